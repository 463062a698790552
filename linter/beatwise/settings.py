"""What a user has settled in ``beatwise.toml``, beside the source or in a folder above it."""

from __future__ import annotations

import math
import re
import tomllib
from collections.abc import Callable, Collection, Mapping, Sequence
from dataclasses import dataclass, field, fields, replace
from difflib import get_close_matches
from pathlib import Path
from typing import Any
from typing import Literal as Word

from beatwise.errors import BadSettings, UserError
from beatwise.model.finding import LEVELS, Level
from beatwise.source.includes import boundary_of, is_within
from beatwise.source.read import absolute, read_text, shown

FILE_NAME = "beatwise.toml"
LEVEL_WORDS = (*LEVELS, "off")


@dataclass(frozen=True, slots=True)
class Limits:
    """From which loss on a finding is an error or a warning: shares of what the access could get, and of all bytes."""

    error_loss: float = 0.5
    error_share: float = 0.01  #: of the kernel's bytes
    warning_loss: float = 0.1


@dataclass(frozen=True, slots=True)
class Settings:
    """All settings; those that nobody gave have their defaults. Paths are absolute."""

    board: str = "hbm2-32ch"  #: a name, or the path of a profile
    top: tuple[str, ...] = ()
    jobs: int | None = None  #: files analysed side by side; None for one per processor
    time_limit_seconds: float = 20.0
    memory_limit_mb: int = 2048
    threshold: Level = "warning"  #: findings of this level and above make the exit status 1
    include: tuple[Path, ...] = ()
    define: tuple[str, ...] = ()  #: NAME or NAME=VALUE
    directives: tuple[Path, ...] = ()
    ignore: tuple[str, ...] = ()  #: patterns of file names, from the given folder down
    given: Mapping[str, int] = field(default_factory=dict)
    levels: Mapping[str, Level | Word["off"]] = field(default_factory=dict)
    limits: Limits = Limits()
    place: Mapping[str, tuple[int, int]] = field(default_factory=dict)  #: argument -> first and last channel


def find_settings(source: Path) -> Path | None:
    """The nearest settings file beside a source (or in a folder given) or above it, as far up as its repository goes;
    up to the root of the file system when it is in none."""
    start = absolute(source)
    for folder in (start, *start.parents) if start.is_dir() else start.parents:
        if (folder / FILE_NAME).is_file():
            return folder / FILE_NAME
        if (folder / ".git").exists():
            return None
    return None


def read_settings(path: Path, *, trusted: bool = False, rules: Collection[str] | None = None) -> Settings:
    """The settings of a file. BadSettings names the file, the key and what was expected.

    Unless it is ``trusted`` (named by the user, not found beside a source), its paths may not lead out of its
    repository. Rule names are checked against ``rules`` where those are given.
    """
    try:
        table = tomllib.loads(read_text(path).text)
    except tomllib.TOMLDecodeError as error:
        raise BadSettings(f"{shown(path)}: not valid TOML: {error}") from None
    except RecursionError:
        raise BadSettings(f"{shown(path)}: nested too deeply") from None
    except UserError as error:
        raise BadSettings(str(error)) from None
    reader = _Reader(path, trusted)
    share = _number("a share from 0 to 1", lambda value: 0 <= value <= 1)
    limits = reader.table("limits", share, [each.name for each in fields(Limits)])
    known = {
        "board": reader.board,
        "top": _texts,
        "jobs": _count,
        "time_limit_seconds": _number("a number of seconds, above 0 and up to a day", lambda value: 0 < value <= 86400),
        "memory_limit_mb": _count,
        "threshold": _one_of(LEVELS),
        "include": reader.paths,
        "define": _definitions,
        "directives": reader.paths,
        "ignore": _texts,
        "given": reader.table("given", _integer),
        "levels": reader.table("levels", _one_of(LEVEL_WORDS), rules),
        "limits": lambda value: Limits(**limits(value)),
        "place": reader.table("place", _channels),
    }
    return Settings(**reader.values("", table, known))


def merge(
    settings: Settings,
    *,
    board: str | None = None,
    top: Sequence[str] = (),
    jobs: int | None = None,
    threshold: Level | None = None,
    include: Sequence[Path] = (),
    define: Sequence[str] = (),
    directives: Sequence[Path] = (),
    given: Mapping[str, int] | None = None,
    place: Mapping[str, tuple[int, int]] | None = None,
) -> Settings:
    """Settings with what the command line says: a single value replaces, folders come first, definitions last, and
    tables are joined name by name."""
    return replace(
        settings,
        board=board or settings.board,
        top=tuple(top) or settings.top,
        jobs=jobs or settings.jobs,
        threshold=threshold or settings.threshold,
        include=(*map(absolute, include), *settings.include),
        define=(*settings.define, *define),
        directives=tuple(map(absolute, directives)) or settings.directives,
        given={**settings.given, **(given or {})},
        place={**settings.place, **(place or {})},
    )


class _Expected(Exception):
    """Says what a value should have been."""


Read = Callable[[Any], Any]


class _Reader:
    def __init__(self, path: Path, trusted: bool) -> None:
        self.file = shown(path)
        self.folder = absolute(path).parent
        self.trusted = trusted

    def values(self, prefix: str, table: Mapping[str, Any], known: Mapping[str, Read]) -> dict[str, Any]:
        found = {}
        for key, value in table.items():
            if key not in known:
                close = get_close_matches(key, known, n=1, cutoff=0.5)
                hint = f"; did you mean {close[0]!r}?" if close else f"; known are {', '.join(sorted(known))}"
                raise BadSettings(f"{self.file}: unknown key {prefix + key!r}{hint}")
            try:
                found[key] = known[key](value)
            except _Expected as expected:
                raise BadSettings(f"{self.file}: {prefix + key!r} must be {expected}, not {_written(value)}") from None
        return found

    def table(self, name: str, read: Read, known: Collection[str] | None = None) -> Read:
        """Reads a table whose keys are all read alike; any key will do where none are ``known``."""

        def reader(value: Any) -> dict[str, Any]:
            if not isinstance(value, dict):
                raise _Expected(f"a table [{name}]")
            return self.values(f"{name}.", value, dict.fromkeys(value if known is None else known, read))

        return reader

    def board(self, value: Any) -> str:
        name = _text(value)
        return str(self._path(name)) if "/" in name or name.endswith(".toml") else name

    def paths(self, value: Any) -> tuple[Path, ...]:
        return tuple(map(self._path, _texts(value)))

    def _path(self, name: str) -> Path:
        path = absolute(self.folder / name)
        if not self.trusted and not is_within(path, boundary_of(self.folder), hidden=True):
            raise _Expected("within the repository of the settings file (or give that file with --settings)")
        return path


def _written(value: Any) -> str:
    text = repr(value)
    return text if len(text) <= 60 else f"{text[:57]}..."


def _text(value: Any) -> str:
    if not isinstance(value, str) or not value or "\0" in value:
        raise _Expected("a text")
    return value


def _texts(value: Any) -> tuple[str, ...]:
    try:
        return tuple(map(_text, value if isinstance(value, list) else [value]))
    except _Expected:
        raise _Expected("a text or a list of texts") from None


def _definitions(value: Any) -> tuple[str, ...]:
    definitions = _texts(value)
    if not all(re.match(r"[A-Za-z_]\w*(=|$)", each) for each in definitions):
        raise _Expected("NAME or NAME=VALUE, or a list of those")
    return definitions


def _integer(value: Any) -> int:
    if not isinstance(value, int) or isinstance(value, bool):
        raise _Expected("a whole number")
    return value


def _count(value: Any) -> int:
    if not isinstance(value, int) or isinstance(value, bool) or value < 1:
        raise _Expected("a whole number of at least 1")
    return value


def _number(expected: str, fits: Callable[[float], bool]) -> Read:
    def reader(value: Any) -> float:
        is_number = isinstance(value, int | float) and not isinstance(value, bool) and math.isfinite(value)
        if not is_number or not fits(value):
            raise _Expected(expected)
        return float(value)

    return reader


def _one_of(words: Sequence[str]) -> Read:
    def reader(value: Any) -> str:
        if value not in words:
            raise _Expected(f"{', '.join(words[:-1])} or {words[-1]}")
        return str(value)

    return reader


def _channels(value: Any) -> tuple[int, int]:
    ends = re.fullmatch(r"([0-9]{1,6}):([0-9]{1,6})", value) if isinstance(value, str) else None
    first, last = (int(ends[1]), int(ends[2])) if ends else (value, value)
    if not isinstance(first, int) or isinstance(first, bool) or not 0 <= first <= last:
        raise _Expected("a channel (3) or a range of channels ('0:3')")
    return first, last
