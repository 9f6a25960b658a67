"""What the sheet prints before and after the calculation."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass

from markupsafe import Markup

from ...record import ConsistencyRecord, InputRecord, Record, RelationRecord, ResultRecord
from ..typesetting import significant
from .figures import conversion_html, number_html, result_html, symbol_html

STATUS = "In preparation \u2013 not checked, not signed"
"""What stands on a sheet that nobody has checked or signed."""

NOT_ADDRESSED = (
    "condensation, freezing and hydrates of the gas or of what it carries",
    "real-gas effects, unless a relation used here says that it includes them",
    "noise and vibration, acoustic or flow-induced",
    "dispersion, toxicity and ignition of the gas released",
    "losses at inlets, outlets, bends and fittings that are not modelled as a process of the path",
    "surges, and the time that valves take to open or close",
    "strength of vessels, pipes and supports",
)
"""What no calculation of this program covers unless a step says so."""

SUPPORT = (
    "These results support, and do not replace, local codes and the judgement of licensed "
    "practice. Whoever signs answers for the inputs, the choice of relations and the use made of "
    "the results."
)

_COMPARISONS = {"<=": "at most", ">=": "at least"}
_MARKS = {"met": "\u2713 met", "not met": "NOT MET", "caution": "CAUTION", "": "\u2013"}


@dataclass(frozen=True)
class InputLine:
    """One design input as printed."""

    item: InputRecord
    symbol: Markup
    conversion: Markup
    changed: bool


@dataclass(frozen=True)
class ResultLine:
    """One result as printed, with its criterion, its verdict and what must be said about it."""

    result: ResultRecord
    symbol: Markup | None
    value: Markup
    criteria: tuple[str, ...]
    mark: str
    notes: tuple[str, ...]


@dataclass(frozen=True)
class AssumptionLine:
    """An assumption of relations, with the numbers of the steps that rest on it."""

    text: str
    steps: tuple[int, ...]


@dataclass(frozen=True)
class SourceLine:
    """A relation with its source, and the numbers of the steps that use it."""

    relation: RelationRecord
    known: str
    steps: tuple[int, ...]


@dataclass(frozen=True)
class CheckLine:
    """A relation that was not needed, evaluated as a check."""

    check: ConsistencyRecord
    difference: Markup


def input_lines(record: Record) -> tuple[InputLine, ...]:
    """Return every input as printed."""
    return tuple(
        InputLine(
            item,
            symbol_html(item.symbol),
            conversion_html(item),
            item.key in record.changed,
        )
        for item in record.inputs
    )


def result_lines(record: Record) -> tuple[ResultLine, ...]:
    """Return every result as printed."""
    return tuple(
        ResultLine(
            result,
            None if result.state else symbol_html(result.symbol),
            result_html(result),
            tuple(f"{_COMPARISONS[c.comparison]} {c.typed}" for c in result.criteria),
            _MARKS[result.verdict],
            tuple(_notes(result)),
        )
        for result in record.results
    )


def _notes(result: ResultRecord) -> Iterator[str]:
    if any(c.holds != c.holds_rounded for c in result.criteria):
        yield (
            f"Rounding to {result.digits} digits would change this verdict; "
            "the unrounded value decides."
        )
    if not result.within_limits:
        yield "A step behind this result is outside the limits of its relation."


def assumption_lines(record: Record) -> tuple[AssumptionLine, ...]:
    """Return what the relations that were used assume, each assumption once."""
    found: dict[str, list[int]] = {}
    for step in record.steps:
        for text in record.relation(step.relation).assumptions:
            found.setdefault(text, []).append(step.number)
    return tuple(AssumptionLine(text, tuple(steps)) for text, steps in found.items())


def source_lines(record: Record) -> tuple[SourceLine, ...]:
    """Return every relation that a step or another route uses, with its source."""
    found: dict[str, list[int]] = {}
    for step in record.steps:
        for name in dict.fromkeys((step.relation, *(m.relation for m in step.combination))):
            found.setdefault(name, []).append(step.number)
    for route in record.routes:
        for own in route.steps:
            found.setdefault(own.relation, [])
    return tuple(
        SourceLine(relation, known_text(relation), tuple(steps))
        for relation, steps in ((record.relation(name), found[name]) for name in found)
    )


def known_text(relation: RelationRecord) -> str:
    """Return how the source of a relation is known, with what that asks of the checker."""
    known = relation.source.known
    return f"{known}: confirm in the source" if known == "from memory" else known


def check_lines(record: Record) -> tuple[CheckLine, ...]:
    """Return the checks as printed."""
    return tuple(
        CheckLine(check, number_html(significant(check.difference, 2))) for check in record.checks
    )
