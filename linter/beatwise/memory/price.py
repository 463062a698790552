"""What a demand gets on a board: every limit alone, in useful GB/s; the least wins and is named."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass
from math import ceil

from beatwise.memory import limits, rows, switch
from beatwise.memory.demand import Demand
from beatwise.model.board import Board
from beatwise.model.traffic import Limit

BINDS = 0.97  #: a row walk that reaches this share of the bus is not held by rows


@dataclass(frozen=True, slots=True)
class Price:
    """``gbps`` is what this port gets, in 10^9 useful bytes a second (``mixed``: both directions together)."""

    gbps: float
    limit: Limit
    limits: Mapping[Limit, float]  #: GB/s by every limit that applies, each alone
    share_of_peak: float  #: of one channel's peak


def price(board: Board, demand: Demand) -> Price:
    """The least of the limits that apply to the demand; of equals, the first of `Limit`'s order counts.

    >>> from beatwise.memory.boards import board
    >>> answer = price(board("hbm2-32ch"), Demand("read", 64, 64, 2, 128, run_bytes=128, channels=4))
    >>> answer.limit, round(answer.gbps, 1)
    ('order', 1.0)
    """
    _sensible(demand)
    bounds = {**_channel_side(board, demand), **_port_side(board, demand)}
    if demand.users > 1 or demand.ports > 1:
        port_side, channel_side = _port_side(board, demand), _channel_side(board, demand)
        bounds["shared"] = min(min(port_side.values()) / demand.users, min(channel_side.values()) / demand.ports)
    if demand.interval_cycles > 1:
        bounds["interval"] = limits.interval(demand.used_bytes, _mhz(board, demand), demand.interval_cycles)
    limit = min(bounds, key=lambda name: bounds[name])
    return Price(bounds[limit], limit, bounds, bounds[limit] / board.peak_gbps)


def _sensible(demand: Demand) -> None:
    if not 0 < demand.used_bytes <= demand.beat_bytes:
        raise ValueError(f"of a beat of {demand.beat_bytes} bytes, {demand.used_bytes} count")
    if min(demand.burst_beats, demand.outstanding, demand.channels, demand.ports, demand.users) < 1:
        raise ValueError(f"beats, transactions, channels, ports and users are at least 1: {demand}")
    if demand.run_bytes is not None and demand.run_bytes <= 0:
        raise ValueError(f"a run of {demand.run_bytes} bytes")


def _mhz(board: Board, demand: Demand) -> float:
    return demand.clock_mhz or board.kernel_mhz


def _port_side(board: Board, demand: Demand) -> dict[Limit, float]:
    """What the port itself allows. The read and the write half of a port work side by side."""
    mhz, useful = _mhz(board, demand), demand.used_bytes / demand.beat_bytes
    halves = 2 if demand.direction == "mixed" else 1
    bounds: dict[Limit, float] = {}
    whole = limits.port(demand.beat_bytes, mhz) * halves
    if useful < 1 or demand.beat_bytes * 8 < board.port_bits:
        bounds["width"] = whole * useful
    else:
        bounds["port"] = whole
    reads, writes = _reads(board, demand), _writes(board, demand)
    if demand.direction == "read":
        bounds["requests"] = reads * useful
    elif demand.direction == "write":
        bounds |= {name: value * useful for name, value in writes.items()}
    else:
        bounds["requests"] = 2 * min(reads, writes["requests"]) * useful
        bounds["gaps"] = 2 * writes["gaps"] * useful
    if demand.channels > 1 and demand.run_bytes is not None:
        cap = min(_cap(board, demand), whole * useful)
        bounds["order"] = limits.order(demand.run_bytes, demand.channels, cap, turn_ns=board.order_turn_ns)
    return bounds


def _reads(board: Board, demand: Demand) -> float:
    mhz = _mhz(board, demand)
    waiting = limits.requests(
        demand.burst_beats,
        demand.beat_bytes,
        mhz,
        outstanding=demand.outstanding,
        latency_ns=board.read_latency_ns,
        beat_factor=board.read_beat_factor,
    )
    if board.request_cycles == 0:
        return waiting
    rate = limits.request_rate(demand.burst_beats, demand.beat_bytes, mhz, request_cycles=board.request_cycles)
    return min(waiting, rate)


def _writes(board: Board, demand: Demand) -> dict[Limit, float]:
    """Both limits of writes; what both together leave stands beside the one that is the less alone."""
    mhz, beats, beat = _mhz(board, demand), demand.burst_beats, demand.beat_bytes
    spaced = limits.gaps(beats, beat, mhz, gap_beats=board.write_gap_beats)
    waiting = limits.requests(
        beats,
        beat,
        mhz,
        outstanding=demand.outstanding,
        latency_ns=board.write_latency_ns + board.write_gap_beats * 1000 / mhz,
        beat_factor=1.0,
    )
    both = limits.writes_in_flight(
        beats,
        beat,
        mhz,
        outstanding=demand.outstanding,
        latency_ns=board.write_latency_ns,
        gap_beats=board.write_gap_beats,
    )
    if waiting < spaced:
        return {"requests": both, "gaps": spaced}
    return {"requests": waiting, "gaps": both}


def _cap(board: Board, demand: Demand) -> float:
    caps = {"read": board.read_cap_gbps, "write": board.write_cap_gbps}
    return caps.get(demand.direction, max(caps.values()))


def _channel_side(board: Board, demand: Demand) -> dict[Limit, float]:
    """What the memory allows, all ports together. Random places spread over all channels that the port reaches."""
    useful, pieces = demand.used_bytes / demand.beat_bytes, demand.channels if demand.run_bytes is not None else 1
    run = demand.run_bytes
    if run is not None and run < demand.beat_bytes:  # a narrow transfer: the memory moves the granules that it touches
        useful = demand.used_bytes / (ceil(run / board.granule_bytes) * board.granule_bytes)
    elif run is not None:
        useful *= run / (ceil(run / board.granule_bytes) * board.granule_bytes)
    useful = min(1.0, useful)
    bounds: dict[Limit, float] = {"channel": _cap(board, demand) * useful * pieces}
    walk = rows.walk(board, run, demand.stride_bytes)
    if walk < BINDS * board.refreshed_gbps:
        bounds["rows"] = walk * useful * pieces
    if demand.direction == "mixed":
        bounds["turnaround"] = rows.walk(board, run, demand.stride_bytes, mixed=True) * useful * pieces
    if demand.crossing:
        bounds["switch"] = switch.first_rate(board, demand, _cap(board, demand)) * useful
    return bounds
