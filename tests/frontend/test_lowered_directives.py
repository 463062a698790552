"""Directives reach the function, loop or variable they belong to, with numbers where names stand for them."""

from __future__ import annotations

from beatwise.source.directives import read_script
from helpers.lowered import lines, shown


def test_a_directive_belongs_to_the_smallest_block_around_it() -> None:
    text = """
        extern "C" void echo(int *a, int n) {
        #pragma HLS interface m_axi port=a bundle=g0
          int t[4];
        #pragma HLS array_partition variable=t complete
          for (int i = 0; i < n; i++) {
        #pragma HLS pipeline II=2
            if (a[i]) {
        #pragma HLS latency min=1
              a[i] = 0;
            }
          }
        }
    """
    assert shown(text) == lines("""
        top extern-c echo(a: *i32 @interface(m_axi port=a bundle=g0 mode=m_axi), n: i32) -> void\
 @interface(m_axi port=a bundle=g0 mode=m_axi) @array_partition(variable=t complete type=complete)
          let t: i32[4] @array_partition(variable=t complete type=complete)
          let i: i32 = 0
          loop i < n step i++ @pipeline(ii=2)
            if <u1>a[i]
              a[i] = 0""")


def test_a_loop_without_braces_takes_what_stands_at_it() -> None:
    text = """
        extern "C" void echo(int *a) {
          for (int i = 0; i < 4; i++)
        #pragma HLS unroll factor=2
            a[i] = 0;
        #pragma HLS pipeline off
          for (int i = 0; i < 4; i++) a[i] = 1;
        #pragma HLS dataflow
        }
    """
    assert shown(text) == lines("""
        top extern-c echo(a: *i32) -> void @dataflow()
          let i: i32 = 0
          loop i < 4 step i++ @unroll(factor=2)
            a[i] = 0
          let i: i32 = 0
          loop i < 4 step i++ @pipeline(off)
            a[i] = 1""")


def test_names_in_options_become_their_numbers() -> None:
    text = """
        #define WORDS (1 << LOG)
        #define LOG 10
        const int LANES = 16;
        enum { DEEP = 3 };
        template <int F> void part(int *a) {
          for (int i = 0; i < 64; i++) {
        #pragma HLS unroll factor=F*LANES
        #pragma HLS pipeline II = DEEP
            a[i] = 0;
          }
        }
        extern "C" void echo(int *a, int *WORDS_) {
          const int half = LANES / 2;
        #pragma HLS interface m_axi port=a depth=WORDS bundle=LANES max_read_burst_length=half
          part<2>(a);
        }
    """
    read = shown(text)
    assert "@interface(m_axi port=a depth=1024 bundle=LANES max_read_burst_length=8 mode=m_axi)" in read
    assert "@unroll(factor=32) @pipeline(ii=3)" in read


def test_pragmas_made_by_macros_reach_the_same_owners() -> None:
    text = """
        #define TEXT(x) #x
        #define HLS(x) _Pragma(TEXT(HLS x))
        #define LOOP(i, n) for (int i = 0; i < n; ++i)
        void echo(int *a, int n) {
          HLS(interface m_axi port=a)
          walk: LOOP(i, n) { HLS(pipeline II=3) a[i] = 0; }
          _Pragma("HLS dataflow")
        }
        void other(int *a) { a[0] = 1; }
    """
    assert shown(text) == lines("""
        top echo(a: *i32 @interface(m_axi port=a mode=m_axi), n: i32) -> void\
 @interface(m_axi port=a mode=m_axi) @dataflow()
          let i: i32 = 0
          walk: loop i < n step ++i @pipeline(ii=3)
            a[i] = 0""")


def test_what_the_preprocessor_leaves_out_holds_no_directives() -> None:
    text = """
        extern "C" void echo(int *a) {
        #ifdef WIDE
        #pragma HLS interface m_axi port=a bundle=wide
        #else
        #pragma HLS interface m_axi port=a bundle=narrow
        #endif
          a[0] = 1;
        }
    """
    assert "bundle=narrow" in shown(text) and "bundle=wide" not in shown(text)
    assert "bundle=wide" in shown(text, defines=["WIDE"]) and "bundle=narrow" not in shown(text, defines=["WIDE"])


def test_a_script_sets_functions_loops_and_variables() -> None:
    script = read_script(
        "set_directive_interface -mode m_axi -bundle g0 echo a\n"
        "set_directive_pipeline -II 2 echo/walk\n"
        "set_directive_array_partition -type complete echo t\n",
        "echo.tcl",
    )
    text = """
        void other(int *a) { a[0] = 1; }
        void echo(int *a, int n) { int t[4]; walk: for (int i = 0; i < n; i++) a[i] = t[i]; }
    """
    read = shown(text, script=script).splitlines()
    assert read[0].startswith("top echo(a: *i32 @interface(mode=m_axi bundle=g0 function=echo port=a)")
    assert read[1] == "  let t: i32[4] @array_partition(type=complete function=echo variable=t)"
    assert read[3] == "  walk: loop i < n step i++ @pipeline(ii=2 function=echo label=walk)"
    assert not any("other" in line for line in read)


def test_directives_of_a_lambda_or_a_local_class_are_its_own() -> None:
    text = """
        extern "C" void echo(int *a) {
          auto put = [&](int i) {
        #pragma HLS inline
            a[i] = 0; };
          struct local { void go(int *p) {
        #pragma HLS inline off
            p[0] = 1; } } one;
          put(1);
          one.go(a);
        }
    """
    heads = [line for line in shown(text).splitlines() if not line.startswith(" ")]
    assert heads == [
        "top extern-c echo(a: *i32) -> void",
        "operator()(i: i32) -> void @inline()",
        "go(p: *i32) -> void @inline(off)",
    ]


def test_an_interface_that_the_preprocessor_leaves_out_makes_no_top() -> None:
    text = """
        void first(int *a) {
        #if 0
        #pragma HLS interface m_axi port=a
        #endif
          a[0] = 1;
        }
        extern "C" void second(int *a) { a[0] = 2; }
    """
    assert [line.split("(")[0] for line in shown(text).splitlines() if line.startswith("top")] == [
        "top extern-c second"
    ]
