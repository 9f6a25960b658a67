"""Integrals as sums over places, so that they can be followed by hand and in a workbook.

The sum is that of Gauss and Legendre in equal parts of the way. How many parts an integral
needs is decided by its proved enclosure; it is given up where the sum does not come near.
"""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from dataclasses import dataclass
from fractions import Fraction
from functools import lru_cache

from flint import arb

from ..errors import UntabulatedIntegral
from ..expressions import Expr, Integral, Number, Symbol, integrals_in, replace_integrals
from .balls import Ball, evaluate, midpoint
from .bound import BALLS, bind

PLACES_OF_A_PART = 16
_PARTS = (1, 2, 4, 8)
_NEAR = arb(2) ** -50


@dataclass(frozen=True)
class Table:
    """An integral as a sum, each number the double nearest to the exact one.

    Attributes:
        integral: the integral.
        places: where the integrand is taken, as shares of the way from low to high.
        weights: weight of each place; their sum is one.
        low: lower limit.
        high: upper limit.
        at: the variable at each place.
        heights: the integrand at each place.
        total: width times the weighted sum of the heights.
    """

    integral: Integral
    places: tuple[float, ...]
    weights: tuple[float, ...]
    low: float
    high: float
    at: tuple[float, ...]
    heights: tuple[float, ...]
    total: float


def tables_of(expr: Expr, values: Mapping[Symbol, Ball]) -> tuple[Table, ...]:
    """Return each different integral of an expression as a sum.

    Args:
        expr: the expression.
        values: a ball in coherent SI for each of its symbols.

    Raises:
        UntabulatedIntegral: if no sum comes near the integral.
    """
    return tuple(_table(integral, values) for integral in dict.fromkeys(integrals_in(expr)))


def tables_alike(integral: Integral, rows: Sequence[Mapping[Symbol, Ball]]) -> tuple[Table, ...]:
    """Return an integral as a sum over the same places for several sets of values.

    Raises:
        UntabulatedIntegral: if no sum comes near the integral.
    """
    count = max(len(_table(integral, values).places) for values in rows)
    return tuple(_as_table(integral, _parts(integral, values, count)) for values in rows)


def tables_at(tables: tuple[Table, ...], values: Mapping[Symbol, Ball]) -> tuple[Table, ...]:
    """Return the same sums for other values."""
    return tuple(
        _as_table(table.integral, _parts(table.integral, values, len(table.places)))
        for table in tables
    )


def with_totals(expr: Expr, tables: tuple[Table, ...]) -> Expr:
    """Return an expression with each integral replaced by its sum, as a workbook has it."""
    totals: dict[Integral, Expr] = {
        table.integral: Number(Fraction(table.total)) for table in tables
    }
    return replace_integrals(expr, totals)


def widest_of(table: Table, values: Mapping[Symbol, Ball]) -> tuple[Ball, Ball, Ball]:
    """Return the widest limit, the widest height and the total of a sum, as balls.

    Args:
        table: the sum.
        values: a ball for each of its symbols.

    Raises:
        OutsideDomainError: if it is defined nowhere in the balls.
    """
    parts = _parts(table.integral, values, len(table.places))
    limits, heights = ((parts.low, parts.high, *parts.at), parts.heights)
    widest = (max(group, key=lambda ball: float(ball.rad())) for group in (limits, heights))
    return (*widest, parts.total)


def _table(integral: Integral, values: Mapping[Symbol, Ball]) -> Table:
    exact = evaluate(integral, values)
    for count in (number * PLACES_OF_A_PART for number in _PARTS):
        parts = _parts(integral, values, count)
        apart = abs(arb(parts.total.mid()) - arb(exact.mid()))
        if apart <= parts.size * _NEAR + exact.rad() + parts.total.rad():
            return _as_table(integral, parts)
    raise UntabulatedIntegral(str(integral.variable), count)


@dataclass(frozen=True)
class _Parts:
    """A sum in balls."""

    low: Ball
    high: Ball
    at: tuple[Ball, ...]
    heights: tuple[Ball, ...]
    total: Ball
    size: Ball


def _parts(integral: Integral, values: Mapping[Symbol, Ball], count: int) -> _Parts:
    """The sum; its size is the total of the magnitudes."""
    low, high = evaluate(integral.low, values), evaluate(integral.high, values)
    places, weights = _gauss_legendre(count)
    at = tuple(low + (high - low) * place for place in places)
    integrand = bind(integral.integrand, values, integral.variable, BALLS)
    heights = tuple(integrand(y) for y in at)
    weighted = [weight * height for weight, height in zip(weights, heights, strict=True)]
    size = sum((abs(part) for part in weighted), arb(0))
    total = sum(weighted, arb(0))
    return _Parts(low, high, at, heights, (high - low) * total, abs(high - low) * size)


def _as_table(integral: Integral, parts: _Parts) -> Table:
    places, weights = _gauss_legendre(len(parts.at))
    return Table(
        integral=integral,
        places=tuple(midpoint(place) for place in places),
        weights=tuple(midpoint(weight) for weight in weights),
        low=midpoint(parts.low),
        high=midpoint(parts.high),
        at=tuple(midpoint(y) for y in parts.at),
        heights=tuple(midpoint(height) for height in parts.heights),
        total=midpoint(parts.total),
    )


@lru_cache(maxsize=64)
def _gauss_legendre(count: int) -> tuple[tuple[Ball, ...], tuple[Ball, ...]]:
    """Places between 0 and 1 in rising order, and their weights, by the library's own roots."""
    parts = count // PLACES_OF_A_PART
    roots = [
        arb.legendre_p_root(PLACES_OF_A_PART, index, weight=True)
        for index in reversed(range(PLACES_OF_A_PART))
    ]
    places, weights = [], []
    for part in range(parts):
        for root, weight in roots:
            places.append((part + (1 + root) / 2) / parts)
            weights.append(weight / 2 / parts)
    return tuple(places), tuple(weights)
