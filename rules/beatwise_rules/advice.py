"""The sizes that advice is given in, for this board and this port."""

from __future__ import annotations

from beatwise.model.finding import Facts
from beatwise.model.traffic import Traffic
from beatwise_rules.evidence import port_of
from beatwise_rules.wording import count, size

SHORT_BEATS = 16  #: a run of fewer beats is short: the usual default for the longest burst
BOUNDARY_BYTES = 4096  #: no burst crosses a multiple of this (AXI4: ARM IHI 0022, section A3.4.1)
TILE_BYTES = 16 * 1024  #: of on-chip memory that a square tile is sized for (our own choice)
TABLE_BYTES = 64 * 1024  #: a table up to this size is worth a copy on chip (our own choice)


def burst_bytes(facts: Facts, traffic: Traffic) -> int:
    """The longest burst this port makes at the board's full width."""
    port = port_of(facts, traffic)
    asked = None if port is None else port.read_burst if traffic.access.direction == "read" else port.write_burst
    return min((asked or facts.board.burst_beats) * facts.board.port_bits // 8, BOUNDARY_BYTES)


def burst_elements(facts: Facts, traffic: Traffic) -> int:
    """How many elements of the access fill such a burst."""
    return max(1, burst_bytes(facts, traffic) // traffic.access.element_bytes)


def elements_a_beat(facts: Facts, traffic: Traffic) -> int:
    """How many elements fit side by side in one beat of the widest port that pays."""
    return max(1, facts.board.port_bits // 8 // traffic.access.element_bytes)


def tile_side(element_bytes: int) -> int:
    """The side of the largest square tile, a power of two, that fits in ``TILE_BYTES``.

    >>> tile_side(4), tile_side(8), tile_side(64)
    (64, 32, 16)
    """
    side = 1
    while (2 * side) ** 2 * element_bytes <= TILE_BYTES:
        side *= 2
    return side


def a_buffer(elements: int, element_bytes: int) -> str:
    """A buffer, by its entries and its size.

    >>> a_buffer(256, 4)
    '256 elements (1 KiB)'
    """
    return f"{count(elements, 'element')} ({size(elements * element_bytes)})"


def fits_on_chip(nbytes: int | None) -> bool:
    """Whether a copy of so many bytes is small enough to be worth it."""
    return nbytes is not None and nbytes <= TABLE_BYTES
