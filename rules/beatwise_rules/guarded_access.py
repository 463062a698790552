"""An access in a loop that happens only when data says so.

A burst promises every one of its beats; none may be left out (AXI4 has no early end). An access under a condition
that each iteration decides from data can't make that promise, so it goes out as single beats. Even the addresses that
do follow each other don't help: the port does not know beforehand that they will.

It matters for compaction, masked updates and thresholding. A condition that is the same for the whole inner loop, or
that depends on counters alone, does no harm: the loop runs in full or not at all.

What to change: move the condition from the access to the value. Read always and use the value only where the
condition holds; write always and choose what to write; or collect the accepted elements on chip and write them as a
burst each time the buffer is full.

Slow::

    // Keeps the echoes above the noise; the others stay as they were.
    void threshold(const float *power, float *echo) {
    #pragma HLS INTERFACE mode=m_axi port=power bundle=power
    #pragma HLS INTERFACE mode=m_axi port=echo bundle=echo
        for (int i = 0; i < 65536; ++i) {
            float p = power[i];
            if (p > 0.25f) echo[i] = p;
        }
    }

Fast::

    // Every gate is written; the condition picks the value.
    void threshold(const float *power, float *echo) {
    #pragma HLS INTERFACE mode=m_axi port=power bundle=power
    #pragma HLS INTERFACE mode=m_axi port=echo bundle=echo
        for (int i = 0; i < 65536; ++i) {
            float p = power[i];
            echo[i] = p > 0.25f ? p : 0.0f;
        }
    }

Sources: every beat of a burst is transferred, early termination is not allowed (AXI4: ARM IHI 0022, section A3.4.1);
1/(1-p) is the mean of a geometric law.
"""

from __future__ import annotations

from collections.abc import Iterator

from beatwise.model.finding import Facts, Finding
from beatwise.model.traffic import Traffic
from beatwise_rules.advice import a_buffer, burst_bytes, burst_elements
from beatwise_rules.evidence import trouble
from beatwise_rules.sites import blocked_by, data_in, moving_loop, named_data, sites
from beatwise_rules.wording import PASSIVE, count, lines, listed, quoted, sentence, size, the_loop

CURES = frozenset({"short-run"})


def find(facts: Facts) -> Iterator[Finding]:
    """One finding for each place and argument that data switches on and off."""
    for site in sites(facts, blocked_by("data-dependent-guard")):
        yield _told(facts, site)


def _told(facts: Facts, site: list[Traffic]) -> Finding:
    worst, access = site[0], site[0].access
    guards = [guard for guard in access.guards if guard.by_data]
    deciders = named_data(symbol for guard in guards for symbol in data_in(guard.condition))
    decided = listed(deciders) if deciders else "data"
    allow = "allow" if len(deciders) > 1 else "allows"
    where = f"The condition on {lines(guard.place.line for guard in guards)}" if guards else "Whether it runs"
    return trouble(
        "guarded-access",
        facts,
        site,
        message=f"{quoted(access.argument)} {PASSIVE[access.direction]} only when {decided} {allow} it, "
        f"so no burst can promise the {access.direction}.",
        because=(
            f"{where} is decided by {decided} in every iteration of {the_loop(moving_loop(access))}.",
            _odds(worst),
        ),
        instead=_advice(facts, worst),
    )


def _odds(traffic: Traffic) -> str:
    run = traffic.walk.run_elements
    if _is_packed(traffic):
        return (
            "The addresses follow each other, but whether the next one comes is known only when its data has arrived."
        )
    if traffic.walk.basis == "data" and run is not None and run > 1:
        odds = f"{1 - 1 / run:.2g}"
        return f"If it holds {odds} of the time, {count(run, 'element')} in a row are to be expected: 1/(1 - {odds})."
    return "If it holds with probability p, 1/(1 - p) elements in a row are to be expected: 2 for p = 1/2, 10 for 9/10."


def _is_packed(traffic: Traffic) -> bool:
    """Whether the address moves on only when the access happens, as in ``out[n++]``."""
    access = traffic.access
    return traffic.walk.pattern == "sequential" and moving_loop(access).counter not in access.offset.symbols()


def _advice(facts: Facts, traffic: Traffic) -> str:
    access, name = traffic.access, quoted(traffic.access.argument)
    if access.direction == "read":
        return (
            f"Read {name} in every iteration and use the value only where the condition holds: "
            f"the reads then join into bursts of up to {size(burst_bytes(facts, traffic))}."
        )
    entries = a_buffer(burst_elements(facts, traffic), access.element_bytes)
    collect = f"collect the accepted elements on chip and write {entries} at a time, one full burst."
    if _is_packed(traffic):
        return sentence(collect)
    return f"Write {name} in every iteration and let the condition choose the value; or {collect}"
