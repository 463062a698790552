"""The comments and preprocessing directives of a C++ text, found without parsing it.

They are lexical, and a text that does not parse still has them. One pass, linear in the length of the text. A text
that ends inside a comment or a raw string ends there; an ordinary string or character constant ends with its line.
"""

from __future__ import annotations

import re
from collections.abc import Iterable, Iterator
from dataclasses import dataclass
from typing import Literal as Word

SPLICE = r"\\[ \t]*(?:\r\n|\n|\r)"
LINE_COMMENT = rf"//(?:{SPLICE}|[^\n\r])*"
BLOCK_COMMENT = r"/\*(?:[\s\S]*?\*/|[\s\S]*)"
STRING = rf'"(?:{SPLICE}|\\[^\n\r]|[^"\\\n\r])*"?'
CHARACTER = rf"'(?:{SPLICE}|\\[^\n\r]|[^'\\\n\r])*'?"

COMMENT = re.compile(f"{LINE_COMMENT}|{BLOCK_COMMENT}")
COMMENT_OR_STRING = re.compile(f"({LINE_COMMENT}|{BLOCK_COMMENT})|{STRING}")
LOGICAL_LINE = re.compile(rf"(?:{BLOCK_COMMENT}|{LINE_COMMENT}|{STRING}|{SPLICE}|[^\n\r])*")
JOINT = re.compile(SPLICE)
STOP = re.compile(r"""//|/\*|(?<!\w)(?:u8|[uUL])?R"(?P<tag>[^()\\\s"]{0,16})\(|["'#]""")
QUOTED = {'"': re.compile(STRING), "'": re.compile(CHARACTER)}
VISIBLE = re.compile(r"[^\n\r]")
UNPLAIN = re.compile(r"[^\x00-\x7f]")
CONDITION = re.compile(r"#[ \t]*(if|elif|else|endif)(?:n?def)?\b[ \t]*(0[ \t]*(?=$|\s|/))?")
SUFFIX = re.compile(r"\w*")
CHARACTER_PREFIX = re.compile(r"(?:^|\W)(?:u8|[uUL])$")


@dataclass(frozen=True, slots=True)
class Lexeme:
    """A comment, a string or character constant, or a preprocessing directive from its ``#`` to the end of its logical
    line; indices into the text."""

    kind: Word["comment", "string", "directive"]
    start: int
    end: int


def lexemes(text: str) -> Iterator[Lexeme]:
    """Comments, strings and directives in the order of the text; what stands inside a directive follows it."""
    index = 0
    comment_starts: dict[int, int] = {}  # end -> start
    while stop := STOP.search(text, index):
        start, sign = stop.start(), stop[0]
        if sign in ("//", "/*"):
            index = _end(COMMENT, text, start)
            comment_starts[index] = start
            yield Lexeme("comment", start, index)
        elif sign == "#":
            index = start + 1
            if _opens_its_line(text, start, comment_starts):
                yield Lexeme("directive", start, _end(LOGICAL_LINE, text, start))
        elif stop["tag"] is not None:
            close = f'){stop["tag"]}"'
            found = text.find(close, stop.end())
            index = len(text) if found < 0 else _end(SUFFIX, text, found + len(close))
            yield Lexeme("string", start, index)
        elif sign == "'" and _separates_digits(text, start):
            index = start + 1
        else:
            index = _end(SUFFIX, text, _end(QUOTED[sign], text, start))
            yield Lexeme("string", start, index)


def joined(text: str) -> str:
    """A logical line on one line, its comments blanked."""
    spliced = JOINT.sub(" ", text)
    return COMMENT_OR_STRING.sub(lambda match: " " if match[1] else match[0], spliced)


def _end(pattern: re.Pattern[str], text: str, start: int) -> int:
    match = pattern.match(text, start)
    return match.end() if match else start + 1


def _separates_digits(text: str, quote: int) -> bool:
    """``1'000``: a quote right after a word is no character constant, unless that word is an encoding prefix."""
    before = text[max(0, quote - 3) : quote]
    return before[-1:].isalnum() and not CHARACTER_PREFIX.search(before)


def _opens_its_line(text: str, mark: int, comment_starts: dict[int, int]) -> bool:
    index = mark
    while index > 0:
        if index in comment_starts:
            index = comment_starts[index]
            continue
        before = text[index - 1]
        if before in "\n\r":
            end = index - (2 if text[max(0, index - 2) : index] == "\r\n" else 1)
            while end and text[end - 1] in " \t":
                end -= 1
            if text[max(0, end - 1) : end] != "\\":
                return True
            index = end - 1  # the line goes on from the one above
            continue
        if before not in " \t\f\v":
            return False
        index -= 1
    return True


def blanked(text: str, gone: Iterable[Lexeme]) -> str:
    """The text with some of its lexemes blanked; every character keeps its index, every line its end."""
    parts: list[str] = []
    index = 0
    for lexeme in gone:
        parts += text[index : lexeme.start], VISIBLE.sub(" ", text[max(index, lexeme.start) : lexeme.end])
        index = max(index, lexeme.end)
    return "".join(parts) + text[index:]


def code_only(text: str) -> str:
    """The text with its comments, its directives and what stands between ``#if 0`` and its end blanked.

    Every character keeps its index, every line its end; what is not ASCII becomes ``_``, so indices are byte offsets.
    """
    gone: list[Lexeme] = []
    dead, dead_from = 0, 0
    for lexeme in lexemes(text):
        if lexeme.kind != "string":
            gone.append(lexeme)
        if lexeme.kind == "directive":
            was_dead, dead = dead, _dead_depth(text[lexeme.start : lexeme.end], dead)
            if dead and not was_dead:
                dead_from = lexeme.start
            elif was_dead and not dead:
                gone.append(Lexeme("directive", dead_from, lexeme.end))
    if dead:
        gone.append(Lexeme("directive", dead_from, len(text)))
    return UNPLAIN.sub("_", blanked(text, sorted(gone, key=lambda lexeme: lexeme.start)))


def _dead_depth(directive: str, dead: int) -> int:
    """How many conditions deep a text left out by ``#if 0`` is after a directive."""
    condition = CONDITION.match(directive)
    if not condition:
        return dead
    word, zero = condition[1], condition[2] is not None
    if word == "if":
        return dead + 1 if dead or zero else 0
    if word == "endif":
        return max(dead - 1, 0)
    return 0 if dead == 1 else dead
