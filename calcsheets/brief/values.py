"""Quantities of one place: a text with a unit, or a table with value and source."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass

from ..errors import UnitError
from ..quantities import (
    GAUGE_OF,
    Kind,
    Quantity,
    Variable,
    catalogue,
    quantity_given,
    read_measured,
)
from .form import Key, Keys
from .model import Given, SameAs
from .table import Table


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
    if known is not None:
        _require_alike(entry, catalogue()[key.name], known)
    if (symbol, other) == (key.name, place):
        entry.refuse("same_as", "this equals itself", "Name another quantity, or give a value")
    return SameAs(
        variable=Variable(key.name, place),
        other=Variable(symbol, other),
        source=entry.text(value_keys["source"]),
        line=entry.line("same_as"),
    )


def _require_alike(entry: Table, own: Quantity, other: Quantity) -> None:
    """Only quantities of one dimension, datum and reference state can be equal."""
    if other.kind is Kind.STATE:
        entry.refuse("same_as", f"{other.symbol} is a state in words", "Name a quantity")
    if other.dimension != own.dimension:
        entry.refuse(
            "same_as",
            f"{own.symbol} and {other.symbol} have different dimensions",
            "Name a quantity of the same dimension",
        )
    if (other.kind, other.reference) != (own.kind, own.reference):
        entry.refuse(
            "same_as",
            f"{own.symbol} is the {own.title}, and {other.symbol} the {other.title}: "
            "they differ in datum or reference state",
            "Name a quantity that agrees in both",
        )


def _given(table: Table, key: str, quantity: Quantity, place: str, value_keys: Keys) -> Given:
    measured = table.measured(key)
    try:
        stated = quantity_given(quantity, measured)
    except UnitError as problem:
        table.refuse_unit(key, problem)
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


def _tolerance(table: Table, value_keys: Keys, quantity: Quantity) -> str:
    text = table.text(value_keys["tolerance"])
    if not text:
        return ""
    try:
        measured = read_measured(text)
    except UnitError as problem:
        table.refuse_unit("tolerance", problem)
    unit = measured.unit
    percent = unit.name == "%"
    if measured.number <= 0:
        table.refuse(
            "tolerance",
            f'"{text}": a tolerance counts both ways and must be above 0',
            "Give it without a sign",
        )
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
    absolute = {gauge: symbol for symbol, gauge in GAUGE_OF.items()}
    seen: set[str] = set()
    for item in given:
        symbol = absolute.get(item.variable.symbol, item.variable.symbol)
        if symbol in seen:
            table.refuse(
                "",
                f"the {catalogue()[symbol].title} is given twice, as {symbol} and as "
                f"{GAUGE_OF[symbol]}",
                "Give it once, gauge or absolute",
            )
        seen.add(symbol)
