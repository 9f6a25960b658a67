"""What the commands print."""

from __future__ import annotations

import json
import sys
from collections.abc import Iterator, Sequence
from contextlib import contextmanager
from typing import Any

import typer


def print_json(value: Any) -> None:
    """Print one JSON object, for another program to read."""
    typer.echo(json.dumps(value, ensure_ascii=False, sort_keys=True))


def print_table(title: str, headings: Sequence[str], rows: Sequence[Sequence[str]]) -> None:
    """Print a table; in a pipe one line a row, its cells parted by tabs."""
    if not sys.stdout.isatty():
        for row in rows:
            typer.echo("\t".join(row))
        return
    from rich.console import Console
    from rich.table import Table
    from rich.text import Text

    table = Table(title=title, title_justify="left", box=None, pad_edge=False)
    for heading in headings:
        table.add_column(heading)
    for row in rows:
        table.add_row(*(Text(cell) for cell in row))
    Console().print(table)


@contextmanager
def working(what: str) -> Iterator[None]:
    """Show that something is under way, where somebody is looking."""
    if not sys.stderr.isatty():
        yield
        return
    from rich.console import Console

    with Console(stderr=True).status(what):
        yield
