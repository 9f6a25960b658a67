"""Taylor forms: enclosures that narrow with a high power of the width of a cell.

Plain ball arithmetic forgets that an unknown that occurs several times is the same each time.
A Taylor polynomial around the middle of a cell, with its remainder enclosed over the cell,
does not: sides that nearly cancel are told apart in cells of ordinary width.
"""

from __future__ import annotations

from collections.abc import Callable, Iterator, Mapping
from contextlib import contextmanager
from dataclasses import dataclass
from types import MappingProxyType
from typing import Any

from flint import arb, arb_series, ctx

from ..expressions import Expr, Symbol, integrals_in
from .balls import Ball, OutsideDomainError
from .bound import Arithmetic, bind

ORDER = 6

Series = Any  # flint.arb_series has no type information

_FUNCTIONS: Mapping[str, Callable[[Series], Series]] = MappingProxyType(
    {
        "exp": lambda x: x.exp(),
        "ln": lambda x: x.log(),
        "lg": lambda x: x.log() / arb(10).log(),
        "sin": lambda x: x.sin(),
        "cos": lambda x: x.cos(),
        "tan": lambda x: x.tan(),
        "arcsin": lambda x: x.asin(),
        "arccos": lambda x: x.acos(),
        "arctan": lambda x: x.atan(),
    }
)


@dataclass(frozen=True)
class TaylorForm:
    """Enclosures of a function over a cell.

    Attributes:
        value: ball of the function.
        slope: ball of its derivative.
    """

    value: Ball
    slope: Ball


def taylor_form(
    expr: Expr, values: Mapping[Symbol, Ball], unknown: Symbol
) -> Callable[[Ball], TaylorForm | None]:
    """Return the Taylor form of an expression as a function of a cell of its unknown.

    Args:
        expr: the expression.
        values: ball of every other symbol.
        unknown: the symbol that varies.

    Returns:
        A function of the cell; it returns ``None`` where the expression is not smooth all over
        the cell.
    """
    if any(integrals_in(expr)):
        return lambda cell: None  # an integral has its derivative, but no series here
    function = bind(expr, values, unknown, _SERIES)

    def form(cell: Ball) -> TaylorForm | None:
        centre = arb(cell.mid())
        with _order(ORDER):
            try:
                at_centre = _coefficients(function(arb_series([centre, 1])))
                over_cell = _coefficients(function(arb_series([cell, 1])))
            except (OutsideDomainError, ZeroDivisionError, ValueError):
                return None
        return _enclosed(at_centre, over_cell[-1], cell - centre)

    return form


def _enclosed(at_centre: list[Ball], remainder: Ball, away: Ball) -> TaylorForm | None:
    terms = [*at_centre[:-1], remainder]
    value, slope = arb(0), arb(0)
    for power in range(ORDER - 1, -1, -1):
        value = value * away + terms[power]
    for power in range(ORDER - 1, 0, -1):
        slope = slope * away + terms[power] * power
    if not (value.is_finite() and slope.is_finite()):
        return None
    return TaylorForm(value, slope)


@contextmanager
def _order(count: int) -> Iterator[None]:
    """Keep so many terms of every series made inside."""
    before = ctx.cap
    ctx.cap = count
    try:
        yield
    finally:
        ctx.cap = before


def _coefficients(series: Series) -> list[Ball]:
    found = list(series.coeffs()) if isinstance(series, arb_series) else [series]
    return found + [arb(0)] * (ORDER - len(found))


def _whole_power(base: Series, exponent: int) -> Series:
    return base**exponent if exponent >= 0 else 1 / base**-exponent


def _power(base: Series, exponent: Series) -> Series:
    """A power by its logarithm, whether the unknown stands in the base, the exponent or both."""
    return (exponent * base.log()).exp()


_SERIES = Arithmetic(_FUNCTIONS, lambda radicand: radicand.sqrt(), _power, _whole_power)
