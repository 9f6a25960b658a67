"""The record: the frozen outcome of a calculation, and all that any renderer needs.

Numbers are doubles in coherent SI unless a field says otherwise; texts are as typed.
"""

from __future__ import annotations

from dataclasses import dataclass

from ..expressions import Condition, Equation, Symbol
from .context import (
    AssumptionRecord,
    FieldRecord,
    LegRecord,
    ReferenceRecord,
    StationRecord,
)
from .course_model import CourseRecord
from .route_model import RouteRecord
from .step_model import StepRecord

SCHEMA = "calcsheets-record/1"


@dataclass(frozen=True)
class SourceRecord:
    """Where something is published, and how we know."""

    document: str
    edition: str
    clause: str
    known: str

    def __str__(self) -> str:
        text = ", ".join(part for part in (self.document, self.edition, self.clause) if part)
        return (
            f"{text} (from memory: confirm in the source)" if self.known == "from memory" else text
        )


@dataclass(frozen=True)
class InputRecord:
    """One input.

    Attributes:
        number: number on the sheet, from 1.
        key: variable, such as ``p_0g@receiver``.
        symbol: the quantity.
        title: the quantity in words.
        place: the place in words.
        typed: the text as typed.
        number_typed: the decimal as typed.
        unit_typed: the unit as understood, by its name in the unit list.
        factor: exact coherent SI value of one such unit, as a fraction.
        offset: exact coherent SI value of the unit's zero, as a fraction.
        pi_power: power of π that the factor is multiplied with.
        value: value in coherent SI.
        unit: coherent SI unit.
        low: physical lower bound in coherent SI.
        high: physical upper bound in coherent SI.
        source: document, revision and page; empty if none was stated.
        tolerance: as typed, empty for none.
        status: as stated, empty for none.
    """

    number: int
    key: str
    symbol: Symbol
    title: str
    place: str
    typed: str
    number_typed: str
    unit_typed: str
    factor: str
    offset: str
    pi_power: int
    value: float
    unit: str
    low: float
    high: float
    source: str
    tolerance: str
    status: str


@dataclass(frozen=True)
class CriterionRecord:
    """One side of a criterion.

    Attributes:
        comparison: ``<=`` or ``>=``.
        typed: the limit as typed.
        limit: the limit in the unit of the result.
        holds: whether the unrounded result meets it.
        holds_rounded: whether the result as printed meets it.
    """

    comparison: str
    typed: str
    limit: float
    holds: bool
    holds_rounded: bool


@dataclass(frozen=True)
class ResultRecord:
    """One wanted result.

    Attributes:
        number: number on the sheet, from 1.
        key: variable.
        symbol: quantity.
        title: result in words.
        place: place in words.
        value: value in ``unit``; ``None`` for a state in words.
        state: the state in words, empty for a number.
        unit: unit in which it was wanted, empty for a state.
        factor: exact coherent SI value of one such unit, as a fraction.
        offset: exact coherent SI value of the unit's zero, as a fraction.
        pi_power: power of π in the factor.
        digits: significant digits to print.
        step: number of the step that gives it, 0 if it is an input.
        input: number of the input that it is, 0 if it is a step.
        criteria: criterion, empty for none.
        used_as: ``minimum``, ``maximum``, ``best estimate`` or empty.
        otherwise: what a missed criterion means, ``fail`` or ``caution``.
        within_limits: whether every step behind it is within the limits of its relation.
        double_error: bound on the absolute error of ``value`` in a workbook.
    """

    number: int
    key: str
    symbol: Symbol
    title: str
    place: str
    value: float | None
    state: str
    unit: str
    factor: str
    offset: str
    pi_power: int
    digits: int
    step: int
    input: int
    criteria: tuple[CriterionRecord, ...]
    used_as: str
    otherwise: str
    within_limits: bool
    double_error: float

    @property
    def verdict(self) -> str:
        """``met``, ``not met``, ``caution``, or empty where there is no criterion."""
        if not self.criteria:
            return ""
        if all(criterion.holds for criterion in self.criteria):
            return "met"
        return "caution" if self.otherwise == "caution" else "not met"


@dataclass(frozen=True)
class ConsistencyRecord:
    """A relation that was not needed, evaluated as a check.

    Attributes:
        relation: name of the relation.
        place: place in words.
        keys: variables in it.
        difference: relative difference of its sides.
    """

    relation: str
    place: str
    keys: tuple[str, ...]
    difference: float


@dataclass(frozen=True)
class RelationRecord:
    """A relation or regime test that the calculation used.

    Attributes:
        name: identifier.
        title: in words.
        chapter: chapter of the library.
        published: the equation as published; of a regime test the condition of its first case,
            of which ``RegimeTest`` has all.
        source: where it is published.
        assumptions: what must be true.
        cautions: where someone can get hurt.
        errs: in which direction it errs.
    """

    name: str
    title: str
    chapter: str
    published: Equation | Condition
    source: SourceRecord
    assumptions: tuple[str, ...]
    cautions: tuple[str, ...]
    errs: str


@dataclass(frozen=True)
class Record:
    """Everything that a calculation came to.

    Attributes:
        schema: format of the record.
        program: name and version of the program.
        library: SHA-256 of the relations of the library.
        brief: SHA-256 of the brief's text.
        identity: fields of the cover block.
        gas: the gas in words.
        stations: stations of the path.
        legs: processes of the path.
        inputs: every input that the calculation used.
        steps: every step, each after those that it needs.
        results: every wanted result.
        courses: how processes run from their start to their end.
        routes: another route to each result that is a number and no input.
        checks: relations that were not needed, evaluated.
        relations: relations and tests used, by name.
        assumptions: of the brief.
        references: of the brief.
        cautions: of the brief, the gas and the relations.
        unused: keys of inputs that nothing needed.
        changed: keys of inputs that were changed after the brief was read.
    """

    schema: str
    program: str
    library: str
    brief: str
    identity: tuple[FieldRecord, ...]
    gas: str
    stations: tuple[StationRecord, ...]
    legs: tuple[LegRecord, ...]
    inputs: tuple[InputRecord, ...]
    steps: tuple[StepRecord, ...]
    results: tuple[ResultRecord, ...]
    courses: tuple[CourseRecord, ...]
    routes: tuple[RouteRecord, ...]
    checks: tuple[ConsistencyRecord, ...]
    relations: tuple[RelationRecord, ...]
    assumptions: tuple[AssumptionRecord, ...]
    references: tuple[ReferenceRecord, ...]
    cautions: tuple[str, ...]
    unused: tuple[str, ...]
    changed: tuple[str, ...]

    def field(self, name: str) -> str:
        """Return a field of the cover block, empty if it is not stated."""
        return next((item.text for item in self.identity if item.name == name), "")

    def relation(self, name: str) -> RelationRecord:
        """Return a relation that the calculation used."""
        return next(relation for relation in self.relations if relation.name == name)

    @property
    def holds(self) -> tuple[AssumptionRecord, ...]:
        """Assumptions that are still to be confirmed."""
        return tuple(item for item in self.assumptions if item.status == "to be confirmed")

    @property
    def open_inputs(self) -> tuple[InputRecord, ...]:
        """Inputs that lack a source or are not verified."""
        return tuple(item for item in self.inputs if not item.source or item.status != "verified")

    @property
    def all_met(self) -> bool:
        """Whether no criterion failed and no step left the limits of its relation."""
        return all(r.verdict != "not met" for r in self.results) and all(
            step.within_limits for step in self.steps
        )

    @property
    def digest(self) -> str:
        """SHA-256 of the canonical form: what people sign."""
        from .canonical import digest_of

        return digest_of(self)

    def value(self, key: str) -> object:
        """Return a result, input or step as a quantity of the pint library.

        Args:
            key: such as ``mdot@orifice``.

        Returns:
            The quantity, in the wanted unit for a result, else in coherent SI.
        """
        from .access import quantity_of

        return quantity_of(self, key)
