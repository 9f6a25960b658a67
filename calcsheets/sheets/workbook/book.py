"""The workbook of a record: every number a live formula with its value stored."""

from __future__ import annotations

from dataclasses import dataclass
from datetime import datetime
from io import BytesIO
from typing import Any

from ...record import Record
from .calculation import write_calculation
from .cells import (
    CALCULATION,
    COURSE,
    INPUTS,
    INTEGRALS,
    OTHER_ROUTES,
    RESULTS,
    ROOTS,
    place_cells,
)
from .course import write_courses
from .inputs import write_inputs
from .integrals import has_integrals, integral_cells, write_integrals
from .page import FormulaCell, Page, make_styles
from .results import write_results
from .roots import root_cells, root_steps, write_roots
from .routes import write_routes
from .texts import write_assumptions, write_cover, write_references

_OPTIONS = {
    "in_memory": True,
    "strings_to_formulas": False,
    "strings_to_numbers": False,
    "strings_to_urls": False,
}


@dataclass(frozen=True)
class Workbook:
    """A workbook with the list of its formulas.

    Attributes:
        content: the file.
        formulas: every formula cell with the value stored.
    """

    content: bytes
    formulas: tuple[FormulaCell, ...]


def make_workbook(record: Record, paper: str = "A4") -> Workbook:
    """Return the workbook of a record, the same bytes for the same record.

    Args:
        record: the record.
        paper: ``A4`` or ``letter``, for printing.
    """
    import xlsxwriter

    buffer = BytesIO()
    with xlsxwriter.Workbook(buffer, _OPTIONS) as book:
        _set_properties(book, record)
        styles = make_styles(book)
        names = ["Cover", RESULTS, INPUTS, "Assumptions", CALCULATION]
        names += [ROOTS] if root_steps(record) else []
        names += [COURSE] if record.courses else []
        names += [INTEGRALS] if has_integrals(record) else []
        names += [OTHER_ROUTES] if record.routes else []
        names += ["References"]
        pages = {name: Page(book, styles, name, record, paper) for name in names}
        cells = place_cells(record)
        write_cover(pages["Cover"], record)
        write_results(pages[RESULTS], record, cells)
        write_inputs(pages[INPUTS], record, book)
        write_assumptions(pages["Assumptions"], record)
        integrals = integral_cells(record, cells)
        write_calculation(pages[CALCULATION], record, cells, root_cells(record), integrals.closed)
        if ROOTS in pages:
            write_roots(pages[ROOTS], record, cells, integrals.trials)
        if COURSE in pages:
            write_courses(pages[COURSE], record, cells, integrals.courses)
        if INTEGRALS in pages:
            write_integrals(pages[INTEGRALS], record, cells)
        if OTHER_ROUTES in pages:
            write_routes(pages[OTHER_ROUTES], record, cells)
        write_references(pages["References"], record)
    formulas = tuple(cell for page in pages.values() for cell in page.formulas)
    return Workbook(buffer.getvalue(), formulas)


def _set_properties(book: Any, record: Record) -> None:
    book.set_size(2400, 1400)
    book.set_calc_mode("auto")
    book.set_properties(
        {
            "title": record.field("title"),
            "subject": record.field("purpose"),
            "author": record.field("originator"),
            "company": record.field("firm"),
            "keywords": f"{record.field('number')} rev {record.field('revision')}",
            "comments": f"Record SHA-256 {record.digest}",
            "created": datetime.fromisoformat(f"{record.field('date')}T00:00:00"),
        }
    )
