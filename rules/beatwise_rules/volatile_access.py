"""A volatile pointer: every access must happen by itself, in the order of the source.

`volatile` forbids what a burst is made of: fetching ahead of use, joining neighbours, widening the port. Each access
goes out alone and is waited for.

It matters for data. It does not for a flag that is polled or a register that reacts to being read; there it is right,
and one word is all that moves.

What to change: drop the qualifier from the data. Where one location must be seen fresh, give that one an argument of
its own and keep the qualifier there.

Slow::

    // Copies a sweep from the receiver's memory.
    void fetch(const volatile float *receiver, float *sweep) {
    #pragma HLS INTERFACE mode=m_axi port=receiver bundle=receiver
    #pragma HLS INTERFACE mode=m_axi port=sweep bundle=sweep
        for (int i = 0; i < 65536; ++i) sweep[i] = receiver[i];
    }

Fast::

    // The same, without the qualifier.
    void fetch(const float *receiver, float *sweep) {
    #pragma HLS INTERFACE mode=m_axi port=receiver bundle=receiver
    #pragma HLS INTERFACE mode=m_axi port=sweep bundle=sweep
        for (int i = 0; i < 65536; ++i) sweep[i] = receiver[i];
    }

Sources: accesses through volatile lvalues happen strictly by the rules of the abstract machine (ISO C++17,
[intro.execution]); volatile disables bursts (HLS user guide UG1399 (2023.2), "Preconditions and Limitations of Burst
Transfer").
"""

from __future__ import annotations

from collections.abc import Iterator

from beatwise.model.finding import Facts, Finding
from beatwise.model.traffic import Traffic
from beatwise_rules.advice import burst_bytes, elements_a_beat
from beatwise_rules.evidence import trouble
from beatwise_rules.sites import moving_loop, sites
from beatwise_rules.wording import PASSIVE, count, quoted, size, the_loop

CURES: frozenset[str] = frozenset()


def find(facts: Facts) -> Iterator[Finding]:
    """One finding for each place and argument that is accessed as volatile."""
    for site in sites(facts, is_volatile):
        worst, access = site[0], site[0].access
        name = quoted(access.argument)
        lanes = elements_a_beat(facts, worst)
        wide = f", {count(lanes, 'element')} side by side in a beat" if lanes > 1 else ""
        yield trouble(
            "volatile-access",
            facts,
            site,
            message=f"{name} {PASSIVE[access.direction]} through a volatile pointer, one element at a time.",
            because=(
                f"Each iteration of {the_loop(moving_loop(access))} makes an access of {size(access.element_bytes)}: "
                "`volatile` forbids to join, widen or advance it.",
                f"Without it a burst of this port holds {size(burst_bytes(facts, worst))}.",
            ),
            instead=f"Drop `volatile` from {name}: its accesses can then join into bursts{wide}. "
            "Where one word must be read fresh, give that word an argument of its own.",
        )


def is_volatile(traffic: Traffic) -> bool:
    """Whether the pointer forbids bursts."""
    return traffic.access.volatile or "volatile" in traffic.blocked
