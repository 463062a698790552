"""The memory model against measured and simulated values, and the document that shows both."""

from __future__ import annotations

import statistics
import sys
from pathlib import Path

import pytest

from memory import document
from memory.measured import Check, checks, simulated

ROOT = Path(__file__).parents[2]
MEASURED, SIMULATED = checks(), simulated()


def name(check: Check) -> str:
    return f"{check.source}: {check.what}"


@pytest.mark.parametrize("check", MEASURED, ids=name)
def test_a_published_value(check: Check) -> None:
    assert check.model == pytest.approx(check.value, rel=check.tolerance, abs=1e-12)


@pytest.mark.parametrize("check", SIMULATED, ids=name)
def test_a_simulated_value(check: Check) -> None:
    assert check.model == pytest.approx(check.value, rel=check.tolerance)


def test_the_median_error_of_what_is_predicted_from_sources_seen_is_within_3_percent() -> None:
    for table, many in ((MEASURED, 30), (SIMULATED, 50)):
        errors = [abs(check.error) for check in table if check.seen and not check.sets]
        assert len(errors) >= many
        assert statistics.median(errors) < 0.03


def test_every_row_of_the_simulation_is_there() -> None:
    assert len(SIMULATED) == 76
    assert {check.source for check in SIMULATED} == {"hbm2-pseudo-channel-2.0Gbps", "ddr4-2400-64bit"}


def test_the_document_shows_what_the_model_says_today(request: pytest.FixtureRequest) -> None:
    """``--rewrite-golden`` writes it anew; ``-s`` shows the table of model against source."""
    text, file = document.text(), ROOT / "docs" / "model.md"
    sys.stdout.write(document.table(MEASURED) + document.table(SIMULATED))
    if request.config.getoption("--rewrite-golden"):
        file.write_text(text, encoding="utf-8")
    assert file.read_text("utf-8") == text, "docs/model.md is stale: --rewrite-golden"
