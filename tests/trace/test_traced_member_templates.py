"""Method templates that are told their arguments."""

from __future__ import annotations

import pytest

from beatwise.traffic.runs import walk
from helpers.traced import traced


@pytest.mark.parametrize("call", ["put<4>(from)", "this->put<4>(from)", "self.template put<4>(from)"])
def test_the_object_of_a_method_template_is_found(call: str) -> None:
    trace = traced(f"""
        struct Mover {{
            int *to;
            template <int F> void put(int row) {{
                for (int c = 0; c < 64; c += F)
                    for (int w = 0; w < F; ++w) to[row * 64 + c + w] = 1;
            }}
            void go(int from) {{ Mover &self = *this; {call}; }}
        }};
        extern "C" void sweep(int *to) {{
            Mover mover{{to}};
            for (int row = 0; row < 8; ++row) mover.go(row);
        }}
    """)
    (access,) = trace.accesses
    found = walk(access, {})
    assert (access.direction, found.pattern, found.run_elements) == ("write", "sequential", 512)
