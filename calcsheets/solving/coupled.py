"""Which of the loops that planning offers determines something, as one edge.

Where no loop torn at one unknown does, two are torn: a loop that gives the second in terms of
the first in closed form serves as one more closed form, and a loop from which the second drops
out gives the first.
"""

from __future__ import annotations

from collections.abc import Callable, Iterator, Mapping
from fractions import Fraction
from itertools import islice, pairwise

from flint import arb

from ..expressions import Expr, integrals_in, symbols_in
from ..planning import Edge, Field, Instance, Loop, Problem
from ..quantities import Variable, catalogue
from .balls import Ball, OutsideDomainError, evaluate, exact_ball, midpoint
from .combination import Combination, Derived
from .moves import isolate

Ready = Callable[[Loop], bool]

_FACTORS = tuple(Fraction(text) for text in ("0.83", "1.21", "0.47", "2.3", "0.11", "9.7"))
_PARTS = (Fraction(37, 100), Fraction(81, 100))
_POWERS = (0, -1, 1, -2, 2, 3, 4, 5, -3, -4, 6)
_LEAST_DECIDING = 3
_MOST_TORN = 12
_MOST_LOOPS = 30
_MOST_TRIES = 24
_SAME = arb(2) ** -80


class Combiner:
    """Makes one relation of each coupled set that determines something.

    It keeps what it has tried, because the loops through one unknown share most of their steps.
    """

    def __init__(
        self,
        problem: Problem,
        values: Mapping[Variable, Ball],
        assumed: frozenset[Variable] = frozenset(),
    ) -> None:
        """Prepare for the loops of one problem.

        Args:
            problem: the problem.
            values: ball of every variable that is known without coupled sets; may grow.
            assumed: regimes whose outcome is assumed and not derived before it is used.
        """
        self._problem = problem
        self._values = values
        self._assumed = assumed
        self._trials: dict[Variable, tuple[dict[Variable, Ball | None], ...]] = {}

    def edge(self, loop: Loop) -> Edge | None:
        """Return a coupled set as one edge that gives its torn unknown.

        Returns:
            The edge, whose relation has the torn unknown as its only unknown; ``None`` if the
            loop is an identity that determines nothing, or a form in it does not close.
        """
        derived = tuple(_closed_form(edge) for edge in loop.derivation)
        closed = tuple(item for item in derived if item is not None)
        if len(closed) < len(derived) or self._is_identity(loop, closed):
            return None
        return Combination(self._problem, loop, closed, loop.torn).edge(self._assumed)

    def nested(self, field: Field, wanted: list[Variable], ready: Ready) -> Edge | None:
        """Return a set that needs two torn unknowns as one edge; ``None`` if there is none.

        Args:
            field: the relations that still have unknowns.
            wanted: variables that do not follow.
            ready: makes the known values of a loop available; whether it could.
        """
        candidates = field.most_connected(wanted, _MOST_TORN)
        for first in candidates:
            for second in candidates:
                if second == first:
                    continue
                edge = self._torn_at_two(field, first, second, ready)
                if edge is not None:
                    return edge
        return None

    def _torn_at_two(
        self, field: Field, first: Variable, second: Variable, ready: Ready
    ) -> Edge | None:
        for loop in islice(field.loops_at(second, (first,)), _MOST_LOOPS):
            derived = tuple(_closed_form(edge) for edge in loop.derivation)
            closed = tuple(item for item in derived if item is not None)
            if len(closed) < len(derived) or not ready(loop):
                continue
            match self._role_of(loop, closed):
                case "drops out":
                    found = Combination(self._problem, loop, closed, first, cancelled=second)
                    edge = found.edge(self._assumed)
                    if edge is not None:
                        return edge
                case "decides":
                    inner = Combination(self._problem, loop, closed, second).edge(self._assumed)
                    if inner is not None and _closed_form(inner) is not None:
                        edge = self._closed_by(field, first, inner, ready)
                        if edge is not None:
                            return edge
        return None

    def _closed_by(self, field: Field, first: Variable, inner: Edge, ready: Ready) -> Edge | None:
        """The set that the first unknown closes once the second follows from it."""
        for loop in islice(field.with_edge(inner).loops_at(first), _MOST_LOOPS):
            if inner in loop.derivation and ready(loop):
                edge = self.edge(loop)
                if edge is not None:
                    return edge
        return None

    def _role_of(self, loop: Loop, derived: tuple[Derived, ...]) -> str:
        """What the torn unknown does in a loop beside another: ``decides``, ``drops out``.

        Empty where the closing relation is an identity, or nothing can be said.
        """
        (beside,) = loop.beside
        for other in islice(_tries(beside, self._values), _MOST_TRIES):
            ratios = []
            for at in islice(_tries(loop.torn, self._values), _MOST_TRIES):
                trial: dict[Variable, Ball | None] = {beside: other, loop.torn: at}
                sides = self._sides(loop.closing, derived, trial)
                if sides is not None and not sides[1].contains(0):
                    ratios.append(sides[0] / sides[1])
                if len(ratios) == _LEAST_DECIDING:
                    break
            if len(ratios) < _LEAST_DECIDING:
                continue
            if any(abs(ratio / ratios[0] - 1) > _SAME for ratio in ratios[1:]):
                return "decides"
            return "" if not abs(ratios[0] - 1) > _SAME else "drops out"
        return ""

    def _is_identity(self, loop: Loop, derived: tuple[Derived, ...]) -> bool:
        """Whether the closing relation holds whatever the torn unknown is, as far as tried."""
        held = 0
        if loop.torn not in self._trials:
            tries = _tries(loop.torn, self._values)
            self._trials[loop.torn] = tuple({loop.torn: at} for at in tries)
        for trial in self._trials[loop.torn]:
            sides = self._sides(loop.closing, derived, trial)
            if sides is None:
                continue
            left, right = sides
            if abs(left - right) > (abs(left) + abs(right)) * _SAME:
                return False
            held += 1
            if held == _LEAST_DECIDING:
                return True
        return True  # nothing shows that it determines anything

    def _sides(
        self, closing: Instance, derived: tuple[Derived, ...], trial: dict[Variable, Ball | None]
    ) -> tuple[Ball, Ball] | None:
        """Both sides of a relation for one try; ``None`` where something has no value."""
        for item in derived:
            if item.variable not in trial:
                value = self._value(item.solved, item.instance, trial)
                trial[item.variable] = value if _possible(item.variable, value) else None
        published = closing.relation.published
        left = self._value(published.left, closing, trial)
        right = self._value(published.right, closing, trial)
        return None if left is None or right is None else (left, right)

    def _value(
        self, expr: Expr, instance: Instance, trial: Mapping[Variable, Ball | None]
    ) -> Ball | None:
        values = {}
        for symbol in set(symbols_in(expr)):
            variable = instance.place.variable(symbol)
            value = trial[variable] if variable in trial else self._values.get(variable)
            if value is None:
                return None
            values[symbol] = value
        try:
            value = evaluate(expr, values)
        except OutsideDomainError:
            return None
        return value if value.is_finite() else None


def _possible(variable: Variable, value: Ball | None) -> bool:
    """Whether a value lies within the bounds of its quantity; beyond them nothing is shown."""
    quantity = catalogue()[variable.symbol]
    return value is not None and bool(
        exact_ball(quantity.low) <= value <= exact_ball(quantity.high)
    )


def _closed_form(edge: Edge) -> Derived | None:
    if not isinstance(edge.source, Instance) or edge.unknown is None:
        return None
    isolation = isolate(edge.source.relation.published, edge.unknown)
    if isolation is None or any(integrals_in(isolation.solved)):
        return None  # an integral must not come to stand within another
    return Derived(edge.target, edge.source, edge.unknown, isolation.solved)


def _tries(variable: Variable, values: Mapping[Variable, Ball]) -> Iterator[Ball]:
    """Values to try: between and around known ones of the dimension, then all magnitudes."""
    quantity = catalogue()[variable.symbol]
    low, high = exact_ball(quantity.low), exact_ball(quantity.high)
    alike = [
        value
        for other, value in sorted(values.items())
        if catalogue()[other.symbol].dimension == quantity.dimension
    ]
    alike = sorted({float(value.mid()): value for value in alike}.values(), key=midpoint)
    between = [a + (b - a) * exact_ball(part) for part in _PARTS for a, b in pairwise(alike)]
    around = [value * exact_ball(factor) for factor in _FACTORS for value in alike]
    magnitudes = [exact_ball(Fraction(10) ** power) for power in _POWERS]
    for value in (*between, *around, *magnitudes):
        if low < value < high:
            yield value
