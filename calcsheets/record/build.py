"""The record of a solved problem."""

from __future__ import annotations

import hashlib
from collections.abc import Iterable, Iterator, Mapping
from dataclasses import dataclass
from decimal import ROUND_HALF_EVEN, Context, Decimal
from fractions import Fraction
from importlib.metadata import PackageNotFoundError, version

from ..brief import Brief, Given, Wanted
from ..expressions import Symbol, decimal_text
from ..planning import Instance, Problem, RegimeInstance
from ..quantities import Unit, Variable, catalogue
from ..relations import Regime, Relation, Source
from ..solving import (
    Ball,
    Move,
    OtherRoot,
    Outcome,
    Solution,
    StepOutcome,
    compare,
    decimal_bounds,
    double_errors,
    evaluate,
    exact_ball,
    isolate,
    midpoint,
    size_of,
    working_precision,
)
from .checks import consistency_checks
from .context import (
    AssumptionRecord,
    FieldRecord,
    LegRecord,
    ReferenceRecord,
    StationRecord,
)
from .model import (
    SCHEMA,
    AlternativeRecord,
    CriterionRecord,
    HalvingRecord,
    InputRecord,
    LimitRecord,
    MoveRecord,
    Operand,
    Record,
    RegimeTest,
    RelationRecord,
    ResultRecord,
    RootRecord,
    SourceRecord,
    StepRecord,
)
from .ranges import property_cautions, range_cautions

_MOST_DIGITS = 15


def build_record(outcome: Outcome, library_digest: str, changed: tuple[str, ...] = ()) -> Record:
    """Return the record of a solved problem.

    Args:
        outcome: the solved problem.
        library_digest: digest of the library that was used.
        changed: keys of inputs that were changed after the brief was read.

    Raises:
        ContradictoryInputs: if a relation that was not needed disagrees with the values.
    """
    errors = double_errors(outcome)
    with working_precision():
        return _Builder(outcome, errors).record(library_digest, changed)


def program_name() -> str:
    """Return the name and version of the program."""
    try:
        return f"calcsheets {version('calcsheets')}"
    except PackageNotFoundError:
        return "calcsheets (not installed)"


@dataclass(frozen=True)
class _Builder:
    outcome: Outcome
    double_errors: Mapping[Variable, float]

    @property
    def problem(self) -> Problem:
        return self.outcome.problem

    @property
    def brief(self) -> Brief:
        return self.problem.brief

    def record(self, library_digest: str, changed: tuple[str, ...]) -> Record:
        used = self._used_variables()
        givens = [given for given in self.brief.given if given.variable in used]
        inputs = {given.variable: number for number, given in enumerate(givens, start=1)}
        steps = {
            step.edge.target: number for number, step in enumerate(self.outcome.steps, start=1)
        }
        where = _Numbers(inputs, steps)
        step_records = tuple(self._step(step, where) for step in self.outcome.steps)
        relations = tuple(self._relations())
        return Record(
            schema=SCHEMA,
            program=program_name(),
            library=library_digest,
            brief=hashlib.sha256(self.brief.text.encode()).hexdigest(),
            identity=tuple(FieldRecord(*item) for item in self.brief.identity.items()),
            gas=self.brief.gas.title,
            stations=tuple(StationRecord(s.name, s.kind, s.title) for s in self.brief.stations),
            legs=tuple(
                LegRecord(leg.name, leg.start, leg.end, leg.process, leg.through, leg.title)
                for leg in self.brief.legs
            ),
            inputs=tuple(self._input(given, inputs[given.variable]) for given in givens),
            steps=step_records,
            results=tuple(
                self._result(wanted, number, where, step_records)
                for number, wanted in enumerate(self.brief.wanted, start=1)
            ),
            checks=tuple(consistency_checks(self.outcome)),
            relations=relations,
            assumptions=tuple(
                AssumptionRecord(a.text, a.status, a.basis, a.owner, a.due)
                for a in self.brief.assumptions
            ),
            references=tuple(
                ReferenceRecord(r.id, r.title, r.edition) for r in self.brief.references
            ),
            cautions=tuple(
                dict.fromkeys(
                    (
                        *self.brief.cautions,
                        *property_cautions(self.outcome),
                        *range_cautions(self.outcome),
                        *(_sentence(caution) for caution in self.brief.gas.cautions),
                        *(caution for relation in relations for caution in relation.cautions),
                    )
                )
            ),
            unused=tuple(str(g.variable) for g in self.brief.given if g.variable not in used),
            changed=changed,
        )

    def _used_variables(self) -> set[Variable]:
        used = {item.variable for item in self.brief.wanted}
        for step in self.outcome.steps:
            used.update(step.edge.inputs)
            used.update(variable for variable in self._limit_variables(step))
        return used

    def _limit_variables(self, step: StepOutcome) -> Iterator[Variable]:
        source = step.edge.source
        if isinstance(source, Instance):
            for limit in source.relation.limits:
                yield from (source.place.variable(symbol) for symbol in limit.condition.symbols)

    def _input(self, given: Given, number: int) -> InputRecord:
        quantity = catalogue()[given.variable.symbol]
        unit = given.measured.unit
        return InputRecord(
            number=number,
            key=str(given.variable),
            symbol=Symbol(quantity.symbol),
            title=quantity.title,
            place=self.problem.title(given.variable),
            typed=given.measured.text,
            number_typed=str(given.measured.number),
            unit_typed=unit.name,
            factor=_fraction_text(unit.factor),
            offset=_fraction_text(unit.offset),
            pi_power=unit.pi_power,
            value=midpoint(self.outcome.values[given.variable]),
            unit=quantity.unit,
            low=float(quantity.low),
            high=float(quantity.high),
            source=given.source,
            tolerance=given.tolerance,
            status=given.status,
        )

    def _step(self, step: StepOutcome, where: _Numbers) -> StepRecord:
        source = step.edge.source
        if isinstance(source, RegimeInstance):
            return self._regime_step(step, source, where)
        solution = step.solution
        if solution is None or step.edge.unknown is None:
            raise ValueError(f"step {step.edge.target} was not solved")
        quantity = catalogue()[step.edge.target.symbol]
        lower, upper = decimal_bounds(solution.value)
        condition = source.regime_variable
        return StepRecord(
            number=where.steps[step.edge.target],
            key=str(step.edge.target),
            symbol=step.edge.unknown,
            title=quantity.title,
            place=self.problem.title(step.edge.target),
            relation=source.relation.name,
            operands=self._operands(source, source.relation.symbols, step.edge.unknown, where),
            method=solution.method,
            moves=tuple(_move(move) for move in solution.moves),
            solved=solution.solved,
            value=midpoint(solution.value),
            unit=quantity.unit,
            lower=lower,
            upper=upper,
            certified_digits=certified_digits(lower, upper),
            double_error=self.double_errors[step.edge.target],
            residual=self._relative_residual(source, solution),
            limits=tuple(self._limits(source)),
            branch=solution.branch,
            bracket=tuple(float(end) for end in solution.bracket or ()),
            other_roots=tuple(_root(root) for root in solution.other_roots),
            halvings=tuple(HalvingRecord(h.low, h.high, h.residual) for h in solution.halvings),
            regime_key="" if condition is None else str(condition),
            regime=source.relation.regime,
            alternatives=tuple(self._alternatives(source, step, where)),
            test=None,
        )

    def _regime_step(
        self, step: StepOutcome, source: RegimeInstance, where: _Numbers
    ) -> StepRecord:
        found = step.regime
        if found is None:
            raise ValueError(f"step {step.edge.target} was not decided")
        regime = source.regime
        return StepRecord(
            number=where.steps[step.edge.target],
            key=str(step.edge.target),
            symbol=Symbol("regime"),
            title=regime.title,
            place=self.problem.title(step.edge.target),
            relation=regime.name,
            operands=self._operands(source, regime.symbols, None, where),
            method="regime",
            moves=(),
            solved=None,
            value=None,
            unit="",
            lower="",
            upper="",
            certified_digits=0,
            double_error=0.0,
            residual=0.0,
            limits=(),
            branch="",
            bracket=(),
            other_roots=(),
            halvings=(),
            regime_key="",
            regime="",
            alternatives=(),
            test=RegimeTest(
                condition=regime.condition,
                left=midpoint(found.left),
                right=midpoint(found.right),
                when_true=regime.when_true,
                when_false=regime.when_false,
                outcome=found.regime,
                assumed=found.assumed,
            ),
        )

    def _operands(
        self,
        source: Instance | RegimeInstance,
        symbols: Iterable[Symbol],
        unknown: Symbol | None,
        where: _Numbers,
    ) -> tuple[Operand, ...]:
        found = []
        for symbol in symbols:
            if symbol == unknown:
                continue
            variable = source.place.variable(symbol)
            quantity = symbol.definition
            found.append(
                Operand(
                    symbol=symbol,
                    key=str(variable),
                    title=quantity.title,
                    place=self.problem.title(variable),
                    value=midpoint(self.outcome.values[variable]),
                    unit=quantity.unit,
                    input=where.inputs.get(variable, 0),
                    step=where.steps.get(variable, 0),
                )
            )
        return tuple(found)

    def _relative_residual(self, source: Instance, solution: Solution) -> float:
        scale = size_of(source.relation, self._values(source, source.relation.symbols))
        return 0.0 if scale == 0 else float((abs(solution.residual) / scale).upper())

    def _values(
        self, source: Instance | RegimeInstance, symbols: Iterable[Symbol]
    ) -> dict[Symbol, Ball]:
        bound = {symbol: source.place.variable(symbol) for symbol in symbols}
        values = self.outcome.values
        return {symbol: values[v] for symbol, v in bound.items() if v in values}

    def _limits(self, source: Instance) -> Iterator[LimitRecord]:
        for limit in source.relation.limits:
            condition = limit.condition
            values = self._values(source, condition.symbols)
            if set(values) < set(condition.symbols):
                yield LimitRecord(condition, limit.reason, None, None, None)
                continue
            yield LimitRecord(
                condition,
                limit.reason,
                midpoint(evaluate(condition.left, values)),
                midpoint(evaluate(condition.right, values)),
                compare(condition, values) is not False,
            )

    def _alternatives(
        self, source: Instance, step: StepOutcome, where: _Numbers
    ) -> Iterator[AlternativeRecord]:
        """The same quantity in the other regimes, where everything that it needs is there."""
        for other in self.problem.instances:
            if (
                (other.place is not source.place and other.place.name != source.place.name)
                or other.regime_variable != source.regime_variable
                or other.relation.regime in ("", source.relation.regime)
            ):
                continue
            unknown = next((s for s, v in other.binding.items() if v == step.edge.target), None)
            if unknown is None:
                continue
            others = [v for v in other.binding.values() if v != step.edge.target]
            isolation = isolate(other.relation.published, unknown)
            if isolation is not None and all(v in where for v in others):
                operands = self._operands(other, other.relation.symbols, unknown, where)
                yield AlternativeRecord(
                    other.relation.regime, other.relation.name, isolation.solved, operands
                )

    def _result(
        self, wanted: Wanted, number: int, where: _Numbers, steps: tuple[StepRecord, ...]
    ) -> ResultRecord:
        quantity = catalogue()[wanted.variable.symbol]
        state = self.outcome.regimes.get(wanted.variable, "")
        unit = wanted.unit
        value = None if unit is None else _in_unit(self.outcome.values[wanted.variable], unit)
        return ResultRecord(
            number=number,
            key=str(wanted.variable),
            symbol=Symbol(quantity.symbol),
            title=wanted.title or quantity.title,
            place=self.problem.title(wanted.variable),
            value=None if value is None else midpoint(value),
            state=state,
            unit=unit.name if unit else "",
            factor=_fraction_text(unit.factor) if unit else "1",
            offset=_fraction_text(unit.offset) if unit else "0",
            pi_power=unit.pi_power if unit else 0,
            digits=wanted.digits,
            step=where.steps.get(wanted.variable, 0),
            input=where.inputs.get(wanted.variable, 0),
            criteria=tuple(self._criteria(wanted, value)),
            used_as=wanted.used_as,
            otherwise=wanted.otherwise,
            within_limits=self._within_limits(wanted.variable, where, steps),
            double_error=self._error_in_unit(wanted),
        )

    def _error_in_unit(self, wanted: Wanted) -> float:
        error = self.double_errors.get(wanted.variable, 0.0)
        return 0.0 if wanted.unit is None else error / float(wanted.unit.factor)

    def _criteria(self, wanted: Wanted, value: Ball | None) -> Iterator[CriterionRecord]:
        unit = wanted.unit
        if unit is None or value is None:
            return
        rounded = _rounded(midpoint(value), wanted.digits)
        for limit in wanted.limits:
            stated = limit.measured
            bound = _in_unit(exact_ball(stated.rational, stated.unit.pi_power), unit)
            at_most = limit.comparison == "<="
            yield CriterionRecord(
                comparison=limit.comparison,
                typed=stated.text,
                limit=midpoint(bound),
                holds=not (value > bound if at_most else value < bound),
                holds_rounded=not (
                    exact_ball(rounded) > bound if at_most else exact_ball(rounded) < bound
                ),
            )

    def _within_limits(
        self, variable: Variable, where: _Numbers, steps: tuple[StepRecord, ...]
    ) -> bool:
        """Whether every step behind a variable is within the limits of its relation."""
        edges = {step.edge.target: step.edge for step in self.outcome.steps}
        open_ends, seen = [variable], {variable}
        while open_ends:
            current = open_ends.pop()
            if current not in edges:
                continue
            if not steps[where.steps[current] - 1].within_limits:
                return False
            new = [item for item in edges[current].inputs if item not in seen]
            seen.update(new)
            open_ends += new
        return True

    def _relations(self) -> Iterator[RelationRecord]:
        """Every relation and test used, once, in the order of the steps."""
        found: dict[str, Relation | Regime] = {}
        for step in self.outcome.steps:
            source = step.edge.source
            item = source.relation if isinstance(source, Instance) else source.regime
            found.setdefault(item.name, item)
        for other in self.problem.instances:
            regime = other.regime_variable
            if regime is not None and regime in self.outcome.regimes:
                found.setdefault(other.relation.name, other.relation)
        for item in found.values():
            yield _relation(item)


@dataclass(frozen=True)
class _Numbers:
    """Number of each input and step on the sheet."""

    inputs: Mapping[Variable, int]
    steps: Mapping[Variable, int]

    def __contains__(self, variable: object) -> bool:
        return variable in self.inputs or variable in self.steps


def _relation(item: Relation | Regime) -> RelationRecord:
    published = item.published if isinstance(item, Relation) else item.condition
    return RelationRecord(
        name=item.name,
        title=item.title,
        chapter=item.chapter,
        published=published,
        source=_source(item.source),
        assumptions=item.assumptions if isinstance(item, Relation) else (),
        cautions=item.cautions,
        errs=item.errs if isinstance(item, Relation) else "",
    )


def _source(source: Source) -> SourceRecord:
    return SourceRecord(source.document, source.edition, source.clause, source.known)


def _move(move: Move) -> MoveRecord:
    return MoveRecord(move.action, move.operand, move.result)


def _root(root: OtherRoot) -> RootRecord:
    return RootRecord(midpoint(root.value), root.reason)


def _in_unit(value: Ball, unit: Unit) -> Ball:
    return (value - exact_ball(unit.offset)) / exact_ball(unit.factor, unit.pi_power)


def _fraction_text(value: Fraction) -> str:
    return decimal_text(value)


def _rounded(value: float, digits: int) -> Fraction:
    context = Context(prec=digits, rounding=ROUND_HALF_EVEN)
    return Fraction(context.create_decimal(Decimal(value)))


def certified_digits(lower: str, upper: str) -> int:
    """Return to how many significant digits two bounds agree when rounded, at most 15."""
    for digits in range(_MOST_DIGITS, 0, -1):
        context = Context(prec=digits, rounding=ROUND_HALF_EVEN)
        if context.create_decimal(lower) == context.create_decimal(upper):
            return digits
    return 0


def _sentence(text: str) -> str:
    """A caution of the gas data as a sentence."""
    return text[:1].upper() + text[1:] + ("" if text.endswith(".") else ".")
