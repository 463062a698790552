"""Where an access is: its line, the calls that lead there, its order; and which port it goes through."""

from __future__ import annotations

import pytest

from beatwise.model.access import Interface
from helpers.lowered import lines
from helpers.traced import kernel, traced

TWICE = """
static void put(int *to, int at) {
    to[at] = 1;
}
static void both(int *to) {
    put(to, 0);
    put(to, 1);
}
"""


def test_a_site_is_kept_apart_by_the_calls_that_lead_to_it() -> None:
    found = traced(kernel("both(a);\nboth(b);", before=TWICE))
    assert [(a.argument, a.place.line, [call.line for call in a.chain]) for a in found.accesses] == [
        ("a", 2, [10, 5]),
        ("a", 2, [10, 6]),
        ("b", 2, [11, 5]),
        ("b", 2, [11, 6]),
    ]
    assert {a.function for a in found.accesses} == {"put"}


def test_accesses_come_in_the_order_in_which_they_run() -> None:
    found = traced(kernel("out[0] = in[table[1]];\na[0] += b[0];"))
    assert [access.argument for access in found.accesses] == ["table", "in", "out", "b", "a", "a"]
    assert [access.order for access in found.accesses] == sorted(access.order for access in found.accesses)


def ports(pragmas: str, parameters: str = "int n, const int *in, int *out") -> str:
    found = traced(kernel(pragmas + "\nout[0] = n;", parameters=parameters))
    return "\n".join(map(show_port, found.interfaces))


def show_port(port: Interface) -> str:
    options = {
        "read burst": port.read_burst,
        "write burst": port.write_burst,
        "reads": port.read_outstanding,
        "writes": port.write_outstanding,
        "latency": port.latency_cycles,
        "widen": port.widen_bits,
    }
    words = [f"{name}: {' '.join(f'{a} {port.element_bytes[a]} B' for a in port.arguments)}" for name in (port.name,)]
    words += ["declared" if port.declared else "not declared"]
    return "  ".join([*words, *(f"{name} {value}" for name, value in options.items() if value is not None)])


def test_arguments_of_one_bundle_share_a_port() -> None:
    found = ports("""
        #pragma HLS INTERFACE m_axi port=in bundle=g0 max_read_burst_length=64 num_read_outstanding=8 latency=30
        #pragma HLS INTERFACE mode=m_axi port=out bundle=g0 max_write_burst_length=32 max_widen_bitwidth=256
        #pragma HLS INTERFACE s_axilite port=n
    """)
    assert found == lines("""
        g0: in 4 B out 4 B  declared  read burst 64  write burst 32  reads 8  latency 30  widen 256
    """)


def test_a_pointer_without_a_directive_is_a_port_of_its_own() -> None:
    assert ports("") == lines("""
        in: in 4 B  not declared
        out: out 4 B  not declared
    """)


@pytest.mark.parametrize("mode", ["ap_memory", "bram", "axis"])
def test_an_argument_in_another_mode_is_no_port(mode: str) -> None:
    assert ports(f"#pragma HLS INTERFACE {mode} port=in") == "out: out 4 B  not declared"


def test_a_port_moves_what_its_arguments_point_to() -> None:
    wide = "const ap_uint<512> *in, hls::vector<float, 8> *out, int n, hls::stream<int> &s, double matrix[4][4]"
    found = traced(
        kernel(
            "matrix[0][0] = n;",
            before="#include <ap_int.h>\n#include <hls_vector.h>\n#include <hls_stream.h>",
            parameters=wide,
        )
    )
    assert [show_port(port) for port in found.interfaces] == [
        "in: in 64 B  not declared",
        "out: out 32 B  not declared",
        "matrix: matrix 8 B  not declared",
    ]


def test_a_depth_says_how_large_the_memory_is() -> None:
    found = traced(kernel("#pragma HLS INTERFACE m_axi port=out depth=64\nout[0] = in[0];"))
    assert [(access.argument, access.array_bytes) for access in found.accesses] == [("in", None), ("out", 256)]
