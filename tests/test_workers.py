"""What one item does to its worker costs that item only."""

from __future__ import annotations

import os
from pathlib import Path

import pytest

from beatwise.workers import Done, Limits, Lost, each
from misbehaviour import work

LIMITS = Limits(seconds=30.0, megabytes=400)


@pytest.fixture(autouse=True)
def workers_find_this_module(monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.setenv("PYTHONPATH", str(Path(__file__).parent))


@pytest.mark.parametrize("jobs", [1, 2, 5])
def test_results_come_in_the_order_of_the_items_however_many_workers_share(jobs: int) -> None:
    assert list(each(work, range(20), limits=LIMITS, jobs=jobs)) == [Done(item * item) for item in range(20)]


@pytest.mark.parametrize(
    ("item", "why"),
    [
        ("crash", "the analysis of this file crashed (SIGSEGV)"),
        ("abort", "the analysis of this file crashed (SIGABRT)"),
        ("swallow", "needs more than 400 MB of memory"),
    ],
)
def test_a_worker_that_dies_costs_its_own_item_only(item: str, why: str) -> None:
    assert list(each(work, [2, item, 3], limits=LIMITS, jobs=1)) == [Done(4), Lost(why), Done(9)]


@pytest.mark.parametrize("item", ["hang", "spin"])
def test_an_item_that_does_not_end_is_given_up(item: str) -> None:
    limits = Limits(seconds=2.0, megabytes=400)
    assert list(each(work, [2, item, 3], limits=limits, jobs=1)) == [Done(4), Lost("gave up after 2 s"), Done(9)]


def test_all_misbehaviour_at_once_leaves_the_others_alone() -> None:
    found = list(each(work, [1, "crash", 2, "swallow", 3, "abort", 4], limits=LIMITS, jobs=3))
    assert [each.result for each in found if isinstance(each, Done)] == [1, 4, 9, 16]
    assert sum(isinstance(each, Lost) for each in found) == 3


def test_a_mistake_of_ours_is_told_in_one_line_with_its_place() -> None:
    (lost,) = each(work, ["raise"], limits=LIMITS)
    assert isinstance(lost, Lost)
    assert lost.why.startswith(
        "a mistake in beatwise itself, please report it: KeyError: 'no such loop' (at tests/misbehaviour.py:"
    )
    assert "\n" not in lost.why


def test_what_a_library_prints_is_not_taken_for_a_result() -> None:
    assert list(each(work, ["print", 3], limits=LIMITS)) == [Done(0), Done(9)]


def test_a_module_in_the_working_directory_is_not_imported(tmp_path: object, monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.chdir(str(tmp_path))
    with open("pickle.py", "w") as planted:
        planted.write("raise SystemExit('planted code ran')\n")
    assert list(each(work, [3], limits=LIMITS)) == [Done(9)]


def test_a_worker_is_kept_for_the_next_item_until_it_has_held_half_of_its_memory() -> None:
    first, second, _, third = each(work, ["pid", "pid", "gorge", "pid"], limits=LIMITS, jobs=1)
    assert first == second != third


def test_no_worker_outlives_the_loop_that_is_left_early() -> None:
    results = each(work, ["pid"] * 4, limits=LIMITS, jobs=2)
    first = next(results)
    assert isinstance(first, Done)
    results.close()  # type: ignore[attr-defined]
    with pytest.raises(ProcessLookupError):
        os.kill(first.result, 0)
