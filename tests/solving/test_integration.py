"""An integral comes with an enclosure that is proved, or with no value."""

from __future__ import annotations

import math
import random
from collections.abc import Callable
from fractions import Fraction
from typing import Any

import pytest
from flint import arb, ctx
from mpmath import mp, mpf
from numpy.polynomial.legendre import leggauss

from calcsheets.checking.decimals import evaluate_decimal
from calcsheets.errors import NoRoot, UntabulatedIntegral
from calcsheets.expressions import (
    Expr,
    Function,
    Integral,
    Symbol,
    exp,
    lg,
    ln,
    number,
    sqrt,
    symbols,
)
from calcsheets.planning.search import _closes
from calcsheets.relations import Relation, Source
from calcsheets.solving import (
    Ball,
    OutsideDomainError,
    Question,
    Table,
    evaluate,
    exact_ball,
    midpoint,
    solve,
    tables_of,
    working_precision,
)

M, gamma, n, x, w = symbols("M gamma n x w")
ZERO, TENTH, HALF, ONE, TWO = map(number, ("0", "0.1", "0.5", "1", "2"))


def ball(expr: Expr, values: dict[Symbol, Ball] | None = None) -> Ball:
    with working_precision():
        return evaluate(expr, values or {})


# Integrals, each with its value in closed form by mpmath (library).
CLOSED: list[tuple[Integral, Callable[[], Any]]] = [
    (Integral(M**2, M, ZERO, ONE), lambda: mpf(1) / 3),
    (Integral(M**2, M, ONE, ZERO), lambda: -mpf(1) / 3),
    (Integral(1 / M, M, ONE, TWO), lambda: mp.log(2)),
    (Integral(exp(-M), M, ZERO, number("700")), lambda: 1 - mp.exp(-700)),
    (Integral(ln(M), M, ONE, TWO), lambda: 2 * mp.log(2) - 1),
    (Integral(lg(M), M, ONE, TWO), lambda: (2 * mp.log(2) - 1) / mp.log(10)),
    (Integral(sqrt(1 + M), M, ZERO, TWO), lambda: (mp.sqrt(27) - 1) * 2 / 3),
    (Integral(Function("sin", M), M, ZERO, TWO), lambda: 1 - mp.cos(2)),
    (Integral(Function("cos", M), M, ZERO, TWO), lambda: mp.sin(2)),
    (Integral(Function("tan", M), M, ZERO, ONE), lambda: -mp.log(mp.cos(1))),
    (Integral(Function("arcsin", M), M, ZERO, HALF), lambda: mp.pi / 12 + mp.sqrt(0.75) - 1),
    (Integral(Function("arccos", M), M, ZERO, HALF), lambda: mp.pi / 6 - mp.sqrt(0.75) + 1),
    (Integral(Function("arctan", M), M, ZERO, TWO), lambda: 2 * mp.atan(2) - mp.log(5) / 2),
    (Integral(M ** number("1.5"), M, ONE, TWO), lambda: (mp.sqrt(32) - 1) * 2 / 5),
    (Integral(2 - M / 3, M, number("-1"), TWO), lambda: mpf("5.5")),
]


@pytest.mark.parametrize(("integral", "closed"), CLOSED, ids=range(len(CLOSED)))
def test_the_enclosure_holds_the_closed_form_and_is_narrow(
    integral: Integral, closed: Callable[[], Any]
) -> None:
    with mp.workdps(80), working_precision():
        expected = arb(mp.nstr(closed(), 75))
        found = evaluate(integral, {})
        assert found.overlaps(expected)
        assert found.rad() <= abs(found) * arb("1e-45")


@pytest.mark.parametrize(("integral", "closed"), CLOSED, ids=range(len(CLOSED)))
def test_the_check_finds_the_same_by_its_own_quadrature(
    integral: Integral, closed: Callable[[], Any]
) -> None:
    with mp.workdps(50):
        assert abs(evaluate_decimal(integral, {}) - closed()) < 1e-40


def test_a_singular_end_widens_the_enclosure_and_never_falsifies_it() -> None:
    found = ball(Integral(sqrt(M), M, ZERO, ONE))
    with working_precision():
        assert abs(found - arb(2) / 3) <= arb("1e-15")
        assert found.overlaps(arb(2) / 3)
        half = evaluate(Integral(M ** number("0.5"), M, ZERO, ONE), {})
        assert half.overlaps(arb(2) / 3)


def test_what_does_not_converge_has_no_finite_value() -> None:
    assert not ball(Integral(1 / M, M, ZERO, ONE)).is_finite()
    with pytest.raises(ArithmeticError):
        evaluate_decimal(Integral(1 / M, M, ZERO, ONE), {})


def test_an_integrand_without_real_value_on_the_way_is_outside_its_domain() -> None:
    with pytest.raises(OutsideDomainError):
        ball(Integral(sqrt(M), M, number("-1"), number("-0.5")))
    with pytest.raises(OutsideDomainError):
        ball(Integral(sqrt(M), M, number("-1"), ONE))


def test_balls_of_limits_and_parameters_are_covered() -> None:
    """Any exact case inside wide limits and a wide parameter lies in the wide enclosure."""
    integral = Integral((1 - M**2) ** (-gamma / (gamma - 1)), M, x, w)
    chance = random.Random(11)
    with working_precision():
        for width in ("1e-30", "1e-9", "0.01", "0.1"):
            middle = {x: arb("0.1"), w: arb("0.35"), gamma: arb("1.35")}
            wide = evaluate(integral, {s: v + arb(0, width) for s, v in middle.items()})
            assert wide.is_finite()
            for _ in range(8):
                inside = {s: v + arb(width) * arb(chance.uniform(-1, 1)) for s, v in middle.items()}
                assert wide.overlaps(evaluate(integral, inside))
                assert wide.contains(arb(evaluate(integral, inside).mid()))


def test_double_precision_leaves_the_digits_of_a_double() -> None:
    with ctx.workprec(53):
        found = evaluate(CLOSED[4][0], {})
        assert found.rad() < arb("1e-13") and found.contains(2 * arb(2).log() - 1)


SOURCE = Source("A test", "", "", "common practice")


def relation(right: Expr) -> Relation:
    return Relation("grown", "A made-up integral", n.equals(right), SOURCE, ("stream",))


GROWN = relation(gamma * Integral((1 + M**2) ** (1 / gamma), M, x, w))
STATE = {gamma: "1.4", x: "0.25", w: "0.75"}


def question(unknown: Symbol, known: dict[Symbol, Ball]) -> Question:
    return Question(GROWN, unknown, known, "", str(unknown), "a place")


@pytest.mark.parametrize("unknown", [n, gamma, x, w], ids=str)
def test_a_relation_with_an_integral_answers_for_each_of_its_quantities(unknown: Symbol) -> None:
    with working_precision():
        state = {s: exact_ball(Fraction(text)) for s, text in STATE.items()}
        state[n] = evaluate(GROWN.published.right, state)
        known = {s: v for s, v in state.items() if s != unknown}
        solution = solve(question(unknown, known))
        assert midpoint(solution.value) == pytest.approx(midpoint(state[unknown]), rel=1e-14)
        assert solution.residual.contains(0)
        assert solution.method == ("moves" if unknown == n else "root")


def test_an_unknown_outside_the_integral_is_isolated_by_moves() -> None:
    scaled = relation(w * Integral(M**gamma, M, TENTH, x))
    with working_precision():
        known = {n: arb("0.05"), gamma: arb("1.5"), x: arb("0.5")}
        solution = solve(Question(scaled, w, known, "", "w", "a place"))
    assert [move.action for move in solution.moves] == ["exchange sides", "divide by"]
    assert midpoint(solution.value) == pytest.approx(0.05 * 2.5 / (0.5**2.5 - 0.1**2.5), rel=1e-14)


def test_planning_knows_that_an_unknown_in_an_integral_is_no_closed_form() -> None:
    scaled = relation(w * Integral(M**gamma, M, ZERO, x)).published
    assert _closes(scaled, w) and _closes(scaled, n)
    assert not _closes(scaled, x) and not _closes(scaled, gamma)


def test_a_value_that_the_integral_does_not_reach_is_refused_with_its_range() -> None:
    with working_precision():
        known = {n: arb(100), gamma: arb("1.4"), x: arb("0.25")}
        with pytest.raises(NoRoot) as caught:
            solve(question(w, known))
    assert caught.value.asked == "100"
    assert "to" in caught.value.reached


SMOOTH: dict[Symbol, Ball] = {gamma: arb("1.4"), x: arb("0.05"), w: arb("0.4")}


class TestTables:
    """A workbook carries an integral as a sum over places."""

    smooth = Integral((1 - M**2) ** (-gamma / (gamma - 1)), M, x, w)

    def table(self) -> Table:
        with working_precision():
            (found,) = tables_of(2 * self.smooth + self.smooth, SMOOTH)
        return found

    def test_the_places_are_those_of_gauss_and_legendre(self) -> None:
        """numpy.polynomial.legendre.leggauss (library)."""
        places, weights = leggauss(16)
        assert self.table().places == pytest.approx((1 + places) / 2, rel=1e-14)
        assert self.table().weights == pytest.approx(weights / 2, rel=1e-13)

    def test_the_sum_is_that_of_its_numbers_and_comes_near_the_integral(self) -> None:
        table = self.table()
        assert (table.low, table.high) == (0.05, 0.4)
        heights = [(1 - y**2) ** -3.5 for y in table.at]
        assert table.heights == pytest.approx(heights, rel=1e-14)
        total = 0.35 * math.fsum(a * b for a, b in zip(table.weights, heights, strict=True))
        assert table.total == pytest.approx(total, rel=1e-14)
        assert table.total == pytest.approx(midpoint(ball(self.smooth, SMOOTH)), rel=1e-15)

    def test_a_sharper_integrand_gets_more_parts(self) -> None:
        with working_precision():
            (table,) = tables_of(Integral(1 / M, M, TENTH, ONE), {})
        assert len(table.places) == 64
        assert list(table.places) == sorted(table.places)
        assert math.fsum(table.weights) == pytest.approx(1, rel=1e-15)
        assert table.total == pytest.approx(math.log(10), rel=1e-14)

    def test_what_no_sum_comes_near_is_refused(self) -> None:
        with working_precision(), pytest.raises(UntabulatedIntegral) as caught:
            tables_of(Integral(sqrt(M), M, ZERO, ONE), {})
        assert (caught.value.variable, caught.value.places) == ("M", 128)

    def test_each_row_of_a_bisection_has_its_own_sum(self) -> None:
        with working_precision():
            known = {n: arb("0.6"), gamma: arb("1.4"), x: arb("0.25")}
            solution = solve(question(w, known))
        assert solution.bisection is not None
        (start,), rows = solution.bisection.start, solution.bisection.rows
        assert start.high == rows[0].low and start.low == 0.25
        for row in rows:
            (table,) = row.tables
            assert table.high == (row.low + row.high) / 2
            residual = (0.6 - 1.4 * table.total) / (0.6 + 1.4 * table.total)
            assert row.residual == pytest.approx(residual, abs=1e-15)
