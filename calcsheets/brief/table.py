"""One table of a brief with its place in the file, checked against the form."""

from __future__ import annotations

import difflib
import re
from collections.abc import Iterable, Iterator, Mapping
from dataclasses import dataclass
from typing import Any, NoReturn

from ..errors import BriefError, UnitError
from ..quantities import Measured, read_measured
from .form import DATE_PATTERN, KEY_PATTERN, NAME_PATTERN, Key, Keys
from .lines import Path, line_of

_LONGEST_TEXT = 2000
_MOST_DIGITS = 12
_CONTROL = re.compile(r"[\x00-\x08\x0b-\x1f\x7f]")


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
        raise BriefError(self.file, self.line(key), _path_text(path), reason, remedy)

    def require_known(self, keys: Iterable[str], what: str = "key") -> None:
        """Refuse any entry whose key is not one of ``keys``, with the nearest valid key."""
        valid = list(keys)
        for name in self.entries:
            if name not in valid:
                near = nearest(name, valid)
                remedy = f"Did you mean {near}" if near else f"Valid here: {', '.join(valid[:12])}"
                self.refuse(name, f"unknown {what}", remedy)

    def require(self, keys: Keys) -> None:
        """Refuse unknown keys and the absence of required ones."""
        self.require_known(keys)
        for key in keys.values():
            if key.required and key.name not in self.entries:
                self.refuse("", f'the key "{key.name}" is missing', f"Add it: {key.about[:-1]}")

    def text(self, key: Key, default: str = "") -> str:
        """Return a text, checked against the choices and pattern of its key."""
        value = self.entries.get(key.name)
        if value is None:
            return default
        if not isinstance(value, str):
            self.refuse(key.name, "this must be a text", f'Write {key.name} = "..."')
        if len(value) > _LONGEST_TEXT:
            self.refuse(
                key.name, f"the text has {len(value)} characters", f"Keep it below {_LONGEST_TEXT}"
            )
        if _CONTROL.search(value):
            self.refuse(key.name, "the text holds a control character", "Remove it")
        if key.required and not value.strip():
            self.refuse(key.name, "this is empty", f"State it: {key.about[:-1]}")
        if key.choices and value not in key.choices:
            near = nearest(value, key.choices)
            hint = f"Did you mean {near}? " if near else ""
            self.refuse(
                key.name,
                f'"{value}" is not one of the choices',
                f"{hint}Choose {_either(key.choices)}",
            )
        pattern, example = _PATTERNS.get(key.what, ("", ""))
        if pattern and not re.match(pattern, value):
            self.refuse(key.name, f'"{value}" is not {example}', f"Correct {key.name}")
        return value

    def digits(self, key: Key, default: int) -> int:
        """Return a number of significant digits."""
        value = self.entries.get(key.name, default)
        if not isinstance(value, int) or isinstance(value, bool) or not 1 <= value <= _MOST_DIGITS:
            self.refuse(
                key.name, "this must be a whole number", f"Write 1 to {_MOST_DIGITS} without quotes"
            )
        return value

    def measured(self, key: str) -> Measured:
        """Return a number with its unit."""
        value = self.entries[key]
        if isinstance(value, int | float) and not isinstance(value, bool):
            self.refuse(
                key,
                "a bare number has no unit and is not kept as typed",
                f'Write it as text: "{value}" with its unit',
            )
        if not isinstance(value, str):
            self.refuse(key, "this must be a number with a unit", 'Write "12.0 bar(g)" or the like')
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
            self.refuse(key, "this must be a table", f"Write a table [{key}]")
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


def _either(choices: tuple[str, ...]) -> str:
    return f"{', '.join(choices[:-1])} or {choices[-1]}" if len(choices) > 1 else choices[0]


def _path_text(path: list[str | int]) -> str:
    text = ""
    for part in path:
        if isinstance(part, int):
            text += f"[{part + 1}]"
        else:
            text += f".{part}" if text else part
    return text
