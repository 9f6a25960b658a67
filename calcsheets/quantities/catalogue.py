"""The vocabulary: every quantity that relations and briefs may name.

Symbols follow NACA Report 1135 and ISO 80000 where those have one; ``u`` is the velocity and
``e`` the specific internal energy, so that ``V`` and ``v`` stay volume and specific volume.
"""

from __future__ import annotations

from collections.abc import Iterator, Mapping
from fractions import Fraction
from functools import cache
from types import MappingProxyType

from ..errors import DefinitionError
from . import dimension as dim
from .dimension import Dimension
from .quantity import Kind, Notation, Quantity
from .reference_states import REFERENCE_STATES

_BIG = Fraction(10**12)


def _q(
    symbol: str,
    title: str,
    notation: Notation,
    dimension: Dimension,
    unit: str,
    low: str = "0",
    high: str = "1e12",
    kind: Kind = Kind.PLAIN,
    reference: str = "",
) -> Quantity:
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
        _home(symbol),
        symbol in _MAY_BE_ZERO or (kind is Kind.REFERENCE_VOLUME and symbol.startswith("q_")),
    )


def _states() -> Iterator[Quantity]:
    n = Notation
    absolute, level = Kind.ABSOLUTE, Kind.LEVEL
    pressure = dim.PRESSURE
    for symbol, title, subscript in (
        ("p", "static pressure", ""),
        ("p_0", "stagnation pressure", "0"),
    ):
        yield _q(symbol, title, n("p", subscript), pressure, "Pa", kind=absolute, high="1e10")
        gauge = f"{subscript},g" if subscript else "g"
        yield _q(
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
        yield _q(symbol, title, n("T", subscript), dim.TEMPERATURE, "K", high="100000", kind=level)
    yield _q("rho", "density", n("ρ"), dim.DENSITY, "kg/m3", high="1e6")
    yield _q("rho_0", "stagnation density", n("ρ", "0"), dim.DENSITY, "kg/m3", high="1e6")
    yield _q("v", "specific volume", n("v"), dim.SPECIFIC_VOLUME, "m3/kg")
    yield _q("M", "Mach number", n("M"), dim.ONE, "1", high="1000")
    yield _q("u", "velocity", n("u"), dim.VELOCITY, "m/s", high="1e7")
    yield _q("a", "speed of sound", n("a"), dim.VELOCITY, "m/s", high="1e7")
    yield _q("a_0", "stagnation speed of sound", n("a", "0"), dim.VELOCITY, "m/s", high="1e7")
    yield _q("u_max", "maximum velocity", n("u", "max"), dim.VELOCITY, "m/s", high="1e7")
    yield _q("q_dyn", "dynamic pressure", n("q"), pressure, "Pa", kind=Kind.DIFFERENTIAL)
    yield _q("mu", "Mach angle", n("μ"), dim.ONE, "rad", high="1.5707963267948966")
    for symbol, title, base, dimension, unit, kind in (
        ("p_cr", "critical pressure, at M = 1", "p", pressure, "Pa", absolute),
        ("T_cr", "critical temperature, at M = 1", "T", dim.TEMPERATURE, "K", level),
        ("rho_cr", "critical density, at M = 1", "ρ", dim.DENSITY, "kg/m3", Kind.PLAIN),
        ("a_cr", "critical speed of sound, at M = 1", "a", dim.VELOCITY, "m/s", Kind.PLAIN),
        ("A_cr", "critical area, at M = 1", "A", dim.AREA, "m2", Kind.PLAIN),
        ("M_cr", "velocity over critical speed of sound", "M", dim.ONE, "1", Kind.PLAIN),
    ):
        yield _q(symbol, title, n(base, superscript="*"), dimension, unit, kind=kind)


def _gas() -> Iterator[Quantity]:
    n = Notation
    yield _q("R", "specific gas constant", n("R"), dim.SPECIFIC_HEAT, "J/(kg*K)", high="1e5")
    yield _q("M_w", "molar mass", n("M", "w"), dim.MOLAR_MASS, "kg/mol", high="10")
    yield _q("gamma", "ratio of specific heats", n("γ"), dim.ONE, "1", low="1.01", high="1.7")
    yield _q(
        "c_p",
        "specific heat at constant pressure",
        n("c", "p"),
        dim.SPECIFIC_HEAT,
        "J/(kg*K)",
        high="1e6",
    )
    yield _q(
        "c_v",
        "specific heat at constant volume",
        n("c", "v"),
        dim.SPECIFIC_HEAT,
        "J/(kg*K)",
        high="1e6",
    )
    yield _q(
        "C_p",
        "molar heat capacity at constant pressure",
        n("C", "p,m"),
        dim.MOLAR_HEAT,
        "J/(mol*K)",
        high="1e5",
    )
    yield _q("x", "mole fraction", n("x"), dim.ONE, "1", high="1.000000001")
    yield _q("w", "mass fraction", n("w"), dim.ONE, "1", high="1.000000001")
    yield _q("n", "polytropic exponent", n("n"), dim.ONE, "1", low="-100", high="100")


def _flow() -> Iterator[Quantity]:
    n = Notation
    yield _q("mdot", "mass flow", n("m", accent="dot"), dim.MASS_FLOW, "kg/s")
    yield _q("ndot", "amount of substance flow", n("n", accent="dot"), dim.AMOUNT_FLOW, "mol/s")
    yield _q("G", "mass flux", n("G"), dim.MASS_FLUX, "kg/(m2*s)")
    yield _q("q_V", "volume flow at flowing conditions", n("q", "V"), dim.VOLUME_FLOW, "m3/s")
    yield _q("A", "cross-sectional area", n("A"), dim.AREA, "m2", high="1e6")
    yield _q("d", "diameter", n("d"), dim.LENGTH, "m", high="1e4")
    yield _q("C_d", "discharge coefficient", n("C", "d"), dim.ONE, "1", high="1.2")
    yield _q("F", "force", n("F"), dim.FORCE, "N", low="-1e12")
    yield _q("F_i", "impulse function", n("I"), dim.FORCE, "N")
    for state in REFERENCE_STATES:
        at = f"at {state.title}"
        yield _q(
            f"q_{state.name}", f"volume flow {at}", n("q", state.name), dim.VOLUME_FLOW, "m3/s",
            kind=Kind.REFERENCE_VOLUME, reference=state.name,
        )  # fmt: skip
        yield _q(
            f"V_{state.name}", f"volume {at}", n("V", state.name), dim.VOLUME, "m3",
            kind=Kind.REFERENCE_VOLUME, reference=state.name,
        )  # fmt: skip


def _changes() -> Iterator[Quantity]:
    n = Notation
    energy = dim.SPECIFIC_ENERGY
    yield _q("dh", "change of specific enthalpy", n("Δh"), energy, "J/kg", low="-1e12")
    yield _q("de", "change of specific internal energy", n("Δe"), energy, "J/kg", low="-1e12")
    yield _q("ds", "change of specific entropy", n("Δs"), dim.SPECIFIC_HEAT, "J/(kg*K)", low="-1e9")
    yield _q("q", "heat added per mass", n("q"), energy, "J/kg", low="-1e12")
    yield _q("w_s", "shaft work done by the gas per mass", n("w", "s"), energy, "J/kg", low="-1e12")
    yield _q(
        "w_b", "boundary work done by the gas per mass", n("w", "b"), energy, "J/kg", low="-1e12"
    )
    yield _q(
        "dp",
        "pressure difference",
        n("Δp"),
        dim.PRESSURE,
        "Pa",
        low="-1e10",
        high="1e10",
        kind=Kind.DIFFERENTIAL,
    )


def _vessel_and_site() -> Iterator[Quantity]:
    n = Notation
    yield _q("V", "volume", n("V"), dim.VOLUME, "m3")
    yield _q("m", "mass of gas", n("m"), dim.MASS, "kg")
    yield _q("N", "amount of substance", n("N"), dim.AMOUNT, "mol")
    yield _q("dm", "mass discharged or filled", n("Δm"), dim.MASS, "kg")
    yield _q("t", "time", n("t"), dim.TIME, "s")
    yield _q(
        "p_atm",
        "atmospheric pressure",
        n("p", "atm"),
        dim.PRESSURE,
        "Pa",
        high="1e7",
        kind=Kind.ABSOLUTE,
    )
    yield _q(
        "T_atm",
        "atmospheric temperature",
        n("T", "atm"),
        dim.TEMPERATURE,
        "K",
        high="10000",
        kind=Kind.LEVEL,
    )
    yield _q(
        "p_ref",
        "reference pressure",
        n("p", "ref"),
        dim.PRESSURE,
        "Pa",
        high="1e7",
        kind=Kind.ABSOLUTE,
    )
    yield _q(
        "T_ref",
        "reference temperature",
        n("T", "ref"),
        dim.TEMPERATURE,
        "K",
        high="10000",
        kind=Kind.LEVEL,
    )
    yield _q("regime", "regime", n("regime"), dim.ONE, "1", kind=Kind.STATE)


_GAS = frozenset({"R", "M_w", "gamma", "c_p", "c_v", "C_p"})
_SITE = frozenset({"p_atm", "T_atm", "p_ref", "T_ref"})


_MAY_BE_ZERO = frozenset({"M", "M_cr", "u", "mdot", "ndot", "G", "q_V", "q_dyn", "dm", "t"})


def _home(symbol: str) -> str:
    return "gas" if symbol in _GAS else "site" if symbol in _SITE else "station"


@cache
def catalogue() -> Mapping[str, Quantity]:
    """Return every quantity by its symbol.

    Raises:
        DefinitionError: if a symbol is defined twice.
    """
    quantities: dict[str, Quantity] = {}
    for chapter in (_states, _gas, _flow, _changes, _vessel_and_site):
        for quantity in chapter():
            if quantities.setdefault(quantity.symbol, quantity) is not quantity:
                raise DefinitionError(f"quantity {quantity.symbol}", "it is defined twice")
    return MappingProxyType(quantities)


GAUGE_OF: Mapping[str, str] = MappingProxyType({"p": "p_g", "p_0": "p_0g"})
"""The gauge quantity that belongs to an absolute one."""

BAROMETRIC: frozenset[str] = frozenset({"p_atm", "p_ref"})
"""Absolute pressures for which nobody says so: a bare unit is understood as absolute."""
