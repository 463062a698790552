"""What all tests share."""

from __future__ import annotations

import os
from pathlib import Path

import pytest

ROOT = Path(__file__).parents[1]


def pytest_addoption(parser: pytest.Parser) -> None:
    parser.addoption("--rewrite-golden", action="store_true", help="write the golden reports anew instead of comparing")


@pytest.fixture(autouse=True)
def no_terminal_settings(monkeypatch: pytest.MonkeyPatch) -> None:
    """Reports are made for 80 columns without colour, whatever the terminal that runs the tests."""
    for name in ("COLUMNS", "NO_COLOR", "FORCE_COLOR", "TERM"):
        monkeypatch.delenv(name, raising=False)


@pytest.fixture
def program_environment() -> dict[str, str]:
    """The environment in which `python -m beatwise` finds this checkout."""
    return os.environ | {"PYTHONPATH": os.pathsep.join((str(ROOT / "linter"), str(ROOT / "rules")))}
