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
from collections import defaultdict
from collections.abc import Iterable, Iterator, Mapping
from dataclasses import dataclass

from ..quantities import Kind, Variable, catalogue
from .problem import Instance, Problem
from .search import Edge, Reach, offered_edges

MOST_RELATIONS = 8
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
    """

    torn: Variable
    derivation: tuple[Edge, ...]
    closing: Instance

    @property
    def size(self) -> int:
        """How many relations are solved together."""
        return len(self.derivation) + 1


def loops(
    problem: Problem,
    regimes: Mapping[Variable, str],
    assumed: frozenset[Variable],
    reached: Reach,
    wanted: Iterable[Variable],
) -> Iterator[Loop]:
    """Yield closed sets among the relations near the wanted variables, smallest first.

    Args:
        problem: the problem.
        regimes: outcome of each regime that is decided or assumed.
        assumed: regimes whose outcome is assumed.
        reached: everything that follows without coupled sets.
        wanted: variables that do not follow.
    """
    field = _Field(tuple(offered_edges(problem, regimes, assumed)), reached)
    found: list[_Ranked] = []
    for torn in field.near(wanted):
        if catalogue()[torn.symbol].kind in _IMAGES:
            continue
        found += field.loops_at(torn)
    for _, _, _, loop in sorted(found, key=lambda item: item[:3]):
        yield loop


_Key = tuple[int, str, str]
_Ranked = tuple[int, int, tuple[str, _Key], Loop]


class _Field:
    """The relations that still have unknowns, and which closed forms lead from one to another."""

    def __init__(self, edges: tuple[Edge, ...], reached: Reach) -> None:
        self._open: dict[_Key, tuple[Instance, tuple[Variable, ...]]] = {}
        self._closed: list[tuple[Edge, tuple[Variable, ...]]] = []
        for edge in edges:
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
        return sorted(seen)

    def loops_at(self, torn: Variable) -> Iterator[_Ranked]:
        """Yield the loops that close when one unknown is torn, with what ranks them."""
        derived, behind = self._derive(torn)
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
            loop = Loop(torn, steps, instance)
            yield loop.size, empirical, (str(torn), instance.key), loop

    def _derive(self, torn: Variable) -> tuple[dict[Variable, Edge], dict[Variable, int]]:
        """What follows from one unknown by the fewest closed forms, and what stands behind it.

        What stands behind a variable is kept as bits in the order of derivation.
        """
        derived: dict[Variable, Edge] = {}
        behind = {torn: 0}
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

        reached_now(torn)
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
