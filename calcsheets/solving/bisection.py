"""The course of a bisection, so that a root can be followed by hand and in a workbook."""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass
from fractions import Fraction

from .balls import Ball, exact_ball, midpoint

HALVINGS = 64


@dataclass(frozen=True)
class Halving:
    """One row of a bisection.

    Attributes:
        low: lower end of the interval.
        high: upper end.
        residual: difference of both sides at the middle, over the sum of their magnitudes.
    """

    low: float
    high: float
    residual: float


def halvings(
    residual: Callable[[Ball], Ball], bracket: tuple[Fraction, Fraction]
) -> tuple[Halving, ...]:
    """Return the rows of a bisection in double precision.

    Args:
        residual: relative difference of both sides of the relation.
        bracket: interval at whose ends the residual has opposite signs.
    """
    low, high = (float(end) for end in bracket)
    lower_positive = residual(exact_ball(Fraction(low))) > 0
    rows = []
    for _ in range(HALVINGS + 1):
        middle = (low + high) / 2
        value = midpoint(residual(exact_ball(Fraction(middle))))
        rows.append(Halving(low, high, value))
        if (value > 0) == lower_positive:
            low = middle
        else:
            high = middle
    return tuple(rows)
