"""The compiler's types, read as those of the model: by the width that hardware gives them."""

from __future__ import annotations

import re
from collections.abc import Callable

from beatwise.frontend.libclang import (
    ClangType,
    Cursor,
    children,
    fields,
    is_stand_in,
    library,
    location,
    spelling,
    text,
    usr,
)
from beatwise.model.types import (
    ArrayType,
    BurstPointerType,
    CallableType,
    Field,
    IntType,
    PointerType,
    RealType,
    RecordType,
    ReferenceType,
    StreamType,
    Type,
    UnknownType,
    VectorType,
    VoidType,
)

Argument = int | Type | None  #: a template argument; None: not known

INTEGERS = {  # CXTypeKind: bits, signed
    3: (1, False),
    4: (8, False),
    5: (8, False),
    6: (16, False),
    7: (32, False),
    8: (16, False),
    9: (32, False),
    10: (64, False),
    11: (64, False),
    12: (128, False),
    13: (8, True),
    14: (8, True),
    15: (32, True),
    16: (16, True),
    17: (32, True),
    18: (64, True),
    19: (64, True),
    20: (128, True),
}
REALS = {21: (32, 4), 22: (64, 8), 23: (128, 16), 30: (128, 16), 31: (16, 2), 32: (16, 2), 39: (16, 2)}
VOID, NULLPTR, COMPLEX, POINTER, LVALUE_REFERENCE, RVALUE_REFERENCE = 2, 24, 100, 101, 103, 104
RECORD, ENUM, FUNCTION_NO_PROTO, FUNCTION, CONSTANT_ARRAY, VECTOR = 105, 106, 110, 111, 112, 113
INCOMPLETE_ARRAY, VARIABLE_ARRAY, MEMBER_POINTER, EXT_VECTOR = 114, 115, 117, 176
UNION, PARAMETER, BASE_SPECIFIER, PACKED = 3, 10, 44, 408  #: CXCursorKind
INVENTED_BITS = 19  #: of the built-in type that stands in for an unknown number type
NAMESPACE = re.compile(r"c:@N@(\w+)@")  #: of a USR
BIT_INT = re.compile(r"(unsigned )?_BitInt\((\d+)\)")


def power_of_two_bytes(bits: int) -> int:
    """The bytes an integer takes in memory: its bits, rounded up to a power of two.

    >>> [power_of_two_bytes(bits) for bits in (1, 12, 24, 96, 512)]
    [1, 2, 4, 16, 64]
    """
    return 1 << max(0, ((max(bits, 1) + 7) // 8 - 1).bit_length())


def integer(bits: Argument, signed: bool) -> Type:
    if not isinstance(bits, int):
        return UnknownType("integer of unknown width")
    return IntType(bits, signed, power_of_two_bytes(bits))


def _type(argument: Argument) -> Type:
    return UnknownType("?") if argument is None or isinstance(argument, int) else argument


def _count(argument: Argument) -> int | None:
    return argument if isinstance(argument, int) else None


def _fixed(arguments: list[Argument]) -> Type:
    bits = _count(arguments[0]) if arguments else None
    return RealType(bits, power_of_two_bytes(bits)) if bits else UnknownType("fixed point of unknown width")


def _stream(arguments: list[Argument]) -> Type:
    depth = _count(arguments[1]) if len(arguments) > 1 else None
    return StreamType(_type(arguments[0]), depth or None)


def _streams(arguments: list[Argument]) -> Type:
    depth = _count(arguments[2]) if len(arguments) > 2 else None
    return ArrayType(StreamType(_type(arguments[0]), depth or None), _count(arguments[1]))


def _vector(arguments: list[Argument]) -> Type:
    element, lanes = _type(arguments[0]), _count(arguments[1])
    if lanes is None:
        return UnknownType("vector of unknown length")
    return VectorType(element, lanes, element.bytes * lanes)


#: Class templates that stand for a type of the model, wherever they are declared.
ANYWHERE: dict[str, Callable[[list[Argument]], Type]] = {
    "ap_int": lambda given: integer(given[0], True),
    "ap_uint": lambda given: integer(given[0], False),
    "ap_int_base": lambda given: integer(given[0], given[1] != 0),
    "ap_bit_ref": lambda _: IntType(1, False, 1),
    "ap_range_ref": lambda given: integer(given[0], False),
    "ap_concat_ref": lambda given: integer(given[0], False),
    "ac_int": lambda given: integer(given[0], given[1] != 0 if len(given) > 1 else True),
    "ap_fixed": _fixed,
    "ap_ufixed": _fixed,
    "ap_fixed_base": _fixed,
    "ac_fixed": _fixed,
    "burst_maxi": lambda given: BurstPointerType(_type(given[0])),
}
#: The same for names that users give to types of their own: only as our headers declare them, by namespace.
IN_HEADERS: dict[tuple[str, str], Callable[[list[Argument]], Type]] = {
    ("", "half"): lambda _: RealType(16, 2),
    ("", "ac_channel"): _stream,
    ("hls", "stream"): _stream,
    ("hls", "stream_of_blocks"): _stream,
    ("hls", "read_lock"): lambda given: _type(given[0]),
    ("hls", "write_lock"): lambda given: _type(given[0]),
    ("hls", "vector"): _vector,
    ("std", "array"): lambda given: ArrayType(_type(given[0]), _count(given[1])),
    ("std", "bitset"): lambda given: integer(given[0], False),
    ("std", "reference"): lambda _: IntType(1, False, 1),  # to a bit of a bitset
    ("std", "function"): lambda _: CallableType(),
    ("std", "atomic"): lambda given: _type(given[0]),
    ("tapa", "stream"): _stream,
    ("tapa", "istream"): _stream,
    ("tapa", "ostream"): _stream,
    ("tapa", "streams"): _streams,
    ("tapa", "istreams"): _streams,
    ("tapa", "ostreams"): _streams,
    ("tapa", "vec_t"): _vector,
    ("tapa", "mmap"): lambda given: PointerType(_type(given[0])),
    ("tapa", "mmaps"): lambda given: ArrayType(PointerType(_type(given[0])), _count(given[1])),
    ("tapa", "async_mmap"): lambda given: BurstPointerType(_type(given[0])),
}


class Types:
    """The types of one translation unit, each read once. ``headers`` is where our own headers are said to lie."""

    def __init__(self, headers: str) -> None:
        self._headers = headers
        self._known: dict[int, Type] = {}
        self._open: set[int] = set()
        self._records: dict[str, ClangType] = {}

    def declared(self, of: RecordType) -> ClangType | None:
        """The compiler's type that a record was read from."""
        return self._records.get(of.key)

    def of(self, cursor: Cursor) -> Type:
        """The type of a declaration or expression."""
        return self.read(library().clang_getCursorType(cursor))

    def of_variable(self, declaration: Cursor, exact: ClangType) -> Type:
        """The type of a variable or of a use of it; an array parameter is a pointer."""
        known = self.read(exact)
        if declaration.kind == PARAMETER and isinstance(known, ArrayType):
            lib = library()
            declared = lib.clang_getCanonicalType(lib.clang_getCursorType(declaration))
            if declared.kind in (CONSTANT_ARRAY, INCOMPLETE_ARRAY, VARIABLE_ARRAY):
                return PointerType(known.element, self.is_volatile(declared))
        return known

    def is_constant(self, given: ClangType) -> bool:
        """Whether a type, or the elements of an array type, are const."""
        return self._is_qualified(given, library().clang_isConstQualifiedType)

    def is_volatile(self, given: ClangType) -> bool:
        return self._is_qualified(given, library().clang_isVolatileQualifiedType)

    def _is_qualified(self, given: ClangType, ask: Callable[[ClangType], int]) -> bool:
        lib = library()
        one = lib.clang_getCanonicalType(given)
        while not ask(one):
            if one.kind not in (CONSTANT_ARRAY, INCOMPLETE_ARRAY, VARIABLE_ARRAY):
                return False
            one = lib.clang_getCanonicalType(lib.clang_getArrayElementType(one))
        return True

    def read(self, given: ClangType) -> Type:
        known = self._known.get(given.identity or 0)
        if known is None:
            known = self._read(library().clang_getCanonicalType(given))
            if given.identity and not self._open:
                self._known[given.identity] = known
        return known

    def _read(self, given: ClangType) -> Type:
        lib = library()
        kind = given.kind
        if kind in INTEGERS:
            bits, signed = INTEGERS[kind]
            return IntType(bits, signed, (bits + 7) // 8)
        if kind in REALS:
            return RealType(*REALS[kind])
        if kind == VOID:
            return VoidType()
        if kind == POINTER:
            pointee = lib.clang_getPointeeType(given)
            if pointee.kind in (FUNCTION, FUNCTION_NO_PROTO):
                return CallableType()
            return PointerType(self.read(pointee), self.is_volatile(pointee), constant=self.is_constant(pointee))
        if kind in (LVALUE_REFERENCE, RVALUE_REFERENCE):
            return ReferenceType(self.read(lib.clang_getPointeeType(given)))
        if kind == CONSTANT_ARRAY:
            return ArrayType(self.read(lib.clang_getArrayElementType(given)), lib.clang_getArraySize(given))
        if kind in (INCOMPLETE_ARRAY, VARIABLE_ARRAY):
            return ArrayType(self.read(lib.clang_getArrayElementType(given)), None)
        if kind == RECORD:
            return self._record(given)
        if kind == ENUM:
            return self.read(lib.clang_getEnumDeclIntegerType(lib.clang_getTypeDeclaration(given)))
        if kind in (FUNCTION, FUNCTION_NO_PROTO):
            return CallableType()
        if kind == NULLPTR:
            return PointerType(VoidType())
        if kind in (VECTOR, EXT_VECTOR):
            lanes = lib.clang_getNumElements(given)
            element = self.read(lib.clang_getElementType(given))
            return VectorType(element, lanes, element.bytes * lanes)
        if kind == COMPLEX:
            size = max(0, lib.clang_Type_getSizeOf(given))
            return RealType(size * 8, size)
        spelled = text(lib.clang_getTypeSpelling(given))
        if exact := BIT_INT.search(spelled):
            bits = int(exact[2])
            return UnknownType("a number") if bits == INVENTED_BITS else integer(bits, not exact[1])
        return CallableType() if kind == MEMBER_POINTER else UnknownType(spelled)

    def arguments(self, given: ClangType) -> list[Argument]:
        """The template arguments of a class type."""
        lib = library()
        declaration = lib.clang_getTypeDeclaration(given)
        found: list[Argument] = []
        for index in range(max(0, lib.clang_Cursor_getNumTemplateArguments(declaration))):
            kind = lib.clang_Cursor_getTemplateArgumentKind(declaration, index)
            if kind == 1:  # a type
                found.append(self.read(lib.clang_Cursor_getTemplateArgumentType(declaration, index)))
            else:
                value = lib.clang_Cursor_getTemplateArgumentValue(declaration, index)
                found.append(value if kind == 4 else None)
        return found

    def _record(self, given: ClangType) -> Type:
        lib = library()
        declaration = lib.clang_getTypeDeclaration(given)
        name, key = spelling(declaration), usr(declaration)
        if "(lambda" in name or not name and "(lambda" in text(lib.clang_getTypeSpelling(given)):
            return CallableType()
        if is_stand_in(key):
            return UnknownType(name)
        namespace = NAMESPACE.match(key)
        made = ANYWHERE.get(name) or IN_HEADERS.get((namespace[1] if namespace else "", name))
        if made:
            ours = location(lib.clang_getCursorLocation(declaration), spelled=False)[0].startswith(self._headers)
            if name in ANYWHERE or ours:
                try:
                    return made(self.arguments(given))
                except IndexError:
                    return UnknownType(name)
        size = max(0, lib.clang_Type_getSizeOf(given))
        identity = declaration.identity or 0
        if identity in self._open:
            return RecordType(key, name, size, ())
        self._open.add(identity)
        self._records[key] = given
        try:
            members, exact, bit_fields = self._fields(given)
            listed = children(declaration)
            bases = tuple(
                base
                for child in listed
                if child.kind == BASE_SPECIFIER and isinstance(base := self.of(child), RecordType)
            )
        finally:
            self._open.discard(identity)
        packed = any(one.kind == PACKED for one in listed) and not bit_fields
        if (packed or not exact) and not bases and declaration.kind != UNION:
            members, size = _laid_out(members, packed=packed)
        return RecordType(key, "" if "(" in name else name, size, members, bases)

    def _fields(self, given: ClangType) -> tuple[tuple[Field, ...], bool, bool]:
        """The members, those of anonymous ones among them; whether the compiler's sizes are those of the model; whether
        some are bit fields."""
        lib = library()
        found, exact, bit_fields = [], True, False
        for member in fields(given):
            declared = lib.clang_getCursorType(member)
            kind = self.read(declared)
            offset = lib.clang_Cursor_getOffsetOfField(member)
            bit_fields = bit_fields or bool(lib.clang_Cursor_isBitField(member))
            name, start = spelling(member), max(0, offset) // 8
            if isinstance(kind, RecordType) and (not name or "(" in name):  # its members count as ours
                found += [Field(one.name, one.type, start + one.offset) for one in kind.fields]
            else:
                found.append(Field(name, kind, start))
            if isinstance(kind, IntType | RealType | VectorType | RecordType | ArrayType) and kind.bytes:
                exact = exact and lib.clang_Type_getSizeOf(declared) == kind.bytes
        return tuple(found), exact, bit_fields


def _laid_out(members: tuple[Field, ...], *, packed: bool) -> tuple[tuple[Field, ...], int]:
    """Members placed one after the other, each aligned to its own size, at most 8 bytes; and the size of it all.

    Packed ones are not aligned: the compiler packs no members with constructors, but hardware packs its integers.
    """
    offset, widest = 0, 1
    placed: list[Field] = []
    for member in members:
        align = 1 if packed else _alignment(member.type)
        widest = max(widest, align)
        offset = -(-offset // align) * align
        placed.append(Field(member.name, member.type, offset))
        offset += member.type.bytes
    return tuple(placed), -(-offset // widest) * widest


def _alignment(of: Type) -> int:
    match of:
        case ArrayType(element=element) | VectorType(element=element):
            return _alignment(element)
        case RecordType(fields=inner):
            return max((_alignment(field.type) for field in inner), default=1)
        case _:
            return min(max(1, of.bytes), 8)
