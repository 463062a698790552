"""Closed forms of what loops carry along, and trips, beside taking every step."""

from __future__ import annotations

from collections.abc import Sequence

from hypothesis import assume, given
from hypothesis import strategies as st

from beatwise.model import form as forms
from beatwise.model.form import Form, Symbol, number, symbol_form
from beatwise.model.operations import both, equal, less, mask, mod, negation, select
from beatwise.trace.logic import always
from beatwise.trace.recurrence import Carry, Solved, solve, trips_while
from helpers.forms import evaluate

LOOP = 1
K = forms.counter("k", LOOP)
k = symbol_form(K)
X, Y, Z = (forms.carried(name, LOOP) for name in "xyz")
x, y, z = (symbol_form(symbol) for symbol in (X, Y, Z))
N = forms.parameter("n", 1, 20)
n = symbol_form(N)
small = st.integers(-9, 9)


def solved(*carries: Carry) -> Solved:
    return solve(carries, K, frozenset({LOOP}))


def steps(carries: Sequence[Carry], turns: int, size: int = 0) -> list[dict[Symbol, int]]:
    """What each variable holds when each iteration starts."""
    values = {K: 0, N: size}
    values.update({carry.symbol: evaluate(carry.first, values.__getitem__) for carry in carries})
    seen = []
    for turn in range(turns):
        values[K] = turn
        seen.append(dict(values))
        following = {carry.symbol: evaluate(carry.next, values.__getitem__) for carry in carries}
        values.update(following)
    return seen


def holds(found: Solved, carries: Sequence[Carry], size: int = 0) -> bool:
    """Whether every closed form gives what the steps give."""
    return all(
        evaluate(form, values.__getitem__) == values[symbol]
        for values in steps(carries, 50, size)
        for symbol, form in found.closed.items()
        if not found.left
    )


@given(small, small, small)
def test_a_constant_step_or_one_that_grows_is_closed(first: int, step: int, growth: int) -> None:
    carries = [Carry(X, number(first), x + step), Carry(Y, number(first), y + k * growth + step)]
    found = solved(*carries)
    assert found.left == ()
    assert holds(found, carries)


@given(small, small, small)
def test_what_follows_another_variable_is_closed_after_it(first: int, step: int, factor: int) -> None:
    carries = [Carry(Y, number(first), x * factor), Carry(X, number(first), x + step), Carry(Z, number(0), z + y)]
    found = solved(*carries)
    assert {X, Y} <= found.closed.keys() - {carry.symbol for carry in found.left}
    for values in steps(carries, 50):
        assert evaluate(found.closed[X], values.__getitem__) == values[X]
        assert evaluate(found.closed[Y], values.__getitem__) == values[Y]


def wrapping(symbol: Form, first: Form, step: int, last: Form, style: str) -> tuple[Form, Form]:
    """The next value of a ring counter, and the condition of its wrap."""
    if style == "bump, then compare":
        wraps = equal(symbol + step, last + step)
    elif style == "compare with the last":
        wraps = equal(symbol, last)
    elif style == "not less":
        wraps = negation(less(symbol, last))
    else:
        wraps = less(last - 1, symbol)
    return select(wraps, first, symbol + step), wraps


STYLES = st.sampled_from(["bump, then compare", "compare with the last", "not less", "greater"])


@given(small, st.integers(1, 4), st.integers(1, 9), STYLES)
def test_a_ring_counter_is_closed(first: int, step: int, turns: int, style: str) -> None:
    next_, _ = wrapping(x, number(first), step, number(first + step * turns), style)
    carries = [Carry(X, number(first), next_)]
    found = solved(*carries)
    assert found.left == ()
    assert holds(found, carries)


@given(st.integers(2, 6), st.integers(2, 6), STYLES, STYLES, st.integers(1, 9))
def test_three_counters_wrapped_by_hand_are_closed(low: int, middle: int, one: str, other: str, step: int) -> None:
    next_x, x_wraps = wrapping(x, number(0), 1, number(low - 1), one)
    ring_y, y_wraps = wrapping(y, number(0), 1, number(middle - 1), other)
    carries = [
        Carry(X, number(0), next_x),
        Carry(Y, number(0), select(x_wraps, ring_y, y)),
        Carry(Z, number(0), select(x_wraps, select(y_wraps, z + step, z), z)),
    ]
    found = solved(*carries)
    assert found.left == ()
    assert holds(found, carries)


@given(st.integers(1, 20))
def test_a_ring_as_long_as_an_argument_is_closed(size: int) -> None:
    carries = [
        Carry(X, number(0), select(equal(x + 1, n), number(0), x + 1)),
        Carry(Y, number(0), select(equal(x + 1, n), y + n, y)),
    ]
    found = solved(*carries)
    assert found.left == ()
    assert holds(found, carries, size)
    assert found.closed[X] + found.closed[Y] == k, "the row and the column together are one walk"


@given(st.integers(0, 20), small, st.integers(1, 12), st.booleans())
def test_a_ring_counter_by_remainder_or_mask_is_right_where_it_is_closed(
    first: int, step: int, size: int, masked: bool
) -> None:
    next_ = mask(x + step, size % 5 + 1) if masked else mod(x + step, number(size))
    carries = [Carry(X, number(first), next_)]
    found = solved(*carries)
    assert holds(found, carries)
    if first < size and step >= 0 and not masked:
        assert found.left == ()


def test_what_has_no_closed_form_is_left_with_what_it_depends_on() -> None:
    drawn = forms.data("mask", None, (LOOP,))
    carry = Carry(X, number(0), select(equal(symbol_form(drawn), number(0)), x + 1, x))
    (left,) = solved(carry).left
    assert left.symbol == X
    assert drawn in left.symbol.depends


# ---------------------------------------------------------------------------------------------------------- trips


def turns_of(condition: Form, most: int = 300) -> int | None:
    """The first value of the counter for which the condition fails."""
    return next((turn for turn in range(most) if not evaluate(condition, {K: turn}.__getitem__)), None)


@given(small, small, small, small)
def test_a_loop_runs_while_one_side_is_less(a: int, b: int, c: int, d: int) -> None:
    condition = less(k * a + b, k * c + d)
    found = trips_while(condition, K)
    true = turns_of(condition)
    if true is None:
        assert found.count is None or found.unsolved
    else:
        assert found.count is not None and (found.count.known, found.unsolved) == (true, ())


@given(st.integers(1, 9), st.integers(0, 9), st.integers(0, 30))
def test_a_loop_runs_until_two_sides_are_equal(step: int, first: int, turns: int) -> None:
    condition = negation(equal(k * step + first, number(first + step * turns)))
    count = trips_while(condition, K).count
    assert count is not None and count.known == turns


def test_a_loop_that_steps_over_its_end_has_no_count() -> None:
    assert trips_while(negation(equal(k * 3, number(10))), K).count is None
    assert trips_while(negation(equal(k + 5, number(3))), K).count is None


@given(small, small, st.integers(1, 9), st.integers(1, 9))
def test_of_two_conditions_the_first_to_fail_ends_the_loop(a: int, b: int, step: int, other: int) -> None:
    condition = both(less(k * step + a, number(30)), less(k * other + b, number(40)))
    assume(condition.known is None)
    count = trips_while(condition, K).count
    assert count is not None and count.known == turns_of(condition)


# ---------------------------------------------------------------------------------------------------------- logic

tests_of_n = st.one_of(
    st.builds(lambda value: equal(n, number(value)), st.integers(1, 3)),
    st.builds(lambda value: less(n, number(value)), st.integers(2, 4)),
    st.builds(lambda value: equal(k, number(value)), st.integers(0, 2)),
)
conditions = st.recursive(
    tests_of_n,
    lambda inner: st.one_of(
        inner.map(negation),
        st.builds(both, inner, inner),
        st.builds(lambda a, b: negation(both(negation(a), negation(b))), inner, inner),
        st.builds(select, inner, inner, inner),
    ),
    max_leaves=6,
)


@given(conditions, st.integers(1, 20), st.integers(0, 9))
def test_what_always_holds_holds(condition: Form, size: int, turn: int) -> None:
    if always(condition):
        assert evaluate(condition, {N: size, K: turn}.__getitem__)
