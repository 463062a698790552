"""How wide a port is for an access, and how long its bursts are."""

from __future__ import annotations

from collections.abc import Sequence

from beatwise.memory import axi
from beatwise.model.access import Access, Direction, Interface
from beatwise.model.board import Board
from beatwise.model.traffic import Block, Walk


def element_beat_bytes(element_bytes: int) -> int:
    """Bytes of a beat that carries one element: the next power of two, at most 128 (AXI: IHI 0022, table A3-2).

    >>> [element_beat_bytes(size) for size in (1, 4, 12, 64, 100, 256)]
    [1, 4, 16, 64, 128, 128]
    """
    return min(128, 1 << max(0, element_bytes - 1).bit_length())


def beat_bytes(access: Access, walk: Walk, interface: Interface, board: Board, blocked: Sequence[Block]) -> int:
    """Bytes of a beat as the access uses the port: its element, or wider where that is done automatically.

    A port is widened for an access only where its runs ascend, nothing blocks them, and each is known to start at and
    to last a multiple of the wide beat; to 512 bits at most. Explicit burst requests keep the width of their type.
    """
    beat = element_beat_bytes(access.element_bytes)
    if walk.pattern != "sequential" or blocked or access.manual:
        return beat
    most = interface.widen_bits if interface.widen_bits is not None else board.widen_bits
    for wide in (64, 32, 16, 8, 4, 2):
        if beat < wide <= most // 8 and walk.run_multiple % wide == 0 and walk.start_multiple % wide == 0:
            return wide
    return beat


def burst_beats(
    access: Access, walk: Walk, interface: Interface, board: Board, blocked: Sequence[Block], beat: int
) -> int:
    """Beats of the bursts that the run becomes, ``beat`` bytes each: 1 where it is blocked or its run is not known."""
    if blocked or walk.run_elements is None:
        return 1
    element = (
        access.element_bytes if beat > element_beat_bytes(access.element_bytes) else padded_bytes(access.element_bytes)
    )
    run = int(walk.run_elements * element / beat)
    return max(1, min(run, longest_burst(interface, board, access.direction), axi.longest(beat)))


def padded_bytes(element_bytes: int) -> int:
    """Bytes that the beats of one element could carry."""
    beat = element_beat_bytes(element_bytes)
    return -(-element_bytes // beat) * beat


def longest_burst(interface: Interface, board: Board, direction: Direction) -> int:
    """The port's own limit on bursts, in beats."""
    own = interface.read_burst if direction == "read" else interface.write_burst
    return own if own is not None else board.burst_beats


def outstanding(interface: Interface, board: Board, direction: Direction) -> int:
    """Transactions that the port may have under way."""
    own = interface.read_outstanding if direction == "read" else interface.write_outstanding
    return own if own is not None else board.outstanding
