"""Every row of a course evaluated again, in other arithmetic and with another quadrature."""

from __future__ import annotations

from collections.abc import Iterator, Mapping
from typing import Any

from ..expressions import Expr, Symbol
from ..record import CaseRecord, CourseRecord
from .decimals import evaluate_decimal, holds_decimal
from .finding import Finding

_TOLERANCE = 1e-12
_ROUNDED = 2.0**-50


def check_course(course: CourseRecord) -> Finding:
    """Return what the check of all rows of a course came to."""
    part = f"course {course.key}"
    try:
        wrong = next(_differences(course), None)
    except ArithmeticError:
        return Finding(part, course.key, "not possible", "a form has no value in 50 digits")
    if wrong is not None:
        return Finding(part, course.key, "failed", wrong)
    rows = len(course.words)
    return Finding(part, course.key, "passed", f"{rows} rows evaluated again, within {_TOLERANCE}")


def _differences(course: CourseRecord) -> Iterator[str]:
    """Say of each value and word of the table that differs by how much."""
    import mpmath

    known = {operand.symbol: mpmath.mpf(operand.value) for operand in course.operands}
    for index, word in enumerate(course.words):
        row = {column.symbol: mpmath.mpf(column.values[index]) for column in course.columns}
        values = {**known, **row, course.row: mpmath.mpf(index)}
        for number, column in enumerate(course.columns):
            ends = {0: course.start, len(course.words) - 1: course.end}
            form: Expr = _case(column.cases, values).value
            if number == 0 and index in ends:
                form = ends[index]
            again = evaluate_decimal(form, values)
            scale = max(abs(value) for value in column.values)
            apart = abs(again - column.values[index])
            allowed = _TOLERANCE * scale
            if apart > allowed and apart > allowed + _rounding(form, values, again):
                yield f"row {index}: {column.title} differs by {float(apart / (scale or 1)):.1e}"
        expected = course.if_so if holds_decimal(course.condition, values) else course.if_not
        if expected != word:
            yield f'row {index}: "{word}" instead of "{expected}"'


def _rounding(form: Expr, values: Mapping[Symbol, Any], value: Any) -> Any:
    """What the last digits of the values can change, which is much near equal pressures."""
    change = 0
    for symbol in values:
        for factor in (1 + _ROUNDED, 1 - _ROUNDED):
            try:
                moved = evaluate_decimal(form, {**values, symbol: values[symbol] * factor})
            except ArithmeticError:
                continue
            change = max(change, abs(moved - value))
    return change


def _case(cases: tuple[CaseRecord, ...], values: Mapping[Symbol, Any]) -> CaseRecord:
    first = (c for c in cases if c.condition is None or holds_decimal(c.condition, values))
    return next(first, cases[-1])
