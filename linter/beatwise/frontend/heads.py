"""The parts of ``for`` and ``if`` heads, told apart by the text where some are left out."""

from __future__ import annotations

import re
from dataclasses import dataclass

from beatwise.frontend import kinds
from beatwise.frontend.libclang import Cursor, children, library
from beatwise.frontend.lowering import Lowering

SKIP = re.compile(rb'//[^\n]*|/\*.*?\*/|"(?:\\.|[^"\\])*"|\'(?:\\.|[^\'\\])*\'|.', re.DOTALL)


@dataclass(slots=True)
class ForParts:
    initial: Cursor | None = None
    declared: Cursor | None = None
    condition: Cursor | None = None
    step: Cursor | None = None
    body: Cursor | None = None


@dataclass(slots=True)
class IfParts:
    condition: Cursor
    yes: Cursor
    no: Cursor | None = None
    initial: Cursor | None = None
    declared: Cursor | None = None


def for_parts(given: Lowering, cursor: Cursor) -> ForParts:
    """The parts of a ``for``; the compiler lists those that are there, in order."""
    listed = children(cursor)
    parts = ForParts()
    if not listed:
        return parts
    parts.body = listed.pop()
    for index, child in enumerate(listed):
        if child.kind == kinds.VARIABLE:
            parts.declared = listed.pop(index)
            break
    if len(listed) == 3:
        parts.initial, parts.condition, parts.step = listed
        return parts
    semicolons = _semicolons(given, cursor)
    for child in listed:
        where = _position(given, child, semicolons) if semicolons else None
        if where is None:
            where = _by_kind(child, parts)
        if where == 0:
            parts.initial = child
        elif where == 1:
            parts.condition = child
        else:
            parts.step = child
    return parts


def _semicolons(given: Lowering, cursor: Cursor) -> tuple[int, int] | None:
    """The offsets of the two semicolons in the head of a ``for`` that is written as it stands."""
    stretch = given.enter(cursor)
    if stretch is None:
        return None
    file, start, end = stretch
    depth, found = 0, []
    for token in SKIP.finditer(file.contents, start, end):
        sign = token[0]
        if sign in (b"(", b"[", b"{"):
            depth += 1
        elif sign in (b")", b"]", b"}"):
            depth -= 1
            if depth == 0:
                break
        elif sign == b";" and depth == 1:
            found.append(token.start())
    return (found[0], found[1]) if len(found) == 2 else None


def _position(given: Lowering, child: Cursor, semicolons: tuple[int, int]) -> int | None:
    place = given.places.place(library().clang_getCursorExtent(child))
    return 0 if place.offset < semicolons[0] else 1 if place.offset < semicolons[1] else 2


def _by_kind(child: Cursor, parts: ForParts) -> int:
    """A guess for a head that a macro made."""
    lib = library()
    if child.kind == kinds.DECLARATIONS:
        return 0
    steps = child.kind == kinds.UNARY and lib.clang_getCursorUnaryOperatorKind(child) in kinds.STEPS
    assigns = child.kind in (kinds.BINARY, kinds.COMPOUND_ASSIGNMENT) and (
        lib.clang_getCursorBinaryOperatorKind(child) in kinds.ASSIGNMENTS
    )
    if steps or assigns and (parts.condition is not None or parts.initial is not None):
        return 2
    if assigns:
        return 0
    return 1 if parts.condition is None else 2


def if_parts(given: Lowering, cursor: Cursor) -> IfParts | None:
    """The parts of an ``if``: initialiser, declaration, condition, branches."""
    listed = children(cursor)
    initial = declared = None
    if listed and listed[0].kind == kinds.DECLARATIONS:
        initial = listed.pop(0)
    for index, child in enumerate(listed[:-1]):
        if child.kind == kinds.VARIABLE:
            declared = listed.pop(index)
            break
    if len(listed) < 2 or listed[0].kind not in kinds.EXPRESSIONS:
        return None
    if len(listed) == 2:
        return IfParts(listed[0], listed[1], None, initial, declared)
    if len(listed) == 3 and not (initial is None and _is_head(given, cursor, listed[1])):
        return IfParts(listed[0], listed[1], listed[2], initial, declared)
    no = listed[3] if len(listed) > 3 else None
    return IfParts(listed[1], listed[2], no, listed[0], declared)


def _is_head(given: Lowering, cursor: Cursor, second: Cursor) -> bool:
    """Whether the second expression still stands in the head (``if (step(); ready) ...``)."""
    stretch = given.enter(cursor)
    if stretch is None or second.kind not in kinds.EXPRESSIONS:
        return False
    file, start, end = stretch
    offset = given.place(second).offset
    depth = 0
    for token in SKIP.finditer(file.contents, start, end):
        if token.start() >= offset:
            return depth > 0
        depth += (token[0] == b"(") - (token[0] == b")")
    return False
