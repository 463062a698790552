"""Loops: what the body changes, what that is in iteration k, and how often the body runs."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass, replace

from beatwise.model.access import LoopInstance, Outcome, Recurrence
from beatwise.model.counting import only_counts
from beatwise.model.form import (
    COUNT,
    ONE,
    ZERO,
    Form,
    Symbol,
    bounds,
    carried,
    counter,
    data,
    number,
    renumbered,
    symbol_form,
    unknown,
)
from beatwise.model.kernel import Directive, Expression, Loop, is_independence
from beatwise.model.operations import floordiv, minimum, mod, negation, select
from beatwise.model.substitution import substitute
from beatwise.model.types import ArrayType, IntType, PointerType, RealType, Type
from beatwise.trace.calls import Caller
from beatwise.trace.expressions import bare
from beatwise.trace.interfaces import element_type
from beatwise.trace.machine import Flow
from beatwise.trace.recurrence import Carry, Solved, Trips, solve, trips_while
from beatwise.trace.state import ANY, State, conjunction, joined, replaced, replaced_cells
from beatwise.trace.values import (
    ChoiceSpot,
    LocalSpot,
    MemorySpot,
    Number,
    Path,
    Pointer,
    Root,
    Spot,
    Value,
    depending,
    picked,
)

Cell = tuple[Root, Path]
TURNS_AT_MOST = 64  #: iterations of a loop that are followed one by one
TURN_STEPS_AT_MOST = 20_000  #: statements and expressions in all of them


@dataclass(slots=True)
class Moving:
    """A cell that the loop changes: the symbol that enters the body for it, and what it held before."""

    cell: Cell
    symbol: Symbol
    before: Value | None
    kind: Type | None

    def entering(self) -> Value:
        """What the body finds."""
        form = symbol_form(self.symbol)
        if isinstance(self.before, Pointer):
            return Pointer(moved(self.before.spot, form))
        return Number(form)

    def first(self) -> Form:
        """What the symbol is in the first iteration."""
        if isinstance(self.before, Pointer):
            return ZERO
        if isinstance(self.before, Number):
            return self.before.form
        return symbol_form(unknown("a variable that was never set", None))

    def after(self, value: Value | None) -> Form | None:
        """What the symbol becomes, when the cell holds ``value`` at the end of the body; None: it can't be told."""
        if isinstance(self.before, Pointer):
            return distance(self.before.spot, value.spot) if isinstance(value, Pointer) else None
        return value.form if isinstance(value, Number) else None


def moved(spot: Spot, by: Form) -> Spot:
    """The spot ``by`` bytes (in memory) or elements (on chip) further."""
    match spot:
        case MemorySpot():
            return replace(spot, offset=spot.offset + by)
        case LocalSpot(path=(*head, Form() as last)):
            return replace(spot, path=(*head, last + by))
        case ChoiceSpot():
            return replace(spot, arms=tuple((c, moved(arm, by)) for c, arm in spot.arms))
        case _:
            return spot


def distance(before: Spot, after: Spot) -> Form | None:
    """How far ``after`` lies behind ``before``, when both are in the same argument or array."""
    match before, after:
        case MemorySpot(), MemorySpot() if before.argument == after.argument:
            return less_in_each_branch(after.offset, before.offset)
        case LocalSpot(path=(*head, Form() as a)), LocalSpot(path=(*rest, Form() as b)):
            return less_in_each_branch(b, a) if before.root == after.root and head == rest else None
        case LocalSpot(), LocalSpot():
            return ZERO if before == after else None
        case ChoiceSpot(), ChoiceSpot() if len(before.arms) == len(after.arms):
            steps = {distance(a, b) for (_, a), (_, b) in zip(before.arms, after.arms, strict=True)}
            return steps.pop() if len(steps) == 1 else None
    return None


def less_in_each_branch(value: Form, by: Form) -> Form:
    """``value - by``; of a choice, each branch less ``by``, so that what a branch adds is seen."""
    symbols = value.symbols()
    if len(value.terms) == 1 and len(symbols) == 1:
        (symbol,) = symbols
        if symbol.name == "select" and symbol.kind == "operation" and value == symbol_form(symbol):
            condition, yes, no = symbol.operands
            return select(condition, less_in_each_branch(yes, by), less_in_each_branch(no, by))
    return value - by


class Looper(Caller):
    """What a loop does."""

    def loop(self, statement: Loop, state: State) -> Flow:
        first = self.run_all(statement.initial, state)
        if first.next is None:
            return first
        state = first.next
        if self.scouting:
            return self._scouted(statement, state)
        changed_in_body, changed_in_step, hints = self._scout(statement, state)
        mark, begin = self.record.mark(), state.copy()
        flow = self._follow(statement, state, changed_in_body, changed_in_step, hints, {})
        turning = self._turning
        if turning is not None and turning[0] is statement:
            self._turning = None
            self.record.cut(mark)
            flow = self._follow(statement, begin, changed_in_body, changed_in_step, hints, turning[1])
            self._turning = None
        return flow

    _turning: tuple[Loop, dict[Cell, list[Spot]]] | None = None

    def _find_turning(self, statement: Loop, moving: list[Moving], end: State) -> None:
        """Pointers that change their argument from one iteration to the next, as when two buffers are swapped."""
        places: dict[Cell, list[Spot]] = {}
        first = {m.cell: m.before.spot for m in moving if isinstance(m.before, Pointer)}
        for m in moving:
            held = end.cells.get(m.cell[0], {}).get(m.cell[1])
            if not isinstance(m.before, Pointer) or not isinstance(held, Pointer):
                continue
            if m.after(held) is None:
                others = [spot for spot in first.values() if _argument(spot) == _argument(held.spot)]
                places[m.cell] = [m.before.spot, others[0] if others else held.spot]
        if places and all(_argument(spot) is not None for spots in places.values() for spot in spots):
            self._turning = (statement, places)

    # --------------------------------------------------------------------------------------------- scouting

    def _scouted(self, statement: Loop, state: State) -> Flow:
        """One look at the body, for what it writes."""
        flow = Flow(None)
        self._loosen(statement, state)
        if statement.condition is not None:
            self.value(statement.condition, state)
        part = self.run(statement.body, state.copy())
        ends = [end for end in (part.next, *part.continues, *part.breaks) if end is not None]
        after = ends[0] if ends else state
        if statement.step is not None:
            self.value(statement.step, after)
        flow.returns = part.returns
        flow.next = after
        return flow

    def _scout(self, statement: Loop, state: State) -> tuple[set[Cell], set[Cell], Mapping[Root, Mapping[Path, Value]]]:
        """The cells that the body and the step write; and what the body leaves in them, roughly."""
        twin = state.copy()
        mark, open_ = self.record.mark(), self.open
        self.scouting += 1
        self.open = (*self.open, -1)
        self._loosen(statement, twin)
        twin.written = set()
        if statement.condition is not None:
            self.value(statement.condition, twin)
        part = self.run(statement.body, twin.copy())
        in_body = set(twin.written)
        after = next((end for end in (part.next, *part.continues, *part.breaks) if end is not None), twin)
        after.written = set()
        if statement.step is not None:
            self.value(statement.step, after)
        in_step = after.written
        self.scouting -= 1
        self.open = open_
        self.record.cut(mark)
        own = state.cells.keys()
        for root in {cell[0] for cell in in_body | in_step} - own:
            if root in self.statics:
                self.declare(self.statics[root], state)
        if state.written is not None:
            state.written |= {cell for cell in in_body | in_step if cell[0] in own}
        return (
            {cell for cell in in_body if cell[0] in own},
            {cell for cell in in_step if cell[0] in own},
            after.cells,
        )

    def _loosen(self, statement: Loop, state: State) -> None:
        """Takes their values from the variables that the loop steps by, so that ``a[i]`` is no certain element."""
        trial = state.copy()
        trial.written = set()
        if statement.step is not None:
            self.value(statement.step, trial)
        else:
            self.run(statement.body, trial)
        for root, path in trial.written:
            if root in state.cells and isinstance(state.cells[root].get(path), Number):
                self._set(state, (root, path), Number(symbol_form(carried(self.variable_name(root), -1))))

    # -------------------------------------------------------------------------------------------- following

    def _follow(
        self,
        statement: Loop,
        state: State,
        changed_in_body: set[Cell],
        changed_in_step: set[Cell],
        hints: Mapping[Root, Mapping[Path, Value]],
        turning: Mapping[Cell, list[Spot]],
    ) -> Flow:
        loop_number = self.new_loop()
        name = statement.label or f"loop at line {statement.place.line}"
        provisional = counter(name, loop_number)
        outer_open = self.open
        self.open = (*self.open, loop_number)
        mark, steps = self.record.mark(), self.steps
        self.record.loops[loop_number] = LoopInstance(
            loop_number, provisional, statement.place, self.frame.function.name, None, why_unknown="it was not followed"
        )
        entry = state.copy()
        moving = self._enter(entry, (changed_in_body | changed_in_step) - turning.keys(), hints, loop_number)
        for cell, spots in turning.items():
            odd = mod(symbol_form(provisional), number(len(spots)))
            self._set(entry, cell, Pointer(picked(odd, dict(enumerate(spots)), statement.place)))
        count_from = provisional
        early = self._step_only(statement, entry, moving, changed_in_body, provisional)
        trips_early: Form | None = None
        if early:
            bound = {m.symbol: form for m, form in early}
            for m, _ in early:
                self._set(entry, m.cell, replaced(m.entering(), bound, {}))
            moving = [m for m in moving if m.symbol not in bound]
            trips_early = self._early_trips(statement, entry, moving, early, provisional)
            if trips_early is not None:
                high = bounds(trips_early)[1]
                count_from = renumbered(provisional, None if high is None else max(0, high - 1))
                swap = {provisional: symbol_form(count_from)}
                memo: dict[Symbol, Form] = {}
                guards = entry.guards
                entry = entry.substituted(swap, memo)
                entry.guards = guards
        # the body, once
        base_guards = entry.guards
        begin = entry.copy()
        condition = ONE
        if statement.condition is not None and statement.test_first:
            condition = self.condition(statement.condition, begin)
        flow = self.run(statement.body, begin)
        end = flow.next
        for state_ in flow.continues:
            end = joined(end, state_, statement.place)
        if end is not None:
            end.guards = base_guards
            if statement.step is not None:
                self.value(statement.step, end)
            if statement.condition is not None and not statement.test_first:
                condition = self.condition(statement.condition, end)
        # what is carried
        if end is not None and not turning:
            self._find_turning(statement, moving, end)
        solved = self._solve(moving, end, count_from, loop_number, mark)
        values = solved.closed
        memo = {}
        condition = substitute(condition, values, memo)
        exits = [substitute(conjunction(s.guards[len(base_guards) :]), values, memo) for s in flow.breaks]
        exits += [substitute(conjunction(s.guards[len(base_guards) :]), values, memo) for s, _ in flow.returns]
        if end is None and not exits:
            exits = [ONE]
        trips = self._trips(condition, exits, count_from, statement, trips_early)
        silent = self.record.mark() == mark
        if (
            silent
            and self._is_computed(moving, solved, changed_in_body, hints)
            and self._is_short(trips, self.steps - steps)
        ):
            self.open = outer_open
            del self.record.loops[loop_number]
            assert trips.count is not None and trips.count.known is not None
            return self._turn_by_turn(statement, state, trips.count.known)
        final = count_from
        if trips.count is not None:
            high = bounds(trips.count)[1]
            if high is not None and (count_from.high is None or high - 1 < count_from.high):
                final = renumbered(count_from, max(0, high - 1))
        if final is not count_from:
            values = {symbol: substitute(form, {count_from: symbol_form(final)}) for symbol, form in values.items()}
            values[count_from] = symbol_form(final)
            memo = {}
        self.record.substitute(mark, values, memo)
        self.record.loops[loop_number] = self._instance(statement, loop_number, final, trips, values, solved.left)
        self.open = outer_open
        return self._leave(
            statement, state, entry, end, flow, moving, early, values, memo, final, trips, loop_number,
            count_from, provisional,
        )  # fmt: skip

    def _enter(
        self, entry: State, changed: set[Cell], hints: Mapping[Root, Mapping[Path, Value]], loop_number: int
    ) -> list[Moving]:
        """Puts a symbol into every cell that the loop changes."""
        moving: list[Moving] = []
        for root, path in sorted(changed, key=lambda cell: (cell[0][1], cell[0][0], repr(cell[1]))):
            cells = entry.cells.get(root, {})
            if ANY in path:
                held = hints.get(root, {}).get(path)
                forms = [v.form for v in (cells.get(path), held) if isinstance(v, Number)]
                if forms:
                    self._set(entry, (root, path), Number(depending(*forms)))
                continue
            inside = [key for key in cells if key[: len(path)] == path] or [path]
            for key in inside:
                before = cells.get(key)
                kind = bare(self.types.get(root, IntType(32, True, 4))) if not key else None
                if before is None and isinstance(kind, ArrayType | PointerType):
                    continue
                if before is not None and not isinstance(before, Number | Pointer):
                    continue
                if isinstance(before, Pointer) and not _can_move(before.spot):
                    continue
                low, high = _range(kind)
                symbol = carried(self.variable_name(root), loop_number, low, high)
                if isinstance(before, Pointer):
                    symbol = replace(symbol, low=None, high=None)
                mover = Moving((root, key), symbol, before, element_type(self.types.get(root, IntType(32, True, 4))))
                moving.append(mover)
                self._set(entry, mover.cell, mover.entering())
        return moving

    def _set(self, state: State, cell: Cell, value: Value) -> None:
        root, path = cell
        cells = dict(state.cells.get(root, {}))
        cells[path] = value
        state.cells[root] = cells

    def _step_only(
        self, statement: Loop, entry: State, moving: list[Moving], changed_in_body: set[Cell], provisional: Symbol
    ) -> list[tuple[Moving, Form]]:
        """Variables that only the loop's step moves have their closed form at once."""
        if statement.step is None:
            return []
        trial = entry.copy()
        trial.written = None
        mark = self.record.mark()
        self.value(statement.step, trial)
        self.record.cut(mark)
        found: list[tuple[Moving, Form]] = []
        symbols = {m.symbol for m in moving}
        for m in moving:
            if m.cell in changed_in_body:
                continue
            after = m.after(trial.cells.get(m.cell[0], {}).get(m.cell[1]))
            if after is None:
                continue
            delta = _unwrapped(after) - symbol_form(m.symbol)
            if symbols & delta.leaves() or delta.known == 0 or _drawn_inside(delta, self.open[-1]):
                continue
            found.append((m, m.first() + symbol_form(provisional) * delta))
        return found

    def _early_trips(
        self, statement: Loop, entry: State, moving: list[Moving], early: list[tuple[Moving, Form]], provisional: Symbol
    ) -> Form | None:
        """How often the loop runs, when its condition depends on nothing that the body changes."""
        if statement.condition is None or not statement.test_first:
            return None
        mark = self.record.mark()
        trial = entry.copy()
        trial.written = None
        condition = self.condition(statement.condition, trial)
        wrapped = self._wrapped_to_false(statement.condition, entry, early, provisional) if condition.known else None
        self.record.cut(mark)
        if condition.leaves() & {m.symbol for m in moving}:
            return None
        trips = trips_while(condition, provisional)
        return trips.count or wrapped or self._wrapping(condition, provisional)

    def _wrapped_to_false(
        self, condition: Expression, entry: State, early: list[tuple[Moving, Form]], provisional: Symbol
    ) -> Form | None:
        """``for (unsigned i = 7; i < 8; --i)``: how often until an unsigned counter passes zero and fails the test."""
        for m, form in early:
            slope = form.coefficient(provisional)
            step = slope.known if slope is not None else None
            if not isinstance(m.kind, IntType) or m.kind.signed or step is None or step >= 0:
                continue
            turns = floordiv(m.first(), number(-step)) + 1
            trial = entry.copy()
            trial.written = None
            self._set(trial, m.cell, Number(m.first() + turns * step + (1 << m.kind.bits)))
            if not self.condition(condition, trial).known:
                return turns
        return None

    def _wrapping(self, condition: Form, symbol: Symbol) -> Form | None:
        """``for (unsigned i = n - 1; i < n; --i)`` ends when i passes below zero."""
        sides = _lt_sides(condition)
        if sides is None:
            return None
        left = sides[0]
        slope = left.coefficient(symbol)
        if slope is None or slope.known is None or slope.known >= 0 or symbol in sides[1].leaves():
            return None
        return floordiv(left.without(symbol), number(-slope.known)) + 1

    def _solve(
        self, moving: list[Moving], end: State | None, count_from: Symbol, loop_number: int, mark: tuple[int, int]
    ) -> Solved:
        if end is None:
            return Solved({m.symbol: m.first() for m in moving}, ())
        carries: list[Carry] = []
        for m in moving:
            after = m.after(end.cells.get(m.cell[0], {}).get(m.cell[1]))
            if after is None:
                after = symbol_form(unknown("a pointer that the loop sets anew", None, (loop_number,)))
            carries.append(Carry(m.symbol, m.first(), after))
        inside = {loop_number}
        for _, loops in self.record.accesses[mark[0] :]:
            inside.update(loops[len(self.open) - 1 :])
        for _, loops in self.record.operations[mark[1] :]:
            inside.update(loops[len(self.open) - 1 :])
        inside.update(n for n in self.record.loops if n > loop_number)
        return solve(carries, count_from, frozenset(inside))

    def _is_computed(
        self,
        moving: list[Moving],
        solved: Solved,
        changed: set[Cell],
        hints: Mapping[Root, Mapping[Path, Value]],
    ) -> bool:
        """Whether the loop computes something that no formula covers, and that is neither data anyway nor a real."""
        reals = {m.symbol for m in moving if isinstance(m.kind, RealType)}
        if any(c.symbol not in reals and not any(s.kind == "data" for s in c.symbol.depends) for c in solved.left):
            return True
        held = (
            hints.get(root, {}).get(path)
            for root, path in changed
            if ANY in path and not isinstance(element_type(self.types.get(root, RealType(0, 0))), RealType)
        )
        stored = [v.form.leaves() for v in held if isinstance(v, Number)]
        return any(leaves and not any(s.kind == "data" or s.reason for s in leaves) for leaves in stored)

    def _is_short(self, trips: Trips, steps: int) -> bool:
        count = trips.count.known if trips.count is not None and not trips.unsolved else None
        return count is not None and count <= TURNS_AT_MOST and count * steps <= TURN_STEPS_AT_MOST

    def _turn_by_turn(self, statement: Loop, state: State, turns: int) -> Flow:
        """A short loop that touches no memory, one iteration after the other: its values then have exact forms."""
        flow = Flow(state)
        for _ in range(turns):
            if flow.next is None:
                break
            if statement.condition is not None and statement.test_first:
                self.value(statement.condition, flow.next)
            part = self.run(statement.body, flow.next)
            flow.returns += part.returns
            after = part.next
            for left in (*part.continues, *part.breaks):
                after = joined(after, left, statement.place)
            if after is not None and statement.step is not None:
                self.value(statement.step, after)
            flow.next = after
        return flow

    def _trips(
        self, condition: Form, exits: list[Form], count_from: Symbol, statement: Loop, early: Form | None
    ) -> Trips:
        """The least of what the condition and each known exit allow."""
        until: list[Form] = []
        inside: list[Form] = []
        counts: list[Form] = []
        if early is not None:
            counts.append(early)
        else:
            by_condition = trips_while(condition, count_from)
            count = by_condition.count
            if count is None and by_condition.unsolved:
                count = self._wrapping(condition, count_from)
                by_condition = by_condition if count is None else Trips(count)
            if count is not None:
                counts.append(count if statement.test_first else count + 1)
            (until if statement.test_first else inside).extend(negation(c) for c in by_condition.unsolved)
        for condition_ in exits:
            if condition_.known is not None:
                if condition_.known:
                    counts.append(ONE)
                continue
            by_exit = trips_while(negation(condition_), count_from)
            if by_exit.count is not None and not by_exit.unsolved:
                counts.append(by_exit.count + 1)
            else:
                inside.append(condition_)
        least: Form | None = None
        for count in counts:
            least = count if least is None else minimum(least, count)
        return Trips(least, (*until, *inside), tuple(until), tuple(inside))

    def _instance(
        self,
        statement: Loop,
        loop_number: int,
        final: Symbol,
        trips: Trips,
        values: Mapping[Symbol, Form],
        left: tuple[Carry, ...],
    ) -> LoopInstance:
        swap = {symbol: form for symbol, form in values.items() if symbol.kind == "counter"}
        unsolved = tuple(substitute(c, swap) for c in trips.unsolved)
        data_exit, because = None, None
        for form in unsolved:
            for symbol in form.leaves():
                if symbol.kind == "data" and (
                    loop_number in symbol.loops or any(n > loop_number for n in symbol.loops)
                ):
                    data_exit, because = symbol.place or statement.place, symbol.name
        if data_exit is None and trips.count is None:
            for form in unsolved:
                for symbol in form.leaves():
                    if symbol.kind == "data":
                        because = symbol.name
        why = None
        if trips.count is None:
            why = "it ends by data" if data_exit is not None else "no formula was found for when it ends"
        directives = _directives(statement.directives)
        unroll = directives.get("unroll")
        pipeline = directives.get("pipeline")
        tripcount = directives.get("loop_tripcount")
        return LoopInstance(
            number=loop_number,
            counter=final,
            place=statement.place,
            function=self.frame.function.name,
            trips=None if trips.count is None else substitute(trips.count, swap),
            label=statement.label,
            tripcount=_tripcount(tripcount),
            recurrences=tuple(Recurrence(c.symbol, substitute(c.first, swap), substitute(c.next, swap)) for c in left),
            until=tuple(substitute(form, swap) for form in trips.until),
            exits=tuple(substitute(form, swap) for form in trips.exits),
            data_exit=data_exit,
            data_exit_because=because if data_exit is not None else None,
            why_unknown=why,
            pipeline=pipeline is not None and "off" not in pipeline.options,
            interval=pipeline.number("ii") if pipeline is not None else None,
            unroll=(unroll.number("factor") or 0) if unroll is not None and "off" not in unroll.options else None,
            flattened="loop_flatten" in directives,
            dataflow="dataflow" in directives,
            independent=any(is_independence(directive) for directive in statement.directives),
        )

    def _leave(
        self,
        statement: Loop,
        state: State,
        entry: State,
        end: State | None,
        flow: Flow,
        moving: list[Moving],
        early: list[tuple[Moving, Form]],
        values: dict[Symbol, Form],
        memo: dict[Symbol, Form],
        final: Symbol,
        trips: Trips,
        loop_number: int,
        count_from: Symbol,
        provisional: Symbol,
    ) -> Flow:
        """The state after the loop: every moved cell as it is when the counter has reached the trips."""
        broken = bool(flow.breaks or flow.returns)
        outcomes: dict[Symbol, Outcome] = {}
        if trips.count is not None and not trips.unsolved:
            last = trips.count
        else:
            depends = frozenset(s for form in trips.unsolved for s in form.leaves() if s.kind == "data")
            top = bounds(trips.count)[1] if trips.count is not None else None
            made = data if depends else None
            symbol = (
                made(_decider(depends), statement.place, self.open, low=0, high=top, depends=depends)
                if made is not None
                else replace(unknown("trips that are not known", statement.place, self.open), low=0, high=top)
            )
            symbol = replace(symbol, reason=COUNT)
            outcomes[final] = Outcome(symbol, symbol_form(final))
            last = symbol_form(symbol)
        at_last = dict.fromkeys((final, count_from, provisional), last)
        if not statement.test_first and not broken:  # the state at the end of the last iteration
            at_last = {symbol: form - 1 for symbol, form in at_last.items()}
        memo_last: dict[Symbol, Form] = {}
        source = end if end is not None else (flow.breaks[0] if flow.breaks else entry)
        result = State({}, state.guards)
        result.written = state.written
        for root, cells in source.cells.items():
            if root in state.cells or root[1] == 0:
                result.cells[root] = replaced_cells(replaced_cells(cells, values, memo), at_last, memo_last)
        if not (statement.test_first or not broken):
            broken = True
        for m, form in [*((m, None) for m in moving), *early]:
            if m.cell[0] not in state.cells:
                continue
            closed = substitute(form, {**values}, {}) if form is not None else values.get(m.symbol, m.first())
            if not statement.test_first and not broken:
                continue  # a do-loop is left from its end, which ``source`` is
            value_here: Value
            shown = substitute(closed, at_last, memo_last)
            if any(s.kind == "carried" and s.loop == loop_number for s in shown.leaves()):
                shown = self._after(shown, statement, loop_number, outcomes)
            if isinstance(m.before, Pointer):
                value_here = Pointer(moved(m.before.spot, shown))
            else:
                value_here = Number(shown)
            self._set(result, m.cell, value_here)
        returns = []
        for left, value in flow.returns:
            gone = left.substituted(values, memo).substituted(at_last, memo_last)
            gone.guards = tuple(
                replace(g, condition=substitute(substitute(g.condition, values, memo), at_last, memo_last), leaves=True)
                if i >= len(state.guards)
                else g
                for i, g in enumerate(left.guards)
            )
            gone.cells = {
                root: cells for root, cells in gone.cells.items() if root in state.cells or root[0].startswith("what")
            }
            returns.append((gone, replaced(replaced(value, values, memo), at_last, memo_last)))
        self.record.loops[loop_number] = replace(self.record.loops[loop_number], outcomes=tuple(outcomes.values()))
        return Flow(result, returns=returns)

    def _after(self, form: Form, statement: Loop, loop_number: int, outcomes: dict[Symbol, Outcome]) -> Form:
        """What a carried variable has come to when the loop is over, where no formula says it."""
        swap = {symbol: symbol_form(outcome.symbol) for symbol, outcome in outcomes.items()}
        for symbol in sorted(form.leaves(), key=lambda symbol: symbol.number):
            if symbol.kind == "carried" and symbol.loop == loop_number and symbol not in swap:
                if any(other.kind == "data" for other in symbol.depends):
                    made = data(symbol.name, statement.place, self.open, depends=symbol.depends)
                else:
                    made = unknown("", statement.place, self.open, symbol.depends)
                steps = {r.symbol: r.next for r in self.record.loops[loop_number].recurrences}
                counts = symbol in steps and only_counts(steps[symbol], symbol)
                made = replace(made, low=symbol.low, high=symbol.high, reason=COUNT if counts else made.reason)
                outcomes[symbol] = Outcome(made, symbol_form(symbol))
                swap[symbol] = symbol_form(made)
        return substitute(form, swap)


def _decider(drawn: frozenset[Symbol]) -> str:
    """The name of the data that is read first."""
    return min(drawn, key=lambda symbol: symbol.number).name


def _argument(spot: Spot) -> str | Root | None:
    return spot.argument if isinstance(spot, MemorySpot) else spot.root if isinstance(spot, LocalSpot) else None


def _can_move(spot: Spot) -> bool:
    match spot:
        case MemorySpot():
            return True
        case LocalSpot(path=path):
            return bool(path) and isinstance(path[-1], Form)
        case ChoiceSpot(arms=arms):
            return all(_can_move(arm) for _, arm in arms)
        case _:
            return False


def _range(kind: Type | None) -> tuple[int | None, int | None]:
    if isinstance(kind, IntType):
        if kind.bits < 32:
            least = -(1 << kind.bits - 1) if kind.signed else 0
            return least, (1 << kind.bits - 1) - 1 if kind.signed else (1 << kind.bits) - 1
        if not kind.signed:
            return 0, None
    return None, None


def _unwrapped(form: Form) -> Form:
    if len(form.terms) == 1:
        ((monomial, factor),) = form.terms.items()
        if factor == 1 and len(monomial) == 1 and monomial[0].kind == "operation" and monomial[0].name == "wrap":
            return monomial[0].operands[0]
    return form


def _lt_sides(condition: Form) -> tuple[Form, Form] | None:
    if len(condition.terms) == 1:
        ((monomial, factor),) = condition.terms.items()
        if factor == 1 and len(monomial) == 1 and monomial[0].kind == "operation" and monomial[0].name == "lt":
            return monomial[0].operands[0], monomial[0].operands[1]
    return None


def _drawn_inside(form: Form, loop_number: int) -> bool:
    return any(symbol.kind in ("data", "unknown") and loop_number in symbol.loops for symbol in form.leaves())


def _directives(directives: tuple[Directive, ...]) -> dict[str, Directive]:
    return {directive.kind: directive for directive in directives}


def _tripcount(directive: Directive | None) -> int | None:
    if directive is None:
        return None
    average = directive.number("avg")
    if average is not None:
        return average
    low, high = directive.number("min"), directive.number("max")
    if low is not None and high is not None:
        return (low + high) // 2
    return high if high is not None else low
