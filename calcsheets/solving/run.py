"""A whole problem solved: regimes decided on the way, then every step that is needed."""

from __future__ import annotations

from collections.abc import Iterator, Mapping
from dataclasses import dataclass, field, replace
from itertools import product

from ..errors import AmbiguousRegime, NotEnoughInputs, OutsideLimit, SolvingError
from ..expressions import Condition, Symbol
from ..planning import (
    Edge,
    Instance,
    Problem,
    Reach,
    RegimeInstance,
    closing_inputs,
    loops,
    reach,
)
from ..quantities import Variable, catalogue
from ..relations import Limit
from .balls import Ball, OutsideDomainError, evaluate, exact_ball, working_precision
from .coupled import Combiner
from .question import Question, compare
from .solve import Solution, solve

_MOST_ASSUMED = 4
_OPPOSITE = {"<=": ">", "<": ">=", ">=": "<", ">": "<="}


@dataclass(frozen=True)
class RegimeOutcome:
    """A regime test with the balls of its sides."""

    left: Ball
    right: Ball
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


@dataclass
class _Run:
    """One attempt, with the regimes that it takes for granted."""

    problem: Problem
    assumed: Mapping[Variable, str] = field(default_factory=dict)
    values: dict[Variable, Ball] = field(default_factory=dict)
    regimes: dict[Variable, str] = field(default_factory=dict)
    solved: dict[Variable, StepOutcome] = field(default_factory=dict)
    coupled: list[Edge] = field(default_factory=list)

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
        missing = _missing(self.problem, reached)
        if not missing:
            return None
        assumed = frozenset(self.assumed)
        combiner = Combiner(self.problem, self.values, assumed)
        for loop in loops(self.problem, self.regimes, assumed, reached, missing):
            needed = {v for edge in loop.derivation for v in edge.inputs}
            needed |= set(loop.closing.binding.values())
            try:
                self.execute(reached.needed(sorted(v for v in needed if v in reached.edges)))
            except SolvingError:
                continue
            edge = combiner.edge(loop)
            if edge is not None and all(item in reached for item in edge.inputs):
                return edge
        return None

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
                outcome = StepOutcome(edge, self._solve(edge, edge.source), None)
            self.solved[edge.target] = outcome

    def _test(self, source: RegimeInstance) -> RegimeOutcome:
        condition = source.regime.condition
        values = {symbol: self.values[variable] for symbol, variable in source.binding.items()}
        holds = compare(condition, values)
        if holds is None:  # the enclosures overlap: both sides are equal as far as is known
            holds = condition.comparison in ("<=", ">=")
        regime = source.regime.when_true if holds else source.regime.when_false
        self.regimes.setdefault(source.variable, regime)
        return RegimeOutcome(
            left=evaluate(condition.left, values),
            right=evaluate(condition.right, values),
            regime=regime,
            assumed=source.variable in self.assumed,
        )

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
            Question(source.relation, unknown, values, branch, str(edge.target), place, limits)
        )
        self.values[edge.target] = solution.value
        return solution

    def _limits(self, target: Variable, unknown: Symbol, source: Instance) -> Iterator[Limit]:
        """The test of the regime in which a relation holds, and what processes ask."""
        variable = source.regime_variable
        if variable is not None and not source.relation.regime_role:
            regime = self.problem.regimes[variable].regime
            test = regime.condition
            if source.relation.regime != regime.when_true:
                test = Condition(test.left, _OPPOSITE[test.comparison], test.right)
            yield Limit(test, f"this relation holds where it is {source.relation.regime}", True)
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
        self.execute(edges)
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
        return [
            variable
            for edge in self.coupled
            if edge.target in needed and isinstance(edge.source, Instance)
            for variable in (edge.target, *(m.gives for m in edge.source.members))
            if variable is not None
        ]

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
            raise OutsideLimit(edge.source.relation.title, str(edge.target), limit.reason)


def _essential_limits(edge: Edge) -> tuple[Limit, ...]:
    if not isinstance(edge.source, Instance):
        return ()
    return tuple(limit for limit in edge.source.relation.limits if limit.essential)


def solve_problem(problem: Problem) -> Outcome:
    """Solve a problem for everything that its brief wants.

    Regimes follow from their tests where the inputs decide them. Where a regime depends on
    the answer, each is tried and kept only if its own test agrees afterwards.

    Raises:
        NotEnoughInputs: if a wanted quantity does not follow.
        AmbiguousRegime: if no regime or more than one agrees with its own test.
        SolvingError: if a step has no root, or several and no stated branch.
    """
    with working_precision():
        stated = _stated_regimes(problem)
        run = _Run(problem, stated)
        reached = run.reach()
        missing = _missing(problem, reached)
        if not missing:
            outcome = run.finish(reached)
            _require_agreement(outcome, stated)
            return outcome
        return _by_assumption(problem, run.regimes, stated, missing[0])


def _stated_regimes(problem: Problem) -> dict[Variable, str]:
    return {Variable("regime", leg.name): leg.regime for leg in problem.brief.legs if leg.regime}


def _missing(problem: Problem, reached: Reach) -> list[Variable]:
    return [w.variable for w in problem.brief.wanted if w.variable not in reached]


def _require_agreement(outcome: Outcome, stated: Mapping[Variable, str]) -> None:
    for variable, regime in stated.items():
        step = next((s for s in outcome.steps if s.edge.target == variable), None)
        if step is not None and step.regime is not None and step.regime.regime != regime:
            raise AmbiguousRegime(variable.place, (), (regime,))


def _by_assumption(
    problem: Problem,
    regimes: Mapping[Variable, str],
    stated: Mapping[Variable, str],
    missing: Variable,
) -> Outcome:
    """Try each combination of the open regimes, and keep those whose tests agree."""
    open_tests = [variable for variable in sorted(problem.regimes) if variable not in regimes]
    open_tests = open_tests[:_MOST_ASSUMED]
    choices = [
        (problem.regimes[v].regime.when_true, problem.regimes[v].regime.when_false)
        for v in open_tests
    ]
    reachable = False
    agreeing: list[Outcome] = []
    for combination in product(*choices) if open_tests else ():
        assumed = {**stated, **dict(zip(open_tests, combination, strict=True))}
        run = _Run(problem, assumed)
        reached = run.reach()
        if _missing(problem, reached):
            continue
        reachable = True
        try:
            outcome = run.finish(reached)
        except (SolvingError, OutsideDomainError):
            continue
        if all(step.regime is None or _agrees(step, assumed) for step in outcome.steps):
            agreeing.append(outcome)
    distinct = _distinct(agreeing, open_tests)
    if len(distinct) == 1:
        return distinct[0]
    if reachable:
        place = open_tests[0].place
        found = tuple(outcome.regimes[open_tests[0]] for outcome in distinct)
        raise AmbiguousRegime(place, found, choices[0])
    raise _not_enough(problem, regimes, missing)


def _agrees(step: StepOutcome, assumed: Mapping[Variable, str]) -> bool:
    regime = step.regime
    return regime is None or assumed.get(step.edge.target, regime.regime) == regime.regime


def _distinct(outcomes: list[Outcome], tests: list[Variable]) -> list[Outcome]:
    """Outcomes that differ only in a regime that no step depends on are one outcome."""
    kept: dict[tuple[str, ...], Outcome] = {}
    for outcome in outcomes:
        sources = (step.edge.source for step in outcome.steps)
        instances = (source for source in sources if isinstance(source, Instance))
        used = {variable for instance in instances for variable, _ in instance.regimes}
        key = tuple(outcome.regimes[test] if test in used else "" for test in tests)
        kept.setdefault(key, outcome)
    return list(kept.values())


def _not_enough(
    problem: Problem, regimes: Mapping[Variable, str], missing: Variable
) -> NotEnoughInputs:
    quantity = catalogue()[missing.symbol]
    against = tuple(dict.fromkeys(_against(problem, regimes, missing)))
    closing = () if against else closing_inputs(problem, regimes, missing)
    return NotEnoughInputs(
        wanted=str(missing),
        title=f"{quantity.title}, {problem.title(missing)}",
        closing=tuple(tuple(str(variable) for variable in extra) for extra in closing),
        regimes=against,
    )


def _against(problem: Problem, regimes: Mapping[Variable, str], missing: Variable) -> Iterator[str]:
    """Say which regimes stand against relations that would give a variable."""
    for instance in problem.instances:
        condition = instance.regime_variable
        if condition is None or missing not in instance.binding.values():
            continue
        found, needed = regimes.get(condition), instance.relation.regime
        offered = [
            other.relation.regime
            for other in problem.instances
            if other.regime_variable == condition and missing in other.binding.values()
        ]
        if found is not None and found not in offered:
            yield (
                f"The regime of {condition.place} is {found}, and the library gives "
                f"{missing.symbol} there only where it is {needed}."
            )
