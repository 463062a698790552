"""Switches between ports and channels: a line of small crossbars with lateral links, and fair shares of its links."""

from __future__ import annotations

from collections.abc import Hashable, Mapping, Sequence
from itertools import pairwise
from typing import TYPE_CHECKING, Any, TypeVar

from beatwise.memory.demand import Demand
from beatwise.model.board import Board

if TYPE_CHECKING:
    import networkx

Link = TypeVar("Link", bound=Hashable)


def max_min(capacity: Mapping[Link, Any], flows: Sequence[Sequence[Link]]) -> tuple[Any, ...]:
    """Max-min fair rates of flows over links, in the unit of the capacities (exact for fractions).

    All rates rise together; those over a link that is full stay where they are (Bertsekas, Gallager, "Data Networks",
    1992, section 6.5.2; from memory). Every flow crosses at least one link.

    >>> max_min({"a": 10}, [["a"], ["a"]])
    (5.0, 5.0)
    """
    rates: dict[int, Any] = {}
    left = dict(capacity)
    rising = {link: {number for number, flow in enumerate(flows) if link in flow} for link in capacity}
    while len(rates) < len(flows):
        share, full = min(((left[link] / len(users), link) for link, users in rising.items() if users), key=_first)
        for number in list(rising[full]):
            rates[number] = share
            for link in set(flows[number]):
                left[link] -= share
                rising[link].discard(number)
    return tuple(rates[number] for number in range(len(flows)))


def _first(pair: tuple[Any, Any]) -> Any:
    return pair[0]


def network(board: Board) -> networkx.DiGraph[Any]:
    """Ports and channels of a board. Every edge is a link of the rate of one port (``lateral``: between switches).

    A lateral link serves a part of a switch's ports, the lower ones the first link and so on; a switch reaches all its
    own channels without loss (controller guide PG276, "Lateral AXI Switch Access Throughput Loss").
    """
    import networkx

    graph: networkx.DiGraph[Any] = networkx.DiGraph()
    size, lanes = board.switch_ports or board.channels, max(1, board.lateral_links)
    for number in range(board.channels):
        here = number // size
        graph.add_edge(("port", number), ("lane", here, number % size * lanes // size), lateral=False)
        graph.add_edge(("into", number), ("channel", number), lateral=False)
        for lane in range(lanes):
            graph.add_edge(("lane", here, lane), ("into", number), lateral=None)
    for here in range(-(-board.channels // size) - 1):
        for lane in range(lanes):
            graph.add_edge(("lane", here, lane), ("lane", here + 1, lane), lateral=True)
            graph.add_edge(("lane", here + 1, lane), ("lane", here, lane), lateral=True)
    return graph


def rates(
    board: Board, pairs: Sequence[tuple[int, int]], gbps: float, *, write_beats: float | None = None
) -> tuple[float, ...]:
    """GB/s of each (port, channel) pair when all are active, each link carrying ``gbps``.

    ``write_beats``: the pairs write in bursts of so many beats, and a lateral link that changes its master loses one
    cycle each time: L / (L + 1) (same guide). None: they read.
    """
    import networkx

    graph = network(board)
    for port, channel in pairs:
        if not (0 <= port < board.channels and 0 <= channel < board.channels):
            raise ValueError(f"port {port} to channel {channel}: the board has {board.channels} of each")
    paths = [networkx.shortest_path(graph, ("port", port), ("channel", channel)) for port, channel in pairs]
    flows = [[link for link in pairwise(path) if graph.edges[link]["lateral"] is not None] for path in paths]
    capacity = {}
    for link in {link for flow in flows for link in flow}:
        users = sum(link in flow for flow in flows)
        changes = write_beats is not None and users > 1 and graph.edges[link]["lateral"]
        capacity[link] = gbps * (write_beats / (write_beats + 1) if changes and write_beats else 1.0)
    return max_min(capacity, flows)


def distance(board: Board, port: int, channel: int) -> int:
    """Lateral links between a port and a channel. Alone on its way, a port loses latency by it, no bandwidth."""
    size = board.switch_ports or board.channels
    return abs(port // size - channel // size)


def first_rate(board: Board, demand: Demand, gbps: float) -> float:
    """What the first of the demand's pairs gets while all are active."""
    beats = None if demand.direction == "read" else demand.burst_beats
    return float(rates(board, demand.crossing, gbps, write_beats=beats)[0])
