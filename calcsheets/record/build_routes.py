"""The record of other routes to the results."""

from __future__ import annotations

from collections.abc import Iterator, Mapping
from dataclasses import replace

from ..planning import Instance
from ..quantities import Variable, catalogue
from ..relations import Relation
from ..solving import (
    Outcome,
    RouteOutcome,
    StepOutcome,
    in_doubles,
    midpoint,
    working_precision,
)
from .build_steps import Numbers, StepRecords
from .model import ResultRecord
from .route_model import RouteRecord, RouteStep
from .step_model import RegimeUse


def route_relations(routes: tuple[RouteOutcome, ...]) -> Iterator[Relation]:
    """Yield the relations of the steps of other routes."""
    for route in routes:
        for step in route.steps:
            if isinstance(step.edge.source, Instance):
                yield step.edge.source.relation


def route_records(
    outcome: Outcome,
    routes: tuple[RouteOutcome, ...],
    where: Numbers,
    results: tuple[ResultRecord, ...],
) -> tuple[RouteRecord, ...]:
    """Return the record of each other route.

    Args:
        outcome: the solved problem.
        routes: the other routes.
        where: number of each input and step of the calculation.
        results: the wanted results.
    """
    numbers = {result.key: result.number for result in results}
    with working_precision():
        return tuple(_record(outcome, route, where, numbers[str(route.result)]) for route in routes)


def _record(outcome: Outcome, route: RouteOutcome, where: Numbers, number: int) -> RouteRecord:
    whole = _with_steps(outcome, route)
    errors = in_doubles(whole).errors
    known = _Known(whole, where, {step.edge.target for step in route.steps})
    value = None if route.value is None else midpoint(route.value)
    first = midpoint(outcome.values[route.result])
    difference = None
    if value is not None:
        scale = max(abs(value), abs(first))
        difference = 0.0 if scale == 0 else (value - first) / scale
    return RouteRecord(
        result=number,
        key=str(route.result),
        steps=tuple(known.steps(route.steps, errors)),
        value=value,
        difference=difference,
        shared=tuple(dict.fromkeys(instance.relation.title for instance in route.shared)),
        reason=route.reason,
    )


def _with_steps(outcome: Outcome, route: RouteOutcome) -> Outcome:
    """The calculation and then the route, whose values take the place of its own."""
    values = dict(outcome.values)
    for step in route.steps:
        if step.solution is not None:
            values[step.edge.target] = step.solution.value
    return replace(outcome, steps=(*outcome.steps, *route.steps), values=values)


class _Known:
    """Writes the steps of one route."""

    def __init__(self, whole: Outcome, where: Numbers, own: set[Variable]) -> None:
        steps = {v: number for v, number in where.steps.items() if v not in own}
        inputs = where.inputs
        self._records = StepRecords(whole, in_doubles(whole), Numbers(inputs, steps))
        self._whole = whole

    def steps(
        self, steps: tuple[StepOutcome, ...], errors: Mapping[Variable, float]
    ) -> Iterator[RouteStep]:
        for number, step in enumerate(steps, start=1):
            source, solution, unknown = step.edge.source, step.solution, step.edge.unknown
            if not isinstance(source, Instance) or solution is None or unknown is None:
                raise ValueError(f"step {step.edge.target} was not solved")
            if solution.solved is None:
                raise ValueError(f"step {step.edge.target} has no closed form")
            quantity = catalogue()[step.edge.target.symbol]
            yield RouteStep(
                number=number,
                key=str(step.edge.target),
                symbol=unknown,
                title=quantity.title,
                place=self._whole.problem.title(step.edge.target),
                relation=source.relation.name,
                operands=self._records.operands(source, source.relation.symbols, unknown),
                solved=solution.solved,
                value=midpoint(solution.value),
                unit=quantity.unit,
                double_error=errors[step.edge.target],
                regimes=tuple(RegimeUse(str(v), outcomes) for v, outcomes in source.regimes),
            )
