"""A second spreadsheet engine recalculates every workbook before it is written out."""

from __future__ import annotations

import io
import tempfile
from collections.abc import Iterable
from pathlib import Path
from typing import Any, Protocol

from ..errors import CheckError
from ..sheets.workbook import DIFFERENCE_FORMAT
from .findings import Finding

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
    model = recalculated(workbook)
    numbers = {
        sheet["name"]: index for index, sheet in enumerate(model.get_worksheets_properties())
    }
    count = 0
    for cell in formulas:
        found = model.get_cell_value(numbers[cell.sheet], cell.row + 1, cell.column + 1)
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


def check_workbook(workbook: bytes) -> tuple[Finding, ...]:
    """Compare every value stored in a workbook file with what the second engine finds.

    Args:
        workbook: content of the file, as it now stands.

    Returns:
        One finding for each sheet with formulas.
    """
    import openpyxl

    formulas = openpyxl.load_workbook(io.BytesIO(workbook))
    stored = openpyxl.load_workbook(io.BytesIO(workbook), data_only=True)
    model = recalculated(workbook)
    findings = []
    for index, sheet in enumerate(formulas):
        cells = [c for row in sheet.iter_rows() for c in row if c.data_type == "f"]
        different = [
            cell.coordinate
            for cell in cells
            if not _same(
                stored[sheet.title][cell.coordinate].value,
                model.get_cell_value(index, cell.row, cell.column),
                1.0 if cell.number_format == DIFFERENCE_FORMAT else 0.0,
            )
        ]
        if not cells:
            continue
        verdict = "failed" if different else "passed"
        reason = f"{ENGINE} finds the same in {len(cells) - len(different)} of {len(cells)} cells"
        if different:
            reason += f"; other values in {', '.join(different[:5])}"
        findings.append(Finding(f"sheet {sheet.title}", "", verdict, reason))
    return tuple(findings)
