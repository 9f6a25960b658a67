"""What double precision leaves of each value: a workbook computes the same steps in doubles.

The steps are evaluated again in balls of 53 bits, whose radii grow with every rounding and
with the condition of every step.
"""

from __future__ import annotations

from collections.abc import Iterable, Mapping
from dataclasses import dataclass

from flint import arb, ctx

from ..expressions import Integral, Symbol, derivative
from ..planning import Instance
from ..quantities import Variable
from ..relations import Course
from .balls import Ball, OutsideDomainError, evaluate, exact_ball
from .courses import course_rows
from .quadrature import Table, widest_of
from .run import Outcome, StepOutcome

_DOUBLE_BITS = 53
_NOTHING_LEFT = 1e280
_ROUNDINGS_OF_A_FUNCTION = 4  # engines round powers and logarithms less well than one operation


@dataclass(frozen=True)
class Doubles:
    """Every known variable in double arithmetic.

    Attributes:
        balls: each variable with what rounding leaves of it.
        errors: bound on the absolute error of each step, in coherent SI; 1e280 where double
            arithmetic leaves nothing.
    """

    balls: Mapping[Variable, Ball]
    errors: Mapping[Variable, float]

    def of_table(self, table: Table, bound: Mapping[Symbol, Variable]) -> TableErrors:
        """Return bounds on the errors of a sum.

        Args:
            table: the sum.
            bound: the variable of each symbol.
        """
        with ctx.workprec(_DOUBLE_BITS):
            return _table_errors(table, [self._values(bound)])

    def of_course(
        self, course: Course, bound: Mapping[Symbol, Variable], tables: Iterable[Table]
    ) -> CourseErrors:
        """Return bounds on the errors of a course.

        Args:
            course: the course.
            bound: the variable of each symbol that must be known.
            tables: each of its integrals in some row.
        """
        with ctx.workprec(_DOUBLE_BITS):
            rows = course_rows(course, self._values(bound))
            symbols = (course.running, *(column.symbol for column in course.columns))
            return CourseErrors(
                {symbol: max(_bound(row[symbol]) for row in rows) for symbol in symbols},
                {table.integral: _table_errors(table, rows) for table in tables},
            )

    def _values(self, bound: Mapping[Symbol, Variable]) -> dict[Symbol, Ball]:
        return {symbol: self.balls[v] for symbol, v in bound.items() if v in self.balls}


@dataclass(frozen=True)
class TableErrors:
    """Bounds on the absolute errors of a sum in double arithmetic.

    Attributes:
        limits: of its limits and of the variable at each place.
        heights: of the integrand at each place.
        total: of the sum.
    """

    limits: float
    heights: float
    total: float


@dataclass(frozen=True)
class CourseErrors:
    """Bounds on the absolute errors of a course in double arithmetic.

    Attributes:
        values: of each of its quantities in any row.
        tables: of each of its integrals in any row.
    """

    values: Mapping[Symbol, float]
    tables: Mapping[Integral, TableErrors]


def in_doubles(outcome: Outcome) -> Doubles:
    """Return what double precision leaves of each variable of a solved problem."""
    balls: dict[Variable, Ball] = {}
    errors: dict[Variable, float] = {}
    with ctx.workprec(_DOUBLE_BITS):
        for given in outcome.problem.brief.given:
            unit = given.measured.unit
            balls[given.variable] = exact_ball(given.measured.rational, unit.pi_power)
        for step in outcome.steps:
            if step.solution is None or not isinstance(step.edge.source, Instance):
                continue
            ball = _in_doubles(step, step.edge.source, balls)
            balls[step.edge.target] = ball
            errors[step.edge.target] = _bound(ball)
    return Doubles(balls, errors)


def _bound(ball: Ball) -> float:
    radius = float(ball.rad()) if ball.is_finite() else _NOTHING_LEFT
    return min(_ROUNDINGS_OF_A_FUNCTION * radius, _NOTHING_LEFT)


def _table_errors(table: Table, rows: Iterable[Mapping[Symbol, Ball]]) -> TableErrors:
    """The largest errors of a sum in any of several sets of values."""
    try:
        widest = [widest_of(table, values) for values in rows]
    except OutsideDomainError:
        return TableErrors(_NOTHING_LEFT, _NOTHING_LEFT, _NOTHING_LEFT)
    return TableErrors(
        *(max(_bound(ball) for ball in group) for group in zip(*widest, strict=True))
    )


def _in_doubles(step: StepOutcome, source: Instance, balls: Mapping[Variable, Ball]) -> Ball:
    solution, unknown = step.solution, step.edge.unknown
    if solution is None or unknown is None:
        raise ValueError(f"step {step.edge.target} was not solved")
    values = {symbol: balls[v] for symbol, v in source.binding.items() if v in balls}
    try:
        if solution.solved is not None:
            return evaluate(solution.solved, values)
        values[unknown] = arb(solution.value.mid())
        difference = source.relation.published.left - source.relation.published.right
        rate = derivative(difference, unknown)
        noise, slope = evaluate(difference, values), evaluate(rate, values)
        if slope.contains(0):
            return _near_touching(
                values[unknown], noise, slope, evaluate(derivative(rate, unknown), values)
            )
        return values[unknown] - noise / slope
    except OutsideDomainError:
        return arb("nan")


def _near_touching(root: Ball, noise: Ball, slope: Ball, curvature: Ball) -> Ball:
    """Where a parabola that only touches zero may still be as small as the noise."""
    rise, low, bend = abs(slope).upper(), abs(noise).upper(), abs(curvature).lower()
    if not bend > 0:
        return arb("nan")
    return root + arb(0, (rise + (rise * rise + 2 * bend * low).sqrt()) / bend)
