"""Relations that give their unknowns only together are found, solved and shown together."""

from __future__ import annotations

from dataclasses import replace
from pathlib import Path
from typing import Any

import pytest
from scipy.optimize import brentq

import calcsheets
from calcsheets.checking import check_record, require_same_values
from calcsheets.errors import NotEnoughInputs, SeveralRoots
from calcsheets.record import Record, StepRecord, read_record, record_bytes
from calcsheets.sheets.workbook import make_workbook

_HEAD = """
[calculation]
number = "C-8"
title = "Coupled sets"
purpose = "test"
revision = "A"
date = "2026-01-01"
originator = "N. N."
[site]
p_atm = "1 bar"
[gas]
gamma = "1.4"
R = "287 J/(kg*K)"
"""
_STREAM = """
[stations.pipe]
kind = "stream"
{branch}
{given}
[wanted]
{wanted}
"""
_SERIES = """
[stations.supply]
kind = "stream"
p_0 = "8 bar(a)"
T_0 = "290 K"
[stations.middle]
kind = "stream"
p = {{ same_as = "p_0@middle", source = "A wide pipe" }}
T_0 = {{ same_as = "T_0@supply", source = "No heat exchange" }}
[stations.outside]
kind = "stream"
p = "{back}"
[[path]]
name = "first"
from = "supply"
to = "middle"
process = "orifice"
C_d = "0.8"
A = "3e-4 m2"
[[path]]
name = "second"
from = "middle"
to = "outside"
process = "orifice"
C_d = "0.8"
A = "3.8e-4 m2"
[wanted]
"mdot@first" = {{ unit = "kg/s" }}
"p_0@middle" = {{ unit = "bar(a)" }}
"regime@first" = {{}}
"regime@second" = {{}}
"""
GAMMA, R = 1.4, 287.0


def calculated(folder: Path, text: str) -> Record:
    path = folder / "brief.toml"
    path.write_text(_HEAD + text)
    return calcsheets.calculate(calcsheets.read_brief(path))


def stream(folder: Path, given: str, wanted: str, branch: str = 'branch = "subsonic"') -> Record:
    return calculated(folder, _STREAM.format(given=given, wanted=wanted, branch=branch))


def combined(record: Record) -> StepRecord:
    (step,) = [step for step in record.steps if step.combination]
    return step


def value(record: Record, key: str) -> float:
    return next(step.value for step in record.steps if step.key == key and step.value is not None)


def flux(mach: float) -> float:
    """Mass flow over A p0 sqrt(gamma/(R T0)), from the definition of the stagnation state."""
    return mach * (1 + (GAMMA - 1) / 2 * mach**2) ** (-(GAMMA + 1) / (2 * (GAMMA - 1)))


FLOW_AND_STATIC_TEMPERATURE = 'mdot = "2 kg/s"\nA = "0.01 m2"\np_0 = "3 bar(a)"\nT = "290 K"'


def test_flow_and_static_temperature_give_the_mach_number_only_together(tmp_path: Path) -> None:
    """Witness: scipy on the two relations written out here (library)."""
    record = stream(tmp_path, FLOW_AND_STATIC_TEMPERATURE, '"M@pipe" = {}')

    def apart(mach: float) -> float:
        stagnation = 290 * (1 + (GAMMA - 1) / 2 * mach**2)
        return 0.01 * 3e5 * (GAMMA / (R * stagnation)) ** 0.5 * flux(mach) - 2

    assert value(record, "M@pipe") == pytest.approx(brentq(apart, 1e-6, 1, xtol=1e-15), rel=1e-12)
    step = combined(record)
    assert {member.relation for member in step.combination} == {
        "stagnation_temperature",
        "mass_flow_stagnation",
    }
    assert step.branch == "subsonic"
    assert [root.value > 1 for root in step.other_roots] == [True]


def test_both_roots_are_asked_about_where_no_branch_is_stated(tmp_path: Path) -> None:
    with pytest.raises(SeveralRoots) as caught:
        stream(tmp_path, FLOW_AND_STATIC_TEMPERATURE, '"M@pipe" = {}', branch="")
    assert "0.1656946" in str(caught.value)
    assert 'branch = "subsonic" or branch = "supersonic"' in str(caught.value)


def test_every_unknown_of_a_set_becomes_a_step_and_the_closing_relation_a_check(
    tmp_path: Path,
) -> None:
    record = stream(tmp_path, FLOW_AND_STATIC_TEMPERATURE, '"M@pipe" = {}')
    step = combined(record)
    shown = {item.key for item in record.steps}
    assert {member.key for member in step.combination} - {""} <= shown
    titles = {check.relation: check.difference for check in record.checks}
    closing = record.relation(step.combination[-1].relation)
    assert abs(titles[closing.title]) < 1e-12
    assert {member.relation for member in step.combination} <= {r.name for r in record.relations}


def test_an_underdetermined_stream_is_not_closed_by_relations_that_follow_from_each_other(
    tmp_path: Path,
) -> None:
    """Twenty relations hold at a station and share its unknowns: most of them are dependent."""
    with pytest.raises(NotEnoughInputs):
        stream(tmp_path, 'p_0 = "3 bar(a)"\nT_0 = "290 K"', '"M@pipe" = {}')


def orifice(up: float, down: float, area: float) -> float:
    """Mass flow of an orifice, choked or not (Saint-Venant and Wantzel), at 290 K."""
    ratio = max(down / up, (2 / (GAMMA + 1)) ** (GAMMA / (GAMMA - 1)))
    inner = ratio ** (2 / GAMMA) - ratio ** ((GAMMA + 1) / GAMMA)
    return 0.8 * area * up * float((2 * GAMMA / ((GAMMA - 1) * R * 290) * inner) ** 0.5)


@pytest.mark.parametrize(
    ("back", "pressure", "first", "second"),
    [
        ("1 bar(a)", 1e5, "not choked", "choked"),
        ("3 bar(a)", 3e5, "not choked", "choked"),
        ("5 bar(a)", 5e5, "not choked", "not choked"),
        ("7 bar(a)", 7e5, "not choked", "not choked"),
    ],
)
def test_two_orifices_in_series_with_both_regimes_open(
    tmp_path: Path, back: str, pressure: float, first: str, second: str
) -> None:
    """Witness: scipy on both mass flows written out here (library)."""
    record = calculated(tmp_path, _SERIES.format(back=back))

    def apart(middle: float) -> float:
        return orifice(8e5, middle, 3e-4) - orifice(middle, pressure, 3.8e-4)

    middle = brentq(apart, pressure * (1 + 1e-9), 8e5 * (1 - 1e-9), xtol=1e-7, rtol=1e-14)
    assert value(record, "p_0@middle") == pytest.approx(middle, rel=1e-9)
    assert value(record, "mdot@first") == pytest.approx(orifice(8e5, middle, 3e-4), rel=1e-9)
    states = {result.key: result.state for result in record.results}
    assert (states["regime@first"], states["regime@second"]) == (first, second)
    assert len(combined(record).combination) == 5


@pytest.fixture(scope="module")
def series(tmp_path_factory: Any) -> Record:
    return calculated(tmp_path_factory.mktemp("series"), _SERIES.format(back="3 bar(a)"))


def test_its_record_is_read_back_and_passes_its_check(series: Record) -> None:
    again = read_record(record_bytes(series))
    assert again == series
    assert [finding for finding in check_record(again) if finding.verdict == "failed"] == []


def test_its_workbook_recalculates_the_same(series: Record) -> None:
    workbook = make_workbook(series)
    assert require_same_values(workbook.content, workbook.formulas) > 20


def test_a_value_that_meets_the_combination_but_no_member_is_found(series: Record) -> None:
    """A member of the set is planted with another form: the check looks at each of them."""
    step = combined(series)
    first, *others = step.combination
    other_form = replace(first.published, right=first.published.right * 2)
    planted = replace(step, combination=(replace(first, published=other_form), *others))
    steps = tuple(planted if item is step else item for item in series.steps)
    failed = [f for f in check_record(replace(series, steps=steps)) if f.verdict == "failed"]
    assert [finding.key for finding in failed] == [step.key]


def test_the_order_of_the_keys_does_not_change_the_set(tmp_path: Path) -> None:
    lines = FLOW_AND_STATIC_TEMPERATURE.split("\n")
    records = [
        stream(tmp_path, "\n".join(order), '"M@pipe" = {}') for order in (lines, lines[::-1])
    ]
    first, second = (combined(record) for record in records)
    assert first.combination == second.combination
    assert first.value == second.value
