"""Two spreadsheet engines at work on our workbooks, from outside."""

from __future__ import annotations

import io
import re
import subprocess
import zipfile
from collections.abc import Mapping
from pathlib import Path

import ironcalc
import openpyxl

from tests.conftest import require_program

# Without this setting the program shows the values stored in the file and calculates nothing.
_RECALCULATE = """<?xml version="1.0" encoding="UTF-8"?>
<oor:items xmlns:oor="http://openoffice.org/2001/registry"
 xmlns:xs="http://www.w3.org/2001/XMLSchema" xmlns:xsi="http://www.w3.org/2001/XMLSchema-instance">
<item oor:path="/org.openoffice.Office.Calc/Formula/Load">
<prop oor:name="OOXMLRecalcMode" oor:op="fuse"><value>0</value></prop></item>
</oor:items>
"""

Values = dict[str, object]


def input_cells(content: bytes) -> list[str]:
    """The cells of the inputs, in the order of the record."""
    sheet = openpyxl.load_workbook(io.BytesIO(content))["Inputs"]
    return [cell.coordinate for (cell,) in sheet["E5:E999"] if cell.value is not None]


def with_cells(content: bytes, changes: Mapping[str, float]) -> bytes:
    """The workbook with other numbers typed into cells of the sheet Inputs; nothing else."""
    book = openpyxl.load_workbook(io.BytesIO(content), read_only=True)
    path = f"xl/worksheets/sheet{book.sheetnames.index('Inputs') + 1}.xml"
    target = io.BytesIO()
    with zipfile.ZipFile(io.BytesIO(content)) as old, zipfile.ZipFile(target, "w") as new:
        for item in old.infolist():
            data = old.read(item)
            if item.filename == path:
                text = data.decode()
                for cell, value in changes.items():
                    text, count = re.subn(
                        rf'(<c r="{cell}"[^>]*><v>)[^<]*(</v>)', rf"\g<1>{value!r}\g<2>", text
                    )
                    assert count == 1, f"cell {cell} was not found"
                data = text.encode()
            new.writestr(item, data)
    return target.getvalue()


def by_ironcalc(content: bytes, folder: Path) -> Values:
    """Values of the sheet Results by IronCalc, by number of the result."""
    path = folder / "iron.xlsx"
    path.write_bytes(content)
    model = ironcalc.load_from_xlsx(str(path), "en", "UTC", "en")
    model.evaluate()
    names = [sheet["name"] for sheet in model.get_worksheets_properties()]
    index, found, row = names.index("Results"), {}, 5
    while model.get_cell_value(index, row, 2) not in (None, ""):
        found[str(model.get_cell_value(index, row, 1))] = model.get_cell_value(index, row, 5)
        row += 1
    return {number.removesuffix(".0"): value for number, value in found.items()}


def by_libreoffice(contents: Mapping[str, bytes], folder: Path) -> dict[str, Values]:
    """Values of the sheet Results of several workbooks by LibreOffice, calculated anew."""
    program = require_program("soffice")
    profile, source, target = folder / "profile", folder / "in", folder / "out"
    (profile / "user").mkdir(parents=True)
    (profile / "user" / "registrymodifications.xcu").write_text(_RECALCULATE)
    source.mkdir()
    for name, content in contents.items():
        (source / f"{name}.xlsx").write_bytes(content)
    subprocess.run(
        [
            program,
            f"-env:UserInstallation={profile.as_uri()}",
            "--headless",
            "--convert-to",
            "xlsx:Calc MS Excel 2007 XML",
            "--outdir",
            str(target),
            *(str(source / f"{name}.xlsx") for name in contents),
        ],
        check=True,
        capture_output=True,
        timeout=300,
    )
    found = {}
    for name in contents:
        sheet = openpyxl.load_workbook(target / f"{name}.xlsx", data_only=True)["Results"]
        found[name] = {
            str(row[0]): row[4] for row in sheet.iter_rows(min_row=5, values_only=True) if row[0]
        }
    return found
