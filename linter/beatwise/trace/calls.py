"""Calls: a function's body is followed in place, with its parameters bound."""

from __future__ import annotations

from collections.abc import Iterator, Sequence

from beatwise.model.form import ZERO, Form, data, symbol_form
from beatwise.model.kernel import Build, Call, Expression, Function, FunctionName, Variable
from beatwise.model.place import Place
from beatwise.model.types import (
    ArrayType,
    BurstPointerType,
    CallableType,
    IntType,
    PointerType,
    RealType,
    RecordType,
    ReferenceType,
    StreamType,
    Type,
    UnknownType,
    VectorType,
)
from beatwise.trace.builtins import SILENT, Builtins
from beatwise.trace.expressions import bare
from beatwise.trace.integers import fitted
from beatwise.trace.machine import CALLS_AT_MOST, RECURSION_AT_MOST, Frame
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
    Spot,
    Value,
    depending,
)

Bound = Value | Spot


class Caller(Builtins):
    """What a call does."""

    def call(self, expression: Call, state: State) -> Value:
        function = self.program.functions.get(expression.function) if expression.function else None
        if function is not None and function.body is not None and not self._known_by_type(expression):
            receiver = self._receiver(expression, state)
            arguments = self._arguments(function, expression.arguments, state)
            return self.enter(function, arguments, receiver, expression.place, state)
        if expression.target is not None:
            return self._indirect(expression, state)
        known = self.builtin(expression, state)
        if known is not None:
            return known
        if function is None and expression.receiver is not None:
            held = self._held_closure(expression.receiver, state)
            if held is not None:
                return self._closure_call(held, expression.arguments, expression.place, state)
        return self._outside(expression, state)

    def _known_by_type(self, expression: Call) -> bool:
        """Methods of streams, vectors and the like are known by their type even where a body is at hand."""
        return expression.receiver is not None and isinstance(
            bare(expression.receiver.type), StreamType | BurstPointerType | VectorType | ArrayType | IntType | RealType
        )

    def _receiver(self, expression: Call, state: State) -> Spot | None:
        return self._object(expression.receiver, state) if expression.receiver is not None else None

    def _held_closure(self, receiver: Expression, state: State) -> Closure | None:
        if not isinstance(bare(receiver.type), CallableType):
            return None
        value = self.value(receiver, state)
        return value if isinstance(value, Closure) else None

    def _arguments(self, function: Function, arguments: Sequence[Expression], state: State) -> list[Bound]:
        bound: list[Bound] = []
        for at, argument in enumerate(arguments):
            kind = function.parameters[at].type if at < len(function.parameters) else argument.type
            bound.append(self.bound(argument, kind, state))
        return bound

    def bound(self, argument: Expression, kind: Type, state: State) -> Bound:
        """An argument as a parameter of type ``kind`` takes it: a place for a reference or a stream, else a value."""
        if isinstance(kind, ReferenceType) or isinstance(bare(argument.type), StreamType):
            spot = self.spot(argument, state)
            if spot is not None:
                return spot
        return self.value(argument, state)

    def enter(
        self, function: Function, arguments: Sequence[Bound], receiver: Spot | None, place: Place, state: State,
        closure: Closure | None = None,
    ) -> Value:  # fmt: skip
        """Follows the function's body with these arguments; ``state`` becomes the state after it."""
        again = self.calls.count(function.key)
        if len(self.calls) >= CALLS_AT_MOST or again >= (1 if self.scouting else RECURSION_AT_MOST):
            if not self.scouting:
                self.notes.append((place, f"{function.name} calls itself too deeply to be followed"))
            return self.lost(f"{function.name} calls itself too deeply", place)
        outer, process = self.frame, self.process
        frame = Frame(function, next(self._activations), {}, receiver, (*outer.chain, place))
        if closure is not None:
            frame.roots.update(closure.roots)
            for key, captured in closure.values.items():
                root = (key, frame.activation)
                frame.roots[key] = root
                state.cells[root] = {(): captured}
            if receiver is None:
                frame.this = closure.receiver
        frame.outer = outer if closure is not None else None
        self.frame = frame
        self.calls.append(function.key)
        if self._starts_process(outer):
            self.process = self._process_named(function.name, place)
        written, state.written = state.written, None
        for parameter, bound in zip(function.parameters, arguments, strict=False):
            self.bind(parameter, bound, state)
        state.written = written
        guards = state.guards
        for name, initial in function.initializers:
            self._initialize(name, initial, state)
        assert function.body is not None
        flow = self.run(function.body, state)
        result = self._returned_value(flow.next, flow.returns, state, place)
        self._forget_locals(state, frame.activation, result)
        state.guards = guards
        self.calls.pop()
        self.frame, self.process = outer, process
        return result

    def _forget_locals(self, state: State, since: int, result: Value) -> None:
        """The variables of a call that has ended are gone, but for what its result points to."""
        kept = {spot.root for spot in _spots_in(result)}
        state.cells = {root: cells for root, cells in state.cells.items() if root[1] < since or root in kept}

    def _process_named(self, name: str, place: Place) -> str:
        """A name for the process that a call starts; each call is a process of its own."""
        calls = self.processes.setdefault(name, [])
        if place not in calls:
            calls.append(place)
        return name if calls[0] == place else f"{name} (line {place.line})"

    def _starts_process(self, outer: Frame) -> bool:
        return self.process is None and any(d.kind == "dataflow" for d in outer.function.directives)

    def _initialize(self, name: str, initial: Expression, state: State) -> None:
        this = self.frame.this
        if isinstance(initial, Build) and initial.function is not None and this is not None:
            function = self.program.functions.get(initial.function)
            own = this.type if isinstance(this, LocalSpot | MemorySpot) else None
            fields = {field.name for field in own.fields} if isinstance(own, RecordType) else set()
            if name not in fields and function is not None and function.body is not None:  # the base's constructor
                self.enter(function, self._arguments(function, initial.arguments, state), this, initial.place, state)
                return
        if isinstance(this, LocalSpot):
            kind = initial.type
            value: Value
            if isinstance(bare(kind), StreamType):
                spot = self.spot(initial, state)
                value = Pointer(spot) if spot is not None else self.value(initial, state)
            elif isinstance(kind, ReferenceType):
                spot = self.spot(initial, state)
                value = Pointer(spot) if spot is not None else self.value(initial, state)
            else:
                value = self.value(initial, state)
            if not (isinstance(value, Record) and not value.parts):
                state.write(LocalSpot(this.root, (*this.path, name), kind), value)

    def bind(self, parameter: Variable, bound: Bound, state: State) -> None:
        """A parameter receives its argument."""
        root = (parameter.key, self.frame.activation)
        self.frame.roots[parameter.key] = root
        kind = parameter.type
        self.types[root] = kind
        self.names[root] = parameter.name
        state.cells[root] = {}
        if isinstance(bound, MemorySpot | LocalSpot | ChoiceSpot | LostSpot):
            if isinstance(bare(kind), StreamType) and not isinstance(kind, ReferenceType):
                self.types[root] = ReferenceType(kind)
            elif isinstance(kind, PointerType | ArrayType):
                bound = self._decayed(bound)
            state.cells[root] = {(): Pointer(bound)}
            return
        if isinstance(kind, ReferenceType):
            if isinstance(bound, Closure):
                self.types[root] = kind.to
                state.cells[root] = {(): bound}
                return
            if isinstance(bound, Pointer) and not isinstance(kind.to, PointerType):
                state.cells[root] = {(): bound}
                return
            self.types[root] = kind.to
        value = self.converted(bound, bare(kind), bare(kind))
        if isinstance(value, Number):
            value = Number(fitted(value.form, bare(kind)))
        state.write(LocalSpot(root, (), bare(kind)), value)

    def _decayed(self, spot: Spot) -> Spot:
        if isinstance(spot, LocalSpot) and isinstance(spot.type, ArrayType):
            return LocalSpot(spot.root, (*spot.path, ZERO), spot.type.element)
        return spot

    def _returned_value(
        self, after: State | None, returns: list[tuple[State, Value]], state: State, place: Place
    ) -> Value:
        """The states of all returns meet; so do their values, held in a cell that the join chooses like any other."""
        root = ("what is returned", next(self._activations))
        meets: State | None = None
        if after is not None:
            meets = after
        for left, value in reversed(returns):
            left.cells[root] = {(): value}
            meets = left if meets is None else joined(left, meets, place)
        if meets is None:
            return NOTHING
        if meets is not state:
            state.become(meets)
        value_cells = state.cells.pop(root, None)
        return value_cells.get((), NOTHING) if value_cells else NOTHING

    def returned(self, expression: Expression, state: State) -> Value:
        if isinstance(self.frame.function.result, ReferenceType):
            spot = self.spot(expression, state)
            if spot is not None:
                return Pointer(spot)
        return self.value(expression, state)

    # ---------------------------------------------------------------------------------- functions held as values

    def _indirect(self, expression: Call, state: State) -> Value:
        assert expression.target is not None
        value = self.value(expression.target, state)
        if isinstance(value, Closure):
            return self._closure_call(value, expression.arguments, expression.place, state)
        return self._outside(expression, state)

    def _closure_call(self, closure: Closure, arguments: Sequence[Expression], place: Place, state: State) -> Value:
        function = self.program.functions.get(closure.key)
        if function is None or function.body is None:
            return self.lost("a function whose body is not known", place)
        bound = self._arguments(function, arguments, state)
        captures = closure if closure.roots or closure.values or closure.receiver else None
        return self.enter(function, bound, closure.receiver if captures is None else None, place, state, captures)

    def build(self, expression: Build, state: State) -> Value:
        function = self.program.functions.get(expression.function) if expression.function else None
        kind = bare(expression.type)
        if function is not None and function.body is not None and isinstance(kind, RecordType):
            root = ("an object", next(self._activations))
            self.types[root] = UnknownType(kind.name)
            state.cells[root] = {}
            spot = LocalSpot(root, (), kind)
            self.enter(function, self._arguments(function, expression.arguments, state), spot, expression.place, state)
            return Record(dict(state.cells.pop(root, {})))
        started = self._started(expression.arguments, expression.place, state)
        if started is not None:
            return started
        values = [self.value(argument, state) for argument in expression.arguments]
        if len(values) == 1:
            return self.converted(values[0], kind, bare(expression.arguments[0].type))
        if not values:
            return Record({}) if not isinstance(kind, IntType) else NOTHING
        return Number(depending(*(self._form_of(value) for value in values)))

    def _started(self, arguments: Sequence[Expression], place: Place, state: State) -> Value | None:
        """A wrapper (a task, a thread, invoke) that is given a function runs it on the arguments that follow."""
        for at, argument in enumerate(arguments):
            closure: Value | None = None
            if isinstance(argument, FunctionName):
                closure = self.value(argument, state)
            elif isinstance(bare(argument.type), CallableType):
                closure = self.value(argument, state)
            if isinstance(closure, Closure):
                process, self.process = self.process, None
                function = self.program.functions.get(closure.key)
                self.process = process or (self._process_named(function.name, place) if function is not None else None)
                self._closure_call(closure, arguments[at + 1 :], place, state)
                self.process = process
                return Record({})
        return None

    def _outside(self, expression: Call, state: State) -> Value:
        """A function without a body here: what it is given in memory can't be followed into it."""
        receiver = expression.receiver
        started = self._started(expression.arguments, expression.place, state)
        if started is not None:
            if receiver is not None:
                self.value(receiver, state)
            return started
        pieces: list[Form] = []
        if receiver is not None:
            pieces.append(self._form_of(self.value(receiver, state)))
        for argument in expression.arguments:
            value = self.value(argument, state)
            if isinstance(value, Pointer):
                self._given_away(expression, argument, value.spot, state)
            else:
                pieces.append(self._form_of(value))
        if isinstance(bare(expression.type), RealType) and pieces:
            return Number(depending(*pieces))
        return self.lost(f"{expression.name} has no body here", expression.place, *pieces)

    def _given_away(self, call: Call, argument: Expression, spot: Spot, state: State) -> None:
        if call.name in SILENT:
            return
        if isinstance(spot, MemorySpot) and not self.scouting:
            kept = bare(argument.type)
            constant = isinstance(kept, PointerType) and kept.constant
            lost = LostSpot(f"it is passed to `{call.name}`, which has no body here", spot.offset, spot.argument)
            self._lost_access(lost, "read" if constant else "write", call.place, state, given_away=True)
        if isinstance(spot, LocalSpot) and not isinstance(bare(argument.type), StreamType | CallableType):
            pointed = bare(argument.type)
            if isinstance(pointed, PointerType) and isinstance(pointed.to, IntType | RealType):
                state.write(spot, Number(symbol_form(data(call.name, call.place, self.open))))


def _spots_in(value: Value) -> Iterator[LocalSpot]:
    """The variables that a value points to."""
    match value:
        case Pointer(LocalSpot() as spot):
            yield spot
        case Pointer(ChoiceSpot(arms=arms)):
            for _, arm in arms:
                yield from _spots_in(Pointer(arm))
        case Record(parts):
            for part in parts.values():
                yield from _spots_in(part)
        case Closure(roots=roots):
            for root in roots.values():
                yield LocalSpot(root, (), CallableType())
