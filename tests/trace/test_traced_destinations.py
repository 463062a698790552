"""Which argument receives or provides the data: every way to pick one."""

from __future__ import annotations

from helpers.lowered import lines
from helpers.traced import accesses, walks


def test_a_destination_picked_by_a_question_mark() -> None:
    found = accesses("rows: for (int i = 0; i < n; ++i) (mask[i] == 3 ? a : b)[i] = 1;")
    assert found == lines("""
        read  mask[4*rows]  4 B  rows xn
        write  a[4*rows]  4 B  rows xn  picks (mask[4*rows] == 3)  a|b by mask[4*rows]
        write  b[4*rows]  4 B  rows xn  picks (mask[4*rows] != 3)  a|b by mask[4*rows]
    """)


def test_a_destination_picked_by_an_assignment_in_a_branch() -> None:
    found = accesses(
        """
        rows: for (int i = 0; i < n; ++i) {
            int *to = a;
            if (mask[i] > 4) to = b;
            to[i] = 1;
        }
        """,
    )
    assert found == lines("""
        read  mask[4*rows]  4 B  rows xn
        write  b[4*rows]  4 B  rows xn  picks (4 < mask[4*rows])  b|a by mask[4*rows]
        write  a[4*rows]  4 B  rows xn  picks (mask[4*rows] < 5)  b|a by mask[4*rows]
    """)


def test_a_destination_picked_by_a_chain_of_branches_with_a_store_in_each() -> None:
    found = accesses(
        """
        rows: for (int i = 0; i < n; ++i) {
            int s = mask[i];
            if (s == 0) a[i] = 1;
            else if (s == 1) b[i] = 1;
            else out[i] = 1;
        }
        """,
    )
    assert found == lines("""
        read  mask[4*rows]  4 B  rows xn
        write  a[4*rows]  4 B  rows xn  picks (mask[4*rows] == 0)  a|b|out by mask[4*rows]
        write  b[4*rows]  4 B  rows xn  picks (mask[4*rows] != 0)  picks (mask[4*rows] == 1)  a|b|out by mask[4*rows]
        write  out[4*rows]  4 B  rows xn  picks (mask[4*rows] != 0)  picks (mask[4*rows] != 1)  a|b|out by mask[4*rows]
    """)


def test_a_destination_picked_by_a_switch_that_sets_a_pointer() -> None:
    found = accesses(
        """
        rows: for (int i = 0; i < n; ++i) {
            int *to;
            switch (mask[i]) {
            case 0: to = a; break;
            case 1: to = b; break;
            default: to = out;
            }
            to[i] = 1;
        }
        """,
    )
    assert found == lines("""
        read  mask[4*rows]  4 B  rows xn
        write  a[4*rows]  4 B  rows xn  picks (mask[4*rows] == 0)  a|b|out by mask[4*rows]
        write  b[4*rows]  4 B  rows xn  picks ((mask[4*rows] != 0) and (mask[4*rows] == 1))  a|b|out by mask[4*rows]
        write  out[4*rows]  4 B  rows xn  picks ((mask[4*rows] != 0) and (mask[4*rows] != 1))  a|b|out by mask[4*rows]
    """)


def test_a_destination_picked_by_an_array_of_pointers() -> None:
    found = accesses(
        """
        int *to[2] = {a, b};
        rows: for (int i = 0; i < n; ++i) to[table[i]][i] = 1;
        """,
    )
    assert found == lines("""
        read  table[4*rows]  4 B  rows xn
        write  a[4*rows]  4 B  rows xn  picks (table[4*rows] == 0)  a|b by table[4*rows]
        write  b[4*rows]  4 B  rows xn  picks (table[4*rows] == 1)  a|b by table[4*rows]
    """)


def test_a_destination_picked_by_a_record_of_pointers_in_an_array() -> None:
    found = accesses(
        """
        Bank banks[2] = {{a, out}, {b, out}};
        rows: for (int i = 0; i < n; ++i) banks[mask[i]].low[i] = 1;
        """,
        before="struct Bank { int *low; int *high; };",
    )
    assert found == lines("""
        read  mask[4*rows]  4 B  rows xn
        write  a[4*rows]  4 B  rows xn  picks (mask[4*rows] == 0)  a|b by mask[4*rows]
        write  b[4*rows]  4 B  rows xn  picks (mask[4*rows] == 1)  a|b by mask[4*rows]
    """)


def test_a_field_of_a_record_of_pointers_is_one_destination() -> None:
    found = accesses(
        """
        Bank bank = {a, b};
        rows: for (int i = 0; i < n; ++i) bank.high[i] = 1;
        """,
        before="struct Bank { int *low; int *high; };",
    )
    assert found == lines("""
        write  b[4*rows]  4 B  rows xn
    """)


def test_a_source_is_picked_like_a_destination() -> None:
    found = accesses("rows: for (int i = 0; i < n; ++i) out[i] = (mask[i] ? a : b)[i];")
    assert found == lines("""
        read  mask[4*rows]  4 B  rows xn
        read  a[4*rows]  4 B  rows xn  picks (mask[4*rows] != 0)  a|b by mask[4*rows]
        read  b[4*rows]  4 B  rows xn  picks (mask[4*rows] == 0)  a|b by mask[4*rows]
        write  out[4*rows]  4 B  rows xn
    """)


def test_each_destination_with_a_counter_of_its_own() -> None:
    found = accesses(
        """
        int p = 0, q = 0;
        rows: for (int i = 0; i < n; ++i) {
            if (mask[i]) a[p++] = 1;
            else b[q++] = 1;
        }
        """,
    )
    assert found == lines("""
        read  mask[4*rows]  4 B  rows xn
        write  a[4*p']  4 B  rows xn  picks (mask[4*rows] != 0)  a|b by mask[4*rows]
        write  b[4*q']  4 B  rows xn  picks (mask[4*rows] == 0)  a|b by mask[4*rows]
        rows: p' = 0 then select((mask[4*rows] != 0), 1 + p', p'); q' = 0 then select((mask[4*rows] != 0), q', 1 + q')
    """)


def test_counters_pick_in_turn_and_nothing_is_steered() -> None:
    found = walks(
        """
        int *to[3] = {a, b, out};
        rows: for (int i = 0; i < 12; ++i) to[i % 3][i / 3] = 1;
        """,
    )
    assert found == lines("""
        write a sequential +4 run 4 constant x4
        write b sequential +4 run 4 constant x4
        write out sequential +4 run 4 constant x4
    """)


def test_an_argument_picks_for_the_whole_loop() -> None:
    found = accesses(
        """
        int *to = n > 4 ? a : b;
        rows: for (int i = 0; i < 8; ++i) to[i] = 1;
        """,
    )
    assert found == lines("""
        write  a[4*rows]  4 B  rows x8  picks (4 < n)  a|b by n
        write  b[4*rows]  4 B  rows x8  picks (n < 5)  a|b by n
    """)


def test_two_places_in_one_argument_are_one_offset() -> None:
    found = accesses("rows: for (int i = 0; i < 8; ++i) (i < 4 ? a : a + 100)[i] = 1;")
    assert found == lines("""
        write  a[4*rows + select((rows < 4), 0, 400)]  4 B  rows x8
    """)


def test_data_picks_among_places_of_one_argument() -> None:
    found = accesses("rows: for (int i = 0; i < n; ++i) (mask[i] ? a + 100 : a)[i] = 1;")
    assert found == lines("""
        read  mask[4*rows]  4 B  rows xn
        write  a[4*rows + select((mask[4*rows] != 0), 400, 0)]  4 B  rows xn
    """)


def test_a_function_that_returns_the_pointer_it_picks() -> None:
    found = accesses(
        "rows: for (int i = 0; i < n; ++i) pick(mask[i], a, b)[i] = 1;",
        before="""
        static int *pick(int s, int *x, int *y) {
            if (s) return x;
            return y;
        }
        """,
    )
    assert found == lines("""
        read  mask[4*rows]  4 B  rows xn
        write  a[4*rows]  4 B  rows xn  picks (mask[4*rows] != 0)  a|b by mask[4*rows]
        write  b[4*rows]  4 B  rows xn  picks (mask[4*rows] == 0)  a|b by mask[4*rows]
    """)


def test_a_copy_goes_where_data_says() -> None:
    found = accesses(
        """
        rows: for (int i = 0; i < n; ++i) memcpy(mask[i] ? a + 16 * i : b + 16 * i, in + 16 * i, 64);
        """,
        before="#include <cstring>",
    )
    assert found == lines("""
        read  mask[4*rows]  4 B  rows xn
        read  in[64*rows + 4*copied]  4 B  rows xn  copied x16
        write  a[64*rows + 4*copied]  4 B  rows xn  copied x16  picks (mask[4*rows] != 0)  a|b by mask[4*rows]
        write  b[64*rows + 4*copied]  4 B  rows xn  copied x16  picks (mask[4*rows] == 0)  a|b by mask[4*rows]
    """)


def test_a_place_that_is_picked_by_reference() -> None:
    found = accesses(
        "rows: for (int i = 0; i < 8; ++i) put(mask[i] ? a[i] : b[table[i]]);",
        before="static void put(int &x) { x = 1; }",
    )
    assert found == lines("""
        read  mask[4*rows]  4 B  rows x8
        read  table[4*rows]  4 B  rows x8  if (mask[4*rows] == 0)
        write  a[4*rows]  4 B  rows x8  picks (mask[4*rows] != 0)  a|b by mask[4*rows]
        write  b[4*table[4*rows]]  4 B  rows x8  picks (mask[4*rows] == 0)  a|b by mask[4*rows]
    """)


def test_a_value_that_is_picked_for_a_reference_is_read_once() -> None:
    found = accesses(
        "rows: for (int i = 0; i < 8; ++i) out[i] = twice(mask[i] ? n : 3);",
        before="static int twice(const int &x) { return 2 * x; }",
    )
    assert found == lines("""
        read  mask[4*rows]  4 B  rows x8
        write  out[4*rows]  4 B  rows x8
    """)
