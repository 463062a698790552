"""Branches: what guards an access, and what leaves a loop, a switch or a function."""

from __future__ import annotations

from helpers.lowered import lines
from helpers.traced import accesses, walks


def test_a_branch_guards_what_is_in_it() -> None:
    found = accesses(
        """
        rows: for (int i = 0; i < n; ++i) {
            if (mask[i] > 2) a[i] = 1;
            else b[0] = 1;
        }
        """,
    )
    assert found == lines("""
        read  mask[4*rows]  4 B  rows xn
        write  a[4*rows]  4 B  rows xn  picks (2 < mask[4*rows])  a|b by mask[4*rows]
        write  b[0]  4 B  rows xn  picks (mask[4*rows] < 3)  a|b by mask[4*rows]
    """)


def test_branches_within_branches_guard_together() -> None:
    found = accesses(
        """
        rows: for (int i = 0; i < n; ++i)
            if (i > 5) if (mask[i]) out[i] = 1;
        """,
    )
    assert found == lines("""
        read  mask[4*rows]  4 B  rows xn  if (5 < rows)
        write  out[4*rows]  4 B  rows xn  if (5 < rows)  if (mask[4*rows] != 0)
    """)


def test_the_right_side_of_a_conjunction_is_read_under_the_left_one() -> None:
    found = accesses("rows: for (int i = 0; i < n; ++i) if (i < m && mask[i]) out[i] = 1;")
    assert found == lines("""
        read  mask[4*rows]  4 B  rows xn  if (rows < m)
        write  out[4*rows]  4 B  rows xn  if ((rows < m) and (mask[4*rows] != 0))
    """)


def test_a_question_mark_guards_what_it_reads() -> None:
    found = accesses("rows: for (int i = 0; i < n; ++i) out[i] = i < m ? in[i] : 0;")
    assert found == lines("""
        read  in[4*rows]  4 B  rows xn  if (rows < m)
        write  out[4*rows]  4 B  rows xn
    """)


def test_a_continue_guards_the_rest_of_the_body() -> None:
    found = accesses(
        """
        rows: for (int i = 0; i < n; ++i) {
            if (mask[i]) continue;
            out[i] = 1;
        }
        """,
    )
    assert found == lines("""
        read  mask[4*rows]  4 B  rows xn
        write  out[4*rows]  4 B  rows xn  if (mask[4*rows] == 0)
    """)


def test_a_continue_on_the_counter_leaves_a_gap() -> None:
    found = walks(
        """
        rows: for (int i = 0; i < 16; ++i) {
            if (i == 5) continue;
            out[i] = 1;
        }
        """,
    )
    assert found == lines("""
        write out sequential +4 run 7.5 constant x15
    """)


def test_a_break_on_data_ends_the_loop_and_guards_the_rest() -> None:
    found = accesses(
        """
        rows: for (int i = 0; i < n; ++i) {
            if (in[i] == 0) break;
            out[i] = 1;
        }
        """,
    )
    assert found == lines("""
        read  in[4*rows]  4 B  rows xn
        write  out[4*rows]  4 B  rows xn  unless left (in[4*rows] != 0)
        rows: leaves when (in[4*rows] == 0); data of in ends it
    """)


def test_a_return_within_a_loop_ends_it_and_what_comes_after_goes_on_elsewhere() -> None:
    found = accesses(
        """
        rows: for (int i = 0; i < n; ++i) {
            if (in[i] == 0) return;
            out[i] = 1;
        }
        """,
    )
    assert found == lines("""
        read  in[4*rows]  4 B  rows xn
        write  out[4*rows]  4 B  rows xn  unless left (in[4*rows] != 0)
        rows: leaves when (in[4*rows] == 0); data of in ends it
    """)


def test_a_break_on_counters_shortens_the_loop() -> None:
    found = accesses(
        """
        rows: for (int i = 0; i < 16; ++i)
            columns: for (int j = 0; j < 16; ++j) {
                if (j > i) break;
                out[16 * i + j] = 1;
            }
        """,
    )
    assert found == lines("""
        write  out[64*rows + 4*columns]  4 B  rows x16  columns xmin(16, 2 + rows)  unless left (columns < (1 + rows))
    """)


def test_a_flag_that_data_sets_ends_the_loop() -> None:
    found = accesses(
        """
        bool stop = false;
        rows: for (int i = 0; i < n && !stop; ++i) {
            if (in[i] == 7) stop = true;
        }
        """,
    )
    assert found == lines("""
        read  in[4*rows]  4 B  rows xn
        rows: stop' = 0 then select((in[4*rows] == 7), 1, stop'); until stop'; data of in ends it
    """)


def test_a_do_loop_with_a_break_on_data() -> None:
    found = accesses(
        """
        int i = 0;
        rows: do {
            if (in[i] == 0) break;
            ++i;
        } while (i < 16);
        """,
    )
    assert found == lines("""
        read  in[4*rows]  4 B  rows x16
        rows: leaves when (in[4*rows] == 0); data of in ends it
    """)


def test_a_function_that_returns_from_its_loop() -> None:
    found = accesses(
        "out[0] = find(in, n);",
        before="""
        static int find(const int *p, int what) {
            look: for (int i = 0; i < 64; ++i) if (p[i] == what) return i;
            return -1;
        }
        """,
    )
    assert found == lines("""
        read  in[4*look]  4 B  look x64
        write  out[0]  4 B
        look: leaves when (in[4*look] == n); data of in ends it
    """)


def test_early_returns_that_give_a_value_are_its_choice() -> None:
    found = accesses(
        "rows: for (int i = 0; i < 16; ++i) out[clamp(i - 1, 15)] = 1;",
        before="""
        static int clamp(int x, int top) {
            if (x < 0) return 0;
            if (x > top) return top;
            return x;
        }
        """,
    )
    assert found == lines("""
        write  out[4*max(0, -1 + rows)]  4 B  rows x16
    """)


def test_an_early_return_on_an_argument_guards_the_rest() -> None:
    found = accesses(
        """
        if (n <= 0) return;
        rows: for (int i = 0; i < n; i++) out[i] = 1;
        """,
    )
    assert found == lines("""
        write  out[4*rows]  4 B  rows xn  unless left (0 < n)
    """)


def test_a_switch_guards_each_of_its_cases() -> None:
    found = accesses(
        """
        switch (n) {
        case 0: a[0] = 1; break;
        case 3: b[0] = 1; break;
        default: out[0] = 1;
        }
        """,
    )
    assert found == lines("""
        write  a[0]  4 B  if (n == 0)
        write  b[0]  4 B  if (n != 0)  if (n == 3)
        write  out[0]  4 B  if (n != 0)  if (n != 3)
    """)


def test_a_case_falls_through_to_the_next() -> None:
    found = accesses(
        """
        switch (n) {
        case 0: a[0] = 1;
        case 3: b[0] = 1; break;
        case 4: out[0] = 1;
        }
        """,
    )
    assert found == lines("""
        write  a[0]  4 B  if (n == 0)
        write  b[0]  4 B  if select((n != 0), (n == 3), 1)
        write  out[0]  4 B  if (n != 0)  if (n != 3)  if (n == 4)
    """)


def test_a_case_that_a_given_size_decides_is_the_only_one() -> None:
    found = accesses(
        """
        switch (n) {
        case 0: a[0] = 1; break;
        case 3: b[0] = 1; break;
        default: out[0] = 1;
        }
        """,
        n=3,
    )
    assert found == lines("""
        write  b[0]  4 B
    """)


def test_a_branch_that_a_given_size_decides_is_dead() -> None:
    found = accesses(
        """
        if (n > 10) a[0] = 1;
        else b[0] = 1;
        """,
        n=4,
    )
    assert found == lines("""
        write  b[0]  4 B
    """)


def test_a_given_flag_that_is_off_leaves_nothing_of_its_branch() -> None:
    found = accesses(
        """
        rows: for (int i = 0; i < 8; ++i) {
            if (verbose) b[i] = 1;
            a[i] = 1;
        }
        """,
        parameters="bool verbose, int *a, int *b",
        verbose=0,
    )
    assert found == lines("""
        write  a[4*rows]  4 B  rows x8
    """)


def test_a_branch_on_a_value_that_is_always_so_guards_nothing() -> None:
    found = accesses(
        """
        rows: for (int i = 0; i < 8; ++i) {
            if (mask[i]) a[0] = 1;
            else b[0] = 1;
            out[i] = 1;
        }
        """,
    )
    assert found == lines("""
        read  mask[4*rows]  4 B  rows x8
        write  a[0]  4 B  rows x8  picks (mask[4*rows] != 0)  a|b by mask[4*rows]
        write  b[0]  4 B  rows x8  picks (mask[4*rows] == 0)  a|b by mask[4*rows]
        write  out[4*rows]  4 B  rows x8
    """)
