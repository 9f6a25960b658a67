"""The course of a bisection, so that a root can be followed by hand and in a workbook."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass
from fractions import Fraction

from ..expressions import Equation, Symbol
from .balls import Ball, evaluate, exact_ball, midpoint
from .quadrature import Table, tables_at, with_totals

HALVINGS = 64


@dataclass(frozen=True)
class Halving:
    """One row of a bisection.

    Attributes:
        low: lower end of the interval.
        high: upper end.
        residual: difference of both sides at the middle, over the sum of their magnitudes.
        tables: the integrals of the relation at the middle, as sums.
    """

    low: float
    high: float
    residual: float
    tables: tuple[Table, ...]


@dataclass(frozen=True)
class Bisection:
    """A bisection in an interval at whose ends the sides of a relation change order.

    Attributes:
        start: the integrals of the relation at the lower end of the interval, as sums.
        rows: its rows in double precision.
    """

    start: tuple[Table, ...]
    rows: tuple[Halving, ...]


@dataclass(frozen=True)
class Search:
    """What a bisection halves for.

    Attributes:
        published: the relation.
        unknown: the symbol whose value is sought.
        values: a ball for every other symbol.
        tables: its integrals at the root, as sums.
    """

    published: Equation
    unknown: Symbol
    values: Mapping[Symbol, Ball]
    tables: tuple[Table, ...]

    def bisection(self, bracket: tuple[Fraction, Fraction]) -> Bisection:
        """Return the course between two ends."""
        low, high = (float(end) for end in bracket)
        at_low, start = self._residual(low)
        rows = []
        for _ in range(HALVINGS + 1):
            middle = (low + high) / 2
            residual, tables = self._residual(middle)
            rows.append(Halving(low, high, residual, tables))
            if (residual > 0) == (at_low > 0):
                low = middle
            else:
                high = middle
        return Bisection(start, tuple(rows))

    def _residual(self, at: float) -> tuple[float, tuple[Table, ...]]:
        """Relative difference of both sides, integrals being the sums that a workbook has."""
        values = {**self.values, self.unknown: exact_ball(Fraction(at))}
        tables = tables_at(self.tables, values)
        left, right = (
            evaluate(with_totals(side, tables), values)
            for side in (self.published.left, self.published.right)
        )
        return midpoint((left - right) / (abs(left) + abs(right))), tables
