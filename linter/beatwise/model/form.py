"""What an address, a bound or a condition depends on, as a closed expression.

A ``Form`` is a polynomial with integer coefficients over symbols: loop counters, kernel parameters, loaded data, and
operations that are no polynomial (a quotient, a minimum, a comparison, a table) of other forms. Two forms that are
built the same way are equal, so that ``8 * (k / 8) + k % 8`` is ``k``. Whole numbers only, in the units of their use.
"""

from __future__ import annotations

from collections.abc import Callable, Iterable, Mapping
from dataclasses import dataclass, replace
from itertools import count
from typing import Literal

from beatwise.model.place import Place

Kind = Literal["counter", "parameter", "data", "carried", "unknown", "operation"]
DEPENDS_AT_MOST = 16  #: symbols that an opaque one names; of more, only those that change in different loops
TERMS_AT_MOST = 48  #: a longer polynomial is kept as one opaque symbol

COUNT = "how often something happened"  #: the reason of data that counts iterations: it leads on, it does not scatter

_numbers = count(1)


@dataclass(frozen=True, slots=True, eq=False)
class Symbol:
    """A quantity that a form is made of. Two with one ``number`` are the same, even where one knows more of itself.

    ``counter``: 0, 1, 2, ... of the loop ``loop``. ``parameter``: a scalar argument of the top function. ``data``: read
    from memory, a stream or a table (``name`` says which); drawn anew in every iteration of ``loops``, or, where ``at``
    is set, of those in which this byte offset changes.
    ``carried``: what a variable holds when an iteration of ``loop`` starts, where no closed form was found.
    ``unknown``: could not be followed, ``reason`` says why. ``operation``: ``name`` applied to ``operands``.
    """

    kind: Kind
    name: str
    number: int
    place: Place | None = None
    low: int | None = None
    high: int | None = None
    loop: int | None = None
    loops: tuple[int, ...] = ()
    operands: tuple[Form, ...] = ()
    depends: frozenset[Symbol] = frozenset()
    table: tuple[int, ...] = ()
    reason: str | None = None
    at: Form | None = None

    def __eq__(self, other: object) -> bool:
        return self is other or (isinstance(other, Symbol) and self.number == other.number)

    def __hash__(self) -> int:
        return self.number

    def __repr__(self) -> str:
        if self.kind == "operation":
            return f"{self.name}({', '.join(map(str, self.operands))})"
        return f"{self.name}'{self.number}" if self.kind in ("data", "carried", "unknown") else self.name


Monomial = tuple[Symbol, ...]


class Form:
    """A polynomial: ``terms`` maps a product of symbols (sorted) to its coefficient; the constant's is empty."""

    __slots__ = ("_hash", "_leaves", "terms")

    def __init__(self, terms: Mapping[Monomial, int]) -> None:
        self.terms: dict[Monomial, int] = {key: value for key, value in terms.items() if value}
        self._hash: int | None = None
        self._leaves: frozenset[Symbol] | None = None

    def __eq__(self, other: object) -> bool:
        return isinstance(other, Form) and self.terms == other.terms

    def __hash__(self) -> int:
        if self._hash is None:
            self._hash = hash(frozenset(self.terms.items()))
        return self._hash

    def __repr__(self) -> str:
        parts = []
        for monomial, factor in sorted(self.terms.items(), key=lambda item: [s.number for s in item[0]]):
            body = "*".join(map(repr, monomial))
            parts.append(str(factor) if not body else body if factor == 1 else f"{factor}*{body}")
        return " + ".join(parts) or "0"

    @property
    def constant(self) -> int:
        """The part without symbols."""
        return self.terms.get((), 0)

    @property
    def known(self) -> int | None:
        """The value, when the form is a plain number."""
        if not self.terms:
            return 0
        return self.terms.get(()) if len(self.terms) == 1 else None

    def __add__(self, other: Form | int) -> Form:
        if isinstance(other, int):
            other = number(other)
        if len(self.terms) < len(other.terms):
            self, other = other, self
        terms = dict(self.terms)
        for monomial, factor in other.terms.items():
            terms[monomial] = terms.get(monomial, 0) + factor
        return _bounded(terms, (self, other))

    def __neg__(self) -> Form:
        return Form({monomial: -factor for monomial, factor in self.terms.items()})

    def __sub__(self, other: Form | int) -> Form:
        return self + (-other)

    def __mul__(self, other: Form | int) -> Form:
        if isinstance(other, int):
            return Form({monomial: factor * other for monomial, factor in self.terms.items()})
        terms: dict[Monomial, int] = {}
        if len(self.terms) * len(other.terms) > 4 * TERMS_AT_MOST:
            return symbol_form(opaque(f"{len(self.terms)} by {len(other.terms)} terms", (self, other)))
        for left, a in self.terms.items():
            for right, b in other.terms.items():
                key = tuple(sorted(left + right, key=lambda symbol: symbol.number))
                terms[key] = terms.get(key, 0) + a * b
        return _bounded(terms, (self, other))

    def symbols(self) -> set[Symbol]:
        """The symbols at the surface: those of the polynomial, operations unopened."""
        return {symbol for monomial in self.terms for symbol in monomial}

    def leaves(self) -> frozenset[Symbol]:
        """All symbols below, operations opened, and what opaque symbols depend on."""
        if self._leaves is None:
            found: set[Symbol] = set()
            for symbol in self.symbols():
                found |= _leaves_of(symbol)
            self._leaves = frozenset(found)
        return self._leaves

    def coefficient(self, symbol: Symbol) -> Form | None:
        """What one more of ``symbol`` adds, when the form is linear in it (0 where it does not occur), else None."""
        terms: dict[Monomial, int] = {}
        for monomial, factor in self.terms.items():
            at = monomial.count(symbol)
            if at > 1:
                return None
            if at == 1:
                rest = tuple(other for other in monomial if other != symbol)
                terms[rest] = terms.get(rest, 0) + factor
            if any(other.kind != "counter" and symbol in _leaves_of(other) for other in monomial if other != symbol):
                return None
        return Form(terms)

    def without(self, symbol: Symbol) -> Form:
        """The terms that do not hold ``symbol`` at the surface."""
        return Form({monomial: factor for monomial, factor in self.terms.items() if symbol not in monomial})


def redrawn_in(symbol: Symbol) -> set[int]:
    """The loops of which a new iteration gives the symbol a new value (that of a parameter never changes).

    What lies at a known place of memory that is only read changes no more often than the place.
    """
    found: set[int] = set()
    for each in (symbol, *symbol.depends):
        if each.at is None:
            found.update(each.loops)
        if each.loop is not None:
            found.add(each.loop)
    return found


def _leaves_of(symbol: Symbol) -> frozenset[Symbol]:
    if symbol.kind == "operation":
        found: frozenset[Symbol] = frozenset()
        for operand in symbol.operands:
            found |= operand.leaves()
        return found
    return frozenset((symbol,)) | symbol.depends


def _bounded(terms: dict[Monomial, int], sources: Iterable[Form]) -> Form:
    form = Form(terms)
    if len(form.terms) > TERMS_AT_MOST:
        return symbol_form(opaque(f"{len(form.terms)} terms", sources))
    return form


# ------------------------------------------------------------------------------------------------------- making


def number(value: int) -> Form:
    """A plain number."""
    return Form({(): value})


ZERO, ONE = number(0), number(1)


def symbol_form(symbol: Symbol) -> Form:
    """The form that is just this symbol."""
    return Form({(symbol,): 1})


def renumbered(symbol: Symbol, high: int | None) -> Symbol:
    """A counter like this one that is known to end at ``high``."""
    return replace(symbol, number=next(_numbers), high=high)


def counter(name: str, loop: int) -> Symbol:
    """The counter of a loop: 0 in its first iteration."""
    return Symbol("counter", name, next(_numbers), low=0, loop=loop)


def parameter(name: str, low: int | None, high: int | None, place: Place | None = None) -> Symbol:
    """A scalar argument of the top function."""
    return Symbol("parameter", name, next(_numbers), place=place, low=low, high=high)


def data(
    name: str,
    place: Place | None,
    loops: tuple[int, ...],
    *,
    low: int | None = None,
    high: int | None = None,
    at: Form | None = None,
    depends: frozenset[Symbol] = frozenset(),
) -> Symbol:
    """A value read from memory, a stream or a table that is not constant."""
    return Symbol("data", name, next(_numbers), place=place, low=low, high=high, loops=loops, at=at, depends=depends)


def carried(name: str, loop: int, low: int | None = None, high: int | None = None) -> Symbol:
    """What a variable holds at the start of an iteration."""
    return Symbol("carried", name, next(_numbers), loop=loop, low=low, high=high)


def unknown(
    reason: str, place: Place | None, loops: tuple[int, ...] = (), depends: frozenset[Symbol] = frozenset()
) -> Symbol:
    """A value that could not be followed."""
    return Symbol("unknown", "?", next(_numbers), place=place, reason=reason, loops=loops, depends=depends)


def opaque(reason: str, sources: Iterable[Form]) -> Symbol:
    """A computed value whose form is given up, but not what it depends on (a real number, an overlong polynomial)."""
    depends = frozenset(_told_apart(leaf for source in sources for leaf in source.leaves()))
    return Symbol("unknown", "~", next(_numbers), depends=depends, reason=None if depends else reason)


def _told_apart(leaves: Iterable[Symbol]) -> list[Symbol]:
    """The leaves without those that say nothing more: opaque ones (what they depend on is among the leaves), and of the
    data that changes in the same loops all but the oldest."""
    found = {leaf for leaf in leaves if not (leaf.name == "~" and leaf.depends)}
    if len(found) <= DEPENDS_AT_MOST:
        return list(found)
    oldest: dict[object, Symbol] = {}
    for leaf in found:
        plain = leaf.kind in ("data", "unknown")
        key = (leaf.kind, leaf.reason, leaf.loops, frozenset(redrawn_in(leaf))) if plain else leaf.number
        if key not in oldest or leaf.number < oldest[key].number:
            oldest[key] = leaf
    return list(oldest.values())


_operations: dict[tuple[str, tuple[Form, ...], tuple[int, ...]], int] = {}


def operation(name: str, *operands: Form, table: tuple[int, ...] = ()) -> Form:
    """An operation that is no polynomial, unsimplified; the same name and operands give equal symbols."""
    key = (name, operands, table)
    known = _operations.get(key)
    if known is None:
        known = _operations[key] = next(_numbers)
    low, high = _operation_bounds(name, operands, table)
    return symbol_form(Symbol("operation", name, known, operands=operands, table=table, low=low, high=high))


# ------------------------------------------------------------------------------------------------------- bounds


def bounds(form: Form) -> tuple[int | None, int | None]:
    """The least and the greatest value the form can take, by its symbols' own bounds; None where there is none.

    >>> from beatwise.model.operations import mask
    >>> k = symbol_form(counter("k", 1))
    >>> bounds(k * 2 + 1), bounds(mask(k, 3))
    ((1, None), (0, 7))
    """
    low, high = _bounds_by_terms(form)
    split = _remainder_in(form) if len(form.terms) > 1 else None
    if split is not None:
        rest, factor, least, most = split
        rest_low, rest_high = bounds(rest)
        ends = (factor * least, factor * most)
        lows = [end for end in (low, None if rest_low is None else rest_low + min(ends)) if end is not None]
        highs = [end for end in (high, None if rest_high is None else rest_high + max(ends)) if end is not None]
        low, high = max(lows, default=None), min(highs, default=None)
    return low, high


def _bounds_by_terms(form: Form) -> tuple[int | None, int | None]:
    low: int | None = 0
    high: int | None = 0
    for monomial, factor in form.terms.items():
        a: int | None = 1
        b: int | None = 1
        for symbol in monomial:
            a, b = _product((a, b), (symbol.low, symbol.high))
        if factor < 0:
            a, b = b, a
        low = None if low is None or a is None else low + factor * a
        high = None if high is None or b is None else high + factor * b
    return low, high


def _remainder_in(form: Form) -> tuple[Form, int, int, int] | None:
    """The form as a rest plus a factor times a remainder ``x - by * (x / by)``: rest, factor, the remainder's bounds.

    ``x`` may itself be a quotient, as in ``k / 4 - 3 * (k / 12)``.
    """
    linear = [(monomial[0], factor) for monomial, factor in form.terms.items() if len(monomial) == 1]
    quotients = [(s, f) for s, f in linear if s.kind == "operation" and s.name in ("floordiv", "div")]
    for symbol, coefficient in quotients:
        value, divisor = symbol.operands
        by = divisor.known
        if by is None or by <= 1:
            continue
        wholes = [(value, by)]
        for finer, _ in quotients:
            step = finer.operands[1].known
            if finer is symbol or not (symbol.name == finer.name == "floordiv"):
                continue
            if finer.operands[0] == value and step and by % step == 0:
                wholes.append((symbol_form(finer), by // step))
        for whole, times in wholes:
            if coefficient % times:
                continue
            factor = -coefficient // times
            rest = form - (whole - symbol_form(symbol) * times) * factor
            if len(rest.terms) < len(form.terms):
                return rest, factor, 0 if symbol.name == "floordiv" else 1 - times, times - 1
    return None


def _product(
    left: tuple[int | None, int | None], right: tuple[int | None, int | None]
) -> tuple[int | None, int | None]:
    if None not in left and None not in right:
        corners = [a * b for a in left for b in right if a is not None and b is not None]
        return min(corners), max(corners)
    if left[0] is not None and right[0] is not None and left[0] >= 0 and right[0] >= 0:
        top = left[1] * right[1] if left[1] is not None and right[1] is not None else None
        return left[0] * right[0], top
    return None, None


def _operation_bounds(name: str, operands: tuple[Form, ...], table: tuple[int, ...]) -> tuple[int | None, int | None]:
    if name in ("lt", "eq", "ne", "not", "and?", "or?"):
        return 0, 1
    if name == "lookup" and table:
        return min(table), max(table)
    ranges = [bounds(operand) for operand in operands]
    if name in ("div", "floordiv"):
        low, high = ranges[0]
        divisor = operands[1].known
        if divisor and divisor > 0:
            return (None if low is None else low // divisor), (None if high is None else high // divisor)
        if low is not None and low >= 0 and ranges[1][0] is not None and ranges[1][0] >= 0:
            return 0, high
    if name in ("min", "max"):
        pick: Callable[[Iterable[int]], int] = min if name == "min" else max
        lows = [low for low, _ in ranges if low is not None]
        highs = [high for _, high in ranges if high is not None]
        if name == "min":
            return (pick(lows) if len(lows) == 2 else None), (min(highs) if highs else None)
        return (max(lows) if lows else None), (pick(highs) if len(highs) == 2 else None)
    if name == "select":
        return _hull(ranges[1], ranges[2])
    if name == "wrap":
        bits, signed = operands[1].constant, operands[2].constant
        return (-(1 << bits - 1), (1 << bits - 1) - 1) if signed else (0, (1 << bits) - 1)
    if name == "and":
        highs = [high for low, high in ranges if low is not None and low >= 0 and high is not None]
        return (0, min(highs)) if highs else (None, None)
    if name in ("or", "xor") and all(low is not None and low >= 0 and high is not None for low, high in ranges):
        return 0, (1 << max(high.bit_length() for _, high in ranges if high is not None)) - 1
    if name == "shl" and ranges[0][0] is not None and ranges[0][0] >= 0:
        return 0, None
    return None, None


def _hull(left: tuple[int | None, int | None], right: tuple[int | None, int | None]) -> tuple[int | None, int | None]:
    low = None if left[0] is None or right[0] is None else min(left[0], right[0])
    high = None if left[1] is None or right[1] is None else max(left[1], right[1])
    return low, high
