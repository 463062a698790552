"""The manual cannot go stale: the kernels on each rule's page are analysed like a user's."""

from __future__ import annotations

import re
import textwrap

import pytest

from beatwise.model.finding import LEVELS, Facts, Finding
from beatwise.survey import KernelSurvey, survey_texts
from beatwise_rules import RULES, Rule, page, rule_names

KERNEL = re.compile(r"^(Slow|Fast)::\n\n((?: {4}.*\n|\n)+)", re.MULTILINE)
BESIDE = {
    "assumed-size",
    "invented-name",
    "oversized-buffers",
    "read-write-turnaround",
    "shared-port",
}  #: speak beside the rules about an access


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
    assert len(set(rule_names())) == len(RULES) == 21
    with pytest.raises(KeyError):
        page("no-such-rule")


def test_a_rule_says_nothing_of_a_kernel_without_accesses(empty: Facts) -> None:
    assert [finding for rule in RULES for finding in rule.find(empty)] == []


WIDE = """
#include <ap_int.h>
void copy_sweep(const ap_uint<512> *sweep, ap_uint<512> *out) {{
#pragma HLS INTERFACE mode=m_axi port=sweep bundle={sweep} {options}
#pragma HLS INTERFACE mode=m_axi port=out bundle={out}
    for (int i = 0; i < 65536; ++i) out[i] = sweep[i];
}}
"""


def copies(sweep: str = "sweep", out: str = "out", options: str = "", board: str = "hbm2-32ch") -> dict[str, Finding]:
    (kernel,) = survey_texts({"kernel.cpp": WIDE.format(sweep=sweep, out=out, options=options)}, board=board)
    return {finding.rule: finding for finding in kernel.findings}


@pytest.mark.parametrize("board", ["hbm2-32ch", "ddr4-2400-1ch"])
def test_the_number_of_outstanding_transactions_that_is_advised_is_enough(board: str) -> None:
    told = copies(options="num_read_outstanding=1", board=board)["few-outstanding"]
    advised = re.search(r"num_read_outstanding=(\d+)", told.instead)
    assert advised is not None
    assert told.seconds_saved
    assert "few-outstanding" not in copies(options=f"num_read_outstanding={advised[1]}", board=board)


def test_half_the_number_that_is_advised_is_not_enough() -> None:
    advised = re.search(
        r"num_read_outstanding=(\d+)", copies(options="num_read_outstanding=1")["few-outstanding"].instead
    )
    assert advised is not None
    assert "few-outstanding" in copies(options=f"num_read_outstanding={int(advised[1]) // 2}")


@pytest.mark.parametrize("board", ["hbm2-32ch", "ddr4-2400-1ch"])
def test_the_buffer_that_is_advised_is_neither_too_large_nor_too_small(board: str) -> None:
    told = copies(options="num_read_outstanding=128 max_read_burst_length=64", board=board)["oversized-buffers"]
    advised = re.search(r"num_read_outstanding=(\d+)", told.instead)
    assert advised is not None
    after = copies(options=f"num_read_outstanding={advised[1]} max_read_burst_length=64", board=board)
    assert not {"oversized-buffers", "few-outstanding"} & after.keys()


def test_a_channel_that_turns_around_is_a_note_where_there_is_no_other() -> None:
    assert copies(board="ddr4-2400-1ch")["read-write-turnaround"].level == "note"
    assert "read-write-turnaround" not in copies(board="hbm2-32ch")


def test_a_channel_that_turns_around_is_told_beside_the_shared_port_without_weighing_twice() -> None:
    told = copies("gmem", "gmem")
    assert told["read-write-turnaround"].level == "note"
    assert told["read-write-turnaround"].could_gbps == pytest.approx(13.27, rel=0.05)
    assert "shared-port" in told


def test_a_turning_channel_that_nobody_waits_for_is_not_told() -> None:
    text = WIDE.format(sweep="gmem", out="gmem", options="").replace("out[i]", "out[i * 64]")
    (kernel,) = survey_texts({"kernel.cpp": text})
    assert "read-write-turnaround" not in {finding.rule for finding in kernel.findings}


def test_single_beats_are_not_called_good_bursts() -> None:
    """Eight counters are written in one go, a beat of 32 bytes: no number of transactions would help."""
    text = """
    void counters(const int *echoes, int *fill) {
    #pragma HLS INTERFACE mode=m_axi port=echoes bundle=echoes
    #pragma HLS INTERFACE mode=m_axi port=fill bundle=fill num_write_outstanding=1
        int local[8];
        for (int i = 0; i < 4096; ++i) local[i & 7] = echoes[i];
        for (int k = 0; k < 8; ++k) fill[k] = local[k];
    }
    """
    (kernel,) = survey_texts({"counters.cpp": text})
    assert "few-outstanding" not in {finding.rule for finding in kernel.findings}
