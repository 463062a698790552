"""Random loop nests: the audit beside a slow walk, the walk beside the compiled kernel and beside an exact count."""

from __future__ import annotations

import tempfile
from collections import Counter
from itertools import pairwise
from pathlib import Path

import pytest
from hypothesis import HealthCheck, given, note, settings
from hypothesis import strategies as st

from generated.exact import facts_of
from generated.nests import ELEMENT_BYTES, Nest
from generated.strategies import affine_nests, nests
from helpers.audit import audit_json
from oracle import Argument, observe
from oracle.observe import run_of
from oracle.truth import agrees

KERNELS_A_FILE = 8  #: one start of the program serves them all
SLOW = settings(deadline=None, suppress_health_check=[HealthCheck.too_slow, HealthCheck.data_too_large])


@pytest.fixture(scope="module")
def scratch(tmp_path_factory: pytest.TempPathFactory) -> Path:
    return tmp_path_factory.mktemp("oracle")


def pieces(nest: Nest) -> list[tuple[int, int]]:
    return [(element, 1) for element in nest.walk()]


def certain_pattern(nest: Nest) -> str | None:
    """The pattern where no reading of the definitions could give another: one step rules the innermost loop."""
    walked = nest.walk()
    if len(walked) < 2:
        return None
    step, times = Counter(after - before for before, after in pairwise(walked)).most_common(1)[0]
    if times / (len(walked) - 1) < 0.75:
        return None
    return {1: "sequential", -1: "descending", 0: "repeated"}.get(step, "strided")


def true_run(nest: Nest, pattern: str) -> float:
    """A repeated access has run 1, though it may move on by one element now and then."""
    return 1.0 if pattern == "repeated" else run_of(pieces(nest))


def wrong(nest: Nest, name: str, document: dict[str, object]) -> list[str]:
    """What the audit says of the nest's load that the walk does not bear out."""
    (kernel,) = [kernel for kernel in document["kernels"] if kernel["name"] == name]  # type: ignore[attr-defined]
    loads = [access for access in kernel["accesses"] if access["argument"] == "in"]
    if not nest.walk():
        return [f"{len(loads)} loads, but none runs"] if any(load["executions"] for load in loads) else []
    if len(loads) != 1:
        return [f"{len(loads)} loads"]
    found = []
    (load,) = loads
    run, pattern = true_run(nest, load["pattern"]), certain_pattern(nest)
    if load["run_elements"] is None or not agrees(load["run_elements"], run):
        found.append(f"run {load['run_elements']}, true {run}; {load['pattern']}, {load['reason']}")
    if pattern not in (None, load["pattern"]):
        found.append(f"pattern {load['pattern']}, true {pattern}")
    if pattern == "strided":
        step = Counter(after - before for before, after in pairwise(nest.walk())).most_common(1)[0][0]
        if load["stride_bytes"] != step * ELEMENT_BYTES:
            found.append(f"stride {load['stride_bytes']}, true {step * ELEMENT_BYTES}")
    if load["guarded"]:
        found.append("guarded, but no data decides")
    return found


@settings(SLOW, max_examples=25)
@given(st.lists(nests(), min_size=1, max_size=KERNELS_A_FILE))
def test_audit_agrees_with_walking(drawn: list[Nest]) -> None:
    text = "\n".join(nest.text(f"nest{number}") for number, nest in enumerate(drawn))
    note(text)
    with tempfile.TemporaryDirectory() as folder:
        source = Path(folder) / "nests.cpp"
        source.write_text(text)
        document = audit_json([source])
    assert [said for number, nest in enumerate(drawn) for said in wrong(nest, f"nest{number}", document)] == []


@settings(SLOW, max_examples=30)
@given(nest=nests())
def test_the_compiled_kernel_agrees_with_walking(nest: Nest, scratch: Path) -> None:
    text = nest.text("nest")
    note(text)
    arguments = (Argument("in", "memory", count=nest.extent), Argument("out", "memory", count=1))
    with tempfile.TemporaryDirectory() as folder:
        source = Path(folder) / "nest.cpp"
        source.write_text(text)
        observed = observe(source, "nest", arguments, scratch)
    loads = [site.pieces for site in observed if site.argument == "in"]
    assert loads == ([tuple(pieces(nest))] if nest.walk() else [])


@settings(SLOW, max_examples=200)
@given(affine_nests())
def test_an_exact_count_agrees_with_walking(nest: Nest) -> None:
    note(nest.text("nest"))
    facts, walked = facts_of(nest), nest.walk()
    assert (facts.executions, facts.footprint) == (len(walked), len(set(walked)))
    assert (facts.first, facts.last) == (min(walked), max(walked))
    assert facts.run == pytest.approx(run_of(pieces(nest)))


@settings(SLOW, max_examples=10)
@given(st.lists(affine_nests(), min_size=1, max_size=KERNELS_A_FILE))
def test_audit_agrees_with_an_exact_count(drawn: list[Nest]) -> None:
    text = "\n".join(nest.text(f"nest{number}") for number, nest in enumerate(drawn))
    note(text)
    with tempfile.TemporaryDirectory() as folder:
        source = Path(folder) / "nests.cpp"
        source.write_text(text)
        document = audit_json([source])
    for number, nest in enumerate(drawn):
        facts = facts_of(nest)
        (kernel,) = [kernel for kernel in document["kernels"] if kernel["name"] == f"nest{number}"]
        (load,) = [access for access in kernel["accesses"] if access["argument"] == "in"]
        assert load["executions"] == facts.executions
        if load["pattern"] != "repeated":
            assert load["run_elements"] == pytest.approx(facts.run, rel=0.1)
