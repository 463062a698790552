"""Accesses of a loop that belong together: parts of one element, neighbours in a run, branches that add up."""

from __future__ import annotations

from collections import Counter, defaultdict
from collections.abc import Hashable, Mapping, Sequence
from dataclasses import dataclass

from beatwise.model.access import Access, Guard
from beatwise.model.counting import only_counts
from beatwise.model.form import Form, Symbol, symbol_form
from beatwise.model.operations import negation
from beatwise.traffic.motion import moving_loop

Conditions = frozenset[Form]

BRANCHES_AT_MOST = 32  #: stores to one address whose conditions are put together; more are left as they are


@dataclass(frozen=True, slots=True)
class Seat:
    """Where an access stands among those of its loop. ``sweep`` and ``element`` only tell same from different."""

    sweep: int  #: accesses of one sweep make one ascending run together
    element: int  #: accesses of one element reach the same element in each iteration
    head: int  #: index of the access to the lowest element of the sweep
    elements: int  #: how many elements the sweep visits in an iteration
    alike: int  #: how many accesses use the same bytes of the element


def seats(accesses: Sequence[Access]) -> tuple[Seat, ...]:
    """For each access, its seat.

    ``a[3*i]``, ``a[3*i + 1]`` and ``a[3*i + 2]`` are one sweep of three elements; the fields of a record are one
    element. A window ``a[i]``, ``a[i + 1]`` is no sweep: it meets elements again in the next iteration.
    """
    keys = [_key(index, access) for index, access in enumerate(accesses)]
    parts = [(keys[index], access.part_bytes, _part(index, access)) for index, access in enumerate(accesses)]
    alike = Counter(parts)
    groups: dict[Hashable, list[int]] = defaultdict(list)
    for index, access in enumerate(accesses):
        groups[keys[index][0], _conditions(access.guards)].append(index)
    numbers: dict[Hashable, int] = {}
    found: list[Seat | None] = [None] * len(accesses)
    for group in groups.values():
        first = {keys[index][1]: index for index in reversed(group)}
        chains = _chains(sorted(first))
        for index in group:
            chain = chains[keys[index][1]]
            together = len(chain) > 1 and _step(accesses[index]) == len(chain) * accesses[index].element_bytes
            head = first[chain[0]] if together else index
            found[index] = Seat(
                sweep=numbers.setdefault(head if together else keys[index], len(numbers)),
                element=numbers.setdefault(keys[index], len(numbers)),
                head=head,
                elements=len(chain) if together else 1,
                alike=alike[parts[index]],
            )
    return tuple(seat for seat in found if seat is not None)


def effective_guards(accesses: Sequence[Access]) -> tuple[tuple[Guard, ...], ...]:
    """For each access, the guards that are left when those to the same address in other branches are put with it.

    The two stores of ``if (wet) out[i] = a; else out[i] = b;`` together run always: neither keeps a guard.
    """
    result = [access.guards for access in accesses]
    groups: dict[Hashable, list[int]] = defaultdict(list)
    for index, access in enumerate(accesses):
        if access.guards:
            groups[_key(index, access), access.offset.constant].append(index)
    for group in groups.values():
        if 1 < len(group) <= BRANCHES_AT_MOST:
            merged = _merged([(_conditions(accesses[index].guards), frozenset((index,))) for index in group])
            for index in group:
                least = min((conditions for conditions, origins in merged if index in origins), key=len)
                result[index] = tuple(guard for guard in accesses[index].guards if guard.condition in least)
    return tuple(result)


@dataclass(frozen=True, slots=True)
class Tests:
    """The conditions under which an access runs, ready to be held against another's."""

    conditions: Conditions
    opposites: Mapping[Form, Form]  #: the condition by its negation
    asked: Mapping[Form, tuple[int, Form]]  #: for ``x == 3``: by x, the number and the condition


def tests_of(access: Access) -> Tests:
    """What must hold for the access to run."""
    conditions = _conditions(access.guards)
    asked = ((condition, _number_asked(condition)) for condition in conditions)
    return Tests(
        conditions,
        {negation(condition): condition for condition in conditions},
        {what[0]: (what[1], condition) for condition, what in asked if what is not None},
    )


def exclusive(left: Tests, right: Tests) -> Form | None:
    """The condition on the left that keeps both from running in one iteration, if there is one."""
    for condition in left.conditions & right.opposites.keys():
        return condition
    for opposite in left.opposites.keys() & right.conditions:
        return left.opposites[opposite]
    for value in left.asked.keys() & right.asked.keys():
        if left.asked[value][0] != right.asked[value][0]:
            return left.asked[value][1]
    return None


def _opposite(left: Form, right: Form) -> bool:
    """Whether one is true where the other is false."""
    return right == negation(left) or left == negation(right)


def _number_asked(condition: Form) -> tuple[Form, int] | None:
    """``x`` and ``3`` of ``x == 3``."""
    symbols = condition.symbols()
    if len(symbols) == 1 and len(condition.terms) == 1 and condition.constant == 0:
        (symbol,) = symbols
        if symbol.kind == "operation" and symbol.name == "eq" and condition.terms[symbol,] == 1:
            value, asked = symbol.operands
            return (value - asked, 0) if asked.known is None else (value - value.constant, asked.known - value.constant)
    return None


def _conditions(guards: tuple[Guard, ...]) -> Conditions:
    return frozenset(guard.condition for guard in guards)


def _key(index: int, access: Access) -> tuple[Hashable, float]:
    """The family (equal but for a constant in the address), and the number of the element in it."""
    if not access.loops or access.unresolved is not None:
        return index, 0
    constant, size = access.offset.constant, access.element_bytes
    family = (
        access.argument,
        access.interface,
        access.direction,
        size,
        access.loops[-1].number,
        access.offset - constant,
    )
    return family, constant / size


def _part(index: int, access: Access) -> Hashable:
    """Which part of the element is used; of lanes nothing but their size is known, so each is taken for another."""
    return index if access.covers.endswith("[]") else access.covers


def _chains(slots: Sequence[float]) -> dict[float, list[float]]:
    """For each of the ascending slots, the slots that follow each other without a gap around it."""
    chains: dict[float, list[float]] = {}
    for slot in slots:
        chains[slot] = chains.get(slot - 1, [])
        chains[slot].append(slot)
    return chains


def _step(access: Access) -> int | None:
    """Bytes by which the loop that moves the access moves it, where that is constant."""
    loop = moving_loop(access)
    if loop is None:
        return None
    step = access.offset.coefficient(loop.counter)
    if step is not None and step.known:
        return step.known
    carried = [r for r in loop.recurrences if r.symbol in access.offset.symbols()]
    if len(carried) != 1 or not only_counts(carried[0].next, carried[0].symbol):
        return None
    factor = access.offset.coefficient(carried[0].symbol)
    moved = _moves(carried[0].next, carried[0].symbol)
    return factor.known * moved.pop() if factor is not None and factor.known and len(moved) == 1 else None


def _moves(step: Form, symbol: Symbol) -> set[int]:
    """By how much a counter moves on the branches on which it does by a plain number."""
    if step.symbols() and (only := next(iter(step.symbols()))).name == "select" and step == symbol_form(only):
        return {move for arm in only.operands[1:] for move in _moves(arm, symbol)}
    move = (step - symbol_form(symbol)).known
    return {move} if move else set()


def _merged(found: list[tuple[Conditions, frozenset[int]]]) -> list[tuple[Conditions, frozenset[int]]]:
    """``found``, and what follows where two sets differ only in one condition, true in one and false in the other."""
    for left, left_origins in found:  # the list grows while it is read
        for right, right_origins in found:
            mine, theirs = left - right, right - left
            if len(mine) != 1 or len(theirs) != 1 or not _opposite(*mine, *theirs):
                continue
            both = (left & right, left_origins | right_origins)
            if both not in found and len(found) < 4 * BRANCHES_AT_MOST:
                found.append(both)
    return found
