"""What a unit is."""

from __future__ import annotations

from dataclasses import dataclass
from fractions import Fraction

from .dimension import Dimension
from .quantity import Kind


@dataclass(frozen=True)
class Unit:
    """One unit of the closed list.

    Attributes:
        name: the name that is printed.
        factor: value of one unit in coherent SI, without its power of π.
        dimension: dimension of the unit.
        kind: the kind of value that the unit states; ``PLAIN`` where it states none.
        aliases: other accepted spellings.
        offset: coherent SI value of the unit's zero, for temperature levels.
        pi_power: power of π in the factor.
        pint: the same unit for the library at the edge, without kind.
        reference: name of the reference state of a volume, else empty.
    """

    name: str
    factor: Fraction
    dimension: Dimension
    kind: Kind = Kind.PLAIN
    aliases: tuple[str, ...] = ()
    offset: Fraction = Fraction(0)
    pi_power: int = 0
    pint: str = ""
    reference: str = ""
