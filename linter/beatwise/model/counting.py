"""Counters: variables that only lead on by numbers, whoever decides whether they do."""

from __future__ import annotations

from beatwise.model.form import COUNT, Form, Symbol, symbol_form


def only_counts(step: Form, symbol: Symbol) -> bool:
    """Whether ``symbol`` becomes itself plus a number or a count, or a number to start from anew, on every branch.

    Data may decide which branch it is: ``if (x > limit) out[n++] = x`` still fills ``out`` in order.
    """
    if len(step.terms) == 1:
        (only,) = step.symbols() or (symbol,)
        if only.kind == "operation" and only.name == "select" and step == symbol_form(only):
            return all(only_counts(arm, symbol) for arm in only.operands[1:])
    moved = [s for s in (step - symbol_form(symbol)).symbols() if not _leads_on(s, symbol)]
    anew = [s for s in step.symbols() if not _leads_on(s, symbol)]
    return not moved or not anew


def _leads_on(part: Symbol, symbol: Symbol) -> bool:
    """Whether a term of the step is no data: a count (also of the variable in an inner loop), a counter, a size."""
    if part == symbol:
        return False
    if part.kind == "operation":
        leaves = {leaf for operand in part.operands for leaf in operand.leaves()}
        return not any(leaf.kind in ("data", "unknown", "carried") and leaf.reason != COUNT for leaf in leaves)
    return part.reason == COUNT or part.kind in ("counter", "parameter")
