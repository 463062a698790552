"""Reading one file of source text."""

from __future__ import annotations

import os
import stat
from dataclasses import dataclass
from pathlib import Path
from typing import Literal as Word

from beatwise.errors import BadInput

LARGEST_BYTES = 4 << 20  #: of a source file; our own limit
BOM = b"\xef\xbb\xbf"


@dataclass(frozen=True, slots=True)
class SourceText:
    """A file's text, line ends as they are. A byte order mark is not part of it, but remembered."""

    text: str
    encoding: Word["utf-8", "latin-1"]
    byte_order_mark: bool


def read_text(path: Path) -> SourceText:
    """The text of a file: UTF-8, or Latin-1 where it is not valid UTF-8, which fits any bytes.

    BadInput when it is missing, no ordinary file, larger than 4 MiB, unreadable, or binary (it has NUL bytes).
    """
    try:
        found = path.stat()
        if not stat.S_ISREG(found.st_mode):
            raise BadInput(f"{shown(path)}: not an ordinary file")
        with path.open("rb") as file:
            content = file.read(LARGEST_BYTES + 1)
    except FileNotFoundError:
        raise BadInput(f"{shown(path)}: no such file or folder") from None
    except (OSError, ValueError) as error:
        raise BadInput(f"{shown(path)}: cannot be read ({getattr(error, 'strerror', None) or error})") from None
    if len(content) > LARGEST_BYTES:
        raise BadInput(f"{shown(path)}: larger than {LARGEST_BYTES >> 20} MiB")
    if b"\0" in content:
        raise BadInput(f"{shown(path)}: a binary file, not C++ source")
    marked = content.startswith(BOM)
    try:
        return SourceText(content.removeprefix(BOM).decode("utf-8"), "utf-8", marked)
    except UnicodeDecodeError:
        return SourceText(content.removeprefix(BOM).decode("latin-1"), "latin-1", marked)


def absolute(path: Path) -> Path:
    """The path from the root, without ``..``; symbolic links stay as they are."""
    return Path(os.path.abspath(path))


def shown(path: Path) -> str:
    """A path as a user reads it: relative to the working directory where it lies in it."""
    here, full = Path.cwd(), absolute(path)
    return (full.relative_to(here) if full.is_relative_to(here) else full).as_posix()
