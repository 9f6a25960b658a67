"""How an entry of the vocabulary is written."""

from __future__ import annotations

from fractions import Fraction

from ..dimension import Dimension
from ..quantity import Kind, Notation, Quantity

RIGHT_ANGLE = "1.5707963267948967"
"""A quarter of a turn in rad, rounded up, so that 90 degrees lie inside it."""


def quantity(
    symbol: str,
    title: str,
    notation: Notation,
    dimension: Dimension,
    unit: str,
    low: str = "0",
    high: str = "1e12",
    kind: Kind = Kind.PLAIN,
    reference: str = "",
    home: str = "station",
    zero: bool = False,
) -> Quantity:
    """Return a quantity; its bounds are written as decimals. See :class:`Quantity`."""
    return Quantity(
        symbol,
        title,
        notation,
        dimension,
        Fraction(low),
        Fraction(high),
        unit,
        kind,
        reference,
        home,
        zero,
    )
