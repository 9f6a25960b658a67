"""Isolation of an unknown that occurs once: the outermost operation is undone, move by move."""

from __future__ import annotations

from dataclasses import dataclass
from fractions import Fraction

from ..expressions import (
    Equation,
    Expr,
    Function,
    Negative,
    Number,
    Power,
    Product,
    Quotient,
    Root,
    Sum,
    Symbol,
    children,
    symbols_in,
)
from .principal import has_one_inverse, never_negative


@dataclass(frozen=True)
class Move:
    """One algebraic action on both sides of an equation.

    Attributes:
        action: what is done, one of ``ACTIONS``.
        operand: what it is done with; ``None`` where the action needs nothing.
        result: the equation afterwards.
    """

    action: str
    operand: Expr | None
    result: Equation


ACTIONS = (
    "exchange sides",
    "add",
    "subtract",
    "multiply by",
    "divide by",
    "take reciprocals and multiply by",
    "change signs",
    "square",
    "take the positive square root",
    "raise to the power",
    "take logarithms and divide by",
    "raise 10 to both sides",
    "apply",
    "collect powers of",
)

_TEN = Number(Fraction(10))
_INVERSE = {
    "exp": "ln",
    "ln": "exp",
    "sin": "arcsin",
    "cos": "arccos",
    "tan": "arctan",
    "arcsin": "sin",
    "arccos": "cos",
    "arctan": "tan",
}


@dataclass(frozen=True)
class Isolation:
    """The way from a published equation to its solved form.

    Attributes:
        moves: the moves, in order.
        solved: the expression that equals the unknown.
    """

    moves: tuple[Move, ...]
    solved: Expr


def occurrences(equation: Equation, unknown: Symbol) -> int:
    """Return how often a symbol occurs in an equation."""
    return sum(s == unknown for side in (equation.left, equation.right) for s in symbols_in(side))


def isolate(equation: Equation, unknown: Symbol) -> Isolation | None:
    """Isolate an unknown by moves.

    Returns:
        The moves and the solved form, or ``None`` if the unknown does not occur exactly once
        or an operation on the way has no single inverse.
    """
    if occurrences(equation, unknown) != 1:
        return None
    moves: list[Move] = []
    side, other = equation.left, equation.right
    if _holds(other, unknown):
        side, other = other, side
        moves.append(Move("exchange sides", None, Equation(side, other)))
    while side != unknown:
        step = _undo(side, other, unknown)
        if step is None:
            return None
        move, side, other = step
        moves.append(move)
    return Isolation(tuple(moves), other)


def gather(equation: Equation, unknown: Symbol) -> Isolation | None:
    """Undo operations until the innermost expression that holds every occurrence stands alone.

    Returns:
        The moves, the last of which shows that expression on the left, and what it equals;
        or ``None`` if the unknown is on both sides or no operation can be undone.
    """
    moves: list[Move] = []
    side, other = equation.left, equation.right
    if _holds(other, unknown):
        side, other = other, side
        moves.append(Move("exchange sides", None, Equation(side, other)))
    if _holds(other, unknown):
        return None
    exchanged = len(moves)
    while sum(_holds(child, unknown) for child in children(side)) == 1:
        step = _undo(side, other, unknown)
        if step is None:
            break
        move, side, other = step
        moves.append(move)
    return Isolation(tuple(moves), other) if len(moves) > exchanged else None


_Undone = tuple[Move, Expr, Expr]


def _undo(side: Expr, other: Expr, unknown: Symbol) -> _Undone | None:
    match side:
        case Sum(terms):
            return _undo_sum(terms, other, unknown)
        case Negative(operand):
            return _moved("change signs", None, operand, Negative(other))
        case Product(factors):
            rest = tuple(factor for factor in factors if not _holds(factor, unknown))
            inner = next(factor for factor in factors if _holds(factor, unknown))
            divisor = rest[0] if len(rest) == 1 else Product(rest)
            return _moved("divide by", divisor, inner, divide(other, divisor))
        case Quotient(numerator, denominator) if _holds(numerator, unknown):
            return _moved("multiply by", denominator, numerator, times(denominator, other))
        case Quotient(numerator, denominator):
            return _moved(
                "take reciprocals and multiply by", numerator, denominator, divide(numerator, other)
            )
        case Root(radicand):
            return _moved("square", None, radicand, Power(other, Number(Fraction(2))))
        case Power(base, exponent) if _holds(base, unknown):
            return _undo_power(base, exponent, other)
        case Power(Number(base), exponent) if base == 10:
            logarithm = Function("lg", other)
            return _moved("apply", logarithm, exponent, logarithm)
        case Power(base, exponent):
            logarithm = Function("ln", base)
            solved = Quotient(Function("ln", other), logarithm)
            return _moved("take logarithms and divide by", logarithm, exponent, solved)
        case Function("lg", argument):
            return _moved("raise 10 to both sides", None, argument, Power(_TEN, other))
        case Function(name, argument) if has_one_inverse(name, argument):
            inverse = _INVERSE[name]
            return _moved("apply", Function(inverse, other), argument, Function(inverse, other))
        case _:
            return None


def _undo_sum(terms: tuple[Expr, ...], other: Expr, unknown: Symbol) -> _Undone:
    inner = next(term for term in terms if _holds(term, unknown))
    rest = tuple(term for term in terms if not _holds(term, unknown))
    if len(rest) == 1 and isinstance(rest[0], Negative):
        return _moved("add", rest[0].operand, inner, other + rest[0].operand)
    known = rest[0] if len(rest) == 1 else Sum(rest)
    return _moved("subtract", known, inner, other - known)


def _undo_power(base: Expr, exponent: Expr, other: Expr) -> _Undone | None:
    even = isinstance(exponent, Number) and exponent.value.numerator % 2 == 0
    if even and not never_negative(base):
        return None
    if exponent == Number(Fraction(2)):
        return _moved("take the positive square root", None, base, Root(other))
    inverse = reciprocal(exponent)
    return _moved("raise to the power", inverse, base, Power(other, inverse))


def _moved(action: str, operand: Expr | None, side: Expr, other: Expr) -> _Undone:
    return Move(action, operand, Equation(side, other)), side, other


def _holds(expr: Expr, unknown: Symbol) -> bool:
    return unknown in set(symbols_in(expr))


def times(factor: Expr, other: Expr) -> Expr:
    """Return the product, with fractions multiplied into their numerator."""
    if isinstance(other, Quotient) and other.numerator == Number(Fraction(1)):
        return divide(factor, other.denominator)
    if isinstance(other, Quotient):
        return Quotient(times(factor, other.numerator), other.denominator)
    return factor * other


def divide(numerator: Expr, divisor: Expr) -> Expr:
    """Return the quotient as one fraction where an operand is one already."""
    if divisor == Number(Fraction(1)):
        return numerator
    if isinstance(divisor, Quotient) and divisor.numerator == Number(Fraction(1)):
        return times(numerator, divisor.denominator)
    if isinstance(divisor, Quotient):
        return times(numerator, Quotient(divisor.denominator, divisor.numerator))
    if isinstance(numerator, Quotient):
        return Quotient(numerator.numerator, numerator.denominator * divisor)
    if isinstance(divisor, Product) and isinstance(divisor.factors[0], Quotient):
        first, rest = divisor.factors[0], divisor.factors[1:]
        below = rest[0] if len(rest) == 1 else Product(rest)
        return divide(divide(numerator, first), below)
    return Quotient(numerator, divisor)


def reciprocal(expr: Expr) -> Expr:
    """Return one over an expression, written as a handbook would."""
    match expr:
        case Number(value):
            return Number(1 / value)
        case Quotient(Number(value), denominator) if value == 1:
            return denominator
        case Quotient(numerator, denominator):
            return Quotient(denominator, numerator)
        case Negative(operand):
            return Negative(reciprocal(operand))
        case _:
            return Quotient(Number(Fraction(1)), expr)
