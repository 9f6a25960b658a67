"""Where every quantity of the record stands in the workbook."""

from __future__ import annotations

from collections.abc import Iterable, Mapping
from dataclasses import dataclass

from xlsxwriter.utility import xl_rowcol_to_cell

from ...expressions import Symbol
from ...record import Operand, Record

INPUTS, CALCULATION, RESULTS = "Inputs", "Calculation", "Results"
ROOTS, COURSE, INTEGRALS, OTHER_ROUTES = "Roots", "Course", "Integrals", "Routes"
FIRST_ROW = 4
INPUT_TYPED, INPUT_SI = 4, 6
STEP_VALUE = 4
RESULT_VALUE = 4


@dataclass(frozen=True)
class Cells:
    """References to the cells of a record's inputs and steps.

    Attributes:
        by_key: absolute reference of each variable's value in coherent SI.
    """

    by_key: Mapping[str, str]

    def of(self, operands: Iterable[Operand]) -> dict[Symbol, str]:
        """Return the cell of each symbol of a step."""
        return {operand.symbol: self.by_key[operand.key] for operand in operands}


def place_cells(record: Record) -> Cells:
    """Lay out inputs and steps, one row each."""
    found = {
        item.key: reference(INPUTS, FIRST_ROW + index, INPUT_SI)
        for index, item in enumerate(record.inputs)
    }
    found |= {
        step.key: reference(CALCULATION, FIRST_ROW + index, STEP_VALUE)
        for index, step in enumerate(record.steps)
    }
    return Cells(found)


def reference(sheet: str, row: int, column: int) -> str:
    """Return an absolute reference; rows and columns count from 0."""
    return f"{sheet}!{xl_rowcol_to_cell(row, column, row_abs=True, col_abs=True)}"


def column_range(sheet: str, column: int, count: int) -> str:
    """Return the absolute range of a column below the heading."""
    first = xl_rowcol_to_cell(FIRST_ROW, column, row_abs=True, col_abs=True)
    last = xl_rowcol_to_cell(FIRST_ROW + count - 1, column, row_abs=True, col_abs=True)
    return f"{sheet}!{first}:{last}"
