"""Where undoing an operation loses no root: ranges that follow from the bounds of quantities.

An arcsine answers between -π/2 and π/2 only, an even root only with a positive number. Such a
move may be made where the bounds of the quantities under it leave no other answer.
"""

from __future__ import annotations

from fractions import Fraction

from ..expressions import (
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
)

_QUARTER = Fraction("1.57079632679489661923")  # of a turn
_ROUNDING = Fraction(1, 10**15)  # bounds of quantities are written with 17 digits
_Range = tuple[Fraction, Fraction]
_PRINCIPAL: dict[str, _Range] = {
    "sin": (-_QUARTER, _QUARTER),
    "cos": (Fraction(0), 2 * _QUARTER),
    "tan": (-_QUARTER, _QUARTER),
}
_POSITIVE: dict[str, _Range] = {
    "sin": (Fraction(0), 2 * _QUARTER),
    "cos": (-_QUARTER, _QUARTER),
    "tan": (Fraction(0), _QUARTER),
}


def has_one_inverse(function: str, argument: Expr) -> bool:
    """Return whether the inverse of a function gives back every argument within its bounds.

    Args:
        function: name of the function.
        argument: what it is taken of.
    """
    return function not in _PRINCIPAL or _within(argument, _PRINCIPAL[function])


def never_negative(expr: Expr) -> bool:
    """Return whether the bounds of quantities leave an expression no negative value."""
    match expr:
        case Number(value):
            return value >= 0
        case Symbol():
            return expr.definition.low >= 0
        case Root() | Function("exp", _):
            return True
        case Function(name, argument) if name in _POSITIVE:
            return _within(argument, _POSITIVE[name])
        case Sum(parts) | Product(parts):
            return all(never_negative(part) for part in parts)
        case Quotient(numerator, denominator):
            return never_negative(numerator) and never_negative(denominator)
        case Power(base, _):
            return never_negative(base)
        case _:
            return False


def _within(expr: Expr, allowed: _Range) -> bool:
    found = _range(expr)
    if found is None:
        return False
    return allowed[0] - _ROUNDING <= found[0] and found[1] <= allowed[1] + _ROUNDING


def _range(expr: Expr) -> _Range | None:
    """The range of sums and of products with numbers over the bounds; ``None`` of all else."""
    match expr:
        case Number(value):
            return value, value
        case Symbol():
            return expr.definition.low, expr.definition.high
        case Negative(operand):
            return _scaled(_range(operand), Fraction(-1))
        case Product((Number(value), factor)):
            return _scaled(_range(factor), value)
        case Quotient(numerator, Number(value)):
            return _scaled(_range(numerator), 1 / value)
        case Sum(terms):
            ranges = [found for term in terms if (found := _range(term)) is not None]
            if len(ranges) < len(terms):
                return None
            zero = Fraction(0)
            return sum((low for low, _ in ranges), zero), sum((high for _, high in ranges), zero)
        case _:
            return None


def _scaled(found: _Range | None, factor: Fraction) -> _Range | None:
    if found is None:
        return None
    first, second = found[0] * factor, found[1] * factor
    return min(first, second), max(first, second)
