"""What ``audit`` says of each kernel beside what running it has shown (which test_oracle.py checks)."""

from __future__ import annotations

from pathlib import Path
from typing import TYPE_CHECKING, Any

import pytest

from helpers.audit import audit_json
from helpers.compare import disagreements
from oracle import Subject, Truth, corpus, fixtures, read_truth

if TYPE_CHECKING:
    from collections.abc import Callable


@pytest.mark.parametrize("subject", [*corpus(), *fixtures()], ids=str)
def test_audit_agrees_with_execution(subject: Subject) -> None:
    found = disagreements(subject.truth, audit_json([subject.kernel], *subject.options))
    assert not found, "\n".join(found)


ENTRY = {
    "line": 2,
    "argument": "in",
    "direction": "read",
    "pattern": "strided",
    "run_elements": 1.0,
    "stride_bytes": 8,
    "element_bytes": 4,
    "basis": "given",
    "guarded": False,
    "blocked": [],
    "reason": None,
}
FINDING = {"kernel": "top", "rule": "strided-access", "argument": "in", "line": 2, "level": "error", "message": "..."}


def answer(accesses: list[dict[str, Any]], findings: list[dict[str, Any]]) -> dict[str, Any]:
    return {"kernels": [{"name": "top", "accesses": accesses}], "findings": findings, "problems": []}


@pytest.fixture
def truth_of(tmp_path: Path) -> Callable[[str], Truth]:
    def read(comments: str) -> Truth:
        source = tmp_path / "kernel.cpp"
        source.write_text(f"// truth: top in[4]\nx = in[i];  {comments}\n")
        return read_truth(source)

    return read


def test_an_answer_that_is_true_passes(truth_of: Callable[[str], Truth]) -> None:
    truth = truth_of("//! read in strided stride=8 tells=strided-access")
    assert disagreements(truth, answer([ENTRY], [FINDING])) == []


@pytest.mark.parametrize(
    "change",
    [
        {"line": 3},
        {"argument": "out"},
        {"direction": "write"},
        {"pattern": "sequential"},
        {"run_elements": 1.2},
        {"run_elements": None},
        {"stride_bytes": 4},
        {"guarded": True},
    ],
)
def test_a_false_answer_is_seen(change: dict[str, Any], truth_of: Callable[[str], Truth]) -> None:
    truth = truth_of("//! read in strided stride=8 tells=strided-access")
    assert disagreements(truth, answer([{**ENTRY, **change}], [FINDING]))


@pytest.mark.parametrize(
    ("accesses", "findings"),
    [
        ([], [FINDING]),
        ([ENTRY], []),
        ([ENTRY], [{**FINDING, "argument": "out"}]),
        ([ENTRY], [FINDING, {**FINDING, "rule": "descending-access"}]),
        ([ENTRY, {**ENTRY, "line": 9}], [FINDING]),
    ],
)
def test_silence_and_false_alarms_are_seen(accesses: Any, findings: Any, truth_of: Callable[[str], Truth]) -> None:
    truth = truth_of("//! read in strided stride=8 tells=strided-access")
    assert disagreements(truth, answer(accesses, findings))
