"""Narrow and unsigned integers change addresses where they wrap, and only there."""

from __future__ import annotations

from helpers.lowered import lines
from helpers.traced import accesses, walks


def test_a_narrow_counter_wraps() -> None:
    found = accesses(
        """
        unsigned char small = 0;
        rows: for (int i = 0; i < 512; ++i) out[small++] = 1;
        """,
    )
    assert found == lines("""
        write  out[4*rows - 1024*(rows // 256)]  4 B  rows x512
    """)


def test_a_narrow_counter_that_stays_within_its_range_does_not() -> None:
    found = accesses("rows: for (unsigned char i = 0; i < 200; ++i) out[i] = 1;")
    assert found == lines("""
        write  out[4*rows]  4 B  rows x200
    """)


def test_a_narrowing_cast_wraps() -> None:
    found = accesses("rows: for (int i = 0; i < 1000; ++i) out[(unsigned char)(3 * i)] = 1;")
    assert found == lines("""
        write  out[4*uint8(3*rows)]  4 B  rows x1000
    """)


def test_a_signed_narrow_variable_wraps_to_negative() -> None:
    found = accesses(
        """
        rows: for (int i = 0; i < 1000; ++i) {
            short s = i * 1000;
            out[s + 40000] = 1;
        }
        """,
    )
    assert found == lines("""
        write  out[160000 + 4*int16(1000*rows)]  4 B  rows x1000
    """)


def test_an_arbitrary_width_wraps_where_its_bits_end() -> None:
    found = accesses(
        """
        ap_uint<4> at = 0;
        rows: for (int i = 0; i < 64; ++i) { out[at] = 1; at++; }
        """,
        before="#include <ap_int.h>",
    )
    assert found == lines("""
        write  out[4*rows - 64*(rows // 16)]  4 B  rows x64
    """)


def test_an_unsigned_counter_that_passes_zero_ends_its_loop() -> None:
    found = accesses(
        """
        rows: for (unsigned i = 7; i < 8; --i) out[i] = 1;
        more: for (unsigned i = n - 1; i < (unsigned)n; i--) out[i] = 1;
        """,
    )
    assert found == lines("""
        write  out[28 - 4*rows]  4 B  rows x8
        write  out[-4 + 4*n - 4*more]  4 B  more xn
    """)


def test_a_narrow_counter_that_passes_zero_meets_its_end() -> None:
    found = accesses("rows: for (unsigned char i = 7; i != 255; --i) out[i] = 1;")
    assert found == lines("""
        write  out[28 - 4*rows]  4 B  rows x8
    """)


def test_what_unsigned_arithmetic_takes_away_it_gives_back() -> None:
    found = accesses("rows: for (unsigned i = 0; i < 8; ++i) out[i - 1u + 1u] = 1;")
    assert found == lines("""
        write  out[4*rows]  4 B  rows x8
    """)


def test_division_of_a_negative_number_rounds_toward_zero_and_is_no_whole_quotient() -> None:
    found = accesses("rows: for (int i = 0; i < 8; i++) out[(i - 4) / 2 + 2] = in[(i + 4) / 2];")
    assert found == lines("""
        read  in[8 + 4*(rows // 2)]  4 B  rows x8
        write  out[8 + 4*((-4 + rows) / 2)]  4 B  rows x8
    """)


def test_the_remainder_of_a_negative_number_is_negative() -> None:
    found = walks("rows: for (int i = 0; i < 8; i++) out[(i - 4) % 3 + 2] = 1;")
    assert found == lines("""
        write out sequential +4 run 2.66667 constant x8
    """)


def test_bits_put_side_by_side_add_up() -> None:
    found = accesses("rows: for (int i = 0; i < 64; ++i) out[((i >> 2) << 5) | (i & 3)] = 1;")
    assert found == lines("""
        write  out[4*rows + 112*(rows // 4)]  4 B  rows x64
    """)


def test_an_exclusive_or_is_walked() -> None:
    found = walks("rows: for (int i = 0; i < 64; ++i) out[i ^ 1] = in[i ^ 32];")
    assert found == lines("""
        read in sequential +4 run 32 constant x64
        write out irregular run 1 constant x64
    """)


def test_a_choice_of_the_lesser_is_a_minimum_and_no_other_choice_is() -> None:
    found = accesses(
        """
        rows: for (int i = 0; i < 8; ++i) {
            int x = in[i], y = x, z = x;
            if (x > 3) y = 3;
            if (x > 3) z = 2;
            a[y] = 1;
            b[z] = 1;
        }
        """,
    )
    assert found == lines("""
        read  in[4*rows]  4 B  rows x8
        write  a[4*min(3, in[4*rows])]  4 B  rows x8
        write  b[4*select((3 < in[4*rows]), 2, in[4*rows])]  4 B  rows x8
    """)


def test_a_narrowing_cast_wraps_in_a_loop_whose_end_is_found_later() -> None:
    found = accesses(
        """
        int i = 0;
        rows: while (i < 500) {
            short s = i;
            out[(unsigned char)(3 * i)] = 1;
            a[s] = 1;
            i++;
        }
        """
    )
    assert found == lines("""
        write  out[4*uint8(3*rows)]  4 B  rows x500
        write  a[4*rows]  4 B  rows x500
    """)


def test_a_negative_factor_of_an_unsigned_counter_goes_down() -> None:
    found = accesses("rows: for (unsigned j = 0; j < 8; ++j) out[-1 * j + 7] = 1;")
    assert found == lines("""
        write  out[28 - 4*rows]  4 B  rows x8
    """)
