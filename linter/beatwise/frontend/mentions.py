"""The functions that a function mentions: calls, constructs, or names as a value."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import fields, is_dataclass

from beatwise.model.kernel import Build, Call, Directive, Function, FunctionName
from beatwise.model.place import Place
from beatwise.model.types import Type


def mentions(function: Function) -> set[str]:
    """The keys of all functions mentioned in a function's body and initialisers."""
    found: set[str] = set()
    for node in nodes((function.body, function.initializers)):
        match node:
            case Call(function=key) | Build(function=key) if key:
                found.add(key)
            case FunctionName(key=key):
                found.add(key)
    return found


def nodes(root: object) -> Iterator[object]:
    """Every value of the lowered tree below one, in no particular order."""
    work = [root]
    while work:
        one = work.pop()
        if isinstance(one, tuple):
            work.extend(one)
        elif is_dataclass(one) and not isinstance(one, Place | Directive | Type):
            yield one
            for field in fields(one):
                inner = getattr(one, field.name)
                if isinstance(inner, tuple) or is_dataclass(inner):
                    work.append(inner)
