"""What each kind of loop makes of the addresses in it, and how often it runs."""

from __future__ import annotations

from helpers.lowered import lines
from helpers.traced import accesses, walks


def test_a_counter_moves_by_its_step() -> None:
    found = accesses("rows: for (int i = 0; i < 16; ++i) out[i] = in[2 * i + 1];")
    assert found == lines("""
        read  in[4 + 8*rows]  4 B  rows x16
        write  out[4*rows]  4 B  rows x16
    """)


def test_a_bound_that_is_an_argument_stays_in_the_trips() -> None:
    found = accesses("rows: for (int i = 3; i <= n; i += 4) out[i] = 1;")
    assert found == lines("""
        write  out[12 + 16*rows]  4 B  rows x((1 + n) // 4)
    """)


def test_a_descending_counter_has_a_negative_step() -> None:
    found = accesses("rows: for (int i = n - 1; i >= 0; --i) out[i] = 1;")
    assert found == lines("""
        write  out[-4 + 4*n - 4*rows]  4 B  rows xn
    """)


def test_two_counters_in_one_head() -> None:
    found = accesses("rows: for (int i = 7, j = 0; i >= 0; i--, j += 2) out[j] = in[i];")
    assert found == lines("""
        read  in[28 - 4*rows]  4 B  rows x8
        write  out[8*rows]  4 B  rows x8
    """)


def test_a_while_loop_counts_what_its_body_moves() -> None:
    found = accesses(
        """
        int i = 0;
        rows: while (i < 10) { out[i] = 1; i++; }
        """,
    )
    assert found == lines("""
        write  out[4*rows]  4 B  rows x10
    """)


def test_a_do_loop_runs_once_more_than_its_test_holds() -> None:
    found = accesses(
        """
        int i = 0;
        rows: do { out[i] = 1; i += 2; } while (i < 10);
        """,
    )
    assert found == lines("""
        write  out[8*rows]  4 B  rows x5
    """)


def test_an_endless_loop_ends_at_its_break() -> None:
    found = accesses(
        """
        int i = 0;
        rows: for (;;) { if (i >= 10) break; out[i] = 1; i++; }
        """,
    )
    assert found == lines("""
        write  out[4*rows]  4 B  rows x11  unless left (rows < 10)
    """)


def test_loops_around_one_another_each_give_a_term() -> None:
    found = accesses(
        """
        rows: for (int i = 0; i < n; ++i)
            columns: for (int j = 0; j < m; ++j)
                out[i * m + j] = in[j * n + i];
        """,
    )
    assert found == lines("""
        read  in[4*n*columns + 4*rows]  4 B  rows xn  columns xm
        write  out[4*m*rows + 4*columns]  4 B  rows xn  columns xm
    """)


def test_an_inner_loop_may_begin_and_end_where_the_outer_one_is() -> None:
    found = accesses(
        """
        rows: for (int i = 0; i < 8; ++i)
            columns: for (int j = i; j < 8; ++j) out[8 * i + j] = 1;
        """,
    )
    assert found == lines("""
        write  out[36*rows + 4*columns]  4 B  rows x8  columns x(8 - rows)
    """)


def test_the_last_chunk_is_as_long_as_what_is_left() -> None:
    found = accesses(
        """
        chunks: for (int i = 0; i < n; i += 64) {
            int len = 64;
            if (i + 64 > n) len = n - i;
            rows: for (int j = 0; j < len; ++j) out[i + j] = 1;
        }
        """,
    )
    assert found == lines("""
        write  out[256*chunks + 4*rows]  4 B  chunks x((63 + n) // 64)  rows xmax(min(n - 64*chunks, 64), 0)
    """)


def test_a_chunk_may_be_cut_by_the_lesser_of_two() -> None:
    found = accesses(
        """
        chunks: for (int i = 0; i < n; i += 32) {
            int len = std::min(32, n - i);
            rows: for (int j = 0; j < len; ++j) out[i + j] = 1;
        }
        """,
        before="#include <algorithm>",
    )
    assert found == lines("""
        write  out[128*chunks + 4*rows]  4 B  chunks x((31 + n) // 32)  rows xmax(min(32, n - 32*chunks), 0)
    """)


def test_a_pointer_that_moves_is_an_offset_that_moves() -> None:
    found = accesses(
        """
        const int *p = in;
        int *q = out + 2;
        rows: for (int i = 0; i < 8; ++i) *q++ = *p++;
        """,
    )
    assert found == lines("""
        read  in[4*rows]  4 B  rows x8
        write  out[8 + 4*rows]  4 B  rows x8
    """)


def test_a_loop_may_end_where_two_pointers_meet() -> None:
    found = accesses(
        """
        const int *p = in, *end = in + 64;
        rows: while (p < end) { out[0] = *p; p += 2; }
        """,
    )
    assert found == lines("""
        read  in[8*rows]  4 B  rows x32
        write  out[0]  4 B  rows x32
    """)


def test_a_pointer_may_walk_backwards_to_where_it_must_not_pass() -> None:
    found = accesses(
        """
        const int *p = in + 8;
        rows: while (p != in) *out = *--p;
        """,
    )
    assert found == lines("""
        read  in[28 - 4*rows]  4 B  rows x8
        write  out[0]  4 B  rows x8
    """)


def test_a_pointer_goes_on_over_the_rows_it_is_not_set_back_in() -> None:
    found = accesses(
        """
        const int *p = in;
        rows: for (int i = 0; i < 8; ++i) {
            columns: for (int j = 0; j < 16; ++j) out[0] = *p++;
            p += 4;
        }
        """,
    )
    assert found == lines("""
        read  in[80*rows + 4*columns]  4 B  rows x8  columns x16
        write  out[0]  4 B  rows x8  columns x16
    """)


def test_a_counter_goes_on_over_the_outer_loop_that_starts_it_anew() -> None:
    found = accesses(
        """
        rows: for (int i = 0; i < 4; ++i) {
            int at = i;
            steps: while (at < 64) { out[at] = 1; at += 4; }
        }
        """,
    )
    assert found == lines("""
        write  out[4*rows + 16*steps]  4 B  rows x4  steps x16
    """)


def test_what_the_iteration_before_left_behind() -> None:
    found = accesses(
        """
        int last = 0;
        rows: for (int i = 0; i < 16; ++i) { out[last] = 1; last = 2 * i; }
        """,
    )
    assert found == lines("""
        write  out[4*select((rows == 0), 0, -2 + 2*rows)]  4 B  rows x16
    """)


def test_a_step_that_grows_has_a_square() -> None:
    found = accesses(
        """
        int k = 0;
        rows: for (int i = 0; i < 16; ++i) { out[k] = 1; k += i; }
        """,
    )
    assert found == lines("""
        write  out[4*((-1*rows + rows*rows) // 2)]  4 B  rows x16
    """)


def test_a_step_by_a_factor_is_carried_along_not_guessed() -> None:
    found = accesses("rows: for (int i = 1; i < 100; i *= 2) out[i] = 1;")
    assert found == lines("""
        write  out[4*i']  4 B  rows x?
        rows: i' = 1 then 2*i'; until (99 < i')
    """)


def test_a_value_that_changes_its_sign_is_carried_along() -> None:
    found = accesses(
        """
        int x = n;
        rows: for (int i = 0; i < 8; ++i) { out[x] = 1; x = -x; }
        """,
    )
    assert found == lines("""
        write  out[4*x']  4 B  rows x8
        rows: x' = n then -1*x'
    """)


def test_a_counter_moved_through_a_reference() -> None:
    found = accesses(
        """
        int at = 0;
        rows: for (int i = 0; i < 8; ++i) put(out, at, in[i]);
        """,
        before="static void put(int *to, int &at, int what) { to[at] = what; at += 3; }",
    )
    assert found == lines("""
        read  in[4*rows]  4 B  rows x8
        write  out[12*rows]  4 B  rows x8
    """)


def test_a_range_for_counts_over_the_range() -> None:
    found = accesses(
        """
        int order[3] = {3, 1, 2};
        rows: for (int x : order) out[x] = 1;
        """,
    )
    assert found == lines("""
        write  out[4*table[3, 1, 2][rows]]  4 B  rows x3
    """)


def test_a_table_filled_by_a_loop_is_known_when_it_is_used() -> None:
    found = accesses(
        """
        int order[4];
        fill: for (int i = 0; i < 4; ++i) order[i] = 3 - i;
        rows: for (int i = 0; i < 4; ++i) out[order[i]] = 1;
        """,
    )
    assert found == lines("""
        write  out[4*table[3, 2, 1, 0][rows]]  4 B  rows x4
    """)


def test_a_loop_that_only_computes_is_followed_turn_by_turn() -> None:
    found = accesses(
        """
        rows: for (int i = 0; i < 8; ++i) {
            int r = 0;
            bits: for (int k = 0; k < 3; ++k) r |= ((i >> k) & 1) << (2 - k);
            out[r] = 1;
        }
        """,
    )
    assert found == lines("""
        write  out[16*rows - 24*(rows // 2) - 12*(rows // 4)]  4 B  rows x8
    """)


def test_a_tripcount_and_other_directives_stay_with_their_loop() -> None:
    found = walks(
        """
        rows: for (int i = 0; i < n; ++i) {
        #pragma HLS LOOP_TRIPCOUNT min=10 max=20
            out[i] = 1;
        }
        """,
    )
    assert found == lines("""
        write out sequential +4 run 15 tripcount x15
    """)


def test_pointers_that_swap_are_a_choice_by_the_round() -> None:
    found = accesses(
        """
        int *p = a, *q = b;
        times: for (int t = 0; t < 4; ++t) {
            rows: for (int i = 0; i < 8; ++i) q[i] = 1;
            int *s = p;
            p = q;
            q = s;
        }
        """,
    )
    assert found == lines("""
        write  b[4*rows]  4 B  times x4  rows x8  picks ((times - 2*(times // 2)) == 0)  b|a by times - 2*(times // 2)
        write  a[4*rows]  4 B  times x4  rows x8  picks ((times - 2*(times // 2)) == 1)  b|a by times - 2*(times // 2)
    """)
