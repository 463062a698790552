"""How long one read takes on an idle channel, in cycles of the port's clock."""

from __future__ import annotations

from math import ceil
from typing import Literal

from beatwise.model.board import Board


def idle_read_cycles(board: Board, row: Literal["open", "closed", "other"], *, hit_cycles: int, mhz: float) -> int:
    """A read whose row is open takes ``hit_cycles``; a closed one tRCD more, one behind another row tRP as well.

    Each is rounded up to the clock of the port.

    >>> from beatwise.memory.boards import board
    >>> [idle_read_cycles(board("hbm2-32ch"), row, hit_cycles=48, mhz=450) for row in ("open", "closed", "other")]
    [48, 55, 62]
    """
    steps = {"open": (), "closed": (board.activate_ns,), "other": (board.activate_ns, board.precharge_ns)}
    return hit_cycles + sum(ceil(step * mhz / 1000) for step in steps[row])
