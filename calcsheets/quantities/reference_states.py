"""Reference states of gas volumes: a volume says nothing before its state is known."""

from __future__ import annotations

from dataclasses import dataclass
from fractions import Fraction


@dataclass(frozen=True)
class ReferenceState:
    """A stated temperature and pressure at which a gas volume is counted.

    Attributes:
        name: short name, also the subscript of its quantities (``q_N``).
        title: the state in words.
        temperature: in kelvin; ``None`` where the site states it.
        pressure: absolute, in pascal; ``None`` where the site states it.
        source: where the state is laid down.
        known: how we know the source.
    """

    name: str
    title: str
    temperature: Fraction | None
    pressure: Fraction | None
    source: str
    known: str


_ATMOSPHERE = Fraction(101325)
_PSI = Fraction("0.45359237") * Fraction("9.80665") / Fraction("0.0254") ** 2

REFERENCE_STATES: tuple[ReferenceState, ...] = (
    ReferenceState(
        "N", "0 °C and 101.325 kPa, dry", Fraction("273.15"), _ATMOSPHERE, "DIN 1343", "from memory"
    ),
    ReferenceState(
        "S",
        "15 °C and 101.325 kPa, dry",
        Fraction("288.15"),
        _ATMOSPHERE,
        "ISO 13443",
        "from memory",
    ),
    ReferenceState(
        "SCF",
        "60 °F and 14.696 psia, dry",
        (Fraction(60) + Fraction("459.67")) * Fraction(5, 9),
        Fraction("14.696") * _PSI,
        "US gas trade",
        "common practice",
    ),
    ReferenceState(
        "ANR",
        "20 °C and 100 kPa, 65 % relative humidity counted as dry",
        Fraction("293.15"),
        Fraction(100000),
        "ISO 8778",
        "from memory",
    ),
    ReferenceState("ref", "the reference state of the site", None, None, "the brief", "brief"),
    ReferenceState("FA", "free air: the atmosphere of the site", None, None, "the brief", "brief"),
)
