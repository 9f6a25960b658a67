"""The sheet of integrals: which sums a record needs, and where they stand."""

from __future__ import annotations

from collections.abc import Iterator, Mapping
from dataclasses import dataclass

from ...expressions import Integral
from ...record import CourseRecord, IntegralRecord, Operand, Record, StepRecord, SumRecord
from ..typesetting import plain_text, regime_words, symbol_text
from .cells import FIRST_ROW, Cells
from .course import course_cells, running_cells
from .page import Page, double_size
from .roots import lower_end, middle_of
from .sums import COLUMNS, Sizes, SumBlock, Trials

TITLE = "Integrals"
NOTE = (
    "Each integral is width times the weighted sum of the integrand at the places of Gauss and "
    "Legendre. Places are shares of the way from the lower to the upper limit."
)
_GAP = 2

ByIntegral = Mapping[Integral, str]


@dataclass(frozen=True)
class IntegralCells:
    """Where the value of each integral stands.

    Attributes:
        closed: by number of the step and of its alternative, 0 for the step itself.
        trials: by number of a root's step: at the lower end of the first interval, then at
            the middle of each.
        courses: by name of the process, in each row of its course.
    """

    closed: Mapping[tuple[int, int], ByIntegral]
    trials: Mapping[int, tuple[ByIntegral, ...]]
    courses: Mapping[str, tuple[ByIntegral, ...]]


@dataclass(frozen=True)
class _Owner:
    """What a sum belongs to: a step with its alternative, or a course by its process."""

    step: int = 0
    alternative: int = 0
    course: str = ""


def integral_cells(record: Record, cells: Cells) -> IntegralCells:
    """Return the cell of each integral of a record."""
    closed: dict[tuple[int, int], dict[Integral, str]] = {}
    rows: dict[_Owner, list[dict[Integral, str]]] = {}
    for top, owner, block in _placed(record, cells):
        if block.trials is None:
            key = (owner.step, owner.alternative)
            closed.setdefault(key, {})[block.integral] = block.total(top)
            continue
        found = rows.setdefault(owner, [{} for _ in block.sums])
        for index, row in enumerate(found):
            row[block.integral] = block.total(top, index)
    return IntegralCells(
        closed,
        {owner.step: tuple(found) for owner, found in rows.items() if owner.step},
        {owner.course: tuple(found) for owner, found in rows.items() if owner.course},
    )


def has_integrals(record: Record) -> bool:
    """Return whether a record needs the sheet."""
    return any(
        step.integrals or any(other.integrals for other in step.alternatives)
        for step in record.steps
    ) or any(course.integrals for course in record.courses)


def write_integrals(page: Page, record: Record, cells: Cells) -> None:
    """Write the sums of every integral."""
    page.heading(TITLE, NOTE, COLUMNS)
    for top, _, block in _placed(record, cells):
        block.write(page, top)


def _placed(record: Record, cells: Cells) -> Iterator[tuple[int, _Owner, SumBlock]]:
    top = FIRST_ROW - 1
    for owner, block in _blocks(record, cells):
        yield top, owner, block
        top += block.height + _GAP


def _blocks(record: Record, cells: Cells) -> Iterator[tuple[_Owner, SumBlock]]:
    for step in record.steps:
        for index, item in enumerate(step.integrals):
            if step.halvings:
                yield _Owner(step.number), _of_root(record, step, index, cells)
            else:
                yield _Owner(step.number), _of_step(step, "", step.operands, item, cells)
        for number, other in enumerate(step.alternatives, start=1):
            where = f", if {regime_words(other.regimes)}"
            for item in other.integrals:
                owner = _Owner(step.number, number)
                yield owner, _of_step(step, where, other.operands, item, cells)
    for course in record.courses:
        for index in range(len(course.integrals)):
            yield _Owner(course=course.key), _of_course(record, course, index, cells)


def _title(step: StepRecord, where: str, integral: Integral) -> str:
    symbol = symbol_text(step.symbol)
    return f"Step {step.number}: {symbol}, {step.place}{where}: {plain_text(integral)}"


def _of_step(
    step: StepRecord, where: str, operands: tuple[Operand, ...], item: IntegralRecord, cells: Cells
) -> SumBlock:
    heights = tuple(node.height for node in item.nodes)
    return SumBlock(
        title=_title(step, where, item.integral),
        integral=item.integral,
        places=tuple(node.place for node in item.nodes),
        weights=tuple(node.weight for node in item.nodes),
        sums=(SumRecord(item.low, item.high, heights, item.total),),
        known=cells.of(operands),
        sizes=Sizes(item.limit_error, item.height_error, item.total_error),
        trials=None,
    )


def _of_root(record: Record, step: StepRecord, index: int, cells: Cells) -> SumBlock:
    item = step.integrals[index]
    middles = range(len(step.halvings))
    values = [step.halvings[0].low, *((row.low + row.high) / 2 for row in step.halvings)]
    return SumBlock(
        title=_title(step, "", item.integral),
        integral=item.integral,
        places=tuple(node.place for node in item.nodes),
        weights=tuple(node.weight for node in item.nodes),
        sums=(
            step.start_integrals[index],
            *(row.integrals[index] for row in step.halvings),
        ),
        known=cells.of(step.operands),
        sizes=Sizes(item.limit_error, item.height_error, item.total_error),
        trials=Trials(
            step.symbol,
            (lower_end(record, step), *(middle_of(record, step, row) for row in middles)),
            tuple(values),
            double_size(step.value or 0.0, 2 * step.double_error),
        ),
    )


def _of_course(record: Record, course: CourseRecord, index: int, cells: Cells) -> SumBlock:
    item = course.integrals[index]
    running = course.columns[0]
    return SumBlock(
        title=f"{course.title}, {course.place}: {plain_text(item.integral)}",
        integral=item.integral,
        places=item.places,
        weights=item.weights,
        sums=item.sums,
        known=cells.of(course.operands),
        sizes=Sizes(item.limit_error, item.height_error, item.total_error),
        trials=Trials(
            running.symbol,
            running_cells(course, course_cells(record)[course.key]),
            running.values,
            double_size(max(abs(v) for v in running.values), running.double_error),
        ),
    )
