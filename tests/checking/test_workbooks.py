"""A workbook that no longer is what was made is found out."""

from __future__ import annotations

import io
import re
import zipfile
from collections.abc import Callable

import pytest

import calcsheets
from calcsheets.checking import check_workbook
from calcsheets.record import Record
from calcsheets.sheets.workbook import make_workbook
from tests.conftest import ROOT


@pytest.fixture(scope="module")
def record() -> Record:
    return calcsheets.calculate(calcsheets.read_brief(ROOT / "examples/receiver-letdown.toml"))


def failures(record: Record, content: bytes) -> dict[str, str]:
    return {f.part: f.reason for f in check_workbook(content, record) if f.verdict != "passed"}


def edited(content: bytes, sheet: str, edit: Callable[[str], str]) -> bytes:
    """The workbook with the text of one sheet's file edited, as a program would write it."""
    names = ["Cover", "Results", "Inputs", "Assumptions", "Calculation", "References"]
    path = f"xl/worksheets/sheet{names.index(sheet) + 1}.xml"
    target = io.BytesIO()
    with zipfile.ZipFile(io.BytesIO(content)) as old, zipfile.ZipFile(target, "w") as new:
        for item in old.infolist():
            data = old.read(item)
            if item.filename == path:
                text = edit(data.decode())
                assert text != data.decode()
                data = text.encode()
            new.writestr(item, data)
    return target.getvalue()


def test_a_workbook_just_made_passes(record: Record) -> None:
    assert failures(record, make_workbook(record).content) == {}


def test_a_formula_replaced_by_its_number_is_found(record: Record) -> None:
    content = edited(
        make_workbook(record).content,
        "Calculation",
        lambda text: re.sub(r'(<c r="E10"[^>]*>)<f>[^<]*</f>', r"\1", text),
    )
    assert failures(record, content) == {
        "sheet Calculation": "row 10, column 5: another formula than was made"
    }


def test_a_formula_of_another_row_is_found(record: Record) -> None:
    content = edited(
        make_workbook(record).content,
        "Results",
        lambda text: text.replace("Calculation!$E$10", "Calculation!$E$12"),
    )
    assert failures(record, content)["sheet Results"].startswith(
        "row 6, column 5: another formula than was made"
    )


def test_a_stored_value_that_the_record_does_not_hold_is_found(record: Record) -> None:
    content = edited(
        make_workbook(record).content,
        "Calculation",
        lambda text: re.sub(r'(<c r="E10"[^>]*><f>[^<]*</f><v>)[^<]*', r"\g<1>0.5", text),
    )
    assert failures(record, content) == {
        "sheet Calculation": "row 10, column 5: another value stored than in the record"
    }


def test_an_input_typed_over_is_found_by_what_follows_from_it(record: Record) -> None:
    content = edited(
        make_workbook(record).content,
        "Inputs",
        lambda text: re.sub(r'(<c r="E8"[^>]*><v>)12(</v>)', r"\g<1>11\2", text),
    )
    found = failures(record, content)
    assert found["sheet Inputs"].startswith("row 8, column 7: IronCalc finds 1100000")
    assert "sheet Results" in found
