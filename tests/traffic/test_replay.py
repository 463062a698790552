"""Walking through a nest number by number: what is seen, what is drawn at random, when it stops."""

from __future__ import annotations

from collections import Counter
from dataclasses import replace
from itertools import pairwise

from hypothesis import given
from hypothesis import strategies as st

from beatwise.model import form as forms
from beatwise.model.access import Access, Recurrence
from beatwise.model.form import number, symbol_form
from beatwise.model.operations import equal, less, negation, select
from beatwise.traffic.replay import STEPS_AT_MOST, Seen, Walker
from traffic.nests import at, drawn, loop, read

STRETCHES = st.lists(
    st.tuples(st.integers(0, 5).map(lambda at: at * 4), st.sampled_from([-4, 0, 4, 8]), st.integers(0, 6)), max_size=8
)


def seen_by(access: Access) -> Seen:
    return Walker(access, {}, {}, {}).walk()


@given(STRETCHES)
def test_a_stretch_is_seen_like_its_executions_one_by_one(stretches: list[tuple[int, int, int]]) -> None:
    at_once, one_by_one = Seen(4), Seen(4)
    for start, stride, many in stretches:
        at_once.take_many(start, stride, many, inner=False)
        for turn in range(many):
            one_by_one.take(start + stride * turn, inner=turn > 0)
    assert (at_once.executions, at_once.runs, at_once.last_run) == (
        one_by_one.executions, one_by_one.runs, one_by_one.last_run,
    )  # fmt: skip
    assert +at_once.steps == +one_by_one.steps
    assert +at_once.inner_steps == +one_by_one.inner_steps
    assert at_once.mean_run == one_by_one.mean_run


@given(st.lists(st.integers(0, 6).map(lambda element: element * 4), min_size=1))
def test_runs_are_counted_by_their_jumps(offsets: list[int]) -> None:
    seen = Seen(4)
    for offset in offsets:
        seen.take(offset, inner=True)
    jumps = sum(after != before + 4 for before, after in pairwise(offsets))
    assert seen.mean_run == len(offsets) / (jumps + 1)
    assert +seen.steps == Counter(after - before for before, after in pairwise(offsets))


def test_rounds_of_a_copy_are_runs_of_their_own() -> None:
    rows, copied = loop("rows", 4), loop("copied", 16, kind="copy")
    assert seen_by(read("in", at(rows) * 64 + at(copied) * 4, rows, copied)).mean_run == 16
    assert seen_by(read("in", at(rows) * 64 + at(copied) * 4, rows, replace(copied, kind="loop"))).mean_run == 64


def test_nothing_seen_has_no_mean() -> None:
    assert Seen(4).mean_run is None


def test_a_long_walk_is_cut_and_the_unfinished_run_left_out() -> None:
    rows, columns = loop("rows", 10**9), loop("columns", 10)
    seen = seen_by(read("in", at(rows) * 400 + at(columns) * 4, rows, columns))
    assert not seen.whole
    assert seen.mean_run == 10
    assert seen.executions <= 10 * STEPS_AT_MOST


def test_an_endless_loop_is_cut() -> None:
    seen = seen_by(read("in", at(endless := loop("endless", None)) * 4, endless))
    assert not seen.whole
    assert seen.executions >= STEPS_AT_MOST


def test_a_carried_variable_takes_its_steps() -> None:
    rows = loop("rows", 6)
    ring = forms.carried("ring", rows.number)
    wrapped = select(equal(symbol_form(ring), number(2)), number(0), symbol_form(ring) + 1)
    rows = replace(rows, recurrences=(Recurrence(ring, number(0), wrapped),))
    seen = seen_by(read("in", symbol_form(ring) * 4, rows))
    assert +seen.steps == Counter({4: 4, -8: 1})


def test_a_loop_ends_before_or_within_the_iteration_that_says_so() -> None:
    rows = loop("rows", 10)
    before = replace(rows, until=(equal(at(rows), number(4)),))
    within = replace(rows, exits=(equal(at(rows), number(4)),))
    assert seen_by(read("in", at(rows) * 4, before)).executions == 4
    assert seen_by(read("in", at(rows) * 4, within)).executions == 5


# ------------------------------------------------------------------------------------------------------ by chance


def test_data_lets_half_of_the_executions_through_in_runs_of_two() -> None:
    rows = loop("rows", 8000)
    seen = seen_by(read("in", at(rows) * 4, rows, guards=(negation(equal(drawn(rows), number(0))),)))
    assert 0.47 < seen.executions / 8000 < 0.53
    assert seen.mean_run is not None and 1.9 < seen.mean_run < 2.1


def test_what_one_branch_leaves_the_other_takes() -> None:
    rows = loop("rows", 500)
    wet = less(drawn(rows), symbol_form(forms.parameter("threshold", 1, 1)))
    taken = seen_by(read("in", at(rows) * 4, rows, guards=(wet,)))
    left = seen_by(read("in", at(rows) * 4, rows, guards=(negation(wet),)))
    assert taken.executions + left.executions == 500


def test_a_test_on_data_is_drawn_once_for_all_that_hang_on_it() -> None:
    rows = loop("rows", 500)
    wet = equal(drawn(rows), number(1))
    count = forms.carried("count", rows.number)
    step = select(wet, symbol_form(count) + 1, symbol_form(count))
    rows = replace(rows, recurrences=(Recurrence(count, number(0), step),))
    seen = seen_by(read("out", symbol_form(count) * 4, rows, guards=(wet,)))
    assert seen.mean_run == seen.executions, "the counter moves when, and only when, the access runs"


def test_data_of_an_outer_loop_is_drawn_once_a_round() -> None:
    rows, columns = loop("rows", 50), loop("columns", 8)
    row = symbol_form(forms.data("table", None, (rows.number,), low=0, high=999))
    seen = seen_by(read("in", row * 32 + at(columns) * 4, rows, columns))
    assert seen.executions == 400
    assert seen.mean_run is not None and 8 <= seen.mean_run < 9


@given(st.integers(-9, 9), st.integers(0, 9))
def test_what_is_drawn_is_within_its_bounds(low: int, width: int) -> None:
    rows = loop("rows", 40)
    value = forms.data("table", None, (rows.number,), low=low, high=low + width)
    walker = Walker(read("in", symbol_form(value) * 4, rows), {}, {}, {})
    walker.walk()
    least = low if low + width < 0 else max(low, 0)  # what may be 0 or more is taken to be
    assert least <= walker.values[value] <= low + width


def test_rows_of_row_pointers_follow_each_other() -> None:
    rows = loop("rows", 20)
    first, second = (
        forms.data("table", None, (), low=0, at=at(rows) * 4 + ahead, depends=frozenset({rows.counter}))
        for ahead in (0, 4)
    )
    inner = loop("inner", symbol_form(second) - symbol_form(first))
    access = read("in", symbol_form(first) * 4 + at(inner) * 4, rows, inner)
    seen = Walker(access, {}, {}, {first: 5 * 256 // 4, second: 5 * 256 // 4}).walk()
    assert (seen.executions, seen.runs) == (100, 1)
