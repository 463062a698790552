"""What an expression can be while a kernel is followed (a number, a pointer, a record, a function) and where it lies.

A *spot* is a place that can be loaded from or stored to: in the memory behind an interface (``MemorySpot``), in an
on-chip variable (``LocalSpot``), one of several picked by a condition (``ChoiceSpot``), or lost (``LostSpot``).
"""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass, replace

from beatwise.model.form import ONE, ZERO, Form, number, opaque, symbol_form
from beatwise.model.operations import both, equal, negation, select
from beatwise.model.place import Place
from beatwise.model.types import ArrayType, Type, UnknownType, VoidType

Root = tuple[str, int]  #: a variable: its key and the activation of its function
Path = tuple[str | Form, ...]  #: fields and subscripts, outermost first
ARMS_AT_MOST = 64
UNKNOWN_BYTES = 4  #: what an element of unknown type is taken to have; it is told where it is used


def size_of(kind: Type) -> int:
    """The bytes of an element; that of an unknown type is taken for granted."""
    return kind.bytes or (UNKNOWN_BYTES if isinstance(kind, UnknownType) else 0)


@dataclass(frozen=True, slots=True)
class MemorySpot:
    """``offset`` bytes into the argument, in elements of ``unit_bytes``; a part of the element where ``part_bytes``."""

    argument: str
    offset: Form
    unit_bytes: int
    type: Type
    part_bytes: int | None = None
    covers: str = ""


@dataclass(frozen=True, slots=True)
class LocalSpot:
    """On chip: a variable, or what ``path`` leads to in it. Streams and arrays of streams are found by their spot."""

    root: Root
    path: Path
    type: Type


@dataclass(frozen=True, slots=True)
class ChoiceSpot:
    """One of several spots; each arm's condition is 1 where it is the one. ``selector`` is what decides."""

    arms: tuple[tuple[Form, Spot], ...]
    selector: Form
    place: Place


@dataclass(frozen=True, slots=True)
class LostSpot:
    """Nobody knows where; ``depends`` is what the lost address was made of."""

    reason: str
    depends: Form = ZERO
    argument: str | None = None


Spot = MemorySpot | LocalSpot | ChoiceSpot | LostSpot


@dataclass(frozen=True, slots=True)
class Number:
    """Any scalar. A real number's form is opaque: only what it depends on is kept."""

    form: Form


@dataclass(frozen=True, slots=True)
class Pointer:
    """The address of a spot; also what a reference is bound to. ``valid`` is 0 where it is null instead."""

    spot: Spot
    valid: Form = ONE


@dataclass(frozen=True, slots=True)
class Record:
    """A struct or array by value: what its parts hold."""

    parts: Mapping[Path, Value]


@dataclass(frozen=True, slots=True)
class Closure:
    """A function, with the variables it has captured: by reference (a root) or by value."""

    key: str
    roots: Mapping[str, Root]
    values: Mapping[str, Value]
    receiver: Spot | None = None


Value = Number | Pointer | Record | Closure
NOTHING = Number(ZERO)


def shifted(spot: Spot, by: Form, pointee: Type) -> Spot:
    """Where a pointer to ``spot`` points after ``by`` elements of type ``pointee``."""
    match spot:
        case MemorySpot():
            if by.known == 0 and (spot.part_bytes is not None or spot.type == pointee):
                return spot
            size = size_of(pointee) or spot.unit_bytes
            return MemorySpot(spot.argument, spot.offset + by * size, size, pointee)
        case LocalSpot():
            if by.known == 0:
                return spot
            if spot.path and isinstance(spot.path[-1], Form):
                return replace(spot, path=(*spot.path[:-1], spot.path[-1] + by))
            return LostSpot("a pointer to a single variable is moved", by)
        case ChoiceSpot():
            return replace(spot, arms=tuple((c, shifted(arm, by, pointee)) for c, arm in spot.arms))
        case LostSpot():
            return replace(spot, depends=depending(spot.depends, by))


def recast(spot: Spot, pointee: Type) -> Spot:
    """The spot as a pointer cast to ``pointee`` sees it."""
    match spot:
        case MemorySpot():
            if isinstance(pointee, VoidType) or not size_of(pointee) or pointee == spot.type:
                return spot
            return MemorySpot(spot.argument, spot.offset, size_of(pointee), pointee)
        case ChoiceSpot():
            return replace(spot, arms=tuple((c, recast(arm, pointee)) for c, arm in spot.arms))
        case _:
            return spot


def element(spot: Spot, index: Form, kind: Type) -> Spot:
    """``spot[index]`` where the spot is an array or a vector; ``kind`` is the element's type."""
    match spot:
        case MemorySpot():
            if isinstance(spot.type, ArrayType) and spot.part_bytes is None:
                return MemorySpot(spot.argument, spot.offset + index * size_of(kind), size_of(kind), kind)
            return replace(spot, type=kind, part_bytes=kind.bytes, covers=f"{spot.covers}[]")
        case LocalSpot():
            return LocalSpot(spot.root, (*spot.path, index), kind)
        case ChoiceSpot():
            return replace(spot, arms=tuple((c, element(arm, index, kind)) for c, arm in spot.arms))
        case LostSpot():
            return replace(spot, depends=depending(spot.depends, index))


def member(spot: Spot, name: str, kind: Type) -> Spot:
    """``spot.name``."""
    match spot:
        case MemorySpot():
            return replace(spot, type=kind, part_bytes=kind.bytes, covers=f"{spot.covers}.{name}".lstrip("."))
        case LocalSpot():
            return LocalSpot(spot.root, (*spot.path, name), kind)
        case ChoiceSpot():
            return replace(spot, arms=tuple((c, member(arm, name, kind)) for c, arm in spot.arms))
        case LostSpot():
            return spot


def depending(*forms: Form) -> Form:
    """A form of no known value that depends on all of these."""
    return symbol_form(opaque("a real number, or another value that is not followed", forms))


def choose(condition: Form, yes: Value | None, no: Value | None, place: Place) -> Value:
    """The value after a branch: ``yes`` where the condition holds."""
    if condition.known is not None:
        chosen = yes if condition.known else no
        return NOTHING if chosen is None else chosen
    if yes is None or no is None or yes == no:
        return yes if yes is not None else no if no is not None else NOTHING
    if isinstance(yes, Number) and isinstance(no, Number):
        return Number(select(condition, yes.form, no.form))
    if isinstance(yes, Pointer) and isinstance(no, Pointer):
        return Pointer(choose_spot(condition, yes.spot, no.spot, place), select(condition, yes.valid, no.valid))
    if isinstance(yes, Record) and isinstance(no, Record):
        paths = [*yes.parts, *(path for path in no.parts if path not in yes.parts)]
        return Record({path: choose(condition, yes.parts.get(path), no.parts.get(path), place) for path in paths})
    if isinstance(yes, Pointer):  # the other is null, or lost
        return replace(yes, valid=select(condition, yes.valid, ZERO))
    if isinstance(no, Pointer):
        return replace(no, valid=select(condition, ZERO, no.valid))
    return Number(depending(condition, *(_form(value) for value in (yes, no))))


def _form(value: Value) -> Form:
    return value.form if isinstance(value, Number) else ZERO


def choose_spot(condition: Form, yes: Spot, no: Spot, place: Place) -> Spot:
    """The spot that a condition picks; two offsets into one argument are one spot with a chosen offset."""
    if isinstance(yes, MemorySpot) and isinstance(no, MemorySpot):
        same = replace(yes, offset=ZERO) == replace(no, offset=ZERO)
        if same:
            return replace(yes, offset=select(condition, yes.offset, no.offset))
    if (
        isinstance(yes, LocalSpot)
        and isinstance(no, LocalSpot)
        and yes.root == no.root
        and len(yes.path) == len(no.path)
    ):
        path = tuple(
            a if a == b else select(condition, a, b) if isinstance(a, Form) and isinstance(b, Form) else None
            for a, b in zip(yes.path, no.path, strict=True)
        )
        if None not in path:
            return replace(yes, path=tuple(part for part in path if part is not None))
    arms = [*_arms(yes, condition), *_arms(no, negation(condition))]
    if len(arms) > ARMS_AT_MOST:
        return LostSpot(f"more than {ARMS_AT_MOST} destinations", condition)
    selectors = {choice.selector for choice in (yes, no) if isinstance(choice, ChoiceSpot)}
    return ChoiceSpot(tuple(arms), _selector(condition, selectors), place)


def _arms(spot: Spot, condition: Form) -> list[tuple[Form, Spot]]:
    if isinstance(spot, ChoiceSpot):
        return [(both(condition, inner), arm) for inner, arm in spot.arms]
    return [(condition, spot)]


def _selector(condition: Form, others: set[Form]) -> Form:
    """The value that decides: the one side of a comparison that all conditions share, else the condition."""
    subject = compared(condition)
    if others and any(other != subject for other in others):
        return depending(condition, *others)
    return subject


def compared(condition: Form) -> Form:
    """``x`` of ``x == 3``; the condition itself when it is no comparison with a number."""
    symbols = condition.symbols()
    if len(condition.terms) == 1 and len(symbols) == 1:
        (symbol,) = symbols
        if symbol.kind == "operation" and symbol.name in ("eq", "ne", "lt"):
            left, right = symbol.operands
            if right.known is not None:
                return left
            if left.known is not None:
                return right
        if symbol.kind == "operation" and symbol.name == "not":
            return compared(symbol.operands[0])
    return condition


def picked(selector: Form, spots: Mapping[int, Spot], place: Place) -> Spot:
    """The spot that an index picks out of an array of pointers or streams."""
    arms = tuple((equal(selector, number(index)), spot) for index, spot in spots.items())
    arms = tuple((condition, spot) for condition, spot in arms if condition.known != 0)
    if len(arms) == 1:
        return arms[0][1]
    if not arms or len(arms) > ARMS_AT_MOST:
        return LostSpot("an index into an array of pointers that holds none there", selector)
    return ChoiceSpot(arms, selector, place)
