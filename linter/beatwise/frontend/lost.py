"""What the compiler dropped: after an error, a statement can vanish without a node in the tree."""

from __future__ import annotations

import re

from beatwise.frontend.libclang import Cursor
from beatwise.frontend.lowering import Lowering
from beatwise.frontend.places import GivenFile
from beatwise.model.kernel import Lost

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
    found: list[tuple[int, Lost]] = []
    position: int | None = start + 1
    for index, child in enumerate(listed):
        stretch = given.enter(child)
        if stretch is None or stretch[0] is not file:
            position = None
            continue
        if position is not None and position < stretch[1]:
            found += [(index, one) for one in _statements(given, file, position, stretch[1])]
        position = max(stretch[2], position or 0)
    if position is not None:
        found += [(len(listed), one) for one in _statements(given, file, position, end - 1)]
    return found


def _statements(given: Lowering, file: GivenFile, start: int, end: int) -> list[Lost]:
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
        return []
    return [Lost(REASON, file.place(start + len(plain) - len(plain.lstrip()), start + len(plain.rstrip())))]


def _blank(text: bytearray, start: int, end: int) -> None:
    start, end = max(0, start), min(len(text), end)
    if start < end:
        text[start:end] = b" " * (end - start)
