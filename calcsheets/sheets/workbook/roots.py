"""Roots as visible rows: each converges again by bisection when an input changes."""

from __future__ import annotations

from collections.abc import Mapping, Sequence

from ...expressions import Equation, Integral
from ...record import Record, StepRecord
from ..typesetting import plain_text, symbol_text
from .cells import FIRST_ROW, ROOTS, Cells, reference
from .formula import formula
from .page import Column, Page, double_size

_COLUMNS = (
    Column("Row", 16),
    Column("Lower end", 24),
    Column("Upper end", 24),
    Column("Middle", 24),
    Column("Relative difference of both sides at the middle", 26),
    Column("Positive at the lower end (1: yes)", 16),
)
_LOW, _HIGH, _MIDDLE, _RESIDUAL, _SIGN = range(1, 6)
_GAP = 3

Trials = Mapping[int, Sequence[Mapping[Integral, str]]]


def root_steps(record: Record) -> tuple[StepRecord, ...]:
    """Return the steps whose value is a root."""
    return tuple(step for step in record.steps if step.method == "root")


def root_cells(record: Record) -> dict[int, str]:
    """Return the cell of each converged root, by number of its step."""
    return {
        step.number: reference(ROOTS, first + len(step.halvings) - 1, _MIDDLE)
        for step, first in _first_rows(record)
    }


def lower_end(record: Record, step: StepRecord) -> str:
    """Return the cell of the lower end of a root's first interval."""
    return reference(ROOTS, _first_row(record, step), _LOW)


def middle_of(record: Record, step: StepRecord, row: int) -> str:
    """Return the cell of the middle of one of a root's intervals."""
    return reference(ROOTS, _first_row(record, step) + row, _MIDDLE)


def write_roots(page: Page, record: Record, cells: Cells, trials: Trials) -> None:
    """Write the rows of every root.

    Args:
        page: the sheet.
        record: the record.
        cells: where every quantity stands.
        trials: by number of a step the cells of its integrals, at the lower end of the first
            interval and then at the middle of each.
    """
    page.table(
        "Roots",
        "The interval is halved so that the sides change order inside it. "
        "No macros and no iterative-calculation mode are needed.",
        _COLUMNS,
    )
    for step, first in _first_rows(record):
        _write_root(page, first, record, step, cells, trials.get(step.number, ()))


def _first_rows(record: Record) -> list[tuple[StepRecord, int]]:
    """The steps, each with the row of its first interval."""
    found, row = [], FIRST_ROW + 1
    for step in root_steps(record):
        found.append((step, row))
        row += len(step.halvings) + _GAP
    return found


def _first_row(record: Record, step: StepRecord) -> int:
    return next(row for other, row in _first_rows(record) if other.number == step.number)


def _write_root(
    page: Page,
    first: int,
    record: Record,
    step: StepRecord,
    cells: Cells,
    trials: Sequence[Mapping[Integral, str]],
) -> None:
    published = record.relation(step.relation).published
    if not isinstance(published, Equation):
        raise ValueError(f"step {step.number} has no equation")
    symbol, place = symbol_text(step.symbol), step.place
    title = f"Step {step.number}: {symbol}, {place}: {plain_text(published)}"
    page.note(first - 1, title)
    operands = cells.of(step.operands)

    def residual(at: str, trial: int) -> str:
        known = {**operands, step.symbol: at}
        integrals = trials[trial] if trials else {}
        left, right = (
            formula(side, known, integrals=integrals) for side in (published.left, published.right)
        )
        return f"({left}-{right})/(ABS({left})+ABS({right}))"

    # Near the root the sign of the residual is noise: rows may differ by what doubles err.
    size = double_size(step.value or 0.0, 2 * step.double_error)
    sign = reference(ROOTS, first, _SIGN)
    lower_positive = 1 if step.halvings[0].low != step.halvings[1].low else 0
    lower_positive = lower_positive if step.halvings[0].residual > 0 else 1 - lower_positive
    page.formula(
        first, _SIGN, f"IF({residual(reference(ROOTS, first, _LOW), 0)}>0,1,0)", lower_positive
    )
    for count, row_values in enumerate(step.halvings):
        row = first + count
        low, high = (reference(ROOTS, row, column) for column in (_LOW, _HIGH))
        page.text(row, 0, f"halved {count} times")
        if count == 0:
            page.number(row, _LOW, row_values.low)
            page.number(row, _HIGH, row_values.high)
        else:
            before = {c: reference(ROOTS, row - 1, c) for c in (_LOW, _HIGH, _MIDDLE, _RESIDUAL)}
            same = f"IF({before[_RESIDUAL]}>0,1,0)={sign}"
            lower = f"IF({same},{before[_MIDDLE]},{before[_LOW]})"
            page.formula(row, _LOW, lower, row_values.low, scale=size)
            upper = f"IF({same},{before[_HIGH]},{before[_MIDDLE]})"
            page.formula(row, _HIGH, upper, row_values.high, scale=size)
        middle = (row_values.low + row_values.high) / 2
        page.formula(row, _MIDDLE, f"({low}+{high})/2", middle, scale=size)
        page.formula(
            row,
            _RESIDUAL,
            residual(reference(ROOTS, row, _MIDDLE), count + 1),
            row_values.residual,
            page.styles.change,
            scale=1.0,
        )
