"""A coupled set as one relation: closed forms inserted into the relation that closes the loop."""

from __future__ import annotations

from collections.abc import Iterable, Iterator, Mapping
from dataclasses import dataclass, replace
from fractions import Fraction
from itertools import pairwise

from flint import arb

from ..expressions import (
    Condition,
    Equation,
    Expr,
    Number,
    Symbol,
    integrals_in,
    substitute,
    symbols_in,
)
from ..planning import Edge, Instance, Loop, Member, Place, Problem
from ..quantities import Variable, catalogue
from ..relations import Branch, Limit, Relation, Source
from .balls import Ball, OutsideDomainError, evaluate, exact_ball, midpoint
from .moves import isolate

_FACTORS = tuple(Fraction(text) for text in ("0.83", "1.21", "0.47", "2.3", "0.11", "9.7"))
_PARTS = (Fraction(37, 100), Fraction(81, 100))
_POWERS = (0, -1, 1, -2, 2, 3, 4, 5, -3, -4, 6)
_LEAST_DECIDING = 3
_SAME = arb(2) ** -80
_SOURCE = Source("Elimination from the relations named", "", "", "common practice")


@dataclass(frozen=True)
class _Derived:
    """One closed form of a loop: the variable, its relation, and the form in its own symbols."""

    variable: Variable
    instance: Instance
    symbol: Symbol
    solved: Expr


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
        return _Combination(self._problem, loop, closed).edge(self._assumed)

    def _is_identity(self, loop: Loop, derived: tuple[_Derived, ...]) -> bool:
        """Whether the closing relation holds whatever the torn unknown is, as far as tried."""
        held = 0
        if loop.torn not in self._trials:
            tries = _tries(loop.torn, self._values)
            self._trials[loop.torn] = tuple({loop.torn: at} for at in tries)
        for trial in self._trials[loop.torn]:
            holds = self._holds(loop.closing, derived, trial)
            if holds is False:
                return False
            held += holds is True
            if held == _LEAST_DECIDING:
                return True
        return True  # nothing shows that it determines anything

    def _holds(
        self, closing: Instance, derived: tuple[_Derived, ...], trial: dict[Variable, Ball | None]
    ) -> bool | None:
        """Whether a relation holds for one try; ``None`` where something has no value."""
        for item in derived:
            if item.variable not in trial:
                value = self._value(item.solved, item.instance, trial)
                trial[item.variable] = value if _possible(item.variable, value) else None
        published = closing.relation.published
        left = self._value(published.left, closing, trial)
        right = self._value(published.right, closing, trial)
        if left is None or right is None:
            return None
        return not abs(left - right) > (abs(left) + abs(right)) * _SAME

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


def _closed_form(edge: Edge) -> _Derived | None:
    if not isinstance(edge.source, Instance) or edge.unknown is None:
        return None
    isolation = isolate(edge.source.relation.published, edge.unknown)
    if isolation is None or any(integrals_in(isolation.solved)):
        return None  # an integral must not come to stand within another
    return _Derived(edge.target, edge.source, edge.unknown, isolation.solved)


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


@dataclass(frozen=True)
class _Combination:
    """Writes the relations of a loop in common symbols, and one into the other."""

    problem: Problem
    loop: Loop
    derived: tuple[_Derived, ...]

    def edge(self, assumed: frozenset[Variable]) -> Edge:
        members, expressions = self._members()
        closing = self.loop.closing
        names = self._names
        published = self._inserted(closing.relation.published, closing, expressions)
        torn = names[self.loop.torn]
        relation = Relation(
            name=f"combination for {self.loop.torn}",
            title=self._title(),
            published=published,
            source=_SOURCE,
            offered_by=("combination",),
            limits=tuple(self._limits(closing, expressions)),
            branches=tuple(self._branches(torn)),
            empirical=any(m.instance.relation.empirical for m in members),
            chapter="combination",
        )
        place = Place(
            name="combination",
            title=" and ".join(self._titles()),
            roles={"": self._only_place(), **{r: p for p, r in self._roles.items() if r}},
            branch="",
        )
        source = Instance(
            relation,
            place,
            closing.rank,
            members,
            tuple(self._demands(expressions)),
        )
        regimes = tuple(v for v, _ in source.regimes if v not in assumed)
        inputs = [v for v in source.binding.values() if v != self.loop.torn]
        cost = (1, int(relation.empirical), len(members))
        return Edge(self.loop.torn, tuple(dict.fromkeys((*inputs, *regimes))), source, torn, cost)

    def _members(self) -> tuple[tuple[Member, ...], dict[Variable, Expr]]:
        names = self._names
        expressions: dict[Variable, Expr] = {}
        members = []
        for item in self.derived:
            own = {s: names[v] for s, v in item.instance.binding.items()}
            solved = substitute(item.solved, own)
            published = item.instance.relation.published
            shown = Equation(substitute(published.left, own), substitute(published.right, own))
            members.append(
                Member(item.instance, item.variable, names[item.variable], shown, solved)
            )
            inner = {names[v]: e for v, e in expressions.items()}
            expressions[item.variable] = substitute(solved, inner)
        closing = self.loop.closing
        own = {s: names[v] for s, v in closing.binding.items()}
        published = closing.relation.published
        shown = Equation(substitute(published.left, own), substitute(published.right, own))
        members.append(Member(closing, None, None, shown, None))
        return tuple(members), expressions

    def _inserted(
        self, equation: Equation, instance: Instance, expressions: Mapping[Variable, Expr]
    ) -> Equation:
        inside = self._inside(instance, equation.symbols, expressions)
        return Equation(substitute(equation.left, inside), substitute(equation.right, inside))

    def _inside(
        self, instance: Instance, symbols: Iterable[Symbol], expressions: Mapping[Variable, Expr]
    ) -> dict[Symbol, Expr]:
        bound = instance.place.variables(symbols)
        return {
            symbol: expressions.get(variable, self._names.get(variable, symbol))
            for symbol, variable in bound.items()
        }

    def _limits(self, closing: Instance, expressions: Mapping[Variable, Expr]) -> Iterator[Limit]:
        for limit in closing.relation.limits:
            condition = self._condition(closing, limit.condition, expressions)
            if condition is not None:
                yield replace(limit, condition=condition)

    def _demands(self, expressions: Mapping[Variable, Expr]) -> Iterator[Limit]:
        """Bounds, limits and branches of what was eliminated."""
        for variable, expr in expressions.items():
            quantity = catalogue()[variable.symbol]
            low, high = Number(quantity.low), Number(quantity.high)
            open_end = quantity.low == 0 and not quantity.zero
            reason = f"{variable} would lie outside its bounds"
            yield Limit(Condition(expr, ">" if open_end else ">=", low), reason, True)
            yield Limit(Condition(expr, "<=", high), reason, True)
            for limit in self.problem.demands.get(variable, ()):
                yield replace(limit, condition=replace(limit.condition, left=expr))
            stated = self.problem.branch_at(variable.place)
            for branch in self.problem.branches.get(variable, ()):
                if branch.name == stated:
                    reason = f"{variable} would not lie on the stated branch, {stated}"
                    yield Limit(replace(branch.condition, left=expr), reason, True)
        for item in self.derived:
            for limit in item.instance.relation.limits:
                condition = self._condition(item.instance, limit.condition, expressions)
                if condition is not None:
                    yield replace(limit, condition=condition)

    def _condition(
        self, instance: Instance, condition: Condition, expressions: Mapping[Variable, Expr]
    ) -> Condition | None:
        """A condition in the symbols of the set; ``None`` if it names what the set does not."""
        bound = instance.place.variables(condition.symbols)
        if not all(variable in self._names for variable in bound.values()):
            return None
        inside = self._inside(instance, condition.symbols, expressions)
        return Condition(
            substitute(condition.left, inside),
            condition.comparison,
            substitute(condition.right, inside),
        )

    def _branches(self, torn: Symbol) -> Iterator[Branch]:
        """Branches of the torn unknown itself."""
        for branch in self.problem.branches.get(self.loop.torn, ()):
            yield replace(branch, condition=replace(branch.condition, left=torn))

    @property
    def _instances(self) -> tuple[Instance, ...]:
        return (*(item.instance for item in self.derived), self.loop.closing)

    def _title(self) -> str:
        titles = dict.fromkeys(instance.relation.title for instance in self._instances)
        return f"Solved together: {'; '.join(titles)}"

    def _titles(self) -> tuple[str, ...]:
        return tuple(dict.fromkeys(instance.place.title for instance in self._instances))

    @property
    def _roles(self) -> dict[str, str]:
        """The role of each place: numbers where there are several, its own name for others."""
        brief = self.problem.brief
        path = [name for leg in brief.legs for name in (leg.start, leg.name, leg.end)]
        path += [station.name for station in brief.stations]
        variables = [v for instance in self._instances for v in instance.binding.values()]
        places = {v.place for v in variables if self._numbered(v)}
        places |= {v.place for i in self._instances for v, _ in i.regimes}
        ordered = [place for place in dict.fromkeys(path) if place in places]
        if len(ordered) == 1:
            return {ordered[0]: ""}
        return {place: str(number) for number, place in enumerate(ordered, start=1)}

    def _only_place(self) -> str:
        return next((place for place, role in self._roles.items() if role == ""), "combination")

    @staticmethod
    def _numbered(variable: Variable) -> bool:
        return variable.place != catalogue()[variable.symbol].home

    @property
    def _names(self) -> dict[Variable, Symbol]:
        """The symbol of each variable of the set."""
        roles = self._roles
        variables = [v for instance in self._instances for v in instance.binding.values()]
        return {
            variable: Symbol(variable.symbol, roles.get(variable.place, variable.place))
            if self._numbered(variable)
            else Symbol(variable.symbol)
            for variable in variables
        }
