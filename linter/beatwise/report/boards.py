"""The boards that are known, and one of them with the source of each of its facts."""

from __future__ import annotations

from collections.abc import Iterable
from dataclasses import fields
from textwrap import wrap

from beatwise.model.board import Board
from beatwise.report.escape import printable
from beatwise.report.figures import rate


def boards_text(boards: Iterable[Board]) -> str:
    """One line for each board: its name, what it is, and the peak of all its channels."""
    rows = [(board.name, board.about, rate(board.peak_gbps * board.channels)) for board in boards]
    names, abouts = (max(len(row[column]) for row in rows) for column in (0, 1))
    return "".join(f"{name:<{names}}  {about:<{abouts}}  {peak:>4} GB/s\n" for name, about, peak in rows)


def board_text(board: Board, width: int) -> str:
    """Every fact of a board with its source. Rates in 10^9 byte/s, times in ns, clocks in MHz, sizes in bytes."""
    facts = [(each.name, _value(getattr(board, each.name))) for each in fields(board) if each.name in board.sources]
    names, values = (max(len(fact[column]) for fact in facts) for column in (0, 1))
    values = min(values, 24)
    lines = [
        f"{printable(board.name)}: {printable(board.about)}",
        "Rates in 10^9 byte/s, times in ns, clocks in MHz, sizes in bytes.",
        "",
    ]
    for name, value in facts:
        source = printable(board.sources[name])
        if len(value) > values:
            lines.append(f"{name:<{names}}  {value}")
            name = value = ""
        head, *rest = wrap(source, max(30, width - names - values - 4))
        lines.append(f"{name:<{names}}  {value:<{values}}  {head}")
        lines += [" " * (names + values + 4) + line for line in rest]
    return "\n".join((*lines, ""))


def _value(value: object) -> str:
    return f"{value:.10g}" if isinstance(value, float) else printable(str(value)) or "-"
