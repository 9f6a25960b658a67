"""Quantities of the state of a gas and of its stream."""

from __future__ import annotations

from collections.abc import Iterator

from .. import dimension as dim
from ..quantity import Kind, Notation, Quantity
from .entry import RIGHT_ANGLE, quantity


def quantities() -> Iterator[Quantity]:
    """Return the quantities."""
    n = Notation
    absolute, level = Kind.ABSOLUTE, Kind.LEVEL
    pressure = dim.PRESSURE
    for symbol, title, subscript in (
        ("p", "static pressure", ""),
        ("p_0", "stagnation pressure", "0"),
    ):
        yield quantity(symbol, title, n("p", subscript), pressure, "Pa", kind=absolute, high="1e10")
        gauge = f"{subscript},g" if subscript else "g"
        yield quantity(
            f"{symbol}g" if subscript else f"{symbol}_g",
            f"{title}, gauge",
            n("p", gauge),
            pressure,
            "Pa",
            low="-200000",
            high="1e10",
            kind=Kind.GAUGE,
        )
    for symbol, title, subscript in (
        ("T", "static temperature", ""),
        ("T_0", "stagnation temperature", "0"),
    ):
        yield quantity(
            symbol, title, n("T", subscript), dim.TEMPERATURE, "K", high="100000", kind=level
        )
    yield quantity("rho", "density", n("ρ"), dim.DENSITY, "kg/m3", high="1e6")
    yield quantity("rho_0", "stagnation density", n("ρ", "0"), dim.DENSITY, "kg/m3", high="1e6")
    yield quantity("v", "specific volume", n("v"), dim.SPECIFIC_VOLUME, "m3/kg")
    yield quantity("M", "Mach number", n("M"), dim.ONE, "1", high="1000", zero=True)
    yield quantity("u", "velocity", n("u"), dim.VELOCITY, "m/s", high="1e7", zero=True)
    yield quantity("a", "speed of sound", n("a"), dim.VELOCITY, "m/s", high="1e7")
    yield quantity("a_0", "stagnation speed of sound", n("a", "0"), dim.VELOCITY, "m/s", high="1e7")
    yield quantity("u_max", "maximum velocity", n("u", "max"), dim.VELOCITY, "m/s", high="1e7")
    yield quantity(
        "q_dyn", "dynamic pressure", n("q"), pressure, "Pa", kind=Kind.DIFFERENTIAL, zero=True
    )
    yield quantity("mu", "Mach angle", n("μ"), dim.ONE, "rad", high=RIGHT_ANGLE)
    for symbol, title, base, dimension, unit, kind in (
        ("p_cr", "critical pressure, at M = 1", "p", pressure, "Pa", absolute),
        ("T_cr", "critical temperature, at M = 1", "T", dim.TEMPERATURE, "K", level),
        ("rho_cr", "critical density, at M = 1", "ρ", dim.DENSITY, "kg/m3", Kind.PLAIN),
        ("a_cr", "critical speed of sound, at M = 1", "a", dim.VELOCITY, "m/s", Kind.PLAIN),
        ("A_cr", "critical area, at M = 1", "A", dim.AREA, "m2", Kind.PLAIN),
    ):
        yield quantity(symbol, title, n(base, superscript="*"), dimension, unit, kind=kind)
    yield quantity(
        "M_cr",
        "velocity over critical speed of sound",
        n("M", superscript="*"),
        dim.ONE,
        "1",
        zero=True,
    )
