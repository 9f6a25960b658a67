"""Evaluation in ball arithmetic: every value comes with a proved enclosure."""

from __future__ import annotations

from collections.abc import Callable, Mapping
from fractions import Fraction
from types import MappingProxyType
from typing import Any

from flint import arb, ctx, fmpq

from ..errors import DefinitionError
from ..expressions import (
    CONSTANTS,
    Constant,
    Expr,
    Function,
    Integral,
    Negative,
    Number,
    Power,
    Product,
    Quotient,
    Root,
    Sum,
    Symbol,
)
from .complex_balls import complex_function
from .integration import integral_ball

Ball = Any  # flint.arb has no type information
PRECISION = 192


class OutsideDomainError(ArithmeticError):
    """An operation has no real value anywhere in its operand's ball."""


BALL_FUNCTIONS: Mapping[str, Callable[[Ball], Ball]] = MappingProxyType(
    {
        "exp": lambda x: x.exp(),
        "ln": lambda x: _inside(x, x > 0 or x.contains(0)).log(),
        "lg": lambda x: _inside(x, x > 0 or x.contains(0)).log() / arb(10).log(),
        "sin": lambda x: x.sin(),
        "cos": lambda x: x.cos(),
        "tan": lambda x: x.tan(),
        "arcsin": lambda x: x.asin(),
        "arccos": lambda x: x.acos(),
        "arctan": lambda x: x.atan(),
    }
)


def working_precision() -> Any:
    """Return the context in which all balls of a calculation are computed."""
    return ctx.workprec(PRECISION)


def exact_ball(value: Fraction, pi_power: int = 0) -> Ball:
    """Return the ball of an exact fraction times a power of π."""
    ball = arb(fmpq(value.numerator, value.denominator))
    return ball * arb.pi() ** pi_power if pi_power else ball


def evaluate(expr: Expr, values: Mapping[Symbol, Ball]) -> Ball:
    """Return the ball of an expression over the part of its operands where it is defined.

    Args:
        expr: the expression.
        values: a ball in coherent SI for each of its symbols.

    Raises:
        OutsideDomainError: if it is defined nowhere in the balls of its operands.
    """
    match expr:
        case Symbol():
            return values[expr]
        case Number(value):
            return exact_ball(value)
        case Constant(name):
            exact = CONSTANTS[name].value
            return arb.pi() if exact is None else exact_ball(exact)
        case Sum(terms):
            total = evaluate(terms[0], values)
            for term in terms[1:]:
                total = total + evaluate(term, values)
            return total
        case Product(factors):
            product = evaluate(factors[0], values)
            for factor in factors[1:]:
                product = product * evaluate(factor, values)
            return product
        case Quotient(numerator, denominator):
            return evaluate(numerator, values) / evaluate(denominator, values)
        case Negative(operand):
            return -evaluate(operand, values)
        case Power(base, exponent):
            raised = evaluate(base, values)
            if isinstance(exponent, Number) and exponent.value.denominator == 1:
                return ball_whole_power(raised, int(exponent.value))
            return ball_power(raised, evaluate(exponent, values))
        case Root(radicand):
            return ball_root(evaluate(radicand, values))
        case Function(name, argument):
            return BALL_FUNCTIONS[name](evaluate(argument, values))
        case Integral():
            return _integral(expr, values)
    raise DefinitionError(f"expression {expr!r}", "it is no node of an expression tree")


def _inside(ball: Ball, possible: bool) -> Ball:
    if not possible:
        raise OutsideDomainError
    return ball


def ball_root(radicand: Ball) -> Ball:
    """Return the ball of a square root, over the part of the radicand that is not negative.

    Raises:
        OutsideDomainError: if it is negative all over.
    """
    if radicand < 0:
        raise OutsideDomainError
    if radicand.contains(0):
        return arb(0).union(arb(radicand.upper()).sqrt())
    return radicand.sqrt()


def ball_whole_power(base: Ball, exponent: int) -> Ball:
    """Return the ball of a whole power: between those of the ends, where the base has one sign.

    The power of a wide ball as such reaches to zero, and would look like a root beside a pole.
    """
    if base.contains(0) or base.is_exact() or not base.is_finite():
        return base**exponent
    return (arb(base.lower()) ** exponent).union(arb(base.upper()) ** exponent)


def ball_power(base: Ball, power: Ball) -> Ball:
    """Return the ball of a power, over the part of the base that is not negative.

    Raises:
        OutsideDomainError: if the base is negative all over.
    """
    if base < 0:
        raise OutsideDomainError
    if base.contains(0) and power > 0 and base.upper() > 0:
        largest = arb(base.upper())
        return arb(0).union(largest**power if largest > 1 else arb(1).union(largest**power))
    return base**power


def _integral(integral: Integral, values: Mapping[Symbol, Ball]) -> Ball:
    variable, integrand = integral.variable, integral.integrand
    value = integral_ball(
        complex_function(integrand, variable, lambda part: evaluate(part, values)),
        lambda at: evaluate(integrand, {**values, variable: at}),
        evaluate(integral.low, values),
        evaluate(integral.high, values),
    )
    return _inside(value, value is not None)


def midpoint(ball: Ball) -> float:
    """Return the double nearest to the middle of a ball; zero if the ball holds it."""
    return 0.0 if ball.contains(0) else float(ball.mid())


def decimal_bounds(ball: Ball, digits: int = 25) -> tuple[str, str]:
    """Return decimal texts below and above which the exact value cannot lie."""
    lower = arb(ball.lower()).str(digits, radius=False)
    upper = arb(ball.upper()).str(digits, radius=False)
    return lower, upper
