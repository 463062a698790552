"""Follows a kernel from its top function: every statement once, every loop body once, calls in place.

Numbers are forms, so one pass over a loop body stands for all its iterations: what the body changes enters it as a
symbol, and when the body has been followed, ``recurrence`` says what that symbol is in iteration k. A branch is
followed both ways unless its condition is known. Nothing of the user's code is ever run.
"""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from dataclasses import dataclass, field, replace
from itertools import count

from beatwise.model.access import Access, Choice, Guard, StreamOperation
from beatwise.model.form import ONE, ZERO, Form, Symbol, data, symbol_form, unknown
from beatwise.model.kernel import (
    Block,
    Declare,
    Evaluate,
    Expression,
    Function,
    If,
    Leave,
    Loop,
    Lost,
    Program,
    Return,
    Statement,
    Switch,
    Variable,
)
from beatwise.model.operations import both, either, equal, negation, truth
from beatwise.model.place import Place
from beatwise.model.types import (
    ArrayType,
    IntType,
    PointerType,
    RecordType,
    ReferenceType,
    StreamType,
    Type,
    UnknownType,
    VectorType,
    VoidType,
)
from beatwise.trace.integers import fitted
from beatwise.trace.record import Recording
from beatwise.trace.state import State, joined
from beatwise.trace.values import (
    NOTHING,
    ChoiceSpot,
    Closure,
    LocalSpot,
    LostSpot,
    MemorySpot,
    Number,
    Pointer,
    Record,
    Root,
    Spot,
    Value,
    choose,
    depending,
)

STEPS_AT_MOST = 400_000  #: statements and expressions followed in one kernel
CALLS_AT_MOST = 200  #: depth of calls
RECURSION_AT_MOST = 40  #: of one function in itself


class OutOfSteps(Exception):
    """The kernel is larger than the tracer follows; raised and caught in this room."""


@dataclass(slots=True)
class Frame:
    """One activation of a function: where its variables are, and the calls that led to it."""

    function: Function
    activation: int
    roots: dict[str, Root]
    this: Spot | None
    chain: tuple[Place, ...]
    outer: Frame | None = None


@dataclass(slots=True)
class Flow:
    """How a statement ends: ``next`` is the state after it (None: it never gets there), the rest have left it."""

    next: State | None
    breaks: list[State] = field(default_factory=list)
    continues: list[State] = field(default_factory=list)
    returns: list[tuple[State, Value]] = field(default_factory=list)

    def take(self, other: Flow) -> None:
        """Adds what has left ``other``."""
        self.breaks += other.breaks
        self.continues += other.continues
        self.returns += other.returns


@dataclass(frozen=True, slots=True)
class Argument:
    """A pointer argument of the top function that is an interface."""

    name: str
    interface: str
    volatile: bool
    element_bytes: int
    array_bytes: int | None


class Machine:
    """The state of following one kernel. Its parts are here and in ``expressions``, ``calls`` and ``loops``."""

    def __init__(self, program: Program, arguments: Mapping[str, Argument], given: Mapping[str, int]) -> None:
        self.program, self.arguments, self.given = program, arguments, given
        self.record = Recording()
        self.open: tuple[int, ...] = ()  #: numbers of the loops around, outermost first
        self.frame: Frame
        self.process: str | None = None
        self.scouting = 0
        self.steps = 0
        self.types: dict[Root, Type] = {}
        self.names: dict[Root, str] = {}
        self.given_used: dict[str, Symbol] = {}
        self.statics: dict[Root, Variable] = {}  #: the static locals that were met
        self.notes: list[tuple[Place, str]] = []
        self._activations = count(1)
        self._loops = count(1)
        self.calls: list[str] = []
        self.touched: set[str] = set()  #: the arguments that the followed code mentions
        #: what was loaded in this iteration and not stored to since: by argument, offset, part, type, and loops
        self.loaded: dict[tuple[str, Form, str, Type, tuple[int, ...]], Symbol] = {}
        self.processes: dict[str, list[Place]] = {}  #: by function: the calls that start it as a process
        self.jumps: dict[tuple[Place, ...], int] = {}  #: by the calls that lead there: the line of a goto

    # ------------------------------------------------------------------------------------------- bookkeeping

    def step(self) -> None:
        """Counts a statement or expression that is followed."""
        self.steps += 1
        if self.steps > STEPS_AT_MOST:
            raise OutOfSteps

    def new_loop(self) -> int:
        """The number of the next loop."""
        return next(self._loops)

    def root(self, key: str) -> Root:
        """The variable that a name means here."""
        frame: Frame | None = self.frame
        while frame is not None:
            found = frame.roots.get(key)
            if found is not None:
                return found
            frame = frame.outer
        return (key, 0)

    def lost(self, reason: str, place: Place, *made_of: Form) -> Number:
        """A value that could not be followed."""
        depends: frozenset[Symbol] = frozenset()
        for form in made_of:
            depends |= form.leaves()
        return Number(symbol_form(unknown(reason, place, self.open, depends)))

    # --------------------------------------------------------------------------------------- loads and stores

    def load(self, spot: Spot, place: Place, state: State) -> Value:
        """What the spot holds; a load from memory is recorded."""
        match spot:
            case MemorySpot():
                if isinstance(spot.type, ArrayType):
                    return Pointer(spot)
                self._access(spot, "read", place, state)
                return self._datum(spot, place)
            case LocalSpot():
                return self._load_local(spot, place, state)
            case ChoiceSpot():
                values = []
                for condition, arm in spot.arms:
                    branch = state.under(condition, spot.place, self.open, chooses=True)
                    self._choosing = Choice(spot.selector, spot.place, alternatives(spot))
                    values.append((condition, self.load(arm, place, branch)))
                    self._choosing = None
                result = values[-1][1]
                for condition, value in reversed(values[:-1]):
                    result = choose(condition, value, result, spot.place)
                return result
            case LostSpot():
                self._lost_access(spot, "read", place, state)
                return self.lost(spot.reason, place, spot.depends)

    _choosing: Choice | None = None

    def _datum(self, spot: MemorySpot, place: Place) -> Value:
        low = high = None
        kind = spot.type
        if isinstance(kind, IntType):
            low = -(1 << kind.bits - 1) if kind.signed else 0
            high = (1 << kind.bits - 1) - 1 if kind.signed else (1 << kind.bits) - 1
        key = (spot.argument, spot.offset, spot.covers, kind, self.open)
        found = self.loaded.get(key)
        if found is None or self.scouting or self.arguments[spot.argument].volatile:
            depends = spot.offset.leaves()
            found = data(spot.argument, place, self.open, low=low, high=high, at=spot.offset, depends=depends)
            if not self.scouting:
                self.loaded[key] = found
        return Number(symbol_form(found))

    def _load_local(self, spot: LocalSpot, place: Place, state: State) -> Value:
        if isinstance(spot.type, ArrayType):
            return Pointer(LocalSpot(spot.root, (*spot.path, ZERO), spot.type.element))
        found = state.read(spot, place)
        if found is not None:
            return found
        if isinstance(spot.type, StreamType | RecordType | VectorType):
            return Record({})
        if isinstance(spot.type, ReferenceType | PointerType):
            return Pointer(LostSpot("a pointer that was never set"))
        index = [step for step in spot.path if isinstance(step, Form)]
        return self.lost("a variable that was never set", place, *index)

    def store(self, spot: Spot, value: Value, place: Place, state: State) -> None:
        """Stores; a store to memory is recorded."""
        match spot:
            case MemorySpot():
                self._access(spot, "write", place, state)
                self.loaded = {key: symbol for key, symbol in self.loaded.items() if key[0] != spot.argument}
            case LocalSpot():
                if isinstance(value, Number):
                    value = Number(fitted(value.form, spot.type))
                state.write(spot, value)
            case ChoiceSpot():
                for condition, arm in spot.arms:
                    branch = state.under(condition, spot.place, self.open, chooses=True)
                    self._choosing = Choice(spot.selector, spot.place, alternatives(spot))
                    if isinstance(arm, LocalSpot):
                        old = state.read(arm, place)
                        branch.write(arm, choose(condition, value, old, place) if old is not None else value)
                        state.cells = branch.cells
                    else:
                        self.store(arm, value, place, branch)
                    self._choosing = None
            case LostSpot():
                self._lost_access(spot, "write", place, state)

    def _access(self, spot: MemorySpot, direction: str, place: Place, state: State, *, manual: bool = False) -> None:
        if self.scouting:
            return
        argument = self.arguments[spot.argument]
        taken = None
        if isinstance(spot.type, UnknownType):
            taken = f"the size of {spot.type.name} is not known and taken as {spot.unit_bytes} bytes"
        self.record.accesses.append(
            (
                Access(
                    place=place,
                    chain=self.frame.chain,
                    function=self.frame.function.name,
                    argument=spot.argument,
                    interface=argument.interface,
                    direction="read" if direction == "read" else "write",
                    element_bytes=spot.unit_bytes,
                    part_bytes=min(spot.part_bytes or spot.unit_bytes, spot.unit_bytes),
                    offset=spot.offset,
                    loops=(),
                    guards=state.guards,
                    order=len(self.record.accesses) + len(self.record.operations),
                    choice=self._choosing,
                    volatile=argument.volatile,
                    manual=manual,
                    taken=taken,
                    process=self.process,
                    array_bytes=argument.array_bytes,
                    covers=spot.covers,
                ),
                self.open,
            )
        )

    def _lost_access(
        self, spot: LostSpot, direction: str, place: Place, state: State, *, given_away: bool = False
    ) -> None:
        """An access whose address is lost is told as unresolved; one whose argument is lost, too, is noted."""
        if self.scouting:
            return
        if spot.argument is None:
            self.notes.append((place, f"a {direction} is left out: {spot.reason}"))
            return
        size = self.arguments[spot.argument].element_bytes
        kept = MemorySpot(spot.argument, spot.depends, size, VoidType())
        self._access(kept, direction, place, state)
        access, loops = self.record.accesses[-1]
        self.record.accesses[-1] = (replace(access, unresolved=spot.reason, given_away=given_away), loops)

    def stream_operation(self, spot: Spot, what: str, place: Place, state: State, *, blocking: bool = True) -> None:
        """One read, write or test of a FIFO."""
        if self.scouting:
            return
        match spot:
            case LocalSpot():
                name = self.stream_name(spot)
                steps = [step for step in spot.path if isinstance(step, Form)]
                self.record.operations.append(
                    (
                        StreamOperation(
                            place=place,
                            chain=self.frame.chain,
                            function=self.frame.function.name,
                            stream=name,
                            operation="read" if what == "read" else "write" if what == "write" else "test",
                            element=self._stream_index(spot, steps),
                            blocking=blocking,
                            loops=(),
                            guards=state.guards,
                            order=len(self.record.accesses) + len(self.record.operations),
                            process=self.process,
                            choice=self._choosing,
                        ),
                        self.open,
                    )
                )
            case ChoiceSpot():
                for condition, arm in spot.arms:
                    self._choosing = Choice(spot.selector, spot.place, alternatives(spot))
                    self.stream_operation(
                        arm, what, place, state.under(condition, spot.place, self.open, chooses=True), blocking=blocking
                    )
                    self._choosing = None
            case _:
                return

    def stream_name(self, spot: LocalSpot) -> str:
        """A FIFO's name: its variable, and the field it is in."""
        variable = self.variable_name(spot.root)
        return ".".join([variable, *(step for step in spot.path if isinstance(step, str))])

    def variable_name(self, root: Root) -> str:
        """The variable's name in the source."""
        return self.names.get(root, root[0].rsplit("@", 1)[-1])

    def _stream_index(self, spot: LocalSpot, steps: list[Form]) -> Form | None:
        if not steps:
            return None
        kind = self.types.get(spot.root)
        index = ZERO
        for step in steps:
            while isinstance(kind, ReferenceType | PointerType):
                kind = kind.to
            size = kind.count if isinstance(kind, ArrayType) and kind.count else 1
            index = index * size + step
            kind = kind.element if isinstance(kind, ArrayType) else None
        return index

    # ------------------------------------------------------------------------------------------- statements

    def run(self, statement: Statement, state: State) -> Flow:
        """Follows one statement; ``state`` is used up."""
        self.step()
        match statement:
            case Block(body=body):
                return self.run_all(body, state)
            case Declare(variable=variable):
                self.declare(variable, state)
                return Flow(state)
            case Evaluate(expression=expression):
                self.value(expression, state)
                return Flow(state)
            case If():
                return self._if(statement, state)
            case Loop():
                return self.loop(statement, state)
            case Switch():
                return self._switch(statement, state)
            case Leave(how="break"):
                return Flow(None, breaks=[state])
            case Leave(how="continue"):
                return Flow(None, continues=[state])
            case Leave(place=place):
                self.notes.append((place, "a goto is not followed"))
                self.jumps[self.frame.chain] = place.line
                return Flow(state)
            case Return(value=None):
                return Flow(None, returns=[(state, NOTHING)])
            case Return(value=expression):
                assert expression is not None
                value = self.returned(expression, state)
                return Flow(None, returns=[(state, value)])
            case Lost(reason=reason, place=place):
                self.notes.append((place, reason))
                return Flow(state)

    def run_all(self, body: Sequence[Statement], state: State) -> Flow:
        """Follows statements in order; ``state`` is used up."""
        flow = Flow(state)
        for statement in body:
            if flow.next is None:
                break
            part = self.run(statement, flow.next)
            flow.take(part)
            flow.next = part.next
        return flow

    def _if(self, statement: If, state: State) -> Flow:
        flow = Flow(None)
        first = self.run_all(statement.initial, state)
        if first.next is None:
            return first
        state = first.next
        condition = self.condition(statement.condition, state)
        if condition.known is not None and not self.scouting:
            if condition.known:
                return self.run(statement.yes, state)
            return self.run(statement.no, state) if statement.no is not None else Flow(state)
        place = statement.condition.place
        inverse = negation(condition)
        yes = self.run(statement.yes, state.under(condition, place, self.open))
        no = Flow(state.under(inverse, place, self.open))
        if statement.no is not None:
            no = self.run(statement.no, state.under(inverse, place, self.open))
        flow.take(yes)
        flow.take(no)
        if yes.next is None and yes.breaks + yes.returns and no.next is not None:
            no.next.guards = _leaving(no.next.guards, len(state.guards))
        if no.next is None and no.breaks + no.returns and yes.next is not None:
            yes.next.guards = _leaving(yes.next.guards, len(state.guards))
        flow.next = joined(yes.next, no.next, place)
        return flow

    def _switch(self, statement: Switch, state: State) -> Flow:
        """The labels are tried in turn, ``default`` last; then the bodies run in order, each falling into the next."""
        flow = Flow(None)
        subject = self.number(statement.subject, state)
        place = statement.subject.place
        rest: State | None = state
        entering: dict[int, State] = {}
        for at, case in enumerate(statement.cases):
            if None in case.values or rest is None:
                continue
            hit = ZERO
            for value in case.values:
                if value is not None:
                    hit = either(hit, equal(subject, self.number(value, rest)))
            if self.scouting or hit.known != 0:
                entering[at] = rest.under(hit, place, self.open)
            rest = None if hit.known and not self.scouting else rest.under(negation(hit), place, self.open)
        default_at = next((at for at, case in enumerate(statement.cases) if None in case.values), None)
        if default_at is not None and rest is not None:
            entering[default_at], rest = rest, None
        falling: State | None = None
        ended: list[State] = []
        for at, case in enumerate(statement.cases):
            begin = joined(entering.get(at), falling, place)
            falling = None
            if begin is None:
                continue
            part = self.run_all(case.body, begin)
            flow.continues += part.continues
            flow.returns += part.returns
            ended += part.breaks
            falling = part.next
        meets = joined(falling, rest, place)
        for end in reversed(ended):
            meets = joined(end, meets, place)
        flow.next = meets
        return flow

    # ------------------------------------------------------------------------------- provided by the other parts

    def value(self, expression: Expression, state: State) -> Value:
        """What the expression gives; what it does to variables happens in ``state``."""
        raise NotImplementedError

    def number(self, expression: Expression, state: State) -> Form:
        """The expression as a form; what is no number only depends."""
        value = self.value(expression, state)
        match value:
            case Number(form):
                return form
            case Pointer(spot):
                return both(value.valid, _address(spot))
            case Record(parts):
                return depending(*(part.form for part in parts.values() if isinstance(part, Number)))
            case Closure():
                return ONE

    def condition(self, expression: Expression, state: State) -> Form:
        """1 where the expression is true."""
        return truth(self.number(expression, state))

    def returned(self, expression: Expression, state: State) -> Value:
        """What a return statement gives: a pointer to the place where the function's result is a reference."""
        raise NotImplementedError

    def declare(self, variable: Variable, state: State) -> None:
        """A local or static variable comes into being."""
        raise NotImplementedError

    def loop(self, statement: Loop, state: State) -> Flow:
        """Follows a loop: its body once, for all iterations."""
        raise NotImplementedError


def _leaving(guards: tuple[Guard, ...], since: int) -> tuple[Guard, ...]:
    """The guards after ``since`` hold because the loop or function has not been left."""
    return (*guards[:since], *(replace(guard, leaves=True) for guard in guards[since:]))


def _address(spot: Spot) -> Form:
    """A pointer as a truth value or an unknown number: never null where it points to something."""
    match spot:
        case MemorySpot() | LocalSpot():
            return ONE
        case ChoiceSpot():
            return spot.selector
        case LostSpot():
            return depending(spot.depends)


def alternatives(choice: ChoiceSpot) -> tuple[str, ...]:
    """The arguments or variables among which is chosen."""
    names: list[str] = []
    for _, arm in choice.arms:
        name = arm.argument if isinstance(arm, MemorySpot) else arm.root[0] if isinstance(arm, LocalSpot) else "?"
        if name and name not in names:
            names.append(name)
    return tuple(names)
