"""Sizes that nobody stated were taken as 1024.

Whether rows join, how long a run is and how much a loop moves depend on sizes. Where a size is an argument of the
kernel, and neither a directive nor the command line says what it usually is, 1024 is taken for the trips of a loop,
and everything that follows from it says so.

It matters when the true sizes are far from that: a run of 8 is another kernel than a run of 1024.

What to change: say the usual value with `--given NAME=VALUE` or in the settings, or write a trip-count directive into
the loop.

Slow::

    #include <ap_int.h>

    // The number of words is the host's choice.
    void copy_words(const ap_uint<512> *in, ap_uint<512> *out, int words) {
    #pragma HLS INTERFACE mode=m_axi port=in bundle=in
    #pragma HLS INTERFACE mode=m_axi port=out bundle=out
        for (int i = 0; i < words; ++i) out[i] = in[i];
    }

Fast::

    #include <ap_int.h>

    // The directive says how many are usual.
    void copy_words(const ap_uint<512> *in, ap_uint<512> *out, int words) {
    #pragma HLS INTERFACE mode=m_axi port=in bundle=in
    #pragma HLS INTERFACE mode=m_axi port=out bundle=out
        for (int i = 0; i < words; ++i) {
    #pragma HLS LOOP_TRIPCOUNT min=4096 max=4096 avg=4096
            out[i] = in[i];
        }
    }

Sources: 1024 is our own choice.
"""

from __future__ import annotations

from collections.abc import Iterator

from beatwise.model.access import LoopInstance
from beatwise.model.finding import Facts, Finding
from beatwise.model.traffic import Traffic
from beatwise_rules.wording import lines, listed, the_loop

ASSUMED_TRIPS = 1024  #: what a loop runs where nothing is known
SHOWN = 6  #: evidence names no more loops than this
CURES: frozenset[str] = frozenset()


def find(facts: Facts) -> Iterator[Finding]:
    """One note for the kernel, or none where every size was known."""
    assumed = [traffic for traffic in facts.traffic if traffic.walk.basis == "assumed"]
    if not assumed:
        return
    loops = _unsized_loops(assumed)
    names = _parameters(facts, assumed)
    places = len({(traffic.access.place.file, traffic.access.place.line) for traffic in assumed})
    where = f"{places} lines" if places > 1 else "one line"
    what = listed(names) if names else "Loop lengths"
    yield Finding(
        rule="assumed-size",
        level="note",
        kernel=facts.trace.kernel,
        place=facts.trace.place,
        argument=None,
        interface=None,
        message=f"{what} {'is' if len(names) == 1 else 'are'} not known: {ASSUMED_TRIPS} is taken, "
        f"and the accesses on {where} depend on it.",
        because=tuple(_evidence(loop) for loop in loops[:SHOWN])
        or (f"The accesses on {lines(traffic.access.place.line for traffic in assumed)} depend on it.",),
        instead=f"Say what is usual: {' '.join(f'`--given {name}=...`' for name in names)}."
        if names
        else "Write a trip-count directive into these loops.",
    )


def _unsized_loops(assumed: list[Traffic]) -> list[LoopInstance]:
    """The loops around these accesses whose trips nothing states, in the order of the source."""
    found = {
        loop.place: loop
        for traffic in assumed
        for loop in traffic.access.loops
        if loop.tripcount is None and (loop.trips is None or loop.trips.known is None)
    }
    return [found[place] for place in sorted(found)]


def _parameters(facts: Facts, assumed: list[Traffic]) -> list[str]:
    """The kernel's arguments that would settle these sizes."""
    forms = [loop.trips for loop in _unsized_loops(assumed) if loop.trips is not None]
    forms += [traffic.access.offset for traffic in assumed]
    symbols = {symbol for form in forms for symbol in form.leaves() if symbol.kind == "parameter"}
    ordered = sorted(symbols, key=lambda symbol: symbol.number)
    return [name for name in dict.fromkeys(symbol.name for symbol in ordered) if name not in facts.given]


def _evidence(loop: LoopInstance) -> str:
    if loop.why_unknown or loop.trips is None:
        why = f": {loop.why_unknown}" if loop.why_unknown else ""
        return f"How often {the_loop(loop)} runs is not known{why}."
    hangs = [
        symbol.name
        for symbol in sorted(loop.trips.leaves(), key=lambda symbol: symbol.number)
        if symbol.kind in ("parameter", "data")
    ]
    return f"How often {the_loop(loop)} runs depends on {listed(hangs or [str(loop.trips)])}."
