"""What each access and each port gets, in GB/s: the least of the limits that apply, each computed alone.

A first model, one step that can be replaced: the n-th interface is taken to reach the n-th memory channel (counted anew
after the last); accesses whose innermost loop is the same share a port and a channel evenly, iteration by iteration;
loops of one process run in turn, dataflow processes side by side. Nobody waits for another port here.
"""

from __future__ import annotations

from collections import defaultdict
from collections.abc import Hashable, Iterable, Mapping, Sequence
from dataclasses import dataclass, replace

from beatwise.memory import axi, limits
from beatwise.model.access import Access, Direction, Guard, Interface, Trace
from beatwise.model.board import Board
from beatwise.model.traffic import Block, Limit, PortTraffic, Traffic, Walk
from beatwise.traffic import runs
from beatwise.traffic.blocks import blocked, neighbours
from beatwise.traffic.bursts import beat_bytes, burst_beats, element_beat_bytes, outstanding, padded_bytes
from beatwise.traffic.sites import Seat, effective_guards, seats


@dataclass(frozen=True, slots=True)
class Measured:
    """The traffic of one kernel: one entry for each of its accesses and interfaces, in the trace's order."""

    traffic: tuple[Traffic, ...]
    ports: tuple[PortTraffic, ...]


@dataclass(frozen=True, slots=True)
class Share:
    """What an access has of its port and channel while its loop runs."""

    beats: int  #: accesses of its direction that take turns on the port
    port: float  #: part of the port's time, beside other processes
    useful: float  #: its part of the bytes that the loop needs from the port in its direction
    channel: float  #: its part of what the channel moves for the loop
    channel_useful: float  #: its part of the bytes that the loop needs from the channel


def measure(trace: Trace, board: Board, given: Mapping[str, int]) -> Measured:
    """Walks, blocks, bursts and rates of every access, and the rates of every interface.

    ``now_gbps`` counts bytes that the kernel uses. ``could_gbps`` is what the access would get if all traffic of its
    loop were long bursts on the widest port that pays, of nothing but used bytes. An access that runs once, or whose
    place is not known, gets ``now`` = ``could``: nothing is held against it, and it does not count for its interface.
    The accesses are the trace's, less the guards that branches make up for between them (`effective_guards`).
    """
    accesses = trace.accesses
    places = seats(accesses)
    guards = effective_guards(accesses)
    walks = _walks(accesses, places, guards, given)
    beside = neighbours(accesses, places, guards)
    ports = {interface.name: interface for interface in trace.interfaces}
    channels = {interface.name: number % board.channels for number, interface in enumerate(trace.interfaces)}
    shares = _shares(accesses, places, walks, channels)
    traffic = []
    for index, (access, walk) in enumerate(zip(accesses, walks, strict=True)):
        why = blocked(index, walk, beside)
        access = replace(access, guards=guards[index])
        traffic.append(_rated(access, walk, why, shares[index], places[index], ports[access.interface], board))
    totals = (_total(port, channels[port.name], traffic) for port in trace.interfaces)
    return Measured(tuple(traffic), tuple(totals))


def _walks(
    accesses: Sequence[Access],
    places: Sequence[Seat],
    guards: Sequence[tuple[Guard, ...]],
    given: Mapping[str, int],
) -> tuple[Walk, ...]:
    """How each access walks, together with those that it makes one run with."""
    walks = []
    for index, (access, seat) in enumerate(zip(accesses, places, strict=True)):
        walk = runs.walk(replace(access, guards=guards[index]), given)
        if guards[index] != access.guards and walk.executions is not None:
            walk = replace(walk, executions=walk.executions / seat.alike)
        if seat.elements > 1:
            size = access.element_bytes * seat.elements
            whole = replace(accesses[seat.head], guards=guards[index], element_bytes=size, part_bytes=size)
            together = runs.walk(whole, given)
            if together.pattern == "sequential" and together.run_elements is not None:
                run = together.run_elements * seat.elements
                walk = replace(
                    together, stride_bytes=access.element_bytes, run_elements=run, executions=walk.executions
                )
        walks.append(walk)
    return tuple(walks)


def _counts(access: Access, walk: Walk) -> bool:
    return bool(access.loops) and access.unresolved is None and walk.pattern not in ("single", "unresolved")


def _shares(
    accesses: Sequence[Access], places: Sequence[Seat], walks: Sequence[Walk], channels: Mapping[str, int]
) -> tuple[Share, ...]:
    """For each access, its share; that of one that does not count is the whole."""
    counted = [index for index, access in enumerate(accesses) if _counts(access, walks[index])]
    on_port: dict[Hashable, list[int]] = defaultdict(list)
    on_channel: dict[Hashable, list[int]] = defaultdict(list)
    port_users: dict[Hashable, set[str]] = defaultdict(set)
    channel_users: dict[Hashable, set[str]] = defaultdict(set)
    for index in counted:
        access = accesses[index]
        on_port[access.loops[-1].number, access.interface, access.direction].append(index)
        on_channel[access.loops[-1].number, channels[access.interface]].append(index)
        if access.process is not None:
            port_users[access.interface, access.direction].add(access.process)
            channel_users[channels[access.interface]].add(access.process)
    elements: dict[Hashable, int] = {}
    used: dict[Hashable, float] = {}
    moved: dict[Hashable, float] = {}
    for key, group in (*on_port.items(), *on_channel.items()):
        sizes = {places[index].element: accesses[index].element_bytes for index in group}
        elements[key] = len(sizes)
        moved[key] = sum(sizes.values())
        used[key] = sum(accesses[index].part_bytes / places[index].alike for index in group)
    result = [Share(1, 1.0, 1.0, access.part_bytes / max(1, access.element_bytes), 1.0) for access in accesses]
    for index in counted:
        access = accesses[index]
        port = (access.loops[-1].number, access.interface, access.direction)
        channel = (access.loops[-1].number, channels[access.interface])
        own = access.part_bytes / places[index].alike
        beside_port = 1 / max(1, len(port_users[access.interface, access.direction]))
        beside_channel = 1 / max(1, len(channel_users[channels[access.interface]]))
        result[index] = Share(
            beats=elements[port],
            port=beside_port,
            useful=own / used[port] * beside_port,
            channel=own / moved[channel] * beside_channel,
            channel_useful=own / used[channel] * beside_channel,
        )
    return tuple(result)


def _rated(
    access: Access, walk: Walk, why: tuple[Block, ...], share: Share, seat: Seat, interface: Interface, board: Board
) -> Traffic:
    beat = beat_bytes(access, walk, interface, board, why)
    beats = burst_beats(access, walk, interface, board, why, beat)
    could = _could(access.direction, beat, share, board)
    bounds: dict[Limit, float] = {"channel": could}
    if _counts(access, walk):
        bounds = _bounds(access, beat, beats, share, seat, interface, board)
    limit = min(bounds, key=lambda name: bounds[name])
    return Traffic(
        access=access,
        walk=walk,
        width_bits=beat * 8,
        burst_beats=beats,
        blocked=why,
        now_gbps=min(could, bounds[limit]),
        could_gbps=could,
        limit=limit,
        limits={str(name): bound for name, bound in bounds.items()},
        bytes_moved=None if walk.executions is None else walk.executions * access.part_bytes,
    )


def _could(direction: Direction, beat: int, share: Share, board: Board) -> float:
    """Long bursts of the board's widest port: held by the port and by the channel alone."""
    widest = max(beat, board.port_bits // 8)
    port = limits.port(widest, board.kernel_mhz)
    if direction == "write":
        port = limits.gaps(axi.longest(widest), widest, board.kernel_mhz, gap_beats=board.write_gap_beats)
    cap = board.read_cap_gbps if direction == "read" else board.write_cap_gbps
    return min(port * share.useful, cap * share.channel_useful)


def _bounds(
    access: Access, beat: int, beats: int, share: Share, seat: Seat, interface: Interface, board: Board
) -> dict[Limit, float]:
    """Useful GB/s by every limit; of equals, the first named counts."""
    read = access.direction == "read"
    mhz = board.kernel_mhz
    waiting = limits.requests(
        beats,
        beat,
        mhz,
        outstanding=outstanding(interface, board, access.direction),
        latency_ns=board.read_latency_ns if read else board.write_latency_ns,
        beat_factor=board.read_beat_factor if read else 1.0,
    )
    rate = limits.request_rate(beats, beat, mhz, request_cycles=board.request_cycles)
    wide = beat > element_beat_bytes(access.element_bytes)
    carried = access.element_bytes if wide else padded_bytes(access.element_bytes)
    own = access.part_bytes / seat.alike / carried * share.port / share.beats
    cap = board.read_cap_gbps if read else board.write_cap_gbps
    full = beat >= board.port_bits // 8 and access.part_bytes == carried
    bounds: dict[Limit, float] = {
        "channel": limits.channel(cap, beats * beat, board.granule_bytes) * share.channel,
        "port" if full else "width": limits.port(beat, mhz) * own,
        "requests": min(waiting, rate) * own if read else waiting * own,
    }
    if not read:
        bounds["gaps"] = limits.gaps(beats, beat, mhz, gap_beats=board.write_gap_beats) * own
    return bounds


def _total(interface: Interface, channel: int, traffic: Iterable[Traffic]) -> PortTraffic:
    """The interface as a whole: accesses of a loop add up, its loops take turns by their bytes, processes add up."""
    mine = [item for item in traffic if item.access.interface == interface.name]
    counted = [item for item in mine if _counts(item.access, item.walk)]
    loops: dict[str | None, dict[int, list[Traffic]]] = defaultdict(lambda: defaultdict(list))
    for item in counted:
        loops[item.access.process][item.access.loops[-1].number].append(item)
    turns = [list(own.values()) for own in loops.values()]
    rest = max((item.could_gbps for item in mine), default=0.0) if not counted else 0.0
    return PortTraffic(
        interface=interface.name,
        arguments=interface.arguments,
        width_bits=max((item.width_bits for item in mine), default=0),
        channels=(channel,),
        now_gbps=rest + sum(_in_turn(own, [sum(item.now_gbps for item in loop) for loop in own]) for own in turns),
        could_gbps=rest + sum(_in_turn(own, [sum(item.could_gbps for item in loop) for loop in own]) for own in turns),
    )


def _in_turn(loops: Sequence[Sequence[Traffic]], rates: Sequence[float]) -> float:
    """The mean rate of loops that run one after the other, by the bytes they move; evenly where those are not known."""
    sizes = [sum(item.bytes_moved or 0.0 for item in loop) for loop in loops]
    if any(item.bytes_moved is None for loop in loops for item in loop) or not all(sizes):
        sizes = [1.0] * len(loops)
    return sum(sizes) / sum(size / rate for size, rate in zip(sizes, rates, strict=True))
