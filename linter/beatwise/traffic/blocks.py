"""Why a run cannot become bursts.

Source of the conditions: HLS user guide UG1399 (2023.2), "Preconditions and Limitations of Burst Transfer": all reads
or all writes; increasing and consecutive, without gap or overlap; length known before the request; at most one array
per port and direction at a time; no dependency until the burst ends; not volatile.
"""

from __future__ import annotations

from collections import defaultdict
from collections.abc import Sequence
from dataclasses import dataclass

from beatwise.model.access import Access, Guard, LoopInstance
from beatwise.model.traffic import Block, Walk
from beatwise.traffic.motion import drawn_in, moving_loop, varies
from beatwise.traffic.sites import Seat, Tests, exclusive, tests_of


@dataclass(frozen=True, slots=True)
class Neighbours:
    """The accesses of a kernel with their seats, found by loop. Indices count in ``accesses``."""

    accesses: Sequence[Access]
    seats: Sequence[Seat]
    guards: Sequence[tuple[Guard, ...]]  #: those that are left of each access's (`effective_guards`)
    tests: Sequence[Tests]  #: the conditions of each
    directly: dict[tuple[int, str, str], list[int]]  #: by innermost loop, interface and direction
    anywhere: dict[tuple[int, str, str], list[int]]  #: by any loop around, argument and direction


def neighbours(accesses: Sequence[Access], seats: Sequence[Seat], guards: Sequence[tuple[Guard, ...]]) -> Neighbours:
    """The accesses of one kernel, ready to ask who runs beside whom."""
    directly: dict[tuple[int, str, str], list[int]] = defaultdict(list)
    anywhere: dict[tuple[int, str, str], list[int]] = defaultdict(list)
    for index, access in enumerate(accesses):
        if access.unresolved is not None:
            continue
        for loop in access.loops:
            anywhere[loop.number, access.argument, access.direction].append(index)
        if access.loops:
            directly[access.loops[-1].number, access.interface, access.direction].append(index)
    return Neighbours(accesses, seats, guards, [tests_of(access) for access in accesses], directly, anywhere)


def blocked(index: int, walk: Walk, beside: Neighbours) -> tuple[Block, ...]:
    """All that keeps the access from bursts; empty when nothing does.

    What counts is the innermost loop that moves the access: a condition, a length or a choice that stays the same
    throughout that loop does no harm. What asks for its bursts itself is stopped by none of that.
    """
    access, loop = beside.accesses[index], moving_loop(beside.accesses[index])
    if access.unresolved is not None:
        return ()
    found: list[Block] = []
    if loop is not None:
        if not access.manual and any(_decides(guard, access, loop) for guard in beside.guards[index]):
            found.append("data-dependent-guard")
        if not access.manual and loop.data_exit is not None:
            found.append("data-dependent-exit")
        if not access.manual and _is_interleaved(index, beside):
            found.append("interleaved")
        if not access.manual and _is_updated(index, loop, beside):
            found.append("load-and-store")
    if access.volatile:
        found.append("volatile")
    if walk.pattern == "descending":
        found.append("not-ascending")
    if loop is not None and access.choice is not None and drawn_in(access.choice.selector, loop, access.loops):
        found.append("destination-by-data")
    return tuple(found)


def _decides(guard: Guard, access: Access, loop: LoopInstance) -> bool:
    """Whether data decides anew in each iteration. The condition of a choice, and of an exit, is told as such."""
    if access.choice is not None and guard.place == access.choice.place:
        return False
    if guard.leaves and loop.data_exit is not None:
        return False
    return drawn_in(guard.condition, loop, access.loops)


def _is_interleaved(index: int, beside: Neighbours) -> bool:
    """Whether another access of the same direction takes turns with it on the port, in each iteration."""
    access, seat = beside.accesses[index], beside.seats[index]
    if not _has_turns(access):
        return False
    return any(
        beside.seats[other].sweep != seat.sweep
        and _has_turns(beside.accesses[other])
        and not _same_site(access, beside.accesses[other])
        and exclusive(beside.tests[index], beside.tests[other]) is None
        for other in beside.directly[access.loops[-1].number, access.interface, access.direction]
    )


def _has_turns(access: Access) -> bool:
    """Whether its innermost loop moves it; one that stays put is kept in a register."""
    return varies(access.offset, access.loops[-1])


def _same_site(left: Access, right: Access) -> bool:
    """Whether both are alternatives of one choice."""
    return left.choice is not None and left.place == right.place and left.chain == right.chain


def _is_updated(index: int, loop: LoopInstance, beside: Neighbours) -> bool:
    """Whether the loop that moves the access also goes through the same argument in the other direction."""
    access = beside.accesses[index]
    opposite = "read" if access.direction == "write" else "write"
    others = beside.anywhere.get((loop.number, access.argument, opposite), ())
    conditions = (exclusive(beside.tests[index], beside.tests[other]) for other in others)
    return any(condition is None or varies(condition, loop) for condition in conditions)
