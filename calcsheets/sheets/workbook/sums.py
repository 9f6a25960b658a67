"""One integral as a visible sum: its places downwards, or to the right with a row per trial."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass

from xlsxwriter.utility import xl_rowcol_to_cell

from ...expressions import Integral, Symbol
from ...record import SumRecord
from .cells import INTEGRALS, reference
from .formula import formula
from .page import Column, Page, double_size

WIDTH = 20
COLUMNS = tuple(
    Column(heading, WIDTH)
    for heading in (
        "Place",
        "Weight",
        "Variable",
        "Integrand",
        "Weight times integrand",
        "Lower limit",
        "Upper limit",
        "Integral",
    )
)
_PLACE, _WEIGHT, _AT, _HEIGHT, _PRODUCT, _LOW, _HIGH, _TOTAL = range(8)
_TRIAL, _TRIAL_LOW, _TRIAL_HIGH, _TRIAL_TOTAL, _FIRST_PLACE = range(5)
_TRIAL_HEADINGS = ("Value", "Lower limit", "Upper limit", "Integral")
_HEAD_ROWS = 2  # title and headings
_TRIAL_HEAD_ROWS = 4  # title, places, weights, headings


@dataclass(frozen=True)
class Sizes:
    """What double arithmetic makes of a sum: bounds on the errors of its parts."""

    limit_error: float
    height_error: float
    total_error: float


@dataclass(frozen=True)
class Trials:
    """The values for each of which the sum is made.

    Attributes:
        symbol: the symbol that varies.
        cells: where each value stands.
        values: each value.
        size: size against which a difference of one of them counts.
    """

    symbol: Symbol
    cells: tuple[str, ...]
    values: tuple[float, ...]
    size: float


@dataclass(frozen=True)
class SumBlock:
    """One integral on the sheet.

    Attributes:
        title: what it belongs to.
        integral: the integral.
        places: shares of the way from its lower to its upper limit.
        weights: weight of each place.
        sums: the sum, or the sum for each trial.
        known: cell of each known symbol.
        sizes: what double arithmetic makes of the sum.
        trials: the trials; ``None`` for one sum.
    """

    title: str
    integral: Integral
    places: tuple[float, ...]
    weights: tuple[float, ...]
    sums: tuple[SumRecord, ...]
    known: Mapping[Symbol, str]
    sizes: Sizes
    trials: Trials | None

    @property
    def height(self) -> int:
        """How many rows it takes."""
        if self.trials is None:
            return _HEAD_ROWS + len(self.places)
        return _TRIAL_HEAD_ROWS + len(self.sums)

    def total(self, top: int, index: int = 0) -> str:
        """Return the cell of the sum, or of the sum of one trial, of a block at a row."""
        if self.trials is None:
            return reference(INTEGRALS, top + _HEAD_ROWS, _TOTAL)
        return reference(INTEGRALS, top + _TRIAL_HEAD_ROWS + index, _TRIAL_TOTAL)

    def write(self, page: Page, top: int) -> None:
        """Write the block."""
        page.note(top, self.title)
        if self.trials is None:
            self._write_places(page, top + _HEAD_ROWS)
            return
        self._write_places_to_the_right(page, top + 1)
        rows = zip(self.trials.cells, self.trials.values, self.sums, strict=True)
        for row, (cell, value, values) in enumerate(rows, start=top + _TRIAL_HEAD_ROWS):
            page.formula(row, _TRIAL, cell, value, scale=self.trials.size)
            self._write_trial(page, top + 1, row, self.trials.symbol, values)

    def _write_places(self, page: Page, first: int) -> None:
        (values,) = self.sums
        for index, column in enumerate(COLUMNS):
            page.text(first - 1, index, column.heading, page.styles.heading)
        low, high = (reference(INTEGRALS, first, column) for column in (_LOW, _HIGH))
        self._write_limits(page, first, (_LOW, _HIGH), self.known, values)
        height_size = self._height_size(values)
        for index, height in enumerate(values.heights):
            row = first + index
            place, weight, at, value = (
                reference(INTEGRALS, row, column) for column in (_PLACE, _WEIGHT, _AT, _HEIGHT)
            )
            page.number(row, _PLACE, self.places[index])
            page.number(row, _WEIGHT, self.weights[index])
            where = values.low + (values.high - values.low) * self.places[index]
            page.formula(row, _AT, _at(low, high, place), where, scale=self._limit_size(values))
            integrand = formula(self.integral.integrand, {**self.known, self.integral.variable: at})
            page.formula(row, _HEIGHT, integrand, height, scale=height_size)
            product = self.weights[index] * height
            page.formula(row, _PRODUCT, f"({weight}*{value})", product, scale=height_size)
        products = _range((first, _PRODUCT), (first + len(self.places) - 1, _PRODUCT))
        total = f"(({high}-{low})*SUM({products}))"
        page.formula(first, _TOTAL, total, values.total, scale=self._total_size(values))

    def _write_places_to_the_right(self, page: Page, top: int) -> None:
        page.text(top, _TRIAL_TOTAL, "Place", page.styles.heading)
        page.text(top + 1, _TRIAL_TOTAL, "Weight", page.styles.heading)
        for index, heading in enumerate(_TRIAL_HEADINGS):
            page.text(top + 2, index, heading, page.styles.heading)
        pairs = zip(self.places, self.weights, strict=True)
        for column, (place, weight) in enumerate(pairs, start=_FIRST_PLACE):
            if column >= len(COLUMNS):
                page.width(column, WIDTH)
            page.number(top, column, place)
            page.number(top + 1, column, weight)
            page.text(top + 2, column, "Integrand", page.styles.heading)

    def _write_trial(
        self, page: Page, top: int, row: int, symbol: Symbol, values: SumRecord
    ) -> None:
        low, high = (reference(INTEGRALS, row, column) for column in (_TRIAL_LOW, _TRIAL_HIGH))
        known = {**self.known, symbol: reference(INTEGRALS, row, _TRIAL)}
        self._write_limits(page, row, (_TRIAL_LOW, _TRIAL_HIGH), known, values)
        height_size = self._height_size(values)
        for column, height in enumerate(values.heights, start=_FIRST_PLACE):
            at = _at(low, high, reference(INTEGRALS, top, column))
            integrand = formula(self.integral.integrand, {**known, self.integral.variable: at})
            page.formula(row, column, integrand, height, scale=height_size)
        last = _FIRST_PLACE + len(values.heights) - 1
        weights = _range((top + 1, _FIRST_PLACE), (top + 1, last))
        heights = _range((row, _FIRST_PLACE), (row, last))
        total = f"(({high}-{low})*SUMPRODUCT({weights},{heights}))"
        page.formula(row, _TRIAL_TOTAL, total, values.total, scale=self._total_size(values))

    def _write_limits(
        self,
        page: Page,
        row: int,
        columns: tuple[int, int],
        known: Mapping[Symbol, str],
        values: SumRecord,
    ) -> None:
        limits = ((self.integral.low, values.low), (self.integral.high, values.high))
        for column, (limit, value) in zip(columns, limits, strict=True):
            page.formula(row, column, formula(limit, known), value, scale=self._limit_size(values))

    def _limit_size(self, values: SumRecord) -> float:
        return double_size(max(abs(values.low), abs(values.high)), self.sizes.limit_error)

    def _height_size(self, values: SumRecord) -> float:
        return double_size(max(abs(h) for h in values.heights), self.sizes.height_error)

    def _total_size(self, values: SumRecord) -> float:
        largest = max(abs(height) for height in values.heights)
        return double_size(abs(values.high - values.low) * largest, self.sizes.total_error)


def _at(low: str, high: str, place: str) -> str:
    return f"({low}+(({high}-{low})*{place}))"


def _range(start: tuple[int, int], end: tuple[int, int]) -> str:
    first, last = (
        xl_rowcol_to_cell(row, column, row_abs=True, col_abs=True) for row, column in (start, end)
    )
    return f"{INTEGRALS}!{first}:{last}"
