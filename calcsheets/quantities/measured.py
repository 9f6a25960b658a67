"""Reading a text with a unit, such as ``12.0 bar(g)``, into an exact value."""

from __future__ import annotations

import difflib
import re
from dataclasses import dataclass
from decimal import Decimal
from fractions import Fraction

from ..errors import UnitError
from . import dimension as dim
from .catalogue import BAROMETRIC, GAUGE_OF, catalogue
from .quantity import Kind, Quantity
from .unit import Unit
from .units import REFUSED, all_units, units_by_name

LONGEST_TEXT = 80
_LARGEST_EXPONENT = 30
_NUMBER = re.compile(
    r"\s*([+-]?(?:[0-9]+\.?[0-9]*|\.[0-9]+)(?:[eE][+-]?[0-9]{1,3})?)(.*)", re.DOTALL
)
_GROUPING = re.compile(r"[\s,.'’_]+\d")
_BLANK_PRODUCT = re.compile(r"(?<=[a-z0-9])\s+(?=[A-Z])")  # as in J/(kg K)
_POWER = re.compile(r"\^|\*\*")
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
    if len(text) > LONGEST_TEXT:
        raise UnitError(
            text[:20] + "...",
            f"a value with its unit has at most {LONGEST_TEXT} characters",
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
    if _GROUPING.match(rest):
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
    wanted = _POWER.sub("", re.sub(r"\s+", "", name.translate(_SPELLING)))
    known = units_by_name()
    product = _BLANK_PRODUCT.sub("*", name.strip().translate(_SPELLING))
    for spelling in (wanted, _POWER.sub("", product)):
        if spelling in known:
            return known[spelling]
    shown = text or name
    if wanted in REFUSED:
        reason, remedy = REFUSED[wanted]
        raise UnitError(shown, reason, remedy)
    folded = sorted(unit for unit in known if unit.casefold() == wanted.casefold())
    near = folded or difflib.get_close_matches(wanted, sorted(known), n=3, cutoff=0.6)
    names = dict.fromkeys(known[spelling].name for spelling in near)
    ask = f"Did you mean {' or '.join(names)}? " if near else ""
    remedy = f"{ask}See calcsheets units"
    raise UnitError(shown, f'the unit "{wanted}" is not in the list of units', remedy)


def default_unit(quantity: Quantity) -> Unit:
    """Return the unit in which a quantity is printed where none is asked for.

    It is the coherent SI unit with the datum of the quantity; a volume at a reference state
    takes the first unit of the list that states it.
    """
    if quantity.kind in (Kind.ABSOLUTE, Kind.GAUGE, Kind.REFERENCE_VOLUME):
        return next(
            unit
            for unit in all_units()
            if unit.dimension == quantity.dimension
            and (unit.kind, unit.reference) == (quantity.kind, quantity.reference)
        )
    return find_unit(quantity.unit)


_STATED = {
    dim.VOLUME: "Nm3, Sm3, SCF or m3(ANR)",
    dim.VOLUME_FLOW: "Nm3/h, Sm3/h, SCFM or m3/h(ANR)",
}


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
        raise _dimension_error(quantity, measured)
    if quantity.kind in (Kind.ABSOLUTE, Kind.GAUGE, Kind.DIFFERENTIAL):
        return _pressure_quantity(quantity, measured)
    if quantity.kind is Kind.REFERENCE_VOLUME:
        raise UnitError(
            text,
            f"{quantity.symbol} is the {quantity.title}, and {unit.name} states no reference state",
            f"Which state is meant? Write the unit with it, such as {_STATED[quantity.dimension]}",
        )
    if quantity.kind is Kind.LEVEL and unit.kind is Kind.DIFFERENCE:
        raise UnitError(
            text,
            f"{quantity.title} is a temperature, and {unit.name} is a temperature difference",
            f"Write {unit.name.removeprefix('Δ')}",
        )
    return quantity


def quantity_given(quantity: Quantity, measured: Measured) -> Quantity:
    """Return the quantity that a text states, and require its value within physical bounds.

    Raises:
        UnitError: as ``quantity_stated``, or if the value is out of the bounds.
    """
    stated = quantity_stated(quantity, measured)
    value = measured.rational * (_PI if measured.unit.pi_power else 1)
    beyond = stated.low == 0 and not stated.zero
    if value < stated.low or (beyond and value == 0):
        limit = f"{'above' if beyond else 'at least'} {_bound(stated.low, stated)}"
    elif value > stated.high:
        limit = f"at most {_bound(stated.high, stated)}"
    else:
        return stated
    raise UnitError(
        measured.text,
        f"{stated.title} ({stated.symbol}) must be {limit}",
        "Check the number and its unit",
    )


_PI = Fraction("3.14159265358979323846")  # only to compare an angle with its bounds


def _bound(value: Fraction, quantity: Quantity) -> str:
    number = f"{float(value):g}"
    return number if quantity.unit == "1" else f"{number} {quantity.unit}"


def _dimension_error(quantity: Quantity, measured: Measured) -> UnitError:
    name = f"{quantity.title} ({quantity.symbol})"
    typed, right = measured.unit.name, default_unit(quantity).name
    if right == "1":
        return UnitError(
            measured.text,
            f"{name} is a plain number, and {typed} is a unit",
            "Give it without a unit, or in %",
        )
    reason = (
        f"the unit is missing; {name} is measured in {right}"
        if typed == "1"
        else f"{name} is measured in {right}, and {typed} is a unit of another dimension"
    )
    return UnitError(measured.text, reason, f"Give it in {right} or another unit of that dimension")


_DATUM = {Kind.ABSOLUTE: "(a)", Kind.GAUGE: "(g)", Kind.DIFFERENTIAL: ""}
_WITH_ARTICLE = {
    Kind.ABSOLUTE: "an absolute pressure",
    Kind.GAUGE: "a gauge pressure",
    Kind.DIFFERENTIAL: "a pressure difference",
}


def _pressure_quantity(quantity: Quantity, measured: Measured) -> Quantity:
    kind, name = measured.unit.kind, measured.unit.name
    bare = name.partition("(")[0]
    if kind is quantity.kind:
        return quantity
    if kind is Kind.PLAIN and (quantity.kind is Kind.DIFFERENTIAL or quantity.symbol in BAROMETRIC):
        return quantity
    if kind is Kind.GAUGE and quantity.symbol in GAUGE_OF:
        return catalogue()[GAUGE_OF[quantity.symbol]]
    title = f"{quantity.title} ({quantity.symbol})"
    if kind is Kind.PLAIN:
        raise UnitError(
            measured.text,
            f"{title} may be gauge or absolute",
            f"Which is meant? Write {bare}(g) or {bare}(a)",
        )
    raise UnitError(
        measured.text,
        f"{title} is {_WITH_ARTICLE[quantity.kind]}, and {name} states {_WITH_ARTICLE[kind]}",
        f"Give the value in {bare}{_DATUM[quantity.kind]}",
    )


_VOLUMES_OF = {"mdot": "q", "m": "V"}


def _reference_quantity(quantity: Quantity, measured: Measured) -> Quantity:
    unit = measured.unit
    if quantity.kind is Kind.REFERENCE_VOLUME:
        if quantity.reference == unit.reference and quantity.dimension == unit.dimension:
            return quantity
        volume = "q" if unit.dimension == dim.VOLUME_FLOW else "V"
        other = catalogue()[f"{volume}_{unit.reference}"]
        raise UnitError(
            measured.text,
            f"{quantity.symbol} is the {quantity.title}, and {unit.name} states the {other.title}",
            f"Give it as {other.symbol}, or in {default_unit(quantity).name}",
        )
    stated = _VOLUMES_OF.get(quantity.symbol)
    found = catalogue().get(f"{stated}_{unit.reference}") if stated else None
    if found is None or found.dimension != unit.dimension:
        raise UnitError(
            measured.text,
            f"{unit.name} counts gas at a reference state and does not state {quantity.title}",
            f"Give {quantity.symbol} in {default_unit(quantity).name} "
            "or another unit of that dimension",
        )
    return found
