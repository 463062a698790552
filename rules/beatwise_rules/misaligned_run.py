"""The runs are long and in order, but they start at the wrong places.

A wide beat starts at a multiple of its width, and no burst crosses a multiple of 4 KB. Where rows start at multiples of
16 bytes only, a port can't be made wider than that for them, although their length would allow 64. And where a burst
starts in the middle of a 4 KB page, it is cut in two at its end: each piece costs a request and a gap of its own.

It matters for rows of an odd pitch: a frame with a header of a few elements, a matrix padded by one. It does not where
the port has its full width already and the channel, not the port, is the limit.

What to change: pad the rows so that each starts at a multiple of the port's width, and of a burst where that is cheap.
The host lays the data out once; the kernel reads it every time.

Slow::

    // Rows of 1024 gates behind a header of four.
    void load_gates(const float *rays, float *gates) {
    #pragma HLS INTERFACE mode=m_axi port=rays bundle=rays
    #pragma HLS INTERFACE mode=m_axi port=gates bundle=gates
        for (int ray = 0; ray < 360; ++ray)
            for (int gate = 0; gate < 1024; ++gate) gates[ray * 1024 + gate] = rays[ray * 1028 + 4 + gate];
    }

Fast::

    // The header is padded to sixteen.
    void load_gates(const float *rays, float *gates) {
    #pragma HLS INTERFACE mode=m_axi port=rays bundle=rays
    #pragma HLS INTERFACE mode=m_axi port=gates bundle=gates
        for (int ray = 0; ray < 360; ++ray)
            for (int gate = 0; gate < 1024; ++gate) gates[ray * 1024 + gate] = rays[ray * 1040 + 16 + gate];
    }

Sources: bursts start at a beat and cross no multiple of 4096 bytes (AXI4: ARM IHI 0022, section A3.4.1); arguments are
taken to start at such a multiple (common practice, no source).
"""

from __future__ import annotations

from collections.abc import Iterator

from beatwise.model.finding import Facts, Finding
from beatwise.model.traffic import Traffic
from beatwise_rules.advice import BOUNDARY_BYTES
from beatwise_rules.evidence import port_of, trouble
from beatwise_rules.narrow_port import is_narrow
from beatwise_rules.sites import moving_loop, sites
from beatwise_rules.wording import PASSIVE, count, quoted, size, the_loop

LEAST_LOSS = 0.03  #: of what the access could get; bursts that are cut for less are not worth a word
CURES: frozenset[str] = frozenset()


def find(facts: Facts) -> Iterator[Finding]:
    """One finding for each place and argument whose runs start where neither a beat nor a burst would."""
    for site in sites(facts, lambda traffic: _is_held_narrow(facts, traffic) or _is_cut(traffic)):
        yield _told(facts, site)


def _is_aligned_otherwise(traffic: Traffic) -> bool:
    """Whether it walks in order, wide enough and unhindered: the start alone may be wrong."""
    in_order = traffic.walk.pattern == "sequential" and not traffic.blocked and not traffic.access.manual
    return in_order and not is_narrow(traffic)


def _widest(facts: Facts, traffic: Traffic) -> int:
    """Bytes of the widest beat that the port may have for this access."""
    port = port_of(facts, traffic)
    option = None if port is None else port.widen_bits
    return min(facts.board.port_bits, facts.board.widen_bits if option is None else option) // 8


def _is_held_narrow(facts: Facts, traffic: Traffic) -> bool:
    """Whether the port would be wider if the runs started at a multiple of that width."""
    wide, walk = _widest(facts, traffic), traffic.walk
    return (
        _is_aligned_otherwise(traffic)
        and traffic.width_bits < 8 * wide
        and walk.run_multiple % wide == 0
        and walk.start_multiple % wide != 0
        and traffic.loss_gbps >= LEAST_LOSS * traffic.could_gbps
    )


def _is_cut(traffic: Traffic) -> bool:
    """Whether bursts are cut at 4 KB boundaries, and that costs something."""
    burst_bytes = traffic.burst_beats * traffic.width_bits // 8
    return (
        _is_aligned_otherwise(traffic)
        and traffic.burst_beats > 1
        and traffic.walk.start_multiple % burst_bytes != 0
        and traffic.limit in ("requests", "gaps")
        and traffic.loss_gbps >= LEAST_LOSS * traffic.could_gbps
    )


def _told(facts: Facts, site: list[Traffic]) -> Finding:
    worst, access, walk = site[0], site[0].access, site[0].walk
    beat, name = worst.width_bits // 8, quoted(access.argument)
    loop = the_loop(moving_loop(access))
    if _is_held_narrow(facts, worst):
        wide = _widest(facts, worst)
        message = (
            f"The runs of {name} start at multiples of {size(walk.start_multiple)} only, so its port carries "
            f"{size(beat)} a beat instead of {wide}."
        )
        because = (
            f"Each run in {loop} is a multiple of {size(wide)} long: the length would allow it, the start does not."
        )
        instead = f"Pad the rows of {name} so that each starts at a multiple of {size(wide)}."
    else:
        burst = worst.burst_beats * beat
        message = f"The bursts of {name}, which {PASSIVE[access.direction]} in order, are cut at 4 KB boundaries."
        because = (
            f"A run in {loop} starts at a multiple of {size(walk.start_multiple)}, its bursts are "
            f"{count(worst.burst_beats, 'beat')} or {size(burst)}: some reach over a multiple of "
            f"{size(BOUNDARY_BYTES)} and are two."
        )
        instead = f"Pad the rows of {name} so that each starts at a multiple of {size(burst)}."
    return trouble("misaligned-run", facts, site, message=message, because=(because,), instead=instead)
