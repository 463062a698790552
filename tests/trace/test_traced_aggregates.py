"""Records that a directive packs."""

from __future__ import annotations

import pytest

from beatwise.traffic.runs import walk
from helpers.traced import traced


@pytest.mark.parametrize(
    ("directive", "size"),
    [
        ("", 12),
        ("#pragma HLS AGGREGATE variable=cells", 6),
        ("#pragma HLS aggregate variable=cells compact=byte", 7),
        ("#pragma HLS AGGREGATE variable=cells compact=none", 12),
    ],
)
def test_an_aggregated_record_has_no_padding(directive: str, size: int) -> None:
    """8 + 32 + 3 + 3 bits: 12 bytes as C++ lays them out, 46 bits side by side, 1 + 4 + 1 + 1 bytes in whole fields."""
    found = traced(f"""
        #include <ap_int.h>
        struct Cell {{ unsigned char kind; int value; ap_uint<3> flags, mode; }};
        extern "C" void sweep(const Cell *cells, int *out) {{
        #pragma HLS INTERFACE m_axi port=cells bundle=a
        #pragma HLS INTERFACE m_axi port=out bundle=b
        {directive}
            for (int i = 0; i < 100; ++i) out[i] = cells[i].value;
        }}
    """)
    (access,) = (access for access in found.accesses if access.argument == "cells")
    seen = walk(access, {})
    assert (access.element_bytes, seen.stride_bytes) == (size, size)
    assert (seen.pattern, seen.run_elements) == ("sequential", 100)
