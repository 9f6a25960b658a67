"""Other routes: a second derivation of a result that shares as little as possible with the first.

Only closed forms are taken besides the steps of the calculation itself: the comparison then
stays alive on a sheet, and a second search for roots would show nothing new.
"""

from __future__ import annotations

from collections.abc import Iterable, Mapping

from ..expressions import integrals_in
from ..quantities import Variable
from .problem import Instance, Problem
from .search import Edge, Reach, cheapest, offered_edges


class Routes:
    """Looks for other routes to the results of one calculation."""

    def __init__(
        self, problem: Problem, regimes: Mapping[Variable, str], steps: Iterable[Edge]
    ) -> None:
        """Take a calculation.

        Args:
            problem: the problem.
            regimes: every regime that was decided.
            steps: the edges of its steps.
        """
        self._known = problem.known
        self._steps = {edge.target: edge for edge in steps if isinstance(edge.source, Instance)}
        offered = offered_edges(problem, regimes, frozenset(regimes))
        closed = (edge for edge in offered if _is_closed(edge))
        taken = (_without_regimes(edge) for edge in self._steps.values())
        self._edges = (*taken, *closed)

    def first(self, result: Variable) -> tuple[Edge, ...]:
        """Return the steps behind a result in the calculation itself."""
        return Reach(self._known, self._steps).needed([result])

    def other(self, result: Variable) -> tuple[Edge, ...] | None:
        """Return another derivation of a result, each edge after its inputs.

        Returns:
            The derivation; ``None`` if every derivation ends with the same relation or uses
            the same relations.
        """
        first = self.first(result)
        if not first:
            return None
        last = first[-1].source.key
        edges = [edge for edge in self._edges if edge.target != result or edge.source.key != last]
        if not any(edge.target == result for edge in edges):
            return None
        shunned = frozenset(edge.source.key for edge in first)
        derived = cheapest(self._known, edges, shunned, until=result)
        found = Reach(self._known, derived).needed([result])
        new = {edge.source.key for edge in found} - shunned
        return found if new else None


def _is_closed(edge: Edge) -> bool:
    """Whether a sheet can carry the edge as one formula."""
    if not isinstance(edge.source, Instance) or edge.cost[0]:
        return False
    published = edge.source.relation.published
    return not any((*integrals_in(published.left), *integrals_in(published.right)))


def _without_regimes(edge: Edge) -> Edge:
    """A step whose regime is taken as decided."""
    inputs = tuple(item for item in edge.inputs if item.symbol != "regime")
    return Edge(edge.target, inputs, edge.source, edge.unknown, edge.cost)
