"""Memory profiles of boards: TOML files in which every fact stands beside its source."""

from __future__ import annotations

import math
from collections.abc import Callable, Mapping
from pathlib import Path
from typing import Any

from beatwise.errors import BadSettings
from beatwise.model.board import Board

_PROFILES = Path(__file__).with_name("boards")


def board_names() -> tuple[str, ...]:
    """The profiles that come with the program."""
    return tuple(sorted(path.stem for path in _PROFILES.glob("*.toml")))


def board(name_or_path: str | Path) -> Board:
    """The profile of that name, else the one in that file. Raises `BadSettings`.

    >>> board("hbm2-32ch").channels
    32
    """
    name, path = str(name_or_path), Path(name_or_path)
    if name in board_names():
        return _parsed(name, name, (_PROFILES / f"{name}.toml").read_text("utf-8"))
    if path.suffix != ".toml" and path.name == name:
        raise BadSettings(f"no board named {name!r}; known: {', '.join(board_names())}; or name a .toml file")
    if not path.is_file():
        raise BadSettings(f"{name}: no such file")
    try:
        return _parsed(path.stem, name, path.read_text("utf-8"))
    except OSError as error:
        raise BadSettings(f"{name}: {error.strerror or error}") from error
    except UnicodeDecodeError as error:
        raise BadSettings(f"{name}: not UTF-8 text") from error


def _parsed(name: str, file: str, text: str) -> Board:
    import tomllib

    try:
        table = tomllib.loads(text)
    except (tomllib.TOMLDecodeError, RecursionError) as error:
        raise BadSettings(f"{file}: not TOML: {error}") from error
    about = table.pop("about", "")
    if not isinstance(about, str):
        raise BadSettings(f"{file}: about: expected text, got {about!r}")
    for key in table:
        if key not in _FACTS:
            raise BadSettings(f"{file}: {key}: no such fact; known: {', '.join(_FACTS)}")
    facts = {key: _fact(file, key, table.get(key), test, expected) for key, (test, expected) in _FACTS.items()}
    values: dict[str, Any] = {key: value for key, (value, _) in facts.items()}
    sources = {key: source for key, (_, source) in facts.items()}
    for cap in ("read_cap_gbps", "write_cap_gbps"):
        if values[cap] > values["peak_gbps"]:
            raise BadSettings(f"{file}: {cap}: expected at most peak_gbps, {values['peak_gbps']}")
    if values["refresh_ns"] >= values["refresh_interval_ns"]:
        raise BadSettings(f"{file}: refresh_ns: expected less than refresh_interval_ns")
    return Board(name=name, about=about, sources=sources, **values)


def _fact(file: str, key: str, entry: object, test: Callable[[float], bool], expected: str) -> tuple[float, str]:
    if not isinstance(entry, Mapping) or entry.keys() != {"value", "source"}:
        missing = "missing; " if entry is None else ""
        raise BadSettings(f"{file}: {key}: {missing}expected a table with value ({expected}) and source")
    value, source = entry["value"], entry["source"]
    if isinstance(value, bool) or not isinstance(value, int | float) or not math.isfinite(value) or not test(value):
        raise BadSettings(f"{file}: {key}: expected {expected}, got {value!r}")
    if not isinstance(source, str) or not source.strip():
        raise BadSettings(f"{file}: {key}: expected a source in words, got {source!r}")
    return value, source


def _count(value: float) -> bool:
    return isinstance(value, int) and value >= 1


def _width(value: float) -> bool:
    return isinstance(value, int) and value in (8, 16, 32, 64, 128, 256, 512, 1024)


_COUNT = (_count, "a whole number of at least 1")
_AMOUNT = (lambda value: value > 0, "a number above 0")
_REST = (lambda value: value >= 0, "a number of at least 0")
_WIDTH = (_width, "a power of two from 8 to 1024")

_FACTS: dict[str, tuple[Callable[[float], bool], str]] = {
    "channels": _COUNT,
    "channel_bytes": _COUNT,
    "peak_gbps": _AMOUNT,
    "granule_bytes": _COUNT,
    "page_bytes": _COUNT,
    "refresh_ns": _REST,
    "refresh_interval_ns": _AMOUNT,
    "row_cycle_ns": _AMOUNT,
    "four_activates_ns": _AMOUNT,
    "read_cap_gbps": _AMOUNT,
    "write_cap_gbps": _AMOUNT,
    "read_latency_ns": _AMOUNT,
    "write_latency_ns": _AMOUNT,
    "read_beat_factor": _REST,
    "write_gap_beats": _REST,
    "request_cycles": _AMOUNT,
    "kernel_mhz": _AMOUNT,
    "port_bits": _WIDTH,
    "burst_beats": (lambda value: _count(value) and value <= 256, "a whole number from 1 to 256"),
    "outstanding": _COUNT,
    "widen_bits": _WIDTH,
}  #: what a profile must say, and what each fact may be
