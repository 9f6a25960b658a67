"""What the sheet prints of the course of a process: a table, pictures, and the forms behind it."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass

from markupsafe import Markup

from ...expressions import Equation
from ...record import ColumnRecord, CourseRecord, Record
from ..typesetting import significant, unit_text
from .chart import Axis, chart
from .figures import equation_html, number_html, symbol_html

_DIGITS = 6
_PICTURES = ("p_0", "T_0", "mdot")
_CONDITION_SHARE = 0.3
_FORM_SHARE = 0.88


@dataclass(frozen=True)
class Heading:
    """The heading of a column."""

    symbol: Markup
    title: str
    unit: str


@dataclass(frozen=True)
class Form:
    """One form of a column, and where it holds; empty for everywhere else."""

    equation: Markup
    condition: Markup | None
    otherwise: bool


@dataclass(frozen=True)
class CourseTable:
    """A course as printed; its forms stand where a course of its kind comes first."""

    course: CourseRecord
    headings: tuple[Heading, ...]
    rows: tuple[tuple[tuple[Markup, ...], str], ...]
    pictures: tuple[Markup, ...]
    forms: tuple[Form, ...]


def course_tables(record: Record, width: float) -> tuple[CourseTable, ...]:
    """Return every course of a record as printed.

    Args:
        record: the record.
        width: width for equations, in points.
    """
    first: dict[str, str] = {}
    for course in record.courses:
        first.setdefault(course.title, course.key)
    return tuple(
        _table(course, width, first[course.title] == course.key) for course in record.courses
    )


def _table(course: CourseRecord, width: float, with_forms: bool) -> CourseTable:
    columns = sorted(course.columns, key=lambda column: column.symbol.quantity != "t")
    rows = zip(*(column.values for column in columns), strict=True)
    return CourseTable(
        course=course,
        headings=tuple(Heading(symbol_html(c.symbol), c.title, unit_text(c.unit)) for c in columns),
        rows=tuple(
            (tuple(number_html(significant(value, _DIGITS)) for value in row), word)
            for row, word in zip(rows, course.words, strict=True)
        ),
        pictures=tuple(_pictures(columns, [word == course.if_so for word in course.words])),
        forms=tuple(form for column in course.columns for form in _forms(column, width))
        if with_forms
        else (),
    )


def _pictures(columns: list[ColumnRecord], filled: list[bool]) -> Iterator[Markup]:
    time = _axis(columns[0])
    for column in columns:
        if column.symbol.quantity in _PICTURES:
            yield chart(time, _axis(column), filled)


def _axis(column: ColumnRecord) -> Axis:
    return Axis(column.symbol, column.unit, column.values)


def _forms(column: ColumnRecord, width: float) -> Iterator[Form]:
    for index, case in enumerate(column.cases):
        condition = None
        if case.condition is not None:
            condition = equation_html(case.condition, width * _CONDITION_SHARE)
        equation = equation_html(Equation(column.symbol, case.value), width * _FORM_SHARE)
        yield Form(equation, condition, index > 0)
