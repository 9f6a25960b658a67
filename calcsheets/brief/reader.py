"""Reading a brief: a file becomes a frozen value, or a sentence with file and line."""

from __future__ import annotations

import re
import tomllib
from decimal import Decimal
from pathlib import Path

from ..errors import BriefError, OutputError, UnitError
from ..quantities import (
    GAUGE_OF,
    Kind,
    Measured,
    Quantity,
    Unit,
    Variable,
    catalogue,
    default_unit,
    find_unit,
    quantity_stated,
)
from ..quantities import dimension as dim
from ..relations import load_library
from .form import NAME_PATTERN, RESERVED_NAMES, Form, brief_form
from .gas import read_gas
from .lines import line_index
from .model import (
    Assumption,
    Brief,
    Given,
    Leg,
    Limit,
    Reference,
    Station,
    Wanted,
)
from .table import Table, either, nearest, visible
from .values import Stated, read_values

LARGEST_FILE = 1_000_000
_DEFAULT_DIGITS = 4
_MASS_OF = {dim.VOLUME_FLOW: "mdot", dim.VOLUME: "m"}


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
        text = content.decode("utf-8-sig")
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
    for name in form.required:
        if name not in root.entries:
            root.refuse("", f"the table [{name}] is missing", "Add it")
    calculation = root.table("calculation")
    calculation.require(form.calculation)
    stations, station_values = _read_stations(root, form)
    legs, leg_values = _read_path(root, form, stations)
    places = (*RESERVED_NAMES, *(s.name for s in stations), *(leg.name for leg in legs))
    gas, gas_values = read_gas(root.table("gas"), form, places)
    site = root.table("site")
    site.require(form.site)
    stated = [read_values(site, "site", form.site, form.value), gas_values]
    stated += [*station_values, *leg_values]
    _require_places(stated, places)
    _require_pressures(root, stated[0].given, stated[1:])
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
        wanted=_read_wanted(root.table("wanted"), form, places, legs),
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
        said = "" if isinstance(problem, RecursionError) else str(problem).partition(" (at")[0]
        reason = visible(_toml_reason(said))
        raise BriefError(
            file, line, "", f"this is not TOML: {reason}", "Correct the text at this line"
        ) from problem
    return Table(file, (), entries, line_index(text))


_TOML_REASONS = {
    "": "brackets are nested too deeply",
    "Cannot overwrite a value": "a key or table stands here for the second time",
    "Illegal character '\\n'": "a quotation mark is missing at the end of a text",
    "Invalid value": "what follows the equals sign is no value; a text needs quotation marks",
}


def _toml_reason(said: str) -> str:
    """What the TOML reader says, in the words of this program where it has some."""
    twice = re.fullmatch(r"Cannot declare \((.*?),?\) twice", said)
    if twice:
        name = twice.group(1).replace("'", "").replace(", ", ".")
        return f"the table [{name}] stands here for the second time"
    return _TOML_REASONS.get(said) or said[:1].lower() + said[1:]


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
    if not re.fullmatch(NAME_PATTERN, name):
        table.refuse(
            name,
            f'"{name}" is not a name of small letters, digits and _',
            "Rename the station",
        )
    if name in RESERVED_NAMES:
        table.refuse(name, f'"{name}" is reserved', "Choose another name for the station")


def _read_path(
    root: Table, form: Form, stations: tuple[Station, ...]
) -> tuple[tuple[Leg, ...], list[Stated]]:
    names = [station.name for station in stations]
    vessels = {station.name for station in stations if station.kind == "vessel"}
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
        _check_stream(table, leg, vessels, legs)
        legs.append(leg)
        stated.append(read_values(table, leg.name, form.leg, form.value))
    return tuple(legs), stated


def _check_leg(table: Table, leg: Leg, stations: list[str], before: list[Leg]) -> None:
    for key, name in (("from", leg.start), ("to", leg.end)):
        if name not in stations:
            near = nearest(name, stations)
            ask = f"Did you mean {near}? If not, add" if near else "Add"
            remedy = f"{ask} [stations.{name}]"
            table.refuse(key, f'there is no station "{name}"', remedy)
    if leg.name in (*stations, *RESERVED_NAMES, *(other.name for other in before)):
        table.refuse("name", f'the name "{leg.name}" is taken', "Choose another name")
    if leg.start == leg.end:
        table.refuse("to", "the process begins and ends at one station", "Name the second station")
    needed = load_library().processes[leg.process].needs_through
    orifices = {other.name: other for other in before if other.process == "orifice"}
    if needed and leg.through not in orifices:
        table.refuse(
            "through" if leg.through else "",
            f'the process "{leg.process}" passes an orifice, and '
            + (f'"{leg.through}" is no orifice before it' if leg.through else "none is named"),
            f"Write through = {either(orifices)}"
            if orifices
            else "State the orifice in a [[path]] entry before this one, and name it in through",
        )
    if leg.through and not needed:
        table.refuse("through", f'the process "{leg.process}" passes no orifice', "Remove through")
    regimes = load_library().outcomes(leg.process)
    if leg.regime and leg.regime not in regimes:
        choice = f"Choose {either(regimes)}" if regimes else "Remove regime"
        table.refuse(
            "regime", f'"{leg.regime}" is no regime of the process "{leg.process}"', choice
        )


def _check_stream(table: Table, leg: Leg, vessels: set[str], before: list[Leg]) -> None:
    """Refuse a second stream into or out of a station: its mass flow would mean both."""
    processes = load_library().processes
    streams = [other for other in before if processes[other.process].one_stream]
    if not processes[leg.process].one_stream:
        return
    for key, name, others in (
        ("from", leg.start, [other.name for other in streams if other.start == leg.start]),
        ("to", leg.end, [other.name for other in streams if other.end == leg.end]),
    ):
        if others and name not in vessels:
            table.refuse(
                key,
                f'the stream of "{others[0]}" already passes "{name}", which cannot hold two flows',
                f"Give this process a station of its own; same_as says what it has from {name}",
            )


def _require_places(stated: list[Stated], places: tuple[str, ...]) -> None:
    """Refuse a stated equality with a quantity at a place that does not exist."""
    for values in stated:
        for same, table in values.same_as:
            _check_variable(table, "same_as", str(same.other), places)


def _require_pressures(root: Table, site: tuple[Given, ...], stated: list[Stated]) -> None:
    """Refuse a gauge pressure below the vacuum, where the atmosphere of the site is stated."""
    atmosphere = next((item.measured for item in site if item.variable.symbol == "p_atm"), None)
    if atmosphere is None:
        return
    for given in (item for values in stated for item in values.given):
        pressure = given.measured
        if pressure.unit.kind is Kind.GAUGE and pressure.rational + atmosphere.rational <= 0:
            raise BriefError(
                root.file,
                given.line,
                str(given.variable),
                f'"{pressure.text}" lies below the vacuum: the atmosphere of the site is '
                f"{atmosphere.text}",
                "Check the number and its unit",
            )


def _check_variable(table: Table, key: str, text: str, places: tuple[str, ...]) -> Variable:
    symbol, _, place = text.partition("@")
    if not place:
        table.refuse(
            key,
            f'"{text}" names no place',
            f"Write {symbol}@ and the name of a station or process",
        )
    if place not in places:
        near = nearest(place, places)
        ask = f"Did you mean {symbol}@{near}? " if near else ""
        table.refuse(
            key,
            f'there is no station or process "{place}"',
            f"{ask}The places are {', '.join(places)}",
        )
    if symbol not in catalogue():
        home = place if place in RESERVED_NAMES else "station"
        near = nearest(symbol, [name for name, q in catalogue().items() if q.home == home])
        ask = f"Did you mean {near}@{place}? " if near else ""
        table.refuse(
            key,
            f'there is no quantity "{symbol}"',
            f"{ask}The quantities are listed in docs/brief.md",
        )
    _require_home(table, key, Variable(symbol, place))
    return Variable(symbol, place)


def _require_home(table: Table, key: str, variable: Variable) -> None:
    quantity = catalogue()[variable.symbol]
    home = "process" if quantity.kind is Kind.STATE else "station or process"
    if quantity.home == "station" and variable.place in RESERVED_NAMES:
        table.refuse(
            key,
            f"{quantity.title} is a quantity of a {home}, not of the {variable.place}",
            f"Write {quantity.symbol}@ and the name of a {home}",
        )
    if quantity.home not in ("station", variable.place):
        table.refuse(
            key,
            f"{quantity.title} is a quantity of the {quantity.home}",
            f"Write {quantity.symbol}@{quantity.home}",
        )


def _read_wanted(
    table: Table, form: Form, places: tuple[str, ...], legs: tuple[Leg, ...]
) -> tuple[Wanted, ...]:
    if not table.entries:
        table.refuse("", "nothing is wanted", 'Add results, such as "mdot@orifice" = {}')
    results: dict[Variable, Wanted] = {}
    for name in table.entries:
        result = _read_result(table, name, form, places)
        if result.unit is None:
            _require_regime(table, name, result.variable.place, legs)
        if result.variable in results:
            table.refuse(
                name,
                f"{result.variable} is wanted already, at line {results[result.variable].line}",
                "Remove one of the two",
            )
        results[result.variable] = result
    return tuple(results.values())


def _require_regime(table: Table, name: str, place: str, legs: tuple[Leg, ...]) -> None:
    """Refuse the regime of a place that is in none."""
    library = load_library()
    with_regimes = [leg.name for leg in legs if library.outcomes(leg.process)]
    if place in with_regimes:
        return
    process = next((leg.process for leg in legs if leg.name == place), "")
    if process:
        reason = f'the process "{process}" has no regimes'
    else:
        reason = f'"{place}" is no process, and only a process has a regime'
    keys = [f"regime@{leg}" for leg in with_regimes]
    table.refuse(name, reason, f"Write {either(keys)}" if keys else "Remove this result")


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
            unit = find_unit(unit_text) if unit_text else default_unit(quantity)
            one = Measured(Decimal(1), unit, unit.name)
            variable = Variable(quantity_stated(quantity, one).symbol, asked.place)
        except UnitError as problem:
            table.refuse_unit("unit", problem)
    return Wanted(
        variable=variable,
        unit=unit,
        digits=table.digits(keys["digits"], _DEFAULT_DIGITS),
        limits=_read_limits(table, variable, unit),
        used_as=table.text(keys["used_as"]),
        otherwise=table.text(keys["otherwise"], "fail"),
        title=table.text(keys["title"]),
        line=root.line(name),
    )


def _read_limits(table: Table, wanted: Variable, unit: Unit | None) -> tuple[Limit, ...]:
    limits: list[Limit] = []
    for key, comparison in (("at_most", "<="), ("at_least", ">=")):
        if unit is not None and key in table.entries:
            measured = _read_limit(table, key, catalogue()[wanted.symbol], unit)
            limits.append(Limit(comparison, measured, wanted))
    if len(limits) == 2 and limits[1].measured.rational > limits[0].measured.rational:
        table.refuse(
            "at_least",
            f'"{limits[1].measured.text}" is above at_most, "{limits[0].measured.text}"',
            "Correct one of the two; no result can meet both",
        )
    return tuple(limits)


def _read_limit(table: Table, key: str, wanted: Quantity, unit: Unit) -> Measured:
    """Read a limit; it must have the datum and the reference state of the result."""
    measured = table.measured(key)
    absolute = next((a for a, gauge in GAUGE_OF.items() if gauge == wanted.symbol), wanted.symbol)
    mass = _MASS_OF[wanted.dimension] if wanted.reference else absolute
    try:
        stated = quantity_stated(catalogue()[mass], measured)
    except UnitError as problem:
        table.refuse_unit(key, problem)
    if stated.symbol != wanted.symbol:
        table.refuse(
            key,
            f'"{measured.text}": this limit is a {stated.title}, and the result is wanted in '
            f"{unit.name}, as {wanted.title}",
            f"Which is meant? Give the limit in {unit.name}, or the unit as {measured.unit.name}",
        )
    return measured


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
