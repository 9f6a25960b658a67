"""Sets that need two torn unknowns, and what is taken out of a combination."""

from __future__ import annotations

import math

import pytest

import calcsheets
from calcsheets.checking import check_record
from calcsheets.expressions import Equation, Expr, exp, symbols
from calcsheets.record import Record
from calcsheets.sheets.typesetting import plain_text
from calcsheets.solving.combination import equation_without, shortened
from tests.solving.test_coupled import _HEAD

m, p, R, T, V, rho, gamma = symbols("m p R T V rho gamma")

_LET_DOWN = """
[stations.before]
kind = "vessel"
m = "{before!r} kg"
[stations.after]
kind = "vessel"
p_0 = "{pressure!r} Pa(a)"
m = "{after!r} kg"
[stations.outside]
kind = "stream"
p = "1 bar(a)"
[[path]]
name = "hole"
from = "before"
to = "outside"
process = "orifice"
C_d = "0.85"
A = "2e-4 m2"
[[path]]
name = "down"
from = "before"
to = "after"
process = "let-down, adiabatic"
through = "hole"
t = "{time!r} s"
[wanted]
"V@before" = {{ unit = "m3" }}
"T_0@before" = {{ unit = "K" }}
"""
GAMMA, GAS = 1.4, 287.0
VOLUME, PRESSURE, TEMPERATURE, RATIO = 12.0, 30e5, 310.0, 0.6


def let_down() -> dict[str, float]:
    """Masses, final pressure and time of a let-down, by the textbook's formulas."""
    colder = RATIO ** ((GAMMA - 1) / GAMMA)
    before = PRESSURE * VOLUME / (GAS * TEMPERATURE)
    speed = math.sqrt(GAMMA * GAS * TEMPERATURE)
    choked = ((GAMMA + 1) / 2) ** ((GAMMA + 1) / (2 * (GAMMA - 1)))
    course = RATIO ** (-(GAMMA - 1) / (2 * GAMMA)) - 1
    time = 2 * VOLUME / ((GAMMA - 1) * 0.85 * 2e-4 * speed) * choked * course
    return {
        "before": before,
        "after": before * RATIO / colder,
        "pressure": PRESSURE * RATIO,
        "time": time,
    }


@pytest.fixture(scope="module")
def record(tmp_path_factory: pytest.TempPathFactory) -> Record:
    path = tmp_path_factory.mktemp("nested") / "brief.toml"
    path.write_text(_HEAD + _LET_DOWN.format(**let_down()))
    return calcsheets.calculate(calcsheets.read_brief(path))


def test_volume_and_temperature_follow_from_masses_pressure_and_time(record: Record) -> None:
    """No relation and no loop torn at one unknown gives either: a temperature drops out first."""
    values = {result.key: result.value for result in record.results}
    assert values["V@before"] == pytest.approx(VOLUME, rel=1e-10)
    assert values["T_0@before"] == pytest.approx(TEMPERATURE, rel=1e-10)


def test_its_members_are_checked_one_by_one(record: Record) -> None:
    assert any(step.combination for step in record.steps)
    assert [finding for finding in check_record(record) if finding.verdict == "failed"] == []


@pytest.mark.parametrize(
    ("left", "right", "expected"),
    [
        (p * V, m * R * T, None),
        (p * T, m * R * T, "p = m·R"),
        (p / T, (m * R) / (V * T), "p = m·R/V"),
        ((T * R) ** 2, (T * p) ** 2, "R² = p²"),
        (exp(T / T), T, None),
        (p * (T + m * T), T, None),
    ],
    ids=range(6),
)
def test_a_factor_that_both_sides_have_is_taken_out(
    left: Expr, right: Expr, expected: str | None
) -> None:
    found = equation_without(Equation(left, right), T)
    if expected is None and left == p * V:
        assert found is not None  # the caller has shown that the factor drops out
    else:
        assert (None if found is None else plain_text(found)) == expected


def test_a_fraction_loses_what_stands_above_and_below() -> None:
    assert plain_text(shortened(p / (p * V))) == "1/V"
    assert plain_text(shortened((m * R * T) / (T * V))) == "m·R/V"
    assert plain_text(shortened((m * R) / (T * V))) == "m·R/(T·V)"
