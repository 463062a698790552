"""Reads and writes meet on one memory channel, which must turn its data bus around between them.

The data pins of a memory carry one direction at a time. Each change costs some idle nanoseconds, and a controller that
gathers requests of one direction before it changes can only make the changes rarer. A channel that serves both at the
same time gives each its part of a smaller whole.

It matters when the channel is the limit: wide ports, long bursts. It does not where the loop or the port is slower than
that anyway. A board with one channel leaves no choice but that of time, so that there it is never more than a note.

What to change: put what is read and what is written on channels of their own. Where there is one channel only, load a
large block on chip, then store a large block, instead of both at the same time.

Slow::

    #include <ap_int.h>

    // Source and destination lie in one memory.
    void copy_sweep(const ap_uint<512> *sweep, ap_uint<512> *out) {
    #pragma HLS INTERFACE mode=m_axi port=sweep bundle=gmem
    #pragma HLS INTERFACE mode=m_axi port=out bundle=gmem
        for (int i = 0; i < 65536; ++i) out[i] = sweep[i];
    }

Fast::

    #include <ap_int.h>

    // Each has a memory of its own.
    void copy_sweep(const ap_uint<512> *sweep, ap_uint<512> *out) {
    #pragma HLS INTERFACE mode=m_axi port=sweep bundle=sweep
    #pragma HLS INTERFACE mode=m_axi port=out bundle=out
        for (int i = 0; i < 65536; ++i) out[i] = sweep[i];
    }

Sources: the bus turns around between reads and writes (JESD79-4, JESD235; write-to-read and read-to-write timings);
measured on a card with four DDR4-2400 channels, reads and writes on one channel reach 68 % of its peak (README log of a
public example suite, bandwidth test); the figures here follow from the board's profile.
"""

from __future__ import annotations

from collections.abc import Iterator, Sequence
from dataclasses import replace

from beatwise.model.finding import Facts, Finding
from beatwise.model.traffic import Traffic
from beatwise_rules.levels import weighed
from beatwise_rules.sites import goes_on
from beatwise_rules.wording import gbps, listed, quoted

LEAST_GAIN = 0.01  #: of the kernel's time; a channel that nobody waits for may turn as it likes (our own choice)
AT_ITS_LIMIT = 0.98  #: of what the turning channel allows: an access that gets less is held by something else
CURES: frozenset[str] = frozenset()


def find(facts: Facts) -> Iterator[Finding]:
    """One finding for each channel, and each loop or dataflow region, that it holds back by turning around."""
    groups: dict[tuple[tuple[int, ...], int], list[Traffic]] = {}
    ports = {port.interface: port.channels for port in facts.ports}
    for traffic in facts.traffic:
        if goes_on(traffic) and "turnaround" in traffic.limits:
            where = 0 if traffic.access.process is not None else traffic.access.loops[-1].number
            groups.setdefault((ports.get(traffic.access.interface, ()), where), []).append(traffic)
    for (channel, _), group in groups.items():
        better = [replace(traffic, could_gbps=_apart(facts, traffic)) for traffic in group]
        if len({traffic.access.direction for traffic in group}) == 2 and _is_felt(facts, better):
            yield _told(facts, channel, better)


def _is_felt(facts: Facts, better: Sequence[Traffic]) -> bool:
    """Whether the kernel would be faster: in its loop, or beside it, nothing else is slower than the channel."""
    return facts.time is not None and facts.time.gain(better) > LEAST_GAIN


def _is_held(traffic: Traffic) -> bool:
    """Whether the turning is what it waits for; where it jumps or stops by itself, that comes first."""
    if traffic.blocked or traffic.walk.pattern != "sequential":
        return False
    return traffic.limits["turnaround"] * AT_ITS_LIMIT <= traffic.now_gbps


def _told(facts: Facts, channel: Sequence[int], group: Sequence[Traffic]) -> Finding:
    board = facts.board
    worst = max(group, key=lambda traffic: traffic.loss_gbps)
    now, could = worst.now_gbps, worst.could_gbps
    loads = [traffic.access.argument for traffic in group if traffic.access.direction == "read"]
    stores = [traffic.access.argument for traffic in group if traffic.access.direction == "write"]
    ports = list(dict.fromkeys(traffic.access.interface for traffic in group))
    where = f"channel {channel[0]}" if channel and board.channels > 1 else "the one channel of this board"
    finding = Finding(
        rule="read-write-turnaround",
        level="note",
        kernel=facts.trace.kernel,
        place=worst.access.place,
        argument=None,
        interface=ports[0] if len(ports) == 1 else None,
        message=f"{listed(loads)} {_verb(loads)} read and {listed(stores)} written on {where} at the same time, "
        "which turns around between them.",
        because=(
            f"Alone, {where} gives {gbps(board.read_cap_gbps)} to reads or {gbps(board.write_cap_gbps)} to writes; "
            f"of both at once, {quoted(worst.access.argument)} has {gbps(now)}.",
            f"Apart it would get {gbps(could)}.",
        ),
        instead=_advice(facts, loads, stores),
        now_gbps=now,
        could_gbps=could,
        loss_gbps=max(0.0, could - now),
        seconds_saved=None if facts.time is None else facts.time.saved(group),
    )
    return weighed([finding], facts)[0]


def _apart(facts: Facts, traffic: Traffic) -> float:
    """What the access would get if its channel served one direction: all its time, or, on the only one, by turns."""
    gone = ("turnaround",) if facts.board.channels == 1 else ("turnaround", "shared")
    rest = [rate for name, rate in traffic.limits.items() if name not in gone]
    return max(traffic.now_gbps, min(rest)) if _is_held(traffic) and rest else traffic.now_gbps


def _verb(names: Sequence[str]) -> str:
    return "is" if len(set(names)) == 1 else "are"


def _advice(facts: Facts, loads: Sequence[str], stores: Sequence[str]) -> str:
    if facts.board.channels == 1:
        return (
            f"Load a large block of {listed(loads)} on chip, then store a large block of {listed(stores)}: "
            "the channel then turns around once a block."
        )
    return (
        f"Give {listed(stores)} a port of its own, and that one of the {facts.board.channels} channels that "
        f"{listed(loads)} {'does' if len(set(loads)) == 1 else 'do'} not use."
    )
