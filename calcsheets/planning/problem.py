"""A brief as a problem: every relation at every place where the path offers it."""

from __future__ import annotations

from collections.abc import Iterable, Iterator, Mapping
from dataclasses import dataclass
from functools import cached_property

from ..brief import Brief, Leg, SameAs, Station
from ..expressions import Condition, Equation, Expr, Number, Symbol
from ..quantities import Variable
from ..relations import (
    Branch,
    Course,
    Library,
    Limit,
    Regime,
    Relation,
    Source,
    ending_in,
    mixture_relations,
    starting_from,
    station_of,
)
from ..relations.roles import DISCHARGE, INLET, OUTLET, SUPPLY, THROUGH


@dataclass(frozen=True)
class Place:
    """Where a relation is offered, and what its roles mean there.

    Attributes:
        name: station, process, ``gas`` or ``site``.
        title: the place in words.
        roles: place of each role.
        branch: stated branch, empty for none.
    """

    name: str
    title: str
    roles: Mapping[str, str]
    branch: str

    def variable(self, symbol: Symbol) -> Variable:
        """Return the variable that a symbol means here."""
        home = symbol.definition.home
        if symbol.role == "" and home != "station":
            return Variable(symbol.quantity, home)
        return Variable(symbol.quantity, self.roles.get(symbol.role, symbol.role))

    def variables(self, symbols: Iterable[Symbol]) -> dict[Symbol, Variable]:
        """Return the variable of each of several symbols."""
        return {symbol: self.variable(symbol) for symbol in symbols}


@dataclass(frozen=True)
class Instance:
    """A relation at a place.

    Attributes:
        relation: the relation.
        place: where it is offered.
        rank: position of the relation in the library; of two equal ways the first is taken.
        members: the relations that it combines, where it is a coupled set.
        limits: what a solution of a coupled set must meet besides.
        dropped: unknowns that stand in members of a coupled set and drop out of it.
    """

    relation: Relation
    place: Place
    rank: int
    members: tuple[Member, ...] = ()
    limits: tuple[Limit, ...] = ()
    dropped: tuple[tuple[Symbol, Variable], ...] = ()

    @cached_property
    def binding(self) -> Mapping[Symbol, Variable]:
        """The variable of each symbol of the relation."""
        return self.place.variables(self.relation.symbols)

    @cached_property
    def key(self) -> tuple[int, str, str]:
        """A total order on instances."""
        return (self.rank, self.relation.name, self.place.name)

    def regime_at(self, role: str) -> Variable:
        """Return the regime of the process that a role means here."""
        return Variable("regime", self.place.roles[role])

    @cached_property
    def regimes(self) -> tuple[tuple[Variable, tuple[str, ...]], ...]:
        """Every regime on which it depends, with the outcomes in which it holds."""
        own = ((self.regime_at(role), outcomes) for role, outcomes in self.relation.uses)
        of_members = (use for member in self.members for use in member.instance.regimes)
        return tuple(dict.fromkeys((*own, *of_members)))

    def holds_in(self, regimes: Mapping[Variable, str], unless_open: bool = False) -> bool:
        """Whether it holds where regimes are as stated.

        Args:
            regimes: outcome of each regime that is decided.
            unless_open: what an undecided regime counts as: whether it may still hold.
        """
        return all(
            regimes[variable] in outcomes if variable in regimes else unless_open
            for variable, outcomes in self.regimes
        )


@dataclass(frozen=True)
class Member:
    """One relation of a coupled set.

    Attributes:
        instance: the relation at its place.
        gives: the variable that it gives once the torn one is known; ``None`` for the relation
            that closes the loop.
        symbol: that variable in the symbols of the set; ``None`` likewise.
        published: the relation in the symbols of the set.
        solved: its solved form in these symbols; ``None`` for the closing relation.
    """

    instance: Instance
    gives: Variable | None
    symbol: Symbol | None
    published: Equation
    solved: Expr | None


@dataclass(frozen=True)
class RegimeInstance:
    """A regime test at a process, ranked among the tests of the library."""

    regime: Regime
    place: Place
    rank: int

    @cached_property
    def binding(self) -> Mapping[Symbol, Variable]:
        """The variable of each symbol of the test."""
        return self.place.variables(self.regime.symbols)

    @cached_property
    def key(self) -> tuple[int, str, str]:
        """A total order on regime tests."""
        return (self.rank, self.regime.name, self.place.name)

    @property
    def variable(self) -> Variable:
        """The regime that the test decides."""
        return Variable("regime", self.place.name)


@dataclass(frozen=True)
class CourseInstance:
    """A course at a process."""

    course: Course
    place: Place

    @cached_property
    def binding(self) -> Mapping[Symbol, Variable]:
        """The variable of each symbol that must be known."""
        return self.place.variables(self.course.symbols)


@dataclass(frozen=True)
class Problem:
    """Everything that planning knows.

    Attributes:
        brief: the brief.
        instances: relations at places, in a total order.
        regimes: regime tests at processes, by the variable that they decide.
        courses: courses of processes, in the order of the path.
    """

    brief: Brief
    instances: tuple[Instance, ...]
    regimes: Mapping[Variable, RegimeInstance]
    courses: tuple[CourseInstance, ...]

    @cached_property
    def known(self) -> frozenset[Variable]:
        """Every variable that the brief gives."""
        return frozenset(given.variable for given in self.brief.given)

    @cached_property
    def branches(self) -> Mapping[Variable, tuple[Branch, ...]]:
        """The branches of each variable: those that relations offered at its place name."""
        found: dict[Variable, dict[str, Branch]] = {}
        for instance in self.instances:
            for branch in instance.relation.branches:
                variable = _bounded(instance.place, branch.condition)
                if variable is not None:
                    found.setdefault(variable, {}).setdefault(branch.name, branch)
        return {variable: tuple(named.values()) for variable, named in found.items()}

    @cached_property
    def demands(self) -> Mapping[Variable, tuple[Limit, ...]]:
        """What the processes ask of variables at their stations, as a shock asks of M."""
        found: dict[Variable, dict[Limit, None]] = {}
        processes = {leg.name for leg in self.brief.legs}
        for instance in self.instances:
            for limit in instance.relation.limits if instance.place.name in processes else ():
                variable = _bounded(instance.place, limit.condition)
                if variable is not None and limit.essential and not instance.relation.uses:
                    found.setdefault(variable, {}).setdefault(limit)
        return {variable: tuple(limits) for variable, limits in found.items()}

    def branch_at(self, place: str) -> str:
        """Return the branch stated at a place, empty for none."""
        return self._stated_branches.get(place, "")

    @cached_property
    def _stated_branches(self) -> Mapping[str, str]:
        stated = {station.name: station.branch for station in self.brief.stations}
        return stated | {leg.name: leg.branch for leg in self.brief.legs}

    def title(self, variable: Variable) -> str:
        """Return the place of a variable in words."""
        return self._titles.get(variable.place, variable.place)

    @cached_property
    def _titles(self) -> Mapping[str, str]:
        titles = {"gas": self.brief.gas.title, "site": "site"}
        titles.update({station.name: station.title for station in self.brief.stations})
        titles.update({leg.name: leg.title for leg in self.brief.legs})
        return titles


def _bounded(place: Place, condition: Condition) -> Variable | None:
    """The variable that a condition compares with a number, if that is all it does."""
    if isinstance(condition.left, Symbol) and isinstance(condition.right, Number):
        return place.variable(condition.left)
    return None


def state_problem(brief: Brief, library: Library) -> Problem:
    """Return the problem that a brief states, with the relations of a library."""
    places = tuple(_places(brief))
    instances = [
        Instance(relation, place, rank)
        for rank, relation in enumerate(library.relations)
        for place, offers in places
        if offers in relation.offered_by
    ]
    for relation, place in (*_equalities(brief), *_mixture(brief)):
        instances.append(Instance(relation, place, len(library.relations)))
    offered = {instance.key: instance for instance in instances}
    tests = [
        RegimeInstance(regime, place, rank)
        for rank, regime in enumerate(library.regimes)
        for place, offers in places
        if offers in regime.offered_by
    ]
    return Problem(
        brief=brief,
        instances=tuple(offered[key] for key in sorted(offered)),
        regimes={test.variable: test for test in sorted(tests, key=lambda test: test.key)},
        courses=tuple(
            CourseInstance(course, place)
            for place, offers in places
            for course in library.courses
            if offers in course.offered_by
        ),
    )


def _equalities(brief: Brief) -> Iterator[tuple[Relation, Place]]:
    for same in brief.same_as:
        yield _equality(same), _same_place(same)


def _mixture(brief: Brief) -> Iterator[tuple[Relation, Place]]:
    components = [gas.key for gas, _ in brief.gas.components]
    for relation in mixture_relations(components, brief.gas.basis) if components else ():
        yield relation, _gas_place(brief)


def _places(brief: Brief) -> Iterator[tuple[Place, str]]:
    """Every place with the name under which relations are offered there."""
    yield _gas_place(brief), "gas"
    yield Place("site", "site", {"": "site"}, ""), "site"
    for station in brief.stations:
        place = _station_place(station)
        yield place, station.kind
        at_ends = {leg.process for leg in brief.legs if station.name in (leg.start, leg.end)}
        yield from ((place, station_of(process)) for process in sorted(at_ends))
    legs = {leg.name: leg for leg in brief.legs}
    kinds = {station.name: station.kind for station in brief.stations}
    for leg in brief.legs:
        place = _leg_place(leg, legs)
        yield place, leg.process
        yield place, starting_from(leg.process, kinds[leg.start])
        yield place, ending_in(leg.process, kinds[leg.end])


def _gas_place(brief: Brief) -> Place:
    return Place("gas", brief.gas.title, {"": "gas"}, "")


def _station_place(station: Station) -> Place:
    return Place(station.name, station.title, {"": station.name}, station.branch)


def _leg_place(leg: Leg, legs: Mapping[str, Leg]) -> Place:
    roles = {"": leg.name, INLET: leg.start, OUTLET: leg.end}
    if leg.through:
        through = legs[leg.through]
        roles |= {THROUGH: through.name, SUPPLY: through.start, DISCHARGE: through.end}
    return Place(leg.name, leg.title, roles, leg.branch)


def _equality(same: SameAs) -> Relation:
    """An equality that the brief states, as a relation whose source is the brief."""
    left = Symbol(same.variable.symbol)
    right = Symbol(same.other.symbol, same.other.place)
    return Relation(
        f"stated_equality_{same.variable.symbol}_{same.variable.place}",
        "Equality stated in the brief",
        left.equals(right),
        Source(same.source or "the brief", "", "", "brief"),
        ("stream",),
        chapter="brief",
    )


def _same_place(same: SameAs) -> Place:
    return Place(same.variable.place, same.variable.place, {"": same.variable.place}, "")
