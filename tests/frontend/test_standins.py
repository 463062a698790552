"""Stand-ins: a kernel whose headers are missing is understood as far as it can be, and what was invented is told."""

from __future__ import annotations

import time
from collections.abc import Iterator
from pathlib import Path

import pytest
from clang.cindex import Cursor, CursorKind, Index, TranslationUnit

from beatwise.frontend.headers import HEADER_FLAGS, header_files
from beatwise.frontend.standins import Diagnostic, StandIns, is_invented, stand_in
from beatwise.frontend.uses import kind_of, template_arguments

KERNEL, PRELUDE = "/_bw/given/kernel.cpp", "/_bw/prelude.h"
FLAGS = [
    "-x",
    "c++",
    "-std=c++17",
    "-target",
    "x86_64-unknown-linux-gnu",
    "-ferror-limit=0",
    "-Wno-everything",
    "-Wundef",
]
KEEP_GOING = 0x200
INDEX = Index.create()
KERNELS = sorted((Path(__file__).parent / "headerless").glob("*.cpp"))


def parsed(text: str, prelude: str = "", headers: dict[str, str] | None = None) -> TranslationUnit:
    files = {**header_files(), **(headers or {}), KERNEL: text, PRELUDE: prelude}
    flags = [*FLAGS, *HEADER_FLAGS, "-include", PRELUDE]
    return INDEX.parse(KERNEL, args=flags, unsaved_files=list(files.items()), options=KEEP_GOING)


def diagnostics(unit: TranslationUnit) -> list[Diagnostic]:
    return [
        Diagnostic(one.severity, one.spelling, str(at.file or ""), at.line, at.column, at.offset)
        for one in unit.diagnostics
        for at in [one.location]
    ]


def stood_in(text: str, limit: int = 12) -> StandIns:
    return stand_in(lambda prelude, headers: diagnostics(parsed(text, prelude, headers)), {KERNEL: text}, limit)


def invented(text: str) -> dict[str, str]:
    """What was invented for a text that comes through clean: name -> kind."""
    found = stood_in(text)
    assert [one.text for one in found.left] == []
    return {one.name: one.kind for one in found.inventions if one.kind != "include"}


def cursors(at: Cursor) -> Iterator[Cursor]:
    yield at
    for child in at.get_children():
        yield from cursors(child)


def qualified(cursor: Cursor) -> str:
    above = cursor.semantic_parent
    outer = qualified(above) + "::" if above is not None and above.kind != CursorKind.TRANSLATION_UNIT else ""
    return outer + str(cursor.spelling)


CASES = {
    "a missing header": ('#include "radar/gates.hpp"\nint ray;', {"radar/gates.hpp": "header"}),
    "a type": ("void f(gate_t *g, int n) { for (int i = 0; i < n; i++) g[i] = g[n - i]; }", {"gate_t": "type"}),
    "a type that is computed with": (
        "void f(echo *e) { echo s = 0; s += e[0] * 2; s = s > 3 ? s : 0; e[1] = -s / 4; float x = s; e[(int)s] = x; }",
        {"echo": "type"},
    ),
    "a type with members": (
        "float f(gate *g) { gate h = {1, 2}; h.power = 3; return g->power + h.moments[2].mean(1); }",
        {"gate": "type", "power": "member", "moments": "member", "mean": "member"},
    ),
    "a class template": (
        "template <class T, int N> void g(sweep<T, N> &);\n"
        "void f(sweep<float, 4> s) { s[0] = 1; g<float, 4>(s); g(s); }",
        {"sweep": "type"},
    ),
    "a constant": (
        "void f(int *a) { for (int i = 0; i < RAYS; i++) a[i * GATES] = 0; }",
        {"RAYS": "constant", "GATES": "constant"},
    ),
    "a bound": (
        "static float ring[RAYS][GATES]; void f() { ring[0][1] = 2; }",
        {"RAYS": "constant", "GATES": "constant"},
    ),
    "case labels": (
        "int f(int a) { switch (a) { case RAIN: return 1; case HAIL: return 2; } return 0; }",
        {"RAIN": "constant", "HAIL": "constant"},
    ),
    "an array": ("float f(int i) { return azimuths[i] + table[i][2]; }", {"azimuths": "constant", "table": "constant"}),
    "a constexpr variable of a type": (
        "constexpr gain_t half = 0.5; float f(float *a) { return a[0] * half; }",
        {"gain_t": "type"},
    ),
    "a function": ("float f(float a) { filter(a); return filter(a) * 2; }", {"filter": "function"}),
    "a function template": ("float f(float a) { return blend<float, 3>(a, 2); }", {"blend": "function"}),
    "a namespace": (
        "float f(float a) { return radar::beam::gain(a); }",
        {"radar": "namespace", "beam": "namespace", "gain": "function"},
    ),
    "a namespace that is opened": ("using namespace radar; int x;", {"radar": "namespace"}),
    "a class with static members": (
        "template <class C> int g(); int f() { return g<Site>() + Site::rays; }",
        {"Site": "type", "rays": "member"},
    ),
    "a prefix macro": (
        "KERNEL void f(GLOBAL float *RESTRICT a) { a[0] = 1; }",
        {"KERNEL": "macro", "GLOBAL": "macro", "RESTRICT": "macro"},
    ),
    "a statement macro": (
        "void f(float *a) {\n PIPELINE(1)\n for (int i = 0; i < 4; i++) a[i] = 1;\n}",
        {"PIPELINE": "macro"},
    ),
    "a condition on an undefined macro": ("#if CHANNELS > 2\nint many;\n#endif", {"CHANNELS": "constant"}),
    "a base class": ("struct Ray : public BaseRay { int n; }; int f(Ray *r) { return r->n; }", {"BaseRay": "type"}),
    "methods of a class that is missing": (
        "Scan::Scan(int n) : rays(n) {}\nint Scan::next(const int *in) { return in[rays]; }\n"
        "int f(int *a) { Scan s(3); return s.next(a); }",
        {"Scan": "type", "rays": "member"},
    ),
    "a name from one of our headers": (
        "void f(ap_uint<8> *a, hls::stream<int> &s, uint32_t n) { memcpy(a, a + n, 8); s.write(std::max(1, 2)); }",
        {},
    ),
    "nothing": ("int f(int a) { return a; }", {}),
}


@pytest.mark.parametrize("case", CASES)
def test_what_is_missing_is_stood_in_for_and_told(case: str) -> None:
    text, expected = CASES[case]
    found = invented(text)
    assert {name: kind for name, kind in found.items() if name in expected} == expected
    assert set(found) == set(expected)


@pytest.mark.parametrize("path", KERNELS, ids=lambda path: path.stem)
def test_a_kernel_comes_through_without_its_own_headers(path: Path) -> None:
    text = path.read_text(encoding="utf-8")
    assert any(one.severity >= 3 for one in diagnostics(parsed(text)))
    assert "header" in invented(text).values()


def test_there_are_kernels_without_headers() -> None:
    assert len(KERNELS) >= 10


def test_stand_ins_are_known_by_their_qualified_names() -> None:
    text = "namespace site { int f(gate_t *g) { return g[RAYS] + beam::gain(2); } } int table[GATES];"
    found = stood_in(text)
    used = {
        one.referenced.spelling: qualified(one.referenced)
        for one in cursors(parsed(text, found.prelude, dict(found.headers)).cursor)
        if not one.spelling.startswith("operator")
        and one.location.file
        and one.location.file.name == KERNEL
        and one.referenced
        and one.kind.is_reference() | one.kind.is_expression()
    }
    assert {name for name, whole in used.items() if is_invented(whole)} == {"gate_t", "RAYS", "gain", "GATES"}
    assert not is_invented(used["g"])


def test_a_constant_has_no_value_where_none_is_needed_and_a_marked_one_where_it_is() -> None:
    prelude = stood_in("static int ring[GATES];\nint f(int i) { return i < RAYS; }").prelude
    assert "extern const int RAYS;" in prelude
    assert "constexpr int GATES = " in prelude


def test_a_type_that_must_mix_with_numbers_in_every_way_becomes_a_number_no_source_uses() -> None:
    assert "typedef _BitInt(19) echo;" in stood_in("int f(echo a) { return a > 0 ? a : 1; }").prelude


def test_a_type_in_a_union_becomes_a_number_too() -> None:
    text = "unsigned f(echo e) { union { echo value; unsigned bits; } c; c.value = e; return c.bits; }"
    assert invented(text) == {"echo": "type"}


def test_a_large_array_of_a_stand_in_type_costs_no_time() -> None:
    start = time.perf_counter()
    assert invented("static echo a[1 << 20] = {}, b[1 << 20] = {0};\nvoid f(int i) { a[i] = b[i]; }") == {
        "echo": "type"
    }
    assert time.perf_counter() - start < 3  # some 0.1 on an idle machine; more than 10 if every element is worked out


def test_a_stand_in_is_withdrawn_where_the_source_declares_the_name_later() -> None:
    found = stood_in("int early(int i) { return RAYS * i; }\nstruct RAYS { int n; };\nint f(RAYS r) { return r.n; }")
    assert "RAYS" not in {one.name for one in found.inventions}
    assert "RAYS" not in found.prelude


def test_a_name_whose_declaration_was_lost_to_another_error_is_not_invented() -> None:
    found = stood_in("void f(int *a) { float near[3], far[a ? ; far[0] = 1; }")
    assert "far" not in {one.name for one in found.inventions}
    assert found.left


def test_a_missing_header_with_the_last_name_of_ours_is_ours() -> None:
    found = stood_in('#include "vendor/include/ap_int.h"\nap_uint<8> word;')
    assert (found.left, [one.kind for one in found.inventions]) == ((), ["include"])


def test_what_cannot_be_repaired_is_left_and_the_parses_are_limited() -> None:
    count = 0
    text = "void f( { gate_t g; if } RAYS ;;"

    def parse(prelude: str, headers: dict[str, str]) -> list[Diagnostic]:
        nonlocal count
        count += 1
        return diagnostics(parsed(text, prelude, headers))

    assert stand_in(parse, {KERNEL: text}, limit=4).left
    assert count <= 4


def test_an_invention_has_the_place_that_first_needs_it() -> None:
    (found,) = stood_in("int a;\nint f() { return RAYS; }\nint g() { return RAYS; }").inventions
    assert (found.name, found.file, found.line) == ("RAYS", KERNEL, 2)


def test_a_mere_product_is_no_declaration() -> None:
    assert kind_of("N", "x = ", " * y;") == "constant"
    assert kind_of("T", "; ", " *y;") == "type"
    assert template_arguments("< n; i++) a[i > 3]") is None
