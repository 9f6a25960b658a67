"""Properties of a gas."""

from __future__ import annotations

from collections.abc import Iterator

from .. import dimension as dim
from ..quantity import Notation, Quantity
from .entry import quantity


def quantities() -> Iterator[Quantity]:
    """Return the quantities."""
    n = Notation
    yield quantity(
        "R", "specific gas constant", n("R"), dim.SPECIFIC_HEAT, "J/(kg*K)", high="1e5", home="gas"
    )
    yield quantity(
        "M_w", "molar mass", n("M", "w"), dim.MOLAR_MASS, "kg/mol", high="10", home="gas"
    )
    yield quantity(
        "gamma", "ratio of specific heats", n("γ"), dim.ONE, "1", low="1.01", high="1.7", home="gas"
    )
    yield quantity(
        "c_p",
        "specific heat at constant pressure",
        n("c", "p"),
        dim.SPECIFIC_HEAT,
        "J/(kg*K)",
        high="1e6",
        home="gas",
    )
    yield quantity(
        "c_v",
        "specific heat at constant volume",
        n("c", "v"),
        dim.SPECIFIC_HEAT,
        "J/(kg*K)",
        high="1e6",
        home="gas",
    )
    yield quantity(
        "C_p",
        "molar heat capacity at constant pressure",
        n("C", "p,m"),
        dim.MOLAR_HEAT,
        "J/(mol*K)",
        high="1e5",
        home="gas",
    )
    yield quantity("x", "mole fraction", n("x"), dim.ONE, "1", high="1.000000001")
    yield quantity("w", "mass fraction", n("w"), dim.ONE, "1", high="1.000000001")
    yield quantity("n", "polytropic exponent", n("n"), dim.ONE, "1", low="-100", high="100")
