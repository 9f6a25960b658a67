"""Changes between two states."""

from __future__ import annotations

from collections.abc import Iterator

from .. import dimension as dim
from ..quantity import Kind, Notation, Quantity
from .entry import quantity


def quantities() -> Iterator[Quantity]:
    """Return the quantities."""
    n = Notation
    energy = dim.SPECIFIC_ENERGY
    yield quantity("dh", "change of specific enthalpy", n("Δh"), energy, "J/kg", low="-1e12")
    yield quantity("de", "change of specific internal energy", n("Δe"), energy, "J/kg", low="-1e12")
    yield quantity(
        "ds", "change of specific entropy", n("Δs"), dim.SPECIFIC_HEAT, "J/(kg*K)", low="-1e9"
    )
    yield quantity("row", "number of the row", n("i"), dim.ONE, "1", high="1e6", zero=True)
    yield quantity("q", "heat added per mass", n("q"), energy, "J/kg", low="-1e12")
    yield quantity(
        "w_s", "shaft work done by the gas per mass", n("w", "s"), energy, "J/kg", low="-1e12"
    )
    yield quantity(
        "w_b", "boundary work done by the gas per mass", n("w", "b"), energy, "J/kg", low="-1e12"
    )
    yield quantity(
        "dp",
        "pressure difference",
        n("Δp"),
        dim.PRESSURE,
        "Pa",
        low="-1e10",
        high="1e10",
        kind=Kind.DIFFERENTIAL,
    )
