"""An access that could not be followed to its memory or its address.

Nothing is said about what it costs, because nothing is known. The reason is given with the place: a variable that was
never set, a pointer that comes out of a computation, a name that is missing, a construct that is not understood. The
rates of the kernel leave this access out.

It matters when the access moves much data. One that runs once can be left.

What to change: make the address plain. Set what it is computed from, index the argument itself instead of a pointer
kept in memory; give the missing header with `--include`, or the value of a size with `--given`.

Slow::

    // Where the sweep begins was never set.
    void clear(float *map) {
    #pragma HLS INTERFACE mode=m_axi port=map bundle=map
        int first;
        for (int i = 0; i < 4096; ++i) map[first + i] = 0;
    }

Fast::

    // It begins where the map does.
    void clear(float *map) {
    #pragma HLS INTERFACE mode=m_axi port=map bundle=map
        int first = 0;
        for (int i = 0; i < 4096; ++i) map[first + i] = 0;
    }

Sources: none needed.
"""

from __future__ import annotations

from collections.abc import Iterator

from beatwise.model.access import Access
from beatwise.model.finding import Facts, Finding
from beatwise.model.traffic import Traffic
from beatwise_rules.wording import PASSIVE, quoted, sentence

CURES: frozenset[str] = frozenset()


def find(facts: Facts) -> Iterator[Finding]:
    """One finding for each place, argument and reason; a warning in a loop, a note elsewhere."""
    told: set[tuple[str, int, str, str]] = set()
    for traffic in facts.traffic:
        if not is_unresolved(traffic):
            continue
        access, place = traffic.access, traffic.access.place
        reason = access.unresolved or traffic.walk.reason or "its address could not be followed"
        key = (place.file, place.offset, access.argument, reason)
        if key in told:
            continue
        told.add(key)
        yield Finding(
            rule="unresolved-access",
            level="warning" if access.loops else "note",
            kernel=facts.trace.kernel,
            place=place,
            argument=access.argument or None,
            interface=access.interface or None,
            message=_message(access),
            because=(
                f"{sentence(reason).rstrip('.')}.",
                "Its runs and its rate are unknown; the kernel's figures leave it out.",
            ),
            instead="Index the argument itself where you can; give a missing header with `--include DIR`, "
            "a size with `--given NAME=VALUE`.",
        )


def is_unresolved(traffic: Traffic) -> bool:
    """Whether the access was found but not followed."""
    return traffic.access.unresolved is not None or traffic.walk.pattern == "unresolved"


def _message(access: Access) -> str:
    who = quoted(access.argument) if access.argument else "memory"
    if access.given_away:
        return f"What becomes of {who} on line {access.place.line} is not known: it is handed on."
    return f"{sentence(who)} {PASSIVE[access.direction]} at an address that could not be followed."
