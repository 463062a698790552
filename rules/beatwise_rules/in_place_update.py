"""The same argument is loaded and stored in one loop.

Bursts of reads and bursts of writes run on their own, far ahead of or behind the loop. Where the loop stores to the
memory it also loads from, a read that ran ahead might miss a value still under way, so neither side may burst unless
the tool can prove that they never meet.

It matters for blends, filters and histograms that work in place. It does not when one loop loads and a later one
stores: the burst of the first has ended before the second begins.

What to change: separate the two in time. Load a block on chip in one loop, compute, store the block in another; or
read from one argument and write to another.

Slow::

    // Ages the echo map where it lies.
    void age(float *map) {
    #pragma HLS INTERFACE mode=m_axi port=map bundle=map
        for (int i = 0; i < 65536; ++i) map[i] = map[i] * 0.9f;
    }

Fast::

    // A block is loaded, aged and stored, one after the other.
    void age(float *map) {
    #pragma HLS INTERFACE mode=m_axi port=map bundle=map
        float block[1024];
        for (int b = 0; b < 64; ++b) {
            for (int i = 0; i < 1024; ++i) block[i] = map[b * 1024 + i];
            for (int i = 0; i < 1024; ++i) map[b * 1024 + i] = block[i] * 0.9f;
        }
    }

Sources: reads and writes travel on channels of their own, and AXI4 orders neither against the other (ARM IHI 0022,
chapter A5); a burst is all reads or all writes, with no dependency until it ends (HLS user guide UG1399 (2023.2),
"Preconditions and Limitations of Burst Transfer").
"""

from __future__ import annotations

from collections.abc import Iterator

from beatwise.model.finding import Facts, Finding
from beatwise.model.traffic import Traffic
from beatwise_rules.advice import a_buffer, burst_bytes, burst_elements
from beatwise_rules.evidence import trouble
from beatwise_rules.sites import blocked_by, moving_loop, sites
from beatwise_rules.wording import count, lines, quoted, sentence, size, the_loop

CURES = frozenset({"interleaved-accesses"})
BURSTS_A_BLOCK = 4  #: enough to overlap waiting and moving (our own choice)


def find(facts: Facts) -> Iterator[Finding]:
    """One finding for each store to an argument that its own loop also loads."""
    for site in sites(facts, _is_store):
        worst, access = site[0], site[0].access
        loads = _loads_beside(facts, worst)
        name, loop = quoted(access.argument), the_loop(moving_loop(access))
        where = f" on {lines(load.access.place.line for load in loads)}" if loads else ""
        block = BURSTS_A_BLOCK * burst_elements(facts, worst)
        yield trouble(
            "in-place-update",
            facts,
            [worst, *(load for load in loads if load.access.interface == access.interface)],
            message=f"{name} is loaded and stored in the same loop, so neither side can burst.",
            because=(
                f"{sentence(loop)} loads {name}{where} and stores it on line {access.place.line}: "
                "a load that ran ahead in a burst could miss a store under way.",
                f"Each side moves {size(access.element_bytes)} per request; a burst of this port holds "
                f"{size(burst_bytes(facts, worst))}.",
            ),
            instead=f"Work in blocks of {a_buffer(block, access.element_bytes)}: load one on chip in one loop, "
            f"store it in the next, {count(BURSTS_A_BLOCK, 'burst')} each; or write to another argument.",
        )


def _is_store(traffic: Traffic) -> bool:
    return traffic.access.direction == "write" and blocked_by("load-and-store")(traffic)


def _loads_beside(facts: Facts, store: Traffic) -> list[Traffic]:
    """The loads of the same argument that share a loop with the store, the innermost sharing first."""
    around = {loop.number for loop in store.access.loops}
    loads = [
        traffic
        for traffic in facts.traffic
        if traffic.access.direction == "read"
        and traffic.access.argument == store.access.argument
        and "load-and-store" in traffic.blocked
        and any(loop.number in around for loop in traffic.access.loops)
    ]
    deepest = max((_shared_depth(load, around) for load in loads), default=0)
    return [load for load in loads if _shared_depth(load, around) == deepest]


def _shared_depth(load: Traffic, around: set[int]) -> int:
    return sum(loop.number in around for loop in load.access.loops)
