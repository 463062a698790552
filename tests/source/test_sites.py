"""Sites: the accesses that the text alone shows."""

from __future__ import annotations

import time
from textwrap import dedent

import pytest

from beatwise.source import subscripts_in


def sites(text: str) -> list[str]:
    return [f"{each.function} {each.line} {each.what}" for each in subscripts_in(dedent(text).lstrip("\n"))]


def test_each_subscript_dereference_and_copy_is_a_site() -> None:
    assert sites("""
        void sweep(const int *gates, Cell *cells, int *sums) {
            sums[0] = gates[gates[1]];
            *sums++ = cells->power + (*cells).phase;
            memcpy(sums, gates, 64);
            std::copy_n(gates, 4, sums);
        }
        """) == [
        "sweep 2 subscript", "sweep 2 subscript", "sweep 2 subscript",
        "sweep 3 dereference", "sweep 3 dereference", "sweep 3 dereference",
        "sweep 4 copy", "sweep 5 copy",
    ]  # fmt: skip


def test_what_only_looks_like_an_access_is_none() -> None:
    assert sites("""
        #define GET(x) gates[x]
        struct Filter { int taps[4]; int first() { return this->tap; } };
        int sweep(int a, int b, int table[4]) {
            int local[4];
            int *place = &a;           // *place, gates[0]
            auto pick = [&](int i) { return a * b; };
            copy(a, b);
            print("gates[0]");
            return GET(1);
        }
        """) == []  # fmt: skip


def test_a_site_belongs_to_the_innermost_function() -> None:
    assert sites("""
        int first = table[0];
        template <int N> int *Filter<N>::run(int *p) { return [&](int i) { return &p[i]; }(0); }
        namespace radar { struct Sum { int operator()(int *p) const { return *p; } }; }
        """) == ["None 1 subscript", "run 2 subscript", "operator() 3 dereference"]  # fmt: skip


def test_regions_left_out_for_good_have_no_sites() -> None:
    assert sites("""
        int f(int *p) {
        #if 0  // old
          p[0];
        #ifdef DEEP
          p[1];
        #else
          p[2];
        #endif
        #else
          p[3];
        #endif
        #ifdef OTHER
          p[4];
        #elif 0
          p[5];
        #endif
        }
        """) == ["f 10 subscript", "f 13 subscript", "f 15 subscript"]  # fmt: skip


def test_conditions_and_directives_that_cut_through_a_construct_do_no_harm() -> None:
    assert sites("""
        #ifdef __cplusplus
        extern "C" {
        #endif
        void sweep(int *p,
        #pragma HLS something odd
                   int *q) {
            p[0] = q[0];
        }
        #ifdef __cplusplus
        }
        #endif
        """) == ["sweep 7 subscript", "sweep 7 subscript"]  # fmt: skip


def test_code_around_a_syntax_error_still_counts() -> None:
    assert sites("void f(int *p) { p[0] = ; }\nvoid g(int *p) { p[1] = 2; }") == ["f 1 subscript", "g 2 subscript"]


def test_lines_count_with_every_line_end_and_any_letters() -> None:
    text = "// é\nvoid f(int *p) {\n  é; p[0];\n}\n"
    assert [sites(text.replace("\n", end)) for end in ("\n", "\r\n", "\r")] == [["f 3 subscript"]] * 3


@pytest.mark.parametrize(
    "piece", ["x<", "(a)(", "if(", "f(a){\n", "a[b]+", "*p;", "#if 0\n", "#if 1\n", "/*", "template<"]
)
def test_reading_takes_linear_time(piece: str) -> None:
    started = time.process_time()
    subscripts_in(piece * (200_000 // len(piece)))
    assert time.process_time() - started < 10
