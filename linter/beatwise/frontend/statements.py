"""Statements: one function for each kind of cursor, chosen by ``statements``."""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import replace

from beatwise.frontend import kinds
from beatwise.frontend.declarations import declared
from beatwise.frontend.heads import for_parts, if_parts
from beatwise.frontend.libclang import Cursor, children, library, operands, spelling
from beatwise.frontend.lost import lost_between
from beatwise.frontend.lowering import Lowering
from beatwise.frontend.options import with_numbers
from beatwise.frontend.ranges import range_item, range_loop
from beatwise.frontend.switches import switch
from beatwise.model.kernel import (
    Block,
    Declare,
    Directive,
    Evaluate,
    Expression,
    If,
    Leave,
    Literal,
    Loop,
    Lost,
    Opaque,
    Return,
    Statement,
    Switch,
    Variable,
)
from beatwise.model.types import IntType, VoidType
from beatwise.source.directives import parse_directive

TRUTH = IntType(1, False, 1)
ON_LOOPS = ("unroll", "pipeline", "loop_tripcount", "loop_flatten", "loop_merge", "dependence")
NAMING = ("variable", "port")  #: options that name a variable


def statements(given: Lowering, cursor: Cursor) -> list[Statement]:
    """A statement of the source as the statements it is made of."""
    found = _statements(given, cursor)
    if given.scope.before and cursor.kind != kinds.COMPOUND:
        found = [*given.scope.before, *found]
        given.scope.before = []
    return found


def _statements(given: Lowering, cursor: Cursor) -> list[Statement]:
    lower = LOWER.get(cursor.kind)
    if lower is not None:
        return lower(given, cursor)
    if cursor.kind in kinds.EXPRESSIONS:
        return [Evaluate(given.expression(cursor), given.place(cursor))]
    if cursor.kind == kinds.UNEXPOSED_STATEMENT:  # attributes before a statement
        below = [child for child in children(cursor) if child.kind >= kinds.LABEL or child.kind in kinds.EXPRESSIONS]
        if below:
            return statements(given, below[-1])
    return [Lost("a statement of a kind not known here", given.place(cursor))]


def statement_expression(given: Lowering, cursor: Cursor) -> Expression:
    """``({ ...; value; })``: its statements come before the one it stands in."""
    inner = [child for child in children(cursor) if child.kind == kinds.COMPOUND]
    found = [one for child in (children(inner[0]) if inner else []) for one in _statements(given, child)]
    last = found.pop() if found else None
    given.scope.before += found
    if isinstance(last, Evaluate):
        return last.expression
    if last is not None:
        given.scope.before.append(last)
    return Opaque("a statement without a value", (), VoidType(), given.place(cursor))


def one(given: Lowering, cursor: Cursor) -> Statement:
    """A statement as a single one."""
    found = statements(given, cursor)
    return found[0] if len(found) == 1 else Block(tuple(found), given.place(cursor))


def block(given: Lowering, cursor: Cursor) -> Block:
    """A compound statement, with the directives that stand directly in it."""
    outer, given.scope.directives = given.scope.directives, []
    body: list[Statement] = []
    listed = children(cursor)
    lost = lost_between(given, cursor, listed)
    label = ""
    for index, child in enumerate(listed):
        body.extend(one for at, one in lost if at == index)
        found = statements(given, child)
        if label and len(found) == 1 and isinstance(found[0], Loop):  # a pragma of a macro stands between them
            found = [_labelled(given, found[0], label)]
        label = spelling(child) if child.kind == kinds.LABEL and not found else ""
        body.extend(found)
    body.extend(one for at, one in lost if at == len(listed))
    mine = [*given.scope.directives, *given.directives_in(given.enter(cursor))]
    mine = sorted((with_numbers(one, given.constant) for one in mine), key=lambda one: one.place.offset)
    given.scope.directives = outer
    body = _told_variables(given, body, mine)
    body, mine = _told_loops(body, mine)
    return Block(tuple(body), given.place(cursor), tuple(mine))


def _told_variables(given: Lowering, body: list[Statement], mine: list[Directive]) -> list[Statement]:
    """The declarations of a block with the directives that name them; the others look further out."""
    waiting = [*given.scope.unclaimed, *(one for one in mine if any(one.options.get(name) for name in NAMING))]
    given.scope.unclaimed = []
    if not waiting:
        return body
    at = {one.variable.name: index for index, one in enumerate(body) if isinstance(one, Declare)}
    for directive in waiting:
        left = False
        for name in named_by(directive):
            if name in at:
                declare = body[at[name]]
                assert isinstance(declare, Declare)
                body[at[name]] = replace(declare, variable=told(declare.variable, directive))
            else:
                left = True
        if left:
            given.scope.unclaimed.append(directive)
    return body


def named_by(directive: Directive) -> list[str]:
    """The variables that a directive names; of ``a.b`` and ``a[0]``, the ``a``."""
    found = []
    for option in NAMING:
        for item in directive.options.get(option, "").split(","):
            name = item.strip().lstrip("&*").split(".")[0].split("[")[0].split("->")[0].strip()
            if name:
                found.append(name)
    return found


def told(variable: Variable, directive: Directive) -> Variable:
    if directive in variable.directives:
        return variable
    return replace(variable, directives=(*variable.directives, directive))


def _told_loops(body: list[Statement], mine: list[Directive]) -> tuple[list[Statement], list[Directive]]:
    """Directives that stand right before a loop without braces are that loop's."""
    bare = [index for index, one in enumerate(body) if isinstance(one, Loop) and not isinstance(one.body, Block)]
    if not bare or not any(one.kind in ON_LOOPS for one in mine):
        return body, mine
    left = []
    for directive in mine:
        following = next((i for i, one in enumerate(body) if one.place.offset > directive.place.offset), None)
        loop = body[following] if following in bare and following is not None else None
        if directive.kind in ON_LOOPS and isinstance(loop, Loop) and following is not None:
            body[following] = replace(loop, directives=(*loop.directives, directive))
        else:
            left.append(directive)
    return body, left


# ------------------------------------------------------------------------------------------------------------ loops


def _body(given: Lowering, cursor: Cursor | None, loop: Cursor) -> tuple[Statement, tuple[Directive, ...]]:
    """The body of a loop and the loop's directives."""
    if cursor is None:
        return Block((), given.place(loop)), ()
    body = one(given, cursor)
    if isinstance(body, Block) and cursor.kind == kinds.COMPOUND:
        return body, body.directives
    between = [with_numbers(found, given.constant) for found in given.directives_in(given.enter(loop))]
    return body, tuple(between)


def _head(given: Lowering, cursor: Cursor) -> Expression:
    """An expression in the head of a loop, which runs again in each round: no statement can come before it."""
    before, given.scope.before = given.scope.before, []
    value = given.expression(cursor)
    if given.scope.before:
        parts = [one.expression for one in given.scope.before if isinstance(one, Evaluate)]
        made = [one.variable for one in given.scope.before if isinstance(one, Declare)]
        parts += [variable.initial for variable in made if variable.initial is not None]
        value = Opaque("statements within the head of a loop", (*parts, value), value.type, value.place)
    given.scope.before = before
    return value


def _for(given: Lowering, cursor: Cursor) -> list[Statement]:
    parts = for_parts(given, cursor)
    initial = tuple(statements(given, parts.initial)) if parts.initial is not None else ()
    if parts.declared is not None:
        initial += tuple(declared(given, parts.declared))
    condition = _head(given, parts.condition) if parts.condition is not None else None
    step = _head(given, parts.step) if parts.step is not None else None
    body, directives = _body(given, parts.body, cursor)
    return [Loop(initial, condition, step, body, True, None, directives, given.place(cursor))]


def _while(given: Lowering, cursor: Cursor) -> list[Statement]:
    parts = children(cursor)
    if len(parts) < 2:
        return _lost(given, cursor)
    condition = _head(given, parts[-2])
    body, directives = _body(given, parts[-1], cursor)
    if parts[0].kind == kinds.VARIABLE:  # declared anew in each round: while (int n = ...) ...
        fresh = declared(given, parts[0])
        leave = If((), condition, Block((), body.place), Leave("break", body.place), body.place)
        body = Block((*fresh, leave, body), body.place, directives)
        return [Loop((), None, None, body, True, None, directives, given.place(cursor))]
    return [Loop((), condition, None, body, True, None, directives, given.place(cursor))]


def _do(given: Lowering, cursor: Cursor) -> list[Statement]:
    parts = children(cursor)
    if len(parts) != 2:
        return _lost(given, cursor)
    body, directives = _body(given, parts[0], cursor)
    condition = _head(given, parts[1])
    if isinstance(condition, Literal) and condition.value == 0:  # do { ... } while (0), as macros are written
        if not _leaves(body):
            return [body]
    return [Loop((), condition, None, body, False, None, directives, given.place(cursor))]


def _leaves(body: Statement) -> bool:
    """Whether a break or continue within belongs to the loop around it."""
    match body:
        case Leave(how=how):
            return how != "goto"
        case Block(body=inner):
            return any(_leaves(one) for one in inner)
        case If(yes=yes, no=no):
            return _leaves(yes) or no is not None and _leaves(no)
        case Switch(cases=cases):
            return any(isinstance(one, Leave) and one.how == "continue" for case in cases for one in case.body)
        case _:
            return False


def _range_for(given: Lowering, cursor: Cursor) -> list[Statement]:
    parts = children(cursor)
    if len(parts) < 3 or parts[-3].kind not in (kinds.VARIABLE, kinds.UNEXPOSED_DECLARATION):
        return _lost(given, cursor)
    first = [one for part in parts[:-3] for one in statements(given, part)]
    item = range_item(given, parts[-3])
    body, directives = _body(given, parts[-1], cursor)
    return [*first, range_loop(given, cursor, item, parts[-2], body, directives)]


def _label(given: Lowering, cursor: Cursor) -> list[Statement]:
    below = children(cursor)
    found = statements(given, below[-1]) if below else []
    if len(found) == 1 and isinstance(found[0], Loop):
        return [_labelled(given, found[0], spelling(cursor))]
    return found


def _labelled(given: Lowering, loop: Loop, label: str) -> Loop:
    """A loop with its label, and the directives that an external script has for it."""
    outside = tuple(given.scope.labels.get(label, ()))
    return replace(loop, label=loop.label or label, directives=(*loop.directives, *outside))


# --------------------------------------------------------------------------------------------------------- branches


def _if(given: Lowering, cursor: Cursor) -> list[Statement]:
    parts = if_parts(given, cursor)
    if parts is None:
        return _lost(given, cursor)
    initial: tuple[Statement, ...] = ()
    if parts.initial is not None:
        initial += tuple(statements(given, parts.initial))
    if parts.declared is not None:
        initial += tuple(declared(given, parts.declared))
    condition = given.expression(parts.condition)
    if isinstance(condition, Literal) and isinstance(condition.value, int) and not initial:
        pass  # both branches stay: the tracer decides
    yes = one(given, parts.yes)
    no = one(given, parts.no) if parts.no is not None else None
    return [If(initial, condition, yes, no, given.place(cursor))]


# ----------------------------------------------------------------------------------------------------------- others


def _lost(given: Lowering, cursor: Cursor) -> list[Statement]:
    return [Lost("a statement that the compiler could not read whole", given.place(cursor))]


def _declarations(given: Lowering, cursor: Cursor) -> list[Statement]:
    found: list[Statement] = []
    for child in children(cursor):
        if child.kind == kinds.STATIC_ASSERT:
            directive = pragma(given, child)
            if directive:
                given.scope.directives.append(directive)
        elif child.kind in kinds.RECORDS or child.kind == kinds.CLASS_TEMPLATE:
            given.directives_in(given.enter(child))  # those of its methods
        else:
            found += declared(given, child)
    return found


def pragma(given: Lowering, cursor: Cursor) -> Directive | None:
    """The directive of a ``_Pragma``, which the preprocessor has turned into an assertion."""
    text = next((spelling(child) for child in children(cursor) if child.kind == kinds.STRING), "")
    plain = text[1:-1].replace('\\"', '"').replace("\\\\", "\\") if text.startswith('"') else text
    return parse_directive(plain, given.place(cursor)) if plain else None


def _return(given: Lowering, cursor: Cursor) -> list[Statement]:
    below = [child for child in children(cursor) if child.kind in kinds.EXPRESSIONS]
    return [Return(given.expression(below[0]) if below else None, given.place(cursor))]


def _assembly(given: Lowering, cursor: Cursor) -> list[Statement]:
    parts = tuple(given.expression(one) for one in operands(cursor))
    place = given.place(cursor)
    return [Evaluate(Opaque("inline assembly", parts, VoidType(), place), place)]


def _try(given: Lowering, cursor: Cursor) -> list[Statement]:
    below = children(cursor)
    return [block(given, below[0])] if below else []


LOWER: dict[int, Callable[[Lowering, Cursor], list[Statement]]] = {
    kinds.COMPOUND: lambda given, cursor: [block(given, cursor)],
    kinds.DECLARATIONS: _declarations,
    kinds.FOR: _for,
    kinds.WHILE: _while,
    kinds.DO: _do,
    kinds.RANGE_FOR: _range_for,
    kinds.LABEL: _label,
    kinds.IF: _if,
    kinds.SWITCH: lambda given, cursor: switch(given, cursor, statements),
    kinds.BREAK: lambda given, cursor: [Leave("break", given.place(cursor))],
    kinds.CONTINUE: lambda given, cursor: [Leave("continue", given.place(cursor))],
    kinds.GOTO: lambda given, cursor: [Leave("goto", given.place(cursor))],
    kinds.COMPUTED_GOTO: lambda given, cursor: [Leave("goto", given.place(cursor))],
    kinds.RETURN: _return,
    kinds.TRY: _try,
    kinds.ASSEMBLY: _assembly,
    kinds.EMPTY: lambda given, cursor: [],
}

__all__ = ["block", "library", "named_by", "pragma", "statements", "told"]
