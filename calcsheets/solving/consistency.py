"""Relations that a derivation did not need, held against the values that it came to."""

from __future__ import annotations

import math
from collections.abc import Iterator

from ..planning import Instance
from .balls import Ball, OutsideDomainError, evaluate, midpoint
from .question import compare
from .run import Outcome

LARGEST_DIFFERENCE = 0.005
"""Above this relative difference values contradict each other and are not rounded alike."""


def differences(outcome: Outcome) -> Iterator[tuple[Instance, float]]:
    """Yield each relation that is no step and whose quantities are all known.

    Args:
        outcome: a solved problem.

    Yields:
        The relation at its place, and the relative difference of its sides; infinite where a
        side has no value.
    """
    used = {
        step.edge.source.key for step in outcome.steps if isinstance(step.edge.source, Instance)
    }
    for instance in outcome.problem.instances:
        if (
            instance.key not in used
            and all(variable in outcome.values for variable in instance.binding.values())
            and instance.holds_in(outcome.regimes)
            and _applies(outcome, instance)
        ):
            yield instance, _difference(outcome, instance)


def is_consistent(outcome: Outcome) -> bool:
    """Return whether no relation that was not needed contradicts the values."""
    return all(abs(difference) <= LARGEST_DIFFERENCE for _, difference in differences(outcome))


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
