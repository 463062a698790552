"""The commands of a directive script: words, quotes, braces, comments, variables and simple repetition.

Only the notation is read. Nothing is run: a command is handed on as its words.
"""

from __future__ import annotations

import re
from collections.abc import Iterator
from dataclasses import dataclass
from functools import cache
from typing import Literal

#: Our own limits, far above what a script needs; they keep a hostile one from running on.
MOST_CHARACTERS = 10_000_000  #: in all words together, after substitution
LONGEST_WORD = 10_000
LONGEST_VARIABLE = 1_000
DEEPEST = 20  #: repetitions within one another

BLANK = re.compile(r"(?:[ \t\f\v]|\\\r?\n)+")
GAP = re.compile(r"(?:[\s;]|\\\r?\n)+")
COMMENT = re.compile(r"#(?:\\\r?\n|[^\n])*")
BARE = re.compile(r"(?:\[[^\]\[\n]{0,400}\]|\\[^\r\n]|[^\s;\\])+")
QUOTED = re.compile(r'"(?:\\[\s\S]|[^"\\])*"?')
BRACE = re.compile(r"\\[\s\S]|[{}]")
VARIABLE = re.compile(r"\\\r?\n[ \t]*|\\(.)|\$(?:\{(\w+)\}|(\w+))")


@dataclass(frozen=True, slots=True)
class Word:
    """One word: where its content lies in the script, and how it was written (braces keep it as it is)."""

    start: int
    end: int
    quoting: Literal["bare", "quotes", "braces"]


@dataclass(frozen=True, slots=True)
class Command:
    """One command with its variables substituted; ``start`` and ``end`` are indices into the script."""

    words: tuple[str, ...]
    start: int
    end: int


def commands(text: str) -> Iterator[Command]:
    """The commands in the order they would run; ``set`` and ``foreach`` are followed, all others are returned.

    >>> [command.words for command in commands('set n 2; foreach p {a b} { depth -of $n "top/$p" }')]
    [('depth', '-of', '2', 'top/a'), ('depth', '-of', '2', 'top/b')]
    """
    return _Script(text).run(0, len(text), DEEPEST)


class _Script:
    def __init__(self, text: str) -> None:
        self.text = text
        self.variables: dict[str, str] = {}
        self.left = MOST_CHARACTERS
        self.split = cache(lambda start, end: tuple(_split(text, start, end)))

    def run(self, start: int, end: int, depth: int) -> Iterator[Command]:
        for words in self.split(start, end):
            plain = tuple(_substituted(self.text, word, self.variables)[:LONGEST_WORD] for word in words)
            self.left -= 1 + sum(map(len, plain))
            if self.left < 0:
                return
            match plain:
                case ("set", name, value):
                    self.variables[name] = value[:LONGEST_VARIABLE]
                case ("foreach", name, items, _) if depth:
                    for item in items.split():
                        self.left -= 1
                        self.variables[name] = item
                        yield from self.run(words[3].start, words[3].end, depth - 1)
                case _:
                    yield Command(plain, words[0].start, words[-1].end)


def _split(text: str, start: int, end: int) -> Iterator[tuple[Word, ...]]:
    words: list[Word] = []
    index = start
    while index < end:
        if blank := BLANK.match(text, index, end):
            index = blank.end()
        elif gap := GAP.match(text, index, end):
            index = gap.end()
            if words:
                yield tuple(words)
                words = []
        elif text[index] == "#" and not words:
            comment = COMMENT.match(text, index, end)
            index = comment.end() if comment else end
        else:
            word, index = _word(text, index, end)
            words.append(word)
    if words:
        yield tuple(words)


def _word(text: str, start: int, end: int) -> tuple[Word, int]:
    if text[start] == "{":
        close = _closing_brace(text, start, end)
        return Word(start + 1, close, "braces"), close + 1
    if text[start] == '"' and (quoted := QUOTED.match(text, start, end)):
        close = quoted.end() - (len(quoted[0]) > 1 and quoted[0].endswith('"'))
        return Word(start + 1, close, "quotes"), quoted.end()
    bare = BARE.match(text, start, end)
    stop = bare.end() if bare else start + 1
    return Word(start, stop, "bare"), stop


def _closing_brace(text: str, start: int, end: int) -> int:
    depth = 0
    for brace in BRACE.finditer(text, start, end):
        depth += {"{": 1, "}": -1}.get(brace[0], 0)
        if depth == 0:
            return brace.start()
    return end


def _substituted(text: str, word: Word, variables: dict[str, str]) -> str:
    written = text[word.start : min(word.end, word.start + LONGEST_WORD)]
    if word.quoting == "braces":
        return written

    def replacement(match: re.Match[str]) -> str:
        escaped, braced, plain = match.groups()
        if escaped is not None:
            return str(escaped)
        name = braced or plain
        return variables.get(name, match[0]) if name else " "

    return VARIABLE.sub(replacement, written)
