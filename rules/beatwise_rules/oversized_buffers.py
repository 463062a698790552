"""A port keeps more block RAM than this board has use for.

For each direction a port has room on chip for all the beats that may be under way: outstanding transactions x longest
burst x width. What lies beyond rate x latency is never filled. Block RAM comes in blocks 512 words deep at most when
they are wide, so that a port of 512 bits takes 8 blocks of 36 Kb at least, and more only beyond 512 words.

It matters when blocks are short, and most of all with many ports: 32 of them take 32 times as much. It costs no
bandwidth.

What to change: lower the number of outstanding transactions, or the longest burst, to what covers the latency.

Slow::

    #include <ap_int.h>

    // As much as can be, to be on the safe side.
    void load_sweep(const ap_uint<512> *sweep, ap_uint<512> *out) {
    #pragma HLS INTERFACE mode=m_axi port=sweep bundle=sweep num_read_outstanding=64 max_read_burst_length=64
    #pragma HLS INTERFACE mode=m_axi port=out bundle=out
        for (int i = 0; i < 65536; ++i) out[i] = sweep[i];
    }

Fast::

    #include <ap_int.h>

    // As much as this memory needs.
    void load_sweep(const ap_uint<512> *sweep, ap_uint<512> *out) {
    #pragma HLS INTERFACE mode=m_axi port=sweep bundle=sweep num_read_outstanding=4 max_read_burst_length=64
    #pragma HLS INTERFACE mode=m_axi port=out bundle=out
        for (int i = 0; i < 65536; ++i) out[i] = sweep[i];
    }

Sources: outstanding x burst x word (HLS user guide UG1399, 2020.2, "Options for Controlling AXI4 Burst Behavior");
shapes of a 36 Kb block: library guide UG953, BRAM_SINGLE_MACRO; rate x latency: J. Little, Oper. Res. 9(3), 1961.
"""

from __future__ import annotations

from collections.abc import Iterator

from beatwise.model.access import Interface
from beatwise.model.finding import Facts, Finding
from beatwise.model.traffic import PortBuffer
from beatwise_rules.wording import count, quoted, size

LEAST_BLOCKS = 8  #: too many of 36 Kb; fewer are not worth a word (our own choice: one buffer of 512 bits)
CURES: frozenset[str] = frozenset()


def find(facts: Facts) -> Iterator[Finding]:
    """One note for each port and direction whose buffer is far larger than rate x latency."""
    interfaces = {port.name: port for port in facts.trace.interfaces}
    for port in facts.ports:
        for buffer in port.buffers:
            if buffer.blocks - buffer.enough_blocks >= LEAST_BLOCKS and port.interface in interfaces:
                yield _told(facts, interfaces[port.interface], buffer)


def _told(facts: Facts, port: Interface, buffer: PortBuffer) -> Finding:
    way, beat_bytes = buffer.direction, buffer.width_bits // 8
    has, needs = buffer.outstanding * buffer.burst_beats, buffer.enough * buffer.used_beats
    shorter = "" if buffer.used_beats == buffer.burst_beats else f" and `max_{way}_burst_length={buffer.used_beats}`"
    return Finding(
        rule="oversized-buffers",
        level="note",
        kernel=facts.trace.kernel,
        place=port.place,
        argument=None,
        interface=port.name,
        message=f"Port {quoted(port.name)} keeps {size(has * beat_bytes)} on chip for {way}s, "
        f"and {size(needs * beat_bytes)} would do.",
        because=(
            f"{buffer.outstanding} outstanding x {count(buffer.burst_beats, 'beat')} x {size(beat_bytes)} = "
            f"{size(has * beat_bytes)}: {count(buffer.blocks, 'block')} of 36 Kb.",
            f"On this board {buffer.enough} outstanding with bursts of {count(buffer.used_beats, 'beat')} get as much: "
            f"{count(buffer.enough_blocks, 'block')}.",
        ),
        instead=f"Give the port `num_{way}_outstanding={buffer.enough}`{shorter}.",
    )
