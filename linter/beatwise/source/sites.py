"""The memory accesses that the text alone shows, to compare with what came through the front end."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass
from typing import TYPE_CHECKING
from typing import Literal as Word

from beatwise.source.lexis import code_only
from beatwise.source.lines import Lines
from beatwise.source.syntax import function_declarator, is_function, name_of, nodes, text_of

if TYPE_CHECKING:
    from tree_sitter import Node

MEMORY = ("memcpy", "memmove", "memset")
COPIES = {*MEMORY, *(f"std::{name}" for name in (*MEMORY, "copy", "copy_n", "fill", "fill_n"))}


@dataclass(frozen=True, slots=True)
class Site:
    """A subscript, dereference or copy; ``function`` is the unqualified name of the innermost function around it."""

    function: str | None
    line: int
    what: Word["subscript", "dereference", "copy"]


def subscripts_in(text: str) -> tuple[Site, ...]:
    """The sites of a text in its order, as written: macros are not expanded, types not known.

    Comments and what ``#if 0`` leaves out have none; the branches of other conditions all count.
    """
    lines = Lines("", text)
    return tuple(
        Site(function, lines.line(node.start_byte), what)
        for function, node in _within_functions(code_only(text))
        if (what := _site(node))
    )


def _within_functions(code: str) -> Iterator[tuple[str | None, Node]]:
    around: list[tuple[int, str | None]] = []
    for depth, node in nodes(code):
        while around and around[-1][0] >= depth:
            around.pop()
        if is_function(node):
            around.append((depth, name_of(function_declarator(node))))
        yield (around[-1][1] if around else None), node


def _site(node: Node) -> Word["subscript", "dereference", "copy"] | None:
    match node.type:
        case "subscript_expression":
            return "subscript"
        case "pointer_expression" if node.children[0].type == "*":
            return "dereference"
        case "field_expression" if node.children[1].type == "->" and node.children[0].type != "this":
            return "dereference"
        case "call_expression":
            callee = node.child_by_field_name("function")
            if callee is not None and callee.type in ("identifier", "qualified_identifier", "template_function"):
                return "copy" if text_of(callee).split("<")[0] in COPIES else None
    return None
