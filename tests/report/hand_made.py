"""Surveys made by hand: the azimuth scatter of one radar station."""

from __future__ import annotations

from dataclasses import replace
from typing import Any, Literal

from beatwise.model.finding import Finding
from beatwise.model.kernel import Problem
from beatwise.model.place import Place
from beatwise.model.traffic import AccessTime, KernelTime, LoopTime, PortTraffic
from beatwise.report.sheet import AccessRow, Sheet, StreamRow, Survey

FILE = "kernels/sector_scatter.cpp"


def place(line: int, column: int = 9, file: str = FILE) -> Place:
    """A place on a line; later lines have greater offsets."""
    return Place(file, line, column, line, column + 10, offset=100 * line + column)


def access(line: int, argument: str, **changes: Any) -> AccessRow:
    """A clean sequential read; ``changes`` spoil it."""
    row = AccessRow(
        place=place(line),
        argument=argument,
        interface=argument,
        direction="read",
        element_bytes=64,
        pattern="sequential",
        stride_bytes=64,
        run_elements=4096.0,
        basis="constant",
        width_bits=512,
        burst_beats=16,
        loop_line=line - 1,
        guarded=False,
        blocked=(),
        executions=4096.0,
        now_gbps=13.27,
        could_gbps=13.27,
        limit="channel",
        reason=None,
    )
    return replace(row, **changes)


def finding(line: int, rule: str = "guarded-access", **changes: Any) -> Finding:
    """A guarded store that loses 12.67 of 13.27 GB/s."""
    made = Finding(
        rule=rule,
        level="error",
        kernel="sector_scatter",
        place=place(line),
        argument="strong",
        interface="strong",
        message="`strong` is written only when `power > floor_dbz` says so, so its beats cannot join into bursts.",
        because=(
            "line 31 decides in every iteration of the loop at line 28 from data read in it",
            "1 beat of 4 bytes a request: 4 of 64 bytes that the channel moves are used",
        ),
        instead="Collect the strong gates in a local buffer of 256 entries (1 KiB) "
        "and write it out in one run when it is full.",
        then=("narrow-port",),
        now_gbps=0.6,
        could_gbps=13.27,
        loss_gbps=12.67,
    )
    return replace(made, **changes)


def timed(**changes: Any) -> KernelTime:
    """Two loops of which one stores 4 MB at 0.6 of 13.27 GB/s, the other reads as much at full speed."""
    rows: tuple[tuple[int, str, Literal["read", "write"], float], ...]
    rows = (20, "load", "read", 13.27), (32, "keep", "write", 0.6)
    loops = tuple(
        LoopTime(
            place=place(line),
            name=name,
            process=None,
            bytes_moved=4e6,
            accesses=(AccessTime((line, name), (name, way), line, 4e-3 / now, 4e-3 / 13.27),),
        )
        for line, name, way, now in rows
    )
    return replace(KernelTime(loops, peak_gbps=460.8), **changes)


def scatter(**changes: Any) -> Sheet:
    """A kernel with one clean input and one guarded output."""
    store = access(
        32,
        "strong",
        direction="write",
        element_bytes=4,
        stride_bytes=4,
        run_elements=2.5,
        basis="data",
        width_bits=32,
        burst_beats=1,
        guarded=True,
        blocked=("data-dependent-guard",),
        executions=None,
        now_gbps=0.6,
        limit="requests",
    )
    made = Sheet(
        kernel="sector_scatter",
        file=FILE,
        line=20,
        interfaces=(
            PortTraffic("gates", ("gates",), 512, (0,), 13.27, 13.27),
            PortTraffic("strong", ("strong",), 32, (1,), 0.6, 13.27),
        ),
        undeclared=(),
        accesses=(access(29, "gates"), store),
        streams=(StreamRow("sorted", 8, 16, 32, ("sort_gates",), ("write_sector",)),),
        findings=(finding(32),),
        time=timed(),
    )
    return replace(made, **changes)


def survey(*kernels: Sheet, problems: tuple[Problem, ...] = ()) -> Survey:
    return Survey(kernels or (scatter(),), problems, "hbm2-32ch")
