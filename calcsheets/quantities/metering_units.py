"""Units of viscosity, of thermal expansion and cooling, and of the size of valves."""

from __future__ import annotations

from collections.abc import Iterator
from fractions import Fraction

from . import dimension as dim
from .unit import Unit


def metering_units() -> Iterator[Unit]:
    """Return the units."""
    u = Unit
    one, bar = Fraction(1), Fraction(10**5)
    litre, gallon = Fraction(1, 1000), 231 * Fraction("0.0254") ** 3
    yield u("Pa*s", one, dim.VISCOSITY, aliases=("kg/(m*s)",), pint="pascal*second")
    yield u("mPa*s", one / 1000, dim.VISCOSITY, aliases=("cP",), pint="millipascal*second")
    yield u("µPa*s", one / 10**6, dim.VISCOSITY, aliases=("uPa*s",), pint="micropascal*second")
    yield u("/K", one, dim.PER_TEMPERATURE, aliases=("/°C", "K-1"), pint="1/kelvin")
    yield u("µm/(m*K)", one / 10**6, dim.PER_TEMPERATURE, pint="micrometer/meter/kelvin")
    yield u("/°F", Fraction(9, 5), dim.PER_TEMPERATURE, pint="1/delta_degree_Fahrenheit")
    yield u("K/Pa", one, dim.COOLING, pint="kelvin/pascal")
    yield u("K/MPa", one / 10**6, dim.COOLING, pint="kelvin/megapascal")
    yield u("K/bar", 1 / bar, dim.COOLING, aliases=("°C/bar",), pint="kelvin/bar")
    yield u(
        "gal/min", gallon / 60, dim.VOLUME_FLOW, aliases=("gpm",), pint="US_liquid_gallon/minute"
    )
    yield u("m3/(s*Pa)", one, dim.CONDUCTANCE, pint="meter**3/second/pascal")
    yield u(
        "L/(s*bar)",
        litre / bar,
        dim.CONDUCTANCE,
        aliases=("l/(s*bar)", "dm3/(s*bar)"),
        pint="liter/second/bar",
    )
    yield u(
        "L/(min*bar)",
        litre / bar / 60,
        dim.CONDUCTANCE,
        aliases=("l/(min*bar)", "dm3/(min*bar)"),
        pint="liter/minute/bar",
    )
