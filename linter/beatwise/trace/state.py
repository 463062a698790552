"""What every variable holds at one point of the execution, and under which conditions that point is reached."""

from __future__ import annotations

from collections.abc import Iterator, Mapping

from beatwise.model.access import Guard
from beatwise.model.form import ONE, Form, Symbol, number
from beatwise.model.operations import both, either, equal, lookup, negation, select
from beatwise.model.place import Place
from beatwise.model.substitution import substitute
from beatwise.trace.logic import always
from beatwise.trace.values import (
    ChoiceSpot,
    Closure,
    LocalSpot,
    LostSpot,
    MemorySpot,
    Number,
    Path,
    Pointer,
    Record,
    Root,
    Spot,
    Value,
    choose,
    depending,
    picked,
)

CHOSEN_AT_MOST = 16  #: elements of an on-chip array among which an index is followed
ANY = "*"  #: in a cell's path: some element, no one knows which
Cells = Mapping[Path, Value]


class State:
    """Cells by variable; ``guards`` is the condition of being here. Copies share what they do not change."""

    __slots__ = ("cells", "guards", "written")

    def __init__(self, cells: dict[Root, Cells], guards: tuple[Guard, ...]) -> None:
        self.cells, self.guards = cells, guards
        self.written: set[tuple[Root, Path]] | None = None  #: what a scouting run has changed

    def copy(self) -> State:
        """A state that may change on its own; what it has written is still noted in the same set."""
        twin = State(dict(self.cells), self.guards)
        twin.written = self.written
        return twin

    def under(self, condition: Form, place: Place, loops: tuple[int, ...], *, chooses: bool = False) -> State:
        """A copy in which ``condition`` is known to hold."""
        twin = self.copy()
        if condition.known is None:
            twin.guards = (*self.guards, Guard(condition, place, loops, chooses=chooses))
        return twin

    def become(self, other: State) -> None:
        """Takes over what the other holds."""
        self.cells, self.guards, self.written = other.cells, other.guards, other.written

    # ----------------------------------------------------------------------------------------------- reading

    def read(self, spot: LocalSpot, place: Place) -> Value | None:
        """What the spot holds; None where nothing has been stored there."""
        cells = self.cells.get(spot.root)
        if not cells:
            return None
        path = spot.path
        exact = cells.get(path)
        if exact is not None:
            return exact
        if any(isinstance(step, Form) and step.known is None for step in path):
            return self._read_some(spot, cells, path, place)
        parts = {key[len(path) :]: value for key, value in cells.items() if key[: len(path)] == path}
        if parts:
            return Record(parts)
        return self._read_summary(cells, path)

    def _read_some(self, spot: LocalSpot, cells: Cells, path: Path, place: Place) -> Value | None:
        """An element whose index is not a plain number."""
        at = next(i for i, step in enumerate(path) if isinstance(step, Form) and step.known is None)
        index = path[at]
        assert isinstance(index, Form)
        found: dict[int, Value] = {}
        hazy = False
        for key in cells:
            if len(key) <= at or key[:at] != path[:at]:
                continue
            step = key[at]
            if step == ANY:
                hazy = hazy or covers(key, path) or covers(path, key)
            elif isinstance(step, Form) and step.known is not None:
                inner = self.read(LocalSpot(spot.root, (*path[:at], step, *path[at + 1 :]), spot.type), place)
                if inner is not None:
                    found[step.known] = inner
        numbers = {at: value.form.known for at, value in found.items() if isinstance(value, Number)}
        if found and not hazy and len(numbers) == len(found):
            if None not in numbers.values() and sorted(numbers) == list(range(len(numbers))):
                return Number(lookup(tuple(value or 0 for _, value in sorted(numbers.items())), index))
            if len(numbers) <= CHOSEN_AT_MOST:
                return Number(_one_of(index, {at: v.form for at, v in found.items() if isinstance(v, Number)}))
        pointers = {at: value.spot for at, value in found.items() if isinstance(value, Pointer)}
        if pointers and not hazy:
            return Pointer(picked(index, pointers, place))
        summary = self._read_summary(cells, path)
        pieces = [value.form for value in found.values() if isinstance(value, Number)]
        if isinstance(summary, Number):
            pieces.append(summary.form)
        elif summary is not None and not pieces:
            return summary
        return Number(depending(index, *pieces)) if pieces else None

    def _read_summary(self, cells: Cells, path: Path) -> Value | None:
        """What some element may hold, or what a part of a value that is known only as a whole depends on."""
        pieces: list[Form] = []
        for key, value in cells.items():
            if covers(key, path):
                if len(key) == len(path) and not isinstance(value, Number):
                    return value
                pieces += forms_in(value)
        if not pieces:
            return None
        indices = [step for step in path if isinstance(step, Form)]
        return Number(depending(*indices, *pieces))

    # ----------------------------------------------------------------------------------------------- writing

    def write(self, spot: LocalSpot, value: Value) -> None:
        """Stores; an element that is not known exactly joins what some element may hold."""
        path = spot.path
        cells = dict(self.cells.get(spot.root, {}))
        fuzzy = tuple(ANY if isinstance(step, Form) and step.known is None else step for step in path)
        if self.written is not None:
            self.written.add((spot.root, fuzzy))
        if fuzzy != path:
            self._write_some(cells, fuzzy, value)
        else:
            for key in [key for key in cells if key[: len(path)] == path]:
                del cells[key]
            if isinstance(value, Record):
                for rest, part in value.parts.items():
                    cells[(*path, *rest)] = part
            else:
                cells[path] = value
        self.cells[spot.root] = cells

    def _write_some(self, cells: dict[Path, Value], fuzzy: Path, value: Value) -> None:
        merged: list[Form] = list(forms_in(value))
        for key in [key for key in cells if covers(fuzzy, key)]:
            old = cells.pop(key)
            merged += forms_in(old)
        if isinstance(value, Number | Record):
            cells[fuzzy] = Number(depending(*merged))
        else:
            cells[fuzzy] = value

    def forget(self, root: Root) -> None:
        """The variable begins anew."""
        self.cells.pop(root, None)

    def substituted(self, values: Mapping[Symbol, Form], memo: dict[Symbol, Form]) -> State:
        """The state with symbols replaced."""
        twin = State({}, self.guards)
        twin.written = self.written
        for root, cells in self.cells.items():
            twin.cells[root] = replaced_cells(cells, values, memo)
        return twin


def _one_of(index: Form, elements: Mapping[int, Form]) -> Form:
    """The element that the index picks."""
    (_, result), *others = sorted(elements.items(), reverse=True)
    for at, form in others:
        result = select(equal(index, number(at)), form, result)
    return result


def covers(wide: Path, narrow: Path) -> bool:
    """Whether a cell at ``wide`` may hold (or hold a whole that holds) what lies at ``narrow``."""
    if len(wide) > len(narrow):
        return False
    for a, b in zip(wide, narrow, strict=False):
        if a == b:
            continue
        loose_a = a == ANY
        loose_b = b == ANY or (isinstance(b, Form) and b.known is None)
        if not ((loose_a and (isinstance(b, Form) or b == ANY)) or (loose_b and (isinstance(a, Form) or a == ANY))):
            return False
    return True


def forms_in(value: Value) -> Iterator[Form]:
    """The forms a value is made of."""
    match value:
        case Number(form):
            yield form
        case Record(parts):
            for part in parts.values():
                yield from forms_in(part)
        case Pointer(spot):
            yield from forms_of_spot(spot)
        case Closure():
            return


def forms_of_spot(spot: Spot) -> Iterator[Form]:
    """The forms that say where a spot is."""
    match spot:
        case MemorySpot():
            yield spot.offset
        case LocalSpot():
            yield from (step for step in spot.path if isinstance(step, Form))
        case ChoiceSpot():
            yield spot.selector
        case LostSpot():
            yield spot.depends


def replaced_cells(cells: Cells, values: Mapping[Symbol, Form], memo: dict[Symbol, Form]) -> Cells:
    """The cells with symbols replaced; the very same where there is nothing to replace."""
    found = {path: replaced(value, values, memo) for path, value in cells.items()}
    return cells if all(found[path] is value for path, value in cells.items()) else found


def replaced(value: Value, values: Mapping[Symbol, Form], memo: dict[Symbol, Form]) -> Value:
    """The value with symbols replaced."""
    match value:
        case Number(form):
            new = substitute(form, values, memo)
            return value if new is form else Number(new)
        case Pointer(spot):
            new_spot, valid = replaced_spot(spot, values, memo), substitute(value.valid, values, memo)
            return value if new_spot is spot and valid is value.valid else Pointer(new_spot, valid)
        case Record(parts):
            return Record({path: replaced(part, values, memo) for path, part in parts.items()})
        case Closure():
            return value


def replaced_spot(spot: Spot, values: Mapping[Symbol, Form], memo: dict[Symbol, Form]) -> Spot:
    """The spot with symbols replaced."""
    if all(values.keys().isdisjoint(form.leaves()) for form in _all_forms(spot)):
        return spot
    match spot:
        case MemorySpot():
            return MemorySpot(
                spot.argument,
                substitute(spot.offset, values, memo),
                spot.unit_bytes,
                spot.type,
                spot.part_bytes,
                spot.covers,
            )
        case LocalSpot():
            path = tuple(substitute(step, values, memo) if isinstance(step, Form) else step for step in spot.path)
            return LocalSpot(spot.root, path, spot.type)
        case ChoiceSpot():
            arms = tuple((substitute(c, values, memo), replaced_spot(arm, values, memo)) for c, arm in spot.arms)
            return ChoiceSpot(arms, substitute(spot.selector, values, memo), spot.place)
        case LostSpot():
            return LostSpot(spot.reason, substitute(spot.depends, values, memo), spot.argument)


def _all_forms(spot: Spot) -> Iterator[Form]:
    if isinstance(spot, ChoiceSpot):
        for condition, arm in spot.arms:
            yield condition
            yield from _all_forms(arm)
    yield from forms_of_spot(spot)


def joined(first: State | None, second: State | None, place: Place) -> State | None:
    """The state where two paths meet: what differs is chosen by the condition that parted them."""
    if first is None or second is None:
        return first if second is None else second
    if first is second:
        return first
    split = 0
    while split < min(len(first.guards), len(second.guards)) and first.guards[split] is second.guards[split]:
        split += 1
    if split == len(first.guards) or split == len(second.guards):
        condition, guards = parted(first, second, split)
    else:
        condition = first.guards[split].condition
        rest_first = conjunction(first.guards[split + 1 :])
        rest_second = conjunction(second.guards[split + 1 :])
        other = second.guards[split].condition
        guards = first.guards[:split]
        reached = select(condition, rest_first, rest_second)
        if other != negation(condition):
            reached = either(both(condition, rest_first), both(other, rest_second))
        if not always(reached):
            parting = first.guards[split]
            leaves = any(guard.leaves for guard in (*first.guards[split:], *second.guards[split:]))
            guards = (*guards, Guard(reached, parting.place, parting.loops, leaves))
    result = State({}, guards)
    result.written = first.written
    for root in [*first.cells, *(root for root in second.cells if root not in first.cells)]:
        a, b = first.cells.get(root), second.cells.get(root)
        if a is b and a is not None:
            result.cells[root] = a
        elif a is None or b is None:
            result.cells[root] = a if a is not None else b if b is not None else {}
        else:
            cells: dict[Path, Value] = {}
            for path in [*a, *(path for path in b if path not in a)]:
                left = a.get(path, b.get(path) if path not in a and _summary(path) else None)
                right = b.get(path, a.get(path) if path not in b and _summary(path) else None)
                cells[path] = choose(condition, left, right, place)
            result.cells[root] = cells
    return result


def _summary(path: Path) -> bool:
    return ANY in path


def parted(first: State, second: State, split: int) -> tuple[Form, tuple[Guard, ...]]:
    """Two states of which one's path holds the other's: the longer one's further conditions decide."""
    if len(first.guards) > len(second.guards):
        return conjunction(first.guards[split:]), first.guards[:split]
    if len(second.guards) > len(first.guards):
        return negation(conjunction(second.guards[split:])), first.guards[:split]
    return ONE, first.guards


def conjunction(guards: tuple[Guard, ...]) -> Form:
    """1 where all hold."""
    result = number(1)
    for guard in guards:
        result = both(result, guard.condition)
    return result
