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
    record_file, workbook_file = _one(folder, "json"), _one(folder, "xlsx")
    with working("checking"):
        record = read_record(record_file.read_bytes())
        findings = (*check_record(record), *check_workbook(workbook_file.read_bytes()))
    failed = [finding for finding in findings if finding.verdict != "passed"]
    if json:
        print_json({"digest": record.digest, "findings": [_facts(f) for f in findings]})
    else:
        rows = [(f.part, f.key, f.verdict, f.reason) for f in findings]
        print_table(f"Check of {record_file.name}", ("part", "quantity", "verdict", "reason"), rows)
        typer.echo(
            f"{len(findings) - len(failed)} of {len(findings)} passed; record {record.digest}"
        )
    return MISSED if failed else DONE


def _one(folder: Path, suffix: str) -> Path:
    found = sorted(folder.glob(f"*.{suffix}")) if folder.is_dir() else []
    if len(found) != 1:
        raise OutputError(
            str(folder),
            f"there is no package here: {len(found)} files *.{suffix}",
            "Name the folder that calcsheets prepare wrote",
        )
    return found[0]


def _facts(finding: Finding) -> dict[str, str]:
    return {
        "part": finding.part,
        "key": finding.key,
        "verdict": finding.verdict,
        "reason": finding.reason,
    }
