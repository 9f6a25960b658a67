"""Other routes to the results, with the same exactness as the calculation."""

from __future__ import annotations

from dataclasses import dataclass

from ..errors import SolvingError
from ..planning import Edge, Instance, Routes
from ..quantities import Kind, Variable, catalogue
from .balls import Ball, OutsideDomainError, working_precision
from .run import Outcome, Run, StepOutcome


@dataclass(frozen=True)
class RouteOutcome:
    """A second derivation of a result.

    Attributes:
        result: the result.
        steps: what the first derivation does not have; empty where there is no other route.
        value: what the route leads to; ``None`` likewise.
        shared: relations that both derivations use, in the order of the route.
        reason: why there is no other route, as a clause; empty where there is one.
    """

    result: Variable
    steps: tuple[StepOutcome, ...]
    value: Ball | None
    shared: tuple[Instance, ...]
    reason: str


_NONE = "every derivation from these inputs in closed forms uses the same relations"


def other_routes(outcome: Outcome) -> tuple[RouteOutcome, ...]:
    """Return another route to every wanted number that is no input.

    Args:
        outcome: a solved problem.
    """
    problem = outcome.problem
    routes = Routes(problem, outcome.regimes, (step.edge for step in outcome.steps))
    wanted = (item.variable for item in problem.brief.wanted)
    results = [
        variable
        for variable in wanted
        if catalogue()[variable.symbol].kind is not Kind.STATE and variable not in problem.known
    ]
    with working_precision():
        return tuple(_route(outcome, routes, result) for result in results)


def _route(outcome: Outcome, routes: Routes, result: Variable) -> RouteOutcome:
    found = routes.other(result)
    if found is None:
        return RouteOutcome(result, (), None, (), _NONE)
    first = {edge.target: edge.source.key for edge in routes.first(result)}
    taken = {step.edge.target: step.edge.source.key for step in outcome.steps}
    own = tuple(edge for edge in found if taken.get(edge.target) != edge.source.key)
    run = Run(outcome.problem, assumed=outcome.regimes)
    run.values.update(_taken_over(outcome, found, own))
    try:
        run.execute(own)
    except (SolvingError, OutsideDomainError):
        return RouteOutcome(result, (), None, (), "the other derivation gives no single value")
    keys = set(first.values())
    shared = tuple(
        edge.source
        for edge in found
        if isinstance(edge.source, Instance) and edge.source.key in keys
    )
    steps = tuple(run.solved[edge.target] for edge in own)
    return RouteOutcome(result, steps, run.values[result], shared, "")


def _taken_over(
    outcome: Outcome, found: tuple[Edge, ...], own: tuple[Edge, ...]
) -> dict[Variable, Ball]:
    """Values of the calculation that the route goes on from."""
    new = {edge.target for edge in own}
    needed = {item for edge in found for item in edge.inputs} | {edge.target for edge in found}
    return {v: outcome.values[v] for v in needed - new if v in outcome.values}
