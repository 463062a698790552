"""The addresses jump before they have filled a burst.

Each jump starts a new request. A write burst of L beats costs about L + 4 cycles on the port; reads keep the memory
busy only as far as the requests under way cover its latency. A run that fills fewer than 16 beats of the port leaves
some of both unused, the more the wider the port is.

It matters for narrow tiles, short rows of a wide matrix, and orders that are computed. It does not for a table of a
few hundred bytes that is read once.

What to change: make the stretch that is accessed in one go longer. Take tiles that are wide along the rows and low
across them, join rows that lie behind each other, or move whole rows through an on-chip buffer.

Slow::

    #include <ap_int.h>

    // The header of each ray, four words, is put before its gates.
    void set_headers(const ap_uint<512> *headers, ap_uint<512> *rays) {
    #pragma HLS INTERFACE mode=m_axi port=headers bundle=headers
    #pragma HLS INTERFACE mode=m_axi port=rays bundle=rays
        for (int ray = 0; ray < 360; ++ray)
            for (int word = 0; word < 4; ++word) rays[ray * 64 + word] = headers[ray * 4 + word];
    }

Fast::

    #include <ap_int.h>

    // The headers have a stretch of memory of their own.
    void set_headers(const ap_uint<512> *headers, ap_uint<512> *ray_headers) {
    #pragma HLS INTERFACE mode=m_axi port=headers bundle=headers
    #pragma HLS INTERFACE mode=m_axi port=ray_headers bundle=rays
        for (int ray = 0; ray < 360; ++ray)
            for (int word = 0; word < 4; ++word) ray_headers[ray * 4 + word] = headers[ray * 4 + word];
    }

Sources: the two rates of a port are those of the board's profile, fitted to published measurements that are named
there; 16 beats are the usual default of the longest burst (common practice).
"""

from __future__ import annotations

from collections.abc import Iterator

from beatwise.model.finding import Facts, Finding
from beatwise.model.traffic import Traffic
from beatwise_rules.advice import SHORT_BEATS, TILE_BYTES, a_buffer, burst_elements
from beatwise_rules.evidence import trouble
from beatwise_rules.sites import moving_loop, never_jumps, sites
from beatwise_rules.wording import PASSIVE, count, quoted, sentence, size, the_loop

CURES: frozenset[str] = frozenset()


def find(facts: Facts) -> Iterator[Finding]:
    """One finding for each place and argument that walks in order, but not for long."""
    for site in sites(facts, is_short):
        yield _told(facts, site)


def is_short(traffic: Traffic) -> bool:
    """Whether the run fills fewer than 16 beats, by its own order and not because data breaks it."""
    walk = traffic.walk
    broken_by_data = {"data-dependent-guard", "destination-by-data"} & set(traffic.blocked)
    if walk.pattern not in ("sequential", "irregular") or walk.run_elements is None or broken_by_data:
        return False
    run_bits = walk.run_elements * traffic.access.element_bytes * 8
    return run_bits < SHORT_BEATS * traffic.width_bits and not never_jumps(traffic)


def _told(facts: Facts, site: list[Traffic]) -> Finding:
    worst, access, walk = site[0], site[0].access, site[0].walk
    run = walk.run_elements or 1
    run_bytes, beat_bytes = run * access.element_bytes, worst.width_bits // 8
    name, done, loop = quoted(access.argument), PASSIVE[access.direction], the_loop(moving_loop(access))
    if walk.pattern == "irregular":
        message = f"{name} {done} in a computed order whose addresses jump after {count(run, 'element')}."
        jump = f"Neither {loop} nor another one moves the address by a constant step"
    else:
        message = f"{name} {done} in runs of {count(run, 'element')}, too few to fill {SHORT_BEATS} beats of its port."
        jump = f"{sentence(loop)} walks {size(run_bytes)} in order, then the address jumps"
    assumed = " (sizes that are not known are taken as 1024)" if walk.basis == "assumed" else ""
    beats = run_bytes / beat_bytes
    return trouble(
        "short-run",
        facts,
        site,
        message=message,
        because=(
            f"{jump}{assumed}.",
            f"{size(run_bytes)} fill {count(beats, 'beat')} of {size(beat_bytes)}; "
            f"{SHORT_BEATS} would take {size(SHORT_BEATS * beat_bytes)}.",
        ),
        instead=_advice(facts, worst),
    )


def _advice(facts: Facts, traffic: Traffic) -> str:
    element, wanted = traffic.access.element_bytes, burst_elements(facts, traffic)
    better = f"Move {a_buffer(wanted, element)}, a full burst, or more in order before the address jumps"
    if traffic.walk.pattern == "irregular":
        return f"{better}: bring such blocks on chip as they lie, and follow the computed order there."
    low = max(1, TILE_BYTES // (wanted * element))
    return (
        f"{better}: tiles of {low} x {wanted} elements ({size(low * wanted * element)}) instead of narrower ones, "
        "or whole rows through an on-chip buffer."
    )
