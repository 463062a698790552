"""Arguments that a directive aggregates: their records lie in memory without padding."""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from dataclasses import replace

from beatwise.model.access import Access
from beatwise.model.form import Form
from beatwise.model.kernel import Function
from beatwise.model.types import ArrayType, IntType, RealType, RecordType, Type, VectorType
from beatwise.trace.interfaces import element_type


def aggregated_bytes(function: Function) -> dict[str, tuple[int, int]]:
    """For each aggregated argument, the bytes of its record with and without padding.

    ``compact=none`` keeps the padding, ``compact=byte`` rounds each field up to bytes; else bits stand side by side.
    """
    found: dict[str, tuple[int, int]] = {}
    records = {parameter.name: element_type(parameter.type) for parameter in function.parameters}
    for directive in function.directives:
        name, compact = directive.options.get("variable", "").strip(), directive.options.get("compact", "bit").lower()
        record = records.get(name)
        if directive.kind == "aggregate" and isinstance(record, RecordType) and compact != "none":
            whole = -(-_bits(record, 8 if compact == "byte" else 1) // 8)
            if 0 < whole < record.bytes:
                found[name] = record.bytes, whole
    return found


def without_padding(accesses: Sequence[Access], sizes: Mapping[str, tuple[int, int]]) -> tuple[Access, ...]:
    """The accesses, those to whole records of aggregated arguments counted by the records' bytes without padding."""
    return tuple(
        _packed(access, *sizes[access.argument]) if access.argument in sizes else access for access in accesses
    )


def _packed(access: Access, padded: int, packed: int) -> Access:
    if access.element_bytes != padded or any(factor % padded for factor in access.offset.terms.values()):
        return access
    offset = Form({monomial: factor // padded * packed for monomial, factor in access.offset.terms.items()})
    return replace(access, element_bytes=packed, part_bytes=min(access.part_bytes, packed), offset=offset)


def _bits(kind: Type, unit: int) -> int:
    """Bits of a value, each scalar rounded up to a multiple of ``unit``."""
    match kind:
        case RecordType(fields=fields):
            return sum(_bits(field.type, unit) for field in fields)
        case ArrayType(element=element, count=count):
            return _bits(element, unit) * (count or 0)
        case VectorType(element=element, lanes=lanes):
            return _bits(element, unit) * lanes
        case IntType(bits=bits) | RealType(bits=bits):
            return -(-bits // unit) * unit
        case _:
            return kind.bytes * 8
