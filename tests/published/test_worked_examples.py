"""Worked examples of handbooks and textbooks, each put to the program as a brief.

Sources and how each is known stand beside each example in worked_examples.toml.
"""

from __future__ import annotations

import math
import re
from decimal import Decimal

import pytest

import calcsheets
from tests.published.examples import CASES, NOT_RUN, NOT_TAKEN, RATIOS, STEPS, TWICE, Case
from tests.published.witnesses import near, rows

EXAMPLES = {row["id"]: row for row in rows("worked_examples")}
PUT = (*CASES, *RATIOS, *TWICE)
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


def filled(text: str, inputs: dict[str, str]) -> str:
    """A text with the inputs of an example in their places."""

    def value(match: re.Match[str]) -> str:
        name, unit = match.groups()
        if unit:
            return f'"{inputs[name].split()[0]} {unit}"'
        return our_unit(inputs[name])

    return re.sub(r"\{(\w+)(?:\|([^}]+))?\}", value, text)


def brief_of(case: Case, inputs: dict[str, str]) -> str:
    wanted = "\n".join(
        f'"{key}" = {{ unit = "{unit}", digits = 12 }}' for key, unit in case.wanted.values()
    )

    return "\n".join(
        (
            '[calculation]\nnumber = "W"\nrevision = "0"\ndate = "2026-01-02"',
            f'title = "{case.id}"\npurpose = "A worked example."\noriginator = "A"',
            f"[gas]\n{filled(case.gas, inputs)}",
            f"[stations.a]\n{filled(case.a, inputs)}",
            f"[stations.b]\n{filled(case.b, inputs)}",
            '[[path]]\nname = "process"\nfrom = "a"\nto = "b"',
            f'process = "{case.process}"\n{filled(case.leg, inputs)}',
            filled(case.more, inputs),
            f"[wanted]\n{wanted}",
        )
    )


def results_of(text: str) -> dict[str, float]:
    record = calcsheets.calculate(calcsheets.parse_brief(text))
    return {result.key: result.value for result in record.results if result.value is not None}


def step(name: str, **more: str) -> dict[str, float]:
    """The results of a step by the symbols of the source; ``more`` adds to its inputs."""
    case = STEPS[name]
    found = results_of(brief_of(case, {**EXAMPLES[case.id]["inputs"], **more}))
    return {symbol: found[key] for symbol, (key, _) in case.wanted.items()}


def number(example: str, name: str) -> float:
    return float(EXAMPLES[example]["inputs"][name].split()[0])


def is_published(found: float, example: str, symbol: str) -> bool:
    """Whether a value is that of the source, within the tolerance stated there."""
    name, _, which = symbol.partition("#")
    items = [item for item in EXAMPLES[example]["expected"] if item["symbol"] == name]
    item = items[int(which or 1) - 1]
    return near(found, item["value"], Decimal(item["tolerance"]))


@pytest.mark.parametrize("case", PUT, ids=[f"{c.id}-{'-'.join(c.wanted)}" for c in PUT])
def test_a_worked_example_comes_out_as_published(case: Case) -> None:
    found = results_of(brief_of(case, EXAMPLES[case.id]["inputs"]))
    for symbol, (key, _) in case.wanted.items():
        assert is_published(found[key], case.id, symbol), (symbol, found[key])


# Values that are more than one quantity of one brief


def test_the_drag_on_a_sphere_follows_from_the_dynamic_pressure() -> None:
    area = math.pi / 4 * number("elger-12-4", "D") ** 2
    drag = step("sphere")["q"] * number("elger-12-4", "C_D") * area
    assert is_published(drag, "elger-12-4", "F")


def test_a_widening_duct_has_the_published_area_over_its_critical_area() -> None:
    ratio = number("niemeyer-isentropic", "A_2_over_A_1") / step("second area")["A_star"]
    assert is_published(ratio, "niemeyer-isentropic", "A_2_over_A_star")


def test_hydrogen_and_methane_leak_in_the_published_ratio() -> None:
    weights = (number("farrell-choked-ratio", f"weight_{gas}") for gas in ("H2", "CH4"))
    hydrogen, methane = weights
    ratio = hydrogen * step("hydrogen")["mdot"] / (methane * step("methane")["mdot"])
    assert is_published(ratio, "farrell-choked-ratio", "ratio")


def test_dry_air_at_altitude_takes_the_published_volume() -> None:
    """The program counts gas dry; the pressure of the dry part is taken from the source's rule."""
    names = ("p", "relative_humidity", "p_sat")
    total, humidity, saturation = (number("acfm-altitude", name) for name in names)
    found = step("dry air", p_dry=f"{total - humidity * saturation:.6f}")
    assert is_published(found["Q"], "acfm-altitude", "Q")


def test_an_ideal_compressor_heats_and_takes_work_as_published() -> None:
    """From the stagnation temperature that the first part of the example printed."""
    inlet = EXAMPLES["cengel-aircraft"]["expected"][1]
    assert inlet["symbol"] == "T_01"
    found = step("compressor", T_01=f"{inlet['value']} {inlet['unit']}")
    assert is_published(found["T_02"], "cengel-aircraft", "T_02")
    assert is_published(-found["w"], "cengel-aircraft", "w")  # ours counts as done by the gas


def test_a_rocket_has_the_published_specific_impulse() -> None:
    """The exhaust velocity over the standard acceleration of gravity."""
    constants = {row["name"]: row["value"] for row in rows("constants")}
    impulse = step("rocket")["V_e"] / float(constants["standard acceleration of gravity"])
    assert is_published(impulse, "sutton-3-2", "I_s")


VESSEL = """
[calculation]
number = "W"
revision = "0"
date = "2026-01-02"
title = "A vessel"
purpose = "A worked example."
originator = "A"
"""

TYRE = """
[gas]
gamma = {gamma}
R = {R}

[stations.full]
kind = "vessel"
V = {V}
p_0 = {p_initial}
T_0 = {T_0}

[stations.ended]
kind = "vessel"
p_0 = "30.0 psia"

[stations.outside]
p = {p_a}

[[path]]
name = "valve"
from = "full"
to = "outside"
process = "orifice"
d = {D_exit}
C_d = {C_d}

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
    found = results_of(VESSEL + filled(TYRE, EXAMPLES["balmer-16-8"]["inputs"]))
    constant = found["t@let_down"] / math.log(number("balmer-16-8", "p_initial") / 30)
    assert is_published(constant, "balmer-16-8", "tau")


TANK = """
[gas]
gamma = {gamma}
R = "287 J/(kg*K)"

[stations.air]
kind = "vessel"
p_0 = "200 kPa(a)"
T_0 = {T_supply}

[stations.empty]
kind = "vessel"
V = "1 m3"
p_0 = "0.1 Pa(a)"
T_0 = {T_supply}

[stations.full]
kind = "vessel"
p_0 = {p}

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


def test_an_evacuated_tank_fills_to_gamma_times_the_supply_temperature() -> None:
    """A tank that holds almost nothing at first: 0.1 Pa before. The energy balance does not ask
    how fast it fills, so the supply stands at a pressure that keeps the valve choked."""
    found = results_of(VESSEL + filled(TANK, EXAMPLES["evacuated-tank-fill"]["inputs"]))
    assert is_published(found["T_0@full"], "evacuated-tank-fill", "T")


# Completeness

BY_TEST = {
    ("elger-12-4", "F"): test_the_drag_on_a_sphere_follows_from_the_dynamic_pressure,
    (
        "niemeyer-isentropic",
        "A_2_over_A_star",
    ): test_a_widening_duct_has_the_published_area_over_its_critical_area,
    ("farrell-choked-ratio", "ratio"): test_hydrogen_and_methane_leak_in_the_published_ratio,
    ("acfm-altitude", "Q"): test_dry_air_at_altitude_takes_the_published_volume,
    ("cengel-aircraft", "T_02"): test_an_ideal_compressor_heats_and_takes_work_as_published,
    ("cengel-aircraft", "w"): test_an_ideal_compressor_heats_and_takes_work_as_published,
    ("sutton-3-2", "I_s"): test_a_rocket_has_the_published_specific_impulse,
    ("balmer-16-8", "tau"): test_a_let_down_time_has_the_published_time_constant,
    (
        "evacuated-tank-fill",
        "T",
    ): test_an_evacuated_tank_fills_to_gamma_times_the_supply_temperature,
}


def published_values() -> set[tuple[str, str]]:
    """Every value of every example, a second one of the same symbol marked so."""
    values: set[tuple[str, str]] = set()
    for example, row in EXAMPLES.items():
        for item in row["expected"]:
            first = (example, item["symbol"])
            values.add((example, f"{item['symbol']}#2") if first in values else first)
    return values


def test_every_published_value_is_compared_or_its_example_listed_with_a_reason() -> None:
    compared = {(case.id, symbol) for case in PUT for symbol in case.wanted} | set(BY_TEST)
    listed = {value for value in published_values() if value[0] in NOT_RUN}
    assert compared | listed == published_values()
    assert not compared & listed
    assert len({example for example, _ in compared}) >= 30


def test_every_input_of_a_source_is_taken_or_listed_with_a_reason() -> None:
    by_hand = {  # read in the tests that go on from a brief
        "elger-12-4": {"C_D", "D"},
        "farrell-choked-ratio": {"weight_H2", "weight_CH4"},
        "acfm-altitude": {"p", "relative_humidity", "p_sat"},
    }
    texts = dict.fromkeys(EXAMPLES, "")
    texts |= {"balmer-16-8": TYRE, "evacuated-tank-fill": TANK}
    for case in (*PUT, *STEPS.values()):
        texts[case.id] += "\n".join((case.gas, case.a, case.b, case.leg, case.more))
    for example, row in EXAMPLES.items():
        taken = set(re.findall(r"\{(\w+)[|}]", texts[example])) | by_hand.get(example, set())
        open_inputs = {(example, name) for name in set(row["inputs"]) - taken}
        assert open_inputs == {key for key in NOT_TAKEN if key[0] == example}
