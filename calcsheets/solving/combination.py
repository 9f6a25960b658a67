"""A coupled set as one relation: closed forms inserted into the relation that closes the loop."""

from __future__ import annotations

from collections.abc import Iterable, Iterator, Mapping
from dataclasses import dataclass, replace
from fractions import Fraction
from functools import cached_property

from ..expressions import (
    Condition,
    Equation,
    Expr,
    Function,
    Negative,
    Number,
    Power,
    Product,
    Quotient,
    Root,
    Sum,
    Symbol,
    children,
    substitute,
    symbols_in,
)
from ..planning import Edge, Instance, Loop, Member, Place, Problem
from ..quantities import Variable, catalogue
from ..relations import Branch, Limit, Relation, Source

_APART = Fraction(1, 2**120)
_SOURCE = Source("Elimination from the relations named", "", "", "common practice")


@dataclass(frozen=True)
class Derived:
    """One closed form of a loop: the variable, its relation, and the form in its own symbols."""

    variable: Variable
    instance: Instance
    symbol: Symbol
    solved: Expr


@dataclass(frozen=True)
class Combination:
    """Writes the relations of a loop in common symbols, and one into the other.

    Attributes:
        problem: the problem.
        loop: the loop.
        derived: the closed forms of its derivation.
        gives: the unknown that the combination is solved for.
        cancelled: an unknown that drops out of it.
    """

    problem: Problem
    loop: Loop
    derived: tuple[Derived, ...]
    gives: Variable
    cancelled: Variable | None = None

    def edge(self, assumed: frozenset[Variable]) -> Edge | None:
        """Return the loop as one edge; ``None`` if what should cancel does not.

        Args:
            assumed: regimes whose outcome is assumed and not derived before it is used.
        """
        members, expressions = self._members()
        closing = self.loop.closing
        names = self._names
        published = self._inserted(closing.relation.published, closing, expressions)
        if self.cancelled is not None:
            without = equation_without(published, names[self.cancelled])
            if without is None:
                return None
            published = without
        given = names[self.gives]
        relation = Relation(
            name=f"combination for {self.gives}",
            title=self._title(),
            published=published,
            source=_SOURCE,
            offered_by=("combination",),
            limits=tuple(self._limits()),
            branches=tuple(self._branches(given)),
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
            () if self.cancelled is None else ((names[self.cancelled], self.cancelled),),
        )
        regimes = tuple(v for v, _ in source.regimes if v not in assumed)
        inputs = [v for v in source.binding.values() if v != self.gives]
        cost = (1, int(relation.empirical), len(members))
        return Edge(self.gives, tuple(dict.fromkeys((*inputs, *regimes))), source, given, cost)

    def _members(self) -> tuple[tuple[Member, ...], dict[Variable, Expr]]:
        names = self._names
        expressions: dict[Variable, Expr] = {}
        members: list[Member] = []
        for item in self.derived:
            members += self._within(item)
            own = {s: names[v] for s, v in item.instance.binding.items()}
            solved = substitute(item.solved, own)
            shown = _renamed(item.instance.relation.published, own)
            members.append(
                Member(item.instance, item.variable, names[item.variable], shown, solved)
            )
            inner = {names[v]: e for v, e in expressions.items()}
            expressions[item.variable] = shortened(substitute(solved, inner))
        closing = self.loop.closing
        own = {s: names[v] for s, v in closing.binding.items()}
        shown = _renamed(closing.relation.published, own)
        members.append(Member(closing, None, None, shown, None))
        return tuple(members), expressions

    def _within(self, item: Derived) -> Iterator[Member]:
        """The relations of a set within the set, in the symbols of this one."""
        names, place = self._names, item.instance.place
        for member in item.instance.members:
            own = {s: names[v] for s, v in place.variables(member.published.symbols).items()}
            gives = member.gives or item.variable
            solved = None if member.solved is None else substitute(member.solved, own)
            shown = _renamed(member.published, own)
            yield Member(member.instance, gives, names[gives], shown, solved)

    def _inserted(
        self, equation: Equation, instance: Instance, expressions: Mapping[Variable, Expr]
    ) -> Equation:
        inside = self._inside(instance, equation.symbols, expressions)
        left, right = (substitute(side, inside) for side in (equation.left, equation.right))
        return Equation(shortened(left), shortened(right))

    def _inside(
        self, instance: Instance, symbols: Iterable[Symbol], expressions: Mapping[Variable, Expr]
    ) -> dict[Symbol, Expr]:
        bound = instance.place.variables(symbols)
        return {
            symbol: expressions.get(variable, self._names.get(variable, symbol))
            for symbol, variable in bound.items()
        }

    def _limits(self) -> Iterator[Limit]:
        """The limits of all its relations, each once, in the symbols of the set."""
        found: dict[Condition, Limit] = {}
        for instance in self._instances:
            for limit in instance.relation.limits:
                condition = self._condition(instance, limit.condition, {})
                if condition is not None:
                    found.setdefault(condition, replace(limit, condition=condition))
        yield from found.values()

    def _demands(self, expressions: Mapping[Variable, Expr]) -> Iterator[Limit]:
        """Bounds, limits, branches and published forms of what was eliminated."""
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
        for instance in self._instances:
            for limit in instance.relation.limits:
                condition = self._condition(instance, limit.condition, expressions)
                if condition is not None:
                    yield replace(limit, condition=condition)
        yield from self._published_forms(expressions)

    def _published_forms(self, expressions: Mapping[Variable, Expr]) -> Iterator[Limit]:
        """That the published form of a member holds, where isolating squared a root away."""
        for item in self.derived:
            sides = item.instance.relation.published
            if any(_is_squared_away(side, item.symbol) for side in (sides.left, sides.right)):
                published = self._inserted(sides, item.instance, expressions)
                sizes = published.left**2 + published.right**2
                apart = (published.left - published.right) ** 2
                reason = f"it is a root of the square of {item.instance.relation.title} only"
                yield Limit(Condition(apart, "<=", Number(_APART) * sizes), reason, True)

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

    def _branches(self, given: Symbol) -> Iterator[Branch]:
        """Branches of the unknown that it gives."""
        for branch in self.problem.branches.get(self.gives, ()):
            yield replace(branch, condition=replace(branch.condition, left=given))

    @property
    def _instances(self) -> tuple[Instance, ...]:
        return (*(item.instance for item in self.derived), self.loop.closing)

    @property
    def _variables(self) -> tuple[Variable, ...]:
        """Every variable of the set, and of the sets within it."""
        found: dict[Variable, None] = {}
        for instance in self._instances:
            for member in instance.members:
                found |= dict.fromkeys(member.instance.binding.values())
            found |= dict.fromkeys(instance.binding.values())
        return tuple(found)

    def _title(self) -> str:
        titles: dict[str, None] = {}
        for instance in self._instances:
            inner = [member.instance.relation.title for member in instance.members]
            titles |= dict.fromkeys(inner or [instance.relation.title])
        return f"Solved together: {'; '.join(titles)}"

    def _titles(self) -> tuple[str, ...]:
        return tuple(dict.fromkeys(instance.place.title for instance in self._instances))

    @cached_property
    def _roles(self) -> dict[str, str]:
        """The role of each place: numbers where there are several, its own name for others."""
        brief = self.problem.brief
        path = [name for leg in brief.legs for name in (leg.start, leg.name, leg.end)]
        path += [station.name for station in brief.stations]
        places = {v.place for v in self._variables if self._numbered(v)}
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

    @cached_property
    def _names(self) -> dict[Variable, Symbol]:
        """The symbol of each variable of the set."""
        roles = self._roles
        return {
            variable: Symbol(variable.symbol, roles.get(variable.place, variable.place))
            if self._numbered(variable)
            else Symbol(variable.symbol)
            for variable in self._variables
        }


def _renamed(equation: Equation, names: Mapping[Symbol, Expr]) -> Equation:
    return Equation(substitute(equation.left, names), substitute(equation.right, names))


def equation_without(equation: Equation, symbol: Symbol) -> Equation | None:
    """Return an equation without a factor that both sides have alike.

    Args:
        equation: the equation, whose ratio of sides does not depend on the symbol.
        symbol: the factor.

    Returns:
        The equation, or ``None`` where the symbol stands in more than products and powers.
    """
    left, right = _without(equation.left, symbol), _without(equation.right, symbol)
    return None if left is None or right is None else Equation(left, right)


def shortened(expr: Expr) -> Expr:
    """Return an expression whose fractions hold no factor above and below the line alike."""
    match expr:
        case Quotient(numerator, denominator):
            return _fraction(shortened(numerator), shortened(denominator))
        case Product(factors):
            return Product(tuple(shortened(factor) for factor in factors))
        case Sum(terms):
            return Sum(tuple(shortened(term) for term in terms))
        case Power(base, exponent):
            return Power(shortened(base), exponent)
        case Negative(operand):
            return Negative(shortened(operand))
        case Root(radicand):
            return Root(shortened(radicand))
        case Function(name, argument):
            return Function(name, shortened(argument))
        case _:
            return expr


def _fraction(numerator: Expr, denominator: Expr) -> Expr:
    above, below = _factors(numerator), _factors(denominator)
    kept = list(above)
    left = []
    for factor in below:
        if factor in kept:
            kept.remove(factor)
        else:
            left.append(factor)
    if len(kept) == len(above):
        return Quotient(numerator, denominator)
    top = _product(kept)
    return Quotient(top, _product(left)) if left else top


def _factors(expr: Expr) -> tuple[Expr, ...]:
    if isinstance(expr, Product):
        return tuple(part for factor in expr.factors for part in _factors(factor))
    return (expr,)


def _product(factors: list[Expr]) -> Expr:
    if not factors:
        return _ONE
    return factors[0] if len(factors) == 1 else Product(tuple(factors))


_ONE = Number(Fraction(1))


def _without(expr: Expr, symbol: Symbol) -> Expr | None:
    if expr == symbol:
        return _ONE
    if symbol not in set(symbols_in(expr)):
        return expr
    match expr:
        case Product(factors):
            parts = [_without(factor, symbol) for factor in factors]
            left = tuple(part for part in parts if part is not None and part != _ONE)
            if any(part is None for part in parts):
                return None
            return Product(left) if len(left) > 1 else left[0] if left else _ONE
        case Quotient(numerator, denominator):
            above, below = _without(numerator, symbol), _without(denominator, symbol)
            if above is None or below is None:
                return None
            return above if below == _ONE else Quotient(above, below)
        case Power(base, exponent) if symbol not in set(symbols_in(exponent)):
            raised = _without(base, symbol)
            return raised if raised is None or raised == _ONE else Power(raised, exponent)
        case Root(radicand):
            under = _without(radicand, symbol)
            return under if under is None or under == _ONE else Root(under)
        case _:
            return None


def _is_squared_away(expr: Expr, symbol: Symbol) -> bool:
    """Whether isolating a symbol raises a root to a power, which can bring in a false root."""
    rooted = isinstance(expr, Root) or (
        isinstance(expr, Power)
        and isinstance(expr.exponent, Number)
        and expr.exponent.value.denominator != 1
    )
    if rooted and symbol in set(symbols_in(expr)):
        return True
    return any(_is_squared_away(child, symbol) for child in children(expr))
