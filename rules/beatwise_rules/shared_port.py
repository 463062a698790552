"""Several arguments that are used at the same time go through one port.

Arguments that name the same bundle share one AXI port: one request path and one data path for each direction, one
memory channel behind it. Two arrays read in one loop get half each; an array read beside one written does not wait
for the port, but both use the same channel.

It matters when the loop, or processes that run side by side, need the arguments in the same iterations. It does not
where one loop loads the first and a later one the second: they take turns anyway.

What to change: name a bundle of its own for each argument that moves much, and put each bundle on a memory channel of
its own.

Slow::

    #include <ap_int.h>

    // Both polarisations come through one port.
    void differential(const ap_uint<512> *horizontal, const ap_uint<512> *vertical, ap_uint<512> *out) {
    #pragma HLS INTERFACE mode=m_axi port=horizontal bundle=sweeps
    #pragma HLS INTERFACE mode=m_axi port=vertical bundle=sweeps
    #pragma HLS INTERFACE mode=m_axi port=out bundle=out
        for (int i = 0; i < 4096; ++i) out[i] = horizontal[i] ^ vertical[i];
    }

Fast::

    #include <ap_int.h>

    // Each has a port of its own.
    void differential(const ap_uint<512> *horizontal, const ap_uint<512> *vertical, ap_uint<512> *out) {
    #pragma HLS INTERFACE mode=m_axi port=horizontal bundle=horizontal
    #pragma HLS INTERFACE mode=m_axi port=vertical bundle=vertical
    #pragma HLS INTERFACE mode=m_axi port=out bundle=out
        for (int i = 0; i < 4096; ++i) out[i] = horizontal[i] ^ vertical[i];
    }

Sources: separate address and data channels for reads and for writes (AXI4: ARM IHI 0022, chapter A1); the rate of a
channel: the board's profile.
"""

from __future__ import annotations

from collections.abc import Iterator, Sequence

from beatwise.model.access import Interface
from beatwise.model.finding import Facts, Finding
from beatwise.model.traffic import Traffic
from beatwise_rules.levels import weighed
from beatwise_rules.sites import goes_on, working_loop
from beatwise_rules.wording import gbps, lines, listed, quoted

CURES: frozenset[str] = frozenset()


def find(facts: Facts) -> Iterator[Finding]:
    """One finding for each port with arguments that are used at the same time."""
    for port in facts.trace.interfaces:
        mine = [traffic for traffic in facts.traffic if traffic.access.interface == port.name and _is_known(traffic)]
        companies = list(_companies(mine))
        if companies:
            yield _told(facts, port, companies)


def _is_known(traffic: Traffic) -> bool:
    return goes_on(traffic) and traffic.walk.pattern != "unresolved"


def _companies(mine: Sequence[Traffic]) -> Iterator[list[Traffic]]:
    """Accesses to several arguments that go on at the same time: those of a loop, those of processes side by side."""
    by_loop: dict[int, list[Traffic]] = {}
    for traffic in mine:
        loop = working_loop(traffic.access)
        if loop is not None:
            by_loop.setdefault(loop.number, []).append(traffic)
    yield from (group for group in by_loop.values() if len(_arguments(group)) > 1 and not _alternatives(group))
    processes: dict[str, set[str]] = {}
    for traffic in mine:
        if traffic.access.process is not None:
            processes.setdefault(traffic.access.process, set()).add(traffic.access.argument)
    if len(processes) > 1 and len(set().union(*processes.values())) > 1:
        yield [traffic for traffic in mine if traffic.access.process is not None]


def _arguments(group: Sequence[Traffic]) -> list[str]:
    return list(dict.fromkeys(traffic.access.argument for traffic in group))


def _alternatives(group: Sequence[Traffic]) -> bool:
    """Whether all are the alternatives of one choice, of which an iteration uses one."""
    return (
        len({(traffic.access.place, traffic.access.direction) for traffic in group}) == 1
        and group[0].access.choice is not None
    )


def _told(facts: Facts, port: Interface, companies: Sequence[list[Traffic]]) -> Finding:
    everyone = list({id(traffic): traffic for group in companies for traffic in group}.values())
    arguments = _arguments(everyone)
    now = sum(traffic.now_gbps for traffic in everyone)
    alone = sum(max(_alone(facts, traffic, group) for group in companies if traffic in group) for traffic in everyone)
    finding = Finding(
        rule="shared-port",
        level="note",
        kernel=facts.trace.kernel,
        place=port.place,
        argument=None,
        interface=port.name,
        message=f"{listed(arguments)} are used at the same time and share port {quoted(port.name)}.",
        because=(
            *(_evidence(group) for group in companies),
            f"Together they get {gbps(now)}; on ports and channels of their own they would get {gbps(alone)}."
            if alone > 1.01 * now
            else f"Together they get {gbps(now)}, which ports of their own would not change as things are.",
        ),
        instead=_advice(facts, port, arguments),
        now_gbps=now,
        could_gbps=alone,
        loss_gbps=max(0.0, alone - now),
    )
    return weighed([finding], facts)[0]


def _evidence(group: Sequence[Traffic]) -> str:
    loops = {loop.place.line for traffic in group if (loop := working_loop(traffic.access)) is not None}
    processes = list(dict.fromkeys(traffic.access.process for traffic in group if traffic.access.process is not None))
    where = f"The loop on {lines(loops)}" if len(loops) == 1 else f"Side by side, {listed(processes)}"
    reads = _arguments([traffic for traffic in group if traffic.access.direction == "read"])
    writes = _arguments([traffic for traffic in group if traffic.access.direction == "write"])
    many = len(loops) != 1
    parts = [f"{'read' if many else 'reads'} {listed(reads)}"] if reads else []
    parts += [f"{'write' if many else 'writes'} {listed(writes)}"] if writes else []
    one_path = (
        " over one data path"
        if len(reads) > 1 or len(writes) > 1
        else ", each direction on its own path but on one channel"
    )
    return f"{where} {' and '.join(parts)}{one_path}."


def _alone(facts: Facts, traffic: Traffic, group: Sequence[Traffic]) -> float:
    """What the access would get with port and channel to itself, all else as it is."""
    access, board = traffic.access, facts.board
    same_way = [other for other in group if other.access.direction == access.direction]
    on_port = len(same_way) / sum(other.access.argument == access.argument for other in same_way)
    on_channel = (
        len(group) / sum(other.access.argument == access.argument for other in group) if board.channels > 1 else 1.0
    )
    best = board.read_cap_gbps if access.direction == "read" else board.write_cap_gbps
    ways = {other.access.direction for other in group if other.access.argument == access.argument}
    gone = (
        {"shared", "turnaround"}
        if board.channels > 1 and len(ways) == 1
        else {"shared"}
        if board.channels > 1
        else set()
    )
    factors = {"port": 1.0, "channel": 1.0 if "shared" in traffic.limits else on_channel, "shared": 1.0}
    factors |= {"rows": on_channel, "turnaround": on_channel, "switch": on_channel}
    bounds = [rate * factors.get(limit, on_port) for limit, rate in traffic.limits.items() if limit not in gone]
    return max(traffic.now_gbps, min([best, *bounds])) if bounds else traffic.now_gbps


def _advice(facts: Facts, port: Interface, arguments: Sequence[str]) -> str:
    bundles = ", ".join(f"`bundle={port.name}_{argument}`" for argument in arguments[1:4])
    more = ", ..." if len(arguments) > 4 else ""
    whose = listed(arguments[1:])
    own = "a bundle of its own" if len(arguments) == 2 else "bundles of their own"
    channels = facts.board.channels
    put = f", and each bundle one of the {channels} channels" if channels > 1 else ""
    return f"Give {whose} {own} ({bundles}{more}){put}."
