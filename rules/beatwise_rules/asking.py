"""All rules together: which of them is told at each place, and how loud."""

from __future__ import annotations

import inspect
from collections.abc import Callable, Iterable, Iterator, Mapping
from dataclasses import dataclass, replace
from types import ModuleType
from typing import Literal

from beatwise.model.finding import LEVELS, Facts, Finding, Level
from beatwise.model.traffic import Block
from beatwise_rules import (
    assumed_size,
    data_dependent_destination,
    descending_access,
    early_exit,
    few_outstanding,
    guarded_access,
    in_place_update,
    indirect_index,
    interleaved_accesses,
    invented_name,
    misaligned_run,
    narrow_port,
    oversized_buffers,
    partial_record,
    read_write_turnaround,
    repeated_address,
    shared_port,
    short_run,
    strided_access,
    unresolved_access,
    volatile_access,
)
from beatwise_rules.levels import DEFAULTS, Thresholds, accesses_of, weighed
from beatwise_rules.sites import goes_on

Setting = Level | Literal["off"]


@dataclass(frozen=True, slots=True)
class Rule:
    """A rule: its name, its page in the manual, what it finds, and which later rules its cure settles too."""

    name: str
    page: str
    find: Callable[[Facts], Iterator[Finding]]
    cures: frozenset[str]


def _rule(module: ModuleType) -> Rule:
    name = module.__name__.rpartition(".")[2].replace("_", "-")
    return Rule(name, inspect.cleandoc(module.__doc__ or ""), module.find, module.CURES)


BY_CAUSE = tuple(
    map(
        _rule,
        (
            unresolved_access,
            data_dependent_destination,
            indirect_index,
            guarded_access,
            early_exit,
            volatile_access,
            repeated_address,
            descending_access,
            strided_access,
            in_place_update,
            interleaved_accesses,
            short_run,
            partial_record,
            narrow_port,
            misaligned_run,
            few_outstanding,
        ),
    )
)  #: rules about an access, the cause that must go first before the others
OF_THE_KERNEL = tuple(
    map(_rule, (shared_port, read_write_turnaround, oversized_buffers, assumed_size, invented_name))
)  #: told beside the others
RULES = BY_CAUSE + OF_THE_KERNEL

TOLD_ELSEWHERE: Mapping[Block, str] = {
    "destination-by-data": "data-dependent-destination",
    "load-and-store": "in-place-update",
    "interleaved": "interleaved-accesses",
}  #: what holds several accesses but is told at one of them: the others stay silent about lesser causes

Site = tuple[str, int, str | None]


def rule_names() -> tuple[str, ...]:
    """All rules, by cause."""
    return tuple(rule.name for rule in RULES)


def page(name: str) -> str:
    """The rule's page in the manual; KeyError where there is no such rule."""
    return {rule.name: rule.page for rule in RULES}[name]


def ask(
    facts: Facts, thresholds: Thresholds = DEFAULTS, levels: Mapping[str, Setting] | None = None
) -> tuple[Finding, ...]:
    """What there is to tell about a kernel, the gravest first, then by loss and place.

    ``levels`` overrides the level of a rule, by name; ``off`` leaves its findings out (nothing else is told instead).
    """
    wanted = levels or {}
    told = [*_joined(_by_cause(facts)), *_of_the_kernel(facts)]
    told = [_quieter(finding, told, facts) for finding in weighed(told, facts, thresholds)]
    told = [
        replace(finding, level=setting)
        if (setting := wanted.get(finding.rule)) is not None and setting != "off"
        else finding
        for finding in told
        if wanted.get(finding.rule) != "off"
    ]
    return tuple(sorted(told, key=_gravest_first))


def _gravest_first(finding: Finding) -> tuple[int, float, str, int, int, str]:
    place = finding.place
    return LEVELS.index(finding.level), -(finding.loss_gbps or 0.0), place.file, place.line, place.column, finding.rule


def _by_cause(facts: Facts) -> Iterator[Finding]:
    """For each site the finding of the first cause, with those that would still hold after it."""
    sites: dict[Site, list[Finding]] = {}
    for rule in BY_CAUSE:
        for finding in rule.find(facts):
            sites.setdefault(_site(finding), []).append(finding)
    cures, order = {rule.name: rule.cures for rule in BY_CAUSE}, rule_names()
    for site, findings in sites.items():
        first, *later = findings
        if _is_told_elsewhere(first, facts):
            continue
        if site[2] is None:
            later += [other for key, others in sites.items() if key[:2] == site[:2] and key != site for other in others]
        names = {finding.rule for finding in later} - cures[first.rule]
        lesser = (name for name in names if order.index(name) > order.index(first.rule))
        yield replace(first, then=tuple(sorted(lesser, key=order.index)))


def _site(finding: Finding) -> Site:
    return finding.place.file, finding.place.offset, finding.argument


def _is_told_elsewhere(first: Finding, facts: Facts) -> bool:
    """Whether a graver cause, told at another access, holds the site's accesses too."""
    here, order = list(filter(goes_on, accesses_of(first, facts))), rule_names()
    causes = {TOLD_ELSEWHERE[block] for traffic in here for block in traffic.blocked if block in TOLD_ELSEWHERE}
    if any(data_dependent_destination.is_steered(traffic) for traffic in here):
        causes.add("data-dependent-destination")
    return any(order.index(cause) < order.index(first.rule) for cause in causes)


def _joined(findings: Iterable[Finding]) -> Iterator[Finding]:
    """The findings; those of one rule on one line for one argument (``x[k] + x[k + 1]``) are told once, the worst."""
    lines: dict[tuple[str, str, int, str | None], list[Finding]] = {}
    for finding in findings:
        lines.setdefault((finding.rule, finding.place.file, finding.place.line, finding.argument), []).append(finding)
    for group in lines.values():
        worst = max(group, key=lambda finding: finding.loss_gbps or 0.0)
        names = {name for finding in group for name in finding.then}
        yield replace(worst, then=tuple(sorted(names, key=rule_names().index)))


def _of_the_kernel(facts: Facts) -> Iterator[Finding]:
    for rule in OF_THE_KERNEL:
        yield from rule.find(facts)


def _quieter(finding: Finding, told: Iterable[Finding], facts: Facts) -> Finding:
    """A note where the same loss is told already: a shared port whose accesses take turns, or whose channel turns
    around; and where the board has one channel, so that reads and writes have nowhere else to go."""
    before = {"shared-port": "interleaved-accesses", "read-write-turnaround": "shared-port"}.get(finding.rule)
    told_already = any(other.rule == before and other.interface == finding.interface for other in told)
    if told_already or (finding.rule == "read-write-turnaround" and facts.board.channels == 1):
        return replace(finding, level="note")
    return finding
