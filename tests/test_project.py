"""What README, checks and package say about each other is true."""

from __future__ import annotations

import re
import tomllib
from pathlib import Path

from beatwise import __version__
from beatwise.settings import read_settings
from beatwise_rules import rule_names

ROOT = Path(__file__).parents[1]
README = (ROOT / "README.md").read_text(encoding="utf-8")


def commands() -> list[str]:
    return re.findall(r"^python3 -m venv .*$", README, re.MULTILINE)


def test_the_readme_sets_up_with_two_commands_an_audit_and_the_tests() -> None:
    audit, tests = commands()
    assert audit.endswith("beatwise audit fixtures/ray_transpose.cpp")
    assert "pytest" in tests


def test_the_checks_run_the_readmes_own_test_command() -> None:
    script = (ROOT / ".ci" / "run").read_text(encoding="utf-8")
    assert f"\n{commands()[1]} || exit 1\n" in script
    assert (ROOT / ".ci" / "run").stat().st_mode & 0o111


def test_the_readme_opens_with_one_paragraph_that_states_the_job() -> None:
    title, job, following = README.split("\n\n")[:3]
    assert title == "# Beatwise"
    assert job.startswith("Beatwise is for ")
    assert following.startswith("## ")


def test_every_setting_of_the_readme_is_one(tmp_path: Path) -> None:
    (block,) = re.findall(r"```toml\n(.*?)```", README, re.DOTALL)
    path = tmp_path / "beatwise.toml"
    path.write_text(block, encoding="utf-8")
    settings = read_settings(path, rules=rule_names())
    shown = tomllib.loads(block)
    assert settings.given == shown["given"]
    assert settings.time_limit_seconds == shown["time_limit_seconds"]


def test_the_changelog_tells_of_this_version() -> None:
    assert f"\n## {__version__}\n" in (ROOT / "CHANGELOG.md").read_text(encoding="utf-8")
