"""Forms as fast functions of plain numbers, for walking through a loop nest."""

from __future__ import annotations

from collections.abc import Callable

from beatwise.model.form import Form, Symbol
from beatwise.model.substitution import PLAIN

Values = dict[Symbol, int]
Compiled = Callable[[Values], int]

_INLINE = {
    "lt": "int({0} < {1})",
    "eq": "int({0} == {1})",
    "ne": "int({0} != {1})",
    "not": "int(not {0})",
    "and?": "int(bool({0}) and bool({1}))",
    "or?": "int(bool({0}) or bool({1}))",
    "select": "({1} if {0} else {2})",
    "min": "min({0}, {1})",
    "max": "max({0}, {1})",
    "floordiv": "({0} // {1} if {1} else 0)",
    "and": "({0} & {1})",
    "or": "({0} | {1})",
    "xor": "({0} ^ {1})",
}
_cache: dict[Form, Compiled] = {}


def compiled(form: Form) -> Compiled:
    """A function from the values of the form's leaves (those that are no operations) to the form's value.

    An operation may be given a value, too: it is then not computed.
    """
    found = _cache.get(form)
    if found is None:
        found = _cache[form] = _compile(form)
    return found


def _compile(form: Form) -> Compiled:
    """Straight-line Python made of numbers and positions alone: no text of the user's goes into it."""
    known = form.known
    if known is not None:
        return lambda values: known
    lines: list[str] = []
    names: dict[Symbol, str] = {}
    space: dict[str, object] = {}

    def of_form(part: Form) -> str:
        terms = []
        for monomial, factor in part.terms.items():
            factors = [of_symbol(symbol) for symbol in monomial]
            if factor != 1 or not factors:
                factors.insert(0, f"({factor})")
            terms.append("*".join(factors))
        return "(" + (" + ".join(terms) or "0") + ")"

    def of_symbol(symbol: Symbol) -> str:
        if symbol in names:
            return names[symbol]
        name = f"s{len(names)}"
        key = f"k{len(names)}"
        names[symbol] = name
        space[key] = symbol
        if symbol.kind != "operation":
            lines.append(f" {name} = v[{key}]")
            return name
        operands = [of_form(operand) for operand in symbol.operands]
        if symbol.name == "lookup":
            space[f"t{name}"] = symbol.table
            code = f"(t{name}[{operands[0]}] if 0 <= {operands[0]} < {len(symbol.table)} else 0)"
        elif symbol.name in _INLINE:
            code = _INLINE[symbol.name].format(*operands)
        else:
            space[f"f{name}"] = PLAIN[symbol.name]
            code = f"f{name}({', '.join(operands)})"
        lines.append(f" {name} = v[{key}] if {key} in v else {code}")
        return name

    result = of_form(form)
    source = "def run(v):\n" + "\n".join(lines) + f"\n return {result}\n"
    exec(compile(source, "<form>", "exec"), space)
    run = space["run"]
    assert callable(run)
    return run
