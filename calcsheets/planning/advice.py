"""Which additional inputs would close a problem that does not close."""

from __future__ import annotations

from collections.abc import Iterator, Mapping
from itertools import combinations

from ..quantities import GAUGE_OF, Kind, Variable, catalogue
from .problem import Problem
from .search import reach

_MOST_SETS = 6
_MOST_CANDIDATES = 40


def closing_inputs(
    problem: Problem, regimes: Mapping[Variable, str], wanted: Variable
) -> tuple[tuple[Variable, ...], ...]:
    """Return small sets of inputs, each of which would make a wanted variable follow.

    Args:
        problem: the problem as given.
        regimes: regimes decided so far.
        wanted: the variable that does not follow.

    Returns:
        Single inputs, best ones first; pairs where no single input closes it.
    """
    candidates = list(_candidates(problem, regimes, wanted))
    for size in (1, 2):
        found = []
        for extra in combinations(candidates[:_MOST_CANDIDATES], size):
            closed = reach(problem, regimes, extra=extra)
            if wanted in closed:
                steps = len(closed.needed([wanted]))
                found.append((steps, extra))
        if found:
            return tuple(extra for _, extra in sorted(found)[:_MOST_SETS])
    return ()


def _candidates(
    problem: Problem, regimes: Mapping[Variable, str], wanted: Variable
) -> Iterator[Variable]:
    """Variables from which the wanted one may follow, nearest first."""
    reached = reach(problem, regimes)
    seen = {wanted}
    layer = [wanted]
    gauges = set(GAUGE_OF.values())
    while layer:
        following: list[Variable] = []
        for instance in problem.instances:
            condition = instance.regime_variable
            if condition is not None and regimes.get(condition) != instance.relation.regime:
                continue
            variables = list(instance.binding.values())
            if not any(variable in layer for variable in variables):
                continue
            for variable in variables:
                if variable not in seen and variable not in reached:
                    seen.add(variable)
                    following.append(variable)
        for variable in sorted(following):
            quantity = catalogue()[variable.symbol]
            if variable.symbol not in gauges and quantity.kind is not Kind.REFERENCE_VOLUME:
                yield variable
        layer = following
