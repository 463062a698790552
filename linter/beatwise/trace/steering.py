"""Destinations that branches pick: stores (or loads) of different arguments of which data lets only one run."""

from __future__ import annotations

from collections import defaultdict
from collections.abc import Sequence
from dataclasses import replace

from beatwise.model.access import Access, Choice, Guard
from beatwise.model.form import Form, number
from beatwise.model.operations import both, either, negation
from beatwise.trace.logic import always
from beatwise.trace.values import compared


def steered(accesses: Sequence[Access]) -> tuple[Access, ...]:
    """The accesses, with a choice on those that a branch on data picks among different arguments.

    ``if (s == 0) a[i] = x; else b[i] = x;`` is the choice that ``(s == 0 ? a : b)[i] = x`` is. Two accesses exclude
    each other when one's guard is the other's negation, or compares the same value with another constant.
    """
    groups: dict[object, list[int]] = defaultdict(list)
    for at, access in enumerate(accesses):
        if access.choice is None and access.loops and any(_decides(g, access) for g in access.guards):
            groups[(access.loops[-1].number, access.direction)].append(at)
    result = list(accesses)
    for members in groups.values():
        for family in _families(accesses, members):
            together = [accesses[at] for at in family]
            names = tuple(
                name for name in dict.fromkeys(a.argument for a in together) if not _in_any_case(name, together)
            )
            if len({_branches(name, together) for name in names}) < 2:
                continue  # they go together, in whichever branch
            for at in family:
                if accesses[at].argument in names:
                    others = [access for access in together if access.argument in names]
                    result[at] = _chosen(accesses[at], others, names)
    return tuple(result)


def _in_any_case(argument: str, family: Sequence[Access]) -> bool:
    """Whether the argument is used whichever way the branches go: it is then no alternative."""
    shared = 0
    while all(len(access.guards) > shared for access in family) and (
        len({access.guards[shared].condition for access in family}) == 1
    ):
        shared += 1
    reached = number(0)
    for access in family:
        if access.argument == argument:
            condition = number(1)
            for guard in access.guards[shared:]:
                condition = both(condition, guard.condition)
            reached = either(reached, condition)
    return always(reached)


def _branches(argument: str, family: Sequence[Access]) -> frozenset[tuple[Form, ...]]:
    """The conditions under which the argument is used, one for each branch."""
    own = (access for access in family if access.argument == argument)
    return frozenset(tuple(guard.condition for guard in access.guards) for access in own)


def _decides(guard: Guard, access: Access) -> bool:
    """Whether the guard is data's, and tested in the loops that move the access."""
    numbers = {loop.number for loop in access.loops}
    return guard.by_data and bool(numbers.intersection(guard.loops))


def _families(accesses: Sequence[Access], members: Sequence[int]) -> list[list[int]]:
    """Members that exclude each other, directly or through a third."""
    families: list[list[int]] = []
    for at in members:
        touching = [f for f in families if any(exclusive(accesses[at], accesses[other]) for other in f)]
        merged = [at]
        for family in touching:
            merged = family + merged
            families.remove(family)
        families.append(sorted(merged))
    return [family for family in families if len(family) > 1]


def exclusive(first: Access, second: Access) -> tuple[Guard, Guard] | None:
    """The guards by which at most one of the two runs."""
    for a in first.guards:
        for b in second.guards:
            if a is b or not (a.by_data and b.by_data):
                continue
            if (
                a.condition == negation(b.condition)
                or b.condition == negation(a.condition)
                or _differ(a.condition, b.condition)
            ):
                return a, b
    return None


def _differ(first: Form, second: Form) -> bool:
    """``x == 3`` and ``x == 4``."""
    sides = [_equality(form) for form in (first, second)]
    if sides[0] is None or sides[1] is None:
        return False
    return sides[0][0] == sides[1][0] and sides[0][1] != sides[1][1]


def _equality(form: Form) -> tuple[Form, int] | None:
    symbols = form.symbols()
    if len(form.terms) != 1 or len(symbols) != 1:
        return None
    (symbol,) = symbols
    if symbol.kind != "operation" or symbol.name != "eq":
        return None
    left, right = symbol.operands
    if right.known is not None:
        return left, right.known
    return (right, left.known) if left.known is not None else None


def _chosen(access: Access, family: Sequence[Access], names: tuple[str, ...]) -> Access:
    parting: set[Guard] = set()
    for other in family:
        if other is not access:
            pair = exclusive(access, other)
            if pair is not None:
                parting.add(pair[0])
    guards = tuple(replace(g, chooses=True) if g in parting else g for g in access.guards)
    if not parting:
        return access
    first = next(g for g in access.guards if g in parting)
    return replace(access, guards=guards, choice=Choice(compared(first.condition), first.place, names))
