"""A whole problem solved: regimes and roots that nothing decides beforehand are tried.

An attempt is kept only if it is consistent to its end: every step has a value within the limits
that mean something, every regime that was assumed is confirmed by its own test, and no relation
that was not needed contradicts the values. One consistent attempt is the answer; several are a
question to whoever asked.
"""

from __future__ import annotations

from collections.abc import Iterator, Mapping
from dataclasses import dataclass
from itertools import product

from ..errors import (
    AmbiguousRegime,
    NotEnoughInputs,
    SeveralRoots,
    SolvingError,
)
from ..planning import Instance, Problem, closing_inputs
from ..quantities import Variable, catalogue
from .balls import OutsideDomainError, working_precision
from .consistency import is_consistent
from .refusals import quantity_text
from .run import Effort, Outcome, Run, StepOutcome, missing_in

_MOST_ASSUMED = 4
_MOST_CHOICES = 4


class _Unreachable(Exception):
    """The wanted quantities do not follow with the regimes of an attempt."""

    def __init__(self, regimes: Mapping[Variable, str], missing: Variable) -> None:
        super().__init__()
        self.regimes = regimes
        self.missing = missing


@dataclass(frozen=True)
class _Fork:
    """A question which of several roots is meant, with what follows from each.

    Attributes:
        question: the question.
        options: the consistent result of each root; ``None`` for none.
    """

    question: SeveralRoots
    options: tuple[Outcome | _Fork | None, ...]

    def settled(self) -> Outcome | SeveralRoots:
        """The only consistent outcome, or the question that stays open."""
        left = [option for option in self.options if option is not None]
        if len(left) != 1:
            return self.question
        (only,) = left
        return only if isinstance(only, Outcome) else only.settled()


def solve_problem(problem: Problem) -> Outcome:
    """Solve a problem for everything that its brief wants.

    Regimes follow from their tests where the inputs decide them. Where a regime depends on
    the answer, each is tried and kept only if its own test agrees afterwards. Where a relation
    has several roots and no branch is stated, each is tried, and kept only if the whole
    calculation is consistent with it.

    Raises:
        NotEnoughInputs: if a wanted quantity does not follow.
        AmbiguousRegime: if no regime or more than one agrees with its own test.
        SolvingError: if a step has no root, or several consistent ones and no stated branch.
    """
    with working_precision():
        stated = _stated_regimes(problem)
        for effort in Effort:
            try:
                return _as_stated(problem, stated, effort)
            except _Unreachable as unreachable:
                left = unreachable
            if effort is Effort.STEPS:
                continue
            try:
                return _by_assumption(problem, left, stated, effort)
            except _Unreachable:
                continue
        raise _not_enough(problem, left.regimes, left.missing)


def _as_stated(problem: Problem, stated: Mapping[Variable, str], effort: Effort) -> Outcome:
    """Solve with nothing taken for granted but the regimes that the brief states."""
    result = _attempt(problem, stated, {}, effort, explain=True)
    settled = result.settled() if isinstance(result, _Fork) else result
    if isinstance(settled, SeveralRoots):
        raise settled
    _require_agreement(settled, stated)
    return settled


def _attempt(
    problem: Problem,
    assumed: Mapping[Variable, str],
    choices: Mapping[str, int],
    effort: Effort,
    explain: bool = False,
) -> Outcome | _Fork:
    """Solve with regimes and roots taken for granted; fork where a root is not decided."""
    run = Run(problem, assumed, choices, effort, explain)
    try:
        reached = run.reach()
        missing = missing_in(problem, reached)
        if missing:
            raise _Unreachable(run.regimes, missing[0])
        return run.finish(reached)
    except SeveralRoots as question:
        if len(choices) == _MOST_CHOICES or question.unknown in choices:
            raise
        taken = ({**choices, question.unknown: i} for i in range(len(question.roots)))
        options = (_option(problem, assumed, choice, effort) for choice in taken)
        return _Fork(question, tuple(options))


def _option(
    problem: Problem,
    assumed: Mapping[Variable, str],
    choices: Mapping[str, int],
    effort: Effort,
) -> Outcome | _Fork | None:
    """What follows from one root; ``None`` if that is not consistent."""
    try:
        result = _attempt(problem, assumed, choices, effort)
    except (SolvingError, OutsideDomainError, _Unreachable):
        return None
    if isinstance(result, _Fork):
        return result if any(option is not None for option in result.options) else None
    agrees = all(_agrees(step, assumed) for step in result.steps)
    return result if agrees and is_consistent(result) else None


def _by_assumption(
    problem: Problem,
    unreachable: _Unreachable,
    stated: Mapping[Variable, str],
    effort: Effort,
) -> Outcome:
    """Try each combination of the open regimes, and keep those whose tests agree."""
    regimes = unreachable.regimes
    tests = [variable for variable in sorted(problem.regimes) if variable not in regimes]
    tests = tests[:_MOST_ASSUMED]
    choices = [problem.regimes[test].regime.outcomes for test in tests]
    reachable = False
    agreeing: list[Outcome] = []
    questions: list[SeveralRoots] = []
    for combination in product(*choices) if tests else ():
        assumed = {**stated, **dict(zip(tests, combination, strict=True))}
        try:
            result: Outcome | _Fork | SeveralRoots = _attempt(problem, assumed, {}, effort)
        except _Unreachable:
            continue
        except (SolvingError, OutsideDomainError):
            reachable = True
            continue
        reachable = True
        if isinstance(result, _Fork):
            if all(option is None for option in result.options):
                continue
            result = result.settled()
        if isinstance(result, SeveralRoots):
            questions.append(result)
        elif all(_agrees(step, assumed) for step in result.steps):
            agreeing.append(result)
    distinct = _distinct(agreeing, tests)
    if len(distinct) == 1 and not questions:
        return distinct[0]
    if questions:
        raise questions[0]
    if reachable:
        raise _ambiguous(problem, tests, distinct)
    raise unreachable


def _ambiguous(problem: Problem, tests: list[Variable], found: list[Outcome]) -> AmbiguousRegime:
    """The question which regime is meant, with the answers in each that agrees with itself."""
    apart = [test for test in tests if len({outcome.regimes[test] for outcome in found}) > 1]
    test = (*apart, *tests)[0]
    agreeing: dict[str, str] = {}
    for outcome in found:
        answers = (
            f"{variable} = " + quantity_text(catalogue()[variable.symbol], outcome.values[variable])
            for variable in (wanted.variable for wanted in problem.brief.wanted)
            if variable in outcome.values
        )
        agreeing.setdefault(outcome.regimes[test], ", ".join(answers))
    shown = tuple(agreeing.values()) if all(agreeing.values()) else ()
    tried = problem.regimes[test].regime.outcomes
    return AmbiguousRegime(test.place, tuple(agreeing), tried, shown)


def _stated_regimes(problem: Problem) -> dict[Variable, str]:
    return {Variable("regime", leg.name): leg.regime for leg in problem.brief.legs if leg.regime}


def _require_agreement(outcome: Outcome, stated: Mapping[Variable, str]) -> None:
    for variable, regime in stated.items():
        step = next((s for s in outcome.steps if s.edge.target == variable), None)
        if step is not None and step.regime is not None and step.regime.regime != regime:
            raise AmbiguousRegime(variable.place, (), (regime,))


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
        if missing not in instance.binding.values():
            continue
        for condition, outcomes in instance.regimes:
            found = regimes.get(condition)
            offered = {
                outcome
                for other in problem.instances
                if missing in other.binding.values()
                for regime, others in other.regimes
                if regime == condition
                for outcome in others
            }
            if found is not None and found not in offered:
                yield (
                    f"The regime of {condition.place} is {found}, and the library gives "
                    f"{missing.symbol} there only where it is {' or '.join(outcomes)}."
                )
