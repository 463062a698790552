"""Range-for loops, as the counted loops they are."""

from __future__ import annotations

from beatwise.frontend.declarations import decompose, variable
from beatwise.frontend.libclang import Cursor
from beatwise.frontend.lowering import Lowering
from beatwise.model.kernel import (
    Binary,
    Block,
    Declare,
    Directive,
    Expression,
    Index,
    Items,
    Literal,
    Loop,
    Name,
    Opaque,
    Statement,
    Step,
    Unary,
    Variable,
)
from beatwise.model.types import ArrayType, IntType, ReferenceType, Type, VectorType

COUNTER = IntType(32, True, 4)
TRUTH = IntType(1, False, 1)


def range_item(given: Lowering, element: Cursor) -> Variable:
    """The variable that holds one element in turn; its parts get their names, if it has some."""
    decompose(given, element)
    return variable(given, element, initial=False)


def range_loop(
    given: Lowering,
    cursor: Cursor,
    item: Variable,
    range_cursor: Cursor,
    body: Statement,
    directives: tuple[Directive, ...],
) -> Loop:
    """``for (element : range) body`` as a loop over a counter of our own."""
    place = given.place(cursor)
    values = given.expression(range_cursor)
    before: tuple[Statement, ...] = ()
    of = values.type
    if isinstance(values, Items):
        inner = of.element if isinstance(of, ArrayType) else _element(item)
        of = ArrayType(inner, len(values.items))
        listed = Variable(given.fresh("items"), "items", of, values.place, "local", values)
        before = (Declare(listed, values.place),)
        values = Name(listed.key, listed.name, of, values.place)
    counter = Variable(given.fresh("index"), "index", COUNTER, place, "local", Literal(0, COUNTER, place))
    index = Name(counter.key, counter.name, COUNTER, place)
    count = of.count if isinstance(of, ArrayType) else of.lanes if isinstance(of, VectorType) else None
    bound: Expression = Literal(count, COUNTER, place)
    if count is None:
        bound = Opaque("the length of the range", (values,), COUNTER, place)
    fetched: Expression = Index(values, index, _element(item), values.place)
    if isinstance(item.type, ReferenceType) and isinstance(of, ArrayType) and of.count is None:
        fetched = Unary("*", values, _element(item), values.place)
    bound_item = Variable(item.key, item.name, item.type, item.place, "local", fetched, item.constant)
    inside = body if isinstance(body, Block) else Block((body,), body.place)
    whole = Block((Declare(bound_item, item.place), *inside.body), inside.place, inside.directives)
    return Loop(
        (*before, Declare(counter, place)),
        Binary("<", index, bound, TRUTH, place),
        Step(1, True, index, COUNTER, place),
        whole,
        True,
        None,
        directives,
        place,
    )


def _element(item: Variable) -> Type:
    return item.type.to if isinstance(item.type, ReferenceType) else item.type
