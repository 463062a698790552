from __future__ import annotations

import pytest

from beatwise.model.finding import Facts
from rules.builders import Kernel


@pytest.fixture
def empty() -> Facts:
    """A kernel that does nothing."""
    return Kernel().facts()
