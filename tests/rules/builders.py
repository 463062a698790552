"""Facts built by hand: one access at a time, with what was measured about it."""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from dataclasses import dataclass
from itertools import count
from typing import Any

from beatwise.model.access import Access, Choice, Direction, Guard, Interface, LoopInstance, Trace
from beatwise.model.board import Board
from beatwise.model.finding import Facts
from beatwise.model.form import Form, counter, data, number, operation, parameter, symbol_form
from beatwise.model.kernel import Invention
from beatwise.model.place import Place
from beatwise.model.traffic import Basis, Block, Limit, Pattern, PortTraffic, Traffic, Walk
from beatwise.traffic.time import kernel_time

BOARD = Board(
    name="hbm2-32ch",
    about="32 channels",
    channels=32,
    channel_bytes=1 << 28,
    peak_gbps=14.4,
    granule_bytes=32,
    page_bytes=1024,
    refresh_ns=260,
    refresh_interval_ns=3900,
    row_cycle_ns=48,
    four_activates_ns=16,
    read_cap_gbps=13.27,
    write_cap_gbps=13.18,
    read_latency_ns=253,
    write_latency_ns=202,
    read_beat_factor=1.2,
    write_gap_beats=4,
    request_cycles=4,
    kernel_mhz=300,
    port_bits=512,
)

_numbers = count(1)


def at(line: int, column: int = 9, file: str = "sweep.cpp") -> Place:
    """A place; its offset follows from line and column."""
    return Place(file, line, column, line, column + 4, line * 100 + column)


def loop(name: str, line: int, trips: int | str | None = 1024, **more: Any) -> LoopInstance:
    """A loop over ``name``; ``trips`` by number, by the name of a kernel argument, or not known."""
    number_of_loop = next(_numbers)
    form = (
        number(trips) if isinstance(trips, int) else None if trips is None else symbol_form(parameter(trips, 0, None))
    )
    return LoopInstance(number_of_loop, counter(name, number_of_loop), at(line), "kernel", form, **more)


def over(*steps: tuple[LoopInstance, int], start: int = 0) -> Form:
    """An address that moves by so many bytes with each loop."""
    form = number(start)
    for each, step in steps:
        form = form + symbol_form(each.counter) * step
    return form


def loaded(name: str, line: int, *loops: LoopInstance, high: int | None = None) -> Form:
    """A value read from ``name`` anew in every iteration of the loops."""
    return symbol_form(data(name, at(line), tuple(each.number for each in loops), low=0, high=high))


def guard(name: str, line: int, *loops: LoopInstance) -> Guard:
    """A condition that data from ``name`` decides."""
    return Guard(operation("lt", number(0), loaded(name, line, *loops)), at(line))


def choice(name: str, line: int, alternatives: Sequence[str], *loops: LoopInstance) -> Choice:
    """A destination that data from ``name`` picks."""
    return Choice(loaded(name, line, *loops), at(line), tuple(alternatives))


@dataclass
class Kernel:
    """A kernel being written down, access by access."""

    name: str = "sweep"

    def __post_init__(self) -> None:
        self.traffic: list[Traffic] = []
        self.inventions: list[Invention] = []
        self.options: dict[str, dict[str, Any]] = {}

    def access(
        self,
        argument: str,
        line: int,
        loops: Sequence[LoopInstance],
        offset: Form | None = None,
        *,
        direction: Direction = "read",
        pattern: Pattern = "sequential",
        stride: int | None = 4,
        run: float | None = 1024,
        basis: Basis = "constant",
        executions: float | None = 65536,
        element: int = 4,
        part: int | None = None,
        width: int | None = None,
        beats: int = 1,
        blocked: Sequence[Block] = (),
        now: float = 0.25,
        could: float = 13.27,
        limit: Limit = "requests",
        limits: Mapping[str, float] | None = None,
        multiple: int = 64,
        interface: str | None = None,
        column: int = 9,
        **more: Any,
    ) -> Kernel:
        """Adds an access."""
        part_bytes = element if part is None else part
        address = offset if offset is not None else over(*((each, element) for each in loops[-1:]))
        access = Access(
            place=at(line, column), chain=(), function="kernel", argument=argument, interface=interface or argument,
            direction=direction, element_bytes=element, part_bytes=part_bytes, offset=address, loops=tuple(loops),
            **{"guards": (), "order": len(self.traffic), **more},
        )  # fmt: skip
        walk = Walk(pattern, stride, run, basis, executions, start_multiple=multiple, run_multiple=multiple)
        self.traffic.append(
            Traffic(
                access=access,
                walk=walk,
                width_bits=width or element * 8,
                burst_beats=beats,
                blocked=tuple(blocked),
                now_gbps=now,
                could_gbps=could,
                limit=limit,
                limits=limits or {limit: now},
                bytes_moved=None if executions is None else executions * part_bytes,
            )
        )
        return self

    def clean(self, argument: str, line: int, loops: Sequence[LoopInstance], **more: Any) -> Kernel:
        """Adds an access that gets all it can."""
        well = {"width": 512, "beats": 16, "now": 13.27, "limit": "channel", "run": 65536}
        return self.access(argument, line, loops, **{**well, **more})

    def port(self, name: str, **options: Any) -> Kernel:
        """Sets options of an interface."""
        self.options[name] = options
        return self

    def missing(self, name: str, line: int, what: Any = "constant") -> Kernel:
        """Adds a name that was stood in for."""
        self.inventions.append(Invention(name, what, at(line)))
        return self

    def facts(self, given: Mapping[str, int] | None = None, board: Board = BOARD) -> Facts:
        """The facts of the kernel so far."""
        arguments: dict[str, list[str]] = {}
        for traffic in self.traffic:
            names = arguments.setdefault(traffic.access.interface, [])
            if traffic.access.argument not in names:
                names.append(traffic.access.argument)
        ports = tuple(
            Interface(name, tuple(names), at(2 + row, 1), True, {}, **self.options.get(name, {}))
            for row, (name, names) in enumerate(arguments.items())
        )
        trace = Trace(
            self.name, "sweep.cpp", at(1, 6), ports, tuple(traffic.access for traffic in self.traffic), (), (), {}, (),
            tuple(self.inventions), (),
        )  # fmt: skip
        totals = tuple(PortTraffic(port.name, port.arguments, 512, (0,), 1.0, 13.27) for port in ports)
        time = kernel_time(trace, self.traffic, board, given or {})
        return Facts(trace, board, tuple(self.traffic), totals, given or {}, time)
