"""An expression as a function of one unknown: what does not depend on it is computed once.

The search for roots evaluates the same expression thousands of times; walking its tree each
time, and its constant parts again, would cost most of the search.
"""

from __future__ import annotations

from collections.abc import Callable, Mapping
from dataclasses import dataclass
from typing import Any

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
from .balls import (
    BALL_FUNCTIONS,
    Ball,
    OutsideDomainError,
    ball_power,
    ball_root,
    ball_whole_power,
    evaluate,
)

Value = Any  # a ball or a series of balls
Bound = Callable[[Value], Value]


@dataclass(frozen=True)
class Arithmetic:
    """The operations of one kind of value that are not Python operators.

    Attributes:
        functions: functions of one value, by name.
        root: the square root.
        power: base and exponent to a power.
        whole_power: base and whole exponent to a power.
    """

    functions: Mapping[str, Callable[[Value], Value]]
    root: Callable[[Value], Value]
    power: Callable[[Value, Value], Value]
    whole_power: Callable[[Value, int], Value]


BALLS = Arithmetic(BALL_FUNCTIONS, ball_root, ball_power, ball_whole_power)


def bind(
    expr: Expr, values: Mapping[Symbol, Ball], unknown: Symbol, arithmetic: Arithmetic
) -> Bound:
    """Return an expression as a function of one of its symbols.

    Args:
        expr: the expression.
        values: ball of every other symbol.
        unknown: the symbol.
        arithmetic: the operations on its values.

    Returns:
        The function. It raises ``OutsideDomainError`` where the expression is defined nowhere.
    """
    if expr == unknown:
        return lambda x: x
    if unknown not in set(symbols_in(expr)):
        return _constant(expr, values)

    def inside(part: Expr) -> Bound:
        return bind(part, values, unknown, arithmetic)

    match expr:
        case Sum(terms):
            return _sum(tuple(inside(term) for term in terms))
        case Product(factors):
            return _product(tuple(inside(factor) for factor in factors))
        case Quotient(numerator, denominator):
            above, below = inside(numerator), inside(denominator)
            return lambda x: above(x) / below(x)
        case Negative(operand):
            positive = inside(operand)
            return lambda x: -positive(x)
        case Power(base, Number(value)) if value.denominator == 1:
            raised, whole = inside(base), int(value)
            return lambda x: arithmetic.whole_power(raised(x), whole)
        case Power(base, exponent):
            raised, power = inside(base), inside(exponent)
            return lambda x: arithmetic.power(raised(x), power(x))
        case Root(radicand):
            under = inside(radicand)
            return lambda x: arithmetic.root(under(x))
        case Function(name, argument):
            of, function = inside(argument), arithmetic.functions[name]
            return lambda x: function(of(x))
        case Integral():
            return lambda x: evaluate(expr, {**values, unknown: x})
    raise DefinitionError(f"expression {expr!r}", "it is no node of an expression tree")


def _constant(expr: Expr, values: Mapping[Symbol, Ball]) -> Bound:
    try:
        value = evaluate(expr, values)
    except OutsideDomainError:
        return _nowhere
    return lambda x: value


def _nowhere(_: Value) -> Value:
    raise OutsideDomainError


def _sum(terms: tuple[Bound, ...]) -> Bound:
    first, *others = terms

    def total(x: Value) -> Value:
        found = first(x)
        for term in others:
            found = found + term(x)
        return found

    return total


def _product(factors: tuple[Bound, ...]) -> Bound:
    first, *others = factors

    def product(x: Value) -> Value:
        found = first(x)
        for factor in others:
            found = found * factor(x)
        return found

    return product
