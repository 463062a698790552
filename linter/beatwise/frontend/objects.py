"""Names of variables and functions, and the objects that members belong to."""

from __future__ import annotations

from beatwise.frontend import kinds
from beatwise.frontend.libclang import Cursor, is_stand_in, library, usr
from beatwise.frontend.lowering import Lowering
from beatwise.model.kernel import Expression, FunctionName, Literal, Name, Opaque, This, Unary
from beatwise.model.types import ArrayType, CallableType, PointerType, RecordType, Type, VoidType


def named(given: Lowering, cursor: Cursor, declaration: Cursor) -> Expression:
    """The use of a declared name that is no member."""
    kind = declaration.kind
    if kind in (kinds.VARIABLE, kinds.PARAMETER):
        return _variable(given, cursor, declaration)
    place = given.place(cursor)
    if kind == kinds.ENUMERATOR:
        value = None
        if not (given.inventions and given.is_invented(declaration)):
            value = int(library().clang_getEnumConstantDeclValue(declaration))
        return Literal(value, given.type(cursor), place, given.name(declaration))
    if kind in kinds.FUNCTIONS:
        callee = given.callee(declaration)
        return FunctionName(callee.key or callee.name, CallableType(), place)
    if (declaration.identity or 0) in given.bindings:
        return given.bindings[declaration.identity or 0]
    return Opaque(f"'{given.name(declaration)}'", (), given.type(cursor), place)


def _variable(given: Lowering, cursor: Cursor, declaration: Cursor) -> Expression:
    lib = library()
    name = given.name(declaration)
    exact = lib.clang_getCursorType(cursor)
    of = given.types.of_variable(declaration, exact)
    place = given.place(cursor)
    if given.inventions and declaration.kind == kinds.VARIABLE and is_stand_in(usr(declaration)):
        return Literal(None, of, place, name)
    if declaration.kind == kinds.VARIABLE and given.types.is_constant(lib.clang_getCursorType(declaration)):
        value = given.folded(declaration) if not isinstance(of, ArrayType | PointerType | RecordType) else None
        if isinstance(value, int | float):
            return Literal(value, of, place)
    given.use(declaration)
    return Name(given.variable_key(declaration), name, of, place)


def dereferenced(pointer: Expression) -> Expression:
    if isinstance(pointer, Unary) and pointer.op == "&":
        return pointer.operand
    to = pointer.type.to if isinstance(pointer.type, PointerType) else VoidType()
    return Unary("*", pointer, to, pointer.place)


def this_object(given: Lowering, cursor: Cursor) -> Expression:
    """The object that a bare member name means."""
    record: Type = given.scope.record or VoidType()
    place = given.place(cursor)
    return Unary("*", This(PointerType(record), place), record, place)
