"""Arithmetic of AXI bursts: addresses, byte lanes, and how a run is cut into bursts. Addresses and sizes in bytes.

Source of the equations and limits: AMBA AXI and ACE Protocol Specification, ARM IHI 0022, section A3.4.1.
"""

from __future__ import annotations

from typing import Literal

BOUNDARY_BYTES = 4096  #: no burst crosses an address that is a multiple of this
LONGEST_BEATS = 256  #: of an incrementing burst (AXI4)
LONGEST_BEATS_AXI3 = 16  #: of any burst in AXI3, and of a fixed burst in AXI4
WRAP_BEATS = (2, 4, 8, 16)  #: lengths that a wrapping burst may have
BEAT_BYTES = (1, 2, 4, 8, 16, 32, 64, 128)  #: what a beat may carry


def aligned(address: int, beat_bytes: int) -> int:
    """The address of the beat that holds ``address``.

    >>> hex(aligned(0x1007, 4))
    '0x1004'
    """
    _beat(beat_bytes)
    return address // beat_bytes * beat_bytes


def wrap_boundary(start: int, beat_bytes: int, beats: int) -> int:
    """The lowest address of a wrapping burst.

    >>> hex(wrap_boundary(0x38, 4, 4))
    '0x30'
    """
    _beat(beat_bytes)
    if beats not in WRAP_BEATS or start % beat_bytes:
        raise ValueError(f"a wrapping burst has {WRAP_BEATS} beats and starts at a beat, not {beats} at {start:#x}")
    return start // (beat_bytes * beats) * (beat_bytes * beats)


def beat_addresses(
    start: int, beat_bytes: int, beats: int, kind: Literal["increment", "wrap", "fixed"] = "increment"
) -> tuple[int, ...]:
    """The address of every beat of one burst.

    >>> [hex(address) for address in beat_addresses(0x1007, 4, 4)]
    ['0x1007', '0x1008', '0x100c', '0x1010']
    """
    _beat(beat_bytes)
    if kind == "wrap":
        low, whole = wrap_boundary(start, beat_bytes, beats), beat_bytes * beats
        return tuple(low + (start - low + number * beat_bytes) % whole for number in range(beats))
    if not 1 <= beats <= (LONGEST_BEATS if kind == "increment" else LONGEST_BEATS_AXI3):
        raise ValueError(f"a {kind} burst cannot have {beats} beats")
    if kind == "fixed":
        return (start,) * beats
    first = aligned(start, beat_bytes)
    addresses = (start, *(first + number * beat_bytes for number in range(1, beats)))
    if addresses[-1] // BOUNDARY_BYTES != start // BOUNDARY_BYTES:
        raise ValueError(f"{beats} beats of {beat_bytes} bytes at {start:#x} cross a multiple of {BOUNDARY_BYTES}")
    return addresses


def lanes(address: int, beat_bytes: int, bus_bytes: int) -> range:
    """The byte lanes of a bus of ``bus_bytes`` that the beat at ``address`` uses.

    >>> lanes(0x1007, 4, 8), lanes(0x100C, 4, 8)
    (range(7, 8), range(4, 8))
    """
    _beat(beat_bytes)
    _beat(bus_bytes)
    if beat_bytes > bus_bytes:
        raise ValueError(f"a beat of {beat_bytes} bytes on a bus of {bus_bytes}")
    base = address // bus_bytes * bus_bytes
    return range(address - base, aligned(address, beat_bytes) + beat_bytes - base)


def longest(beat_bytes: int) -> int:
    """Beats of the longest incrementing burst (AXI4), by the width of a beat.

    >>> [longest(bits // 8) for bits in (32, 64, 128, 256, 512, 1024)]
    [256, 256, 256, 128, 64, 32]
    """
    _beat(beat_bytes)
    return min(LONGEST_BEATS, BOUNDARY_BYTES // beat_bytes)


def split(start: int, size: int, beat_bytes: int, max_beats: int) -> tuple[int, ...]:
    """Beats of each burst that carries ``size`` bytes from ``start``, in order.

    >>> split(0x40, 4096, 64, 64), split(0xFC0, 1024, 64, 16), split(0, 400, 4, 64)
    ((63, 1), (1, 15), (64, 36))
    """
    most = min(max_beats, longest(beat_bytes))
    if most < 1 or size < 0:
        raise ValueError(f"{size} bytes in bursts of at most {max_beats} beats")
    bursts = []
    address, end = aligned(start, beat_bytes), start + size
    while size and address < end:
        stop = min(end, (address // BOUNDARY_BYTES + 1) * BOUNDARY_BYTES)
        beats = min(most, -(-(stop - address) // beat_bytes))
        bursts.append(beats)
        address += beats * beat_bytes
    return tuple(bursts)


def _beat(beat_bytes: int) -> None:
    if beat_bytes not in BEAT_BYTES:
        raise ValueError(f"a beat carries {BEAT_BYTES} bytes, not {beat_bytes}")
