"""Expressions: every operator, conversion and constant of C++ becomes one of a few kinds."""

from __future__ import annotations

import pytest

from beatwise.model.kernel import Items, Literal
from helpers.lowered import body, lines, program, shown, statements

INTEGERS = "#include <ap_int.h>\n"


@pytest.mark.parametrize(
    ("source", "lowered"),
    [
        ("a[n] = b[n + 1] * 2;", "a[n] = (b[n + 1] * 2)"),
        ("a[0] += b[1] << 3;", "a[0] += (b[1] << 3)"),
        ("*a++ = -*b;", "*a++ = -*b"),
        ("(*a)--;", "*a--"),
        ("--*a;", "--*a"),
        ("a[n > 2 ? 1 : 0] = !n && u || ~n;", "a[(n > 2) ? 1 : 0] = <i32>((!<u1>n && <u1>u) || <u1>~n)"),
        ("n = a[0], b[0] = n;", "(n = a[0]) , (b[0] = n)"),
        ("a[0] = b[0] = n;", "a[0] = (b[0] = n)"),
        ("3[a] = 4;", "a[3] = 4"),
        ("*(a + n) = (&b[2])[1];", "*(a + n) = &b[2][1]"),
        ("*&a[1] = 2;", "a[1] = 2"),
    ],
)
def test_operators_keep_their_operands(source: str, lowered: str) -> None:
    assert statements(source) == lowered


@pytest.mark.parametrize(
    ("source", "lowered"),
    [
        ("wide[n] = n;", "wide[n] = <i64>n"),
        ("a[bytes[0]] = 1;", "a[bytes[0]] = 1"),
        ("a[(unsigned char)n] = 1;", "a[<u8>n] = 1"),
        ("a[0] = u > -1;", "a[0] = <i32>(u > 4294967295)"),
        ("a[0] = f[0];", "a[0] = <i32>f[0]"),
        ("f[0] = 2;", "f[0] = 2.0"),
        ("a[0] = (int)(a[1]);", "a[0] = a[1]"),
        ("a[0] = ((short *)a)[1];", "a[0] = <i32><*i16>a[1]"),
        ("a[0] = *reinterpret_cast<int *>(wide);", "a[0] = *<*i32>wide"),
        ("wide[0] = (long)a;", "wide[0] = <i64>a"),
        ("const int *c = a; volatile int *v = a;", "let c: *i32 = a\nlet v: *volatile i32 = <*volatile i32>a"),
        ("if (a) n = 0;", "if <u1>a\n  n = 0"),
    ],
)
def test_a_conversion_stays_where_it_changes_width_sign_or_pointee(source: str, lowered: str) -> None:
    assert statements(source) == lowered


@pytest.mark.parametrize(
    ("source", "value"),
    [
        ("0x10", "16"),
        ("'a'", "97"),
        ("sizeof(double) * 0 + sizeof(int[4])", "(8 * 0) + 16"),
        ("SECTORS", "8"),
        ("Mode::Scan == Mode::Scan", "4 == 4"),
        ("LIMIT", "12"),
        ("gates(3)", "48"),
        ("true", "1"),
        ("0xFFFFFFFFFFFFFFFFull", "18446744073709551615"),
        ("-5", "-5"),
    ],
)
def test_constants_are_folded(source: str, value: str) -> None:
    before = """
        enum { SECTORS = 8 };
        enum class Mode { Idle, Scan = 4 };
        const int LIMIT = 12;
        constexpr int gates(int n) { return n * 16; }
    """
    assert statements(f"auto x = {source};", before=before).endswith(f" = {value}")


def test_an_integer_takes_the_bytes_of_its_width_rounded_up_to_a_power_of_two() -> None:
    text = f"{INTEGERS} void echo(ap_int<24> *a, ap_uint<96> *b, ap_uint<512> *c) {{ a[0] = b[0] = c[0]; }}"
    (echo,) = program(text).functions.values()
    assert [one.type.to.bytes for one in echo.parameters] == [4, 16, 64]  # type: ignore[union-attr]


@pytest.mark.parametrize(
    ("source", "lowered"),
    [
        ("w[0] = w[1] + 1;", "w[0] = <u512>(w[1] + 1)"),
        ("w[0].range(31, 0) = w[1](63, 32);", "w[0]{31:0} = w[1]{63:32}"),
        ("s += 3; s++; --s; s <<= 2;", "s += 3\ns++\n--s\ns <<= 2"),
        ("s[3] = w[0][n];", "s{3} = w[0]{n}"),
        ("n = s.to_int() + (int)s;", "n = (<i32>s + <i32><u16>s)"),
        ("if (s == 4 && !s.get_bit(2)) s = 0;", "if (s == 4) && !s{2}\n  s = 0"),
        ("w[0] = (s, s);", "w[0] = <u512>opaque<a concatenation>(s, s)"),
        ("n = w[s];", "n = <i32><u64>w[<u16>s]"),
        ("n = s.length();", "n = 12"),
        ("s.set(3, true); s.clear(1);", "s{3} = 1\ns{1} = 0"),
    ],
)
def test_arbitrary_precision_integers_are_plain_integers(source: str, lowered: str) -> None:
    assert body(f"{INTEGERS} void echo(ap_uint<512> *w, ap_uint<12> s, int n) {{ {source} }}") == lowered


def test_fixed_point_numbers_are_reals() -> None:
    text = """
        #include <ap_fixed.h>
        typedef ap_fixed<16, 6> level_t;
        void echo(level_t *a) { level_t sum = 0; sum += a[0] * a[1]; if (sum > level_t(2)) a[sum.to_int()] = -sum; }
    """
    assert body(text) == lines("""
        let sum: r16 = 0.0
        sum += (a[0] * a[1])
        if sum > 2.0
          a[<i32>sum] = <r16>-sum""")


def test_streams_and_vectors_are_called_by_name() -> None:
    text = """
        #include <hls_stream.h>
        #include <hls_vector.h>
        void echo(hls::stream<int> &in, hls::stream<int, 8> out[2], hls::vector<float, 8> *v, int n) {
          out[n] << in.read();
          int x;
          in >> x;
          if (!in.empty() && in.read_nb(x)) out[0].write(x);
          v[0][n] = v[1][2];
        }
    """
    assert shown(text) == lines("""
        top echo(in: &stream<i32>, out: *stream<i32, 8>, v: *vector<r32, 8>, n: i32) -> void
          out[n].write?(in.read?())
          let x: i32
          in.read?(x)
          if !in.empty?() && in.read_nb?(x)
            out[0].write?(x)
          v[0][<u64>n] = v[1][2]""")


def test_standard_arrays_are_arrays() -> None:
    text = """
        #include <array>
        void echo(int *a, int n) { std::array<int, 4> t{}; t[n] = t.at(1) + t.size() + t.back(); a[0] = t.data()[2]; }
    """
    assert body(text) == lines("""
        let t: i32[4] = {}
        t[<u64>n] = <i32>((<u64>t[1] + 4) + <u64>t[3])
        a[0] = t[2]""")


def test_braced_lists_get_their_nesting_and_order_back() -> None:
    before = "struct gate { int range; float level[2]; struct { int x, y; } at; };"
    assert statements(
        """
        int t[2][2] = {1, 2, 3, 4};
        gate g = {1, 2, 3, 4, 5};
        gate h{.range = 7, .at = {1, 2}};
        int z[4] = {};
        gate list[] = {{1}, {2, {3}}};
        """,
        before=before,
    ) == lines("""
        let t: i32[2][2] = {{1, 2}, {3, 4}}
        let g: gate = {1, {2.0, 3.0}, {4, 5}}
        let h: gate = {7, {}, {1, 2}}
        let z: i32[4] = {}
        let list: gate[2] = {{1}, {2, {3.0}}}""")


def test_members_pointers_and_references_lead_to_their_objects() -> None:
    before = "struct point { int x, y; }; struct view { point *at; int *rows[2]; };"
    assert statements(
        """
        view v = {(point *)a, {a, b}};
        v.at->x = v.at[2].y;
        v.rows[n][3] = (*v.at).x;
        view *p = &v;
        p->rows[0] = b;
        int &r = a[4];
        r = 1;
        point q = *v.at;
        """,
        before=before,
    ) == lines("""
        let v: view = {<*point>a, {a, b}}
        *v.at.x = v.at[2].y
        v.rows[n][3] = *v.at.x
        let p: *view = &v
        *p.rows[0] = b
        let r: &i32 = a[4]
        r = 1
        let q: point = *v.at""")


def test_structured_bindings_stand_for_the_parts() -> None:
    assert statements(
        "span s{1, 2}; auto [first, count] = s; a[first] = count;", before="struct span { int at, n; };"
    ) == lines("""
        let s: span = {1, 2}
        let [first, count]: span = s
        a[[first, count].at] = [first, count].n""")


def test_what_is_not_understood_is_opaque_and_keeps_its_parts() -> None:
    assert statements("int *p = new int[a[0]]; delete p;").startswith("let p: *i32 = opaque<")
    assert "a[0]" in statements("int *p = new int[a[0]];")


def test_a_reinterpreted_reference_is_what_its_address_points_to() -> None:
    assert statements("reinterpret_cast<float &>(a[9]) = 2;") == "*<*r32>&a[9] = 2.0"


def test_members_of_anonymous_records_are_members_of_the_record_around() -> None:
    text = """
        struct cell { int tag; union { int whole; float real; }; struct { short low, high; }; };
        extern "C" void echo(cell *c) { c[1].real = 2; c->high = 3; }
    """
    (echo,) = program(text).functions.values()
    cell = echo.parameters[0].type.to  # type: ignore[union-attr]
    assert [(one.name, one.offset) for one in cell.fields] == [  # type: ignore[union-attr]
        ("tag", 0),
        ("whole", 4),
        ("real", 4),
        ("low", 8),
        ("high", 10),
    ]
    assert body(text) == "c[1].real = 2.0\n*c.high = 3"


def test_records_keep_their_padding_unless_they_are_packed() -> None:
    text = """
        #include <ap_int.h>
        struct loose { char tag; ap_uint<24> gate; double level; };
        struct tight { char tag; ap_uint<24> gate; double level; } __attribute__((packed));
        struct node { node *next; int value; };
        extern "C" void echo(loose *a, tight *b, node *c) { a[0].tag = b[0].tag = c->next->value; }
    """
    (echo,) = program(text).functions.values()
    assert [one.type.to.bytes for one in echo.parameters] == [16, 13, 16]  # type: ignore[union-attr]


def test_a_statement_expression_comes_before_its_statement() -> None:
    before = "#define LEAST(x, y) ({ typeof(x) x_ = (x); typeof(y) y_ = (y); x_ < y_ ? x_ : y_; })"
    assert statements("a[0] = LEAST(b[0], b[1]);", before=before) == lines("""
        let x_: i32 = b[0]
        let y_: i32 = b[1]
        a[0] = ((x_ < y_) ? x_ : y_)""")


def test_long_tables_keep_every_value() -> None:
    values = [(7 * index) % 256 - 128 for index in range(1000)]
    listed = ", ".join(map(str, values))
    text = f"static const signed char t[1000] = {{{listed},}};\nint echo(int *a) {{ return t[a[0]]; }}"
    (table,) = program(text).globals.values()
    assert isinstance(table.initial, Items)
    assert [one.value for one in table.initial.items if isinstance(one, Literal)] == values


def test_defaults_are_filled_in_where_the_function_has_a_body() -> None:
    before = "int pick(int *p, int at = 3, int by = 2 * 2) { return p[at] + by; }"
    assert statements("a[0] = pick(b) + pick(b, n);", before=before) == "a[0] = (pick(b, 3, 4) + pick(b, n, 4))"
