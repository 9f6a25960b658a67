"""The closed list of units.

A general unit parser reads trade units into nonsense, so nothing is parsed here: a unit is
known by its exact name or alias, or it is refused. Factors are exact fractions of coherent
SI units (times a power of π for angles), so that a decimal as typed stays exact.
"""

from __future__ import annotations

from collections.abc import Iterator, Mapping
from fractions import Fraction
from functools import cache
from types import MappingProxyType

from ..errors import DefinitionError
from . import dimension as dim
from .metering_units import metering_units
from .quantity import Kind
from .unit import Unit

# Exact definitions: international yard and pound of 1959, SI brochure, NIST SP 811 (from memory).
_INCH = Fraction("0.0254")
_FOOT = 12 * _INCH
_POUND = Fraction("0.45359237")
_G_N = Fraction("9.80665")
_POUND_FORCE = _POUND * _G_N
_PSI = _POUND_FORCE / _INCH**2
_MMHG = Fraction("13.5951") * _G_N  # conventional millimetre of mercury
_MMH2O = _G_N  # conventional: 1000 kg/m3
_BTU = 1055 + Fraction("0.05585262")
_RANKINE = Fraction(5, 9)
_GALLON = 231 * _INCH**3
_HOUR = Fraction(3600)
_MINUTE = Fraction(60)
_DAY = Fraction(86400)
_SLUG = _POUND_FORCE / _FOOT

_PRESSURES: tuple[tuple[str, Fraction, tuple[str, ...], str], ...] = (
    ("Pa", Fraction(1), (), "pascal"),
    ("hPa", Fraction(100), (), "hectopascal"),
    ("kPa", Fraction(1000), (), "kilopascal"),
    ("MPa", Fraction(10**6), (), "megapascal"),
    ("mbar", Fraction(100), (), "millibar"),
    ("bar", Fraction(10**5), (), "bar"),
    ("psi", _PSI, ("lbf/in2",), "pound_force_per_square_inch"),
    ("psf", _POUND_FORCE / _FOOT**2, ("lbf/ft2",), "force_pound/foot**2"),
    ("ksi", 1000 * _PSI, (), "kip_per_square_inch"),
    ("atm", Fraction(101325), (), "standard_atmosphere"),
    ("at", _G_N * 10**4, ("kgf/cm2",), "technical_atmosphere"),
    ("mmHg", _MMHG, (), "mmHg"),
    ("Torr", Fraction(101325, 760), ("torr",), "torr"),
    ("inHg", _MMHG * _INCH * 1000, (), "inHg"),
    ("mmH2O", _MMH2O, ("mmWC", "mmwc"), "mmH2O"),
    ("cmH2O", 10 * _MMH2O, (), "cmH2O"),
    ("mH2O", 1000 * _MMH2O, (), "mH2O"),
    ("inH2O", _MMH2O * _INCH * 1000, ("inWC", "inwc"), "inH2O"),
    ("ftH2O", _MMH2O * _FOOT * 1000, (), "ftH2O"),
)
_PRESSURE_KINDS = (
    ("(a)", ("a", "(abs)", " abs"), Kind.ABSOLUTE),
    ("(g)", ("g", "(gauge)", " gauge"), Kind.GAUGE),
    ("(d)", ("d", "(diff)"), Kind.DIFFERENTIAL),
)
# Only these take a bare letter: "barg" and "psia" are trade words, "Pag" is not.
_LETTERED = {"bar", "mbar", "psi"}


def _pressure_units() -> Iterator[Unit]:
    for name, factor, aliases, pint in _PRESSURES:
        yield Unit(name, factor, dim.PRESSURE, Kind.PLAIN, aliases, pint=pint)
        for suffix, others, kind in _PRESSURE_KINDS:
            spelled = [
                base + other
                for base in (name, *aliases)
                for other in (suffix, *others)
                if len(other) > 1 or base in _LETTERED
            ]
            yield Unit(
                name + suffix,
                factor,
                dim.PRESSURE,
                kind,
                tuple(text.replace(" ", "") for text in spelled if text != name + suffix),
                pint=pint,
            )


def _temperature_units() -> Iterator[Unit]:
    ice_point = Fraction("273.15")
    zero_fahrenheit = Fraction("459.67") * _RANKINE
    levels = (
        ("°C", Fraction(1), ice_point, ("degC", "C", "ºC"), "degree_Celsius"),
        ("°F", _RANKINE, zero_fahrenheit, ("degF", "F", "ºF"), "degree_Fahrenheit"),
    )
    for name, factor, offset, aliases, pint in levels:
        yield Unit(name, factor, dim.TEMPERATURE, Kind.LEVEL, aliases, offset, pint=pint)
        yield Unit(
            f"Δ{name}",
            factor,
            dim.TEMPERATURE,
            Kind.DIFFERENCE,
            tuple(f"delta_{alias}" for alias in aliases[:2]),
            pint=f"delta_{pint}",
        )
    yield Unit("K", Fraction(1), dim.TEMPERATURE, Kind.PLAIN, ("kelvin",), pint="kelvin")
    yield Unit(
        "°R", _RANKINE, dim.TEMPERATURE, Kind.PLAIN, ("degR", "R", "ºR"), pint="degree_Rankine"
    )


_VOLUME_TIMES = (("s", Fraction(1)), ("min", _MINUTE), ("h", _HOUR), ("d", _DAY))


def _reference_volume_units() -> Iterator[Unit]:
    """Volumes and volume flows at a stated reference state, from one list of prefixes."""
    cubic_foot = _FOOT**3
    bases: tuple[tuple[str, str, Fraction, tuple[str, ...], str], ...] = (
        ("N", "Nm3", Fraction(1), ("m3(N)",), "meter**3"),
        ("N", "NL", Fraction(1, 1000), ("Nl",), "liter"),
        ("S", "Sm3", Fraction(1), ("m3(S)", "scm", "SCM"), "meter**3"),
        ("SCF", "SCF", cubic_foot, ("scf", "Scf", "ft3(std)"), "foot**3"),
        ("ANR", "m3(ANR)", Fraction(1), (), "meter**3"),
        ("ANR", "L(ANR)", Fraction(1, 1000), ("dm3(ANR)", "l(ANR)"), "liter"),
        ("FA", "m3(FAD)", Fraction(1), ("m3(freeair)",), "meter**3"),
        ("FA", "ft3(FAD)", cubic_foot, ("ft3(freeair)",), "foot**3"),
        ("ref", "m3(ref)", Fraction(1), (), "meter**3"),
        ("ref", "ft3(ref)", cubic_foot, (), "foot**3"),
    )
    kind = Kind.REFERENCE_VOLUME
    for state, name, factor, aliases, pint in bases:
        yield Unit(name, factor, dim.VOLUME, kind, aliases, pint=pint, reference=state)
        for time, seconds in _VOLUME_TIMES:
            flow = _flow_name(name, time)
            spelled = dict.fromkeys(_flow_aliases(name, aliases, time))
            spelled.pop(flow, None)
            yield Unit(
                flow,
                factor / seconds,
                dim.VOLUME_FLOW,
                kind,
                tuple(spelled),
                pint=f"{pint}/{_PINT_TIMES[time]}",
                reference=state,
            )


_PINT_TIMES = {"s": "second", "min": "minute", "h": "hour", "d": "day"}
_SCF_WORDS = {
    "min": ("SCFM", "scfm", "Scfm"),
    "h": ("SCFH", "scfh", "Scfh"),
    "d": ("SCFD", "scfd"),
    "s": ("SCFS", "scfs"),
}


def _flow_name(name: str, time: str) -> str:
    """``m3(ANR)`` per hour is written ``m3/h(ANR)``: the state stands behind the unit."""
    volume, bracket, state = name.partition("(")
    return f"{volume}/{time}{bracket}{state}"


def _flow_aliases(name: str, aliases: tuple[str, ...], time: str) -> Iterator[str]:
    for spelled in (name, *aliases):
        yield f"{spelled}/{time}"
        if spelled != name:
            yield _flow_name(spelled, time)
    if name == "SCF":
        yield from _SCF_WORDS[time]
    if name == "ft3(FAD)" and time == "min":
        yield from ("cfm(FAD)", "CFM(FAD)")


def _plain_units() -> Iterator[Unit]:
    yield from _geometric_units()
    yield from _mechanical_units()
    yield from _rates()
    yield from _specific_units()
    yield from metering_units()
    yield Unit("1", Fraction(1), dim.ONE, aliases=("",), pint="dimensionless")
    yield Unit("%", Fraction(1, 100), dim.ONE, pint="percent")
    yield Unit("rad", Fraction(1), dim.ONE, pint="radian")
    yield Unit("°", Fraction(1, 180), dim.ONE, aliases=("deg",), pi_power=1, pint="degree")


def _geometric_units() -> Iterator[Unit]:
    one = Fraction(1)
    milli = Fraction(1, 1000)
    u = Unit
    yield u("m", one, dim.LENGTH, pint="meter")
    yield u("mm", milli, dim.LENGTH, pint="millimeter")
    yield u("cm", Fraction(1, 100), dim.LENGTH, pint="centimeter")
    yield u("km", Fraction(1000), dim.LENGTH, pint="kilometer")
    yield u("µm", Fraction(1, 10**6), dim.LENGTH, aliases=("um", "μm"), pint="micrometer")
    yield u("in", _INCH, dim.LENGTH, aliases=("inch",), pint="inch")
    yield u("thou", _INCH / 1000, dim.LENGTH, pint="thou")
    yield u("ft", _FOOT, dim.LENGTH, aliases=("foot",), pint="foot")
    yield u("m2", one, dim.AREA, pint="meter**2")
    yield u("cm2", Fraction(1, 10**4), dim.AREA, pint="centimeter**2")
    yield u("mm2", Fraction(1, 10**6), dim.AREA, pint="millimeter**2")
    yield u("in2", _INCH**2, dim.AREA, pint="inch**2")
    yield u("ft2", _FOOT**2, dim.AREA, pint="foot**2")
    yield u("m3", one, dim.VOLUME, pint="meter**3")
    yield u("L", milli, dim.VOLUME, aliases=("l", "dm3"), pint="liter")
    yield u("cm3", Fraction(1, 10**6), dim.VOLUME, aliases=("mL", "ml"), pint="centimeter**3")
    yield u("ft3", _FOOT**3, dim.VOLUME, aliases=("cuft",), pint="foot**3")
    yield u("in3", _INCH**3, dim.VOLUME, pint="inch**3")
    yield u("gal", _GALLON, dim.VOLUME, aliases=("gal(US)",), pint="US_liquid_gallon")


def _mechanical_units() -> Iterator[Unit]:
    """Time, mass, amount, force, energy and power."""
    one = Fraction(1)
    milli = Fraction(1, 1000)
    u = Unit
    yield u("s", one, dim.TIME, aliases=("sec",), pint="second")
    yield u("ms", milli, dim.TIME, pint="millisecond")
    yield u("min", _MINUTE, dim.TIME, pint="minute")
    yield u("h", _HOUR, dim.TIME, aliases=("hr",), pint="hour")
    yield u("d", _DAY, dim.TIME, aliases=("day",), pint="day")
    yield u("kg", one, dim.MASS, pint="kilogram")
    yield u("g", milli, dim.MASS, pint="gram")
    yield u("t", Fraction(1000), dim.MASS, aliases=("tonne",), pint="metric_ton")
    yield u("lbm", _POUND, dim.MASS, aliases=("lb",), pint="pound")
    yield u("slug", _SLUG, dim.MASS, pint="slug")
    yield u("mol", one, dim.AMOUNT, pint="mole")
    yield u("kmol", Fraction(1000), dim.AMOUNT, pint="kilomole")
    yield u("lbmol", 1000 * _POUND, dim.AMOUNT, pint="pound*mole/gram")
    yield u("N", one, dim.FORCE, pint="newton")
    yield u("kN", Fraction(1000), dim.FORCE, pint="kilonewton")
    yield u("lbf", _POUND_FORCE, dim.FORCE, pint="pound_force")
    yield u("kgf", _G_N, dim.FORCE, aliases=("kp",), pint="kilogram_force")
    yield u("J", one, dim.ENERGY, pint="joule")
    yield u("kJ", Fraction(1000), dim.ENERGY, pint="kilojoule")
    yield u("MJ", Fraction(10**6), dim.ENERGY, pint="megajoule")
    yield u("Btu", _BTU, dim.ENERGY, aliases=("BTU",), pint="Btu_it")
    yield u("ft*lbf", _FOOT * _POUND_FORCE, dim.ENERGY, pint="foot*pound_force")
    yield u("W", one, dim.POWER, pint="watt")
    yield u("kW", Fraction(1000), dim.POWER, pint="kilowatt")
    yield u("MW", Fraction(10**6), dim.POWER, pint="megawatt")
    yield u("hp", 550 * _FOOT * _POUND_FORCE, dim.POWER, pint="horsepower")
    yield u("Btu/h", _BTU / _HOUR, dim.POWER, aliases=("BTU/h",), pint="Btu_it/hour")


def _rates() -> Iterator[Unit]:
    u = Unit
    for mass, factor, pint in (
        ("kg", Fraction(1), "kilogram"),
        ("g", Fraction(1, 1000), "gram"),
        ("t", Fraction(1000), "metric_ton"),
        ("lbm", _POUND, "pound"),
        ("slug", _SLUG, "slug"),
    ):
        for time, seconds in _VOLUME_TIMES:
            aliases: tuple[str, ...] = (f"lb/{time}",) if mass == "lbm" else ()
            if mass == "lbm" and time == "h":
                aliases += ("lb/hr", "lbm/hr", "pph")
            if mass == "kg" and time == "h":
                aliases = ("kg/hr",)
            yield u(
                f"{mass}/{time}",
                factor / seconds,
                dim.MASS_FLOW,
                aliases=aliases,
                pint=f"{pint}/{_PINT_TIMES[time]}",
            )
    words = {"min": ("cfm", "CFM", "acfm", "ACFM"), "h": ("cfh", "CFH"), "s": ("cfs",), "d": ()}
    for time, seconds in _VOLUME_TIMES:
        per = _PINT_TIMES[time]
        yield u(f"m3/{time}", 1 / seconds, dim.VOLUME_FLOW, pint=f"meter**3/{per}")
        yield u(
            f"L/{time}",
            Fraction(1, 1000) / seconds,
            dim.VOLUME_FLOW,
            aliases=(f"l/{time}",),
            pint=f"liter/{per}",
        )
        yield u(
            f"ft3/{time}",
            _FOOT**3 / seconds,
            dim.VOLUME_FLOW,
            aliases=words[time],
            pint=f"foot**3/{per}",
        )
        yield u(f"mol/{time}", 1 / seconds, dim.AMOUNT_FLOW, pint=f"mole/{per}")
        yield u(f"kmol/{time}", 1000 / seconds, dim.AMOUNT_FLOW, pint=f"kilomole/{per}")
        yield u(
            f"lbmol/{time}",
            1000 * _POUND / seconds,
            dim.AMOUNT_FLOW,
            pint=f"pound*mole/gram/{per}",
        )


def _specific_units() -> Iterator[Unit]:
    u = Unit
    one, kilo = Fraction(1), Fraction(1000)
    yield u("m/s", one, dim.VELOCITY, pint="meter/second")
    yield u("km/h", kilo / _HOUR, dim.VELOCITY, pint="kilometer/hour")
    yield u("ft/s", _FOOT, dim.VELOCITY, aliases=("fps",), pint="foot/second")
    yield u("ft/min", _FOOT / _MINUTE, dim.VELOCITY, aliases=("fpm",), pint="foot/minute")
    yield u("kn", Fraction(1852) / _HOUR, dim.VELOCITY, aliases=("kt",), pint="knot")
    yield u("m/s2", one, dim.ACCELERATION, pint="meter/second**2")
    yield u("ft/s2", _FOOT, dim.ACCELERATION, pint="foot/second**2")
    yield u("kg/m3", one, dim.DENSITY, pint="kilogram/meter**3")
    yield u("g/L", one, dim.DENSITY, aliases=("g/l",), pint="gram/liter")
    yield u("lbm/ft3", _POUND / _FOOT**3, dim.DENSITY, aliases=("lb/ft3",), pint="pound/foot**3")
    yield u("slug/ft3", _SLUG / _FOOT**3, dim.DENSITY, pint="slug/foot**3")
    yield u("m3/kg", one, dim.SPECIFIC_VOLUME, pint="meter**3/kilogram")
    yield u(
        "ft3/lbm", _FOOT**3 / _POUND, dim.SPECIFIC_VOLUME, aliases=("ft3/lb",), pint="foot**3/pound"
    )
    yield u("kg/(m2*s)", one, dim.MASS_FLUX, pint="kilogram/meter**2/second")
    yield u("lbm/(ft2*s)", _POUND / _FOOT**2, dim.MASS_FLUX, pint="pound/foot**2/second")
    yield u("J/kg", one, dim.SPECIFIC_ENERGY, pint="joule/kilogram")
    yield u("kJ/kg", kilo, dim.SPECIFIC_ENERGY, pint="kilojoule/kilogram")
    yield u("Btu/lbm", _BTU / _POUND, dim.SPECIFIC_ENERGY, aliases=("Btu/lb",), pint="Btu_it/pound")
    yield u(
        "ft*lbf/lbm",
        _FOOT * _G_N,
        dim.SPECIFIC_ENERGY,
        pint="foot*pound_force/pound",
    )
    yield u("J/(kg*K)", one, dim.SPECIFIC_HEAT, pint="joule/kilogram/kelvin")
    yield u("kJ/(kg*K)", kilo, dim.SPECIFIC_HEAT, pint="kilojoule/kilogram/kelvin")
    btu_heat = _BTU / _POUND / _RANKINE
    yield u(
        "Btu/(lbm*°R)",
        btu_heat,
        dim.SPECIFIC_HEAT,
        aliases=("Btu/(lbm*degR)", "Btu/(lbm*R)", "Btu/(lbm*°F)", "Btu/(lb*R)", "Btu/(lb*F)"),
        pint="Btu_it/pound/delta_degree_Fahrenheit",
    )
    yield u(
        "ft*lbf/(lbm*°R)",
        _FOOT * _G_N / _RANKINE,
        dim.SPECIFIC_HEAT,
        aliases=("ft*lbf/(lbm*degR)", "ft*lbf/(lbm*R)", "ft*lbf/(lb*R)"),
        pint="foot*pound_force/pound/delta_degree_Fahrenheit",
    )
    yield u("kg/mol", one, dim.MOLAR_MASS, pint="kilogram/mole")
    yield u(
        "g/mol",
        1 / kilo,
        dim.MOLAR_MASS,
        aliases=("kg/kmol", "lbm/lbmol", "lb/lbmol"),
        pint="gram/mole",
    )
    yield u("J/(mol*K)", one, dim.MOLAR_HEAT, aliases=("kJ/(kmol*K)",), pint="joule/mole/kelvin")


REFUSED: Mapping[str, tuple[str, str]] = MappingProxyType(
    {
        "mil": (
            "mil is said for a thousandth of an inch and for a millimetre",
            "Write thou (0.001 in) or mm",
        ),
        "mils": (
            "mil is said for a thousandth of an inch and for a millimetre",
            "Write thou (0.001 in) or mm",
        ),
        "ton": (
            "ton is said for 2000 lb, 2240 lb and 1000 kg",
            "Write t (1000 kg), or give the mass in lbm",
        ),
        "cal": ("several calories differ by up to 0.1 %", "Write J"),
        "kcal": ("several calories differ by up to 0.1 %", "Write kJ"),
        "pdl": ("the poundal is easily taken for the pound-force", "Write lbf or N"),
        "ata": ("ata is said for technical and for standard atmospheres", "Write at(a) or atm(a)"),
        "atg": ("atg is said for technical and for standard atmospheres", "Write at(g) or atm(g)"),
    }
)
"""Units that people mean differently, with the reason and the remedy."""


@cache
def all_units() -> tuple[Unit, ...]:
    """Return every unit of the closed list, in a fixed order."""
    return (
        *_plain_units(),
        *_pressure_units(),
        *_temperature_units(),
        *_reference_volume_units(),
    )


@cache
def units_by_name() -> Mapping[str, Unit]:
    """Return the closed list by name and alias.

    Raises:
        DefinitionError: if two units claim one name.
    """
    names: dict[str, Unit] = {}
    for unit in all_units():
        for name in (unit.name, *unit.aliases):
            if names.setdefault(name, unit) is not unit:
                raise DefinitionError(f"unit {unit.name}", f'the name "{name}" is taken twice')
    return MappingProxyType(names)
