"""The walk is clean, but a beat carries a narrow element and the port can't be widened by itself.

A port moves one beat a cycle at most. With 4-byte elements that is 1.2 GB/s at 300 MHz, while 64 bytes a beat reach
what a memory channel can give. Tools widen a port on their own only where each run is known to start at a multiple of
the wide beat and to be a whole number of them; a length or an offset that is known at run time only prevents it.

It matters for long walks over elements narrower than 128 bits. It does not where the loop takes less than one element
a cycle anyway, or where little is moved.

What to change: declare the argument as words of the port's width and take the elements out of them on chip; or make
the length a whole number of wide beats in a way the compiler can see, and deal with the rest apart.

Slow::

    // Copies as many gates as the host asks for.
    void copy_gates(const float *gates, float *out, int n) {
    #pragma HLS INTERFACE mode=m_axi port=gates bundle=gates
    #pragma HLS INTERFACE mode=m_axi port=out bundle=out
        for (int i = 0; i < n; ++i) out[i] = gates[i];
    }

Fast::

    #include <ap_int.h>

    // Sixteen gates a beat.
    void copy_gates(const ap_uint<512> *gates, ap_uint<512> *out, int words) {
    #pragma HLS INTERFACE mode=m_axi port=gates bundle=gates
    #pragma HLS INTERFACE mode=m_axi port=out bundle=out
        for (int i = 0; i < words; ++i) out[i] = gates[i];
    }

Sources: unused lanes of a beat carry nothing (AXI4: ARM IHI 0022, section A3.4.1); 4 bytes x 300 MHz = 1.2 GB/s by
counting; the bound of 128 bits is our own choice.
"""

from __future__ import annotations

from collections.abc import Iterator

from beatwise.model.finding import Facts, Finding
from beatwise.model.traffic import Traffic
from beatwise_rules.advice import elements_a_beat
from beatwise_rules.evidence import port_of, trouble
from beatwise_rules.levels import share_of_bytes
from beatwise_rules.sites import never_jumps, sites
from beatwise_rules.wording import PASSIVE, count, gbps, quoted, size

NARROW_BITS = 128  #: an element that is wider is left in peace
SMALL_BYTES = 4096  #: a table that is smaller and read once is left in peace (our own choice: one page of addresses)
SMALL_SHARE = 0.25  #: provided that it is less than this of what the kernel moves (our own choice)
CURES: frozenset[str] = frozenset()


def find(facts: Facts) -> Iterator[Finding]:
    """One finding for each place and argument that is walked in order through a narrow port."""
    for site in sites(facts, lambda traffic: is_narrow(traffic) and not _is_small_table(facts, traffic)):
        worst, access = site[0], site[0].access
        beat_bytes = worst.width_bits // 8
        name = quoted(access.argument)
        yield trouble(
            "narrow-port",
            facts,
            site,
            message=f"{name} {PASSIVE[access.direction]} in order, but only {size(beat_bytes)} wide.",
            because=(
                f"At {facts.board.kernel_mhz:g} MHz a beat of {size(beat_bytes)} moves at most "
                f"{gbps(beat_bytes * facts.board.kernel_mhz / 1000)}; a port of this board may carry "
                f"{facts.board.port_bits // 8} bytes a beat.",
                f"It is not widened by itself: {_why_not(facts, worst)}.",
            ),
            instead=_advice(facts, worst),
        )


def is_narrow(traffic: Traffic) -> bool:
    """Whether an element walked in order is narrow, and stays so: a block that goes away may let the port widen."""
    walk, access = traffic.walk, traffic.access
    own_bits = 8 << (access.element_bytes - 1).bit_length()  # an element has a beat that is a power of two
    is_wide = traffic.width_bits >= NARROW_BITS and traffic.width_bits > own_bits
    if walk.pattern != "sequential" or access.element_bytes * 8 >= NARROW_BITS or is_wide:
        return False
    wide = NARROW_BITS // 8
    widens_unblocked = traffic.blocked and walk.run_multiple % wide == 0 and walk.start_multiple % wide == 0
    return not widens_unblocked


def _is_small_table(facts: Facts, traffic: Traffic) -> bool:
    """Whether it is a table that is read once beside much greater traffic."""
    if traffic.bytes_moved is None or traffic.bytes_moved >= SMALL_BYTES or not never_jumps(traffic):
        return False
    share = share_of_bytes(facts, [traffic])
    return share is None or share < SMALL_SHARE


def _why_not(facts: Facts, traffic: Traffic) -> str:
    walk, port, wide = traffic.walk, port_of(facts, traffic), NARROW_BITS // 8
    if traffic.access.manual:
        return "explicit burst requests keep the width of their type"
    if port is not None and port.widen_bits is not None and port.widen_bits < NARROW_BITS:
        return f"the port's own option allows {port.widen_bits} bits"
    odd_run, odd_start = walk.run_multiple % wide, walk.start_multiple % wide
    if odd_run and odd_start:
        return f"neither the start nor the length of a run is known to be a multiple of {wide} bytes"
    if odd_start:
        return f"a run is known to start at a multiple of {size(walk.start_multiple)} only, not of {wide}"
    if odd_run:
        return f"the length of a run is known to be a multiple of {size(walk.run_multiple)} only, not of {wide}"
    return "what blocks its bursts also keeps it narrow" if traffic.blocked else "the board's profile does not allow it"


def _advice(facts: Facts, traffic: Traffic) -> str:
    walk, wide = traffic.walk, NARROW_BITS // 8
    bits, lanes, name = facts.board.port_bits, elements_a_beat(facts, traffic), quoted(traffic.access.argument)
    words = f"Declare {name} as {bits}-bit words, {count(lanes, 'element')} a beat, and take the elements out on chip"
    if traffic.access.manual or not (walk.run_multiple % wide or walk.start_multiple % wide):
        return f"{words}."
    if walk.start_multiple % wide:
        return f"{words}; or let every run start and end at a multiple of {bits // 8} bytes, by padding its rows."
    return (
        f"{words}; or give its loop a length that is visibly a multiple of {lanes} (`n / {lanes} * {lanes}`), "
        "with the rest in a loop of its own."
    )
