"""Reading a text with a unit, such as ``12.0 bar(g)``, into an exact value."""

from __future__ import annotations

import difflib
import re
from dataclasses import dataclass
from decimal import Decimal
from fractions import Fraction

from ..errors import UnitError
from .catalogue import BAROMETRIC, GAUGE_OF, catalogue
from .quantity import Kind, Quantity
from .units import REFUSED, Unit, units_by_name

_LONGEST_TEXT = 80
_LARGEST_EXPONENT = 30
_NUMBER = re.compile(r"\s*([+-]?(?:\d+\.?\d*|\.\d+)(?:[eE][+-]?\d{1,3})?)(.*)", re.DOTALL)
_SPELLING = str.maketrans({"³": "3", "²": "2", "·": "*", "⋅": "*", "−": "-", "μ": "µ"})


@dataclass(frozen=True)
class Measured:
    """A number with a unit of the closed list, as typed.

    Attributes:
        number: the decimal as typed.
        unit: the unit.
        text: the whole text as typed.
    """

    number: Decimal
    unit: Unit
    text: str

    @property
    def rational(self) -> Fraction:
        """Exact value in coherent SI, without the unit's power of π."""
        return Fraction(self.number) * self.unit.factor + self.unit.offset


def read_measured(text: str) -> Measured:
    """Read a number and a unit.

    Args:
        text: such as ``12.0 bar(g)``, ``25 °C`` or ``0.82``.

    Returns:
        The number exactly as typed, with its unit.

    Raises:
        UnitError: if there is no number, or the unit is unknown or ambiguous.
    """
    if len(text) > _LONGEST_TEXT:
        raise UnitError(
            text[:20] + "...",
            f"a value with its unit has at most {_LONGEST_TEXT} characters",
            "Write only a number and a unit",
        )
    match = _NUMBER.fullmatch(text.translate(_SPELLING))
    if match is None:
        raise UnitError(
            text,
            "it does not begin with a number",
            'Write a number and a unit, such as "12.0 bar(g)"',
        )
    number, rest = match.groups()
    if re.match(r"\s*[,'_ ]\s*\d", rest):
        raise UnitError(
            text,
            "only digits and one decimal point are read",
            "Write the decimal sign as a point and leave out group separators",
        )
    value = Decimal(number)
    if value and abs(value.adjusted()) > _LARGEST_EXPONENT:
        raise UnitError(text, "the number is beyond any physical quantity", "Check its exponent")
    return Measured(value, find_unit(rest, text), text)


def find_unit(name: str, text: str = "") -> Unit:
    """Return the unit with this name or alias.

    Args:
        name: unit as typed; spaces inside do not count.
        text: the whole text, for the message.

    Raises:
        UnitError: if the unit is unknown or said for several units.
    """
    wanted = re.sub(r"\s+", "", name.translate(_SPELLING))
    known = units_by_name()
    if wanted in known:
        return known[wanted]
    shown = text or name
    if wanted in REFUSED:
        reason, remedy = REFUSED[wanted]
        raise UnitError(shown, reason, remedy)
    folded = sorted(unit for unit in known if unit.casefold() == wanted.casefold())
    near = folded or difflib.get_close_matches(wanted, sorted(known), n=3, cutoff=0.6)
    remedy = f"Did you mean {' or '.join(near)}" if near else "See calcsheets units"
    raise UnitError(shown, f'the unit "{wanted}" is not in the list of units', remedy)


def quantity_stated(quantity: Quantity, measured: Measured) -> Quantity:
    """Return the quantity that a text states when it stands for ``quantity``.

    A gauge pressure given for an absolute one states the gauge quantity, a volume flow at a
    reference state given for a mass flow states that volume flow: the way back is a step of
    the calculation and not a silent conversion.

    Raises:
        UnitError: if the unit does not fit, or leaves open which quantity is meant.
    """
    unit, text = measured.unit, measured.text
    if quantity.kind is Kind.STATE:
        raise UnitError(text, f"{quantity.symbol} is a state in words", "Give it as a word")
    if unit.kind is Kind.REFERENCE_VOLUME:
        return _reference_quantity(quantity, measured)
    if unit.dimension != quantity.dimension:
        raise UnitError(
            text,
            f"{quantity.title} ({quantity.symbol}) is measured in {quantity.unit}, "
            f"and {unit.name} is a unit of another dimension",
            f"Give it in {quantity.unit} or another unit of that dimension",
        )
    if quantity.kind in (Kind.ABSOLUTE, Kind.GAUGE, Kind.DIFFERENTIAL):
        return _pressure_quantity(quantity, measured)
    if quantity.kind is Kind.REFERENCE_VOLUME:
        raise UnitError(
            text,
            f"{quantity.symbol} is a {quantity.title}, and {unit.name} states no reference state",
            "Write the unit with its reference state, such as Nm3/h, Sm3/h, SCFM or m3/h(ANR)",
        )
    if quantity.kind is Kind.LEVEL and unit.kind is Kind.DIFFERENCE:
        raise UnitError(
            text,
            f"{quantity.title} is a temperature, and {unit.name} is a temperature difference",
            f"Write {unit.name.removeprefix('Δ')}",
        )
    return quantity


def _pressure_quantity(quantity: Quantity, measured: Measured) -> Quantity:
    kind, name = measured.unit.kind, measured.unit.name
    bare = name.partition("(")[0]
    if quantity.kind is Kind.DIFFERENTIAL:
        if kind in (Kind.PLAIN, Kind.DIFFERENTIAL):
            return quantity
        raise UnitError(
            measured.text,
            f"{quantity.title} is a pressure difference, neither gauge nor absolute",
            f"Write {bare}",
        )
    if kind is quantity.kind or (kind is Kind.PLAIN and quantity.symbol in BAROMETRIC):
        return quantity
    if kind is Kind.GAUGE and quantity.symbol in GAUGE_OF:
        return catalogue()[GAUGE_OF[quantity.symbol]]
    if kind is Kind.PLAIN:
        raise UnitError(
            measured.text,
            f"is this {quantity.title} gauge or absolute",
            f"Write {bare}(g) or {bare}(a)",
        )
    raise UnitError(
        measured.text,
        f"{quantity.title} ({quantity.symbol}) is a {quantity.kind.value}, "
        f"and {name} states a {kind.value}",
        "Write the pressure with the datum that the quantity has",
    )


_VOLUMES_OF = {"mdot": "q", "m": "V"}


def _reference_quantity(quantity: Quantity, measured: Measured) -> Quantity:
    unit = measured.unit
    if quantity.kind is Kind.REFERENCE_VOLUME:
        if quantity.reference == unit.reference and quantity.dimension == unit.dimension:
            return quantity
        raise UnitError(
            measured.text,
            f"{quantity.symbol} is a {quantity.title}, and {unit.name} has another meaning",
            f"Give {_VOLUMES_OF_DIMENSION[unit.name.count('/') > 0]}_{unit.reference} instead",
        )
    stated = _VOLUMES_OF.get(quantity.symbol)
    found = catalogue().get(f"{stated}_{unit.reference}") if stated else None
    if found is None or found.dimension != unit.dimension:
        raise UnitError(
            measured.text,
            f"{unit.name} is a volume at a reference state and does not state {quantity.title}",
            f"Give {quantity.symbol} in {quantity.unit} or another unit of that dimension",
        )
    return found


_VOLUMES_OF_DIMENSION = {True: "q", False: "V"}
