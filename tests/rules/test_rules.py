"""What each rule tells, and what it leaves in peace."""

from __future__ import annotations

from collections.abc import Callable
from typing import Any

import pytest

from beatwise.model.access import Direction
from beatwise.model.finding import Finding
from beatwise.model.form import carried, data, symbol_form
from beatwise_rules import RULES, ask
from rules.builders import Kernel, at, choice, guard, loaded, loop, over

FIND = {rule.name: rule.find for rule in RULES}
I = loop("i", 10, 65536)  # noqa: E741
GUARDED: dict[str, Any] = {"guards": (guard("power", 13, I),), "blocked": ["data-dependent-guard"]}
DIRECTIONS: tuple[Direction, ...] = ("read", "write")
RAY, GATE = loop("ray", 10, 360), loop("gate", 11, 1024)


def found(rule: str, kernel: Kernel) -> list[Finding]:
    return list(FIND[rule](kernel.facts()))


def one(rule: str, kernel: Kernel) -> Finding:
    (finding,) = found(rule, kernel)
    return finding


@pytest.mark.parametrize("rule", FIND)
def test_a_clean_walk_is_left_in_peace_by_every_rule(rule: str) -> None:
    kernel = (
        Kernel().clean("gates", 12, [I]).clean("out", 13, [I], direction="write").clean("words", 14, [I], element=64)
    )
    assert found(rule, kernel) == []


@pytest.mark.parametrize("rule", sorted(set(FIND) - {"unresolved-access"}))
def test_an_access_that_runs_once_is_left_in_peace(rule: str) -> None:
    kernel = Kernel().access(
        "status", 12, [], pattern="single", run=1, executions=1, volatile=True, blocked=["volatile"]
    )
    assert found(rule, kernel) == []


# ---------------------------------------------------------------------------------------------------- where it goes


def sectors(direction: Direction = "write") -> Kernel:
    kernel, names = Kernel(), ["north", "east", "south", "west"]
    for name in names:
        kernel.access(name, 14, [I], direction=direction, pattern="steered", run=4 / 3, basis="data",
                      blocked=["destination-by-data"], choice=choice("azimuth", 13, names, I))  # fmt: skip
    return kernel


def test_a_destination_that_data_picks_is_told_once_for_all_alternatives() -> None:
    finding = one("data-dependent-destination", sectors())
    assert finding.message == "`azimuth` picks which of `north`, `east`, `south` and `west` each write goes to."
    assert finding.because[1] == "With 4 destinations equally likely, 1.33 elements in a row share one: 4/(4 - 1)."
    assert (finding.argument, finding.interface, finding.place.line, finding.level) == (None, None, 14, "error")


def test_the_staging_buffers_are_sized_for_the_port() -> None:
    assert "4 regions of 256 elements (1 KiB), 4 KiB in all" in one("data-dependent-destination", sectors()).instead


def test_a_source_that_data_picks_is_told_as_a_read() -> None:
    assert "each read comes from" in one("data-dependent-destination", sectors("read")).message


def test_branches_of_one_condition_are_one_choice() -> None:
    kernel = Kernel()
    for line, name in enumerate(("wet", "dry"), 14):
        kernel.access(name, line, [I], direction="write", pattern="steered", run=2, guards=(guard("dbz", 13, I),),
                      blocked=["data-dependent-guard"])  # fmt: skip
    assert (
        one("data-dependent-destination", kernel).message == "`dbz` picks which of `wet` and `dry` each write goes to."
    )
    assert [finding.rule for finding in ask(kernel.facts())] == ["data-dependent-destination"]


def test_an_index_that_is_loaded_names_what_it_was_loaded_from() -> None:
    kernel = Kernel().access(
        "clutter", 14, [I], loaded("cell", 13, I, high=4095) * 4, pattern="indirect", stride=None, run=1
    )
    finding = one("indirect-index", kernel)
    assert finding.message == "`clutter` is read at an index taken from `cell`, so its addresses follow no order."
    assert "`cell` (line 13)" in finding.because[0]
    assert "4 of the 32 bytes that the memory moves for it, 12.5 %" in finding.because[1]
    assert (
        finding.instead
        == "Copy `clutter` on chip in order before the loop, 4096 elements (16 KiB), and index the copy."
    )


def test_an_index_names_what_it_is_made_of_not_what_that_hangs_on() -> None:
    first = data("first", at(11), (I.number,))
    member = data("member", at(12), (I.number,), depends=frozenset((first,)))
    kernel = Kernel().access("echo", 14, [I], symbol_form(member) * 4, pattern="indirect", stride=None, run=1)
    assert "taken from `member`, so" in one("indirect-index", kernel).message


def test_a_table_of_unknown_size_is_not_simply_copied() -> None:
    kernel = Kernel().access("clutter", 14, [I], loaded("cell", 13, I) * 4, pattern="indirect", stride=None, run=1)
    assert one("indirect-index", kernel).instead.startswith("If `clutter` has no more than 16,384 elements (64 KiB)")


def test_a_table_that_is_known_to_be_large_is_binned() -> None:
    kernel = Kernel().access("map", 14, [I], loaded("cell", 13, I) * 4, pattern="indirect", run=1, array_bytes=1 << 24)
    assert one("indirect-index", kernel).instead.startswith("At 16 MiB, `map` is too large to copy: sort or bin")


def test_a_histogram_is_one_finding_for_its_load_and_its_store() -> None:
    kernel, bin_ = Kernel(), loaded("level", 13, I, high=255) * 4
    for direction in DIRECTIONS:
        kernel.access("bins", 14, [I], bin_, direction=direction, pattern="indirect", run=1, blocked=["load-and-store"])
    finding = one("indirect-index", kernel)
    assert "is read and written at an index taken from `level`" in finding.message
    assert "Collect the results in an on-chip copy of `bins`, 256 elements (1 KiB)" in finding.instead


# --------------------------------------------------------------------------------------------------------- the order


def test_a_stride_is_told_in_bytes_and_elements_with_the_loop_that_makes_it() -> None:
    kernel = Kernel().access(
        "rays", 12, [GATE, RAY], over((GATE, 4), (RAY, 4096)), pattern="strided", stride=4096, run=1
    )
    finding = one("strided-access", kernel)
    assert finding.message == "`rays` is read in steps of 4 KiB, each element a request of its own."
    assert (
        finding.because[0] == "Each iteration of the loop over `ray` (line 10) moves 4 KiB: 1024 elements of 4 bytes."
    )
    assert finding.because[1].startswith("Of every 32 bytes that the memory moves, 4 are used, 12.5 %")


def test_a_column_walk_is_told_which_loop_to_put_innermost() -> None:
    kernel = Kernel().access(
        "rays", 12, [GATE, RAY], over((GATE, 4), (RAY, 4096)), pattern="strided", stride=4096, run=1
    )
    advice = one("strided-access", kernel).instead
    assert advice.startswith("Make the loop over `gate` (line 11) the innermost")
    assert "tiles of 64 x 64 elements (16 KiB)" in advice


def test_a_transpose_is_told_to_go_through_a_tile_since_another_order_breaks_the_other_side() -> None:
    kernel = Kernel().clean("by_ray", 12, [RAY, GATE], offset=over((RAY, 4096), (GATE, 4)))
    kernel.access("by_gate", 13, [RAY, GATE], over((RAY, 4), (GATE, 1440)), direction="write", pattern="strided",
                  stride=1440, run=1)  # fmt: skip
    advice = one("strided-access", kernel).instead
    assert advice.startswith(
        "Another order of the loops would break the runs of `by_ray`: copy tiles of 64 x 64 elements"
    )


def test_a_short_step_is_read_through() -> None:
    kernel = Kernel().access("rgb", 12, [I], over((I, 12)), pattern="strided", stride=12, run=1)
    finding = one("strided-access", kernel)
    assert finding.instead.startswith("Read in order and pick every third")
    assert finding.because[1].startswith("Of every 12 bytes that the memory moves, 4 are used, 33.3 %")


def test_a_downward_walk_is_told() -> None:
    kernel = Kernel().access("sweep", 12, [I], over((I, -4), start=262140), pattern="descending", stride=-4, run=1)
    assert one("descending-access", kernel).because[0] == (
        "Each iteration of the loop over `i` (line 10) lies 4 bytes before the last: one element per request."
    )


def test_an_address_that_stays_is_told_with_the_loop_that_does_not_move_it() -> None:
    kernel = Kernel().access("gain", 12, [RAY, GATE], over((RAY, 4)), pattern="repeated", stride=0, run=1)
    finding = one("repeated-address", kernel)
    assert finding.message == "`gain` is read at the same address in every iteration of the loop over `gate` (line 11)."
    assert "the same 4 bytes travel 1024 times over" in finding.because[0]
    assert finding.instead.startswith("Read `gain` into a local variable before the loop over `gate`")


def test_a_run_of_fewer_than_16_beats_is_short() -> None:
    rows = over((RAY, 4096), (GATE, 64))
    kernel = Kernel().access("rays", 12, [RAY, GATE], rows, run=8, element=64, stride=64, width=512, beats=8)
    finding = one("short-run", kernel)
    assert finding.message == "`rays` is read in runs of 8 elements, too few to fill 16 beats of its port."
    assert finding.because[1] == "512 bytes fill 8 beats of 64 bytes; 16 would take 1 KiB."


@pytest.mark.parametrize(
    ("run", "width", "short"), [(15, 32, True), (16, 32, False), (64, 512, True), (256, 512, False)]
)
def test_a_beat_is_as_wide_as_the_port_is_for_this_access(run: int, width: int, short: bool) -> None:
    assert bool(found("short-run", Kernel().access("rays", 12, [I], run=run, width=width, beats=4))) == short


def test_a_run_that_data_breaks_is_not_called_short() -> None:
    assert (
        found("short-run", Kernel().access("out", 12, [I], run=2, basis="data", blocked=["data-dependent-guard"])) == []
    )


def test_a_computed_order_is_a_short_run() -> None:
    finding = one("short-run", Kernel().access("in", 12, [I], pattern="irregular", stride=None, run=1.5))
    assert finding.message == "`in` is read in a computed order whose addresses jump after 1.5 elements."


def test_a_short_walk_that_never_jumps_is_left_in_peace() -> None:
    assert found("short-run", Kernel().access("taps", 12, [I], run=8, executions=8)) == []
    assert found("short-run", Kernel().access("taps", 12, [RAY, I], run=8, executions=2880))


# -------------------------------------------------------------------------------------------------- parts of records


def test_a_field_of_a_record_is_told_with_the_share_used() -> None:
    finding = one("partial-record", Kernel().access("gates", 12, [I], element=16, part=4, covers="power"))
    assert finding.message == "Of every 16 bytes of `gates` only 4 bytes are read (`power`)."
    assert "uses 4 of 16 bytes, 25 % of what travels" in finding.because[0]


def test_fields_that_make_up_the_record_leave_nothing_unused() -> None:
    kernel = Kernel()
    for column, field in enumerate(("power", "velocity", "width", "quality"), 9):
        kernel.access("gates", 12, [I], element=16, part=4, covers=field, column=column)
    assert found("partial-record", kernel) == []


def test_a_field_that_is_used_twice_counts_once() -> None:
    kernel = Kernel()
    for column in (9, 30):
        kernel.access("gates", 12, [I], element=8, part=4, covers="power", column=column)
    assert len(found("partial-record", kernel)) == 1


def test_lanes_of_an_unrolled_loop_make_up_the_word() -> None:
    lane = loop("lane", 11, 16, unroll=0)
    assert found("partial-record", Kernel().access("words", 12, [I, lane], over((I, 64)), element=64, part=4)) == []


# ----------------------------------------------------------------------------------------------- what stops a burst


def test_a_guarded_store_names_the_condition_and_the_odds() -> None:
    kernel = Kernel().access("echo", 14, [I], direction="write", run=2, basis="data", **GUARDED)
    finding = one("guarded-access", kernel)
    assert finding.message == "`echo` is written only when `power` allows it, so no burst can promise the write."
    assert finding.because[:2] == (
        "The condition on line 13 is decided by `power` in every iteration of the loop over `i` (line 10).",
        "If it holds 0.5 of the time, 2 elements in a row are to be expected: 1/(1 - 0.5).",
    )
    assert "256 elements (1 KiB) at a time, one full burst" in finding.instead


def test_a_packed_store_is_told_to_collect_not_to_write_always() -> None:
    packed = symbol_form(carried("kept", I.number)) * 4
    kernel = Kernel().access("out", 14, [I], packed, direction="write", run=500, basis="data", **GUARDED)
    finding = one("guarded-access", kernel)
    assert finding.because[1].startswith("The addresses follow each other")
    assert finding.instead.startswith("Collect the accepted elements on chip and write 256 elements (1 KiB) at a time")


def test_a_guard_that_does_not_block_is_left_in_peace() -> None:
    assert found("guarded-access", Kernel().clean("echo", 14, [I], guards=(guard("power", 9),))) == []


def test_a_guarded_load_is_told_to_read_always() -> None:
    kernel = Kernel().access("echo", 14, [I], **GUARDED)
    assert one("guarded-access", kernel).instead.startswith("Read `echo` in every iteration")


def test_an_exit_by_data_names_what_decides_it() -> None:
    until = loop("i", 10, None, data_exit=at(13), data_exit_because="gates")
    finding = one("early-exit", Kernel().access("gates", 12, [until], blocked=["data-dependent-exit"]))
    assert finding.message == "`gates` is read in a loop that may end after any element, as `gates` decides."
    assert "depends on `gates` on line 13" in finding.because[0]
    assert "blocks of 256 elements (1 KiB)" in finding.instead


def test_a_load_and_a_store_of_one_loop_are_told_once_at_the_store() -> None:
    kernel = Kernel().access("map", 12, [I], blocked=["load-and-store"])
    kernel.access("map", 13, [I], direction="write", blocked=["load-and-store"])
    finding = one("in-place-update", kernel)
    assert finding.place.line == 13
    assert "loads `map` on line 12 and stores it on line 13" in finding.because[0]
    assert "blocks of 1024 elements (4 KiB)" in finding.instead


def test_accesses_that_take_turns_are_told_once_with_all_their_lines() -> None:
    kernel = Kernel().access("a", 12, [I], blocked=["interleaved"], interface="gmem")
    kernel.access("b", 13, [I], blocked=["interleaved"], interface="gmem")
    finding = one("interleaved-accesses", kernel)
    assert finding.message.startswith("The loop over `i` (line 10) reads `a` and `b` in turn through port `gmem`")
    assert "(lines 12 and 13)" in finding.because[0]
    assert finding.instead.startswith("Give `b` a bundle of its own; or load 256 elements (1 KiB) of each in turn")


def test_reads_and_writes_do_not_take_turns_with_each_other() -> None:
    kernel = Kernel()
    for line, direction in enumerate((*DIRECTIONS, *DIRECTIONS), 12):
        kernel.access("a", line, [I], direction=direction, blocked=["interleaved"])
    assert [finding.place.line for finding in found("interleaved-accesses", kernel)] == [12, 13]


def test_a_volatile_pointer_is_told() -> None:
    finding = one("volatile-access", Kernel().access("gates", 12, [I], volatile=True, blocked=["volatile"]))
    assert finding.message == "`gates` is read through a volatile pointer, one element at a time."


# --------------------------------------------------------------------------------------------------------- the port


def narrow(**more: Any) -> Kernel:
    return Kernel().access("gates", 12, [I], **{"now": 1.2, "limit": "width", "multiple": 4, "beats": 16, **more})


def test_a_narrow_port_is_told_with_its_rate_and_what_keeps_it_narrow() -> None:
    finding = one("narrow-port", narrow())
    assert finding.because[0].startswith("At 300 MHz a beat of 4 bytes moves at most 1.20 GB/s")
    assert "neither the start nor the length of a run is known to be a multiple of 16 bytes" in finding.because[1]
    assert finding.instead.startswith("Declare `gates` as 512-bit words, 16 elements a beat")


@pytest.mark.parametrize("clean", [{"element": 16}, {"width": 512}, {"width": 128}, {"pattern": "strided"}])
def test_a_wide_or_widened_port_is_left_in_peace(clean: dict[str, Any]) -> None:
    assert found("narrow-port", narrow(**clean)) == []


@pytest.mark.parametrize(("bytes_of_rest", "told"), [(2998 * 4, True), (3000 * 4, False)])
def test_a_small_table_read_once_beside_greater_traffic_is_left_in_peace(bytes_of_rest: int, told: bool) -> None:
    kernel = narrow(run=1000, executions=1000).clean("rest", 20, [I], executions=bytes_of_rest / 4 + 1)
    assert bool(found("narrow-port", kernel)) == told


def test_a_port_that_would_widen_once_unblocked_is_left_in_peace() -> None:
    assert found("narrow-port", narrow(blocked=["load-and-store"], multiple=64)) == []
    assert found("narrow-port", narrow(blocked=["load-and-store"], multiple=4))


def test_the_option_that_keeps_a_port_narrow_is_named() -> None:
    assert (
        "the port's own option allows 32 bits"
        in one("narrow-port", narrow(multiple=64).port("gates", widen_bits=32)).because[1]
    )


def test_arguments_of_one_bundle_in_one_loop_share_a_port() -> None:
    kernel = (
        Kernel()
        .clean("a", 12, [I], interface="gmem", now=6.6)
        .clean("b", 12, [I], interface="gmem", now=6.6, column=30)
    )
    finding = one("shared-port", kernel)
    assert finding.message == "`a` and `b` are used at the same time and share port `gmem`."
    assert finding.because[0] == "The loop on line 10 reads `a` and `b` over one data path."
    assert (
        finding.because[1]
        == "Together they get 13.2 GB/s; on ports and channels of their own they would get 26.4 GB/s."
    )
    assert (finding.argument, finding.interface, finding.level) == (None, "gmem", "error")


def test_processes_side_by_side_share_a_port() -> None:
    other = loop("j", 20)
    kernel = Kernel().clean("a", 12, [I], interface="gmem", process="load_a", now=6.6)
    kernel.clean("b", 22, [other], interface="gmem", process="load_b", now=6.6)
    assert (
        one("shared-port", kernel).because[0]
        == "Side by side, `load_a` and `load_b` read `a` and `b` over one data path."
    )


def test_loops_that_follow_each_other_do_not_share_a_port() -> None:
    tile, other = loop("tile", 9), loop("j", 20)
    kernel = Kernel().clean("a", 12, [tile, I], interface="gmem").clean("b", 22, [tile, other], interface="gmem")
    assert found("shared-port", kernel) == []


def test_alternatives_of_one_choice_do_not_share_a_port() -> None:
    kernel = Kernel()
    for name in ("wet", "dry"):
        kernel.access(name, 14, [I], pattern="steered", interface="gmem", choice=choice("dbz", 13, ["wet", "dry"], I))
    assert found("shared-port", kernel) == []


# ---------------------------------------------------------------------------------------------------------- honesty


def test_an_unresolved_access_is_told_with_its_reason() -> None:
    kernel = Kernel().access("map", 12, [I], pattern="unresolved", unresolved="a pointer that was computed")
    finding = one("unresolved-access", kernel)
    assert finding.because[0] == "A pointer that was computed."
    assert (finding.level, finding.now_gbps) == ("warning", None)


def test_sizes_that_were_assumed_are_told_once_with_what_would_settle_them() -> None:
    rays, gates = loop("ray", 10, "rays"), loop("gate", 11, "gates")
    kernel = Kernel().clean("a", 12, [rays, gates], basis="assumed").clean("b", 13, [rays, gates], basis="assumed")
    finding = one("assumed-size", kernel)
    assert (
        finding.message == "`rays` and `gates` are not known: 1024 is taken, and the accesses on 2 lines depend on it."
    )
    assert finding.because[0] == "How often the loop over `ray` (line 10) runs depends on `rays`."
    assert finding.instead == "Say what is usual: `--given rays=...` `--given gates=...`."
    assert (finding.level, finding.place.line) == ("note", 1)


def test_a_loop_that_data_ends_is_named_among_the_assumed() -> None:
    until = loop("i", 10, None, why_unknown="it ends by data")
    finding = one("assumed-size", Kernel().clean("a", 12, [until], basis="assumed"))
    assert finding.because == ("How often the loop over `i` (line 10) runs is not known: it ends by data.",)
    assert finding.instead == "Write a trip-count directive into these loops."


def test_a_missing_name_is_told_once() -> None:
    kernel = Kernel().clean("a", 12, [I]).missing("GATES", 3).missing("GATES", 6).missing("radar.h", 1, "header")
    header, gates = sorted(found("invented-name", kernel), key=lambda finding: finding.place.line)
    assert (gates.message, gates.level) == ("The constant `GATES` is missing and was stood in for.", "note")
    assert "on lines 3 and 6" in gates.because[0]
    assert header.instead == "Give the folder that holds it with `--include DIR`."


def test_a_missing_name_that_a_bound_hangs_on_is_a_warning() -> None:
    until = loop("i", 10, None, why_unknown="the value of GATES is not known")
    kernel = Kernel().clean("a", 12, [until]).missing("GATES", 10).missing("STATION_GATES", 10, "function")
    levels = {finding.message: finding.level for finding in found("invented-name", kernel)}
    assert levels["The constant `GATES` is missing and was stood in for."] == "warning"
    assert levels["The function `STATION_GATES` is missing and was stood in for."] == "note"


@pytest.mark.parametrize("rule", FIND)
def test_no_sentence_names_a_thing_that_is_not_there(rule: str) -> None:
    kernel = Kernel()
    add: Callable[..., Kernel] = kernel.access
    blocks = ["data-dependent-guard", "data-dependent-exit", "interleaved", "load-and-store", "volatile"]
    for pattern in ("steered", "strided", "repeated", "descending", "indirect", "irregular", "sequential"):
        nameless = loop("loop at line 9", 9, None)
        add("x", 13, [nameless], pattern=pattern, stride=None, run=None, executions=None, blocked=blocks)
    for finding in found(rule, kernel):
        text = " ".join((finding.message, *finding.because, finding.instead))
        assert "None" not in text
        assert "``" not in text
        assert "  " not in text
