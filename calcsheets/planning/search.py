"""Which relation gives which unknown: the cheapest derivation of everything reachable.

Relations are hyperedges: all but one of their variables lead to the last. Knuth's
generalisation of the shortest-path search finds for each variable the derivation of least
cost: roots before all else are avoided, then empirical relations, then steps. Of equal ways
the one that stands first in the library is taken, so that a brief always gives the same plan.
"""

from __future__ import annotations

import heapq
from collections import defaultdict
from collections.abc import Iterable, Iterator, Mapping, Sequence
from dataclasses import dataclass
from functools import lru_cache

from ..expressions import Equation, Symbol, integrals_in, symbols_in
from ..quantities import Variable
from .problem import Instance, Problem, RegimeInstance

Cost = tuple[int, ...]
Key = tuple[int, str, str]


@dataclass(frozen=True)
class Edge:
    """One way to one variable.

    Attributes:
        target: the variable.
        inputs: the variables that it needs, in order of appearance.
        source: the relation or regime test at its place.
        unknown: symbol of the target in the relation; ``None`` for a regime test.
        cost: roots, empirical relations and steps of this edge alone.
    """

    target: Variable
    inputs: tuple[Variable, ...]
    source: Instance | RegimeInstance
    unknown: Symbol | None
    cost: Cost


@dataclass(frozen=True)
class Reach:
    """Everything that follows from what is known.

    Attributes:
        known: what was known.
        edges: the edge of each reached variable, in the order in which they were reached.
    """

    known: frozenset[Variable]
    edges: Mapping[Variable, Edge]

    def __contains__(self, variable: object) -> bool:
        return variable in self.known or variable in self.edges

    def needed(self, wanted: Iterable[Variable]) -> tuple[Edge, ...]:
        """Return the edges that the wanted variables need, each after its inputs.

        The order is that of a reader: the derivation of the first result first.
        """
        ordered: dict[Variable, Edge] = {}
        stack = [(variable, False) for variable in reversed(list(wanted))]
        while stack:
            variable, inputs_done = stack.pop()
            if variable in ordered or variable not in self.edges:
                continue
            edge = self.edges[variable]
            if inputs_done:
                ordered[variable] = edge
            else:
                stack.append((variable, True))
                stack += [(item, False) for item in reversed(edge.inputs)]
        return tuple(ordered.values())


def reach(
    problem: Problem,
    regimes: Mapping[Variable, str],
    assumed: frozenset[Variable] = frozenset(),
    extra: Iterable[Variable] = (),
    open_regimes: bool = False,
    further: Iterable[Edge] = (),
) -> Reach:
    """Return everything that follows, by the cheapest derivations.

    Args:
        problem: the problem.
        regimes: outcome of each regime that is decided; relations of others are not offered.
        assumed: regimes whose outcome is assumed and not derived before it is used.
        extra: variables to take as known besides the given ones.
        open_regimes: whether relations of undecided regimes are offered too, once the regime
            can be decided: for what could be reached, not for what is.
        further: edges besides those of the relations, such as coupled sets.
    """
    known = problem.known | frozenset(extra)
    edges = (*offered_edges(problem, regimes, assumed, open_regimes), *further)
    return Reach(known, cheapest(known, edges))


def cheapest(
    known: frozenset[Variable],
    edges: Sequence[Edge],
    shunned: frozenset[Key] = frozenset(),
    until: Variable | None = None,
) -> dict[Variable, Edge]:
    """Return the edge of each variable that follows, by the derivation of least cost.

    Args:
        known: what is known.
        edges: every way to a variable that may be taken.
        shunned: keys of relations that cost more than anything else.
        until: a variable after which the search may end.
    """
    waiting = [len(set(edge.inputs) - known) for edge in edges]
    users: defaultdict[Variable, list[int]] = defaultdict(list)
    for index, edge in enumerate(edges):
        for variable in set(edge.inputs) - known:
            users[variable].append(index)
    derivations = _Derivations(shunned)
    heap: list[tuple[Cost, str, Key, int]] = []

    def offer(index: int) -> None:
        edge = edges[index]
        if edge.target not in known and edge.target not in derivations.edges:
            cost = derivations.cost(edge)
            heapq.heappush(heap, (cost, str(edge.target), edge.source.key, index))

    for index, count in enumerate(waiting):
        if count == 0:
            offer(index)
    while heap:
        _, _, _, index = heapq.heappop(heap)
        edge = edges[index]
        if edge.target in derivations.edges:
            continue
        derivations.take(edge)
        if edge.target == until:
            break
        for user in users[edge.target]:
            waiting[user] -= 1
            if waiting[user] == 0:
                offer(user)
    return derivations.edges


class _Derivations:
    """What has been reached, and for each variable the set of everything behind it.

    Sets are bits of whole numbers, so that a step that two inputs share counts once.
    """

    def __init__(self, shunned: frozenset[Key]) -> None:
        self.edges: dict[Variable, Edge] = {}
        self._shunned = shunned
        self._behind: dict[Variable, int] = {}
        self._avoided = 0
        self._roots = 0
        self._empirical = 0

    def cost(self, edge: Edge) -> Cost:
        """Return the cost of a derivation that ends with this edge."""
        behind = self._union(edge)
        own = edge.cost
        avoided = edge.source.key in self._shunned
        return (
            avoided + (behind & self._avoided).bit_count(),
            own[0] + (behind & self._roots).bit_count(),
            own[1] + (behind & self._empirical).bit_count(),
            own[2] + behind.bit_count(),
        )

    def take(self, edge: Edge) -> None:
        """Settle on an edge for its target."""
        bit = 1 << len(self.edges)
        self._behind[edge.target] = self._union(edge) | bit
        self._avoided |= bit * (edge.source.key in self._shunned)
        self._roots |= bit * edge.cost[0]
        self._empirical |= bit * edge.cost[1]
        self.edges[edge.target] = edge

    def _union(self, edge: Edge) -> int:
        union = 0
        for item in edge.inputs:
            union |= self._behind.get(item, 0)
        return union


def offered_edges(
    problem: Problem,
    regimes: Mapping[Variable, str],
    assumed: frozenset[Variable],
    open_regimes: bool = False,
) -> Iterator[Edge]:
    """Yield every way from a relation or regime test to one of its variables; see :func:`reach`."""
    for instance in problem.instances:
        if not instance.holds_in(regimes, open_regimes):
            continue
        before = tuple(variable for variable, _ in instance.regimes if variable not in assumed)
        yield from _relation_edges(instance, before)
    for test in problem.regimes.values():
        inputs = tuple(dict.fromkeys(test.binding.values()))
        yield Edge(test.variable, inputs, test, None, (0, 0, 1))


def _relation_edges(instance: Instance, before: tuple[Variable, ...]) -> Iterator[Edge]:
    variables = list(instance.binding.values())
    for symbol, target in instance.binding.items():
        if variables.count(target) > 1:
            continue
        inputs = tuple(dict.fromkeys(v for v in variables if v != target))
        closed = _closes(instance.relation.published, symbol)
        cost = (0 if closed else 1, int(instance.relation.empirical), 1)
        yield Edge(target, (*inputs, *before), instance, symbol, cost)


@lru_cache(maxsize=4096)
def _closes(equation: Equation, unknown: Symbol) -> bool:
    """Whether the unknown occurs once and in no integral, so that moves isolate it."""
    sides = (equation.left, equation.right)
    if any(unknown in set(symbols_in(i)) for side in sides for i in integrals_in(side)):
        return False
    return [symbol for side in sides for symbol in symbols_in(side)].count(unknown) == 1
