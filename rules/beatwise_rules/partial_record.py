"""Records are walked in order, but only a part of each is used.

Memory has no notion of fields: the beats of a burst carry the whole record, and the kernel throws away what it did
not ask for. The burst is as long as before, its worth is the share of bytes used.

It matters where an array of large structures is scanned for one field, or where one lane of a wide word is taken. It
does not when the fields left out are used elsewhere in the same iteration, for then all of the record travels for a
reason.

What to change: give the field an array of its own (a structure of arrays); or read the record once, as a whole, and
use all that is needed of it in that pass.

Slow::

    struct Gate { float power; float velocity; float width; float quality; };

    // Only the power of each gate is of interest.
    void powers(const Gate *gates, float *power) {
    #pragma HLS INTERFACE mode=m_axi port=gates bundle=gates
    #pragma HLS INTERFACE mode=m_axi port=power bundle=power
        for (int i = 0; i < 16384; ++i) power[i] = gates[i].power;
    }

Fast::

    // The powers lie by themselves.
    void powers(const float *gate_power, float *power) {
    #pragma HLS INTERFACE mode=m_axi port=gate_power bundle=gates
    #pragma HLS INTERFACE mode=m_axi port=power bundle=power
        for (int i = 0; i < 16384; ++i) power[i] = gate_power[i];
    }

Sources: all bytes of a read burst are transferred (AXI4: ARM IHI 0022, section A3.4.1); the share by counting.
"""

from __future__ import annotations

from collections.abc import Iterator

from beatwise.model.access import Access
from beatwise.model.finding import Facts, Finding
from beatwise.model.traffic import Traffic
from beatwise_rules.evidence import trouble
from beatwise_rules.sites import moves, moving_loop, sites, working_loop
from beatwise_rules.wording import listed, quoted, sentence, size, the_loop

CURES: frozenset[str] = frozenset()


def find(facts: Facts) -> Iterator[Finding]:
    """One finding for each loop, argument and direction that leaves a part of its records unused."""
    scans: dict[tuple[str, str, int], list[Traffic]] = {}
    for site in sites(facts, lambda traffic: traffic.walk.pattern not in ("repeated", "unresolved")):
        for traffic in site:
            access = traffic.access
            loop = working_loop(access) or access.loops[-1]
            scans.setdefault((access.argument, access.direction, loop.number), []).append(traffic)
    for scan in scans.values():
        used = used_bytes([traffic.access for traffic in scan])
        if used < scan[0].access.element_bytes:
            yield _told(facts, scan, used)


def used_bytes(accesses: list[Access]) -> int:
    """How much of an element the accesses of one loop use together."""
    parts: dict[tuple[str, int], int] = {}
    for access in accesses:
        lanes = 1
        for loop in access.loops:
            if loop.unroll is not None and not moves(loop, access):
                lanes *= loop.unroll or (loop.trips.known if loop.trips is not None else None) or access.element_bytes
        named = bool(access.covers) and not access.covers.endswith("[]")
        part = (access.covers, 0 if named else access.place.offset)
        parts[part] = max(access.part_bytes * lanes, parts.get(part, 0))
    return min(accesses[0].element_bytes, sum(parts.values()))


def _told(facts: Facts, scan: list[Traffic], used: int) -> Finding:
    access = scan[0].access
    whole, name, loop = access.element_bytes, quoted(access.argument), the_loop(moving_loop(access))
    covers = [traffic.access.covers for traffic in scan if traffic.access.covers]
    parts = f" ({listed(covers)})" if covers else ""
    is_done = f"{'are' if used > 1 else 'is'} {'read' if access.direction == 'read' else 'written'}"
    share = f"{used} of {whole} bytes, {100 * used / whole:.3g} % of what travels"
    return trouble(
        "partial-record",
        facts,
        scan,
        message=f"Of every {size(whole)} of {name} only {size(used)} {is_done}{parts}.",
        because=(f"{sentence(loop)} walks {name} record by record and uses {share}.",),
        instead=f"Keep the {size(used)} that are used in an array of their own; "
        f"or take all that is needed of the {size(whole)} in one pass and hold it on chip.",
    )
