"""Integrals as visible sums: one row for each place, or one row of places for each trial."""

from __future__ import annotations

from collections.abc import Iterator, Mapping
from dataclasses import dataclass

from xlsxwriter.utility import xl_rowcol_to_cell

from ...expressions import Integral, Symbol
from ...record import IntegralRecord, Operand, Record, StepRecord, SumRecord
from ..typesetting import plain_text, symbol_text
from .cells import FIRST_ROW, INTEGRALS, Cells, reference
from .formula import formula
from .page import Column, Page, double_size
from .roots import lower_end, middle_of

TITLE = "Integrals"
NOTE = (
    "Each integral is width times the weighted sum of the integrand at the places of Gauss and "
    "Legendre. Places are shares of the way from the lower to the upper limit."
)
_COLUMNS = (
    Column("Place", 20),
    Column("Weight", 20),
    Column("Variable", 20),
    Column("Integrand", 20),
    Column("Weight times integrand", 20),
    Column("Lower limit", 20),
    Column("Upper limit", 20),
    Column("Integral", 20),
)
_PLACE, _WEIGHT, _AT, _HEIGHT, _PRODUCT, _LOW, _HIGH, _TOTAL = range(8)
_TRIAL, _TRIAL_LOW, _TRIAL_HIGH, _TRIAL_TOTAL, _FIRST_PLACE = range(5)
_TRIAL_HEADINGS = ("Trial value", "Lower limit", "Upper limit", "Integral")
_PLACE_WIDTH = 20
_GAP = 2
_HEAD_ROWS = 2  # title and headings of a block
_TRIAL_HEAD_ROWS = 4  # title, places, weights, headings


@dataclass(frozen=True)
class IntegralCells:
    """Where the value of each integral stands.

    Attributes:
        closed: by number of the step and of its alternative, 0 for the step itself.
        trials: by number of a root's step: at the lower end of the first interval, then at
            the middle of each.
    """

    closed: Mapping[tuple[int, int], Mapping[Integral, str]]
    trials: Mapping[int, tuple[Mapping[Integral, str], ...]]


@dataclass(frozen=True)
class _Block:
    """One integral on the sheet: its first row, and whose it is."""

    row: int
    step: StepRecord
    alternative: int
    operands: tuple[Operand, ...]
    item: IntegralRecord
    trials: tuple[SumRecord, ...]

    @property
    def first(self) -> int:
        """Row of the first place or of the first trial."""
        return self.row + (_TRIAL_HEAD_ROWS if self.trials else _HEAD_ROWS)

    @property
    def end(self) -> int:
        """Row behind the last one."""
        return self.first + len(self.trials or self.item.nodes)


def integral_cells(record: Record) -> IntegralCells:
    """Return the cell of each integral of a record."""
    closed: dict[tuple[int, int], dict[Integral, str]] = {}
    trials: dict[int, list[dict[Integral, str]]] = {}
    for block in _blocks(record):
        number, integral = block.step.number, block.item.integral
        if not block.trials:
            cell = reference(INTEGRALS, block.first, _TOTAL)
            closed.setdefault((number, block.alternative), {})[integral] = cell
            continue
        rows = trials.setdefault(number, [{} for _ in block.trials])
        for index, row in enumerate(rows):
            row[integral] = reference(INTEGRALS, block.first + index, _TRIAL_TOTAL)
    return IntegralCells(closed, {number: tuple(rows) for number, rows in trials.items()})


def has_integrals(record: Record) -> bool:
    """Return whether a record needs the sheet."""
    return any(_blocks(record))


def write_integrals(page: Page, record: Record, cells: Cells) -> None:
    """Write the sums of every integral."""
    page.heading(TITLE, NOTE, _COLUMNS)
    for block in _blocks(record):
        page.note(block.row, _title(block))
        if block.trials:
            _write_trials(page, block, cells, record)
        else:
            _write_places(page, block, cells)


def _blocks(record: Record) -> Iterator[_Block]:
    row = FIRST_ROW - 1
    for block in _unplaced(record):
        placed = _Block(row, *block)
        yield placed
        row = placed.end + _GAP


_Unplaced = tuple[StepRecord, int, tuple[Operand, ...], IntegralRecord, tuple[SumRecord, ...]]


def _unplaced(record: Record) -> Iterator[_Unplaced]:
    for step in record.steps:
        for index, item in enumerate(step.integrals):
            at_rows = tuple(row.integrals[index] for row in step.halvings)
            start = step.start_integrals[index : index + 1]
            yield step, 0, step.operands, item, (*start, *at_rows)
        for number, other in enumerate(step.alternatives, start=1):
            for item in other.integrals:
                yield step, number, other.operands, item, ()


def _title(block: _Block) -> str:
    step = block.step
    other = step.alternatives[block.alternative - 1] if block.alternative else None
    where = "" if other is None else f", if {' and '.join(u.outcome for u in other.regimes)}"
    integral = plain_text(block.item.integral)
    return f"Step {step.number}: {symbol_text(step.symbol)}, {step.place}{where}: {integral}"


def _write_places(page: Page, block: _Block, cells: Cells) -> None:
    item, first = block.item, block.first
    known = cells.of(block.operands)
    for index, column in enumerate(_COLUMNS):
        page.text(first - 1, index, column.heading, page.styles.heading)
    low, high = (reference(INTEGRALS, first, column) for column in (_LOW, _HIGH))
    sizes = _Sizes(item)
    page.formula(first, _LOW, formula(item.integral.low, known), item.low, scale=sizes.limits)
    page.formula(first, _HIGH, formula(item.integral.high, known), item.high, scale=sizes.limits)
    for row, node in enumerate(item.nodes, start=first):
        place, weight, at, height = (
            reference(INTEGRALS, row, column) for column in (_PLACE, _WEIGHT, _AT, _HEIGHT)
        )
        page.number(row, _PLACE, node.place)
        page.number(row, _WEIGHT, node.weight)
        page.formula(row, _AT, f"({low}+(({high}-{low})*{place}))", node.at, scale=sizes.limits)
        integrand = formula(item.integral.integrand, {**known, item.integral.variable: at})
        page.formula(row, _HEIGHT, integrand, node.height, scale=sizes.heights)
        product = node.weight * node.height
        page.formula(row, _PRODUCT, f"({weight}*{height})", product, scale=sizes.heights)
    products = _range(first, _PRODUCT, block.end - 1, _PRODUCT)
    page.formula(first, _TOTAL, f"(({high}-{low})*SUM({products}))", item.total, scale=sizes.total)


def _write_trials(page: Page, block: _Block, cells: Cells, record: Record) -> None:
    """Places run to the right, trials downwards: a root is sought with each trial's own sum."""
    item, first = block.item, block.first
    places, weights = first - 3, first - 2
    page.text(places, _TRIAL_TOTAL, "Place", page.styles.heading)
    page.text(weights, _TRIAL_TOTAL, "Weight", page.styles.heading)
    for index, heading in enumerate(_TRIAL_HEADINGS):
        page.text(first - 1, index, heading, page.styles.heading)
    for index, node in enumerate(item.nodes, start=_FIRST_PLACE):
        if index >= len(_COLUMNS):
            page.width(index, _PLACE_WIDTH)
        page.number(places, index, node.place)
        page.number(weights, index, node.weight)
        page.text(first - 1, index, "Integrand", page.styles.heading)
    origins = [lower_end(record, block.step)]
    origins += [middle_of(record, block.step, index) for index in range(len(block.trials) - 1)]
    for row, (origin, values) in enumerate(zip(origins, block.trials, strict=True), start=first):
        _write_trial(page, row, block, cells, origin, values)


def _write_trial(
    page: Page, row: int, block: _Block, cells: Cells, origin: str, values: SumRecord
) -> None:
    item, step = block.item, block.step
    places, weights = block.first - 3, block.first - 2
    trial, low, high = (
        reference(INTEGRALS, row, column) for column in (_TRIAL, _TRIAL_LOW, _TRIAL_HIGH)
    )
    known: dict[Symbol, str] = {**cells.of(block.operands), step.symbol: trial}
    sizes = _Sizes(item)
    largest = max(abs(height) for height in values.heights)
    widest = max(abs(values.low), abs(values.high), sizes.limits)
    index = row - block.first - 1
    halved = step.halvings[max(index, 0)]
    value = halved.low if index < 0 else (halved.low + halved.high) / 2
    page.formula(row, _TRIAL, origin, value, scale=_trial_size(step))
    page.formula(row, _TRIAL_LOW, formula(item.integral.low, known), values.low, scale=widest)
    page.formula(row, _TRIAL_HIGH, formula(item.integral.high, known), values.high, scale=widest)
    for column, height in enumerate(values.heights, start=_FIRST_PLACE):
        at = f"({low}+(({high}-{low})*{reference(INTEGRALS, places, column)}))"
        integrand = formula(item.integral.integrand, {**known, item.integral.variable: at})
        page.formula(row, column, integrand, height, scale=max(largest, sizes.heights))
    last = _FIRST_PLACE + len(values.heights) - 1
    of_weights = _range(weights, _FIRST_PLACE, weights, last)
    of_heights = _range(row, _FIRST_PLACE, row, last)
    size = max(abs(values.high - values.low) * largest, sizes.total)
    page.formula(
        row,
        _TRIAL_TOTAL,
        f"(({high}-{low})*SUMPRODUCT({of_weights},{of_heights}))",
        values.total,
        scale=size,
    )


@dataclass(frozen=True)
class _Sizes:
    """Sizes against which a difference of 1e-12 is no more than double arithmetic errs."""

    item: IntegralRecord

    @property
    def limits(self) -> float:
        """Of a limit, or of the variable at a place."""
        return double_size(max(abs(self.item.low), abs(self.item.high)), self.item.limit_error)

    @property
    def heights(self) -> float:
        """Of the integrand at a place."""
        return double_size(max(abs(n.height) for n in self.item.nodes), self.item.height_error)

    @property
    def total(self) -> float:
        """Of the sum."""
        return double_size(self.item.total, self.item.total_error)


def _trial_size(step: StepRecord) -> float:
    return double_size(step.value or 0.0, 2 * step.double_error)


def _range(top: int, left: int, bottom: int, right: int) -> str:
    first = xl_rowcol_to_cell(top, left, row_abs=True, col_abs=True)
    last = xl_rowcol_to_cell(bottom, right, row_abs=True, col_abs=True)
    return f"{INTEGRALS}!{first}:{last}"
