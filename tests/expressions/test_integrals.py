"""A definite integral is a node like others, whose variable means nothing outside it."""

from __future__ import annotations

import random
from fractions import Fraction

import mpmath
import pytest
import scipy.integrate
import sympy

from calcsheets.errors import DefinitionError
from calcsheets.expressions import (
    Expr,
    Integral,
    Symbol,
    derivative,
    dimension_of,
    exp,
    expression_from_mathml,
    expression_to_mathml,
    integrals_in,
    ln,
    number,
    replace_integrals,
    sqrt,
    substitute,
    symbols,
    symbols_in,
    to_sympy,
)
from calcsheets.solving import evaluate, exact_ball, midpoint, working_precision

p, T, M, M_cr, gamma, n = symbols("p T M M_cr gamma n")
GROWING = Integral(M**2 * gamma, M, n, 2 * n)
ONE, TWO = number("1"), number("2")


def value(expr: Expr, **values: float) -> float:
    with working_precision():
        balls = {Symbol(name): exact_ball(Fraction(v)) for name, v in values.items()}
        return midpoint(evaluate(expr, balls))


def test_the_variable_of_an_integral_is_no_symbol_of_the_expression() -> None:
    assert list(symbols_in(GROWING)) == [n, n, gamma]
    assert list(symbols_in(GROWING + M)) == [n, n, gamma, M]
    assert M.equals(GROWING).symbols == (M, n, gamma)


def test_a_substitution_leaves_the_variable_alone() -> None:
    assert substitute(GROWING, {M: TWO, gamma: ONE, n: TWO}) == Integral(
        M**2 * ONE, M, TWO, 2 * TWO
    )
    assert substitute(GROWING + M, {M: TWO}) == GROWING + TWO


def test_an_integral_can_be_replaced_by_its_value() -> None:
    assert list(integrals_in(1 + sqrt(GROWING))) == [GROWING]
    assert replace_integrals(1 + sqrt(GROWING), {GROWING: TWO}) == 1 + sqrt(TWO)
    assert replace_integrals(1 + sqrt(GROWING), {}) == 1 + sqrt(GROWING)


def test_an_integral_has_the_dimension_of_integrand_times_variable() -> None:
    high = symbols("p_0")[0]
    assert str(dimension_of(Integral(1 / T, p, high, 2 * high))) == "kg*m^-1*s^-2*K^-1"


@pytest.mark.parametrize(
    ("make", "reason"),
    [
        (lambda: dimension_of(Integral(T, p, T, symbols("p_0")[0])), "it has a limit in K"),
        (lambda: dimension_of(Integral(ln(T), p, p.of("1"), p.of("2"))), "argument of ln"),
        (lambda: Integral(M, M, ONE, M), "its limits hold its own variable"),
        (lambda: Integral(GROWING, M_cr, ONE, TWO), "its integrand holds another integral"),
    ],
    ids=["limit", "integrand", "own variable", "nested"],
)
def test_an_integral_that_means_nothing_is_refused(make, reason) -> None:  # type: ignore[no-untyped-def]
    with pytest.raises(DefinitionError) as caught:
        make()
    assert reason in str(caught.value)


@pytest.mark.parametrize(
    "expr",
    [
        GROWING,
        Integral(M, M, ONE, n),
        Integral(exp(n * M), M, n, ONE),
        gamma * Integral((1 - M**2) ** (-n / (n - 1)), M, sqrt(number("0.04")), 1 / (3 * n)),
        sqrt(Integral(n**M, M, number("-2"), n**2)) + ln(n),
    ],
    ids=range(5),
)
def test_the_derivative_follows_leibniz(expr: Expr) -> None:
    """Against numerical differentiation of numerical quadrature by mpmath (library)."""
    slope = derivative(expr, n)
    chance = random.Random(5)
    for _ in range(3):
        at, g = chance.uniform(1.2, 1.9), chance.uniform(1.1, 1.6)
        expected = mpmath.diff(lambda x, g=g: value(expr, n=float(x), gamma=g), at, h=1e-5)
        assert value(slope, n=at, gamma=g) == pytest.approx(float(expected), rel=1e-6)


def test_the_derivative_by_what_does_not_occur_is_zero() -> None:
    assert derivative(GROWING, M) == number("0")
    assert derivative(GROWING, T) == number("0")


def test_computer_algebra_gets_the_integral_unevaluated() -> None:
    """sympy (library) evaluates it when it is asked to."""
    found = to_sympy(GROWING)
    assert isinstance(found, sympy.Integral)
    x, g = to_sympy(n), to_sympy(gamma)
    assert sympy.simplify(found.doit() - g * 7 * x**3 / 3) == 0


class TestContentMathML:
    def test_an_integral_is_written_in_strict_form_and_read_back(self) -> None:
        text = expression_to_mathml(GROWING)
        assert text == (
            '<apply><csymbol cd="calculus1">defint</csymbol>'
            '<apply><csymbol cd="interval1">oriented_interval</csymbol><ci>n</ci>'
            '<apply><csymbol cd="arith1">times</csymbol><cn type="integer">2</cn><ci>n</ci></apply>'
            "</apply>"
            '<bind><csymbol cd="fns1">lambda</csymbol><bvar><ci>M</ci></bvar>'
            '<apply><csymbol cd="arith1">times</csymbol>'
            '<apply><csymbol cd="arith1">power</csymbol><ci>M</ci><cn type="integer">2</cn></apply>'
            "<ci>gamma</ci></apply></bind></apply>"
        )
        assert expression_from_mathml(text) == GROWING

    @pytest.mark.parametrize(
        ("old", "new"),
        [
            ("oriented_interval", "interval"),
            ("lambda", "mu"),
            ("<bvar><ci>M</ci></bvar>", "<bvar><ci>M</ci><ci>n</ci></bvar>"),
            ("<bvar><ci>M</ci></bvar>", "<bvar/>"),
            ("<bvar><ci>M</ci></bvar>", "<ci>M</ci>"),
            ("<bvar><ci>M</ci></bvar>", '<bvar><cn type="integer">2</cn></bvar>'),
            ("<bind>", "<apply>"),
        ],
    )
    def test_what_is_no_integral_over_one_variable_is_refused(self, old: str, new: str) -> None:
        text = expression_to_mathml(GROWING).replace(old, new)
        text = text.replace("</bind>", "</apply>") if new == "<apply>" else text
        with pytest.raises(DefinitionError) as caught:
            expression_from_mathml(text)
        assert "an integral needs two limits and a function of one variable" in str(caught.value)

    def test_limits_may_not_hold_the_variable(self) -> None:
        text = expression_to_mathml(GROWING).replace("<ci>n</ci>", "<ci>M</ci>", 1)
        with pytest.raises(DefinitionError) as caught:
            expression_from_mathml(text)
        assert "its limits hold its own variable" in str(caught.value)


def test_scipy_finds_the_same_value() -> None:
    """scipy.integrate.quad (library)."""
    expected, _ = scipy.integrate.quad(lambda x: (1 - x**2) ** -3.5, 0.1, 0.4)
    integral = Integral((1 - M**2) ** (-gamma / (gamma - 1)), M, number("0.1"), number("0.4"))
    assert value(integral, gamma=1.4) == pytest.approx(expected, rel=1e-13)
