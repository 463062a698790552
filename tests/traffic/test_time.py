"""Seconds of loops and kernels: ports in lockstep, loops in sequence, processes side by side."""

from __future__ import annotations

from dataclasses import replace
from typing import Any

import pytest
from hypothesis import given as sampled
from hypothesis import strategies as st

from beatwise.model.access import Access, StreamOperation
from beatwise.model.traffic import AccessTime, KernelTime, LoopTime
from beatwise.traffic import measure
from beatwise.traffic.time import kernel_time
from traffic.nests import DDR, HBM, at, drawn, loop, place, read, trace, write

SCAN, SWEEP = loop("i", 4096), loop("j", 1024)
WORD = {"size": 64}


def timed(*accesses: Access, given: dict[str, int] | None = None, **more: Any) -> KernelTime:
    whole = replace(trace(*accesses), **more)
    return kernel_time(whole, measure(whole, HBM, given or {}).traffic, HBM, given or {})


def alone(access: Access) -> float:
    return timed(access).total()


def test_a_loop_takes_its_bytes_over_its_rate() -> None:
    time = timed(read("in", at(SCAN) * 64, SCAN, **WORD))
    assert time.seconds == pytest.approx(4096 * 64 / (HBM.read_cap_gbps * 1e9))
    assert time.gbps == pytest.approx(HBM.read_cap_gbps)
    assert (time.basis, time.bytes_moved, time.peak_gbps) == ("constant", 4096 * 64, 32 * 14.4)


def test_ports_of_a_loop_run_at_the_pace_of_the_slowest() -> None:
    fast, slow = read("in", at(SCAN) * 64, SCAN, **WORD), write("out", at(SCAN) * 4, SCAN, guards=(drawn(SCAN),))
    assert timed(fast, slow).total() == pytest.approx(max(alone(fast), alone(slow)))


def test_arrays_that_take_turns_on_a_port_take_the_sum() -> None:
    pair = [read(name, at(SCAN) * 64, SCAN, interface="g", guards=(drawn(SCAN),), **WORD) for name in "ab"]
    assert timed(*pair).total() == pytest.approx(2 * alone(pair[0]))


def test_loops_in_sequence_add_up() -> None:
    pair = read("a", at(SCAN) * 64, SCAN, **WORD), read("b", at(SWEEP) * 64, SWEEP, **WORD)
    assert timed(*pair).total() == pytest.approx(sum(map(alone, pair)))


def test_processes_run_side_by_side_and_the_rest_before_or_after() -> None:
    before = loop("k", 512)
    load = read("a", at(SCAN) * 64, SCAN, process="load", **WORD)
    store = write("b", at(SWEEP) * 64, SWEEP, process="store", **WORD)
    table = read("t", at(before) * 64, before, **WORD)
    assert timed(load, store).total() == pytest.approx(max(alone(load), alone(store)))
    assert timed(load, store, table).total() == pytest.approx(alone(load) + alone(table))


def test_one_function_called_twice_is_two_processes() -> None:
    calls = [replace(place(line), line=line) for line in (40, 41)]
    pair = [
        read(name, at(each) * 64, each, process="load", chain=(call,), **WORD)
        for name, each, call in zip("ab", (SCAN, SWEEP), calls, strict=True)
    ]
    assert timed(*pair).total() == pytest.approx(max(map(alone, pair)))


def test_a_loop_unrolled_in_full_is_part_of_the_loop_around_it() -> None:
    inner = loop("u", 4, unroll=0)
    load = read("a", at(SCAN) * 64, SCAN, **WORD)
    store = write("b", at(SCAN) * 64 + at(inner) * 16, SCAN, inner, size=16)
    time = timed(load, store)
    assert len(time.loops) == 1
    assert time.total() == pytest.approx(max(alone(load), alone(store)))


def operation(*loops: Any, **more: Any) -> StreamOperation:
    made = StreamOperation(place(), (), "sweep", "echoes", "write", None, True, loops, (), order=999)
    return replace(made, **more)


def test_a_fifo_moves_one_element_a_cycle() -> None:
    slow = timed(read("in", at(SCAN) * 4, SCAN), operations=(operation(SCAN),))
    assert slow.total() == pytest.approx(4096 / 300e6)
    halved = timed(read("in", at(SCAN) * 4, SCAN), operations=(operation(replace(SCAN, interval=2)),))
    assert halved.total() == pytest.approx(2 * 4096 / 300e6)


def test_nothing_is_claimed_of_a_fifo_whose_loop_data_ends() -> None:
    endless = loop("w", None)
    time = timed(read("in", at(SCAN) * 64, SCAN, **WORD), operations=(operation(endless),))
    assert (len(time.loops), time.known) == (1, True)


def test_sizes_that_nobody_states_give_rates_but_no_seconds() -> None:
    unsized = loop("w", None)
    lost = timed(read("in", at(unsized) * 64, unsized, **WORD))
    assert (lost.seconds, lost.known, lost.wanted, lost.unsized) == (None, False, (), (unsized.place.line,))
    assert lost.gbps == pytest.approx(HBM.read_cap_gbps)


def test_a_trip_count_directive_makes_seconds() -> None:
    stated = loop("w", None, tripcount=2048)
    time = timed(read("in", at(stated) * 64, stated, **WORD))
    assert time.basis == "tripcount"
    assert time.seconds == pytest.approx(time.bytes_moved / (HBM.read_cap_gbps * 1e9))


def test_an_access_that_is_lost_leaves_the_whole_unknown() -> None:
    time = timed(
        read("in", at(SCAN) * 64, SCAN, **WORD), read("a", at(SCAN) * 4, SCAN, unresolved="its type is not known")
    )
    assert (time.lost, time.seconds) == (1, None)


def test_what_a_cure_saves_is_what_the_kernel_gets_faster() -> None:
    slow, slower = (
        write("a", at(SCAN) * 4, SCAN, guards=(drawn(SCAN),)),
        write("b", at(SWEEP) * 64, SWEEP, guards=(drawn(SWEEP),), **WORD),
    )
    whole = trace(slow, slower)
    traffic = measure(whole, HBM, {}).traffic
    time = kernel_time(whole, traffic, HBM, {})
    each = [time.saved([item]) or 0.0 for item in traffic]
    assert each[0] > each[1] > 0
    assert sum(each) == pytest.approx(time.total() - time.could_total)
    assert time.saved(traffic) == pytest.approx(sum(each))


SECONDS = st.floats(1e-6, 1.0)


@st.composite
def kernels(draw: st.DrawFn) -> KernelTime:
    loops = []
    for number in range(draw(st.integers(1, 4))):
        process = draw(st.sampled_from([None, ("load", 3), ("store", 4)]))
        accesses = [
            AccessTime(
                (10 * number + k, "x"),
                (draw(st.sampled_from("gh")), "read"),
                number,
                now,
                now * draw(st.floats(0.01, 1)),
            )
            for k, now in enumerate(draw(st.lists(SECONDS, min_size=1, max_size=3)))
        ]
        loops.append(LoopTime(place(), None, process, 1e6, tuple(accesses), draw(st.sampled_from([0.0, 1e-3]))))
    return KernelTime(tuple(loops), 460.8)


@sampled(kernels())
def test_no_cure_makes_a_kernel_slower_and_none_saves_more_than_all(time: KernelTime) -> None:
    better = {each.key: each.could_seconds for made in time.loops for each in made.accesses}
    assert time.total(better) == pytest.approx(time.could_total)
    for key, seconds in better.items():
        assert time.could_total <= time.total({key: seconds}) * (1 + 1e-9) <= time.total() * (1 + 2e-9)
    assert (
        max(loop.seconds() for loop in time.loops)
        <= time.total()
        <= sum(loop.seconds() for loop in time.loops) * 1.0001
    )


def test_a_loop_of_known_size_has_its_time_beside_one_of_unknown_size() -> None:
    unsized = loop("w", None)
    whole = trace(write("a", at(SCAN) * 4, SCAN, guards=(drawn(SCAN),)), read("b", at(unsized) * 64, unsized, **WORD))
    traffic = measure(whole, HBM, {}).traffic
    time = kernel_time(whole, traffic, HBM, {})
    assert [each.known for each in time.loops] == [True, False]
    assert time.seconds is None
    assert time.saved(traffic[:1]) == pytest.approx(time.loops[0].seconds() - time.loops[0].could_seconds)
    assert time.saved(traffic[1:]) is None
    assert time.saved(traffic) is None


def test_all_advice_gives_each_argument_a_channel_where_there_are_as_many() -> None:
    """A copy within one HBM2 channel, after all advice on two; two reads that take turns, on two."""
    copy = read("a", at(SCAN) * 64, SCAN, interface="g", **WORD), write("b", at(SCAN) * 64, SCAN, interface="g", **WORD)
    assert timed(*copy).could_total == pytest.approx(4096 * 64 / (HBM.write_cap_gbps * 1e9))
    loads = [read(name, at(SCAN) * 64, SCAN, interface="g", **WORD) for name in "ab"]
    assert timed(*loads).could_total == pytest.approx(4096 * 64 / (HBM.read_cap_gbps * 1e9))


def test_on_the_only_channel_all_advice_is_to_take_turns() -> None:
    copy = trace(read("a", at(SCAN) * 64, SCAN, **WORD), write("b", at(SCAN) * 64, SCAN, **WORD))
    time = kernel_time(copy, measure(copy, DDR, {}).traffic, DDR, {})
    turns = 4096 * 64 / 1e9 * 2 / DDR.write_cap_gbps
    assert time.could_total == pytest.approx(turns)
    assert time.could_total < time.total()


def test_what_is_updated_in_place_keeps_its_channel_for_both_directions() -> None:
    load, store = read("map", at(SCAN) * 64, SCAN, **WORD), write("map", at(SCAN) * 64, SCAN, **WORD)
    assert timed(load, store).could_total == pytest.approx(2 * 4096 * 64 / (HBM.write_cap_gbps * 1e9))
