"""One tolerant parse of a text; the only place that knows tree-sitter."""

from __future__ import annotations

import time
from collections.abc import Iterator
from functools import cache
from typing import TYPE_CHECKING

if TYPE_CHECKING:
    from tree_sitter import Node, Parser

LONGEST_SECONDS = 5.0  #: of one parse; an ordinary file of 100 KB takes 0.03


def nodes(code: str) -> Iterator[tuple[int, Node]]:
    """Depth and node of every node in the order of the text, parents first; none when the parse takes too long.

    ``code`` is ASCII with its directives blanked (``lexis.code_only``): conditionals that cut through a construct would
    otherwise tear the tree.
    """
    source = code.encode("ascii", "replace")
    deadline = time.monotonic() + LONGEST_SECONDS

    def read(offset: int, _: object) -> bytes:
        return source[offset : offset + 65536]

    def is_late(_offset: int, _wrong: bool) -> bool:
        return time.monotonic() > deadline

    try:
        tree = _parser().parse(read, progress_callback=is_late)
    except ValueError:
        _parser().reset()
        return
    cursor = tree.walk()
    depth = 0
    while True:
        node = cursor.node
        if node is not None and node.is_named:
            yield depth, node
        if cursor.goto_first_child():
            depth += 1
            continue
        while not cursor.goto_next_sibling():
            if not cursor.goto_parent():
                return
            depth -= 1


def name_of(declarator: Node | None) -> str | None:
    """The unqualified name that a declarator declares."""
    while declarator is not None:
        match declarator.type:
            case "identifier" | "field_identifier" | "operator_name" | "destructor_name" | "type_identifier":
                return text_of(declarator)
            case "qualified_identifier" | "template_function" | "template_method" | "template_type":
                declarator = declarator.child_by_field_name("name")
            case "reference_declarator" | "parenthesized_declarator" | "attributed_declarator":
                declarator = declarator.named_children[0] if declarator.named_children else None
            case _:
                declarator = declarator.child_by_field_name("declarator")
    return None


def function_declarator(node: Node) -> Node | None:
    """The function declarator of a definition or declaration, past what its result adds (``int *f()``)."""
    declarator = node.child_by_field_name("declarator")
    while declarator is not None and declarator.type != "function_declarator":
        if declarator.type == "reference_declarator":
            declarator = declarator.named_children[0] if declarator.named_children else None
        else:
            declarator = declarator.child_by_field_name("declarator")
    return declarator


def is_function(node: Node) -> bool:
    """A function with its body, also one that holds nothing but macros and so reads like an initialised variable."""
    if node.type == "declaration":
        declarator = node.child_by_field_name("declarator")
        value = declarator.child_by_field_name("value") if declarator is not None else None
        return value is not None and value.type == "initializer_list" and function_declarator(node) is not None
    return node.type == "function_definition"


def text_of(node: Node) -> str:
    return node.text.decode("ascii", "replace") if node.text else ""


@cache
def _parser() -> Parser:
    import tree_sitter_cpp
    from tree_sitter import Language, Parser

    return Parser(Language(tree_sitter_cpp.language()))
