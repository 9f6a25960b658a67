"""Coupled sets: relations that give their unknowns only together.

Where no relation has a single unknown left, one unknown is torn: it is taken as known for the
moment, everything that then follows in closed forms is derived from it, and a relation that
was not needed for that closes the loop. The sets are offered smallest first.

A count of relations against unknowns would not do: many relations of a library follow from
others, and a set of them is square without determining anything. Whether a loop is more than
such an identity is for the solving stage to find out; it has the numbers.
"""

from __future__ import annotations

import heapq
from collections import Counter, defaultdict
from collections.abc import Iterable, Iterator, Mapping, Set
from dataclasses import dataclass

from ..quantities import Kind, Variable, catalogue
from .problem import Instance, Problem
from .search import Edge, Reach, offered_edges

MOST_RELATIONS = 14
"""A larger set than this is not looked for: nobody follows it on a sheet."""

_IMAGES = (Kind.GAUGE, Kind.REFERENCE_VOLUME)
"""Another way of stating a quantity: to tear it would only lengthen the set."""


@dataclass(frozen=True)
class Loop:
    """A closed set of relations, torn at one unknown.

    Attributes:
        torn: the unknown taken as known for the moment.
        derivation: closed forms that follow from it, each after its inputs.
        closing: the relation that all of them meet.
        beside: other unknowns taken as known, where the loop gives one unknown in terms of
            another.
    """

    torn: Variable
    derivation: tuple[Edge, ...]
    closing: Instance
    beside: tuple[Variable, ...] = ()

    @property
    def size(self) -> int:
        """How many relations are solved together."""
        return len(self.derivation) + 1


_Key = tuple[int, str, str]
_Ranked = tuple[int, int, tuple[str, _Key], Loop]


class Field:
    """The relations that still have unknowns, and which closed forms lead from one to another."""

    def __init__(self, edges: Iterable[Edge], reached: Reach) -> None:
        """Take what is still unknown.

        Args:
            edges: every way from relations to variables.
            reached: everything that follows without coupled sets.
        """
        self._edges = tuple(edges)
        self._reached = reached
        self._open: dict[_Key, tuple[Instance, tuple[Variable, ...]]] = {}
        self._closed: list[tuple[Edge, tuple[Variable, ...]]] = []
        for edge in self._edges:
            if not isinstance(edge.source, Instance) or edge.target in reached:
                continue
            inputs = tuple(item for item in edge.inputs if item not in reached)
            if any(item.symbol == "regime" for item in inputs):
                continue
            self._open[edge.source.key] = (edge.source, (edge.target, *inputs))
            if edge.cost[0] == 0:
                self._closed.append((edge, inputs))
        self._users: defaultdict[Variable, list[int]] = defaultdict(list)
        for index, (_, inputs) in enumerate(self._closed):
            for item in inputs:
                self._users[item].append(index)

    @classmethod
    def of(
        cls,
        problem: Problem,
        regimes: Mapping[Variable, str],
        assumed: frozenset[Variable],
        reached: Reach,
    ) -> Field:
        """Return the field of a problem; see :func:`reach`."""
        return cls(offered_edges(problem, regimes, assumed), reached)

    def with_edge(self, edge: Edge) -> Field:
        """Return the field with one more closed form."""
        return Field((*self._edges, edge), self._reached)

    def loops(self, wanted: Iterable[Variable]) -> Iterator[Loop]:
        """Yield closed sets among the relations near the wanted variables, smallest first."""
        found = [item for torn in self.near(wanted) for item in self._loops_at(torn, ())]
        for _, _, _, loop in sorted(found, key=lambda item: item[:3]):
            yield loop

    def loops_at(self, torn: Variable, beside: tuple[Variable, ...] = ()) -> Iterator[Loop]:
        """Yield the closed sets that close at one unknown, smallest first.

        Args:
            torn: the unknown.
            beside: other unknowns to take as known; loops that close without the torn one are
                left out.
        """
        without = set(self._derive(beside)[1])
        for _, _, _, loop in sorted(self._loops_at(torn, beside), key=lambda item: item[:3]):
            if not set(loop.closing.binding.values()) - self._reached_with(without):
                continue
            yield loop

    def _reached_with(self, further: Set[Variable]) -> Set[Variable]:
        return further | self._reached.known | self._reached.edges.keys()

    def most_connected(self, wanted: Iterable[Variable], count: int) -> list[Variable]:
        """Return the unknowns near the wanted ones that most relations name."""
        uses = Counter(v for _, unknowns in self._open.values() for v in unknowns)
        return sorted(self.near(wanted), key=lambda variable: (-uses[variable], variable))[:count]

    def near(self, wanted: Iterable[Variable]) -> list[Variable]:
        """Every unknown that shares relations with the wanted ones, in a total order."""
        neighbours: defaultdict[Variable, set[Variable]] = defaultdict(set)
        for _, unknowns in self._open.values():
            for item in unknowns:
                neighbours[item].update(unknowns)
        seen = set(wanted)
        open_ends = list(seen)
        while open_ends:
            new = neighbours[open_ends.pop()] - seen
            seen |= new
            open_ends += new
        kept = (v for v in seen if catalogue()[v.symbol].kind not in _IMAGES)
        return sorted(kept)

    def _loops_at(self, torn: Variable, beside: tuple[Variable, ...]) -> Iterator[_Ranked]:
        """Yield the loops that close when unknowns are torn, with what ranks them."""
        derived, behind = self._derive((torn, *beside))
        bits = {edge.source.key: 1 << index for index, edge in enumerate(derived.values())}
        for instance, unknowns in self._open.values():
            if not all(item in behind for item in unknowns):
                continue
            union = 0
            for item in unknowns:
                union |= behind[item]
            if union & bits.get(instance.key, 0) or union.bit_count() >= MOST_RELATIONS:
                continue
            steps = tuple(edge for i, edge in enumerate(derived.values()) if union >> i & 1)
            empirical = sum(edge.cost[1] for edge in steps) + int(instance.relation.empirical)
            loop = Loop(torn, steps, instance, beside)
            yield loop.size, empirical, (str(torn), instance.key), loop

    def _derive(
        self, torn: tuple[Variable, ...]
    ) -> tuple[dict[Variable, Edge], dict[Variable, int]]:
        """What follows from some unknowns by the fewest closed forms, and what stands behind it.

        What stands behind a variable is kept as bits in the order of derivation.
        """
        derived: dict[Variable, Edge] = {}
        behind = dict.fromkeys(torn, 0)
        waiting = [len(inputs) for _, inputs in self._closed]
        heap: list[tuple[int, _Key, str, int]] = []

        def reached_now(variable: Variable) -> None:
            for index in self._users[variable]:
                waiting[index] -= 1
                edge, inputs = self._closed[index]
                if waiting[index] == 0 and edge.target not in behind:
                    union = 0
                    for item in inputs:
                        union |= behind[item]
                    cost = union.bit_count()
                    heapq.heappush(heap, (cost, edge.source.key, str(edge.target), index))

        for variable in torn:
            reached_now(variable)
        while heap:
            cost, _, _, index = heapq.heappop(heap)
            edge, inputs = self._closed[index]
            if edge.target in behind or cost + 1 >= MOST_RELATIONS:
                continue
            union = 1 << len(derived)
            for item in inputs:
                union |= behind[item]
            derived[edge.target] = edge
            behind[edge.target] = union
            reached_now(edge.target)
        return derived, behind
