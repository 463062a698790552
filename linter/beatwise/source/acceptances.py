"""Findings that the source accepts: ``// beatwise accepts RULE: reason``."""

from __future__ import annotations

import re
from bisect import bisect_right
from dataclasses import dataclass

from beatwise.model.place import Place
from beatwise.source.lexis import JOINT, Lexeme, blanked, code_only, lexemes
from beatwise.source.lines import LINE_END, Lines

ACCEPTS = re.compile(r"[/*!\s]*beatwise\s+accepts\b\s*((?:[\w-]+\s*,\s*)*[\w-]*)\s*(:?)(.*)", re.IGNORECASE | re.DOTALL)


@dataclass(frozen=True, slots=True)
class Acceptance:
    """``rule`` is accepted on ``lines`` (first and last) of the comment's file.

    ``reason`` is None where none is given; ``rule`` is as written, known or not, and may be empty.
    """

    rule: str
    reason: str | None
    place: Place
    lines: tuple[int, int]


def acceptances_in(text: str, file: str) -> tuple[Acceptance, ...]:
    """All acceptances written in the comments of a text.

    A comment beside code covers the lines it shares with code; one that stands alone covers the next line of code,
    and the directives before that line.

    >>> (accepted,) = acceptances_in("f(a[i]);  // beatwise accepts short-run: cold path", "f.cpp")
    >>> accepted.rule, accepted.reason, accepted.lines
    ('short-run', 'cold path', (1, 1))
    """
    if "beatwise" not in text.lower():
        return ()
    comments = [lexeme for lexeme in lexemes(text) if lexeme.kind == "comment"]
    found = [(comment, match) for comment in comments if (match := ACCEPTS.match(_content(text, comment)))]
    if not found:
        return ()
    lines = Lines(file, text)
    occupied, code = set(_filled(blanked(text, comments))), _filled(code_only(text))
    return tuple(
        Acceptance(
            rule.strip(),
            (match[2] and " ".join(match[3].split())) or None,
            lines.place(comment.start, comment.end),
            _covered(lines.line(comment.start), lines.line(comment.end), occupied, code),
        )
        for comment, match in found
        for rule in match[1].split(",")
    )


def _filled(text: str) -> list[int]:
    return [number for number, line in enumerate(LINE_END.split(text), start=1) if line.strip()]


def _covered(first: int, last: int, occupied: set[int], code: list[int]) -> tuple[int, int]:
    if first in occupied or last in occupied:
        return first, last
    following = bisect_right(code, last)
    return last + 1, code[following] if following < len(code) else last + 1


def _content(text: str, comment: Lexeme) -> str:
    content = JOINT.sub(" ", text[comment.start : comment.end])
    if content.startswith("/*"):
        content = content[2:].removesuffix("*/")
        return re.sub(r"(\r\n|\n|\r)[ \t]*\*+", r"\1", content)
    return content[2:]
