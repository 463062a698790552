"""What one port asks of a memory channel, in a steady state: the question that `price` answers."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Literal


@dataclass(frozen=True, slots=True)
class Demand:
    """One port's traffic in one direction (``mixed``: both in turns). Sizes in bytes, clocks in MHz."""

    direction: Literal["read", "write", "mixed"]
    beat_bytes: int  #: of one beat as the port carries it
    used_bytes: float  #: of each beat, the bytes that count: less in part-filled beats and part-used records
    burst_beats: float  #: of one transaction; a mean where bursts differ
    outstanding: int  #: transactions that wait for their answers at a time, in one direction
    run_bytes: float | None  #: consecutive bytes before the address jumps; None: sequential without end
    stride_bytes: int | None = None  #: constant step from run to run; None with ``run_bytes``: random places
    channels: int = 1  #: how many channels this port reaches at random
    ports: int = 1  #: ports that share the channel
    users: int = 1  #: accesses that take turns on this port in this direction
    interval_cycles: float = 1  #: the loop issues one element each so many cycles
    clock_mhz: float | None = None  #: of the kernel; the board's where None
    crossing: tuple[tuple[int, int], ...] = ()  #: (port position, channel) pairs active together, this port's first
