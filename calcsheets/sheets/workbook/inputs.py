"""The sheet of inputs: the only cells that are meant to be changed."""

from __future__ import annotations

from decimal import Decimal
from fractions import Fraction
from typing import Any

from ...record import InputRecord, Record
from ..typesetting import symbol_text, unit_text
from .cells import FIRST_ROW, INPUT_SI, INPUT_TYPED, INPUTS, reference
from .formula import exact_number
from .page import Column, Page, typed_style

_COLUMNS = (
    Column("No.", 5),
    Column("Quantity", 24),
    Column("Symbol", 8),
    Column("Place", 22),
    Column("Value", 10),
    Column("Unit", 10),
    Column("In coherent SI", 13),
    Column("SI unit", 11),
    Column("Source", 32),
    Column("Tolerance", 10),
    Column("Status", 14),
    Column("Value as issued", 13),
    Column("Changed by", 9),
)
CHANGE = 12


def write_inputs(page: Page, record: Record, book: Any) -> None:
    """Write one row for each input."""
    page.table(
        "Design inputs",
        "Change only the shaded values, each in the unit beside it. Everything else follows.",
        _COLUMNS,
    )
    for index, item in enumerate(record.inputs):
        _row(page, book, FIRST_ROW + index, item)


def _row(page: Page, book: Any, row: int, item: InputRecord) -> None:
    page.number(row, 0, item.number)
    page.text(row, 1, item.title)
    page.text(row, 2, symbol_text(item.symbol))
    page.text(row, 3, item.place)
    page.number(row, INPUT_TYPED, float(item.number_typed), _typed_style(book, item))
    page.sheet.data_validation(row, INPUT_TYPED, row, INPUT_TYPED, _bounds(item))
    page.text(row, 5, unit_text(item.unit_typed))
    page.formula(row, INPUT_SI, _conversion(row, item), item.value, page.value_style(item.value))
    page.text(row, 7, unit_text(item.unit))
    page.text(row, 8, item.source or "no source stated")
    page.text(row, 9, item.tolerance)
    page.text(row, 10, item.status)
    page.value(row, 11, item.value)
    value = reference(page.name, row, INPUT_SI)
    issued = reference(page.name, row, 11)
    page.change(row, CHANGE, value, issued, abs(item.value))


def _typed_style(book: Any, item: InputRecord) -> Any:
    """Show as many decimals as were typed."""
    exponent = Decimal(item.number_typed).as_tuple().exponent
    decimals = -exponent if isinstance(exponent, int) and exponent < 0 else 0
    if decimals > 12 or "e" in item.number_typed.lower():
        return typed_style(book, "General")
    return typed_style(book, "0." + "0" * decimals if decimals else "0")


def _conversion(row: int, item: InputRecord) -> str:
    """Typed value times the unit's factor, plus the unit's zero."""
    text = reference(INPUTS, row, INPUT_TYPED)
    factor, offset = Fraction(item.factor), Fraction(item.offset)
    if factor != 1:
        text += f"*{exact_number(factor)}"
    text += "*PI()" * item.pi_power
    return text if offset == 0 else f"{text}+{exact_number(offset)}"


def _bounds(item: InputRecord) -> dict[str, Any]:
    factor, offset = float(Fraction(item.factor)), float(Fraction(item.offset))
    return {
        "validate": "decimal",
        "criteria": "between",
        "minimum": (item.low - offset) / factor,
        "maximum": (item.high - offset) / factor,
        "error_title": "Outside physical bounds",
        "error_message": f"{item.title}: check the number and its unit."[:250],
    }
