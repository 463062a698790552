"""Switches: arms with their labels, falling through until they break."""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import replace

from beatwise.frontend import kinds
from beatwise.frontend.declarations import declared
from beatwise.frontend.libclang import Cursor, children
from beatwise.frontend.lost import lost_between
from beatwise.frontend.lowering import Lowering
from beatwise.model.kernel import Block, Case, Declare, Expression, Literal, Lost, Statement, Switch

Statements = Callable[[Lowering, Cursor], list[Statement]]


def switch(given: Lowering, cursor: Cursor, statements: Statements) -> list[Statement]:
    """A switch; ``statements`` lowers what stands in it."""
    parts = children(cursor)
    if len(parts) < 2:
        return [Lost("a switch that the compiler could not read whole", given.place(cursor))]
    before: list[Statement] = []
    for extra in parts[:-2]:
        before += declared(given, extra) if extra.kind == kinds.VARIABLE else statements(given, extra)
    subject = given.expression(parts[-2])
    outer, given.scope.directives = given.scope.directives, []
    first, cases = _cases(given, parts[-1], statements)
    given.scope.directives = outer
    place = given.place(cursor)
    made = Switch(subject, tuple(cases), place)
    before += first
    return [Block((*before, made), place)] if before else [made]


def _cases(given: Lowering, body: Cursor, statements: Statements) -> tuple[list[Statement], list[Case]]:
    """What is declared before the first label, and the arms."""
    inside = children(body) if body.kind == kinds.COMPOUND else [body]
    lost = lost_between(given, body, inside) if body.kind == kinds.COMPOUND else []
    first: list[Statement] = []
    arms: list[tuple[list[Expression | None], list[Statement], Cursor]] = []
    for index, cursor in enumerate(inside):
        values, statement = _arm(given, cursor)
        if values:
            arms.append((values, [], cursor))
        found: list[Statement] = [one for at, one in lost if at == index]
        if statement is not None:
            found += statements(given, statement)
        if arms:
            arms[-1][1].extend(found)
        else:  # never runs, but its declarations exist
            first += [one for one in found if isinstance(one, Declare | Lost)]
    return first, [Case(tuple(values), tuple(found), given.place(start)) for values, found, start in arms]


def _arm(given: Lowering, cursor: Cursor) -> tuple[list[Expression | None], Cursor | None]:
    """The labels of a statement in a switch, and the statement itself."""
    values: list[Expression | None] = []
    while cursor.kind in (kinds.CASE, kinds.DEFAULT):
        below = children(cursor)
        if cursor.kind == kinds.DEFAULT:
            values.append(None)
        else:
            values += _labels(given, below[:-1])
        if not below:
            return values, None
        cursor = below[-1]
    return values, cursor


def _labels(given: Lowering, cursors: list[Cursor]) -> list[Expression | None]:
    """The values of one label; ``case 1 ... 4`` is four."""
    values = [given.expression(cursor) for cursor in cursors]
    if len(values) == 2 and all(isinstance(one, Literal) and isinstance(one.value, int) for one in values):
        first, last = values
        assert isinstance(first, Literal) and isinstance(last, Literal)
        assert isinstance(first.value, int) and isinstance(last.value, int)
        if 0 <= last.value - first.value <= 4096:
            return [replace(first, value=value) for value in range(first.value, last.value + 1)]
    return list(values)
