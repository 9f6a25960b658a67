"""The derivative of an expression, to prove that a root is the only one in its bracket."""

from __future__ import annotations

from fractions import Fraction

from .tree import (
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
    substitute,
    symbols_in,
)

_ZERO = Number(Fraction(0))
_ONE = Number(Fraction(1))


def derivative(expr: Expr, variable: Symbol) -> Expr:
    """Return the derivative with respect to a symbol, not simplified beyond zero terms."""
    if variable not in set(symbols_in(expr)):
        return _ZERO
    match expr:
        case Negative(operand):
            return Negative(derivative(operand, variable))
        case Sum(terms):
            return _sum(tuple(derivative(term, variable) for term in terms))
        case Product(factors):
            return _product_rule(factors, variable)
        case Quotient(numerator, denominator):
            top = derivative(numerator, variable)
            below = derivative(denominator, variable)
            if below == _ZERO:
                return top / denominator
            return (top * denominator - numerator * below) / denominator**2
        case Root(radicand):
            return derivative(radicand, variable) / (2 * expr)
        case Power(base, exponent):
            return _power_rule(expr, base, exponent, variable)
        case Function(name, argument):
            return derivative(argument, variable) * _outer(name, argument)
        case Integral():
            return _leibniz(expr, variable)
        case _:
            return _ONE


def _sum(terms: tuple[Expr, ...]) -> Expr:
    kept = tuple(term for term in terms if term != _ZERO)
    return kept[0] if len(kept) == 1 else Sum(kept) if kept else _ZERO


def _product_rule(factors: tuple[Expr, ...], variable: Symbol) -> Expr:
    terms = []
    for index, factor in enumerate(factors):
        changed = derivative(factor, variable)
        if changed != _ZERO:
            terms.append(Product((*factors[:index], changed, *factors[index + 1 :])))
    return _sum(tuple(terms))


def _power_rule(power: Expr, base: Expr, exponent: Expr, variable: Symbol) -> Expr:
    in_base = derivative(base, variable)
    in_exponent = derivative(exponent, variable)
    terms: list[Expr] = []
    if in_base != _ZERO:
        # A whole exponent stays one: its base may be negative.
        less = Number(exponent.value - 1) if isinstance(exponent, Number) else exponent - 1
        terms.append(exponent * base**less * in_base)
    if in_exponent != _ZERO:
        terms.append(power * Function("ln", base) * in_exponent)
    return _sum(tuple(terms))


def _leibniz(integral: Integral, variable: Symbol) -> Expr:
    """The limits move, and the integrand changes between them."""
    terms: list[Expr] = []
    at_high = substitute(integral.integrand, {integral.variable: integral.high})
    at_low = substitute(integral.integrand, {integral.variable: integral.low})
    for end, limit in ((at_high, integral.high), (Negative(at_low), integral.low)):
        rate = derivative(limit, variable)
        if rate != _ZERO:
            terms.append(end * rate)
    inside = derivative(integral.integrand, variable)
    if inside != _ZERO:
        terms.append(Integral(inside, integral.variable, integral.low, integral.high))
    return _sum(tuple(terms))


def _outer(name: str, argument: Expr) -> Expr:
    match name:
        case "exp":
            return Function("exp", argument)
        case "ln":
            return 1 / argument
        case "lg":
            return 1 / (argument * Function("ln", Number(Fraction(10))))
        case "sin":
            return Function("cos", argument)
        case "cos":
            return Negative(Function("sin", argument))
        case "tan":
            return 1 / Function("cos", argument) ** 2
        case "arcsin":
            return 1 / Root(1 - argument**2)
        case "arccos":
            return Negative(1 / Root(1 - argument**2))
        case _:
            return 1 / (1 + argument**2)
