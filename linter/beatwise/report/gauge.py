"""What a pattern gets on a board, as text, as JSON, and as a chart over one of its numbers."""

from __future__ import annotations

import json
from collections.abc import Mapping, Sequence
from dataclasses import dataclass

from beatwise.report.escape import printable
from beatwise.report.figures import rate

NARROWEST_BAR = 10  #: columns of the chart


@dataclass(frozen=True, slots=True)
class Answer:
    """What one question got: GB/s in all and by every limit, the limit that counts, the share of a channel's peak."""

    gbps: float
    limit: str
    limits: Mapping[str, float]
    share_of_peak: float


@dataclass(frozen=True, slots=True)
class Question:
    """What was asked, in words, and the board that it was asked of."""

    board: str
    peak_gbps: float
    pattern: str


def gauge_text(question: Question, answer: Answer) -> str:
    """
    >>> print(gauge_text(Question("harbour", 14.4, "reads"), Answer(7.2, "rows", {"channel": 13.27, "rows": 7.2}, 0.5)))
    harbour: reads
    7.2 GB/s, 50 % of a channel's peak of 14.4 GB/s; held by rows
    <BLANKLINE>
    limit    GB/s
    rows     7.2
    channel  13.3
    <BLANKLINE>
    """
    names = max(map(len, answer.limits))
    rows = sorted(answer.limits.items(), key=lambda pair: pair[1])
    return "\n".join(
        (
            f"{printable(question.board)}: {question.pattern}",
            f"{rate(answer.gbps)} GB/s, {answer.share_of_peak:.0%} of a channel's peak of "
            f"{rate(question.peak_gbps)} GB/s; held by {answer.limit}".replace("%", " %"),
            "",
            f"{'limit':<{names}}  GB/s",
            *(f"{name:<{names}}  {rate(value)}" for name, value in rows),
            "",
        )
    )


def gauge_json(question: Question, answer: Answer) -> str:
    """One object; rates in 10^9 byte/s."""
    return json.dumps({"board": question.board, "pattern": question.pattern, **_facts(answer)}, indent=2) + "\n"


def sweep_json(question: Question, name: str, points: Sequence[tuple[int, Answer]]) -> str:
    """One object; ``points`` has one answer for each value of ``sweep``."""
    series = [{name: value, **_facts(answer)} for value, answer in points]
    whole = {"board": question.board, "pattern": question.pattern, "sweep": name, "points": series}
    return json.dumps(whole, indent=2) + "\n"


def sweep_text(
    question: Question, name: str, points: Sequence[tuple[int, Answer]], *, width: int, ascii_only: bool
) -> str:
    """A bar for each value, the longest for the highest rate or the peak, whichever is more.

    >>> points = [(32, Answer(3.6, "rows", {}, 0.25)), (64, Answer(14.4, "channel", {}, 1.0))]
    >>> print(sweep_text(Question("harbour", 14.4, "reads"), "run", points, width=48, ascii_only=True))
    harbour: reads
    the whole width is 14.4 GB/s
    <BLANKLINE>
    run  GB/s
     32   3.6  #######                       rows
     64  14.4  ############################  channel
    <BLANKLINE>
    """
    whole = max(question.peak_gbps, *(answer.gbps for _, answer in points))
    values = max(len(name), *(len(str(value)) for value, _ in points))
    rates = max(4, *(len(rate(answer.gbps)) for _, answer in points))
    limits = max(len(answer.limit) for _, answer in points)
    room = max(NARROWEST_BAR, width - values - rates - limits - 6)
    lines = [
        f"{printable(question.board)}: {question.pattern}",
        f"the whole width is {rate(whole)} GB/s",
        "",
        f"{name:>{values}}  {'GB/s':>{rates}}",
    ]
    for value, answer in points:
        bar = ("#" if ascii_only else "█") * round(answer.gbps / whole * room)
        lines.append(f"{value:>{values}}  {rate(answer.gbps):>{rates}}  {bar:<{room}}  {answer.limit}")
    return "\n".join((*lines, ""))


def _facts(answer: Answer) -> dict[str, object]:
    return {
        "gbps": answer.gbps,
        "share_of_peak": answer.share_of_peak,
        "limit": answer.limit,
        "limits": dict(answer.limits),
    }
