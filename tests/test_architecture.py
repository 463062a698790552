"""The house: imports point one way, and each library is imported in one room."""

from __future__ import annotations

import ast
import subprocess
import sys
from collections.abc import Iterator
from pathlib import Path

import pytest

ROOT = Path(__file__).parents[1]
SOURCES = [path for root in ("linter/beatwise", "rules/beatwise_rules") for path in sorted((ROOT / root).rglob("*.py"))]

#: what each room may know, besides itself
MAY_KNOW = {
    "model": set(),
    "errors": set(),
    "source": {"model", "errors"},
    "memory": {"model", "errors"},
    "frontend": {"model", "errors", "source"},
    "trace": {"model", "source", "frontend"},
    "traffic": {"model", "memory", "source", "frontend", "trace"},
    "streams": {"model", "source", "frontend", "trace", "traffic"},
    "rules": {"model"},
    "report": {"model", "version"},
    "rework": {"model"},
    "settings": {"model", "errors", "source"},
    "acceptance": {"model", "source"},
    "workers": set(),
}

#: where each library lives
LIBRARIES = {
    "clang": "frontend",
    "tree_sitter": "source",
    "tree_sitter_cpp": "source",
    "networkx": "memory",
    "rich": "report",
    "click": "cli",
}


def room(path: Path) -> str:
    """The room a file belongs to: a folder's name, or a file's that stands at the top."""
    parts = path.relative_to(ROOT).parts
    if parts[1] == "beatwise_rules":
        return "rules"
    return "version" if parts[2] == "__init__.py" else parts[2].removesuffix(".py")


def imports(path: Path) -> Iterator[tuple[str, ...]]:
    """Every module that a file imports, wherever in the file, as its dotted parts."""
    for node in ast.walk(ast.parse(path.read_text(encoding="utf-8"))):
        if isinstance(node, ast.Import):
            yield from (tuple(alias.name.split(".")) for alias in node.names)
        elif isinstance(node, ast.ImportFrom):
            assert node.level == 0, f"{path}: imports are absolute"
            for alias in node.names:
                yield (*str(node.module).split("."), alias.name)


def known_room(module: tuple[str, ...]) -> str | None:
    """The room that an import reaches, None for what is not ours."""
    if module[0] == "beatwise_rules":
        return "rules"
    if module[0] != "beatwise":
        return None
    return "version" if module[1] == "__version__" else module[1]


def test_there_are_sources_to_look_at() -> None:
    assert {"model", "report", "rules"} <= {room(path) for path in SOURCES}


@pytest.mark.parametrize("path", SOURCES, ids=lambda path: str(path.relative_to(ROOT)))
def test_imports_point_one_way(path: Path) -> None:
    here = room(path)
    if here not in MAY_KNOW:
        assert here in ("survey", "cli", "__main__", "version"), f"{here} is a room that nobody placed"
        return
    reached = {known_room(module) for module in imports(path)} - {None, here}
    assert reached <= MAY_KNOW[here]


@pytest.mark.parametrize("path", SOURCES, ids=lambda path: str(path.relative_to(ROOT)))
def test_each_library_is_imported_in_its_own_room_only(path: Path) -> None:
    for module in imports(path):
        if module[0] in sys.stdlib_module_names or module[0] in ("beatwise", "beatwise_rules"):
            continue
        assert LIBRARIES.get(module[0]) == room(path), f"{path} imports {module[0]}"


def test_nothing_but_the_named_rooms_is_imported_before_it_is_needed() -> None:
    """The command line starts fast: what is heavy is imported where it is used."""
    heavy = {"clang", "rich", "tree_sitter", "networkx"}
    code = f"import sys, beatwise.cli; sys.exit(str(sorted({heavy} & set(sys.modules))))"
    paths = {"PYTHONPATH": f"{ROOT}/linter:{ROOT}/rules"}
    run = subprocess.run([sys.executable, "-c", code], capture_output=True, text=True, env=paths, check=False)
    assert run.stderr.strip() == "[]"


@pytest.mark.parametrize("path", SOURCES, ids=lambda path: str(path.relative_to(ROOT)))
def test_only_the_report_room_prints(path: Path) -> None:
    calls = [node for node in ast.walk(ast.parse(path.read_text(encoding="utf-8"))) if isinstance(node, ast.Call)]
    prints = [node.lineno for node in calls if isinstance(node.func, ast.Name) and node.func.id == "print"]
    assert room(path) == "report" or not prints
