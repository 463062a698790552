"""What is measured about each access: its pattern and runs, the bursts they become, and the rate they get."""

from __future__ import annotations

from collections.abc import Iterable, Mapping, Sequence
from dataclasses import dataclass
from typing import Literal

from beatwise.model.access import Access, Direction
from beatwise.model.place import Place

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
    apart_gbps: float = 0.0  #: and with a port and a channel for its argument, as far as the board has channels

    @property
    def loss_gbps(self) -> float:
        """GB/s that the access could get and does not."""
        return max(0.0, self.could_gbps - self.now_gbps)


@dataclass(frozen=True, slots=True)
class PortBuffer:
    """What a port keeps on chip for one direction: room for all beats that may be under way.

    ``enough`` is the least power of two of outstanding transactions, at the longest bursts that the port's accesses
    make, from which on more gain nothing on this board. Blocks are of 36 Kb.
    """

    direction: Direction
    outstanding: int
    burst_beats: int  #: the longest that the port may make
    used_beats: int  #: the longest that its accesses do make
    width_bits: int
    blocks: int
    enough: int
    enough_blocks: int
    gbps: float  #: what such bursts get, alone, with ``outstanding``
    enough_gbps: float  #: and with ``enough``


@dataclass(frozen=True, slots=True)
class PortTraffic:
    """One interface: its width, its channels, and what its accesses get together."""

    interface: str
    arguments: tuple[str, ...]
    width_bits: int
    channels: tuple[int, ...]
    now_gbps: float
    could_gbps: float
    buffers: tuple[PortBuffer, ...] = ()  #: one for each direction in use


LEAST_GAIN = 1e-9  #: of the time; less is but rounding
NONE_BETTER: Mapping[tuple[int, str], float] = {}


@dataclass(frozen=True, slots=True)
class AccessTime:
    """How long one access keeps its port busy in one call of the kernel, in seconds: as it is, and at best.

    ``port`` is the interface and the direction. Accesses of one ``turn`` share it iteration by iteration, and their
    rates say so; turns follow each other.
    """

    key: tuple[int, str]  #: order and argument: which access it is
    port: tuple[str, Direction]
    turn: int
    seconds: float
    could_seconds: float


@dataclass(frozen=True, slots=True)
class LoopTime:
    """An innermost loop: its ports go on side by side, so it takes as long as the slowest of them.

    ``issue_seconds`` is what its FIFOs need in any case, one element a cycle each; 0 where it has none.
    """

    place: Place
    name: str | None  #: its label
    process: tuple[str, int] | None  #: the dataflow process it runs in, and the line it is called on
    bytes_moved: float
    accesses: tuple[AccessTime, ...]
    issue_seconds: float = 0.0
    basis: Basis = "constant"  #: the weakest that its time rests on

    @property
    def known(self) -> bool:
        """Whether its time rests on sizes that somebody stated."""
        return self.basis != "assumed"

    def seconds(self, better: Mapping[tuple[int, str], float] = NONE_BETTER) -> float:
        """In one call of the kernel, if the accesses in ``better`` (order and argument) took these seconds instead."""
        return self._slowest((each, better.get(each.key, each.seconds)) for each in self.accesses)

    @property
    def could_seconds(self) -> float:
        """The same, if all its accesses got what they could."""
        return self._slowest((each, each.could_seconds) for each in self.accesses)

    def _slowest(self, times: Iterable[tuple[AccessTime, float]]) -> float:
        ports: dict[tuple[str, Direction], dict[int, float]] = {}
        for access, seconds in times:
            turns = ports.setdefault(access.port, {})
            turns[access.turn] = max(turns.get(access.turn, 0.0), seconds)
        return max(self.issue_seconds, *(sum(turns.values()) for turns in ports.values()), 0.0)


@dataclass(frozen=True, slots=True)
class KernelTime:
    """One call of the kernel: loops in sequence add up, dataflow processes run side by side, the slowest counts.

    All numbers rest on 1024 for sizes that nobody stated; ``known`` says whether there are none. Waiting for the first
    answer at the start of a loop, and loops that neither reach memory nor a FIFO, are not counted.
    """

    loops: tuple[LoopTime, ...]
    peak_gbps: float  #: of all channels of the board
    basis: Basis = "constant"  #: the weakest that a time rests on
    wanted: tuple[str, ...] = ()  #: arguments of the kernel whose sizes would make times known
    unsized: tuple[int, ...] = ()  #: lines of loops that only a trip-count directive can size
    lost: int = 0  #: accesses that could not be followed: their time is not in any sum

    @property
    def known(self) -> bool:
        """Whether ``total`` is a time, and not only good for the rates between its parts."""
        return bool(self.loops) and self.basis != "assumed" and not self.lost

    def total(self, better: Mapping[tuple[int, str], float] = NONE_BETTER) -> float:
        """Seconds of one call, if the accesses in ``better`` (order and argument) took these seconds instead."""
        return self._sum((loop, loop.seconds(better)) for loop in self.loops)

    def gain(self, better: Iterable[Traffic]) -> float:
        """The share of a call's time, from 0 to 1, that falls away if these accesses get what they could."""
        before = self.total()
        share = 1 - self.total(_best_seconds(better)) / before if before > 0 else 0.0
        return share if share > LEAST_GAIN else 0.0

    def saved(self, better: Sequence[Traffic]) -> float | None:
        """Seconds of a call that fall away with it; None where sizes that matter are not known.

        A loop in sequence saves what it saves, whatever the others take; a process may wait for another.
        """
        if self.known:
            return self.gain(better) * self.total()
        seconds = _best_seconds(better)
        touched = [loop for loop in self.loops if any(each.key in seconds for each in loop.accesses)]
        if not touched or not all(loop.known and loop.process is None for loop in touched):
            return None
        return sum(max(0.0, loop.seconds() - loop.seconds(seconds)) for loop in touched)

    @property
    def could_total(self) -> float:
        """Seconds of one call, if all accesses got what they could."""
        return self._sum((loop, loop.could_seconds) for loop in self.loops)

    @staticmethod
    def _sum(times: Iterable[tuple[LoopTime, float]]) -> float:
        sums: dict[tuple[str, int] | None, float] = {}
        for loop, seconds in times:
            sums[loop.process] = sums.get(loop.process, 0.0) + seconds
        return sums.pop(None, 0.0) + max(sums.values(), default=0.0)

    @property
    def seconds(self) -> float | None:
        """Of one call; None where a size is not known."""
        return self.total() if self.known else None

    @property
    def bytes_moved(self) -> float:
        """That the kernel uses in one call, reads and writes together."""
        return sum(loop.bytes_moved for loop in self.loops)

    @property
    def gbps(self) -> float:
        """The rate of the whole call, all ports together."""
        return self.bytes_moved / self.total() / 1e9 if self.total() > 0 else 0.0

    @property
    def could_gbps(self) -> float:
        """The same after all advice."""
        return self.bytes_moved / self.could_total / 1e9 if self.could_total > 0 else 0.0


def _best_seconds(better: Iterable[Traffic]) -> dict[tuple[int, str], float]:
    """What each of the accesses would take if it got what it could."""
    return {
        (item.access.order, item.access.argument): (item.bytes_moved or 0.0) / item.could_gbps / 1e9
        for item in better
        if item.could_gbps > 0
    }
