"""What the rules ask of an access: which loop moves it, what data it depends on, which others stand at its site."""

from __future__ import annotations

from collections.abc import Callable, Iterable, Iterator

from beatwise.model.access import Access, LoopInstance
from beatwise.model.finding import Facts
from beatwise.model.form import Form, Symbol, bounds
from beatwise.model.place import Place
from beatwise.model.traffic import Block, Traffic

PLAUSIBLE_BYTES = 1 << 30  #: what a 32-bit index could reach says nothing about the size of an array


def sites(facts: Facts, holds: Callable[[Traffic], bool]) -> Iterator[list[Traffic]]:
    """The accesses for which ``holds`` is true and that run in a loop, grouped by place and argument, the worst first.

    A load and a store at one place (``x[k] += 1``), and a helper called twice on one argument, are one site.
    """
    groups: dict[tuple[str, int, str], list[Traffic]] = {}
    again = loaded_again(facts)
    for traffic in facts.traffic:
        if goes_on(traffic) and holds(traffic) and traffic.access.order not in again:
            place = traffic.access.place
            groups.setdefault((place.file, place.offset, traffic.access.argument), []).append(traffic)
    for group in groups.values():
        yield sorted(group, key=lambda traffic: -traffic.loss_gbps)


def loaded_again(facts: Facts) -> set[int]:
    """The guarded loads (by their order) of an element that the same iteration has loaded before in any case.

    ``if (x[k] > limit) y[n++] = x[k];``: the value is at hand, no tool fetches it twice. Not where the argument is also
    stored to in between.
    """
    written = {traffic.access.argument for traffic in facts.traffic if traffic.access.direction == "write"}
    first: dict[tuple[str, str, Form, tuple[int, ...], tuple[Place, ...]], Access] = {}
    found: set[int] = set()
    for access in sorted((traffic.access for traffic in facts.traffic), key=lambda access: access.order):
        if access.direction == "write" or access.argument in written or access.unresolved is not None:
            continue
        key = (access.argument, access.covers, access.offset, tuple(loop.number for loop in access.loops), access.chain)
        earlier = first.setdefault(key, access)
        shared = len(earlier.guards)
        if len(access.guards) > shared and earlier.guards == access.guards[:shared]:
            found.add(access.order)
    return found


def goes_on(traffic: Traffic) -> bool:
    """Whether the access runs more than once, in a loop; one that does not is never worth a word."""
    return bool(traffic.access.loops) and traffic.walk.pattern != "single"


def blocked_by(block: Block) -> Callable[[Traffic], bool]:
    """Whether an access is kept from bursts for this reason."""
    return lambda traffic: block in traffic.blocked


def moves(loop: LoopInstance, access: Access) -> bool:
    """Whether the address of the access changes with the loop."""
    return any(
        symbol.loop == loop.number or (symbol.kind in ("data", "unknown") and loop.number in symbol.loops)
        for symbol in access.offset.leaves()
    )


def moving_loop(access: Access) -> LoopInstance:
    """The innermost loop that moves the address; the innermost of all when none does."""
    return next((loop for loop in reversed(access.loops) if moves(loop, access)), access.loops[-1])


def working_loop(access: Access) -> LoopInstance | None:
    """The innermost loop whose iterations follow each other in time: one unrolled in full is hardware side by side."""
    return next((loop for loop in reversed(access.loops) if loop.unroll != 0), None)


def data_in(form: Form) -> tuple[Symbol, ...]:
    """The data that a form is made of, in the order of the source; what it only depends on where there is no other."""
    found = _made_of(form) or {symbol for symbol in form.leaves() if symbol.kind == "data"}
    return tuple(sorted(found, key=lambda symbol: symbol.number))


def _made_of(form: Form) -> set[Symbol]:
    direct = {symbol for symbol in form.symbols() if symbol.kind == "data"}
    inner = (operand for symbol in form.symbols() if symbol.kind == "operation" for operand in symbol.operands)
    return direct.union(*map(_made_of, inner))


def named_data(symbols: Iterable[Symbol]) -> list[str]:
    """The names of data that have one."""
    return list(dict.fromkeys(symbol.name for symbol in symbols if symbol.name.strip("?~ ")))


def never_jumps(traffic: Traffic) -> bool:
    """Whether the access walks over its argument once, in order, from end to end."""
    walk = traffic.walk
    once = walk.executions is not None and (walk.run_elements or 0) >= walk.executions
    return once and walk.pattern == "sequential" and not traffic.blocked


def argument_bytes(access: Access) -> int | None:
    """How large the argument is, as far as its type, a directive, or the reach of the index says."""
    low, high = bounds(access.offset)
    reach = high + access.element_bytes if low is not None and low >= 0 and high is not None else None
    known = [value for value in (access.array_bytes, reach) if value is not None and value <= PLAUSIBLE_BYTES]
    return min(known) if known else None
