"""A package holds one calculation in all its forms, and the same brief gives the same bytes."""

from __future__ import annotations

import os
import subprocess
import sys
from pathlib import Path

import pikepdf
import pytest

import calcsheets
from calcsheets.errors import CheckError
from calcsheets.package import Package, file_name
from calcsheets.record import read_record
from tests.conftest import ROOT

LETDOWN = ROOT / "examples" / "receiver-letdown.toml"


@pytest.fixture(scope="module")
def package(tmp_path_factory: pytest.TempPathFactory) -> Package:
    brief = calcsheets.read_brief(LETDOWN)
    return calcsheets.write_sheets(
        calcsheets.calculate(brief), tmp_path_factory.mktemp("package"), brief
    )


def test_the_record_in_the_package_is_the_record(package: Package) -> None:
    record = calcsheets.calculate(calcsheets.read_brief(LETDOWN))
    assert read_record(package.record.read_bytes()) == record


def test_the_brief_in_the_package_is_the_brief(package: Package) -> None:
    assert package.brief is not None
    assert package.brief.read_bytes() == LETDOWN.read_bytes()


def test_the_pdf_carries_workbook_record_and_brief(package: Package) -> None:
    with pikepdf.open(package.pdf) as pdf:
        attached = {name: item.get_file().read_bytes() for name, item in pdf.attachments.items()}
    assert package.brief is not None
    assert attached == {
        path.name: path.read_bytes() for path in (package.workbook, package.record, package.brief)
    }


def test_another_process_with_another_clock_and_language_writes_the_same_bytes(
    package: Package, tmp_path: Path
) -> None:
    code = (
        "import sys, calcsheets\n"
        "brief = calcsheets.read_brief(sys.argv[1])\n"
        "calcsheets.write_sheets(calcsheets.calculate(brief), sys.argv[2], brief)\n"
    )
    subprocess.run(
        [sys.executable, "-c", code, str(LETDOWN), str(tmp_path)],
        cwd=ROOT,
        env={**os.environ, "PYTHONHASHSEED": "7", "TZ": "Asia/Kolkata", "LC_ALL": "C"},
        check=True,
        timeout=120,
    )
    for path in (package.record, package.workbook, package.pdf):
        assert (tmp_path / path.name).read_bytes() == path.read_bytes(), path.name


def test_nothing_is_written_when_a_second_engine_disagrees(
    tmp_path: Path, monkeypatch: pytest.MonkeyPatch
) -> None:
    def disagree(*_: object) -> int:
        raise CheckError("IronCalc", "Calculation, row 5, column 5", "1.0", "2.0")

    monkeypatch.setattr("calcsheets.package.require_same_values", disagree)
    record = calcsheets.calculate(calcsheets.read_brief(LETDOWN))
    with pytest.raises(CheckError):
        calcsheets.write_sheets(record, tmp_path / "out")
    assert not (tmp_path / "out").exists()


def test_file_names_are_safe_on_every_system() -> None:
    text = LETDOWN.read_text()
    for number, name in (
        ("CS-0001", "CS-0001-A"),
        ("../../etc/passwd", "etc-passwd-A"),
        ("C:\\\\x|y", "C-x-y-A"),
        ("Ä/ß", "A"),
    ):
        brief = calcsheets.parse_brief(text.replace('number = "CS-0001"', f'number = "{number}"'))
        assert file_name(calcsheets.calculate(brief)) == name
