"""The instrument sheet: for each kernel what its ports get of what they could get, in GB/s, then what costs the most.

Layouts are made for 80 columns and use more where there is more: from ``WIDE`` columns on, evidence and advice stand
side by side, and the access table shows all its columns where they fit.
"""

from __future__ import annotations

import os
from collections.abc import Sequence
from itertools import groupby
from typing import TextIO

from rich.cells import cell_len
from rich.console import Console
from rich.table import Table
from rich.text import Text

from beatwise.model.finding import Finding, Level
from beatwise.model.kernel import Problem
from beatwise.model.traffic import PortTraffic
from beatwise.report.budget import budget_lines, loop_rows
from beatwise.report.escape import printable
from beatwise.report.figures import amount, loss, plural, rate, signed, time
from beatwise.report.sheet import AccessRow, Sheet, StreamRow, Survey, at_or_above, grouped

WIDE = 120  #: columns from which evidence and advice stand side by side
LABEL = 11
DISCLAIMER = "Estimates from the source and the board's profile; the synthesis report and the board decide."
COLOURS = {"error": "red", "warning": "yellow", "note": "cyan"}


def audit_text(
    survey: Survey, *, width: int = 80, colour: bool = False, ascii_only: bool = False, problems: bool = True
) -> str:
    """The full picture of every kernel. ``problems``: whether to list what could not be done."""
    page = _Page(width, colour, ascii_only)
    for sheet in survey.kernels:
        _head(page, sheet, survey.board)
        _ports(page, sheet)
        _budget(page, sheet)
        _costs(page, sheet.findings)
        _accesses(page, sheet.accesses)
        _loops(page, sheet)
        _streams(page, sheet.streams)
    if problems and survey.problems:
        page.rule("not done", "")
        for problem in survey.problems:
            page.wrapped(Text(problem_line(problem)), indent=2)
        page.gap()
    if survey.kernels:
        page.wrapped(Text(DISCLAIMER, style="dim"))
    return page.text()


def sift_text(
    survey: Survey, threshold: Level, *, width: int = 80, colour: bool = False, ascii_only: bool = False
) -> str:
    """The findings at ``threshold`` or graver, without those accepted, and one line that sums up."""
    page = _Page(width, colour, ascii_only)
    told = 0
    for sheet in survey.kernels:
        findings = at_or_above(sheet.findings, threshold)
        told += len(findings)
        if findings:
            page.rule(sheet.kernel, f"{sheet.file}:{sheet.line}")
            page.gap()
        for alike in grouped(findings):
            _cost(page, alike, brief=True)
    page.wrapped(Text(_summary(survey, told, threshold)))
    return page.text()


def problem_line(problem: Problem) -> str:
    """One line: where, then what."""
    where = problem.file if problem.line is None else f"{problem.file}:{problem.line}"
    return printable(f"{where}: {problem.what}" if where else problem.what)


def capable(stream: TextIO) -> tuple[bool, bool]:
    """Whether ``stream`` takes colour, and whether it can only take ASCII."""
    colour = stream.isatty() and not os.environ.get("NO_COLOR") and os.environ.get("TERM") != "dumb"
    try:
        "━╸┄┤▏·−→×".encode(stream.encoding or "ascii")
    except (UnicodeEncodeError, LookupError):
        return colour, True
    return colour, False


# ------------------------------------------------------------------------------------------------------- the page


class _Page:
    """Collects rendered blocks; every text that reaches it from outside goes through ``printable`` first."""

    def __init__(self, width: int, colour: bool, ascii_only: bool) -> None:
        self.width, self.colour = max(width, 40), colour
        self.marks = _ASCII if ascii_only else _LINES
        self.console = Console(
            width=self.width,
            force_terminal=colour,
            color_system="standard" if colour else None,
            no_color=not colour,
            highlight=False,
            markup=False,
            emoji=False,
            legacy_windows=False,
        )
        self.parts: list[str] = []

    @property
    def wide(self) -> bool:
        return self.width >= WIDE

    def show(self, block: Text | Table) -> None:
        with self.console.capture() as capture:
            self.console.print(block, no_wrap=None)
        for line in capture.get().splitlines():
            self.parts.append(line.rstrip())

    def line(self, text: Text) -> None:
        """One line that is never wrapped; what does not fit is cut, and the cut is shown."""
        text.truncate(self.width, overflow="ellipsis" if self.marks is _LINES else "crop")
        self.show(text)

    def wrapped(self, text: Text, indent: int = 0) -> None:
        for line in text.wrap(self.console, self.width - indent, overflow="fold"):
            self.show(Text(" " * indent).append_text(line))

    def gap(self) -> None:
        if self.parts and self.parts[-1]:
            self.parts.append("")

    def rule(self, left: str, right: str) -> None:
        """A heading: a name, a line, a place; the place is never cut, or it could not be followed."""
        left, right = printable(left), printable(right)
        fill = self.width - cell_len(left) - cell_len(right) - 4 - bool(right)
        text = Text(f"{self.marks['rule'] * 2} ", style="dim").append(left, style="bold not dim")
        if fill >= 2:
            text.append(f" {self.marks['rule'] * fill} ", style="dim").append(right, style="not dim")
            self.show(text)
        else:
            self.wrapped(text)
            self.wrapped(Text(right), indent=3)

    def text(self) -> str:
        text = "".join(f"{line}\n" for line in self.parts).strip("\n") + "\n" * bool(self.parts)
        if self.marks is _LINES:
            return text
        return text.translate(_PLAIN).encode("ascii", "backslashreplace").decode()


_LINES = {"rule": "━", "beam": "━", "tip": "╸", "lost": "┄", "end": "┤", "at": "·", "to": "→", "by": "×"}
_ASCII = {"rule": "-", "beam": "=", "tip": ">", "lost": ".", "end": "|", "at": "|", "to": "->", "by": "x"}
_PLAIN = {ord("−"): "-", ord("·"): "|", ord("…"): "~", ord("×"): "x", ord("→"): "->"}


# ---------------------------------------------------------------------------------------------------- one kernel


def _head(page: _Page, sheet: Sheet, board: str) -> None:
    page.gap()
    page.rule(sheet.kernel, f"{sheet.file}:{sheet.line}")
    words = [
        f"on {board}",
        plural(len(sheet.interfaces), "interface"),
        plural(len(sheet.accesses), "access", "accesses"),
        plural(len(sheet.findings), "finding"),
    ]
    if sheet.streams:
        words.append(plural(len(sheet.streams), "stream"))
    page.wrapped(Text(f" {page.marks['at']} ".join(map(printable, words)), style="dim"), indent=3)
    page.gap()


def _ports(page: _Page, sheet: Sheet) -> None:
    """A beam for each interface, all on one scale: drawn as far as it gets, dotted as far as it could."""
    if not sheet.interfaces:
        page.wrapped(Text("no interface reaches memory"), indent=3)
        page.gap()
        return
    scale = max(port.could_gbps for port in sheet.interfaces)
    names = max(4, min(24, max(cell_len(printable(port.interface)) for port in sheet.interfaces)))
    beam = max(12, min(60, page.width - 3 - names - 34))
    full = f"{rate(scale)} GB/s"
    page.line(Text(f"   {'port':<{names}}  0{full:>{beam}}  {'now':>6} of could  width", style="dim"))
    for port in sheet.interfaces:
        text = Text("   ").append(_fitted(printable(port.interface), names), style="bold").append("  ")
        text.append_text(_beam(page, port, scale, beam))
        text.append(f"  {rate(port.now_gbps):>6} of {rate(port.could_gbps):<5}  {port.width_bits:>4} bit")
        if page.wide and _named_apart(port):
            text.append(f"  {printable(', '.join(port.arguments))}", style="dim")
        page.line(text)
    carried = [f"{port.interface} {', '.join(port.arguments)}" for port in sheet.interfaces if _named_apart(port)]
    if carried and not page.wide:
        page.wrapped(Text(printable(f"carried: {'; '.join(carried)}"), style="dim"), indent=3)
    if sheet.undeclared:
        names_ = printable(", ".join(sheet.undeclared))
        page.wrapped(Text(f"No directive makes a port for {names_}: a port for each is taken.", style="dim"), indent=3)
    page.gap()


def _budget(page: _Page, sheet: Sheet) -> None:
    """What one call moves and takes, and what it would."""
    lines = list(budget_lines(sheet.time))
    if lines:
        grid = _labelled()
        for number, line in enumerate(lines):
            grid.add_row(_label("" if number else "budget"), Text(printable(line)))
        page.show(grid)
        page.gap()


def _loops(page: _Page, sheet: Sheet) -> None:
    """The time of each loop, where there are several and their sizes are known."""
    rows = loop_rows(sheet.time)
    if not rows:
        return
    columns: tuple[Column, ...] = (("line", True), ("loop", False), ("takes", True), ("could take", True))
    lines = [(line, printable(name), takes, could) for line, name, takes, could in rows]
    widths = _widths(columns, lines)
    widths[1] = min(widths[1], max(8, page.width - 3 - sum(widths) + widths[1] - 6))
    page.line(Text("   Loops, one call", style="bold"))
    page.line(_table_line([name for name, _ in columns], columns, widths, "  ", "dim"))
    for cells in lines:
        page.line(_table_line(cells, columns, widths, "  ", ""))
    page.gap()


def _named_apart(port: PortTraffic) -> bool:
    """Whether the port's name does not already say what it carries."""
    return port.arguments not in ((), (port.interface,))


def _beam(page: _Page, port: PortTraffic, scale: float, cells: int) -> Text:
    could = max(1, round(cells * port.could_gbps / scale)) if scale else 1
    now = min(could, round(cells * port.now_gbps / scale)) if scale else 0
    share = port.now_gbps / port.could_gbps if port.could_gbps else 1.0
    style = "green" if share >= 0.9 else "yellow" if share >= 0.5 else "red"
    text = Text()
    text.append(page.marks["beam"] * max(0, now - 1) + page.marks["tip"] * min(1, now), style=style)
    text.append(page.marks["lost"] * (could - now), style="dim")
    return text.append(page.marks["end"]).append(" " * (cells - could))


def _fitted(text: str, cells: int) -> str:
    """The text in exactly ``cells`` cells, cut with an ellipsis where it is longer."""
    fitted = Text(text)
    fitted.truncate(cells, overflow="ellipsis", pad=True)
    return fitted.plain


# ---------------------------------------------------------------------------------------------------------- costs


def _costs(page: _Page, findings: Sequence[Finding]) -> None:
    if not findings:
        page.wrapped(Text("No finding: no rule has anything to tell here."), indent=3)
        page.gap()
    for alike in grouped(findings):
        _cost(page, alike)


def _cost(page: _Page, alike: Sequence[Finding], brief: bool = False) -> None:
    """One finding: what it costs on the left, what it says on the right, its evidence and advice below, and where else
    the same was found."""
    finding, *others = alike
    style = COLOURS[finding.level] if finding.accepted is None else "dim"
    worth = finding.loss_gbps is not None and finding.loss_gbps >= 0.005
    cost = f"{signed(loss(finding.loss_gbps or 0))} GB/s" if worth else finding.level
    sheet = _labelled()
    sheet.add_row(Text(cost, f"bold {style}"), Text(printable(finding.message), "bold"))
    sheet.add_row(_label("at"), f"{printable(finding.place.file)}:{finding.place.line}")
    because = Text("\n").join(Text(printable(line)) for line in finding.because)
    instead = Text(printable(finding.instead))
    if page.wide and because and not brief:
        page.show(sheet)
        sheet = _labelled()
        page.show(_side_by_side(because, instead))
    else:
        if because and not brief:
            sheet.add_row(_label("because"), because)
        sheet.add_row(_label("instead"), instead)
    if others:
        sheet.add_row(_label("likewise"), Text("\n").join(map(_site, others)))
    if finding.then and not brief:
        sheet.add_row(_label("then"), ", ".join(map(printable, finding.then)))
    sheet.add_row(_label("rule"), Text.assemble(printable(finding.rule), ", ", (finding.level, style), _saved(finding)))
    if finding.accepted is not None:
        sheet.add_row(_label("accepted"), Text(printable(finding.accepted)))
    page.show(sheet)
    page.gap()


def _site(finding: Finding) -> Text:
    argument = f" `{finding.argument}`" if finding.argument else ""
    return Text(printable(f"{finding.place.file}:{finding.place.line}{argument}"))


def _saved(finding: Finding) -> str:
    return f", would save {time(finding.seconds_saved)} a call" if finding.seconds_saved else ""


def _label(name: str) -> Text:
    return Text(name, "dim")


def _labelled() -> Table:
    """Short labels on the left, what they say on the right."""
    grid = Table.grid(padding=(0, 2, 0, 0))
    grid.add_column(width=LABEL, justify="right", no_wrap=True)
    grid.add_column(overflow="fold")
    return grid


def _side_by_side(because: Text, instead: Text) -> Table:
    grid = Table.grid(padding=(0, 2, 0, 0), expand=True)
    grid.add_column(width=LABEL, justify="right", no_wrap=True)
    grid.add_column(overflow="fold", ratio=1)
    grid.add_column(width=LABEL, justify="right", no_wrap=True)
    grid.add_column(overflow="fold", ratio=1)
    grid.add_row(_label("because"), because, _label("instead"), instead)
    return grid


def _summary(survey: Survey, told: int, threshold: str) -> str:
    every = [finding for sheet in survey.kernels for finding in sheet.findings]
    accepted = sum(finding.accepted is not None for finding in every)
    below = len(every) - told - accepted
    found = plural(told, "finding") if told else "No finding"
    text = f"{found} at {threshold} or above in {plural(len(survey.kernels), 'kernel')}"
    rest = [f"{below} below" if below else "", f"{accepted} accepted" if accepted else ""]
    tail = ", ".join(filter(None, rest))
    return f"{text}; {tail}: beatwise audit shows all." if tail else f"{text}."


# ------------------------------------------------------------------------------------------------------- accesses

Column = tuple[str, bool]  #: heading, and whether its cells are numbers
NARROW: tuple[Column, ...] = (
    ("line", True), ("", False), ("argument", False), ("pattern", False), ("step B", True), ("run", True),
    ("beats", True), ("now/could", True), ("held by", False),
)  # fmt: skip
FULL: tuple[Column, ...] = (
    ("at", False), ("", False), ("argument", False), ("port", False), ("element", True), ("pattern", False),
    ("step B", True), ("run", True), ("sizes", False), ("beats", True), ("times", True), ("now/could", True),
    ("held by", False), ("kept from bursts by", False),
)  # fmt: skip


def _accesses(page: _Page, rows: Sequence[AccessRow]) -> None:
    """The table of accesses; with all its columns where they fit, else with what does not fit told below a row."""
    if not rows:
        return
    full = [_full(row) for row in rows]
    if 3 + sum(_widths(FULL, full)) + 2 * len(FULL) <= page.width:
        columns, lines, notes = FULL, full, [row.reason or "" for row in rows]
    else:
        columns, lines, notes = NARROW, [_narrow(row) for row in rows], [_note(row) for row in rows]
    widths = _widths(columns, lines)
    spare = page.width - 3 - sum(widths)
    gap = "  " if spare >= 2 * (len(columns) - 1) else " "
    widths[2] = max(8, widths[2] + min(0, spare - len(gap) * (len(columns) - 1)))
    page.line(Text("   Accesses, GB/s", style="bold"))
    page.line(_table_line([name for name, _ in columns], columns, widths, gap, "dim"))
    several = len({row.place.file for row in rows}) > 1 and columns is NARROW
    table = zip(rows, lines, notes, strict=True)
    for file, group in groupby(table, key=lambda line: line[0].place.file):
        if several:
            page.line(Text(f"   in {printable(file)}", style="dim"))
        for _, cells, note in group:
            page.line(_table_line(cells, columns, widths, gap, ""))
            if note:
                page.wrapped(Text(printable(note), style="dim"), indent=3 + widths[0] + len(gap))
    page.gap()


def _widths(columns: Sequence[Column], lines: Sequence[Sequence[str]]) -> list[int]:
    return [max(cell_len(name), *(cell_len(line[i]) for line in lines)) for i, (name, _) in enumerate(columns)]


def _table_line(cells: Sequence[str], columns: Sequence[Column], widths: Sequence[int], gap: str, style: str) -> Text:
    parts = []
    for cell, (_, numeric), width in zip(cells, columns, widths, strict=True):
        fitted = Text(cell)
        fitted.truncate(width, overflow="ellipsis")
        pad = " " * (width - fitted.cell_len)
        parts.append(pad + fitted.plain if numeric else fitted.plain + pad)
    return Text("   " + gap.join(parts), style=style)


def _note(row: AccessRow) -> str:
    blocked = f"kept from bursts by {', '.join(row.blocked)}" if row.blocked else ""
    return "; ".join(filter(None, (row.reason, blocked)))


def _narrow(row: AccessRow) -> tuple[str, ...]:
    return (
        str(row.place.line),
        row.direction,
        printable(row.argument),
        row.pattern,
        _step(row),
        amount(row.run_elements),
        str(row.burst_beats),
        f"{rate(row.now_gbps)}/{rate(row.could_gbps)}",
        row.limit,
    )


def _full(row: AccessRow) -> tuple[str, ...]:
    line, way, argument, pattern, step, run, beats, gbps, limit = _narrow(row)
    return (
        f"{printable(row.place.file)}:{line}",
        way,
        argument,
        printable(row.interface),
        f"{row.element_bytes} B",
        pattern,
        step,
        run,
        row.basis,
        beats,
        amount(row.executions),
        gbps,
        limit,
        ", ".join(row.blocked),
    )


def _step(row: AccessRow) -> str:
    return "" if row.stride_bytes is None else signed(amount(abs(row.stride_bytes)), row.stride_bytes)


def _streams(page: _Page, rows: Sequence[StreamRow]) -> None:
    if not rows:
        return
    page.line(Text("   Streams", style="bold"))
    for row in rows:
        many = f" {page.marks['by']} {row.count}" if row.count != 1 else ""
        depth = "depth not said" if row.depth is None else f"depth {row.depth}"
        ends = f"{', '.join(row.producers) or '?'} {page.marks['to']} {', '.join(row.consumers) or '?'}"
        page.wrapped(Text(printable(f"{row.name}{many}, {row.element_bits} bit, {depth}: {ends}")), indent=3)
    page.gap()
