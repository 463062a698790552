"""The reports that a user sees for each fixture; `pytest --rewrite-golden` writes them anew, the diff is reviewed."""

from __future__ import annotations

import json
import re
from pathlib import Path
from typing import Any

import pytest

from beatwise import cli

ROOT = Path(__file__).parents[1]
FIXTURES = sorted((ROOT / "fixtures").glob("*.cpp"))
REPORTS = ROOT / "fixtures" / "reports"
SAMPLE = "ray_transpose"  #: the fixture whose report the README shows


@pytest.fixture
def rewrite(request: pytest.FixtureRequest) -> bool:
    return bool(request.config.getoption("--rewrite-golden"))


def audit(source: Path, form: str, to: Path) -> str:
    """The report of a fixture, with the directive script that lies beside it, if there is one."""
    script = source.with_suffix(".tcl")
    options = ["--directives", str(script.relative_to(ROOT))] if script.exists() else []
    assert cli.run(["audit", str(source.relative_to(ROOT)), "--as", form, *options, "--to", str(to)]) == cli.DONE
    return to.read_text(encoding="utf-8")


def compare(found: str, golden: Path, rewrite: bool) -> None:
    if rewrite:
        golden.parent.mkdir(exist_ok=True)
        golden.write_text(found, encoding="utf-8")
    assert found == golden.read_text(encoding="utf-8")


@pytest.mark.parametrize("source", FIXTURES, ids=lambda source: source.stem)
@pytest.mark.parametrize(("form", "suffix"), [("text", ".txt"), ("json", ".json")])
def test_a_fixture_has_the_report_that_lies_beside_it(
    source: Path, form: str, suffix: str, tmp_path: Path, monkeypatch: pytest.MonkeyPatch, rewrite: bool
) -> None:
    monkeypatch.chdir(ROOT)
    compare(audit(source, form, tmp_path / "report"), REPORTS / f"{source.stem}{suffix}", rewrite)


def test_there_are_fixtures_and_no_report_without_one() -> None:
    assert len(FIXTURES) >= 10
    assert {report.stem for report in REPORTS.iterdir()} == {source.stem for source in FIXTURES}


@pytest.mark.parametrize("source", FIXTURES, ids=lambda source: source.stem)
def test_text_and_json_tell_the_same_findings(source: Path) -> None:
    text = (REPORTS / f"{source.stem}.txt").read_text(encoding="utf-8")
    document: dict[str, Any] = json.loads((REPORTS / f"{source.stem}.json").read_text(encoding="utf-8"))
    told = re.findall(r"^ +rule  ([a-z-]+), (error|warning|note)", text, re.MULTILINE)
    assert set(told) == {(each["rule"], each["level"]) for each in document["findings"]}
    assert len(told) + text.count(" likewise ") <= len(document["findings"])


def test_the_readme_shows_the_report_as_it_is(rewrite: bool) -> None:
    path = ROOT / "README.md"
    readme = path.read_text(encoding="utf-8")
    report = (REPORTS / f"{SAMPLE}.txt").read_text(encoding="utf-8")
    block = re.compile(r"(\$ beatwise audit fixtures/" + SAMPLE + r"\.cpp\n).*?(?=```\n)", re.DOTALL)
    assert len(block.findall(readme)) == 1
    if rewrite:
        readme = block.sub(lambda match: match[1] + report, readme)
        path.write_text(readme, encoding="utf-8")
    assert report in readme
