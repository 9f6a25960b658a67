"""A whole problem solved: regimes decided on the way, then every step that is needed."""

from __future__ import annotations

from collections.abc import Iterator, Mapping
from dataclasses import dataclass, field, replace
from enum import Enum

from ..errors import NoRoot, NotEnoughInputs, SeveralRoots, SolvingError
from ..expressions import Symbol
from ..planning import (
    Edge,
    Field,
    Instance,
    Loop,
    Problem,
    Reach,
    RegimeInstance,
    reach,
)
from ..quantities import Variable
from ..relations import Limit
from .balls import Ball, evaluate, exact_ball
from .coupled import Combiner
from .question import Question, compare, decide
from .refusals import limit_missed
from .solve import Solution, solve


@dataclass(frozen=True)
class RegimeOutcome:
    """A regime test with its outcome.

    Attributes:
        sides: balls of both sides of each case.
        regime: the outcome.
        assumed: whether it was taken for granted before it was tested.
    """

    sides: tuple[tuple[Ball, Ball], ...]
    regime: str
    assumed: bool


@dataclass(frozen=True)
class StepOutcome:
    """What one edge of the plan came to.

    Attributes:
        edge: the edge.
        solution: of a relation; ``None`` for a regime test.
        regime: of a regime test; ``None`` for a relation.
    """

    edge: Edge
    solution: Solution | None
    regime: RegimeOutcome | None


@dataclass(frozen=True)
class Outcome:
    """A solved problem.

    Attributes:
        problem: the problem.
        steps: in the order of the plan.
        values: ball of every known or solved variable.
        regimes: every regime that was decided.
        reached: everything that the plan could reach.
    """

    problem: Problem
    steps: tuple[StepOutcome, ...]
    values: Mapping[Variable, Ball]
    regimes: Mapping[Variable, str]
    reached: Reach


class Effort(Enum):
    """How far a plan goes to find what is wanted; each level only where the one before fails."""

    STEPS = 0
    """One relation after the other."""
    LOOPS = 1
    """Coupled sets torn at one unknown."""
    NESTED = 2
    """Coupled sets torn at two."""


@dataclass
class Run:
    """One attempt.

    Attributes:
        problem: the problem.
        assumed: regimes that it takes for granted.
        choices: which of several roots it takes, by the key of the unknown.
        effort: how far it goes.
        explain: whether its refusal will be read.
    """

    problem: Problem
    assumed: Mapping[Variable, str] = field(default_factory=dict)
    choices: Mapping[str, int] = field(default_factory=dict)
    effort: Effort = Effort.STEPS
    explain: bool = True
    values: dict[Variable, Ball] = field(default_factory=dict)
    regimes: dict[Variable, str] = field(default_factory=dict)
    solved: dict[Variable, StepOutcome] = field(default_factory=dict)
    coupled: list[Edge] = field(default_factory=list)
    unsolved: set[Variable] = field(default_factory=set)
    questions: list[SeveralRoots] = field(default_factory=list)

    def __post_init__(self) -> None:
        self.regimes.update(self.assumed)
        for given in self.problem.brief.given:
            unit = given.measured.unit
            self.values[given.variable] = exact_ball(given.measured.rational, unit.pi_power)

    def reach(self) -> Reach:
        """Search, decide the regimes that can be decided, and search again."""
        tried: set[Variable] = set()
        while True:
            reached = reach(
                self.problem, self.regimes, frozenset(self.assumed), further=self.coupled
            )
            undecided = [
                variable
                for variable in reached.edges
                if variable in self.problem.regimes
                and variable not in self.regimes
                and variable not in tried
            ]
            if not undecided:
                coupled = self._couple(reached)
                if coupled is None:
                    return reached
                self.coupled.append(coupled)
            for variable in undecided:
                tried.add(variable)
                self._decide(reached, variable)

    def _couple(self, reached: Reach) -> Edge | None:
        """The smallest coupled set that leads on, where a wanted quantity does not follow."""
        missing = missing_in(self.problem, reached)
        if not missing or self.effort is Effort.STEPS:
            return None
        assumed = frozenset(self.assumed)
        combiner = Combiner(self.problem, self.values, assumed)
        field = Field.of(self.problem, self.regimes, assumed, reached)

        def ready(loop: Loop) -> bool:
            return self._prepare(reached, loop)

        for loop in field.loops(missing):
            edge = combiner.edge(loop) if ready(loop) else None
            if edge is not None and all(item in reached for item in edge.inputs):
                return edge
        nested = self.effort is Effort.NESTED
        edge = combiner.nested(field, missing, ready) if nested else None
        if edge is not None and all(item in reached for item in edge.inputs):
            return edge
        if self.questions:
            raise self.questions[0]  # with one of its roots a set may close
        return None

    def _prepare(self, reached: Reach, loop: Loop) -> bool:
        """Solve what the relations of a loop know already; whether that was possible."""
        needed = {v for edge in loop.derivation for v in edge.inputs}
        needed |= set(loop.closing.binding.values())
        edges = reached.needed(sorted(v for v in needed if v in reached.edges))
        if any(edge.target in self.unsolved for edge in edges):
            return False
        try:
            self.execute(edges)
        except SeveralRoots as question:
            self.questions.append(question)
            return False
        except SolvingError:
            return False
        return True

    def _decide(self, reached: Reach, variable: Variable) -> None:
        try:
            self.execute(reached.needed([variable]))
        except SolvingError:
            return  # a regime that nothing needs must not stop the calculation

    def execute(self, edges: tuple[Edge, ...]) -> None:
        """Solve edges that are not solved yet, in order."""
        for edge in edges:
            if edge.target in self.solved:
                continue
            if isinstance(edge.source, RegimeInstance):
                outcome = StepOutcome(edge, None, self._test(edge.source))
            else:
                outcome = StepOutcome(edge, self._try(edge, edge.source), None)
            self.solved[edge.target] = outcome

    def _test(self, source: RegimeInstance) -> RegimeOutcome:
        values = {symbol: self.values[variable] for symbol, variable in source.binding.items()}
        regime = next(
            (outcome for condition, outcome in source.regime.cases if decide(condition, values)),
            source.regime.otherwise,
        )
        self.regimes.setdefault(source.variable, regime)
        return RegimeOutcome(
            sides=tuple(
                (evaluate(condition.left, values), evaluate(condition.right, values))
                for condition in source.regime.conditions
            ),
            regime=regime,
            assumed=source.variable in self.assumed,
        )

    def _try(self, edge: Edge, source: Instance) -> Solution:
        try:
            return self._solve(edge, source)
        except SolvingError:
            self.unsolved.add(edge.target)
            raise

    def _solve(self, edge: Edge, source: Instance) -> Solution:
        unknown = edge.unknown
        if unknown is None:
            raise NotEnoughInputs(str(edge.target), "", ())
        limits = tuple(self._limits(edge.target, unknown, source))
        named = (s for limit in (*limits, *source.relation.limits) for s in limit.condition.symbols)
        bound = source.place.variables((*source.relation.symbols, *named))
        values = {
            symbol: self.values[variable]
            for symbol, variable in bound.items()
            if variable in self.values and variable != edge.target
        }
        branch = self.problem.branch_at(edge.target.place) or source.place.branch
        place = f"the place {edge.target.place}"
        solution = solve(
            Question(
                relation=source.relation,
                unknown=unknown,
                values=values,
                branch=branch,
                key=str(edge.target),
                place=place,
                limits=limits,
                choice=self.choices.get(str(edge.target)),
                explain=self.explain,
            )
        )
        self.values[edge.target] = solution.value
        return solution

    def _limits(self, target: Variable, unknown: Symbol, source: Instance) -> Iterator[Limit]:
        """The tests of the regime in which a relation holds, and what processes ask."""
        for role, outcomes in source.relation.uses:
            if role:
                continue
            reason = f"this relation holds where it is {' or '.join(outcomes)}"
            for test in self.problem.regimes[source.regime_at(role)].regime.asks(outcomes):
                yield Limit(test, reason, True)
        for limit in self.problem.demands.get(target, ()):
            yield replace(limit, condition=replace(limit.condition, left=unknown))
        yield from source.limits

    def finish(self, reached: Reach) -> Outcome:
        """Solve everything that the wanted results need."""
        wanted = [item.variable for item in self.problem.brief.wanted]
        tests = [variable for variable in self.assumed if variable in reached.edges]
        targets = [*wanted, *tests]
        targets = [*self._solved_together(reached.needed(targets)), *targets]
        edges = reached.needed(targets)
        try:
            self.execute(edges)
        except NoRoot as refused:
            if not refused.limits:  # one that names other quantities may stand against it
                self._with_limits(reached, targets, edges)
            raise
        edges = self._with_limits(reached, targets, edges)
        return Outcome(
            self.problem,
            tuple(self.solved[edge.target] for edge in edges),
            dict(self.values),
            dict(self.regimes),
            reached,
        )

    def _solved_together(self, edges: tuple[Edge, ...]) -> list[Variable]:
        """Every unknown of the coupled sets among some edges, so that all of a set is shown."""
        needed = {edge.target for edge in edges}
        found: list[Variable] = []
        for edge in self.coupled:
            if edge.target in needed and isinstance(edge.source, Instance):
                gives = (member.gives for member in edge.source.members)
                dropped = (variable for _, variable in edge.source.dropped)
                found += [edge.target, *(v for v in gives if v is not None), *dropped]
        return found

    def _with_limits(
        self, reached: Reach, targets: list[Variable], edges: tuple[Edge, ...]
    ) -> tuple[Edge, ...]:
        """Solve also for what the essential limits of the steps ask for, and test them.

        Raises:
            OutsideLimit: if an essential limit is not met.
        """
        extra = [
            variable
            for edge in edges
            for limit in _essential_limits(edge)
            for variable in edge.source.place.variables(limit.condition.symbols).values()
            if variable not in self.values and variable in reached
        ]
        for variable in dict.fromkeys(extra):
            try:
                self.execute(reached.needed([variable]))
            except SolvingError:
                continue  # the sheet says that the limit could not be evaluated
            targets = [*targets, variable]
        for edge in edges:
            for limit in _essential_limits(edge):
                self._require(edge, limit)
        return reached.needed(targets)

    def _require(self, edge: Edge, limit: Limit) -> None:
        bound = edge.source.place.variables(limit.condition.symbols)
        values = {s: self.values[v] for s, v in bound.items() if v in self.values}
        if len(values) < len(bound) or not isinstance(edge.source, Instance):
            return
        if compare(limit.condition, values) is False:
            raise limit_missed(edge.source.relation, str(edge.target), limit, values)


def _essential_limits(edge: Edge) -> tuple[Limit, ...]:
    if not isinstance(edge.source, Instance):
        return ()
    return tuple(limit for limit in edge.source.relation.limits if limit.essential)


def missing_in(problem: Problem, reached: Reach) -> list[Variable]:
    """Return the wanted variables that do not follow."""
    return [w.variable for w in problem.brief.wanted if w.variable not in reached]
