"""C++ integer arithmetic on forms."""

from __future__ import annotations

from collections.abc import Iterator

from beatwise.model.form import ONE, ZERO, Form, Symbol, bounds, number, operation
from beatwise.model.operations import both, div, either, equal, floordiv, less, mask, mod, negation, truth, wrap
from beatwise.model.types import IntType, Type
from beatwise.trace.values import depending


def fitted(form: Form, kind: Type) -> Form:
    """The form as a variable of type ``kind`` holds it.

    A value whose range is not known is taken to fit; one that is known to leave the type's range wraps around.
    """
    if not isinstance(kind, IntType):
        return form
    low, high = bounds(form)
    least = -(1 << kind.bits - 1) if kind.signed else 0
    most = (1 << kind.bits - 1) - 1 if kind.signed else (1 << kind.bits) - 1
    if kind.bits == 1 and not kind.signed:
        return truth(form) if low is None or high is None or low < 0 or high > 1 else form
    if kind.bits >= 32 and not kind.signed and form.known is None and (high is None or high > most):
        form = _with_small_factors(form, kind.bits)
        low, high = bounds(form)
    if kind.bits < 32 and None in (low, high) and any(symbol.kind == "carried" for symbol in _parts(form)):
        return wrap(form, kind.bits, kind.signed)  # how far a loop carries it is known only when the loop is solved
    too_high = high is not None and high > most
    too_low = low is not None and low < least and (kind.bits < 32 or (high is not None and high < least))
    if kind.bits >= 32 and too_high and not (low is not None and low > most) and form.known is None:
        return form if not _only_plain(form) else wrap(form, kind.bits, kind.signed)
    return wrap(form, kind.bits, kind.signed) if too_high or too_low else form


def _parts(form: Form) -> Iterator[Symbol]:
    """The symbols that make up the form's value, without what these depend on."""
    for symbol in form.symbols():
        if symbol.kind == "operation":
            for operand in symbol.operands:
                yield from _parts(operand)
        else:
            yield symbol


def _with_small_factors(form: Form, bits: int) -> Form:
    """The same modulo ``2**bits``: ``4294967295 * j + 1`` of 32 bits is ``1 - j``."""
    half = 1 << bits - 1
    return Form({monomial: (factor + half) % (1 << bits) - half for monomial, factor in form.terms.items()})


def _only_plain(form: Form) -> bool:
    """Whether every leaf is a loop counter, so that an overflow is a fact and not a matter of loose bounds."""
    return all(symbol.kind == "counter" for symbol in form.leaves())


def binary(op: str, left: Form, right: Form, kind: Type) -> Form:
    """``left op right``; ``kind`` is the result's type."""
    match op:
        case "+":
            return left + right
        case "-":
            return left - right
        case "*":
            return left * right
        case "/":
            return div(left, right) if right.known != 0 else ZERO
        case "%":
            return mod(left, right) if right.known != 0 else ZERO
        case "<":
            return less(left, right)
        case "<=":
            return less(left, right + 1)
        case ">":
            return less(right, left)
        case ">=":
            return less(right, left + 1)
        case "==":
            return equal(left, right)
        case "!=":
            return negation(equal(left, right))
        case "&&":
            return both(truth(left), truth(right))
        case "||":
            return either(truth(left), truth(right))
        case "<<":
            return _shifted_left(left, right)
        case ">>":
            return _shifted_right(left, right)
        case "&":
            return _and(left, right, kind)
        case "|":
            return _or(left, right)
        case "^":
            if left.known is not None and right.known is not None:
                return number(left.known ^ right.known)
            return operation("xor", left, right)
        case ",":
            return right
    return depending(left, right)


def _shifted_left(left: Form, right: Form) -> Form:
    by = right.known
    if by is not None:
        return left * (1 << by) if 0 <= by < 4096 else ZERO
    return operation("shl", left, right)


def _shifted_right(left: Form, right: Form) -> Form:
    by = right.known
    if by is not None:
        return floordiv(left, number(1 << by)) if 0 <= by < 4096 else ZERO
    if left.known is not None and left.known == 0:
        return ZERO
    return operation("shr", left, right)


def _and(left: Form, right: Form, kind: Type) -> Form:
    if left.known is not None and right.known is None:
        left, right = right, left
    bits = right.known
    if bits is None:
        return operation("and", left, right)
    if left.known is not None:
        return number(left.known & bits)
    if bits < 0 and isinstance(kind, IntType):
        inverse = ~bits
        if inverse & (inverse + 1) == 0:  # ~0b0111: rounds down
            return left - mask(left, inverse.bit_length())
    if bits >= 0:
        if bits & (bits + 1) == 0:
            return mask(left, bits.bit_length())
        if isinstance(kind, IntType) and not kind.signed:
            inverse = ((1 << kind.bits) - 1) ^ bits
            if inverse >= 0 and inverse & (inverse + 1) == 0:
                return left - mask(left, inverse.bit_length())
        low = (bits & -bits).bit_length() - 1  # 0b0111000: some bits in the middle
        field = bits >> low
        if bits and field & (field + 1) == 0:
            return mask(floordiv(left, number(1 << low)), field.bit_length()) * (1 << low)
    return operation("and", left, right)


def _or(left: Form, right: Form) -> Form:
    if left.known is not None and right.known is not None:
        return number(left.known | right.known)
    for high_part, low_part in ((left, right), (right, left)):
        low, high = bounds(low_part)
        if low is None or high is None or low < 0:
            continue
        unit = 1 << high.bit_length()
        if all(factor % unit == 0 for factor in high_part.terms.values()):
            return high_part + low_part
    return operation("or", left, right)


def inverted(form: Form, kind: Type) -> Form:
    """``~form``."""
    if isinstance(kind, IntType) and not kind.signed:
        return number((1 << kind.bits) - 1) - form
    return -form - ONE


def bit_range(form: Form, high: Form | None, low: Form | None) -> Form:
    """``form.range(high, low)``."""
    if high is None or low is None:
        return depending(form)
    width = (high - low).known
    at = low.known
    if width is None or width < 0:
        return depending(form, high, low)
    moved = floordiv(form, number(1 << at)) if at is not None and 0 <= at < 65536 else operation("shr", form, low)
    return mask(moved, width + 1)
