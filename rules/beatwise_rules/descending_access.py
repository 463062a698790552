"""The addresses run downwards.

A burst counts up: its first address is its lowest. A loop that walks an array from its end visits neighbours all
the way, but each step lies before the one it follows, so no two of them join.

It matters for reversals, for filters that run backwards in time, and for loops that count down from habit. Walking an
on-chip array downwards does no harm.

What to change: turn the loop round where the order does not matter. Where it does, read ascending blocks on chip and
walk the copy downwards.

Slow::

    // Plays a sweep backwards.
    void reverse_sweep(const float *sweep, float *reversed) {
    #pragma HLS INTERFACE mode=m_axi port=sweep bundle=sweep
    #pragma HLS INTERFACE mode=m_axi port=reversed bundle=reversed
        for (int i = 0; i < 65536; ++i) reversed[i] = sweep[65535 - i];
    }

Fast::

    // Blocks are read upwards and turned round on chip.
    void reverse_sweep(const float *sweep, float *reversed) {
    #pragma HLS INTERFACE mode=m_axi port=sweep bundle=sweep
    #pragma HLS INTERFACE mode=m_axi port=reversed bundle=reversed
        float block[1024];
        for (int b = 0; b < 64; ++b) {
            for (int i = 0; i < 1024; ++i) block[i] = sweep[(63 - b) * 1024 + i];
            for (int i = 0; i < 1024; ++i) reversed[b * 1024 + i] = block[1023 - i];
        }
    }

Sources: the addresses of an incrementing burst increase (AXI4: ARM IHI 0022, section A3.4.1).
"""

from __future__ import annotations

from collections.abc import Iterator

from beatwise.model.finding import Facts, Finding
from beatwise_rules.advice import a_buffer, burst_bytes, burst_elements
from beatwise_rules.evidence import trouble
from beatwise_rules.sites import moving_loop, sites
from beatwise_rules.wording import PASSIVE, quoted, size, the_loop

CURES = frozenset({"short-run"})


def find(facts: Facts) -> Iterator[Finding]:
    """One finding for each place and argument that is walked downwards."""
    for site in sites(facts, lambda traffic: traffic.walk.pattern == "descending"):
        worst, access, reads = site[0], site[0].access, site[0].access.direction == "read"
        loop, name, done = the_loop(moving_loop(access)), quoted(access.argument), PASSIVE[access.direction]
        block = a_buffer(burst_elements(facts, worst), access.element_bytes)
        how = "read upwards and turned round on chip" if reads else "turned round on chip and written upwards"
        yield trouble(
            "descending-access",
            facts,
            site,
            message=f"{name} {done} from high addresses to low ones, against the direction of a burst.",
            because=(
                f"Each iteration of {loop} lies {size(access.element_bytes)} before the last: one element per request.",
                f"Upwards, a burst of this port holds {size(burst_bytes(facts, worst))}.",
            ),
            instead=f"Let {loop} count upwards. Where the order matters, use blocks of {block}, {how}.",
        )
