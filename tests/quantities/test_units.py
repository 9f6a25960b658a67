"""The closed list of units: factors by two witnesses, and every trade unit as it is meant."""

from __future__ import annotations

import math
import tomllib
from decimal import Decimal
from fractions import Fraction

import pint
import pytest

from calcsheets.errors import UnitError
from calcsheets.quantities import (
    Kind,
    Unit,
    all_units,
    catalogue,
    default_unit,
    find_unit,
    quantity_given,
    quantity_stated,
    read_measured,
    units_by_name,
)
from calcsheets.quantities import dimension as dim
from tests.conftest import ROOT

REGISTRY = pint.UnitRegistry()
ROWS = {
    row["name"]: row
    for row in tomllib.loads((ROOT / "tests/published/constants.toml").read_text("utf-8"))["row"]
}
PUBLISHED_NAME = {
    "ft": "international foot",
    "in": "international inch",
    "lbm": "international avoirdupois pound",
    "slug": "slug",
    "gal": "US liquid gallon",
    "lbf": "pound-force",
    "psi": "pound-force per square inch",
    "atm": "standard atmosphere",
    "bar": "bar",
    "at": "technical atmosphere (kilogram-force per square centimetre)",
    "Torr": "torr",
    "mmHg": "conventional millimetre of mercury",
    "inHg": "conventional inch of mercury",
    "mmH2O": "conventional millimetre of water",
    "inH2O": "conventional inch of water",
    "ftH2O": "conventional foot of water",
    "Btu": "British thermal unit (International Table)",
    "hp": "mechanical horsepower (550 ft lbf/s)",
}


def unit_name(unit: Unit) -> str:
    return unit.name


def value(text: str) -> Fraction:
    return read_measured(text).rational


# Factors


@pytest.mark.parametrize("unit", all_units(), ids=unit_name)
def test_a_factor_and_its_dimension_agree_with_the_units_library(unit: Unit) -> None:
    one, zero = (REGISTRY.Quantity(number, unit.pint).to_base_units() for number in (1.0, 0.0))
    step = float(unit.factor) * math.pi**unit.pi_power
    assert (one - zero).magnitude == pytest.approx(step, rel=1e-12)
    assert zero.magnitude == pytest.approx(float(unit.offset), rel=1e-12)
    names = ("[mass]", "[length]", "[time]", "[temperature]", "[substance]")
    found = tuple(Fraction(str(one.dimensionality.get(name, 0))) for name in names)
    assert found == unit.dimension.exponents


@pytest.mark.parametrize(("name", "row"), PUBLISHED_NAME.items())
def test_a_factor_agrees_with_the_published_definition(name: str, row: str) -> None:
    """A definition agrees exactly, a rounded figure to half a unit of its last digit."""
    published = Decimal(ROWS[row]["value"])
    last_digit = Fraction(10) ** int(published.as_tuple().exponent)
    allowed = Fraction(0) if ROWS[row]["exact"] else last_digit / 2
    assert abs(find_unit(name).factor - Fraction(published)) <= allowed


def test_the_zero_of_the_celsius_scale_is_the_published_one() -> None:
    assert find_unit("°C").offset == Fraction(ROWS["zero of the Celsius scale"]["value"])


def test_the_inch_of_mercury_is_the_conventional_one_and_not_that_at_60_fahrenheit() -> None:
    assert find_unit("inHg").factor != Fraction(ROWS["inch of mercury at 60 degF"]["value"])


# Names


def test_no_name_or_alias_belongs_to_two_units() -> None:
    names = [name for unit in all_units() for name in (unit.name, *unit.aliases)]
    assert sorted({name for name in names if names.count(name) > 1}) == []
    assert len(units_by_name()) == len(names)


@pytest.mark.parametrize("unit", all_units(), ids=unit_name)
def test_a_unit_is_found_by_its_name_and_every_alias(unit: Unit) -> None:
    for name in (unit.name, *unit.aliases):
        assert find_unit(name) is unit
        assert find_unit(f" {name} ") is unit


@pytest.mark.parametrize("unit", all_units(), ids=unit_name)
def test_a_number_with_a_unit_reads_back_as_printed(unit: Unit) -> None:
    measured = read_measured("1.50" if unit.name == "1" else f"1.50 {unit.name}")
    assert (str(measured.number), measured.unit) == ("1.50", unit)


def test_every_quantity_has_a_unit_to_be_printed_in() -> None:
    for quantity in catalogue().values():
        if quantity.kind is not Kind.STATE:
            unit = default_unit(quantity).name
            one = read_measured("1" if unit == "1" else f"1 {unit}")
            assert quantity_stated(quantity, one) is quantity


def test_names_that_differ_in_case_alone_mean_one_unit() -> None:
    """A slip of the shift key must not change a value."""
    folded: dict[str, set[tuple[Fraction, object]]] = {}
    for name, unit in units_by_name().items():
        folded.setdefault(name.casefold(), set()).add((unit.factor, unit.dimension))
    apart = {name for name, meanings in folded.items() if len(meanings) > 1}
    assert apart == {"kn"}  # the knot and the kilonewton have different dimensions


# Spellings of the trade


@pytest.mark.parametrize(
    ("text", "name"),
    [
        ("1 bara", "bar(a)"),
        ("1 barg", "bar(g)"),
        ("1 bar g", "bar(g)"),
        ("1 bar (g)", "bar(g)"),
        ("1 bar(abs)", "bar(a)"),
        ("1 bar gauge", "bar(g)"),
        ("1 psig", "psi(g)"),
        ("1 psia", "psi(a)"),
        ("1 kPa(g)", "kPa(g)"),
        ("1 kPa(a)", "kPa(a)"),
        ("1 mbar(a)", "mbar(a)"),
        ("1 mmH2O(g)", "mmH2O(g)"),
        ("1 mmWC", "mmH2O"),
        ("1 inHg(a)", "inHg(a)"),
        ("1 inWC", "inH2O"),
        ("1 kgf/cm2(g)", "at(g)"),
        ("1 m³/h", "m3/h"),
        ("1 m^3/h", "m3/h"),
        ("1 kg/m**3", "kg/m3"),
        ("1 J/(kg·K)", "J/(kg*K)"),
        ("1 J/(kg K)", "J/(kg*K)"),
        ("1 μm", "µm"),
        ("1 Nm³/h", "Nm3/h"),
        ("1 Sm3/h", "Sm3/h"),
        ("1 SCFM", "SCF/min"),
        ("1 scfm", "SCF/min"),
        ("1 m3/h (ANR)", "m3/h(ANR)"),
        ("1 m3(ANR)/h", "m3/h(ANR)"),
        ("1 L/min (ANR)", "L/min(ANR)"),
        ("1 m3/h (free air)", "m3/h(FAD)"),
        ("1 cfm (FAD)", "ft3/min(FAD)"),
        ("1 cfm", "ft3/min"),
        ("1 acfm", "ft3/min"),
        ("1 lb/h", "lbm/h"),
        ("1 pph", "lbm/h"),
        ("1 lb", "lbm"),
        ("1 slug", "slug"),
        ("1 lbf", "lbf"),
        ("1 degC", "°C"),
        ("1 C", "°C"),
        ("1 F", "°F"),
        ("1 R", "°R"),
        ("1 Δ°F", "Δ°F"),
        ("1 delta_degC", "Δ°C"),
        ("1", "1"),
        ("1 %", "%"),
    ],
)
def test_a_spelling_of_the_trade_is_understood(text: str, name: str) -> None:
    assert read_measured(text).unit.name == name


@pytest.mark.parametrize(
    "text", ["1 J/kg K", "1 kW h", "1 Pa s", "1 barr", "1 kPas", "1 Nm", "1 cF"]
)
def test_what_a_free_parser_would_read_into_something_is_refused(text: str) -> None:
    with pytest.raises(UnitError, match="is not in the list of units"):
        read_measured(text)


@pytest.mark.parametrize(
    ("text", "message"),
    [
        (
            "5 mil",
            '"5 mil": mil is said for a thousandth of an inch and for a millimetre. '
            "Write thou (0.001 in) or mm.",
        ),
        (
            "5 ton/h",
            '"5 ton/h": the unit "ton/h" is not in the list of units. '
            "Did you mean t/h or t or mol/h? See calcsheets units.",
        ),
        (
            "5 ata",
            '"5 ata": ata is said for technical and for standard atmospheres. '
            "Write at(a) or atm(a).",
        ),
        (
            "5 kcal",
            '"5 kcal": several calories differ by up to 0.1 %. Write kJ.',
        ),
        (
            "5 BARG",
            '"5 BARG": the unit "BARG" is not in the list of units. '
            "Did you mean bar(g)? See calcsheets units.",
        ),
    ],
)
def test_what_people_mean_differently_is_refused_with_a_reason(text: str, message: str) -> None:
    with pytest.raises(UnitError) as refused:
        read_measured(text)
    assert str(refused.value) == message


# Values


@pytest.mark.parametrize(
    ("text", "expected"),
    [
        ("25 °C", Fraction("298.15")),
        ("-40 °F", Fraction("233.15")),
        ("536.67 °R", Fraction("298.15")),
        ("298.15 K", Fraction("298.15")),
        ("9 Δ°F", Fraction(5)),
        ("9 °R", Fraction(5)),
        ("5 Δ°C", Fraction(5)),
        ("7 bar(g)", Fraction(700000)),
        ("7 bar(a)", Fraction(700000)),
        ("1 mmH2O", Fraction("9.80665")),
        ("60 ft3/min", Fraction("0.3048") ** 3),
        ("3600 Nm3/h", Fraction(1)),
        ("50 %", Fraction(1, 2)),
        ("1 Btu/(lbm*°R)", Fraction("4186.8")),
    ],
)
def test_a_text_has_its_exact_value(text: str, expected: Fraction) -> None:
    """The conversion to SI by definitions, worked by hand; 1 Btu/(lb °R) is 4186.8 J/(kg K)."""
    assert value(text) == expected


def test_specific_gas_constants_of_both_systems_are_one() -> None:
    """10.7316 psi ft3/(lbmol °R), read in a handbook, is the molar gas constant to its digits."""
    row = ROWS["molar gas constant in US customary units"]
    psi, cubic_foot = find_unit("psi").factor, find_unit("ft3").factor
    per = find_unit("lbmol").factor * find_unit("°R").factor
    published = Fraction(row["value"]) * psi * cubic_foot / per
    assert float(published) == pytest.approx(float(ROWS["molar gas constant"]["value"]), rel=6e-6)


# What a text states when it stands for a quantity


@pytest.mark.parametrize(
    ("symbol", "text", "stated"),
    [
        ("p", "1 bar(a)", "p"),
        ("p", "1 bar(g)", "p_g"),
        ("p_0", "100 psig", "p_0g"),
        ("p_g", "-0.2 bar(g)", "p_g"),
        ("p_atm", "98.2 kPa", "p_atm"),
        ("p_atm", "98.2 kPa(a)", "p_atm"),
        ("dp", "20 mbar", "dp"),
        ("dp", "20 mbar(d)", "dp"),
        ("q_dyn", "20 Pa", "q_dyn"),
        ("T", "25 °C", "T"),
        ("T", "300 K", "T"),
        ("mdot", "900 kg/h", "mdot"),
        ("mdot", "900 Nm3/h", "q_N"),
        ("mdot", "900 Sm3/h", "q_S"),
        ("mdot", "900 SCFM", "q_SCF"),
        ("mdot", "900 m3/h (ANR)", "q_ANR"),
        ("mdot", "900 m3/h (FAD)", "q_FA"),
        ("mdot", "900 m3/h (ref)", "q_ref"),
        ("m", "30 Nm3", "V_N"),
        ("q_V", "900 m3/h", "q_V"),
        ("q_V", "900 cfm", "q_V"),
    ],
)
def test_a_text_states_the_quantity_that_its_unit_means(
    symbol: str, text: str, stated: str
) -> None:
    assert quantity_stated(catalogue()[symbol], read_measured(text)).symbol == stated


@pytest.mark.parametrize(
    ("symbol", "text"),
    [
        ("p", "1 bar"),
        ("p", "1 bar(d)"),
        ("p_g", "1 bar(a)"),
        ("p_atm", "0 bar(g)"),
        ("p_cr", "1 bar(g)"),
        ("dp", "1 bar(a)"),
        ("T", "25 Δ°C"),
        ("T", "25"),
        ("q_V", "900 Nm3/h"),
        ("q_N", "900 m3/h"),
        ("q_N", "900 Sm3/h"),
        ("q_N", "900 Nm3"),
        ("q_N", "900 kg/h"),
        ("V", "3 Nm3"),
        ("mdot", "3 Nm3"),
        ("d", "3 m2"),
        ("M", "3 m"),
        ("regime", "1"),
    ],
)
def test_a_text_that_leaves_the_meaning_open_is_refused(symbol: str, text: str) -> None:
    with pytest.raises(UnitError):
        quantity_stated(catalogue()[symbol], read_measured(text))


@pytest.mark.parametrize(
    ("symbol", "text", "message"),
    [
        ("T", "-300 °C", '"-300 °C": static temperature (T) must be above 0 K. '
         "Check the number and its unit."),
        ("M", "-1", '"-1": Mach number (M) must be at least 0. Check the number and its unit.'),
        ("mu", "91 °", '"91 °": Mach angle (mu) must be at most 1.5708 rad. '
         "Check the number and its unit."),
    ],
)  # fmt: skip
def test_a_value_out_of_bounds_is_refused(symbol: str, text: str, message: str) -> None:
    with pytest.raises(UnitError) as refused:
        quantity_given(catalogue()[symbol], read_measured(text))
    assert str(refused.value) == message


def test_dimensions_combine_as_units_do() -> None:
    assert dim.MASS_FLOW / dim.DENSITY == dim.VOLUME_FLOW
    assert dim.PRESSURE * dim.VOLUME == dim.ENERGY
    assert str(dim.PRESSURE) == "kg*m^-1*s^-2"
    assert str(dim.ONE) == "1"
