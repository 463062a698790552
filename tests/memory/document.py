"""docs/model.md: what a profile says, the limits, and the model beside its sources. Made, not typed."""

from __future__ import annotations

import inspect
import re
import statistics
from collections.abc import Sequence

from beatwise.memory import boards, limits, price, rows, switch
from beatwise.model.board import Board
from memory.measured import Check, checks, simulated

LIMITS = {
    "port": limits.port,
    "width": limits.port,
    "requests": limits.requests,
    "gaps": limits.gaps,
    "order": limits.order,
    "rows": rows.walk,
    "channel": limits.channel,
    "turnaround": rows.walk,
    "switch": switch.rates,
    "shared": price.price,
    "interval": limits.interval,
}
SAYS = {
    "width": "The same, of beats that are part-filled or part-used, or of a port narrower than the widest that pays.",
    "channel": "The cap of the board, measured, else peak less refresh; less what granules and beats carry unused.",
    "rows": "Named where it holds the channel below its peak. How: see `memory/rows.py`.",
    "turnaround": "The same walk with reads and writes in turns, so many granules of each before the bus turns.",
    "shared": "Users of one port divide what the port allows, ports on one channel what the channel allows.",
}
HEAD = """# The memory model

Made by the tests from the code and its tables (`pytest tests/memory --rewrite-golden`); do not edit.
GB/s are 10^9 byte/s. A price is the least of the limits that apply, each computed alone.
"""
BOARDS = """
## What a board's profile says

A TOML file with `about = "..."` and one table for each fact, with `value` and `source`. A fact with a default may be
left out. Rates in 10^9 byte/s, times in ns, clocks in MHz, sizes in bytes.

`address_map` names the fields of an address from high to low with their bits, above the bits within one granule. A
field may come in pieces; `row` without a number takes what is left.
The bits are those of `ranks`, `bank_groups`, `banks_per_group` and `page_bytes` / `granule_bytes`, all powers of two.
"""
MEASURED = """
## Measured values

`sets`: the value set a constant of the profile, so that agreement says nothing; all others are predicted.
`second hand`: quoted by others, from memory, or computed, not seen in the source itself.
Two measurements of random reads differ by 20 % in requests a second; the profile has a value between them.
Not modelled, and so not in the table: launch time, and the cap by page hits of a power guide.
"""
SIMULATED = """
## A simulated channel

Rows of `tests/memory/dram_cycle_sim.csv`; the profiles are in `tests/memory/boards/`, and say what was read out of
these very rows.
"""


def text() -> str:
    """The whole document."""
    parts = (HEAD, "\n## Limits\n\n", _limits(), BOARDS, "\n", _facts(), MEASURED, "\n", table(checks()))
    return "".join((*parts, SIMULATED, "\n", table(simulated())))


def table(items: Sequence[Check]) -> str:
    """Source, what was measured, its value, the model's, the error."""
    lines = ["| source | what | value | model | error | |", "|---|---|---:|---:|---:|---|"]
    for item in items:
        how = ", ".join(word for word, said in (("sets", item.sets), ("second hand", not item.seen)) if said)
        lines.append(
            f"| {item.source} | {item.what} | {item.value:.6g} | {item.model:.4g} | {item.error:+.1%} | {how} |"
        )
    errors = [abs(item.error) for item in items if item.seen and not item.sets]
    end = f"\nPredicted, from sources seen: {len(errors)}; median error {statistics.median(errors):.1%}.\n"
    return "\n".join(lines) + "\n" + end


def _limits() -> str:
    lines = ["| limit | what it says |", "|---|---|"]
    for name, function in LIMITS.items():
        first = " ".join((inspect.getdoc(function) or "").split("\n\n")[0].split())
        lines.append(f"| `{name}` | {SAYS.get(name, first)} |")
    return "\n".join(lines) + "\n"


def _facts() -> str:
    meanings = dict(re.findall(r"^    (\w+): [^#\n]*#: (.*)$", inspect.getsource(Board), re.MULTILINE))
    lines = ["| fact | what | expected | where it is left out |", "|---|---|---|---|"]
    for name, (_, expected) in boards.FACTS.items():
        default, says = boards.DEFAULTS.get(name, (None, "must be there"))
        if name in boards.DEFAULTS:
            says = says.removeprefix("not given; ")
            shown = f"{default}: {says}" if default not in (None, "") else says or "peak less refresh"
        else:
            shown = says
        lines.append(f"| `{name}` | {meanings[name]} | {expected} | {shown} |")
    return "\n".join(lines) + "\n"
