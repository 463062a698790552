"""Seconds: how long each loop and the kernel take, from what each access moves and gets.

An access takes the bytes it moves over the rate it gets. Ports of one loop run in lockstep, at the pace of the slowest;
loops in sequence add up; dataflow processes run side by side, and the slowest is the region's time.
"""

from __future__ import annotations

from collections.abc import Iterable, Mapping, Sequence
from dataclasses import dataclass, field

from beatwise.model.access import Access, LoopInstance, StreamOperation, Trace
from beatwise.model.board import Board
from beatwise.model.form import ZERO
from beatwise.model.traffic import AccessTime, Basis, KernelTime, LoopTime, Traffic
from beatwise.traffic import runs

_GRAVITY: tuple[Basis, ...] = ("constant", "given", "tripcount", "data", "assumed")


@dataclass
class _Loop:
    """What is known of one loop so far."""

    loop: LoopInstance
    process: tuple[str, int] | None
    accesses: list[AccessTime] = field(default_factory=list)
    bytes_moved: float = 0.0
    issue_seconds: float = 0.0
    basis: Basis = "constant"


def kernel_time(trace: Trace, traffic: Sequence[Traffic], board: Board, given: Mapping[str, int]) -> KernelTime:
    """The times of a kernel's loops; those that neither reach memory nor a FIFO are not among them."""
    loops: dict[tuple[int, tuple[str, int] | None], _Loop] = {}
    counted = [item for item in traffic if item.access.loops and item.bytes_moved and item.now_gbps > 0]
    for item in counted:
        own = _of(loops, item.access)
        own.bytes_moved += item.bytes_moved or 0.0
        own.accesses.append(_access_time(item))
        own.basis = max(own.basis, _basis(item, given), key=_GRAVITY.index)
    for operation, executions in _steady(trace.operations, given):
        interval = max(1, operation.loops[-1].interval or 1)
        own = _of(loops, operation)
        own.issue_seconds = max(own.issue_seconds, executions * interval / (board.kernel_mhz * 1e6))
    bases = [_basis(item, given) for item in counted]
    assumed = [item.access for item, basis in zip(counted, bases, strict=True) if basis == "assumed"]
    unsized = _unsized(assumed)
    return KernelTime(
        loops=tuple(
            LoopTime(
                own.loop.place,
                own.loop.label,
                own.process,
                own.bytes_moved,
                tuple(own.accesses),
                own.issue_seconds,
                own.basis,
            )
            for own in loops.values()
        ),
        peak_gbps=board.peak_gbps * board.channels,
        basis=max(bases, key=_GRAVITY.index, default="constant"),
        wanted=_wanted(assumed, unsized, given),
        unsized=tuple(sorted({loop.place.line for loop in unsized if not _sized_by_names(loop)})),
        lost=sum(item.walk.pattern == "unresolved" and bool(item.access.loops) for item in traffic),
    )


def working_loop(loops: Sequence[LoopInstance]) -> LoopInstance:
    """The innermost loop whose iterations follow each other in time: one unrolled in full is hardware side by side."""
    return next((loop for loop in reversed(loops) if loop.unroll != 0), loops[0])


def process_of(access: Access | StreamOperation) -> tuple[str, int] | None:
    """The dataflow process: its function, and the line of the call, for a function may be two processes."""
    if access.process is None:
        return None
    return access.process, access.chain[0].line if access.chain else 0


def _of(loops: dict[tuple[int, tuple[str, int] | None], _Loop], access: Access | StreamOperation) -> _Loop:
    loop, process = working_loop(access.loops), process_of(access)
    return loops.setdefault((loop.number, process), _Loop(loop, process))


def _access_time(item: Traffic) -> AccessTime:
    access, moved = item.access, (item.bytes_moved or 0.0) / 1e9
    return AccessTime(
        key=(access.order, access.argument),
        port=(access.interface, access.direction),
        turn=access.loops[-1].number,
        seconds=moved / item.now_gbps,
        could_seconds=moved / max(item.could_gbps, item.now_gbps, item.apart_gbps),
    )


def _steady(operations: Iterable[StreamOperation], given: Mapping[str, int]) -> Iterable[tuple[StreamOperation, float]]:
    """The stream operations whose number is known, each with that number. Of the others nothing is claimed."""
    counted: dict[object, float | None] = {}
    for operation in operations:
        loops = tuple(loop for loop in operation.loops if loop.unroll != 0)
        if not loops or operation.operation == "test":
            continue
        key = (tuple(loop.number for loop in loops), operation.guards)
        if key not in counted:
            counted[key] = _count(operation, loops, given)
        executions = counted[key]
        if executions:
            yield operation, executions


def _count(operation: StreamOperation, loops: tuple[LoopInstance, ...], given: Mapping[str, int]) -> float | None:
    """How often it happens; None where a size is not known or data decides."""
    access = Access(
        operation.place, operation.chain, operation.function, operation.stream, operation.stream, "read", 1, 1, ZERO,
        loops, operation.guards, operation.order,
    )  # fmt: skip
    if runs.size_basis(access, given) in ("assumed", "data"):
        return None
    return runs.walk(access, given).executions


def _basis(item: Traffic, given: Mapping[str, int]) -> Basis:
    """The weakest that the time of the access rests on: how much it moves, and how fast."""
    bases = (item.walk.basis, runs.size_basis(item.access, given))
    return max(bases, key=_GRAVITY.index)


def _unsized(accesses: Iterable[Access]) -> list[LoopInstance]:
    """The loops around these accesses whose trips nothing states."""
    return [
        loop
        for access in accesses
        for loop in access.loops
        if loop.tripcount is None and (loop.trips is None or loop.trips.known is None)
    ]


def _sized_by_names(loop: LoopInstance) -> bool:
    """Whether arguments of the kernel say how often it runs."""
    leaves = loop.trips.leaves() if loop.trips is not None else frozenset()
    return any(leaf.kind == "parameter" for leaf in leaves) and all(
        leaf.kind in ("parameter", "counter", "operation") for leaf in leaves
    )


def _wanted(accesses: Iterable[Access], unsized: Iterable[LoopInstance], given: Mapping[str, int]) -> tuple[str, ...]:
    """The kernel's arguments that sizes hang on, in their order."""
    forms = [loop.trips for loop in unsized if loop.trips is not None]
    for access in accesses:
        conditions = (guard.condition for guard in access.guards)
        forms += [
            access.offset,
            *(form for form in conditions if not any(leaf.kind == "data" for leaf in form.leaves())),
        ]
    symbols = {leaf for form in forms for leaf in form.leaves() if leaf.kind == "parameter"}
    ordered = sorted(symbols, key=lambda symbol: symbol.number)
    return tuple(dict.fromkeys(symbol.name for symbol in ordered if symbol.name not in given))
