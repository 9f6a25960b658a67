"""Each result is led to once more, by a derivation that shares as little as possible."""

from __future__ import annotations

import io
from dataclasses import replace
from pathlib import Path

import openpyxl
import pytest

import calcsheets
from calcsheets.checking import check_record, require_same_values
from calcsheets.planning import Routes, reach, state_problem
from calcsheets.quantities import Variable
from calcsheets.record import LARGEST_DIFFERENCE, Record, RouteRecord, read_record, record_bytes
from calcsheets.relations import load_library
from calcsheets.sheets.pdf.routes import route_lines
from calcsheets.sheets.workbook import make_workbook
from tests.conftest import EXAMPLES, ROOT

NOZZLE = ROOT / "examples" / "nozzle-and-shock.toml"


@pytest.fixture(scope="module")
def record() -> Record:
    return calcsheets.calculate(calcsheets.read_brief(NOZZLE))


def route(record: Record, key: str) -> RouteRecord:
    return next(route for route in record.routes if route.key == key)


@pytest.mark.parametrize("path", EXAMPLES, ids=lambda path: path.stem)
def test_both_routes_agree_to_the_last_digits(path: Path) -> None:
    made = calcsheets.calculate(calcsheets.read_brief(path))
    compared = [route for route in made.routes if route.value is not None]
    assert compared
    for item in compared:
        assert item.difference is not None
        assert abs(item.difference) < 1e-12
        assert item.agrees is True


def test_every_number_that_is_a_result_has_a_route_or_a_reason(record: Record) -> None:
    numbers = {result.key for result in record.results if result.value is not None and result.step}
    assert {route.key for route in record.routes} == numbers
    for item in record.routes:
        assert bool(item.steps) != bool(item.reason)


def test_a_route_ends_with_another_relation_than_the_calculation(record: Record) -> None:
    last = {step.key: step.relation for step in record.steps}
    for item in record.routes:
        if item.steps:
            assert item.steps[-1].key == item.key
            assert item.steps[-1].relation != last[item.key]


def test_the_mach_number_behind_the_shock_comes_once_more_through_the_temperatures(
    record: Record,
) -> None:
    assert [step.relation for step in route(record, "M@tube").steps][-2:] == [
        "shock_temperature",
        "stagnation_temperature",
    ]


def test_what_no_other_relation_leads_to_says_so(record: Record) -> None:
    assert route(record, "M@exit").reason == (
        "every derivation from these inputs in closed forms uses the same relations"
    )


def test_a_route_shares_as_few_relations_as_it_can(record: Record) -> None:
    """The isentropic relation would do too; the route through the mass flow shares less."""
    problem = state_problem(calcsheets.read_brief(NOZZLE), load_library())
    found = reach(problem, {})
    wanted = [item.variable for item in problem.brief.wanted]
    routes = Routes(problem, {}, found.needed(wanted))
    pressure = Variable("p", "exit")
    first = {edge.source.key for edge in routes.first(pressure)}
    other = routes.other(pressure)
    assert other is not None
    assert {edge.source.key for edge in other} - first
    assert other[-1].source.key not in first


def test_the_check_goes_through_the_route_step_by_step(record: Record) -> None:
    findings = [f for f in check_record(record) if f.part.startswith("other route")]
    assert {finding.verdict for finding in findings} == {"passed", "not possible"}
    item = route(record, "p@exit")
    changed = replace(item.steps[-1], value=item.steps[-1].value * (1 + 1e-6))
    planted = replace(item, steps=(*item.steps[:-1], changed), value=changed.value)
    routes = tuple(planted if other is item else other for other in record.routes)
    failed = [f for f in check_record(replace(record, routes=routes)) if f.verdict == "failed"]
    assert [(f.part, f.key) for f in failed] == [
        (f"other route to result {item.result}", "p@exit"),
        (f"other route to result {item.result}", "p@exit"),
    ]
    assert failed[-1].reason == "both routes differ by 1.0e-06"


def test_routes_that_differ_are_said_to_disagree(record: Record) -> None:
    item = route(record, "p@exit")
    apart = replace(item, difference=2 * LARGEST_DIFFERENCE)
    assert apart.agrees is False
    routes = tuple(apart if other is item else other for other in record.routes)
    (line,) = [
        line
        for line in route_lines(replace(record, routes=routes), 400.0)
        if line.result.key == "p@exit"
    ]
    assert not line.agrees


def test_the_record_with_its_routes_is_read_back(record: Record) -> None:
    assert read_record(record_bytes(record)).routes == record.routes


def test_the_workbook_carries_every_route_alive(record: Record) -> None:
    workbook = make_workbook(record)
    require_same_values(workbook.content, workbook.formulas)
    sheet = openpyxl.load_workbook(io.BytesIO(workbook.content))["Routes"]
    formulas = [
        cell.value
        for row in sheet.iter_rows()
        for cell in row
        if isinstance(cell.value, str) and cell.value.startswith("=")
    ]
    steps = sum(len(route.steps) for route in record.routes)
    compared = sum(bool(route.steps) for route in record.routes)
    assert len(formulas) == steps + compared
