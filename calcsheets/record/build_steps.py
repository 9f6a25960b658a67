"""The record of each step."""

from __future__ import annotations

from collections.abc import Iterable, Iterator, Mapping
from dataclasses import dataclass

from ..errors import UntabulatedIntegral
from ..expressions import Expr, Symbol
from ..planning import Instance, RegimeInstance
from ..quantities import Variable, catalogue
from ..relations import EQUAL_WITHIN
from ..solving import (
    Ball,
    Doubles,
    Halving,
    Move,
    OtherRoot,
    Outcome,
    OutsideDomainError,
    Solution,
    StepOutcome,
    Table,
    compare,
    decimal_bounds,
    evaluate,
    isolate,
    midpoint,
    size_of,
    tables_of,
)
from .build_integrals import integral_record, sum_record
from .digits import certified_digits
from .step_model import (
    AlternativeRecord,
    HalvingRecord,
    IntegralRecord,
    LimitRecord,
    MemberRecord,
    MoveRecord,
    Operand,
    RegimeCase,
    RegimeTest,
    RegimeUse,
    RootRecord,
    StepRecord,
)


@dataclass(frozen=True)
class Numbers:
    """Number of each input and step on the sheet."""

    inputs: Mapping[Variable, int]
    steps: Mapping[Variable, int]

    def __contains__(self, variable: object) -> bool:
        return variable in self.inputs or variable in self.steps


@dataclass(frozen=True)
class StepRecords:
    """Makes the record of any step of a solved problem.

    Attributes:
        outcome: the solved problem.
        doubles: what double precision leaves of each value.
        where: number of each input and step.
    """

    outcome: Outcome
    doubles: Doubles
    where: Numbers

    def step(self, step: StepOutcome) -> StepRecord:
        source = step.edge.source
        if isinstance(source, RegimeInstance):
            return self._regime_step(step, source)
        solution = step.solution
        if solution is None or step.edge.unknown is None:
            raise ValueError(f"step {step.edge.target} was not solved")
        quantity = catalogue()[step.edge.target.symbol]
        lower, upper = decimal_bounds(solution.value)
        bisection = solution.bisection
        return StepRecord(
            number=self.where.steps[step.edge.target],
            key=str(step.edge.target),
            symbol=step.edge.unknown,
            title=quantity.title,
            place=self.outcome.problem.title(step.edge.target),
            relation=source.relation.name,
            operands=self.operands(source, source.relation.symbols, step.edge.unknown),
            method=solution.method,
            moves=tuple(_move(move) for move in solution.moves),
            solved=solution.solved,
            value=midpoint(solution.value),
            unit=quantity.unit,
            lower=lower,
            upper=upper,
            certified_digits=certified_digits(lower, upper),
            double_error=self.doubles.errors[step.edge.target],
            residual=self._relative_residual(source, solution),
            limits=tuple(self._limits(source)),
            limit_operands=self._limit_operands(source),
            branch=solution.branch,
            bracket=tuple(float(end) for end in solution.bracket or ()),
            other_roots=tuple(_root(root) for root in solution.other_roots),
            halvings=tuple(_halving(row) for row in bisection.rows) if bisection else (),
            integrals=self._tables(source, solution.tables),
            start_integrals=tuple(sum_record(t) for t in bisection.start) if bisection else (),
            regimes=_uses(source),
            alternatives=tuple(self._alternatives(source, step)),
            test=None,
            combination=tuple(self._members(source)),
            dropped=self.operands(source, (s for s, v in source.dropped if v in self.where), None),
        )

    def _regime_step(self, step: StepOutcome, source: RegimeInstance) -> StepRecord:
        found = step.regime
        if found is None:
            raise ValueError(f"step {step.edge.target} was not decided")
        regime = source.regime
        return StepRecord(
            number=self.where.steps[step.edge.target],
            key=str(step.edge.target),
            symbol=Symbol("regime"),
            title=regime.title,
            place=self.outcome.problem.title(step.edge.target),
            relation=regime.name,
            operands=self.operands(source, regime.symbols, None),
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
            limit_operands=(),
            branch="",
            bracket=(),
            other_roots=(),
            halvings=(),
            integrals=(),
            start_integrals=(),
            regimes=(),
            alternatives=(),
            test=RegimeTest(
                cases=tuple(
                    RegimeCase(condition, midpoint(left), midpoint(right), outcome)
                    for (condition, outcome), (left, right) in zip(
                        regime.cases, found.sides, strict=True
                    )
                ),
                otherwise=regime.otherwise,
                equal_within=float(EQUAL_WITHIN),
                outcome=found.regime,
                assumed=found.assumed,
            ),
            combination=(),
            dropped=(),
        )

    def _tables(self, source: Instance, tables: tuple[Table, ...]) -> tuple[IntegralRecord, ...]:
        values = self._values(source, source.relation.symbols)
        errors = (self.doubles.of_table(table, source.binding) for table in tables)
        return tuple(
            integral_record(table, values, error)
            for table, error in zip(tables, errors, strict=True)
        )

    def _members(self, source: Instance) -> Iterator[MemberRecord]:
        for member in source.members:
            yield MemberRecord(
                relation=member.instance.relation.name,
                place=member.instance.place.title,
                key="" if member.gives is None else str(member.gives),
                symbol=member.symbol,
                published=member.published,
                solved=member.solved,
            )

    def operands(
        self,
        source: Instance | RegimeInstance,
        symbols: Iterable[Symbol],
        unknown: Symbol | None,
    ) -> tuple[Operand, ...]:
        """Return every known quantity among the symbols of a relation."""
        found = []
        for symbol in symbols:
            if symbol == unknown:
                continue
            found.append(self.operand(symbol, source.place.variable(symbol)))
        return tuple(found)

    def operand(self, symbol: Symbol, variable: Variable) -> Operand:
        """Return the record of a known quantity."""
        quantity = symbol.definition
        return Operand(
            symbol=symbol,
            key=str(variable),
            title=quantity.title,
            place=self.outcome.problem.title(variable),
            value=midpoint(self.outcome.values[variable]),
            unit=quantity.unit,
            input=self.where.inputs.get(variable, 0),
            step=self.where.steps.get(variable, 0),
        )

    def _relative_residual(self, source: Instance, solution: Solution) -> float:
        scale = size_of(source.relation, self._values(source, source.relation.symbols))
        return 0.0 if scale == 0 else float((abs(solution.residual) / scale).upper())

    def _values(
        self, source: Instance | RegimeInstance, symbols: Iterable[Symbol]
    ) -> dict[Symbol, Ball]:
        bound = source.place.variables(symbols)
        values = self.outcome.values
        return {symbol: values[v] for symbol, v in bound.items() if v in self.where}

    def _limit_operands(self, source: Instance) -> tuple[Operand, ...]:
        """What the limits name, the relation does not, and the sheet nevertheless holds."""
        named = (s for limit in source.relation.limits for s in limit.condition.symbols)
        further = [
            symbol
            for symbol in dict.fromkeys(named)
            if symbol not in source.relation.symbols and source.place.variable(symbol) in self.where
        ]
        return self.operands(source, further, None)

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

    def _alternatives(self, source: Instance, step: StepOutcome) -> Iterator[AlternativeRecord]:
        """The same quantity in the other regimes, where everything that it needs is there."""
        for other in self.outcome.problem.instances:
            if (
                source.members
                or (other.place is not source.place and other.place.name != source.place.name)
                or not self._excludes(other, source)
            ):
                continue
            unknown = next((s for s, v in other.binding.items() if v == step.edge.target), None)
            if unknown is None:
                continue
            others = [v for v in other.binding.values() if v != step.edge.target]
            isolation = isolate(other.relation.published, unknown)
            if isolation is not None and all(v in self.where for v in others):
                integrals = self._integrals_of(other, isolation.solved)
                if integrals is None:
                    continue
                yield AlternativeRecord(
                    _uses(other),
                    other.relation.name,
                    isolation.solved,
                    self.operands(other, other.relation.symbols, unknown),
                    integrals,
                )

    def _excludes(self, other: Instance, source: Instance) -> bool:
        """Whether a relation holds only in other regimes, all of which the sheet tests."""
        own = dict(source.regimes)
        differs = any(
            not set(own.get(v, outcomes)) & set(outcomes) for v, outcomes in other.regimes
        )
        return differs and all(v in self.where for v, _ in other.regimes)

    def _integrals_of(self, source: Instance, solved: Expr) -> tuple[IntegralRecord, ...] | None:
        """The integrals of another solved form; ``None`` if one has no value as things are."""
        values = self._values(source, source.relation.symbols)
        try:
            return self._tables(source, tables_of(solved, values))
        except (UntabulatedIntegral, OutsideDomainError):
            return None


def _uses(source: Instance) -> tuple[RegimeUse, ...]:
    return tuple(RegimeUse(str(variable), outcomes) for variable, outcomes in source.regimes)


def _move(move: Move) -> MoveRecord:
    return MoveRecord(move.action, move.operand, move.result)


def _halving(row: Halving) -> HalvingRecord:
    return HalvingRecord(row.low, row.high, row.residual, tuple(map(sum_record, row.tables)))


def _root(root: OtherRoot) -> RootRecord:
    return RootRecord(midpoint(root.value), root.reason)
