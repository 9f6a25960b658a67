"""A course laid out: every column of it at every row, in ball arithmetic."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass
from fractions import Fraction

from ..expressions import Condition, Integral, Symbol, integrals_in
from ..relations import INTERVALS, Case, Course
from .balls import Ball, evaluate, exact_ball
from .quadrature import Table, tables_alike
from .question import compare


@dataclass(frozen=True)
class CourseRows:
    """A course laid out.

    Attributes:
        values: by symbol the ball in each row, the running quantity first.
        words: the word of each row.
        tables: each integral of any case as a sum over the same places, in each row.
    """

    values: Mapping[Symbol, tuple[Ball, ...]]
    words: tuple[str, ...]
    tables: Mapping[Integral, tuple[Table, ...]]


def lay_out(course: Course, known: Mapping[Symbol, Ball]) -> CourseRows:
    """Lay out a course.

    Args:
        course: the course.
        known: a ball in coherent SI for each of its symbols.

    Returns:
        Its rows, from the start to the end.

    Raises:
        OutsideDomainError: if a form is not defined in some row.
        UntabulatedIntegral: if no sum comes near an integral of it.
    """
    rows = course_rows(course, known)
    symbols = (course.running, *(column.symbol for column in course.columns))
    words = course.words
    return CourseRows(
        values={symbol: tuple(row[symbol] for row in rows) for symbol in symbols},
        words=tuple(words.if_so if holds(words.condition, row) else words.if_not for row in rows),
        tables={i: tables_alike(i, rows) for i in course_integrals(course)},
    )


def course_rows(course: Course, known: Mapping[Symbol, Ball]) -> tuple[dict[Symbol, Ball], ...]:
    """Return the values of each row, those that are known among them."""
    return tuple(_row(course, known, number) for number in range(INTERVALS + 1))


def course_integrals(course: Course) -> tuple[Integral, ...]:
    """Return each integral of any case once."""
    cases = (case for column in course.columns for case in column.cases)
    return tuple(dict.fromkeys(i for case in cases for i in integrals_in(case.value)))


def holds(condition: Condition, values: Mapping[Symbol, Ball]) -> bool:
    """Return whether a condition holds; sides that cannot be told apart are equal."""
    decided = compare(condition, values)
    return condition.comparison in ("<=", ">=") if decided is None else decided


def _row(course: Course, known: Mapping[Symbol, Ball], number: int) -> dict[Symbol, Ball]:
    """All values of one row; both ends are those that are known, without rounding."""
    row = {**known, course.row: exact_ball(Fraction(number))}
    if number == 0:
        row[course.running] = known[course.start]
    elif number == INTERVALS:
        row[course.running] = known[course.end]
    else:
        row[course.running] = evaluate(course.between, row)
    for column in course.columns:
        row[column.symbol] = evaluate(_case(column.cases, row).value, row)
    return row


def _case(cases: tuple[Case, ...], row: Mapping[Symbol, Ball]) -> Case:
    first = (c for c in cases if c.condition is None or holds(c.condition, row))
    return next(first, cases[-1])
