"""Statements: loops, branches, jumps, declarations, whatever parts they leave out."""

from __future__ import annotations

import pytest

from beatwise.model.kernel import Function, Loop
from helpers.lowered import function_named, lines, program, shown, statements

MACROS = """
#define FOR(i, n) for (int i = 0; i < (n); ++i)
#define FOREVER for (;;)
#define UNTIL(c) for (; !(c);)
#define SWAP(x, y) do { int t_ = x; x = y; y = t_; } while (0)
"""


@pytest.mark.parametrize(
    ("source", "lowered"),
    [
        ("for (int i = 0; i < n; i += 2) a[i] = 0;", "let i: i32 = 0\nloop i < n step i += 2\n  a[i] = 0"),
        ("for (; n < 4;) n++;", "loop n < 4\n  n++"),
        ("for (;; n++) { if (n > 3) break; }", "loop always step n++\n  if n > 3\n    break"),
        ("for (;;) break;", "loop always\n  break"),
        ("for (n = 0;;) break;", "n = 0\nloop always\n  break"),
        ("for (int i = 0, j = n; i < j; ++i, --j) ;", "let i: i32 = 0\nlet j: i32 = n\nloop i < j step ++i , --j"),
        ("while (n--) continue;", "loop <u1>n--\n  continue"),
        ("do n--; while (n > 0);", "loop-then-test n > 0\n  n--"),
        ("FOR(i, n) a[i] = i;", "let i: i32 = 0\nloop i < n step ++i\n  a[i] = i"),
        ("FOREVER { n++; break; }", "loop always\n  n++\n  break"),
        ("UNTIL(n == 3) n++;", "loop !(n == 3)\n  n++"),
        ("SWAP(a[0], a[1]);", "block\n  let t_: i32 = a[0]\n  a[0] = a[1]\n  a[1] = t_"),
        ("for (/* ; */ ; /* ; */ n < 2; ) { n += ';'; }", "loop n < 2\n  n += 59"),
    ],
)
def test_loops_with_missing_parts(source: str, lowered: str) -> None:
    assert statements(source, before=MACROS) == lowered


def test_a_declaration_in_a_condition_is_made_anew_each_round() -> None:
    assert statements("while (int v = *a++) b[v] = 1;") == lines("""
        loop always
          let v: i32 = *a++
          if <u1>v
          else
            break
          b[v] = 1""")


def test_branches_keep_their_heads() -> None:
    assert statements("""
        if (int q = a[0]) b[0] = q; else b[0] = -1;
        if (int z = a[1]; z > 3) b[z] = 1;
        if (n++; n > 2) b[1] = 1;
        """) == lines("""
        let q: i32 = a[0]
        if <u1>q
          b[0] = q
        else
          b[0] = -1
        let z: i32 = a[1]
        if z > 3
          b[z] = 1
        n++
        if n > 2
          b[1] = 1""")


def test_a_switch_falls_through_until_it_breaks() -> None:
    assert statements("""
        switch (n & 3) {
          case 0: a[0] = 1;
          case 1: a[1] = 2; break;
          case 2 ... 4: { a[2] = 3; break; }
          case 7: default: a[3] = 4;
        }""") == lines("""
        switch n & 3
          case 0
            a[0] = 1
          case 1
            a[1] = 2
            break
          case 2, 3, 4
            block
              a[2] = 3
              break
          case 7, default
            a[3] = 4""")


def test_labels_name_loops_and_jumps_are_told() -> None:
    assert statements(
        "outer: for (int i = 0; i < n; i++) { inner: while (n) { n--; goto done; } } done: a[0] = 1;"
    ) == lines("""
        let i: i32 = 0
        outer: loop i < n step i++
          inner: loop <u1>n
            n--
            goto
        a[0] = 1""")


def test_a_range_for_is_a_counted_loop() -> None:
    assert statements(
        "int t[3] = {1, 2, 3}; for (int &x : t) x = 0; for (int y : {4, 5}) a[y] = y;",
        before="#include <initializer_list>",
    ) == lines("""
        let t: i32[3] = {1, 2, 3}
        let index: i32 = 0
        loop index < 3 step ++index
          let x: &i32 = t[index]
          x = 0
        let items: i32[2] = {4, 5}
        let index: i32 = 0
        loop index < 2 step ++index
          let y: i32 = items[index]
          a[y] = y""")


def test_static_locals_and_constant_tables_keep_their_values() -> None:
    text = """
        static const int table[2][3] = {{1, 2}, {3}};
        int count;
        extern "C" void echo(int *a) {
          static int calls = 5;
          const int local[2] = {7, 8};
          a[calls++] = table[1][0] + local[count];
        }
    """
    assert shown(text) == lines("""
        global count: i32
        global const table: i32[2][3] = {{1, 2}, {3}}
        top extern-c echo(a: *i32) -> void
          let static calls: i32 = 5
          let const local: i32[2] = {7, 8}
          a[calls++] = (table[1][0] + local[count])""")


def test_a_place_is_the_text_it_stands_for() -> None:
    read = program("""
        #define STORE(x) a[x] = 0
        void echo(int *a, int n) {
          /* é */ for (int i = 0; i < n; i++)
            STORE(i);
        }
    """)
    loop = first_loop(function_named(read, "echo"))
    assert (loop.place.line, loop.place.column, loop.place.end_line) == (3, 11, 4)
    assert loop.place.offset == len("#define STORE(x) a[x] = 0\nvoid echo(int *a, int n) {\n  /* é */ ".encode())
    assert str(loop.body.place) == "echo.cpp:4:5"


def first_loop(function: Function) -> Loop:
    assert function.body
    return next(one for one in function.body.body if isinstance(one, Loop))
