"""A second spreadsheet engine recalculates every workbook before it is written out."""

from __future__ import annotations

import io
import tempfile
from collections.abc import Iterable
from pathlib import Path
from typing import Any, Protocol

from ..errors import CheckError
from ..record import Record
from ..sheets.workbook import make_workbook
from .finding import Finding

ENGINE = "IronCalc"
LARGEST_DIFFERENCE = 1e-12


class StoredFormula(Protocol):
    """A formula cell with the value stored in the file."""

    @property
    def sheet(self) -> str:
        """Name of the sheet."""

    @property
    def row(self) -> int:
        """Row, from 0."""

    @property
    def column(self) -> int:
        """Column, from 0."""

    @property
    def value(self) -> float | str:
        """The value stored."""

    @property
    def scale(self) -> float:
        """Size against which a difference counts, where the value may be zero."""


def require_same_values(workbook: bytes, formulas: Iterable[StoredFormula]) -> int:
    """Recalculate a workbook and compare every formula with the value stored.

    Args:
        workbook: content of the file.
        formulas: every formula cell.

    Returns:
        How many cells were compared.

    Raises:
        CheckError: if one differs by more than ``LARGEST_DIFFERENCE``.
    """
    engine = _Engine(workbook)
    count = 0
    for cell in formulas:
        found = engine.value(cell)
        if not _same(cell.value, found, cell.scale):
            raise CheckError(
                ENGINE, f"{cell.sheet}, row {cell.row + 1}, column {cell.column + 1}",
                str(cell.value), str(found),
            )  # fmt: skip
        count += 1
    return count


def recalculated(workbook: bytes) -> Any:
    """Return a workbook in the second engine, every cell calculated anew."""
    import ironcalc

    with tempfile.TemporaryDirectory() as folder:
        path = Path(folder) / "workbook.xlsx"
        path.write_bytes(workbook)
        model = ironcalc.load_from_xlsx(str(path), "en", "UTC", "en")
    model.evaluate()
    return model


def _same(stored: object, found: object, scale: float) -> bool:
    if not isinstance(stored, int | float) or not isinstance(found, int | float):
        return stored == found
    return abs(found - stored) <= LARGEST_DIFFERENCE * max(abs(stored), scale)


def check_workbook(workbook: bytes, record: Record) -> tuple[Finding, ...]:
    """Compare a workbook file, as it now stands, with its record and with a second engine.

    Args:
        workbook: content of the file.
        record: the record that it was made from.

    Returns:
        One finding for each sheet: its formulas are those that were made, the values stored
        are those of the record, and the second engine finds the same.
    """
    import openpyxl

    expected = make_workbook(record)
    made = openpyxl.load_workbook(io.BytesIO(expected.content))
    formulas = openpyxl.load_workbook(io.BytesIO(workbook))
    stored = openpyxl.load_workbook(io.BytesIO(workbook), data_only=True)
    engine = _Engine(workbook)
    problems: dict[str, list[str]] = {cell.sheet: [] for cell in expected.formulas}
    for cell in expected.formulas:
        where = f"row {cell.row + 1}, column {cell.column + 1}"
        if cell.sheet not in formulas.sheetnames:
            problems[cell.sheet].append(f"{where}: the sheet is missing")
            continue
        place = {"row": cell.row + 1, "column": cell.column + 1}
        if formulas[cell.sheet].cell(**place).value != made[cell.sheet].cell(**place).value:
            problems[cell.sheet].append(f"{where}: another formula than was made")
        elif not _same(cell.value, stored[cell.sheet].cell(**place).value, cell.scale):
            problems[cell.sheet].append(f"{where}: another value stored than in the record")
        elif not _same(cell.value, engine.value(cell), cell.scale):
            problems[cell.sheet].append(f"{where}: {ENGINE} finds {engine.value(cell)}")
    return tuple(_finding(sheet, found) for sheet, found in problems.items())


def _finding(sheet: str, problems: list[str]) -> Finding:
    reason = f"formulas as made, values as in the record, {ENGINE} finds the same"
    if problems:
        more = f"; {len(problems) - 3} more" if len(problems) > 3 else ""
        reason = "; ".join(problems[:3]) + more
    return Finding(f"sheet {sheet}", "", "failed" if problems else "passed", reason)


class _Engine:
    """A workbook recalculated in the second engine."""

    def __init__(self, workbook: bytes) -> None:
        self._model = recalculated(workbook)
        names = [sheet["name"] for sheet in self._model.get_worksheets_properties()]
        self._numbers = {name: index for index, name in enumerate(names)}

    def value(self, cell: StoredFormula) -> Any:
        """Return the value of a cell."""
        return self._model.get_cell_value(self._numbers[cell.sheet], cell.row + 1, cell.column + 1)
