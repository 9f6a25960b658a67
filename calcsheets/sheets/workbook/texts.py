"""The sheets of words: cover, assumptions and holds, references."""

from __future__ import annotations

from ...record import Record
from . import calculation, inputs, results
from .cells import CALCULATION, INPUTS, RESULTS, column_range
from .page import Column, Page

_SAME = "1E-9"
STATEMENT = (
    "Results support, and do not replace, the codes that apply at the place of use and the "
    "judgement of a licensed engineer."
)


def write_cover(page: Page, record: Record) -> None:
    """Write identity, purpose, the state of the workbook and the program's identification."""
    sheet, styles = page.sheet, page.styles
    page.width(0, 26)
    page.width(1, 90)
    sheet.write_string(0, 0, record.field("title"), styles.title)
    row = 2
    for item in record.identity:
        page.text(row, 0, item.name.replace("_", " ").capitalize(), styles.heading)
        page.text(row, 1, item.text)
        row += 1
    row = _write_state(page, record, row + 1)
    program = (
        ("Gas", record.gas),
        ("Program", record.program),
        ("Relations of the library", f"SHA-256 {record.library}"),
        ("Brief", f"SHA-256 {record.brief}"),
        ("Record", f"SHA-256 {record.digest}"),
        ("Limits of use", STATEMENT),
        ("Sealed record", "The PDF, not this workbook, is the document that is signed."),
    )
    for name, text in program:
        page.text(row, 0, name, styles.heading)
        page.text(row, 1, text)
        row += 1


def _write_state(page: Page, record: Record, row: int) -> int:
    """Say whether the sheet still shows what was issued."""
    tables = (
        ("Inputs", INPUTS, inputs.CHANGE, len(record.inputs)),
        ("Calculation", CALCULATION, calculation.CHANGE, len(record.steps)),
        ("Results", RESULTS, results.CHANGE, len(record.results)),
    )
    for name, sheet, column, count in tables:
        if count:
            test = f"MAX({column_range(sheet, column, count)})<={_SAME}"
            page.text(row, 0, f"{name} as issued", page.styles.heading)
            page.formula(row, 1, f'IF({test},"yes","no: changed")', "yes", page.styles.strong)
            row += 1
    return row + 1


def write_assumptions(page: Page, record: Record) -> None:
    """Write the assumptions of the brief, then those of the relations."""
    page.table(
        "Assumptions and holds",
        f"{len(record.holds)} to be confirmed.",
        (
            Column("Assumption", 70),
            Column("Status", 18),
            Column("Basis", 50),
            Column("Owner", 20),
            Column("Due", 12),
        ),
    )
    row = 4
    for item in record.assumptions:
        for column, text in enumerate((item.text, item.status, item.basis, item.owner, item.due)):
            page.text(row, column, text)
        row += 1
    by_relation: dict[str, list[str]] = {}
    for relation in record.relations:
        for assumption in relation.assumptions:
            by_relation.setdefault(assumption, []).append(relation.title)
    for assumption, titles in by_relation.items():
        page.text(row, 0, assumption[:1].upper() + assumption[1:] + ".")
        page.text(row, 1, "of the relation")
        page.text(row, 2, "; ".join(titles))
        row += 1


def write_references(page: Page, record: Record) -> None:
    """Write the documents of the brief, the sources of the relations, and the cautions."""
    page.table(
        "References and cautions",
        STATEMENT,
        (Column("Mark", 40), Column("Document", 80), Column("Edition", 30)),
    )
    row = 4
    for reference in record.references:
        for column, text in enumerate((reference.id, reference.title, reference.edition)):
            page.text(row, column, text)
        row += 1
    for relation in record.relations:
        page.text(row, 0, relation.title)
        page.text(row, 1, str(relation.source))
        page.text(row, 2, relation.source.known)
        row += 1
    for caution in record.cautions:
        page.text(row, 0, "Caution", page.styles.strong)
        page.text(row, 1, caution)
        page.text(row, 2, "")
        row += 1
