"""Copies, fills and burst requests are loops of their own over the elements."""

from __future__ import annotations

from helpers.lowered import lines
from helpers.traced import accesses, walks


def test_a_copy_reads_and_writes_element_by_element() -> None:
    found = accesses(
        "memcpy(out + m, &in[8], n * sizeof(int));",
        before="#include <cstring>",
    )
    assert found == lines("""
        read  in[32 + 4*copied]  4 B  copied xn
        write  out[4*m + 4*copied]  4 B  copied xn
    """)


def test_a_copy_to_an_array_on_chip_only_reads() -> None:
    found = accesses(
        """
        int line[64];
        rows: for (int i = 0; i < 8; ++i) memcpy(line, in + 64 * i, sizeof line);
        """,
        before="#include <cstring>",
    )
    assert found == lines("""
        read  in[256*rows + 4*copied]  4 B  rows x8  copied x64
    """)


def test_a_copied_row_is_a_run_of_its_own() -> None:
    found = walks(
        "rows: for (int i = 0; i < 8; ++i) memcpy(out + 16 * i, in + 16 * i, 64);",
        before="#include <cstring>",
    )
    assert found == lines("""
        read in sequential +4 run 16 constant x128
        write out sequential +4 run 16 constant x128
    """)


def test_a_fill_only_writes() -> None:
    found = accesses(
        "memset(out, 0, 4 * n);",
        before="#include <cstring>",
    )
    assert found == lines("""
        write  out[4*copied]  4 B  copied xn
    """)


def test_a_copy_of_a_range() -> None:
    found = accesses(
        """
        std::copy(in, in + 64, out);
        std::copy_n(in, n, out);
        """,
        before="#include <algorithm>",
    )
    assert found == lines("""
        read  in[4*copied]  4 B  copied x64
        write  out[4*copied]  4 B  copied x64
        read  in[4*copied]  4 B  copied xn
        write  out[4*copied]  4 B  copied xn
    """)


def test_a_length_from_data() -> None:
    found = accesses(
        """
        rows: for (int i = 0; i < 8; ++i) memcpy(out + 64 * i, in + 64 * i, mask[i] * sizeof(int));
        """,
        before="#include <cstring>",
    )
    assert found == lines("""
        read  mask[4*rows]  4 B  rows x8
        read  in[256*rows + 4*copied]  4 B  rows x8  copied xmask[4*rows]
        write  out[256*rows + 4*copied]  4 B  rows x8  copied xmask[4*rows]
    """)


def test_a_burst_request_is_the_access_and_its_beats_are_not() -> None:
    found = accesses(
        """
        in.read_request(32, 64);
        rows: for (int i = 0; i < 64; ++i) out[i] = in.read();
        """,
        before="#include <hls_burst_maxi.h>",
        parameters="hls::burst_maxi<int> in, int *out",
    )
    assert found == lines("""
        read  in[128 + 4*copied]  4 B  copied x64  by request
        write  out[4*rows]  4 B  rows x64
    """)


def test_a_burst_request_that_writes() -> None:
    found = accesses(
        """
        rows: for (int r = 0; r < 4; ++r) {
            out.write_request(16 * r, 16);
            beats: for (int i = 0; i < 16; ++i) out.write(i);
            out.write_response();
        }
        """,
        before="#include <hls_burst_maxi.h>",
        parameters="hls::burst_maxi<int> out, int *a",
    )
    assert found == lines("""
        write  out[64*rows + 4*copied]  4 B  rows x4  copied x16  by request
    """)
