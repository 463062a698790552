"""Forms with symbols replaced, and what each operation computes on plain numbers."""

from __future__ import annotations

from collections.abc import Callable, Mapping
from dataclasses import replace

from beatwise.model.form import ZERO, Form, Symbol, number, operation, symbol_form
from beatwise.model.operations import (
    both,
    div,
    either,
    equal,
    floordiv,
    less,
    lookup,
    maximum,
    minimum,
    negation,
    select,
    wrap,
)


def substitute(form: Form, values: Mapping[Symbol, Form], memo: dict[Symbol, Form] | None = None) -> Form:
    """The form with symbols replaced, simplified anew; the form itself where there is nothing to replace."""
    if not form.terms or values.keys().isdisjoint(form.leaves()):
        return form
    memo = {} if memo is None else memo
    result = ZERO
    for monomial, factor in form.terms.items():
        product = number(factor)
        for symbol in monomial:
            product = product * _substituted(symbol, values, memo)
        result = result + product
    return result


def _substituted(symbol: Symbol, values: Mapping[Symbol, Form], memo: dict[Symbol, Form]) -> Form:
    found = memo.get(symbol)
    if found is not None:
        return found
    if symbol in values:
        result = values[symbol]
    elif symbol.kind == "operation":
        operands = [substitute(operand, values, memo) for operand in symbol.operands]
        same = all(new is old for new, old in zip(operands, symbol.operands, strict=True))
        result = symbol_form(symbol) if same else rebuilt(symbol, operands)
    elif symbol.kind in ("data", "unknown") and any(other in values for other in symbol.depends):
        depends: frozenset[Symbol] = frozenset()
        for other in symbol.depends:
            depends |= values[other].leaves() if other in values else frozenset((other,))
        at = substitute(symbol.at, values, memo) if symbol.at is not None else None
        result = symbol_form(replace(symbol, depends=depends, at=at))
    else:
        result = symbol_form(symbol)
    memo[symbol] = result
    return result


def rebuilt(symbol: Symbol, operands: list[Form]) -> Form:
    """The symbol's operation, applied to other operands."""
    match symbol.name:
        case "lt":
            return less(*operands)
        case "eq":
            return equal(*operands)
        case "ne":
            return negation(equal(*operands))
        case "not":
            return negation(*operands)
        case "and?":
            return both(*operands)
        case "or?":
            return either(*operands)
        case "select":
            return select(*operands)
        case "min":
            return minimum(*operands)
        case "max":
            return maximum(*operands)
        case "floordiv":
            return floordiv(*operands)
        case "div":
            return div(*operands)
        case "wrap":
            return wrap(operands[0], operands[1].constant, bool(operands[2].constant))
        case "lookup":
            return lookup(symbol.table, operands[0])
    values = [operand.known for operand in operands]
    if symbol.name in PLAIN and all(value is not None for value in values):
        return number(PLAIN[symbol.name](*values))
    return operation(symbol.name, *operands, table=symbol.table)


def _shift_left(value: int, by: int) -> int:
    return value << by if 0 <= by < 512 else 0


def _shift_right(value: int, by: int) -> int:
    return value >> by if by >= 0 else 0


def _divided(value: int, by: int) -> int:
    if by == 0:
        return 0
    quotient = abs(value) // abs(by)
    return quotient if (value < 0) == (by < 0) else -quotient


def _wrapped(value: int, bits: int, signed: int) -> int:
    least = -(1 << bits - 1) if signed else 0
    return (value - least) % (1 << bits) + least


PLAIN: dict[str, Callable[..., int]] = {
    "lt": lambda a, b: int(a < b),
    "eq": lambda a, b: int(a == b),
    "ne": lambda a, b: int(a != b),
    "not": lambda a: int(not a),
    "and?": lambda a, b: int(bool(a) and bool(b)),
    "or?": lambda a, b: int(bool(a) or bool(b)),
    "select": lambda c, a, b: a if c else b,
    "min": min,
    "max": max,
    "floordiv": lambda a, b: a // b if b else 0,
    "div": _divided,
    "wrap": _wrapped,
    "and": lambda a, b: a & b,
    "or": lambda a, b: a | b,
    "xor": lambda a, b: a ^ b,
    "shl": _shift_left,
    "shr": _shift_right,
}  #: what each operation computes on plain numbers
