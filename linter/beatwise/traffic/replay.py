"""Walks through a loop nest number by number, for the accesses that no formula covers.

Loops run as the source says: counters, carried variables, exits, guards. What only the data knows is drawn at random,
the same draw for the same iteration. The walk stops after ``STEPS_AT_MOST`` iterations; what it has seen by then stands
for all.
"""

from __future__ import annotations

from collections import Counter
from collections.abc import Iterable, Mapping, Sequence
from dataclasses import dataclass, field
from math import gcd

from beatwise.model.access import Access, LoopInstance
from beatwise.model.form import Form, Symbol, redrawn_in
from beatwise.model.operations import negation
from beatwise.traffic.compiled import Values, compiled

STEPS_AT_MOST = 12_000  #: iterations of innermost loops that are walked through for one access
SCATTER = 1 << 22  #: data that has no known range is drawn from this many values


class Enough(Exception):
    """The walk has seen enough; raised and caught in this file."""


@dataclass
class Seen:
    """What the walk saw: bytes between one access and the next, and the runs they make."""

    element_bytes: int
    cut: bool = False  #: each round of the innermost loop is a run of its own (a copy)
    steps: Counter[int] = field(default_factory=Counter)
    inner_steps: Counter[int] = field(default_factory=Counter)  #: within the innermost loop
    executions: int = 0
    runs: int = 0
    whole: bool = True  #: the walk came to its end
    last_run: int = 0
    starts: int = 0  #: bytes that every run starts at a multiple of
    lengths: int = 0  #: bytes that every run is a multiple of
    _next: int | None = None
    _last: int | None = None

    def take(self, offset: int, inner: bool) -> None:
        """One execution, at ``offset``; ``inner``: in the same round of the innermost loop as the one before."""
        self.executions += 1
        if self._last is not None:
            step = offset - self._last
            self.steps[step] += 1
            if inner:
                self.inner_steps[step] += 1
        if offset == self._next and not (self.cut and not inner):
            self.last_run += 1
        else:
            self.close()
            self.starts = gcd(self.starts, offset)
            self.runs += 1
            self.last_run = 1
        self._last, self._next = offset, offset + self.element_bytes

    def take_many(self, offset: int, stride: int, many: int, inner: bool) -> None:
        """``many`` executions from ``offset`` on, ``stride`` bytes apart."""
        if many <= 0:
            return
        self.take(offset, inner)
        if many == 1:
            return
        self.executions += many - 1
        self.steps[stride] += many - 1
        self.inner_steps[stride] += many - 1
        if stride == self.element_bytes:
            self.last_run += many - 1
        else:
            self.close()
            self.starts = gcd(self.starts, stride)
            self.runs += many - 1
            self.last_run = 1
        self._last = offset + stride * (many - 1)
        self._next = self._last + self.element_bytes

    def close(self) -> None:
        """A run has ended."""
        self.lengths = gcd(self.lengths, self.last_run * self.element_bytes)

    @property
    def mean_run(self) -> float | None:
        """Elements a run, the unfinished last one left out where the walk was cut short."""
        if not self.runs:
            return None
        if not self.whole and self.runs > 1:
            return (self.executions - self.last_run) / (self.runs - 1)
        return self.executions / self.runs


class Walker:
    """One walk. ``trips_of`` gives the trips of loops whose count no form tells. ``let_in``: data lets the access run
    whenever it decides (else every test on data is a toss of a coin).
    """

    def __init__(
        self,
        access: Access,
        sizes: Mapping[Symbol, int],
        trips_of: Mapping[int, int],
        rows: Mapping[Symbol, int],
        *,
        let_in: bool = False,
    ) -> None:
        self.access, self.trips_of, self.rows = access, trips_of, rows
        self.values: Values = _Drawn(self)
        self.values.update(sizes)
        self.seen = Seen(access.element_bytes, cut=bool(access.loops) and access.loops[-1].kind == "copy")
        self.steps = 0
        self.guards = [g.condition for g in access.guards if not g.leaves or not _by_data(g.condition)]
        self.free = [g for g in self.guards if not _by_data(g)]
        self.drawn = [g for g in self.guards if _by_data(g)]
        tests = {test for g in self.drawn for test in _comparisons(g)}
        for form in (access.offset, *(r.next for loop in access.loops for r in loop.recurrences)):
            tests |= _deciding(form)
        self.coins = dict(coin for test in sorted(tests, key=_age) for coin in _sides(test))
        self.coin_loops = {coin: _tossed_in(coin) for coin in self.coins}
        self.constants = _constants(self.coins)
        self.picks: dict[Form, int | None] = {}
        self.by_loop = _drawn_in(access)
        self.decided: dict[Symbol, int] = {}
        if let_in:
            for guard in self.drawn:
                _decide(guard, True, self.decided)
        self.gates = _gates(access, self.guards)
        self.oldest = min((loop.counter.number for loop in access.loops), default=0)

    def walk(self) -> Seen:
        """What is seen from the first iteration to the last, or until there is enough."""
        try:
            if self._open(-1):
                self._level(0)
        except Enough:
            self.seen.whole = False
        self.seen.close()
        return self.seen

    def _level(self, level: int) -> None:
        loops = self.access.loops
        if level == len(loops):
            self.seen.take(compiled(self.access.offset)(self.values), False)
            return
        loop = loops[level]
        values = self.values
        firsts = [(r.symbol, compiled(r.first)) for r in loop.recurrences]
        nexts = [(r.symbol, compiled(r.next)) for r in loop.recurrences]
        for symbol, value in [(symbol, first(values)) for symbol, first in firsts]:
            values[symbol] = value
        self._redraw(loop)
        values[loop.counter] = 0
        trips = self._trips(loop)
        innermost = level == len(loops) - 1
        if innermost and self._regular(loop) and trips > 2:
            self._stretch(loop, trips)
            if trips > STEPS_AT_MOST and loop.trips is None:
                raise Enough
            self._end(loop, trips)
            return
        ended = trips
        until = [compiled(form) for form in loop.until if not _by_data(form)]
        exits = [compiled(form) for form in loop.exits if not _by_data(form)]
        for k in range(trips):
            values[loop.counter] = k
            if k:
                self._redraw(loop)
            if any(test(values) for test in until):
                ended = k
                break
            self.steps += 1
            if self.steps > STEPS_AT_MOST:
                raise Enough
            for coin, turning in self.coin_loops.items():
                if loop.number in turning:
                    self._toss(coin)
            if self._open(level):
                if innermost:
                    self.seen.take(compiled(self.access.offset)(values), k > 0)
                else:
                    self._level(level + 1)
            if any(test(values) for test in exits):
                ended = k
                break
            for symbol, value in [(symbol, following(values)) for symbol, following in nexts]:
                values[symbol] = value
        self._end(loop, ended)

    def _end(self, loop: LoopInstance, ended: int) -> None:
        """What stands for the loop's variables after it gets its value."""
        self.values[loop.counter] = ended
        for outcome in loop.outcomes:
            self.values[outcome.symbol] = compiled(outcome.form)(self.values)

    def _open(self, level: int) -> bool:
        """Whether the conditions that the loop at ``level`` settles (-1: before all loops) let the access run."""
        values = self.values
        for guard, coins in self.gates.get(level, ()):
            for coin in coins:
                self._toss(coin)
            if not compiled(guard)(values):
                return False
        return True

    def _toss(self, coin: Symbol) -> None:
        """The outcome of a test on data: an even chance; of tests against several constants one at the most holds."""
        if coin in self.values:
            return
        if coin in self.decided:
            self.values[coin] = self.decided[coin]
            return
        subject, constant = _compared(coin)
        choices = self.constants.get(subject, ()) if subject is not None else ()
        if subject is None or len(choices) < 2:
            first, turned = self.coins[coin]
            self.values[coin] = self.flip(first) ^ turned
            return
        if subject not in self.picks:
            drawn = self._mixed(coin) % (len(choices) + 1)
            self.picks[subject] = choices[drawn] if drawn < len(choices) else None
        self.values[coin] = int((self.picks[subject] == constant) == (coin.name == "eq"))

    def _trips(self, loop: LoopInstance) -> int:
        if loop.number in self.trips_of:
            return self.trips_of[loop.number]
        if loop.trips is None:
            return STEPS_AT_MOST + 1
        return compiled(loop.trips)(self.values)

    def _regular(self, loop: LoopInstance) -> bool:
        if loop.recurrences or loop.until or loop.exits or self.drawn:
            return False
        if any(loop.counter in g.leaves() for g in self.free) or loop.number in self.by_loop:
            return False
        step = self.access.offset.coefficient(loop.counter)
        inside = self.access.offset.without(loop.counter).leaves()
        return step is not None and loop.counter not in step.leaves() and loop.counter not in inside

    def _stretch(self, loop: LoopInstance, trips: int) -> None:
        self.steps += 1
        if self.steps > STEPS_AT_MOST:
            raise Enough
        start = compiled(self.access.offset)(self.values)
        self.values[loop.counter] = 1
        stride = compiled(self.access.offset)(self.values) - start
        self.seen.take_many(start, stride, trips, False)

    def _redraw(self, loop: LoopInstance) -> None:
        """A new iteration: what was drawn in the one before is drawn anew."""
        values = self.values
        for symbol in self.by_loop.get(loop.number, ()):
            values.pop(symbol, None)
        for coin, loops in self.coin_loops.items():
            if loop.number in loops:
                values.pop(coin, None)
                subject, _ = _compared(coin)
                if subject is not None:
                    self.picks.pop(subject, None)

    def flip(self, symbol: Symbol) -> int:
        """An even chance, the same for the same iteration."""
        return self._mixed(symbol) & 1

    def draw(self, symbol: Symbol) -> int:
        """A value for what only the data knows."""
        if symbol in self.rows and symbol.at is not None:
            return compiled(symbol.at)(self.values) * self.rows[symbol] >> 8
        low = symbol.low if symbol.low is not None else 0
        high = symbol.high if symbol.high is not None else SCATTER
        low, high = max(low, -SCATTER if low < 0 and high < 0 else 0), min(high, SCATTER)
        return low + self._mixed(symbol) % max(1, high - low + 1)

    def _mixed(self, symbol: Symbol) -> int:
        """64 bits that look random (the mixing steps of SplitMix64: Steele, Lea and Flood, OOPSLA 2014)."""
        state = symbol.number - self.oldest  # the same whatever was analysed before
        for loop in self.access.loops:
            state = (state + self.values.get(loop.counter, 0) + 1) * 0x9E3779B97F4A7C15 & 0xFFFFFFFFFFFFFFFF
            state = (state ^ state >> 30) * 0xBF58476D1CE4E5B9 & 0xFFFFFFFFFFFFFFFF
            state = (state ^ state >> 27) * 0x94D049BB133111EB & 0xFFFFFFFFFFFFFFFF
            state ^= state >> 31
        return state


class _Drawn(dict[Symbol, int]):
    """The values of symbols; one that is asked for and not there is drawn."""

    def __init__(self, walker: Walker) -> None:
        super().__init__()
        self._walker = walker

    def __missing__(self, symbol: Symbol) -> int:
        value = self[symbol] = self._walker.draw(symbol)
        return value


def _by_data(form: Form) -> bool:
    return any(symbol.kind in ("data", "unknown") for symbol in form.leaves())


def _comparisons(form: Form) -> set[Symbol]:
    """The tests on data that a condition is made of."""
    found: set[Symbol] = set()
    for symbol in form.symbols():
        if symbol.kind != "operation":
            if symbol.kind in ("data", "unknown"):
                found.add(symbol)
        elif symbol.name in ("and?", "or?", "not", "select"):
            for operand in symbol.operands:
                found |= _comparisons(operand)
        elif _by_data(Form({(symbol,): 1})):
            found.add(symbol)
    return found


def _sides(test: Symbol) -> list[tuple[Symbol, tuple[Symbol, int]]]:
    """A test and its opposite, each with the older of the two and whether it is the other one."""
    opposite = negation(Form({(test,): 1})).symbols() | {test}
    first = min(opposite, key=lambda symbol: symbol.number)
    return [(symbol, (first, int(symbol is not first))) for symbol in opposite]


def _gates(access: Access, guards: Sequence[Form]) -> dict[int, list[tuple[Form, list[Symbol]]]]:
    """The conditions, with the tests on data in them (and their opposites), by the position of the innermost loop that
    can change them."""
    position = {loop.number: at for at, loop in enumerate(access.loops)}
    carrying = max((at for at, loop in enumerate(access.loops) if loop.outcomes), default=-1)
    found: dict[int, list[tuple[Form, list[Symbol]]]] = {}
    for guard in guards:
        turned = {loop for symbol in guard.leaves() for loop in redrawn_in(symbol)}
        level = max((position[loop] for loop in turned if loop in position), default=-1)
        level = max(level, carrying)  # what a loop leaves behind must be computed even where the access does not run
        sides = {side for test in _comparisons(guard) for side, _ in _sides(test)} if _by_data(guard) else ()
        tests = sorted(sides, key=lambda symbol: symbol.number)
        found.setdefault(level, []).append((guard, tests))
    return found


def _age(symbol: Symbol) -> int:
    return symbol.number


def _deciding(form: Form) -> set[Symbol]:
    """The tests on data by which the form chooses between values."""
    found: set[Symbol] = set()
    for symbol in form.symbols():
        for at, operand in enumerate(symbol.operands):
            if symbol.name == "select" and at == 0:
                found |= _comparisons(operand) if _by_data(operand) else set()
            else:
                found |= _deciding(operand)
    return found


def _compared(test: Symbol) -> tuple[Form | None, int | None]:
    """``x`` and 3 of the tests ``x == 3`` and ``x != 3``."""
    if test.kind == "operation" and test.name in ("eq", "ne") and test.operands[1].known is not None:
        return test.operands[0], test.operands[1].known
    return None, None


def _constants(coins: Iterable[Symbol]) -> dict[Form, list[int]]:
    """The constants that each value is compared with."""
    found: dict[Form, set[int]] = {}
    for coin in coins:
        subject, constant = _compared(coin)
        if subject is not None and constant is not None:
            found.setdefault(subject, set()).add(constant)
    return {subject: sorted(constants) for subject, constants in found.items()}


def _decide(condition: Form, wanted: bool, decided: dict[Symbol, int]) -> None:
    """The outcomes of the tests on data that make the condition come out as wanted, where there is no choice."""
    if len(condition.terms) != 1:
        return
    (symbol,) = condition.symbols() or (None,)
    if symbol is None:
        return
    if symbol.kind == "operation" and symbol.name == "not":
        _decide(symbol.operands[0], not wanted, decided)
    elif symbol.kind == "operation" and symbol.name == ("and?" if wanted else "or?"):
        for operand in symbol.operands:
            _decide(operand, wanted, decided)
    elif symbol in _comparisons(condition):
        for side, (first, turned) in _sides(symbol):
            outcome = int(wanted) if side == symbol else int(not wanted)
            decided.setdefault(side, outcome)
            decided.setdefault(first, outcome ^ turned)


def _tossed_in(coin: Symbol) -> set[int]:
    """The loops of which a new iteration may turn the test's outcome."""
    return {loop for symbol in Form({(coin,): 1}).leaves() for loop in redrawn_in(symbol)}


def _drawn_in(access: Access) -> dict[int, set[Symbol]]:
    """The data symbols that a new iteration of each loop draws anew."""
    forms = [access.offset, *(g.condition for g in access.guards)]
    for loop in access.loops:
        forms += [*loop.until, *loop.exits, *(r.next for r in loop.recurrences), *(r.first for r in loop.recurrences)]
        if loop.trips is not None:
            forms.append(loop.trips)
    found: dict[int, set[Symbol]] = {}
    numbers = [loop.number for loop in access.loops]
    for form in forms:
        for symbol in form.leaves():
            if symbol.kind in ("data", "unknown"):
                for number in redrawn_in(symbol).intersection(numbers):
                    found.setdefault(number, set()).add(symbol)
    for at, number in enumerate(numbers):  # an outer iteration draws the inner data anew, too
        for inner in numbers[at + 1 :]:
            found.setdefault(number, set()).update(found.get(inner, ()))
    return found
