"""Constants and units against their definitions as published.

Sources and how each is known stand in constants.toml beside each value.
"""

from __future__ import annotations

from decimal import Decimal
from fractions import Fraction

import pytest

from calcsheets.expressions import CONSTANTS
from calcsheets.quantities import REFERENCE_STATES, units_by_name
from tests.published.witnesses import Row, rows, solved, tolerance

ROWS = {row["name"]: row for row in rows("constants")}

# Name in the file: our unit. The value there is in the coherent unit of its dimension.
UNITS = {
    "standard atmosphere": "atm",
    "international foot": "ft",
    "international inch": "in",
    "international avoirdupois pound": "lbm",
    "slug": "slug",
    "US liquid gallon": "gal",
    "pound-force": "lbf",
    "pound-force per square inch": "psi",
    "bar": "bar",
    "technical atmosphere (kilogram-force per square centimetre)": "at",
    "torr": "Torr",
    "conventional millimetre of mercury": "mmHg",
    "conventional inch of mercury": "inHg",
    "conventional millimetre of water": "mmH2O",
    "conventional inch of water": "inH2O",
    "conventional foot of water": "ftH2O",
    "British thermal unit (International Table)": "Btu",
    "mechanical horsepower (550 ft lbf/s)": "hp",
}


def allowed(row: Row) -> Fraction:
    return Fraction(0) if row["exact"] else Fraction(tolerance(row, "value"))


@pytest.mark.parametrize(("name", "unit"), UNITS.items(), ids=list(UNITS.values()))
def test_a_unit_is_what_its_definition_says(name: str, unit: str) -> None:
    row = ROWS[name]
    factor = units_by_name()[unit].factor
    assert abs(factor - Fraction(row["value"])) <= allowed(row)


def test_the_gas_constant_is_the_exact_one_of_the_si() -> None:
    value = CONSTANTS["R_u"].value
    assert value == Fraction(ROWS["molar gas constant"]["value"])
    product = Fraction(ROWS["Avogadro constant"]["value"]) * Fraction(
        ROWS["Boltzmann constant"]["value"]
    )
    assert value == product


def test_the_handbook_gas_constant_in_us_units_is_ours() -> None:
    """10.7316 psi ft3/(lbmol °R), as a handbook prints it."""
    unit = units_by_name()
    row = ROWS["molar gas constant in US customary units"]
    ours = CONSTANTS["R_u"].value
    assert ours is not None
    per = unit["psi"].factor * unit["ft3"].factor / (unit["lbmol"].factor * unit["°R"].factor)
    assert abs(ours / per - Fraction(row["value"])) <= allowed(row)


@pytest.mark.parametrize(
    ("name", "state"),
    [
        ("molar volume of an ideal gas at 273.15 K and 101.325 kPa", "N"),
        ("volume of one pound-mole of an ideal gas at 60 degF and 14.696 psi", "SCF"),
    ],
)
def test_a_mole_fills_the_published_volume_at_its_reference_state(name: str, state: str) -> None:
    row = ROWS[name]
    mole = "1" if state == "N" else str(units_by_name()["lbmol"].factor)
    volume = "m3" if state == "N" else "ft3"
    found = solved(f"volume_at_{state}", f"V_{state}", m=mole, R="8.31446261815324")
    in_unit = Decimal(found) / (Decimal(1) * Decimal(float(units_by_name()[volume].factor)))
    assert abs(in_unit - Decimal(row["value"])) <= max(
        Decimal(float(allowed(row))), Decimal("1e-15")
    )


def test_reference_states_are_those_that_their_names_stand_for() -> None:
    """0 °C, 15 °C, 60 °F, 20 °C (practice of the trade; DIN 1343, ISO 13443, ISO 8778)."""
    zero = Fraction(ROWS["zero of the Celsius scale"]["value"])
    atmosphere = Fraction(ROWS["standard atmosphere"]["value"])
    states = {state.name: state for state in REFERENCE_STATES}
    assert (states["N"].temperature, states["N"].pressure) == (zero, atmosphere)
    assert (states["S"].temperature, states["S"].pressure) == (zero + 15, atmosphere)
    assert (states["ANR"].temperature, states["ANR"].pressure) == (zero + 20, 100000)
    assert states["SCF"].temperature == zero + Fraction(60 - 32) * Fraction(5, 9)
    assert states["ref"].temperature is None  # the site states it
