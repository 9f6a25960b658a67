"""An integrand as a function of a complex ball, as rigorous integration asks for it.

The integrator encloses the integrand on ellipses around parts of the path, so the function
must say where it is not analytic: roots, logarithms and powers have a cut along the negative
real axis.
"""

from __future__ import annotations

from collections.abc import Callable, Mapping
from types import MappingProxyType
from typing import Any

from flint import acb, arb

from ..errors import DefinitionError
from ..expressions import (
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
    symbols_in,
)

ComplexBall = Any  # flint.acb has no type information
ComplexFunction = Callable[[ComplexBall, bool], ComplexBall]

_NOWHERE = acb("nan")


def complex_function(expr: Expr, variable: Symbol, known: Callable[[Expr], Any]) -> ComplexFunction:
    """Return an expression as a function of one of its symbols.

    Args:
        expr: the expression.
        variable: the symbol that becomes complex.
        known: the real ball of a part that does not hold the symbol.

    Returns:
        A function of a complex ball and of whether it must be analytic there; it is not
        finite where it is not.
    """

    def of(node: Expr) -> ComplexFunction:
        return complex_function(node, variable, known)

    if variable not in set(symbols_in(expr)):
        constant = acb(known(expr))
        return lambda x, analytic: constant
    match expr:
        case Symbol():
            return lambda x, analytic: x
        case Negative(operand):
            inner = of(operand)
            return lambda x, analytic: -inner(x, analytic)
        case Sum(terms):
            return _folded([of(term) for term in terms], lambda a, b: a + b)
        case Product(factors):
            return _folded([of(factor) for factor in factors], lambda a, b: a * b)
        case Quotient(numerator, denominator):
            return _folded([of(numerator), of(denominator)], lambda a, b: a / b)
        case Root(radicand):
            inner = of(radicand)
            return lambda x, analytic: inner(x, analytic).sqrt(analytic=analytic)
        case Power(base, Number(value)) if value.denominator == 1:
            inner = of(base)
            return lambda x, analytic: inner(x, analytic) ** int(value)
        case Power(base, exponent):
            inner, outer = of(base), of(exponent)
            return lambda x, analytic: _power(inner(x, analytic), outer(x, analytic), analytic)
        case Function(name, argument):
            inner, function = of(argument), _FUNCTIONS[name]
            return lambda x, analytic: function(inner(x, analytic), analytic)
        case Integral():
            raise DefinitionError("an integral", "its integrand holds another integral")
    raise DefinitionError(f"expression {expr!r}", "it is no node of an expression tree")


def _folded(
    parts: list[ComplexFunction], operation: Callable[[ComplexBall, ComplexBall], ComplexBall]
) -> ComplexFunction:
    first, *others = parts

    def function(x: ComplexBall, analytic: bool) -> ComplexBall:
        value = first(x, analytic)
        for other in others:
            value = operation(value, other(x, analytic))
        return value

    return function


def _power(base: ComplexBall, exponent: ComplexBall, analytic: bool) -> ComplexBall:
    if not analytic and base.contains(0) and exponent.imag == 0 and exponent.real > 0:
        largest = arb(abs(base).upper())
        bound = largest**exponent.real if largest > 0 else arb(0)
        either = bound.union(-bound)
        return acb(either, either)
    return base.pow(exponent, analytic=analytic)


def _off_the_cut(
    function: Callable[[ComplexBall], ComplexBall], inside: Callable[[ComplexBall], bool]
) -> ComplexFunction:
    def checked(x: ComplexBall, analytic: bool) -> ComplexBall:
        return function(x) if not analytic or inside(x) else _NOWHERE

    return checked


def _between_cuts(x: ComplexBall) -> bool:
    """Arcsine and arccosine have cuts on the real axis outside −1 to 1."""
    return bool(abs(x.real) < 1) or not x.imag.contains(0)


def _beside_cuts(x: ComplexBall) -> bool:
    """The arctangent has cuts on the imaginary axis outside −i to i."""
    return bool(abs(x.imag) < 1) or not x.real.contains(0)


_FUNCTIONS: Mapping[str, ComplexFunction] = MappingProxyType(
    {
        "exp": lambda x, analytic: x.exp(),
        "ln": lambda x, analytic: x.log(analytic=analytic),
        "lg": lambda x, analytic: x.log(analytic=analytic) / arb(10).log(),
        "sin": lambda x, analytic: x.sin(),
        "cos": lambda x, analytic: x.cos(),
        "tan": lambda x, analytic: x.tan(),
        "arcsin": _off_the_cut(lambda x: x.asin(), _between_cuts),
        "arccos": _off_the_cut(lambda x: x.acos(), _between_cuts),
        "arctan": _off_the_cut(lambda x: x.atan(), _beside_cuts),
    }
)
