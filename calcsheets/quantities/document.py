"""The page of units, made from the list: ``python -m calcsheets.quantities.document``."""

from __future__ import annotations

import sys
from collections.abc import Iterator
from decimal import Decimal
from fractions import Fraction

from . import dimension as dim
from .dimension import Dimension
from .quantity import Kind
from .reference_states import REFERENCE_STATES, ReferenceState
from .unit import Unit
from .units import REFUSED, all_units

_MOST_DIGITS = 16
_LARGE = 100_000
_TITLES = (
    (dim.ONE, "Numbers and angles"),
    (dim.LENGTH, "Length"),
    (dim.AREA, "Area"),
    (dim.VOLUME, "Volume"),
    (dim.TIME, "Time"),
    (dim.MASS, "Mass"),
    (dim.AMOUNT, "Amount of substance"),
    (dim.TEMPERATURE, "Temperature"),
    (dim.PRESSURE, "Pressure"),
    (dim.FORCE, "Force"),
    (dim.ENERGY, "Energy"),
    (dim.POWER, "Power"),
    (dim.VELOCITY, "Velocity"),
    (dim.ACCELERATION, "Acceleration"),
    (dim.DENSITY, "Density"),
    (dim.SPECIFIC_VOLUME, "Specific volume"),
    (dim.MASS_FLOW, "Mass flow"),
    (dim.MASS_FLUX, "Mass flux"),
    (dim.VOLUME_FLOW, "Volume flow"),
    (dim.AMOUNT_FLOW, "Amount of substance flow"),
    (dim.SPECIFIC_ENERGY, "Specific energy"),
    (dim.SPECIFIC_HEAT, "Specific heat and gas constant"),
    (dim.MOLAR_MASS, "Molar mass"),
    (dim.MOLAR_HEAT, "Molar heat capacity"),
    (dim.VISCOSITY, "Dynamic viscosity"),
    (dim.PER_TEMPERATURE, "Thermal expansion"),
    (dim.COOLING, "Joule-Thomson coefficient"),
    (dim.CONDUCTANCE, "Sonic conductance"),
)

_INTRODUCTION = """\
# Units

A value is a number, a blank and a unit: `12.0 bar(g)`, `25 °C`, `0.82`. The decimal sign is a
point, and digits are not grouped. The list of units is closed: a unit that is not on it is
refused, with the nearest one that is. Blanks inside a unit do not count, `m³` and `m^3` are
read as `m3`, and `·` as `*`. Factors are exact: a decimal stays as it was typed.

**Pressure.** `bar(a)` is absolute, `bar(g)` counts from the atmosphere of the site, `bar(d)` is
a difference. Where the datum matters and the unit does not say it, the program asks. A gauge
pressure becomes absolute in a step of the calculation, with `p_atm` of the site.

**Temperature.** `°C` and `°F` are levels, `Δ°C` and `Δ°F` differences. `K` and `°R` are both.

**Volume of gas.** `m3` is the volume at flowing conditions. A volume at a reference state says
which: `Nm3`, `Sm3`, `SCF`, `m3(ANR)`. It becomes a mass in a step of the calculation.
"""


def units_page() -> str:
    """Return the page as Markdown."""
    return "\n".join([_INTRODUCTION, *_plain(), *_datum(), *_reference(), *_refused()])


def _plain() -> Iterator[str]:
    for dimension, title in _TITLES:
        units = [
            unit
            for unit in all_units()
            if unit.dimension == dimension
            and unit.kind in (Kind.PLAIN, Kind.LEVEL, Kind.DIFFERENCE)
        ]
        yield f"## {title}\n"
        yield from _table(("unit", "also written", "in SI"), (_row(unit) for unit in units))


def _row(unit: Unit) -> tuple[str, ...]:
    return (f"`{unit.name}`", _also(unit), _in_si(unit))


def _also(unit: Unit) -> str:
    return ", ".join(f"`{alias}`" for alias in unit.aliases if alias)


def _in_si(unit: Unit) -> str:
    coherent = _coherent(unit.dimension)
    factor = f"{'π·' * unit.pi_power}{_number(unit.factor)} {coherent}".strip()
    return f"{factor}; zero at {_number(unit.offset)} {coherent}" if unit.offset else factor


def _coherent(dimension: Dimension) -> str:
    """Name of the coherent SI unit, empty for a number."""
    unit = next(u for u in all_units() if u.dimension == dimension and u.factor == 1)
    return "" if dimension.is_one else unit.name


def _number(value: Fraction) -> str:
    """A short decimal if that is exact, else a short fraction, else ten digits."""
    decimal = Decimal(value.numerator) / Decimal(value.denominator)
    if Fraction(decimal) == value and len(decimal.as_tuple().digits) <= _MOST_DIGITS:
        return f"{decimal:f}"
    if value.numerator < _LARGE and value.denominator < _LARGE:
        return str(value)
    return f"≈ {float(value):.10g}"


def _datum() -> Iterator[str]:
    yield "## Pressure with its datum\n"
    kinds = (Kind.ABSOLUTE, Kind.GAUGE, Kind.DIFFERENTIAL)
    rows = (
        (unit.kind.value, f"`{unit.name}`", _also(unit))
        for kind in kinds
        for unit in all_units()
        if unit.kind is kind
    )
    yield from _table(("states", "unit", "also written"), rows)


def _reference() -> Iterator[str]:
    yield "## Reference states of gas volumes\n"
    yield from _table(("name", "state", "source"), (_state(state) for state in REFERENCE_STATES))
    yield "## Volumes and volume flows at a reference state\n"
    rows = (
        (unit.reference, *_row(unit)) for unit in all_units() if unit.kind is Kind.REFERENCE_VOLUME
    )
    yield from _table(("state", "unit", "also written", "in SI, at that state"), rows)


def _state(state: ReferenceState) -> tuple[str, ...]:
    source = state.source if state.source == "the brief" else f"{state.source} ({state.known})"
    return (state.name, state.title, source)


def _refused() -> Iterator[str]:
    yield "## Refused, with the reason\n"
    rows = ((f"`{name}`", reason, f"{remedy}.") for name, (reason, remedy) in REFUSED.items())
    yield from _table(("unit", "reason", "remedy"), rows)


def _table(heads: tuple[str, ...], rows: Iterator[tuple[str, ...]]) -> Iterator[str]:
    yield f"| {' | '.join(heads)} |"
    yield "|" + "---|" * len(heads)
    for row in rows:
        yield f"| {' | '.join(row)} |"
    yield ""


if __name__ == "__main__":
    sys.stdout.write(units_page())
