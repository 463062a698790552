"""Where reports go: standard output, or a file that is whole or not there at all; complaints go to standard error."""

from __future__ import annotations

import os
import shutil
import sys
import tempfile
from contextlib import suppress
from pathlib import Path
from typing import TextIO

from beatwise.report.escape import printable


def deliver(text: str, to: Path | None = None) -> None:
    """Write the text to the file, else to standard output. OSError when that cannot be done."""
    if to is not None:
        replace_file(to, text)
        return
    write(sys.stdout, text)


def complain(line: str) -> None:
    """One line to standard error."""
    write(sys.stderr, f"beatwise: {printable(line)}\n")


def columns(stream: TextIO) -> int:
    """The width of the terminal; COLUMNS where it is set, 80 where there is neither."""
    if stream.isatty() or "COLUMNS" in os.environ:
        return shutil.get_terminal_size().columns
    return 80


def write(stream: TextIO, text: str) -> None:
    """Write and flush; what the stream's encoding does not know is written as an escape."""
    encoding = stream.encoding or "utf-8"
    stream.write(text.encode(encoding, "backslashreplace").decode(encoding))
    stream.flush()


def replace_file(path: Path, text: str) -> None:
    """The file holds the whole text or is as it was, whatever happens in between; a device is simply written to."""
    target = Path(os.path.realpath(path))
    if target.exists() and not target.is_file():
        target.write_text(text, encoding="utf-8")
        return
    handle, name = tempfile.mkstemp(prefix=f".{target.name}.", dir=target.parent)
    try:
        with os.fdopen(handle, "w", encoding="utf-8", newline="") as file:
            file.write(text)
        os.chmod(name, _mode(target))
        os.replace(name, target)
    except BaseException:
        with suppress(OSError):
            os.unlink(name)
        raise


def _mode(target: Path) -> int:
    """The mode of the file that is replaced, or what a new file would get."""
    if target.exists():
        return target.stat().st_mode & 0o777
    mask = os.umask(0)
    os.umask(mask)
    return 0o666 & ~mask
