"""The record of each wanted result, and of its criterion."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass
from decimal import ROUND_HALF_EVEN, Context, Decimal
from fractions import Fraction

from ..brief import Wanted
from ..expressions import Symbol, decimal_text
from ..quantities import Unit, Variable, catalogue
from ..solving import Ball, Doubles, Outcome, exact_ball, midpoint
from .build_steps import Numbers
from .model import CriterionRecord, ResultRecord
from .step_model import StepRecord


@dataclass(frozen=True)
class ResultRecords:
    """Makes the record of any wanted result of a solved problem.

    Attributes:
        outcome: the solved problem.
        doubles: what double precision leaves of each value.
        where: number of each input and step.
        steps: the record of each step, in order.
    """

    outcome: Outcome
    doubles: Doubles
    where: Numbers
    steps: tuple[StepRecord, ...]

    def result(self, wanted: Wanted, number: int) -> ResultRecord:
        quantity = catalogue()[wanted.variable.symbol]
        state = self.outcome.regimes.get(wanted.variable, "")
        unit = wanted.unit
        value = None if unit is None else _in_unit(self.outcome.values[wanted.variable], unit)
        return ResultRecord(
            number=number,
            key=str(wanted.variable),
            symbol=Symbol(quantity.symbol),
            title=wanted.title or quantity.title,
            place=self.outcome.problem.title(wanted.variable),
            value=None if value is None else midpoint(value),
            state=state,
            unit=unit.name if unit else "",
            factor=decimal_text(unit.factor) if unit else "1",
            offset=decimal_text(unit.offset) if unit else "0",
            pi_power=unit.pi_power if unit else 0,
            digits=wanted.digits,
            step=self.where.steps.get(wanted.variable, 0),
            input=self.where.inputs.get(wanted.variable, 0),
            criteria=tuple(self._criteria(wanted, value)),
            used_as=wanted.used_as,
            otherwise=wanted.otherwise,
            within_limits=self._within_limits(wanted.variable),
            double_error=self._error_in_unit(wanted),
        )

    def _error_in_unit(self, wanted: Wanted) -> float:
        error = self.doubles.errors.get(wanted.variable, 0.0)
        return 0.0 if wanted.unit is None else error / float(wanted.unit.factor)

    def _criteria(self, wanted: Wanted, value: Ball | None) -> Iterator[CriterionRecord]:
        unit = wanted.unit
        if unit is None or value is None:
            return
        rounded = _rounded(midpoint(value), wanted.digits)
        for limit in wanted.limits:
            stated = limit.measured
            bound = _in_unit(exact_ball(stated.rational, stated.unit.pi_power), unit)
            at_most = limit.comparison == "<="
            yield CriterionRecord(
                comparison=limit.comparison,
                typed=stated.text,
                limit=midpoint(bound),
                holds=not (value > bound if at_most else value < bound),
                holds_rounded=not (
                    exact_ball(rounded) > bound if at_most else exact_ball(rounded) < bound
                ),
            )

    def _within_limits(self, variable: Variable) -> bool:
        """Whether every step behind a variable is within the limits of its relation."""
        edges = {step.edge.target: step.edge for step in self.outcome.steps}
        open_ends, seen = [variable], {variable}
        while open_ends:
            current = open_ends.pop()
            if current not in edges:
                continue
            if not self.steps[self.where.steps[current] - 1].within_limits:
                return False
            new = [item for item in edges[current].inputs if item not in seen]
            seen.update(new)
            open_ends += new
        return True


def _in_unit(value: Ball, unit: Unit) -> Ball:
    return (value - exact_ball(unit.offset)) / exact_ball(unit.factor, unit.pi_power)


def _rounded(value: float, digits: int) -> Fraction:
    context = Context(prec=digits, rounding=ROUND_HALF_EVEN)
    return Fraction(context.create_decimal(Decimal(value)))
