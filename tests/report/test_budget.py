"""The budget of a kernel in words: what is known is said, and what would make the rest known."""

from __future__ import annotations

import pytest

from beatwise.model.traffic import KernelTime
from beatwise.report.budget import budget_lines, loop_rows
from report.hand_made import timed


def test_known_sizes_give_bytes_seconds_and_what_advice_would_make_of_them() -> None:
    now, after = budget_lines(timed())
    assert now.startswith("8 MB in 6.97 ms a call: 1.15 GB/s, 0.25 % of the 461 GB/s")
    assert after == "After all advice: 603 µs, 13.3 GB/s, 2.9 % of it."


@pytest.mark.parametrize(
    ("wanted", "unsized", "says"),
    [
        (("rays", "gates"), (), "Seconds need sizes: `--given rays=...` `--given gates=...`."),
        ((), (7,), "Seconds need sizes: a trip-count directive in the loop on line 7."),
        (("n",), (7, 9), "Seconds need sizes: `--given n=...` and a trip-count directive in the loops on line 7, 9."),
        ((), (), "No seconds: a size is not known."),
    ],
)
def test_unknown_sizes_give_rates_and_what_would_make_seconds(
    wanted: tuple[str, ...], unsized: tuple[int, ...], says: str
) -> None:
    now, after, how = budget_lines(timed(basis="assumed", wanted=wanted, unsized=unsized))
    assert now.startswith("1.15 GB/s over a whole call")
    assert "ms" not in now + after and "µs" not in now + after
    assert how == says


def test_what_was_lost_is_said() -> None:
    assert list(budget_lines(timed(lost=2)))[-1] == "No seconds: 2 accesses could not be followed."


def test_where_nothing_can_be_gained_that_is_said() -> None:
    fast = timed(loops=timed().loops[:1])
    assert list(budget_lines(fast))[-1] == "No advice would change that."


def test_expectations_about_data_are_told() -> None:
    assert "where data decides by halves" in next(budget_lines(timed(basis="data")))


def test_nothing_is_said_of_a_kernel_that_moves_nothing() -> None:
    assert list(budget_lines(KernelTime((), 460.8))) == []


def test_loops_are_listed_slowest_first_where_there_are_several_of_known_size() -> None:
    assert [row[1] for row in loop_rows(timed())] == ["keep", "load"]
    assert loop_rows(timed(basis="assumed")) == []
    assert loop_rows(timed(loops=timed().loops[:1])) == []
