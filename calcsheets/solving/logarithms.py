"""The logarithm of a product form, taken factor by factor.

Powers become products with their exponents, so that balls stay narrow where an exponent is
large: isolating a root then takes few cells.
"""

from __future__ import annotations

from ..expressions import Expr, Function, Power, Product, Quotient, Root, Sum


def logarithm_of(expr: Expr) -> Expr | None:
    """Return ln of a product form as a sum, or ``None`` if the expression is no product form.

    Args:
        expr: a product, fraction, power or root; wherever it is positive the result holds.
    """
    match expr:
        case Product(factors):
            return Sum(tuple(_factor(factor) for factor in factors))
        case Quotient() | Power() | Root():
            return _factor(expr)
        case _:
            return None


def _factor(expr: Expr) -> Expr:
    match expr:
        case Product(factors):
            return Sum(tuple(_factor(factor) for factor in factors))
        case Quotient(numerator, denominator):
            return _factor(numerator) - _factor(denominator)
        case Power(base, exponent):
            return exponent * _factor(base)
        case Root(radicand):
            return _factor(radicand) / 2
        case _:
            return Function("ln", expr)
