"""Vessels and the site."""

from __future__ import annotations

from collections.abc import Iterator

from .. import dimension as dim
from ..quantity import Kind, Notation, Quantity
from .entry import quantity


def quantities() -> Iterator[Quantity]:
    """Return the quantities."""
    n = Notation
    yield quantity("V", "volume", n("V"), dim.VOLUME, "m3")
    yield quantity("m", "mass of gas", n("m"), dim.MASS, "kg")
    yield quantity("N", "amount of substance", n("N"), dim.AMOUNT, "mol")
    yield quantity("dm", "mass discharged or filled", n("Δm"), dim.MASS, "kg", zero=True)
    yield quantity("t", "time", n("t"), dim.TIME, "s", zero=True)
    yield quantity(
        "p_atm",
        "atmospheric pressure",
        n("p", "atm"),
        dim.PRESSURE,
        "Pa",
        high="1e7",
        kind=Kind.ABSOLUTE,
        home="site",
    )
    yield quantity(
        "T_atm",
        "atmospheric temperature",
        n("T", "atm"),
        dim.TEMPERATURE,
        "K",
        high="10000",
        kind=Kind.LEVEL,
        home="site",
    )
    yield quantity(
        "p_ref",
        "reference pressure",
        n("p", "ref"),
        dim.PRESSURE,
        "Pa",
        high="1e7",
        kind=Kind.ABSOLUTE,
        home="site",
    )
    yield quantity(
        "T_ref",
        "reference temperature",
        n("T", "ref"),
        dim.TEMPERATURE,
        "K",
        high="10000",
        kind=Kind.LEVEL,
        home="site",
    )
    yield quantity("regime", "regime", n("regime"), dim.ONE, "1", kind=Kind.STATE)
