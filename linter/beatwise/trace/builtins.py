"""What is known by name: copies, minimum and maximum, streams, burst requests, containers."""

from __future__ import annotations

from beatwise.model.access import Choice, Direction, LoopInstance
from beatwise.model.form import ONE, ZERO, Form, counter, data, number, renumbered, symbol_form
from beatwise.model.kernel import Call, Expression, Member
from beatwise.model.operations import div, floordiv, less, maximum, minimum, negation, select
from beatwise.model.place import Place
from beatwise.model.types import (
    ArrayType,
    BurstPointerType,
    IntType,
    PointerType,
    RealType,
    StreamType,
    Type,
    VectorType,
)
from beatwise.trace.expressions import Evaluator, bare
from beatwise.trace.machine import alternatives
from beatwise.trace.state import State
from beatwise.trace.values import (
    NOTHING,
    ChoiceSpot,
    LocalSpot,
    LostSpot,
    MemorySpot,
    Number,
    Pointer,
    Spot,
    Value,
    depending,
    element,
    shifted,
)

COPIES = {"memcpy", "memmove", "__builtin_memcpy", "__builtin_memmove"}
SILENT = {"printf", "fprintf", "puts", "assert", "__assert_fail", "exit", "abort"}
READS = {"read", "read_nb", "try_read", "peek", "try_peek", "get", "pop", "front"}
WRITES = {"write", "write_nb", "try_write", "put", "push", "close", "try_close"}
ADDRESSES: dict[str, Direction] = {"read_addr": "read", "write_addr": "write"}  #: queues of a port's addresses
TESTS = {"empty", "full", "size", "available", "eot", "try_eot", "exist", "try_open", "open"}


class Builtins(Evaluator):
    """Calls that have no body to follow, but a meaning."""

    def builtin(self, call: Call, state: State) -> Value | None:
        """The result, or None when the call is not known by name."""
        if call.receiver is not None:
            return self._method(call, state)
        name = call.name
        if name in COPIES and len(call.arguments) == 3:
            return self._memory_copy(call, state)
        if name in ("memset", "__builtin_memset") and len(call.arguments) == 3:
            return self._memory_set(call, state)
        if name in ("copy", "copy_n", "fill", "fill_n") and len(call.arguments) == 3:
            return self._range_copy(call, state)
        if name in ("min", "max", "fmin", "fmax", "fminf", "fmaxf") and len(call.arguments) == 2:
            return self._extreme(name, call, state)
        if name in ("abs", "labs", "llabs") and len(call.arguments) == 1:
            form = self.number(call.arguments[0], state)
            if isinstance(bare(call.type), RealType):
                return Number(depending(form))
            return Number(select(less(form, ZERO), -form, form))
        if name == "swap" and len(call.arguments) == 2:
            return self._swap(call.arguments[0], call.arguments[1], call.place, state)
        if (
            name in ("move", "forward", "ref", "cref", "as_const", "addressof", "reg", "launder")
            and len(call.arguments) == 1
        ):
            spot = self.spot(call.arguments[0], state)
            return Pointer(spot) if spot is not None else self.value(call.arguments[0], state)
        if name in ("__builtin_expect", "assume") and call.arguments:
            return self.value(call.arguments[0], state)
        return None

    def gives_place(self, expression: Call) -> bool:
        if super().gives_place(expression):
            return True
        if expression.receiver is None:
            return expression.name in ("move", "forward", "ref", "cref", "as_const", "reg")
        kind = bare(expression.receiver.type)
        return isinstance(kind, ArrayType | VectorType) and expression.name in (
            "at",
            "operator[]",
            "back",
            "front",
            "get",
        )

    # ---------------------------------------------------------------------------------------------- methods

    def _method(self, call: Call, state: State) -> Value | None:
        receiver = call.receiver
        assert receiver is not None
        kind = bare(receiver.type)
        if isinstance(receiver, Member) and receiver.field in ADDRESSES and call.name in WRITES and call.arguments:
            asked = bare(receiver.base.type)
            if isinstance(asked, BurstPointerType):
                return self._address_request(call, receiver, asked, state)
        if isinstance(kind, PointerType) and isinstance(kind.to, StreamType | VectorType | BurstPointerType):
            kind = kind.to
        if isinstance(kind, StreamType):
            return self._stream(call, kind, state)
        if isinstance(kind, BurstPointerType):
            return self._burst_request(call, kind, state)
        if isinstance(kind, ArrayType | VectorType):
            return self._container(call, kind, state)
        if isinstance(kind, IntType):
            return self._integer(call, state)
        if isinstance(kind, RealType):
            pieces = [self.number(receiver, state), *(self.number(a, state) for a in call.arguments)]
            return Number(depending(*pieces))
        return None

    def _address_request(self, call: Call, receiver: Member, kind: BurstPointerType, state: State) -> Value:
        """An address put into a port's own queue: an access there. That the queue has room is no matter of data."""
        base = self._burst_base(self._object(receiver.base, state), state, call.place)
        spot = shifted(base, self.number(call.arguments[0], state), kind.to)
        if isinstance(spot, MemorySpot):
            self._access(spot, ADDRESSES[receiver.field], call.place, state, manual=True)
        return self.lost("whether the queue had room", call.place)

    def _integer(self, call: Call, state: State) -> Value:
        assert call.receiver is not None
        form = self.number(call.receiver, state)
        arguments = [self.number(argument, state) for argument in call.arguments]
        name = call.name
        if name.startswith(("to_", "operator ")) or name in ("value", "get"):
            return Number(form)
        if name in ("or_reduce", "is_nonzero"):
            return Number(negation(less(form, ONE)))
        if name == "length" and isinstance(bare(call.receiver.type), IntType):
            kind = bare(call.receiver.type)
            return Number(number(kind.bits if isinstance(kind, IntType) else 0))
        return Number(depending(form, *arguments))

    def _stream(self, call: Call, kind: StreamType, state: State) -> Value:
        assert call.receiver is not None
        spot = self._object(call.receiver, state)
        name = call.name
        if name in READS or name == "operator>>":
            what = "read"
        elif name in WRITES or name == "operator<<":
            what = "write"
        elif name in TESTS:
            what = "test"
        else:
            for argument in call.arguments:
                self.value(argument, state)
            return self.lost(f"{name} of a stream", call.place)
        blocking = not (name.endswith("_nb") or name.startswith("try_"))
        if what == "write":
            for argument in call.arguments:
                self.value(argument, state)
            self.stream_operation(spot, what, call.place, state, blocking=blocking)
            return self._drawn(spot, call.place, IntType(1, False, 1)) if not blocking else Pointer(spot)
        self.stream_operation(spot, what, call.place, state, blocking=blocking)
        if what == "test":
            return self._drawn(spot, call.place, IntType(1, False, 1))
        drawn = self._drawn(spot, call.place, kind.element)
        for argument in call.arguments:
            target = self.spot(argument, state)
            if target is not None and isinstance(target, LocalSpot) and not isinstance(bare(argument.type), StreamType):
                self.store(target, drawn, call.place, state)
            elif target is not None and isinstance(target, MemorySpot):
                self.store(target, drawn, call.place, state)
        if name == "operator>>":
            return Pointer(spot)
        return self._drawn(spot, call.place, IntType(1, False, 1)) if not blocking and call.arguments else drawn

    def _drawn(self, spot: Spot, place: Place, kind: Type) -> Value:
        """A value that came out of a stream."""
        low = high = None
        if isinstance(kind, IntType):
            low = -(1 << kind.bits - 1) if kind.signed else 0
            high = (1 << kind.bits - 1) - 1 if kind.signed else (1 << kind.bits) - 1
        name = self.stream_name(spot) if isinstance(spot, LocalSpot) else "a stream"
        return Number(symbol_form(data(name, place, self.open, low=low, high=high)))

    def _object(self, receiver: Expression, state: State) -> Spot:
        """Where the object of a method lies; a pointer to it is followed."""
        kind = bare(receiver.type)
        if isinstance(kind, PointerType):
            value = self.value(receiver, state)
            return value.spot if isinstance(value, Pointer) else LostSpot("a pointer to a stream that is not known")
        spot = self.spot(receiver, state)
        if spot is None:
            spot = self.temporary(self.value(receiver, state), kind, state)
        return spot

    def _container(self, call: Call, kind: ArrayType | VectorType, state: State) -> Value:
        assert call.receiver is not None
        name = call.name
        if name in ("operator[]", "at", "get") and call.arguments:
            spot = self._object(call.receiver, state)
            at = self.number(call.arguments[0], state)
            return Pointer(element(spot, at, kind.element))
        if name in ("data", "begin", "cbegin"):
            return Pointer(element(self._object(call.receiver, state), ZERO, kind.element))
        if name in ("end", "cend") and isinstance(kind, ArrayType):
            return Pointer(element(self._object(call.receiver, state), number(kind.count or 0), kind.element))
        if name in ("front", "back"):
            last = (kind.count or 1) - 1 if isinstance(kind, ArrayType) else kind.lanes - 1
            at = ZERO if name == "front" else number(last)
            return Pointer(element(self._object(call.receiver, state), at, kind.element))
        if name == "size":
            return Number(number(kind.count or 0 if isinstance(kind, ArrayType) else kind.lanes))
        if name == "fill" and call.arguments:
            value = self.value(call.arguments[0], state)
            spot = self._object(call.receiver, state)
            if isinstance(spot, LocalSpot):
                state.write(LocalSpot(spot.root, (*spot.path, _some(self)), kind.element), value)
            return NOTHING
        pieces = [self.value(argument, state) for argument in call.arguments]
        whole = self.value(call.receiver, state)
        forms = [self._form_of(piece) for piece in (*pieces, whole)]
        return Number(depending(*forms))

    # -------------------------------------------------------------------------------------------- burst requests

    def _burst_request(self, call: Call, kind: BurstPointerType, state: State) -> Value:
        """``read_request(offset, length)`` and ``write_request`` are the accesses; the beats that follow are theirs."""
        assert call.receiver is not None
        name = call.name
        values = [self.value(argument, state) for argument in call.arguments]
        if name in ("read_request", "write_request") and len(values) == 2:
            base = self._burst_base(self._object(call.receiver, state), state, call.place)
            start = shifted(base, self._form_of(values[0]), kind.to)
            direction = "read" if name == "read_request" else "write"
            self.run_of(start, self._form_of(values[1]), direction, call.place, state, kind.to, manual=True)
            return NOTHING
        if name == "read":
            burst = self._burst_base(self._object(call.receiver, state), state, call.place)
            argument = burst.argument if isinstance(burst, MemorySpot) else "a burst"
            drawn = Number(symbol_form(data(argument, call.place, self.open)))
            return drawn
        return NOTHING

    def _burst_base(self, spot: Spot, state: State, place: Place) -> Spot:
        if isinstance(spot, LocalSpot):
            held = state.read(spot, place)
            if isinstance(held, Pointer):
                return held.spot
        return spot

    # ------------------------------------------------------------------------------------------------- copies

    def run_of(
        self,
        start: Spot,
        elements: Form,
        direction: str,
        place: Place,
        state: State,
        kind: Type,
        *,
        manual: bool = False,
    ) -> None:
        """``elements`` consecutive elements of type ``kind``, as the innermost loop of a copy."""
        if self.scouting or not isinstance(start, MemorySpot):
            if not self.scouting and not isinstance(start, LocalSpot | MemorySpot):
                self._each_arm(start, elements, direction, place, state, kind, manual)
            return
        number_ = self.new_loop()
        symbol = counter("copied", number_)
        known = elements.known
        if known is not None:
            symbol = renumbered(symbol, max(0, known - 1))
        self.record.loops[number_] = LoopInstance(
            number_, symbol, place, self.frame.function.name, elements, kind="copy", pipeline=True
        )
        unit = start.unit_bytes or kind.bytes
        moving = MemorySpot(start.argument, start.offset + symbol_form(symbol) * unit, unit, start.type)
        outer, self.open = self.open, (*self.open, number_)
        self._access(moving, direction, place, state, manual=manual)
        self.open = outer

    def _each_arm(
        self, spot: Spot, elements: Form, direction: str, place: Place, state: State, kind: Type, manual: bool
    ) -> None:
        if isinstance(spot, ChoiceSpot):
            for condition, arm in spot.arms:
                self._choosing = Choice(spot.selector, spot.place, alternatives(spot))
                branch = state.under(condition, spot.place, self.open, chooses=True)
                self.run_of(arm, elements, direction, place, branch, kind, manual=manual)
                self._choosing = None
        elif isinstance(spot, LostSpot):
            self._lost_access(spot, direction, place, state)

    def _memory_copy(self, call: Call, state: State) -> Value:
        target, source = self.value(call.arguments[0], state), self.value(call.arguments[1], state)
        size = self.number(call.arguments[2], state)
        self._copy(_spot(target), _spot(source), size, True, call.place, state)
        return target

    def _memory_set(self, call: Call, state: State) -> Value:
        target = self.value(call.arguments[0], state)
        self.number(call.arguments[1], state)
        size = self.number(call.arguments[2], state)
        spot = _spot(target)
        if isinstance(spot, LocalSpot):
            state.write(_whole(spot, self), NOTHING)
        else:
            self.run_of(spot, _elements(size, spot), "write", call.place, state, IntType(8, False, 1))
        return target

    def _range_copy(self, call: Call, state: State) -> Value:
        """``copy(first, last, out)``, ``copy_n(first, n, out)``, ``fill(first, last, x)``, ``fill_n(first, n, x)``."""
        first, second, third = (self.value(argument, state) for argument in call.arguments)
        begin = _spot(first)
        if call.name.endswith("_n"):
            length = self._form_of(second)
        else:
            length = self._distance(begin, _spot(second))
        if call.name.startswith("fill"):
            if isinstance(begin, LocalSpot):
                state.write(_whole(begin, self), third)
            else:
                self.run_of(begin, length, "write", call.place, state, _element_type(begin))
            return NOTHING
        self._copy(_spot(third), begin, length, False, call.place, state)
        return third

    def _distance(self, begin: Spot, end: Spot) -> Form:
        if isinstance(begin, MemorySpot) and isinstance(end, MemorySpot) and begin.argument == end.argument:
            return div(end.offset - begin.offset, number(begin.unit_bytes or 1))
        if isinstance(begin, LocalSpot) and isinstance(end, LocalSpot) and begin.path and end.path:
            a, b = begin.path[-1], end.path[-1]
            if isinstance(a, Form) and isinstance(b, Form):
                return b - a
        return depending()

    def _copy(self, target: Spot, source: Spot, size: Form, in_bytes: bool, place: Place, state: State) -> None:
        if not isinstance(source, LocalSpot):
            elements = _elements(size, source) if in_bytes else size
            self.run_of(source, elements, "read", place, state, _element_type(source))
        if not isinstance(target, LocalSpot):
            elements = _elements(size, target) if in_bytes else size
            self.run_of(target, elements, "write", place, state, _element_type(target))
            return
        if isinstance(source, MemorySpot):
            held: Value = Number(symbol_form(data(source.argument, place, self.open, depends=source.offset.leaves())))
        elif isinstance(source, LocalSpot):
            found = state.read(_whole(source, self), place)
            held = found if found is not None else self.lost("a variable that was never set", place)
        else:
            held = self.lost("a copy from a place that is not known", place)
        state.write(_whole(target, self), held if isinstance(held, Number) else Number(depending(self._form_of(held))))

    def _extreme(self, name: str, call: Call, state: State) -> Value:
        left, right = (self.number(argument, state) for argument in call.arguments)
        if isinstance(bare(call.type), RealType):
            return Number(depending(left, right))
        return Number(minimum(left, right) if name.startswith(("min", "fmin")) else maximum(left, right))

    def _swap(self, left: Expression, right: Expression, place: Place, state: State) -> Value:
        a, b = self.spot(left, state), self.spot(right, state)
        if a is not None and b is not None:
            first, second = self.load(a, place, state), self.load(b, place, state)
            self.store(a, second, place, state)
            self.store(b, first, place, state)
        return NOTHING


def _spot(value: Value) -> Spot:
    return value.spot if isinstance(value, Pointer) else LostSpot("a pointer whose target is not known")


def _element_type(spot: Spot) -> Type:
    return spot.type if isinstance(spot, MemorySpot | LocalSpot) else IntType(8, False, 1)


def _elements(size: Form, spot: Spot) -> Form:
    """Bytes as elements of the spot; the arms of a choice have elements of one size."""
    while isinstance(spot, ChoiceSpot):
        spot = spot.arms[0][1]
    unit = spot.unit_bytes if isinstance(spot, MemorySpot) else _element_type(spot).bytes
    return floordiv(size, number(unit or 1))


def _whole(spot: LocalSpot, machine: Evaluator) -> LocalSpot:
    """Some element of the array the spot points into."""
    if spot.path and isinstance(spot.path[-1], Form):
        return LocalSpot(spot.root, (*spot.path[:-1], _some(machine)), spot.type)
    return spot


def _some(machine: Evaluator) -> Form:
    return symbol_form(data("any element", None, machine.open))
