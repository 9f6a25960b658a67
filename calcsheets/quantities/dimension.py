"""Dimensions: exponents of the SI base units."""

from __future__ import annotations

from dataclasses import dataclass
from fractions import Fraction

_BASE_UNITS = ("kg", "m", "s", "K", "mol")


@dataclass(frozen=True)
class Dimension:
    """Exponents of kilogram, metre, second, kelvin and mole, in this order."""

    exponents: tuple[Fraction, ...] = (Fraction(0),) * len(_BASE_UNITS)

    def __mul__(self, other: Dimension) -> Dimension:
        return Dimension(tuple(a + b for a, b in zip(self.exponents, other.exponents, strict=True)))

    def __truediv__(self, other: Dimension) -> Dimension:
        return self * other**-1

    def __pow__(self, exponent: Fraction | int) -> Dimension:
        return Dimension(tuple(a * exponent for a in self.exponents))

    @property
    def is_one(self) -> bool:
        """Whether a quantity of this dimension is a plain number."""
        return not any(self.exponents)

    def __str__(self) -> str:
        """The coherent SI unit in base units, such as ``kg*m^-1*s^-2``; ``1`` for a number."""
        parts = [
            unit if exponent == 1 else f"{unit}^{exponent}"
            for unit, exponent in zip(_BASE_UNITS, self.exponents, strict=True)
            if exponent
        ]
        return "*".join(parts) or "1"


def dimension(kg: int = 0, m: int = 0, s: int = 0, K: int = 0, mol: int = 0) -> Dimension:  # noqa: N803 - unit symbols
    """Return the dimension with the given whole exponents of the SI base units."""
    return Dimension(tuple(Fraction(exponent) for exponent in (kg, m, s, K, mol)))


ONE = dimension()
LENGTH = dimension(m=1)
AREA = dimension(m=2)
VOLUME = dimension(m=3)
TIME = dimension(s=1)
MASS = dimension(kg=1)
AMOUNT = dimension(mol=1)
TEMPERATURE = dimension(K=1)
PRESSURE = dimension(kg=1, m=-1, s=-2)
FORCE = dimension(kg=1, m=1, s=-2)
ENERGY = dimension(kg=1, m=2, s=-2)
POWER = dimension(kg=1, m=2, s=-3)
VELOCITY = dimension(m=1, s=-1)
ACCELERATION = dimension(m=1, s=-2)
DENSITY = dimension(kg=1, m=-3)
SPECIFIC_VOLUME = dimension(m=3, kg=-1)
MASS_FLOW = dimension(kg=1, s=-1)
MASS_FLUX = dimension(kg=1, m=-2, s=-1)
VOLUME_FLOW = dimension(m=3, s=-1)
AMOUNT_FLOW = dimension(mol=1, s=-1)
VISCOSITY = dimension(kg=1, m=-1, s=-1)
SPECIFIC_ENERGY = dimension(m=2, s=-2)
SPECIFIC_HEAT = dimension(m=2, s=-2, K=-1)
MOLAR_MASS = dimension(kg=1, mol=-1)
MOLAR_HEAT = dimension(kg=1, m=2, s=-2, K=-1, mol=-1)
PER_TEMPERATURE = dimension(K=-1)
COOLING = TEMPERATURE / PRESSURE
CONDUCTANCE = VOLUME_FLOW / PRESSURE
