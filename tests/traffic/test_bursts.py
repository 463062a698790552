"""How wide a port is for an access, and how long its bursts are."""

from __future__ import annotations

from dataclasses import replace

import pytest
from hypothesis import given
from hypothesis import strategies as st

from beatwise.model.access import Access, Interface
from beatwise.model.form import number
from beatwise.model.traffic import Traffic, Walk
from beatwise.traffic.bursts import beat_bytes, burst_beats
from traffic.nests import DDR, HBM, at, drawn, loop, place, read, traffic


def only(access: Access, **port: int) -> Traffic:
    (item,) = traffic(access, ports={access.interface: port})
    return item


def shape(access: Access, **port: int) -> tuple[int, int]:
    """Bits of the port, beats of a burst."""
    item = only(access, **port)
    return item.width_bits, item.burst_beats


def test_a_long_aligned_run_makes_the_port_wide() -> None:
    i = loop("i", 1024)
    assert shape(read("in", at(i) * 4, i)) == (512, 16)


@pytest.mark.parametrize(("trips", "bits"), [(1024, 512), (1000, 256), (1004, 128), (1002, 64), (1001, 32)])
def test_the_port_gets_as_wide_as_divides_the_run(trips: int, bits: int) -> None:
    """1000 floats are 4000 bytes: 125 beats of 32 bytes."""
    i = loop("i", trips)
    assert shape(read("in", at(i) * 4, i)) == (bits, 16)


@pytest.mark.parametrize(("skip", "bits"), [(0, 512), (4, 32), (16, 128), (64, 512)])
def test_the_port_gets_as_wide_as_divides_the_start(skip: int, bits: int) -> None:
    i = loop("i", 1024)
    assert only(read("in", at(i) * 4 + skip, i)).width_bits == bits


def test_the_port_gets_no_wider_than_it_may() -> None:
    i = loop("i", 1024)
    walk = read("in", at(i) * 4, i)
    assert only(walk, widen_bits=128).width_bits == 128
    assert only(walk, widen_bits=1024).width_bits == 512
    assert only(walk, widen_bits=0).width_bits == 32


def test_what_is_blocked_is_neither_widened_nor_burst() -> None:
    i = loop("i", 1024)
    assert shape(read("in", at(i) * 4, i, guards=(drawn(i),))) == (32, 1)


def test_an_explicit_request_keeps_its_width() -> None:
    k = loop("k", 1024, kind="copy")
    assert shape(read("in", at(k) * 4, k, manual=True)) == (32, 16)


def test_rows_that_do_not_join_are_bursts_of_a_row() -> None:
    """48 floats of each 64: 192 bytes, 3 beats."""
    r, c = loop("r", 16), loop("c", 48)
    assert shape(read("in", at(r) * 256 + at(c) * 4, r, c)) == (512, 3)


def test_rows_that_join_are_one_run() -> None:
    r, c = loop("r", 16), loop("c", 8)
    assert shape(read("in", at(r) * 32 + at(c) * 4, r, c)) == (512, 8)


def test_jumps_are_single_beats() -> None:
    i = loop("i", 64)
    assert shape(read("in", at(i) * 256, i)) == (32, 1)
    assert shape(read("in", drawn(i, name="index") * 4, i)) == (32, 1)
    assert shape(read("in", number(8), i)) == (32, 1)


@pytest.mark.parametrize(("longest", "beats"), [(1, 1), (64, 64), (100, 64), (256, 64)])
def test_a_directive_sets_the_longest_burst_up_to_4096_bytes(longest: int, beats: int) -> None:
    i = loop("i", 1 << 12)
    assert shape(read("in", at(i) * 64, i, size=64), read_burst=longest) == (512, beats)


def test_reads_and_writes_have_limits_of_their_own() -> None:
    i = loop("i", 1 << 12)
    walk = read("in", at(i) * 64, i, size=64)
    assert only(walk, read_burst=32, write_burst=64).burst_beats == 32
    assert only(replace(walk, direction="write"), read_burst=32, write_burst=64).burst_beats == 64


@pytest.mark.parametrize(
    ("size", "bits", "beats"), [(1, 8, 7), (2, 16, 7), (12, 128, 7), (64, 512, 7), (128, 1024, 7), (256, 1024, 14)]
)
def test_an_element_that_is_not_widened_takes_whole_beats(size: int, bits: int, beats: int) -> None:
    i = loop("i", 7)
    assert shape(read("in", at(i) * size, i, size=size), widen_bits=8) == (bits, beats)


SIZES = st.sampled_from((1, 2, 3, 4, 8, 12, 16, 24, 64, 128, 200))


@given(
    size=SIZES,
    run=st.floats(1, 1e6),
    run_multiple=st.integers(1, 512),
    start_multiple=st.integers(1, 512),
    longest=st.integers(1, 256),
    widen=st.sampled_from((None, 32, 128, 512, 1024)),
    pattern=st.sampled_from(("sequential", "strided", "indirect")),
)
def test_bursts_keep_to_the_protocol(
    size: int, run: float, run_multiple: int, start_multiple: int, longest: int, widen: int | None, pattern: str
) -> None:
    """At most 256 beats and 4096 bytes (AXI: IHI 0022, A3.4.1), no wider than asked, no longer than the run."""
    i = loop("i", 64)
    walk = Walk(pattern, size, run, "given", 64.0, None, start_multiple, run_multiple)  # type: ignore[arg-type]
    port = Interface("in", ("in",), place(), True, read_burst=longest, widen_bits=widen)
    for board in (HBM, DDR):
        beat = beat_bytes(read("in", at(i) * size, i, size=size), walk, port, board, ())
        beats = burst_beats(read("in", at(i) * size, i, size=size), walk, port, board, (), beat)
        assert beat & (beat - 1) == 0
        assert 1 <= beats <= min(256, longest, 4096 // beat)
        if beat > 2 * size:
            assert pattern == "sequential"
            assert beat * 8 <= min(widen or 512, 512)
            assert run_multiple % beat == start_multiple % beat == 0
            assert beats == 1 or beats * beat <= run * size
