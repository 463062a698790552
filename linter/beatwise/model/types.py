"""The types of a kernel, by the width that hardware gives them.

Sizes are in bytes, as a value lies in memory behind a port: an integer of 512 bits is 64 bytes, one of 24 bits is 4
(rounded up to a power of two), a vector is its lanes, a record its size with padding unless packed.
"""

from __future__ import annotations

from dataclasses import dataclass


@dataclass(frozen=True, slots=True)
class VoidType:
    """No value."""

    bytes: int = 0


@dataclass(frozen=True, slots=True)
class IntType:
    """An integer of ``bits``: the built-in ones, enumerations, bool, and arbitrary-precision integers."""

    bits: int
    signed: bool
    bytes: int


@dataclass(frozen=True, slots=True)
class RealType:
    """A floating- or fixed-point number; its value is never followed, only what it depends on."""

    bits: int
    bytes: int


@dataclass(frozen=True, slots=True)
class PointerType:
    """A pointer, or an array parameter (which C++ makes a pointer)."""

    to: Type
    volatile: bool = False
    bytes: int = 8
    constant: bool = False  #: what it points to can't be written through it


@dataclass(frozen=True, slots=True)
class ReferenceType:
    """A reference; the tracer binds it to the place it names."""

    to: Type
    bytes: int = 8


@dataclass(frozen=True, slots=True)
class ArrayType:
    """An array; ``count`` is None where the bound is not written or not known."""

    element: Type
    count: int | None

    @property
    def bytes(self) -> int:
        """All elements; 0 where the count is not known."""
        return self.element.bytes * (self.count or 0)


@dataclass(frozen=True, slots=True)
class Field:
    """A member of a record, ``offset`` bytes from its start."""

    name: str
    type: Type
    offset: int


@dataclass(frozen=True, slots=True)
class RecordType:
    """A struct, class or union. ``key`` is unique per definition (its USR); ``bytes`` counts padding."""

    key: str
    name: str
    bytes: int
    fields: tuple[Field, ...]
    bases: tuple[RecordType, ...] = ()


@dataclass(frozen=True, slots=True)
class VectorType:
    """A vector of ``lanes`` elements that moves as one value."""

    element: Type
    lanes: int
    bytes: int


@dataclass(frozen=True, slots=True)
class StreamType:
    """A FIFO of ``element``; ``depth`` where the type itself says it (a template argument), else None."""

    element: Type
    depth: int | None = None
    bytes: int = 0


@dataclass(frozen=True, slots=True)
class BurstPointerType:
    """A pointer that is used through explicit burst requests (read_request, read, write_request, write, ...)."""

    to: Type
    bytes: int = 8


@dataclass(frozen=True, slots=True)
class CallableType:
    """A function, a function pointer or a lambda."""

    bytes: int = 8


@dataclass(frozen=True, slots=True)
class UnknownType:
    """A type that could not be had, with its spelling; ``bytes`` is 0."""

    name: str
    bytes: int = 0


Type = (
    VoidType
    | IntType
    | RealType
    | PointerType
    | ReferenceType
    | ArrayType
    | RecordType
    | VectorType
    | StreamType
    | BurstPointerType
    | CallableType
    | UnknownType
)
