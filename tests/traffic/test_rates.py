"""What accesses and interfaces get, in GB/s. Expected values are spelt out from the boards' facts."""

from __future__ import annotations

import time
from dataclasses import replace

import pytest
from hypothesis import HealthCheck, settings
from hypothesis import given as sampled
from hypothesis import strategies as st

from beatwise.model.access import Access, LoopInstance
from beatwise.model.board import Board
from beatwise.model.form import number
from beatwise.model.operations import negation
from beatwise.model.traffic import PortTraffic, Traffic
from beatwise.traffic import measure
from traffic.nests import DDR, HBM, at, drawn, loop, read, trace, traffic, write

BOTH = pytest.mark.parametrize("on", [HBM, DDR], ids=lambda on: str(on.name))


def only(access: Access, on: Board = HBM) -> Traffic:
    (item,) = traffic(access, board=on)
    return item


def ports(*accesses: Access, on: Board = HBM) -> dict[str, PortTraffic]:
    return {port.interface: port for port in measure(trace(*accesses), on, {}).ports}


@BOTH
def test_a_wide_walk_gets_all_that_the_channel_gives(on: Board) -> None:
    i = loop("i", 4096)
    item = only(read("in", at(i) * 64, i, size=64), on)
    assert item.now_gbps == item.could_gbps == on.read_cap_gbps
    assert (item.limit, item.loss_gbps) == ("channel", 0.0)


@BOTH
def test_a_walk_that_is_widened_gets_all_too(on: Board) -> None:
    i = loop("i", 4096)
    assert only(read("in", at(i) * 4, i), on).loss_gbps == 0.0


def test_writes_lose_the_gaps_between_their_bursts() -> None:
    """Bursts of 16: 16 of 20 beats of 19.2 GB/s. Held by the channel on HBM2, by the gaps on DDR4."""
    i = loop("i", 4096)
    out = write("out", at(i) * 64, i, size=64)
    assert only(out, HBM).limit == "channel"
    item = only(out, DDR)
    assert item.limit == "gaps"
    assert item.now_gbps == pytest.approx(19.2 * 16 / 20)
    assert item.could_gbps == 16.28


def test_a_narrow_port_is_held_by_its_width() -> None:
    """4 bytes in each cycle of 300 MHz; 1001 floats cannot be widened."""
    i = loop("i", 1001)
    item = only(read("in", at(i) * 4, i))
    assert item.limit == "width"
    assert item.now_gbps == pytest.approx(1.2)
    assert item.could_gbps == HBM.read_cap_gbps


def test_single_beats_are_held_by_requests() -> None:
    """16 under way, each 253 ns (75.9 cycles) and 1.2 cycles: 16 x 4 bytes in 257 ns."""
    i = loop("i", 64)
    item = only(read("table", drawn(i, name="index") * 4, i))
    assert (item.limit, item.burst_beats) == ("requests", 1)
    assert item.now_gbps == pytest.approx(16 * 4 / 257, rel=1e-3)


def test_single_writes_are_held_by_gaps() -> None:
    """One beat of five, and a little less for waiting."""
    i = loop("i", 64)
    item = only(write("out", at(i) * 4, i, guards=(drawn(i),)))
    assert (item.limit, item.burst_beats) == ("gaps", 1)
    assert 0.9 * 1.2 / 5 < item.now_gbps < 1.2 / 5


def test_few_outstanding_hold_reads_back() -> None:
    """One burst of 16 beats at a time: 1024 bytes in 253 ns and 19.2 cycles."""
    i = loop("i", 4096)
    (item,) = traffic(read("in", at(i) * 64, i, size=64), ports={"in": {"read_outstanding": 1}})
    assert item.limit == "requests"
    assert item.now_gbps == pytest.approx(1024 / (253 + 64))


def test_many_outstanding_are_held_by_the_request_rate() -> None:
    """64 bytes in so many cycles of 300 MHz."""
    i = loop("i", 4096)
    (item,) = traffic(read("in", at(i) * 128, i, size=64), ports={"in": {"read_outstanding": 128}})
    assert item.limit == "requests"
    assert item.now_gbps == pytest.approx(64 * 0.3 / HBM.request_cycles)


def test_an_element_of_12_bytes_leaves_part_of_its_beat_empty() -> None:
    i = loop("i", 1001)
    item = only(read("in", at(i) * 12, i, size=12))
    assert (item.width_bits, item.limit) == (128, "width")
    assert item.now_gbps == pytest.approx(12 * 0.3)


def test_elements_of_12_bytes_fill_the_beats_of_a_widened_port() -> None:
    i = loop("i", 1024)
    item = only(read("in", at(i) * 12, i, size=12))
    assert (item.width_bits, item.limit) == (512, "channel")
    assert item.limits["port"] == pytest.approx(19.2)


def test_a_wide_single_beat_wastes_no_granule_but_a_narrow_one_does() -> None:
    """4 of 32 bytes."""
    i = loop("i", 64)
    limits = only(read("in", at(i) * 256, i)).limits
    assert limits["channel"] == pytest.approx(HBM.read_cap_gbps / 8)
    assert only(read("in", at(i) * 256, i, size=64)).limits["channel"] == HBM.read_cap_gbps


def test_part_of_a_record_gets_part_of_the_rate() -> None:
    i = loop("i", 4096)
    item = only(read("cells", at(i) * 16, i, size=16, part_bytes=4))
    assert item.now_gbps == pytest.approx(HBM.read_cap_gbps / 4)
    assert item.could_gbps == HBM.read_cap_gbps


@pytest.mark.parametrize(
    "names", [("north", "east", "south", "west"), ("[]", "[]", "[]", "[]")], ids=["fields", "lanes"]
)
def test_the_parts_of_a_record_together_get_the_whole_rate(names: tuple[str, ...]) -> None:
    i = loop("i", 4096)
    items = traffic(*(read("cells", at(i) * 16, i, size=16, part_bytes=4, covers=name) for name in names))
    assert [item.loss_gbps for item in items] == [pytest.approx(0.0)] * 4
    assert sum(item.now_gbps for item in items) == pytest.approx(HBM.read_cap_gbps)


def test_neighbours_in_one_run_share_its_rate() -> None:
    i = loop("i", 4096)
    items = traffic(*(read("a", at(i) * 12 + 4 * k, i) for k in range(3)))
    assert {(item.width_bits, item.burst_beats) for item in items} == {(512, 16)}
    assert sum(item.now_gbps for item in items) == pytest.approx(HBM.read_cap_gbps)
    assert sum(item.loss_gbps for item in items) == pytest.approx(0.0)


def test_stores_in_both_branches_share_the_rate() -> None:
    i = loop("i", 4096)
    wet = drawn(i)

    items = traffic(*(write("out", at(i) * 4, i, guards=(guard,)) for guard in (wet, negation(wet))))
    assert sum(item.now_gbps for item in items) == pytest.approx(HBM.write_cap_gbps)
    assert [item.loss_gbps for item in items] == [pytest.approx(0.0)] * 2
    alone = only(write("out", at(i) * 4, i))
    assert [item.limits["gaps"] for item in items] == [pytest.approx(alone.limits["gaps"] / 2)] * 2


def test_two_arrays_on_one_port_get_half_each() -> None:
    i = loop("i", 4096)
    items = traffic(*(read(name, at(i) * 64, i, size=64, interface="gmem") for name in "ab"))
    assert [item.could_gbps for item in items] == [HBM.read_cap_gbps / 2] * 2
    one = only(read("a", at(i) * 64, i, size=64, guards=(drawn(i),)))
    assert [item.now_gbps for item in items] == [pytest.approx(one.now_gbps / 2)] * 2


def test_two_arrays_on_two_ports_share_only_a_channel() -> None:
    i = loop("i", 4096)
    pair = [read(name, at(i) * 64, i, size=64) for name in "ab"]
    assert [item.now_gbps for item in traffic(*pair, board=HBM)] == [HBM.read_cap_gbps] * 2
    assert [item.now_gbps for item in traffic(*pair, board=DDR)] == [DDR.read_cap_gbps / 2] * 2


def test_reads_and_writes_of_a_port_share_its_channel_alone() -> None:
    i = loop("i", 4096)
    pair = (read("a", at(i) * 64, i, size=64, interface="g"), write("b", at(i) * 64, i, size=64, interface="g"))
    items = traffic(*pair)
    assert {item.limit for item in items} == {"turnaround"}
    assert items[0].now_gbps == items[1].now_gbps < HBM.write_cap_gbps / 2
    assert items[0].could_gbps == items[0].now_gbps
    narrow = traffic(*(replace(item, offset=at(i) * 8, element_bytes=4, part_bytes=4) for item in pair))
    alone = [only(item.access) for item in narrow]
    assert [item.limits["requests"] for item in narrow] == [item.limits["requests"] for item in alone]


def test_loops_in_turn_share_nothing() -> None:
    i, j = loop("i", 4096), loop("j", 4096)
    pair = (read("a", at(i) * 64, i, size=64, interface="g"), read("b", at(j) * 64, j, size=64, interface="g"))
    assert [item.now_gbps for item in traffic(*pair)] == [HBM.read_cap_gbps] * 2
    assert ports(*pair)["g"].now_gbps == pytest.approx(HBM.read_cap_gbps)


def test_processes_side_by_side_share_a_port() -> None:
    i, j = loop("i", 4096), loop("j", 4096)
    pair = (
        read("a", at(i) * 64, i, size=64, interface="g", process="load_a"),
        read("b", at(j) * 64, j, size=64, interface="g", process="load_b"),
    )
    assert [item.now_gbps for item in traffic(*pair)] == [HBM.read_cap_gbps / 2] * 2
    assert ports(*pair)["g"].now_gbps == pytest.approx(HBM.read_cap_gbps)


@BOTH
def test_processes_share_every_limit_of_a_port(on: Board) -> None:
    i, j = loop("i", 4096), loop("j", 4096)
    slow = replace(on, port_bits=64)
    one = read("a", at(i) * 4, i, interface="g", process="load_a", guards=(drawn(i),))
    other = replace(one, loops=(j,), offset=at(j) * 4, guards=(), process="load_b")
    (alone,), (beside, _) = traffic(one, board=slow), traffic(one, other, board=slow)
    assert alone.could_gbps == pytest.approx(2.4)
    assert beside.could_gbps == pytest.approx(1.2)
    limits = dict(beside.limits)
    assert limits.pop("shared") == pytest.approx(alone.limits["channel"] / 2)
    assert limits.pop("channel") == pytest.approx(alone.limits["channel"])
    assert limits == {name: pytest.approx(limit / 2) for name, limit in alone.limits.items() if name != "channel"}


@BOTH
def test_nothing_is_held_against_what_runs_once_or_is_not_known(on: Board) -> None:
    i = loop("i", 64)
    once, lost = read("n", number(0)), read("a", at(i) * 4, i, unresolved="its type is not known", element_bytes=0)
    for access in (once, lost):
        item = only(access, on)
        assert item.now_gbps == item.could_gbps > 0
    beside = read("in", at(i) * 64, i, size=64, interface="g")
    items = traffic(replace(once, interface="g"), beside, board=on)
    assert items[1].now_gbps == only(beside, on).now_gbps


def test_bytes_moved_are_executions_times_what_is_used() -> None:
    i = loop("i", 300)
    assert only(read("cells", at(i) * 16, i, size=16, part_bytes=4)).bytes_moved == 1200


@pytest.mark.parametrize(("loads", "per_iteration"), [("a", 16), ("a", 16), ("ab", 24), ("bc", 24)])
def test_bytes_of_copy_scale_add_and_triad(loads: str, per_iteration: int) -> None:
    """J. McCalpin's stream.c 5.10: 2, 2, 3 and 3 elements of 8 bytes in an iteration."""
    i = loop("i", 100)
    items = traffic(*(read(name, at(i) * 8, i, size=8) for name in loads), write("out", at(i) * 8, i, size=8))
    assert sum(item.bytes_moved or 0 for item in items) == 100 * per_iteration


def test_an_interface_weighs_its_loops_by_their_time() -> None:
    """64 KiB at 13.27 GB/s, then 256 bytes at 0.249 GB/s."""
    i, j = loop("i", 1024), loop("j", 64)
    fast, slow = read("a", at(i) * 64, i, size=64, interface="g"), read("b", drawn(j) * 4, j, interface="g")
    rates = [item.now_gbps for item in traffic(fast, slow)]
    whole = ports(fast, slow)["g"]
    assert whole.now_gbps == pytest.approx((65536 + 256) / (65536 / rates[0] + 256 / rates[1]))
    assert whole.could_gbps == pytest.approx(HBM.read_cap_gbps)
    assert (whole.width_bits, whole.arguments) == (512, ("a", "b"))


def test_interfaces_take_the_channels_in_turn() -> None:
    i = loop("i", 64)
    accesses = [read(f"a{k}", at(i) * 4, i) for k in range(34)]
    assert [port.channels for port in measure(trace(*accesses), HBM, {}).ports][30:] == [(30,), (31,), (0,), (1,)]
    assert {port.channels for port in measure(trace(*accesses), DDR, {}).ports} == {(0,)}


# ------------------------------------------------------------------------------------------------ in all cases


@st.composite
def kernels(draw: st.DrawFn) -> tuple[Access, ...]:
    loops = [loop("i", draw(st.integers(1, 40))), loop("j", draw(st.integers(1, 40)))]
    accesses = []
    for _ in range(draw(st.integers(1, 5))):
        size = draw(st.sampled_from((1, 4, 12, 16, 64, 128, 256)))
        nest: tuple[LoopInstance, ...] = draw(st.sampled_from(((), tuple(loops[:1]), tuple(loops))))
        offset = number(size * draw(st.integers(0, 3)))
        for each in nest:
            offset = offset + at(each) * (size * draw(st.integers(-2, 40)))
        if draw(st.booleans()) and nest:
            offset = offset + drawn(*nest) * size
        guards = (drawn(*nest),) if draw(st.booleans()) and nest else ()
        make = draw(st.sampled_from((read, write)))
        name = draw(st.sampled_from("abc"))
        part = draw(st.sampled_from((size, max(1, size // 4))))
        port = draw(st.sampled_from((name, "shared")))
        accesses.append(make(name, offset, *nest, size=size, part_bytes=part, interface=port, guards=guards))
    return tuple(accesses)


@BOTH
@sampled(accesses=kernels())
@settings(suppress_health_check=[HealthCheck.function_scoped_fixture], max_examples=60, deadline=None)
def test_no_access_gets_more_than_it_could(on: Board, accesses: tuple[Access, ...]) -> None:
    measured = measure(trace(*accesses), on, {})
    for item in measured.traffic:
        assert 0 < item.now_gbps <= item.could_gbps <= max(on.read_cap_gbps, on.write_cap_gbps)
        assert item.limits[item.limit] == min(item.limits.values())
        assert item.limits[item.limit] == pytest.approx(item.now_gbps) or item.now_gbps == item.could_gbps
        assert 1 <= item.burst_beats <= 16
    for port in measured.ports:
        assert 0 < port.now_gbps <= port.could_gbps * (1 + 1e-9)
    assert measured == measure(trace(*accesses), on, {})


def test_a_loop_of_a_thousand_accesses_takes_less_than_a_second() -> None:
    i = loop("i", 4)
    accesses = [read(f"a{k % 7}", at(i) * 4000 + 4 * k, i, interface="g", guards=(drawn(i),)) for k in range(1000)]
    started = time.perf_counter()
    measure(trace(*accesses), HBM, {})
    assert time.perf_counter() - started < 1.0


# ------------------------------------------------------------------------------------ limits of memory and loop


def test_steps_that_open_a_row_each_are_held_by_rows() -> None:
    """A step of 16 KiB stays in one bank: 64 bytes in each row cycle of 48 ns, less refresh."""
    i = loop("i", 4096)
    item = only(read("in", at(i) * 16384, i, size=64))
    assert item.limit == "rows"
    assert item.now_gbps == pytest.approx(64 / HBM.row_cycle_ns * (1 - 260 / 3900), rel=0.05)


def test_two_processes_that_fill_one_channel_are_told_to_share_it() -> None:
    i, j = loop("i", 4096), loop("j", 4096)
    pair = (
        read("a", at(i) * 64, i, size=64, interface="g", process="load_a"),
        read("b", at(j) * 64, j, size=64, interface="g", process="load_b"),
    )
    assert [item.limit for item in traffic(*pair)] == ["shared", "shared"]
    assert traffic(*pair)[0].limits["channel"] == HBM.read_cap_gbps


def test_neighbours_of_one_run_do_not_share_with_each_other() -> None:
    i = loop("i", 4096)
    items = traffic(*(read("a", at(i) * 12 + 4 * k, i) for k in range(3)))
    assert {item.limit for item in items} == {"channel"}


def test_bursts_that_are_cut_at_page_ends_lose_more_to_gaps() -> None:
    """16 beats from any multiple of 64 bytes: 15 of 64 places are cut, 16 beats in 1 + 15/64 bursts on average."""
    rows, i = loop("rows", 64), loop("i", 16)
    apart = {64: 65, 1024: 80}  # the step of the rows, in words, by what it makes their starts multiples of
    cut, whole = (
        only(write("out", at(rows) * 64 * step + at(i) * 64, rows, i, size=64), DDR).limits["gaps"]
        for step in apart.values()
    )
    beats = 16 / (1 + 15 / 64)
    assert cut == pytest.approx(19.2 * beats / (beats + DDR.write_gap_beats), rel=0.02)
    assert whole == pytest.approx(19.2 * 16 / (16 + DDR.write_gap_beats), rel=0.02)


@pytest.mark.parametrize("independent", [False, True])
def test_a_load_that_may_need_the_last_store_waits_for_it(independent: bool) -> None:
    """A bin of a histogram in memory: 4 bytes in each read and write latency."""
    i = loop("i", 4096, independent=independent)
    index = drawn(i, name="bin") * 4
    load, _ = traffic(read("bins", index, i, interface="g"), write("bins", index, i, interface="g"))
    if independent:
        assert "interval" not in load.limits
    else:
        assert load.limit == "interval"
        assert load.now_gbps == pytest.approx(4 / (HBM.read_latency_ns + HBM.write_latency_ns))


def test_a_loop_that_is_asked_to_start_every_fourth_cycle_gets_a_quarter_of_its_port() -> None:
    i = loop("i", 4096, interval=4)
    item = only(read("in", at(i) * 64, i, size=64))
    assert item.limit == "interval"
    assert item.now_gbps == pytest.approx(4.8)


def test_accesses_of_one_iteration_are_issued_together() -> None:
    """Every fourth cycle each of two arrays gets a beat."""
    i = loop("i", 4096, interval=4)
    items = traffic(*(read(name, at(i) * 64, i, size=64, interface="g") for name in "ab"))
    assert [item.limits["interval"] for item in items] == [pytest.approx(4.8)] * 2
