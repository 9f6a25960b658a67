"""What the record says of the course of a process.

Numbers are doubles in coherent SI.
"""

from __future__ import annotations

from dataclasses import dataclass

from ..expressions import Condition, Expr, Integral, Symbol
from .step_model import Operand, SumRecord


@dataclass(frozen=True)
class CaseRecord:
    """One form of a column, and where it holds, if no case before it does."""

    value: Expr
    condition: Condition | None


@dataclass(frozen=True)
class ColumnRecord:
    """One quantity of a course.

    Attributes:
        symbol: its symbol in the forms.
        title: quantity in words.
        unit: coherent SI unit.
        cases: the first of these that holds gives it.
        values: its value in each row.
        double_error: bound on the absolute error of a value in doubles.
    """

    symbol: Symbol
    title: str
    unit: str
    cases: tuple[CaseRecord, ...]
    values: tuple[float, ...]
    double_error: float


@dataclass(frozen=True)
class CourseIntegralRecord:
    """An integral of a course as a sum over the same places in each row.

    Attributes:
        integral: the integral.
        places: where the integrand is taken, as shares of the way from low to high.
        weights: weight of each place.
        sums: the sum in each row.
        limit_error: bound on the error of a limit, or of the variable at a place, in doubles.
        height_error: bound on the error of the integrand at a place in doubles.
        total_error: bound on the error of a sum in doubles.
    """

    integral: Integral
    places: tuple[float, ...]
    weights: tuple[float, ...]
    sums: tuple[SumRecord, ...]
    limit_error: float
    height_error: float
    total_error: float


@dataclass(frozen=True)
class CourseRecord:
    """The course of a process, row by row from its start to its end.

    Attributes:
        key: name of the process in the brief.
        title: the course in words.
        place: the process in words.
        source: where its forms come from, in words.
        operands: known quantities of its forms.
        row: symbol of the number of the row, which counts from 0.
        start: the running quantity at the start, as one of the operands.
        end: the same at the end.
        columns: every quantity, the running one first; that one has its form in between.
        condition: what the words of the rows say of.
        if_so: the word of a row where it holds.
        if_not: the word of a row where it does not.
        words: the word of each row.
        integrals: the integrals of its forms.
    """

    key: str
    title: str
    place: str
    source: str
    operands: tuple[Operand, ...]
    row: Symbol
    start: Symbol
    end: Symbol
    columns: tuple[ColumnRecord, ...]
    condition: Condition
    if_so: str
    if_not: str
    words: tuple[str, ...]
    integrals: tuple[CourseIntegralRecord, ...]
