"""From a program to what each of its top functions does to memory."""

from __future__ import annotations

import sys
from collections.abc import Mapping
from dataclasses import replace

from beatwise.model.access import Access, Stream, Trace
from beatwise.model.form import Symbol, number, parameter, symbol_form
from beatwise.model.kernel import Function, Problem, Program, Variable
from beatwise.model.place import Place
from beatwise.model.types import (
    ArrayType,
    BurstPointerType,
    IntType,
    PointerType,
    RecordType,
    ReferenceType,
    StreamType,
    Type,
)
from beatwise.trace.aggregates import aggregated_bytes, without_padding
from beatwise.trace.interfaces import interfaces_of, is_memory
from beatwise.trace.loops import Looper
from beatwise.trace.machine import STEPS_AT_MOST, Frame, OutOfSteps
from beatwise.trace.state import State
from beatwise.trace.steering import steered
from beatwise.trace.values import LocalSpot, MemorySpot, Number, Path, Pointer, Record, Root, Value, size_of

DEEPEST = 20_000  #: Python frames: a deep nest of calls and expressions is followed by recursion


class Tracer(Looper):
    """A machine that starts at a top function."""

    def note_stream(self, variable: Variable) -> None:
        found = stream_in(variable.type)
        if found is None:
            return
        kind, count = found
        depth = kind.depth
        for directive in variable.directives:
            if directive.kind == "stream" and directive.number("depth") is not None:
                depth = directive.number("depth")
        if variable.name not in self.record.streams:
            self.record.streams[variable.name] = Stream(
                variable.name, count, depth, _bits(kind.element), variable.place
            )


def stream_in(kind: Type) -> tuple[StreamType, int] | None:
    """The FIFO type of a variable, and how many there are; None when it holds none."""
    count = 1
    while isinstance(kind, ReferenceType | PointerType | ArrayType):
        if isinstance(kind, ArrayType):
            count *= kind.count or 1
            kind = kind.element
        else:
            kind = kind.to
    return (kind, count) if isinstance(kind, StreamType) else None


def _bits(kind: Type) -> int:
    return kind.bits if isinstance(kind, IntType) else kind.bytes * 8


def trace_program(program: Program, given: Mapping[str, int]) -> tuple[Trace, ...]:
    """Each top function's accesses and stream operations.

    ``given`` are sizes by name: of scalar arguments, or of variables whose value the source does not tell.
    """
    before = sys.getrecursionlimit()
    sys.setrecursionlimit(max(before, DEEPEST))
    try:
        return tuple(_trace(program, program.functions[key], given) for key in program.tops)
    finally:
        sys.setrecursionlimit(before)


def _trace(program: Program, top: Function, given: Mapping[str, int]) -> Trace:
    ports, arguments = interfaces_of(top)
    machine = Tracer(program, arguments, given)
    frame = Frame(top, 0, {}, None, ())
    machine.frame = frame
    state = State({}, ())
    parameters: dict[str, Symbol] = {}
    problems: list[Problem] = []
    for key, variable in program.globals.items():
        if not variable.constant and (key, 0) not in state.cells:
            machine.define_global(key, state)
    for variable in top.parameters:
        root: Root = (variable.key, 0)
        frame.roots[variable.key] = root
        machine.types[root] = variable.type
        machine.names[root] = variable.name
        machine.note_stream(variable)
        kind = variable.type
        if variable.name in arguments:
            held: Value = Pointer(memory_of(variable.name, kind))
            if isinstance(kind, ArrayType):
                machine.types[root] = ReferenceType(kind)
            state.cells[root] = {(): held}
        elif stream_in(kind) is not None:
            state.cells[root] = {}
            while isinstance(kind, ReferenceType | PointerType):
                kind = kind.to
            machine.types[root] = kind
        else:
            while isinstance(kind, ReferenceType):
                kind = kind.to
            machine.types[root] = kind
            value = _scalar(variable.name, kind, variable, given, parameters)
            state.cells[root] = {}
            if value is not None:
                state.write(LocalSpot(root, (), kind), value)
    try:
        if top.body is not None:
            machine.calls.append(top.key)
            machine.run(top.body, state)
    except OutOfSteps:
        problems.append(
            Problem(
                top.place.file,
                top.place.line,
                f"{top.name}: not followed to its end ({STEPS_AT_MOST} steps were taken)",
            )
        )
    except RecursionError:
        problems.append(Problem(top.place.file, top.place.line, f"{top.name}: nested too deeply to be followed"))
    machine.record.forget_places_of_written()
    accesses, operations = machine.record.finished()
    accesses = without_padding(accesses, aggregated_bytes(top))
    accesses = steered(tuple(_jumped(access, machine.jumps) for access in accesses))
    parameters.update(machine.given_used)
    silent = machine.touched - {access.argument for access in accesses}
    problems += [
        Problem(
            top.place.file, top.place.line, f"{top.name}: no access through {name} was found, although it is mentioned"
        )
        for name in arguments
        if name in silent
    ]
    problems += [Problem(place.file, place.line, what) for place, what in dict.fromkeys(machine.notes)]
    return Trace(
        kernel=top.name,
        file=top.place.file,
        place=top.place,
        interfaces=ports,
        accesses=accesses,
        streams=tuple(machine.record.streams.values()),
        operations=operations,
        parameters=parameters,
        directives=top.directives,
        inventions=program.inventions,
        problems=(*program.problems, *problems),
        dataflow=any(d.kind == "dataflow" for d in top.directives),
    )


def _jumped(access: Access, jumps: Mapping[tuple[Place, ...], int]) -> Access:
    """The access, unresolved where a goto in one of the functions around it makes its order unknown."""
    for depth in range(len(access.chain) + 1):
        line = jumps.get(access.chain[:depth])
        if line is not None:
            return replace(access, unresolved=f"the goto on line {line} is not followed")
    return access


def memory_of(name: str, kind: Type) -> MemorySpot:
    """The start of an argument's memory."""
    while isinstance(kind, ReferenceType):
        kind = kind.to
    if isinstance(kind, PointerType | BurstPointerType):
        return MemorySpot(name, number(0), size_of(kind.to), kind.to)
    if isinstance(kind, ArrayType):
        return MemorySpot(name, number(0), kind.bytes or size_of(kind.element), kind)
    return MemorySpot(name, number(0), kind.bytes, kind)


def _scalar(
    name: str, kind: Type, variable: Variable, given: Mapping[str, int], parameters: dict[str, Symbol]
) -> Value | None:
    """A scalar argument: a parameter; a record's fields each one."""
    if isinstance(kind, RecordType):
        parts: dict[Path, Value] = {}
        for field in kind.fields:
            value = _scalar(f"{name}.{field.name}", field.type, variable, given, parameters)
            if isinstance(value, Record):
                parts.update({(field.name, *path): part for path, part in value.parts.items()})
            elif value is not None:
                parts[(field.name,)] = value
        return Record(parts)
    if is_memory(kind) or isinstance(kind, StreamType):
        return None
    size = given.get(name)
    low: int | None = size
    high: int | None = size
    if size is None and isinstance(kind, IntType):
        low = 0
        high = (1 << kind.bits) - 1 if kind.bits < 31 else None
    symbol = parameter(name, low, high, variable.place)
    parameters[name] = symbol
    return Number(symbol_form(symbol))
