"""Relations that the derivation did not need, evaluated as checks on the inputs."""

from __future__ import annotations

from collections.abc import Iterator

from ..errors import ContradictoryInputs, SolvingError
from ..planning import Instance
from ..quantities import Variable, catalogue
from ..solving import (
    LARGEST_DIFFERENCE,
    Outcome,
    Question,
    differences,
    midpoint,
    solve,
)
from .model import ConsistencyRecord


def consistency_checks(outcome: Outcome) -> Iterator[ConsistencyRecord]:
    """Evaluate every relation that is not a step and whose quantities are all known.

    Raises:
        ContradictoryInputs: if its sides differ by more than ``LARGEST_DIFFERENCE``.
    """
    for instance, difference in differences(outcome):
        variables = tuple(dict.fromkeys(instance.binding.values()))
        if abs(difference) > LARGEST_DIFFERENCE:
            raise _contradiction(outcome, instance, variables, difference)
        yield ConsistencyRecord(
            relation=instance.relation.title,
            place=instance.place.title,
            keys=tuple(str(variable) for variable in variables),
            difference=difference,
        )


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
