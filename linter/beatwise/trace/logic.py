"""Whether a condition always holds, whatever the tests in it come to."""

from __future__ import annotations

from collections.abc import Iterator
from itertools import product

from beatwise.model.form import Form, Symbol

CASES_AT_MOST = 2048  #: combinations that are tried; a condition with more counts as one that may fail
_CONNECTIVES = ("and?", "or?", "not", "select")
Test = tuple[Form, int | None]  #: (x, 3) is x == 3; (x, None) is x < 0


def always(condition: Form) -> bool:
    """Whether the condition is 1 for every outcome of its tests.

    Tests of one value against several constants exclude each other.

    >>> from beatwise.model.form import number, parameter, symbol_form
    >>> from beatwise.model.operations import either, equal, negation
    >>> x = symbol_form(parameter("x", 0, None))
    >>> always(either(equal(x, number(1)), negation(equal(x, number(1)))))
    True
    >>> always(either(equal(x, number(1)), equal(x, number(2))))
    False
    """
    if condition.known is not None:
        return bool(condition.known)
    tests: set[Test] = set()
    _collect(condition, tests)
    values: dict[Form, list[int]] = {}
    signs = [subject for subject, constant in tests if constant is None]
    for subject, constant in tests:
        if constant is not None:
            values.setdefault(subject, []).append(constant)
    cases = 2 ** len(signs)
    for constants in values.values():
        cases *= len(constants) + 1
    if cases > CASES_AT_MOST:
        return False
    return all(_holds(condition, outcome) for outcome in _outcomes(values, signs))


def _outcomes(values: dict[Form, list[int]], signs: list[Form]) -> Iterator[dict[Test, bool]]:
    subjects = list(values)
    for picks in product(*([*values[subject], None] for subject in subjects)):
        for negative in product((False, True), repeat=len(signs)):
            outcome: dict[Test, bool] = {(s, None): sign for s, sign in zip(signs, negative, strict=True)}
            for subject, pick in zip(subjects, picks, strict=True):
                outcome.update({(subject, constant): constant == pick for constant in values[subject]})
            yield outcome


def _test(symbol: Symbol) -> tuple[Test, bool]:
    """The test that a symbol is, and whether it is its opposite."""
    if symbol.kind == "operation" and symbol.name in ("eq", "ne"):
        gap = symbol.operands[0] - symbol.operands[1]
        subject = gap - gap.constant
        turned = _turned(subject)
        constant = gap.constant if turned else -gap.constant
        return (-subject if turned else subject, constant), symbol.name == "ne"
    if symbol.kind == "operation" and symbol.name == "lt":
        gap = symbol.operands[0] - symbol.operands[1]
        if _turned(gap):
            return (-gap - 1, None), True
        return (gap, None), False
    return (Form({(symbol,): -1}), None), False


def _turned(form: Form) -> bool:
    """Whether the term with the oldest symbol is negative: of a form and its negative exactly one is turned."""
    oldest = min((m for m in form.terms if m), key=lambda m: [s.number for s in m], default=None)
    return oldest is not None and form.terms[oldest] < 0


def _symbol(form: Form) -> Symbol | None:
    if len(form.terms) == 1:
        ((monomial, factor),) = form.terms.items()
        if factor == 1 and len(monomial) == 1:
            return monomial[0]
    return None


def _collect(form: Form, tests: set[Test]) -> None:
    if form.known is not None:
        return
    symbol = _symbol(form)
    if symbol is not None and symbol.kind == "operation" and symbol.name in _CONNECTIVES:
        for operand in symbol.operands:
            _collect(operand, tests)
    elif symbol is not None:
        tests.add(_test(symbol)[0])
    else:
        tests.add((form, 0))


def _holds(form: Form, outcome: dict[Test, bool]) -> bool:
    if form.known is not None:
        return bool(form.known)
    symbol = _symbol(form)
    if symbol is None:
        return not outcome[form, 0]
    if symbol.kind == "operation" and symbol.name in _CONNECTIVES:
        parts = (_holds(operand, outcome) for operand in symbol.operands)
        match symbol.name:
            case "and?":
                return all(parts)
            case "or?":
                return any(parts)
            case "not":
                return not next(parts)
        condition, yes, no = symbol.operands
        return _holds(yes if _holds(condition, outcome) else no, outcome)
    test, opposite = _test(symbol)
    return outcome[test] != opposite
