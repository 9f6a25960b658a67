"""What a quantity is: symbol, name, dimension, kind and physical bounds."""

from __future__ import annotations

from dataclasses import dataclass
from enum import Enum
from fractions import Fraction

from ..errors import DefinitionError
from .dimension import Dimension


class Kind(Enum):
    """What a value is beyond its dimension."""

    PLAIN = "plain"
    ABSOLUTE = "absolute pressure"
    GAUGE = "gauge pressure"
    DIFFERENTIAL = "pressure difference"
    LEVEL = "temperature"
    DIFFERENCE = "temperature difference"
    REFERENCE_VOLUME = "volume at a reference state"
    STATE = "state in words"


@dataclass(frozen=True)
class Notation:
    """How the symbol of a quantity is set.

    Attributes:
        base: the letter, Greek letters as such (``γ``).
        subscript: the subscript, empty for none.
        accent: ``dot`` for a rate, else empty.
        superscript: such as ``*`` for the critical state, else empty.
    """

    base: str
    subscript: str = ""
    accent: str = ""
    superscript: str = ""


@dataclass(frozen=True)
class Quantity:
    """One physical quantity of the vocabulary.

    Attributes:
        symbol: the name used in briefs and keys, such as ``p_0``.
        title: the name in words, such as ``stagnation pressure``.
        notation: how the symbol is set.
        dimension: dimension of the quantity.
        low: physical lower bound in coherent SI units.
        high: upper bound in coherent SI units up to which a root is searched.
        kind: what a value is beyond its dimension.
        reference: name of the reference state of a volume, else empty.
        unit: coherent SI unit for printing, a name of the closed unit list.
        home: whose quantity it is: ``station`` (also a process), ``gas`` or ``site``.
        zero: whether a quantity whose lower bound is zero may be zero, as a flow may.
    """

    symbol: str
    title: str
    notation: Notation
    dimension: Dimension
    low: Fraction
    high: Fraction
    unit: str
    kind: Kind = Kind.PLAIN
    reference: str = ""
    home: str = "station"
    zero: bool = False

    def __post_init__(self) -> None:
        if self.low >= self.high:
            raise DefinitionError(
                f"quantity {self.symbol}", "its lower bound is not below its upper bound"
            )
        if not self.symbol.replace("_", "").isalnum() or not self.symbol.isascii():
            raise DefinitionError(
                f"quantity {self.symbol}", "a symbol consists of ASCII letters, digits and _"
            )


@dataclass(frozen=True, order=True)
class Variable:
    """A quantity at a place: ``p_0@receiver``.

    Attributes:
        symbol: symbol of the quantity.
        place: name of the station or process, or ``gas`` or ``site``.
    """

    symbol: str
    place: str

    def __str__(self) -> str:
        return f"{self.symbol}@{self.place}"
