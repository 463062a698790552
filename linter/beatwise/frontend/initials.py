"""Braced lists: given their nesting and their order back, whatever the source left out or named."""

from __future__ import annotations

import re

from beatwise.frontend import kinds
from beatwise.frontend.conversions import converted, same, wrapped
from beatwise.frontend.libclang import ClangType, Cursor, children, fields, library, operands, spelling
from beatwise.frontend.lowering import Lowering
from beatwise.frontend.members import member_value
from beatwise.model.kernel import Expression, Items, Literal, Opaque
from beatwise.model.types import ArrayType, CallableType, IntType, PointerType, RealType, RecordType, Type

LONG_BYTES = 400  #: a braced list with more text than this may be a table
#: Decimal and hexadecimal integers; an octal one is left to the compiler.
PLAIN_INTEGERS = re.compile(r"\{(?:\s*-?\s?(?:0[xX][0-9a-fA-F]+|[1-9]\d*|0)[uUlL]{0,3}\s*(?:,|(?=\})))+\s*\}")


def braced(given: Lowering, cursor: Cursor, of: Type) -> Expression:
    """A braced list as a value of type ``of``."""
    place = given.place(cursor)
    if isinstance(of, ArrayType) and isinstance(of.element, IntType) and (table := _table(given, cursor, of.element)):
        return Items(table, of, place)
    listed = [child for child in children(cursor) if child.kind not in kinds.REFERENCES]
    if isinstance(of, IntType | RealType | PointerType | CallableType):
        if not listed:
            return Literal(0, of, place)
        return converted(given.expression(listed[0]), of, place)
    if isinstance(of, ArrayType) and len(listed) == 1 and listed[0].kind == kinds.BRACED and given.is_record(cursor):
        return braced(given, listed[0], of)  # the braces of the class and those of the array in it
    remaining = listed[::-1]
    if isinstance(of, ArrayType | RecordType) and len(listed) == 1 and listed[0].kind != kinds.BRACED:
        if same(given.type(listed[0]), of) or listed[0].kind == kinds.STRING:
            return given.expression(listed[0])
    return Items(tuple(_items(given, remaining, of)), of, place)


def _table(given: Lowering, cursor: Cursor, element: IntType) -> tuple[Literal, ...] | None:
    """A long list of plain integers, read from its text: tables have thousands. All share the place of the list."""
    extent = library().clang_getCursorExtent(cursor)
    if extent.end - extent.begin < LONG_BYTES:
        return None
    written = given.places.text(extent)
    if written is None or not PLAIN_INTEGERS.fullmatch(written):
        return None
    place = given.places.place(extent)
    numbers = written.strip("{} \t\r\n,").split(",")
    return tuple(Literal(wrapped(_number(one), element), element, place) for one in numbers)


def _number(written: str) -> int:
    plain = written.strip().rstrip("uUlL")
    return int(plain, 16 if "x" in plain or "X" in plain else 10)


def _items(given: Lowering, remaining: list[Cursor], of: Type) -> list[Expression]:
    """The elements or fields of one aggregate, taken from the end of a reversed list."""
    match of:
        case ArrayType(element=element, count=count):
            found: list[Expression] = []
            while remaining and (count is None or len(found) < count):
                found.append(_item(given, remaining, element))
            return found
        case RecordType(fields=listed, bases=bases):
            found = []
            named: dict[str, Expression] = {}
            for base in bases:
                if remaining:
                    found.append(_item(given, remaining, base))
            for field in listed:
                if not remaining:
                    break
                if name := _designated(remaining[-1]):
                    named[name] = _designation(given, remaining.pop(), fields_type(of, name))
                    continue
                found.append(_item(given, remaining, field.type))
            while remaining and (name := _designated(remaining[-1])):
                named[name] = _designation(given, remaining.pop(), fields_type(of, name))
            if not bases and (exact := given.types.declared(of)) is not None:
                _add_defaults(given, exact, of, found, named)
            return _ordered(found, named, of) if named else found
        case _:
            return [given.expression(remaining.pop()) for _ in range(len(remaining))]


def _add_defaults(
    given: Lowering, exact: ClangType, of: RecordType, found: list[Expression], named: dict[str, Expression]
) -> None:
    """The initial values that the class has for the fields that a list leaves out."""
    left_out = {field.name for field in of.fields[len(found) :]} - named.keys()
    for member in fields(exact) if left_out else ():
        name = given.name(member)
        if name in left_out and (value := member_value(given, member, given.place(member))) is not None:
            named[name] = value


def fields_type(of: RecordType, name: str) -> Type | None:
    return next((field.type for field in of.fields if field.name == name), None)


def _designated(cursor: Cursor) -> str | None:
    """The field that ``.field = value`` names."""
    if cursor.kind != kinds.UNEXPOSED:
        return None
    below = children(cursor)
    if len(below) >= 2 and below[0].kind == kinds.MEMBER_REFERENCE:
        return spelling(below[0])
    return None


def _designation(given: Lowering, cursor: Cursor, of: Type | None) -> Expression:
    value = operands(cursor)[-1]
    if of is not None and value.kind == kinds.BRACED:
        return braced(given, value, of)
    lowered = given.expression(value)
    return converted(lowered, of, lowered.place) if of is not None else lowered


def _ordered(found: list[Expression], named: dict[str, Expression], of: RecordType) -> list[Expression]:
    """The fields in their order; one that was left out is zero."""
    by_name = dict(zip((field.name for field in of.fields), found, strict=False)) | named
    last = max((index for index, field in enumerate(of.fields) if field.name in by_name), default=-1)
    some = next(iter(named.values()))
    return [
        by_name.get(field.name, Items((), field.type, some.place))
        if isinstance(field.type, ArrayType | RecordType)
        else by_name.get(field.name, Literal(0, field.type, some.place))
        for field in of.fields[: last + 1]
    ]


def _item(given: Lowering, remaining: list[Cursor], of: Type) -> Expression:
    cursor = remaining[-1]
    if cursor.kind == kinds.BRACED:
        return braced(given, remaining.pop(), of)
    if not library().clang_getCursorExtent(cursor).begin and not children(cursor):
        place = given.place(remaining.pop())
        return Items((), of, place) if isinstance(of, ArrayType | RecordType) else Literal(0, of, place)
    if isinstance(of, ArrayType) and cursor.kind != kinds.STRING:
        place = given.place(cursor)
        return Items(tuple(_items(given, remaining, of)), of, place)
    if isinstance(of, RecordType) and not isinstance(given.type(cursor), RecordType) and cursor.kind != kinds.CALL:
        before = len(remaining)
        place = given.place(cursor)
        found = Items(tuple(_items(given, remaining, of)), of, place)
        if len(remaining) == before:
            return Opaque("an item of no field", (given.expression(remaining.pop()),), of, place)
        return found
    lowered = given.expression(remaining.pop())
    return converted(lowered, of, lowered.place)
