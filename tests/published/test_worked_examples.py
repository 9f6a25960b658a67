"""Worked examples of handbooks and textbooks, each put to the program as a brief.

Sources and how each is known stand beside each example in worked_examples.toml.
"""

from __future__ import annotations

import math
import re
from decimal import Decimal

import pytest

import calcsheets
from tests.published.examples import CASES, NOT_RUN, SPHERE, TWICE, Case
from tests.published.witnesses import Row, near, rows

EXAMPLES = {row["id"]: row for row in rows("worked_examples")}
PRESSURES = {"kPa", "MPa", "bar", "psi", "atm"}


def our_unit(text: str) -> str:
    """A value of the source in our spelling; its pressures are absolute."""
    number, _, unit = text.partition(" ")
    if unit in PRESSURES:
        return f'"{number} {unit}(a)"'
    spelled = unit.replace("^", "").replace("degR", "°R").replace("degF", "°F")
    spelled = spelled.replace("ft lbf", "ft*lbf").replace("(kg K)", "(kg*K)")
    spelled = spelled.replace("(lbm °R)", "(lbm*°R)")
    return f'"{number} {spelled}"'.replace(' "', '"')


def brief_of(case: Case, row: Row) -> str:
    inputs = {name: our_unit(text) for name, text in row["inputs"].items()}
    wanted = "\n".join(
        f'"{key}" = {{ unit = "{unit}", digits = 12 }}' for key, unit in case.wanted.values()
    )

    def filled(text: str) -> str:
        return re.sub(r"\{(\w+)\}", lambda match: inputs[match.group(1)], text)

    return "\n".join(
        (
            '[calculation]\nnumber = "W"\nrevision = "0"\ndate = "2026-01-02"',
            f'title = "{case.id}"\npurpose = "A worked example."\noriginator = "A"',
            f"[gas]\n{filled(case.gas)}",
            f"[stations.a]\n{filled(case.a)}",
            f"[stations.b]\n{filled(case.b)}",
            '[[path]]\nname = "process"\nfrom = "a"\nto = "b"',
            f'process = "{case.process}"\n{filled(case.leg)}',
            filled(case.more),
            f"[wanted]\n{wanted}",
        )
    )


@pytest.mark.parametrize(
    "case", (*CASES, *TWICE), ids=[f"{c.id}-{'-'.join(c.wanted)}" for c in (*CASES, *TWICE)]
)
def test_a_worked_example_comes_out_as_published(case: Case) -> None:
    row = EXAMPLES[case.id]
    record = calcsheets.calculate(calcsheets.parse_brief(brief_of(case, row)))
    found = {result.key: result.value for result in record.results}
    expected = {item["symbol"]: item for item in reversed(row["expected"])}
    for symbol, (key, _) in case.wanted.items():
        item, value = expected[symbol], found[key]
        assert value is not None
        assert near(value, item["value"], Decimal(item["tolerance"])), (symbol, value)


def test_the_drag_on_a_sphere_follows_from_the_dynamic_pressure() -> None:
    row = EXAMPLES[SPHERE.id]
    record = calcsheets.calculate(calcsheets.parse_brief(brief_of(SPHERE, row)))
    q = record.results[0].value
    assert q is not None
    drag = q * 0.95 * math.pi / 4 * 0.01**2
    (item,) = row["expected"]
    assert near(drag, item["value"], Decimal(item["tolerance"]))


VESSEL = """
[calculation]
number = "W"
revision = "0"
date = "2026-01-02"
title = "A tyre"
purpose = "A worked example."
originator = "A"

[gas]
gamma = "1.40"
R = "53.34 ft*lbf/(lbm*°R)"

[stations.full]
kind = "vessel"
V = "1.00 ft3"
p_0 = "50.0 psia"
T_0 = "70 °F"

[stations.ended]
kind = "vessel"
p_0 = "30.0 psia"

[stations.outside]
p = "14.7 psia"

[[path]]
name = "valve"
from = "full"
to = "outside"
process = "orifice"
d = "0.0938 in"
C_d = "1"

[[path]]
name = "let_down"
from = "full"
to = "ended"
process = "let-down, isothermal"
through = "valve"

[wanted]
"t@let_down" = { unit = "s" }
"""


def test_a_let_down_time_has_the_published_time_constant() -> None:
    """The source's time is its constant times ln(p1/p2); see its remark."""
    record = calcsheets.calculate(calcsheets.parse_brief(VESSEL))
    time = record.results[0].value
    assert time is not None
    (item,) = EXAMPLES["balmer-16-8"]["expected"]
    assert near(time / math.log(50 / 30), item["value"], Decimal(item["tolerance"]))


def test_an_evacuated_tank_fills_to_gamma_times_the_supply_temperature() -> None:
    """A tank that holds almost nothing at first: 0.1 Pa before, 95 kPa after."""
    text = """
[calculation]
number = "W"
revision = "0"
date = "2026-01-02"
title = "A tank"
purpose = "A worked example."
originator = "A"

[gas]
gamma = "1.4"
R = "287 J/(kg*K)"

[stations.air]
kind = "vessel"
p_0 = "200 kPa(a)"
T_0 = "290 K"

[stations.empty]
kind = "vessel"
V = "1 m3"
p_0 = "0.1 Pa(a)"
T_0 = "290 K"

[stations.full]
kind = "vessel"
p_0 = "95 kPa(a)"

[[path]]
name = "valve"
from = "air"
to = "empty"
process = "orifice"
d = "10 mm"
C_d = "1"

[[path]]
name = "filling"
from = "empty"
to = "full"
process = "filling, adiabatic"
through = "valve"

[wanted]
"T_0@full" = { unit = "K" }
"""
    record = calcsheets.calculate(calcsheets.parse_brief(text))
    found = record.results[0].value
    assert found is not None
    (item,) = EXAMPLES["evacuated-tank-fill"]["expected"]
    assert near(found, item["value"], Decimal(item["tolerance"]))


def test_no_example_is_left_out_without_a_reason() -> None:
    run = {case.id for case in (*CASES, *TWICE, SPHERE)}
    assert run | set(NOT_RUN) == set(EXAMPLES)
    assert not run & set(NOT_RUN)
    assert len(run) >= 30
