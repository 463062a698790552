"""Expressions: one function for each kind of cursor; ``LOWER`` says which."""

from __future__ import annotations

from beatwise.frontend import kinds
from beatwise.frontend.calls import call
from beatwise.frontend.conversions import converted
from beatwise.frontend.initials import braced
from beatwise.frontend.lambdas import closure
from beatwise.frontend.libclang import Cursor, evaluated, library, operands, spelling
from beatwise.frontend.lowering import Lower, Lowering
from beatwise.frontend.objects import dereferenced, named, this_object
from beatwise.model.kernel import (
    Assign,
    Binary,
    Cast,
    Expression,
    Index,
    Literal,
    Member,
    Opaque,
    Select,
    Step,
    This,
    Unary,
)
from beatwise.model.types import ArrayType, CallableType, IntType, PointerType


def folded(given: Lowering, cursor: Cursor) -> Expression:
    return Literal(given.folded(cursor), given.type(cursor), given.place(cursor))


def _string(given: Lowering, cursor: Cursor) -> Expression:
    written = spelling(cursor)
    return Literal(written[1:-1] if written.startswith('"') else written, given.type(cursor), given.place(cursor))


def _integer(given: Lowering, cursor: Cursor) -> Expression:
    extent = library().clang_getCursorExtent(cursor)
    written = given.places.text(extent)
    value: int | float | str | None
    value = int(written) if written and written.isdigit() and written[0] != "0" else evaluated(cursor)
    return Literal(value, given.type(cursor), given.places.place(extent))


def _implied(given: Lowering, cursor: Cursor) -> Expression:
    """Implicit casts and everything else that the compiler does not expose."""
    parts = operands(cursor)
    if len(parts) == 1:
        return converted(given.expression(parts[0]), given.type(cursor), given.place(cursor))
    if not parts:
        value = given.folded(cursor)
        if value is not None:
            return Literal(value, given.type(cursor), given.place(cursor))
        return Opaque("not exposed by the compiler", (), given.type(cursor), given.place(cursor))
    return given.opaque(cursor, "an expression that the compiler could not resolve")


def _parentheses(given: Lowering, cursor: Cursor) -> Expression:
    parts = operands(cursor)
    return given.expression(parts[0]) if parts else given.opaque(cursor, "empty parentheses")


def _cast(given: Lowering, cursor: Cursor) -> Expression:
    parts = operands(cursor)
    if not parts:
        return folded(given, cursor)
    return converted(given.expression(parts[-1]), given.type(cursor), given.place(cursor))


def _reinterpreted(given: Lowering, cursor: Cursor) -> Expression:
    """A reinterpreted pointer; a reinterpreted reference is what the reinterpreted address points to."""
    parts = operands(cursor)
    of, place = given.type(cursor), given.place(cursor)
    value = given.expression(parts[-1]) if parts else None
    if value is None or isinstance(of, PointerType) or isinstance(value.type, PointerType | ArrayType):
        return _cast(given, cursor)
    address = Unary("&", value, PointerType(value.type), place)
    return Unary("*", Cast(address, PointerType(of), place), of, place)


def _reference(given: Lowering, cursor: Cursor) -> Expression:
    declaration = library().clang_getCursorReferenced(cursor)
    if not declaration.identity or declaration.kind in kinds.INVALID:  # what a template parameter stands for
        return _implied(given, cursor)
    return named(given, cursor, declaration)


def _member(given: Lowering, cursor: Cursor) -> Expression:
    declaration = library().clang_getCursorReferenced(cursor)
    if declaration.kind != kinds.FIELD:
        return named(given, cursor, declaration)
    place = given.place(cursor)
    bases = operands(cursor)
    if bases:
        base = given.expression(bases[0])
        if given.is_pointer(bases[0]):
            base = dereferenced(base)
    else:
        base = this_object(given, cursor)
    return Member(base, given.name(declaration), given.type(cursor), place)


def _this(given: Lowering, cursor: Cursor) -> Expression:
    return This(given.type(cursor), given.place(cursor))


def _unary(given: Lowering, cursor: Cursor) -> Expression:
    code = library().clang_getCursorUnaryOperatorKind(cursor)
    parts = operands(cursor)
    if not parts:
        return given.opaque(cursor, "an operator without its operand")
    operand, of, place = given.expression(parts[0]), given.type(cursor), given.place(cursor)
    if code in kinds.STEPS:
        by, prefix = kinds.STEPS[code]
        return Step(by, prefix, operand, of, place)
    op = kinds.UNARY_OPERATORS.get(code)
    if op == "+" or code == 13:  # __extension__
        return converted(operand, of, place)
    if isinstance(operand.type, CallableType) and op in ("&", "*"):
        return operand
    if op == "&" and isinstance(operand, Unary) and operand.op == "*":
        return operand.operand
    if op == "*" and isinstance(operand, Unary) and operand.op == "&":
        return operand.operand
    if op is None:
        return Opaque("an operator not known here", (operand,), of, place)
    if op == "-" and isinstance(operand, Literal) and isinstance(operand.value, int | float):
        return Literal(-operand.value, of, place)
    return Unary(op, operand, of, place)


def _binary(given: Lowering, cursor: Cursor) -> Expression:
    code = library().clang_getCursorBinaryOperatorKind(cursor)
    parts = operands(cursor)
    if len(parts) != 2:
        return given.opaque(cursor, "an operator without its operands")
    left, right = given.expression(parts[0]), given.expression(parts[1])
    of, place = given.type(cursor), given.place(cursor)
    if code in kinds.ASSIGNMENTS:
        return Assign(kinds.ASSIGNMENTS[code], left, right, of, place)
    op = kinds.BINARY_OPERATORS.get(code)
    if op is None:
        return Opaque("a pointer to a member", (left, right), of, place)
    return Binary(op, left, right, of, place)


def _subscript(given: Lowering, cursor: Cursor) -> Expression:
    parts = operands(cursor)
    if len(parts) != 2:
        return given.opaque(cursor, "a subscript without its parts")
    base, index = given.expression(parts[0]), given.expression(parts[1])
    if isinstance(base.type, IntType) and isinstance(index.type, PointerType | ArrayType):
        base, index = index, base
    return Index(base, index, given.type(cursor), given.place(cursor))


def _conditional(given: Lowering, cursor: Cursor) -> Expression:
    parts = operands(cursor)
    if len(parts) != 3:
        return given.opaque(cursor, "a conditional without its parts")
    condition, yes, no = (given.expression(part) for part in parts)
    return Select(condition, yes, no, given.type(cursor), given.place(cursor))


def _braced(given: Lowering, cursor: Cursor) -> Expression:
    return braced(given, cursor, given.type(cursor))


def _compound_literal(given: Lowering, cursor: Cursor) -> Expression:
    parts = operands(cursor)
    return braced(given, parts[-1], given.type(cursor)) if parts else given.opaque(cursor, "an empty literal")


LOWER: dict[int, Lower] = {
    kinds.UNEXPOSED: _implied,
    kinds.DECLARATION_REFERENCE: _reference,
    kinds.MEMBER: _member,
    kinds.CALL: call,
    kinds.INTEGER: _integer,
    **dict.fromkeys((kinds.FLOATING, kinds.CHARACTER, kinds.TRUTH), folded),
    kinds.STRING: _string,
    **dict.fromkeys((kinds.SIZE_OF, kinds.PACK_SIZE), folded),
    kinds.GNU_NULL: lambda given, cursor: Literal(0, given.type(cursor), given.place(cursor)),
    kinds.NULL_POINTER: lambda given, cursor: Literal(0, given.type(cursor), given.place(cursor)),
    kinds.PARENTHESES: _parentheses,
    kinds.UNARY: _unary,
    kinds.SUBSCRIPT: _subscript,
    kinds.BINARY: _binary,
    kinds.COMPOUND_ASSIGNMENT: _binary,
    kinds.CONDITIONAL: _conditional,
    **dict.fromkeys((kinds.C_CAST, kinds.STATIC_CAST, kinds.DYNAMIC_CAST), _cast),
    kinds.REINTERPRET_CAST: _reinterpreted,
    **dict.fromkeys((kinds.CONST_CAST, kinds.FUNCTIONAL_CAST), _cast),
    kinds.COMPOUND_LITERAL: _compound_literal,
    kinds.BRACED: _braced,
    kinds.THIS: _this,
    kinds.LAMBDA: closure,
}
