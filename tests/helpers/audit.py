"""The program under test, run as a user runs it."""

from __future__ import annotations

import json
import os
import subprocess
import sys
from pathlib import Path
from typing import TYPE_CHECKING, Any

if TYPE_CHECKING:
    from collections.abc import Sequence

ROOT = Path(__file__).parents[2]
SECONDS = 60


def audit_json(paths: Sequence[Path], *options: str, folder: Path | None = None) -> dict[str, Any]:
    """What ``beatwise audit --as json`` says, run in ``folder`` (by default that of the first path)."""
    folder = folder or paths[0].parent
    command = [sys.executable, "-m", "beatwise", "audit", "--as", "json", *options]
    search = os.pathsep.join(str(ROOT / name) for name in ("linter", "rules"))
    done = subprocess.run(
        [*command, *(os.path.relpath(path, folder) for path in paths)],
        cwd=folder,
        env={**os.environ, "PYTHONPATH": search},
        capture_output=True,
        text=True,
        timeout=SECONDS,
        check=False,
    )
    if done.returncode not in (0, 1):
        raise AssertionError(f"audit ended with {done.returncode}: {done.stderr}")
    document: dict[str, Any] = json.loads(done.stdout)
    return document
