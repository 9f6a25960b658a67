"""The record of each course."""

from __future__ import annotations

from collections.abc import Callable, Iterator, Mapping
from dataclasses import dataclass

from ..errors import UntabulatedIntegral
from ..expressions import Symbol
from ..planning import CourseInstance
from ..quantities import Variable
from ..relations import Case
from ..solving import (
    Ball,
    CourseErrors,
    CourseRows,
    Doubles,
    Outcome,
    OutsideDomainError,
    lay_out,
    midpoint,
)
from .build_integrals import sum_record
from .course_model import CaseRecord, ColumnRecord, CourseIntegralRecord, CourseRecord
from .step_model import Operand


def used_courses(outcome: Outcome) -> tuple[CourseInstance, ...]:
    """Return each course of a process of which a step speaks, and whose quantities are known."""
    places = {v.place for step in outcome.steps for v in (step.edge.target, *step.edge.inputs)}
    known = outcome.problem.known | {step.edge.target for step in outcome.steps}
    return tuple(
        instance
        for instance in outcome.problem.courses
        if instance.place.name in places and known.issuperset(instance.binding.values())
    )


@dataclass(frozen=True)
class CourseRecords:
    """Makes the record of any course of a solved problem.

    Attributes:
        outcome: the solved problem.
        doubles: what double precision leaves of each value.
        operand: makes the record of a known quantity.
    """

    outcome: Outcome
    doubles: Doubles
    operand: Callable[[Symbol, Variable], Operand]

    def courses(self) -> Iterator[CourseRecord]:
        """Yield the course of each process that the calculation uses and knows enough of."""
        for instance in used_courses(self.outcome):
            yield from self._course(instance)

    def _course(self, instance: CourseInstance) -> Iterator[CourseRecord]:
        """The course, unless a form of it has no value on the way."""
        known: Mapping[Symbol, Ball] = {
            symbol: self.outcome.values[v] for symbol, v in instance.binding.items()
        }
        try:
            rows = lay_out(instance.course, known)
        except (OutsideDomainError, UntabulatedIntegral):
            return
        first = (tables[0] for tables in rows.tables.values())
        errors = self.doubles.of_course(instance.course, instance.binding, first)
        yield self._record(instance, rows, errors)

    def _record(
        self, instance: CourseInstance, rows: CourseRows, errors: CourseErrors
    ) -> CourseRecord:
        course = instance.course
        cases: dict[Symbol, tuple[Case, ...]] = {course.running: (Case(course.between),)}
        cases |= {column.symbol: column.cases for column in course.columns}
        return CourseRecord(
            key=instance.place.name,
            title=course.title,
            place=instance.place.title,
            source=str(course.source),
            operands=tuple(self.operand(s, v) for s, v in instance.binding.items()),
            row=course.row,
            start=course.start,
            end=course.end,
            columns=tuple(
                ColumnRecord(
                    symbol=symbol,
                    title=symbol.definition.title,
                    unit=symbol.definition.unit,
                    cases=tuple(CaseRecord(case.value, case.condition) for case in forms),
                    values=tuple(midpoint(ball) for ball in rows.values[symbol]),
                    double_error=errors.values[symbol],
                )
                for symbol, forms in cases.items()
            ),
            condition=course.words.condition,
            if_so=course.words.if_so,
            if_not=course.words.if_not,
            words=rows.words,
            integrals=tuple(_integrals(rows, errors)),
        )


def _integrals(rows: CourseRows, errors: CourseErrors) -> Iterator[CourseIntegralRecord]:
    for integral, tables in rows.tables.items():
        bounds = errors.tables[integral]
        yield CourseIntegralRecord(
            integral=integral,
            places=tables[0].places,
            weights=tables[0].weights,
            sums=tuple(sum_record(table) for table in tables),
            limit_error=bounds.limits,
            height_error=bounds.heights,
            total_error=bounds.total,
        )
