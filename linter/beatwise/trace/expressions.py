"""Expressions: names, subscripts, arithmetic, assignments."""

from __future__ import annotations

from beatwise.model.form import ONE, ZERO, Form, Symbol, number, parameter, symbol_form
from beatwise.model.kernel import (
    Assign,
    Binary,
    Bits,
    Build,
    Call,
    Cast,
    Expression,
    FunctionName,
    Index,
    Items,
    Literal,
    Member,
    Name,
    Opaque,
    Select,
    Step,
    This,
    Unary,
    Variable,
)
from beatwise.model.operations import div, mask, negation
from beatwise.model.place import Place
from beatwise.model.types import (
    ArrayType,
    BurstPointerType,
    IntType,
    PointerType,
    RealType,
    RecordType,
    ReferenceType,
    StreamType,
    Type,
    VectorType,
)
from beatwise.trace.integers import binary, bit_range, fitted, inverted
from beatwise.trace.machine import Machine
from beatwise.trace.state import State, joined
from beatwise.trace.values import (
    NOTHING,
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
    choose_spot,
    depending,
    element,
    member,
    recast,
    shifted,
)

SETTABLE = 4096  #: elements of an initialised array that are kept one by one


def bare(kind: Type) -> Type:
    """The type behind references."""
    while isinstance(kind, ReferenceType):
        kind = kind.to
    return kind


class Evaluator(Machine):
    """What expressions are, and where places are."""

    # ------------------------------------------------------------------------------------------------ values

    def value(self, expression: Expression, state: State) -> Value:
        self.step()
        match expression:
            case Literal(value=int() as plain):
                return Number(number(int(plain)))
            case Literal(value=None, name=str() as name):
                return Number(symbol_form(self.size_named(name)))
            case Literal(value=None, place=place):
                return self.lost("a constant whose value is not known", place)
            case Literal():
                return Number(depending())
            case Name() | Index() | Member():
                spot = self.spot(expression, state)
                assert spot is not None
                return self.load(spot, expression.place, state)
            case Bits():
                return self._bits(expression, state)
            case FunctionName():
                return self._closure(expression, state)
            case This():
                return Pointer(self.frame_this())
            case Unary():
                return self._unary(expression, state)
            case Step(by=by, prefix=prefix, operand=operand, place=place):
                return self._step(by, prefix, operand, place, state)
            case Binary():
                return self._binary(expression, state)
            case Assign():
                held = self.assign(expression, state)
                return self._peek(held, state, expression.place) if isinstance(held, PLACES) else held
            case Select():
                return self._select(expression, state)
            case Cast():
                return self._cast(expression, state)
            case Call():
                result = self.call(expression, state)
                if isinstance(result, Pointer) and self.gives_place(expression):
                    return self.load(result.spot, expression.place, state)
                return result
            case Build():
                return self.build(expression, state)
            case Items():
                return self._items(expression, state)
            case Opaque(reason="a concatenation", parts=(high, low)) if isinstance(bare(low.type), IntType):
                low_type = bare(low.type)
                assert isinstance(low_type, IntType)
                low_form = mask(self.number(low, state), low_type.bits)
                return Number(self.number(high, state) * (1 << low_type.bits) + low_form)
            case Opaque(reason=reason, parts=parts, place=place):
                made_of = [self.number(part, state) for part in parts]
                return self.lost(reason, place, *made_of)

    def frame_this(self) -> Spot:
        """The object that the method around works on."""
        frame = self.frame
        while frame.this is None and frame.outer is not None:
            frame = frame.outer
        return frame.this if frame.this is not None else LostSpot("an object that is not known")

    def _peek(self, spot: Spot, state: State, place: Place) -> Value:
        """What was just stored, without a load being recorded."""
        if isinstance(spot, LocalSpot):
            found = state.read(spot, place)
            return found if found is not None else NOTHING
        return self._stored

    _stored: Value = NOTHING

    def temporary(self, value: Value, kind: Type, state: State) -> Spot:
        """Somewhere for a value that lies nowhere (a returned record, a vector), so that its parts can be had."""
        if isinstance(value, Pointer):
            return value.spot
        root: Root = ("a temporary", next(self._activations))
        self.types[root] = kind
        state.cells[root] = {}
        spot = LocalSpot(root, (), kind)
        written, state.written = state.written, None
        state.write(spot, value)
        state.written = written
        return spot

    def _closure(self, expression: FunctionName, state: State) -> Value:
        roots: dict[str, Root] = {}
        values: dict[str, Value] = {}
        for key, by_reference in expression.captures:
            root = self.root(key)
            cells = state.cells.get(root)
            if by_reference or isinstance(
                bare(self.types.get(root, RealType(0, 0))), ArrayType | StreamType | RecordType
            ):
                roots[key] = root
            elif cells is not None and () in cells:
                values[key] = cells[()]
            else:
                roots[key] = root
        return Closure(expression.key, roots, values, self.frame.this)

    def _bits(self, expression: Bits, state: State) -> Value:
        high = self.number(expression.high, state) if expression.high is not None else None
        low = self.number(expression.low, state) if expression.low is not None else None
        spot = self.spot(expression.base, state)
        if isinstance(spot, MemorySpot):
            spot = _bits_of(spot, high, low)
        whole = (
            self.load(spot, expression.base.place, state) if spot is not None else self.value(expression.base, state)
        )
        if not isinstance(whole, Number):
            return self.lost("bits of something that is no integer", expression.place)
        return Number(bit_range(whole.form, high, low))

    def _unary(self, expression: Unary, state: State) -> Value:
        match expression.op:
            case "&":
                spot = self.spot(expression.operand, state)
                return Pointer(spot) if spot is not None else self.value(expression.operand, state)
            case "*":
                spot = self.spot(expression, state)
                assert spot is not None
                return self.load(spot, expression.place, state)
            case "!":
                return Number(negation(self.condition(expression.operand, state)))
        form = self.number(expression.operand, state)
        if isinstance(bare(expression.type), RealType):
            return Number(depending(form))
        match expression.op:
            case "-":
                return Number(-form)
            case "~":
                return Number(inverted(form, bare(expression.type)))
        return Number(form)

    def _step(self, by: int, prefix: bool, operand: Expression, place: Place, state: State) -> Value:
        spot = self.spot(operand, state)
        if spot is None:
            return self.value(operand, state)
        old = self.load(spot, operand.place, state)
        kind = bare(operand.type)
        new: Value
        if isinstance(old, Pointer):
            pointee = kind.to if isinstance(kind, PointerType) else kind
            new = Pointer(shifted(old.spot, number(by), pointee))
        elif isinstance(old, Number):
            new = Number(depending(old.form)) if isinstance(kind, RealType) else Number(fitted(old.form + by, kind))
        else:
            new = old
        self.store(spot, new, operand.place, state)
        return new if prefix else old

    def _binary(self, expression: Binary, state: State) -> Value:
        op = expression.op
        if op in ("&&", "||"):
            return self._short_circuit(expression, state)
        left, right = self.value(expression.left, state), self.value(expression.right, state)
        return self.combined(
            op, left, right, expression.type, expression.left.type, expression.right.type, expression.place
        )

    def combined(
        self, op: str, left: Value, right: Value, kind: Type, left_type: Type, right_type: Type, place: Place
    ) -> Value:
        """``left op right`` on values."""
        kind = bare(kind)
        if op == ",":
            return right
        if isinstance(left, Pointer) and isinstance(right, Pointer):
            return self._pointers(op, left.spot, right.spot, left_type)
        if isinstance(left, Pointer) or isinstance(right, Pointer):
            pointer, other = (left, right) if isinstance(left, Pointer) else (right, left)
            assert isinstance(pointer, Pointer)
            if op in ("+", "-") and isinstance(other, Number):
                pointer_type = bare(left_type if isinstance(left, Pointer) else right_type)
                pointee = pointer_type.to if isinstance(pointer_type, PointerType) else (
                    pointer_type.element if isinstance(pointer_type, ArrayType) else pointer_type
                )  # fmt: skip
                return Pointer(shifted(pointer.spot, other.form if op == "+" else -other.form, pointee))
            if op in ("==", "!=") and isinstance(other, Number) and other.form.known == 0:
                return Number(negation(pointer.valid) if op == "==" else pointer.valid)
            return self.lost("arithmetic on a pointer", place)
        a, b = self._form_of(left), self._form_of(right)
        if isinstance(kind, RealType):
            return Number(depending(a, b))
        if isinstance(bare(left_type), RealType) or isinstance(bare(right_type), RealType):
            return Number(depending(a, b))
        result = binary(op, a, b, kind)
        if op in ("+", "-", "*", "<<") and isinstance(kind, IntType):
            result = fitted(result, kind)
        return Number(result)

    def _form_of(self, value: Value) -> Form:
        match value:
            case Number(form):
                return form
            case Record(parts):
                return depending(*(part.form for part in parts.values() if isinstance(part, Number)))
            case _:
                return ONE

    def _pointers(self, op: str, left: Spot, right: Spot, left_type: Type) -> Value:
        if isinstance(left, MemorySpot) and isinstance(right, MemorySpot) and left.argument == right.argument:
            kind = bare(left_type)
            if op == "-":
                size = kind.to.bytes if isinstance(kind, PointerType) else left.unit_bytes
                return Number(div(left.offset - right.offset, number(size or 1)))
            return Number(binary(op, left.offset, right.offset, kind))
        if isinstance(left, LocalSpot) and isinstance(right, LocalSpot) and left.root == right.root and left.path:
            a, b = left.path[-1], right.path[-1]
            if isinstance(a, Form) and isinstance(b, Form) and left.path[:-1] == right.path[:-1]:
                return Number(binary(op, a, b, bare(left_type)))
        if (
            op in ("==", "!=")
            and isinstance(left, MemorySpot | LocalSpot)
            and isinstance(right, MemorySpot | LocalSpot)
        ):
            return Number(ZERO if op == "==" else ONE)
        return Number(depending())

    def _short_circuit(self, expression: Binary, state: State) -> Value:
        left = self.condition(expression.left, state)
        stop = expression.op == "||"
        if left.known is not None and not self.scouting:
            if bool(left.known) == stop:
                return Number(ONE if stop else ZERO)
            return Number(self.condition(expression.right, state))
        goes = negation(left) if stop else left
        branch = state.under(goes, expression.left.place, self.open)
        right = self.condition(expression.right, branch)
        skips = state.under(negation(goes), expression.left.place, self.open)
        meets = joined(branch, skips, expression.place)
        guards = state.guards
        if meets is not None:
            state.become(meets)
            state.guards = guards
        return Number(binary(expression.op, left, right, expression.type))

    def _select(self, expression: Select, state: State) -> Value:
        condition = self.condition(expression.condition, state)
        if condition.known is not None and not self.scouting:
            return self.value(expression.yes if condition.known else expression.no, state)
        place = expression.condition.place
        guards = state.guards
        yes_state = state.under(condition, place, self.open)
        yes = self.value(expression.yes, yes_state)
        no_state = state.under(negation(condition), place, self.open)
        no = self.value(expression.no, no_state)
        meets = joined(yes_state, no_state, place)
        if meets is not None:
            state.become(meets)
            state.guards = guards
        if condition.known is not None:
            return yes if condition.known else no
        if isinstance(bare(expression.type), RealType):
            return Number(depending(condition, self._form_of(yes), self._form_of(no)))
        return choose(condition, yes, no, place)

    def _cast(self, expression: Cast, state: State) -> Value:
        value = self.value(expression.operand, state)
        return self.converted(value, bare(expression.type), bare(expression.operand.type))

    def converted(self, value: Value, kind: Type, before: Type) -> Value:
        """The value as type ``kind``."""
        if isinstance(value, Pointer) and isinstance(kind, PointerType):
            return Pointer(recast(value.spot, kind.to))
        if isinstance(value, Number):
            if isinstance(kind, IntType):
                return Number(depending(value.form) if isinstance(before, RealType) else fitted(value.form, kind))
            if isinstance(kind, RealType):
                return Number(depending(value.form))
        return value

    def _items(self, expression: Items, state: State) -> Value:
        kind = bare(expression.type)
        parts: dict[Path, Value] = {}
        if isinstance(kind, RecordType):
            names = [field.name for field in kind.fields]
            for name, item in zip(names, expression.items, strict=False):
                _put(parts, (name,), self.initial(item, state))
            for field in kind.fields[len(expression.items) :]:
                if isinstance(field.type, IntType):
                    parts[(field.name,)] = NOTHING
            return Record(parts)
        if len(expression.items) == 1 and not isinstance(kind, ArrayType | VectorType):
            return self.value(expression.items[0], state)
        for at, item in enumerate(expression.items[:SETTABLE]):
            _put(parts, (number(at),), self.initial(item, state))
        if isinstance(kind, ArrayType) and kind.count and kind.count <= SETTABLE and isinstance(kind.element, IntType):
            for at in range(len(expression.items), kind.count):
                parts[(number(at),)] = NOTHING
        return Record(parts)

    def initial(self, expression: Expression, state: State) -> Value:
        """The value of an initialiser."""
        return self.value(expression, state)

    # ------------------------------------------------------------------------------------------------ places

    def spot(self, expression: Expression, state: State) -> Spot | None:
        """Where the expression lies; None when it is a mere value."""
        match expression:
            case Name(key=key):
                return self._name_spot(key, expression.type, state)
            case This():
                return None
            case Unary(op="*", operand=operand):
                return self._pointee(operand, ZERO, expression.type, state)
            case Index(base=base, index=index):
                at = self.number(index, state)
                return self._subscript(base, at, expression, state)
            case Member(base=base, field=name):
                whole = self.spot(base, state)
                if whole is None:
                    whole = self.temporary(self.value(base, state), bare(base.type), state)
                spot = member(whole, name, expression.type)
                return self._through_reference(spot, expression.type, state, expression.place)
            case Cast(operand=operand, type=kind):
                inner = self.spot(operand, state) if isinstance(bare(kind), type(bare(operand.type))) else None
                return inner
            case Assign():
                result = self.assign(expression, state)
                return result if isinstance(result, PLACES) else None
            case Step(by=by, prefix=True, operand=operand, place=place):
                self._step(by, True, operand, place, state)
                return self.spot(operand, state)
            case Select(condition=condition, yes=yes, no=no):
                return self._picked_spot(condition, yes, no, state) if self._lies(yes) and self._lies(no) else None
            case Call():
                if self.gives_place(expression):
                    value = self.call(expression, state)
                    return value.spot if isinstance(value, Pointer) else None
                return None
            case Binary(op=",", left=left, right=right):
                self.value(left, state)
                return self.spot(right, state)
            case _:
                return None

    def _lies(self, expression: Expression) -> bool:
        """Whether the expression names a place, by its shape: nothing is evaluated."""
        match expression:
            case Name() | Index() | Member() | Unary(op="*") | Assign() | Step(prefix=True):
                return True
            case Select(yes=yes, no=no):
                return self._lies(yes) and self._lies(no)
            case Call():
                return self.gives_place(expression)
            case _:
                return False

    def _picked_spot(self, condition: Expression, yes: Expression, no: Expression, state: State) -> Spot | None:
        decided = self.condition(condition, state)
        if decided.known is not None:
            return self.spot(yes if decided.known else no, state)
        guards = state.guards
        yes_state = state.under(decided, condition.place, self.open)
        no_state = state.under(negation(decided), condition.place, self.open)
        a, b = self.spot(yes, yes_state), self.spot(no, no_state)
        meets = joined(yes_state, no_state, condition.place)
        if meets is not None:
            state.become(meets)
            state.guards = guards
        return choose_spot(decided, a, b, condition.place) if a is not None and b is not None else None

    def gives_place(self, expression: Call) -> bool:
        """Whether a call's result is a place and no value: a reference."""
        function = self.program.functions.get(expression.function) if expression.function else None
        return isinstance(expression.type, ReferenceType) or (
            function is not None and isinstance(function.result, ReferenceType)
        )

    def _name_spot(self, key: str, kind: Type, state: State) -> Spot:
        root = self.root(key)
        declared = self.types.get(root, kind)
        if root[1] == 0 and not self.scouting and self.names.get(root) in self.arguments:
            self.touched.add(self.names[root])
        if root[1] == 0 and root not in state.cells and key in self.program.globals:
            self.define_global(key, state)
        spot = LocalSpot(root, (), kind if isinstance(declared, ReferenceType) else declared)
        if isinstance(declared, ReferenceType):
            held = state.cells.get(root, {}).get(())
            if isinstance(held, Pointer):
                return _typed(held.spot, bare(declared))
            if held is None:
                return LocalSpot(root, (), bare(declared))
        return _typed(spot, bare(declared))

    def define_global(self, key: str, state: State) -> None:
        """A global comes into being when it is first used."""
        variable = self.program.globals[key]
        root = (key, 0)
        self.types[root] = variable.type
        self.names[root] = variable.name
        state.cells[root] = {}
        written, state.written = state.written, None
        if variable.initial is not None:
            self._fill(root, variable.type, self.initial(variable.initial, state), state)
        elif isinstance(bare(variable.type), IntType):
            self._fill(root, variable.type, Number(symbol_form(self.size_named(variable.name))), state)
        state.written = written

    def _fill(self, root: Root, kind: Type, value: Value, state: State) -> None:
        if isinstance(value, Number) and isinstance(kind, ArrayType):
            return
        state.write(LocalSpot(root, (), bare(kind)), value)

    def _through_reference(self, spot: Spot, kind: Type, state: State, place: Place) -> Spot:
        """A reference member stands for what it is bound to."""
        if isinstance(kind, ReferenceType) and isinstance(spot, LocalSpot):
            held = state.read(spot, place)
            if isinstance(held, Pointer):
                return held.spot
        if isinstance(spot, LocalSpot):
            held = state.cells.get(spot.root, {}).get(spot.path)
            if isinstance(held, Pointer) and not isinstance(bare(kind), PointerType | BurstPointerType | ArrayType):
                return held.spot
        return spot

    def _pointee(self, pointer: Expression, by: Form, kind: Type, state: State) -> Spot:
        value = self.value(pointer, state)
        if isinstance(value, Pointer):
            return _typed(shifted(value.spot, by, kind), kind)
        if isinstance(value, Record):
            return LostSpot("an object used as a pointer", by)
        return LostSpot("a pointer whose target is not known", value.form if isinstance(value, Number) else ZERO)

    def _subscript(self, base: Expression, at: Form, expression: Index, state: State) -> Spot:
        kind = bare(base.type)
        if isinstance(kind, PointerType | BurstPointerType):
            return self._pointee(base, at, expression.type, state)
        whole = self.spot(base, state)
        if whole is None:
            value = self.value(base, state)
            if isinstance(value, Pointer):
                return shifted(value.spot, at, expression.type)
            whole = self.temporary(value, kind, state)
        spot = element(whole, at, expression.type)
        return self._element_reference(spot, expression.type, state)

    def _element_reference(self, spot: Spot, kind: Type, state: State) -> Spot:
        """An element that is itself bound to something else (an array of references to streams)."""
        if isinstance(spot, LocalSpot) and isinstance(bare(kind), StreamType | RecordType):
            held = state.cells.get(spot.root, {}).get(spot.path)
            if isinstance(held, Pointer):
                return held.spot
        return spot

    # ----------------------------------------------------------------------------------------- assignments

    def assign(self, expression: Assign, state: State) -> Spot | Value:
        """Carries out an assignment; gives the target's spot."""
        target = expression.target
        if isinstance(target, Bits):
            return self._assign_bits(target, expression, state)
        value = self.initial(expression.value, state)
        spot = self.spot(target, state)
        if spot is None:
            self.value(target, state)
            return value
        if expression.op:
            old = self.load(spot, target.place, state)
            value = self.combined(
                expression.op, old, value, target.type, target.type, expression.value.type, expression.place
            )
        value = self.converted(value, bare(target.type), bare(expression.value.type))
        self._stored = value
        self.store(spot, value, target.place, state)
        return spot

    def _assign_bits(self, target: Bits, expression: Assign, state: State) -> Spot | Value:
        value = self.value(expression.value, state)
        high = self.number(target.high, state) if target.high is not None else None
        low = self.number(target.low, state) if target.low is not None else None
        spot = self.spot(target.base, state)
        form = self._form_of(value)
        if isinstance(spot, LocalSpot):
            old = state.read(spot, target.place)
            before = self._form_of(old) if old is not None else ZERO
            state.write(spot, Number(_with_bits(before, form, high, low)))
            return spot
        if isinstance(spot, MemorySpot):
            spot = _bits_of(spot, high, low)
        if spot is not None:
            self.store(spot, value, target.base.place, state)
            self._stored = value
            return spot
        return value

    def declare(self, variable: Variable, state: State) -> None:
        frame = self.frame
        root: Root = (variable.key, 0 if variable.scope in ("static", "global") else frame.activation)
        frame.roots[variable.key] = root
        kind = variable.type
        self.types[root] = kind
        self.names[root] = variable.name
        self.note_stream(variable)
        if variable.scope == "static":
            self.statics[root] = variable
            if root in state.cells:
                return
        state.forget(root)
        if state.written is not None:
            state.written.add((root, ()))
        state.cells[root] = {}
        if variable.initial is None:
            if variable.scope == "static" and isinstance(kind, IntType):
                self._fill(root, kind, NOTHING, state)
            return
        if isinstance(kind, ReferenceType):
            spot = self.spot(variable.initial, state)
            if spot is not None:
                state.write(LocalSpot(root, (), kind), Pointer(spot))
                return
        value = self.initial(variable.initial, state)
        if isinstance(kind, ReferenceType):
            self.types[root] = bare(kind)
        value = self.converted(value, bare(kind), bare(variable.initial.type))
        if isinstance(value, Number):
            value = self._given(variable.name, value)
            value = Number(fitted(value.form, bare(kind)))
        self._fill(root, kind, value, state)

    def size_named(self, name: str) -> Symbol:
        """A constant whose value is not in the source: a size that the user can give."""
        if name not in self.given_used:
            size = self.given.get(name)
            self.given_used[name] = parameter(name, 0 if size is None else size, size)
        return self.given_used[name]

    def _given(self, name: str, value: Number) -> Number:
        """A size that the user has given stands for a value that the source does not tell."""
        if name not in self.given or value.form.known is not None:
            return value
        if not any(symbol.kind in ("data", "unknown") for symbol in value.form.leaves()):
            return value
        return Number(symbol_form(self.size_named(name)))

    def note_stream(self, variable: Variable) -> None:
        """A declared FIFO, or array of FIFOs, is remembered."""

    # -------------------------------------------------------------------------------- provided by the next part

    def call(self, expression: Call, state: State) -> Value:
        """What a call gives."""
        raise NotImplementedError

    def build(self, expression: Build, state: State) -> Value:
        """A constructed value."""
        raise NotImplementedError


PLACES = (MemorySpot, LocalSpot, ChoiceSpot, LostSpot)


def _typed(spot: Spot, kind: Type) -> Spot:
    """A local spot with the type that the expression says it has."""
    if isinstance(spot, LocalSpot) and spot.type != kind:
        return LocalSpot(spot.root, spot.path, kind)
    return spot


def _put(parts: dict[Path, Value], path: Path, value: Value) -> None:
    if isinstance(value, Record):
        for rest, part in value.parts.items():
            parts[(*path, *rest)] = part
    else:
        parts[path] = value


def _with_bits(whole: Form, part: Form, high: Form | None, low: Form | None) -> Form:
    """``whole`` with bits ``high`` to ``low`` set to ``part``; only what it depends on, where data is in it anyway."""
    at = low.known if low is not None else None
    width = (high - low).known if high is not None and low is not None else None
    drawn = any(symbol.kind in ("data", "unknown") for symbol in whole.leaves() | part.leaves())
    if at is None or width is None or width < 0 or at > 1024 or drawn:
        return depending(whole, part)
    return whole + (mask(part, width + 1) - bit_range(whole, high, low)) * (1 << at)


def _bits_of(spot: MemorySpot, high: Form | None, low: Form | None) -> MemorySpot:
    """A bit range of an element in memory."""
    width = (high - low).known if high is not None and low is not None else None
    part = max(1, -(-(width + 1) // 8)) if width is not None and width >= 0 else None
    if part is not None and part >= spot.unit_bytes:
        part = None
    return MemorySpot(spot.argument, spot.offset, spot.unit_bytes, spot.type, part, "bits")
