"""Calls are followed in place: helpers, lambdas, function objects, templates, tasks, methods."""

from __future__ import annotations

from helpers.lowered import lines
from helpers.traced import accesses, problems


def test_a_helper_called_twice_gives_its_accesses_twice() -> None:
    found = accesses(
        """
        put(a, in, 0);
        put(b, in, 4);
        """,
        before="static void put(int *to, const int *from, int at) { to[at] = from[at]; }",
    )
    assert found == lines("""
        read  in[0]  4 B
        write  a[0]  4 B
        read  in[16]  4 B
        write  b[16]  4 B
    """)


def test_a_lambda_reaches_what_it_captures() -> None:
    found = accesses(
        """
        auto put = [&](int at, int what) { out[at] = what; };
        rows: for (int i = 0; i < 8; ++i) put(2 * i, in[i]);
        """,
    )
    assert found == lines("""
        read  in[4*rows]  4 B  rows x8
        write  out[8*rows]  4 B  rows x8
    """)


def test_a_lambda_that_captures_by_value_keeps_the_value() -> None:
    found = accesses(
        """
        int base = 4;
        auto put = [=](int at) { out[base + at] = 1; };
        base = 0;
        put(1);
        """,
    )
    assert found == lines("""
        write  out[20]  4 B
    """)


def test_a_function_object() -> None:
    found = accesses(
        """
        Put put{out};
        rows: for (int i = 0; i < 8; ++i) put(2 * i, in[i]);
        """,
        before="""
        struct Put {
            int *to;
            void operator()(int at, int what) const { to[at] = what; }
        };
        """,
    )
    assert found == lines("""
        read  in[4*rows]  4 B  rows x8
        write  out[8*rows]  4 B  rows x8
    """)


def test_a_method_moves_what_its_object_holds() -> None:
    found = accesses(
        """
        Writer w(out);
        rows: for (int i = 0; i < 8; ++i) w.put(1);
        """,
        before="""
        struct Writer {
            int *to;
            int at;
            Writer(int *t) : to(t), at(3) {}
            void put(int x) { to[at] = x; at += 2; }
        };
        """,
    )
    assert found == lines("""
        write  out[12 + 8*rows]  4 B  rows x8
    """)


def test_a_function_pointer() -> None:
    found = accesses(
        """
        int (*f)(int) = twice;
        rows: for (int i = 0; i < 8; ++i) out[f(i)] = 1;
        """,
        before="static int twice(int x) { return 2 * x; }",
    )
    assert found == lines("""
        write  out[8*rows]  4 B  rows x8
    """)


def test_a_function_held_by_a_wrapper() -> None:
    found = accesses(
        """
        std::function<int(int)> f = [&](int x) { return in[x]; };
        rows: for (int i = 0; i < 8; ++i) out[i] = f(2 * i);
        """,
        before="#include <functional>",
    )
    assert found == lines("""
        read  in[8*rows]  4 B  rows x8
        write  out[4*rows]  4 B  rows x8
    """)


def test_a_template_that_calls_itself() -> None:
    found = accesses(
        "Sum<2>::run(in, out);",
        before="""
        template <int N> struct Sum {
            static void run(const int *p, int *q) { q[N] = p[N]; Sum<N - 1>::run(p, q); }
        };
        template <> struct Sum<0> {
            static void run(const int *p, int *q) { q[0] = p[0]; }
        };
        """,
    )
    assert found == lines("""
        read  in[8]  4 B
        write  out[8]  4 B
        read  in[4]  4 B
        write  out[4]  4 B
        read  in[0]  4 B
        write  out[0]  4 B
    """)


def test_a_reference_to_an_array_on_chip_is_no_access() -> None:
    found = accesses(
        """
        int local[4];
        rows: for (int i = 0; i < 4; ++i) put(local, i);
        out[0] = local[2];
        """,
        before="static void put(int (&to)[4], int at) { to[at] = 1; }",
    )
    assert found == lines("""
        write  out[0]  4 B
    """)


def test_a_macro_s_accesses_are_those_of_its_text() -> None:
    found = accesses(
        "rows: for (int i = 0; i < 8; ++i) { LOAD(i) }",
        before="#define LOAD(k) out[k] = in[(k) * 3];",
    )
    assert found == lines("""
        read  in[12*rows]  4 B  rows x8
        write  out[4*rows]  4 B  rows x8
    """)


def test_recursion_with_a_known_end_is_followed_to_it() -> None:
    found = accesses(
        "out[0] = deep(in, 3);",
        before="static int deep(const int *p, int n) { return n == 0 ? 0 : p[n] + deep(p, n - 1); }",
    )
    assert found == lines("""
        read  in[12]  4 B
        read  in[8]  4 B
        read  in[4]  4 B
        write  out[0]  4 B
    """)


def test_recursion_without_a_known_end_is_told() -> None:
    found = problems(
        "out[0] = deep(in, n);",
        before="static int deep(const int *p, int n) { return n == 0 ? 0 : p[n] + deep(p, n - 1); }",
    )
    assert found == lines("""
        deep calls itself too deeply to be followed
    """)


def test_a_static_local_keeps_its_value_over_the_calls() -> None:
    found = accesses(
        "rows: for (int i = 0; i < 8; ++i) out[next()] = 1;",
        before="""
        static int next() {
            static int c = 3;
            return c++;
        }
        """,
    )
    assert found == lines("""
        write  out[12 + 4*rows]  4 B  rows x8
    """)


def test_a_static_local_without_a_value_starts_at_zero() -> None:
    found = accesses(
        """
        rows: for (int i = 0; i < 8; ++i) {
            static int c;
            out[c] = 1;
            c += 2;
        }
        """,
    )
    assert found == lines("""
        write  out[8*rows]  4 B  rows x8
    """)


def test_a_global_moves_like_any_variable() -> None:
    found = accesses(
        "rows: for (int i = 0; i < 8; ++i) out[calls++] = 1;",
        before="static int calls = 0;",
    )
    assert found == lines("""
        write  out[4*rows]  4 B  rows x8
    """)


def test_a_global_that_the_source_does_not_set_is_a_size_to_be_given() -> None:
    found = accesses(
        "rows: for (int i = 0; i < 8; ++i) out[start + i] = 1;",
        before="extern int start;",
    )
    assert found == lines("""
        write  out[4*start + 4*rows]  4 B  rows x8
    """)


def test_a_constant_table_is_looked_up() -> None:
    found = accesses(
        "rows: for (int i = 0; i < 4; ++i) out[order[i]] = 1;",
        before="static const int order[4] = {3, 1, 0, 2};",
    )
    assert found == lines("""
        write  out[4*table[3, 1, 0, 2][rows]]  4 B  rows x4
    """)
