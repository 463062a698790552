"""The limits by themselves; `test_model.py` holds what follows from them against measured tables."""

from __future__ import annotations

import pytest

from beatwise.memory.limits import channel, gaps, interval, order, port, requests, writes_in_flight


@pytest.mark.parametrize(
    ("outstanding", "share", "cycles"), [(18, 0.19, (80, 140)), (3, 0.17, (10, 20))], ids=["18", "3"]
)
def test_single_beats_follow_littles_law(outstanding: int, share: float, cycles: tuple[int, int]) -> None:
    """A developer's forum post, cloud card at 250 MHz: 18 outstanding, 80 to 140 cycles, 19 % of the peak; 3
    outstanding, 10 to 20 cycles, 17 %. A weak source: shows consistency only."""
    peak = port(64, 250)
    slow, fast = (
        requests(1, 64, 250, outstanding=outstanding, latency_ns=c * 4, beat_factor=0) for c in reversed(cycles)
    )
    assert slow < share * peak < fast


def test_a_channel_moves_whole_granules() -> None:
    """Counting: of a stride of 64 bytes with 4-byte elements, 12.5 % of each 32-byte granule is used."""
    assert channel(1.0, 4, 32) == 0.125
    assert channel(1.0, 48, 32) == 0.75
    assert channel(1.0, 4096, 32) == 1.0


def test_writes_tend_to_the_gaps_and_to_littles_law() -> None:
    """Reiser, Lavenberg, 1980 (from memory): both asymptotes of a closed network bound it."""
    for outstanding in (1, 2, 4, 8, 16, 64):
        got = writes_in_flight(16, 64, 300, outstanding=outstanding, latency_ns=140, gap_beats=4)
        waiting = requests(16, 64, 300, outstanding=outstanding, latency_ns=140 + 4 / 0.3, beat_factor=1.0)
        assert got <= min(waiting, gaps(16, 64, 300, gap_beats=4)) * (1 + 1e-9)
    assert writes_in_flight(16, 64, 300, outstanding=1, latency_ns=140, gap_beats=4) == pytest.approx(
        requests(16, 64, 300, outstanding=1, latency_ns=140 + 4 / 0.3, beat_factor=1.0)
    )


def test_more_channels_cost_more_turns() -> None:
    rates = [order(256, channels, 13.27, turn_ns=150) for channels in (1, 2, 4, 8, 32)]
    assert rates == sorted(rates, reverse=True)
    assert order(1e9, 4, 13.27, turn_ns=150) == pytest.approx(13.27, rel=1e-3)


def test_a_loop_that_issues_rarely() -> None:
    assert interval(64, 300, 1) == 19.2
    assert interval(64, 300, 8) == 2.4
