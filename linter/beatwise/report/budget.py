"""A kernel's budget in words: what one call moves, how long that takes, and what that makes of the board's peak."""

from __future__ import annotations

from collections.abc import Iterator

from beatwise.model.traffic import KernelTime, LoopTime
from beatwise.report.figures import plural, rate, time, volume

GAIN = 0.01  #: a gain of less than this share is none
LOOPS_SHOWN = 12  #: the slowest of more


def budget_lines(budget: KernelTime) -> Iterator[str]:
    """Sentences, the first what it is, the second what it would be; none where nothing is known to move."""
    if not budget.bytes_moved or not budget.total():
        return
    share = _percent(budget.gbps / budget.peak_gbps)
    board = f"{share} of the {rate(budget.peak_gbps)} GB/s of the board's memory"
    if budget.known:
        moved, about = volume(budget.bytes_moved), " where data decides by halves" if budget.basis == "data" else ""
        yield f"{moved} in {time(budget.total())} a call{about}: {rate(budget.gbps)} GB/s, {board}."
    else:
        yield f"{rate(budget.gbps)} GB/s over a whole call, {board}."
    if budget.total() - budget.could_total < GAIN * budget.total():
        yield "No advice would change that."
    else:
        took = f"{time(budget.could_total)}, " if budget.known else ""
        could = budget.could_gbps
        yield f"After all advice: {took}{rate(could)} GB/s, {_percent(could / budget.peak_gbps)} of it."
    if not budget.known:
        yield _unknown(budget)


def loop_rows(budget: KernelTime) -> list[tuple[str, str, str, str]]:
    """Line, name, time and time after all advice of each loop, the slowest first; none where times are not known."""
    if not budget.known or len(budget.loops) < 2:
        return []
    slowest = sorted(budget.loops, key=lambda loop: -loop.seconds())
    return [
        (str(loop.place.line), _name(loop), time(loop.seconds()), time(loop.could_seconds))
        for loop in slowest[:LOOPS_SHOWN]
    ]


def _name(loop: LoopTime) -> str:
    parts = (loop.name, f"process {loop.process[0]}" if loop.process else None)
    return ", ".join(part for part in parts if part)


def _unknown(budget: KernelTime) -> str:
    """Why there are no seconds, and what would give them."""
    if budget.lost:
        return f"No seconds: {plural(budget.lost, 'access', 'accesses')} could not be followed."
    ways = []
    if budget.wanted:
        ways.append(" ".join(f"`--given {name}=...`" for name in budget.wanted))
    if budget.unsized:
        lines = ", ".join(map(str, budget.unsized))
        ways.append(f"a trip-count directive in the {'loop' if len(budget.unsized) == 1 else 'loops'} on line {lines}")
    return f"Seconds need sizes: {' and '.join(ways)}." if ways else "No seconds: a size is not known."


def _percent(share: float) -> str:
    """
    >>> _percent(0.0288), _percent(0.5), _percent(0.0001)
    ('2.9 %', '50 %', '0.01 %')
    """
    return f"{100 * share:.2g} %" if share < 0.995 else "100 %"
