"""The sheet as HTML, and the HTML as PDF/A-3a with the same bytes for the same record."""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from contextlib import nullcontext
from dataclasses import dataclass
from datetime import UTC, datetime
from io import BytesIO
from pathlib import Path
from types import MappingProxyType
from typing import Any, Literal

from ...errors import DefinitionError
from ...files import write_whole
from ...record import Record
from ..templates import template_environment, templates_folder
from . import views
from .cards import cards
from .courses import course_tables
from .routes import route_lines


@dataclass(frozen=True)
class Paper:
    """A size of paper.

    Attributes:
        size: width and height for the style sheet.
        column: width for equations, in points.
    """

    size: str
    column: float


# The column is what the style sheet leaves: margins 20 and 16 mm, labels 23 mm, numbers 11 mm.
PAPERS: Mapping[str, Paper] = MappingProxyType(
    {
        "A4": Paper("210mm 297mm", (210 - 70) / 25.4 * 72),
        "letter": Paper("8.5in 11in", (8.5 - 70 / 25.4) * 72),
    }
)


@dataclass(frozen=True)
class Attachment:
    """A file to be carried inside the PDF.

    Attributes:
        name: file name.
        content: its bytes.
        description: what it is, in words.
        relationship: what it is to the PDF.
        mime: media type, such as ``application/json``.
    """

    name: str
    content: bytes
    description: str
    relationship: Literal["Alternative", "Data", "Source"]
    mime: str


def render_html(record: Record, paper: str = "A4") -> str:
    """Return the sheet as HTML that is also well-formed XML.

    Args:
        record: the record.
        paper: ``A4`` or ``letter``.

    Raises:
        DefinitionError: if the paper is not known.
        OutputError: if the templates are missing.
    """
    size = _paper(paper)
    template = template_environment().get_template("sheet.html")
    return template.render(
        record=record,
        field=record.field,
        page_size=size.size,
        status=views.STATUS,
        not_addressed=views.NOT_ADDRESSED,
        support=views.SUPPORT,
        results=views.result_lines(record),
        inputs=views.input_lines(record),
        relation_assumptions=views.assumption_lines(record),
        cards=cards(record, size.column),
        courses=course_tables(record, size.column),
        outside=tuple(step for step in record.steps if not step.within_limits),
        routes=route_lines(record, size.column),
        checks=views.check_lines(record),
        sources=views.source_lines(record),
    )


def write_pdf(
    record: Record, path: Path, paper: str = "A4", attachments: Sequence[Attachment] = ()
) -> None:
    """Write the sheet as PDF/A-3a.

    Args:
        record: the record.
        path: the file to write.
        paper: ``A4`` or ``letter``.
        attachments: files to be carried inside; two of the same content need one relationship.

    Raises:
        DefinitionError: if the paper is not known.
        OutputError: if the file cannot be written, or the templates are missing.
    """
    write_whole(path, pdf_bytes(record, paper, attachments))


def pdf_bytes(record: Record, paper: str = "A4", attachments: Sequence[Attachment] = ()) -> bytes:
    """Return the sheet as PDF/A-3a; arguments and errors as for :func:`write_pdf`."""
    # The import is slow, and only printing needs it.
    import weasyprint

    from .fetching import FontFetcher

    folder = templates_folder()
    fetcher = FontFetcher(folder / "fonts")
    base = folder.as_uri() + "/"
    fonts = weasyprint.text.fonts.FontConfiguration()
    style = weasyprint.CSS(
        string=(folder / "sheet.css").read_text(encoding="utf-8"),
        base_url=base,
        url_fetcher=fetcher,
        font_config=fonts,
    )
    html = weasyprint.HTML(string=render_html(record, paper), base_url=base, url_fetcher=fetcher)
    content: bytes = html.write_pdf(
        stylesheets=[style],
        font_config=fonts,
        attachments=[_attached(item, _date(record)) for item in attachments],
        pdf_variant="pdf/a-3a",
        full_fonts=True,
        pdf_identifier=bytes.fromhex(record.digest)[:16],
        finisher=_each_file_once,
    )
    return content


def _paper(name: str) -> Paper:
    if name not in PAPERS:
        raise DefinitionError(f'paper "{name}"', f"the sheet is set up for {', '.join(PAPERS)}")
    return PAPERS[name]


def _date(record: Record) -> datetime:
    """The date of the revision: a clock would give other bytes on every run."""
    return datetime.strptime(record.field("date"), "%Y-%m-%d").replace(tzinfo=UTC)


def _attached(item: Attachment, date: datetime) -> Any:
    import weasyprint

    attachment = weasyprint.Attachment(
        string=item.content,
        name=item.name,
        description=item.description,
        created=date,
        modified=date,
        relationship=item.relationship,
    )
    # The composer would guess the media type from tables that differ between machines.
    attachment.source = nullcontext((BytesIO(item.content), None, None, item.mime))
    return attachment


def _each_file_once(document: object, pdf: Any) -> None:
    """Name each attached file once among the associated files; the composer names it twice."""
    if "AF" in pdf.catalog:
        pdf.catalog["AF"][:] = list(dict.fromkeys(pdf.catalog["AF"]))
