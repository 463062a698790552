"""The commands as a user types them."""

from __future__ import annotations

import json
import os
import re
import resource
import signal
import subprocess
import sys
import time
from collections.abc import Callable
from dataclasses import dataclass
from pathlib import Path

import pytest

from beatwise import cli
from beatwise.memory import board_names

GUARDED = """\
extern "C" void keep_strong(const float *gates, float *strong, const float *floor_dbz) {
#pragma HLS INTERFACE m_axi port=gates bundle=g0
#pragma HLS INTERFACE m_axi port=strong bundle=g1
#pragma HLS INTERFACE m_axi port=floor_dbz bundle=g2
    for (int i = 0; i < 4096; ++i) {
        if (gates[i] > floor_dbz[i]) strong[i] = gates[i];
    }
}
"""
CLEAN = """\
#include "ap_int.h"
extern "C" void copy_scan(const ap_uint<512> *gates, ap_uint<512> *out) {
#pragma HLS INTERFACE m_axi port=gates bundle=g0
#pragma HLS INTERFACE m_axi port=out bundle=g1
    for (int i = 0; i < 4096; ++i) {
#pragma HLS PIPELINE II=1
        out[i] = gates[i];
    }
}
"""


@dataclass(frozen=True, slots=True)
class Told:
    status: int
    out: str
    err: str


@pytest.fixture
def beatwise(tmp_path: Path, monkeypatch: pytest.MonkeyPatch, capfd: pytest.CaptureFixture[str]) -> Callable[..., Told]:
    """Runs a command line in a folder with a guarded and a clean kernel."""
    (tmp_path / "guarded.cpp").write_text(GUARDED, encoding="utf-8")
    (tmp_path / "clean.cpp").write_text(CLEAN, encoding="utf-8")
    monkeypatch.chdir(tmp_path)

    def run(*arguments: str) -> Told:
        status = cli.run(arguments)
        return Told(status, *capfd.readouterr())

    return run


Beatwise = Callable[..., Told]

# ----------------------------------------------------------------------------------------------------- bad input


@pytest.mark.parametrize(
    ("name", "content", "line"),
    [
        ("missing.cpp", None, "missing.cpp: no such file or folder"),
        ("empty.cpp", b"", "empty.cpp: an empty file"),
        ("binary.cpp", b"\x7fELF\0\0\0", "binary.cpp: a binary file, not C++ source"),
        ("plain.cpp", b"int level = 3;\n", "plain.cpp: no kernel function in it"),
    ],
)
def test_a_path_that_cannot_be_used_is_named_in_one_line(
    beatwise: Beatwise, name: str, content: bytes | None, line: str
) -> None:
    if content is not None:
        Path(name).write_bytes(content)
    for command in ("sift", "audit"):
        assert beatwise(command, name) == Told(2, "", f"beatwise: {line}\n")
        assert beatwise(command, "clean.cpp", name) == Told(2, "", f"beatwise: {line}\n")


def test_a_syntax_error_is_told_with_its_line(beatwise: Beatwise) -> None:
    Path("broken.cpp").write_text(GUARDED.replace("++i) {", "++i {"), encoding="utf-8")
    told = beatwise("audit", "broken.cpp")
    assert told.status == 2
    assert re.fullmatch(r"beatwise: broken\.cpp:5: .+\n", told.err)


@pytest.mark.parametrize(
    ("arguments", "line"),
    [
        (
            ["--top", "keep_stong"],
            "no top function named 'keep_stong'; did you mean 'keep_strong'? known are keep_strong",
        ),
        (["--given", "n"], "--given: 'n': expected NAME=WHOLE NUMBER"),
        (["--given", "n=many"], "--given: 'n=many': 'many' is no whole number"),
        (["--given", "4=4"], "--given: '4=4': expected NAME=WHOLE NUMBER"),
        (["--define", "2X"], "--define: '2X': expected NAME or NAME=VALUE"),
        (["--board", "hbm9"], f"no board named 'hbm9'; known: {', '.join(board_names())}; or name a .toml file"),
        (["--board", "mine.toml"], "mine.toml: no such file"),
        (["--as", "yaml"], "--as: 'yaml' is not one of 'text', 'json'."),
        (["--jobs", "0"], "--jobs: 0 is not in the range x>=1."),
        (["--include", "nowhere"], "nowhere: no such folder to include from"),
        (["--directives", "nowhere.tcl"], "--directives: File 'nowhere.tcl' does not exist."),
        (["--settings", "nowhere.toml"], "--settings: File 'nowhere.toml' does not exist."),
        (["--to", "nowhere/report.txt"], "nowhere/report.txt: cannot be written (No such file or directory)"),
        (["--frobnicate"], "No such option '--frobnicate'."),
    ],
)
def test_a_mistake_in_the_command_is_named_in_one_line(beatwise: Beatwise, arguments: list[str], line: str) -> None:
    assert beatwise("audit", "guarded.cpp", *arguments) == Told(2, "", f"beatwise: {line}\n")


def test_settings_that_make_no_sense_are_named_with_file_and_key(beatwise: Beatwise) -> None:
    Path("beatwise.toml").write_text("treshold = 'note'\n", encoding="utf-8")
    told = beatwise("sift", "guarded.cpp")
    assert told == Told(2, "", "beatwise: beatwise.toml: unknown key 'treshold'; did you mean 'threshold'?\n")


def test_a_rule_that_does_not_exist_is_named_with_the_nearest(beatwise: Beatwise) -> None:
    told = beatwise("why", "guarded-acess")
    assert told.status == 2
    assert told.err.startswith("beatwise: no rule named 'guarded-acess'; did you mean 'guarded-access'? known are ")
    assert told.out == ""


@pytest.mark.parametrize("arguments", [[], ["audit"], ["frobnicate"]])
def test_an_incomplete_command_is_told_in_one_line(beatwise: Beatwise, arguments: list[str]) -> None:
    told = beatwise(*arguments)
    assert (told.status, told.out, told.err.count("\n")) == (2, "", 1)


# ------------------------------------------------------------------------------------------------------ statuses


def test_sift_ends_with_1_where_something_is_found_and_0_where_nothing_is(beatwise: Beatwise) -> None:
    assert beatwise("sift", "guarded.cpp").status == 1
    assert beatwise("sift", "clean.cpp").status == 0
    assert beatwise("sift", ".").status == 1


def test_audit_ends_with_0_whatever_is_found(beatwise: Beatwise) -> None:
    assert beatwise("audit", "guarded.cpp").status == 0


def test_the_threshold_of_the_settings_decides_what_counts(beatwise: Beatwise) -> None:
    Path("beatwise.toml").write_text("[levels]\nguarded-access = 'note'\n", encoding="utf-8")
    assert beatwise("sift", "guarded.cpp").status == 0
    Path("beatwise.toml").write_text("threshold = 'note'\n[levels]\nguarded-access = 'note'\n", encoding="utf-8")
    assert beatwise("sift", "guarded.cpp").status == 1


def test_a_rule_can_be_turned_off(beatwise: Beatwise) -> None:
    Path("beatwise.toml").write_text("[levels]\nguarded-access = 'off'\n", encoding="utf-8")
    assert "guarded-access" not in beatwise("audit", "guarded.cpp").out.split("\n  then")[0].split("then")[0]


def test_paths_with_different_settings_are_refused(beatwise: Beatwise) -> None:
    Path("north").mkdir()
    Path("north/beatwise.toml").write_text("threshold = 'note'\n", encoding="utf-8")
    Path("north/scan.cpp").write_text(CLEAN, encoding="utf-8")
    told = beatwise("sift", "guarded.cpp", "north/scan.cpp")
    assert told.status == 2
    assert "different settings" in told.err
    assert beatwise("sift", "guarded.cpp", "north/scan.cpp", "--settings", "north/beatwise.toml").status == 1


def test_files_without_a_kernel_can_be_passed_over(beatwise: Beatwise) -> None:
    Path("ordinary.cpp").write_text("int f(const int *list) { return list[0]; }\n", encoding="utf-8")
    Path("empty.hpp").write_text("", encoding="utf-8")
    assert beatwise("sift", "--skip-without-kernel", "ordinary.cpp", "empty.hpp").status == 0
    assert beatwise("sift", "--skip-without-kernel", "ordinary.cpp", "guarded.cpp").status == 1
    assert beatwise("sift", "--skip-without-kernel", "missing.cpp").status == 2


# ------------------------------------------------------------------------------------------------------ accepted


def accepted(comment: str) -> str:
    return GUARDED.replace("        if (gates", f"        {comment}\n        if (gates")


def test_a_finding_that_the_source_accepts_no_longer_counts(beatwise: Beatwise) -> None:
    source = accepted("// beatwise accepts guarded-access: a scan has twelve strong gates at most")
    Path("guarded.cpp").write_text(source, encoding="utf-8")
    assert beatwise("sift", "guarded.cpp").status == 0
    told = beatwise("audit", "guarded.cpp", "--as", "json")
    reasons = {each["rule"]: each["accepted"] for each in json.loads(told.out)["findings"]}
    assert reasons["guarded-access"] == "a scan has twelve strong gates at most"
    assert told.err == ""


@pytest.mark.parametrize(
    ("comment", "status", "line"),
    [
        (
            "// beatwise accepts guarded-access",
            1,
            "accepts guarded-access without a reason, so it does not count: "
            "write 'beatwise accepts guarded-access: why'",
        ),
        (
            "// beatwise accepts descending-access: the scan turns back",
            1,
            "accepts descending-access, but nothing of the kind is found there: the comment can go",
        ),
        (
            "// beatwise accepts garded-access: typing error",
            1,
            "accepts 'garded-access', but there is no such rule (beatwise why lists them)",
        ),
    ],
)
def test_an_acceptance_that_does_not_count_is_told(beatwise: Beatwise, comment: str, status: int, line: str) -> None:
    Path("guarded.cpp").write_text(accepted(comment), encoding="utf-8")
    told = beatwise("sift", "guarded.cpp")
    assert (told.status, told.err) == (status, f"beatwise: guarded.cpp:6: {line}\n")


# -------------------------------------------------------------------------------------------------------- output


def test_the_report_can_go_to_a_file(beatwise: Beatwise) -> None:
    direct = beatwise("audit", "guarded.cpp")
    assert beatwise("audit", "guarded.cpp", "--to", "report.txt") == Told(0, "", "")
    assert Path("report.txt").read_text(encoding="utf-8") == direct.out
    assert sorted(os.listdir()) == ["clean.cpp", "guarded.cpp", "report.txt"]


def test_a_file_keeps_its_old_content_when_the_new_report_fails(
    beatwise: Beatwise, monkeypatch: pytest.MonkeyPatch
) -> None:
    Path("report.txt").write_text("as it was\n", encoding="utf-8")

    def full(*_: object) -> None:
        raise OSError(28, "No space left on device")

    monkeypatch.setattr(os, "replace", full)
    assert beatwise("audit", "guarded.cpp", "--to", "report.txt").status == 2
    assert Path("report.txt").read_text(encoding="utf-8") == "as it was\n"
    assert sorted(os.listdir()) == ["clean.cpp", "guarded.cpp", "report.txt"]


def test_sift_as_json_has_the_findings_that_count(beatwise: Beatwise) -> None:
    told = beatwise("sift", ".", "--as", "json")
    document = json.loads(told.out)
    assert [each["name"] for each in document["kernels"]] == ["copy_scan", "keep_strong"]
    assert {each["level"] for each in document["findings"]} <= {"error", "warning"}
    assert "guarded-access" in {each["rule"] for each in document["findings"]}


def test_the_page_of_a_rule_is_shown(beatwise: Beatwise) -> None:
    told = beatwise("why", "guarded-access")
    assert told.status == 0
    assert told.out.startswith("guarded-access\n")
    assert "Slow::" in told.out


def test_why_alone_lists_all_rules(beatwise: Beatwise) -> None:
    from beatwise_rules import rule_names

    assert set(rule_names()) <= set(beatwise("why").out.split())


@pytest.mark.parametrize("command", [[], ["sift"], ["audit"], ["why"]])
def test_help_is_complete(beatwise: Beatwise, command: list[str]) -> None:
    told = beatwise(*command, "--help")
    assert (told.status, told.err) == (0, "")
    if command in (["sift"], ["audit"]):
        assert "the synthesis report and the board decide" in " ".join(told.out.split())
        for option in ("board", "top", "given", "include", "define", "directives", "settings", "as", "to", "jobs"):
            assert f"--{option} " in told.out


def test_the_version_is_told(beatwise: Beatwise) -> None:
    assert re.fullmatch(r"beatwise \d+\.\d+\.\d+\n", beatwise("--version").out)


# ---------------------------------------------------------------------------------------- as a process of its own


def start(where: Path, environment: dict[str, str], *arguments: str) -> subprocess.Popen[str]:
    return subprocess.Popen(
        [sys.executable, "-m", "beatwise", *arguments],
        cwd=where,
        stdout=subprocess.PIPE,
        stderr=subprocess.PIPE,
        text=True,
        env=environment,
        start_new_session=True,
    )


@pytest.mark.usefixtures("beatwise")
def test_a_reader_that_goes_away_is_no_error(tmp_path: Path, program_environment: dict[str, str]) -> None:
    with start(tmp_path, program_environment, "audit", "guarded.cpp", "--as", "json") as program:
        assert program.stdout is not None and program.stderr is not None
        program.stdout.close()
        assert program.stderr.read() == ""
    assert program.returncode == cli.NO_READER


@pytest.mark.usefixtures("beatwise")
def test_an_interrupt_ends_it_quietly_with_130_and_leaves_no_file(
    tmp_path: Path, program_environment: dict[str, str]
) -> None:
    bomb = "#define A(x) x x x x x x x x\n" + GUARDED.replace("if (gates", "A(A(A(A(A(A(A(A(;)))))))) if (gates")
    (tmp_path / "slow.cpp").write_text(bomb, encoding="utf-8")
    with start(tmp_path, program_environment, "audit", "slow.cpp", "--to", "report.txt") as program:
        time.sleep(1.0)
        os.killpg(program.pid, signal.SIGINT)
        _, err = program.communicate(timeout=10)
    assert (program.returncode, err) == (130, "")
    assert not list(tmp_path.glob("*report*"))


@pytest.mark.usefixtures("beatwise")
def test_one_small_file_takes_less_than_a_second_of_work(tmp_path: Path, program_environment: dict[str, str]) -> None:
    def seconds() -> float:
        used = resource.getrusage(resource.RUSAGE_CHILDREN)
        return used.ru_utime + used.ru_stime

    before = seconds()
    with start(tmp_path, program_environment, "audit", "clean.cpp") as program:
        program.communicate()
    assert program.returncode == 0
    assert 0 < seconds() - before < 1.0
