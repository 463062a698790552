"""Programs: several files, their headers, top functions, and what can't be read."""

from __future__ import annotations

import time

import pytest

from beatwise.frontend.program import NoSuchTop, read_program
from beatwise.frontend.show import show
from helpers.lowered import body, lines, program, shown


def tops(text: str, **settings: object) -> list[str]:
    read = program(text, **settings)
    return [read.functions[key].name for key in read.tops]


def test_files_are_linked_by_what_they_define() -> None:
    files = {
        "scan/echo.cpp": """
            #include "../common/load.h"
            #include "gain.h"
            static int twice(int x) { return x + x; }
            extern "C" void echo(word *a) { a[0] = twice(load(a, GAIN)) + gain[1]; }""",
        "scan/load.cpp": """
            #include "../common/load.h"
            static int twice(int x) { return 2 * x; }
            word load(const word *p, int i) { return twice(p[i]); }
            const word gain[2] = {3, 4};""",
    }
    header = """
        #pragma once
        typedef int word;
        word load(const word *p, int i);
        extern const word gain[2];"""
    read = read_program(files, includes={"common/load.h": header, "scan/gain.h": "#define GAIN 5"})
    assert show(read) == lines("""
        global const gain: i32[2] = {3, 4}
        top extern-c echo(a: *i32) -> void
          a[0] = (twice(load(a, 5)) + gain[1])
        twice(x: i32) -> i32
          return x + x
        load(p: *i32, i: i32) -> i32
          return twice(p[i])
        twice(x: i32) -> i32
          return 2 * x""")


def test_nothing_on_disk_is_read(tmp_path: object) -> None:
    secret = f"{tmp_path}/secret.h"
    with open(secret, "w") as file:
        file.write("#define SECRET 42\n")
    text = f"""
        #include "{secret}"
        #define ELSEWHERE "{secret}"
        #include ELSEWHERE
        #include "../../../../../../../../../../../..{secret}"
        #ifdef SECRET
        int leaked(int *a) {{ return a[0]; }}
        #endif
        extern "C" void echo(int *a) {{ a[0] = 1; }}
    """
    read = program(text)
    assert [one.name for one in read.functions.values()] == ["echo"]
    assert {one.what for one in read.inventions} == {"header"}


@pytest.mark.parametrize(
    ("text", "names"),
    [
        (
            'void a(int *p) {\n#pragma HLS interface m_axi port=p\n p[0]=1; } extern "C" void b(int *p) { p[0]=1; }',
            ["a"],
        ),
        ('extern "C" void b(int *p) { p[0]=1; } extern "C" void c(int n) {} void d(int *p) { p[0]=2; }', ["b"]),
        ("void inner(int *p) { p[0]=1; } void outer(int *p) { inner(p); } int main() { outer(0); }", ["outer"]),
        ("void inner(int *p) { p[0]=1; } void outer(int *p) { inner(p); } void none(int n) {}", ["outer"]),
        ("int none(int n) { return n; }", []),
    ],
)
def test_top_functions_are_found(text: str, names: list[str]) -> None:
    assert tops(text) == names


def test_a_named_top_is_all_there_is() -> None:
    text = "void first(int *p) { p[0] = 1; } void second(int *p) { p[1] = 1; }"
    assert tops(text, top="second") == ["second"]
    assert "first" not in shown(text, top="second")
    with pytest.raises(NoSuchTop, match="no function 'third'; the functions with a body are: first, second"):
        program(text, top="third")


def test_a_syntax_error_is_told_with_its_line() -> None:
    read = program('extern "C" void echo(int *a) {\n  for (int i = 0; i < 4; i++ { a[i] = 1; }\n  a[9] = 2;\n}\n')
    assert [(one.file, one.line) for one in read.problems] == [("echo.cpp", 2)]


def test_an_empty_file_is_an_empty_program() -> None:
    assert shown("") == ""


def test_a_missing_header_is_stood_in_for_and_told() -> None:
    text = """
        #include "gates.h"
        extern "C" void echo(gate_t *in, int *a) {
          for (int i = 0; i < RANGE_GATES; i++) a[i] = scaled(in[i].level);
        }
    """
    read = program(text)
    assert {(one.what, one.name) for one in read.inventions} >= {
        ("header", "gates.h"),
        ("type", "gate_t"),
        ("constant", "RANGE_GATES"),
    }
    assert "loop i < ? step i++" in body(text)  # the stand-in's value is nobody's
    assert "in[i].level" in body(text)


def test_a_constant_made_from_an_invented_one_is_not_known_either() -> None:
    text = """
        #include "gates.h"
        const int HALF = RANGE_GATES / 2;
        extern "C" void echo(int *a) { int line[RANGE_GATES]; for (int i = 0; i < HALF; i++) a[i] = line[i]; }
    """
    assert "loop i < 64" not in body(text) and "loop i < 32" not in body(text)


def test_two_thousand_lines_take_less_than_a_second_or_two() -> None:
    stage = """
        static void stage%d(const float *in, float *out, int n) {
          float line[64];
          for (int i = 0; i < 64; i++) {
            line[i] = in[i * 64] * %d.0f + in[i + 1];
          }
          for (int i = 0; i < n; i++) {
            if (line[i %% 64] > 0.5f) {
              out[i * 2 + %d] = line[(i + %d) %% 64];
            } else {
              out[i] = 0;
            }
          }
        }
    """
    calls = "".join(f"stage{k}(a, b, n);\n" for k in range(150))
    text = (
        "".join(stage % (k, k, k, k) for k in range(150))
        + f'extern "C" void echo(float *a, float *b, int n) {{\n{calls}}}\n'
    )
    assert text.count("\n") > 2000
    start = time.perf_counter()
    read = program(text)
    assert len(read.functions) == 151
    assert time.perf_counter() - start < 5  # about 0.3 s on an idle machine; the bound is for loaded ones


def test_a_copy_of_a_header_that_we_declare_ourselves_is_passed_over() -> None:
    files = {"echo.cpp": '#include "ap_int.h"\nextern "C" void echo(ap_uint<24> *a) { a[0] = a[1]; }'}
    read = read_program(files, includes={"ap_int.h": "template <int W> struct ap_uint { char bytes[99]; };"})
    assert show(read) == "top extern-c echo(a: *u24) -> void\n  a[0] = a[1]"


def test_an_external_variable_told_within_a_function_is_the_global() -> None:
    text = 'extern "C" void echo(int *a) { extern int pitch; a[pitch] = 0; }\nint pitch = 7;'
    assert shown(text) == lines("""
        global pitch: i32 = 7
        top extern-c echo(a: *i32) -> void
          a[pitch] = 0""")


def test_what_an_error_made_vanish_is_told_with_its_place() -> None:
    text = """
        struct gate { int range; };
        extern "C" void echo(int *a, gate *g) {
          a[0] = 1;
          a[1] = g->nothing_like_it(3) = ;
          a[2] = 3;
        }
    """
    read = shown(text)
    assert "lost at echo.cpp:4:" in read
    assert "a[0] = 1" in read and "a[2] = 3" in read


def test_a_template_parameter_of_a_class_is_known_in_its_methods() -> None:
    text = """
        template <int N> struct lane {
          void go(int *a) {
            for (int i = 0; i < N; i++) {
        #pragma HLS unroll factor=N/2
              a[i] = 0;
            }
          }
        };
        extern "C" void echo(int *a) { lane<8> one; one.go(a); }
    """
    assert "  loop i < 8 step i++ @unroll(factor=4)" in shown(text)


def test_a_function_that_an_error_made_vanish_is_told() -> None:
    text = """
        namespace scan {
        int gate;
        void gate::load(int *p) { p[0] = 1; }
        void kept(int *p) { p[1] = 1; }
        }
        extern "C" void echo(int *a) { scan::kept(a); }
    """
    read = program(text)
    assert [one.name for one in read.functions.values()] == ["echo", "kept"]
    assert [(one.line, one.what) for one in read.problems] == [
        (3, "the compiler could not read the definition that stands here")
    ]
