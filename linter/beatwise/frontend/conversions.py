"""Conversions: kept where they change width, sign or pointee, folded on constants, else left out."""

from __future__ import annotations

from beatwise.model.kernel import Assign, Bits, Cast, Expression, Items, Literal, Opaque
from beatwise.model.place import Place
from beatwise.model.types import (
    ArrayType,
    CallableType,
    IntType,
    PointerType,
    RealType,
    RecordType,
    ReferenceType,
    StreamType,
    Type,
    UnknownType,
    VoidType,
)


def converted(value: Expression, to: Type, place: Place) -> Expression:
    """``value`` as a value of type ``to``."""
    of = value.type
    if isinstance(to, ReferenceType):
        to = to.to
    if same(of, to) or isinstance(to, VoidType | UnknownType | CallableType):
        return value
    match value, to:
        case Literal(value=int(number)), IntType():
            return Literal(wrapped(number, to), to, value.place)
        case Literal(value=int() | float() as number), RealType():
            return Literal(float(number), to, value.place)
        case Literal(value=None), _:
            return Literal(None, to, value.place, value.name)
        case Literal(), PointerType() if not isinstance(of, ArrayType):
            return Literal(value.value, to, value.place)
        case ((Items() | Opaque()), _) if isinstance(of, VoidType | UnknownType):
            return value
    if isinstance(of, ArrayType) and isinstance(to, PointerType) and same(of.element, to.to):
        return value
    if isinstance(of, ArrayType | PointerType) and isinstance(to, ArrayType):
        return value
    if isinstance(value, Items) and isinstance(to, RecordType) or isinstance(value, Bits) and _holds(to, of):
        return value
    if isinstance(value, Assign) and isinstance(value.target, Bits):
        return value
    if isinstance(of, CallableType) or isinstance(of, StreamType) and isinstance(to, StreamType):
        return value
    return Cast(value, to, place)


def _holds(wide: Type, narrow: Type) -> bool:
    """Whether an unsigned integer keeps its value in another one."""
    if not isinstance(wide, IntType) or not isinstance(narrow, IntType):
        return False
    return not wide.signed and not narrow.signed and narrow.bits <= wide.bits


def same(left: Type, right: Type) -> bool:
    """Whether two types are one; records are, by their key."""
    if left is right:
        return True
    match left, right:
        case RecordType(), RecordType():
            return left.key == right.key
        case PointerType(), PointerType():
            return left.volatile == right.volatile and same(left.to, right.to)
        case ArrayType(), ArrayType():
            return left.count == right.count and same(left.element, right.element)
        case _:
            return left == right


def wrapped(number: int, to: IntType) -> int:
    """An integer as ``to`` holds it.

    >>> wrapped(-1, IntType(8, False, 1)), wrapped(200, IntType(8, True, 1))
    (255, -56)
    """
    if to.bits == 1 and not to.signed:
        return int(number != 0) if to.bytes == 1 else number & 1
    number &= (1 << to.bits) - 1
    return number - (1 << to.bits) if to.signed and number >> (to.bits - 1) else number
