"""Elements: records, vectors, bit ranges, wide words, arrays of several dimensions, casts."""

from __future__ import annotations

from helpers.lowered import lines
from helpers.traced import accesses


def test_a_field_is_a_part_of_its_record() -> None:
    found = accesses(
        "rows: for (int i = 0; i < 8; ++i) out[i].phase = in[i].power;",
        before="struct Gate { int power; short phase; short width; };",
        parameters="const Gate *in, Gate *out",
    )
    assert found == lines("""
        read  in[8*rows]  4 of 8 B  rows x8
        write  out[8*rows]  2 of 8 B  rows x8
    """)


def test_a_whole_record_moves_as_one() -> None:
    found = accesses(
        """
        rows: for (int i = 0; i < 8; ++i) {
            Gate g = in[i];
            g.phase = 0;
            out[i] = g;
        }
        """,
        before="struct Gate { int power; short phase; short width; };",
        parameters="const Gate *in, Gate *out",
    )
    assert found == lines("""
        read  in[8*rows]  8 B  rows x8
        write  out[8*rows]  8 B  rows x8
    """)


def test_a_field_within_a_field() -> None:
    found = accesses(
        "rows: for (int i = 0; i < 8; ++i) out[i].second.y = in[i].first.x;",
        before="""
        struct Part { short x; short y; };
        struct Pair { Part first; Part second; };
        """,
        parameters="const Pair *in, Pair *out",
    )
    assert found == lines("""
        read  in[8*rows]  2 of 8 B  rows x8
        write  out[8*rows]  2 of 8 B  rows x8
    """)


def test_a_reference_to_an_element_reaches_it_when_it_is_used() -> None:
    found = accesses(
        """
        rows: for (int i = 0; i < 8; ++i) {
            const Gate &g = in[i];
            out[i].power = g.power;
        }
        """,
        before="struct Gate { int power; short phase; short width; };",
        parameters="const Gate *in, Gate *out",
    )
    assert found == lines("""
        read  in[8*rows]  4 of 8 B  rows x8
        write  out[8*rows]  4 of 8 B  rows x8
    """)


def test_an_array_within_a_record_is_a_part_of_it() -> None:
    found = accesses(
        """
        rays: for (int i = 0; i < 8; ++i)
            gates: for (int j = 0; j < 15; ++j) out[15 * i + j] = in[i].gates[j];
        """,
        before="struct Ray { int azimuth; float gates[15]; };",
        parameters="const Ray *in, float *out",
    )
    assert found == lines("""
        read  in[64*rays]  4 of 64 B  rays x8  gates x15
        write  out[60*rays + 4*gates]  4 B  rays x8  gates x15
    """)


def test_a_bit_range_is_a_part_of_its_word() -> None:
    found = accesses(
        "rows: for (int i = 0; i < 8; ++i) out[i].range(31, 0) = in[i].range(63, 32);",
        before="#include <ap_int.h>",
        parameters="const ap_uint<512> *in, ap_uint<512> *out",
    )
    assert found == lines("""
        read  in[64*rows]  4 of 64 B  rows x8
        write  out[64*rows]  4 of 64 B  rows x8
    """)


def test_a_wide_word_taken_apart_on_chip_is_read_once() -> None:
    found = accesses(
        """
        rows: for (int i = 0; i < 8; ++i) {
            ap_uint<512> w = in[i];
            lanes: for (int j = 0; j < 16; ++j) out[16 * i + j] = w.range(32 * j + 31, 32 * j);
        }
        """,
        before="#include <ap_int.h>",
        parameters="const ap_uint<512> *in, int *out",
    )
    assert found == lines("""
        read  in[64*rows]  64 B  rows x8
        write  out[64*rows + 4*lanes]  4 B  rows x8  lanes x16
    """)


def test_a_word_of_24_bits_takes_four_bytes() -> None:
    found = accesses(
        "rows: for (int i = 0; i < 8; ++i) out[i] = in[i];",
        before="#include <ap_int.h>",
        parameters="const ap_uint<24> *in, ap_uint<24> *out",
    )
    assert found == lines("""
        read  in[4*rows]  4 B  rows x8
        write  out[4*rows]  4 B  rows x8
    """)


def test_a_lane_is_a_part_of_its_vector() -> None:
    found = accesses(
        """
        rows: for (int i = 0; i < 8; ++i) lanes: for (int j = 0; j < 16; ++j) out[16 * i + j] = in[i][j];
        """,
        before="#include <hls_vector.h>",
        parameters="const hls::vector<float, 16> *in, float *out",
    )
    assert found == lines("""
        read  in[64*rows]  4 of 64 B  rows x8  lanes x16
        write  out[64*rows + 4*lanes]  4 B  rows x8  lanes x16
    """)


def test_rows_and_columns_of_an_array_parameter() -> None:
    found = accesses(
        """
        rows: for (int i = 0; i < 8; ++i)
            columns: for (int j = 0; j < 16; ++j) out[j][i] = in[i][j];
        """,
        parameters="const int in[8][16], int out[16][8]",
    )
    assert found == lines("""
        read  in[64*rows + 4*columns]  4 B  rows x8  columns x16
        write  out[4*rows + 32*columns]  4 B  rows x8  columns x16
    """)


def test_four_dimensions() -> None:
    found = accesses(
        "rows: for (int i = 0; i < 5; ++i) out[i] = in[1][2][i][3];",
        parameters="const int in[2][3][5][7], int *out",
    )
    assert found == lines("""
        read  in[712 + 28*rows]  4 B  rows x5
        write  out[4*rows]  4 B  rows x5
    """)


def test_a_pointer_cast_is_read_in_its_own_elements() -> None:
    found = accesses(
        """
        const short *half = (const short *)in;
        const long long *twice = reinterpret_cast<const long long *>(in);
        rows: for (int i = 0; i < 8; ++i) out[i] = half[i] + twice[i];
        """,
    )
    assert found == lines("""
        read  in[2*rows]  2 B  rows x8
        read  in[8*rows]  8 B  rows x8
        write  out[4*rows]  4 B  rows x8
    """)


def test_a_cast_to_bytes_and_back_keeps_the_offset() -> None:
    found = accesses(
        """
        int *p = (int *)((char *)out + 16);
        rows: for (int i = 0; i < 8; ++i) p[i] = 1;
        """,
    )
    assert found == lines("""
        write  out[16 + 4*rows]  4 B  rows x8
    """)


def test_a_cast_to_rows() -> None:
    found = accesses(
        """
        int (*grid)[8] = (int (*)[8])out;
        rows: for (int i = 0; i < 4; ++i)
            columns: for (int j = 0; j < 8; ++j) grid[i][j] = 1;
        """,
    )
    assert found == lines("""
        write  out[32*rows + 4*columns]  4 B  rows x4  columns x8
    """)


def test_a_store_through_a_cast_is_as_wide_as_its_type() -> None:
    found = accesses("rows: for (int i = 0; i < 8; ++i) *(long long *)(out + 2 * i) = 1;")
    assert found == lines("""
        write  out[8*rows]  8 B  rows x8
    """)


def test_a_compound_assignment_reads_and_writes() -> None:
    found = accesses(
        """
        rows: for (int i = 0; i < 8; ++i) {
            out[i] += in[i];
            a[i]++;
        }
        """,
    )
    assert found == lines("""
        read  in[4*rows]  4 B  rows x8
        read  out[4*rows]  4 B  rows x8
        write  out[4*rows]  4 B  rows x8
        read  a[4*rows]  4 B  rows x8
        write  a[4*rows]  4 B  rows x8
    """)


def test_a_negative_subscript() -> None:
    found = accesses(
        """
        int *end = out + 8;
        end[-1] = 2;
        """,
    )
    assert found == lines("""
        write  out[28]  4 B
    """)


def test_volatile_is_kept() -> None:
    found = accesses(
        "rows: for (int i = 0; i < 8; ++i) out[i] = in[i];",
        parameters="volatile const int *in, int *out",
    )
    assert found == lines("""
        read  in[4*rows]  4 B  rows x8  volatile
        write  out[4*rows]  4 B  rows x8
    """)
