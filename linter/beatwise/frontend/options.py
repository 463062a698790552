"""Numbers in the options of directives: macros, constants and template parameters become their value."""

from __future__ import annotations

import ast
import re
from collections.abc import Callable
from dataclasses import replace

from beatwise.model.kernel import Directive

#: The options that are numbers; all others are words or names and stay as they are written.
NUMERIC = {
    *("depth", "latency", "ii", "factor", "dim", "min", "max", "avg", "limit", "instances", "distance"),
    *("max_read_burst_length", "max_write_burst_length", "num_read_outstanding", "num_write_outstanding"),
    *("max_widen_bitwidth", "channel", "skip", "port_width"),
}
WORD = re.compile(r"[A-Za-z_]\w*(?:\s*::\s*[A-Za-z_]\w*)*")
SUFFIX = re.compile(r"\b(0[xX][0-9a-fA-F]+|\d+)[uUlL]+\b")
CAST = re.compile(r"\(\s*(?:unsigned|int|long|short|char|size_t|u?int\d+_t|\s)+\)")
LARGEST_SHIFT = 64


def with_numbers(directive: Directive, value: Callable[[str], int | str | None]) -> Directive:
    """The directive with its numeric options worked out. ``value`` gives the number, or the text, a name stands for."""
    changed = {
        option: str(number)
        for option, text in directive.options.items()
        if option in NUMERIC and text and not text.isdigit() and (number := evaluate(text, value)) is not None
    }
    return replace(directive, options={**directive.options, **changed}) if changed else directive


def evaluate(text: str, value: Callable[[str], int | str | None], depth: int = 0) -> int | None:
    """The integer a constant expression stands for, or None.

    >>> evaluate("2 * (N + 1)", {"N": 7}.get)
    16
    """
    if depth > 16 or len(text) > 1000:
        return None
    numbers: dict[str, int] = {}

    def named(match: re.Match[str]) -> str:
        name = re.sub(r"\s", "", match[0])
        found = value(name)
        if isinstance(found, str):
            found = evaluate(found, value, depth + 1)
        if found is None:
            return name.replace("::", "__")
        numbers[name.replace("::", "__")] = found
        return name.replace("::", "__")

    plain = WORD.sub(named, SUFFIX.sub(r"\1", CAST.sub("", text)))
    try:
        return _value(ast.parse(plain.strip(), mode="eval").body, numbers)
    except (SyntaxError, ValueError, KeyError, ZeroDivisionError, RecursionError, MemoryError):
        return None


def _value(node: ast.expr, numbers: dict[str, int]) -> int:
    match node:
        case ast.Constant(value=int(number)):
            return int(number)
        case ast.Name(id=name):
            return numbers[name]
        case ast.UnaryOp(op=ast.USub(), operand=operand):
            return -_value(operand, numbers)
        case ast.UnaryOp(op=ast.UAdd(), operand=operand):
            return _value(operand, numbers)
        case ast.BinOp(left=left, op=op, right=right):
            return _combined(op, _value(left, numbers), _value(right, numbers))
        case _:
            raise ValueError("no constant expression")


def _combined(op: ast.operator, left: int, right: int) -> int:
    match op:
        case ast.Add():
            return left + right
        case ast.Sub():
            return left - right
        case ast.Mult():
            return left * right
        case ast.Div():
            return abs(left) // abs(right) * (1 if (left < 0) == (right < 0) else -1)
        case ast.Mod():
            return abs(left) % abs(right) * (-1 if left < 0 else 1)
        case ast.LShift() if 0 <= right <= LARGEST_SHIFT:
            return left << right
        case ast.RShift() if 0 <= right <= LARGEST_SHIFT:
            return left >> right
        case ast.BitOr():
            return left | right
        case ast.BitAnd():
            return left & right
        case _:
            raise ValueError("no constant expression")
