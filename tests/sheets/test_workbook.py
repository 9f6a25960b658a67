"""The workbook is alive: it says what the record says, and follows its inputs as a brief does."""

from __future__ import annotations

import io
import re
import zipfile
from decimal import Decimal
from pathlib import Path

import openpyxl
import pytest

import calcsheets
from calcsheets.checking import check_workbook, require_same_values
from calcsheets.errors import CheckError
from calcsheets.record import Record
from calcsheets.sheets.workbook import FormulaCell, make_workbook
from tests.conftest import EXAMPLES, ROOT
from tests.sheets.recalculating import by_ironcalc, by_libreoffice, input_cells, with_cells

# Functions of the first edition of ISO/IEC 29500, part 1, 18.17.7 (from memory).
ALLOWED = {
    "ABS", "ACOS", "AND", "ASIN", "ATAN", "COS", "EXP", "IF", "LN", "MAX", "NA", "PI", "POWER",
    "SIN", "SQRT", "TAN",
}  # fmt: skip

NOZZLE = """
[calculation]
number = "T-1"
revision = "0"
date = "2026-01-02"
title = "=1+1"
purpose = "@x"
originator = "-1"
firm = "+A1"
client = "a\\tb"

[gas]
name = "air"

[stations.throat]
p_0 = "5 bar(a)"
T_0 = "300 K"
d = "20 mm"
M = "1"

[stations.exit]
title = "=HYPERLINK(1)"
d = "30 mm"
branch = "BRANCH"

[[path]]
name = "nozzle"
from = "throat"
to = "exit"
process = "isentropic flow"

[wanted]
"M@exit" = { digits = 6 }
"p@exit" = { unit = "bar(a)" }
"mdot@exit" = { unit = "kg/s" }
"""

ORIFICE = """
[calculation]
number = "T-2"
revision = "0"
date = "2026-01-02"
title = "Orifice"
purpose = "What flows?"
originator = "A"

[gas]
gamma = "1.4"
M_w = "28.97 g/mol"

[stations.upstream]
p_0 = "3 bar(a)"
T_0 = "20 °C"

[stations.downstream]
p = "1 bar(a)"

[[path]]
name = "orifice"
from = "upstream"
to = "downstream"
process = "orifice"
d = "10 mm"
C_d = "0.8"

[wanted]
"mdot@orifice" = { unit = "kg/h", at_least = "100 kg/h" }
"regime@orifice" = {}
"""


def parsed(text: str) -> Record:
    return calcsheets.calculate(calcsheets.parse_brief(text))


def expected(record: Record) -> dict[str, object]:
    return {str(r.number): r.state if r.value is None else r.value for r in record.results}


def agree(found: dict[str, object], record: Record) -> None:
    """Words are the same, numbers within 1e-9 relative."""
    for number, value in expected(record).items():
        if isinstance(value, str):
            assert found[number] == value, number
        else:
            assert found[number] == pytest.approx(value, rel=1e-9, abs=0), number
    assert set(found) == set(expected(record))


def changed_brief(path: Path) -> list[tuple[Record, bytes]]:
    """Each input of an example 3 % larger: by the brief, and typed into the workbook."""
    brief = calcsheets.read_brief(path)
    record = calcsheets.calculate(brief)
    content = make_workbook(record).content
    cases = []
    for item, cell in zip(record.inputs, input_cells(content), strict=True):
        number = Decimal(item.number_typed) * Decimal("1.03")
        text = f"{number} {item.unit_typed}".removesuffix(" 1")
        try:
            changed = calcsheets.calculate(brief, inputs={item.key: text})
        except calcsheets.CalcsheetsError as problem:
            pytest.fail(f"{item.key} = {text}: {problem}")
        cases.append((changed, with_cells(content, {cell: float(number)})))
    return cases


@pytest.mark.parametrize("path", EXAMPLES, ids=lambda path: path.stem)
def test_two_engines_find_what_the_record_says(path: Path, tmp_path: Path) -> None:
    record = calcsheets.calculate(calcsheets.read_brief(path))
    content = make_workbook(record).content
    agree(by_ironcalc(content, tmp_path), record)
    agree(by_libreoffice({"a": content}, tmp_path)["a"], record)


@pytest.mark.parametrize("path", EXAMPLES, ids=lambda path: path.stem)
def test_an_input_changed_in_the_workbook_gives_what_a_changed_brief_gives(
    path: Path, tmp_path: Path
) -> None:
    cases = changed_brief(path)
    by_office = by_libreoffice({f"c{i}": c for i, (_, c) in enumerate(cases)}, tmp_path)
    for index, (record, content) in enumerate(cases):
        agree(by_ironcalc(content, tmp_path), record)
        agree(by_office[f"c{index}"], record)


@pytest.mark.parametrize("branch", ["subsonic", "supersonic"])
@pytest.mark.parametrize("factor", [0.7, 0.97, 1.03, 1.5])
def test_a_root_converges_again_on_its_branch(branch: str, factor: float, tmp_path: Path) -> None:
    record = parsed(NOZZLE.replace("BRANCH", branch))
    content = make_workbook(record).content
    keys = [item.key for item in record.inputs]
    cell = input_cells(content)[keys.index("d@exit")]
    diameter = 30 * factor
    changed = parsed(NOZZLE.replace("BRANCH", branch).replace("30 mm", f"{diameter!r} mm"))
    agree(by_ironcalc(with_cells(content, {cell: diameter}), tmp_path), changed)


def test_a_regime_changes_in_the_workbook_as_in_the_brief(tmp_path: Path) -> None:
    content = make_workbook(parsed(ORIFICE)).content
    keys = [item.key for item in parsed(ORIFICE).inputs]
    cell = input_cells(content)[keys.index("p@downstream")]
    found = by_ironcalc(with_cells(content, {cell: 2.5}), tmp_path)
    unchoked = parsed(ORIFICE.replace('"1 bar(a)"', '"2.5 bar(a)"'))
    assert unchoked.results[1].state == "not choked"
    agree(found, unchoked)


def test_a_let_down_that_no_longer_stays_choked_is_followed_by_the_workbook(tmp_path: Path) -> None:
    """The time changes from a closed form to an integral, the orifice to no value at all."""
    brief = calcsheets.read_brief(ROOT / "examples/receiver-letdown.toml")
    record = calcsheets.calculate(brief)
    content = make_workbook(record).content
    keys = [item.key for item in record.inputs]
    cell = input_cells(content)[keys.index("p_g@header")]
    found = by_ironcalc(with_cells(content, {cell: 1.5}), tmp_path)
    changed = calcsheets.calculate(brief, inputs={"p_g@header": "1.5 bar(g)"})
    agree(found, changed)


def test_the_cover_says_whether_anything_was_changed(tmp_path: Path) -> None:
    record = parsed(ORIFICE)
    content = make_workbook(record).content
    cell = input_cells(content)[0]

    def cover(book: bytes) -> set[object]:
        import ironcalc

        path = tmp_path / "cover.xlsx"
        path.write_bytes(book)
        model = ironcalc.load_from_xlsx(str(path), "en", "UTC", "en")
        model.evaluate()
        rows = range(1, 40)
        return {model.get_cell_value(0, row, 2) for row in rows
                if str(model.get_cell_value(0, row, 1)).endswith("as issued")}  # fmt: skip

    assert cover(content) == {"yes"}
    assert cover(with_cells(content, {cell: 1.39})) == {"no: changed"}


def test_every_formula_has_its_value_stored() -> None:
    record = parsed(NOZZLE.replace("BRANCH", "subsonic"))
    content = make_workbook(record).content
    formulas = openpyxl.load_workbook(io.BytesIO(content))
    values = openpyxl.load_workbook(io.BytesIO(content), data_only=True)
    missing = [
        (sheet.title, cell.coordinate)
        for sheet in formulas
        for row in sheet.iter_rows()
        for cell in row
        if cell.data_type == "f" and values[sheet.title][cell.coordinate].value is None
    ]
    assert missing == []
    assert {finding.verdict for finding in check_workbook(content, record)} == {"passed"}


def test_only_functions_of_the_first_edition_of_the_standard_are_written() -> None:
    for text in (NOZZLE.replace("BRANCH", "supersonic"), ORIFICE):
        book = openpyxl.load_workbook(io.BytesIO(make_workbook(parsed(text)).content))
        formulas = [
            cell.value
            for sheet in book
            for row in sheet.iter_rows()
            for cell in row
            if cell.data_type == "f"
        ]
        used = set(re.findall(r"([A-Z][A-Z0-9.]*)\(", "".join(formulas)))
        assert used <= ALLOWED
        assert not any("^" in formula or "[" in formula for formula in formulas)


def test_text_of_the_user_stays_text() -> None:
    content = make_workbook(parsed(NOZZLE.replace("BRANCH", "subsonic"))).content
    cover = openpyxl.load_workbook(io.BytesIO(content))["Cover"]
    typed = {row[0].value: row[1] for row in cover.iter_rows() if row[0].value}
    for name, text in (
        ("Title", "=1+1"),
        ("Purpose", "@x"),
        ("Originator", "-1"),
        ("Firm", "+A1"),
        ("Client", "a\tb"),
    ):
        assert typed[name].value == text
        assert typed[name].data_type == "s"


def test_nothing_in_the_workbook_points_outside() -> None:
    content = make_workbook(parsed(NOZZLE.replace("BRANCH", "subsonic"))).content
    with zipfile.ZipFile(io.BytesIO(content)) as archive:
        for name in archive.namelist():
            text = archive.read(name).decode()
            assert 'TargetMode="External"' not in text
            assert "vbaProject" not in name
            assert "externalLink" not in name


def test_only_inputs_are_unlocked_and_each_is_validated() -> None:
    record = parsed(ORIFICE)
    book = openpyxl.load_workbook(io.BytesIO(make_workbook(record).content))
    unlocked = {
        (sheet.title, cell.coordinate)
        for sheet in book
        for row in sheet.iter_rows()
        for cell in row
        if not cell.protection.locked
    }
    cells = input_cells(make_workbook(record).content)
    assert unlocked == {("Inputs", cell) for cell in cells}
    assert all(sheet.protection.sheet for sheet in book)
    validated = {str(rule.sqref) for rule in book["Inputs"].data_validations.dataValidation}
    assert validated == set(cells)


@pytest.mark.parametrize(("paper", "code"), [("A4", "9"), ("letter", "1")])
def test_each_sheet_is_set_up_for_printing(paper: str, code: str) -> None:
    book = openpyxl.load_workbook(io.BytesIO(make_workbook(parsed(ORIFICE), paper).content))
    for sheet in book:
        assert str(sheet.page_setup.paperSize) == code
        assert sheet.page_setup.orientation == "landscape"
        assert "T-2 rev 0" in sheet.oddHeader.right.text
        assert "of &N" in sheet.oddFooter.right.text


def test_the_same_record_gives_the_same_bytes() -> None:
    record = parsed(ORIFICE)
    assert make_workbook(record).content == make_workbook(record).content


def test_a_value_that_a_second_engine_does_not_find_stops_the_run() -> None:
    book = make_workbook(parsed(ORIFICE))
    cell = next(c for c in book.formulas if c.sheet == "Calculation" and isinstance(c.value, float))
    wrong = FormulaCell(cell.sheet, cell.row, cell.column, cell.value * (1 + 1e-11), cell.scale)
    with pytest.raises(CheckError) as caught:
        require_same_values(book.content, [wrong])
    assert str(caught.value) == (
        f"Calculation, row {cell.row + 1}, column {cell.column + 1}: the program computed "
        f"{wrong.value}, IronCalc finds {cell.value}. The workbook was not written; report this "
        "as a fault of the program."
    )
