"""A name was stood in for, because its header or macro is missing.

The sources include something that was not given. So that the rest can still be read, a stand-in is declared for what
is missing: a type of no known size, a constant of no known value, a function that does nothing known. Nothing is
computed from it, so an address or a loop bound that depends on it is unknown too.

It matters when it is a size or a type that memory is laid out by; such a stand-in is told as a warning, any other as
a note.

What to change: give the folder of the header with `--include DIR`, or the macro with `--define NAME=VALUE`.

Slow::

    #include "station_config.h"

    // The number of gates stands in a header that is not there.
    void clear(float *sweep) {
    #pragma HLS INTERFACE mode=m_axi port=sweep bundle=sweep
        for (int i = 0; i < STATION_GATES; ++i) sweep[i] = 0;
    }

Fast::

    // The number of gates stands here.
    #define STATION_GATES 4096
    void clear(float *sweep) {
    #pragma HLS INTERFACE mode=m_axi port=sweep bundle=sweep
        for (int i = 0; i < STATION_GATES; ++i) sweep[i] = 0;
    }

Sources: none needed.
"""

from __future__ import annotations

import re
from collections.abc import Iterable, Iterator

from beatwise.model.access import Access
from beatwise.model.finding import Facts, Finding
from beatwise.model.form import Form
from beatwise.model.kernel import Invention
from beatwise_rules.wording import lines, listed, quoted

CURES: frozenset[str] = frozenset()

CONSEQUENCE = {
    "header": "what it declares is stood in for where it is used",
    "type": "its size is not known",
    "template": "its size is not known",
    "constant": "its value is not known, and nothing is computed from it",
    "function": "what it does to memory is not known",
    "member": "its type is not known",
    "namespace": "what it holds is stood in for where it is used",
}


def find(facts: Facts) -> Iterator[Finding]:
    """One finding for each missing name, at its first use."""
    named: dict[str, list[Invention]] = {}
    for invention in facts.trace.inventions:
        named.setdefault(invention.name, []).append(invention)
    for name, uses in named.items():
        yield _told(facts, name, uses)


def _told(facts: Facts, name: str, uses: list[Invention]) -> Finding:
    first = min(uses, key=lambda use: use.place)
    hanging = [traffic.access for traffic in facts.traffic if _hangs_on(traffic.access, name, uses)]
    evidence = [f"{quoted(name)} is used on {lines(use.place.line for use in uses)}: {CONSEQUENCE[first.what]}."]
    if hanging:
        what = f"{listed(access.argument for access in hanging)} on {lines(access.place.line for access in hanging)}"
        evidence.append(f"An address, a length or a condition of {what} depends on it.")
    return Finding(
        rule="invented-name",
        level="warning" if hanging else "note",
        kernel=facts.trace.kernel,
        place=first.place,
        argument=None,
        interface=None,
        message=f"The {first.what} {quoted(name)} is missing and was stood in for.",
        because=tuple(evidence),
        instead=_advice(first),
    )


def _advice(invention: Invention) -> str:
    if invention.what == "header":
        return "Give the folder that holds it with `--include DIR`."
    macro = f", or `--define {invention.name}=VALUE` if it is a macro" if invention.what == "constant" else ""
    return f"Give the header that declares it with `--include DIR`{macro}."


def _hangs_on(access: Access, name: str, uses: Iterable[Invention]) -> bool:
    """Whether an address, a bound or a condition of the access was made unknown by the name."""
    word = re.compile(rf"(?<!\w){re.escape(name)}(?!\w)")
    lines_of_use = {(use.place.file, use.place.line) for use in uses if use.what != "header"}
    unknown = [symbol for form in _forms(access) for symbol in form.leaves() if symbol.kind == "unknown"]
    reasons = [access.unresolved, *(loop.why_unknown for loop in access.loops), *(symbol.reason for symbol in unknown)]
    return any(reason is not None and word.search(reason) for reason in reasons) or any(
        symbol.place is not None and (symbol.place.file, symbol.place.line) in lines_of_use for symbol in unknown
    )


def _forms(access: Access) -> Iterable[Form]:
    yield access.offset
    yield from (guard.condition for guard in access.guards)
    yield from (loop.trips for loop in access.loops if loop.trips is not None)
