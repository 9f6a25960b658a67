"""The sheet of courses: a table of live rows for each process that has one."""

from __future__ import annotations

from collections.abc import Mapping, Sequence

from ...expressions import Integral, Symbol
from ...record import ColumnRecord, CourseRecord, Record
from ..typesetting import plain_text, symbol_text, unit_text
from .cells import COURSE, FIRST_ROW, Cells, reference
from .formula import comparison, formula
from .page import Column, Page, double_size

_NOTE = (
    "Each row follows the inputs: its first value lies between start and end, the others follow "
    "from it by the form that holds there."
)
_ROW, _FIRST = 0, 1
_WIDTH = 16
_GAP = 2
_HEAD_ROWS = 2  # title and headings


def course_cells(record: Record) -> dict[str, int]:
    """Return the first row of each course, by the name of its process."""
    found, top = {}, FIRST_ROW - 1
    for course in record.courses:
        found[course.key] = top + _HEAD_ROWS
        top += _HEAD_ROWS + len(course.words) + _GAP
    return found


def running_cells(course: CourseRecord, first: int) -> tuple[str, ...]:
    """Return the cell of the running quantity in each row."""
    return tuple(reference(COURSE, first + index, _FIRST) for index in range(len(course.words)))


def write_courses(
    page: Page,
    record: Record,
    cells: Cells,
    integrals: Mapping[str, Sequence[Mapping[Integral, str]]],
) -> None:
    """Write the table of each course.

    Args:
        page: the sheet.
        record: the record.
        cells: where every quantity stands.
        integrals: by name of a process the cells of its integrals in each row.
    """
    most = max(len(course.columns) for course in record.courses)
    page.heading("Course", _NOTE, [Column("", 6), *(Column("", _WIDTH) for _ in range(most + 1))])
    for course in record.courses:
        first = course_cells(record)[course.key]
        _write_headings(page, first, course)
        for index in range(len(course.words)):
            own = integrals.get(course.key, ())
            _write_row(page, first, index, course, cells.of(course.operands), own)


def _write_headings(page: Page, first: int, course: CourseRecord) -> None:
    page.note(first - 2, f"{course.title}, {course.place}. {course.source}.")
    page.text(first - 1, _ROW, symbol_text(course.row), page.styles.heading)
    for index, column in enumerate(course.columns, start=_FIRST):
        unit = f", {unit_text(column.unit)}" if unit_text(column.unit) else ""
        text = f"{column.title}, {symbol_text(column.symbol)}{unit}"
        page.text(first - 1, index, text, page.styles.heading)
    last = _FIRST + len(course.columns)
    page.text(first - 1, last, plain_text(course.condition), page.styles.heading)


def _write_row(
    page: Page,
    first: int,
    index: int,
    course: CourseRecord,
    operands: Mapping[Symbol, str],
    integrals: Sequence[Mapping[Integral, str]],
) -> None:
    row = first + index
    here = {course.row: reference(COURSE, row, _ROW)}
    for number, column in enumerate(course.columns, start=_FIRST):
        here[column.symbol] = reference(COURSE, row, number)
    known = {**operands, **here}
    page.number(row, _ROW, index)
    ends = {0: course.start, len(course.words) - 1: course.end}
    for number, column in enumerate(course.columns, start=_FIRST):
        if number == _FIRST and index in ends:
            text = operands[ends[index]]
        else:
            text = _cases(column, known, integrals[index] if integrals else {})
        value = column.values[index]
        page.formula(row, number, text, value, page.value_style(value), _size(column))
    word = f'IF({comparison(course.condition, known)},"{course.if_so}","{course.if_not}")'
    page.formula(row, _FIRST + len(course.columns), word, course.words[index])


def _cases(
    column: ColumnRecord, known: Mapping[Symbol, str], integrals: Mapping[Integral, str]
) -> str:
    """The forms of a column, nested so that the first that holds gives its value."""
    *conditional, last = column.cases
    text = formula(last.value, known, integrals=integrals)
    for case in reversed(conditional):
        value = formula(case.value, known, integrals=integrals)
        if case.condition is not None:
            text = f"IF({comparison(case.condition, known)},{value},{text})"
    return text


def _size(column: ColumnRecord) -> float:
    return double_size(max(abs(value) for value in column.values), column.double_error)
