"""The top function's arguments: which are AXI master ports, and with what options."""

from __future__ import annotations

from beatwise.model.access import Interface
from beatwise.model.kernel import Directive, Function, Variable
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
from beatwise.trace.machine import Argument

MASTER = "m_axi"


def interfaces_of(function: Function) -> tuple[tuple[Interface, ...], dict[str, Argument]]:
    """The ports, in the order of the arguments, and the arguments that reach them."""
    ports: dict[str, list[tuple[Variable, Directive | None]]] = {}
    arguments: dict[str, Argument] = {}
    config = [d for d in function.directives if d.kind == "config_interface"]
    for parameter in function.parameters:
        if not is_memory(parameter.type):
            continue
        modes = [d for d in function.directives if d.kind == "interface" and _names(d, parameter.name)]
        master = next((d for d in modes if d.options.get("mode", "").lower() == MASTER), None)
        if master is None and any(_other_memory(d) for d in modes):
            continue
        bundle = (master.options.get("bundle") if master is not None else None) or parameter.name
        ports.setdefault(bundle, []).append((parameter, master))
        arguments[parameter.name] = Argument(
            parameter.name,
            bundle,
            is_volatile(parameter.type),
            element_type(parameter.type).bytes or 1,
            _array_bytes(parameter.type, master),
        )
    return tuple(_port(name, members, config) for name, members in ports.items()), arguments


def is_memory(kind: Type) -> bool:
    """Whether an argument of this type is memory (a pointer, an array) and not a scalar or a stream."""
    while isinstance(kind, ReferenceType):
        kind = kind.to
    if isinstance(kind, BurstPointerType):
        return True
    if isinstance(kind, PointerType):
        inner: Type = kind.to
        while isinstance(inner, ArrayType):
            inner = inner.element
        return not isinstance(inner, StreamType)
    if isinstance(kind, ArrayType):
        inner = kind
        while isinstance(inner, ArrayType):
            inner = inner.element
        return isinstance(inner, IntType | RealType | RecordType | VectorType)
    return False


def is_volatile(kind: Type) -> bool:
    """Whether what the argument points to is volatile."""
    return isinstance(kind, PointerType) and kind.volatile


def element_type(kind: Type) -> Type:
    """What the argument points to, behind all array dimensions."""
    while isinstance(kind, ReferenceType | PointerType | BurstPointerType):
        kind = kind.to
    while isinstance(kind, ArrayType):
        kind = kind.element
    return kind


def _names(directive: Directive, argument: str) -> bool:
    return directive.options.get("port", "").strip() == argument


def _other_memory(directive: Directive) -> bool:
    mode = directive.options.get("mode", "").lower()
    return mode not in ("", MASTER, "s_axilite")


def _array_bytes(kind: Type, master: Directive | None) -> int | None:
    depth = master.number("depth") if master is not None else None
    if isinstance(kind, ArrayType) and kind.bytes:
        return kind.bytes
    return depth * element_type(kind).bytes if depth else None


def _port(name: str, members: list[tuple[Variable, Directive | None]], config: list[Directive]) -> Interface:
    def option(*keys: str) -> int | None:
        for _, directive in members:
            for key in keys:
                value = directive.number(key) if directive is not None else None
                if value is not None:
                    return value
        for directive in config:
            for key in keys:
                value = directive.number(f"m_axi_{key}")
                if value is not None:
                    return value
        return None

    return Interface(
        name=name,
        arguments=tuple(parameter.name for parameter, _ in members),
        place=members[0][1].place if members[0][1] is not None else members[0][0].place,
        declared=members[0][1] is not None,
        element_bytes={parameter.name: element_type(parameter.type).bytes for parameter, _ in members},
        read_burst=option("max_read_burst_length"),
        write_burst=option("max_write_burst_length"),
        read_outstanding=option("num_read_outstanding"),
        write_outstanding=option("num_write_outstanding"),
        latency_cycles=option("latency"),
        widen_bits=option("max_widen_bitwidth"),
    )
