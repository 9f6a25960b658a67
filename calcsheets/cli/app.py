"""The commands. They hold no logic: every answer comes from the stages."""

from __future__ import annotations

import sys
from pathlib import Path
from typing import Annotated

import typer

from ..errors import CalcsheetsError

DONE, MISSED, REFUSED = 0, 1, 2

app = typer.Typer(
    name="calcsheets",
    help="Checkable calculation sheets for compressible gas flow.",
    no_args_is_help=True,
    add_completion=False,
    pretty_exceptions_enable=False,
    context_settings={"help_option_names": ["-h", "--help"]},
)

JsonOption = Annotated[bool, typer.Option("--json", help="Print one JSON object.")]


def run() -> None:
    """Run a command; an error of ours becomes one line and exit code 2."""
    try:
        app()
    except CalcsheetsError as problem:
        typer.echo(f"calcsheets: {problem}", err=True)
        sys.exit(REFUSED)


@app.callback()
def _root() -> None:
    """Checkable calculation sheets for compressible gas flow.

    Example: calcsheets prepare examples/receiver-letdown.toml
    """


@app.command()
def prepare(
    brief: Annotated[Path, typer.Argument(help="The brief, a TOML file.")],
    out: Annotated[
        Path | None,
        typer.Option(
            "--out", "-o", help="Folder of the package; packages/NUMBER-REVISION if left out."
        ),
    ] = None,
    paper: Annotated[str, typer.Option(help="A4 or letter.")] = "A4",
    json: JsonOption = False,
) -> None:
    """Prepare a package from a brief: record, workbook and PDF.

    Exit code 1 if a criterion is not met or a limit is exceeded.

    Example: calcsheets prepare examples/receiver-letdown.toml --paper letter
    """
    from . import prepared

    sys.exit(prepared.prepare(brief, out, paper, json))


@app.command()
def check(
    package: Annotated[Path, typer.Argument(help="Folder of a package.")],
    json: JsonOption = False,
) -> None:
    """Check a package: every step again in other arithmetic, the workbook in a second engine.

    Example: calcsheets check packages/CS-0001-A
    """
    from . import checked

    sys.exit(checked.check(package, json))


@app.command()
def relations(
    word: Annotated[
        str, typer.Argument(help="Word, symbol, chapter or source; all if left out.")
    ] = "",
    json: JsonOption = False,
) -> None:
    """Show what relations the library holds; one that is named is shown whole.

    Example: calcsheets relations choked
    """
    from . import lists

    sys.exit(lists.relations(word, json))


@app.command()
def gases(
    word: Annotated[str, typer.Argument(help="Name, formula or part of it; all if left out.")] = "",
    json: JsonOption = False,
) -> None:
    """Show the gases that the program knows.

    Example: calcsheets gases nitrogen
    """
    from . import lists

    sys.exit(lists.gases_known(word, json))


@app.command()
def units(
    word: Annotated[str, typer.Argument(help="Unit or part of it; all if left out.")] = "",
    json: JsonOption = False,
) -> None:
    """Show the units that the program reads.

    Example: calcsheets units psi
    """
    from . import lists

    sys.exit(lists.units_known(word, json))
