"""What a form comes to, the slow, obvious way: every operation as a plain integer function."""

from __future__ import annotations

from typing import TYPE_CHECKING

if TYPE_CHECKING:
    from collections.abc import Callable

    from beatwise.model.form import Form, Symbol


def evaluate(form: Form, value_of: Callable[[Symbol], int], memo: dict[Symbol, int] | None = None) -> int:
    """The form's value; ``value_of`` gives each symbol that is no operation, once if ``memo`` is given."""
    memo = {} if memo is None else memo
    total = 0
    for monomial, factor in form.terms.items():
        product = factor
        for symbol in monomial:
            if symbol not in memo:
                memo[symbol] = _value(symbol, value_of, memo)
            product *= memo[symbol]
        total += product
    return total


def _value(symbol: Symbol, value_of: Callable[[Symbol], int], memo: dict[Symbol, int]) -> int:
    if symbol.kind != "operation":
        return value_of(symbol)
    return applied(symbol.name, [evaluate(operand, value_of, memo) for operand in symbol.operands], symbol.table)


def applied(name: str, values: list[int], table: tuple[int, ...] = ()) -> int:
    """The operation on plain numbers, as C++ or its name defines it; by 0 is 0, and so is what lies outside a table."""
    first, second = values[0], values[1] if len(values) > 1 else 0
    match name:
        case "lt":
            return int(first < second)
        case "eq":
            return int(first == second)
        case "ne":
            return int(first != second)
        case "not":
            return int(first == 0)
        case "and?":
            return int(first != 0 and second != 0)
        case "or?":
            return int(first != 0 or second != 0)
        case "select":
            return values[1] if first else values[2]
        case "min":
            return first if first < second else second
        case "max":
            return second if first < second else first
        case "floordiv":
            return first // second if second else 0
        case "div":
            return quotient(first, second)
        case "wrap":
            return wrapped(first, second, bool(values[2]))
        case "and":
            return first & second
        case "or":
            return first | second
        case "xor":
            return first ^ second
        case "shl":
            return first * 2**second if 0 <= second < 512 else 0
        case "shr":
            return first // 2**second if second >= 0 else 0
        case "lookup":
            return table[first] if 0 <= first < len(table) else 0
    raise ValueError(f"no operation is called {name}")


def quotient(value: int, by: int) -> int:
    """As in C++: toward zero."""
    if by == 0:
        return 0
    sign = 1 if (value < 0) == (by < 0) else -1
    return sign * (abs(value) // abs(by))


def wrapped(value: int, bits: int, signed: bool) -> int:
    """What an integer of ``bits`` holds after the value is stored in it."""
    kept = value % (1 << bits)
    return kept - (1 << bits) if signed and kept >= 1 << bits - 1 else kept
