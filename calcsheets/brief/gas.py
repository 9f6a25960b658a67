"""The gas of a brief: by name, by composition, or by properties of its own."""

from __future__ import annotations

import re
from collections.abc import Mapping
from decimal import Decimal

from ..errors import UnknownGas
from ..gases import Gas, GasValue, find_gas
from ..quantities import Variable, read_measured
from .form import Form
from .model import GasStatement, Given
from .table import Table
from .values import Stated, read_values

_LIBRARY_STATUS = "verified"
FRACTION_SYMBOLS = {"mole": "x", "mass": "w"}
BALANCE = "balance"


def read_gas(table: Table, form: Form, places: tuple[str, ...]) -> tuple[GasStatement, Stated]:
    """Read the table ``[gas]``.

    Args:
        table: the table.
        form: the form of a brief.
        places: names that components must not take.

    Returns:
        What the gas is, and the values that follow from the brief and the gas data.
    """
    table.require(form.gas)
    own = read_values(table, "gas", form.gas, form.value)
    name = table.text(form.gas["name"])
    if "composition" in table.entries:
        if own.given or own.same_as:
            table.refuse(
                "composition",
                "a composition and own properties are two statements of one gas",
                "Give one of them",
            )
        return _mixture(table, form, name, places)
    for key in ("by", "source", "status"):
        if key in table.entries:
            table.refuse(
                key, f"{key} belongs to a composition", f"Add composition, or remove {key}"
            )
    if not name and not own.given:
        table.refuse("", "the gas is not stated", "Give name, composition, or gamma and M_w")
    return _single(table, name, own)


def _single(table: Table, name: str, own: Stated) -> tuple[GasStatement, Stated]:
    gas: Gas | None = None
    if name:
        try:
            gas = find_gas(name)
        except UnknownGas as problem:
            if not own.given:
                table.refuse(
                    "name",
                    f'the gas "{name}" is not known',
                    f"{_asked(problem)}See calcsheets gases, or give gamma and M_w of your own",
                )
    title = gas.title if gas else name or "gas by own properties"
    cautions = gas.cautions if gas else ()
    if own.given:
        return GasStatement(title, (), "", None, gas, cautions), own
    if gas is None:
        table.refuse("name", "the gas is not stated", "Give name or properties")
    values = tuple(_data(gas, "gas"))
    return GasStatement(title, (), "", gas, gas, cautions), Stated(values, ())


def _asked(problem: UnknownGas) -> str:
    return f"Did you mean {' or '.join(problem.near)}? " if problem.near else ""


def _data(gas: Gas, place: str) -> tuple[Given, Given]:
    return (
        _from_data(gas.molar_mass, Variable("M_w", place)),
        _from_data(gas.molar_heat, Variable("C_p", place)),
    )


def _from_data(value: GasValue, variable: Variable) -> Given:
    return Given(variable, value.value, value.source, "", _LIBRARY_STATUS, 0)


def _mixture(
    root: Table, form: Form, name: str, places: tuple[str, ...]
) -> tuple[GasStatement, Stated]:
    basis = root.text(form.gas["by"])
    if not basis:
        root.refuse(
            "",
            "the composition does not say what its fractions count",
            'Add by = "mole" or by = "mass"',
        )
    table = root.table("composition")
    fractions = _fractions(table)
    components: list[tuple[Gas, Decimal]] = []
    given: list[Given] = []
    for component, measured in fractions.items():
        try:
            gas = find_gas(component)
        except UnknownGas as problem:
            table.refuse(
                component,
                f'the gas "{component}" is not known',
                f"{_asked(problem)}See calcsheets gases",
            )
        if any(gas is other for other, _ in components):
            table.refuse(component, f"{gas.title} is named twice", "Give it one fraction")
        if gas.key in places:
            table.refuse(
                component,
                f'"{gas.key}" is also the name of a station or process',
                "Rename the station or process",
            )
        components.append((gas, measured))
        if table.entries[component] != BALANCE:
            given.append(_fraction(root, form, component, gas, measured))
        given += _data(gas, gas.key)
    components.sort(key=lambda part: part[0].key)  # the order of keys in a file means nothing
    title = name or ", ".join(f"{gas.title} {fraction}" for gas, fraction in components)
    cautions = tuple(dict.fromkeys(f"{g.title}: {c}" for g, _ in components for c in g.cautions))
    statement = GasStatement(title, tuple(components), basis, None, None, cautions)
    return statement, Stated(tuple(given), ())


def _fraction(root: Table, form: Form, component: str, gas: Gas, value: Decimal) -> Given:
    return Given(
        variable=Variable(FRACTION_SYMBOLS[root.text(form.gas["by"])], gas.key),
        measured=read_measured(str(value)),
        source=root.text(form.gas["source"]),
        tolerance="",
        status=root.text(form.gas["status"]),
        line=root.table("composition").line(component),
    )


def _fractions(table: Table) -> Mapping[str, Decimal]:
    """Read the fractions; one may be the balance, otherwise they must add to exactly 1."""
    if len(table.entries) < 2:
        table.refuse("", "a composition needs at least two gases", "Give name for a single gas")
    found: dict[str, Decimal | None] = {}
    for name, text in table.entries.items():
        if not isinstance(text, str):
            table.refuse(name, "a fraction must be a text", f'Write it as "{text}"')
        found[name] = None if text == BALANCE else _decimal(table, name, text)
    total = sum((value for value in found.values() if value is not None), Decimal(0))
    missing = [name for name, value in found.items() if value is None]
    if len(missing) > 1:
        table.refuse(missing[1], "only one gas can be the balance", "Give the others as fractions")
    if not missing and total != 1:
        table.refuse(
            "", f"the fractions add to {total}, not to 1", 'Correct them, or give one as "balance"'
        )
    if missing and total >= 1:
        table.refuse(
            missing[0],
            f"the other fractions add to {total} and leave nothing for the balance",
            "Correct them",
        )
    return {name: 1 - total if value is None else value for name, value in found.items()}


_FRACTION = re.compile(r"\s*([0-9]{0,3}\.?[0-9]{1,20})\s*(%?)\s*")


def _decimal(table: Table, name: str, text: str) -> Decimal:
    """Read a fraction; so few digits that sums of decimals stay exact."""
    match = _FRACTION.fullmatch(text)
    if match is None:
        table.refuse(name, f'"{text}" is not a fraction', 'Write "0.79", "79 %" or "balance"')
    value = Decimal(match.group(1)) / (100 if match.group(2) else 1)
    if not 0 < value < 1:
        table.refuse(
            name,
            f'"{text}": a fraction must lie between 0 and 1',
            'Write it in the manner of "0.79" or "79 %"',
        )
    return value
