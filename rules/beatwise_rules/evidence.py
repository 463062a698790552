"""A finding's arithmetic: the rate an access gets, spelt out so that a reader can check it by hand."""

from __future__ import annotations

from collections.abc import Sequence

from beatwise.model.access import Interface
from beatwise.model.finding import Facts, Finding
from beatwise.model.traffic import Traffic
from beatwise_rules.levels import weighed
from beatwise_rules.wording import count, gbps, size

MANY = 64  #: a rate that is left over by more accesses than this has another reason
KNOWN_SIZES = ("constant", "given", "tripcount")  #: bases on which a time may be stated


def trouble(
    rule: str,
    facts: Facts,
    site: Sequence[Traffic],
    *,
    message: str,
    because: Sequence[str],
    instead: str,
    argument: str | None = "",
) -> Finding:
    """A finding about the accesses of one site, the worst first, with the worst one's rates as its last evidence.

    ``argument`` is the site's unless told otherwise; None where the trouble lies between several.
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
        because=(*because, rate_line(facts, worst)),
        instead=instead,
        now_gbps=worst.now_gbps,
        could_gbps=worst.could_gbps,
        loss_gbps=worst.loss_gbps,
        seconds_saved=seconds_saved(site),
    )
    return weighed([finding], facts)[0]


def seconds_saved(site: Sequence[Traffic]) -> float | None:
    """What the accesses would need less if they got what they could; None where the sizes are assumed."""
    saved = 0.0
    for traffic in site:
        if traffic.bytes_moved is None or traffic.walk.basis not in KNOWN_SIZES:
            return None
        if traffic.now_gbps > 0 and traffic.could_gbps > 0:
            saved += traffic.bytes_moved / 1e9 * (1 / traffic.now_gbps - 1 / traffic.could_gbps)
    return max(0.0, saved)


def rate_line(facts: Facts, traffic: Traffic) -> str:
    """What the access gets, the sum behind it, and what it could get."""
    now, could = gbps(traffic.now_gbps), gbps(traffic.could_gbps)
    if traffic.loss_gbps < 0.01 * traffic.could_gbps:
        return f"It gets {now} all the same: on this board that is all that long bursts would get here."
    how = _arithmetic(facts, traffic)
    return (
        f"{how}{now}; long full-width bursts would get {could}."
        if how
        else f"It gets {now}; long full-width bursts would get {could}."
    )


def _arithmetic(facts: Facts, traffic: Traffic) -> str | None:
    """The sum behind the limit that binds, up to the colon; None where this is not how the number came about."""
    bus = _on_the_bus(facts, traffic)
    if bus is None or traffic.now_gbps <= 0:
        return None
    how, rate = bus
    access, beat_bytes = traffic.access, traffic.width_bits // 8
    packed = beat_bytes > 1 << (access.element_bytes - 1).bit_length()  # several elements side by side in a beat
    carried = access.element_bytes if packed else -(-access.element_bytes // beat_bytes) * beat_bytes
    used = access.part_bytes / carried
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
    board, port, beats = facts.board, port_of(facts, traffic), traffic.burst_beats
    beat_bytes, cycle_ns, reads = traffic.width_bits / 8, 1000 / board.kernel_mhz, traffic.access.direction == "read"
    request_bytes = beats * beat_bytes
    a_request = f"{count(beats, 'beat')} of {size(beat_bytes)} per request"
    match traffic.limit:
        case "requests":
            own = None if port is None else port.read_outstanding if reads else port.write_outstanding
            outstanding = own or board.outstanding
            wait_ns = board.read_latency_ns + board.read_beat_factor * beats * cycle_ns
            if not reads:
                wait_ns = board.write_latency_ns + beats * cycle_ns
            turn_ns = board.request_cycles * cycle_ns
            if reads and turn_ns > wait_ns / outstanding:
                return (
                    f"{a_request}, one request in {board.request_cycles:g} cycles at {board.kernel_mhz:g} MHz",
                    request_bytes / turn_ns,
                )
            return (
                f"{a_request}, {outstanding} outstanding over {wait_ns:.0f} ns",
                outstanding * request_bytes / wait_ns,
            )
        case "gaps":
            lost = board.write_gap_beats
            how = f"{a_request}, then {count(lost, 'beat')} lost, at {board.kernel_mhz:g} MHz"
            return how, beats / (beats + lost) * beat_bytes / cycle_ns
        case "width" | "port":
            return f"{size(beat_bytes)} a cycle at {board.kernel_mhz:g} MHz", beat_bytes / cycle_ns
        case "channel":
            cap = board.read_cap_gbps if reads else board.write_cap_gbps
            moved = -(-request_bytes // board.granule_bytes) * board.granule_bytes
            used = f", {size(request_bytes)} of every {size(moved)}" if moved > request_bytes else ""
            return f"What the channel gives to {'reads' if reads else 'writes'}{used}", cap * request_bytes / moved
        case _:
            return None


def port_of(facts: Facts, traffic: Traffic) -> Interface | None:
    """The interface that the access goes through."""
    return next((port for port in facts.trace.interfaces if port.name == traffic.access.interface), None)
