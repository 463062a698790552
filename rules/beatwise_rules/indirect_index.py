"""The index is itself read from memory or a stream.

An address that is known only after another value has arrived can't be part of a burst, and neighbouring iterations
rarely touch neighbouring elements. Each access is one transaction of one element: of the 32 or 64 bytes that the
memory moves for it, a 4-byte element uses an eighth or less, and the port waits out the latency with as many requests
as it may have outstanding.

It matters for gathers, histograms, hash tables and sparse matrices. It does not for a table that is read once in
order and then indexed on chip: on-chip memory has no bursts to lose.

What to change: bring the table on chip when it fits, as one long burst, and index the copy. When it does not fit,
sort or bin the indices so that one block of the table serves many of them, or spread the table over several channels
with a port each, so that more requests are under way at once.

Slow::

    #include <stdint.h>

    // Subtracts from each gate the clutter that is usual for its cell.
    void remove_clutter(const uint16_t *cell, const float *clutter, float *echo) {
    #pragma HLS INTERFACE mode=m_axi port=cell bundle=cells
    #pragma HLS INTERFACE mode=m_axi port=clutter bundle=map
    #pragma HLS INTERFACE mode=m_axi port=echo bundle=echo
        for (int i = 0; i < 65536; ++i) echo[i] = clutter[cell[i]];
    }

Fast::

    #include <stdint.h>

    // The clutter map is brought on chip first, in order.
    void remove_clutter(const uint16_t *cell, const float *clutter, float *echo) {
    #pragma HLS INTERFACE mode=m_axi port=cell bundle=cells
    #pragma HLS INTERFACE mode=m_axi port=clutter bundle=map
    #pragma HLS INTERFACE mode=m_axi port=echo bundle=echo
        float map[4096];
        for (int i = 0; i < 4096; ++i) map[i] = clutter[i];
        for (int i = 0; i < 65536; ++i) echo[i] = map[cell[i] & 4095];
    }

Sources: a burst needs increasing consecutive addresses known before the request (AXI4: ARM IHI 0022, section A3.4.1);
the least that a memory moves is its data width times its burst length (JESD235, JESD79-4), here the board profile's
granule.
"""

from __future__ import annotations

from collections.abc import Iterator

from beatwise.model.access import Access, Direction
from beatwise.model.finding import Facts, Finding
from beatwise.model.traffic import Traffic
from beatwise_rules.advice import TABLE_BYTES, a_buffer, burst_bytes, fits_on_chip
from beatwise_rules.evidence import trouble
from beatwise_rules.sites import argument_bytes, data_in, named_data, sites
from beatwise_rules.wording import PASSIVE, lines, listed, quoted, size

CURES = frozenset({"guarded-access", "repeated-address", "descending-access", "strided-access", "short-run"})


def find(facts: Facts) -> Iterator[Finding]:
    """One finding for each place and argument that is indexed by data."""
    for site in sites(facts, lambda traffic: traffic.walk.pattern == "indirect"):
        yield _told(facts, site)


def _told(facts: Facts, site: list[Traffic]) -> Finding:
    worst, access = site[0], site[0].access
    symbols = data_in(access.offset)
    names, name = named_data(symbols), quoted(access.argument)
    places = [symbol.place.line for symbol in symbols if symbol.place is not None]
    loaded = f"{listed(names)}" if names else "data"
    where = f" ({lines(places)})" if places else ""
    directions = {traffic.access.direction for traffic in site}
    done = "is read and written" if len(directions) == 2 else PASSIVE[access.direction]
    return trouble(
        "indirect-index",
        facts,
        site,
        message=f"{name} {done} at an index taken from {loaded}, so its addresses follow no order.",
        because=(
            f"The index comes from {loaded}{where}, known only when that has arrived: no burst can be announced.",
            _used(access, facts.board.granule_bytes, burst_bytes(facts, worst)),
        ),
        instead=_advice(facts, worst, directions),
    )


def _used(access: Access, granule_bytes: int, burst: int) -> str:
    moved = -(-access.part_bytes // granule_bytes) * granule_bytes
    if moved == access.part_bytes:
        return (
            f"Each {access.direction} moves {size(moved)} and waits out the latency alone; a burst holds {size(burst)}."
        )
    return (
        f"Each {access.direction} uses {access.part_bytes} of the {size(moved)} that the memory moves for it, "
        f"{100 * access.part_bytes / moved:.3g} %; a burst of this port holds {size(burst)}."
    )


def _advice(facts: Facts, traffic: Traffic, directions: set[Direction]) -> str:
    access = traffic.access
    table, name, element = argument_bytes(access), quoted(access.argument), access.element_bytes
    if table is not None and fits_on_chip(table):
        copy = a_buffer(table // element, element)
        if directions == {"read"}:
            return f"Copy {name} on chip in order before the loop, {copy}, and index the copy."
        return f"Collect the results in an on-chip copy of {name}, {copy}, and write it back in order after the loop."
    if table is not None:
        why = f"At {size(table)}, {name} is too large to copy: sort"
    else:
        why = f"If {name} has no more than {a_buffer(TABLE_BYTES // element, element)}, index a copy on chip. Else sort"
    channels = facts.board.channels
    spread = f", or spread it over several of the {channels} channels with a port each" if channels > 1 else ""
    return f"{why} or bin the indices so that one block on chip serves many of them{spread}."
