"""Loop nests built by hand, and the slow, obvious way to walk them: every iteration is visited."""

from __future__ import annotations

import random
from collections.abc import Iterator, Mapping
from dataclasses import replace
from itertools import count, pairwise
from typing import Any

from beatwise.memory import board
from beatwise.model import form as forms
from beatwise.model.access import Access, Choice, Guard, Interface, LoopInstance, Trace
from beatwise.model.board import Board
from beatwise.model.form import Form, Symbol, number, symbol_form
from beatwise.model.place import Place
from beatwise.model.traffic import Traffic, Walk
from beatwise.traffic import measure
from helpers.forms import evaluate

_count = count(1)
HBM, DDR = board("hbm2-32ch"), board("ddr4-2400-1ch")


def place(line: int = 1) -> Place:
    """Somewhere of its own in a made-up file."""
    return Place("sweep.cpp", line, 1, line, 2, next(_count))


def loop(name: str, trips: int | Form | None, **more: Any) -> LoopInstance:
    """A loop of the nest."""
    serial = next(_count)
    known = number(trips) if isinstance(trips, int) else trips
    return LoopInstance(serial, forms.counter(name, serial), place(), "sweep", known, **more)


def at(instance: LoopInstance) -> Form:
    """The counter of a loop."""
    return symbol_form(instance.counter)


def drawn(*loops: LoopInstance, name: str = "mask") -> Form:
    """A value read from memory anew in every iteration of the loops."""
    return symbol_form(forms.data(name, place(), tuple(each.number for each in loops), low=0, high=1))


def read(argument: str, offset: Form, *loops: LoopInstance, size: int = 4, **more: Any) -> Access:
    """A load of ``size`` bytes through a port named like the argument, unless ``interface`` says otherwise."""
    guards = tuple(Guard(each, place()) if isinstance(each, Form) else each for each in more.pop("guards", ()))
    plain = Access(
        place=place(), chain=(), function="sweep", argument=argument, interface=argument, direction="read",
        element_bytes=size, part_bytes=size, offset=offset, loops=loops, guards=guards, order=next(_count),
    )  # fmt: skip
    return replace(plain, **more)


def write(argument: str, offset: Form, *loops: LoopInstance, **more: Any) -> Access:
    """A store."""
    return read(argument, offset, *loops, direction="write", **more)


def choice(selector: Form, *alternatives: str) -> Choice:
    """A pick among arguments."""
    return Choice(selector, place(), alternatives)


def trace(*accesses: Access, ports: Mapping[str, Mapping[str, Any]] | None = None) -> Trace:
    """A kernel of these accesses; ``ports`` gives options of interfaces by name."""
    interfaces = []
    for name in dict.fromkeys(access.interface for access in accesses):
        arguments = tuple(dict.fromkeys(access.argument for access in accesses if access.interface == name))
        interfaces.append(Interface(name, arguments, place(), True, **(ports or {}).get(name, {})))
    return Trace("sweep", "sweep.cpp", place(), tuple(interfaces), accesses, (), (), {}, (), (), ())


def traffic(
    *accesses: Access, board: Board = HBM, ports: Mapping[str, Mapping[str, Any]] | None = None
) -> tuple[Traffic, ...]:
    """What is measured about each of them."""
    return measure(trace(*accesses, ports=ports), board, {}).traffic


# ------------------------------------------------------------------------------------------------- the slow walk


def walk_by_counting(access: Access, given: Mapping[str, int]) -> Walk:
    """The walk, by visiting every iteration; loaded values are drawn at random."""
    if access.unresolved is not None:
        return Walk("unresolved", None, None, "data", None, access.unresolved)
    size = access.element_bytes
    visited = [offset // size * size for offset in _visits(access, given)]
    steps = [after - before for before, after in pairwise(visited)]
    if not steps:
        return Walk("single", None, 1.0, "constant", float(len(visited)))
    lengths = [1]
    starts = [visited[0]]
    for offset, step in zip(visited[1:], steps, strict=True):
        if step == size:
            lengths[-1] += 1
        else:
            lengths.append(1)
            starts.append(offset)
    usual = max(sorted(set(steps)), key=steps.count)
    pattern: Any = {size: "sequential", -size: "descending", 0: "repeated"}.get(usual, "strided")
    by_data = any(symbol.kind == "data" for symbol in access.offset.leaves())
    return Walk(
        "indirect" if by_data else pattern, None if by_data else usual, sum(lengths) / len(lengths), "constant",
        float(len(visited)), None, _shared(starts), _shared([length * size for length in lengths]),
    )  # fmt: skip


def _shared(values: list[int]) -> int:
    """The greatest power of two, up to 4096, that divides all."""
    return next(power for power in (4096 >> shift for shift in range(13)) if all(v % power == 0 for v in values))


def _visits(access: Access, given: Mapping[str, int]) -> Iterator[int]:
    draw = random.Random(1)

    def inside(loops: tuple[LoopInstance, ...], counters: dict[Symbol, int]) -> Iterator[int]:
        def value_of(symbol: Symbol) -> int:
            if symbol.kind == "counter":
                return counters[symbol]
            if symbol.kind == "parameter":
                return given[symbol.name]
            return draw.randint(symbol.low or 0, symbol.high if symbol.high is not None else 1000)

        if not loops:
            memo: dict[Symbol, int] = {}
            if all(evaluate(guard.condition, value_of, memo) for guard in access.guards):
                yield evaluate(access.offset, value_of, memo)
            return
        first, *rest = loops
        for turn in range(evaluate(first.trips, value_of) if first.trips is not None else 64):
            yield from inside(tuple(rest), {**counters, first.counter: turn})

    yield from inside(access.loops, {})
