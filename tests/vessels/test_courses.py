"""The course of a let-down and of a filling: a table that starts, runs and ends as it must."""

from __future__ import annotations

import io
import re
from dataclasses import replace
from itertools import pairwise
from pathlib import Path
from xml.etree import ElementTree as ET

import openpyxl
import pytest
from scipy.integrate import solve_ivp

from calcsheets.checking import check_record, check_workbook
from calcsheets.errors import DefinitionError
from calcsheets.expressions import Symbol
from calcsheets.record import ColumnRecord, CourseRecord, Record, read_record, record_bytes
from calcsheets.relations import Case, Course, CourseColumn, load_library
from calcsheets.sheets.pdf import render_html
from calcsheets.sheets.pdf.chart import Axis, chart
from calcsheets.sheets.workbook import make_workbook
from tests.sheets.recalculating import by_libreoffice, input_cells, with_cells
from tests.vessels.briefs import calculated, filling, let_down, result
from tests.vessels.witnesses import (
    CRITICAL,
    GAMMA,
    T_SUPPLY,
    R,
    T,
    V,
    filling_time,
    let_down_time,
    mass_flow,
)

KINDS = ("isothermal", "adiabatic")


def course(record: Record) -> CourseRecord:
    (found,) = record.courses
    return found


def column(table: CourseRecord, quantity: str) -> tuple[float, ...]:
    return next(c.values for c in table.columns if c.symbol == Symbol(quantity, "now"))


@pytest.mark.parametrize("kind", KINDS)
def test_the_course_of_a_let_down_is_that_of_its_balances(kind: str) -> None:
    """Time by quadrature, temperature, flow and mass by the laws of the perfect gas (scipy)."""
    record = calculated(let_down(kind))
    table = course(record)
    assert len(table.words) == 21
    assert (column(table, "p_0")[0], column(table, "p_0")[-1]) == (13e5, 1.3e5)
    assert column(table, "t")[0] == 0
    assert column(table, "t")[-1] == pytest.approx(result(record), rel=1e-15)
    names = ("p_0", "t", "T_0", "mdot", "m")
    for p, t, now, flow, mass in zip(*(column(table, name) for name in names), strict=True):
        expected = T if kind == "isothermal" else T * (p / 13e5) ** ((GAMMA - 1) / GAMMA)
        assert now == pytest.approx(expected, rel=1e-12)
        assert flow == pytest.approx(mass_flow(p, now, 1.2e5), rel=1e-12)
        assert mass == pytest.approx(p * V / (R * now), rel=1e-12)
        if t:
            assert t == pytest.approx(let_down_time(kind, 13e5, p, 1.2e5), rel=1e-9)
    expected_words = ["choked" if p >= 1.2e5 / CRITICAL else "not choked"
                      for p in column(table, "p_0")]  # fmt: skip
    assert list(table.words) == expected_words
    assert set(table.words) == {"choked", "not choked"}


@pytest.mark.parametrize("kind", KINDS)
def test_the_course_of_a_filling_is_that_of_its_balances(kind: str) -> None:
    """Mass and temperature marched over time by scipy from the balances of mass and energy."""
    table = course(calculated(filling(kind)))
    heat = 0.0 if kind == "isothermal" else 1.0

    def rates(_: float, state: list[float]) -> list[float]:
        mass, now = state
        flow = mass_flow(8e5, T_SUPPLY, mass * R * now / V)
        return [flow, heat * flow * (GAMMA * T_SUPPLY - now) / mass]

    times = column(table, "t")
    start = [1e5 * V / (R * T), T]
    found = solve_ivp(rates, (0, times[-1]), start, t_eval=times, rtol=1e-11, atol=1e-12)
    assert column(table, "m") == pytest.approx(found.y[0], rel=1e-8)
    assert column(table, "T_0") == pytest.approx(found.y[1], rel=1e-8)
    for p, t in zip(column(table, "p_0"), times, strict=True):
        assert t == pytest.approx(filling_time(kind, 1e5, p, 8e5), rel=1e-9, abs=1e-12)


def test_the_time_rises_and_the_mass_falls_from_row_to_row() -> None:
    table = course(calculated(let_down("adiabatic")))
    for name, sign in (("t", 1), ("m", -1), ("p_0", -1), ("T_0", -1), ("mdot", -1)):
        assert all((b - a) * sign > 0 for a, b in pairwise(column(table, name))), name


def test_a_course_ends_where_the_answer_is_when_the_end_is_asked() -> None:
    wanted = "'p_0@emptied' = { unit = 'Pa(a)', digits = 12 }"
    record = calculated(let_down("isothermal", p_2="", t="t = '900 s'", wanted=wanted))
    table = course(record)
    assert column(table, "p_0")[-1] == result(record)
    assert column(table, "t")[-1] == pytest.approx(900, rel=1e-14)


def test_a_process_of_which_too_little_is_known_has_no_course() -> None:
    wanted = "'T_0@emptied' = { unit = 'K' }"
    record = calculated(let_down("adiabatic", A="", wanted=wanted))
    assert record.courses == ()


def test_the_record_of_a_course_is_read_back_and_checked() -> None:
    record = calculated(let_down("adiabatic"))
    assert read_record(record_bytes(record)) == record
    (finding,) = [f for f in check_record(record) if f.part == "course change"]
    assert finding.verdict == "passed"
    assert finding.reason == "21 rows evaluated again, within 1e-12"


def planted(record: Record, quantity: str, row: int, factor: float) -> Record:
    table = course(record)

    def changed(item: ColumnRecord) -> ColumnRecord:
        if item.symbol.quantity != quantity:
            return item
        values = list(item.values)
        values[row] *= factor
        return replace(item, values=tuple(values))

    columns = tuple(changed(item) for item in table.columns)
    return replace(record, courses=(replace(table, columns=columns),))


@pytest.mark.parametrize(
    ("quantity", "row", "title"),
    [("t", 17, "time"), ("m", 3, "mass of gas"), ("p_0", 20, "stagnation pressure")],
)
def test_a_changed_value_of_a_course_is_found(quantity: str, row: int, title: str) -> None:
    record = planted(calculated(let_down("isothermal")), quantity, row, 1.00001)
    (finding,) = [f for f in check_record(record) if f.verdict == "failed"]
    assert finding.part == "course change"
    assert finding.reason.startswith(f"row {row}: {title} differs by ")


def test_a_changed_word_of_a_course_is_found() -> None:
    record = calculated(let_down("isothermal"))
    table = replace(course(record), words=("choked",) * 21)
    (finding,) = [f for f in check_record(replace(record, courses=(table,)))
                  if f.verdict == "failed"]  # fmt: skip
    assert finding.reason == 'row 16: "choked" instead of "not choked"'


def test_the_rows_of_a_course_follow_a_changed_input(tmp_path: Path) -> None:
    """All rows of the sheet Course, calculated by LibreOffice, after the header has changed."""
    record = calculated(let_down("adiabatic"))
    content = make_workbook(record).content
    keys = [item.key for item in record.inputs]
    cell = input_cells(content)[keys.index("p@header")]
    by_libreoffice({"a": with_cells(content, {cell: 1.0})}, tmp_path)
    sheet = openpyxl.load_workbook(tmp_path / "out" / "a.xlsx", data_only=True)["Course"]
    expected = course(calculated(let_down("adiabatic", p_b="p = '1 bar(a)'")))
    rows = list(sheet.iter_rows(min_row=6, max_row=26, values_only=True))
    for index, row in enumerate(rows):
        values = [item.values[index] for item in expected.columns]
        assert row[0] == index
        assert row[1:6] == pytest.approx(values, rel=1e-9, abs=1e-9)
        assert row[6] == expected.words[index]


def test_the_sheet_course_stands_before_the_integrals_that_it_uses() -> None:
    record = calculated(let_down("adiabatic"))
    book = make_workbook(record)
    names = openpyxl.load_workbook(io.BytesIO(book.content)).sheetnames
    assert names[-4:] == ["Course", "Integrals", "Routes", "References"]
    assert {f.verdict for f in check_workbook(book.content, record)} == {"passed"}


class TestPrint:
    html = render_html(calculated(let_down("adiabatic")))

    def test_every_row_is_printed_with_its_word(self) -> None:
        table = re.search(r'<table class="grid course">(.*?)</table>', self.html, re.DOTALL)
        assert table is not None
        rows = re.findall(r"<tr><td.*?</tr>", table[1])
        assert len(rows) == 21
        last = re.sub(r"<[^>]+>", "|", rows[-1]).replace("\u202f", "").replace("\u00a0", "")
        assert [part for part in last.split("|") if part][-1] == "not choked"
        assert "778.738" in last

    def test_every_form_is_printed_with_its_condition(self) -> None:
        assert self.html.count("<td>if <svg") == 3
        assert self.html.count("<td>otherwise</td>") == 2
        assert "Filled points: choked; open points: not choked." in self.html

    def test_the_pictures_hold_nothing_but_shapes_in_black_grey_and_white(self) -> None:
        pictures = re.findall(r'<div class="chart">(<svg.*?</svg>)</div>', self.html, re.DOTALL)
        assert len(pictures) == 3
        for picture in pictures:
            root = ET.fromstring(picture)
            tags = {element.tag.split("}")[1] for element in root.iter()}
            assert tags == {"svg", "title", "path", "polyline", "circle", "g"}
            colours = set(re.findall(r"#[0-9a-f]+", picture))
            assert colours == {"#000", "#bbb", "#fff"}

    def test_a_second_course_of_one_kind_refers_to_the_first(self) -> None:
        record = calculated(let_down("adiabatic"))
        twice = replace(course(record), key="again", place="again")
        html = render_html(replace(record, courses=(course(record), twice)))
        assert html.count('class="limits forms"') == 1
        assert html.count("Forms as in the course of the same name above.") == 1


class TestChart:
    time = Axis(Symbol("t"), "s", (0.0, 25.0, 100.0))

    def points(self, *values: float) -> list[tuple[float, float]]:
        picture = str(chart(self.time, Axis(Symbol("p_0"), "Pa", values), [True, True, False]))
        (line,) = re.findall(r'points="([^"]+)"', picture)
        return [tuple(map(float, pair.split(","))) for pair in line.split()]  # type: ignore[misc]

    def test_points_stand_in_proportion_to_their_values(self) -> None:
        (x1, y1), (x2, y2), (x3, y3) = self.points(1e5, 3e5, 2e5)
        assert (x2 - x1) / (x3 - x1) == pytest.approx(0.25, abs=0.001)
        assert (y1 - y3) / (y1 - y2) == pytest.approx(0.5, abs=0.001)
        assert y2 < y3 < y1, "higher values stand higher"

    def test_a_point_is_open_where_the_word_is_the_other_one(self) -> None:
        picture = str(
            chart(self.time, Axis(Symbol("p_0"), "Pa", (1.0, 2.0, 3.0)), [True, True, False])
        )
        fills = re.findall(r'<circle [^>]*fill="(#[0-9a-f]+)"', picture)
        assert fills == ["#000", "#000", "#fff"]

    @pytest.mark.parametrize(
        ("values", "ticks", "exponent"),
        [
            ((0.0, 800.0), (0, 200, 400, 600, 800), 0),
            ((1.3e6, 1.3e5), (0, 250e3, 500e3, 750e3, 1e6, 1.25e6, 1.5e6), 6),
            ((300.0, 300.0), None, 0),
            ((0.0, 0.0), None, 0),
            ((0.009, 0.12), None, 0),
            ((2e-5, 8e-5), None, -6),
        ],
    )
    def test_an_axis_ends_at_round_numbers(self, values, ticks, exponent) -> None:
        axis = Axis(Symbol("p_0"), "Pa", values)
        if ticks is not None:
            assert axis.ticks == pytest.approx(ticks)
        assert axis.ticks[0] <= min(values) and max(values) <= axis.ticks[-1]
        assert len(axis.ticks) >= 2
        assert axis.exponent == exponent


class TestLibrary:
    def test_every_process_of_a_vessel_has_a_course(self) -> None:
        offered = [process for item in load_library().courses for process in item.offered_by]
        assert sorted(offered) == sorted(
            p for p in load_library().processes if p.startswith(("let-down", "filling"))
        )

    def test_a_form_of_another_dimension_is_refused(self) -> None:
        first = load_library().courses[0]
        wrong = CourseColumn(first.columns[0].symbol, (Case(first.between),))
        with pytest.raises(DefinitionError) as caught:
            replace(first, columns=(wrong,))
        assert str(caught.value) == (
            "definition of course course_of_isothermal: t.now is in s, its form in kg*m^-1*s^-2"
        )

    def test_a_changed_form_changes_the_digest_of_the_library(self) -> None:
        library = load_library()
        chapter = next(c for c in library.chapters if c.courses)
        first: Course = chapter.courses[0]
        other = replace(first, columns=first.columns[:-1])
        changed = replace(
            library,
            chapters=tuple(
                replace(c, courses=(other, *c.courses[1:])) if c is chapter else c
                for c in library.chapters
            ),
        )
        assert changed.digest != library.digest
