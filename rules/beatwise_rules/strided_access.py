"""The addresses jump by a constant step that is more than one element.

A burst holds consecutive addresses only. Down the columns of a row-major array each element is a request of its own;
the memory moves at least a granule for it (32 bytes in the second generation of high-bandwidth memory, 64 in a DDR4
channel) and may have to open another row. A stride of S bytes uses s/S of what travels, for elements of s bytes,
until the granule is the limit.

It matters for column walks, transposes, interleaved channels and structures taken apart. It does not for a handful of
elements, or for rows that are long enough to burst before the jump.

What to change: put the loop over the last subscript innermost. Where the algorithm needs the other order (a
transpose), copy a tile on chip along the rows and walk the tile in any order.

Slow::

    // Range profile of every ray, taken down the columns.
    void scale(const float *rays, float *scaled) {
    #pragma HLS INTERFACE mode=m_axi port=rays bundle=rays
    #pragma HLS INTERFACE mode=m_axi port=scaled bundle=scaled
        for (int gate = 0; gate < 1024; ++gate)
            for (int ray = 0; ray < 512; ++ray) scaled[ray * 1024 + gate] = 2 * rays[ray * 1024 + gate];
    }

Fast::

    // The same, along the rows.
    void scale(const float *rays, float *scaled) {
    #pragma HLS INTERFACE mode=m_axi port=rays bundle=rays
    #pragma HLS INTERFACE mode=m_axi port=scaled bundle=scaled
        for (int ray = 0; ray < 512; ++ray)
            for (int gate = 0; gate < 1024; ++gate) scaled[ray * 1024 + gate] = 2 * rays[ray * 1024 + gate];
    }

Sources: increasing consecutive addresses (AXI4: ARM IHI 0022, section A3.4.1); granules: JESD235 (4 x 64 bits),
JESD79-4 (8 x 64 bits); s/S by counting.
"""

from __future__ import annotations

from collections.abc import Iterator

from beatwise.model.access import Access, LoopInstance
from beatwise.model.finding import Facts, Finding
from beatwise.model.traffic import Traffic
from beatwise_rules.advice import burst_bytes, tile_side
from beatwise_rules.evidence import trouble
from beatwise_rules.sites import moving_loop, sites
from beatwise_rules.wording import PASSIVE, count, listed, quoted, size, the_loop

CURES = frozenset({"short-run"})
NEAR_ELEMENTS = 16  #: steps up to this may be cheaper to read through than to jump over (our own choice)


def find(facts: Facts) -> Iterator[Finding]:
    """One finding for each place and argument that steps over elements."""
    for site in sites(facts, lambda traffic: traffic.walk.pattern == "strided"):
        yield _told(facts, site)


def _told(facts: Facts, site: list[Traffic]) -> Finding:
    worst, access = site[0], site[0].access
    loop, stride, name = moving_loop(access), worst.walk.stride_bytes, quoted(access.argument)
    by = size(abs(stride)) if stride is not None else "more than an element"
    backwards = " backwards" if stride is not None and stride < 0 else ""
    return trouble(
        "strided-access",
        facts,
        site,
        message=f"{name} {PASSIVE[access.direction]} in steps of {by}{backwards}, each element a request of its own.",
        because=(
            _step(access, stride, loop),
            f"{_used(facts, access, stride)}; a burst of this port holds {size(burst_bytes(facts, worst))}.",
        ),
        instead=_advice(facts, access, stride, loop),
    )


def _step(access: Access, stride: int | None, loop: LoopInstance) -> str:
    element = size(access.element_bytes)
    if stride is None:
        return f"Each iteration of {the_loop(loop)} steps over elements of {element}."
    elements = count(abs(stride) / access.element_bytes, "element")
    return f"Each iteration of {the_loop(loop)} moves {size(abs(stride))}: {elements} of {element}."


def _used(facts: Facts, access: Access, stride: int | None) -> str:
    granule, used = facts.board.granule_bytes, access.part_bytes
    travel = granule if stride is None else max(used, min(abs(stride), granule))
    if travel <= used:
        return "Every request waits out the latency for one element"
    return f"Of every {size(travel)} that the memory moves, {used} are used, {100 * used / travel:.3g} %"


def _advice(facts: Facts, access: Access, stride: int | None, loop: LoopInstance) -> str:
    element, name = access.element_bytes, quoted(access.argument)
    side = tile_side(element)
    tile = (
        f"copy tiles of {side} x {side} elements ({size(side * side * element)}) through on-chip memory, "
        f"in rows of {size(side * element)}, and walk the tile in any order"
    )
    unit = next((outer for outer in access.loops if outer is not loop and _step_of(access, outer) == element), None)
    if unit is not None:
        partners = _in_order_along(facts, loop)
        if partners:
            return f"Another order of the loops would break the runs of {listed(partners)}: {tile}."
        return f"Make {the_loop(unit)} the innermost: it moves by one element. Where the order must stay, {tile}."
    if stride is not None and abs(stride) % element == 0 and abs(stride) <= NEAR_ELEMENTS * element:
        if access.direction == "read":
            nth = _ordinal(abs(stride) // element)
            return f"Read in order and pick every {nth} on chip, or lay {name} out so that what is used lies together."
        return f"Gather results on chip and write in order, or lay {name} out so that what is written lies together."
    return f"Lay {name} out in the order of the loop, or {tile}."


def _in_order_along(facts: Facts, loop: LoopInstance) -> list[str]:
    """The arguments that the same loop walks element by element."""
    return [
        traffic.access.argument
        for traffic in facts.traffic
        if traffic.walk.pattern == "sequential"
        and any(other.number == loop.number for other in traffic.access.loops)
        and _step_of(traffic.access, loop) == traffic.access.element_bytes
    ]


def _step_of(access: Access, loop: LoopInstance) -> int | None:
    coefficient = access.offset.coefficient(loop.counter)
    return None if coefficient is None else coefficient.known


def _ordinal(number: int) -> str:
    return {2: "second", 3: "third"}.get(number, f"{number}th")
