"""Where something stands in the user's source."""

from __future__ import annotations

from dataclasses import dataclass


@dataclass(frozen=True, slots=True, order=True)
class Place:
    """A stretch of source text. Lines and columns count from 1, columns in code points; the end is one past the last.

    ``offset`` is the byte offset of the start in the file: two places with the same file and offset are the same site.
    """

    file: str
    line: int
    column: int
    end_line: int
    end_column: int
    offset: int

    def __str__(self) -> str:
        return f"{self.file}:{self.line}:{self.column}"
