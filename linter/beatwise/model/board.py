"""A board's memory, as facts with their sources."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass, field


@dataclass(frozen=True, slots=True)
class Board:
    """A memory system and the ports that reach it. Rates in 10^9 byte/s, times in ns, clocks in MHz, sizes in bytes."""

    name: str
    about: str
    channels: int  #: memories that are addressed on their own
    channel_bytes: int  #: capacity of one channel
    peak_gbps: float  #: of one channel, before refresh
    granule_bytes: int  #: what the memory moves at least
    page_bytes: int  #: of one row of one bank, all devices of the channel together
    refresh_ns: float  #: tRFC
    refresh_interval_ns: float  #: tREFI
    row_cycle_ns: float  #: tRC
    four_activates_ns: float  #: tFAW
    read_cap_gbps: float  #: what one channel gives to reads at best, measured; peak less refresh where not measured
    write_cap_gbps: float  #: the same for writes
    read_latency_ns: float  #: of one read as a kernel's port sees it, without its beats
    write_latency_ns: float  #: from the end of a write's beats to its answer
    read_beat_factor: float  #: cycles that each beat of an outstanding read adds to its time
    write_gap_beats: float  #: beats lost between two write bursts
    request_cycles: float  #: cycles between two requests of one port
    kernel_mhz: float  #: clock of kernels and ports
    port_bits: int  #: widest port that pays
    burst_beats: int = 16  #: longest burst where no directive says it
    outstanding: int = 16  #: transactions of one direction that a port has under way, where no directive says it
    widen_bits: int = 512  #: up to which the HLS flow widens ports by itself
    ranks: int = 1  #: of one channel; each has activation windows of its own
    bank_groups: int = 1  #: of one rank
    banks_per_group: int = 8  #: all banks where there are no groups
    address_map: str = ""  #: bits above the granule, high to low: "row bank:2 group:2 column:7"; "": that order
    same_group_ns: float = 0.0  #: tCCD_L; 0: no slower than the bus
    activate_gap_ns: float = 0.0  #: tRRD_S
    activate_gap_same_group_ns: float = 0.0  #: tRRD_L
    activate_ns: float = 0.0  #: tRCD
    precharge_ns: float = 0.0  #: tRP
    reorder_requests: int = 40  #: that the controller holds at a time and may serve out of order
    request_bytes: int = 0  #: longest piece of a transaction that it holds as one request; 0: a granule
    batch_granules: int = 40  #: granules of one direction before the bus turns around, when both wait
    turnaround_ns: float = 14.0  #: idle data bus at each change of direction
    order_turn_ns: float = 150.0  #: what a port waits when its next transaction goes to another channel
    switch_ports: int = 0  #: ports (and channels) of one switch; 0: every port has its channel, no switch
    lateral_links: int = 0  #: each way, between neighbouring switches
    sources: Mapping[str, str] = field(default_factory=dict)  #: by field name

    @property
    def refreshed_gbps(self) -> float:
        """The peak of a channel less its refresh time."""
        return self.peak_gbps * (1 - self.refresh_ns / self.refresh_interval_ns)
