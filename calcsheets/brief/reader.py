"""Reading a brief: a file becomes a frozen value, or a sentence with file and line."""

from __future__ import annotations

import re
import tomllib
from decimal import Decimal
from pathlib import Path

from ..errors import BriefError, OutputError, UnitError
from ..quantities import Kind, Measured, Variable, catalogue, find_unit, quantity_stated
from ..relations import load_library
from .form import NAME_PATTERN, Form, brief_form
from .gas import read_gas
from .lines import line_index
from .model import (
    Assumption,
    Brief,
    Leg,
    Limit,
    Reference,
    Station,
    Wanted,
)
from .table import Table, nearest
from .values import Stated, read_values

LARGEST_FILE = 1_000_000
_RESERVED = ("gas", "site")
_DEFAULT_DIGITS = 4


def read_brief(path: str | Path) -> Brief:
    """Read a brief from a TOML file.

    Args:
        path: the file.

    Returns:
        The brief, checked and frozen.

    Raises:
        OutputError: if the file cannot be read.
        BriefError: if anything in it is not understood, with file and line.
    """
    file = Path(path)
    try:
        content = file.read_bytes()
    except OSError as problem:
        reason = (problem.strerror or "cannot be read").lower()
        raise OutputError(str(path), reason, "Check the name of the brief") from problem
    if len(content) > LARGEST_FILE:
        raise BriefError(
            file.name,
            0,
            "",
            f"the file has {len(content)} bytes, the limit is {LARGEST_FILE}",
            "A brief is a short text; check that this is one",
        )
    try:
        text = content.decode("utf-8")
    except UnicodeDecodeError as problem:
        line = content[: problem.start].count(b"\n") + 1
        raise BriefError(
            file.name, line, "", "the text is not UTF-8", "Save the file as UTF-8"
        ) from problem
    return parse_brief(text, file.name)


def parse_brief(text: str, file: str = "brief") -> Brief:
    """Read a brief from a text.

    Args:
        text: TOML.
        file: name for messages.

    Raises:
        BriefError: if anything in it is not understood, with file and line.
    """
    root = _parse_toml(text, file)
    form = brief_form()
    root.require_known(form.tables, "table")
    for name in ("calculation", "gas", "wanted"):
        if name not in root.entries:
            root.refuse("", f"the table [{name}] is missing", f"Add it: [{name}]")
    calculation = root.table("calculation")
    calculation.require(form.calculation)
    stations, station_values = _read_stations(root, form)
    legs, leg_values = _read_path(root, form, stations)
    places = (*_RESERVED, *(s.name for s in stations), *(leg.name for leg in legs))
    gas, gas_values = read_gas(root.table("gas"), form, places)
    site = root.table("site")
    site.require(form.site)
    stated = [read_values(site, "site", form.site, form.value), gas_values]
    stated += [*station_values, *leg_values]
    _require_places(stated, places)
    return Brief(
        file=file,
        text=text,
        identity={
            key.name: calculation.text(key)
            for key in form.calculation.values()
            if key.name in calculation.entries
        },
        gas=gas,
        stations=stations,
        legs=legs,
        given=tuple(given for values in stated for given in values.given),
        same_as=tuple(same for values in stated for same, _ in values.same_as),
        wanted=_read_wanted(root.table("wanted"), form, places),
        assumptions=tuple(_read_assumption(table, form) for table in root.tables("assumption")),
        references=_read_references(root, form),
        cautions=tuple(_read_caution(table, form) for table in root.tables("caution")),
    )


def _parse_toml(text: str, file: str) -> Table:
    depth = max((line.count("[") + line.count("{") for line in text.splitlines()), default=0)
    if depth > 200:
        raise BriefError(
            file, 0, "", "a line nests too many brackets", "Check that this is a brief"
        )
    try:
        entries = tomllib.loads(text)
    except (tomllib.TOMLDecodeError, RecursionError, ValueError) as problem:
        found = re.search(r"\(at line (\d+), column (\d+)\)", str(problem))
        line = int(found.group(1)) if found else text.count("\n") + 1
        reason = str(problem).partition(" (at")[0]
        reason = reason[:1].lower() + reason[1:] if reason else "nested too deeply"
        raise BriefError(
            file, line, "", f"this is not TOML: {reason}", "Correct the text at this line"
        ) from problem
    return Table(file, (), entries, line_index(text))


def _read_stations(root: Table, form: Form) -> tuple[tuple[Station, ...], list[Stated]]:
    table = root.table("stations")
    stations, stated = [], []
    for name in table.entries:
        _require_name(table, name)
        entry = table.table(name)
        entry.require(form.station)
        stations.append(
            Station(
                name=name,
                kind=entry.text(form.station["kind"], "stream"),
                title=entry.text(form.station["title"], name.replace("_", " ")),
                branch=entry.text(form.station["branch"]),
                line=entry.line(),
            )
        )
        stated.append(read_values(entry, name, form.station, form.value))
    return tuple(stations), stated


def _require_name(table: Table, name: str) -> None:
    if not re.match(NAME_PATTERN, name):
        table.refuse(
            name,
            f'"{name}" is not a name of small letters, digits and _',
            "Rename the station",
        )
    if name in _RESERVED:
        table.refuse(name, f'"{name}" is reserved', "Choose another name for the station")


def _read_path(
    root: Table, form: Form, stations: tuple[Station, ...]
) -> tuple[tuple[Leg, ...], list[Stated]]:
    names = [station.name for station in stations]
    legs: list[Leg] = []
    stated = []
    for table in root.tables("path"):
        table.require(form.leg)
        leg = Leg(
            name=table.text(form.leg["name"]),
            start=table.text(form.leg["from"]),
            end=table.text(form.leg["to"]),
            process=table.text(form.leg["process"]),
            through=table.text(form.leg["through"]),
            title=table.text(form.leg["title"], table.text(form.leg["name"]).replace("_", " ")),
            regime=table.text(form.leg["regime"]),
            branch=table.text(form.leg["branch"]),
            line=table.line(),
        )
        _check_leg(table, leg, names, legs)
        legs.append(leg)
        stated.append(read_values(table, leg.name, form.leg, form.value))
    return tuple(legs), stated


def _check_leg(table: Table, leg: Leg, stations: list[str], before: list[Leg]) -> None:
    for key, name in (("from", leg.start), ("to", leg.end)):
        if name not in stations:
            near = nearest(name, stations)
            remedy = f"Did you mean {near}" if near else f"Add [stations.{name}]"
            table.refuse(key, f'there is no station "{name}"', remedy)
    if leg.name in (*stations, *_RESERVED, *(other.name for other in before)):
        table.refuse("name", f'the name "{leg.name}" is taken', "Choose another name")
    if leg.start == leg.end:
        table.refuse("to", "the process begins and ends at one station", "Name the second station")
    needed = load_library().processes[leg.process].needs_through
    orifices = {other.name: other for other in before if other.process == "orifice"}
    if needed and leg.through not in orifices:
        have = f"one of {', '.join(orifices)}" if orifices else "an orifice stated before it"
        table.refuse(
            "through" if leg.through else "",
            f'the process "{leg.process}" passes an orifice, and '
            + (f'"{leg.through}" is none' if leg.through else "none is named"),
            f"Name {have}: through = ...",
        )
    if leg.through and not needed:
        table.refuse("through", f'the process "{leg.process}" passes no orifice', "Remove through")
    regimes = [
        outcome
        for regime in load_library().regimes
        if leg.process in regime.offered_by
        for outcome in (regime.when_true, regime.when_false)
    ]
    if leg.regime and leg.regime not in regimes:
        choice = f"Choose {' or '.join(regimes)}" if regimes else "Remove regime"
        table.refuse(
            "regime", f'"{leg.regime}" is no regime of the process "{leg.process}"', choice
        )


def _require_places(stated: list[Stated], places: tuple[str, ...]) -> None:
    """Refuse a stated equality with a quantity at a place that does not exist."""
    for values in stated:
        for same, table in values.same_as:
            _check_variable(table, "same_as", str(same.other), places)


def _check_variable(table: Table, key: str, text: str, places: tuple[str, ...]) -> Variable:
    symbol, _, place = text.partition("@")
    if not place:
        table.refuse(key, f'"{text}" names no place', f"Write {symbol}@ and the name of a station")
    if place not in places:
        near = nearest(place, places)
        remedy = f"Did you mean {symbol}@{near}" if near else f"Places: {', '.join(places)}"
        table.refuse(key, f'there is no station or process "{place}"', remedy)
    if symbol not in catalogue():
        near = nearest(symbol, catalogue())
        remedy = f"Did you mean {near}@{place}" if near else "See calcsheets relations"
        table.refuse(key, f'there is no quantity "{symbol}"', remedy)
    return Variable(symbol, place)


def _read_wanted(table: Table, form: Form, places: tuple[str, ...]) -> tuple[Wanted, ...]:
    if not table.entries:
        table.refuse("", "nothing is wanted", 'Add results, such as "mdot@orifice" = {}')
    return tuple(_read_result(table, name, form, places) for name in table.entries)


def _read_result(root: Table, name: str, form: Form, places: tuple[str, ...]) -> Wanted:
    asked = _check_variable(root, name, name, places)
    table = root.table(name)
    table.require(form.wanted)
    keys = form.wanted
    quantity = catalogue()[asked.symbol]
    unit_text = table.text(keys["unit"])
    variable, unit = asked, None
    if quantity.kind is Kind.STATE:
        for key in ("unit", "at_most", "at_least", "digits"):
            if key in table.entries:
                table.refuse(key, f"{name} is a state in words", f"Remove {key}")
    else:
        try:
            unit = find_unit(unit_text or quantity.unit)
            if unit_text or quantity.kind is Kind.REFERENCE_VOLUME:
                one = Measured(Decimal(1), unit, unit.name)
                variable = Variable(quantity_stated(quantity, one).symbol, asked.place)
        except UnitError as problem:
            table.refuse_unit("unit", problem)
    return Wanted(
        variable=variable,
        unit=unit,
        digits=table.digits(keys["digits"], _DEFAULT_DIGITS),
        limits=_read_limits(table, asked),
        used_as=table.text(keys["used_as"]),
        otherwise=table.text(keys["otherwise"], "fail"),
        title=table.text(keys["title"]),
        line=root.line(name),
    )


def _read_limits(table: Table, asked: Variable) -> tuple[Limit, ...]:
    limits = []
    for key, comparison in (("at_most", "<="), ("at_least", ">=")):
        if key in table.entries:
            measured = table.measured(key)
            try:
                stated = quantity_stated(catalogue()[asked.symbol], measured)
            except UnitError as problem:
                table.refuse_unit(key, problem)
            limits.append(Limit(comparison, measured, Variable(stated.symbol, asked.place)))
    return tuple(limits)


def _read_assumption(table: Table, form: Form) -> Assumption:
    table.require(form.assumption)
    keys = form.assumption
    status = table.text(keys["status"], "justified")
    assumption = Assumption(
        text=table.text(keys["text"]),
        status=status,
        basis=table.text(keys["basis"]),
        owner=table.text(keys["owner"]),
        due=table.text(keys["due"]),
    )
    if status == "to be confirmed" and not assumption.owner:
        table.refuse("", "a hold has no owner", "Add owner: who confirms the assumption")
    return assumption


def _read_caution(table: Table, form: Form) -> str:
    table.require(form.caution)
    return table.text(form.caution["text"])


def _read_references(root: Table, form: Form) -> tuple[Reference, ...]:
    found: dict[str, Reference] = {}
    for table in root.tables("reference"):
        table.require(form.reference)
        keys = form.reference
        reference = Reference(*(table.text(keys[name]) for name in ("id", "title", "edition")))
        if reference.id in found:
            table.refuse("id", f'the mark "{reference.id}" is taken', "Choose another mark")
        found[reference.id] = reference
    return tuple(found.values())
