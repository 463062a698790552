"""Calls, operator calls and constructions."""

from __future__ import annotations

from beatwise.frontend import kinds, numbers
from beatwise.frontend.conversions import converted, same
from beatwise.frontend.initials import braced
from beatwise.frontend.libclang import Cursor, Location, library, location, operands
from beatwise.frontend.lowering import Callee, Lowering
from beatwise.frontend.objects import dereferenced, this_object
from beatwise.model.kernel import Assign, Build, Call, Expression, FunctionName, Index, Items, Literal, Opaque
from beatwise.model.place import Place
from beatwise.model.types import (
    ArrayType,
    BurstPointerType,
    CallableType,
    IntType,
    PointerType,
    RealType,
    RecordType,
    StreamType,
    Type,
    UnknownType,
    VectorType,
    VoidType,
)

METHODS = frozenset({kinds.METHOD, kinds.CONVERSION, kinds.DESTRUCTOR})
SIZE = IntType(64, False, 8)


def call(given: Lowering, cursor: Cursor) -> Expression:
    """Anything the compiler calls a call: of a function, a method, an operator, a value, or a construction."""
    declaration = library().clang_getCursorReferenced(cursor)
    kind = declaration.kind
    if kind == kinds.CONSTRUCTOR:
        return _construction(given, cursor, declaration)
    if kind not in kinds.FUNCTIONS:
        return _through_value(given, cursor)
    callee = given.callee(declaration)
    passed = [library().clang_Cursor_getArgument(cursor, index) for index in range(_count(cursor))]
    of, place = given.type(cursor), given.place(cursor)
    if kind in METHODS and not library().clang_CXXMethod_isStatic(declaration):
        member = _callee_expression(cursor)
        if member is not None and member.kind == kinds.MEMBER and _names(given, member, callee.name):
            receiver = _receiver(given, member)
            arguments = _arguments(given, passed, declaration, callee)
            return _method(given, callee, declaration, receiver, arguments, of, place, operator=False)
        if passed:
            receiver = given.expression(passed[0])
            arguments = _arguments(given, passed[1:], declaration, callee)
            return _method(given, callee, declaration, receiver, arguments, of, place, operator=True)
    arguments = _arguments(given, passed, declaration, callee)
    return _function(given, callee, declaration, cursor, arguments, of, place)


def _count(cursor: Cursor) -> int:
    count: int = library().clang_Cursor_getNumArguments(cursor)
    return max(0, count)


def _callee_expression(cursor: Cursor) -> Cursor | None:
    """The expression that names what is called, without what the compiler put around it."""
    parts = operands(cursor)
    one = parts[0] if parts else None
    while one is not None and one.kind in (kinds.UNEXPOSED, kinds.PARENTHESES):
        below = operands(one)
        one = below[0] if below else None
    return one


def _names(given: Lowering, member: Cursor, name: str) -> bool:
    """Whether a member expression names the method that is called: ``x.f = y`` begins with one, too."""
    return given.name(library().clang_getCursorReferenced(member)) == name


def _receiver(given: Lowering, member: Cursor) -> Expression:
    lib = library()
    parts = operands(member)
    if not given.name(lib.clang_getCursorReferenced(member)).startswith("operator"):
        named = _offset(lib.clang_getCursorLocation(member))  # what comes after the name are the template's arguments
        starts = [(part, lib.clang_getRangeStart(lib.clang_getCursorExtent(part))) for part in parts]
        parts = [part for part, start in starts if _offset(start) <= named]
    if not parts:
        return this_object(given, member)
    base = given.expression(parts[0])
    return dereferenced(base) if given.is_pointer(parts[0]) else base


def _offset(raw: Location) -> int:
    return location(raw, spelled=True)[3]


def _arguments(given: Lowering, passed: list[Cursor], declaration: Cursor, callee: Callee) -> tuple[Expression, ...]:
    """The arguments; defaults that the source leaves out are filled in, but for functions known by name only."""
    found = []
    for index, one in enumerate(passed):
        if library().clang_getCursorExtent(one).begin or operands(one):
            found.append(given.expression(one))
        elif callee.given or callee.name.startswith("operator"):  # the mark of postfix ++ is one, too
            found.append(_default(given, one, declaration, index))
    return tuple(found)


def _default(given: Lowering, left_out: Cursor, declaration: Cursor, index: int) -> Expression:
    value = given.folded(left_out)
    if value is not None:
        return Literal(value, given.type(left_out), given.place(left_out))
    parameter = library().clang_Cursor_getArgument(declaration, index)
    written = operands(parameter)
    if written:
        return converted(given.expression(written[-1]), given.type(parameter), given.place(parameter))
    return Opaque("a default argument", (), given.type(left_out), given.place(left_out))


def _function(
    given: Lowering,
    callee: Callee,
    declaration: Cursor,
    cursor: Cursor,
    arguments: tuple[Expression, ...],
    of: Type,
    place: Place,
) -> Expression:
    name = callee.name
    if not callee.given and arguments:
        if name.startswith("operator") and not name[8:9].isalnum():
            return _free_operator(name[8:], arguments, of, place)
        if name in ("move", "forward", "as_const") and len(arguments) == 1:
            return arguments[0]
    if isinstance(of, IntType) and all(isinstance(one, Literal) for one in arguments) and callee.given:
        value = given.folded(cursor)
        if isinstance(value, int):
            return Literal(value, of, place)
    return Call(callee.key, name, None, arguments, of, place, template_arguments=_template(given, declaration))


def _free_operator(op: str, arguments: tuple[Expression, ...], of: Type, place: Place) -> Expression:
    first = arguments[0].type
    if isinstance(first, StreamType) and op in ("<<", ">>"):
        return Call(None, "read" if op == ">>" else "write", arguments[0], arguments[1:], of, place)
    if all(numbers.is_number(one.type) for one in arguments):
        return numbers.operator(op, arguments, of, place)
    return Call(None, f"operator{op}", arguments[0], arguments[1:], of, place)


def _template(given: Lowering, declaration: Cursor) -> tuple[int | str | Type | None, ...]:
    lib = library()
    found: list[int | str | Type | None] = []
    for index in range(max(0, lib.clang_Cursor_getNumTemplateArguments(declaration))):
        kind = lib.clang_Cursor_getTemplateArgumentKind(declaration, index)
        if kind == 1:
            found.append(given.types.read(lib.clang_Cursor_getTemplateArgumentType(declaration, index)))
        else:
            found.append(lib.clang_Cursor_getTemplateArgumentValue(declaration, index) if kind == 4 else None)
    return tuple(found)


def _method(
    given: Lowering,
    callee: Callee,
    declaration: Cursor,
    receiver: Expression,
    arguments: tuple[Expression, ...],
    of: Type,
    place: Place,
    *,
    operator: bool,
) -> Expression:
    name = callee.name
    if isinstance(receiver.type, CallableType) and name == "operator()":
        template = library().clang_getSpecializedCursorTemplate(declaration)
        generic = template.kind == kinds.FUNCTION_TEMPLATE  # only the call knows which instance it is
        return Call(callee.key if generic else None, name, None, arguments, of, place, target=receiver)
    if callee.given and isinstance(receiver.type, RecordType | UnknownType | VoidType):
        if name == "operator=" and callee.key is None and len(arguments) == 1:  # the compiler's own
            return Assign("", receiver, converted(arguments[0], receiver.type, place), receiver.type, place)
        return Call(callee.key, name, receiver, arguments, of, place, template_arguments=_template(given, declaration))
    op = name[8:] if name.startswith("operator") and not name[8:9].isalnum() and name[8:9] != " " else None
    match receiver.type:
        case IntType() | RealType():
            if op is not None:
                return numbers.operator(op, (receiver, *arguments), of, place)
            template = next((one for one in _template(given, declaration) if isinstance(one, int)), None)
            return numbers.method(name, receiver, arguments, template, of, place)
        case StreamType() if op in ("<<", ">>"):
            return Call(None, "read" if op == ">>" else "write", receiver, arguments, of, place)
        case ArrayType() | VectorType() | PointerType() if op == "[]" and len(arguments) == 1:
            return Index(receiver, arguments[0], of, place)
        case ArrayType(count=count):
            match name, arguments:
                case "at", (index,):
                    return Index(receiver, index, of, place)
                case (("data" | "begin" | "cbegin"), ()):
                    return receiver
                case (("size" | "max_size"), ()) if count is not None:
                    return Literal(count, of, place)
                case "front", ():
                    return Index(receiver, Literal(0, SIZE, place), of, place)
                case "back", () if count:
                    return Index(receiver, Literal(count - 1, SIZE, place), of, place)
        case VectorType(lanes=lanes) if name == "size":
            return Literal(lanes, of, place)
        case PointerType() if name in ("get", "data") and not arguments:
            return receiver
    if op == "=" and len(arguments) == 1 and not isinstance(receiver.type, StreamType | BurstPointerType):
        return Assign("", receiver, converted(arguments[0], receiver.type, place), receiver.type, place)
    if name.startswith("operator ") and (same(receiver.type, of) or isinstance(of, PointerType) and not arguments):
        return receiver if isinstance(receiver.type, ArrayType | PointerType) else converted(receiver, of, place)
    return Call(None, name, receiver, arguments, of, place, template_arguments=_template(given, declaration))


def _through_value(given: Lowering, cursor: Cursor) -> Expression:
    """A call of a function pointer or of something the compiler could not resolve."""
    of, place = given.type(cursor), given.place(cursor)
    parts = operands(cursor)
    passed = [library().clang_Cursor_getArgument(cursor, index) for index in range(_count(cursor))]
    arguments = tuple(given.expression(one) for one in passed)
    if len(parts) <= len(passed):
        return Opaque("a call that the compiler could not resolve", arguments, of, place)
    target = given.expression(parts[0])
    if isinstance(target, FunctionName):
        return Call(target.key, target.key, None, arguments, of, place)
    return Call(None, "", None, arguments, of, place, target=target)


def _construction(given: Lowering, cursor: Cursor, constructor: Cursor) -> Expression:
    of, place = given.type(cursor), given.place(cursor)
    callee = given.callee(constructor)
    passed = [library().clang_Cursor_getArgument(cursor, index) for index in range(_count(cursor))]
    if len(passed) == 1 and passed[0].kind == kinds.BRACED and not callee.given:
        return braced(given, passed[0], of)
    arguments = _arguments(given, passed, constructor, callee)
    return constructed(callee, arguments, of, place)


def constructed(callee: Callee, arguments: tuple[Expression, ...], of: Type, place: Place) -> Expression:
    """What a constructor makes of its arguments: copies and conversions of numbers are just that."""
    if callee.key is None:
        if len(arguments) == 1:
            only = arguments[0]
            if same(only.type, of) or isinstance(only.type, CallableType) and isinstance(of, CallableType):
                return only
            if isinstance(of, IntType | RealType) and isinstance(only.type, IntType | RealType | RecordType):
                return converted(only, of, place)
            if isinstance(of, PointerType) and isinstance(only.type, PointerType | ArrayType):
                return converted(only, of, place)
        if not arguments and isinstance(of, IntType | RealType | PointerType):
            return Literal(0, of, place)
        if not arguments and isinstance(of, ArrayType | RecordType | VectorType):
            return Items((), of, place)
    return Build(callee.key, arguments, of, place)
