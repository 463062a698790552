"""What an unknown name must be, as far as its uses in the source tell: a namespace, a type, a constant, a function."""

from __future__ import annotations

import re
from collections.abc import Iterable, Iterator, Set
from typing import Literal as Word

Kind = Word[
    "namespace",
    "template",
    "type",
    "empty macro",
    "call macro",
    "function template",
    "function",
    "variable",
    "constant",
    "type argument",
]

#: A name used in several ways is the first of these that fits. A mere argument of a template is a type only where
#: nothing else is known of it.
STRONGEST: tuple[Kind, ...] = (
    *("template", "type", "empty macro", "namespace", "call macro"),
    *("function template", "function", "variable", "constant", "type argument"),
)

BUILT_IN = r"(?:void|bool|char|short|int|long|float|double|signed|unsigned|auto)"
DECLARING = rf"(?:{BUILT_IN}|static|inline|extern|const|constexpr|volatile|template|struct|class|typedef|typename)\b"
COMMENT_OR_TEXT = re.compile(r"//[^\n]*|/\*.*?\*/|\"(?:\\.|[^\"\\\n])*\"|'(?:\\.|[^'\\\n])*'", re.DOTALL)
TEMPLATE_OPENING = re.compile(r"[A-Za-z_]\w*\s*<(?:[^;(){}<>]|<[^;(){}<>]*>)*$")
QUALIFIER = re.compile(r"(?:\w+\s*::\s*)+$|(?<![\w>])::\s*$")
BEFORE, AFTER = 300, 600  #: characters looked at on either side of a use

#: Templates whose first argument is a type, and whose others are numbers.
TYPE_FIRST = frozenset(
    ("stream", "vector", "istream", "ostream", "vec_t", "mmap", "async_mmap", "array", "burst_maxi", "axis", "streams")
)

#: What may stand between the angles of template arguments.
ARGUMENTS = re.compile(r"[\w\s:,*&.()+/\-\[\]\"']*")


def bare(text: str) -> str:
    """The text with comments, strings and directive lines blanked out; every character keeps its place.

    >>> bare('a = 1; // b')
    'a = 1;     '
    """
    blanked = COMMENT_OR_TEXT.sub(lambda found: re.sub(r"[^\n]", " ", found.group()), text)
    return re.sub(
        r"^[ \t]*#[ \t]*(?:include|pragma)[^\n]*", lambda found: " " * len(found.group()), blanked, flags=re.M
    )


def kinds(name: str, texts: Iterable[str]) -> frozenset[Kind]:
    """Every kind that some use of the name in the bare texts speaks for.

    >>> sorted(kinds("T", ["T x; f(T());"]))
    ['function', 'type']
    """
    return frozenset(kind for before, after in _surroundings(name, texts) if (kind := kind_of(name, before, after)))


def strongest(found: Iterable[Kind]) -> Kind:
    """The kind that explains all the others best; a constant if there is none."""
    seen = set(found)
    if {"namespace", "type argument"} <= seen:
        return "template" if "template" in seen else "type"
    return next((kind for kind in STRONGEST if kind in seen), "constant")


def kind_of(name: str, before: str, after: str) -> Kind | None:
    """What one use of a name speaks for, from the text on either side of it; None where it says nothing.

    >>> kind_of("N", "i < ", "; i++)"), kind_of("radar", "", "::gate g;"), kind_of("M", "", "<float, 4> m(3);")
    ('constant', 'namespace', 'template')
    """
    after_directive = re.search(r"(?:^|\n)[ \t]*#[^\n]*\n\s*$", before)
    before, after = QUALIFIER.sub("", before).rstrip(), after.lstrip()
    if re.match(r"<", after):
        return _before_angle(after)
    if after.startswith("::"):
        return "namespace"
    if re.search(r"\b(?:struct|class|union|enum)$", before):
        return None  # declared by the source itself
    if re.search(r"\b(?:typename|new|public|private|protected|typedef)$|\busing\s+\w+\s*=$", before):
        return "type"
    if re.search(r"#\s*define$|\.$|->$|#\s*if.*$|\bdefined\s*\(?$", before):
        return None
    begins = bool(not before or after_directive or before[-1] in ";{}:" or re.search(rf"{DECLARING}$", before))
    in_template = bool(TEMPLATE_OPENING.search(before)) and before[-1:] in ("<", ",")
    if in_template and re.match(r"[*&]*\s*[,>]", after):
        return "type" if after[0] in "*&" else _argument(name, before)
    if re.match(rf"(?:(?:const|volatile)\s+)?(?!const|volatile){DECLARING}", after):
        return "empty macro"
    if (
        begins
        and (
            not after
            or after[0] == "}"
            or re.match(r"[A-Za-z_]\w*\s+[A-Za-z_]", after)
            and not re.match(r"const\b", after)
        )
    ) or (before[-1:] in ("*", "&") and re.match(r"[A-Za-z_]\w*\s*[,)=;[]", after)):
        return "empty macro"
    if before.endswith("(") and (cast := re.match(r"(\**)\s*\)\s*(.?)", after)):
        if cast[1] or re.search(r"\bsizeof\s*\($", before) or re.match(r"[\w(]", cast[2]) and _is_cast(before):
            return "type"
        return "constant"
    if re.match(r"(?:const\b\s*)?[*&]*\s*(?:const\b\s*)?[A-Za-z_]\w*\s*[;,=)(\[{:<]", after) and (
        begins or (before[-1:] in "(,<" and (after[0] not in "*&"))
    ):
        return "type"
    if before[-1:] in "(," and re.match(r"[*&]+\s*(?:const\b\s*)?[A-Za-z_]\w*\s*[,)=[]", after):
        return None  # a parameter or a product
    if after.startswith("{") and not before.endswith(")"):
        return "type"
    if after.startswith("("):
        return _before_parenthesis(after, begins)
    if begins and re.match(r"[A-Za-z_]", after):
        return "type"
    return "variable" if re.match(r"\[|\.\s*[A-Za-z_]|->", after) else "constant"


def template_arguments(after: str) -> tuple[str, ...] | None:
    """The arguments between the angles that the text begins with, or None if they are no template arguments.

    >>> template_arguments("<hls::stream<float>, 4> s;"), template_arguments("< n && m > 3")
    (('hls::stream<float>', '4'), None)
    """
    end = _closing_angle(after)
    if end is None:
        return None
    parts, depth, start = [], 0, 1
    for at in range(1, end):
        depth += (after[at] in "<([") - (after[at] in ">)]")
        if after[at] == "," and not depth:
            parts.append(after[start:at].strip())
            start = at + 1
    return (*parts, after[start:end].strip()) if after[start:end].strip() or parts else ()


def argument_lists(name: str, texts: Iterable[str]) -> Iterator[tuple[str, ...]]:
    """The template arguments of every use of the name that has some."""
    for _, after in _surroundings(name, texts):
        if after.lstrip().startswith("<") and (found := template_arguments(after.lstrip())) is not None:
            yield found


def _surroundings(name: str, texts: Iterable[str]) -> Iterator[tuple[str, str]]:
    pattern = re.compile(rf"(?<![\w#]){re.escape(name)}\b")
    for text in texts:
        for use in pattern.finditer(text):
            yield text[max(0, use.start() - BEFORE) : use.start()], text[use.end() : use.end() + AFTER]


def _closing_angle(after: str) -> int | None:
    depth, at = 0, 0
    while at < len(after):
        if after[at] == "<":
            depth += 1
        elif after[at] == ">" and after[at - 1] != "-":
            depth -= 1
            if not depth:
                return at
        elif not ARGUMENTS.fullmatch(after[at]) or after.startswith("&&", at):
            return None
        at += 1
    return None


def _before_angle(after: str) -> Kind:
    end = _closing_angle(after)
    if end is None:
        return "constant"
    rest = after[end + 1 :].lstrip()
    if rest.startswith("("):
        return "function template"
    return "template" if re.match(r"[A-Za-z_&*,>){;]|::|\.\.\.", rest) else "constant"


def _before_parenthesis(after: str, begins: bool) -> Kind:
    depth = 0
    for at, letter in enumerate(after):
        depth += (letter == "(") - (letter == ")")
        if not depth:
            rest = after[at + 1 :].lstrip()
            return "call macro" if begins and re.match(r"[A-Za-z_}#{]", rest) else "function"
    return "function"


def _is_cast(before: str) -> bool:
    """Whether a parenthesis that ends the text opens a cast and not a call or a condition."""
    return not re.search(r"[\w\])]\s*\($", before) or bool(re.search(r"\breturn\s*\($", before))


def _argument(name: str, before: str) -> Kind:
    """What a template argument is: the template may tell by its own name, else the argument's spelling does."""
    template = re.findall(r"(\w+)\s*<", before)[-1]
    if template in TYPE_FIRST:
        return "type" if before.endswith("<") else "constant"
    if re.fullmatch(r"(?:ap|ac)_\w+", template):
        return "constant"
    if name.isupper() or re.fullmatch(r"[A-Z0-9_]+", name):
        return "type argument" if re.search(r"(?:^T_|_T$|TYPE|^T$)", name) else "constant"
    return "type argument"


def template_parameters(name: str, texts: Iterable[str], values: Set[str]) -> tuple[str, ...]:
    """The template parameters (``class``, or the type of a value) that all uses of the name together ask for.

    ``values`` are names known to be constants.
    """
    texts = tuple(texts)
    found: list[tuple[int, str]] = []
    for arguments in argument_lists(name, texts):
        for at, argument in enumerate(arguments):
            told = _parameter(argument, texts, values)
            if at == len(found):
                found.append(told)
            elif told[0] > found[at][0]:
                found[at] = told
    return tuple(kind for _, kind in found)


def _parameter(argument: str, texts: Iterable[str], values: Set[str]) -> tuple[int, str]:
    """What parameter a template argument asks for, after how sure that is."""
    if re.match(r"[\d'\"(!~-]|true\b|false\b|sizeof\b", argument) or re.search(r"\w\s*[+*/%-]\s*\w", argument):
        return 1, "int"
    if not re.fullmatch(r"[A-Za-z_]\w*", argument) or re.fullmatch(rf"{BUILT_IN}|half", argument):
        return 1, "class"
    typed = rf"\b((?:unsigned\s+)?int|unsigned|size_t|bool|u?int\d+_t)\s+{argument}\b(?!\s*\()"
    named = rf"\b(?:typename|class|struct)\s+{argument}\b|\btypedef\b[^;]*\b{argument}\s*;|\busing\s+{argument}\s*="
    for text in texts:
        if value := re.search(typed, text):
            return 2, value[1]
        if re.search(named, text):
            return 2, "class"
        if replaced := re.search(rf"#\s*define\s+{argument}\s+(\S+)", text):
            return 1, "int" if re.match(r"[\d(]", replaced[1]) else "class"
    if argument in values:
        return 0, "int"
    return 0, "class" if strongest(kinds(argument, texts)) in ("type", "type argument", "template") else "int"
