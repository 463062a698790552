"""What the lowering of one translation unit knows while it walks: places, types, names, directives, work to do."""

from __future__ import annotations

from bisect import bisect_left
from collections import deque
from collections.abc import Callable, Mapping
from dataclasses import dataclass, field

from beatwise.frontend import kinds
from beatwise.frontend.libclang import (
    Cursor,
    TranslationUnit,
    children,
    evaluated,
    has_body,
    is_stand_in,
    library,
    operands,
    spelling,
    usr,
)
from beatwise.frontend.members import sets_members
from beatwise.frontend.places import GivenFile, Places
from beatwise.frontend.types import POINTER, RECORD, Types
from beatwise.model.kernel import Directive, Expression, FunctionName, Opaque, Statement, Variable
from beatwise.model.place import Place
from beatwise.model.types import Type

EXTERN = 2  #: CX_StorageClass


@dataclass(slots=True)
class Scope:
    """The function being lowered."""

    name: str
    key: str
    record: Type | None = None
    directives: list[Directive] = field(default_factory=list)  #: found in the block being lowered, from macros
    claimed: set[tuple[str, int]] = field(default_factory=set)  #: (file, offset) of directives that have their owner
    unclaimed: list[Directive] = field(default_factory=list)  #: those that name a variable not yet met
    constants: dict[str, int] = field(default_factory=dict)  #: names whose value is known here
    declared: set[str] = field(default_factory=set)  #: keys of its variables and parameters
    before: list[Statement] = field(default_factory=list)  #: to come before the statement being lowered
    labels: Mapping[str, tuple[Directive, ...]] = field(default_factory=dict)  #: of a script, by loop label
    outer: Scope | None = None  #: of the function around a lambda


@dataclass(slots=True)
class Callee:
    """A function as it is called: ``key`` is None where it has no body among the given files."""

    key: str | None
    name: str
    kind: int
    given: bool  #: declared in a file of the user, not in our headers


class Lowering:
    """One translation unit on its way. ``number`` tells it from the others of the program."""

    def __init__(
        self,
        unit: TranslationUnit,
        files: Mapping[str, GivenFile],
        main: str,
        headers: str,
        number: int,
        directives: Mapping[str, tuple[Directive, ...]],
        skipped: Mapping[str, list[tuple[int, int]]],
        inventions: bool,
        expressions: Mapping[int, Lower],
    ) -> None:
        self._expressions = expressions
        self.unit = unit
        self.files = files
        self.number = number
        self.places = Places(unit, files, main)
        self.types = Types(headers)
        self.inventions = inventions
        self._invented: dict[int, bool] = {}
        self.globals: dict[str, Variable] = {}
        self.bindings: dict[int, Expression] = {}  #: what the names of ``auto [a, b] = ...`` stand for
        self.used_globals: dict[str, Cursor] = {}
        self.far_directives: list[tuple[str, Directive]] = []  #: those that name a variable of no function
        self.defined_globals: dict[str, Cursor] = {}  #: by key
        self.has_pragma_operators = any(b"_Pragma" in file.contents for file in files.values())
        self.pending: deque[tuple[str, Cursor]] = deque()  #: functions to lower: key, definition
        self.linked: Mapping[str, tuple[Lowering, Cursor]] = {}  #: definitions of all units, by USR
        self.constants: dict[str, Cursor] = {}  #: constants and enumerators outside functions, by name
        self.macros: dict[str, str] = {}  #: object-like ones of the user, by name
        self.macro_names: set[str] = set()  #: all of the user's
        self.has_errors = any(severity >= 3 for severity, *_ in unit.diagnostics())
        self.skipped = skipped
        self.lambdas: dict[str, FunctionName] = {}
        self.scope = Scope("", "")
        self._directives = {
            name: ([directive.place.offset for directive in found], found) for name, found in directives.items()
        }
        self._variables: dict[int, str] = {}
        self._functions: dict[int, str] = {}
        self._function_keys: dict[str, int] = {}
        self._callees: dict[int, Callee] = {}
        self._queued: set[str] = set()
        self._names: dict[int, str] = {}
        self._fresh = 0

    # ------------------------------------------------------------------------------------------------- expressions

    def expression(self, cursor: Cursor) -> Expression:
        """An expression, lowered; never raises for what it does not know."""
        lower = self._expressions.get(cursor.kind)
        return lower(self, cursor) if lower else self.opaque(cursor, "an expression of a kind not known here")

    def opaque(self, cursor: Cursor, reason: str) -> Expression:
        parts = tuple(self.expression(child) for child in operands(cursor))
        return Opaque(reason, parts, self.type(cursor), self.place(cursor))

    # ------------------------------------------------------------------------------------------------ small things

    def place(self, cursor: Cursor) -> Place:
        return self.places.place(library().clang_getCursorExtent(cursor))

    def type(self, cursor: Cursor) -> Type:
        return self.types.of(cursor)

    def is_pointer(self, cursor: Cursor) -> bool:
        """Whether an expression is a pointer of C++ (some classes are pointers in the model)."""
        lib = library()
        kind: int = lib.clang_getCanonicalType(lib.clang_getCursorType(cursor)).kind
        return kind == POINTER

    def is_record(self, cursor: Cursor) -> bool:
        """Whether an expression is of a class of C++ (some classes are arrays in the model)."""
        lib = library()
        kind: int = lib.clang_getCanonicalType(lib.clang_getCursorType(cursor)).kind
        return kind == RECORD

    def name(self, declaration: Cursor) -> str:
        identity = declaration.identity or 0
        known = self._names.get(identity)
        if known is None:
            known = self._names[identity] = spelling(declaration)
        return known

    def is_given(self, cursor: Cursor) -> bool:
        return self.places.is_given(library().clang_getCursorLocation(cursor))

    def use(self, declaration: Cursor) -> None:
        """Remember a global that lowered code names: it becomes part of the program."""
        if declaration.kind == kinds.VARIABLE and self.is_global(declaration):
            key = self.variable_key(declaration)
            if key not in self.globals:
                self.used_globals[key] = declaration

    # ----------------------------------------------------------------------------------------------------- constants

    def folded(self, cursor: Cursor) -> int | float | str | None:
        """What an expression or variable is, if it is constant and nothing in it was stood in for."""
        value = evaluated(cursor)
        return None if value is not None and self.inventions and self.is_invented(cursor) else value

    def is_invented(self, cursor: Cursor) -> bool:
        """Whether a declaration or expression is a stand-in, or is made with one."""
        if cursor.kind in kinds.DECLARATIONS_OF_NAMES:
            identity = cursor.identity or 0
            known = self._invented.get(identity)
            if known is None:
                self._invented[identity] = False  # while it is looked at
                known = is_stand_in(usr(cursor)) or any(self.is_invented(child) for child in children(cursor))
                self._invented[identity] = known
            return known
        if cursor.kind in (kinds.DECLARATION_REFERENCE, kinds.TYPE_REFERENCE, kinds.TEMPLATE_REFERENCE, kinds.MEMBER):
            named = library().clang_getCursorReferenced(cursor)
            if named.identity and named.kind in kinds.DECLARATIONS_OF_NAMES and self.is_invented(named):
                return True
        return any(self.is_invented(child) for child in children(cursor))

    # --------------------------------------------------------------------------------------------------------- keys

    def variable_key(self, declaration: Cursor) -> str:
        """One key per variable: the USR of a global, else its name and a number."""
        lib = library()
        identity = declaration.identity or 0
        known = self._variables.get(identity)
        if known is None:
            if declaration.kind == kinds.VARIABLE and self.is_global(declaration):
                known = usr(declaration)
                if lib.clang_Cursor_getStorageClass(declaration) == EXTERN and "@F@" in known:  # told within a function
                    known = f"c:@{self.name(declaration)}"
                if lib.clang_getCursorLinkage(declaration) != 4:  # not external: each unit has its own
                    known = f"{known}@{self.number}" if self.number else known
                canonical = lib.clang_getCanonicalCursor(declaration)
                self._variables[canonical.identity or 0] = known
            else:
                unit = f".{self.number}" if self.number else ""
                known = f"{self.name(declaration)}#{len(self._variables)}{unit}"
            self._variables[identity] = known
        return known

    def fresh(self, name: str) -> str:
        """A key for a variable that the source does not have."""
        self._fresh += 1
        return f"{name}#of{self._fresh}.{self.number}"

    def is_global(self, declaration: Cursor) -> bool:
        lib = library()
        if lib.clang_Cursor_getStorageClass(declaration) == EXTERN:
            return True
        parent = lib.clang_getCursorSemanticParent(declaration)
        return parent.kind not in kinds.FUNCTIONS and parent.kind != kinds.FUNCTION_TEMPLATE

    def function_key(self, declaration: Cursor) -> str:
        """One key per function and instantiation: the USR, numbered where that does not tell two apart."""
        canonical = library().clang_getCanonicalCursor(declaration)
        identity = canonical.identity or 0
        known = self._functions.get(identity)
        if known is None:
            known = usr(declaration)
            if self.number and library().clang_getCursorLinkage(declaration) != 4:
                known = f"{known}@{self.number}"
            taken = self._function_keys.get(known)
            if taken is not None and taken != identity:
                known = f"{known}~{identity:x}"
            self._function_keys[known] = identity
            self._functions[identity] = known
        return known

    # ---------------------------------------------------------------------------------------------------- functions

    def callee(self, declaration: Cursor) -> Callee:
        """What is known of a function that is called or named; its body is put on the list of work."""
        identity = declaration.identity or 0
        known = self._callees.get(identity)
        if known is None:
            given = self.is_given(declaration)
            key = self.request(declaration) if given else None
            known = self._callees[identity] = Callee(key, self.name(declaration), declaration.kind, given)
        return known

    def request(self, declaration: Cursor) -> str | None:
        """The key of a function with a body, which will be lowered; None when it has none."""
        definition = self.definition(declaration)
        if definition is not None and self._is_implicit(definition):
            return None
        if definition is not None:
            key = self.function_key(declaration)
            if key not in self._queued:
                self._queued.add(key)
                self.pending.append((key, definition))
            return key
        elsewhere = self.linked.get(usr(declaration))
        return elsewhere[0].request(elsewhere[1]) if elsewhere and elsewhere[0] is not self else None

    def definition(self, declaration: Cursor) -> Cursor | None:
        """The declaration of a function that has its body."""
        lib = library()
        if has_body(declaration):
            return declaration
        found: Cursor = lib.clang_getCursorDefinition(declaration)
        if found.kind in kinds.FUNCTIONS and has_body(found):
            return found
        return None

    def _is_implicit(self, definition: Cursor) -> bool:
        """Whether the compiler wrote a function itself: a copy or an empty default constructor. One that sets the
        members' own initial values is none."""
        if definition.kind not in (kinds.CONSTRUCTOR, kinds.METHOD, kinds.DESTRUCTOR):
            return False
        lib = library()
        body = next((one for one in children(definition) if one.kind in (kinds.COMPOUND, kinds.TRY)), None)
        whole, inner = lib.clang_getCursorExtent(definition), body and lib.clang_getCursorExtent(body)
        if inner is None or whole.begin != inner.begin and inner.begin:
            return False
        if definition.kind != kinds.CONSTRUCTOR or lib.clang_Cursor_getNumArguments(definition):
            return True
        return not sets_members(lib.clang_getCursorType(lib.clang_getCursorSemanticParent(definition)))

    # --------------------------------------------------------------------------------------------------- directives

    def enter(self, cursor: Cursor) -> tuple[GivenFile, int, int] | None:
        return self.places.stretch(library().clang_getCursorExtent(cursor))

    def directives_in(self, stretch: tuple[GivenFile, int, int] | None, *, claim: bool = True) -> list[Directive]:
        """The pragmas written in a stretch of text that have no owner yet; with ``claim``, they now have one."""
        if stretch is None:
            return []
        file, start, end = stretch
        offsets, found = self._directives.get(file.name, ([], ()))
        claimed = self.scope.claimed
        mine = []
        for index in range(bisect_left(offsets, start), len(offsets)):
            if offsets[index] >= end:
                break
            if (file.name, offsets[index]) not in claimed:
                if claim:
                    claimed.add((file.name, offsets[index]))
                mine.append(found[index])
        return mine

    def constant(self, name: str) -> int | str | None:
        """The value of a name in an option of a directive: a number, or the text of a macro."""
        scope: Scope | None = self.scope
        while scope is not None:
            if name in scope.constants:
                return scope.constants[name]
            scope = scope.outer
        if name in self.macros:
            return self.macros[name]
        declaration = self.constants.get(name) or self.constants.get(name.rpartition("::")[2])
        if declaration is None:
            return None
        if declaration.kind == kinds.ENUMERATOR:
            return int(library().clang_getEnumConstantDeclValue(declaration))
        value = self.folded(declaration)
        return value if isinstance(value, int) else None


Lower = Callable[[Lowering, Cursor], Expression]
