"""A pattern described in a few numbers, as a demand; and the series of one of these numbers. For what-if questions."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass, replace
from math import ceil
from typing import Any, Literal

from beatwise.errors import BadSettings
from beatwise.memory import axi
from beatwise.memory.demand import Demand
from beatwise.model.board import Board

SWEPT = ("run", "stride", "width", "burst", "outstanding", "channels", "ports", "clock")


@dataclass(frozen=True, slots=True)
class Pattern:
    """What a user says of a port's traffic; None where they leave it to the board or to the pattern."""

    direction: Literal["read", "write", "mixed"] = "read"
    run: int | None = None  #: bytes
    stride: int | None = None  #: bytes from run to run
    random: bool = False  #: runs at random places; so are runs without a stride
    width: int | None = None  #: bits of the port
    burst: int | None = None  #: longest transaction, in beats
    outstanding: int | None = None
    channels: int = 1
    ports: int = 1
    clock: float | None = None  #: MHz


def demand(board: Board, pattern: Pattern) -> Demand:
    """The demand of a pattern. Raises `BadSettings`.

    Without ``run`` the traffic is sequential; one granule (or one beat, where that is less) at each step of a
    ``stride`` or random place; one transaction at a time where a port reaches several channels.

    >>> from beatwise.memory.boards import board
    >>> demand(board("hbm2-32ch"), Pattern(run=96)).used_bytes       # of each of two beats of 64 bytes
    48.0
    """
    width = pattern.width or board.port_bits
    if width % 8 or width // 8 not in axi.BEAT_BYTES:
        raise BadSettings(f"width: expected a power of two from 8 to 1024 bits, got {width}")
    if pattern.channels > board.channels:
        raise BadSettings(f"channels: the board has {board.channels}, got {pattern.channels}")
    if pattern.random and pattern.stride is not None:
        raise BadSettings("random: places that a stride gives are not random")
    beat = width // 8
    longest = min(pattern.burst or board.burst_beats, axi.longest(beat))
    run = pattern.run
    if run is None and (pattern.stride is not None or pattern.random):
        run = min(beat, board.granule_bytes)
    elif run is None and pattern.channels > 1:
        run = longest * beat
    beats = longest if run is None else ceil(run / beat)
    return Demand(
        pattern.direction,
        beat_bytes=beat,
        used_bytes=beat if run is None else run / beats,
        burst_beats=beats / ceil(beats / longest),
        outstanding=pattern.outstanding or board.outstanding,
        run_bytes=run,
        stride_bytes=pattern.stride,
        channels=pattern.channels,
        ports=pattern.ports,
        clock_mhz=pattern.clock,
    )


def words(board: Board, pattern: Pattern, swept: str | None = None) -> str:
    """The pattern as a sentence's worth of words, with what the board decided; less the number that is swept.

    >>> from beatwise.memory.boards import board
    >>> words(board("hbm2-32ch"), Pattern(run=128, outstanding=64))
    'read, runs of 128 bytes at random places, 512 bits at 300 MHz, 2 beats a transaction, 64 outstanding'
    """
    ask = demand(board, pattern)
    run = "sequential"
    if ask.run_bytes is not None:
        place = "at random places" if ask.stride_bytes is None else f"every {ask.stride_bytes} bytes"
        run = f"runs of {ask.run_bytes:g} bytes {place}"
    parts = {
        "direction": ask.direction,
        "run": run,
        "width": f"{ask.beat_bytes * 8} bits at {ask.clock_mhz or board.kernel_mhz:g} MHz",
        "burst": f"{ask.burst_beats:.3g} beat{'' if ask.burst_beats == 1 else 's'} a transaction",
        "outstanding": f"{ask.outstanding} outstanding",
        "channels": f"over {ask.channels} channels" if ask.channels > 1 else "",
        "ports": f"{ask.ports} ports on the channel" if ask.ports > 1 else "",
    }
    gone = {"run": ("run", "burst"), "stride": ("run",), "clock": ("width",)}.get(swept or "", (swept,))
    return ", ".join(part for name, part in parts.items() if part and name not in gone)


def numbered(pattern: Pattern, name: str, value: int) -> Pattern:
    """The pattern with another value of one of the numbers of `SWEPT`."""
    change: dict[str, Any] = {name: value}
    return replace(pattern, **change)


def sweep(pattern: Pattern, name: str, low: int, high: int) -> Iterator[tuple[int, Pattern]]:
    """The pattern with one of its numbers doubled from ``low`` to ``high``, which ends the series."""
    value = low
    while value < high:
        yield value, numbered(pattern, name, value)
        value *= 2
    yield high, numbered(pattern, name, high)


def sweep_range(text: str) -> tuple[str, int, int]:
    """``run=32:65536`` as name, first and last value. Raises `BadSettings`."""
    name, equals, limits = text.partition("=")
    low, colon, high = limits.partition(":")
    if name not in SWEPT or not (equals and colon and low.isdecimal() and high.isdecimal()):
        raise BadSettings(
            f"sweep: expected NAME=FIRST:LAST, as in run=32:65536, NAME one of {', '.join(SWEPT)}; got {text!r}"
        )
    first, last = int(low[:19]), int(high[:19])
    if not 1 <= first <= last:
        raise BadSettings(f"sweep: expected 1 <= FIRST <= LAST, got {text!r}")
    return name, first, last
