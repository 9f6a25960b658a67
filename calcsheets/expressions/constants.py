"""The constants that equations may name, each with its source."""

from __future__ import annotations

from collections.abc import Iterator, Mapping
from dataclasses import dataclass
from fractions import Fraction
from functools import cached_property
from types import MappingProxyType

from ..quantities import REFERENCE_STATES, Dimension
from ..quantities.dimension import (
    CONDUCTANCE,
    DENSITY,
    LENGTH,
    MOLAR_HEAT,
    ONE,
    PRESSURE,
    TEMPERATURE,
    VELOCITY,
    VOLUME_FLOW,
)


@dataclass(frozen=True)
class ConstantDefinition:
    """A constant with its source.

    Attributes:
        name: name in expressions.
        title: the constant in words.
        value: exact value in coherent SI; ``None`` for π.
        dimension: its dimension.
        base: letter for printing.
        subscript: subscript for printing.
        source: where the value is laid down.
        known: how we know it.
    """

    name: str
    title: str
    value: Fraction | None
    dimension: Dimension
    base: str
    subscript: str
    source: str
    known: str

    @cached_property
    def text(self) -> str:
        """The exact value as text; ``π`` for π."""
        return "π" if self.value is None else decimal_text(self.value)


def _constants() -> Iterator[ConstantDefinition]:
    row = ConstantDefinition
    yield row(
        "pi", "ratio of circumference to diameter", None, ONE, "π", "",
        "mathematics", "common practice",
    )  # fmt: skip
    yield row(
        "R_u", "molar gas constant", Fraction("8.31446261815324"), MOLAR_HEAT, "R", "u",
        "CODATA 2018 and 2022, exact by the SI of 2019", "library",
    )  # fmt: skip
    yield from _of_metering()
    for state in REFERENCE_STATES:
        for letter, value, dimension, word in (
            ("T", state.temperature, TEMPERATURE, "temperature"),
            ("p", state.pressure, PRESSURE, "pressure"),
        ):
            if value is not None:
                yield row(
                    f"{letter}_{state.name}", f"{word} of the reference state {state.title}",
                    value, dimension, letter, state.name, state.source, state.known,
                )  # fmt: skip


def _of_metering() -> Iterator[ConstantDefinition]:
    """Lengths, pressures and a density that the standards of flow measurement name."""
    row = ConstantDefinition
    yield row(
        "l_in", "one inch, the length of ISO 5167-2 for flange tappings", Fraction("0.0254"),
        LENGTH, "l", "in", "25.4 mm, ISO 5167-2", "library",
    )  # fmt: skip
    yield row(
        "l_mm", "one millimetre, the unit of lengths in the standard", Fraction(1, 1000),
        LENGTH, "l", "mm", "the standard of the relation", "common practice",
    )  # fmt: skip
    yield row(
        "l_m", "one metre, the unit of lengths in the standard", Fraction(1),
        LENGTH, "l", "m", "the standard of the relation", "common practice",
    )  # fmt: skip
    yield row(
        "C_u", "one cubic metre per second and pascal, the unit of sonic conductance", Fraction(1),
        CONDUCTANCE, "C", "u", "the standard of the relation", "common practice",
    )  # fmt: skip
    yield row(
        "T_20", "20 °C, the temperature at which dimensions are stated", Fraction("293.15"),
        TEMPERATURE, "T", "20", "ISO 1", "from memory",
    )  # fmt: skip
    yield row(
        "q_Kv", "one cubic metre per hour, the unit of Kv", Fraction(1, 3600),
        VOLUME_FLOW, "q", "u", "IEC 60534-1", "common practice",
    )  # fmt: skip
    yield row(
        "nu_u", "one square metre per second, the unit of kinematic viscosity", Fraction(1),
        VELOCITY * LENGTH, "ν", "u", "IEC 60534-2-1", "common practice",
    )  # fmt: skip
    yield row(
        "p_Kv", "pressure drop of the water test that defines Kv", Fraction(100000),
        PRESSURE, "p", "Kv", "1 bar, IEC 60534-1", "common practice",
    )  # fmt: skip
    yield row(
        "p_Cv", "pressure drop of the water test that defines Cv",
        Fraction("0.45359237") * Fraction("9.80665") / Fraction("0.0254") ** 2,
        PRESSURE, "p", "Cv", "1 psi, IEC 60534-1", "common practice",
    )  # fmt: skip
    yield row(
        "rho_w", "density of water at 15 °C, to which Kv and Cv refer", Fraction("999.1"),
        DENSITY, "ρ", "w", "IEC 60534-2-1", "library",
    )  # fmt: skip


CONSTANTS: Mapping[str, ConstantDefinition] = MappingProxyType(
    {definition.name: definition for definition in _constants()}
)


def decimal_text(value: Fraction) -> str:
    """Return a finite decimal as text, or numerator/denominator where there is none."""
    denominator = value.denominator
    digits = 0
    while denominator % 10 == 0 or denominator % 5 == 0 or denominator % 2 == 0:
        denominator = denominator // (
            10 if denominator % 10 == 0 else 5 if denominator % 5 == 0 else 2
        )
        digits += 1
    if denominator != 1:
        return f"{value.numerator}/{value.denominator}"
    scaled = value * 10**digits
    text = f"{abs(scaled.numerator):0{digits + 1}d}"
    whole, decimals = (text[:-digits], text[-digits:].rstrip("0")) if digits else (text, "")
    sign = "-" if value < 0 else ""
    return f"{sign}{whole}.{decimals}" if decimals else f"{sign}{whole}"
