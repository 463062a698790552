"""Data read in the loop decides when the loop ends.

A burst's length is part of its request, and every beat that was asked for arrives. A loop that may end after any
element it reads can't say how many it will need, so it asks for one at a time and waits for each.

It matters for searches, delimiters and packets whose end is marked in their data. A length that was read before the
loop starts does no harm: it is known when the burst is requested. Neither does an exit that depends on counters
alone.

What to change: read blocks of fixed size on chip, without a condition, and search the copy. The elements read past
the end cost less than the waits.

Slow::

    // Counts the gates before the first that the radar marked as missing.
    void usable_range(const float *gates, int *found) {
    #pragma HLS INTERFACE mode=m_axi port=gates bundle=sweep
    #pragma HLS INTERFACE mode=m_axi port=found bundle=found
        int n = 0;
        for (int i = 0; i < 65536; ++i) {
            if (gates[i] < 0.0f) break;
            ++n;
        }
        *found = n;
    }

Fast::

    // The whole sweep is read; the end is found in passing.
    void usable_range(const float *gates, int *found) {
    #pragma HLS INTERFACE mode=m_axi port=gates bundle=sweep
    #pragma HLS INTERFACE mode=m_axi port=found bundle=found
        int n = 0;
        bool usable = true;
        for (int i = 0; i < 65536; ++i) {
            float gate = gates[i];
            if (gate < 0.0f) usable = false;
            n += usable ? 1 : 0;
        }
        *found = n;
    }

Sources: the length is part of the request, and a burst can't end early (AXI4: ARM IHI 0022, section A3.4.1).
"""

from __future__ import annotations

from collections.abc import Iterator

from beatwise.model.access import Access, LoopInstance
from beatwise.model.finding import Facts, Finding
from beatwise.model.traffic import Traffic
from beatwise_rules.advice import a_buffer, burst_bytes, burst_elements
from beatwise_rules.evidence import trouble
from beatwise_rules.sites import blocked_by, moves, moving_loop, sites
from beatwise_rules.wording import PASSIVE, quoted, size, the_loop

CURES = frozenset({"short-run"})


def find(facts: Facts) -> Iterator[Finding]:
    """One finding for each place and argument in a loop that ends by its data."""
    for site in sites(facts, blocked_by("data-dependent-exit")):
        yield _told(facts, site)


def _told(facts: Facts, site: list[Traffic]) -> Finding:
    worst, access = site[0], site[0].access
    loop = _ending_loop(access)
    decider = quoted(loop.data_exit_because) if loop.data_exit_because else "data"
    on_line = f" on line {loop.data_exit.line}" if loop.data_exit is not None else ""
    return trouble(
        "early-exit",
        facts,
        site,
        message=f"{quoted(access.argument)} {PASSIVE[access.direction]} in a loop that may end after any element, "
        f"as {decider} decides.",
        because=(
            f"When {the_loop(loop)} ends depends on {decider}{on_line}: a burst could not say how long it is.",
            f"Each iteration asks for {size(access.element_bytes)}; a burst of this port holds "
            f"{size(burst_bytes(facts, worst))}.",
        ),
        instead=_advice(access, a_buffer(burst_elements(facts, worst), access.element_bytes)),
    )


def _advice(access: Access, block: str) -> str:
    if access.direction == "read":
        return f"Read blocks of {block} on chip, each one full burst, and look for the end in the copy."
    return f"Collect the elements on chip and write blocks of {block} as one burst each; the last may be shorter."


def _ending_loop(access: Access) -> LoopInstance:
    """The innermost loop around the access that data ends, those that move it first."""
    by_data = [loop for loop in reversed(access.loops) if loop.data_exit is not None]
    return next((loop for loop in by_data if moves(loop, access)), by_data[0] if by_data else moving_loop(access))
