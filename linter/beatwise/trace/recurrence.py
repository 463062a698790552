"""Closed forms for what a loop carries from one iteration to the next, and how often it runs."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass, replace

from beatwise.model.form import ONE, ZERO, Form, Symbol, bounds, number, symbol_form
from beatwise.model.operations import both, equal, floordiv, mask, maximum, minimum, mod, negation, select
from beatwise.model.substitution import substitute


@dataclass(frozen=True, slots=True)
class Carry:
    """A variable that starts as ``first`` and is ``next`` after an iteration that found it as ``symbol``."""

    symbol: Symbol
    first: Form
    next: Form


@dataclass(frozen=True, slots=True)
class Solved:
    """``closed``: each symbol by the loop's counter. ``left``: those that must be computed step by step."""

    closed: dict[Symbol, Form]
    left: tuple[Carry, ...]


def solve(carries: Sequence[Carry], loop_counter: Symbol, inside: frozenset[int]) -> Solved:
    """Closed forms where there are any. ``inside`` are the numbers of this loop and those within it.

    >>> from beatwise.model.form import carried, counter
    >>> k, x = counter("k", 1), carried("x", 1)
    >>> solve([Carry(x, number(5), symbol_form(x) + 3)], k, frozenset({1})).closed[x]
    5 + 3*k
    """
    k = symbol_form(loop_counter)
    closed: dict[Symbol, Form] = {}
    left = list(carries)
    clocks: list[tuple[Form, Form]] = [(ONE, k)]  #: (condition of a tick, ticks so far)
    progress = True
    while left and progress:
        progress = False
        memo: dict[Symbol, Form] = {}
        left = [replace(carry, next=substitute(carry.next, closed, memo)) for carry in left]
        clocks = [(substitute(tick, closed, memo), ticks) for tick, ticks in clocks]
        for carry in list(left):
            form = _closed_form(carry, clocks, loop_counter, {c.symbol for c in left}, inside)
            if form is not None:
                closed[carry.symbol] = form
                left.remove(carry)
                progress = True
                break
    if left:
        pending = {carry.symbol for carry in left}
        renamed: dict[Symbol, Form] = {}
        for carry in left:
            own = frozenset(s for s in _reach(carry, left) if s not in pending)
            renamed[carry.symbol] = symbol_form(replace(carry.symbol, depends=own))
        memo = {}
        left = [
            Carry(next(iter(renamed[c.symbol].symbols())), c.first, substitute(c.next, renamed, memo)) for c in left
        ]
        closed = {symbol: substitute(form, renamed, memo) for symbol, form in closed.items()} | renamed
    return Solved(closed, tuple(left))


def _reach(carry: Carry, carries: Sequence[Carry]) -> frozenset[Symbol]:
    """Everything that the carry's value can come to depend on."""
    by_symbol = {other.symbol: other for other in carries}
    found: set[Symbol] = set(carry.first.leaves())
    waiting = [carry]
    seen = {carry.symbol}
    while waiting:
        for symbol in waiting.pop().next.leaves():
            found.add(symbol)
            if symbol in by_symbol and symbol not in seen:
                seen.add(symbol)
                waiting.append(by_symbol[symbol])
    return frozenset(found)


def varies(form: Form, pending: set[Symbol], inside: frozenset[int]) -> bool:
    """Whether the form may change from one iteration of the loop to the next (its counter apart)."""
    return any(
        symbol in pending
        or (symbol.kind in ("data", "unknown") and any(loop in inside for loop in symbol.loops))
        or (symbol.kind == "carried" and symbol.loop in inside)
        for symbol in form.leaves()
    )


def _closed_form(
    carry: Carry, clocks: list[tuple[Form, Form]], loop_counter: Symbol, pending: set[Symbol], inside: frozenset[int]
) -> Form | None:
    x, k = symbol_form(carry.symbol), symbol_form(loop_counter)
    step = carry.next
    if step == x or step == carry.first:
        return carry.first
    if carry.symbol not in step.leaves() and not varies(step, pending, inside):
        return _previous(carry.first, step, loop_counter)
    wrapped = _operands(step, "wrap")
    if wrapped is not None and not wrapped[2].constant:
        delta = wrapped[0] - x
        if delta.known is not None:
            return mask(carry.first + k * delta.known, wrapped[1].constant)
    choice = _operands(step, "select")
    if choice is not None and loop_counter not in choice[0].leaves() and not varies(choice[0], pending, inside):
        arms = [
            _closed_form(replace(carry, next=arm), clocks, loop_counter, pending, inside) for arm in choice[1:]
        ]  # which branch it is stays the same throughout the loop
        if arms[0] is not None and arms[1] is not None:
            return select(choice[0], arms[0], arms[1])
    masked = _masked(step, carry.symbol)
    if masked is not None:
        by, modulus = masked
        low, high = bounds(carry.first)
        if low is not None and high is not None and 0 <= low <= high < modulus:
            return mod(carry.first + k * by, number(modulus))
    delta = step - x
    if not varies(delta, pending, inside):
        return _summed(carry.first, delta, loop_counter)
    return _ticking(carry, step, clocks, pending, inside, loop_counter)


def _masked(step: Form, symbol: Symbol) -> tuple[int, int] | None:
    """``by`` and ``modulus`` of ``(x + by) % modulus``, also written ``(x + by) & (modulus - 1)``."""
    for quotient in step.symbols():
        if quotient.kind != "operation" or quotient.name not in ("floordiv", "div"):
            continue
        modulus = quotient.operands[1].known
        if modulus is None:
            continue
        by = (quotient.operands[0] - symbol_form(symbol)).known
        whole = step + symbol_form(quotient) * modulus - symbol_form(symbol)
        if by is not None and whole.known == by and modulus > 0:
            return by, modulus
    return None


def _previous(first: Form, step: Form, loop_counter: Symbol) -> Form | None:
    """What the iteration before has left: a form of the counter alone."""
    k = symbol_form(loop_counter)
    before = substitute(step, {loop_counter: k - 1})
    if loop_counter not in step.leaves():
        return first if step == first else select(equal(k, ZERO), first, step)
    if substitute(step, {loop_counter: number(-1)}) == first:
        return before
    return select(equal(k, ZERO), first, before)


def _summed(first: Form, delta: Form, loop_counter: Symbol) -> Form | None:
    """``first`` plus the sum of ``delta`` over the iterations so far; at most linear in the counter."""
    k = symbol_form(loop_counter)
    if loop_counter not in delta.leaves():
        return first + k * delta
    slope = delta.coefficient(loop_counter)
    if slope is None or loop_counter in slope.leaves() or loop_counter in delta.without(loop_counter).leaves():
        return None
    return first + k * delta.without(loop_counter) + slope * floordiv(k * k - k, number(2))


def _operands(form: Form, name: str) -> tuple[Form, ...] | None:
    """The operands, when the form is one operation of this name and nothing else."""
    if len(form.terms) != 1:
        return None
    ((monomial, factor),) = form.terms.items()
    if factor == 1 and len(monomial) == 1 and monomial[0].kind == "operation" and monomial[0].name == name:
        return monomial[0].operands
    return None


def _ticking(
    carry: Carry,
    step: Form,
    clocks: list[tuple[Form, Form]],
    pending: set[Symbol],
    inside: frozenset[int],
    loop_counter: Symbol,
) -> Form | None:
    """Counters with a hand-made wrap, and what moves only when another one wraps.

    ``if (++j == N) { j = 0; ++i; }``: j wraps every N ticks of the loop, i moves once every N.
    """
    for tick, ticks in clocks:
        moved = _on_tick(step, symbol_form(carry.symbol), tick)
        if moved is None:
            continue
        x = symbol_form(carry.symbol)
        delta = moved - x
        if not varies(delta, pending, inside) and loop_counter not in delta.leaves():
            return carry.first + ticks * delta
        choice = _operands(moved, "select")
        if choice is None:
            continue
        condition, yes, no = choice
        for again, onward, wraps in ((yes, no, condition), (no, yes, negation(condition))):
            stride = (onward - x).known
            if stride is None or stride <= 0 or varies(carry.first, pending, inside) or varies(again, pending, inside):
                continue
            period = _period(wraps, x, again, stride)
            if period is None:
                continue
            if again != carry.first:  # it starts somewhere in its range
                if stride != 1:
                    continue
                ticks = ticks + carry.first - again
            turn = floordiv(ticks, period)
            clocks.append((both(tick, wraps), turn))
            return again + (ticks - turn * period) * stride
    return None


def _on_tick(step: Form, x: Form, tick: Form) -> Form | None:
    """What x becomes when the clock ticks, if it keeps its value otherwise."""
    if tick == ONE:
        return step
    parts = _operands(tick, "and?")
    if parts is not None:
        outer = _on_tick(step, x, parts[0])
        return None if outer is None else _on_tick(outer, x, parts[1])
    choice = _operands(step, "select")
    if choice is None:
        return None
    condition, yes, no = choice
    if condition == tick and no == x:
        return yes
    if negation(condition) == tick and yes == x:
        return no
    return None


def _period(wraps: Form, x: Form, first: Form, stride: int) -> Form | None:
    """Ticks from ``first`` until the wrap, for ``x + stride == end``, ``x == end - stride``, ``end <= x + stride``."""
    for name in ("eq", "lt"):
        sides = _operands(wraps, name)
        if sides is None:
            continue
        for left, right in (sides, sides[::-1]):
            offset = left - x
            if offset.known is None or any(s in right.leaves() for s in x.symbols()):
                continue
            end = right - offset  # the wrap comes in the iteration that finds x == end (eq) or x > end (lt)
            if name == "lt":
                if left is sides[0]:
                    continue  # x < end: wraps while small, no counter does that
                end = end + 1
            span = end - first
            if stride == 1:
                return span + 1
            if span.known is not None and (span.known % stride == 0 or name == "lt"):
                return number(-(-span.known // stride) + 1)
    return None


# --------------------------------------------------------------------------------------------------------- trips


@dataclass(frozen=True, slots=True)
class Trips:
    """How often a loop's condition lets it run; ``unsolved`` are the conditions that no formula was found for.

    ``until``: those that end the loop before an iteration when they are not 0; ``exits``: within one.
    """

    count: Form | None
    unsolved: tuple[Form, ...] = ()
    until: tuple[Form, ...] = ()
    exits: tuple[Form, ...] = ()


def trips_while(condition: Form, loop_counter: Symbol) -> Trips:
    """The first value of the counter at which ``condition`` is 0.

    >>> from beatwise.model.form import counter
    >>> from beatwise.model.operations import less
    >>> k = counter("k", 1)
    >>> trips_while(less(symbol_form(k) * 4, number(10)), k).count
    3
    """
    if condition.known is not None:
        return Trips(None if condition.known else ZERO, ())
    parts = _operands(condition, "and?")
    if parts is not None:
        left, right = (trips_while(part, loop_counter) for part in parts)
        counts = [t.count for t in (left, right) if t.count is not None]
        count = minimum(counts[0], counts[1]) if len(counts) == 2 else counts[0] if counts else None
        return Trips(count, left.unsolved + right.unsolved)
    count = _first_false(condition, loop_counter)
    return Trips(count, () if count is not None else (condition,))


def _first_false(condition: Form, loop_counter: Symbol) -> Form | None:
    sides = _operands(condition, "lt")
    if sides is not None:
        gap = sides[0] - sides[1]  # runs while gap < 0
        slope = gap.coefficient(loop_counter)
        if slope is None or loop_counter in slope.leaves() or loop_counter in gap.without(loop_counter).leaves():
            return None
        start = gap.without(loop_counter)
        high = bounds(slope)[1]
        if high is not None and high <= 0:
            lowest = bounds(start)[0]
            return ZERO if lowest is not None and lowest >= 0 else None
        if slope.known == 1:
            return _at_least_zero(-start)
        return _at_least_zero(floordiv(slope - start - 1, slope))
    sides = _operands(condition, "ne")
    if sides is not None:
        gap = sides[0] - sides[1]
        slope = gap.coefficient(loop_counter)
        if slope is None or slope.known in (None, 0) or loop_counter in gap.without(loop_counter).leaves():
            return None
        start = gap.without(loop_counter)
        assert slope.known is not None
        distance, step = (-start, slope.known) if slope.known > 0 else (start, -slope.known)
        if distance.known is not None and (distance.known < 0 or distance.known % step):
            return None  # it steps over its end
        return floordiv(distance, number(step))
    return None


def _at_least_zero(count: Form) -> Form:
    known = count.known
    if known is not None:
        return number(max(0, known))
    low, high = bounds(count)
    if high is not None and high <= 0:
        return ZERO
    if any(symbol.kind == "counter" for symbol in count.leaves()) and (low is None or low < 0):
        return maximum(count, ZERO)
    return count
