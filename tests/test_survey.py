"""From paths to a survey: what is found, in which order, and what one bad file costs the others."""

from __future__ import annotations

from dataclasses import replace
from pathlib import Path

import pytest

from beatwise.errors import NoKernel, UnknownName
from beatwise.settings import Settings
from beatwise.survey import survey, survey_texts

THIN = """\
extern "C" void {name}(const float *gates, float *thinned, int n) {{
#pragma HLS INTERFACE m_axi port=gates bundle=g0
#pragma HLS INTERFACE m_axi port=thinned bundle=g1
    for (int i = 0; i < n; ++i) thinned[i] = gates[8 * i];
}}
"""
#: 8**10 tokens; no compiler gets through this in the time that the tests give it
BOMB = "#define A0 x\n" + "".join(f"#define A{i} {f'A{i - 1} ' * 8}\n" for i in range(1, 11)) + "int boom() {{ A10 }}\n"
BLOWN = ("gave up after 3 s", "needs more than 2048 MB of memory", "the compiler could not read this file")
HASTY = Settings(time_limit_seconds=3.0)


@pytest.fixture
def folder(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> Path:
    """Three kernels and a file without one."""
    for name in ("a", "b", "c"):
        (tmp_path / f"{name}.cpp").write_text(THIN.format(name=f"thin_{name}"), encoding="utf-8")
    (tmp_path / "ordinary.cpp").write_text("int stations() { return 4; }\n", encoding="utf-8")
    monkeypatch.chdir(tmp_path)
    return tmp_path


def kernels(*paths: Path, settings: Settings = HASTY) -> list[str]:
    return [sheet.kernel for sheet in survey(paths, settings).kernels]


def test_a_folder_gives_its_kernels_in_the_order_of_the_names(folder: Path) -> None:
    assert kernels(folder) == ["thin_a", "thin_b", "thin_c"]


def test_files_give_their_kernels_in_the_order_they_are_named(folder: Path) -> None:
    assert kernels(folder / "c.cpp", folder / "a.cpp") == ["thin_c", "thin_a"]


@pytest.mark.parametrize("jobs", [1, 2, 4])
def test_a_macro_bomb_costs_one_line_whatever_the_number_of_jobs(folder: Path, jobs: int) -> None:
    (folder / "aa.cpp").write_text(BOMB + THIN.format(name="thin_bomb"), encoding="utf-8")
    found = survey([folder], replace(HASTY, jobs=jobs))
    assert [sheet.kernel for sheet in found.kernels] == ["thin_a", "thin_b", "thin_c"]
    (problem,) = found.problems
    assert problem.file == "aa.cpp"
    assert problem.what in BLOWN
    assert not found.failed


def test_a_named_file_that_could_not_be_done_makes_the_survey_fail(folder: Path) -> None:
    (folder / "bomb.cpp").write_text(BOMB + THIN.format(name="thin_bomb"), encoding="utf-8")
    assert survey([folder / "a.cpp", folder / "bomb.cpp"], HASTY).failed


def test_a_folder_of_which_nothing_could_be_done_makes_the_survey_fail(tmp_path: Path) -> None:
    (tmp_path / "bomb.cpp").write_text(BOMB + THIN.format(name="thin_bomb"), encoding="utf-8")
    assert survey([tmp_path], HASTY).failed


def test_an_expression_too_deep_for_the_analysis_costs_its_file_only(folder: Path) -> None:
    deep = THIN.format(name="thin_deep").replace("8 * i", " + ".join(["i"] * 100_000))
    (folder / "deep.cpp").write_text(deep, encoding="utf-8")
    found = survey([folder], replace(Settings(), time_limit_seconds=10.0))
    assert [sheet.kernel for sheet in found.kernels][:3] == ["thin_a", "thin_b", "thin_c"]
    assert {problem.file for problem in found.problems} == {"deep.cpp"}


def test_an_include_of_a_file_outside_reads_nothing(folder: Path) -> None:
    (folder / ".git").mkdir()
    secret = folder.parent / "secret.h"
    secret.write_text("#define SECRET 77\n", encoding="utf-8")
    source = f'#include "{secret}"\n#include "../secret.h"\n#include "/etc/passwd"\n'
    text = source + THIN.format(name="thin_peek").replace("8 * i", "SECRET * i")
    (folder / "peek.cpp").write_text(text, encoding="utf-8")
    (sheet,) = survey([folder / "peek.cpp"], HASTY).kernels
    assert 77 * 4 not in {row.stride_bytes for row in sheet.accesses}
    assert any(finding.rule == "invented-name" for finding in sheet.findings)


def test_what_is_given_settles_a_size_and_is_said_to(folder: Path) -> None:
    (sheet,) = survey([folder / "a.cpp"], replace(HASTY, given={"n": 256})).kernels
    assert {(row.basis, row.executions) for row in sheet.accesses} == {("given", 256)}
    (sheet,) = survey([folder / "a.cpp"], HASTY).kernels
    assert {(row.basis, row.executions) for row in sheet.accesses} == {("assumed", 1024)}


def test_a_top_function_is_looked_for_in_every_file(folder: Path) -> None:
    found = survey([folder / "a.cpp", folder / "b.cpp"], replace(HASTY, top=("thin_b",)))
    assert [sheet.kernel for sheet in found.kernels] == ["thin_b"]
    assert (found.problems, found.failed) == ((), False)
    assert kernels(folder, settings=replace(HASTY, top=("thin_c", "thin_a"))) == ["thin_a", "thin_c"]
    with pytest.raises(UnknownName, match="did you mean 'thin_b'"):
        survey([folder], replace(HASTY, top=("thinb",)))


def test_a_folder_without_a_kernel_is_refused_unless_only_kernels_count(folder: Path) -> None:
    (folder / "plain").mkdir()
    (folder / "plain" / "ordinary.cpp").write_text("int f() { return 1; }\n", encoding="utf-8")
    with pytest.raises(NoKernel, match="plain: no kernel in this folder"):
        survey([folder / "plain"], HASTY)
    assert survey([folder / "plain"], HASTY, only_kernels=True).kernels == ()


def test_an_acceptance_in_a_shared_header_counts_where_it_matches(folder: Path) -> None:
    (folder / "shared.h").write_text(
        "// beatwise accepts strided-access: one gate of eight is enough for the preview\n"
        "inline float eighth(const float *gates, int i) { return gates[8 * i]; }\n"
        "inline float first(const float *gates, int i) { return gates[i]; }\n",
        encoding="utf-8",
    )
    for name, helper in (("d", "eighth"), ("e", "first")):
        text = THIN.format(name=f"thin_{name}").replace("gates[8 * i]", f"{helper}(gates, i)")
        (folder / f"{name}.cpp").write_text('#include "shared.h"\n' + text, encoding="utf-8")
    found = survey([folder / "d.cpp", folder / "e.cpp"], HASTY)
    assert found.problems == ()
    assert [each.accepted for each in found.kernels[0].findings if each.rule == "strided-access"] == [
        "one gate of eight is enough for the preview"
    ]


def test_texts_are_surveyed_without_files() -> None:
    (kernel,) = survey_texts({"thin.cpp": THIN.format(name="thin")}, given={"n": 64})
    assert [(each.access.argument, each.walk.pattern) for each in kernel.traffic] == [
        ("gates", "strided"),
        ("thinned", "sequential"),
    ]
    assert "strided-access" in {finding.rule for finding in kernel.findings}


def test_a_size_that_is_given_turns_rates_into_seconds() -> None:
    """4096 floats at 13.27 GB/s of one HBM2 channel."""
    text = """
    void load(const float *in, float *out, int n) {
    #pragma HLS INTERFACE mode=m_axi port=in bundle=a
    #pragma HLS INTERFACE mode=m_axi port=out bundle=b
        for (int i = 0; i < n * 16; ++i) out[i] = in[i];
    }
    """
    (unknown,) = survey_texts({"load.cpp": text})
    assert (unknown.time.seconds, unknown.time.wanted) == (None, ("n",))
    (known,) = survey_texts({"load.cpp": text}, given={"n": 256})
    assert known.time.seconds == pytest.approx(4096 * 4 / 13.27e9, rel=0.01)
    assert (known.time.wanted, known.time.basis) == ((), "given")


@pytest.mark.parametrize(
    ("directive", "held"),
    [
        ("", True),
        ("dependence variable=bins inter false", False),
        ("DEPENDENCE variable=bins type=inter dependent=false", False),
        ("dependence variable=bins intra false", True),
        ("dependence variable=bins inter true", True),
    ],
)
def test_a_directive_that_denies_a_dependence_is_believed(directive: str, held: bool) -> None:
    text = f"""
    void count(const int *echoes, int *bins) {{
    #pragma HLS INTERFACE mode=m_axi port=echoes bundle=a
    #pragma HLS INTERFACE mode=m_axi port=bins bundle=b
        for (int i = 0; i < 4096; ++i) {{
    #pragma HLS {directive or "pipeline"}
            bins[echoes[i]] += 1;
        }}
    }}
    """
    (kernel,) = survey_texts({"count.cpp": text})
    assert any(item.limit == "interval" for item in kernel.traffic) is held
