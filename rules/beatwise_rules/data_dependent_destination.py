"""Data picks which memory each element goes to or comes from.

A burst names its destination before its first beat. Where the next element goes to a memory that is known only once
the element has been looked at, no burst can be announced: each element is a transaction of its own, with the whole
latency of the memory ahead of it and fifteen sixteenths of a wide beat left empty. With K destinations equally
likely, K/(K-1) elements in a row go the same way, 1.14 for eight: there is no run to be found afterwards.

It matters wherever elements are sorted, binned or scattered over channels. It does not where the choice is made once
per block (a ping-pong buffer, one channel per tile): the elements of the block still form a run.

What to change: choose on chip, write in blocks. Give each destination a region of on-chip memory that holds one
burst; put the element into the region of its destination; when a region is full, write it as one burst. Twice the
regions let one half fill while the other drains.

Slow::

    #include <stdint.h>

    // Each gate of a radar sweep goes to the memory of the sector it was seen in.
    void sort_gates(const uint32_t *gates, uint32_t *north, uint32_t *south) {
    #pragma HLS INTERFACE mode=m_axi port=gates bundle=sweep
    #pragma HLS INTERFACE mode=m_axi port=north bundle=north
    #pragma HLS INTERFACE mode=m_axi port=south bundle=south
        for (int i = 0; i < 65536; ++i) {
            uint32_t gate = gates[i];
            uint32_t *sector = (gate & 1) ? north : south;
            sector[i] = gate;
        }
    }

Fast::

    #include <stdint.h>

    // The same sectors, in blocks: a buffer per sector, written as one burst.
    void sort_gates(const uint32_t *gates, uint32_t *north, uint32_t *south) {
    #pragma HLS INTERFACE mode=m_axi port=gates bundle=sweep
    #pragma HLS INTERFACE mode=m_axi port=north bundle=north
    #pragma HLS INTERFACE mode=m_axi port=south bundle=south
        uint32_t bucket[2][1024];
        for (int block = 0; block < 64; ++block) {
            for (int i = 0; i < 1024; ++i) {
                uint32_t gate = gates[block * 1024 + i];
                bucket[gate & 1][i] = gate;
            }
            for (int i = 0; i < 1024; ++i) north[block * 1024 + i] = bucket[0][i];
            for (int i = 0; i < 1024; ++i) south[block * 1024 + i] = bucket[1][i];
        }
    }

Sources: a burst's address precedes its data and fixes its length (AXI4: ARM IHI 0022, section A3.4.1); K/(K-1) is the
mean of a geometric law.
"""

from __future__ import annotations

from collections.abc import Iterator

from beatwise.model.access import Access
from beatwise.model.finding import Facts, Finding
from beatwise.model.traffic import Traffic
from beatwise_rules.advice import a_buffer, burst_bytes, burst_elements
from beatwise_rules.evidence import trouble
from beatwise_rules.sites import data_in, moving_loop, named_data, sites
from beatwise_rules.wording import count, listed, size, the_loop

CURES = frozenset({"guarded-access", "repeated-address", "descending-access", "strided-access", "short-run"})


def find(facts: Facts) -> Iterator[Finding]:
    """One finding for each choice that data makes, whatever the number of arguments it chooses from."""
    chosen: dict[tuple[str, int, str], list[Traffic]] = {}
    for site in sites(facts, is_steered):
        for traffic in site:
            access = traffic.access
            where = access.choice.place.offset if access.choice else -moving_loop(access).number
            chosen.setdefault((access.place.file, where, access.direction), []).append(traffic)
    for group in chosen.values():
        yield _told(facts, sorted(group, key=lambda traffic: (-traffic.loss_gbps, traffic.access.order)))


def is_steered(traffic: Traffic) -> bool:
    """Whether data decides where it goes. Branches of one condition, each with an argument of its own, are a choice."""
    return traffic.walk.pattern == "steered" or "destination-by-data" in traffic.blocked


def _told(facts: Facts, site: list[Traffic]) -> Finding:
    worst, access = site[0], site[0].access
    arguments = list(dict.fromkeys(traffic.access.argument for traffic in site))
    alternatives = list(dict.fromkeys(access.choice.alternatives)) if access.choice else arguments
    return trouble(
        "data-dependent-destination",
        facts,
        site,
        argument=arguments[0] if len(arguments) == 1 else None,
        message=_message(access, alternatives),
        because=(
            _how_often(worst),
            _odds(access, len(alternatives)),
            f"An element has {size(access.element_bytes)}, a burst of this port {size(burst_bytes(facts, worst))}.",
        ),
        instead=_advice(facts, worst, max(2, len(alternatives))),
    )


def _how_often(traffic: Traffic) -> str:
    access = traffic.access
    line = (access.choice or access).place.line
    if "destination-by-data" in traffic.blocked or not traffic.walk.run_elements or traffic.walk.run_elements <= 2:
        loop = the_loop(moving_loop(access))
        return f"The choice on line {line} is made anew in every iteration of {loop}: no burst can be announced."
    row = count(traffic.walk.run_elements, "element")
    return f"The choice on line {line} holds for {row} in a row, then it is made anew."


def _message(access: Access, alternatives: list[str]) -> str:
    choosing = [access.choice.selector] if access.choice else [guard.condition for guard in access.guards]
    pickers = named_data(symbol for form in choosing for symbol in data_in(form))
    picks = f"{listed(pickers)} {'pick' if len(pickers) > 1 else 'picks'}" if pickers else "Data picks"
    way = "goes to" if access.direction == "write" else "comes from"
    where = f"which of {listed(alternatives)}" if len(alternatives) > 1 else f"where in {listed(alternatives)}"
    return f"{picks} {where} each {access.direction} {way}."


def _odds(access: Access, ways: int) -> str:
    place = "destination" if access.direction == "write" else "source"
    if ways < 2:
        return f"No two {access.direction}s in a row are known to share a {place}."
    row = count(ways / (ways - 1), "element")
    return f"With {ways} {place}s equally likely, {row} in a row share one: {ways}/({ways} - 1)."


def _advice(facts: Facts, traffic: Traffic, ways: int) -> str:
    access, entries = traffic.access, burst_elements(facts, traffic)
    place = "destination" if access.direction == "write" else "source"
    writes = access.direction == "write"
    move = "write a region as one burst when it is full" if writes else "fill each in bursts ahead of use"
    return (
        f"Keep one region per {place} on chip and {move}: {ways} regions of {a_buffer(entries, access.element_bytes)}, "
        f"{size(ways * entries * access.element_bytes)} in all; twice that lets one half fill while the other drains."
    )
