"""What keeps a run from becoming bursts. One kernel that shows each condition, and look-alikes that are free of it
(conditions: HLS user guide UG1399, 2023.2, "Preconditions and Limitations of Burst Transfer")."""

from __future__ import annotations

from dataclasses import replace

import pytest

from beatwise.model import form as forms
from beatwise.model.access import Access, Guard, Recurrence
from beatwise.model.form import number, symbol_form
from beatwise.model.operations import equal, floordiv, less, negation, select
from beatwise.traffic import measure
from traffic.nests import HBM, at, choice, drawn, loop, place, read, trace, traffic, write


def blocked(*accesses: Access) -> list[tuple[str, ...]]:
    return [item.blocked for item in traffic(*accesses)]


def test_a_plain_walk_is_free() -> None:
    i = loop("i", 64)
    assert blocked(read("in", at(i) * 4, i), write("out", at(i) * 4, i)) == [(), ()]


# ------------------------------------------------------------------------------------------------------- guards


def test_a_condition_by_data_in_the_loop() -> None:
    """if (mask[i]) out[i] = x;"""
    i = loop("i", 64)
    assert blocked(write("out", at(i) * 4, i, guards=(drawn(i),))) == [("data-dependent-guard",)]


def test_a_condition_by_data_around_the_loop_is_free() -> None:
    """for r: if (flag[r]) for c: out[64*r + c] = x;"""
    r, c = loop("r", 8), loop("c", 64)
    assert blocked(write("out", at(r) * 256 + at(c) * 4, r, c, guards=(drawn(r),))) == [()]


def test_a_condition_by_counters_or_arguments_is_free() -> None:
    i = loop("i", 64)
    n = symbol_form(forms.parameter("n", 0, 1000))
    guards = (less(at(i), number(40)), less(at(i), n))
    assert [
        item.blocked for item in measure(trace(write("out", at(i) * 4, i, guards=guards)), HBM, {"n": 30}).traffic
    ] == [()]


def test_a_loop_of_one_trip_does_not_hide_the_condition() -> None:
    i, once = loop("i", 64), loop("once", 1)
    access = write("out", at(i) * 4 + at(once) * 4, i, once, guards=(drawn(i),))
    assert blocked(access) == [("data-dependent-guard",)]


def test_stores_in_both_branches_are_free() -> None:
    """if (wet) out[i] = a; else out[i] = b;"""
    i = loop("i", 64)
    wet = drawn(i)
    first = write("out", at(i) * 4, i, guards=(wet,))
    second = write("out", at(i) * 4, i, guards=(negation(wet),))
    both = traffic(first, second)
    assert [item.blocked for item in both] == [(), ()]
    assert [item.walk.run_elements for item in both] == [64, 64]
    assert sum(item.walk.executions or 0 for item in both) == 64


def test_stores_in_every_branch_of_a_chain_are_free() -> None:
    """if (a) out[i] = 1; else if (b) out[i] = 2; else out[i] = 3;"""
    i = loop("i", 64)
    a, b = drawn(i), drawn(i)
    chain = ((a,), (negation(a), b), (negation(a), negation(b)))
    assert blocked(*(write("out", at(i) * 4, i, guards=guards) for guards in chain)) == [(), (), ()]


def test_a_chain_with_a_gap_is_not() -> None:
    """if (a) out[i] = 1; else if (b) out[i] = 2;"""
    i = loop("i", 64)
    a, b = drawn(i), drawn(i)
    chain = ((a,), (negation(a), b))
    assert blocked(*(write("out", at(i) * 4, i, guards=guards) for guards in chain)) == [("data-dependent-guard",)] * 2


def test_branches_that_store_to_different_places_are_not_free() -> None:
    """if (wet) rain[i] = x; else dry[i] = x;"""
    i = loop("i", 64)
    wet = drawn(i)
    accesses = (write("rain", at(i) * 4, i, guards=(wet,)), write("dry", at(i) * 4, i, guards=(negation(wet),)))
    assert blocked(*accesses) == [("data-dependent-guard",)] * 2


def test_a_store_again_under_a_condition_is_not_free() -> None:
    """out[i] = 0; if (wet) out[i] = x;"""
    i = loop("i", 64)
    assert blocked(write("out", at(i) * 4, i), write("out", at(i) * 4, i, guards=(drawn(i),))) == [
        (),
        ("data-dependent-guard",),
    ]


def test_a_condition_that_is_carried_along_by_data() -> None:
    """if (count < 10) out[i] = x;  where count grows when mask[i] says so"""
    held = forms.carried("count", 0)
    count = symbol_form(held)
    i = loop("i", 64)
    grows = replace(i, recurrences=(Recurrence(held, number(0), count + select(drawn(i), number(1), number(0))),))
    steady = replace(i, recurrences=(Recurrence(held, number(0), count + 1),))
    guard = less(count, number(10))
    assert blocked(write("out", at(i) * 4, grows, guards=(guard,))) == [("data-dependent-guard",)]
    assert blocked(write("out", at(i) * 4, steady, guards=(guard,))) == [()]


# ------------------------------------------------------------------------------------------------------- exits


def test_an_exit_by_data_read_in_the_loop() -> None:
    """for (i..) if (in[i] == key) break;   while (in[i]) i++;"""
    i = loop("i", 64, data_exit=place())
    leaving = replace(i, exits=(drawn(i),))
    assert blocked(read("in", at(i) * 4, leaving)) == [("data-dependent-exit",)]
    endless = loop("k", None, data_exit=place())
    assert blocked(read("in", at(endless) * 4, endless)) == [("data-dependent-exit",)]


def test_what_runs_only_until_then_is_told_once() -> None:
    """for (i..) { if (in[i] == key) break; out[i] = x; }"""
    i = loop("i", 64, data_exit=place())
    key = drawn(i)
    leaving = replace(i, exits=(key,))
    after = write("out", at(i) * 4, leaving, guards=(Guard(negation(key), place(), leaves=True),))
    assert blocked(after) == [("data-dependent-exit",)]


def test_leaving_a_helper_early_is_a_guard() -> None:
    """void put(..) { if (x < 0) return; out[i] = x; }   called in a loop that has no exit"""
    i = loop("i", 64)
    after = write("out", at(i) * 4, i, guards=(Guard(drawn(i), place(), leaves=True),))
    assert blocked(after) == [("data-dependent-guard",)]


def test_a_length_loaded_before_the_loop_is_free() -> None:
    """for (k = row[r]; k < row[r+1]; k++) y += val[k];"""
    r = loop("r", 8)
    k = loop("k", symbol_form(forms.data("row", place(), (r.number,), low=5, high=9)))
    first = symbol_form(forms.data("row", place(), (r.number,), low=0, high=400))
    assert blocked(read("val", (first + at(k)) * 4, r, k)) == [()]


def test_an_exit_around_the_loop_is_free() -> None:
    """for (;;) { if (done[b]) break; for c: out[64*b + c] = x; }"""
    b, c = loop("b", None, data_exit=place()), loop("c", 64)
    assert blocked(write("out", at(b) * 256 + at(c) * 4, b, c)) == [()]


# ------------------------------------------------------------------------------------------------- interleaving


def test_two_arguments_on_one_port_take_turns() -> None:
    i = loop("i", 64)
    both = (read("a", at(i) * 4, i, interface="gmem"), read("b", at(i) * 4, i, interface="gmem"))
    assert blocked(*both) == [("interleaved",)] * 2


def test_two_halves_of_one_argument_take_turns() -> None:
    i = loop("i", 64)
    assert blocked(read("a", at(i) * 4, i), read("a", at(i) * 4 + 256, i)) == [("interleaved",)] * 2


def test_a_window_meets_elements_again() -> None:
    """a[i-1], a[i], a[i+1]: not consecutive without overlap."""
    i = loop("i", 64)
    assert blocked(*(read("a", at(i) * 4 + 4 * k, i) for k in range(3))) == [("interleaved",)] * 3


def test_the_bounds_of_an_inner_loop_meet_again() -> None:
    """for r: for (k = row[r]; k < row[r+1]; k++) ..   reads each bound twice."""
    r, k = loop("r", 64), loop("k", 8)
    bounds = (read("row", at(r) * 4, r), read("row", at(r) * 4 + 4, r))
    assert blocked(*bounds, read("val", at(k) * 4, r, k)) == [("interleaved",), ("interleaved",), ()]


def test_neighbours_that_fill_the_stride_are_one_run() -> None:
    """a[3i], a[3i+1], a[3i+2], in any order"""
    i = loop("i", 64)
    three = traffic(*(read("a", at(i) * 12 + 4 * k, i) for k in (1, 0, 2)))
    assert [item.blocked for item in three] == [()] * 3
    assert {(item.walk.pattern, item.walk.stride_bytes, item.walk.run_elements) for item in three} == {
        ("sequential", 4, 192)
    }
    assert [item.walk.executions for item in three] == [64] * 3


def test_neighbours_in_two_rows_are_two_runs_that_take_turns() -> None:
    """a[2i], a[2i+1], b[2i], b[2i+1] with b a row further on"""
    i = loop("i", 32)
    four = traffic(*(read("a", at(i) * 8 + 4 * k + row, i) for row in (0, 1024) for k in range(2)))
    assert [(item.walk.pattern, item.walk.run_elements, item.blocked) for item in four] == [
        ("sequential", 64, ("interleaved",))
    ] * 4


def test_neighbours_stored_in_both_branches_are_one_run() -> None:
    """if (wet) { out[2i] = a; out[2i+1] = b; } else { out[2i] = c; out[2i+1] = d; }"""
    i = loop("i", 64)
    wet = drawn(i)
    four = traffic(
        *(write("out", at(i) * 8 + 4 * k, i, guards=(guard,)) for guard in (wet, negation(wet)) for k in range(2))
    )
    assert [item.blocked for item in four] == [()] * 4
    assert [(item.walk.run_elements, item.walk.executions) for item in four] == [(128, 32)] * 4


def test_neighbours_that_leave_a_gap_are_not() -> None:
    """a[4i], a[4i+1]"""
    i = loop("i", 64)
    two = traffic(read("a", at(i) * 16, i), read("a", at(i) * 16 + 4, i))
    assert [(item.walk.pattern, item.walk.run_elements, item.blocked) for item in two] == [
        ("strided", 1, ("interleaved",))
    ] * 2


def test_the_fields_of_a_record_are_one_element() -> None:
    i = loop("i", 64)
    fields = [read("cells", at(i) * 8, i, size=8, part_bytes=4, covers=name) for name in ("power", "width")]
    assert blocked(*fields) == [(), ()]


def test_loading_an_element_twice_is_no_interleaving() -> None:
    i = loop("i", 64)
    assert blocked(read("a", at(i) * 4, i), read("a", at(i) * 4, i)) == [(), ()]


@pytest.mark.parametrize("other", ["port", "direction", "loop"])
def test_what_differs_in_port_direction_or_loop_does_not_take_turns(other: str) -> None:
    i, j = loop("i", 64), loop("j", 64)
    first = read("a", at(i) * 4, i, interface="gmem")
    second = {
        "port": read("b", at(i) * 4, i),
        "direction": write("b", at(i) * 4, i, interface="gmem"),
        "loop": read("b", at(j) * 4, j, interface="gmem"),
    }[other]
    assert blocked(first, second) == [(), ()]


def test_what_stays_put_in_the_loop_does_not_take_turns() -> None:
    """for i: for j: s += gain[i] * in[64*i + j];"""
    i, j = loop("i", 8), loop("j", 64)
    both = (read("gain", at(i) * 4, i, j, interface="g"), read("in", at(i) * 256 + at(j) * 4, i, j, interface="g"))
    assert blocked(*both) == [(), ()]


def test_branches_that_exclude_each_other_do_not_take_turns() -> None:
    """i < 32 ? a[i] : b[i]"""
    i = loop("i", 64)
    near = less(at(i), number(32))
    accesses = (
        read("a", at(i) * 4, i, interface="g", guards=(near,)),
        read("b", at(i) * 4, i, interface="g", guards=(negation(near),)),
    )
    assert blocked(*accesses) == [(), ()]


def test_cases_of_one_value_do_not_take_turns() -> None:
    i = loop("i", 64)
    q = loop("q", 4)
    cases = [
        read(name, at(i) * 4, q, i, interface="g", guards=(equal(at(q), number(value)),))
        for name, value in (("a", 0), ("b", 1), ("c", 2))
    ]
    assert blocked(*cases) == [()] * 3


def test_alternatives_of_one_choice_do_not_take_turns() -> None:
    i, q = loop("i", 64), loop("q", 4)
    pick = choice(at(q), "a", "b", "c")
    site = place()
    arms = [read(name, at(i) * 4, q, i, interface="g", choice=pick, place=site) for name in "abc"]
    assert blocked(*arms) == [()] * 3
    elsewhere = replace(arms[0], place=place())
    assert blocked(elsewhere, *arms[1:]) == [("interleaved",)] * 3


def test_neighbours_out_of_step_are_no_run() -> None:
    """a[2i], a[2i+3]"""
    i = loop("i", 64)
    assert blocked(read("a", at(i) * 8, i), read("a", at(i) * 8 + 12, i)) == [("interleaved",)] * 2


# ------------------------------------------------------------------------------------------- loading and storing


def test_an_update_in_place() -> None:
    i = loop("i", 64)
    assert blocked(read("map", at(i) * 4, i), write("map", at(i) * 4, i)) == [("load-and-store",)] * 2


def test_an_update_over_two_loops_is_free() -> None:
    t, i, j = loop("t", 4), loop("i", 64), loop("j", 64)
    both = (read("map", at(t) * 256 + at(i) * 4, t, i), write("map", at(t) * 256 + at(j) * 4, t, j))
    assert blocked(*both) == [(), ()]


def test_an_update_around_an_inner_loop() -> None:
    """for r: { x = y[r]; for k: x += a[8*r + k]; y[r] = x; }"""
    r, k = loop("r", 16), loop("k", 8)
    row = read("a", at(r) * 32 + at(k) * 4, r, k)
    assert blocked(read("y", at(r) * 4, r), row, write("y", at(r) * 4, r)) == [
        ("load-and-store",),
        (),
        ("load-and-store",),
    ]


def test_an_update_by_turns_of_data_is_not_free() -> None:
    """if (mask[i]) x = map[i]; else map[i] = y;"""
    i = loop("i", 64)
    mask = drawn(i)
    both = (read("map", at(i) * 4, i, guards=(mask,)), write("map", at(i) * 4, i, guards=(negation(mask),)))
    assert blocked(*both) == [("data-dependent-guard", "load-and-store")] * 2


def test_a_swap_by_turns_is_free() -> None:
    """for t: from = t % 2 ? b : a, to = the other; for i: to[i] = from[i];"""
    t, i = loop("t", 8), loop("i", 64)
    odd = at(t) - floordiv(at(t), number(2)) * 2
    turn = equal(odd, number(1))
    even = negation(turn)
    accesses = (
        read("a", at(i) * 4, t, i, guards=(even,)),
        read("b", at(i) * 4, t, i, guards=(turn,)),
        write("b", at(i) * 4, t, i, guards=(even,)),
        write("a", at(i) * 4, t, i, guards=(turn,)),
    )
    assert blocked(*accesses) == [()] * 4


# ------------------------------------------------------------------------------------------------------ the rest


def test_volatile_descending_and_chosen_by_data() -> None:
    i = loop("i", 64)
    assert blocked(read("status", at(i) * 4, i, volatile=True)) == [("volatile",)]
    assert blocked(read("in", at(i) * -4 + 252, i)) == [("not-ascending",)]
    sector = drawn(i, name="sector")
    pick = choice(sector, "north", "south")
    arms = [
        write(name, at(i) * 4, i, choice=pick, guards=(Guard(condition, pick.place),))
        for name, condition in (("north", sector), ("south", negation(sector)))
    ]
    one_port = [replace(arm, interface="g", place=pick.place) for arm in arms]
    assert blocked(*arms) == [("destination-by-data",)] * 2
    assert blocked(*one_port) == [("destination-by-data",)] * 2


def test_a_destination_chosen_before_the_loop_is_free() -> None:
    r, i = loop("r", 4), loop("i", 64)
    sector = drawn(r, name="sector")
    pick = choice(sector, "north", "south")
    offset = at(r) * 256 + at(i) * 4
    assert blocked(write("north", offset, r, i, choice=pick, guards=(Guard(sector, pick.place),))) == [()]


def test_a_place_that_is_not_known_blocks_nothing() -> None:
    i = loop("i", 64)
    lost = read("a", at(i) * 4, i, unresolved="a pointer that was never set", interface="g", element_bytes=0)
    assert blocked(lost, read("b", at(i) * 4, i, interface="g")) == [(), ()]
