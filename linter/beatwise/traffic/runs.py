"""How an access walks through its argument: its pattern, its step, and the mean length of its runs.

By formula where the address is linear in the loop counters and the loops are rectangular; else by walking through the
nest (``replay``). Sizes that nobody knows are taken as ``ASSUMED_TRIPS``, and the basis says so.
"""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from dataclasses import replace
from math import gcd, prod

from beatwise.model.access import Access, LoopInstance, Recurrence
from beatwise.model.counting import only_counts
from beatwise.model.form import COUNT, Form, Symbol, number, redrawn_in, symbol_form
from beatwise.model.operations import both
from beatwise.model.traffic import Basis, Pattern, Walk
from beatwise.traffic.compiled import compiled
from beatwise.traffic.replay import STEPS_AT_MOST, Walker
from beatwise.traffic.trips import ASSUMED_TRIPS, Trips, all_trips, is_given, parameters_of, size_of, worst

EVEN_CHANCE = 0.5  #: how often data lets a guarded access run, when nothing more is known
START_MULTIPLE = 4096  #: an argument is taken to start at a multiple of this (common practice, no source)


def walk(access: Access, given: Mapping[str, int]) -> Walk:
    """The walk of one access.

    ``given`` are sizes by parameter name. A run's length in elements follows from the trips of the loops whose steps
    join up; an access that data guards is expected to run in half of the cases, so that its runs are 1/(1 - 1/2) = 2
    elements.
    """
    if access.unresolved is not None:
        return Walk("unresolved", None, None, "constant", None, access.unresolved)
    left = [loop for loop in access.loops if _leaves(access, loop)]
    if left:
        return _last_of(access, left, given)
    sizes = {symbol: size_of(symbol, given) for symbol in parameters_of(access)}
    lost = _lost(access)
    if lost is not None:
        basis = worst(t.basis for t in all_trips(access, sizes))
        return Walk("unresolved", None, None, basis, None, lost)
    found = _measured(access, sizes)
    if not found.executions and not all(map(is_given, sizes)):
        found = _measured(*_taken_to_run(access, sizes))
        found = replace(found, basis=worst([found.basis, "assumed"]))
    if access.choice is not None and _by_data(access.choice.selector):
        return _steered(access, found, sizes)
    return found


def _measured(access: Access, sizes: Mapping[Symbol, int]) -> Walk:
    trips = all_trips(access, sizes)
    return _by_formula(access, trips, sizes) or _by_walking(access, trips, sizes)


def _taken_to_run(access: Access, sizes: Mapping[Symbol, int]) -> tuple[Access, dict[Symbol, int]]:
    """An access that only assumed sizes keep from running: sizes nobody knows then decide no branch, and loops that
    count from one of them count from 0."""
    unknown = {symbol for symbol in sizes if not is_given(symbol)}
    guards = tuple(guard for guard in access.guards if not unknown & guard.condition.leaves())
    taken_off = {
        symbol
        for loop in access.loops
        for monomial, factor in (loop.trips.terms.items() if loop.trips is not None else ())
        for symbol in monomial
        if factor < 0 and symbol in unknown
    }
    return replace(access, guards=guards), {**sizes, **dict.fromkeys(taken_off, 0)}


def _leaves(access: Access, loop: LoopInstance) -> bool:
    """Whether the access runs only in the iteration that ends the loop."""
    if not loop.exits:
        return False
    inside = [guard.condition for guard in access.guards if loop.number in guard.loops]
    condition = number(1)
    for part in inside:
        condition = both(condition, part)
        if condition in loop.exits and _by_data(condition):
            return True
    return False


def _last_of(access: Access, left: Sequence[LoopInstance], given: Mapping[str, int]) -> Walk:
    """The walk of an access that runs once for each time that ``left`` are run through, where data decides."""
    numbers = {loop.number for loop in left}
    own = {loop.counter for loop in left} | {r.symbol for loop in left for r in loop.recurrences}
    outer = replace(
        access,
        loops=tuple(loop for loop in access.loops if loop.number not in numbers),
        guards=tuple(guard for guard in access.guards if not numbers.intersection(guard.loops)),
    )
    if not own & access.offset.leaves() and not any(
        numbers.intersection(redrawn_in(s)) for s in access.offset.leaves()
    ):
        return walk(outer, given)
    if not outer.loops:
        return Walk("single", None, 1.0, "data", 1.0, access.taken)
    executions = walk(replace(outer, offset=number(0)), given).executions
    return Walk("indirect", None, 1.0, "data", executions, access.taken)


# ------------------------------------------------------------------------------------------------------- sizes


def size_basis(access: Access, given: Mapping[str, int]) -> Basis:
    """Where the number of times that the access runs comes from; ``data`` where data decides it, within known loops."""
    symbols = parameters_of(access)
    trips = all_trips(access, {symbol: size_of(symbol, given) for symbol in symbols})
    bases = [t.basis for t in trips if not _ends_by_itself(t.loop)]
    if len(bases) < len(trips) and not all(map(is_given, symbols)):
        bases.append("assumed")
    conditions = [guard.condition for guard in access.guards]
    told = [form for form in conditions if not _by_data(form)]
    if any(leaf.kind == "parameter" and not is_given(leaf) for form in told for leaf in form.leaves()):
        bases.append("assumed")
    if any(map(_by_data, conditions)) or any(_by_data(form) for loop in access.loops for form in loop.exits):
        bases.append("data" if "assumed" not in bases else "assumed")
    return "assumed" if "assumed" in bases else worst(bases)


def _by_data(form: Form) -> bool:
    return any(symbol.kind == "data" for symbol in form.leaves())


def _lost(access: Access) -> str | None:
    """Why the address can't be told, when it depends on something that could not be followed."""
    numbers = {loop.number for loop in access.loops}
    for symbol in access.offset.leaves():
        if symbol.kind == "unknown" and symbol.reason and not _by_data(access.offset):
            if symbol.loops and not numbers.intersection(symbol.loops):
                continue
            if not symbol.loops and not symbol.depends and symbol.place is None:
                return symbol.reason
            if symbol.reason == "a variable that was never set" and not symbol.depends:
                return symbol.reason
            where = f" (line {symbol.place.line})" if symbol.place is not None else ""
            return f"{symbol.reason}{where}"
    return None


# ------------------------------------------------------------------------------------------------- by formula


def _by_formula(access: Access, trips: Sequence[Trips], sizes: Mapping[Symbol, int]) -> Walk | None:
    """The walk, when the address is linear in all counters and the nest is a box; None when it is not."""
    if any(t.loop.until or t.count < 0 for t in trips):
        return None
    if any(any(not _by_data(form) for form in t.loop.exits) for t in trips):
        return None
    counters = {t.loop.counter for t in trips}
    numbers = {t.loop.number for t in trips}
    for guard in access.guards:
        turns = (s for s in guard.condition.leaves() if s.kind in ("counter", "carried"))
        if not _by_data(guard.condition) and any(s.loop in numbers for s in turns):
            return None
    if any(
        symbol.kind in ("data", "unknown", "carried") and numbers.intersection(redrawn_in(symbol))
        for symbol in access.offset.leaves()
    ):
        return None
    strides: list[Form] = []
    rest = access.offset
    for t in trips:
        stride = access.offset.coefficient(t.loop.counter)
        if stride is None or counters & stride.leaves():
            return None
        strides.append(stride)
        rest = rest.without(t.loop.counter)
    if counters & rest.leaves():
        return None
    if not all(compiled(g.condition)(dict(sizes)) for g in access.guards if not _drawn(g.condition)):
        return Walk("single", None, None, worst([t.basis for t in trips]), 0)
    return _boxed(access, trips, strides, rest, sizes)


def _drawn(form: Form) -> bool:
    return any(symbol.kind in ("data", "unknown", "carried", "counter") for symbol in form.leaves())


def _boxed(
    access: Access, trips: Sequence[Trips], strides: Sequence[Form], rest: Form, sizes: Mapping[Symbol, int]
) -> Walk:
    run_form: Form | None = number(access.element_bytes)
    decided = _deciding_loop(access, trips)
    run = 1
    thinned: float | None = None  # the mean run, once data decides whether the next round runs at all
    whole = True
    executions = 1
    pattern: Pattern = "single"
    step: int | None = None
    run_basis: list[Basis] = []
    run_multiple = access.element_bytes
    copied = bool(trips) and trips[-1].loop.kind == "copy"
    start_multiple = gcd(START_MULTIPLE, *(abs(f) for f in rest.terms.values()))
    for t, stride in zip(reversed(trips), reversed(strides), strict=True):
        executions *= t.count
        if t.count == 1 and (t.basis in ("constant", "given")):
            continue
        value = compiled(stride)(dict(sizes)) if not _drawn(stride) else None
        if pattern == "single":
            pattern, step = _pattern(stride, value, access.element_bytes)
        joins = (
            whole
            and not (copied and t is not trips[-1])
            and _joins(stride, value, run_form, run * access.element_bytes, run_basis)
        )
        if whole and t.loop.number == decided:
            thinned = run * min(float(t.count), 1 / (1 - EVEN_CHANCE)) if joins else float(run)
        if joins:
            run *= t.count
            run_basis.append(t.basis)
            run_form = run_form * t.form if run_form is not None and t.form is not None else None
            run_multiple *= _multiple(t)
        else:
            if whole and run == 1:
                run_basis.append(t.basis)
            whole = False
            start_multiple = (
                gcd(start_multiple, *(abs(f) for f in stride.terms.values())) if stride.terms else start_multiple
            )
    basis = worst(run_basis) if run_basis else worst([t.basis for t in trips])
    mean = float(run) if thinned is None else thinned
    if pattern in ("repeated", "descending", "strided"):
        mean = 1.0
    if (
        pattern in ("descending", "strided")
        and decided is None
        and all(t.basis in ("constant", "given") for t in trips)
    ):
        if not any(map(_drawn, strides)):
            jumps = [compiled(stride)(dict(sizes)) for stride in strides]
            mean = _counted_run([t.count for t in trips], jumps, access.element_bytes)
    if decided is not None and (thinned is not None or pattern != "sequential"):
        basis = "data"
    if access.manual:
        pattern = "sequential" if pattern == "single" else pattern
    if copied and pattern == "single":
        pattern, step = "sequential", access.element_bytes
    return Walk(
        pattern, step, mean, basis, float(executions), access.taken, start_multiple or START_MULTIPLE, run_multiple
    )


def _counted_run(counts: Sequence[int], strides: Sequence[int], element: int) -> float:
    """Elements a run in a box of loops, outermost first, by counting the steps of one element ahead.

    The rounds of a loop may meet by chance: ``a[3 - i - j]`` goes from 3, 2, 1 on to 2, 1, 0.

    >>> _counted_run([2, 3], [-4, -4], 4), _counted_run([2, 3], [400, 4], 4)
    (1.2, 3.0)
    """
    inside, back, joins = 1, 0, 0
    total = prod(counts)
    for count, stride in zip(reversed(counts), reversed(strides), strict=True):
        inside *= count
        if stride - back == element and inside:
            joins += total // inside * (count - 1)
        back += stride * (count - 1)
    return total / max(1, total - joins)


def _pattern(stride: Form, value: int | None, element: int) -> tuple[Pattern, int | None]:
    if not stride.terms:
        return "repeated", 0
    known = stride.known if stride.known is not None else value if all(map(is_given, stride.leaves())) else None
    if known == element:
        return "sequential", element
    if known == -element:
        return "descending", -element
    if known == 0:
        return "repeated", 0
    return "strided", known


def _joins(stride: Form, value: int | None, run_form: Form | None, run_bytes: int, bases: Sequence[Basis]) -> bool:
    """Whether the next round of a loop begins where the run of the last one ended."""
    if run_form is not None and stride == run_form:
        return True
    exact = all(basis in ("constant", "given") for basis in bases)
    exact = exact and all(is_given(symbol) for symbol in stride.leaves() if symbol.kind == "parameter")
    return exact and value == run_bytes


def _multiple(t: Trips) -> int:
    """What the trips are known to be a multiple of while the hardware is built."""
    if t.form is None:
        return 1
    if t.form.known is not None:
        return max(1, t.form.known)
    content = 0
    for factor in t.form.terms.values():
        content = gcd(content, factor)
    return max(1, abs(content))


def _guarded(access: Access, trips: Sequence[Trips]) -> bool:
    """Whether data decides anew, in the loops that move the access, if it runs."""
    numbers = {t.loop.number for t in trips}
    return any(g.by_data and numbers.intersection(_redrawn(g.condition)) for g in access.guards)


def _deciding_loop(access: Access, trips: Sequence[Trips]) -> int | None:
    """The innermost loop in whose iterations data decides anew whether the access runs."""
    drawn: set[int] = set()
    for guard in access.guards:
        if guard.by_data:
            drawn |= _redrawn(guard.condition)
    return next((t.loop.number for t in reversed(trips) if t.loop.number in drawn), None)


def _redrawn(form: Form) -> set[int]:
    """The loops of which a new iteration brings new data into the form."""
    return {n for symbol in form.leaves() if _holds_data(symbol) for n in redrawn_in(symbol)}


def _holds_data(symbol: Symbol) -> bool:
    return symbol.kind == "data" or any(other.kind == "data" for other in symbol.depends)


# ------------------------------------------------------------------------------------------------- by walking


def _by_walking(access: Access, trips: Sequence[Trips], sizes: Mapping[Symbol, int]) -> Walk:
    rows = _rows(trips)
    fixed = {
        t.loop.number: t.count
        for t in trips
        if t.count >= 0 and (t.form is None or any(s.kind in ("data", "unknown", "carried") for s in t.form.leaves()))
        and not (t.form is not None and rows.keys() & t.form.leaves())
        and not _ends_by_itself(t.loop)
    }  # fmt: skip
    walker = Walker(access, sizes, fixed, rows)
    seen = walker.walk()
    let_in = Walker(access, sizes, fixed, rows, let_in=True).walk() if walker.drawn else seen
    basis = worst([t.basis for t in trips])
    if any(_ends_by_itself(t.loop) for t in trips):
        basis = worst([t.basis for t in trips if not _ends_by_itself(t.loop)])
        if any(not is_given(symbol) for symbol in sizes):
            basis = "assumed"
    indirect = _indirect(access, trips)
    if _guarded(access, trips) or walker.coins:
        basis = "data"
    mean = seen.mean_run
    if let_in.executions < seen.executions:  # letting it in keeps it out later (a state that it sets itself)
        let_in = seen
    if not seen.executions and not (seen.whole or let_in.executions):
        return Walk("unresolved", None, None, basis, None, f"it does not run in the first {STEPS_AT_MOST} iterations")
    if not let_in.executions:
        return Walk("single", None, None, basis, 0.0)
    if not seen.executions:  # data lets it run too seldom to be drawn
        mean = 1.0
    counted = let_in if _guarded(access, trips) else seen
    executions = float(counted.executions) if counted.whole else _product(trips)
    if let_in.executions == 1 and let_in.whole:
        return Walk("single", None, 1.0, basis, 1.0)
    pattern, step = _seen_pattern(let_in.inner_steps or let_in.steps, access.element_bytes)
    if pattern == "strided" and _own_counter(access) and walker.coins:
        pattern, step = "irregular", None  # data decides how far it moves
    mean = 1.0 if pattern == "repeated" else mean
    if seen.inner_steps and mean is not None and mean >= 1.5 and pattern not in ("sequential",):
        pattern, step = _seen_pattern(let_in.steps, access.element_bytes)
    if indirect and not (pattern == "sequential" and _is_mixed(access, trips)):
        basis = "data" if mean is None or mean < 2 else basis
        return Walk("indirect", None, mean, basis, executions, access.taken, *_multiples(access, trips))
    start, length = _multiples(access, trips) if pattern == "sequential" else (access.element_bytes,) * 2
    if basis == "constant" and pattern == "sequential" and seen.whole:
        start, length = max(start, gcd(START_MULTIPLE, seen.starts)), max(length, seen.lengths)
    return Walk(pattern, step, mean, basis, executions, access.taken, start, length)


def _multiples(access: Access, trips: Sequence[Trips]) -> tuple[int, int]:
    """What the start and length of the rows that the innermost loop walks are known to be multiples of, in bytes."""
    rest, length = access.offset, access.element_bytes
    if trips:
        inner = trips[-1]
        step = access.offset.coefficient(inner.loop.counter)
        if step is not None and step.known == access.element_bytes:
            rest, length = access.offset.without(inner.loop.counter), access.element_bytes * _multiple(inner)
    start = START_MULTIPLE
    carried = {r.symbol: r for loop in access.loops for r in loop.recurrences}
    for monomial, factor in rest.terms.items():
        for symbol in monomial:
            factor *= _symbol_multiple(symbol, carried)
        start = gcd(start, factor)
    return max(start, access.element_bytes), length


def _symbol_multiple(symbol: Symbol, carried: Mapping[Symbol, Recurrence]) -> int:
    """What a carried variable is known to be a multiple of: of where it starts and of all its steps."""
    if symbol not in carried:
        return 1
    multiple = 0
    waiting = [carried[symbol].next]
    for factor in carried[symbol].first.terms.values():
        multiple = gcd(multiple, factor)
    while waiting:
        form = waiting.pop()
        (only,) = form.symbols() if len(form.symbols()) == 1 else (symbol,)
        if only.kind == "operation" and only.name == "select" and form == symbol_form(only):
            waiting += only.operands[1:]
            continue
        for monomial, factor in (form - symbol_form(symbol)).terms.items():
            multiple = gcd(multiple, 1 if symbol in monomial else factor)
    return max(1, multiple)


def _ends_by_itself(loop: LoopInstance) -> bool:
    """Whether the walk finds out how often the loop runs: its end depends on no data."""
    ends = (*loop.until, *loop.exits)
    return loop.trips is None and bool(ends) and not any(_drawn_end(form) for form in ends)


def _drawn_end(form: Form) -> bool:
    return any(symbol.kind in ("data", "unknown") for symbol in form.leaves())


def _product(trips: Sequence[Trips]) -> float | None:
    product = 1.0
    for t in trips:
        if t.count < 0:
            return None
        product *= t.count
    return product


def _seen_pattern(steps: Mapping[int, int], element: int) -> tuple[Pattern, int | None]:
    total = sum(steps.values())
    if not total:
        return "single", None
    if steps.get(element, 0) * 5 >= total * 2:
        return "sequential", element
    step, times = max(steps.items(), key=lambda item: (item[1], -abs(item[0])))
    if step == 0 and times * 2 >= total:
        return "repeated", 0
    if times * 3 < total * 2:
        return "irregular", None
    return ("descending", step) if step == -element else ("strided", step)


def _rows(trips: Sequence[Trips]) -> dict[Symbol, int]:
    """Row pointers: data of which the next one ends a loop that this one begins. Rows are taken to join each other."""
    found: dict[Symbol, int] = {}
    for t in trips:
        if t.form is None:
            continue
        drawn = [s for s in t.form.leaves() if s.kind == "data" and s.at is not None]
        for first in drawn:
            for second in drawn:
                if first is second or first.name != second.name or first.at is None or second.at is None:
                    continue
                gap = (second.at - first.at).known
                if gap is not None and gap > 0:
                    length = t.count if t.count > 0 else ASSUMED_TRIPS
                    found[first] = found[second] = length * 256 // gap
    return found


def _indirect(access: Access, trips: Sequence[Trips]) -> bool:
    """Whether data that changes while the access moves decides its address.

    The first element of a row whose bounds are both data is no index: the row is walked in order.
    """
    drawn = _values_in(access.offset, access, set())
    drawn = {s for s in drawn if _holds_data(s)}
    if not drawn:
        return False
    for t in reversed(trips):
        if t.loop.trips is not None and t.loop.trips.known == 1:
            continue
        if any(t.loop.number in redrawn_in(s) for s in drawn):
            return True
        if _moves_apart(access.offset, t.loop.number, drawn):
            return False
    return False


def _moves_apart(offset: Form, loop: int, drawn: set[Symbol]) -> bool:
    """Whether the loop moves the offset in terms of its own, not under one operation with the data."""
    parts = [Form({monomial: 1}).leaves() for monomial in offset.terms]
    moved = [leaves for leaves in parts if any(s.loop == loop for s in leaves)]
    return bool(moved) and all(drawn.isdisjoint(leaves) for leaves in moved)


def _is_mixed(access: Access, trips: Sequence[Trips]) -> bool:
    """Whether data and the innermost counter stand under one operation (a ring buffer that starts where data says)."""
    return bool(trips) and any(s.loop == trips[-1].loop.number for s in access.offset.leaves())


def _values_in(form: Form, access: Access, seen: set[Symbol]) -> set[Symbol]:
    """The leaves that make up the form's value, those apart that only decide between two values.

    ``out[n++]`` under a condition on data walks in order, although data says how far.
    """
    carried = {r.symbol: r for loop in access.loops for r in loop.recurrences}
    outcomes = {o.symbol: o.form for loop in access.loops for o in loop.outcomes}
    found: set[Symbol] = set()
    for symbol in form.symbols():
        if symbol in seen:
            continue
        if symbol in outcomes:
            seen.add(symbol)
            found |= _values_in(outcomes[symbol], access, seen)
            continue
        if symbol.kind == "operation":
            operands = symbol.operands[1:] if symbol.name == "select" else symbol.operands
            for operand in operands:
                found |= _values_in(operand, access, seen)
        elif symbol in carried:
            seen.add(symbol)
            step = carried[symbol].next
            found |= _values_in(carried[symbol].first, access, seen)
            if not only_counts(step, symbol):
                found |= _values_in(step, access, seen)
                found |= {leaf for leaf in step.leaves() - carried.keys() - outcomes.keys() if leaf.reason != COUNT}
        else:
            found.add(symbol)
    return found


# ----------------------------------------------------------------------------------------------------- steered


def _steered(access: Access, found: Walk, sizes: Mapping[Symbol, int]) -> Walk:
    """Data picks where it goes: between K places that are as likely, a run to one of them has K/(K-1) elements."""
    assert access.choice is not None
    places = max(2, len(access.choice.alternatives))
    run = places / (places - 1)
    if found.pattern == "sequential" and _own_counter(access):
        return Walk("steered", None, found.run_elements, "data", found.executions, None)
    if found.pattern in ("indirect", "irregular", "strided", "descending", "repeated"):
        run = 1.0
    if not access.loops:
        return found
    numbers = {loop.number for loop in access.loops}
    if not numbers.intersection(_redrawn(access.choice.selector)):
        return Walk("steered", found.stride_bytes, found.run_elements, found.basis, found.executions, None)
    inner = access.loops[-1]
    if inner.kind == "copy" or not _redrawn(access.choice.selector).intersection({inner.number}):
        return Walk("steered", None, found.run_elements, found.basis, found.executions, None)
    plain = tuple(guard for guard in access.guards if not _by_data(guard.condition))
    of_all = _measured(replace(access, offset=number(0), guards=plain), sizes).executions
    return Walk("steered", None, run, "data", None if of_all is None else of_all / places, None)


def _own_counter(access: Access) -> bool:
    """Whether the destination has a counter of its own, which moves only when it is chosen."""
    return any(symbol.kind == "carried" for symbol in access.offset.leaves())
