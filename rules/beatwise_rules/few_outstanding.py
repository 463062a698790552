"""The bursts are good, but too few of them may be under way to cover the memory's latency.

A port asks, and the answer comes a few hundred nanoseconds later. To keep the memory busy meanwhile, as many bytes must
be under way as it delivers in that time: rate x latency (Little's law). A port that may have N transactions of L beats
under way never gets more than N x L x width a latency, however long the walk is.

It matters where a directive sets the number of outstanding transactions low, or the longest burst, on a board whose
memory is far away. It does not where the port is narrow: little is then under way at full speed anyway.

What to change: raise the number of outstanding transactions of the port, or its longest burst. Both cost the same:
room on chip for all beats under way.

Slow::

    #include <ap_int.h>

    // One request at a time, to save block RAM.
    void load_sweep(const ap_uint<512> *sweep, ap_uint<512> *out) {
    #pragma HLS INTERFACE mode=m_axi port=sweep bundle=sweep num_read_outstanding=1
    #pragma HLS INTERFACE mode=m_axi port=out bundle=out
        for (int i = 0; i < 65536; ++i) out[i] = sweep[i];
    }

Fast::

    #include <ap_int.h>

    // Eight requests cover the latency.
    void load_sweep(const ap_uint<512> *sweep, ap_uint<512> *out) {
    #pragma HLS INTERFACE mode=m_axi port=sweep bundle=sweep num_read_outstanding=8
    #pragma HLS INTERFACE mode=m_axi port=out bundle=out
        for (int i = 0; i < 65536; ++i) out[i] = sweep[i];
    }

Sources: J. Little, "A Proof for the Queuing Formula: L = lambda W", Oper. Res. 9(3), 1961; latencies: the board's
profile.
"""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import replace
from math import ceil

from beatwise.model.finding import Facts, Finding
from beatwise.model.traffic import PortBuffer, Traffic
from beatwise_rules.advice import SHORT_BEATS
from beatwise_rules.evidence import buffer_of, request_ns, trouble
from beatwise_rules.sites import sites
from beatwise_rules.wording import PASSIVE, count, gbps, quoted, size

LEAST_GAIN = 1.02  #: of the rate; less is not worth a directive
CURES: frozenset[str] = frozenset()


def find(facts: Facts) -> Iterator[Finding]:
    """One finding for each place and argument whose bursts wait for each other."""
    for site in sites(facts, lambda traffic: _needed(facts, traffic) is not None):
        buffer = _needed(facts, site[0])
        if buffer is not None:
            gain = buffer.enough_gbps / buffer.gbps
            better = [replace(each, could_gbps=min(each.could_gbps, each.now_gbps * gain)) for each in site]
            yield _told(facts, better, buffer)


def _needed(facts: Facts, traffic: Traffic) -> PortBuffer | None:
    """The port's buffer, where more transactions under way would make the access faster, and nothing else need be."""
    if traffic.limit not in ("requests", "gaps") or traffic.blocked or traffic.walk.pattern != "sequential":
        return None
    buffer = buffer_of(facts, traffic)
    if buffer is None or traffic.burst_beats < min(SHORT_BEATS, buffer.burst_beats):
        return None
    if buffer.outstanding >= buffer.enough or buffer.enough_gbps < LEAST_GAIN * buffer.gbps:
        return None
    return buffer


def _told(facts: Facts, site: list[Traffic], buffer: PortBuffer) -> Finding:
    worst, access = site[0], site[0].access
    burst_bytes, wait_ns = worst.burst_beats * worst.width_bits // 8, request_ns(facts, worst)
    many = count(buffer.outstanding, "transaction")
    option = f"num_{access.direction}_outstanding={buffer.enough}"
    return trouble(
        "few-outstanding",
        facts,
        site,
        message=f"{quoted(access.argument)} {PASSIVE[access.direction]} in good bursts, but port "
        f"{quoted(access.interface)} has only {many} under way.",
        because=(
            f"{gbps(buffer.enough_gbps)} x {wait_ns:.0f} ns = {size(round(buffer.enough_gbps * wait_ns))} must be "
            f"under way (Little's law): {count(ceil(buffer.enough_gbps * wait_ns / burst_bytes), 'burst')} of "
            f"{size(burst_bytes)}.",
        ),
        instead=f"Give the port `{option}`: with bursts of {count(buffer.used_beats, 'beat')} that takes "
        f"{size(buffer.enough * buffer.used_beats * buffer.width_bits // 8)} on chip "
        f"({count(buffer.enough_blocks, 'block')} of 36 Kb).",
        cure=f"with {buffer.enough} under way it",
    )
