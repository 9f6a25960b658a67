"""The form of a brief: every table and key, written once.

The reader checks against this table, and the JSON Schema in ``docs/`` is generated from it.
"""

from __future__ import annotations

from collections.abc import Iterator, Mapping
from dataclasses import dataclass, field
from types import MappingProxyType

from ..quantities import Kind, catalogue, default_unit
from ..relations import STATION_KINDS, load_library
from .model import ASSUMPTION_STATUSES, BASES, CONSEQUENCES, STATUSES, USES

RESERVED_NAMES = ("gas", "site")
NAME_PATTERN = "^[a-z][a-z0-9_]*$"
KEY_PATTERN = "^[A-Za-z][A-Za-z0-9_]*@[a-z][a-z0-9_]*$"
_TEXT = "text"
DATE_PATTERN = "^[0-9]{4}-[0-9]{2}-[0-9]{2}$"


@dataclass(frozen=True)
class Key:
    """One key of a table.

    Attributes:
        name: the key.
        what: what it holds, one of ``text``, ``name``, ``key``, ``date``, ``value``, ``measured``,
            ``digits``, ``fractions``.
        about: one sentence for editors and documentation.
        required: whether the table needs it.
        choices: the words that it may hold; empty for any.
    """

    name: str
    what: str
    about: str
    required: bool = False
    choices: tuple[str, ...] = ()


Keys = Mapping[str, Key]


@dataclass(frozen=True)
class Form:
    """All tables of a brief; those in ``required`` must be there."""

    calculation: Keys
    site: Keys
    gas: Keys
    station: Keys
    leg: Keys
    value: Keys
    wanted: Keys
    assumption: Keys
    reference: Keys
    caution: Keys
    required: tuple[str, ...] = ("calculation", "gas", "wanted")
    tables: tuple[str, ...] = field(
        default=(
            "calculation",
            "site",
            "gas",
            "stations",
            "path",
            "wanted",
            "assumption",
            "reference",
            "caution",
        )
    )


def _keys(*keys: Key) -> Keys:
    return MappingProxyType({key.name: key for key in keys})


def _quantities(*homes: str) -> Iterator[Key]:
    for quantity in catalogue().values():
        if quantity.home in homes and quantity.kind is not Kind.STATE:
            title = quantity.title[0].upper() + quantity.title[1:]
            unit = "" if quantity.unit == "1" else f", such as in {default_unit(quantity).name}"
            yield Key(quantity.symbol, "value", f"{title}{unit}.")


def _calculation_keys() -> Keys:
    return _keys(
        Key("number", _TEXT, "Identification number of the calculation.", True),
        Key("title", _TEXT, "Title.", True),
        Key("purpose", _TEXT, "The question that is answered, in one sentence.", True),
        Key("revision", _TEXT, "Revision index.", True),
        Key("date", "date", "Date of the revision, as year-month-day.", True),
        Key("originator", _TEXT, "Who prepares the calculation.", True),
        Key("firm", _TEXT, "Legal owner of the document."),
        Key("checker", _TEXT, "Who is to check it."),
        Key("approver", _TEXT, "Who is to approve it."),
        Key("client", _TEXT, "Client."),
        Key("project", _TEXT, "Project number and name."),
        Key("equipment", _TEXT, "Plant, system or equipment tag."),
        Key("discipline", _TEXT, "Discipline."),
        Key("jurisdiction", _TEXT, "Jurisdiction whose codes apply."),
        Key("supplementary_title", _TEXT, "Second line of the title."),
        Key("purpose_of_issue", _TEXT, "What the sheet is issued for."),
        Key("reason_for_revision", _TEXT, "Why this revision was made."),
    )


def _gas_keys() -> Keys:
    return _keys(
        Key(
            "name",
            _TEXT,
            "Name of the gas; its data come from the program unless the table gives its own.",
        ),
        Key("composition", "fractions", "Gas names with their fractions; one may be balance."),
        Key("by", _TEXT, "What the fractions count.", choices=BASES),
        Key("source", _TEXT, "Document, revision and page that the composition comes from."),
        Key("status", _TEXT, "How far the composition is confirmed.", choices=STATUSES),
        *_quantities("gas"),
    )


def _branch_key() -> Key:
    """The branches are those of the library."""
    relations = load_library().relations
    names = dict.fromkeys(branch.name for item in relations for branch in item.branches)
    return Key("branch", _TEXT, "Which of several roots is meant.", choices=tuple(names))


def _station_keys() -> Keys:
    return _keys(
        Key("kind", _TEXT, "What the station is; stream if left out.", choices=STATION_KINDS),
        Key("title", _TEXT, "The place in words."),
        _branch_key(),
        *_quantities("station"),
    )


def _leg_keys() -> Keys:
    processes = tuple(load_library().processes)
    return _keys(
        Key("name", "name", "Name of the process; its own quantities stand there.", True),
        Key("from", "name", "First station.", True),
        Key("to", "name", "Second station.", True),
        Key("process", _TEXT, "What happens between them.", True, choices=processes),
        Key("through", "name", "Name of the orifice that the gas passes."),
        Key("title", _TEXT, "The process in words."),
        Key("regime", _TEXT, "The regime, where the inputs leave it open."),
        _branch_key(),
        *_quantities("station"),
    )


def _value_keys() -> Keys:
    return _keys(
        Key("value", "measured", "Number and unit."),
        Key("same_as", "key", "Another quantity that this one equals, such as p@header."),
        Key("source", _TEXT, "Document, revision and page that the value comes from."),
        Key("tolerance", _TEXT, "Tolerance with unit."),
        Key("status", _TEXT, "How far the value is confirmed.", choices=STATUSES),
    )


def _wanted_keys() -> Keys:
    return _keys(
        Key("unit", _TEXT, "Unit of the result."),
        Key("digits", "digits", "Significant digits to print, 1 to 12; 4 if left out."),
        Key("at_most", "measured", "Criterion: the result is at most this."),
        Key("at_least", "measured", "Criterion: the result is at least this."),
        Key("used_as", _TEXT, "What the result is used as.", choices=USES),
        Key("otherwise", _TEXT, "What a missed criterion means.", choices=CONSEQUENCES),
        Key("title", _TEXT, "The result in words."),
    )


def brief_form() -> Form:
    """Return the form; quantities and processes come from the vocabulary and the library."""
    return Form(
        calculation=_calculation_keys(),
        site=_keys(*_quantities("site")),
        gas=_gas_keys(),
        station=_station_keys(),
        leg=_leg_keys(),
        value=_value_keys(),
        wanted=_wanted_keys(),
        assumption=_keys(
            Key("text", _TEXT, "The assumption.", True),
            Key("status", _TEXT, "Justified, or a hold.", choices=ASSUMPTION_STATUSES),
            Key("basis", _TEXT, "Justification or reference."),
            Key("owner", _TEXT, "Who confirms it."),
            Key("due", "date", "By when, as year-month-day."),
        ),
        reference=_keys(
            Key("id", _TEXT, "Short mark, such as DS-201.", True),
            Key("title", _TEXT, "Title of the document.", True),
            Key("edition", _TEXT, "Edition or revision.", True),
        ),
        caution=_keys(Key("text", _TEXT, "The caution.", True)),
    )
