"""A workbook computes in doubles; how far that can be trusted is bounded step by step."""

from __future__ import annotations

import math

import pytest

import calcsheets
from calcsheets.checking import check_record, check_workbook, require_same_values
from calcsheets.record import Record, StepRecord
from calcsheets.sheets.workbook import make_workbook

BRIEF = """
[calculation]
number = "T-4"
revision = "0"
date = "2026-01-02"
title = "A slow stream"
purpose = "How fast?"
originator = "A"

[gas]
gamma = "1.4"
R = "287 J/(kg*K)"

[stations.a]
p = "1 bar(a)"
T = "STATIC K"
T_0 = "300 K"

[stations.b]
p = "2 bar(a)"

[[path]]
name = "change"
from = "a"
to = "b"
process = "isentropic change"

[wanted]
"M@a" = {}
"ds@change" = {}
"T@b" = { unit = "K" }
"""


def solved(static: str) -> Record:
    return calcsheets.calculate(calcsheets.parse_brief(BRIEF.replace("STATIC", static)))


def step(record: Record, key: str) -> StepRecord:
    return next(item for item in record.steps if item.key == key)


@pytest.mark.parametrize("static", ["290", "299.9", "299.9999999", "299.9999999999"])
def test_the_bound_holds_for_plain_floats(static: str) -> None:
    """The same formula in floats differs from the exact value by no more than the bound."""
    found = step(solved(static), "M@a")
    assert found.value is not None
    in_floats = math.sqrt((300.0 / float(static) - 1) * 2 / (1.4 - 1))
    assert abs(in_floats - found.value) <= found.double_error


def test_a_difference_of_nearly_equal_numbers_leaves_few_digits() -> None:
    well, ill = step(solved("290"), "M@a"), step(solved("299.9999999999"), "M@a")
    assert well.value is not None
    assert ill.value is not None
    assert well.double_error / well.value < 1e-13
    assert ill.double_error / ill.value > 1e-5
    assert ill.certified_digits == 15  # the program itself does not compute in doubles


@pytest.mark.parametrize("static", ["290", "299.9999999999"])
def test_an_ill_conditioned_step_does_not_stop_the_workbook(static: str) -> None:
    record = solved(static)
    book = make_workbook(record)
    assert require_same_values(book.content, book.formulas) > 0
    assert "failed" not in {finding.verdict for finding in check_record(record)}
    assert {finding.verdict for finding in check_workbook(book.content, record)} == {"passed"}


def test_a_value_that_cancels_to_zero_is_zero() -> None:
    """An isentropic change has no change of entropy; its ball holds zero."""
    found = step(solved("290"), "ds@change")
    assert found.value == 0.0
    assert 0 < found.double_error < 1e-10
    assert found.residual < 1e-40


NOZZLE = """
[calculation]
number = "T-8"
revision = "0"
date = "2026-01-02"
title = "Near the throat"
purpose = "How fast?"
originator = "A"

[gas]
gamma = "1.4"
R = "287 J/(kg*K)"

[stations.a]
A = "1.0000001 m2"
A_cr = "1 m2"
branch = "supersonic"

[wanted]
"M@a" = {}
"""


def test_a_root_near_the_throat_is_bisected_as_far_as_doubles_reach() -> None:
    record = calcsheets.calculate(calcsheets.parse_brief(NOZZLE))
    found = step(record, "M@a")
    assert found.value is not None
    assert found.double_error / found.value > 1e-13
    book = make_workbook(record)
    assert require_same_values(book.content, book.formulas) > 0
    assert "failed" not in {finding.verdict for finding in check_record(record)}


DUCT = """
[calculation]
number = "T-9"
revision = "0"
date = "2026-01-02"
title = "At the throat"
purpose = "What is the pressure there?"
originator = "A"

[gas]
gamma = "1.4"
R = "287 J/(kg*K)"

[stations.a]
A = "1 m2"
A_cr = "1 m2"
p_0 = "5 bar(a)"
T_0 = "300 K"
branch = "BRANCH"

[wanted]
"M@a" = {}
"p@a" = { unit = "bar(a)" }
"""


@pytest.mark.parametrize("branch", ["subsonic", "supersonic"])
def test_a_calculation_goes_on_from_the_critical_area(branch: str) -> None:
    """p*/p_0 at γ = 1.4 is 0.528282 (NACA Report 1135, table I, from memory).

    The root only touches zero: its enclosure is wide, and doubles find it to half their digits.
    """
    record = calcsheets.calculate(calcsheets.parse_brief(DUCT.replace("BRANCH", branch)))
    assert record.results[0].value == pytest.approx(1, abs=1e-11)
    assert record.results[1].value == pytest.approx(5 * 0.528282, rel=1e-6)
    mach = step(record, "M@a")
    assert 1e-9 < mach.double_error < 1e-5
    assert 9 <= mach.certified_digits < 15
    book = make_workbook(record)
    assert require_same_values(book.content, book.formulas) > 0


def test_a_step_of_which_doubles_leave_nothing_does_not_stop_the_workbook() -> None:
    """T and T_0 differ in the 20th digit only: in doubles the Mach number may be anything."""
    record = solved("299.99999999999999999999")
    assert step(record, "M@a").value == pytest.approx(1.2910e-11, rel=1e-3)
    book = make_workbook(record)
    assert require_same_values(book.content, book.formulas) > 0
