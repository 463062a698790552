"""Memory profiles of boards: TOML files in which every fact stands beside its source."""

from __future__ import annotations

import math
from collections.abc import Callable, Mapping
from pathlib import Path
from typing import Any

from beatwise.errors import BadSettings
from beatwise.memory.limits import refreshed
from beatwise.memory.rows import address_fields
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
        if key not in FACTS:
            raise BadSettings(f"{file}: {key}: no such fact; known: {', '.join(FACTS)}")
    values: dict[str, Any] = {}
    sources: dict[str, str] = {}
    for key, (test, expected) in FACTS.items():
        if key not in table and key in DEFAULTS:
            values[key], sources[key] = DEFAULTS[key]
        else:
            values[key], sources[key] = _fact(file, key, table.get(key), test, expected)
    if values["refresh_ns"] >= values["refresh_interval_ns"]:
        raise BadSettings(f"{file}: refresh_ns: expected less than refresh_interval_ns")
    _caps(file, values, sources)
    _together(file, values)
    profile = Board(name=name, about=about, sources=sources, **values)
    try:
        address_fields(profile)
    except ValueError as error:
        raise BadSettings(f"{file}: address_map: {error}") from error
    return profile


def _caps(file: str, values: dict[str, Any], sources: dict[str, str]) -> None:
    """A cap that was not measured is the peak less refresh."""
    for cap in ("read_cap_gbps", "write_cap_gbps"):
        if values[cap] is None:
            values[cap] = refreshed(values["peak_gbps"], values["refresh_ns"], values["refresh_interval_ns"])
            sources[cap] = "peak_gbps less refresh; not measured"
        if values[cap] > values["peak_gbps"]:
            raise BadSettings(f"{file}: {cap}: expected at most peak_gbps, {values['peak_gbps']}")


def _together(file: str, values: dict[str, Any]) -> None:
    """What facts must be to each other."""
    granule, page, ports, channels = (
        values[key] for key in ("granule_bytes", "page_bytes", "switch_ports", "channels")
    )
    if page % granule:
        raise BadSettings(f"{file}: page_bytes: expected a multiple of granule_bytes, {granule}; got {page}")
    if values["channel_bytes"] % page:
        raise BadSettings(f"{file}: channel_bytes: expected a multiple of page_bytes, {page}")
    if ports and channels % ports:
        raise BadSettings(f"{file}: switch_ports: expected a divisor of channels, {channels}; got {ports}")
    if values["lateral_links"] > ports:
        raise BadSettings(f"{file}: lateral_links: expected at most switch_ports, {ports}")
    if 0 < ports < channels and not values["lateral_links"]:
        raise BadSettings(f"{file}: lateral_links: expected at least 1 between switches of {ports} ports")


def _fact(file: str, key: str, entry: object, test: Callable[[Any], bool], expected: str) -> tuple[Any, str]:
    if not isinstance(entry, Mapping) or entry.keys() != {"value", "source"}:
        missing = "missing; " if entry is None else ""
        raise BadSettings(f"{file}: {key}: {missing}expected a table with value ({expected}) and source")
    value, source = entry["value"], entry["source"]
    number = isinstance(value, int | float) and not isinstance(value, bool) and math.isfinite(value)
    if not (isinstance(value, str) if test is _words else number) or not test(value):
        raise BadSettings(f"{file}: {key}: expected {expected}, got {value!r}")
    if not isinstance(source, str) or not source.strip():
        raise BadSettings(f"{file}: {key}: expected a source in words, got {source!r}")
    return value, source


def _count(value: float) -> bool:
    return isinstance(value, int) and value >= 1


def _width(value: float) -> bool:
    return isinstance(value, int) and value in (8, 16, 32, 64, 128, 256, 512, 1024)


def _words(value: str) -> bool:
    return bool(value.strip())


_COUNT = (_count, "a whole number of at least 1")
_AMOUNT = (lambda value: value > 0, "a number above 0")
_REST = (lambda value: value >= 0, "a number of at least 0")
_WIDTH = (_width, "a power of two from 8 to 1024")

_WHOLE = (lambda value: isinstance(value, int) and value >= 0, "a whole number of at least 0")

FACTS: dict[str, tuple[Callable[[Any], bool], str]] = {
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
    "request_cycles": _REST,
    "kernel_mhz": _AMOUNT,
    "port_bits": _WIDTH,
    "burst_beats": (lambda value: _count(value) and value <= 256, "a whole number from 1 to 256"),
    "outstanding": _COUNT,
    "widen_bits": _WIDTH,
    "ranks": _COUNT,
    "bank_groups": _COUNT,
    "banks_per_group": _COUNT,
    "address_map": (_words, "fields from high to low, as in 'row bank:2 group:2 column:7'"),
    "same_group_ns": _REST,
    "activate_gap_ns": _REST,
    "activate_gap_same_group_ns": _REST,
    "activate_ns": _REST,
    "precharge_ns": _REST,
    "reorder_requests": _COUNT,
    "request_bytes": _WHOLE,
    "batch_granules": _COUNT,
    "turnaround_ns": _REST,
    "order_turn_ns": _REST,
    "switch_ports": _WHOLE,
    "lateral_links": _WHOLE,
}  #: what a profile may say, and what each fact may be

DEFAULTS: dict[str, tuple[Any, str]] = {
    "read_cap_gbps": (None, ""),
    "write_cap_gbps": (None, ""),
    "read_beat_factor": (1.2, "not given; as ddr4-2400-1ch"),
    "write_gap_beats": (4, "not given; as ddr4-2400-1ch"),
    "request_cycles": (3.7, "not given; as hbm2-32ch"),
    "burst_beats": (16, "not given; default of the HLS flow, user guide UG1399, 2020.2"),
    "outstanding": (16, "not given; default of the HLS flow, from memory"),
    "widen_bits": (512, "not given; default of the HLS flow, from memory"),
    "ranks": (1, "not given; one"),
    "address_map": ("", "not given; row, rank, group, bank, column from high to low"),
    "same_group_ns": (0.0, "not given; no slower than the bus"),
    "activate_gap_ns": (0.0, "not given; four_activates_ns alone counts"),
    "activate_gap_same_group_ns": (0.0, "not given; four_activates_ns alone counts"),
    "activate_ns": (0.0, "not given; only idle latencies need it"),
    "precharge_ns": (0.0, "not given; only idle latencies need it"),
    "reorder_requests": (40, "not given; common practice, no source"),
    "request_bytes": (0, "not given; a granule"),
    "batch_granules": (40, "not given; common practice, no source"),
    "turnaround_ns": (14.0, "not given; JESD79-4 timings, from memory"),
    "order_turn_ns": (150.0, "not given; as hbm2-32ch"),
    "switch_ports": (0, "not given; no switch"),
    "lateral_links": (0, "not given; no switch"),
}  #: what stands for a fact that a profile leaves out, and what is said as its source
