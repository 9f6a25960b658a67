"""The record of a solved problem."""

from __future__ import annotations

import hashlib
from collections.abc import Iterator
from dataclasses import dataclass
from importlib.metadata import PackageNotFoundError, version

from ..brief import Brief, Given
from ..expressions import Symbol, decimal_text
from ..planning import Instance, Problem
from ..quantities import Variable, catalogue
from ..relations import Regime, Relation, Source
from ..solving import (
    Doubles,
    Outcome,
    RouteOutcome,
    StepOutcome,
    in_doubles,
    midpoint,
    other_routes,
    working_precision,
)
from .build_courses import CourseRecords, used_courses
from .build_results import ResultRecords
from .build_routes import route_records, route_relations
from .build_steps import Numbers, StepRecords
from .checks import consistency_checks
from .context import (
    AssumptionRecord,
    FieldRecord,
    LegRecord,
    ReferenceRecord,
    StationRecord,
)
from .model import SCHEMA, InputRecord, Record, RelationRecord, SourceRecord
from .ranges import property_cautions, range_cautions


def build_record(outcome: Outcome, library_digest: str, changed: tuple[str, ...] = ()) -> Record:
    """Return the record of a solved problem.

    Args:
        outcome: the solved problem.
        library_digest: digest of the library that was used.
        changed: keys of inputs that were changed after the brief was read.

    Raises:
        ContradictoryInputs: if a relation that was not needed disagrees with the values.
    """
    doubles = in_doubles(outcome)
    routes = other_routes(outcome)
    with working_precision():
        return _Builder(outcome, doubles, routes).record(library_digest, changed)


def program_name() -> str:
    """Return the name and version of the program."""
    try:
        return f"calcsheets {version('calcsheets')}"
    except PackageNotFoundError:
        return "calcsheets (not installed)"


@dataclass(frozen=True)
class _Builder:
    outcome: Outcome
    doubles: Doubles
    routes: tuple[RouteOutcome, ...]

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
        where = Numbers(inputs, steps)
        step_records = StepRecords(self.outcome, self.doubles, where)
        made = tuple(step_records.step(step) for step in self.outcome.steps)
        results = ResultRecords(self.outcome, self.doubles, where, made)
        wanted = enumerate(self.brief.wanted, start=1)
        result_records = tuple(results.result(item, number) for number, item in wanted)
        relations = tuple(self._relations())
        courses = CourseRecords(self.outcome, self.doubles, step_records.operand)
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
            steps=made,
            results=result_records,
            courses=tuple(courses.courses()),
            routes=route_records(self.outcome, self.routes, where, result_records),
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
        for course in used_courses(self.outcome):
            used.update(course.binding.values())
        for route in self.routes:
            used.update(variable for step in route.steps for variable in step.edge.inputs)
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
            factor=decimal_text(unit.factor),
            offset=decimal_text(unit.offset),
            pi_power=unit.pi_power,
            value=midpoint(self.outcome.values[given.variable]),
            unit=quantity.unit,
            low=float(quantity.low),
            high=float(quantity.high),
            source=given.source,
            tolerance=given.tolerance,
            status=given.status,
        )

    def _relations(self) -> Iterator[RelationRecord]:
        """Every relation and test used, once, in the order of the steps."""
        found: dict[str, Relation | Regime] = {}
        for step in self.outcome.steps:
            source = step.edge.source
            item = source.relation if isinstance(source, Instance) else source.regime
            found.setdefault(item.name, item)
            members = source.members if isinstance(source, Instance) else ()
            for relation in (member.instance.relation for member in members):
                found.setdefault(relation.name, relation)
        for other in self.problem.instances:
            if any(regime in self.outcome.regimes for regime, _ in other.regimes):
                found.setdefault(other.relation.name, other.relation)
        for relation in route_relations(self.routes):
            found.setdefault(relation.name, relation)
        for item in found.values():
            yield _relation(item)


def _relation(item: Relation | Regime) -> RelationRecord:
    published = item.published if isinstance(item, Relation) else item.conditions[0]
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


def _sentence(text: str) -> str:
    """A caution of the gas data as a sentence."""
    return text[:1].upper() + text[1:] + ("" if text.endswith(".") else ".")
