"""What the compiler dropped: after an error, a statement can vanish without a node in the tree."""

from __future__ import annotations

import re
from collections.abc import Iterator

from beatwise.frontend import kinds
from beatwise.frontend.libclang import Cursor, children
from beatwise.frontend.lowering import Lowering
from beatwise.frontend.places import GivenFile
from beatwise.model.kernel import Lost, Problem

NOISE = re.compile(
    rb"//[^\n]*|/\*.*?\*/|^[ \t]*#(?:[^\n\\]|\\\r?\n|\\.)*|\[\[.*?\]\]|\b(?:case|default)\b[^:;]*:",
    re.DOTALL | re.MULTILINE,
)
MACRO_USE = re.compile(rb"\b([A-Za-z_]\w*)\s*(\((?:[^()]|\([^()]*\))*\))?")
WORD = re.compile(rb"\w")
REASON = "the compiler could not read what stands here and left it out"


def lost_between(given: Lowering, compound: Cursor, listed: list[Cursor]) -> list[tuple[int, Lost]]:
    """The statements of a compound that have no cursor: before which child each stood, and what to say.

    Asked only where the compiler reported errors; next to a statement that a macro made nothing is claimed.
    """
    whole = given.enter(compound)
    if not given.has_errors or whole is None:
        return []
    file, start, end = whole
    return [
        (index, Lost(REASON, file.place(*left)))
        for index, gap in _gaps(given, file, start + 1, end - 1, listed)
        if (left := _written(given, file, *gap))
    ]


def lost_functions(given: Lowering, file: GivenFile) -> list[Problem]:
    """The definitions outside functions, in the file itself, that have no cursor."""
    found = []
    listed = [one for one in children(given.unit.root) if one.kind < kinds.MACRO_DEFINITION]
    work = [(0, len(file.contents), listed)]
    while work:
        start, end, listed = work.pop()
        here = [one for one in listed if (stretch := given.enter(one)) and stretch[0] is file]
        for _, gap in _gaps(given, file, start, end, here):
            left = _written(given, file, *gap)
            if left and b"{" in file.contents[left[0] : left[1]]:
                found.append(
                    Problem(
                        file.name, file.place(*left).line, "the compiler could not read the definition that stands here"
                    )
                )
        for one in here:
            stretch = given.enter(one)
            inner = children(one) if one.kind in (kinds.NAMESPACE, kinds.LINKAGE) else []
            if stretch and inner:
                opening = file.contents.find(b"{", stretch[1], stretch[2])
                if opening >= 0:
                    work.append((opening + 1, stretch[2] - 1, inner))
    return found


def _gaps(
    given: Lowering, file: GivenFile, start: int, end: int, listed: list[Cursor]
) -> Iterator[tuple[int, tuple[int, int]]]:
    """The stretches of text between cursors, with the number of the cursor that follows."""
    position: int | None = start
    for index, child in enumerate(listed):
        stretch = given.enter(child)
        if stretch is None or stretch[0] is not file:
            position = None
            continue
        if position is not None and position < stretch[1]:
            yield index, (position, stretch[1])
        position = max(stretch[2], position or 0)
    if position is not None:
        yield len(listed), (position, end)


def _written(given: Lowering, file: GivenFile, start: int, end: int) -> tuple[int, int] | None:
    """What is written in a gap besides comments, preprocessor lines, inactive regions and uses of macros."""
    text = bytearray(file.contents[start:end])
    for first, last in given.skipped.get(file.name, ()):
        _blank(text, first - start, last - start)
    for noise in NOISE.finditer(bytes(text)):
        _blank(text, noise.start(), noise.end())
    for use in MACRO_USE.finditer(bytes(text)):
        if use[1].decode() in given.macro_names:
            _blank(text, use.start(), use.end())
    plain = bytes(text).replace(b";", b" ")
    if not WORD.search(plain):
        return None
    return start + len(plain) - len(plain.lstrip()), start + len(plain.rstrip())


def _blank(text: bytearray, start: int, end: int) -> None:
    start, end = max(0, start), min(len(text), end)
    if start < end:
        text[start:end] = b" " * (end - start)
