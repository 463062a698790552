"""Consecutive iterations access the same element.

Memory behind a port has no cache of its own: an address that stays the same is sent again in every iteration, and the
same bytes travel again. A burst can't help, its addresses must increase.

It matters for sums kept in memory, for coefficients read in an inner loop, and for a word whose parts are taken one
by one. It does not where the loop is so short that nobody waits for it.

What to change: keep the element in a local variable. Read it once before the loop, or write it once behind it.

Slow::

    // Sums the power of each ray where it will be stored.
    void ray_power(const float *gates, float *power) {
    #pragma HLS INTERFACE mode=m_axi port=gates bundle=gates
    #pragma HLS INTERFACE mode=m_axi port=power bundle=power
        for (int ray = 0; ray < 512; ++ray)
            for (int gate = 0; gate < 1024; ++gate) power[ray] += gates[ray * 1024 + gate];
    }

Fast::

    // The sum stays in a register until the ray is done.
    void ray_power(const float *gates, float *power) {
    #pragma HLS INTERFACE mode=m_axi port=gates bundle=gates
    #pragma HLS INTERFACE mode=m_axi port=power bundle=power
        for (int ray = 0; ray < 512; ++ray) {
            float sum = 0;
            for (int gate = 0; gate < 1024; ++gate) sum += gates[ray * 1024 + gate];
            power[ray] = sum;
        }
    }

Sources: a burst whose address stays is a FIXED burst of at most 16 beats, meant for FIFOs (AXI4: ARM IHI 0022,
section A3.4.1); that HLS tools make none for memory is common practice.
"""

from __future__ import annotations

from collections.abc import Iterator

from beatwise.model.access import Access, Direction, LoopInstance
from beatwise.model.finding import Facts, Finding
from beatwise_rules.evidence import trouble
from beatwise_rules.sites import moves, sites, working_loop
from beatwise_rules.wording import PASSIVE, count, quoted, size, the_loop

CURES = frozenset({"short-run", "strided-access", "descending-access"})


def find(facts: Facts) -> Iterator[Finding]:
    """One finding for each place and argument whose address stays the same."""
    for site in sites(facts, lambda traffic: traffic.walk.pattern == "repeated"):
        access = site[0].access
        directions = {traffic.access.direction for traffic in site}
        name = quoted(access.argument)
        done = "is read and written" if len(directions) == 2 else PASSIVE[access.direction]
        still = _still_loop(access)
        loop, trips = the_loop(still), still.trips.known if still.trips is not None else None
        times = f"{count(trips, 'time')} over" if trips else "over and over"
        yield trouble(
            "repeated-address",
            facts,
            site,
            message=f"{name} {done} at the same address in every iteration of {loop}.",
            because=(
                f"The address does not change with that loop: the same {size(access.element_bytes)} travel {times}.",
                "Each iteration makes a request of its own, and none can join the one before.",
            ),
            instead=_advice(name, loop, directions),
        )


def _still_loop(access: Access) -> LoopInstance:
    """The innermost loop that does not move the address."""
    loop = working_loop(access)
    if loop is not None and not moves(loop, access):
        return loop
    return next((loop for loop in reversed(access.loops) if not moves(loop, access)), access.loops[-1])


def _advice(name: str, loop: str, directions: set[Direction]) -> str:
    if directions == {"read"}:
        return f"Read {name} into a local variable before {loop} and use that inside."
    if directions == {"write"}:
        return f"Keep the value in a local variable inside {loop} and write {name} once behind it."
    return f"Read {name} into a local variable before {loop}, work on that, and write it back once behind the loop."
