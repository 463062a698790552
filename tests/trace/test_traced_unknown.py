"""What cannot be followed is said to be unknown, with the reason and the place."""

from __future__ import annotations

import pytest

from beatwise.trace import machine, tracer
from helpers.lowered import lines
from helpers.traced import accesses, kernel, problems, traced, walks


def test_a_loaded_index_is_data() -> None:
    found = accesses("rows: for (int i = 0; i < n; ++i) out[table[i] + 1] = 1;")
    assert found == lines("""
        read  table[4*rows]  4 B  rows xn
        write  out[4 + 4*table[4*rows]]  4 B  rows xn
    """)


def test_a_chain_of_loads_is_carried_along() -> None:
    found = accesses(
        """
        int at = 0;
        walk: while (at != -1) at = table[at];
        """,
    )
    assert found == lines("""
        read  table[4*at']  4 B  walk x?
        walk: at' = 0 then table[4*at']; until (at' == -1); data of table ends it
    """)


def test_a_sum_of_loaded_values_is_data_when_it_is_used() -> None:
    found = accesses(
        """
        int sum = 0;
        rows: for (int i = 0; i < 64; ++i) sum += in[i];
        out[sum] = 1;
        """,
    )
    assert found == lines("""
        read  in[4*rows]  4 B  rows x64
        write  out[4*sum[]]  4 B
        rows: sum' = 0 then sum' + in[4*rows]
    """)


def test_a_clamped_index_is_still_data() -> None:
    found = accesses(
        """
        rows: for (int i = 0; i < n; ++i) {
            int k = in[i];
            if (k < 0) k = 0;
            if (k > 15) k = 15;
            out[k] = 1;
        }
        """,
    )
    assert found == lines("""
        read  in[4*rows]  4 B  rows xn
        write  out[4*min(15, max(0, in[4*rows]))]  4 B  rows xn
    """)


def test_loop_bounds_from_memory() -> None:
    found = accesses("rows: for (int i = table[0]; i < table[1]; ++i) out[i] = 1;")
    assert found == lines("""
        read  table[0]  4 B
        read  table[4]  4 B  rows x(-1*table[0] + table[4])
        write  out[4*table[0] + 4*rows]  4 B  rows x(-1*table[0] + table[4])
    """)


def test_a_variable_that_was_never_set() -> None:
    found = walks(
        """
        int x;
        rows: for (int i = 0; i < 8; ++i) out[x] = 1;
        """,
    )
    assert found == lines("""
        write out unresolved: a variable that was never set
    """)


def test_a_function_without_a_body() -> None:
    found = walks(
        "rows: for (int i = 0; i < 8; ++i) out[missing(i)] = 1;",
        before="int missing(int);",
    )
    assert found == lines("""
        write out unresolved: missing has no body here (line 3)
    """)


def test_what_a_function_without_a_body_makes_of_data_is_data() -> None:
    found = walks(
        "rows: for (int i = 0; i < 8; ++i) out[missing(in[i])] = 1;",
        before="int missing(int);",
    )
    assert found == lines("""
        read in sequential +4 run 8 constant x8
        write out indirect run 1 data x8
    """)


def test_an_object_that_nobody_knows() -> None:
    found = problems(
        "rows: for (int i = 0; i < 8; ++i) out[i] = lost[i];",
        before="extern int *lost;",
    )
    assert found == lines("""
        a read is left out: a pointer that was never set
    """)


def test_an_argument_given_to_a_function_without_a_body() -> None:
    found = accesses(
        "consume(out, n);",
        before="void consume(int *, int);",
    )
    assert found == lines("""
        write  out[0]  4 B  unresolved: it is passed to `consume`, which has no body here
    """)


def test_an_index_that_is_a_real_number() -> None:
    found = walks(
        """
        float f = 0;
        rows: for (int i = 0; i < 8; ++i) {
            out[(int)f] = 1;
            f += 0.5f;
        }
        """,
    )
    assert found == lines("""
        write out unresolved: a real number, or another value that is not followed
    """)


def test_a_pointer_that_was_never_set() -> None:
    found = problems(
        """
        int *p;
        rows: for (int i = 0; i < 8; ++i) p[i] = 1;
        """,
    )
    assert found == lines("""
        a write is left out: a pointer that was never set
    """)


def test_a_jump() -> None:
    found = problems(
        """
        goto end;
        out[0] = 1;
        end: out[1] = 2;
        """,
    )
    assert found == lines("""
        a goto is not followed
    """)


def test_data_that_only_says_how_far_the_counter_has_come() -> None:
    found = accesses(
        """
        int count = 0;
        rows: for (int i = 0; i < n; ++i) if (mask[i]) out[count++] = 1;
        """,
    )
    assert found == lines("""
        read  mask[4*rows]  4 B  rows xn
        write  out[4*count']  4 B  rows xn  if (mask[4*rows] != 0)
        rows: count' = 0 then select((mask[4*rows] != 0), 1 + count', count')
    """)


def test_a_kernel_with_too_many_steps_is_told_and_keeps_what_was_found(monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.setattr(machine, "STEPS_AT_MOST", 30)
    monkeypatch.setattr(tracer, "STEPS_AT_MOST", 30)
    found = traced(kernel("a[0] = 1;\n" + "".join(f"out[{at}] = {at};\n" for at in range(40))))
    assert [problem.what for problem in found.problems] == ["echo: not followed to its end (30 steps were taken)"]
    assert 0 < len(found.accesses) < 41
