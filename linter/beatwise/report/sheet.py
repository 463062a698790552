"""What every report shows of one kernel: plain values, small enough to hand between processes.

A ``Sheet`` holds no forms and no syntax. Access rows are merged here: one for each site, argument and direction, unless
two calls of the same helper were measured differently.
"""

from __future__ import annotations

from collections.abc import Iterable
from dataclasses import dataclass, replace

from beatwise.model.access import Access, Direction, Guard, Trace
from beatwise.model.finding import LEVELS, Finding, Level
from beatwise.model.form import redrawn_in
from beatwise.model.kernel import Problem
from beatwise.model.place import Place
from beatwise.model.traffic import Basis, Block, KernelTime, Limit, Pattern, PortTraffic, Traffic


@dataclass(frozen=True, slots=True)
class AccessRow:
    """One access site for one argument. ``executions`` adds up all calls that were measured alike."""

    place: Place
    argument: str
    interface: str
    direction: Direction
    element_bytes: int
    pattern: Pattern
    stride_bytes: int | None
    run_elements: float | None
    basis: Basis
    width_bits: int
    burst_beats: int
    loop_line: int | None  #: of the innermost loop around it
    guarded: bool  #: data decides whether it runs
    blocked: tuple[Block, ...]
    executions: float | None
    now_gbps: float
    could_gbps: float
    limit: Limit
    reason: str | None


@dataclass(frozen=True, slots=True)
class StreamRow:
    """A FIFO, or an array of ``count``, with the functions at its ends; ``depth`` is None where nothing says it."""

    name: str
    count: int
    depth: int | None
    element_bits: int
    producers: tuple[str, ...]
    consumers: tuple[str, ...]


@dataclass(frozen=True, slots=True)
class Sheet:
    """One kernel as reports show it; ``findings`` the dearest first."""

    kernel: str
    file: str
    line: int
    interfaces: tuple[PortTraffic, ...]
    undeclared: tuple[str, ...]  #: interfaces that no directive asks for: a port of its own was taken for each
    accesses: tuple[AccessRow, ...]
    streams: tuple[StreamRow, ...]
    findings: tuple[Finding, ...]
    time: KernelTime


@dataclass(frozen=True, slots=True)
class Survey:
    """All kernels that were found, and what could not be done.

    ``failed``: a file that the user named, or all there was, could not be read in full.
    """

    kernels: tuple[Sheet, ...]
    problems: tuple[Problem, ...]
    board: str
    failed: bool = False


def sheet(
    trace: Trace,
    traffic: Iterable[Traffic],
    ports: Iterable[PortTraffic],
    findings: Iterable[Finding],
    time: KernelTime,
) -> Sheet:
    """The sheet of one kernel, from all that was measured about it."""
    return Sheet(
        kernel=trace.kernel,
        file=trace.file,
        line=trace.place.line,
        interfaces=tuple(ports),
        undeclared=tuple(interface.name for interface in trace.interfaces if not interface.declared),
        accesses=merged(map(_row, traffic)),
        streams=_streams(trace),
        findings=dearest_first(findings),
        time=time,
    )


def merged(rows: Iterable[AccessRow]) -> tuple[AccessRow, ...]:
    """The rows in the order of the source; those that differ in executions alone become one, their sum."""
    sums: dict[AccessRow, float | None] = {}
    for row in rows:
        key = replace(row, executions=None)
        before = sums.get(key, 0)
        sums[key] = None if before is None or row.executions is None else before + row.executions
    together = (replace(row, executions=executions) for row, executions in sums.items())
    return tuple(sorted(together, key=lambda row: (row.place.file, row.place.offset, row.argument, row.direction)))


def dearest_first(findings: Iterable[Finding]) -> tuple[Finding, ...]:
    """By loss, then level, then place; those without a loss last."""
    return tuple(
        sorted(findings, key=lambda f: (-(f.loss_gbps or 0), LEVELS.index(f.level), f.place, f.rule, f.argument or ""))
    )


def grouped(findings: Iterable[Finding]) -> tuple[tuple[Finding, ...], ...]:
    """The findings, those together that say the same of different arguments; in the order of the first of each."""
    alike: dict[object, list[Finding]] = {}
    for finding in findings:
        alike.setdefault(_without_names(finding), []).append(finding)
    return tuple(map(tuple, alike.values()))


def _without_names(finding: Finding) -> object:
    """What a finding says when its own argument, interface and line are left out."""

    def anonymous(text: str) -> str:
        for name in filter(None, (finding.argument, finding.interface)):
            text = text.replace(f"`{name}`", "`")
        return text.replace(f"line {finding.place.line}", "line")

    said = tuple(map(anonymous, (finding.message, *finding.because, finding.instead)))
    return finding.rule, finding.level, finding.accepted, finding.loss_gbps, finding.then, finding.place.file, said


def at_or_above(findings: Iterable[Finding], threshold: Level) -> tuple[Finding, ...]:
    """Those that count: at ``threshold`` or graver, and not accepted in the source."""
    grave = LEVELS[: LEVELS.index(threshold) + 1]
    return tuple(finding for finding in findings if finding.level in grave and finding.accepted is None)


def _row(traffic: Traffic) -> AccessRow:
    access, walk = traffic.access, traffic.walk
    around = [loop.place.line for loop in access.loops if loop.kind == "loop"]
    return AccessRow(
        place=access.place,
        argument=access.argument,
        interface=access.interface,
        direction=access.direction,
        element_bytes=access.element_bytes,
        pattern=walk.pattern,
        stride_bytes=walk.stride_bytes,
        run_elements=walk.run_elements,
        basis=walk.basis,
        width_bits=traffic.width_bits,
        burst_beats=traffic.burst_beats,
        loop_line=around[-1] if around else None,
        guarded=any(guard.by_data and _decided_in(guard, access) for guard in access.guards),
        blocked=traffic.blocked,
        executions=walk.executions,
        now_gbps=traffic.now_gbps,
        could_gbps=traffic.could_gbps,
        limit=traffic.limit,
        reason=walk.reason or access.unresolved,
    )


def _decided_in(guard: Guard, access: Access) -> bool:
    """Whether the guard is decided anew in a loop around the access, not once before all of them."""
    numbers = {loop.number for loop in access.loops}
    return any(numbers & redrawn_in(symbol) for symbol in guard.condition.leaves())


def _streams(trace: Trace) -> tuple[StreamRow, ...]:
    return tuple(
        StreamRow(
            stream.name,
            stream.count,
            stream.depth,
            stream.element_bits,
            producers=_ends(trace, stream.name, "write"),
            consumers=_ends(trace, stream.name, "read"),
        )
        for stream in trace.streams
    )


def _ends(trace: Trace, stream: str, operation: str) -> tuple[str, ...]:
    used = sorted(
        (o for o in trace.operations if o.stream == stream and o.operation == operation), key=lambda o: o.order
    )
    return tuple(dict.fromkeys(o.function for o in used))
