"""One cause, one finding: which rule is told at a site, what is left under ``then``, and how loud it is."""

from __future__ import annotations

from collections.abc import Callable
from functools import partial
from typing import Any, get_args

import pytest
from hypothesis import given
from hypothesis import strategies as st

from beatwise.model.finding import Finding
from beatwise.model.traffic import Block, Pattern
from beatwise_rules import RULES, Thresholds, ask, rule_names
from rules.builders import Kernel, choice, guard, loaded, loop, over

I = loop("i", 10, 65536)  # noqa: E741


def told(kernel: Kernel) -> list[tuple[str, tuple[str, ...]]]:
    return [(finding.rule, finding.then) for finding in ask(kernel.facts())]


def one(kernel: Kernel, **settings: Any) -> Finding:
    (finding,) = ask(kernel.facts(), **settings)
    return finding


def test_a_clean_kernel_is_silent() -> None:
    assert ask(Kernel().clean("in", 12, [I]).clean("out", 12, [I], direction="write", column=2).facts()) == ()


# ------------------------------------------------------------------------------------------------ the first cause wins


def test_a_steered_store_is_not_also_told_as_short_guarded_and_narrow() -> None:
    kernel, guards = Kernel(), (guard("dbz", 13, I),)
    blocks: list[Block] = ["destination-by-data", "data-dependent-guard"]
    add: Callable[..., Kernel] = partial(
        kernel.access, pattern="steered", run=2, basis="data", multiple=4, blocked=blocks
    )
    for name in ("wet", "dry"):
        add(name, 14, [I], direction="write", guards=guards, choice=choice("dbz", 13, ["wet", "dry"], I))
    assert told(kernel) == [("data-dependent-destination", ())]


@pytest.mark.parametrize(
    ("pattern", "blocked", "first", "then"),
    [
        ("indirect", ["data-dependent-guard", "load-and-store"], "indirect-index", ("in-place-update",)),
        (
            "sequential",
            ["data-dependent-guard", "data-dependent-exit"],
            "guarded-access",
            ("early-exit", "narrow-port"),
        ),
        ("strided", ["data-dependent-guard"], "guarded-access", ("strided-access",)),
        ("sequential", ["data-dependent-exit", "volatile"], "early-exit", ("volatile-access", "narrow-port")),
        ("sequential", ["volatile", "load-and-store"], "volatile-access", ("in-place-update", "narrow-port")),
        ("repeated", ["load-and-store"], "repeated-address", ("in-place-update",)),
        ("descending", ["not-ascending", "load-and-store"], "descending-access", ("in-place-update",)),
        ("strided", ["load-and-store", "interleaved"], "strided-access", ("in-place-update", "interleaved-accesses")),
        ("sequential", ["load-and-store", "interleaved"], "in-place-update", ("narrow-port",)),
        ("sequential", ["interleaved"], "interleaved-accesses", ("narrow-port",)),
    ],
)
def test_causes_stand_in_order(pattern: Pattern, blocked: list[Block], first: str, then: tuple[str, ...]) -> None:
    kernel = Kernel().access("x", 12, [I], direction="write", pattern=pattern, blocked=blocked, multiple=4, run=1000)
    assert told(kernel) == [(first, then)]


BY_CAUSE = (
    "unresolved-access",
    "data-dependent-destination",
    "indirect-index",
    "guarded-access",
    "early-exit",
    "volatile-access",
    "repeated-address",
    "descending-access",
    "strided-access",
    "in-place-update",
    "interleaved-accesses",
    "short-run",
    "partial-record",
    "narrow-port",
    "misaligned-run",
    "few-outstanding",
)
OF_THE_KERNEL = ("shared-port", "read-write-turnaround", "oversized-buffers", "assumed-size", "invented-name")


def test_rules_are_listed_by_cause_then_those_of_the_kernel() -> None:
    assert rule_names() == (*BY_CAUSE, *OF_THE_KERNEL)


def test_a_cure_settles_only_what_stands_later() -> None:
    for position, rule in enumerate(RULES):
        assert rule.cures <= set(rule_names()[position + 1 :])


# --------------------------------------------------------------------------------------------------- told in one place


def test_the_load_of_an_in_place_pair_is_covered_by_the_finding_at_the_store() -> None:
    kernel = Kernel().access("map", 12, [I], blocked=["load-and-store"], multiple=4)
    kernel.access("map", 13, [I], direction="write", blocked=["load-and-store"], multiple=4)
    assert told(kernel) == [("in-place-update", ("narrow-port",))]


def test_the_partner_of_an_interleaved_access_is_covered_by_the_finding_at_the_first() -> None:
    kernel = Kernel().access("x", 12, [I], blocked=["interleaved"], multiple=4)
    kernel.access("x", 13, [I], over((I, 4), start=4096), blocked=["interleaved"], multiple=4)
    assert told(kernel) == [("interleaved-accesses", ("narrow-port",))]


def test_a_load_and_a_store_at_one_place_are_one_finding() -> None:
    kernel = Kernel()
    for direction in ("read", "write"):
        kernel.access("power", 12, [I, loop("g", 11)], over((I, 4)), direction=direction, pattern="repeated", run=1)
    assert len(told(kernel)) == 1


def test_a_helper_that_is_called_for_two_arguments_gives_one_finding_for_each() -> None:
    kernel = Kernel()
    for name in ("horizontal", "vertical", "vertical"):
        kernel.access(name, 12, [I], over((I, 8)), pattern="strided", stride=8, run=1)
    assert sorted(finding.argument or "" for finding in ask(kernel.facts())) == ["horizontal", "vertical"]


def test_neighbours_on_one_line_with_one_trouble_are_told_once() -> None:
    kernel, index = Kernel(), loaded("cell", 11, I) * 4
    for column in (9, 20, 31):
        kernel.access("table", 12, [I], index + column, pattern="indirect", run=1, column=column)
    assert len(told(kernel)) == 1


def test_different_troubles_of_one_line_are_told_apart() -> None:
    kernel = Kernel().access("a", 12, [I], over((I, 8)), pattern="strided", stride=8, run=1)
    kernel.access("b", 12, [I], loaded("cell", 11, I) * 4, pattern="indirect", run=1, column=20)
    assert sorted(rule for rule, _ in told(kernel)) == ["indirect-index", "strided-access"]


def test_a_shared_port_is_a_note_where_taking_turns_is_told_already() -> None:
    kernel = Kernel().access("a", 12, [I], blocked=["interleaved"], interface="gmem")
    kernel.access("b", 12, [I], blocked=["interleaved"], interface="gmem", column=20)
    assert {finding.rule: finding.level for finding in ask(kernel.facts())} == {
        "interleaved-accesses": "error",
        "shared-port": "note",
    }


# ------------------------------------------------------------------------------------------------------------- levels


def strided(now: float, could: float = 10.0, executions: float | None = 65536) -> Kernel:
    kernel = Kernel().clean("rest", 20, [I], executions=None if executions is None else 1e6)
    rates = {"now": now, "could": could, "executions": executions}
    add: Callable[..., Kernel] = partial(kernel.access, pattern="strided", stride=8, run=1)
    return add("x", 12, [I], over((I, 8)), **rates)


@pytest.mark.parametrize(
    ("now", "level"),
    [(4.9, "error"), (5.0, "error"), (5.1, "warning"), (9.0, "warning"), (9.1, "note"), (10.0, "note")],
)
def test_the_level_follows_from_the_loss(now: float, level: str) -> None:
    assert one(strided(now)).level == level


def test_an_access_that_moves_less_than_a_hundredth_of_the_bytes_is_a_note() -> None:
    assert one(strided(0.1, executions=9_000)).level == "note"
    assert one(strided(0.1, executions=11_000)).level == "error"


def test_where_sizes_are_not_known_the_loss_alone_decides() -> None:
    assert one(strided(0.1, executions=None)).level == "error"


def test_thresholds_and_levels_can_be_set() -> None:
    assert one(strided(4.0), thresholds=Thresholds(error_loss=0.7)).level == "warning"
    assert one(strided(4.0), thresholds=Thresholds(error_loss=0.7, warning_loss=0.65)).level == "note"
    assert one(strided(4.0), thresholds=Thresholds(least_share=0.5)).level == "note"
    assert one(strided(4.0), levels={"strided-access": "note"}).level == "note"


def test_a_rule_that_is_off_tells_nothing_and_no_lesser_cause_steps_in() -> None:
    kernel = Kernel().access("x", 12, [I], blocked=["data-dependent-guard", "data-dependent-exit"])
    assert ask(kernel.facts(), levels={"guarded-access": "off"}) == ()


def test_the_gravest_comes_first_then_the_greatest_loss() -> None:
    kernel = Kernel()
    for line, (now, could) in enumerate([(9.5, 10.0), (1.0, 10.0), (1.0, 4.0), (8.0, 10.0)], 12):
        kernel.access("x", line, [I], over((I, 8)), pattern="strided", stride=8, run=1, now=now, could=could)
    assert [finding.place.line for finding in ask(kernel.facts())] == [13, 14, 15, 12]


# ----------------------------------------------------------------------------------------------------------- evidence


def last_line(kernel: Kernel) -> str:
    return one(kernel).because[-1]


def test_the_rate_of_single_beat_reads_is_spelt_out() -> None:
    wait_ns = 253 + 1.2 * 1000 / 300
    assert last_line(strided(16 * 4 / wait_ns, 13.27)) == (
        "1 beat of 4 bytes per request, 16 outstanding over 257 ns: 0.25 GB/s; "
        "long full-width bursts would get 13.3 GB/s."
    )


def test_the_outstanding_requests_of_the_port_count() -> None:
    kernel = strided(4 * 4 / 257, 13.27).port("x", read_outstanding=4)
    assert last_line(kernel).startswith("1 beat of 4 bytes per request, 4 outstanding over 257 ns: 0.062 GB/s")


def test_the_rate_of_requests_binds_when_many_are_outstanding() -> None:
    kernel = strided(4 / (4 * 1000 / 300), 13.27).port("x", read_outstanding=64)
    assert last_line(kernel).startswith("1 beat of 4 bytes per request, one request in 4 cycles at 300 MHz: 0.30 GB/s")


def test_the_gap_between_bursts_of_writes_is_spelt_out() -> None:
    kernel = Kernel().access("x", 12, [I], direction="write", now=0.96, limit="gaps", beats=16, multiple=4)
    assert last_line(kernel).startswith("16 beats of 4 bytes per request, then 4 beats lost, at 300 MHz: 0.96 GB/s")


def test_what_a_port_is_shared_by_is_spelt_out() -> None:
    kernel = Kernel().access("x", 12, [I], now=0.6, limit="width", beats=16, multiple=4)
    assert last_line(kernel).startswith("4 bytes a cycle at 300 MHz: 1.20 GB/s, shared by 2 accesses: 0.60 GB/s")


def test_elements_that_do_not_fill_their_beat_are_reckoned_with() -> None:
    kernel = Kernel().access("x", 12, [I], now=3.6, limit="width", element=12, width=128, beats=16, multiple=4)
    finding = next(finding for finding in ask(kernel.facts()) if finding.rule == "narrow-port")
    assert finding.because[-1].startswith("16 bytes a cycle at 300 MHz: 4.80 GB/s, 75 % of it used: 3.60 GB/s")


def test_arithmetic_that_does_not_give_the_rate_is_not_shown() -> None:
    kernel = Kernel().access("x", 12, [I], now=0.7, limit="width", beats=16, multiple=4)
    assert last_line(kernel) == "It gets 0.70 GB/s; long full-width bursts would get 13.3 GB/s."


def test_a_trouble_that_costs_nothing_says_so() -> None:
    finding = one(strided(10.0))
    assert finding.because[-1].startswith("It gets 10.0 GB/s all the same")
    assert finding.level == "note"


def halved(**more: Any) -> Kernel:
    return Kernel().access("x", 12, [I], over((I, 8)), pattern="strided", stride=8, run=1, now=5.0, could=10.0, **more)


def test_the_seconds_saved_follow_from_known_sizes_only() -> None:
    assert one(halved()).seconds_saved == pytest.approx(65536 * 4 / 5e9 - 65536 * 4 / 10e9)
    strided_one = next(each for each in ask(halved(basis="assumed").facts()) if each.rule == "strided-access")
    assert strided_one.seconds_saved is None


def test_what_waits_for_a_slower_neighbour_saves_only_up_to_that() -> None:
    kernel = halved().clean("rest", 20, [I], executions=65536, now=8.0, could=8.0)
    assert one(kernel).seconds_saved == pytest.approx(65536 * 4 / 5e9 - 65536 * 4 / 8e9)


# ------------------------------------------------------------------------------------------------------- whatever comes

PATTERNS: tuple[Pattern, ...] = get_args(Pattern)
BLOCKS: tuple[Block, ...] = get_args(Block)


@st.composite
def kernels(draw: st.DrawFn) -> Kernel:
    """Kernels of a few accesses about which anything may have been measured."""
    kernel, shared = Kernel(), loop("i", 10)
    for _ in range(draw(st.integers(1, 5))):
        name, line = draw(st.sampled_from("abc")), draw(st.integers(12, 15))
        loops = draw(st.sampled_from([[], [shared], [shared, loop("j", 11, draw(st.sampled_from([None, 8, "n"])))]]))
        element, could = draw(st.sampled_from([1, 2, 4, 12, 64])), draw(st.floats(0.01, 13.27))
        kernel.access(
            name,
            line,
            loops,
            loaded("x", 11, *loops) * 4 if draw(st.booleans()) else over(*((each, element) for each in loops)),
            direction=draw(st.sampled_from(["read", "write"])),
            pattern=draw(st.sampled_from(PATTERNS)),
            stride=draw(st.sampled_from([None, 0, element, -element, 3 * element + 1])),
            run=draw(st.sampled_from([None, 1, 4 / 3, 8, 1000])),
            basis=draw(st.sampled_from(["constant", "assumed", "data"])),
            executions=draw(st.sampled_from([None, 0, 1, 500, 1e6])),
            element=element,
            part=draw(st.integers(1, element)),
            width=draw(st.sampled_from([8, 32, 128, 512])),
            beats=draw(st.sampled_from([1, 16])),
            blocked=draw(st.lists(st.sampled_from(BLOCKS), unique=True)),
            now=could * draw(st.floats(0, 1)),
            could=could,
            limit=draw(st.sampled_from(["requests", "gaps", "width", "port", "channel", "order"])),
            interface=draw(st.sampled_from([None, "gmem"])),
            process=draw(st.sampled_from([None, "load", "store"])),
            choice=draw(st.sampled_from([None, choice("x", 11, ["a", "b"], *loops)])),
        )
    return kernel


@given(kernels())
def test_whatever_was_measured_a_site_has_one_finding_at_most(kernel: Kernel) -> None:
    findings = [finding for finding in ask(kernel.facts()) if finding.rule in BY_CAUSE]
    sites = [(finding.place, finding.argument) for finding in findings]
    assert len(sites) == len(set(sites))
    for finding in findings:
        assert all(rule_names().index(rule) > rule_names().index(finding.rule) for rule in finding.then)
        assert finding.message.endswith(".")
        assert all(line.endswith(".") for line in (*finding.because, finding.instead))


@given(kernels())
def test_no_argument_that_is_walked_out_of_order_goes_without_a_finding(kernel: Kernel) -> None:
    facts = kernel.facts()
    spoken = {finding.argument for finding in ask(facts)} | {
        name for finding in ask(facts) if finding.argument is None for name in ("a", "b", "c")
    }
    for traffic in facts.traffic:
        told_of = traffic.walk.pattern in ("indirect", "strided", "repeated", "descending") and traffic.access.loops
        assert not told_of or traffic.access.argument in spoken
