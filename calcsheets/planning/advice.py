"""Which additional inputs would close a problem that does not close."""

from __future__ import annotations

from collections import Counter
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
        Single inputs, or pairs where no single input closes it; those that close most other
        results too come first, then those that most relations use.
    """
    candidates = list(_candidates(problem, regimes, wanted))
    results = [item.variable for item in problem.brief.wanted]
    uses = Counter(v for instance in problem.instances for v in instance.binding.values())
    for size in (1, 2):
        found = []
        for extra in combinations(candidates[:_MOST_CANDIDATES], size):
            closed = reach(problem, regimes, extra=extra, open_regimes=True)
            if wanted in closed:
                open_results = sum(result not in closed for result in results)
                users = sum(uses[variable] for variable in extra)
                found.append(((open_results, -users), extra))
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
    if wanted in problem.regimes:
        layer = list(problem.regimes[wanted].binding.values())
        seen.update(layer)
        yield from (variable for variable in sorted(set(layer)) if variable not in reached)
    while layer:
        following: list[Variable] = []
        for instance in problem.instances:
            if not instance.holds_in(regimes, unless_open=True):
                continue
            variables = list(instance.binding.values())
            for condition, _ in instance.regimes:
                if condition not in regimes:
                    variables += problem.regimes[condition].binding.values()
            if not any(variable in layer for variable in variables):
                continue
            for variable in variables:
                if variable not in seen and variable not in reached:
                    seen.add(variable)
                    following.append(variable)
        for variable in sorted(following):
            quantity = catalogue()[variable.symbol]
            gauge = Variable(GAUGE_OF.get(variable.symbol, ""), variable.place)
            if gauge in problem.known or variable.symbol in gauges:
                continue
            if quantity.kind is not Kind.REFERENCE_VOLUME:
                yield variable
        layer = following
