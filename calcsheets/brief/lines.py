"""Where in a TOML text a key stands, since the TOML reader keeps no lines."""

from __future__ import annotations

import re
from collections import Counter
from collections.abc import Mapping

Path = tuple[str | int, ...]

_HEADER = re.compile(r"\s*(\[\[?)\s*([^\]#]+?)\s*\]\]?\s*(#.*)?$")
_KEY = r"""(?:"[^"]*"|'[^']*'|[A-Za-z0-9_-]+)"""
_ASSIGNMENT = re.compile(rf"\s*{_KEY}(?:\s*\.\s*{_KEY})*\s*=")
_PART = re.compile(r"""\s*(?:"([^"]*)"|'([^']*)'|([A-Za-z0-9_-]+))\s*\.?""")


def line_index(text: str) -> Mapping[Path, int]:
    """Return the line, counted from 1, of every table header and key of a TOML text.

    Keys inside inline tables stand where their table begins, unless on lines of their own.
    """
    lines: dict[Path, int] = {}
    counts: Counter[Path] = Counter()
    table: Path = ()
    quotes = ""
    for line_number, line in enumerate(text.split("\n"), start=1):
        if quotes:
            quotes = "" if quotes in line else quotes
            continue
        header = _HEADER.match(line)
        if header:
            table = _parts(header.group(2))
            if header.group(1) == "[[":
                table = (*table, counts[table])
                counts[table[:-1]] += 1
            lines.setdefault(table, line_number)
            continue
        assignment = _ASSIGNMENT.match(line)
        if assignment:
            lines.setdefault((*table, *_parts(line[: assignment.end() - 1])), line_number)
        quotes = _opened(line)
    return lines


def _parts(text: str) -> Path:
    return tuple(a or b or c for a, b, c in _PART.findall(text))


def _opened(line: str) -> str:
    """The kind of a multi-line string that a line leaves open, or nothing."""
    for quotes in ('"""', "'''"):
        if line.count(quotes) % 2:
            return quotes
    return ""


def line_of(lines: Mapping[Path, int], path: Path) -> int:
    """Return the line of a key or of the nearest table around it; 0 if none is known."""
    for length in range(len(path), 0, -1):
        if path[:length] in lines:
            return lines[path[:length]]
    return 0
