"""Dimensional homogeneity: every relation is checked when it is defined."""

from __future__ import annotations

from fractions import Fraction

from ..errors import DefinitionError
from ..quantities import Dimension
from ..quantities.dimension import ONE
from .constants import CONSTANTS
from .tree import (
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


def dimension_of(expr: Expr) -> Dimension:
    """Return the dimension of an expression.

    Raises:
        DefinitionError: if terms of unlike dimension are added, or a function or an exponent
            is taken of something that is not a plain number.
    """
    match expr:
        case Symbol():
            return expr.definition.dimension
        case Constant(name):
            return CONSTANTS[name].dimension
        case Number():
            return ONE
        case Negative(operand):
            return dimension_of(operand)
        case Sum(terms):
            return _common(terms)
        case Product(factors):
            product = ONE
            for factor in factors:
                product = product * dimension_of(factor)
            return product
        case Quotient(numerator, denominator):
            return dimension_of(numerator) / dimension_of(denominator)
        case Root(radicand):
            return dimension_of(radicand) ** Fraction(1, 2)
        case Power(base, exponent):
            return _power(base, exponent)
        case Function(name, argument):
            _require_number(argument, f"the argument of {name}")
            return ONE
        case Integral(integrand, variable, low, high):
            return dimension_of(integrand) * _of_limits(variable, low, high)
    raise DefinitionError(f"expression {expr!r}", "it is no node of an expression tree")


def _common(terms: tuple[Expr, ...]) -> Dimension:
    first, *others = (dimension_of(term) for term in terms)
    for other in others:
        if other != first:
            raise DefinitionError("a sum", f"{first} and {other} cannot be added")
    return first


def _of_limits(variable: Symbol, low: Expr, high: Expr) -> Dimension:
    dimension = dimension_of(variable)
    for limit in (dimension_of(low), dimension_of(high)):
        if limit != dimension:
            raise DefinitionError("an integral", f"over {dimension} it has a limit in {limit}")
    return dimension


def _power(base: Expr, exponent: Expr) -> Dimension:
    _require_number(exponent, "an exponent")
    dimension = dimension_of(base)
    if dimension.is_one:
        return ONE
    if isinstance(exponent, Number):
        return dimension**exponent.value
    raise DefinitionError("a power", f"a base in {dimension} has an exponent that may vary")


def _require_number(expr: Expr, what: str) -> None:
    dimension = dimension_of(expr)
    if not dimension.is_one:
        raise DefinitionError(what, f"it must be a plain number and is in {dimension}")
