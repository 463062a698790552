"""Operators and methods of the arbitrary-precision integers and fixed-point numbers, as the plain ones they are."""

from __future__ import annotations

from beatwise.frontend.conversions import converted
from beatwise.model.kernel import Assign, Binary, Bits, Cast, Expression, Literal, Opaque, Step, Unary
from beatwise.model.place import Place
from beatwise.model.types import IntType, RealType, Type

INT = IntType(32, True, 4)
BINARY = frozenset("+ - * / % & | ^ << >> < <= > >= == != && ||".split())
UPDATES = frozenset(op + "=" for op in "+ - * / % & | ^ << >>".split())


def is_number(of: Type) -> bool:
    return isinstance(of, IntType | RealType)


def operator(op: str, operands: tuple[Expression, ...], of: Type, place: Place) -> Expression:
    """``operator op`` of our headers applied to its operands, the object first."""
    first = operands[0]
    if len(operands) == 2:
        second = operands[1]
        if op == "=":
            return Assign("", first, converted(second, first.type, place), first.type, place)
        if op in UPDATES:
            return Assign(op[:-1], first, second, first.type, place)
        if op in BINARY:
            return Binary(op, first, second, of, place)
        if op in ("++", "--"):  # the second operand tells postfix
            return Step(1 if op == "++" else -1, False, first, first.type, place)
        if op == "[]":
            return bits(first, second, second, place)
        if op == ",":
            return Opaque("a concatenation", operands, of, place)
    if len(operands) == 1:
        if op in ("++", "--"):
            return Step(1 if op == "++" else -1, True, first, first.type, place)
        if op in ("-", "~", "!"):
            return Unary(op, first, of, place)
        if op == "+":
            return converted(first, of, place)
    if op == "()" and len(operands) == 3:
        return bits(first, operands[1], operands[2], place)
    return Opaque(f"operator {op}", operands, of, place)


def bits(base: Expression, high: Expression | None, low: Expression | None, place: Place) -> Expression:
    """A bit range; its type is as wide as it is where both ends are known."""
    of: Type = IntType(base.type.bits, False, base.type.bytes) if isinstance(base.type, IntType) else base.type
    if isinstance(high, Literal) and isinstance(low, Literal) and isinstance(of, IntType):
        if isinstance(high.value, int) and isinstance(low.value, int):
            width = abs(high.value - low.value) + 1
            of = IntType(width, False, min(of.bytes, 1 << max(0, ((width + 7) // 8 - 1).bit_length())))
    elif high is low:
        of = IntType(1, False, 1)
    return Bits(base, high, low, of, place)


def method(
    name: str, base: Expression, arguments: tuple[Expression, ...], template: int | None, of: Type, place: Place
) -> Expression:
    """A method of our headers' numbers. ``template`` is its template argument, if it has one that is a number."""
    width = base.type.bits if isinstance(base.type, IntType | RealType) else 0
    match name, arguments:
        case "range", (high, low):
            return bits(base, high, low, place)
        case "range", ():
            return bits(base, Literal(width - 1, INT, place), Literal(0, INT, place), place)
        case (("bit" | "get_bit" | "test"), (index,)):
            return bits(base, index, index, place)
        case (("set" | "set_bit" | "set_bit_v"), (index, value)):
            one = bits(base, index, index, place)
            return Assign("", one, value, one.type, place)
        case (("set" | "clear"), (index,)) if isinstance(base.type, IntType):
            one = bits(base, index, index, place)
            return Assign("", one, Literal(int(name == "set"), one.type, place), one.type, place)
        case "set", (value,):
            return Assign("", base, value, base.type, place)
        case "slc", (low,) if template:
            high = Binary("+", low, Literal(template - 1, INT, place), INT, place)
            known = low.value if isinstance(low, Literal) and isinstance(low.value, int) else None
            top: Expression = high if known is None else Literal(known + template - 1, INT, place)
            return bits(base, top, low, place)
        case "set_slc", (low, value):
            size = value.type.bits if isinstance(value.type, IntType) else 1
            top = Binary("+", low, Literal(size - 1, INT, place), INT, place)
            one = bits(base, top, low, place)
            return Assign("", one, value, one.type, place)
        case (("length" | "width"), ()):
            return Literal(width, of, place)
        case "get", ():
            return base
    if name.startswith(("to_", "operator ")) and not arguments and is_number(of):
        return converted(base, of, place)
    if name.startswith("to_") and not arguments:
        return Cast(base, of, place)
    return Opaque(f"{name}()", (base, *arguments), of, place)
