"""A file parsed with stand-ins for what it needs and was not given."""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from typing import Literal as Word

from beatwise.frontend.libclang import TranslationUnit, location
from beatwise.frontend.parse import parse
from beatwise.frontend.places import GivenFile
from beatwise.frontend.standins import WARNING, Diagnostic, stand_in
from beatwise.model.kernel import Invention
from beatwise.model.place import Place

What = Word["header", "type", "template", "constant", "function", "member", "namespace"]
WHAT: dict[str, What] = {
    "header": "header",
    "namespace": "namespace",
    "type": "type",
    "template": "template",
    "constant": "constant",
    "macro": "constant",
    "function": "function",
    "member": "member",
}


def repaired(
    path: str, given: Mapping[str, GivenFile], defines: Sequence[str]
) -> tuple[TranslationUnit, tuple[Invention, ...]]:
    """The translation unit of the file at a virtual path, and what was invented to make it whole."""
    contents = {one: file.contents for one, file in given.items()}
    last: list[tuple[tuple[str, dict[str, str]], TranslationUnit]] = []

    def attempt(prelude: str, headers: dict[str, str]) -> list[Diagnostic]:
        unit = parse(path, contents, defines, prelude, headers)
        last[:] = [((prelude, dict(headers)), unit)]
        return diagnostics(unit)

    if all(one.severity < WARNING for one in attempt("", {})):
        return last[0][1], ()
    found = stand_in(attempt, {one: file.contents.decode("utf-8", "replace") for one, file in given.items()})
    wanted = (found.prelude, dict(found.headers))
    if not last or last[0][0] != wanted:
        attempt(*wanted)
    inventions = tuple(
        Invention(one.name, WHAT[one.kind], _line(given, path, one.file, one.line))
        for one in found.inventions
        if one.kind in WHAT
    )
    return last[0][1], inventions


def diagnostics(unit: TranslationUnit) -> list[Diagnostic]:
    """What the compiler complains of, in the order of its discovery."""
    if unit.handle is None:
        return []
    return [Diagnostic(severity, text, *location(raw, spelled=False)) for severity, text, _, raw in unit.diagnostics()]


def _line(given: Mapping[str, GivenFile], path: str, file: str, line: int) -> Place:
    """The line of a given file that first needs an invention."""
    known = given.get(file) or given[path]
    return Place(known.name, line, 1, line, 1, known.line_start(line))
