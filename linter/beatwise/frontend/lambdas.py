"""Lambdas: a function of their own, and what they capture."""

from __future__ import annotations

import re
from functools import partial

from beatwise.frontend import kinds
from beatwise.frontend.declarations import variable
from beatwise.frontend.libclang import Cursor, children, library
from beatwise.frontend.lowering import Lowering
from beatwise.model.kernel import Declare, Expression, FunctionName
from beatwise.model.types import CallableType

INTRODUCER = re.compile(r"\s*\[([^\]]*)\]")


def closure(given: Lowering, cursor: Cursor) -> Expression:
    """A lambda as a value; its body becomes a function of the program."""
    lib = library()
    place = given.place(cursor)
    given.directives_in(given.enter(cursor))  # they are those of its own function
    record = lib.clang_getTypeDeclaration(lib.clang_getCursorType(cursor))
    key = ""
    for member in children(record):
        if member.kind == kinds.METHOD and given.name(member) == "operator()":
            key = given.callee(member).key or ""
            break
    fresh = _fresh(given, cursor)
    given.scope.before += [Declare(made, made.place) for made in map(partial(variable, given), fresh)]
    captures = _captures(given, cursor, {one.identity or 0 for one in fresh})
    return FunctionName(key or f"lambda@{place}", CallableType(), place, captures)


def _fresh(given: Lowering, cursor: Cursor) -> list[Cursor]:
    """The variables that a capture list makes (``[p = base + 4]``)."""
    lib = library()
    extent = lib.clang_getCursorExtent(cursor)
    found = []
    for child in children(cursor):
        if child.kind == kinds.VARIABLE_REFERENCE:
            declaration = lib.clang_getCursorReferenced(child)
            begin = lib.clang_getCursorExtent(declaration).begin
            if declaration.kind == kinds.VARIABLE and extent.begin < begin < extent.end:
                found.append(declaration)
    return found


def _captures(given: Lowering, cursor: Cursor, fresh: set[int]) -> tuple[tuple[str, bool], ...]:
    """The local variables of the functions around that its body names: key, and whether by reference."""
    written = given.places.text(library().clang_getCursorExtent(cursor))
    introducer = INTRODUCER.match(written) if written else None
    items = [item.strip() for item in introducer[1].split(",")] if introducer else ["&"]
    by_reference = not items or "=" not in items
    explicit = {
        item.lstrip("& ").split("=")[0].strip(): item.startswith("&") for item in items if item not in ("", "&", "=")
    }
    inner: set[int] = set()
    used: dict[str, bool] = {}
    below = children(cursor)
    if fresh:  # their initial values belong to the function around
        below = [one for one in below if one.kind == kinds.VARIABLE_REFERENCE or one.kind not in kinds.EXPRESSIONS]
    work = below[::-1]
    while work:
        one = work.pop()
        if one.kind in (kinds.VARIABLE, kinds.PARAMETER):
            inner.add(one.identity or 0)
        elif one.kind == kinds.THIS or one.kind == kinds.MEMBER and not children(one):
            used["this"] = "*this" not in items
        elif one.kind in (kinds.DECLARATION_REFERENCE, kinds.VARIABLE_REFERENCE):
            declaration = library().clang_getCursorReferenced(one)
            if _is_outer(given, declaration) and (declaration.identity or 0) not in inner:
                used[given.variable_key(declaration)] = explicit.get(given.name(declaration), by_reference)
        work.extend(children(one)[::-1])
    return tuple(used.items())


def _is_outer(given: Lowering, declaration: Cursor) -> bool:
    if declaration.kind == kinds.PARAMETER:
        return True
    return declaration.kind == kinds.VARIABLE and not given.is_global(declaration)
