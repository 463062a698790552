"""What is measured about each access: its pattern and runs, the bursts they become, and the rate they get."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass
from typing import Literal

from beatwise.model.access import Access

Pattern = Literal[
    "sequential", "descending", "strided", "repeated", "indirect", "steered", "irregular", "single", "unresolved"
]
Basis = Literal["constant", "given", "tripcount", "assumed", "data"]
Block = Literal[
    "data-dependent-guard", "data-dependent-exit", "interleaved", "load-and-store", "volatile", "not-ascending",
    "destination-by-data",
]  # fmt: skip
Limit = Literal[
    "port", "width", "requests", "gaps", "order", "rows", "channel", "turnaround", "switch", "shared", "interval"
]


@dataclass(frozen=True, slots=True)
class Walk:
    """The order in which an access visits its elements.

    ``stride_bytes`` is the step of the innermost loop that moves it, when constant. ``run_elements`` is the mean number
    of consecutive ascending elements before the address first jumps. ``executions`` counts how often the access runs in
    one call of the kernel.
    """

    pattern: Pattern
    stride_bytes: int | None
    run_elements: float | None
    basis: Basis
    executions: float | None
    reason: str | None = None
    start_multiple: int = 1  #: every run is known to start at a multiple of this many bytes (from the argument's start)
    run_multiple: int = 1  #: every run is known to be a multiple of this many bytes long


@dataclass(frozen=True, slots=True)
class Traffic:
    """An access with all that is measured about it. GB/s are 10^9 bytes that the kernel uses, a second."""

    access: Access
    walk: Walk
    width_bits: int  #: of the port as this access uses it, after automatic widening
    burst_beats: int
    blocked: tuple[Block, ...]
    now_gbps: float
    could_gbps: float
    limit: Limit
    limits: Mapping[str, float]  #: GB/s by every limit that applies
    bytes_moved: float | None  #: in one call of the kernel; None where executions are not known

    @property
    def loss_gbps(self) -> float:
        """GB/s that the access could get and does not."""
        return max(0.0, self.could_gbps - self.now_gbps)


@dataclass(frozen=True, slots=True)
class PortTraffic:
    """One interface: its width, its channels, and what its accesses get together."""

    interface: str
    arguments: tuple[str, ...]
    width_bits: int
    channels: tuple[int, ...]
    now_gbps: float
    could_gbps: float
