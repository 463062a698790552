"""Declarations of variables, and their initial values."""

from __future__ import annotations

from dataclasses import replace
from typing import Literal as Word

from beatwise.frontend import kinds
from beatwise.frontend.initials import braced
from beatwise.frontend.libclang import Cursor, children, library, operands
from beatwise.frontend.lowering import EXTERN, Lowering
from beatwise.model.kernel import (
    Declare,
    Expression,
    Index,
    Literal,
    Lost,
    Member,
    Name,
    Opaque,
    Statement,
    Variable,
)
from beatwise.model.types import (
    ArrayType,
    IntType,
    PointerType,
    RecordType,
    ReferenceType,
    StreamType,
    Type,
    UnknownType,
)

IGNORED = frozenset({20, 33, 34, 35, 36, 601, *kinds.RECORDS, kinds.ENUM, kinds.FUNCTION, kinds.FUNCTION_TEMPLATE})


def declared(given: Lowering, cursor: Cursor) -> list[Statement]:
    """The statements of one declarator: none for types and the like."""
    if cursor.kind == kinds.VARIABLE and library().clang_Cursor_getStorageClass(cursor) == EXTERN:
        return []
    if cursor.kind == kinds.VARIABLE:
        made = variable(given, cursor)
        if made.constant and isinstance(made.type, IntType) and isinstance(known := given.folded(cursor), int):
            given.scope.constants[made.name] = known
        lost = _lost_value(given, cursor, made)
        return [Declare(made, made.place), lost] if lost else [Declare(made, made.place)]
    if cursor.kind in IGNORED or cursor.kind in kinds.REFERENCES:
        if cursor.kind == kinds.ENUM:
            for one in children(cursor):
                if one.kind == kinds.ENUMERATOR:
                    given.scope.constants[given.name(one)] = library().clang_getEnumConstantDeclValue(one)
        return []
    if cursor.kind == kinds.UNEXPOSED_DECLARATION:
        if not decompose(given, cursor):
            return []
        whole = variable(given, cursor)
        return [Declare(whole, whole.place)]
    return [Lost("a declaration of a kind not known here", given.place(cursor))]


def decompose(given: Lowering, cursor: Cursor) -> bool:
    """``auto [a, b] = value`` is one variable without a name; the names stand for its parts. Whether it is one."""
    names = [one for one in children(cursor) if one.kind == kinds.UNEXPOSED_DECLARATION]
    if not names or cursor.kind != kinds.UNEXPOSED_DECLARATION:
        return False
    whole = variable(given, cursor, initial=False)
    of = whole.type.to if isinstance(whole.type, ReferenceType) else whole.type
    used = Name(whole.key, whole.name, of, whole.place)
    for index, one in enumerate(names):
        part_type, place = given.type(one), given.place(one)
        part: Expression = Opaque("a part of a decomposed value", (used,), part_type, place)
        if isinstance(of, RecordType) and index < len(of.fields):
            part = Member(used, of.fields[index].name, part_type, place)
        elif isinstance(of, ArrayType):
            part = Index(used, Literal(index, IntType(32, True, 4), place), part_type, place)
        given.bindings[one.identity or 0] = part
    return True


def _lost_value(given: Lowering, cursor: Cursor, made: Variable) -> Lost | None:
    """What to say where the compiler dropped an initial value."""
    if not given.has_errors or made.initial is not None:
        return None
    stretch = given.enter(cursor)
    if stretch is None or isinstance(made.type, StreamType):
        return None
    file, start, end = stretch
    written = file.contents[start : end + 40].decode("utf-8", "replace")
    value = written.partition(made.name)[2].lstrip(" \t\r\n")
    if not value.startswith(("=", "(", "{")):
        return None
    return Lost(f"the compiler could not read the initial value of '{made.name}'", made.place)


def variable(given: Lowering, cursor: Cursor, *, initial: bool = True) -> Variable:
    """A local, static or global variable."""
    lib = library()
    exact = lib.clang_getCursorType(cursor)
    of = given.types.of_variable(cursor, exact)
    if given.has_errors and lib.clang_isInvalidDeclaration(cursor):
        of = _unknown_within(of)
    scope: Word["local", "static", "global", "parameter"] = "local"
    if cursor.kind == kinds.PARAMETER:
        scope = "parameter"
    elif given.is_global(cursor):
        scope = "global"
    elif lib.clang_Cursor_hasVarDeclGlobalStorage(cursor) == 1:
        scope = "static"
    constant = given.types.is_constant(exact)
    value = initial_value(given, cursor, of) if initial else None
    return Variable(given.variable_key(cursor), given.name(cursor), of, given.place(cursor), scope, value, constant)


def _unknown_within(of: Type) -> Type:
    """A type that the compiler made up after an error: it takes ``int`` for what it does not know."""
    match of:
        case PointerType(to=to):
            return replace(of, to=_unknown_within(to))
        case ReferenceType(to=to):
            return ReferenceType(_unknown_within(to))
        case ArrayType(element=element):
            return ArrayType(_unknown_within(element), of.count)
        case IntType(bits=32, signed=True):
            return UnknownType("not known after an error")
        case _:
            return of


def initial_value(given: Lowering, cursor: Cursor, of: Type) -> Expression | None:
    """What a variable is declared with; None where that is left open."""
    lib = library()
    value = lib.clang_Cursor_getVarDeclInitializer(cursor)
    if value.kind not in kinds.EXPRESSIONS:
        return None
    if value.kind == kinds.CALL and not operands(value) and _is_left_open(given, value):
        return None
    if value.kind == kinds.BRACED:
        return braced(given, value, of)
    if isinstance(of, ArrayType) and value.kind == kinds.UNEXPOSED and (parts := operands(value)):
        return given.expression(parts[0])  # a copy of a whole array
    return given.expression(value)


def _is_left_open(given: Lowering, construction: Cursor) -> bool:
    """Whether a variable is default-constructed by the compiler alone (``point p;``), which sets nothing."""
    constructor = library().clang_getCursorReferenced(construction)
    if constructor.kind != kinds.CONSTRUCTOR or given.callee(constructor).key is not None:
        return False
    written = given.places.text(library().clang_getCursorExtent(construction)) or ""
    return not written.endswith(("}", ")"))
