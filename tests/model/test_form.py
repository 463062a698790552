"""Forms: their algebra against plain integers, what is recognised, and that bounds hold."""

from __future__ import annotations

from collections.abc import Callable, Mapping

import pytest
from hypothesis import assume, given
from hypothesis import strategies as st

from beatwise.model import form as forms
from beatwise.model.form import (
    ONE,
    TERMS_AT_MOST,
    ZERO,
    Form,
    Symbol,
    bounds,
    number,
    operation,
    redrawn_in,
    symbol_form,
)
from beatwise.model.operations import (
    both,
    div,
    either,
    equal,
    floordiv,
    less,
    lookup,
    mask,
    maximum,
    minimum,
    mod,
    negation,
    select,
    truth,
    wrap,
)
from beatwise.model.substitution import substitute
from beatwise.traffic.compiled import compiled
from helpers.forms import applied, evaluate, quotient, wrapped
from helpers.traced import show

Values = Mapping[Symbol, int]

ROW, COLUMN = (forms.counter(name, serial) for serial, name in enumerate("ij", 1))
N = forms.parameter("n", 0, 40)
WIDE = forms.parameter("wide", None, None)
DRAWN = forms.data("mask", None, (1,), low=-8, high=7)
SYMBOLS = (ROW, COLUMN, N, WIDE, DRAWN)
i, j, n, wide, drawn = (symbol_form(symbol) for symbol in SYMBOLS)

RANGES = {ROW: (0, 30), COLUMN: (0, 30), N: (0, 40), WIDE: (-50, 50), DRAWN: (-8, 7)}
values = st.fixed_dictionaries({symbol: st.integers(*span) for symbol, span in RANGES.items()})
numbers = st.integers(-20, 20).map(number)
plain = st.one_of(st.sampled_from([i, j, n, wide, drawn]), numbers)
polynomials = st.recursive(
    plain,
    lambda inner: st.one_of(
        st.builds(lambda a, b: a + b, inner, inner),
        st.builds(lambda a, b: a - b, inner, inner),
        st.builds(lambda a, b: a * b, inner, inner),
        st.builds(lambda a, b: a * b, inner, st.integers(-9, 9)),
    ),
    max_leaves=5,
)
positive = st.integers(1, 16).map(number)
conditions = st.one_of(
    st.builds(less, polynomials, polynomials),
    st.builds(equal, polynomials, polynomials),
    st.builds(lambda a, b: negation(less(a, b)), polynomials, polynomials),
    st.builds(lambda a, b: negation(equal(a, b)), polynomials, polynomials),
)
operations = st.one_of(
    st.builds(floordiv, polynomials, positive),
    st.builds(div, polynomials, st.integers(-9, 9).filter(bool).map(number)),
    st.builds(mod, polynomials, positive),
    st.builds(mask, polynomials, st.integers(1, 6)),
    st.builds(minimum, polynomials, polynomials),
    st.builds(maximum, polynomials, polynomials),
    st.builds(select, conditions, polynomials, polynomials),
    st.builds(wrap, polynomials, st.integers(2, 9), st.booleans()),
    st.builds(lambda a, b, c: both(truth(a), either(b, c)), polynomials, conditions, conditions),
    st.builds(operation, st.sampled_from(["and", "or", "xor"]), polynomials, polynomials),
    st.builds(lambda table, at: lookup(table, mask(at, 2)), st.tuples(*[st.integers(-5, 90)] * 4), polynomials),
)
any_form = st.recursive(
    st.one_of(operations, polynomials, conditions),
    lambda inner: st.one_of(
        st.builds(lambda a, b: a + b, inner, inner),
        st.builds(lambda a, b: a * b, inner, st.integers(-4, 4)),
        st.builds(floordiv, inner, positive),
        st.builds(minimum, inner, inner),
        st.builds(lambda c, a, b: select(truth(c), a, b), inner, inner, inner),
        st.builds(lambda a: negation(truth(a)), inner),
    ),
    max_leaves=3,
)


def at(form: Form, found: Values) -> int:
    return evaluate(form, found.__getitem__)


# ------------------------------------------------------------------------------------------------------- algebra


@given(polynomials, polynomials, values)
def test_sums_differences_and_products_are_those_of_the_values(a: Form, b: Form, found: Values) -> None:
    x, y = at(a, found), at(b, found)
    assert (at(a + b, found), at(a - b, found), at(a * b, found), at(-a, found)) == (x + y, x - y, x * y, -x)


@given(polynomials, polynomials, polynomials)
def test_forms_that_are_built_from_the_same_parts_in_another_order_are_equal(a: Form, b: Form, c: Form) -> None:
    assert a + b == b + a
    assert (a + b) + c == a + (b + c)
    assert a * b == b * a
    assert a * (b + c) == a * b + a * c
    assert a - a == ZERO
    assert hash(a + b) == hash(b + a)


def test_a_form_is_shown_as_a_sum() -> None:
    assert repr(i * 4 + j * i * 2 - 1 + ZERO) == "-1 + 4*i + 2*i*j"
    assert repr(ZERO) == "0"


def test_a_polynomial_of_too_many_terms_keeps_only_what_it_depends_on() -> None:
    long = ZERO
    for serial in range(TERMS_AT_MOST + 1):
        long = long + symbol_form(forms.counter("c", serial)) * 3
    assert len(long.terms) <= 2
    assert len(long.leaves()) >= TERMS_AT_MOST
    square = sum((symbol_form(forms.counter("c", serial)) for serial in range(20)), ZERO)
    assert (square * square).leaves() >= square.leaves()


def test_the_coefficient_is_what_one_more_of_a_symbol_adds() -> None:
    form = i * j * 4 + i * n + j + 3
    assert form.coefficient(ROW) == j * 4 + n
    assert form.without(ROW) == j + 3
    assert form.coefficient(DRAWN) == ZERO


def test_what_is_not_linear_in_a_symbol_has_no_coefficient() -> None:
    assert (i * i).coefficient(ROW) is None
    assert (floordiv(i + n, number(3)) * i).coefficient(ROW) is None


def test_the_leaves_are_all_symbols_below_also_those_a_loaded_value_was_indexed_by() -> None:
    loaded = forms.data("table", None, (1,), at=i * 4, depends=frozenset({ROW}))
    form = floordiv(symbol_form(loaded) + wide, number(8))
    assert form.leaves() == {loaded, ROW, WIDE}
    assert [symbol.kind for symbol in form.symbols()] == ["operation"]
    assert redrawn_in(loaded) == {1}


# ------------------------------------------------------------------------------------------------------ division


@given(any_form, st.integers(1, 16), values)
def test_the_quotient_rounds_down(a: Form, by: int, found: Values) -> None:
    assert at(floordiv(a, number(by)), found) == at(a, found) // by


@given(any_form, st.integers(-16, 16).filter(bool), values)
def test_division_and_remainder_are_those_of_cpp(a: Form, by: int, found: Values) -> None:
    x = at(a, found)
    assert at(div(a, number(by)), found) == quotient(x, by)
    assert at(mod(a, number(by)), found) == x - by * quotient(x, by)


@given(polynomials, polynomials, values)
def test_division_by_a_form_is_that_of_cpp(a: Form, b: Form, found: Values) -> None:
    by = at(b, found)
    assume(by)
    assert at(div(a, b), found) == quotient(at(a, found), by)


@given(polynomials, st.integers(1, 16))
def test_quotient_and_remainder_rejoin(a: Form, by: int) -> None:
    assert div(a, number(by)) * by + mod(a, number(by)) == a
    assert floordiv(a, number(by)) * by + (a - floordiv(a, number(by)) * by) == a


@given(polynomials, st.integers(1, 8))
def test_bits_below_and_above_rejoin(a: Form, bits: int) -> None:
    assert floordiv(a, number(1 << bits)) * (1 << bits) + mask(a, bits) == a


def test_whole_multiples_leave_a_quotient() -> None:
    assert floordiv(i * 8 + 3, number(8)) == i
    assert floordiv(i * 8 + 11, number(8)) == i + 1
    assert show(floordiv(i * 8 + j, number(8))) == "i + (j // 8)"
    assert floordiv(floordiv(i, number(4)), number(3)) == floordiv(i, number(12))
    assert div(n * m(), m()) == n


def m() -> Form:
    """A size that is not 0."""
    return symbol_form(M)


M = forms.parameter("m", 1, None)


# ---------------------------------------------------------------------------------------------------- conditions


@given(any_form, any_form, values)
def test_comparisons_are_those_of_the_values(a: Form, b: Form, found: Values) -> None:
    x, y = at(a, found), at(b, found)
    assert at(less(a, b), found) == int(x < y)
    assert at(equal(a, b), found) == int(x == y)
    assert at(minimum(a, b), found) == min(x, y)
    assert at(maximum(a, b), found) == max(x, y)


@given(any_form, any_form, any_form, values)
def test_connectives_are_those_of_the_values(a: Form, b: Form, c: Form, found: Values) -> None:
    x, y, z = at(a, found), at(b, found), at(c, found)
    assert at(truth(a), found) == int(x != 0)
    assert at(negation(a), found) == int(x == 0)
    assert at(both(truth(a), truth(b)), found) == int(x != 0 and y != 0)
    assert at(either(truth(a), truth(b)), found) == int(x != 0 or y != 0)
    assert at(select(truth(a), b, c), found) == (y if x else z)


@given(conditions)
def test_the_opposite_of_the_opposite_is_the_condition(condition: Form) -> None:
    assert negation(negation(condition)) == condition


@given(polynomials, polynomials, st.integers(-9, 9))
def test_a_comparison_does_not_hang_on_what_is_added_to_both_sides(a: Form, b: Form, shift: int) -> None:
    assert less(a + shift, b + shift) == less(a, b)
    assert equal(a + shift, b + shift) == equal(a, b)


@pytest.mark.parametrize(
    ("chosen", "expected"),
    [
        (select(less(wide, n), wide, n), "min(wide, n)"),
        (select(less(n, wide + 1), n, wide), "min(n, wide)"),
        (select(less(wide, n), n, wide), "max(n, wide)"),
        (select(less(wide, number(8)), wide, number(7)), "min(wide, 7)"),
        (select(less(wide, number(8)), wide, number(8)), "min(wide, 8)"),
        (select(less(number(15), wide), number(15), wide), "min(15, wide)"),
        (select(less(number(15), wide), number(14), wide), "select((15 < wide), 14, wide)"),
        (select(less(wide, ZERO), ZERO, wide), "max(0, wide)"),
    ],
    ids=str,
)  # fmt: skip
def test_a_choice_of_the_lesser_or_greater_is_recognised_and_no_other(chosen: Form, expected: str) -> None:
    assert show(chosen) == expected


def test_what_the_bounds_decide_is_decided() -> None:
    off = symbol_form(forms.parameter("off", 0, 0))
    assert (truth(off), negation(off), truth(off + 1)) == (ZERO, ONE, ONE)
    assert less(i, ZERO) == ZERO
    assert less(number(-1), i) == ONE
    assert equal(n, number(41)) == ZERO
    assert minimum(n, number(40)) == n
    assert maximum(drawn, number(7)) == number(7)
    assert select(less(i, ZERO), j, n) == n
    assert both(ZERO, wide) == ZERO
    assert either(number(3), wide) == ONE


# ----------------------------------------------------------------------------------------------------------- wrap


@given(any_form, st.integers(2, 12), st.booleans(), values)
def test_wrapping_keeps_the_low_bits(a: Form, bits: int, signed: bool, found: Values) -> None:
    assert at(wrap(a, bits, signed), found) == wrapped(at(a, found), bits, signed)


def test_what_fits_is_not_wrapped() -> None:
    assert wrap(n, 6, False) == n
    assert wrap(drawn, 4, True) == drawn
    assert wrap(number(300), 8, False) == number(44)
    assert show(wrap(n, 5, False)) == "uint5(n)"


# --------------------------------------------------------------------------------------------------------- bounds


@given(any_form, values)
def test_bounds_hold(a: Form, found: Values) -> None:
    low, high = bounds(a)
    value = at(a, found)
    assert low is None or low <= value
    assert high is None or value <= high


@pytest.mark.parametrize(
    ("form", "expected"),
    [
        (i * 4 + 3, (3, None)),
        (number(5) - n, (-35, 5)),
        (n * drawn, (-320, 280)),
        (floordiv(n, number(8)), (0, 5)),
        (mask(wide, 3), (0, 7)),
        (mod(i, number(3)), (0, 2)),
        (minimum(i, number(9)), (0, 9)),
        (select(less(wide, n), drawn, n), (-8, 40)),
        (wrap(wide, 8, True), (-128, 127)),
        (operation("and", wide, n), (0, 40)),
        (lookup((5, 3, 9), i), (3, 9)),
        (wide, (None, None)),
    ],
    ids=str,
)
def test_bounds_are_as_close_as_the_operation_allows(form: Form, expected: tuple[int | None, int | None]) -> None:
    assert bounds(form) == expected


# --------------------------------------------------------------------------------------------------- substitution


@given(any_form, st.sampled_from([ROW, COLUMN, N, WIDE]), numbers, values)
def test_a_symbol_is_replaced_by_a_value(a: Form, symbol: Symbol, by: Form, found: dict[Symbol, int]) -> None:
    if by.constant < 0 and symbol is not WIDE:
        by = -by
    assert at(substitute(a, {symbol: by}), found) == at(a, {**found, symbol: by.constant})


@given(any_form, st.integers(0, 3), st.integers(0, 9), values)
def test_a_symbol_is_replaced_by_a_form(a: Form, slope: int, start: int, found: dict[Symbol, int]) -> None:
    by = j * slope + start
    assert at(substitute(a, {ROW: by}), found) == at(a, {**found, ROW: at(by, found)})


def test_replacing_simplifies_anew() -> None:
    guarded = select(less(i, n), i * 2, ZERO)
    assert substitute(guarded, {ROW: number(3), N: number(4)}) == number(6)
    assert substitute(floordiv(i + n, number(4)), {ROW: j * 4 - n}) == j


def test_a_loaded_value_goes_on_to_depend_on_what_its_index_was_made_of() -> None:
    loaded = symbol_form(forms.data("table", None, (1,), at=i * 4, depends=frozenset({ROW})))
    first, second = (substitute(loaded, {ROW: j + 1}) for _ in range(2))
    assert first == second, "the same value, however often it is rewritten"
    assert show(first) == "table[4 + 4*j]"
    assert COLUMN in first.leaves()


# ------------------------------------------------------------------------------------------------------ compiled


@given(any_form, values)
def test_a_compiled_form_computes_the_same(a: Form, found: dict[Symbol, int]) -> None:
    assert compiled(a)(dict(found)) == at(a, found)


@pytest.mark.parametrize("name", ["div", "shl", "shr", "and", "or", "xor", "floordiv", "min", "max"])
@given(st.integers(-99, 99), st.integers(0, 9))
def test_a_compiled_operation_computes_the_same(name: str, left: int, right: int) -> None:
    assert compiled(operation(name, wide, n))({WIDE: left, N: right}) == applied(name, [left, right])


def test_an_operation_that_has_a_value_is_not_computed() -> None:
    (test,) = less(wide, n).symbols()
    run: Callable[[dict[Symbol, int]], int] = compiled(less(wide, n) * 10)
    assert (run({WIDE: 1, N: 2}), run({WIDE: 1, N: 2, test: 0})) == (10, 0)
