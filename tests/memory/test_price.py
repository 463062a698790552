"""A demand's price: which limit wins, and what the order of patterns must be."""

from __future__ import annotations

from dataclasses import replace
from itertools import pairwise

import pytest

from beatwise.errors import BadSettings
from beatwise.memory import board, board_names
from beatwise.memory.demand import Demand
from beatwise.memory.gauge import Pattern, demand, sweep, sweep_range
from beatwise.memory.price import price
from beatwise.memory.switch import distance, rates

HBM, DDR = board("hbm2-32ch"), board("ddr4-2400-1ch")
BEST = Demand("read", 64, 64, 64, 64, None)


@pytest.mark.parametrize(
    ("ask", "limit"),
    [
        (replace(BEST, clock_mhz=150), "port"),
        (replace(BEST, used_bytes=8), "channel"),
        (replace(BEST, beat_bytes=8, used_bytes=8), "width"),
        (replace(BEST, burst_beats=4, outstanding=2), "requests"),
        (replace(BEST, direction="write", burst_beats=2), "gaps"),
        (replace(BEST, burst_beats=1, run_bytes=64, channels=2), "order"),
        (replace(BEST, burst_beats=1, run_bytes=64, stride_bytes=16384), "rows"),
        (BEST, "channel"),
        (replace(BEST, direction="mixed"), "turnaround"),
        (replace(BEST, crossing=((0, 4), (1, 5))), "switch"),
        (replace(BEST, ports=2), "shared"),
        (replace(BEST, users=4), "shared"),
        (replace(BEST, interval_cycles=8), "interval"),
    ],
    ids=str,
)
def test_each_limit_wins_where_it_should(ask: Demand, limit: str) -> None:
    answer = price(HBM, ask)
    assert answer.limit == limit
    assert answer.gbps == min(answer.limits.values())
    assert answer.share_of_peak == pytest.approx(answer.gbps / 14.4)


@pytest.mark.parametrize("name", board_names())
def test_reads_writes_mixed_and_sequence_chance_in_this_order(name: str) -> None:
    """Order of the efficiencies of a hard DDR3 controller: device manual UG585, "DDR Efficiency"."""
    on = board(name)
    wide = replace(BEST, outstanding=256, clock_mhz=2000)
    read, write, mixed = (price(on, replace(wide, direction=way)).gbps for way in ("read", "write", "mixed"))
    assert on.peak_gbps > read >= write > mixed
    piece = replace(wide, burst_beats=1, run_bytes=64)
    assert price(on, piece).gbps < read


@pytest.mark.parametrize("name", board_names())
def test_longer_runs_never_get_much_less(name: str) -> None:
    on = board(name)
    rates = [price(on, demand(on, each)).gbps for _, each in sweep(Pattern(), "run", 32, 65536)]
    assert all(after > before * 0.97 for before, after in pairwise(rates))
    assert rates[-1] == pytest.approx(price(on, demand(on, Pattern())).gbps, rel=0.05)


def test_what_a_demand_may_not_be() -> None:
    for wrong in (replace(BEST, used_bytes=65), replace(BEST, ports=0), replace(BEST, run_bytes=0)):
        with pytest.raises(ValueError, match=r"of|at least"):
            price(HBM, wrong)


def test_a_narrow_run_moves_only_the_granules_that_it_touches() -> None:
    bounds = price(HBM, replace(BEST, used_bytes=32, burst_beats=1, run_bytes=32)).limits
    assert bounds["channel"] == HBM.read_cap_gbps
    assert (
        price(HBM, replace(BEST, used_bytes=4, burst_beats=1, run_bytes=4)).limits["channel"] == HBM.read_cap_gbps / 8
    )


def test_switches_and_their_distances() -> None:
    assert [distance(HBM, 0, channel) for channel in (0, 3, 4, 31)] == [0, 0, 1, 7]
    assert distance(DDR, 0, 0) == 0
    with pytest.raises(ValueError, match="port 32"):
        rates(HBM, [(32, 0)], 1.0)
    assert rates(HBM, [(0, 9), (1, 10), (4, 11)], 1.0) == pytest.approx((1 / 3, 1 / 3, 1 / 3))
    assert rates(HBM, [(0, 7), (3, 7)], 1.0) == (0.5, 0.5)


def test_patterns_become_demands() -> None:
    assert demand(HBM, Pattern()) == Demand("read", 64, 64, 16, 16, None)
    assert demand(HBM, Pattern(stride=4096)).run_bytes == 32
    assert demand(HBM, Pattern(random=True, width=32)).run_bytes == 4
    assert demand(HBM, Pattern(channels=4, burst=2)).run_bytes == 128
    assert demand(HBM, Pattern(run=4096 + 64, burst=64)).burst_beats == pytest.approx(32.5)
    for wrong in (Pattern(width=7), Pattern(channels=33), Pattern(random=True, stride=64)):
        with pytest.raises(BadSettings):
            demand(HBM, wrong)


def test_a_sweep_doubles_and_ends_where_it_should() -> None:
    assert sweep_range("run=32:65536") == ("run", 32, 65536)
    assert [value for value, _ in sweep(Pattern(), "outstanding", 3, 20)] == [3, 6, 12, 20]
    assert [each.run for _, each in sweep(Pattern(), "run", 64, 64)] == [64]
    for wrong in ("run", "run=", "run=1", "run=0:4", "run=8:4", "depth=1:2", "run=a:b", "run=-1:4"):
        with pytest.raises(BadSettings, match=r"^sweep: expected"):
            sweep_range(wrong)


def test_published_bounds_hold() -> None:
    """Interconnect guide PG059: at least 3 cycles between two grants to one input, so that single beats get at most a
    third. HLS user guide UG1399, manual burst: 80 to 95 % of 19.2 GB/s at 512 bits. Lu et al., FPGA 2021, abstract: a
    naive design gets less than 5 % of the bandwidth off chip."""
    single = replace(BEST, burst_beats=1, outstanding=256)
    assert price(DDR, single).limits["requests"] <= 19.2 / 3
    assert 0.80 * 19.2 < price(DDR, BEST).gbps < 0.95 * 19.2
    for direction in ("read", "write"):
        naive = Demand("read" if direction == "read" else "write", 4, 4, 1, 16, None)
        assert price(DDR, naive).gbps / 19.2 < 0.05


def test_gigabytes_in_flight_follow_littles_law() -> None:
    """Little, 1961: 13.27 GB/s at 106.7 ns (Wang et al., FCCM 2020) are 45 beats of 32 bytes on the way."""
    on = replace(HBM, read_latency_ns=106.7, read_beat_factor=0, request_cycles=0)
    narrow = replace(BEST, beat_bytes=32, used_bytes=32, burst_beats=1, clock_mhz=450)
    few, enough = (price(on, replace(narrow, outstanding=many)) for many in (40, 45))
    assert few.limit == "requests"
    assert enough.gbps == pytest.approx(13.27, rel=0.02)
