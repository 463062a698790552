"""Operations on forms: division, the lesser and greater, comparisons, choices; simplified where the bounds decide."""

from __future__ import annotations

from beatwise.model.form import ONE, ZERO, Form, Monomial, bounds, number, operation


def floordiv(value: Form, divisor: Form) -> Form:
    """``value / divisor`` rounded down; for values that are not negative this is also what C++ computes.

    >>> from beatwise.model.form import counter, symbol_form
    >>> k = symbol_form(counter("k", 1))
    >>> floordiv(k * 8 + 3, number(8)) == k
    True
    """
    by = divisor.known
    if value.known is not None and by:
        return number(value.known // by)
    if by == 1:
        return value
    if by is None or by <= 0:
        if value == divisor:
            return ONE
        quotient = _divided_exactly(value, divisor)
        return quotient if quotient is not None else operation("floordiv", value, divisor)
    whole = Form({m: f // by for m, f in value.terms.items() if f % by == 0 and m})
    rest = Form({m: f for m, f in value.terms.items() if f % by or not m})
    low, high = bounds(rest)
    if low is not None and high is not None and low // by == high // by and (low < high or rest.known is not None):
        return whole + low // by  # where a given size alone decides, it stays to be seen in the form
    if len(rest.terms) == 1 and rest.constant == 0:
        ((monomial, factor),) = rest.terms.items()
        if factor == 1 and len(monomial) == 1 and monomial[0].name == "floordiv" and monomial[0].kind == "operation":
            inner, inner_by = monomial[0].operands
            if inner_by.known and inner_by.known > 0:
                return whole + operation("floordiv", inner, number(inner_by.known * by))
    shift = rest.constant // by
    return whole + operation("floordiv", rest - shift * by, divisor) + shift


def _divided_exactly(value: Form, divisor: Form) -> Form | None:
    """``value / divisor`` for a divisor that is one product of symbols which divides every term."""
    if len(divisor.terms) != 1:
        return None
    ((monomial, factor),) = divisor.terms.items()
    terms: dict[Monomial, int] = {}
    for other, coefficient in value.terms.items():
        rest = list(other)
        for symbol in monomial:
            if symbol not in rest:
                return None
            rest.remove(symbol)
        if coefficient % factor:
            return None
        terms[tuple(rest)] = coefficient // factor
    return Form(terms)


def div(value: Form, divisor: Form) -> Form:
    """C++ division, which rounds toward zero."""
    low, _ = bounds(value)
    low_by, _ = bounds(divisor)
    if low is not None and low >= 0 and low_by is not None and low_by >= 0:
        return floordiv(value, divisor)
    if value.known is not None and divisor.known:
        quotient = abs(value.known) // abs(divisor.known)
        return number(quotient if (value.known < 0) == (divisor.known < 0) else -quotient)
    exact = _divided_exactly(value, divisor) if divisor.known is None else None
    if divisor.known and all(factor % divisor.known == 0 for factor in value.terms.values()):
        exact = Form({monomial: factor // divisor.known for monomial, factor in value.terms.items()})
    return exact if exact is not None else operation("div", value, divisor)


def mod(value: Form, divisor: Form) -> Form:
    """C++ remainder; kept as ``value - divisor * quotient`` so that quotient and remainder add up again."""
    return value - divisor * div(value, divisor)


def mask(value: Form, bits: int) -> Form:
    """The low ``bits`` bits of ``value``."""
    return value - floordiv(value, number(1 << bits)) * (1 << bits)


def minimum(left: Form, right: Form) -> Form:
    """The lesser of two."""
    low, high = bounds(left - right)
    if high is not None and high <= 0:
        return left
    if low is not None and low >= 0:
        return right
    return operation("min", left, right)


def maximum(left: Form, right: Form) -> Form:
    """The greater of two."""
    low, high = bounds(left - right)
    if low is not None and low >= 0:
        return left
    if high is not None and high <= 0:
        return right
    return operation("max", left, right)


def less(left: Form, right: Form) -> Form:
    """1 where ``left < right``, else 0. A number stands alone on its side, so that opposites of opposites are equal."""
    low, high = bounds(left - right)
    if high is not None and high < 0:
        return ONE
    if low is not None and low >= 0:
        return ZERO
    moved = right.constant if left.known is not None else left.constant
    return operation("lt", left - moved, right - moved)


def equal(left: Form, right: Form) -> Form:
    """1 where both are the same, else 0."""
    low, high = bounds(left - right)
    if low == high == 0:
        return ONE
    if (low is not None and low > 0) or (high is not None and high < 0):
        return ZERO
    if left.known is not None:
        left, right = right, left
    return operation("eq", left - left.constant, right - left.constant)


def negation(condition: Form) -> Form:
    """1 where the condition is 0, else 0."""
    decided = _decided(condition)
    if decided is not None:
        return number(1 - decided)
    if len(condition.terms) == 1:
        ((monomial, factor),) = condition.terms.items()
        if factor == 1 and len(monomial) == 1 and monomial[0].kind == "operation":
            symbol = monomial[0]
            if symbol.name == "not":
                return (
                    symbol.operands[0] if _is_truth(symbol.operands[0]) else operation("ne", symbol.operands[0], ZERO)
                )
            if symbol.name == "lt":
                return less(symbol.operands[1], symbol.operands[0] + 1)
            if symbol.name == "eq":
                return operation("ne", *symbol.operands)
            if symbol.name == "ne":
                return operation("eq", *symbol.operands)
    return operation("not", condition)


def _decided(form: Form) -> int | None:
    """1 where the bounds say that the form is not 0, 0 where it is."""
    low, high = bounds(form)
    if low == high == 0:
        return 0
    return 1 if (low is not None and low > 0) or (high is not None and high < 0) else None


def _is_truth(form: Form) -> bool:
    return bounds(form) in ((0, 1), (0, 0), (1, 1))


def both(left: Form, right: Form) -> Form:
    """1 where neither is 0."""
    if left.known == 0 or right.known == 0:
        return ZERO
    if left.known is not None:
        return truth(right)
    if right.known is not None:
        return truth(left)
    return left if left == right else operation("and?", left, right)


def either(left: Form, right: Form) -> Form:
    """1 where one is not 0."""
    if left.known or right.known:
        return ONE
    if left.known == 0:
        return truth(right)
    if right.known == 0:
        return truth(left)
    return left if left == right else operation("or?", left, right)


def truth(form: Form) -> Form:
    """1 where the form is not 0."""
    decided = _decided(form)
    if decided is not None:
        return number(decided)
    return form if _is_truth(form) else negation(equal(form, ZERO))


def select(condition: Form, yes: Form, no: Form) -> Form:
    """``yes`` where the condition is not 0, else ``no``."""
    if condition.known is not None:
        return yes if condition.known else no
    if yes == no:
        return yes
    simple = _as_minimum(condition, yes, no)
    return simple if simple is not None else operation("select", condition, yes, no)


def _as_minimum(condition: Form, yes: Form, no: Form) -> Form | None:
    """``a < b ? a : b`` and its kin."""
    if len(condition.terms) != 1:
        return None
    ((monomial, factor),) = condition.terms.items()
    if factor != 1 or len(monomial) != 1 or monomial[0].kind != "operation" or monomial[0].name != "lt":
        return None
    gap = monomial[0].operands[0] - monomial[0].operands[1]
    if yes - no == gap or yes - no == gap + 1:
        return operation("min", yes, no)
    if no - yes == gap or no - yes == gap + 1:
        return operation("max", yes, no)
    return None


def wrap(value: Form, bits: int, signed: bool) -> Form:
    """The value as an integer of ``bits`` holds it; itself where it is known to fit."""
    low, high = bounds(value)
    least = -(1 << bits - 1) if signed else 0
    most = (1 << bits - 1) - 1 if signed else (1 << bits) - 1
    if low is not None and high is not None and least <= low and high <= most:
        return value
    if value.known is not None:
        return number((value.known - least) % (1 << bits) + least)
    return operation("wrap", value, number(bits), number(int(signed)))


def lookup(table: tuple[int, ...], index: Form) -> Form:
    """An element of a constant table."""
    if index.known is not None and 0 <= index.known < len(table):
        return number(table[index.known])
    return operation("lookup", index, table=table)
