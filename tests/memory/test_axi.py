"""AXI arithmetic against the protocol's equations and worked examples (AMBA AXI and ACE Protocol, IHI 0022, A3.4.1)."""

from __future__ import annotations

import pytest
from hypothesis import given
from hypothesis import strategies as st

from beatwise.memory.axi import (
    BEAT_BYTES,
    BOUNDARY_BYTES,
    LONGEST_BEATS,
    aligned,
    beat_addresses,
    lanes,
    longest,
    split,
    wrap_boundary,
)

BEATS = st.sampled_from(BEAT_BYTES)


def test_an_incrementing_burst_from_an_unaligned_address() -> None:
    addresses = beat_addresses(0x1007, 4, 4)
    assert addresses == (0x1007, 0x1008, 0x100C, 0x1010)
    assert [list(lanes(address, 4, 8)) for address in addresses] == [[7], [0, 1, 2, 3], [4, 5, 6, 7], [0, 1, 2, 3]]


def test_narrow_beats_walk_over_the_lanes_of_the_bus() -> None:
    assert [list(lanes(address, 1, 4)) for address in beat_addresses(0, 1, 5)] == [[0], [1], [2], [3], [0]]


def test_a_wrapping_burst_returns_to_its_lowest_address() -> None:
    assert wrap_boundary(0x38, 4, 4) == 0x30
    assert beat_addresses(0x38, 4, 4, "wrap") == (0x38, 0x3C, 0x30, 0x34)


def test_a_fixed_burst_stays_where_it_is() -> None:
    assert beat_addresses(0x40, 4, 3, "fixed") == (0x40, 0x40, 0x40)


@pytest.mark.parametrize("beats", [0, 1, 3, 5, 17])
def test_a_wrapping_burst_has_2_4_8_or_16_beats(beats: int) -> None:
    with pytest.raises(ValueError, match="wrapping"):
        beat_addresses(0, 4, beats, "wrap")


def test_a_wrapping_burst_starts_at_a_beat() -> None:
    with pytest.raises(ValueError, match="wrapping"):
        beat_addresses(0x39, 4, 4, "wrap")


@pytest.mark.parametrize(("kind", "most"), [("increment", 256), ("fixed", 16)])
def test_no_burst_is_longer_than_the_protocol_allows(kind: str, most: int) -> None:
    assert len(beat_addresses(0, 1, most, kind)) == most  # type: ignore[arg-type]
    with pytest.raises(ValueError, match="cannot have"):
        beat_addresses(0, 1, most + 1, kind)  # type: ignore[arg-type]


def test_no_burst_crosses_4096_bytes() -> None:
    assert beat_addresses(0xFC0, 64, 1) == (0xFC0,)
    with pytest.raises(ValueError, match="cross"):
        beat_addresses(0xFC0, 64, 2)


@pytest.mark.parametrize("beat", [0, 3, 256])
def test_a_beat_carries_a_power_of_two_up_to_128_bytes(beat: int) -> None:
    with pytest.raises(ValueError, match="a beat carries"):
        aligned(0, beat)


def test_a_beat_is_no_wider_than_its_bus() -> None:
    with pytest.raises(ValueError, match="bus"):
        lanes(0, 8, 4)


def test_the_longest_burst_by_width() -> None:
    """AXI4: 256 beats, and 4096 bytes (IHI 0022; the widths to 512 bits also in HLS user guide UG1399, burst mode)."""
    assert {bits: longest(bits // 8) for bits in (32, 64, 128, 256, 512, 1024)} == {
        32: 256, 64: 256, 128: 256, 256: 128, 512: 64, 1024: 32,
    }  # fmt: skip


def test_a_loop_of_100_with_a_limit_of_64() -> None:
    """HLS user guide UG1399, "Specifying Burst Mode"."""
    assert split(0, 400, 4, 64) == (64, 36)


def test_runs_are_cut_at_4096_bytes_and_at_the_limit() -> None:
    """From the 4096-byte rule."""
    assert split(0x40, 4096, 64, 64) == (63, 1)
    assert split(0xFC0, 1024, 64, 16) == (1, 15)
    assert split(0, 1 << 20, 64, 16) == (16,) * 1024
    assert split(0, 1 << 20, 16, 256) == (256,) * 256
    assert split(0, 0, 64, 16) == ()


@given(start=st.integers(0, 1 << 20), size=st.integers(0, 20_000), beat=BEATS, limit=st.integers(1, 2 * LONGEST_BEATS))
def test_the_bursts_of_a_run_visit_each_of_its_bytes_once(start: int, size: int, beat: int, limit: int) -> None:
    visited: list[int] = []
    address = start
    for beats in split(start, size, beat, limit):
        assert 1 <= beats <= min(limit, longest(beat))
        addresses = beat_addresses(address, beat, beats)
        assert {each // BOUNDARY_BYTES for each in addresses} == {address // BOUNDARY_BYTES}
        for each in addresses:
            visited.extend(range(each, aligned(each, beat) + beat))
        address = aligned(addresses[-1], beat) + beat
    assert visited[:size] == list(range(start, start + size))
    assert len(visited) - size < beat


@given(start=st.integers(0, 1 << 16), beat=BEATS, beats=st.sampled_from((2, 4, 8, 16)))
def test_a_wrapping_burst_visits_its_block_once(start: int, beat: int, beats: int) -> None:
    start = aligned(start, beat)
    low = wrap_boundary(start, beat, beats)
    assert sorted(beat_addresses(start, beat, beats, "wrap")) == list(range(low, low + beat * beats, beat))


@given(start=st.integers(0, 1 << 16), beat=BEATS, beats=st.integers(2, 32))
def test_every_beat_after_the_first_is_aligned_and_follows(start: int, beat: int, beats: int) -> None:
    if aligned(start, beat) % BOUNDARY_BYTES + beat * beats > BOUNDARY_BYTES:
        return
    addresses = beat_addresses(start, beat, beats)
    assert addresses[0] == start
    assert [each - aligned(start, beat) for each in addresses[1:]] == [beat * n for n in range(1, beats)]


@given(address=st.integers(0, 1 << 16), beat=BEATS, bus=BEATS)
def test_lanes_lie_within_the_bus(address: int, beat: int, bus: int) -> None:
    if beat <= bus:
        used = lanes(address, beat, bus)
        assert 0 <= used.start < used.stop <= bus
        assert len(used) <= beat
        assert used.start == address % bus
