"""What an access asks of its port and its channel, as `memory.price` wants to know it."""

from __future__ import annotations

from collections.abc import Sequence
from functools import lru_cache
from math import gcd

from beatwise.memory import axi
from beatwise.memory.demand import Demand
from beatwise.model.access import Access, Direction, Interface
from beatwise.model.board import Board
from beatwise.model.traffic import Block, Walk
from beatwise.traffic.bursts import element_beat_bytes, outstanding, padded_bytes

ENDLESS_BYTES = 1 << 17  #: a longer run is as good as one without end (Lu et al., FPGA 2021: saturation at 128 KB)

MOST_SPLIT_BYTES = 1 << 14  #: a longer run is cut like this much of it
STARTS_TRIED = 64  #: of all places in 4 KB where a run may start


def demand(
    access: Access, walk: Walk, blocked: Sequence[Block], beat: int, beats: int, interface: Interface, board: Board
) -> Demand:
    """The demand of an access that has port and channel to itself. Every byte of its beats counts here."""
    run, stride = _places(access, walk, board)
    return Demand(
        access.direction,
        beat_bytes=beat,
        used_bytes=beat,
        burst_beats=_mean_burst(walk, access, beat, beats, run),
        outstanding=outstanding(interface, board, access.direction),
        run_bytes=run,
        stride_bytes=stride,
        interval_cycles=interval_cycles(access, walk, blocked, board) if access.loops else 1,
    )


def _mean_burst(walk: Walk, access: Access, beat: int, beats: int, run: float | None) -> float:
    """Beats of the mean transaction: runs that start off a multiple of their bursts are cut at each 4 KB boundary."""
    if beats == 1 or run is None or walk.pattern != "sequential":
        return beats
    return mean_burst(max(beat, min(int(run), MOST_SPLIT_BYTES)), walk.start_multiple, beat, beats)


@lru_cache(maxsize=512)
def mean_burst(run_bytes: int, start_multiple: int, beat: int, most_beats: int) -> float:
    """Beats of the mean burst of runs that start anywhere at a multiple of ``start_multiple``.

    >>> mean_burst(4096, 4096, 64, 16), mean_burst(4096, 64, 64, 64)
    (16.0, 32.25196850393701)
    """
    step = max(1, gcd(start_multiple, axi.BOUNDARY_BYTES))
    apart = step * (axi.BOUNDARY_BYTES // STARTS_TRIED // step | 1)  # odd, so that the places tried are of all kinds
    starts = (number * apart % axi.BOUNDARY_BYTES for number in range(min(STARTS_TRIED, axi.BOUNDARY_BYTES // step)))
    runs = [axi.split(start, run_bytes, beat, most_beats) for start in starts]
    return sum(map(sum, runs)) / sum(map(len, runs))


def best(direction: Direction, beat: int, interface: Interface, board: Board) -> Demand:
    """The demand of the same port after all advice: the longest bursts of the widest beats, enough under way."""
    widest = max(beat, board.port_bits // 8)
    return Demand(
        direction,
        beat_bytes=widest,
        used_bytes=widest,
        burst_beats=axi.longest(widest),
        outstanding=max(outstanding(interface, board, direction), board.outstanding),
        run_bytes=None,
    )


def carried_bytes(access: Access, beat: int) -> int:
    """Bytes that the beats of one element carry, used or not."""
    wide = beat > element_beat_bytes(access.element_bytes)
    return access.element_bytes if wide else padded_bytes(access.element_bytes)


def interval_cycles(access: Access, walk: Walk, blocked: Sequence[Block], board: Board) -> float:
    """Cycles between two beats as the loop issues them; 1 where nothing is known to hold it back.

    A load that may need what the iteration before has stored waits for that store: a read's and a write's latency;
    unless a directive lets it off that.
    """
    asked = max(1, access.loops[-1].interval or 1)
    may_need = "load-and-store" in blocked and walk.pattern in ("repeated", "indirect")
    if may_need and not any(loop.independent for loop in access.loops):
        waiting = (board.read_latency_ns + board.write_latency_ns) * board.kernel_mhz / 1000
        return max(asked, waiting)
    return asked


def _places(access: Access, walk: Walk, board: Board) -> tuple[float | None, int | None]:
    """The run in bytes, and the constant step from run to run; None for a run that has no end as the memory sees it."""
    match walk.pattern:
        case "strided":
            stride = abs(walk.stride_bytes) if walk.stride_bytes else None
            return access.element_bytes * max(1.0, walk.run_elements or 1.0), stride
        case "indirect" | "irregular":
            if access.array_bytes is not None and access.array_bytes <= board.page_bytes:
                return None, None  # it stays in one row
            return access.element_bytes * max(1.0, walk.run_elements or 1.0), None
        case "sequential" if walk.basis != "data" and walk.run_elements is not None:
            run = access.element_bytes * walk.run_elements
            endless = run >= ENDLESS_BYTES or (walk.executions is not None and walk.run_elements >= walk.executions)
            return (None, None) if endless else (run, None)
        case _:
            return None, None
