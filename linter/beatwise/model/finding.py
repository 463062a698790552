"""One thing to tell the user, with its evidence."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass
from typing import Literal

from beatwise.model.access import Trace
from beatwise.model.board import Board
from beatwise.model.place import Place
from beatwise.model.traffic import KernelTime, PortTraffic, Traffic

Level = Literal["error", "warning", "note"]
LEVELS: tuple[Level, ...] = ("error", "warning", "note")  #: the gravest first


@dataclass(frozen=True, slots=True)
class Facts:
    """All that a rule may know about one kernel."""

    trace: Trace
    board: Board
    traffic: tuple[Traffic, ...]
    ports: tuple[PortTraffic, ...]
    given: Mapping[str, int]
    time: KernelTime | None = None


@dataclass(frozen=True, slots=True)
class Finding:
    """What a rule has found. ``message`` is one sentence with the user's own names; ``because`` are lines that a reader
    can check by hand; ``instead`` says what to change; ``then`` names the rules that would still hold after that."""

    rule: str
    level: Level
    kernel: str
    place: Place
    argument: str | None
    interface: str | None
    message: str
    because: tuple[str, ...]
    instead: str
    then: tuple[str, ...] = ()
    now_gbps: float | None = None
    could_gbps: float | None = None
    loss_gbps: float | None = None
    seconds_saved: float | None = None
    edit: bool = False
    accepted: str | None = None
