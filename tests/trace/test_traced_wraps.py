"""Counters that are wrapped by hand, flattened loops, and the idioms of divided counters."""

from __future__ import annotations

from helpers.lowered import lines
from helpers.traced import accesses, walks


def test_a_flattened_pair_of_counters_is_one_walk() -> None:
    found = accesses(
        """
        int i = 0, j = 0;
        flat: for (int k = 0; k < 24; ++k) {
            out[8 * i + j] = 1;
            if (++j == 8) { j = 0; ++i; }
        }
        """,
    )
    assert found == lines("""
        write  out[4*flat]  4 B  flat x24
    """)


def test_a_flattened_pair_with_a_gap_after_each_row() -> None:
    found = accesses(
        """
        int i = 0, j = 0;
        flat: for (int k = 0; k < n; ++k) {
            out[10 * i + j] = 1;
            if (j < 7) j++;
            else { j = 0; i++; }
        }
        """,
    )
    assert found == lines("""
        write  out[4*flat + 8*(flat // 8)]  4 B  flat xn
    """)


def test_a_row_that_is_bumped_when_the_column_wraps_at_an_argument() -> None:
    found = accesses(
        """
        int j = 0, row = 0;
        flat: for (int k = 0; k < n; ++k) {
            out[row + j] = 1;
            j++;
            if (j == m) { j = 0; row += m; }
        }
        """,
    )
    assert found == lines("""
        write  out[4*flat]  4 B  flat xn
    """)


def test_three_flattened_counters_are_one_walk() -> None:
    found = accesses(
        """
        int i = 0, j = 0, l = 0;
        flat: for (int k = 0; k < 24; ++k) {
            out[12 * i + 4 * j + l] = 1;
            if (++l == 4) {
                l = 0;
                if (++j == 3) { j = 0; ++i; }
            }
        }
        """,
    )
    assert found == lines("""
        write  out[4*flat]  4 B  flat x24
    """)


def test_three_flattened_counters_with_gaps() -> None:
    found = accesses(
        """
        int i = 0, j = 0, l = 0;
        flat: for (int k = 0; k < 24; ++k) {
            out[100 * i + 10 * j + l] = 1;
            if (++l == 4) {
                l = 0;
                if (++j == 3) { j = 0; ++i; }
            }
        }
        """,
    )
    assert found == lines("""
        write  out[4*flat + 24*(flat // 4) + 280*(flat // 12)]  4 B  flat x24
    """)


def test_a_ring_counter_compared_with_its_last_value() -> None:
    found = accesses(
        """
        int j = 0;
        rows: for (int i = 0; i < 24; ++i) { out[j] = 1; if (j >= 7) j = 0; else j++; }
        """,
    )
    assert found == lines("""
        write  out[4*rows - 32*(rows // 8)]  4 B  rows x24
    """)


def test_a_ring_counter_picked_by_a_question_mark() -> None:
    found = accesses(
        """
        int j = 0;
        rows: for (int i = 0; i < 24; ++i) { out[j] = 1; j = j == 7 ? 0 : j + 1; }
        """,
    )
    assert found == lines("""
        write  out[4*rows - 32*(rows // 8)]  4 B  rows x24
    """)


def test_a_ring_counter_by_remainder_is_walked() -> None:
    found = walks(
        """
        int j = 0;
        rows: for (int i = 0; i < 24; ++i) { out[j] = 1; j = (j + 1) % 8; }
        """,
    )
    assert found == lines("""
        write out sequential +4 run 8 constant x24
    """)


def test_quotient_and_remainder_rejoin() -> None:
    found = accesses(
        "rows: for (int i = 0; i < 64; ++i) out[(i / 8) * 8 + i % 8] = in[(i >> 3) * 8 + (i & 7)];",
    )
    assert found == lines("""
        read  in[4*rows]  4 B  rows x64
        write  out[4*rows]  4 B  rows x64
    """)


def test_quotient_and_remainder_that_change_places_transpose() -> None:
    found = accesses("rows: for (int i = 0; i < 64; ++i) out[(i & 7) << 3 | i >> 3] = 1;")
    assert found == lines("""
        write  out[32*rows - 252*(rows // 8)]  4 B  rows x64
    """)


def test_rounding_down_to_a_multiple() -> None:
    found = accesses("rows: for (int i = 0; i < 64; ++i) out[i & ~7] = 1;")
    assert found == lines("""
        write  out[32*(rows // 8)]  4 B  rows x64
    """)
