"""Expressions keep the order in which they were published, and say what they are."""

from __future__ import annotations

import random
from fractions import Fraction

import mpmath
import pytest
import sympy

from calcsheets.errors import DefinitionError
from calcsheets.expressions import (
    PI,
    Equation,
    Expr,
    Function,
    Number,
    Power,
    Product,
    Symbol,
    constants_in,
    decimal_text,
    derivative,
    dimension_of,
    exp,
    expression_from_mathml,
    expression_to_mathml,
    lg,
    ln,
    number,
    sqrt,
    symbols,
    to_sympy,
)
from calcsheets.relations import load_library
from calcsheets.solving import evaluate, exact_ball, midpoint, working_precision
from tests.relations.states import random_states

p, rho, T, R, gamma, M, u, A = symbols("p rho T R gamma M u A")
LIBRARY = load_library()


def test_operators_keep_the_order_of_their_operands() -> None:
    assert rho * u * A == Product((rho, u, A))
    assert rho * u * A != A * u * rho
    assert [str(s) for s in Equation(p, rho * R * T).symbols] == ["p", "rho", "R", "T"]


def test_only_exact_numbers_stand_in_an_equation() -> None:
    assert (M**2).exponent == Number(Fraction(2))  # type: ignore[attr-defined]
    assert number("0.62") == Number(Fraction(31, 50))
    with pytest.raises(DefinitionError) as caught:
        M * 0.5  # type: ignore[operator]
    assert str(caught.value) == (
        "definition of expression 0.5: only exact numbers may stand in an equation"
    )


def test_a_symbol_is_one_of_the_vocabulary() -> None:
    with pytest.raises(DefinitionError) as caught:
        Symbol("Quark")
    assert str(caught.value) == "definition of symbol Quark: no such quantity in the vocabulary"


@pytest.mark.parametrize(
    ("value", "text"),
    [
        ("0", "0"), ("7", "7"), ("-12", "-12"), ("1/8", "0.125"), ("-1/40", "-0.025"),
        ("1/3", "1/3"), ("100", "100"), ("8.31446261815324", "8.31446261815324"),
        ("0.0254", "0.0254"), ("123456789/1000000", "123.456789"),
    ],
)  # fmt: skip
def test_an_exact_number_is_written_exactly(value: str, text: str) -> None:
    assert decimal_text(Fraction(value)) == text
    assert Fraction(text) == Fraction(value)


STATEMENTS = [
    *(relation.published for relation in LIBRARY.relations),
    *(limit.condition for relation in LIBRARY.relations for limit in relation.limits),
    *(condition for regime in LIBRARY.regimes for condition in regime.conditions),
]


@pytest.mark.parametrize("statement", STATEMENTS, ids=range(len(STATEMENTS)))
def test_content_mathml_brings_every_statement_back(statement: Expr) -> None:
    text = expression_to_mathml(statement)
    assert expression_from_mathml(text) == statement
    assert "csymbol" in text


@pytest.mark.parametrize(
    ("text", "reason"),
    [
        ('<!DOCTYPE a [<!ENTITY b "c">]><ci>p</ci>', "with a declaration"),
        ("<?xml version='1.0'?><ci>p</ci>", "with a declaration"),
        ("<ci>p", "not well formed"),
        ("<ci>__import__</ci>", "no such quantity in the vocabulary"),
        ("<cn>1e999</cn>", "is not a decimal number"),
        ("<cn>nan</cn>", "is not a decimal number"),
        ("<cn>" + "9" * 100 + "</cn>", "is not a decimal number"),
        ("<mi>p</mi>", "element mi is not expected"),
        ("<apply/>", "element apply is not expected"),
        (
            '<apply><csymbol cd="arith1">system</csymbol><ci>p</ci></apply>',
            'operator "system" with 1 operands',
        ),
        (
            '<apply><csymbol cd="arith1">divide</csymbol><ci>p</ci></apply>',
            'operator "divide" with 1 operands',
        ),
        (
            '<apply><csymbol cd="transc1">getattr</csymbol><ci>p</ci></apply>',
            'operator "getattr" with 1 operands',
        ),
        (
            '<apply><csymbol cd="relation1">approx</csymbol><ci>p</ci><ci>p</ci></apply>',
            'no comparison "approx" of two sides',
        ),
        (
            '<apply><csymbol cd="arith1">unary_minus</csymbol>' * 80
            + "<ci>p</ci>"
            + "</apply>" * 80,
            "nested deeper than 60 levels",
        ),
        ("<ci>p</ci>" + " " * 100_001, "too long"),
    ],
)
def test_hostile_mathml_is_refused(text: str, reason: str) -> None:
    with pytest.raises(DefinitionError) as caught:
        expression_from_mathml(text)
    assert reason in str(caught.value)


@pytest.mark.parametrize(
    "expr",
    [
        M**3 - 2 * M,
        1 / M,
        sqrt(1 + M**2) * ln(M + 2),
        exp(-M) / (1 + M),
        (1 + (gamma - 1) / 2 * M**2) ** (gamma / (gamma - 1)),
        Power(gamma, M),
        lg(2 + M / 3) * M,
        Function("sin", M) * Function("cos", M) + Function("tan", M / 3),
        Function("arcsin", M / 5) + Function("arccos", M / 5) * Function("arctan", M),
        number("3") - M * PI,
    ],
    ids=range(10),
)
def test_the_derivative_is_that_of_the_expression(expr: Expr) -> None:
    """Against numerical differentiation by mpmath (library)."""
    chance = random.Random(7)
    slope = derivative(expr, M)
    for _ in range(5):
        at, g = Fraction(chance.randint(20, 300), 100), Fraction(chance.randint(110, 166), 100)
        expected = mpmath.diff(lambda x, g=g: _float(expr, x, g), float(at), h=1e-6)
        assert _float(slope, float(at), g) == pytest.approx(float(expected), rel=1e-5, abs=1e-7)


def test_the_derivative_of_a_square_holds_where_its_base_is_negative() -> None:
    slope = derivative((M - 3) ** 2, M)
    assert _float(slope, 1.0, Fraction(7, 5)) == -4.0


def _float(expr: Expr, at: float, g: Fraction) -> float:
    with working_precision():
        return midpoint(evaluate(expr, {M: exact_ball(Fraction(float(at))), gamma: exact_ball(g)}))


@pytest.mark.parametrize(
    ("expr", "reason"),
    [
        (p + T, "kg*m^-1*s^-2 and K cannot be added"),
        (p**M, "a base in kg*m^-1*s^-2 has an exponent that may vary"),
        (M**p, "it must be a plain number and is in kg*m^-1*s^-2"),
        (ln(T), "it must be a plain number and is in K"),
    ],
    ids=["sum", "variable exponent", "exponent with a unit", "logarithm"],
)
def test_nonsense_has_no_dimension(expr: Expr, reason: str) -> None:
    with pytest.raises(DefinitionError) as caught:
        dimension_of(expr)
    assert reason in str(caught.value)


def test_a_logarithm_to_base_ten_is_one_of_the_standard_dictionary() -> None:
    """OpenMath, transc1: ``log`` takes the base first."""
    text = expression_to_mathml(lg(M))
    assert text == (
        '<apply><csymbol cd="transc1">log</csymbol><cn type="integer">10</cn><ci>M</ci></apply>'
    )
    assert expression_from_mathml(text) == lg(M)
    for other in ('<cn type="integer">2</cn>', "<ci>M</ci>"):
        with pytest.raises(DefinitionError, match="operator"):
            expression_from_mathml(text.replace('<cn type="integer">10</cn>', other))
    with pytest.raises(DefinitionError, match="operator"):
        expression_from_mathml('<apply><csymbol cd="transc1">lg</csymbol><ci>M</ci></apply>')


def test_a_logarithm_to_base_ten_is_one_to_computer_algebra_too() -> None:
    assert to_sympy(lg(M)) == sympy.log(to_sympy(M), 10)
    assert to_sympy(lg(number("1000"))) == 3


def test_a_root_and_a_rational_power_have_a_dimension() -> None:
    assert str(dimension_of(sqrt(gamma * R * T))) == "m*s^-1"
    assert str(dimension_of(A ** Fraction(1, 2))) == "m"


@pytest.mark.parametrize("relation", LIBRARY.relations, ids=lambda relation: relation.name)
def test_computer_algebra_gets_the_same_expression(relation) -> None:  # type: ignore[no-untyped-def]
    """Sides evaluated by sympy (library) agree with ball arithmetic."""
    (state,) = random_states(relation, 1, seed=2)
    values = {to_sympy(s): sympy.Float(midpoint(ball), 30) for s, ball in state.items()}
    for name in {c.name for side in (relation.published.left, relation.published.right)
                 for c in constants_in(side)} - {"pi"}:  # fmt: skip
        from calcsheets.expressions import CONSTANTS, Constant

        exact = CONSTANTS[name].value
        assert exact is not None
        values[to_sympy(Constant(name))] = sympy.Rational(exact.numerator, exact.denominator)
    for side in (relation.published.left, relation.published.right):
        with working_precision():
            ours = midpoint(evaluate(side, state))
        assert float(to_sympy(side).subs(values).evalf(25)) == pytest.approx(ours, rel=1e-11)
