"""Quantities of one place: a text with a unit, or a table with value and source."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass
from fractions import Fraction

from ..errors import UnitError
from ..quantities import (
    Kind,
    Measured,
    Quantity,
    Variable,
    catalogue,
    quantity_stated,
    read_measured,
)
from .form import Key, Keys
from .model import Given, SameAs
from .table import Table

_PI = Fraction(355, 113)  # only to compare an angle with its bounds


@dataclass(frozen=True)
class Stated:
    """What one table states: inputs, and equalities with the table that states them."""

    given: tuple[Given, ...]
    same_as: tuple[tuple[SameAs, Table], ...]


def read_values(table: Table, place: str, keys: Keys, value_keys: Keys) -> Stated:
    """Read the quantities of a station, process, the gas or the site.

    Args:
        table: the table, its keys checked already.
        place: name of the place.
        keys: keys of the table; those that hold a ``value`` are read.
        value_keys: keys of a table that gives one value.
    """
    given: list[Given] = []
    same_as: list[tuple[SameAs, Table]] = []
    for key in keys.values():
        if key.what != "value" or key.name not in table.entries:
            continue
        quantity = catalogue()[key.name]
        if isinstance(table.entries[key.name], Mapping):
            entry = table.table(key.name)
            entry.require(value_keys)
            if ("value" in entry.entries) == ("same_as" in entry.entries):
                entry.refuse("", "this needs either value or same_as", "Give one of them")
            if "same_as" in entry.entries:
                same_as.append((_same_as(entry, place, key, value_keys), entry))
                continue
            given.append(_given(entry, "value", quantity, place, value_keys))
        else:
            given.append(_given(table, key.name, quantity, place, {}))
    _refuse_twice(table, given)
    return Stated(tuple(given), tuple(same_as))


def _same_as(entry: Table, place: str, key: Key, value_keys: Keys) -> SameAs:
    for name in ("tolerance", "status"):
        if name in entry.entries:
            entry.refuse(name, "an equality has no " + name, f"Remove {name}")
    symbol, _, other = entry.text(value_keys["same_as"]).partition("@")
    known = catalogue().get(symbol)
    if known is not None and known.dimension != catalogue()[key.name].dimension:
        entry.refuse(
            "same_as",
            f"{key.name} and {symbol} have different dimensions",
            "Name a quantity of the same dimension",
        )
    return SameAs(
        variable=Variable(key.name, place),
        other=Variable(symbol, other),
        source=entry.text(value_keys["source"]),
        line=entry.line("same_as"),
    )


def _given(table: Table, key: str, quantity: Quantity, place: str, value_keys: Keys) -> Given:
    measured = table.measured(key)
    try:
        stated = quantity_stated(quantity, measured)
    except UnitError as problem:
        table.refuse_unit(key, problem)
    _require_bounds(table, key, stated, measured)
    if not value_keys:
        return Given(Variable(stated.symbol, place), measured, "", "", "", table.line(key))
    return Given(
        variable=Variable(stated.symbol, place),
        measured=measured,
        source=table.text(value_keys["source"]),
        tolerance=_tolerance(table, value_keys, stated),
        status=table.text(value_keys["status"]),
        line=table.line(key),
    )


def _require_bounds(table: Table, key: str, quantity: Quantity, measured: Measured) -> None:
    value = measured.rational * (_PI if measured.unit.pi_power else 1)
    if value < quantity.low or (quantity.low == 0 and value == 0):
        bound = "above" if quantity.low == 0 else "at least"
        limit = f"{bound} {_plain(quantity.low)} {quantity.unit}"
    elif value > quantity.high:
        limit = f"at most {_plain(quantity.high)} {quantity.unit}"
    else:
        return
    table.refuse(
        key,
        f'"{measured.text}": {quantity.title} must be {limit}',
        "Check the number and its unit",
    )


def _plain(value: Fraction) -> str:
    return f"{float(value):g}"


def _tolerance(table: Table, value_keys: Keys, quantity: Quantity) -> str:
    text = table.text(value_keys["tolerance"])
    if not text:
        return ""
    try:
        unit = read_measured(text).unit
    except UnitError as problem:
        table.refuse_unit("tolerance", problem)
    percent = unit.name == "%"
    if unit.dimension != quantity.dimension and not percent:
        table.refuse(
            "tolerance",
            f'"{text}": the tolerance of {quantity.title} must have its dimension or be in %',
            f"Give it in {quantity.unit} or in %",
        )
    if unit.kind is Kind.REFERENCE_VOLUME and unit.reference != quantity.reference:
        table.refuse(
            "tolerance",
            f'"{text}": the tolerance has another reference state',
            "Give it in %",
        )
    return text


def _refuse_twice(table: Table, given: list[Given]) -> None:
    """Gauge and absolute pressure of one place are one fact given twice."""
    seen: dict[Variable, Given] = {}
    for item in given:
        if item.variable in seen:
            table.refuse("", f"{item.variable} is given twice", "Give it once, in one of its units")
        seen[item.variable] = item
