"""Evaluation in 50-digit decimal arithmetic, from the record alone.

This shares no code with the solving of the relations: another arithmetic, another traversal.
"""

from __future__ import annotations

import operator
from collections.abc import Callable, Mapping
from types import MappingProxyType
from typing import Any

from ..errors import DefinitionError
from ..expressions import (
    CONSTANTS,
    Condition,
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

DIGITS = 50
_LARGEST_ERROR = 1e-25
COMPARE: Mapping[str, Callable[[Any, Any], bool]] = MappingProxyType(
    {"<": operator.lt, "<=": operator.le, ">": operator.gt, ">=": operator.ge}
)


def evaluate_decimal(expr: Expr, values: Mapping[Symbol, Any]) -> Any:
    """Return the value of an expression as an mpmath number of 50 digits.

    Args:
        expr: the expression.
        values: an mpmath number in coherent SI for each of its symbols.

    Raises:
        ArithmeticError: if it is undefined there.
    """
    import mpmath

    def value(node: Expr) -> Any:
        match node:
            case Symbol():
                return values[node]
            case Number(fraction):
                return mpmath.mpf(fraction.numerator) / fraction.denominator
            case Constant(name):
                exact = CONSTANTS[name].value
                if exact is None:
                    return +mpmath.pi
                return mpmath.mpf(exact.numerator) / exact.denominator
            case Sum(terms):
                return mpmath.fsum(value(term) for term in terms)
            case Product(factors):
                return mpmath.fprod(value(factor) for factor in factors)
            case Quotient(numerator, denominator):
                return value(numerator) / value(denominator)
            case Negative(operand):
                return -value(operand)
            case Power(base, exponent):
                return mpmath.power(value(base), value(exponent))
            case Root(radicand):
                return mpmath.sqrt(value(radicand))
            case Function(name, argument):
                return getattr(mpmath, _NAMES[name])(value(argument))
            case Integral():
                return _integral(node, values)
        raise DefinitionError(f"expression {node!r}", "it is no node of an expression tree")

    with mpmath.workdps(DIGITS):
        found = value(expr)
    if isinstance(found, mpmath.mpc):
        raise ArithmeticError("no real value")
    return found


def holds_decimal(
    condition: Condition, values: Mapping[Symbol, Any], equal_within: float = 2e-15
) -> bool:
    """Return whether a condition holds.

    Args:
        condition: the condition.
        values: value of each of its symbols.
        equal_within: sides that differ by no more of the right one count as equal; as it is,
            those that agree to the last digits of a double.
    """
    left = evaluate_decimal(condition.left, values)
    right = evaluate_decimal(condition.right, values)
    if abs(left - right) <= equal_within * abs(right):
        return condition.comparison in ("<=", ">=")
    return bool(COMPARE[condition.comparison](left, right))


def _integral(integral: Integral, values: Mapping[Symbol, Any]) -> Any:
    """By tanh-sinh quadrature, which says how far it may be off.

    Raises:
        ArithmeticError: if it does not converge.
    """
    import mpmath

    def integrand(at: Any) -> Any:
        return evaluate_decimal(integral.integrand, {**values, integral.variable: at})

    limits = [evaluate_decimal(limit, values) for limit in (integral.low, integral.high)]
    found, error = mpmath.quad(integrand, limits, error=True)
    if error > _LARGEST_ERROR * (1 + abs(found)):
        raise ArithmeticError("the integral does not converge")
    return found


_NAMES = {
    "exp": "exp",
    "ln": "log",
    "lg": "log10",
    "sin": "sin",
    "cos": "cos",
    "tan": "tan",
    "arcsin": "asin",
    "arccos": "acos",
    "arctan": "atan",
}
