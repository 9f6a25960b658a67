"""A package: record, workbook and PDF of one calculation in one folder."""

from __future__ import annotations

import re
from dataclasses import dataclass
from pathlib import Path

from .brief import Brief
from .checking import require_same_values
from .files import make_folder, write_whole
from .record import Record, record_bytes
from .sheets.pdf import Attachment, pdf_bytes
from .sheets.workbook import make_workbook

PAPERS = ("A4", "letter")


@dataclass(frozen=True)
class Package:
    """Paths of the files of a package.

    Attributes:
        folder: the folder.
        record: canonical JSON.
        workbook: the live workbook.
        pdf: the sheet.
        brief: copy of the brief; ``None`` if it was not at hand.
    """

    folder: Path
    record: Path
    workbook: Path
    pdf: Path
    brief: Path | None


def write_sheets(
    record: Record, folder: str | Path, brief: Brief | None = None, paper: str = "A4"
) -> Package:
    """Write record, workbook and PDF of a calculation.

    Args:
        record: the record.
        folder: folder to write to; made if it is not there.
        brief: the brief, to be kept in the package.
        paper: ``A4`` or ``letter``.

    Returns:
        The paths. Nothing is written unless everything could be made.

    Raises:
        CheckError: if the second spreadsheet engine finds another value than the program.
        OutputError: if a file cannot be written.
    """
    workbook = make_workbook(record, paper)
    require_same_values(workbook.content, workbook.formulas)
    name = file_name(record)
    data = record_bytes(record)
    attachments = [
        Attachment(
            f"{name}.xlsx",
            workbook.content,
            "Live workbook of this calculation",
            "Alternative",
            "application/vnd.openxmlformats-officedocument.spreadsheetml.sheet",
        ),
        Attachment(f"{name}.json", data, "Record of this calculation", "Data", "application/json"),
    ]
    if brief is not None:
        attachments.append(
            Attachment(
                f"{name}.toml",
                brief.text.encode(),
                "Brief of this calculation",
                "Source",
                "application/toml",
            )
        )
    pdf = pdf_bytes(record, paper, attachments)
    target = Path(folder)
    make_folder(target)
    package = Package(
        folder=target,
        record=target / f"{name}.json",
        workbook=target / f"{name}.xlsx",
        pdf=target / f"{name}.pdf",
        brief=None if brief is None else target / f"{name}.toml",
    )
    if brief is not None and package.brief is not None:
        write_whole(package.brief, brief.text.encode())
    write_whole(package.record, data)
    write_whole(package.workbook, workbook.content)
    write_whole(package.pdf, pdf)
    return package


def file_name(record: Record) -> str:
    """Return the name of a package's files: number and revision, safe on every system."""
    text = f"{record.field('number')}-{record.field('revision')}"
    return re.sub(r"[^A-Za-z0-9._-]+", "-", text).strip("-.")[:80] or "calculation"
