"""The hook as its users meet it: the real pre-commit, on a scratch repository, from a commit of this one."""

from __future__ import annotations

import os
import shutil
import subprocess
import sys
from pathlib import Path

import pytest

ROOT = Path(__file__).parents[1]
SHIPPED = ("linter", "rules", "pyproject.toml", "README.md", "LICENSE", ".pre-commit-hooks.yaml")

WASTEFUL = """\
extern "C" void keep_strong(const float *gates, float *strong, const float *floor_dbz) {
#pragma HLS INTERFACE m_axi port=gates bundle=g0
#pragma HLS INTERFACE m_axi port=strong bundle=g1
#pragma HLS INTERFACE m_axi port=floor_dbz bundle=g2
    for (int i = 0; i < 4096; ++i) {
        if (gates[i] > floor_dbz[i]) strong[i] = gates[i];
    }
}
"""
CLEAN = """\
#include "ap_int.h"
extern "C" void copy_scan(const ap_uint<512> *gates, ap_uint<512> *out) {
#pragma HLS INTERFACE m_axi port=gates bundle=g0
#pragma HLS INTERFACE m_axi port=out bundle=g1
    for (int i = 0; i < 4096; ++i) {
#pragma HLS PIPELINE II=1
        out[i] = gates[i];
    }
}
"""
ORDINARY = "#include <vector>\nint stations(const std::vector<int> &list) { return static_cast<int>(list.size()); }\n"


def git(where: Path, *arguments: str) -> str:
    command = ["git", "-c", "user.name=A Station", "-c", "user.email=station@example.org", *arguments]
    return subprocess.run(command, cwd=where, capture_output=True, text=True, check=True).stdout.strip()


def committed(where: Path) -> str:
    git(where, "init", "-q")
    git(where, "add", "-A")
    git(where, "commit", "-q", "-m", "As it is")
    return git(where, "rev-parse", "HEAD")


@pytest.fixture(scope="module")
def hooked(tmp_path_factory: pytest.TempPathFactory) -> Path:
    """A user's repository whose pre-commit configuration names this project."""
    ours, theirs = tmp_path_factory.mktemp("hooks"), tmp_path_factory.mktemp("user")
    for name in SHIPPED:
        source = ROOT / name
        if source.is_dir():
            shutil.copytree(source, ours / name, ignore=shutil.ignore_patterns("__pycache__", "*.egg-info"))
        else:
            shutil.copy(source, ours / name)
    revision = committed(ours)
    (theirs / ".pre-commit-config.yaml").write_text(
        f"repos:\n  - repo: {ours}\n    rev: {revision}\n    hooks:\n      - id: beatwise\n", encoding="utf-8"
    )
    (theirs / "ordinary.cpp").write_text(ORDINARY, encoding="utf-8")
    (theirs / "empty.hpp").write_text("", encoding="utf-8")
    (theirs / "clean.cpp").write_text(CLEAN, encoding="utf-8")
    committed(theirs)
    return theirs


def run_hook(where: Path, home: Path) -> subprocess.CompletedProcess[str]:
    git(where, "add", "-A")
    return subprocess.run(
        [sys.executable, "-m", "pre_commit", "run", "beatwise", "--all-files", "--color", "never"],
        cwd=where,
        capture_output=True,
        text=True,
        env={key: value for key, value in os.environ.items() if key != "PYTHONPATH"} | {"PRE_COMMIT_HOME": str(home)},
        check=False,
    )


def test_the_hook_passes_clean_kernels_and_ordinary_files_and_stops_a_wasteful_one(
    hooked: Path, tmp_path: Path
) -> None:
    passed = run_hook(hooked, tmp_path)
    assert passed.returncode == 0, passed.stdout + passed.stderr
    assert "Passed" in passed.stdout
    (hooked / "wasteful.cpp").write_text(WASTEFUL, encoding="utf-8")
    stopped = run_hook(hooked, tmp_path)
    assert stopped.returncode == 1
    assert "guarded-access" in stopped.stdout
    assert "wasteful.cpp:6" in stopped.stdout
    assert "exit code: 1" in stopped.stdout
