"""What the members of a class start with, where no constructor of the user says so."""

from __future__ import annotations

from typing import TYPE_CHECKING

from beatwise.frontend import kinds
from beatwise.frontend.conversions import converted
from beatwise.frontend.libclang import ClangType, Cursor, children, fields, has_body, library, operands
from beatwise.model.kernel import Build, Expression, Items, Opaque
from beatwise.model.place import Place
from beatwise.model.types import RecordType, Type

if TYPE_CHECKING:
    from beatwise.frontend.lowering import Lowering

CONSTANT_ARRAY, RECORD = 112, 105  #: CXTypeKind
DEEPEST = 16  #: classes within classes that are looked at


def default_of(field: Cursor) -> Cursor | None:
    """The initial value a member is declared with."""
    lib = library()
    parts = operands(field)
    if not parts:
        return None
    last = parts[-1]
    where = lib.clang_getCursorExtent(last)
    if where.begin <= lib.clang_getCursorLocation(field).raw or where.end > lib.clang_getCursorExtent(field).end:
        return None
    if lib.clang_Cursor_isBitField(field) and len(parts) == 1:
        return None
    is_bound = lib.clang_getCursorType(field).kind == CONSTANT_ARRAY and last.kind != kinds.BRACED
    return None if is_bound else last


def sets_members(record: ClangType, depth: int = 0) -> bool:
    """Whether default construction of a class gives some member a value."""
    if depth > DEEPEST:
        return False
    for field in fields(record):
        if default_of(field) is not None or _is_constructed(library().clang_getCursorType(field), depth):
            return True
    return any(_is_constructed(library().clang_getCursorType(base), depth) for base in _bases(record))


def _is_constructed(of: ClangType, depth: int) -> bool:
    one = library().clang_getCanonicalType(of)
    return one.kind == RECORD and (_constructor(one) is not None or sets_members(one, depth + 1))


def _bases(record: ClangType) -> list[Cursor]:
    return [one for one in children(library().clang_getTypeDeclaration(record)) if one.kind == kinds.BASE]


def _constructor(record: ClangType) -> Cursor | None:
    """The default constructor that the user wrote."""
    lib = library()
    for one in children(lib.clang_getTypeDeclaration(record)):
        if one.kind == kinds.CONSTRUCTOR and lib.clang_Cursor_getNumArguments(one) == 0:
            definition: Cursor = lib.clang_getCursorDefinition(one)
            if definition.kind == kinds.CONSTRUCTOR and has_body(definition):
                return definition
    return None


def implied(given: Lowering, record: ClangType, named: set[str], place: Place) -> list[tuple[str, Expression]]:
    """The values of the members and bases that ``named`` does not hold; those of a base without a constructor of its
    own count as members."""
    lib = library()
    found: list[tuple[str, Expression]] = []
    for base in _bases(record):
        one = lib.clang_getCanonicalType(lib.clang_getCursorType(base))
        name = given.name(lib.clang_getTypeDeclaration(one))
        if name in named or not given.is_given(lib.clang_getTypeDeclaration(one)):
            continue
        if constructor := _constructor(one):
            found.append((name, Build(given.callee(constructor).key, (), given.types.read(one), place)))
        else:
            found += implied(given, one, named, place)
    for field in fields(record):
        name = given.name(field)
        if name not in named and (value := member_value(given, field, place)) is not None:
            found.append((name, value))
    return found


def member_value(given: Lowering, field: Cursor, place: Place) -> Expression | None:
    """What a member starts with if nobody says so; None where that is open."""
    lib = library()
    written = default_of(field)
    of = given.type(field)
    if written is not None:
        return initial(given, written, of)
    one = lib.clang_getCanonicalType(lib.clang_getCursorType(field))
    if one.kind != RECORD or not isinstance(of, RecordType) or not given.is_given(lib.clang_getTypeDeclaration(one)):
        return None
    if constructor := _constructor(one):
        return Build(given.callee(constructor).key, (), of, place)
    if not sets_members(one):
        return None
    values = dict(implied(given, one, set(), place))
    left_open = [Opaque("a member without an initial value", (), each.type, place) for each in of.fields]
    return Items(tuple(values.get(each.name, left_open[at]) for at, each in enumerate(of.fields)), of, place)


def initial(given: Lowering, written: Cursor, of: Type) -> Expression:
    from beatwise.frontend.initials import braced

    if written.kind == kinds.BRACED:
        return braced(given, written, of)
    return converted(given.expression(written), of, given.place(written))
