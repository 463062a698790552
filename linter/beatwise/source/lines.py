"""Where an index of a text lies: line, column, byte offset."""

from __future__ import annotations

import re
from bisect import bisect_right
from itertools import accumulate

from beatwise.model.place import Place

LINE_END = re.compile(r"\r\n|\n|\r")
WIDE = re.compile(r"[^\x00-\x7f]")


class Lines:
    """The lines of one text. Built in one pass; each question after that takes a binary search.

    >>> str(Lines("kernel.cpp", "int a;\\r\\nint b;").place(8, 11))
    'kernel.cpp:2:1'
    """

    def __init__(self, file: str, text: str) -> None:
        self.file = file
        self._starts = [0, *(match.end() for match in LINE_END.finditer(text))]
        self._wide = [] if text.isascii() else [match.start() for match in WIDE.finditer(text)]
        self._extra = [0, *accumulate(len(text[index].encode("utf-8", "surrogatepass")) - 1 for index in self._wide)]

    def line(self, index: int) -> int:
        """The line of a character, from 1."""
        return bisect_right(self._starts, index)

    def byte(self, index: int) -> int:
        """The offset of a character in bytes of UTF-8."""
        return index + self._extra[bisect_right(self._wide, index - 1)]

    def place(self, start: int, end: int) -> Place:
        """The stretch from one character to another (one past the last)."""
        line, end_line = self.line(start), self.line(end)
        return Place(
            self.file,
            line,
            start - self._starts[line - 1] + 1,
            end_line,
            end - self._starts[end_line - 1] + 1,
            self.byte(start),
        )
