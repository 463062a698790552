"""The compiler's own interface, called directly: structures, prototypes and the few questions the lowering asks.

A cursor is copied by value and asked through plain function calls; the cursor objects of the library's Python binding
cost several times as much. Kinds and operator codes are those of the C header of libclang 18.
"""

from __future__ import annotations

import ctypes
import functools
import importlib.util
from collections.abc import Mapping, Sequence
from ctypes import CFUNCTYPE, POINTER, Structure, byref, c_char_p, c_int, c_longlong, c_uint, c_ulonglong, c_void_p
from pathlib import Path
from typing import Any

from beatwise.frontend import kinds
from beatwise.frontend.prelude import INVENTED


class Cursor(Structure):
    """CXCursor: a declaration, statement, expression or reference. ``data[0]`` identifies a declaration."""

    kind: int
    identity: int | None
    statement: int | None
    _fields_ = [
        ("kind", c_int),
        ("xdata", c_int),
        ("identity", c_void_p),
        ("statement", c_void_p),
        ("unit", c_void_p),
    ]


class ClangType(Structure):
    """CXType; ``identity`` is one per qualified type."""

    kind: int
    identity: int | None
    _fields_ = [("kind", c_int), ("identity", c_void_p), ("unit", c_void_p)]


class Location(Structure):
    """CXSourceLocation; ``raw`` counts through all files, its top bit marks macro expansions."""

    raw: int
    _fields_ = [("data", c_void_p * 2), ("raw", c_uint)]


class Extent(Structure):
    """CXSourceRange."""

    begin: int
    end: int
    _fields_ = [("data", c_void_p * 2), ("begin", c_uint), ("end", c_uint)]


class Text(Structure):
    """CXString."""

    _fields_ = [("data", c_void_p), ("flags", c_uint)]


class UnsavedFile(Structure):
    """CXUnsavedFile."""

    _fields_ = [("name", c_char_p), ("contents", c_char_p), ("length", ctypes.c_ulong)]


class Ranges(Structure):
    """CXSourceRangeList."""

    _fields_ = [("count", c_uint), ("ranges", POINTER(Extent))]


Visitor = CFUNCTYPE(c_int, Cursor, Cursor, c_void_p)
FieldVisitor = CFUNCTYPE(c_int, Cursor, c_void_p)
MACRO_BIT = 1 << 31  #: of a raw location

PROTOTYPES: dict[str, tuple[Any, list[Any]]] = {
    "clang_createIndex": (c_void_p, [c_int, c_int]),
    "clang_disposeIndex": (None, [c_void_p]),
    "clang_parseTranslationUnit2": (
        c_int,
        [c_void_p, c_char_p, POINTER(c_char_p), c_int, POINTER(UnsavedFile), c_uint, c_uint, POINTER(c_void_p)],
    ),
    "clang_disposeTranslationUnit": (None, [c_void_p]),
    "clang_getTranslationUnitCursor": (Cursor, [c_void_p]),
    "clang_getNumDiagnostics": (c_uint, [c_void_p]),
    "clang_getDiagnostic": (c_void_p, [c_void_p, c_uint]),
    "clang_disposeDiagnostic": (None, [c_void_p]),
    "clang_getDiagnosticSpelling": (Text, [c_void_p]),
    "clang_getDiagnosticSeverity": (c_int, [c_void_p]),
    "clang_getDiagnosticCategoryText": (Text, [c_void_p]),
    "clang_getDiagnosticLocation": (Location, [c_void_p]),
    "clang_getCString": (c_char_p, [Text]),
    "clang_disposeString": (None, [Text]),
    "clang_visitChildren": (c_uint, [Cursor, Visitor, c_void_p]),
    "clang_Type_visitFields": (c_uint, [ClangType, FieldVisitor, c_void_p]),
    "clang_getCursorSpelling": (Text, [Cursor]),
    "clang_getCursorUSR": (Text, [Cursor]),
    "clang_getCursorType": (ClangType, [Cursor]),
    "clang_getCursorExtent": (Extent, [Cursor]),
    "clang_getCursorLocation": (Location, [Cursor]),
    "clang_getCursorReferenced": (Cursor, [Cursor]),
    "clang_getCanonicalCursor": (Cursor, [Cursor]),
    "clang_getCursorDefinition": (Cursor, [Cursor]),
    "clang_getCursorSemanticParent": (Cursor, [Cursor]),
    "clang_getSpecializedCursorTemplate": (Cursor, [Cursor]),
    "clang_getCursorBinaryOperatorKind": (c_int, [Cursor]),
    "clang_getCursorUnaryOperatorKind": (c_int, [Cursor]),
    "clang_Cursor_getNumArguments": (c_int, [Cursor]),
    "clang_Cursor_getArgument": (Cursor, [Cursor, c_uint]),
    "clang_Cursor_getVarDeclInitializer": (Cursor, [Cursor]),
    "clang_Cursor_getStorageClass": (c_int, [Cursor]),
    "clang_Cursor_hasVarDeclGlobalStorage": (c_int, [Cursor]),
    "clang_Cursor_isFunctionInlined": (c_uint, [Cursor]),
    "clang_CXXMethod_isStatic": (c_uint, [Cursor]),
    "clang_getCursorLinkage": (c_int, [Cursor]),
    "clang_isInvalidDeclaration": (c_uint, [Cursor]),
    "clang_isCursorDefinition": (c_uint, [Cursor]),
    "clang_Cursor_isBitField": (c_uint, [Cursor]),
    "clang_getFieldDeclBitWidth": (c_int, [Cursor]),
    "clang_Cursor_getOffsetOfField": (c_longlong, [Cursor]),
    "clang_getEnumConstantDeclValue": (c_longlong, [Cursor]),
    "clang_Cursor_Evaluate": (c_void_p, [Cursor]),
    "clang_EvalResult_getKind": (c_int, [c_void_p]),
    "clang_EvalResult_getAsLongLong": (c_longlong, [c_void_p]),
    "clang_EvalResult_isUnsignedInt": (c_uint, [c_void_p]),
    "clang_EvalResult_getAsUnsigned": (c_ulonglong, [c_void_p]),
    "clang_EvalResult_getAsDouble": (ctypes.c_double, [c_void_p]),
    "clang_EvalResult_getAsStr": (c_char_p, [c_void_p]),
    "clang_EvalResult_dispose": (None, [c_void_p]),
    "clang_Cursor_getNumTemplateArguments": (c_int, [Cursor]),
    "clang_Cursor_getTemplateArgumentKind": (c_int, [Cursor, c_uint]),
    "clang_Cursor_getTemplateArgumentType": (ClangType, [Cursor, c_uint]),
    "clang_Cursor_getTemplateArgumentValue": (c_longlong, [Cursor, c_uint]),
    "clang_getCanonicalType": (ClangType, [ClangType]),
    "clang_getPointeeType": (ClangType, [ClangType]),
    "clang_getTypeDeclaration": (Cursor, [ClangType]),
    "clang_getArrayElementType": (ClangType, [ClangType]),
    "clang_getArraySize": (c_longlong, [ClangType]),
    "clang_getNumElements": (c_longlong, [ClangType]),
    "clang_getElementType": (ClangType, [ClangType]),
    "clang_getResultType": (ClangType, [ClangType]),
    "clang_getEnumDeclIntegerType": (ClangType, [Cursor]),
    "clang_isConstQualifiedType": (c_uint, [ClangType]),
    "clang_isVolatileQualifiedType": (c_uint, [ClangType]),
    "clang_Type_getSizeOf": (c_longlong, [ClangType]),
    "clang_Type_getAlignOf": (c_longlong, [ClangType]),
    "clang_getTypeSpelling": (Text, [ClangType]),
    "clang_Type_getNumTemplateArguments": (c_int, [ClangType]),
    "clang_Type_getTemplateArgumentAsType": (ClangType, [ClangType, c_uint]),
    "clang_getFile": (c_void_p, [c_void_p, c_char_p]),
    "clang_getFileName": (Text, [c_void_p]),
    "clang_getLocationForOffset": (Location, [c_void_p, c_void_p, c_uint]),
    "clang_getRangeStart": (Location, [Extent]),
    "clang_getRangeEnd": (Location, [Extent]),
    "clang_getExpansionLocation": (
        None,
        [Location, POINTER(c_void_p), POINTER(c_uint), POINTER(c_uint), POINTER(c_uint)],
    ),
    "clang_getFileLocation": (None, [Location, POINTER(c_void_p), POINTER(c_uint), POINTER(c_uint), POINTER(c_uint)]),
    "clang_getAllSkippedRanges": (POINTER(Ranges), [c_void_p]),
    "clang_disposeSourceRangeList": (None, [POINTER(Ranges)]),
    "clang_getCursorPrettyPrinted": (Text, [Cursor, c_void_p]),
}


@functools.cache
def library() -> Any:
    """libclang, with the prototypes set. Loaded once, when first asked for."""
    wheel = importlib.util.find_spec("clang")  # its binding stays unused: importing it takes longer than the library
    folders = [Path(folder) / "native" for folder in (wheel.submodule_search_locations or ())] if wheel else []
    found = next((path for folder in folders for path in sorted(folder.glob("libclang.*"))), None)
    if found is None:
        raise ImportError("the package 'libclang' is not installed, or holds no library")
    loaded = ctypes.CDLL(str(found))
    for function, (result, arguments) in PROTOTYPES.items():
        prototype = getattr(loaded, function)
        prototype.restype, prototype.argtypes = result, arguments
    return loaded


def text(value: Text) -> str:
    """The Python string of a CXString, which is given back."""
    lib = library()
    raw: bytes | None = lib.clang_getCString(value)
    found = raw.decode("utf-8", "replace") if raw is not None else ""
    lib.clang_disposeString(value)
    return found


_visited: list[Cursor] = []


def _note(child: Cursor, _parent: Cursor, _data: int | None) -> int:
    _visited.append(child)
    return 1  # CXChildVisit_Continue


_visit = Visitor(_note)


def children(cursor: Cursor) -> list[Cursor]:
    """The cursors directly below one, in the order of the source."""
    library().clang_visitChildren(cursor, _visit, None)
    found = _visited[:]
    _visited.clear()
    return found


def fields(record: ClangType) -> list[Cursor]:
    """The data members of a record type, those of template instances too."""
    found: list[Cursor] = []

    def visit(child: Cursor, _data: int | None) -> int:
        found.append(child)
        return 1

    library().clang_Type_visitFields(record, FieldVisitor(visit), None)
    return found


def spelling(cursor: Cursor) -> str:
    return text(library().clang_getCursorSpelling(cursor))


def usr(cursor: Cursor) -> str:
    """The name of a declaration that is the same in every file."""
    return text(library().clang_getCursorUSR(cursor))


def operands(cursor: Cursor) -> list[Cursor]:
    """The expressions directly below a cursor."""
    return [child for child in children(cursor) if child.kind in kinds.EXPRESSIONS]


def has_body(function: Cursor) -> bool:
    return any(child.kind in (kinds.COMPOUND, kinds.TRY) for child in children(function))


def is_stand_in(usr: str) -> bool:
    """Whether a USR is that of a declaration in the namespace of the stand-ins."""
    return usr.startswith(f"c:@N@{INVENTED}@")


def evaluated(cursor: Cursor) -> int | float | str | None:
    """What the compiler folds an expression or an initialised variable to."""
    lib = library()
    result = lib.clang_Cursor_Evaluate(cursor)
    if not result:
        return None
    kind = lib.clang_EvalResult_getKind(result)
    value: int | float | str | None = None
    if kind == 1:
        unsigned = lib.clang_EvalResult_isUnsignedInt(result)
        value = lib.clang_EvalResult_getAsUnsigned(result) if unsigned else lib.clang_EvalResult_getAsLongLong(result)
    elif kind == 2:
        value = lib.clang_EvalResult_getAsDouble(result)
    elif kind in (4, 5):
        value = (lib.clang_EvalResult_getAsStr(result) or b"").decode("utf-8", "replace")
    lib.clang_EvalResult_dispose(result)
    return value


def location(raw: Location, *, spelled: bool) -> tuple[str, int, int, int]:
    """File name, line, column and offset of a location; inside a macro those of the expansion, or, with ``spelled``,
    of the argument's text where it is written as a macro's argument."""
    lib = library()
    file, line, column, offset = c_void_p(), c_uint(), c_uint(), c_uint()
    ask = lib.clang_getFileLocation if spelled else lib.clang_getExpansionLocation
    ask(raw, byref(file), byref(line), byref(column), byref(offset))
    name = text(lib.clang_getFileName(file)) if file.value else ""
    return name, line.value, column.value, offset.value


class TranslationUnit:
    """One parsed file with everything it includes; ``handle`` lives as long as this object."""

    def __init__(self, name: str, files: Mapping[str, bytes], arguments: Sequence[str], options: int) -> None:
        lib = library()
        self._index = lib.clang_createIndex(0, 0)
        unsaved = (UnsavedFile * len(files))(
            *(UnsavedFile(path.encode(), contents, len(contents)) for path, contents in files.items())
        )
        flags = (c_char_p * len(arguments))(*(argument.encode() for argument in arguments))
        handle = c_void_p()
        self.failure: int = lib.clang_parseTranslationUnit2(
            self._index, name.encode(), flags, len(arguments), unsaved, len(files), options, byref(handle)
        )
        self.handle: int | None = handle.value

    def __del__(self) -> None:
        lib = library()
        if self.handle:
            lib.clang_disposeTranslationUnit(self.handle)
            self.handle = None
        lib.clang_disposeIndex(self._index)

    @property
    def root(self) -> Cursor:
        found: Cursor = library().clang_getTranslationUnitCursor(self.handle)
        return found

    def file_base(self, path: str) -> int | None:
        """The raw location of the first byte of a file; None when it takes no part in the parse."""
        lib = library()
        file = lib.clang_getFile(self.handle, path.encode())
        if not file:
            return None
        raw: int = lib.clang_getLocationForOffset(self.handle, file, 0).raw
        return raw or None

    def skipped(self) -> list[Extent]:
        """The stretches that ``#if`` left out, in all files."""
        lib = library()
        listed = lib.clang_getAllSkippedRanges(self.handle)
        if not listed:
            return []
        found = [Extent.from_buffer_copy(listed.contents.ranges[index]) for index in range(listed.contents.count)]
        lib.clang_disposeSourceRangeList(listed)
        return found

    def diagnostics(self) -> list[tuple[int, str, str, Location]]:
        """Severity (2 warning, 3 error, 4 fatal), text, category and location of each."""
        lib = library()
        found = []
        for number in range(lib.clang_getNumDiagnostics(self.handle)):
            one = lib.clang_getDiagnostic(self.handle, number)
            found.append(
                (
                    lib.clang_getDiagnosticSeverity(one),
                    text(lib.clang_getDiagnosticSpelling(one)),
                    text(lib.clang_getDiagnosticCategoryText(one)),
                    lib.clang_getDiagnosticLocation(one),
                )
            )
            lib.clang_disposeDiagnostic(one)
        return found
