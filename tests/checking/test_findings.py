"""The check finds what was planted, and finds nothing in what was not touched."""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import replace
from fractions import Fraction
from pathlib import Path

import pytest

import calcsheets
from calcsheets.checking import Finding, check_record
from calcsheets.expressions import Condition, Number, Symbol
from calcsheets.record import Record, StepRecord, read_record, record_bytes
from tests.conftest import EXAMPLES, ROOT

LETDOWN = ROOT / "examples" / "receiver-letdown.toml"


@pytest.fixture(scope="module")
def record() -> Record:
    return calcsheets.calculate(calcsheets.read_brief(LETDOWN))


def failed(record: Record) -> list[Finding]:
    return [finding for finding in check_record(record) if finding.verdict == "failed"]


@pytest.mark.parametrize("path", EXAMPLES, ids=lambda path: path.stem)
def test_a_record_read_back_from_its_file_passes(path: Path) -> None:
    content = record_bytes(calcsheets.calculate(calcsheets.read_brief(path)))
    assert failed(read_record(content)) == []


def test_every_input_step_and_result_is_checked(record: Record) -> None:
    parts = {finding.part for finding in check_record(record)}
    expected = {f"input {item.number}" for item in record.inputs}
    expected |= {f"step {step.number}" for step in record.steps}
    expected |= {f"result {result.number}" for result in record.results}
    expected |= {f"course {course.key}" for course in record.courses}
    expected |= {f"other route to result {route.result}" for route in record.routes}
    assert parts == expected


def with_step(record: Record, key: str, change: Callable[[StepRecord], StepRecord]) -> Record:
    steps = tuple(change(step) if step.key == key else step for step in record.steps)
    assert steps != record.steps
    return replace(record, steps=steps)


def test_a_changed_value_of_a_step_is_found(record: Record) -> None:
    planted = with_step(record, "R@gas", lambda step: replace(step, value=296.80306))
    assert "step 5" in {finding.part for finding in failed(planted)}


def test_a_step_that_uses_another_value_than_its_origin_is_found(record: Record) -> None:
    def swap(step: StepRecord) -> StepRecord:
        first = replace(step.operands[0], value=step.operands[0].value * 1.0001)
        return replace(step, operands=(first, *step.operands[1:]))

    planted = with_step(record, "mdot@orifice", swap)
    (finding,) = failed(planted)
    assert (finding.part, finding.verdict) == ("step 6", "failed")
    assert finding.reason == "C_d@orifice is not the value of its origin"


def test_a_gauge_pressure_taken_as_absolute_is_found(record: Record) -> None:
    planted = with_step(record, "p_0@receiver", lambda step: replace(step, value=1_200_000.0))
    assert "step 2" in {finding.part for finding in failed(planted)}


def test_another_relation_in_place_of_the_published_one_is_found(record: Record) -> None:
    relations = tuple(
        replace(item, published=Symbol("A").equals(Symbol("d") ** 2))
        if item.name == "circular_area"
        else item
        for item in record.relations
    )
    found = failed(replace(record, relations=relations))
    assert {finding.key for finding in found} >= {"A@orifice", "A@vent"}


def test_a_regime_that_its_test_does_not_give_is_found(record: Record) -> None:
    def turn(step: StepRecord) -> StepRecord:
        assert step.test is not None
        return replace(step, test=replace(step.test, outcome="not choked"))

    planted = with_step(record, "regime@orifice", turn)
    assert [finding.key for finding in failed(planted)] == ["regime@orifice"] * 2


def test_cases_of_a_regime_test_in_another_order_are_found(record: Record) -> None:
    """The first case that holds decides: another order is another test."""

    def before(step: StepRecord) -> StepRecord:
        assert step.test is not None
        (case,) = step.test.cases
        always = replace(case, condition=Condition(case.condition.left, ">=", Number(Fraction(0))))
        return replace(step, test=replace(step.test, cases=(replace(always, outcome="x"), case)))

    planted = with_step(record, "regime@orifice", before)
    (finding,) = [item for item in failed(planted) if item.part.startswith("step")]
    assert finding.reason == "regime test evaluated again: x"


def test_a_wrong_conversion_of_an_input_is_found(record: Record) -> None:
    inputs = tuple(
        replace(item, factor="100") if item.key == "p_0g@receiver" else item
        for item in record.inputs
    )
    (finding,) = failed(replace(record, inputs=inputs))
    assert finding.key == "p_0g@receiver"
    assert finding.reason.startswith("conversion to SI differs by")


def test_a_criterion_called_met_that_is_not_is_found(record: Record) -> None:
    results = tuple(
        replace(result, criteria=tuple(replace(c, holds=not c.holds) for c in result.criteria))
        if result.key == "M@vent"
        else result
        for result in record.results
    )
    (finding,) = failed(replace(record, results=results))
    assert (finding.key, finding.reason) == ("M@vent", "criterion 0.3")


def test_a_result_in_the_wrong_unit_is_found(record: Record) -> None:
    results = tuple(
        replace(result, factor="1") if result.key == "mdot@orifice" else result
        for result in record.results
    )
    (finding,) = failed(replace(record, results=results))
    assert finding.key == "mdot@orifice"
