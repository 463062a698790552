"""The manual cannot go stale: the kernels on each rule's page are analysed like a user's."""

from __future__ import annotations

import re
import textwrap

import pytest

from beatwise.model.finding import LEVELS, Facts, Finding
from beatwise.survey import KernelSurvey, survey_texts
from beatwise_rules import RULES, Rule, page, rule_names

KERNEL = re.compile(r"^(Slow|Fast)::\n\n((?: {4}.*\n|\n)+)", re.MULTILINE)
BESIDE = {"assumed-size", "invented-name", "shared-port"}  #: speak beside the rules about an access


def kernels_in(rule: Rule) -> dict[str, str]:
    return {kind: textwrap.dedent(text) for kind, text in KERNEL.findall(rule.page + "\n")}


def analysed(text: str) -> KernelSurvey:
    (kernel,) = survey_texts({"kernel.cpp": text}, board="hbm2-32ch")
    return kernel


def told(rule: Rule, kernel: KernelSurvey) -> list[Finding]:
    return [finding for finding in kernel.findings if finding.rule == rule.name]


@pytest.mark.parametrize("rule", RULES, ids=lambda rule: rule.name)
def test_a_rule_reports_its_slow_kernel_and_spares_its_fast_one(rule: Rule) -> None:
    kernels = kernels_in(rule)
    assert told(rule, analysed(kernels["Slow"]))
    assert not told(rule, analysed(kernels["Fast"]))


@pytest.mark.parametrize("rule", RULES, ids=lambda rule: rule.name)
def test_the_fast_kernel_of_a_page_has_no_other_trouble(rule: Rule) -> None:
    findings = analysed(kernels_in(rule)["Fast"]).findings
    assert [(finding.rule, finding.level) for finding in findings if finding.rule not in BESIDE] == []


@pytest.mark.parametrize("rule", RULES, ids=lambda rule: rule.name)
def test_a_slow_kernel_shows_evidence_and_advice(rule: Rule) -> None:
    for finding in told(rule, analysed(kernels_in(rule)["Slow"])):
        assert finding.message.endswith(".")
        assert finding.because
        assert finding.instead
        assert finding.level in LEVELS
        assert (finding.place.file, finding.kernel) == ("kernel.cpp", finding.kernel)
        assert finding.place.line > 0


@pytest.mark.parametrize("rule", RULES, ids=lambda rule: rule.name)
def test_a_page_says_what_happens_when_it_matters_what_to_change_and_from_where(rule: Rule) -> None:
    text = page(rule.name)
    for part in ("It matters", "What to change:", "Slow::", "Fast::", "Sources:"):
        assert text.count(part) == 1, part
    assert max(map(len, text.splitlines())) <= 120


def test_every_rule_has_a_page_under_its_name() -> None:
    assert len(set(rule_names())) == len(RULES) == 17
    with pytest.raises(KeyError):
        page("no-such-rule")


def test_a_rule_says_nothing_of_a_kernel_without_accesses(empty: Facts) -> None:
    assert [finding for rule in RULES for finding in rule.find(empty)] == []
