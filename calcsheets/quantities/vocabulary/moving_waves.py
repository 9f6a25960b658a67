"""Waves that move through a gas: shocks, expansions, shock tubes.

Quantities of a station are those over ground. Seen from the shock, velocities and stagnation
values are others, and have symbols of their own.
"""

from __future__ import annotations

from collections.abc import Iterator

from .. import dimension as dim
from ..quantity import Kind, Notation, Quantity
from .entry import quantity


def quantities() -> Iterator[Quantity]:
    """Return the quantities."""
    n = Notation
    for symbol, title, subscript in (
        ("M_s", "shock Mach number, relative to the gas ahead", "s"),
        ("M_r", "Mach number of the reflected shock, relative to the gas ahead", "r"),
        ("M_2s", "Mach number behind, relative to the shock", "2s"),
    ):
        yield quantity(symbol, title, n("M", subscript), dim.ONE, "1", high="1000")
    yield quantity(
        "u_s", "velocity of the shock over ground", n("u", "s"), dim.VELOCITY, "m/s",
        low="-1e7", high="1e7",
    )  # fmt: skip
    for symbol, title, subscript in (
        ("u_p", "change of velocity by the wave", "p"),
        ("u_esc", "velocity of unsteady expansion into vacuum", "esc"),
    ):
        yield quantity(symbol, title, n("u", subscript), dim.VELOCITY, "m/s", high="1e7", zero=True)
    yield quantity(
        "u_tail", "velocity of the tail of the expansion, with the stream", n("u", "tail"),
        dim.VELOCITY, "m/s", low="-1e7", high="1e7",
    )  # fmt: skip
    yield quantity(
        "T_0s", "stagnation temperature relative to the shock", n("T", "0s"), dim.TEMPERATURE,
        "K", high="100000", kind=Kind.LEVEL,
    )  # fmt: skip
    for symbol, title, subscript in (
        ("p_01s", "stagnation pressure ahead, relative to the shock", "01s"),
        ("p_02s", "stagnation pressure behind, relative to the shock", "02s"),
    ):
        yield quantity(
            symbol, title, n("p", subscript), dim.PRESSURE, "Pa", kind=Kind.ABSOLUTE, high="1e12"
        )
    yield quantity(
        "a_4", "speed of sound in the driver gas", n("a", "4"), dim.VELOCITY, "m/s", high="1e7"
    )
    yield quantity(
        "gamma_4", "ratio of specific heats of the driver gas", n("γ", "4"), dim.ONE, "1",
        low="1.01", high="1.7",
    )  # fmt: skip
    yield quantity(
        "R_4", "specific gas constant of the driver gas", n("R", "4"), dim.SPECIFIC_HEAT,
        "J/(kg*K)", high="1e5",
    )  # fmt: skip
    yield quantity(
        "M_w4", "molar mass of the driver gas", n("M", "w4"), dim.MOLAR_MASS, "kg/mol",
        high="10",
    )  # fmt: skip
