"""The record is frozen, canonical, and the same wherever it is made."""

from __future__ import annotations

import hashlib
import json
import os
import subprocess
import sys
from dataclasses import FrozenInstanceError, replace
from typing import Any

import pytest
import rfc8785

import calcsheets
from calcsheets.errors import DefinitionError
from calcsheets.record import CriterionRecord, Record, read_record, record_bytes
from calcsheets.record.digits import certified_digits
from tests.conftest import EXAMPLES, ROOT

LETDOWN = ROOT / "examples" / "receiver-letdown.toml"


@pytest.fixture(scope="module")
def record() -> Record:
    return calcsheets.calculate(calcsheets.read_brief(LETDOWN))


@pytest.mark.parametrize("path", EXAMPLES, ids=lambda path: path.stem)
def test_a_record_is_read_back_as_it_was_written(path: Any) -> None:
    made = calcsheets.calculate(calcsheets.read_brief(path))
    content = record_bytes(made)
    assert read_record(content) == made
    assert record_bytes(read_record(content)) == content


def test_the_file_is_canonical_json(record: Record) -> None:
    """RFC 8785 by an implementation of others (library), and its outward signs."""
    content = record_bytes(record)
    assert content == rfc8785.dumps(json.loads(content))
    assert content.decode("utf-8").startswith('{"assumptions":[{"basis":')
    assert b", " not in content.replace(b'", ', b"")[:200]


def test_the_digest_is_that_of_the_file(record: Record) -> None:
    assert record.digest == hashlib.sha256(record_bytes(record)).hexdigest()


def test_another_process_makes_the_same_record(record: Record) -> None:
    code = (
        "import sys, calcsheets\n"
        "print(calcsheets.calculate(calcsheets.read_brief(sys.argv[1])).digest)\n"
    )
    for seed, zone in (("0", "UTC"), ("4242", "Pacific/Auckland")):
        done = subprocess.run(
            [sys.executable, "-c", code, str(LETDOWN)],
            cwd=ROOT,
            env={**os.environ, "PYTHONHASHSEED": seed, "TZ": zone, "LC_ALL": "C"},
            capture_output=True,
            text=True,
            check=True,
        )
        assert done.stdout.strip() == record.digest


def test_nothing_in_a_record_can_be_changed(record: Record) -> None:
    with pytest.raises(FrozenInstanceError):
        record.gas = "air"  # type: ignore[misc]
    with pytest.raises(FrozenInstanceError):
        record.steps[0].value = 1.0  # type: ignore[misc]


def test_every_change_changes_the_digest(record: Record) -> None:
    step = replace(record.steps[0], value=123200.00000000001)
    for changed in (
        replace(record, steps=(step, *record.steps[1:])),
        replace(record, gas="Nitrogen"),
        replace(record, program="calcsheets 0.1.1"),
        replace(record, inputs=(replace(record.inputs[0], source="elsewhere"), *record.inputs[1:])),
    ):
        assert changed.digest != record.digest


def test_a_value_leaves_the_record_with_its_unit(record: Record) -> None:
    assert record.value("mdot@orifice").to("kg/s").magnitude == pytest.approx(0.12316689812)
    assert str(record.value("T_0@emptied_adiabatic").units) == "degree_Celsius"
    assert record.value("p_0@receiver").to("bar").magnitude == pytest.approx(12.982)
    assert record.value("regime@orifice") == "choked"
    with pytest.raises(DefinitionError) as caught:
        record.value("mdot@nowhere")
    assert "the record holds only" in str(caught.value)


def edited(record: Record, change: Any) -> bytes:
    plain = json.loads(record_bytes(record))
    change(plain)
    return rfc8785.dumps(plain)


@pytest.mark.parametrize(
    ("change", "reason"),
    [
        (lambda r: r.update(extra=1), "unknown field extra in Record"),
        (lambda r: r.pop("gas"), "'gas'"),
        (lambda r: r["steps"][0].update(value="1e5"), "expected float, found str"),
        (lambda r: r["steps"][0].update(number=True), "expected"),
        (lambda r: r["steps"][0].update(symbol="<ci>exec</ci>"), "no such quantity"),
        (lambda r: r["relations"][0].update(published="<a/>"), "element a is not expected"),
        (lambda r: r.update(inputs={"a": 1}), "expected an object for InputRecord"),
        (lambda r: r.update(identity=[7]), "expected an object for FieldRecord"),
    ],
    ids=["extra", "missing", "type", "bool", "symbol", "mathml", "object", "number"],
)
def test_what_is_no_record_is_refused(record: Record, change: Any, reason: str) -> None:
    content = edited(record, change)
    assert content != record_bytes(record)
    with pytest.raises(DefinitionError) as caught:
        read_record(content)
    assert reason in str(caught.value)


@pytest.mark.parametrize("content", [b"", b"[]", b"7", b"{}", b"\xff", b"[" * 100_000])
def test_other_files_are_refused(content: bytes) -> None:
    with pytest.raises(DefinitionError):
        read_record(content)


@pytest.mark.parametrize(
    ("lower", "upper", "digits"),
    [
        ("1.2345", "1.2345", 15),
        ("1.23449999", "1.23450001", 8),
        ("0.99", "1.01", 1),
        ("-1", "1", 0),
        ("123456.7", "123456.8", 6),
    ],
)
def test_digits_are_certified_by_both_ends(lower: str, upper: str, digits: int) -> None:
    assert certified_digits(lower, upper) == digits


def criterion(record: Record, holds: bool, otherwise: str) -> str:
    found = next(result for result in record.results if result.criteria)
    one = CriterionRecord("<=", "1", 1.0, holds, holds)
    return replace(found, criteria=(one,), otherwise=otherwise).verdict


def test_a_verdict_says_what_the_criterion_says(record: Record) -> None:
    assert criterion(record, True, "fail") == "met"
    assert criterion(record, False, "fail") == "not met"
    assert criterion(record, False, "caution") == "caution"


def test_a_decision_that_rounding_would_change_is_kept_unrounded() -> None:
    """560.658 s against 560.6 s: printed with 3 digits it would be 561, with 4 it is 560.7."""
    text = LETDOWN.read_text("utf-8").replace(
        'at constant temperature", at_most = "600 s"',
        'at constant temperature", digits = 3, at_most = "560.8 s"',
    )
    record = calcsheets.calculate(calcsheets.parse_brief(text))
    (found,) = next(r.criteria for r in record.results if r.key == "t@let_down_isothermal")
    assert found.holds
    assert not found.holds_rounded


def test_open_points_are_those_of_the_brief(record: Record) -> None:
    assert len(record.holds) == 1
    assert {item.key for item in record.open_inputs} == {
        "T_0@receiver", "p_g@header", "C_d@orifice",
    }  # fmt: skip
    assert record.unused == ()


def test_a_temperature_outside_the_gas_data_is_a_caution() -> None:
    record = calcsheets.calculate(
        calcsheets.read_brief(ROOT / "examples" / "nozzle-and-shock.toml")
    )
    hot = calcsheets.calculate(
        calcsheets.read_brief(ROOT / "examples" / "nozzle-and-shock.toml"),
        inputs={"T_0@throat": "500 °C"},
    )
    assert not any("holds within 2 %" in caution for caution in record.cautions)
    assert any("holds within 2 %" in caution for caution in hot.cautions)


def test_properties_of_another_gas_are_a_caution() -> None:
    """γ = 1.30 for nitrogen, whose heat capacity at 25 °C gives 1.400."""
    brief = calcsheets.read_brief(LETDOWN)
    wrong = calcsheets.calculate(brief, inputs={"gamma@gas": "1.30"})
    expected = (
        "Ratio of specific heats of nitrogen: 1.3 is used, the gas data give 1.3996 at 25 °C. "
        "Check that the value is that of this gas."
    )
    assert expected in wrong.cautions
    assert not any("the gas data give" in c for c in calcsheets.calculate(brief).cautions)
