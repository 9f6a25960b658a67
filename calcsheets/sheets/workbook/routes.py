"""The sheet of other routes: each a short calculation of its own, compared with the first."""

from __future__ import annotations

from ...expressions import Equation
from ...record import Record, RouteRecord, RouteStep
from ..typesetting import plain_text, symbol_text, unit_text
from .cells import FIRST_ROW, OTHER_ROUTES, STEP_VALUE, Cells, reference
from .formula import formula, is_one_of
from .page import Column, Page, double_size

_COLUMNS = (
    Column("Step", 8),
    Column("Quantity", 30),
    Column("Symbol", 8),
    Column("Place", 22),
    Column("Value", 14),
    Column("SI unit", 9),
    Column("Relation and its source", 44),
    Column("As published, and solved for the quantity", 54),
)
_GAP = 1


def write_routes(page: Page, record: Record, cells: Cells) -> None:
    """Write every other route below the other, each with its comparison.

    Args:
        page: the sheet.
        record: the record.
        cells: where every quantity of the calculation stands.
    """
    page.table(
        "Other routes",
        "Each result once more, through relations that the calculation did not use where there "
        "are any. #N/A: the regime has changed.",
        _COLUMNS,
    )
    row = FIRST_ROW
    for route in record.routes:
        row = _write_route(page, row, record, route, cells) + _GAP


def _write_route(page: Page, row: int, record: Record, route: RouteRecord, cells: Cells) -> int:
    result = record.results[route.result - 1]
    page.text(row, 0, f"Result {result.number}", page.styles.strong)
    page.text(row, 1, result.title, page.styles.strong)
    page.text(row, 2, symbol_text(result.symbol))
    page.text(row, 3, result.place)
    if route.value is None:
        page.text(row, 6, f"No other route: {route.reason}.")
        return row + 1
    shared = "; ".join(route.shared) or "nothing"
    page.text(row, 6, f"Shared with the calculation: {shared}.")
    own = dict(cells.by_key)
    for step in route.steps:
        row += 1
        _write_step(page, row, record, step, Cells(own))
        own[step.key] = reference(OTHER_ROUTES, row, STEP_VALUE)
    row += 1
    here, there = own[route.key], cells.by_key[route.key]
    page.text(row, 1, "Relative difference of both routes", page.styles.strong)
    last = route.steps[-1]
    noise = double_size(route.value, last.double_error) / max(abs(route.value), 1e-300)
    difference = f"IF({here}={there},0,({here}-{there})/MAX(ABS({here}),ABS({there})))"
    page.formula(
        row, STEP_VALUE, difference, route.difference or 0.0, page.styles.change, scale=noise
    )
    return row + 1


def _write_step(page: Page, row: int, record: Record, step: RouteStep, cells: Cells) -> None:
    relation = record.relation(step.relation)
    page.number(row, 0, step.number)
    page.text(row, 1, step.title)
    page.text(row, 2, symbol_text(step.symbol))
    page.text(row, 3, step.place)
    page.text(row, 5, unit_text(step.unit))
    page.text(row, 6, f"{relation.title}\n{relation.source}")
    solved = plain_text(Equation(step.symbol, step.solved))
    page.text(row, 7, f"{plain_text(relation.published)}\n{solved}")
    text = formula(step.solved, cells.of(step.operands))
    for use in step.regimes:
        if use.key in cells.by_key:
            text = f"IF({is_one_of(cells.by_key[use.key], use.outcomes)},{text},NA())"
    size = double_size(step.value, step.double_error)
    page.formula(row, STEP_VALUE, text, step.value, page.value_style(step.value), size)
