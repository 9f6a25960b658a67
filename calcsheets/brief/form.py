"""The form of a brief: every table and key, written once.

The reader checks against this table, and the JSON Schema in ``docs/`` is generated from it.
"""

from __future__ import annotations

from collections.abc import Iterator, Mapping
from dataclasses import dataclass, field
from types import MappingProxyType

from ..quantities import Kind, catalogue
from ..relations import STATION_KINDS, load_library
from .model import ASSUMPTION_STATUSES, BASES, CONSEQUENCES, STATUSES, USES

RESERVED_NAMES = ("gas", "site")
NAME_PATTERN = "^[a-z][a-z0-9_]*$"
KEY_PATTERN = "^[A-Za-z][A-Za-z0-9_]*@[a-z][a-z0-9_]*$"
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
    """All tables of a brief."""

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
            unit = "" if quantity.unit == "1" else f", such as in {quantity.unit}"
            yield Key(quantity.symbol, "value", f"{quantity.title.capitalize()}{unit}.")


def brief_form() -> Form:
    """Return the form; quantities and processes come from the vocabulary and the library."""
    text = "text"
    processes = tuple(load_library().processes)
    branches = tuple(
        dict.fromkeys(
            branch.name for relation in load_library().relations for branch in relation.branches
        )
    )
    branch = Key("branch", text, "Which of several roots is meant.", choices=branches)
    return Form(
        calculation=_keys(
            Key("number", text, "Identification number of the calculation.", True),
            Key("title", text, "Title.", True),
            Key("purpose", text, "The question that is answered, in one sentence.", True),
            Key("revision", text, "Revision index.", True),
            Key("date", "date", "Date of the revision, as year-month-day.", True),
            Key("originator", text, "Who prepares the calculation.", True),
            Key("firm", text, "Legal owner of the document."),
            Key("checker", text, "Who is to check it."),
            Key("approver", text, "Who is to approve it."),
            Key("client", text, "Client."),
            Key("project", text, "Project number and name."),
            Key("equipment", text, "Plant, system or equipment tag."),
            Key("discipline", text, "Discipline."),
            Key("jurisdiction", text, "Jurisdiction whose codes apply."),
            Key("supplementary_title", text, "Second line of the title."),
            Key("purpose_of_issue", text, "What the sheet is issued for."),
            Key("reason_for_revision", text, "Why this revision was made."),
        ),
        site=_keys(*_quantities("site")),
        gas=_keys(
            Key(
                "name",
                text,
                "Name of the gas; its data come from the program unless the table gives its own.",
            ),
            Key("composition", "fractions", "Gas names with their fractions; one may be balance."),
            Key("by", text, "What the fractions count.", choices=BASES),
            *_quantities("gas"),
        ),
        station=_keys(
            Key("kind", text, "What the station is; stream if left out.", choices=STATION_KINDS),
            Key("title", text, "The place in words."),
            branch,
            *_quantities("station"),
        ),
        leg=_keys(
            Key("name", "name", "Name of the process; its own quantities stand there.", True),
            Key("from", "name", "First station.", True),
            Key("to", "name", "Second station.", True),
            Key("process", text, "What happens between them.", True, choices=processes),
            Key("through", "name", "Name of the orifice that the gas passes."),
            Key("title", text, "The process in words."),
            Key("regime", text, "The regime, where the inputs leave it open."),
            branch,
            *_quantities("station"),
        ),
        value=_keys(
            Key("value", "measured", "Number and unit."),
            Key("same_as", "key", "Another quantity that this one equals, such as p@header."),
            Key("source", text, "Document, revision and page that the value comes from."),
            Key("tolerance", text, "Tolerance with unit."),
            Key("status", text, "How far the value is confirmed.", choices=STATUSES),
        ),
        wanted=_keys(
            Key("unit", text, "Unit of the result."),
            Key("digits", "digits", "Significant digits to print, 1 to 12; 4 if left out."),
            Key("at_most", "measured", "Criterion: the result is at most this."),
            Key("at_least", "measured", "Criterion: the result is at least this."),
            Key("used_as", text, "What the result is used as.", choices=USES),
            Key("otherwise", text, "What a missed criterion means.", choices=CONSEQUENCES),
            Key("title", text, "The result in words."),
        ),
        assumption=_keys(
            Key("text", text, "The assumption.", True),
            Key("status", text, "Justified, or a hold.", choices=ASSUMPTION_STATUSES),
            Key("basis", text, "Justification or reference."),
            Key("owner", text, "Who confirms it."),
            Key("due", "date", "By when, as year-month-day."),
        ),
        reference=_keys(
            Key("id", text, "Short mark, such as DS-201.", True),
            Key("title", text, "Title of the document.", True),
            Key("edition", text, "Edition or revision.", True),
        ),
        caution=_keys(Key("text", text, "The caution.", True)),
    )
