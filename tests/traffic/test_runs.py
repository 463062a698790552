"""Walks: the pattern, step, run, basis and executions of an access; beside nests that are walked the slow way."""

from __future__ import annotations

from collections import Counter
from collections.abc import Iterator
from dataclasses import replace
from itertools import pairwise

import pytest
from hypothesis import HealthCheck, given, note, settings
from hypothesis import strategies as st

from beatwise.model import form as forms
from beatwise.model.access import Access, LoopInstance, Recurrence
from beatwise.model.form import Form, Symbol, number
from beatwise.model.form import symbol_form as form_of
from beatwise.model.operations import equal, floordiv, less, mask, maximum, minimum, negation, select
from beatwise.model.traffic import Walk
from beatwise.traffic.runs import walk
from beatwise.traffic.trips import ASSUMED_TRIPS
from generated.nests import ELEMENT_BYTES, Nest
from generated.strategies import nests
from helpers.forms import evaluate
from helpers.lowered import lines
from helpers.traced import show_walk, traced, walks
from traffic.nests import at, loop, read

SLOW = settings(deadline=None, suppress_health_check=[HealthCheck.too_slow, HealthCheck.data_too_large])


# ----------------------------------------------------------------------------------------------------- by formula


@pytest.mark.parametrize(
    ("subscript", "expected"),
    [
        ("i * 16 + j", "sequential +4 run 128 constant x128"),
        ("i * 32 + j", "sequential +4 run 16 constant x128"),
        ("j * 8 + i", "strided +32 run 1 constant x128"),
        ("127 - i * 16 - j", "descending -4 run 1 constant x128"),
        ("i", "repeated +0 run 1 constant x128"),
        ("j", "sequential +4 run 16 constant x128"),
        ("2 * (i * 16 + j)", "strided +8 run 1 constant x128"),
        ("i * 16 + j * 0", "repeated +0 run 1 constant x128"),
        ("i * j", "strided run 1 constant x128"),
    ],
)
def test_two_loops_and_a_subscript(subscript: str, expected: str) -> None:
    found = walks(f"for (int i = 0; i < 8; ++i) for (int j = 0; j < 16; ++j) out[{subscript}] = 1;")
    if subscript == "i * j":
        assert found.startswith(("write out strided", "write out irregular"))
    else:
        assert found == f"write out {expected}"


def test_one_execution_is_single() -> None:
    assert walks("out[5] = 1;") == "write out single run 1 constant x1"
    assert walks("for (int i = 3; i < 4; ++i) out[i] = 1;") == "write out single run 1 constant x1"


def test_a_size_in_the_stride_joins_rows_that_are_as_long() -> None:
    found = walks("for (int i = 0; i < 8; ++i) for (int j = 0; j < n; ++j) { a[i * n + j] = 1; b[i * m + j] = 1; }")
    assert found == lines("""
        write a sequential +4 run 8192 assumed x8192
        write b sequential +4 run 1024 assumed x8192
    """)


def test_a_part_of_an_element_counts_as_the_element() -> None:
    found = walks(
        "for (int i = 0; i < 64; ++i) out[i].phase = 1;",
        before="struct Gate { int power; short phase; short width; };",
        parameters="Gate *out",
    )
    assert found == "write out sequential +8 run 64 constant x64"


# --------------------------------------------------------------------------------------------------------- basis


def test_the_basis_is_where_the_sizes_came_from() -> None:
    loop_over = "for (int i = 0; i < {}; ++i) {{\n{}\nout[i] = 1; }}"
    counted = "#pragma HLS LOOP_TRIPCOUNT avg=40"
    assert walks(loop_over.format("64", "")) == "write out sequential +4 run 64 constant x64"
    assert walks(loop_over.format("n", ""), n=300) == "write out sequential +4 run 300 given x300"
    assert walks(loop_over.format("n", counted)) == "write out sequential +4 run 40 tripcount x40"
    assert walks(loop_over.format("n", counted), n=300) == "write out sequential +4 run 300 given x300"
    assert walks(loop_over.format("n", "")) == f"write out sequential +4 run {ASSUMED_TRIPS} assumed x{ASSUMED_TRIPS}"
    assert walks(loop_over.format("mask[0]", counted)).endswith("write out sequential +4 run 40 tripcount x40")


def test_a_size_is_assumed_no_larger_than_its_type() -> None:
    found = walks("for (int i = 0; i < n; ++i) out[i] = 1;", parameters="unsigned char n, int *out")
    assert found == "write out sequential +4 run 255 assumed x255"


def test_sizes_that_nobody_knows_decide_no_branch() -> None:
    found = walks("""
        if (m == 0) for (int i = 0; i < n; ++i) a[i] = 1;
        else if (m == 1) for (int i = 0; i < n; ++i) b[2 * i] = 1;
    """)
    assert found == lines("""
        write a sequential +4 run 1024 assumed x1024
        write b strided +8 run 1 assumed x1024
    """)


def test_sizes_that_are_given_decide_branches() -> None:
    found = walks("for (int i = 0; i < n; ++i) { if (i < m) a[i] = 1; else b[i] = 1; }", n=64, m=64)
    assert found.splitlines()[0] == "write a sequential +4 run 64 given x64"
    assert all(line.endswith("x0") for line in found.splitlines()[1:])


def test_a_loop_that_counts_from_one_unknown_size_to_another_is_taken_to_run() -> None:
    found = walks("for (int i = m; i < n; ++i) for (int j = 0; j < i; ++j) out[j] = 1;")
    assert found == "write out sequential +4 run 512 assumed x523776"


# -------------------------------------------------------------------------------------------------------- by data


def test_data_that_guards_makes_runs_of_two() -> None:
    found = walks("for (int i = 0; i < n; ++i) if (mask[i]) out[i] = 1;", n=64)
    assert found == lines("""
        read mask sequential +4 run 64 given x64
        write out sequential +4 run 2 data x64
    """)


def test_data_that_guards_whole_rows_leaves_their_runs() -> None:
    found = walks("for (int i = 0; i < 8; ++i) if (mask[i]) for (int j = 0; j < 16; ++j) out[100 * i + j] = 1;")
    assert found.splitlines()[1].startswith("write out sequential +4 run 16 ")


def test_data_in_the_subscript_is_indirect() -> None:
    found = walks("for (int i = 0; i < n; ++i) { out[table[i]] = 1; a[i] = b[4 * in[i]]; }", n=64).splitlines()
    assert [line for line in found if "indirect" in line] == [
        "write out indirect run 1 data x64",
        "read b indirect run 1 data x64",
    ]


def test_data_that_picks_rows_leaves_the_order_within_them() -> None:
    found = walks("for (int i = 0; i < 8; ++i) for (int j = 0; j < 16; ++j) out[16 * table[i] + j] = 1;")
    assert found == lines("""
        read table repeated +0 run 1 constant x128
        write out sequential +4 run 16 constant x128
    """)


def test_what_lies_in_memory_that_is_also_written_is_read_anew_each_time() -> None:
    found = walks("for (int i = 0; i < 8; ++i) { int at = a[0]; out[at] = 1; a[0] = at + 1; }")
    assert found.splitlines()[1] == "write out indirect run 1 data x8"


def test_a_value_drawn_once_before_the_loop_only_shifts_it() -> None:
    found = walks("int start = table[0];\nfor (int i = 0; i < 16; ++i) out[start + i] = 1;")
    assert found.splitlines()[-1] == "write out sequential +4 run 16 constant x16"


def test_bisection_is_indirect() -> None:
    found = walks("""
        int lo = 0, hi = n;
        while (lo < hi) {
            int mid = (lo + hi) / 2;
            if (in[mid] < m) lo = mid + 1;
            else hi = mid;
        }
        out[0] = lo;
    """)
    assert found.splitlines()[0].startswith("read in indirect run 1 ")


def test_what_data_lets_through_is_written_in_order() -> None:
    text = "int count = 0;\nfor (int i = 0; i < 512; ++i) if (mask[i]) out[count++] = 1;"
    assert walks(text).splitlines()[1].startswith("write out sequential +4 ")


def test_destinations_that_data_picks_are_steered() -> None:
    found = walks("""
        int *to[4] = {a, b, out, spare};
        for (int i = 0; i < 64; ++i) to[mask[i]][i] = 1;
    """, parameters="const int *mask, int *a, int *b, int *out, int *spare")  # fmt: skip
    assert found.splitlines()[1:] == [f"write {name} steered run 1.33333 data x16" for name in "a b out spare".split()]


def test_a_destination_with_a_counter_of_its_own_is_filled_in_order() -> None:
    found = traced("""
        extern "C" void echo(const int *mask, int *a, int *b) {
            int p = 0, q = 0;
            for (int i = 0; i < 512; ++i) {
                if (mask[i]) a[p++] = 1;
                else b[q++] = 1;
            }
        }
    """)
    _, left, right = (walk(access, {}) for access in found.accesses)
    assert left.pattern == right.pattern == "steered"
    assert (left.run_elements, right.run_elements) == (left.executions, right.executions)
    assert left.executions is not None and right.executions is not None
    assert left.executions + right.executions == 512


def test_a_destination_picked_for_the_whole_row_keeps_its_run() -> None:
    found = walks("for (int i = 0; i < 8; ++i) { int *to = mask[i] ? a : b; for (int j = 0; j < 16; ++j) to[j] = 1; }")
    assert [line.rpartition(" run 16 ")[0] for line in found.splitlines()[1:]] == [
        "write a steered",
        "write b steered",
    ]


def test_what_is_walked_at_random_is_walked_alike_every_time() -> None:
    text = "int k = 0;\nfor (int i = 0; i < 300; ++i) { out[k] = 1; if (mask[i] > 3) k += 2; else k += table[i] & 7; }"
    first = walks(text)
    walks("for (int i = 0; i < n; ++i) out[table[i]] = in[i];")
    assert walks(text) == first


# -------------------------------------------------------------------------------------------------------- walked


@pytest.mark.parametrize(
    ("statement", "expected"),
    [
        ("out[(unsigned char)(3 * i)] = 1;", "strided +12 run 1 constant x512"),
        ("out[i % 48] = 1;", "sequential +4 run 46.5455 constant x512"),
        ("out[i / 4] = 1;", "repeated +0 run 1 constant x512"),
        ("out[i ^ 1] = 1;", "irregular run 1 constant x512"),
        ("out[i < 256 ? i : i + 100] = 1;", "sequential +4 run 256 constant x512"),
        ("if (i % 8 < 6) out[i] = 1;", "sequential +4 run 6 constant x384"),
        ("if (i % 4 == 0) out[i] = 1;", "strided +16 run 1 constant x128"),
        ("if (i == 7) out[i] = 1;", "single run 1 constant x1"),
        ("out[i * i] = 1;", "irregular run 1.00196 constant x512"),
    ],
)  # fmt: skip
def test_one_loop_and_what_no_formula_covers(statement: str, expected: str) -> None:
    assert walks(f"for (int i = 0; i < 512; ++i) {{ {statement} }}") == f"write out {expected}"


def test_a_triangle_has_the_mean_of_its_rows() -> None:
    found = walks("for (int i = 0; i < 8; ++i) for (int j = i; j < 8; ++j) out[100 * i + j] = 1;")
    assert found == "write out sequential +4 run 4.5 constant x36"


def test_chunks_with_a_tail_are_one_run() -> None:
    found = walks(
        """
        for (int i = 0; i < n; i += 64) {
            int len = i + 64 > n ? n - i : 64;
            for (int j = 0; j < len; ++j) out[i + j] = 1;
        }
        """,
        n=1000,
    )
    assert found == "write out sequential +4 run 1000 given x1000"


def test_copies_do_not_join() -> None:
    found = walks("for (int i = 0; i < 8; ++i) memcpy(out + 16 * i, in, 64);", before="#include <cstring>")
    assert found == lines("""
        read in sequential +4 run 16 constant x128
        write out sequential +4 run 16 constant x128
    """)


def test_rows_whose_ends_are_data_are_walked_in_order() -> None:
    found = walks("for (int i = 0; i < 64; ++i) for (int k = table[i]; k < table[i + 1]; ++k) a[i] += in[k];")
    assert "\nread in sequential +4 " in found


def test_a_list_that_is_followed_is_indirect() -> None:
    assert walks("int at = 0;\nwhile (at != -1) at = table[at];").startswith("read table indirect run 1 data")


def test_what_cannot_be_followed_is_unresolved_with_the_reason() -> None:
    assert walks("int x;\nfor (int i = 0; i < 8; ++i) out[x] = 1;") == (
        "write out unresolved: a variable that was never set"
    )


def test_starts_and_lengths_are_known_multiples() -> None:
    found = traced("""
        extern "C" void echo(int n, int *a, int *b, int *out) {
            for (int i = 0; i < n; ++i) for (int j = 0; j < 32; ++j) a[64 * i + j] = 1;
            for (int i = 0; i < 16 * n; ++i) b[i + 4] = 1;
            for (int i = 0; i < n; ++i) out[i] = 1;
        }
    """)
    measured = [walk(access, {}) for access in found.accesses]
    assert [(each.start_multiple, each.run_multiple) for each in measured] == [(256, 128), (16, 64), (4096, 4)]


# ------------------------------------------------------------------------------------- beside a slow simulation


def run_of(offsets: list[int], size: int) -> float:
    """Elements a run."""
    return len(offsets) / (1 + sum(after - before != size for before, after in pairwise(offsets)))


def main_step(offsets: list[int]) -> tuple[int, float]:
    """The most frequent step and its share."""
    step, times = Counter(after - before for before, after in pairwise(offsets)).most_common(1)[0]
    return step, times / (len(offsets) - 1)


def disagreements(found: Walk, offsets: list[int], size: int) -> list[str]:
    """What the walk says that the offsets do not bear out."""
    if found.executions != len(offsets):
        return [f"executed {found.executions} times, truly {len(offsets)}"]
    if len(offsets) < 2:
        return [] if not offsets or found.pattern == "single" else [f"{found.pattern} of one"]
    step, share = main_step(offsets)
    wrong = []
    named = {size: "sequential", -size: "descending", 0: "repeated"}.get(step, "strided")
    if share >= 0.75 and len(offsets) > 20 and found.pattern != named:
        wrong.append(f"{found.pattern}, truly {named} ({share:.0%})")
    if found.pattern == named == "strided" and found.stride_bytes != step and share >= 0.75:
        wrong.append(f"stride {found.stride_bytes}, truly {step}")
    run = 1.0 if found.pattern == "repeated" else run_of(offsets, size)
    if found.run_elements is None or abs(found.run_elements - run) > 0.02 * run:
        wrong.append(f"run {found.run_elements}, truly {run}")
    return wrong


@settings(SLOW, max_examples=60)
@given(nests())
def test_a_nest_as_text_is_walked_as_it_runs(nest: Nest) -> None:
    text = nest.text("echo")
    note(text)
    loads = [access for access in traced(text).accesses if access.argument == "in"]
    offsets = [element * ELEMENT_BYTES for element in nest.walk()]
    if not loads:
        assert not offsets
        return
    found = walk(loads[0], {})
    note(show_walk(found))
    assert disagreements(found, offsets, ELEMENT_BYTES) == []


def visits(access: Access) -> list[int]:
    """The offsets of all executions: every iteration of every loop is visited, every form computed from its meaning."""

    def inside(loops: tuple[LoopInstance, ...], values: dict[Symbol, int]) -> Iterator[int]:
        def value(form: Form) -> int:
            return evaluate(form, values.__getitem__)

        if not loops:
            if all(value(guard.condition) for guard in access.guards):
                yield value(access.offset)
            return
        first, rest = loops[0], loops[1:]
        for carried in [(r.symbol, value(r.first)) for r in first.recurrences]:
            values[carried[0]] = carried[1]
        turns = 10_000 if first.trips is None else value(first.trips)
        for turn in range(turns):
            values[first.counter] = turn
            if any(value(form) for form in first.until):
                break
            yield from inside(rest, values)
            if any(value(form) for form in first.exits):
                break
            values.update([(r.symbol, value(r.next)) for r in first.recurrences])

    return list(inside(access.loops, {}))


@st.composite
def formed_accesses(draw: st.DrawFn) -> Access:
    """Loops that depend on each other, carry a ring or a doubled value along, end early; an offset made of it all."""
    loops: list[LoopInstance] = []
    values: list[Form] = []
    small = st.integers(1, 12)
    for name in "ijk"[: draw(st.integers(1, 3))]:
        trips: Form = number(draw(small))
        if draw(st.booleans()) and values:
            outer = draw(st.sampled_from(values))
            least = maximum(minimum(trips, outer), number(0))
            trips = draw(st.sampled_from([least, mask(outer, 3), floordiv(outer, number(2))]))
        made = loop(name, trips)
        values.append(at(made))
        kind = draw(st.sampled_from(["plain", "plain", "ring", "doubled", "until", "exit"]))
        if kind == "ring":
            ring = forms.carried("ring", made.number)
            wraps = equal(form_of(ring), number(draw(small)))
            made = replace(
                made, recurrences=(Recurrence(ring, number(0), select(wraps, number(0), form_of(ring) + 1)),)
            )
            values.append(form_of(ring))
        elif kind == "doubled":
            twice = forms.carried("twice", made.number)
            made = replace(
                made, trips=None, recurrences=(Recurrence(twice, number(1), form_of(twice) * 2),),
                until=(less(number(draw(st.integers(1, 300))), form_of(twice)),),
            )  # fmt: skip
            values.append(form_of(twice))
        elif kind == "until":
            made = replace(made, until=(less(number(draw(small)), draw(st.sampled_from(values))),))
        elif kind == "exit":
            made = replace(made, exits=(equal(draw(st.sampled_from(values)), number(draw(small))),))
        loops.append(made)
    element = number(draw(st.integers(0, 9)))
    for each in values:
        element = element + each * draw(st.sampled_from([-3, 0, 1, 1, 2, 4, 8, 12, 16]))
    bend = draw(st.sampled_from(["none", "none", "quotient", "remainder", "least"]))
    by = number(draw(st.integers(2, 20)))
    if bend == "quotient":
        element = floordiv(element, by)
    elif bend == "remainder":
        element = element - floordiv(element, by) * by
    elif bend == "least":
        element = minimum(element, by)
    guards = []
    if draw(st.booleans()):
        guards.append(
            draw(st.sampled_from([less, equal, lambda a, b: negation(equal(a, b))]))(values[0], values[-1] + 1)
        )
    return read("in", element * 4, *loops, guards=tuple(guard for guard in guards if guard.known != 1))


@settings(SLOW, max_examples=150)
@given(formed_accesses())
def test_a_nest_of_forms_is_walked_as_it_runs(access: Access) -> None:
    offsets = visits(access)
    found = walk(access, {})
    note(show_walk(found))
    note(f"{offsets[:40]}")
    if access.guards and access.guards[0].condition.known == 0:
        assert not offsets
    assert disagreements(found, offsets, 4) == []
