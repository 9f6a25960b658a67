"""The limits of a relation are evaluated even where they name what the relation does not."""

from __future__ import annotations

import io
from dataclasses import replace
from pathlib import Path

import openpyxl
import pytest

import calcsheets
from calcsheets.checking import check_record, require_same_values
from calcsheets.errors import ContradictoryInputs, OutsideLimit
from calcsheets.record import Record, StepRecord
from calcsheets.sheets.workbook import make_workbook

_HEAD = """
[calculation]
number = "C-7"
title = "Limits"
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

_SHOCK = """
[stations.a]
kind = "stream"
{before}
[stations.b]
kind = "stream"
{after}
[[path]]
name = "shock"
from = "a"
to = "b"
process = "normal shock"
[wanted]
{wanted}
"""


def calculated(folder: Path, before: str, after: str, wanted: str) -> Record:
    path = folder / "brief.toml"
    path.write_text(_HEAD + _SHOCK.format(before=before, after=after, wanted=wanted))
    return calcsheets.calculate(calcsheets.read_brief(path))


@pytest.fixture
def entropy(tmp_path: Path) -> Record:
    """The entropy rise from both stagnation pressures: its limit is on the Mach number."""
    return calculated(
        tmp_path,
        'p_0 = "10 bar(a)"',
        'p_0 = "7.2087386 bar(a)"',
        '"ds@shock" = { unit = "J/(kg*K)" }',
    )


def step_of(record: Record, key: str) -> StepRecord:
    return next(step for step in record.steps if step.key == key)


def test_a_quantity_that_only_a_limit_names_is_calculated_for_it(entropy: Record) -> None:
    step = step_of(entropy, "ds@shock")
    assert [operand.key for operand in step.limit_operands] == ["M@a"]
    (limit,) = step.limits
    assert limit.holds is True
    # Stagnation pressures across a shock at M = 2: NACA Report 1135 table II (from memory).
    assert limit.left == pytest.approx(2.0, abs=1e-4)


def test_its_check_and_its_workbook_evaluate_the_limit(entropy: Record) -> None:
    verdicts = {
        finding.reason: finding.verdict
        for finding in check_record(entropy)
        if finding.reason.startswith("limit")
    }
    assert set(verdicts.values()) == {"passed"}
    workbook = make_workbook(entropy)
    sheet = openpyxl.load_workbook(io.BytesIO(workbook.content))["Calculation"]
    texts = [str(cell.value) for row in sheet.iter_rows() for cell in row]
    assert [text for text in texts if text.startswith("=IF(AND(")]
    require_same_values(workbook.content, workbook.formulas)


def test_a_limit_whose_outcome_was_changed_is_found(entropy: Record) -> None:
    step = step_of(entropy, "ds@shock")
    planted = replace(step, limits=(replace(step.limits[0], holds=False),))
    steps = tuple(planted if item is step else item for item in entropy.steps)
    failed = [f for f in check_record(replace(entropy, steps=steps)) if f.verdict == "failed"]
    assert [(f.key, f.reason) for f in failed] == [
        ("ds@shock", "limit evaluated again: a shock stands only in supersonic flow")
    ]


def test_a_limit_that_claims_values_nobody_holds_fails(entropy: Record) -> None:
    step = step_of(entropy, "ds@shock")
    planted = replace(step, limit_operands=())
    steps = tuple(planted if item is step else item for item in entropy.steps)
    failed = [f for f in check_record(replace(entropy, steps=steps)) if f.verdict == "failed"]
    assert [f.reason for f in failed] == [
        "limit needs a value that the calculation does not hold: "
        "a shock stands only in supersonic flow"
    ]


def test_a_limit_that_nothing_leads_to_is_said_to_be_open(tmp_path: Path) -> None:
    record = calculated(tmp_path, 'A = "0.01 m2"', "", '"A@b" = { unit = "m2" }')
    (limit,) = step_of(record, "A@b").limits
    assert limit.holds is None
    verdicts = [(f.verdict, f.reason) for f in check_record(record) if "limit" in f.reason]
    assert verdicts == [
        (
            "not possible",
            "limit needs a value that the calculation does not hold: "
            "a shock stands only in supersonic flow",
        )
    ]


def test_no_value_is_given_where_a_relation_means_nothing(tmp_path: Path) -> None:
    with pytest.raises(OutsideLimit) as caught:
        calculated(tmp_path, 'M = "0.5"\nA = "0.01 m2"', "", '"A@b" = { unit = "m2" }')
    assert str(caught.value) == (
        "A shock is thin: one area, for A@b: a shock stands only in supersonic flow, and the "
        "inputs lead to values outside that: Mach number is 0.5, allowed is at least 1. Check "
        "the inputs of this step."
    )


def test_a_side_without_a_value_is_a_contradiction(tmp_path: Path) -> None:
    """A static temperature above the stagnation temperature leaves no real Mach number."""
    with pytest.raises(ContradictoryInputs) as caught:
        calculated(
            tmp_path,
            'M = "2"\nT = "300 K"\nT_0 = "250 K"',
            "",
            '"a@a" = { unit = "m/s" }\n"M@b" = {}',
        )
    assert "T" in str(caught.value)
