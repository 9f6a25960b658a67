"""The logarithm of a product form, taken factor by factor.

Powers become products with their exponents, so that balls stay narrow where an exponent is
large: isolating a root then takes few cells.
"""

from __future__ import annotations

from ..expressions import (
    Constant,
    Expr,
    Function,
    Number,
    Power,
    Product,
    Quotient,
    Root,
    Sum,
    Symbol,
)


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


def is_positive(expr: Expr) -> bool:
    """Return whether an expression cannot be negative where it is defined.

    Quantities that are physically positive, powers that need a positive base, and what is
    multiplied and added from them are.
    """
    match expr:
        case Symbol():
            return expr.definition.low >= 0
        case Number(value):
            return value >= 0
        case Constant() | Root():
            return True
        case Product(parts) | Sum(parts):
            return all(is_positive(part) for part in parts)
        case Quotient(numerator, denominator):
            return is_positive(numerator) and is_positive(denominator)
        case Power(base, Number(value)) if value.denominator == 1:
            return value % 2 == 0 or is_positive(base)
        case Power():
            return True
        case Function(name):
            return name == "exp"
        case _:
            return False
