"""The command that checks a package."""

from __future__ import annotations

from pathlib import Path

import typer

from ..checking import Finding, check_record, check_workbook
from ..errors import OutputError
from ..record import read_record
from .app import DONE, MISSED
from .output import print_json, print_table, working


def check(folder: Path, json: bool) -> int:
    """Check the record and the workbook of a package and say what was found."""
    record_file, workbook_file = _files(folder)
    with working("checking"):
        record = read_record(record_file.read_bytes())
        findings = (*check_record(record), *check_workbook(workbook_file.read_bytes(), record))
    failed = [finding for finding in findings if finding.verdict == "failed"]
    if json:
        print_json({"digest": record.digest, "findings": [_facts(f) for f in findings]})
    else:
        rows = [(f.part, f.key, f.verdict, f.reason) for f in findings]
        print_table(f"Check of {record_file.name}", ("part", "quantity", "verdict", "reason"), rows)
        passed = sum(finding.verdict == "passed" for finding in findings)
        open_ones = len(findings) - passed - len(failed)
        left = f", {open_ones} not possible" if open_ones else ""
        typer.echo(f"{passed} of {len(findings)} passed{left}; record {record.digest}")
    return MISSED if failed else DONE


def _files(folder: Path) -> tuple[Path, Path]:
    """The record and the workbook of a package."""
    records = sorted(folder.glob("*.json")) if folder.is_dir() else []
    workbooks = sorted(folder.glob("*.xlsx")) if folder.is_dir() else []
    if len(records) != 1 or len(workbooks) != 1:
        raise OutputError(
            str(folder),
            f"there is no package here: {len(records)} files *.json, {len(workbooks)} files *.xlsx",
            "Name the folder that calcsheets prepare wrote",
        )
    return records[0], workbooks[0]


def _facts(finding: Finding) -> dict[str, str]:
    return {
        "part": finding.part,
        "key": finding.key,
        "verdict": finding.verdict,
        "reason": finding.reason,
    }
