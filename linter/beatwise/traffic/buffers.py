"""What a port's transactions under way take on chip, and how many of them this board needs."""

from __future__ import annotations

from collections.abc import Iterable
from dataclasses import replace

from beatwise.memory.demand import Demand
from beatwise.memory.onchip import blocks
from beatwise.memory.price import price
from beatwise.model.access import Direction, Interface
from beatwise.model.board import Board
from beatwise.model.traffic import PortBuffer, Traffic
from beatwise.traffic.bursts import longest_burst, outstanding

MOST_OUTSTANDING = 256  #: more are never asked for
AS_GOOD = 0.98  #: of what the most outstanding get


def buffers(interface: Interface, board: Board, traffic: Iterable[Traffic]) -> tuple[PortBuffer, ...]:
    """The buffers of an interface, for each direction that its accesses in loops use."""
    found = []
    directions: tuple[Direction, ...] = ("read", "write")
    items = [item for item in traffic if item.access.interface == interface.name and item.access.loops]
    for direction in directions:
        own = [item for item in items if item.access.direction == direction and item.walk.pattern != "unresolved"]
        if own:
            found.append(_buffer(interface, board, direction, own))
    return tuple(found)


def _buffer(interface: Interface, board: Board, direction: Direction, own: list[Traffic]) -> PortBuffer:
    width = max(item.width_bits for item in own)
    longest = longest_burst(interface, board, direction)
    used = max(item.burst_beats for item in own)
    many = outstanding(interface, board, direction)
    ask = Demand(direction, width // 8, width // 8, used, many, run_bytes=None)
    enough = _enough(board, ask)
    return PortBuffer(
        direction=direction,
        outstanding=many,
        burst_beats=longest,
        used_beats=used,
        width_bits=width,
        blocks=blocks(many * longest, width),
        enough=enough,
        enough_blocks=blocks(enough * used, width),
        gbps=price(board, ask).gbps,
        enough_gbps=price(board, replace(ask, outstanding=enough)).gbps,
    )


def _enough(board: Board, ask: Demand) -> int:
    """The least power of two of outstanding transactions that is as good as ``MOST_OUTSTANDING`` (Little's law)."""
    most = price(board, replace(ask, outstanding=MOST_OUTSTANDING)).gbps
    number = 1
    while number < MOST_OUTSTANDING and price(board, replace(ask, outstanding=number)).gbps < AS_GOOD * most:
        number *= 2
    return number
