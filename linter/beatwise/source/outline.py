"""What one file defines, declares and uses, as far as its text alone tells."""

from __future__ import annotations

import re
from collections import Counter
from dataclasses import dataclass, field
from typing import TYPE_CHECKING

from beatwise.source.lexis import blanked, code_only, joined, lexemes
from beatwise.source.syntax import function_declarator, is_function, name_of, nodes, text_of

if TYPE_CHECKING:
    from tree_sitter import Node

INCLUDED = re.compile(r'#\s*(?:include|define\s+\w+)\s*(?:"([^"\n]+)"|<([^>\n]+)>)')
MEMORY_MAPPED = re.compile(r"\bhls\s+interface\b[^\n]{0,400}\bm_axi\b", re.IGNORECASE)
BY_OPERATOR = re.compile(r'\b_Pragma\s*\(\s*L?"\s*hls\s+interface\b[^\n"]{0,400}\bm_axi\b', re.IGNORECASE)
MADE_BY_MACRO = re.compile(r"#\s*define\s+(\w+)[^\n]*\bm_axi\b", re.IGNORECASE)
DEFINE = re.compile(r"#\s*define\b")
DIRECTIVE = re.compile(r"\bhls\s+\w+", re.IGNORECASE)
HARDWARE = re.compile(r"\b(?:ap_u?int|ap_u?fixed|ac_int|ac_fixed)\b|\bhls::|\bhls_\w+\.h\b|\bap_\w+\.h\b")
WORD = re.compile(r"[A-Za-z_]\w*")


@dataclass(frozen=True, slots=True)
class Definition:
    """A function with a body; a ``method`` belongs to a class or is qualified."""

    name: str
    parameters: int
    extern_c: bool
    static: bool
    method: bool
    by_memory: bool  #: it has a parameter that is a pointer or an array
    template: bool


@dataclass(frozen=True, slots=True)
class Outline:
    """``quoted`` and ``angled`` are the names in its ``#include`` lines (and in macros that stand for one)."""

    definitions: tuple[Definition, ...]
    declared: frozenset[str]  #: functions and external variables declared without being defined here
    declared_c: frozenset[str]  #: those of them declared ``extern "C"``
    variables: frozenset[str]  #: names of global variables defined here
    words: Counter[str]  #: every identifier in its code, and how often
    quoted: tuple[str, ...]
    angled: tuple[str, ...]
    memory_mapped: bool  #: a directive in it makes an interface memory-mapped
    interface_macros: frozenset[str]  #: macros it defines that can write such a directive
    hardware: bool  #: it has directives or hardware types at all


def outline(text: str) -> Outline:
    """Read one text. What stands in comments or is left out by ``#if 0`` does not count.

    >>> [each.name for each in outline("static int half(int x) { return x / 2; } int main() { half(3); }").definitions]
    ['half', 'main']
    """
    code = code_only(text)
    found = tuple(lexemes(text))
    directives = [joined(text[each.start : each.end]) for each in found if each.kind == "directive"]
    uncommented = blanked(text, (each for each in found if each.kind == "comment"))
    unquoted = blanked(code, (each for each in found if each.kind == "string"))
    includes = [match for each in directives if (match := INCLUDED.match(each))]
    macros = [match[1] for each in directives if (match := MADE_BY_MACRO.match(each))]
    plain = [each for each in directives if not DEFINE.match(each)]
    names = _names(code)
    return Outline(
        tuple(names.definitions),
        frozenset(names.declared),
        frozenset(names.declared_c),
        frozenset(names.variables),
        Counter(WORD.findall(code)),
        tuple(match[1] for match in includes if match[1]),
        tuple(match[2] for match in includes if match[2]),
        any(map(MEMORY_MAPPED.search, (*plain, unquoted))) or bool(BY_OPERATOR.search(code)),
        frozenset(macros),
        bool(DIRECTIVE.search(uncommented) or HARDWARE.search(uncommented)),
    )


@dataclass(slots=True)
class _Names:
    definitions: list[Definition] = field(default_factory=list)
    declared: set[str] = field(default_factory=set)
    declared_c: set[str] = field(default_factory=set)
    variables: set[str] = field(default_factory=set)


def _names(code: str) -> _Names:
    names = _Names()
    around: list[tuple[int, str]] = []
    for depth, node in nodes(code):
        while around and around[-1][0] >= depth:
            around.pop()
        within = {kind for _, kind in around}
        if "function" in within:
            continue
        if is_function(node):
            around.append((depth, "function"))
            if definition := _definition(node, within):
                names.definitions.append(definition)
            continue
        match node.type:
            case "linkage_specification":
                language = node.child_by_field_name("value")
                around.append((depth, "c" if language is not None and text_of(language) == '"C"' else "other"))
            case "class_specifier" | "struct_specifier" | "union_specifier":
                around.append((depth, "class"))
            case "template_declaration":
                around.append((depth, "template"))
            case "declaration" | "field_declaration":
                _declare(names, node, within)
    return names


def _definition(node: Node, within: set[str]) -> Definition | None:
    declarator = function_declarator(node)
    name = name_of(declarator)
    if declarator is None or name is None:
        return None
    parameters = _parameters(declarator)
    head = declarator.child_by_field_name("declarator")
    qualified = head is not None and head.type == "qualified_identifier"
    return Definition(
        name,
        len(parameters),
        extern_c="c" in within,
        static=_stored(node, "static"),
        method=qualified or "class" in within,
        by_memory=any(map(_is_memory, parameters)),
        template="template" in within,
    )


def _declare(names: _Names, node: Node, within: set[str]) -> None:
    external = _stored(node, "extern") or "c" in within
    for declarator in node.children_by_field_name("declarator"):
        name = name_of(declarator)
        if name is None:
            continue
        if declarator.type == "function_declarator" or _inner_function(declarator):
            names.declared.add(name)
            if "c" in within:
                names.declared_c.add(name)
        elif external and declarator.type != "init_declarator":
            names.declared.add(name)
        elif "class" not in within:
            names.variables.add(name)


def _inner_function(declarator: Node) -> bool:
    """A function whose result is a pointer or reference; a pointer to a function is none."""
    inner: Node | None = declarator
    while inner is not None and inner.type in ("pointer_declarator", "reference_declarator"):
        inner = inner.named_children[-1] if inner.named_children else None
    return inner is not None and inner is not declarator and inner.type == "function_declarator"


def _parameters(declarator: Node) -> list[Node]:
    listed = declarator.child_by_field_name("parameters")
    parameters = [] if listed is None else [each for each in listed.named_children if "parameter" in each.type]
    only_void = len(parameters) == 1 and text_of(parameters[0]).strip() == "void"
    return [] if only_void else parameters


def _is_memory(parameter: Node) -> bool:
    declarator = parameter.child_by_field_name("declarator")
    while declarator is not None:
        if declarator.type in ("pointer_declarator", "array_declarator"):
            return True
        if declarator.type in ("abstract_pointer_declarator", "abstract_array_declarator"):
            return True
        declarator = declarator.child_by_field_name("declarator")
    kind = parameter.child_by_field_name("type")
    return kind is not None and "burst_maxi" in text_of(kind)


def _stored(node: Node, word: str) -> bool:
    return any(child.type == "storage_class_specifier" and text_of(child) == word for child in node.children)
