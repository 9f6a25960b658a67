"""The printed sheet: complete, legible, safe, archivable, and the same on every run."""

from __future__ import annotations

import os
import re
import subprocess
import sys
from collections.abc import Iterator, Mapping
from dataclasses import replace
from decimal import Decimal, localcontext
from pathlib import Path
from typing import Any
from xml.etree import ElementTree as ET

import pikepdf
import pytest

import calcsheets
from calcsheets.errors import DefinitionError, OutputError
from calcsheets.expressions import (
    Constant,
    Expr,
    Function,
    Negative,
    Number,
    Power,
    Product,
    Quotient,
    Root,
    Sum,
    Symbol,
    sqrt,
    symbols,
)
from calcsheets.record import Record
from calcsheets.sheets.pdf import PAPERS, Attachment, pdf_bytes, render_html, write_pdf
from calcsheets.sheets.pdf.fetching import FontFetcher
from calcsheets.sheets.pdf.figures import (
    conversion_html,
    equation_picture,
    result_html,
    working,
)
from calcsheets.sheets.pdf.picture import SMALLEST
from calcsheets.sheets.printable import printable
from calcsheets.sheets.templates import covered_characters, templates_folder
from calcsheets.sheets.typesetting import symbol_text
from tests.conftest import EXAMPLES, ROOT, require_program

LET_DOWN = ROOT / "examples" / "receiver-letdown.toml"
HOSTILE = Path(__file__).parent / "branch_and_shock.toml"
SVG = "{http://www.w3.org/2000/svg}"
ATTACHMENTS = (
    Attachment("sheet.xlsx", b"PK workbook", "The live workbook", "Alternative", "application/zip"),
    Attachment("record.json", b"{}", "The record", "Data", "application/json"),
    Attachment("brief.toml", b"[calculation]", "The brief", "Source", "application/toml"),
)


def record_of(brief: Path) -> Record:
    return calcsheets.calculate(calcsheets.read_brief(brief))


@pytest.fixture(scope="module")
def record() -> Record:
    return record_of(LET_DOWN)


@pytest.fixture(scope="module")
def sheet(record: Record) -> ET.Element:
    return ET.fromstring(render_html(record))


@pytest.fixture(scope="module")
def pdf(record: Record, tmp_path_factory: pytest.TempPathFactory) -> Path:
    path = tmp_path_factory.mktemp("pdf") / "sheet.pdf"
    write_pdf(record, path, attachments=ATTACHMENTS)
    return path


@pytest.fixture(scope="module")
def hostile() -> Record:
    return record_of(HOSTILE)


def text_of(path: Path) -> str:
    done = subprocess.run(
        [require_program("pdftotext"), "-layout", str(path), "-"],
        check=True,
        capture_output=True,
        text=True,
    )
    return done.stdout


def words(text: str) -> str:
    return re.sub(r"\s+", " ", text)


def all_text(element: ET.Element) -> str:
    """The text on paper: text alternatives of pictures are not printed."""
    if element.tag.startswith(SVG):
        return element.tail or ""
    inside = "".join(all_text(child) for child in element)
    return (element.text or "") + inside + (element.tail or "")


def of_class(element: ET.Element, name: str) -> Iterator[ET.Element]:
    return (found for found in element.iter() if name in found.get("class", "").split())


class TestTheSheetIsComplete:
    def test_every_result_is_found_in_the_text_with_its_unit(
        self, record: Record, pdf: Path
    ) -> None:
        text = words(text_of(pdf))
        for result in record.results:
            assert words(result_html(result).striptags()) in text, result.key

    def test_every_page_names_the_sheet_and_counts_the_pages(self, pdf: Path) -> None:
        pages = [words(page) for page in text_of(pdf).split("\f")[:-1]]
        assert len(pages) > 5
        for number, page in enumerate(pages, start=1):
            assert "CS-0001 rev. A" in page
            assert "Let-down of nitrogen receiver V-101" in page
            assert f"page {number} of {len(pages)}" in page
            assert "In preparation – not checked, not signed" in page

    def test_a_search_for_a_plain_word_is_not_defeated_by_ligatures(self, pdf: Path) -> None:
        assert "orifice" in text_of(pdf)

    def test_every_digest_is_printed(self, record: Record, pdf: Path) -> None:
        text = words(text_of(pdf))
        for digest in (record.digest, record.brief, record.library):
            assert digest in text

    def test_each_step_leads_to_its_inputs_and_steps(self, record: Record, pdf: Path) -> None:
        expected = sum(len(step.operands) for step in record.steps)
        with pikepdf.open(pdf) as document:
            links = [
                note
                for page in document.pages
                for note in page.get("/Annots", [])
                if note.get("/Subtype") == "/Link"
            ]
        assert len(links) > expected

    def test_headings_and_steps_are_bookmarks(self, record: Record, pdf: Path) -> None:
        with pikepdf.open(pdf) as document, document.open_outline() as outline:
            chapters = {item.title: item for item in outline.root}
            steps = [words(item.title) for item in chapters["Calculation"].children]
        assert len(steps) == len(record.steps)
        assert steps[0] == "Step 1 Static pressure, vent header"

    def test_letter_paper_is_letter(self, hostile: Record, tmp_path: Path) -> None:
        path = tmp_path / "letter.pdf"
        write_pdf(hostile, path, "letter")
        with pikepdf.open(path) as document:
            assert [float(x) for x in document.pages[0].MediaBox] == [0, 0, 612, 792]

    def test_other_paper_is_refused(self, record: Record) -> None:
        with pytest.raises(DefinitionError) as caught:
            render_html(record, "A5")
        assert str(caught.value) == ('definition of paper "A5": the sheet is set up for A4, letter')

    def test_a_verdict_that_rounding_would_change_is_flagged(self, record: Record) -> None:
        result = next(r for r in record.results if r.criteria)
        criterion = replace(result.criteria[0], holds_rounded=False)
        changed = replace(result, criteria=(criterion,), within_limits=False)
        others = tuple(changed if r is result else r for r in record.results)
        text = words(all_text(ET.fromstring(render_html(replace(record, results=others)))))
        assert "Rounding to 4 digits would change this verdict" in text
        assert "A step behind this result is outside the limits of its relation." in text

    def test_limits_branch_and_roots_not_taken_are_printed(self, hostile: Record) -> None:
        text = words(all_text(ET.fromstring(render_html(hostile))))
        assert "2.197 198 1 against 1 ✓ holds a shock stands only in supersonic flow" in words(
            re.sub("(✓ holds)", r" \1 ", text)
        ).replace("\u202f", " ")
        assert "Branch: supersonic." in text
        assert "Root not taken: 0.305" in text


class TestAPersonCanRepeatEachStep:
    """With the printed numbers alone, in plain decimal arithmetic."""

    @pytest.mark.parametrize("brief", [*EXAMPLES, HOSTILE], ids=lambda path: path.stem)
    def test_the_printed_numbers_give_the_printed_value(self, brief: Path) -> None:
        record = record_of(brief)
        cards = tuple(of_class(ET.fromstring(render_html(record)), "step"))
        assert len(cards) == len(record.steps)
        for card, step in zip(cards, record.steps, strict=True):
            if step.solved is None:
                continue
            printed = dict(where(card))
            (value,) = [next(of_class(line, "number")) for line in of_class(card, "value")]
            expected = number_in(value)
            with localcontext(prec=40):
                found = evaluate(step.solved, printed)
                assert abs(found - expected) <= abs(expected) * Decimal("1e-6"), step.key

    @pytest.mark.parametrize(
        ("value", "text"),
        [
            (1298200.0, "1.2982 × 10⁶"),
            (98200.0, "98\u202f200"),
            (0.82, "0.82"),
            (0.1231668981196618, "0.123\u202f166\u202f90"),
            (5.026548245743669e-05, "5.026\u202f548\u202f2 × 10⁻⁵"),
            (0.0, "0"),
        ],
    )
    def test_numbers_are_printed_in_full_or_with_eight_digits(
        self, value: float, text: str
    ) -> None:
        assert working(value).text == text

    def test_the_conversion_of_an_input_can_be_repeated(self, hostile: Record) -> None:
        sheet = ET.fromstring(render_html(hostile))
        shown = [words(all_text(cell)) for cell in of_class(sheet, "conversion")]
        assert "(68 + 459.67) × (5/9) = 293.15 K" in [text.strip() for text in shown]


def where(card: ET.Element) -> Iterator[tuple[str, Decimal]]:
    for table in of_class(card, "where"):
        for row in table.iter("tr"):
            symbol = next(of_class(row, "symbol")).find(f"{SVG}svg/{SVG}title")
            assert symbol is not None
            yield symbol.text or "", number_in(next(of_class(row, "figure")))


def number_in(element: ET.Element) -> Decimal:
    text = "".join(element.itertext()).replace("−", "-").replace("\u202f", "")
    match = re.match(r"(-?[\d.]+)(?:\u00a0×\u00a010(-?\d+))?", text)
    assert match is not None, text
    return Decimal(match[1]).scaleb(int(match[2] or 0))


PI = Decimal("3.141592653589793238462643383279502884197")


def evaluate(expr: Expr, values: Mapping[str, Decimal]) -> Decimal:
    def value(part: Expr) -> Decimal:
        return evaluate(part, values)

    match expr:
        case Constant("pi"):
            return PI
        case Symbol() | Constant():
            return values[symbol_text(expr)]
        case Number(exact):
            return Decimal(exact.numerator) / exact.denominator
        case Sum(terms):
            return sum((value(term) for term in terms), Decimal(0))
        case Negative(operand):
            return -value(operand)
        case Product(factors):
            product = Decimal(1)
            for factor in factors:
                product *= value(factor)
            return product
        case Quotient(above, below):
            return value(above) / value(below)
        case Power(base, exponent):
            return value(base) ** value(exponent)
        case Root(radicand):
            return value(radicand).sqrt()
        case Function("ln", argument):
            return value(argument).ln()
        case Function("lg", argument):
            return value(argument).log10()
        case Function("exp", argument):
            return value(argument).exp()
    raise AssertionError(expr)


class TestEquationsFitTheirColumn:
    @pytest.mark.parametrize("paper", sorted(PAPERS))
    def test_no_equation_is_wider_than_its_column_or_too_small(
        self, record: Record, paper: str
    ) -> None:
        sheet = ET.fromstring(render_html(record, paper))
        pictures = [svg for line in of_class(sheet, "equation") for svg in line.iter(f"{SVG}svg")]
        assert len(pictures) > 2 * len(record.steps)
        for svg in pictures:
            width = float(svg.get("width", "").removesuffix("pt"))
            natural = float(svg.get("viewBox", "").split()[2])
            assert width <= PAPERS[paper].column + 0.01
            assert width / natural >= SMALLEST

    @pytest.mark.parametrize("width", [120.0, 250.0, 400.0])
    def test_an_equation_of_any_length_is_broken(self, width: float) -> None:
        T, M, gamma = symbols("T M gamma")
        term = (1 + (gamma - 1) / 2 * M**2) ** ((gamma + 1) / (2 * (gamma - 1)))
        long = sum((term * M for _ in range(9)), term)
        ratio = (long + 1) / (long * M)
        for statement in (T.equals(long), T.equals(ratio), T.equals(sqrt(ratio) * M**2)):
            shown = equation_picture(statement, width)
            assert shown.width <= width + 0.01
            assert shown.scale >= SMALLEST
            assert shown.lines > 1


class TestTextStaysText:
    def test_markup_and_template_signs_are_printed_as_typed(
        self, hostile: Record, tmp_path: Path
    ) -> None:
        path = tmp_path / "hostile.pdf"
        write_pdf(hostile, path)
        text = words(text_of(path))
        for typed in (
            "Shock & <script>alert(1)</script> {{ 7*7 }}",
            "{% raw %} & Sons",
            "A. <b>Originator</b>",
            "<img src=x> Mach number",
            "<i>no</i> boundary layer {{ record }}",
            "</li></ul><a href='file:///etc/passwd'>x</a>",
        ):
            assert typed in text

    def test_a_character_without_a_glyph_is_printed_as_its_code(self) -> None:
        assert printable("中 ṁ 8 mm", covered_characters()) == "[U+4E2D] m\u0307 8 mm"

    @pytest.mark.parametrize(
        "url",
        ["http://example.com/a.woff2", "file:///etc/passwd", "file:///a/b.woff2", "data:,x"],
    )
    def test_nothing_but_our_fonts_is_fetched(self, url: str) -> None:
        with pytest.raises(OutputError):
            FontFetcher(templates_folder() / "fonts").fetch(url)


class TestAnArchiveCanKeepIt:
    def test_it_claims_and_carries_what_pdf_a_3a_asks_for(self, pdf: Path) -> None:
        with pikepdf.open(pdf) as document:
            root = document.Root
            with document.open_metadata() as meta:
                assert meta["pdfaid:part"] == "3"
                assert meta["pdfaid:conformance"] == "A"
            assert root.Lang == "en"
            assert root.MarkInfo.Marked is True
            assert root.StructTreeRoot.K[0].S == "/Document"
            assert root.OutputIntents[0].S == "/GTS_PDFA1"
            assert document.docinfo["/Title"] == (
                "CS-0001 rev. A: Let-down of nitrogen receiver V-101"
            )

    def test_each_attachment_is_there_with_its_relationship_and_media_type(self, pdf: Path) -> None:
        with pikepdf.open(pdf) as document:
            found = {
                str(item.UF): (
                    str(item.AFRelationship),
                    str(item.EF.F.Subtype),
                    item.EF.F.read_bytes(),
                )
                for item in document.Root.AF
            }
            assert len(document.Root.AF) == len(ATTACHMENTS)
        assert found == {
            item.name: (f"/{item.relationship}", f"/{item.mime}", item.content)
            for item in ATTACHMENTS
        }

    def test_every_picture_has_its_text_alternative(self, record: Record, pdf: Path) -> None:
        with pikepdf.open(pdf) as document:
            figures = [
                item
                for item in document.objects
                if isinstance(item, pikepdf.Dictionary) and item.get("/S") == "/Figure"
            ]
            alternatives = [str(item.get("/Alt", "")) for item in figures]
        assert len(alternatives) > 3 * len(record.steps)
        assert all(alternatives)
        assert "p = p_g + p_atm with p_g = 25\u202f000\u00a0Pa, p_atm = 98\u202f200\u00a0Pa" in (
            alternatives
        )

    @pytest.mark.parametrize("name", ["pdffonts", "qpdf"])
    def test_its_parts_are_sound(self, pdf: Path, name: str) -> None:
        program = require_program(name)
        command = [program, str(pdf)] if name == "pdffonts" else [program, "--check", str(pdf)]
        done = subprocess.run(command, check=True, capture_output=True, text=True)
        if name == "pdffonts":
            fonts = done.stdout.splitlines()[2:]
            assert fonts
            assert all(line.split()[-5:-3] == ["yes", "yes"] for line in fonts), done.stdout


class TestTheSameRecordGivesTheSameBytes:
    def test_on_a_second_run(self, record: Record, pdf: Path) -> None:
        assert pdf_bytes(record, attachments=ATTACHMENTS) == pdf.read_bytes()

    def test_in_another_process_with_another_hash_seed_clock_and_language(
        self, hostile: Record, tmp_path: Path
    ) -> None:
        path = tmp_path / "other.pdf"
        script = (
            "import calcsheets, pathlib, sys; from calcsheets.sheets.pdf import write_pdf; "
            "brief = calcsheets.read_brief(sys.argv[1]); "
            "write_pdf(calcsheets.calculate(brief), pathlib.Path(sys.argv[2]))"
        )
        other = {"PYTHONHASHSEED": "7", "TZ": "Pacific/Auckland", "LC_ALL": "C"}
        subprocess.run(
            [sys.executable, "-c", script, str(HOSTILE), str(path)],
            check=True,
            cwd=ROOT,
            env={**os.environ, **other},
        )
        assert path.read_bytes() == pdf_bytes(hostile)

    def test_and_the_composer_has_nothing_to_complain_about(
        self, hostile: Record, caplog: Any
    ) -> None:
        pdf_bytes(hostile)
        assert [entry.getMessage() for entry in caplog.records] == []


@pytest.mark.parametrize("path", EXAMPLES, ids=lambda path: path.stem)
def test_a_conversion_fits_its_column_and_can_be_repeated(path: Path) -> None:
    """The printed factor times the printed number gives the printed value to 7 digits."""
    record = calcsheets.calculate(calcsheets.read_brief(path))
    for item in record.inputs:
        shown = re.sub(r"<[^>]+>", "", str(conversion_html(item)))
        start, _, value = shown.replace("\u202f", "").partition(" = ")
        assert len(start) <= 30, shown
        if not value:
            continue
        start = start.replace("×", "*").replace("−", "-")
        number = re.match(r"[-0-9.]+", value.replace("−", "-"))
        assert number is not None
        printed = float(number.group())
        power = re.search(r"×.10(\d+)", value)
        printed *= 10.0 ** int(power.group(1)) if power else 1.0
        assert _arithmetic(start) == pytest.approx(printed, rel=1e-7), shown


def _arithmetic(text: str) -> float:
    """Products, sums and one bracket or fraction, as a person with a calculator would."""
    if text.startswith("("):
        inner, _, factor = text[1:].partition(") * ")
        return _arithmetic(inner) * _arithmetic(factor.strip("()"))
    for sign, combine in ((" + ", 1), (" - ", -1)):
        left, found, right = text.partition(sign)
        if found:
            return _arithmetic(left) + combine * _arithmetic(right)
    left, found, right = text.partition(" * ")
    if found:
        return _arithmetic(left) * _arithmetic(right.strip("()"))
    above, found, below = text.partition("/")
    return float(above) / float(below) if found else float(text)
