"""The sheet of results against their criteria."""

from __future__ import annotations

from collections.abc import Sequence
from fractions import Fraction

from ...record import CriterionRecord, Record, ResultRecord
from ..typesetting import symbol_text, unit_text
from .cells import FIRST_ROW, RESULT_VALUE, RESULTS, Cells, reference
from .formula import exact_number
from .page import Column, Page, double_size

_COLUMNS = (
    Column("No.", 5),
    Column("Result", 34),
    Column("Symbol", 8),
    Column("Place", 24),
    Column("Value", 12),
    Column("Unit", 10),
    Column("At least", 9),
    Column("At most", 9),
    Column("Criterion", 12),
    Column("Used as", 14),
    Column("Step", 8),
    Column("Value as issued", 12),
    Column("Changed by", 11),
)
_AT_LEAST, _AT_MOST, _VERDICT, _ISSUED, CHANGE = 6, 7, 8, 11, 12


def write_results(page: Page, record: Record, cells: Cells) -> None:
    """Write one row for each wanted result."""
    page.table(
        "Results against criteria",
        "Compared unrounded, shown rounded. Values follow the inputs, verdicts the values.",
        _COLUMNS,
    )
    watched = [
        f'{cells.by_key[step.key]}="{step.test.outcome}"'
        for step in record.steps
        if step.test and step.test.assumed
    ]
    for index, result in enumerate(record.results):
        _row(page, FIRST_ROW + index, result, cells, watched)


def _row(page: Page, row: int, result: ResultRecord, cells: Cells, watched: Sequence[str]) -> None:
    """One result; #N/A where a regime that was assumed is no longer the one of the issue."""
    page.number(row, 0, result.number)
    page.text(row, 1, result.title, page.styles.strong)
    page.text(row, 2, "" if result.state else symbol_text(result.symbol))
    page.text(row, 3, result.place)
    page.text(row, 5, unit_text(result.unit) if result.unit else "")
    page.text(row, 9, result.used_as)
    page.text(row, 10, str(result.step) if result.step else f"input {result.input}")
    source = cells.by_key[result.key]
    value = reference(RESULTS, row, RESULT_VALUE)
    issued = reference(RESULTS, row, _ISSUED)
    if result.value is None:
        page.formula(row, RESULT_VALUE, source, result.state, page.styles.strong)
        page.text(row, _ISSUED, result.state)
        page.changed(row, CHANGE, value, issued)
        for column in (_AT_LEAST, _AT_MOST, _VERDICT):
            page.text(row, column, "")
        return
    style = page.value_style(result.value, result.digits)
    size = double_size(result.value, result.double_error)
    shown = _in_unit(source, result)
    if watched:
        shown = f"IF(AND({','.join(watched)}),{shown},NA())"
    page.formula(row, RESULT_VALUE, shown, result.value, style, size)
    page.value(row, _ISSUED, result.value, result.digits)
    page.change(row, CHANGE, value, issued, size)
    _write_criterion(page, row, result, value)


def _in_unit(source: str, result: ResultRecord) -> str:
    """The coherent SI value less the unit's zero, over the unit's factor."""
    factor, offset = Fraction(result.factor), Fraction(result.offset)
    text = source if offset == 0 else f"({source}-{exact_number(offset)})"
    if factor != 1:
        text = f"{text}/{exact_number(factor)}"
    return text + "/PI()" * result.pi_power


def _write_criterion(page: Page, row: int, result: ResultRecord, value: str) -> None:
    limits = {criterion.comparison: criterion for criterion in result.criteria}
    conditions = []
    for comparison, column in ((">=", _AT_LEAST), ("<=", _AT_MOST)):
        criterion: CriterionRecord | None = limits.get(comparison)
        if criterion is None:
            page.text(row, column, "")
            continue
        page.number(row, column, criterion.limit)
        conditions.append(f"{value}{comparison}{reference(RESULTS, row, column)}")
    if not conditions:
        page.text(row, _VERDICT, "no criterion")
        return
    missed = "caution" if result.otherwise == "caution" else "not met"
    page.formula(
        row, _VERDICT, f'IF(AND({",".join(conditions)}),"met","{missed}")', result.verdict,
        page.styles.strong,
    )  # fmt: skip
