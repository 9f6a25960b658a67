"""Taylor forms enclose what they stand for, and narrow faster than plain balls."""

from __future__ import annotations

import random
from fractions import Fraction

import pytest
from flint import arb

from calcsheets.expressions import (
    Expr,
    Function,
    Integral,
    Number,
    Symbol,
    derivative,
    exp,
    ln,
    sqrt,
    symbols,
)
from calcsheets.expressions.tree import FUNCTIONS
from calcsheets.relations import load_library
from calcsheets.solving import (
    Question,
    evaluate,
    exact_ball,
    isolate,
    solve,
    working_precision,
)
from calcsheets.solving.balls import OutsideDomainError
from calcsheets.solving.bound import BALLS, bind
from calcsheets.solving.taylor import taylor_form
from tests.relations.states import random_states

M, gamma = symbols("M gamma")
GAMMA = {gamma: exact_ball(Fraction("1.4"))}
AREA = (1 + (gamma - 1) / 2 * M**2) ** ((gamma + 1) / (2 * (gamma - 1))) / M
CASES: list[Expr] = [
    AREA,
    sqrt(1 + M) - ln(M) * exp(-M),
    M**gamma / (1 + M) ** -2,
    gamma**M - 2,
    *(Function(name, M / 3) for name in FUNCTIONS),
]


def ball(low: str, high: str) -> arb:
    return exact_ball(Fraction(low)).union(exact_ball(Fraction(high)))


@pytest.mark.parametrize("expr", CASES, ids=range(len(CASES)))
def test_a_form_encloses_value_and_slope_at_every_point_of_its_cell(expr: Expr) -> None:
    chance = random.Random(4)
    slope = derivative(expr, M)
    with working_precision():
        form = taylor_form(expr, GAMMA, M)(ball("0.7", "0.9"))
        assert form is not None
        for _ in range(20):
            at = {**GAMMA, M: exact_ball(Fraction(chance.uniform(0.7, 0.9)))}
            assert form.value.overlaps(evaluate(expr, at))
            assert form.slope.overlaps(evaluate(slope, at))


def test_a_form_is_narrower_than_plain_balls_where_terms_nearly_cancel() -> None:
    expr = AREA - (M + 1) * AREA / (1 + M)
    with working_precision():
        cell = ball("0.70", "0.72")
        form = taylor_form(expr, GAMMA, M)(cell)
        plain = evaluate(expr, {**GAMMA, M: cell})
        assert form is not None
        assert form.value.rad() * 10_000 < plain.rad()


@pytest.mark.parametrize(
    "expr", [ln(M), sqrt(M), 1 / M, M**gamma], ids=["logarithm", "root", "pole", "power"]
)
def test_there_is_no_form_where_the_expression_is_not_smooth(expr: Expr) -> None:
    with working_precision():
        assert taylor_form(expr, GAMMA, M)(ball("-0.1", "0.1")) is None


def test_there_is_no_form_of_an_integral() -> None:
    u = Symbol("u")
    with working_precision():
        form = taylor_form(Integral(u**2, u, Number(Fraction(0)), M), {}, M)
        assert form(ball("0.7", "0.9")) is None


def test_a_bound_function_is_the_expression_for_every_relation() -> None:
    """Walked as a tree or bound once: the same balls."""
    with working_precision():
        for relation in load_library().relations:
            (state,) = random_states(relation, 1, seed=2)
            for unknown in relation.symbols:
                for side in (relation.published.left, relation.published.right):
                    known = {s: value for s, value in state.items() if s != unknown}
                    assert bind(side, known, unknown, BALLS)(state[unknown]).overlaps(
                        evaluate(side, state)
                    )


def test_a_bound_function_is_defined_nowhere_where_its_constant_part_is_not() -> None:
    with working_precision(), pytest.raises(OutsideDomainError):
        bind(ln(-gamma) * M, GAMMA, M, BALLS)(exact_ball(Fraction(1)))


def test_a_root_of_nearly_cancelling_sides_is_found() -> None:
    """The loss of stagnation pressure over a weak shock hardly depends on gamma."""
    relation = {r.name: r for r in load_library().relations}["shock_stagnation_pressure"]
    unknown = next(s for s in relation.symbols if s.quantity == "gamma")
    with working_precision():
        values = {
            s: exact_ball(Fraction({"M": "1.00301", "p_0": "115415"}.get(s.quantity, "0")))
            for s in relation.symbols
            if s != unknown
        }
        behind = next(s for s in relation.symbols if str(s) == "p_0.2")
        isolation = isolate(relation.published, behind)
        assert isolation is not None
        hidden = exact_ball(Fraction("1.5744"))
        values[behind] = evaluate(isolation.solved, {**values, unknown: hidden})
        found = solve(Question(relation, unknown, values, "", "gamma", "the gas"))
        assert abs(found.value - hidden) < arb("1e-20")
