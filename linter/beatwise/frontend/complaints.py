"""The compiler's complaints, and the source around the place each of them names."""

from __future__ import annotations

import re
from collections.abc import Iterable, Mapping
from dataclasses import dataclass

from beatwise.frontend.prelude import INVENTED, Scope

WARNING, ERROR = 2, 3  #: as the compiler numbers severities; 4 is fatal
MOST = 1000  #: complaints of one parse that are looked at
LINES_BEFORE, LINES_AFTER = 6, 8  #: of the source, around a complaint

#: What a complaint is not about: a template that is only declared and is used with a type local to a function.
HARMLESS = re.compile("is used but not defined in this translation unit")

#: A variable of an arbitrary-precision or stand-in type, whose value is not followed; it stays declared.
VALUELESS = re.compile("constexpr variable '.*' must be initialized by a constant expression")

MISSING = re.compile(
    r"(?:use of undeclared identifier|unknown type name|unknown class name|no (?:template|type|member) named) '(\w+)'"
)


@dataclass(frozen=True, slots=True)
class Diagnostic:
    """What the compiler says; ``severity`` is 2 for a warning, 3 for an error, 4 for a fatal one."""

    severity: int
    text: str
    file: str
    line: int  #: from 1
    column: int  #: from 1, in bytes
    offset: int  #: from 0, in bytes


@dataclass(frozen=True, slots=True)
class Complaint:
    """An error, with what it says is missing and the bare source around its place."""

    text: str
    file: str
    number: int  #: of the line, from 1
    column: int  #: from 1, in bytes
    name: str  #: what is missing, or empty
    scope: Scope  #: the namespace it was looked for in
    word: str  #: the word at the place, or empty
    line: str  #: the whole line
    before: str  #: the source up to the place
    after: str  #: the source from the place on, without the missing name

    @property
    def in_namespace(self) -> bool:
        """Whether the name was looked for in a namespace, not among the members of a class."""
        return " in namespace " in self.text or " in '" not in self.text


def matters(one: Diagnostic) -> bool:
    """Whether it is an error that changes what the compiler understood."""
    return one.severity >= ERROR and not HARMLESS.search(one.text)


def is_lasting(one: Diagnostic) -> bool:
    """Whether an error that no stand-in cures costs anything of what the source says."""
    return matters(one) and not VALUELESS.match(one.text)


def complaints(diagnostics: Iterable[Diagnostic], lines: Mapping[str, list[bytes]]) -> list[Complaint]:
    """The errors among the diagnostics; ``lines`` are those of the bare text of each file."""
    return [_complaint(one, lines.get(one.file, [])) for one in diagnostics if matters(one)][:MOST]


def _complaint(one: Diagnostic, lines: list[bytes]) -> Complaint:
    missing = MISSING.match(one.text)
    name = missing[1] if missing else ""
    inside = re.search(r" in namespace '([^']+)'", one.text)
    scope = tuple(inside[1].replace(f"{INVENTED}::", "").split("::")) if inside else ()
    at = one.line - 1
    here = lines[at] if 0 <= at < len(lines) else b""
    before = b"\n".join([*lines[max(0, at - LINES_BEFORE) : max(0, at)], here[: one.column - 1]]).decode(
        "utf-8", "replace"
    )
    after = b"\n".join([here[one.column - 1 :], *lines[at + 1 : at + 1 + LINES_AFTER]]).decode("utf-8", "replace")
    word = re.match(r"[A-Za-z_]\w*", after)
    return Complaint(
        text=one.text,
        file=one.file,
        number=one.line,
        column=one.column,
        name=name,
        scope=scope,
        word=word.group() if word else "",
        line=here.decode("utf-8", "replace"),
        before=before,
        after=after.removeprefix(name),
    )
