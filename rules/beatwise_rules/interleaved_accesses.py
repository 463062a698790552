"""Two or more accesses of one direction take turns on one port, and each breaks the other's run.

A port has one request path for reads and one for writes. Where an iteration loads from here, then from there, the
addresses that the port sees jump with every element although each access alone walks in order. A tool makes bursts
of at most one array per port and direction at a time; the others go out element by element.

It matters for sums of two arrays behind one port, for two halves of one array, and for stencils over several rows.
Loads that join into one stream (`a[3 * i]`, `a[3 * i + 1]`, `a[3 * i + 2]`) do no harm, nor does one load beside one
store.

What to change: give the arguments bundles of their own, or load a stretch of one, then a stretch of the other, into
buffers on chip. Rows of a stencil belong in line buffers: each element is then read once.

Slow::

    // Mean of two sweeps that lie behind each other in one memory.
    void mean(const float *sweeps, float *out) {
    #pragma HLS INTERFACE mode=m_axi port=sweeps bundle=sweeps
    #pragma HLS INTERFACE mode=m_axi port=out bundle=out
        for (int i = 0; i < 65536; ++i) out[i] = 0.5f * (sweeps[i] + sweeps[i + 65536]);
    }

Fast::

    // A stretch of each sweep in turn.
    void mean(const float *sweeps, float *out) {
    #pragma HLS INTERFACE mode=m_axi port=sweeps bundle=sweeps
    #pragma HLS INTERFACE mode=m_axi port=out bundle=out
        float first[1024], second[1024];
        for (int b = 0; b < 64; ++b) {
            for (int i = 0; i < 1024; ++i) first[i] = sweeps[b * 1024 + i];
            for (int i = 0; i < 1024; ++i) second[i] = sweeps[65536 + b * 1024 + i];
            for (int i = 0; i < 1024; ++i) out[b * 1024 + i] = 0.5f * (first[i] + second[i]);
        }
    }

Sources: one address channel for each direction (AXI4: ARM IHI 0022, chapter A1); at most one array per port and
direction bursts at a time (HLS user guide UG1399 (2023.2), "Preconditions and Limitations of Burst Transfer").
"""

from __future__ import annotations

from collections.abc import Iterator

from beatwise.model.finding import Facts, Finding
from beatwise.model.traffic import Traffic
from beatwise_rules.advice import a_buffer, burst_bytes, burst_elements
from beatwise_rules.evidence import trouble
from beatwise_rules.sites import blocked_by, moving_loop, sites, working_loop
from beatwise_rules.wording import count, lines, listed, quoted, sentence, size, the_loop

CURES: frozenset[str] = frozenset()


def find(facts: Facts) -> Iterator[Finding]:
    """One finding for each loop, port and direction whose accesses take turns."""
    turns: dict[tuple[str, str, int], list[Traffic]] = {}
    for site in sites(facts, blocked_by("interleaved")):
        for traffic in site:
            access = traffic.access
            loop = working_loop(access) or moving_loop(access)
            turns.setdefault((access.interface, access.direction, loop.number), []).append(traffic)
    for group in turns.values():
        yield _told(facts, sorted(group, key=_other_causes))


def _other_causes(traffic: Traffic) -> tuple[bool, int, int]:
    """The access to which nothing else has happened first, then the order of the source."""
    return traffic.walk.pattern != "sequential", len(traffic.blocked), traffic.access.order


def _told(facts: Facts, group: list[Traffic]) -> Finding:
    first, access = group[0], group[0].access
    ordered = sorted(group, key=lambda traffic: traffic.access.order)
    arguments = list(dict.fromkeys(traffic.access.argument for traffic in ordered))
    loop = the_loop(working_loop(access) or moving_loop(access))
    verb = "reads" if access.direction == "read" else "writes"
    where = lines(traffic.access.place.line for traffic in ordered)
    others = "one of another address" if len(group) == 2 else f"{len(group) - 1} of other addresses"
    come = "comes" if len(group) == 2 else "come"
    what = listed(arguments) if len(arguments) > 1 else f"{quoted(arguments[0])} at {count(len(group), 'place')}"
    return trouble(
        "interleaved-accesses",
        facts,
        group,
        message=f"{sentence(loop)} {verb} {what} in turn through port {quoted(access.interface)}, "
        "and each breaks the other's bursts.",
        because=(
            f"Between two {verb} of {quoted(access.argument)} {come} {others} ({where}): "
            "the port sees a jump with every element.",
            f"One at a time, each would fill bursts of {size(burst_bytes(facts, first))}.",
        ),
        instead=_advice(facts, first, arguments),
    )


def _advice(facts: Facts, traffic: Traffic, arguments: list[str]) -> str:
    access = traffic.access
    block = a_buffer(burst_elements(facts, traffic), access.element_bytes)
    moved = "load" if access.direction == "read" else "store"
    if len(arguments) > 1:
        own = "a bundle of its own" if len(arguments) == 2 else "bundles of their own"
        return f"Give {listed(arguments[1:])} {own}; or {moved} {block} of each in turn, through buffers on chip."
    return (
        f"{sentence(moved)} {block} from one place, then as many from the next, through buffers on chip; "
        "where they overlap, keep rows in line buffers and neighbours in registers, and touch each element once."
    )
