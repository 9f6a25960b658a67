"""The sheet of the calculation: one row for each step, each a live formula."""

from __future__ import annotations

from collections.abc import Mapping, Sequence, Set

from ...expressions import Condition, Equation, Expr, Integral, Symbol
from ...record import LimitRecord, Operand, Record, RegimeUse, StepRecord
from ..typesetting import plain_text, symbol_text, test_text, unit_text
from .cells import CALCULATION, FIRST_ROW, STEP_VALUE, Cells, reference
from .formula import comparison, decision, formula, is_one_of, joined
from .page import Column, Page, double_size

_COLUMNS = (
    Column("No.", 5),
    Column("Quantity", 22),
    Column("Symbol", 7),
    Column("Place", 19),
    Column("Value", 14),
    Column("SI unit", 9),
    Column("Relation and its source", 40),
    Column("As published, and solved for the quantity", 54),
    Column("Limits", 20),
    Column("Within limits", 9),
    Column("Value as issued", 14),
    Column("Changed by", 9),
)
_WITHIN, _ISSUED, CHANGE = 9, 10, 11
ROOT_TEXT = "root on the sheet Roots"


Closed = Mapping[tuple[int, int], Mapping[Integral, str]]


def write_calculation(
    page: Page, record: Record, cells: Cells, roots: Mapping[int, str], integrals: Closed
) -> None:
    """Write one row for each step.

    Args:
        page: the sheet.
        record: the record.
        cells: where every quantity stands.
        roots: cell of the converged root, by number of its step.
        integrals: cells of integrals, by number of the step and of its alternative, 0 for none.
    """
    page.table(
        "Calculation",
        "Every value is a formula of the cells it names. #N/A: the regime has changed to one "
        "for which this sheet holds no relation; prepare the brief again.",
        _COLUMNS,
    )
    assumed = {step.key for step in record.steps if step.test and step.test.assumed}
    for index, step in enumerate(record.steps):
        value = (
            _test_formula(step, cells)
            if step.test
            else _value_formula(step, cells, roots, integrals, assumed)
        )
        _row(page, FIRST_ROW + index, record, step, cells, value)


def _row(
    page: Page,
    row: int,
    record: Record,
    step: StepRecord,
    cells: Cells,
    text: str,
) -> None:
    relation = record.relation(step.relation)
    page.number(row, 0, step.number)
    page.text(row, 1, "regime" if step.test else step.title)
    page.text(row, 2, symbol_text(step.symbol))
    page.text(row, 3, step.place)
    page.text(row, 5, unit_text(step.unit) if step.unit else "")
    page.text(row, 6, f"{relation.title}\n{relation.source}")
    together = [plain_text(member.published) for member in step.combination]
    own = [] if step.test else [plain_text(relation.published)]
    shown = [*together, *own, _solved_text(step)]
    page.text(row, 7, "\n".join(shown))
    page.text(row, 8, "; ".join(plain_text(limit.condition) for limit in step.limits))
    value = reference(CALCULATION, row, STEP_VALUE)
    issued = reference(CALCULATION, row, _ISSUED)
    if step.test is not None:
        page.formula(row, STEP_VALUE, text, step.test.outcome, page.styles.strong)
        page.text(row, _WITHIN, "")
        page.text(row, _ISSUED, step.test.outcome)
        page.changed(row, CHANGE, value, issued)
        return
    found = step.value or 0.0
    size = double_size(found, step.double_error)
    page.formula(row, STEP_VALUE, text, found, page.value_style(found), size)
    _write_limits(page, row, step, cells)
    page.value(row, _ISSUED, found)
    page.change(row, CHANGE, value, issued, size)


def _solved_text(step: StepRecord) -> str:
    if step.test is not None:
        return test_text(step.test)
    if step.solved is None:
        return ROOT_TEXT
    return plain_text(Equation(step.symbol, step.solved))


def _test_formula(step: StepRecord, cells: Cells) -> str:
    test = step.test
    if test is None:
        raise ValueError(f"step {step.number} is no regime test")
    text = f'"{test.otherwise}"'
    for case in reversed(test.cases):
        holds = decision(case.condition, cells.of(step.operands), test.equal_within)
        text = f'IF({holds},"{case.outcome}",{text})'
    return text


def _value_formula(
    step: StepRecord,
    cells: Cells,
    roots: Mapping[int, str],
    integrals: Closed,
    assumed: Set[str],
) -> str:
    """The live formula of a step.

    A regime that was assumed and confirmed afterwards follows from the step itself and cannot
    switch it without a circle; the results watch such a regime.
    """

    def closed(solved: Expr, operands: Sequence[Operand], number: int) -> str:
        own = integrals.get((step.number, number), {})
        return formula(solved, cells.of(operands), integrals=own)

    def holds(uses: Sequence[RegimeUse]) -> str:
        watched = [use for use in uses if use.key in cells.by_key and use.key not in assumed]
        return joined("AND", [is_one_of(cells.by_key[use.key], use.outcomes) for use in watched])

    text = roots[step.number] if step.solved is None else closed(step.solved, step.operands, 0)
    if not holds(step.regimes):
        return text
    taken = {use.key: use.outcomes for use in step.regimes if use.key in assumed}
    other = "NA()"
    for number, alternative in enumerate(step.alternatives, start=1):
        if all(
            set(taken.get(use.key, use.outcomes)) & set(use.outcomes) for use in alternative.regimes
        ):
            value = closed(alternative.solved, alternative.operands, number)
            other = f"IF({holds(alternative.regimes)},{value},{other})"
    return f"IF({holds(step.regimes)},{text},{other})"


def _write_limits(page: Page, row: int, step: StepRecord, cells: Cells) -> None:
    known = {
        **cells.of((*step.operands, *step.limit_operands)),
        step.symbol: cells.by_key[step.key],
    }
    conditions = [
        comparison(limit.condition, known) for limit in step.limits if _evaluable(limit, known)
    ]
    if not conditions:
        page.text(row, _WITHIN, "no limits" if not step.limits else "not evaluated")
        return
    shown = "yes" if step.within_limits else "no"
    page.formula(row, _WITHIN, f'IF(AND({",".join(conditions)}),"yes","no")', shown)


def _evaluable(limit: LimitRecord, known: Mapping[Symbol, str]) -> bool:
    condition: Condition = limit.condition
    return set(condition.symbols) <= set(known)
