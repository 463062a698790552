"""What ports keep on chip: blocks of 36 Kb, and how many transactions a board needs."""

from __future__ import annotations

import pytest

from beatwise.memory.onchip import blocks
from beatwise.model.board import Board
from beatwise.model.traffic import PortBuffer
from beatwise.traffic import measure
from beatwise.traffic.demands import mean_burst
from traffic.nests import DDR, HBM, at, loop, read, trace, write

SCAN = loop("i", 4096)


def buffer(on: Board = HBM, **options: int) -> PortBuffer:
    whole = trace(read("in", at(SCAN) * 64, SCAN, size=64), ports={"in": options})
    ((found,),) = (port.buffers for port in measure(whole, on, {}).ports)
    return found


def test_a_buffer_holds_all_beats_under_way() -> None:
    found = buffer(read_outstanding=32, read_burst=32)
    assert (found.outstanding, found.burst_beats, found.used_beats, found.width_bits) == (32, 32, 32, 512)
    assert found.blocks == blocks(1024, 512) > blocks(512, 512)


@pytest.mark.parametrize("on", [HBM, DDR], ids=lambda on: str(on.name))
def test_enough_covers_rate_times_latency(on: Board) -> None:
    """Little's law by hand: a power of two, within a factor of two of rate x latency over the bytes of a burst."""
    found = buffer(on)
    wait_ns = on.read_latency_ns + on.read_beat_factor * 16 * 1000 / on.kernel_mhz
    needed = found.enough_gbps * wait_ns / 1024
    assert 0.95 * needed <= found.enough < 2 * needed + 1
    assert found.enough_gbps == pytest.approx(on.read_cap_gbps)


def test_longer_bursts_need_fewer_of_them() -> None:
    assert buffer(read_burst=64).enough < buffer(read_burst=16).enough < buffer(read_burst=4).enough


def test_each_direction_in_use_has_its_own() -> None:
    both = (
        read("a", at(SCAN) * 64, SCAN, size=64, interface="g"),
        write("b", at(SCAN) * 64, SCAN, size=64, interface="g"),
    )
    (port,) = measure(trace(*both), HBM, {}).ports
    assert [each.direction for each in port.buffers] == ["read", "write"]


def test_a_burst_that_starts_in_the_middle_of_a_page_is_two() -> None:
    """4 KB in 64 beats: whole at 1 of 64 places, else in two; 64 x 64 beats in 127 bursts."""
    assert mean_burst(4096, 64, 64, 64) == pytest.approx(64 * 64 / 127)
    assert mean_burst(4096, 4096, 64, 64) == 64
    assert mean_burst(1024, 1024, 64, 16) == 16


def test_bursts_of_a_run_that_is_no_multiple_of_them_are_shorter() -> None:
    """20 beats are 16 and 4."""
    assert mean_burst(20 * 64, 4096, 64, 16) == 10
