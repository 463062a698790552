"""Which findings the source accepts, and which of its acceptances mean nothing.

An acceptance counts when it gives a reason and covers the line of a finding of its rule. One without a reason, one of a
rule that does not exist and one that covers no finding are told as problems of their file; they change no exit status.
"""

from __future__ import annotations

from collections.abc import Collection, Iterable
from dataclasses import replace

from beatwise.model.finding import Finding
from beatwise.model.kernel import Problem
from beatwise.source.acceptances import Acceptance


def accepts(acceptance: Acceptance, finding: Finding) -> bool:
    """Whether the acceptance speaks of this finding, with or without a reason."""
    first, last = acceptance.lines
    place = finding.place
    return acceptance.rule == finding.rule and acceptance.place.file == place.file and first <= place.line <= last


def accepted(findings: Iterable[Finding], acceptances: Collection[Acceptance]) -> tuple[Finding, ...]:
    """The findings, those that the source accepts marked with the reason."""
    return tuple(_marked(finding, acceptances) for finding in findings)


def _marked(finding: Finding, acceptances: Iterable[Acceptance]) -> Finding:
    reasons = (each.reason for each in acceptances if each.reason and accepts(each, finding))
    return replace(finding, accepted=next(reasons, None))


def idle(
    acceptances: Iterable[Acceptance], used: Collection[Acceptance], rules: Collection[str]
) -> tuple[Problem, ...]:
    """What is to be told of acceptances that do not count; ``used`` are those that cover a finding."""
    told = ((each, _trouble(each, each in used, rules)) for each in acceptances)
    return tuple(Problem(each.place.file, each.place.line, what) for each, what in told if what)


def _trouble(acceptance: Acceptance, used: bool, rules: Collection[str]) -> str | None:
    rule = acceptance.rule
    if rule not in rules:
        return f"accepts {rule!r}, but there is no such rule (beatwise why lists them)"
    if not used:
        return f"accepts {rule}, but nothing of the kind is found there: the comment can go"
    if not acceptance.reason:
        return f"accepts {rule} without a reason, so it does not count: write 'beatwise accepts {rule}: why'"
    return None
