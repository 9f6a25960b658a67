"""The command that prepares a package."""

from __future__ import annotations

from pathlib import Path

import typer

from ..brief import read_brief
from ..calculation import calculate
from ..errors import OutputError
from ..package import PAPERS, Package, file_name, write_sheets
from ..record import Record, ResultRecord
from ..sheets.typesetting import significant, unit_text
from .app import DONE, MISSED
from .output import print_json, print_table, working


def prepare(path: Path, out: Path | None, paper: str, json: bool) -> int:
    """Prepare a package and say what came of it."""
    if paper not in PAPERS:
        raise OutputError(f"--paper {paper}", "no such paper", f"Choose {' or '.join(PAPERS)}")
    brief = read_brief(path)
    with working("calculating"):
        record = calculate(brief)
    folder = out or Path("packages") / file_name(record)
    with working("setting the sheets"):
        package = write_sheets(record, folder, brief, paper)
    if json:
        print_json(_facts(record, package))
    else:
        _print(record, package)
    return DONE if record.all_met else MISSED


def _print(record: Record, package: Package) -> None:
    rows = [_row(result) for result in record.results]
    print_table(
        f"{record.field('number')} rev {record.field('revision')}: {record.field('title')}",
        ("result", "value", "criterion", "verdict"),
        rows,
    )
    for step in record.steps:
        for limit in step.limits:
            if limit.holds is False:
                typer.echo(f"outside limits: step {step.number} ({step.place}): {limit.reason}")
    for key in record.unused:
        typer.echo(f"not used: {key}")
    typer.echo(f"to be confirmed: {len(record.holds)} assumption(s), "
               f"{len(record.open_inputs)} input(s)")  # fmt: skip
    for file in (package.pdf, package.workbook, package.record):
        typer.echo(str(file))


def _row(result: ResultRecord) -> tuple[str, str, str, str]:
    if result.value is None:
        value = result.state
    else:
        value = f"{significant(result.value, result.digits).text} {unit_text(result.unit)}".strip()
    signs = {"<=": "at most", ">=": "at least"}
    criterion = ", ".join(f"{signs[c.comparison]} {c.typed}" for c in result.criteria)
    return result.title, value, criterion, result.verdict


def _facts(record: Record, package: Package) -> dict[str, object]:
    return {
        "number": record.field("number"),
        "revision": record.field("revision"),
        "digest": record.digest,
        "all_met": record.all_met,
        "files": {
            "record": str(package.record),
            "workbook": str(package.workbook),
            "pdf": str(package.pdf),
        },
        "results": [
            {
                "key": result.key,
                "title": result.title,
                "value": result.state if result.value is None else result.value,
                "unit": result.unit,
                "verdict": result.verdict,
            }
            for result in record.results
        ],
    }
