"""What holds a port back, each limit alone, in GB/s (10^9 byte/s) on the bus. The least of them is what the port gets.

``burst_beats`` beats of ``beat_bytes`` bytes make a transaction; ``mhz`` is the kernel's clock. The constants stand in
the board files, with the measurements they come from; ``tests/memory/test_limits.py`` holds the other measured points
against what follows from them.
"""

from __future__ import annotations


def port(beat_bytes: int, mhz: float) -> float:
    """One beat in every cycle. The name of this limit is ``width`` where the port could be wider.

    >>> port(64, 300), port(4, 300)
    (19.2, 1.2)
    """
    return beat_bytes * mhz / 1000


def requests(
    burst_beats: float, beat_bytes: int, mhz: float, *, outstanding: int, latency_ns: float, beat_factor: float
) -> float:
    """``outstanding`` transactions at a time, each answered ``latency_ns`` and its own beats later.

    Little's law (Oper. Res. 9(3), 1961). ``beat_factor`` is how many cycles each beat adds to that time.
    """
    cycles = latency_ns * mhz / 1000 + beat_factor * burst_beats
    return outstanding * burst_beats * port(beat_bytes, mhz) / cycles


def request_rate(burst_beats: float, beat_bytes: int, mhz: float, *, request_cycles: float) -> float:
    """One transaction in every ``request_cycles`` cycles at most. Told as part of ``requests``.

    >>> request_rate(1, 64, 300, request_cycles=4)
    4.8
    """
    return burst_beats * port(beat_bytes, mhz) / request_cycles


def gaps(burst_beats: float, beat_bytes: int, mhz: float, *, gap_beats: float) -> float:
    """Bursts of writes with ``gap_beats`` beats lost between two of them: L / (L + gap) of the port.

    >>> round(gaps(16, 64, 300, gap_beats=4), 2)
    15.36
    """
    return port(beat_bytes, mhz) * burst_beats / (burst_beats + gap_beats)


def channel(cap_gbps: float, transaction_bytes: float, granule_bytes: int) -> float:
    """What a memory channel gives, when it moves whole granules and a transaction needs only part of the last one.

    >>> channel(13.27, 512, 32), channel(16.0, 8, 32)
    (13.27, 4.0)
    """
    granules = -(-transaction_bytes // granule_bytes)
    return cap_gbps * transaction_bytes / (granules * granule_bytes)


def refreshed(peak_gbps: float, refresh_ns: float, refresh_interval_ns: float) -> float:
    """The peak of a channel less the time that it spends refreshing: 1 - tRFC / tREFI.

    >>> round(refreshed(14.4, 260, 3900), 2), round(refreshed(19.2, 350, 7800), 2)
    (13.44, 18.34)
    """
    return peak_gbps * (1 - refresh_ns / refresh_interval_ns)


def writes_in_flight(
    burst_beats: float, beat_bytes: int, mhz: float, *, outstanding: int, latency_ns: float, gap_beats: float
) -> float:
    """Writes with few outstanding: a port that serves bursts in L + gap cycles, each answered ``latency_ns`` later.

    Mean value analysis of a closed network of one queue and one delay (Reiser, Lavenberg, J. ACM 27(2), 1980; from
    memory). Tends to `gaps` for many outstanding, to Little's law for few.

    >>> round(writes_in_flight(16, 64, 300, outstanding=1000, latency_ns=140, gap_beats=4), 2)
    15.36
    """
    serve, think, waiting, rate = burst_beats + gap_beats, latency_ns * mhz / 1000, 0.0, 0.0
    for number in range(1, min(outstanding, 512) + 1):
        answer = serve * (1 + waiting)
        rate = number / (think + answer)
        waiting = rate * answer
    return rate * burst_beats * port(beat_bytes, mhz)


def order(run_bytes: float, channels: int, gbps: float, *, turn_ns: float) -> float:
    """One port over K channels, at random: it waits ``turn_ns`` whenever the channel changes, 1 - 1/K of the times.

    Answers of one AXI identity come in order (ARM IHI 0022), so that transactions to different channels do not overlap.

    >>> round(order(256, 2, 13.27, turn_ns=150), 2), round(order(256, 1, 13.27, turn_ns=150), 2)
    (2.71, 13.27)
    """
    return run_bytes / (run_bytes / gbps + (1 - 1 / channels) * turn_ns)


def interval(used_bytes: float, mhz: float, interval_cycles: float) -> float:
    """One beat's useful bytes in every ``interval_cycles`` cycles.

    >>> interval(64, 300, 4)
    4.8
    """
    return used_bytes * mhz / 1000 / interval_cycles
