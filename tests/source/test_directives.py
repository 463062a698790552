"""Directives: what is read from a pragma and from an external script."""

from __future__ import annotations

import time
from textwrap import dedent

import pytest

from beatwise.model.kernel import Directive
from beatwise.model.place import Place
from beatwise.source import parse_directive, pragmas_in, read_script

HERE = Place("echo.cpp", 3, 1, 3, 40, 17)


def show(directive: Directive) -> str:
    options = (key if value == "" else f"{key}=<{value}>" for key, value in directive.options.items())
    return " ".join((directive.kind, *options))


def show_all(directives: tuple[Directive, ...]) -> list[str]:
    return [f"{each.place.line}:{each.place.column} {show(each)}" for each in directives]


def pragmas(text: str) -> list[str]:
    return show_all(pragmas_in(dedent(text).lstrip("\n"), "echo.cpp"))


def script(text: str) -> list[str]:
    return show_all(read_script(dedent(text).lstrip("\n"), "radar.tcl"))


@pytest.mark.parametrize(
    ("written", "read"),
    [
        (
            "HLS INTERFACE mode=m_axi port=gates offset=slave bundle=g0 depth=N",
            "interface mode=<m_axi> port=<gates> offset=<slave> bundle=<g0> depth=<N>",
        ),
        ("HLS interface m_axi port=gates", "interface m_axi port=<gates> mode=<m_axi>"),
        ("hls Interface M_AXI PORT=Gates", "interface m_axi port=<Gates> mode=<m_axi>"),
        ("HLS INTERFACE MODE = M_AXI port =gates bundle= g0", "interface mode=<m_axi> port=<gates> bundle=<g0>"),
        (
            'HLS interface m_axi port=gates bundle="g 0" depth=4',
            "interface m_axi port=<gates> bundle=<g 0> depth=<4> mode=<m_axi>",
        ),
        ("HLS interface m_axi port=a, bundle=g0", "interface m_axi port=<a> bundle=<g0> mode=<m_axi>"),
        ("HLS interface register s_axilite port=n", "interface register s_axilite port=<n> mode=<s_axilite>"),
        ("  HLS\tpipeline  II=1\trewind ", "pipeline ii=<1> rewind"),
        ("HLS pipeline off", "pipeline off"),
        ("HLS dataflow", "dataflow"),
        ("HLS unroll factor=-1 skip_exit_check", "unroll factor=<-1> skip_exit_check"),
        ("HLS loop_tripcount min=1 max=(N + 1) * 2 avg = N/2", "loop_tripcount min=<1> max=<(N + 1) * 2> avg=<N/2>"),
        ("HLS unroll factor=least(A, B) region", "unroll factor=<least(A, B)> region"),
        ("HLS unroll factor=Sizes<4, 2>::lanes region", "unroll factor=<Sizes<4, 2>::lanes> region"),
        (
            "HLS array_partition variable=a, b cyclic factor=4 dim=1",
            "array_partition variable=<a, b> cyclic factor=<4> dim=<1> type=<cyclic>",
        ),
        ("HLS array_partition variable=a,b type=complete", "array_partition variable=<a,b> type=<complete>"),
        ("HLS dependence variable=sums inter false", "dependence variable=<sums> inter false type=<inter>"),
        ("HLS stream variable=fifo[2] depth=64 // deep", "stream variable=<fifo[2]> depth=<64>"),
        ("HLS stream /* the \n long one */ variable=fifo", "stream variable=<fifo>"),
        ("HLS stream \\\n variable=fifo \\\r\n depth=2", "stream variable=<fifo> depth=<2>"),
        ("HLS unroll factor=", "unroll factor"),
        ("HLS unroll 4 ) =", "unroll"),
    ],
)
def test_a_directive_is_its_kind_and_its_options(written: str, read: str) -> None:
    directive = parse_directive(written, HERE)
    assert directive is not None
    assert (show(directive), directive.place) == (read, HERE)


@pytest.mark.parametrize("written", ["once", "omp parallel for", "HLS", "", "HLSX pipeline", "pack(1)"])
def test_other_pragmas_are_no_directives(written: str) -> None:
    assert parse_directive(written, HERE) is None


def test_a_number_is_known_only_where_it_is_written_as_one() -> None:
    directive = parse_directive("HLS interface m_axi depth=0x40 latency=N", HERE)
    assert directive is not None
    assert [directive.number(option) for option in ("depth", "latency", "offset")] == [64, None, None]


def test_pragmas_are_found_with_their_places() -> None:
    assert pragmas("""
        #pragma once
        void echo(int *gates) {
        #pragma HLS INTERFACE m_axi port=gates
            for (int i = 0; i < 4; ++i) {
              #  pragma hls PIPELINE II=1   // every cycle
                gates[i] = 0;
            }
        }
        """) == ["3:1 interface m_axi port=<gates> mode=<m_axi>", "5:7 pipeline ii=<1>"]  # fmt: skip


NASTY = r"""
// #pragma HLS pipeline
/* #pragma HLS pipeline
#pragma HLS pipeline
*/
// a comment that goes on \
#pragma HLS pipeline
const char *plain = "\
#pragma HLS pipeline";
const char *raw = R"radar(
#pragma HLS pipeline
)" )radar"; const char *wide = LR"(
#pragma HLS pipeline
)";
#define PIPELINED \
#pragma HLS pipeline
int count = 1'000'000; char quote = '"', prefixed = u8'\''; int hex = 0xA'B;
int a; #pragma HLS pipeline
  /* here */ #pragma HLS UNROLL \
    factor = 4 \
    region
#pragma HLS stream variable=s /* goes
on */ depth=2
auto R = 1; auto text = FOOR"(x"; /* "a" */
#pragma HLS dataflow
#error don't
#pragma HLS inline
"""


@pytest.mark.parametrize("line_end", ["\n", "\r\n", "\r"])
def test_comments_strings_and_macros_hold_no_pragmas(line_end: str) -> None:
    assert show_all(pragmas_in(NASTY.replace("\n", line_end), "echo.cpp")) == [
        "19:14 unroll factor=<4> region",
        "22:1 stream variable=<s> depth=<2>",
        "25:1 dataflow",
        "27:1 inline",
    ]


def test_offsets_are_bytes_and_columns_are_characters() -> None:
    text = "// Küste 🌊\r\n/* é */ #pragma HLS inline\r\n"
    (directive,) = pragmas_in(text, "echo.cpp")
    place = directive.place
    assert (place.line, place.column, place.end_line, place.end_column) == (2, 9, 2, 27)
    assert text.encode()[place.offset :].startswith(b"#pragma")


@pytest.mark.parametrize(
    "ending", ["/*", '"', 'R"x(', "'", "\\", "//", "#", "#pragma HLS unroll factor=(", "#pragma HLS a /*"]
)
def test_a_text_may_end_anywhere(ending: str) -> None:
    assert pragmas_in(f"#pragma HLS inline\n{ending}", "echo.cpp")[0].kind == "inline"


HOSTILE = ["/*", '"', "'", 'R"(', 'R"x', "#", "# ", "#\n", "/**/", "\\\n", "\\ ", " ", "(", "a=", ",", "é", "*"]


@pytest.mark.parametrize("piece", [*HOSTILE, "#pragma HLS x y=( /*\n"])
def test_reading_takes_linear_time(piece: str) -> None:
    started = time.process_time()
    pragmas_in(piece * (400_000 // len(piece)), "echo.cpp")
    pragmas_in("#pragma HLS unroll " + piece * (400_000 // len(piece)) + "!", "echo.cpp")
    assert time.process_time() - started < 5  # quadratic would take minutes


def test_a_script_says_which_function_loop_and_port_it_means() -> None:
    assert script("""
        open_project radar
        # set_directive_pipeline nothing
        set_directive_interface -mode m_axi -bundle g0 sweep gates
        set_directive_interface sweep sums -mode M_AXI -depth 1024
        set_directive_pipeline -II 2 "sweep/ROWS"
        set_directive_pipeline -off sweep/OUTER/INNER
        set_directive_array_partition -type cyclic -factor 4 -dim 1 sweep {row}
        set_directive_dataflow sweep
        set_directive_top -name sweep_top sweep
        """) == [
        "3:1 interface mode=<m_axi> bundle=<g0> function=<sweep> port=<gates>",
        "4:1 interface mode=<m_axi> depth=<1024> function=<sweep> port=<sums>",
        "5:1 pipeline ii=<2> function=<sweep> label=<ROWS>",
        "6:1 pipeline off function=<sweep> label=<INNER>",
        "7:1 array_partition type=<cyclic> factor=<4> dim=<1> function=<sweep> variable=<row>",
        "8:1 dataflow function=<sweep>",
        "9:1 top name=<sweep_top> function=<sweep>",
    ]  # fmt: skip


def test_script_variables_are_put_in_and_lists_gone_through() -> None:
    assert script("""
        set n 4; set ports {gates sums}
        set_directive_unroll -factor $n sweep/A; set_directive_unroll -factor ${n} "sweep/$unknown"
        foreach port $ports {
            foreach depth {1} { set_directive_interface -mode m_axi -bundle g_$port -depth $depth sweep $port }
        }
        set_directive_unroll -factor {$n} sweep/B
        """) == [
        "2:1 unroll factor=<4> function=<sweep> label=<A>",
        "2:42 unroll factor=<4> function=<sweep> label=<$unknown>",
        "4:25 interface mode=<m_axi> bundle=<g_gates> depth=<1> function=<sweep> port=<gates>",
        "4:25 interface mode=<m_axi> bundle=<g_sums> depth=<1> function=<sweep> port=<sums>",
        "6:1 unroll factor=<$n> function=<sweep> label=<B>",
    ]  # fmt: skip


@pytest.mark.parametrize("line_end", ["\n", "\r\n"])
def test_a_command_goes_on_after_a_backslash(line_end: str) -> None:
    text = line_end.join(
        (r"set_directive_interface -mode m_axi \ ".rstrip(), "    -max_read_burst_length 64 sweep gates", "")
    )
    assert show_all(read_script(text, "radar.tcl")) == [
        "1:1 interface mode=<m_axi> max_read_burst_length=<64> function=<sweep> port=<gates>"
    ]


def test_options_without_a_value_leave_the_next_word_alone() -> None:
    assert script("""
        set_directive_inline -off mix
        set_directive_inline -off=true mix
        set_directive_unroll -skip_exit_check true sweep/A
        set_directive_interface -register -mode s_axilite sweep n
        set_directive_interface -depth -1 sweep gates
        """) == [
        "1:1 inline off function=<mix>",
        "2:1 inline off=<true> function=<mix>",
        "3:1 unroll skip_exit_check=<true> function=<sweep> label=<A>",
        "4:1 interface register mode=<s_axilite> function=<sweep> port=<n>",
        "5:1 interface depth=<-1> function=<sweep> port=<gates>",
    ]  # fmt: skip


def test_the_configuration_of_interfaces_is_told_and_other_commands_are_not() -> None:
    assert script("""
        config_interface -m_axi_max_widen_bitwidth 512 -m_axi_addr64 -m_axi_latency=32
        config_compile -pipeline_loops 64
        csynth_design
        """) == ["1:1 config_interface m_axi_max_widen_bitwidth=<512> m_axi_addr64 m_axi_latency=<32>"]  # fmt: skip


@pytest.mark.parametrize(
    "text",
    [
        "[" * 300_000,
        "{" * 300_000,
        '"a' * 150_000,
        "set a xx\n" + "set a $a$a\n" * 60 + "set_directive_inline $a",
        "foreach x {" + "1 " * 900 + "} {" + "foreach x {" + "1 " * 900 + "} {" * 15 + "set b $x" + "}" * 16,
        "foreach x {a} {" * 200 + "set_directive_inline f" + "}" * 200,
    ],
    ids=["brackets", "braces", "quotes", "growth", "repetition", "depth"],
)
def test_a_hostile_script_ends_soon(text: str) -> None:
    started = time.process_time()
    read_script(text, "radar.tcl")
    assert time.process_time() - started < 10
