"""A finding's arithmetic: the rate an access gets, spelt out so that a reader can check it by hand."""

from __future__ import annotations

from collections.abc import Sequence

from beatwise.model.access import Interface
from beatwise.model.finding import Facts, Finding
from beatwise.model.traffic import PortBuffer, Traffic
from beatwise_rules.levels import weighed
from beatwise_rules.wording import count, gbps, size

LEAST_GBPS = 1e-6  #: a rate of less is not explained
MANY = 64  #: a rate that is left over by more accesses than this has another reason


def trouble(
    rule: str,
    facts: Facts,
    site: Sequence[Traffic],
    *,
    message: str,
    because: Sequence[str],
    instead: str,
    argument: str | None = "",
    cure: str = "long full-width bursts",
) -> Finding:
    """A finding about the accesses of one site, the worst first, with the worst one's rates as its last evidence.

    ``argument`` is the site's unless told otherwise; None where the trouble lies between several. ``cure`` is what
    would get what the accesses could.
    """
    worst = site[0]
    access = worst.access
    finding = Finding(
        rule=rule,
        level="note",
        kernel=facts.trace.kernel,
        place=access.place,
        argument=access.argument if argument == "" else argument,
        interface=access.interface if len({traffic.access.interface for traffic in site}) == 1 else None,
        message=message,
        because=(*because, rate_line(facts, worst, cure)),
        instead=instead,
        now_gbps=worst.now_gbps,
        could_gbps=worst.could_gbps,
        loss_gbps=worst.loss_gbps,
        seconds_saved=seconds_saved(facts, site),
    )
    return weighed([finding], facts)[0]


def seconds_saved(facts: Facts, site: Sequence[Traffic]) -> float | None:
    """What a call of the kernel would need less if the accesses got what they could; None where sizes are assumed."""
    return None if facts.time is None else facts.time.saved(site)


def rate_line(facts: Facts, traffic: Traffic, cure: str) -> str:
    """What the access gets, the sum behind it, and what it could get."""
    now, could = gbps(traffic.now_gbps), gbps(traffic.could_gbps)
    if traffic.loss_gbps < 0.01 * traffic.could_gbps:
        return f"It gets {now} all the same: on this board that is all that {cure} would get here."
    how = _arithmetic(facts, traffic)
    return f"{how}{now}; {cure} would get {could}." if how else f"It gets {now}; {cure} would get {could}."


def _arithmetic(facts: Facts, traffic: Traffic) -> str | None:
    """The sum behind the limit that binds, up to the colon; None where this is not how the number came about."""
    bus = _on_the_bus(facts, traffic) if traffic.now_gbps >= LEAST_GBPS else None
    if bus is None:
        return None
    how, rate = bus
    used = _used(traffic)
    sharing = rate * used / traffic.now_gbps
    if not 0.9 < sharing < MANY or abs(sharing - round(sharing)) > 0.02 * sharing:
        return None
    if round(sharing) == 1 and used == 1:
        return f"{how}: "
    parts = [f"{how}: {gbps(rate)}"]
    if used < 1:
        parts.append(f"{100 * used:.3g} % of it used")
    if round(sharing) > 1:
        parts.append(f"shared by {round(sharing)} accesses")
    return f"{', '.join(parts)}: "


def _on_the_bus(facts: Facts, traffic: Traffic) -> tuple[str, float] | None:
    """The limit that binds, in words, and the rate it leaves to the port."""
    board, beats = facts.board, traffic.burst_beats
    beat_bytes, cycle_ns, reads = traffic.width_bits / 8, 1000 / board.kernel_mhz, traffic.access.direction == "read"
    request_bytes = beats * beat_bytes
    a_request = f"{count(beats, 'beat')} of {size(beat_bytes)} per request"
    outstanding = outstanding_of(facts, traffic)
    match traffic.limit:
        case "requests" if reads:
            wait_ns, turn_ns = request_ns(facts, traffic), board.request_cycles * cycle_ns
            if turn_ns > wait_ns / outstanding:
                return (
                    f"{a_request}, one request in {board.request_cycles:g} cycles at {board.kernel_mhz:g} MHz",
                    request_bytes / turn_ns,
                )
            how = f"{a_request}, {outstanding} outstanding over {wait_ns:.0f} ns"
            return how, outstanding * request_bytes / wait_ns
        case "requests" | "gaps":
            lost, wait_ns = board.write_gap_beats, request_ns(facts, traffic)
            spaced = beats / (beats + lost) * beat_bytes / cycle_ns
            how = f"{a_request}, then {count(lost, 'beat')} lost, at {board.kernel_mhz:g} MHz"
            if outstanding * request_bytes / wait_ns < spaced:
                spaced = outstanding * request_bytes / wait_ns
                how = f"{a_request}, {outstanding} outstanding over {wait_ns:.0f} ns"
            return _less_waiting(traffic, how, spaced)
        case "width" | "port":
            return f"{size(beat_bytes)} a cycle at {board.kernel_mhz:g} MHz", beat_bytes / cycle_ns
        case "interval":
            cycles = beat_bytes / cycle_ns * _used(traffic) / traffic.now_gbps
            return (
                f"{size(beat_bytes)} each {cycles:.0f} cycles at {board.kernel_mhz:g} MHz",
                beat_bytes / cycle_ns / cycles,
            )
        case "channel":
            cap = board.read_cap_gbps if reads else board.write_cap_gbps
            moved = -(-request_bytes // board.granule_bytes) * board.granule_bytes
            used = f", {size(request_bytes)} of every {size(moved)}" if moved > request_bytes else ""
            return f"What the channel gives to {'reads' if reads else 'writes'}{used}", cap * request_bytes / moved
        case "rows":
            return "The memory opens a row for nearly every jump", traffic.now_gbps / _used(traffic)
        case "turnaround":
            return "The channel turns around between reads and writes, and this is its part", (
                traffic.now_gbps / _used(traffic)
            )
        case _:
            return None


def _less_waiting(traffic: Traffic, how: str, bound: float) -> tuple[str, float] | None:
    """Writes that wait for answers and for gaps get a little less than either alone would leave them."""
    used = _used(traffic)
    accesses = max(1, round(bound * used / traffic.now_gbps))
    rate = traffic.now_gbps * accesses / used
    if rate > 0.99 * bound:
        return how, bound
    return (f"{how}: {gbps(bound)}, less what waiting for answers takes", rate) if rate > 0.7 * bound else None


def _used(traffic: Traffic) -> float:
    """The share of the bytes in its beats that an access uses."""
    access, beat_bytes = traffic.access, traffic.width_bits // 8
    packed = beat_bytes > 1 << (access.element_bytes - 1).bit_length()  # several elements side by side in a beat
    carried = access.element_bytes if packed else -(-access.element_bytes // beat_bytes) * beat_bytes
    return access.part_bytes / carried


def request_ns(facts: Facts, traffic: Traffic) -> float:
    """From a request to the end of its answer, alone on the bus."""
    board, beats, cycle_ns = facts.board, traffic.burst_beats, 1000 / facts.board.kernel_mhz
    if traffic.access.direction == "read":
        return board.read_latency_ns + board.read_beat_factor * beats * cycle_ns
    return board.write_latency_ns + (beats + board.write_gap_beats) * cycle_ns


def outstanding_of(facts: Facts, traffic: Traffic) -> int:
    port = port_of(facts, traffic)
    own = None if port is None else port.read_outstanding
    if port is not None and traffic.access.direction == "write":
        own = port.write_outstanding
    return own or facts.board.outstanding


def buffer_of(facts: Facts, traffic: Traffic) -> PortBuffer | None:
    """What the access's port keeps on chip for its direction."""
    access = traffic.access
    return next(
        (
            buffer
            for port in facts.ports
            if port.interface == access.interface
            for buffer in port.buffers
            if buffer.direction == access.direction
        ),
        None,
    )


def port_of(facts: Facts, traffic: Traffic) -> Interface | None:
    """The interface that the access goes through."""
    return next((port for port in facts.trace.interfaces if port.name == traffic.access.interface), None)
