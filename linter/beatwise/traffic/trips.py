"""How often the loops of a nest run, and what is taken where nobody knows."""

from __future__ import annotations

from collections.abc import Iterable, Mapping
from dataclasses import dataclass

from beatwise.model.access import Access, LoopInstance
from beatwise.model.form import Form, Symbol, bounds
from beatwise.model.traffic import Basis
from beatwise.traffic.compiled import compiled

ASSUMED_TRIPS = 1024  #: of a loop about which nothing is known
_GRAVITY: tuple[Basis, ...] = ("constant", "given", "tripcount", "assumed", "data")


@dataclass(frozen=True, slots=True)
class Trips:
    """How often a loop runs: a number, the form behind it where it is exact, and where it is from."""

    count: int
    form: Form | None
    basis: Basis
    loop: LoopInstance


def parameters_of(access: Access) -> set[Symbol]:
    """The sizes that the access, its guards and its loops depend on."""
    forms = [access.offset, *(guard.condition for guard in access.guards)]
    for loop in access.loops:
        forms += [*loop.until, *loop.exits, *(r.next for r in loop.recurrences), *(r.first for r in loop.recurrences)]
        if loop.trips is not None:
            forms.append(loop.trips)
    return {symbol for form in forms for symbol in form.leaves() if symbol.kind == "parameter"}


def size_of(symbol: Symbol, given: Mapping[str, int]) -> int:
    """The size that is given, else the one that is assumed."""
    if symbol.name in given:
        return given[symbol.name]
    if symbol.low is not None and symbol.low == symbol.high:
        return symbol.low
    return ASSUMED_TRIPS if symbol.high is None else min(ASSUMED_TRIPS, symbol.high)


def is_given(symbol: Symbol) -> bool:
    """Whether the size is known: it has one value."""
    return symbol.low is not None and symbol.low == symbol.high


def all_trips(access: Access, sizes: Mapping[Symbol, int]) -> list[Trips]:
    """The trips of the loops around the access, outermost first."""
    computed = _computed(access)
    return [_trips(loop, sizes, computed) for loop in access.loops]


def _computed(access: Access) -> set[Symbol]:
    """The carried variables whose values a walk computes: no data is in them."""
    steps = {r.symbol: r.first.leaves() | r.next.leaves() for loop in access.loops for r in loop.recurrences}
    found = set(steps)
    while lost := {
        symbol
        for symbol in found
        if any(s.kind in ("data", "unknown") or (s.kind == "carried" and s not in found) for s in steps[symbol])
    }:
        found -= lost
    return found


def _trips(loop: LoopInstance, sizes: Mapping[Symbol, int], computed: set[Symbol]) -> Trips:
    """The loop's trips as a number; -1 where they change from one round of the loops around to the next."""
    form = loop.trips
    if form is None:
        if loop.tripcount is not None:
            return Trips(loop.tripcount, None, "tripcount", loop)
        return Trips(ASSUMED_TRIPS, None, "assumed", loop)
    leaves = form.leaves()
    if any(symbol.kind in ("data", "unknown", "carried") and symbol not in computed for symbol in leaves):
        high = bounds(form)[1]
        if loop.tripcount is not None:
            return Trips(loop.tripcount, form, "tripcount", loop)
        return Trips(
            min(ASSUMED_TRIPS, high) if high is not None and high > 0 else ASSUMED_TRIPS, form, "assumed", loop
        )
    unknown = [symbol for symbol in leaves if symbol.kind == "parameter" and not is_given(symbol)]
    if unknown and loop.tripcount is not None:
        return Trips(loop.tripcount, form, "tripcount", loop)
    if any(symbol.kind == "counter" or symbol in computed for symbol in leaves):
        return Trips(-1, form, "assumed" if unknown else "constant", loop)
    count = compiled(form)(dict(sizes))
    if unknown:
        high = bounds(form)[1]
        simple = len(leaves) == 1 and len(form.terms) <= 2
        return Trips(count if simple or high is not None else ASSUMED_TRIPS, form, "assumed", loop)
    given = any(symbol.kind == "parameter" for symbol in leaves)
    return Trips(max(0, count), form, "given" if given else "constant", loop)


def worst(bases: Iterable[Basis]) -> Basis:
    """The basis that says least."""
    return max(bases, key=_GRAVITY.index, default="constant")
