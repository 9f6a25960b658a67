"""The same expression for computer algebra. Trees become objects there, never text."""

from __future__ import annotations

from typing import Any

from ..errors import DefinitionError
from .constants import CONSTANTS
from .tree import (
    Constant,
    Equation,
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


def to_sympy(expr: Expr) -> Any:
    """Return the expression as a sympy object, evaluated as sympy does; integrals are not.

    Symbols carry the sign that the bounds of their quantity prove; constants other than π
    stay symbols, so that an equation keeps its form.
    """
    import sympy

    match expr:
        case Symbol():
            positive = expr.definition.low >= 0 or None
            return sympy.Symbol(str(expr), real=True, positive=positive)
        case Constant("pi"):
            return sympy.pi
        case Constant(name):
            return sympy.Symbol(CONSTANTS[name].name, positive=True)
        case Number(value):
            return sympy.Rational(value.numerator, value.denominator)
        case Negative(operand):
            return -to_sympy(operand)
        case Sum(terms):
            return sympy.Add(*(to_sympy(term) for term in terms))
        case Product(factors):
            return sympy.Mul(*(to_sympy(factor) for factor in factors))
        case Quotient(numerator, denominator):
            return to_sympy(numerator) / to_sympy(denominator)
        case Power(base, exponent):
            return to_sympy(base) ** to_sympy(exponent)
        case Root(radicand):
            return sympy.sqrt(to_sympy(radicand))
        case Function(name, argument):
            return _functions()[name](to_sympy(argument))
        case Integral(integrand, variable, low, high):
            limits = (to_sympy(variable), to_sympy(low), to_sympy(high))
            return sympy.Integral(to_sympy(integrand), limits)
    raise DefinitionError(f"expression {expr!r}", "it is no node of an expression tree")


def equation_to_sympy(equation: Equation) -> Any:
    """Return the equation as ``sympy.Eq``."""
    import sympy

    return sympy.Eq(to_sympy(equation.left), to_sympy(equation.right), evaluate=False)


def _functions() -> dict[str, Any]:
    import sympy

    return {
        "exp": sympy.exp,
        "ln": sympy.log,
        "lg": lambda argument: sympy.log(argument, 10),
        "sin": sympy.sin,
        "cos": sympy.cos,
        "tan": sympy.tan,
        "arcsin": sympy.asin,
        "arccos": sympy.acos,
        "arctan": sympy.atan,
    }
