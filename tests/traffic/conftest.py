"""Here accesses are walked the slow, obvious way; how the program walks them has tests of its own."""

from __future__ import annotations

import pytest

from beatwise.traffic import runs
from traffic.nests import walk_by_counting


@pytest.fixture(autouse=True)
def slow_walks(request: pytest.FixtureRequest, monkeypatch: pytest.MonkeyPatch) -> None:
    """Not for the tests of the walks themselves."""
    if not request.node.path.name.startswith("test_runs"):
        monkeypatch.setattr(runs, "walk", walk_by_counting)
