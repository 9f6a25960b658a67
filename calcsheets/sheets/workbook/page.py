"""One sheet of the workbook: styles, headings and cells, set up for printing."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass
from decimal import Decimal
from math import ceil
from typing import Any

from ...record import Record
from .cells import FIRST_ROW

VALUE_DIGITS = 8
_CHARACTERS_PER_WIDTH = 1.05  # characters of the sheet's font in one unit of column width
_LINE_HEIGHT = 12  # points

_INK = "#1a1a1a"
_RULE = "#8c8c8c"
_SHADE = "#ececec"
_INPUT_SHADE = "#fff8dc"
_BASE = {"font_name": "Arial", "font_size": 9, "font_color": _INK, "valign": "top"}
_CELL = {**_BASE, "border": 1, "border_color": _RULE, "text_wrap": True}
_PAPERS = {"A4": 9, "letter": 1}


@dataclass(frozen=True)
class Styles:
    """Cell styles, made once for a workbook."""

    title: Any
    note: Any
    heading: Any
    text: Any
    strong: Any
    number: Any
    change: Any


def make_styles(book: Any) -> Styles:
    """Return the styles of a workbook."""
    base, cell = _BASE, _CELL
    return Styles(
        title=book.add_format({**base, "font_size": 14, "bold": True, "text_wrap": False}),
        note=book.add_format({**base, "italic": True, "text_wrap": False}),
        heading=book.add_format({**cell, "bold": True, "bg_color": _SHADE}),
        text=book.add_format(cell),
        strong=book.add_format({**cell, "bold": True}),
        number=book.add_format({**cell, "num_format": "General", "align": "right"}),
        change=book.add_format({**cell, "num_format": "0.0E+00", "align": "right"}),
    )


def value_format(value: float, digits: int) -> str:
    """Return the number format that shows a value with so many significant digits."""
    if value == 0:
        return "0"
    exponent = Decimal(value).adjusted()
    if not -4 < exponent < 7:
        return "0." + "0" * (digits - 1) + "E+00" if digits > 1 else "0E+00"
    decimals = max(0, digits - 1 - exponent)
    return "0." + "0" * decimals if decimals else "0"


def typed_style(book: Any, number_format: str) -> Any:
    """Return the style of a cell that is meant to be changed."""
    return book.add_format(
        {
            **_CELL,
            "locked": False,
            "bg_color": _INPUT_SHADE,
            "align": "right",
            "num_format": number_format,
        }
    )


@dataclass(frozen=True)
class Column:
    """A column: heading and width in characters."""

    heading: str
    width: float


@dataclass(frozen=True)
class FormulaCell:
    """A formula as written, for whoever recalculates the workbook.

    Attributes:
        sheet: name of the sheet.
        row: row, from 0.
        column: column, from 0.
        value: the value that was stored with it.
        scale: size against which a difference counts, where the value itself may be zero, or
            is known in double arithmetic to fewer digits.
    """

    sheet: str
    row: int
    column: int
    value: float | str
    scale: float


def double_size(value: float, error: float) -> float:
    """Return the size against which a difference of 1e-12 is no more than double arithmetic errs.

    Args:
        value: the value.
        error: bound on its absolute error in double arithmetic.
    """
    return max(abs(value), error * 1e12)


class Page:
    """A sheet under construction. Texts are always written as text, never as formulas."""

    def __init__(self, book: Any, styles: Styles, name: str, record: Record, paper: str) -> None:
        self.sheet = book.add_worksheet(name)
        self.book = book
        self.styles = styles
        self.name = name
        self.formulas: list[FormulaCell] = []
        self._widths: dict[int, float] = {}
        self._lines: dict[int, int] = {}
        sheet = self.sheet
        sheet.hide_gridlines(2)
        sheet.set_landscape()
        sheet.set_paper(_PAPERS[paper])
        sheet.set_margins(left=0.5, right=0.5, top=0.8, bottom=0.7)
        sheet.fit_to_pages(1, 0)
        identity = f"{_header(record.field('number'))} rev {_header(record.field('revision'))}"
        sheet.set_header(f"&L&9{_header(record.field('title'))}&R&9{identity}")
        sheet.set_footer(f"&L&9{name}&C&9In preparation - not checked, not signed&R&9&P of &N")
        sheet.protect("", {"format_columns": True, "format_rows": True})

    def table(self, title: str, note: str, columns: Sequence[Column]) -> None:
        """Write title, note and the heading row of a table."""
        self.heading(title, note, columns)
        self.sheet.set_row(FIRST_ROW - 1, 2 * _LINE_HEIGHT + 2)
        for index, column in enumerate(columns):
            self.sheet.write_string(FIRST_ROW - 1, index, column.heading, self.styles.heading)
        self.sheet.freeze_panes(FIRST_ROW, 2)
        self.sheet.repeat_rows(FIRST_ROW - 1)

    def heading(self, title: str, note: str, columns: Sequence[Column]) -> None:
        """Write title and note, and set the widths of columns."""
        self.sheet.write_string(0, 0, title, self.styles.title)
        self.note(1, note)
        for index, column in enumerate(columns):
            self.width(index, column.width)

    def note(self, row: int, text: str) -> None:
        """Write a line of text across the sheet."""
        self.sheet.write_string(row, 0, text, self.styles.note)

    def width(self, column: int, width: float) -> None:
        """Set the width of a column, in characters."""
        self._widths[column] = width
        self.sheet.set_column(column, column, width)

    def text(self, row: int, column: int, text: str, style: Any = None) -> None:
        """Write a text as text, and make its row high enough for it."""
        self.sheet.write_string(row, column, text, style or self.styles.text)
        room = max(1.0, self._widths.get(column, 1000.0) * _CHARACTERS_PER_WIDTH)
        lines = sum(max(1, ceil(len(part) / room)) for part in text.split("\n"))
        if lines > self._lines.get(row, 1):
            self._lines[row] = lines
            self.sheet.set_row(row, lines * _LINE_HEIGHT + 2)

    def value(self, row: int, column: int, value: float, digits: int = VALUE_DIGITS) -> None:
        """Write a number with so many significant digits."""
        self.number(row, column, value, self.value_style(value, digits))

    def value_style(self, value: float, digits: int = VALUE_DIGITS) -> Any:
        """Return the style that shows a value with so many significant digits."""
        return self.book.add_format(
            {**_CELL, "align": "right", "num_format": value_format(value, digits)}
        )

    def number(self, row: int, column: int, value: float, style: Any = None) -> None:
        """Write a number."""
        self.sheet.write_number(row, column, value, style or self.styles.number)

    def formula(
        self,
        row: int,
        column: int,
        formula: str,
        value: float | str,
        style: Any = None,
        scale: float = 0.0,
    ) -> None:
        """Write a formula with the value that it has."""
        self.sheet.write_formula(row, column, f"={formula}", style or self.styles.number, value)
        self.formulas.append(FormulaCell(self.name, row, column, value, scale))

    def change(self, row: int, column: int, value: str, issued: str, size: float) -> None:
        """Write by how much a cell differs from the value as issued, over its size."""
        over = repr(max(size, 1e-300)).replace("e", "E")
        change = f"ABS({value}-{issued})/{over}"
        self.formula(row, column, change, 0.0, self.styles.change, scale=1.0)

    def changed(self, row: int, column: int, value: str, issued: str) -> None:
        """Write 1 if a word differs from the word as issued, else 0."""
        self.formula(row, column, f"IF({value}={issued},0,1)", 0.0, self.styles.change, scale=1.0)


def _header(text: str) -> str:
    """A header code begins with an ampersand: doubled, it is text."""
    return text.replace("&", "&&")[:80]
