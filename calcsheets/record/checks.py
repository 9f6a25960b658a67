"""Relations that the derivation did not need, evaluated as checks on the inputs."""

from __future__ import annotations

import math
from collections.abc import Iterator

from ..errors import ContradictoryInputs, SolvingError
from ..planning import Instance
from ..quantities import Variable, catalogue
from ..solving import (
    Ball,
    Outcome,
    OutsideDomainError,
    Question,
    compare,
    evaluate,
    midpoint,
    solve,
)
from .model import ConsistencyRecord

LARGEST_DIFFERENCE = 0.005
"""Above this relative difference given values contradict each other and are not rounded alike."""


def consistency_checks(outcome: Outcome) -> Iterator[ConsistencyRecord]:
    """Evaluate every relation that is not a step and whose quantities are all known.

    Raises:
        ContradictoryInputs: if its sides differ by more than ``LARGEST_DIFFERENCE``.
    """
    used = {
        step.edge.source.key for step in outcome.steps if isinstance(step.edge.source, Instance)
    }
    for instance in outcome.problem.instances:
        variables = tuple(dict.fromkeys(instance.binding.values()))
        if (
            instance.key in used
            or not all(variable in outcome.values for variable in variables)
            or any(outcome.regimes.get(v) != regime for v, regime in instance.regimes)
            or not _applies(outcome, instance)
        ):
            continue
        difference = _difference(outcome, instance)
        if abs(difference) > LARGEST_DIFFERENCE:
            raise _contradiction(outcome, instance, variables, difference)
        yield ConsistencyRecord(
            relation=instance.relation.title,
            place=instance.place.title,
            keys=tuple(str(variable) for variable in variables),
            difference=difference,
        )


def _applies(outcome: Outcome, instance: Instance) -> bool:
    """Whether no limit outside which the relation means nothing is known to be missed."""
    for limit in instance.relation.limits:
        bound = instance.place.variables(limit.condition.symbols)
        values = {s: outcome.values[v] for s, v in bound.items() if v in outcome.values}
        evaluable = len(values) == len(bound)
        if limit.essential and evaluable and compare(limit.condition, values) is False:
            return False
    return True


def _difference(outcome: Outcome, instance: Instance) -> float:
    """Relative difference of the sides; infinite where a side has no value."""
    values = {symbol: outcome.values[v] for symbol, v in instance.binding.items()}
    published = instance.relation.published
    try:
        return _relative(evaluate(published.left, values), evaluate(published.right, values))
    except OutsideDomainError:
        return math.inf


def _relative(left: Ball, right: Ball) -> float:
    a, b = midpoint(left), midpoint(right)
    scale = max(abs(a), abs(b))
    return 0.0 if scale == 0 or a == b else (b - a) / scale


def _contradiction(
    outcome: Outcome, instance: Instance, variables: tuple[Variable, ...], difference: float
) -> ContradictoryInputs:
    """State the contradiction for the first given quantity that the others lead to."""
    given = next((v for v in variables if v in outcome.problem.known), variables[0])
    unit = catalogue()[given.symbol].unit
    return ContradictoryInputs(
        quantity=str(given),
        given=_text(midpoint(outcome.values[given]), unit),
        derived=_derived(outcome, instance, given, unit),
        relation=instance.relation.title,
        inputs=tuple(str(v) for v in variables if v != given),
        difference=difference,
    )


def _derived(outcome: Outcome, instance: Instance, given: Variable, unit: str) -> str:
    unknown = next(symbol for symbol, v in instance.binding.items() if v == given)
    values = {s: outcome.values[v] for s, v in instance.binding.items() if s != unknown}
    place = f"the place {given.place}"
    question = Question(instance.relation, unknown, values, "", str(given), place)
    try:
        return _text(midpoint(solve(question).value), unit)
    except SolvingError:
        return "no value"


def _text(value: float, unit: str) -> str:
    return f"{value:.6g}" if unit == "1" else f"{value:.6g} {unit}"
