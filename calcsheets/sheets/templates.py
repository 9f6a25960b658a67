"""Where the templates of the sheets are, and how they are read."""

from __future__ import annotations

from functools import cache
from pathlib import Path
from typing import Any

from jinja2 import Environment, FileSystemLoader, StrictUndefined

from ..errors import OutputError
from .printable import printable


@cache
def templates_folder() -> Path:
    """Return the folder of templates: inside the installed package, else beside it.

    Raises:
        OutputError: if neither is there.
    """
    package = Path(__file__).resolve().parent.parent
    for folder in (package / "templates", package.parent / "templates"):
        if (folder / "sheet.html").is_file():
            return folder
    raise OutputError(
        str(package / "templates"), "the templates are missing", "Install the program again"
    )


@cache
def template_environment() -> Environment:
    """Return the environment in which templates are read.

    What a template prints is escaped, names that do not exist are errors, and characters that
    the fonts lack are replaced by their code.
    """
    environment = Environment(
        loader=FileSystemLoader(templates_folder()),
        undefined=StrictUndefined,
        autoescape=True,
        finalize=_finalize,
        trim_blocks=True,
        lstrip_blocks=True,
    )
    environment.filters["capitalize_first"] = lambda text: text[:1].upper() + text[1:]
    return environment


def _finalize(value: Any) -> Any:
    """Make plain text printable; markup of our own is left as it is."""
    if isinstance(value, str) and not hasattr(value, "__html__"):
        return printable(value, covered_characters())
    return value


@cache
def covered_characters() -> frozenset[str]:
    """Return the characters that every font of the sheet can print."""
    # The import is slow, and only printing needs it.
    from fontTools.ttLib import TTFont

    shared: frozenset[str] | None = None
    for path in sorted((templates_folder() / "fonts").glob("*.woff2")):
        with TTFont(path, lazy=True) as font:
            found = frozenset(map(chr, font.getBestCmap()))
        shared = found if shared is None else shared & found
    return shared or frozenset()
