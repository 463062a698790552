"""The program's answer about a kernel beside the truth in the kernel's comments."""

from __future__ import annotations

from typing import TYPE_CHECKING, Any

from oracle.truth import Expectation, Truth, agrees

if TYPE_CHECKING:
    from collections.abc import Callable, Mapping

#: what a rule says about a pattern must be borne out by a pattern that the kernel's comments state
NEEDS: Mapping[str, Callable[[Expectation], bool]] = {
    "strided-access": lambda one: "strided" in one.patterns,
    "descending-access": lambda one: "descending" in one.patterns,
    "repeated-address": lambda one: "repeated" in one.patterns,
    "indirect-index": lambda one: "indirect" in one.patterns,
    "data-dependent-destination": lambda one: "steered" in one.patterns,
    "guarded-access": lambda one: one.guarded,
    "early-exit": lambda one: "early-exit" in one.tells,
    "volatile-access": lambda one: "volatile-access" in one.tells,
    "partial-record": lambda one: "partial-record" in one.tells,
    "interleaved-accesses": lambda one: "interleaved-accesses" in one.tells or "sequential" not in one.patterns,
    "unresolved-access": lambda one: "unresolved" in one.patterns,
    "invented-name": lambda _: False,
}

#: what stops the bursts of an access that a rule is told about
BLOCKED_BY = {
    "guarded-access": "data-dependent-guard",
    "early-exit": "data-dependent-exit",
    "interleaved-accesses": "interleaved",
    "in-place-update": "load-and-store",
    "volatile-access": "volatile",
    "descending-access": "not-ascending",
    "data-dependent-destination": "destination-by-data",
}


def disagreements(truth: Truth, document: Mapping[str, Any]) -> list[str]:
    """One line for each access, finding or silence in the program's answer that the truth does not bear out."""
    kernels = [kernel for kernel in document["kernels"] if kernel["name"] == truth.top]
    if len(kernels) != 1:
        return [f"{len(kernels)} kernels named {truth.top}; problems: {document['problems']}"]
    return wrong_accesses(truth, kernels[0]["accesses"]) + wrong_findings(
        truth, [finding for finding in document["findings"] if finding["kernel"] == truth.top]
    )


def wrong_accesses(truth: Truth, entries: list[Mapping[str, Any]]) -> list[str]:
    found = []
    told: set[Expectation] = set()
    for entry in entries:
        key = (entry["line"], entry["argument"], entry["direction"])
        candidates = [one for one in truth.expectations if one.key == key]
        matching = [one for one in candidates if says(entry, one)]
        told.update(matching)
        if not matching:
            found.append(f"{show(entry)} but true is {candidates or 'no such access'}")
    reached = {(entry["line"], entry["argument"], entry["direction"]) for entry in entries}
    for one in truth.expectations:
        if one not in told:
            found.append(f"{'told otherwise' if one.key in reached else 'not found'}: {one}")
    return found


def says(entry: Mapping[str, Any], one: Expectation) -> bool:
    """Whether an access in the answer is what the expectation states."""
    run = entry["run_elements"]
    facts = (
        entry["pattern"] in one.patterns,
        one.run is None or (run is not None and agrees(run, one.run)),
        one.stride_bytes in (None, entry["stride_bytes"]),
        one.element_bytes in (None, entry["element_bytes"]),
        one.basis in (None, entry["basis"]),
        "steered" in one.patterns or one.joined is not None or entry["guarded"] == one.guarded,
        all(BLOCKED_BY[rule] in entry["blocked"] for rule in one.tells if rule in BLOCKED_BY),
    )
    return all(facts)


def wrong_findings(truth: Truth, findings: list[Mapping[str, Any]]) -> list[str]:
    found = []
    for one in truth.expectations:
        for rule in one.tells:
            about = [finding for finding in findings if finding["rule"] == rule]
            if "steered" not in one.patterns:
                about = [finding for finding in about if finding["argument"] in (None, one.argument)]
            if not about:
                found.append(f"{rule} is not told of {one.argument}, line {one.line}")
    rules = {finding["rule"] for finding in findings}
    found += [f"{rule} is not told" for rule in truth.tells if rule not in rules]
    for finding in findings:
        rule, argument = finding["rule"], finding["argument"]
        reasons = [one for one in truth.expectations if argument in (None, one.argument)]
        if rule in NEEDS and rule not in truth.tells and not any(map(NEEDS[rule], reasons)):
            found.append(f"{rule} is told of {argument}, line {finding['line']}: {finding['message']}")
        elif truth.quiet and finding["level"] != "note":
            found.append(f"not quiet: {rule} ({finding['level']}), line {finding['line']}: {finding['message']}")
    return found


def show(entry: Mapping[str, Any]) -> str:
    keys = ("pattern", "run_elements", "stride_bytes", "element_bytes", "basis", "guarded", "blocked", "reason")
    facts = " ".join(f"{key}={entry[key]}" for key in keys)
    return f"line {entry['line']}: {entry['direction']} {entry['argument']} {facts}"
