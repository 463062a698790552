"""Files of C++ to one lowered program."""

from __future__ import annotations

import re
import sys
import threading
from collections.abc import Callable, Iterable, Mapping, Sequence
from dataclasses import replace

from beatwise.frontend import kinds
from beatwise.frontend.declarations import variable
from beatwise.frontend.expressions import LOWER
from beatwise.frontend.functions import function, is_extern_c
from beatwise.frontend.headers import INCLUDE_DIRECTORY, header_files
from beatwise.frontend.libclang import Cursor, TranslationUnit, children, library, location, usr
from beatwise.frontend.lost import lost_functions
from beatwise.frontend.lowering import Lowering
from beatwise.frontend.mentions import mentions
from beatwise.frontend.parse import virtual_path
from beatwise.frontend.places import GivenFile
from beatwise.frontend.repair import repaired
from beatwise.frontend.statements import pragma, statement_expression
from beatwise.model.kernel import Directive, Function, Invention, Problem, Program, Variable
from beatwise.model.types import ArrayType, BurstPointerType, PointerType, ReferenceType, StreamType
from beatwise.source.directives import pragmas_in

EXPRESSIONS = {**LOWER, kinds.STATEMENT_EXPRESSION: statement_expression}
STACK_BYTES = 128 * 1024 * 1024  #: for the thread that lowers: expressions nest deeply
RECURSION_LIMIT = 100_000


class NoSuchTop(Exception):
    """The function that the user named as top does not exist; ``names`` are those that do."""

    def __init__(self, top: str, names: Sequence[str]) -> None:
        super().__init__(top, names)
        self.top, self.names = top, tuple(names)

    def __str__(self) -> str:
        known = ", ".join(self.names) or "none"
        return f"no function '{self.top}'; the functions with a body are: {known}"


def read_program(
    files: Mapping[str, str],
    *,
    top: str | None = None,
    includes: Mapping[str, str] | None = None,
    defines: Sequence[str] = (),
    script: Sequence[Directive] = (),
) -> Program:
    """The program that the given files make, from its top functions on. Both mappings are from name to text: ``files``
    are read each on its own and linked, ``includes`` only where one of them includes it. Nothing on disk is read.

    Raises NoSuchTop when ``top`` names no function of the files.
    """
    return _with_deep_stack(lambda: _read(files, top, includes or {}, defines, tuple(script)))


def _with_deep_stack(work: Callable[[], Program]) -> Program:
    outcome: list[Program | BaseException] = []

    def run() -> None:
        try:
            outcome.append(work())
        except BaseException as error:  # handed over to the thread that waits
            outcome.append(error)

    before, limit = threading.stack_size(STACK_BYTES), sys.getrecursionlimit()
    sys.setrecursionlimit(RECURSION_LIMIT)
    try:
        thread = threading.Thread(target=run)
        thread.start()
        thread.join()
    finally:
        threading.stack_size(before)
        sys.setrecursionlimit(limit)
    (result,) = outcome
    if isinstance(result, BaseException):
        raise result
    return result


def _read(
    files: Mapping[str, str],
    top: str | None,
    includes: Mapping[str, str],
    defines: Sequence[str],
    script: tuple[Directive, ...],
) -> Program:
    texts = {**{name: text for name, text in includes.items() if not _is_ours(name)}, **files}
    given = {virtual_path(name): GivenFile(name, text.encode("utf-8", "replace")) for name, text in texts.items()}
    directives: dict[str, tuple[Directive, ...]] = {}
    units: list[Lowering] = []
    inventions: list[Invention] = []
    problems: list[Problem] = []
    for number, name in enumerate(files):
        path = virtual_path(name)
        unit, made = repaired(path, given, defines)
        if unit.handle is None:
            problems.append(Problem(name, None, "the compiler could not read this file"))
            continue
        inventions += [one for one in made if one not in inventions]
        problems += _problems(unit, given, name)
        for part, file in given.items():
            if file.name not in directives and unit.file_base(part) is not None:
                directives[file.name] = pragmas_in(texts[file.name], file.name)
        skipped = _skipped(unit, given)
        active = {file: _active(found, skipped.get(file, [])) for file, found in directives.items()}
        one = Lowering(unit, given, path, INCLUDE_DIRECTORY, number, active, skipped, bool(made), EXPRESSIONS)
        if one.has_errors and not any(problem.file == name for problem in problems):
            problems += lost_functions(one, given[path])
        units.append(one)
    definitions = [(one, cursor) for one in units for cursor in _survey(one)]
    linked = {usr(cursor): (one, cursor) for one, cursor in reversed(definitions)}
    for one in units:
        one.linked = linked
    tops = _named_tops(definitions, top) if top is not None else _likely_tops(definitions, script)
    keys = [key for one, cursor in tops or definitions if (key := one.request(cursor))]
    functions = _lowered(units, script)
    if not tops:
        keys = [*_uncalled(functions, keys)]
        functions = _reachable(functions, keys)
    variables = _globals(units)
    return Program(
        tuple(files),
        functions,
        variables,
        tuple(dict.fromkeys(key for key in keys if key in functions)),
        tuple(inventions),
        tuple(problems),
        tuple(dict.fromkeys(one.place.file for one in script)),
    )


def _is_ours(name: str) -> bool:
    """Whether a header is one that we declare ourselves: a copy of it beside the source would say no more."""
    return f"{INCLUDE_DIRECTORY}/{name.rpartition('/')[2]}" in header_files() and name.endswith(".h")


def _problems(unit: TranslationUnit, given: Mapping[str, GivenFile], name: str) -> list[Problem]:
    """The errors of syntax in the user's own text."""
    found = []
    for severity, text, category, where in unit.diagnostics():
        if severity >= 3 and category == "Parse Issue":
            path, line, _, _ = location(where, spelled=False)
            file = given.get(path)
            found.append(Problem(file.name if file else name, line or None, text))
    return found[:1]


def _skipped(unit: TranslationUnit, given: Mapping[str, GivenFile]) -> dict[str, list[tuple[int, int]]]:
    """What ``#if`` left out of each file: start and end."""
    lib = library()
    skipped: dict[str, list[tuple[int, int]]] = {}
    for extent in unit.skipped():
        path, _, _, start = location(lib.clang_getRangeStart(extent), spelled=False)
        _, _, _, end = location(lib.clang_getRangeEnd(extent), spelled=False)
        if path in given:
            skipped.setdefault(given[path].name, []).append((start, end))
    return skipped


def _active(found: tuple[Directive, ...], skipped: list[tuple[int, int]]) -> tuple[Directive, ...]:
    return tuple(one for one in found if not any(start <= one.place.offset < end for start, end in skipped))


def _survey(given: Lowering) -> list[Cursor]:
    """All functions with a body outside our headers; notes macros and constants on the way."""
    found: list[Cursor] = []
    work = children(given.unit.root)[::-1]
    while work:
        cursor = work.pop()
        kind = cursor.kind
        if kind == kinds.MACRO_DEFINITION:
            if given.is_given(cursor):
                _note_macro(given, cursor)
        elif kind in kinds.FUNCTIONS:
            if given.is_given(cursor) and given.definition(cursor) is cursor:
                found.append(cursor)
        elif kind in (kinds.NAMESPACE, kinds.LINKAGE, kinds.UNEXPOSED_DECLARATION, *kinds.RECORDS):
            if given.is_given(cursor):
                work.extend(children(cursor)[::-1])
        elif kind == kinds.ENUM:
            if given.is_given(cursor):
                for one in children(cursor):
                    given.constants.setdefault(given.name(one), one)
        elif kind == kinds.VARIABLE and given.is_given(cursor):
            given.constants.setdefault(given.name(cursor), cursor)
            if library().clang_isCursorDefinition(cursor):
                given.defined_globals.setdefault(given.variable_key(cursor), cursor)
    return found


def _note_macro(given: Lowering, cursor: Cursor) -> None:
    """Remember the text of an object-like macro."""
    written = given.places.text(library().clang_getCursorExtent(cursor)) or ""
    name = given.name(cursor)
    given.macro_names.add(name)
    text = written[len(name) :]
    if text and not text.startswith("("):
        given.macros[name] = re.sub(r"//.*|/\*.*?\*/|\\\n", " ", text).strip()


# --------------------------------------------------------------------------------------------------- top functions

Definitions = list[tuple[Lowering, Cursor]]


def _named_tops(definitions: Definitions, top: str) -> Definitions:
    found = [(one, cursor) for one, cursor in definitions if one.name(cursor) == top.rpartition("::")[2]]
    if not found:
        raise NoSuchTop(top, sorted({one.name(cursor) for one, cursor in definitions}))
    return found


def _likely_tops(definitions: Definitions, script: tuple[Directive, ...]) -> Definitions:
    """Those with memory-mapped interface directives, else those with C linkage and pointers among their parameters."""
    named = {one.options.get("function", "").rpartition("::")[2] for one in script if _is_mapped(one)}
    with_directive = [
        (one, cursor) for one, cursor in definitions if one.name(cursor) in named or _holds_mapped(one, cursor)
    ]
    if with_directive:
        return with_directive
    return [(one, cursor) for one, cursor in definitions if is_extern_c(cursor) and _has_memory(one, cursor)]


def _is_mapped(directive: Directive) -> bool:
    return directive.kind == "interface" and directive.options.get("mode", "").lower() == "m_axi"


def _holds_mapped(given: Lowering, cursor: Cursor) -> bool:
    """Whether a memory-mapped interface directive is written in a function, or made by a macro."""
    stretch = given.enter(cursor)
    if stretch is not None and any(_is_mapped(one) for one in given.directives_in(stretch, claim=False)):
        return True
    if not given.has_pragma_operators:
        return False
    for body in children(cursor):
        for statement in children(body) if body.kind == kinds.COMPOUND else ():
            for one in children(statement) if statement.kind == kinds.DECLARATIONS else ():
                if one.kind == kinds.STATIC_ASSERT and (found := pragma(given, one)) and _is_mapped(found):
                    return True
    return False


def _has_memory(given: Lowering, cursor: Cursor) -> bool:
    lib = library()
    if given.name(cursor) == "main":
        return False
    for index in range(max(0, lib.clang_Cursor_getNumArguments(cursor))):
        of = given.type(lib.clang_Cursor_getArgument(cursor, index))
        if isinstance(of, ReferenceType):
            of = of.to
        if isinstance(of, PointerType | ArrayType | BurstPointerType):
            return True
    return False


def _uncalled(functions: Mapping[str, Function], keys: Sequence[str]) -> list[str]:
    """The functions with memory among their parameters that no other such function calls, on whatever way."""
    candidates = [key for key in keys if key in functions and _takes_memory(functions[key])]
    called: set[str] = set()
    for key in candidates:
        if key not in called:
            called |= _reachable(functions, mentions(functions[key]) - {key}).keys() - {key}
    return [key for key in candidates if key not in called]


def _takes_memory(one: Function) -> bool:
    if one.name == "main" or one.record is not None:
        return False
    types = [each.type.to if isinstance(each.type, ReferenceType) else each.type for each in one.parameters]
    return any(isinstance(of, PointerType | ArrayType | BurstPointerType | StreamType) for of in types)


def _reachable(functions: Mapping[str, Function], keys: Iterable[str]) -> dict[str, Function]:
    kept: dict[str, Function] = {}
    work = list(keys)[::-1]
    while work:
        key = work.pop()
        if key not in kept and key in functions:
            kept[key] = functions[key]
            work.extend(mentions(functions[key]))
    return kept


# -------------------------------------------------------------------------------------------------------- lowering


def _lowered(units: Sequence[Lowering], script: tuple[Directive, ...]) -> dict[str, Function]:
    functions: dict[str, Function] = {}
    while any(one.pending or one.used_globals for one in units):
        for one in units:
            while one.pending:
                key, definition = one.pending.popleft()
                if key in functions:  # of a header that several units include
                    continue
                name = one.name(definition)
                mine = tuple(found for found in script if found.options.get("function", "").rpartition("::")[2] == name)
                functions[key] = function(one, key, definition, mine)
            while one.used_globals:
                key, cursor = one.used_globals.popitem()
                if key not in one.globals:
                    home = next((unit for unit in (one, *units) if key in unit.defined_globals), None)
                    one.globals[key] = variable(home or one, home.defined_globals[key] if home else cursor)
    return functions


def _globals(units: Sequence[Lowering]) -> dict[str, Variable]:
    found: dict[str, Variable] = {}
    for one in units:
        for key, made in one.globals.items():
            told = tuple(directive for name, directive in one.far_directives if name == made.name)
            made = replace(made, directives=(*made.directives, *told))
            if key not in found or found[key].initial is None:
                found[key] = made
    return found
