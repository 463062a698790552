"""A board's memory, as facts with their sources."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass, field


@dataclass(frozen=True, slots=True)
class Board:
    """A memory system and the ports that reach it. Rates in 10^9 byte/s, times in ns, clocks in MHz, sizes in bytes."""

    name: str
    about: str
    channels: int
    channel_bytes: int  #: capacity of one channel
    peak_gbps: float  #: of one channel, before refresh
    granule_bytes: int  #: what the memory moves at least
    page_bytes: int
    refresh_ns: float  #: tRFC
    refresh_interval_ns: float  #: tREFI
    row_cycle_ns: float  #: tRC
    four_activates_ns: float  #: tFAW
    read_cap_gbps: float  #: what one channel gives to reads at best, measured; peak less refresh where not measured
    write_cap_gbps: float
    read_latency_ns: float  #: of one read as a kernel's port sees it, without its beats
    write_latency_ns: float  #: from a write's first beat to its answer, without its beats
    read_beat_factor: float  #: cycles that each beat of an outstanding read adds to its time
    write_gap_beats: float  #: beats lost between two write bursts
    request_cycles: float  #: cycles between two requests of one port
    kernel_mhz: float
    port_bits: int  #: widest port that pays
    burst_beats: int = 16  #: longest burst where no directive says it
    outstanding: int = 16
    widen_bits: int = 512
    sources: Mapping[str, str] = field(default_factory=dict)  #: by field name
