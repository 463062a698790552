"""The survey as ``beatwise-audit-1``: keys are stable, more may be added. ``audit.schema.json`` describes it."""

from __future__ import annotations

import json
import math
from typing import Any

from beatwise import __version__
from beatwise.model.finding import Finding
from beatwise.model.traffic import KernelTime, LoopTime, PortTraffic
from beatwise.report.sheet import AccessRow, Sheet, StreamRow, Survey

FORMAT = "beatwise-audit-1"
DIGITS = 4  #: significant digits of every estimate


def as_json(survey: Survey) -> str:
    """The whole survey as one JSON document and a newline; plain ASCII, so that no name can steer a terminal."""
    return json.dumps(document(survey), indent=1, allow_nan=False) + "\n"


def document(survey: Survey) -> dict[str, Any]:
    """The survey as plain dictionaries, lists, numbers and strings."""
    return {
        "format": FORMAT,
        "version": __version__,
        "board": survey.board,
        "kernels": [_kernel(sheet) for sheet in survey.kernels],
        "findings": [_finding(finding) for sheet in survey.kernels for finding in sheet.findings],
        "problems": [{"file": p.file, "line": p.line, "what": p.what} for p in survey.problems],
    }


def rounded(value: float | None) -> float | int | None:
    """Four significant digits, as an integer where it is one and exact below 2**53.

    >>> rounded(13.27349), rounded(1024.0), rounded(None)
    (13.27, 1024, None)
    """
    if value is None or not math.isfinite(value):
        return None
    if value == int(value) and abs(value) < 2**53:
        return int(value)
    return float(f"{value:.{DIGITS}g}")


def _kernel(sheet: Sheet) -> dict[str, Any]:
    return {
        "name": sheet.kernel,
        "file": sheet.file,
        "line": sheet.line,
        "interfaces": [_interface(port, port.interface not in sheet.undeclared) for port in sheet.interfaces],
        "accesses": [_access(row) for row in sheet.accesses],
        "streams": [_stream(row) for row in sheet.streams],
        "seconds": rounded(sheet.time.seconds),
        "loops": [_loop(loop) for loop in sheet.time.loops],
        "budget": _budget(sheet.time),
    }


def _loop(loop: LoopTime) -> dict[str, Any]:
    return {
        "file": loop.place.file,
        "line": loop.place.line,
        "label": loop.name,
        "process": None if loop.process is None else loop.process[0],
        "bytes": rounded(loop.bytes_moved) if loop.known else None,
        "seconds": rounded(loop.seconds()) if loop.known else None,
        "could_seconds": rounded(loop.could_seconds) if loop.known else None,
    }


def _budget(time: KernelTime) -> dict[str, Any]:
    return {
        "bytes": rounded(time.bytes_moved) if time.known else None,
        "now_gbps": rounded(time.gbps),
        "could_gbps": rounded(time.could_gbps),
        "peak_gbps": rounded(time.peak_gbps),
        "share_of_peak": rounded(time.gbps / time.peak_gbps),
        "could_seconds": rounded(time.could_total) if time.known else None,
        "basis": time.basis,
        "wanted": list(time.wanted),
        "unsized_lines": list(time.unsized),
    }


def _interface(port: PortTraffic, declared: bool) -> dict[str, Any]:
    return {
        "interface": port.interface,
        "arguments": list(port.arguments),
        "width_bits": port.width_bits,
        "channels": list(port.channels),
        "now_gbps": rounded(port.now_gbps),
        "could_gbps": rounded(port.could_gbps),
        "declared": declared,
    }


def _access(row: AccessRow) -> dict[str, Any]:
    return {
        "file": row.place.file,
        "line": row.place.line,
        "column": row.place.column,
        "argument": row.argument,
        "interface": row.interface,
        "direction": row.direction,
        "element_bytes": row.element_bytes,
        "pattern": row.pattern,
        "stride_bytes": row.stride_bytes,
        "run_elements": rounded(row.run_elements),
        "basis": row.basis,
        "burst_beats": row.burst_beats,
        "loop_line": row.loop_line,
        "guarded": row.guarded,
        "blocked": list(row.blocked),
        "executions": rounded(row.executions),
        "now_gbps": rounded(row.now_gbps),
        "could_gbps": rounded(row.could_gbps),
        "limit": row.limit,
        "reason": row.reason,
        "width_bits": row.width_bits,
    }


def _stream(row: StreamRow) -> dict[str, Any]:
    return {
        "name": row.name,
        "count": row.count,
        "depth": row.depth,
        "element_bits": row.element_bits,
        "producers": list(row.producers),
        "consumers": list(row.consumers),
    }


def _finding(finding: Finding) -> dict[str, Any]:
    return {
        "rule": finding.rule,
        "level": finding.level,
        "kernel": finding.kernel,
        "file": finding.place.file,
        "line": finding.place.line,
        "column": finding.place.column,
        "argument": finding.argument,
        "interface": finding.interface,
        "message": finding.message,
        "because": list(finding.because),
        "instead": finding.instead,
        "then": list(finding.then),
        "now_gbps": rounded(finding.now_gbps),
        "could_gbps": rounded(finding.could_gbps),
        "loss_gbps": rounded(finding.loss_gbps),
        "edit": finding.edit,
        "accepted": finding.accepted,
        "seconds_saved": rounded(finding.seconds_saved),
    }
