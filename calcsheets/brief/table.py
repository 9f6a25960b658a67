"""One table of a brief with its place in the file, checked against the form."""

from __future__ import annotations

import difflib
import re
from collections.abc import Iterable, Iterator, Mapping
from dataclasses import dataclass
from datetime import date
from typing import Any, NoReturn

from ..errors import BriefError, UnitError
from ..quantities import Kind, Measured, catalogue, read_measured
from .form import DATE_PATTERN, KEY_PATTERN, NAME_PATTERN, Key, Keys
from .lines import Path, line_of

MOST_CHOICES = 14
LONGEST_TEXT = 2000
MOST_DIGITS = 12
_MOST_SHOWN = 12
_LARGE = 10**20
CONTROL = r"[\x00-\x08\x0b-\x1f\x7f]"


@dataclass(frozen=True)
class Table:
    """A table of the file.

    Attributes:
        file: name of the file, for messages.
        path: keys that lead to the table.
        entries: its content.
        lines: line of every path.
    """

    file: str
    path: Path
    entries: Mapping[str, Any]
    lines: Mapping[Path, int]

    def line(self, key: str = "") -> int:
        """Return the line of a key, or of the table."""
        return line_of(self.lines, (*self.path, key) if key else self.path)

    def refuse(self, key: str, reason: str, remedy: str) -> NoReturn:
        """Raise a BriefError at a key of this table."""
        path = [part for part in (*self.path, key) if part != ""]
        where = visible(_path_text(path))
        raise BriefError(self.file, self.line(key), where, visible(reason), visible(remedy))

    def require_known(self, keys: Iterable[str], what: str = "key") -> None:
        """Refuse any entry whose key is not one of ``keys``, with the nearest valid key."""
        valid = list(keys)
        for name in self.entries:
            if name not in valid:
                self.refuse(name, f"unknown {what}", _elsewhere(name) or _offer(name, valid, what))

    def require(self, keys: Keys) -> None:
        """Refuse unknown keys and the absence of required ones."""
        self.require_known(keys)
        for key in keys.values():
            if key.required and key.name not in self.entries:
                self.refuse("", f'the key "{key.name}" is missing', f"Add {_described(key)}")

    def text(self, key: Key, default: str = "") -> str:
        """Return a text, checked against the choices and pattern of its key."""
        value = self.entries.get(key.name)
        if value is None:
            return default
        if not isinstance(value, str):
            self.refuse(key.name, "this must be a text", f"Write {key.name} = {_quoted(value)}")
        if len(value) > LONGEST_TEXT:
            self.refuse(
                key.name, f"the text has {len(value)} characters", f"Write at most {LONGEST_TEXT}"
            )
        if re.search(CONTROL, value):
            self.refuse(key.name, "the text holds a control character", "Remove it")
        if key.required and not value.strip():
            self.refuse(key.name, "this is empty", f"State {_described(key)}")
        if key.choices and value not in key.choices:
            near = nearest(value, key.choices)
            hint = f"Did you mean {near}? " if near else ""
            self.refuse(
                key.name,
                f'"{value}" is not one of the choices',
                f"{hint}{_to_choose(key.choices)}",
            )
        pattern, example = _PATTERNS.get(key.what, ("", ""))
        if pattern and not re.fullmatch(pattern, value):
            self.refuse(key.name, f'"{value}" is not {example}', f"Correct {key.name}")
        if key.what == "date" and not _in_calendar(value):
            self.refuse(key.name, f'"{value}" is not in the calendar', f"Correct {key.name}")
        return value

    def digits(self, key: Key, default: int) -> int:
        """Return a number of significant digits."""
        value = self.entries.get(key.name, default)
        if not isinstance(value, int) or isinstance(value, bool) or not 1 <= value <= MOST_DIGITS:
            self.refuse(
                key.name,
                f"this must be a whole number from 1 to {MOST_DIGITS}",
                f"Write {key.name} = {default}, without quotes",
            )
        return value

    def measured(self, key: str) -> Measured:
        """Return a number with its unit."""
        value = self.entries[key]
        if isinstance(value, int | float) and not isinstance(value, bool):
            self.refuse(
                key,
                "a bare number has no unit and is not kept as typed",
                f"Write {key} = {_quoted(value)}, with the unit inside the quotes if it has one",
            )
        if not isinstance(value, str):
            self.refuse(
                key,
                "this must be a text of a number and a unit",
                f'Write {key} = "...", with a number and its unit inside the quotes',
            )
        try:
            return read_measured(value)
        except UnitError as problem:
            self.refuse_unit(key, problem)

    def refuse_unit(self, key: str, problem: UnitError) -> NoReturn:
        """Raise a UnitError as a BriefError at its key."""
        self.refuse(key, f'"{problem.text}": {problem.reason}', problem.remedy)

    def table(self, key: str) -> Table:
        """Return a table inside this one, empty if it is not there."""
        value = self.entries.get(key, {})
        if not isinstance(value, Mapping):
            remedy = f"Write a table [{_path_text([*self.path, key])}]"
            if self.path and self.path[0] != "stations":
                remedy = f'Write "{key}" = {{ }} with its keys inside the braces'
            self.refuse(key, "this must be a table", remedy)
        return Table(self.file, (*self.path, key), value, self.lines)

    def tables(self, key: str) -> Iterator[Table]:
        """Yield the tables of an array of tables, none if it is not there."""
        value = self.entries.get(key, [])
        if not isinstance(value, list) or not all(isinstance(item, Mapping) for item in value):
            self.refuse(key, "this must be a list of tables", f"Begin each with [[{key}]]")
        for index, item in enumerate(value):
            yield Table(self.file, (*self.path, key, index), item, self.lines)


_PATTERNS = {
    "name": (NAME_PATTERN, "a name of small letters, digits and _"),
    "key": (KEY_PATTERN, "a quantity at a place, such as p@header"),
    "date": (DATE_PATTERN, "a date such as 2026-03-31"),
}


def nearest(name: str, valid: Iterable[str]) -> str:
    """Return the valid name most like a given one, empty if none is."""
    choices = list(valid)
    found = difflib.get_close_matches(name, choices, n=1, cutoff=0.55)
    folded = [choice for choice in choices if choice.casefold() == name.casefold()]
    return (folded or found or [""])[0]


def _offer(name: str, valid: list[str], what: str) -> str:
    """The nearest valid name, or the first of them all."""
    near = nearest(name, valid)
    if near:
        return f"Did you mean {near}? If not, remove this {what}"
    more = " and others, see docs/brief.md" if len(valid) > _MOST_SHOWN else ""
    return f"Valid here: {', '.join(valid[:_MOST_SHOWN])}{more}"


def _elsewhere(name: str) -> str:
    """Where a quantity belongs that stands in the wrong table; empty for other names."""
    quantity = catalogue().get(name)
    if quantity is None or quantity.kind is Kind.STATE:
        return ""
    if quantity.home == "station":
        return "It is a quantity of a station or process: give it there"
    return f"It is a quantity of the {quantity.home}: give it in [{quantity.home}]"


def either(choices: Iterable[str]) -> str:
    """Return choices as text in quotation marks, such as ``"a", "b" or "c"``."""
    quoted = [f'"{choice}"' for choice in choices]
    return f"{', '.join(quoted[:-1])} or {quoted[-1]}" if len(quoted) > 1 else quoted[0]


def _to_choose(choices: tuple[str, ...]) -> str:
    """What to do about a wrong choice; a long list would hide the sentence."""
    if len(choices) > MOST_CHOICES:
        return f"The {len(choices)} choices are listed in docs/brief.md"
    return f"Choose {either(choices)}"


def visible(text: str) -> str:
    """Return a text with its unprintable characters written as escapes, fit for a terminal."""
    return "".join(c if c.isprintable() else c.encode("unicode_escape").decode() for c in text)


def _described(key: Key) -> str:
    return f"{key.name}: {key.about[0].lower()}{key.about[1:-1]}"


def _quoted(value: object) -> str:
    """A bare number or date in quotes; dots for anything longer."""
    if isinstance(value, float | date) or (isinstance(value, int) and abs(value) < _LARGE):
        return f'"{value}"' if not isinstance(value, bool) else '"..."'
    return '"..."'


def _in_calendar(text: str) -> bool:
    try:
        date.fromisoformat(text)
    except ValueError:
        return False
    return True


def _path_text(path: list[str | int]) -> str:
    text = ""
    for part in path:
        if isinstance(part, int):
            text += f"[{part + 1}]"
        else:
            text += f".{part}" if text else part
    return text
