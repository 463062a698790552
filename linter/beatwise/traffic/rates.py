"""What each access and each port gets, in GB/s: the least of the limits that apply.

Each access becomes a `Demand` that `memory.price` answers as if it were alone; what it shares is taken off here. The
n-th interface is taken to reach the n-th memory channel (counted anew after the last); accesses whose innermost loop is
the same share a port and a channel evenly, iteration by iteration; loops of one process run in turn, dataflow processes
side by side. Who waits for whom is the matter of `traffic.time`.
"""

from __future__ import annotations

from collections import defaultdict
from collections.abc import Hashable, Mapping, Sequence
from dataclasses import dataclass, replace

from beatwise.memory.demand import Demand
from beatwise.memory.price import price
from beatwise.model.access import Access, Guard, Interface, Trace
from beatwise.model.board import Board
from beatwise.model.traffic import Block, Limit, PortTraffic, Traffic, Walk
from beatwise.traffic import runs
from beatwise.traffic.blocks import blocked, neighbours
from beatwise.traffic.buffers import buffers
from beatwise.traffic.bursts import beat_bytes, burst_beats
from beatwise.traffic.demands import best, carried_bytes, demand
from beatwise.traffic.sites import Seat, effective_guards, seats
from beatwise.traffic.time import process_of

#: what the memory holds back, all that use the channel together; every other limit is the port's
CHANNEL_SIDE: frozenset[Limit] = frozenset(("channel", "rows", "turnaround", "switch"))
#: what nobody lacks but those that share it: told as ``shared``
WHOLE: frozenset[Limit] = frozenset(("port", "channel"))


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
    apart: float = 1.0  #: its part of the bytes that the loop needs from its argument, or, on too few channels, of all
    mixed: bool = False  #: the channel serves both directions at the same time
    alone: bool = True  #: no other run uses the channel at the same time


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
    shares = _shares(accesses, places, walks, channels, board)
    traffic = []
    for index, (access, walk) in enumerate(zip(accesses, walks, strict=True)):
        why = blocked(index, walk, beside)
        access = replace(access, guards=guards[index])
        traffic.append(_rated(access, walk, why, shares[index], places[index], ports[access.interface], board))
    totals = (_total(port, channels[port.name], traffic, board) for port in trace.interfaces)
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
    accesses: Sequence[Access], places: Sequence[Seat], walks: Sequence[Walk], channels: Mapping[str, int], board: Board
) -> tuple[Share, ...]:
    """For each access, its share; that of one that does not count is the whole."""
    counted = [index for index, access in enumerate(accesses) if _counts(access, walks[index])]
    on_port: dict[Hashable, list[int]] = defaultdict(list)
    on_channel: dict[Hashable, list[int]] = defaultdict(list)
    port_users: dict[Hashable, set[Hashable]] = defaultdict(set)
    channel_users: dict[Hashable, set[Hashable]] = defaultdict(set)
    ways: dict[Hashable, set[str]] = defaultdict(set)
    for index in counted:
        access = accesses[index]
        on_port[access.loops[-1].number, access.interface, access.direction].append(index)
        on_channel[access.loops[-1].number, channels[access.interface]].append(index)
        ways[access.loops[-1].number, channels[access.interface]].add(access.direction)
        process = process_of(access)
        if process is not None:
            port_users[access.interface, access.direction].add(process)
            channel_users[channels[access.interface]].add(process)
            ways[channels[access.interface]].add(access.direction)
    elements: dict[Hashable, int] = {}
    used: dict[Hashable, float] = {}
    of_argument: dict[Hashable, float] = defaultdict(float)
    for index in counted:
        access = accesses[index]
        of_argument[access.loops[-1].number, access.argument] += access.part_bytes / places[index].alike
    fits = len({accesses[index].argument for index in counted}) <= board.channels
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
            apart=own / of_argument[access.loops[-1].number, access.argument]
            if fits
            else own / used[channel] * beside_channel,
            mixed=len(ways[channel]) > 1 or (access.process is not None and len(ways[channel[1]]) > 1),
            alone=len({places[other].sweep for other in on_channel[channel]}) == 1 and beside_channel == 1,
        )
    return tuple(result)


def _rated(
    access: Access, walk: Walk, why: tuple[Block, ...], share: Share, seat: Seat, interface: Interface, board: Board
) -> Traffic:
    beat = beat_bytes(access, walk, interface, board, why)
    beats = burst_beats(access, walk, interface, board, why, beat)
    could = _could(access, beat, share, interface, board)
    bounds: dict[Limit, float] = {"channel": could}
    if _counts(access, walk):
        asked = demand(access, walk, why, beat, beats, interface, board)
        bounds = _bounds(access, asked, beats, share, seat, board)
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
        apart_gbps=_could(
            access, beat, replace(share, useful=share.apart, channel_useful=share.apart, mixed=False), interface, board
        ),
    )


def _could(access: Access, beat: int, share: Share, interface: Interface, board: Board) -> float:
    """Long bursts of the board's widest port, enough of them under way, of nothing but used bytes."""
    wide = best(access.direction, beat, interface, board)
    bounds = _shared(price(board, wide).limits, share.useful, share.channel_useful)
    if share.mixed:
        turning = price(board, replace(wide, direction="mixed")).limits["turnaround"]
        bounds["turnaround"] = turning * share.channel_useful
    return min(bounds.values())


def _bounds(access: Access, asked: Demand, beats: int, share: Share, seat: Seat, board: Board) -> dict[Limit, float]:
    """Useful GB/s by every limit; of equals, the first named counts."""
    beat = asked.beat_bytes
    own = access.part_bytes / seat.alike / carried_bytes(access, beat)
    alone = dict(price(board, asked).limits)
    waste = min(1.0, beats * beat / (-(-beats * beat // board.granule_bytes) * board.granule_bytes))
    if asked.run_bytes is None:  # requests in order, each of whole granules however little it needs of the last
        alone |= {name: rate * waste for name, rate in alone.items() if name in CHANNEL_SIDE}
    if share.mixed:
        turning = price(board, replace(asked, direction="mixed")).limits["turnaround"]
        alone["turnaround"] = turning * (waste if asked.run_bytes is None else 1.0)
    full = beat >= board.port_bits // 8 and access.part_bytes == carried_bytes(access, beat)
    if "port" in alone or "width" in alone:
        whole = alone.pop("port", 0.0) or alone.pop("width")
        alone["port" if full else "width"] = whole
    bounds = _shared(alone, own * share.port / share.beats, share.channel)
    if "interval" in alone:  # the loop issues for every run at once; only the elements of one run share a beat
        bounds["interval"] = alone["interval"] * own * share.port / seat.elements
    if not share.alone:
        for name in WHOLE & bounds.keys():
            part = own / share.beats * share.port if name == "port" else share.channel
            if part < own:
                bounds["shared"] = min(bounds.get("shared", float("inf")), bounds[name])
                bounds[name] = alone[name] * own
    return bounds


def _shared(alone: Mapping[Limit, float], port: float, channel: float) -> dict[Limit, float]:
    """The limits with what is left of the port's and of the channel's."""
    return {name: rate * (channel if name in CHANNEL_SIDE else port) for name, rate in alone.items()}


def _total(interface: Interface, channel: int, traffic: Sequence[Traffic], board: Board) -> PortTraffic:
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
        buffers=buffers(interface, board, traffic),
    )


def _in_turn(loops: Sequence[Sequence[Traffic]], rates: Sequence[float]) -> float:
    """The mean rate of loops that run one after the other, by the bytes they move; evenly where those are not known."""
    sizes = [sum(item.bytes_moved or 0.0 for item in loop) for loop in loops]
    if any(item.bytes_moved is None for loop in loops for item in loop) or not all(sizes):
        sizes = [1.0] * len(loops)
    return sum(sizes) / sum(size / rate for size, rate in zip(sizes, rates, strict=True))
