"""Which files an ``#include`` may mean, and reading them; nothing outside the allowed folders is ever opened."""

from __future__ import annotations

import os
from collections.abc import Sequence
from functools import cache
from pathlib import Path

from beatwise.errors import BadInput
from beatwise.source.outline import Outline, outline
from beatwise.source.read import absolute, read_text, shown

FOLDERS = (
    "",
    "include",
    "inc",
)  #: where headers are kept, seen from a folder above the source; common practice, no source
MOST_HEADERS = 2000  #: that one source may reach; our own limit


class Library:
    """The files read so far, and where included ones may be: the folders given with ``--include``."""

    def __init__(self, include: Sequence[Path]) -> None:
        self.include = [absolute(folder) for folder in include]
        self.source = cache(read_text)
        self.facts = cache(self._facts)
        self.problems: dict[Path, str] = {}

    def reached(self, source: Path, boundary: Path) -> tuple[Path, ...]:
        """The files that a source includes, directly or not, in the order they are first met.

        Searched are the folder of the including file (for a quoted name), the ``--include`` folders, and the folders
        from the source upward to ``boundary`` with their ``include`` and ``inc``. A name that leads outside
        ``boundary`` and the ``--include`` folders, or into a hidden folder, is not followed.
        """
        searched = [*self.include, *_upward(source.parent, boundary)]
        allowed = [boundary, *self.include]
        found: dict[Path, None] = {source: None}
        pending = [source]
        while pending and len(found) < MOST_HEADERS:
            includer = pending.pop()
            facts = self.facts(includer)
            names = [(name, [includer.parent, *searched]) for name in facts.quoted]
            names += [(name, searched) for name in facts.angled]
            for name, folders in names:
                header = next((path for folder in folders if (path := self._inside(folder, name, allowed))), None)
                if header and header not in found and self._readable(header):
                    found[header] = None
                    pending.append(header)
        return tuple(found)[1:]

    def _facts(self, path: Path) -> Outline:
        return outline(self.source(path).text)

    def _inside(self, folder: Path, name: str, allowed: Sequence[Path]) -> Path | None:
        if os.path.isabs(name) or "\\" in name or len(name) > 1000:
            return None
        path = Path(os.path.normpath(folder / name))
        if not path.is_file():
            return None
        if not any(is_within(path, root) for root in allowed):
            self.problems[path] = "included, but it lies outside the given folders, so it was not read"
            return None
        return path

    def _readable(self, path: Path) -> bool:
        try:
            self.source(path)
        except BadInput as error:
            self.problems[path] = f"included, but {str(error).removeprefix(f'{shown(path)}: ')}"
            return False
        return True


def is_within(path: Path, root: Path, *, hidden: bool = False) -> bool:
    """Whether a path and what it really is (symbolic links followed) lie in a folder; unless ``hidden``, in no hidden
    place of it."""
    real, real_root = Path(os.path.realpath(path)), Path(os.path.realpath(root))
    return _lies_in(path, root, hidden) and _lies_in(real, real_root, hidden)


def boundary_of(folder: Path) -> Path:
    """How far up from a folder included files may lie: the root of its git work tree, else the folder itself."""
    tree = next((each for each in (folder, *folder.parents) if (each / ".git").exists()), folder)
    return tree if _lies_in(folder, tree, hidden=False) else folder


def _lies_in(path: Path, root: Path, hidden: bool) -> bool:
    if not path.is_relative_to(root):
        return False
    return hidden or not any(part.startswith(".") for part in path.relative_to(root).parts)


def _upward(folder: Path, boundary: Path) -> list[Path]:
    above = [each for each in (folder, *folder.parents) if each.is_relative_to(boundary)]
    return [each / name for each in above for name in FOLDERS]
