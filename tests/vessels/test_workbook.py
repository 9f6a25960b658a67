"""Integrals in the workbook: sums that follow their inputs, also in the search for a root."""

from __future__ import annotations

import io
import re
from collections.abc import Sequence
from pathlib import Path

import openpyxl
import pytest

from calcsheets.checking import check_record, check_workbook, require_same_values
from calcsheets.record import Record
from calcsheets.sheets.workbook import make_workbook
from tests.sheets.recalculating import by_ironcalc, by_libreoffice, input_cells, with_cells
from tests.vessels.briefs import calculated, filling, let_down, result

TO = "'p_0@emptied' = { unit = 'bar(a)', digits = 12 }"
FROM = "'p_0@receiver' = { unit = 'bar(a)', digits = 12 }"

# Text, the changed input, its new number, and its new text: within a regime and across them.
CASES = {
    "time": (let_down("adiabatic"), "p_0@receiver", 12.5, "12.5 bar(a)"),
    "time, now never choked": (let_down("isothermal"), "p_0@receiver", 2.2, "2.2 bar(a)"),
    "time, now choked throughout": (let_down("adiabatic"), "p@header", 0.6, "0.6 bar(a)"),
    "time of a filling": (filling("adiabatic"), "p_0@filled", 7.5, "7.5 bar(a)"),
    "filling, now choked throughout": (filling("isothermal"), "p_0@filled", 4.1, "4.1 bar(a)"),
    "filling, now never choked": (filling("isothermal"), "p_0@receiver", 6.0, "6 bar(a)"),
    "area": (
        let_down("isothermal", A="", t="t = '900 s'", wanted="'A@orifice' = { unit = 'mm2' }"),
        "t@change", 850.0, "850 s",
    ),
    "end": (let_down("isothermal", p_2="", t="t = '900 s'", wanted=TO), "t@change", 850.0, "850 s"),
    "end of an adiabatic one": (
        let_down("adiabatic", p_2="", t="t = '700 s'", wanted=TO), "A@orifice", 52.0, "52 mm2",
    ),
    "start": (
        let_down("adiabatic", p_1="", t="t = '700 s'", wanted=FROM), "p@header", 1.15, "1.15 bar(a)"
    ),
    "end, never choked": (
        let_down("adiabatic", p_1="p_0 = '2 bar(a)'", p_2="", t="t = '90 s'", wanted=TO),
        "p_0@receiver", 2.05, "2.05 bar(a)",
    ),
}  # fmt: skip


def changed(name: str) -> tuple[Record, Record, bytes]:
    """The record, the record of the changed brief, and the workbook with the change typed in."""
    text, key, number, typed = CASES[name]
    record = calculated(text)
    content = make_workbook(record).content
    cell = input_cells(content)[[item.key for item in record.inputs].index(key)]
    return record, calculated(text, **{key: typed}), with_cells(content, {cell: number})


@pytest.mark.parametrize("name", CASES)
def test_the_second_engine_finds_what_the_record_says(name: str) -> None:
    record = calculated(CASES[name][0])
    book = make_workbook(record)
    assert require_same_values(book.content, book.formulas) == len(book.formulas)
    findings = (*check_record(record), *check_workbook(book.content, record))
    assert "failed" not in {finding.verdict for finding in findings}


def test_a_changed_input_gives_what_a_changed_brief_gives(tmp_path: Path) -> None:
    """By both engines, within 1e-9 relative."""
    cases = {f"c{number}": changed(name) for number, name in enumerate(CASES)}
    office = by_libreoffice({name: book for name, (_, _, book) in cases.items()}, tmp_path)
    for name, (record, other, book) in cases.items():
        assert result(other) != pytest.approx(result(record), rel=1e-3)
        for engine in (by_ironcalc(book, tmp_path), office[name]):
            assert engine["1"] == pytest.approx(result(other), rel=1e-9), name


def sheet(record: Record) -> openpyxl.worksheet.worksheet.Worksheet:
    book = openpyxl.load_workbook(io.BytesIO(make_workbook(record).content), data_only=True)
    assert book.sheetnames[-3:] == ["Integrals", "Routes", "References"]
    return book["Integrals"]


def same(shown: Sequence[object], kept: Sequence[float]) -> None:
    """The file keeps sixteen digits of a number."""
    assert list(shown) == pytest.approx(list(kept), rel=1e-15)


def test_a_closed_form_shows_one_row_for_each_place() -> None:
    record = calculated(let_down("adiabatic", wanted=TIME_AND_REGIMES))
    (item,) = record.steps[-1].integrals
    rows = list(sheet(record).iter_rows(min_row=4, values_only=True))
    assert rows[0][0].startswith("Step 3: t, change: ∫[√(1 − (p_b/p_0,2)^((γ − 1)/γ)) to ")
    assert rows[1][:8] == (
        "Place", "Weight", "Variable", "Integrand", "Weight times integrand", "Lower limit",
        "Upper limit", "Integral",
    )  # fmt: skip
    for row, node in zip(rows[2:18], item.nodes, strict=True):
        same(row[:4], (node.place, node.weight, node.at, node.height))
    same(rows[2][5:8], (item.low, item.high, item.total))


TIME_AND_REGIMES = """
't@change' = { unit = 's' }
'regime@change' = {}
"""


def test_the_form_of_another_regime_stands_ready() -> None:
    record = calculated(let_down("isothermal", p_2="p_0 = '3 bar(a)'"))
    step = record.steps[-1]
    outcomes = [
        tuple(" or ".join(use.outcomes) for use in other.regimes) for other in step.alternatives
    ]
    assert outcomes == [
        ("unchoked at the end", "choked"),
        ("unchoked at the end", "not choked"),
    ]
    titles = [row[0] for row in sheet(record).iter_rows(values_only=True)
              if str(row[0]).startswith("Step")]  # fmt: skip
    assert [re.findall("if (.*?):", title) for title in titles] == [
        ["unchoked at the end and choked"],
        ["unchoked at the end and not choked"],
    ]


def test_a_root_shows_one_row_of_places_for_each_trial() -> None:
    record = calculated(CASES["end"][0])
    step = next(step for step in record.steps if step.method == "root")
    rows = list(sheet(record).iter_rows(min_row=4, values_only=True))
    (item,) = step.integrals
    same(rows[1][4:20], [node.place for node in item.nodes])
    same(rows[2][4:20], [node.weight for node in item.nodes])
    trials = rows[4 : 4 + 1 + len(step.halvings)]
    same(trials[0][:1], [step.halvings[0].low])
    for row, halving in zip(trials[1:], step.halvings, strict=True):
        (found,) = halving.integrals
        same(row[:2], ((halving.low + halving.high) / 2, found.low))
        same(row[2:4], (found.high, found.total))
        same(row[4:20], found.heights)
    assert trials[-1][3] == pytest.approx(item.total, rel=1e-12)


def test_a_record_without_integrals_has_no_such_sheet() -> None:
    record = calculated(filling("isothermal"))
    book = openpyxl.load_workbook(io.BytesIO(make_workbook(record).content))
    assert "Integrals" not in book.sheetnames
