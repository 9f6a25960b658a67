"""Which relation gives which unknown, in which order, and what is missing."""

from __future__ import annotations

import random
import tomllib
from dataclasses import replace
from typing import Any

import pytest

import calcsheets
from calcsheets.brief import parse_brief
from calcsheets.errors import (
    AmbiguousRegime,
    ContradictoryInputs,
    NoRoot,
    NotEnoughInputs,
    SeveralRoots,
)
from calcsheets.expressions import integrals_in
from calcsheets.planning import reach, state_problem
from calcsheets.quantities import Variable, catalogue
from calcsheets.record import Record, record_bytes
from calcsheets.relations import Library, load_library
from calcsheets.solving import solve_problem
from tests.brief.toml_writer import write_toml
from tests.conftest import EXAMPLES, ROOT

LETDOWN = ROOT / "examples" / "receiver-letdown.toml"

ORIFICE = """
[calculation]
number = "T-5"
revision = "0"
date = "2026-01-02"
title = "Orifice"
purpose = "What flows?"
originator = "A"

[gas]
gamma = "1.4"
R = "287 J/(kg*K)"

[stations.a]
P0
T_0 = "300 K"

[stations.b]
PB

[[path]]
name = "orifice"
from = "a"
to = "b"
process = "orifice"
d = "10 mm"
C_d = "0.8"
LEG

[wanted]
WANTED
"""


def orifice(
    p_0: str = "", p: str = "", leg: str = "", wanted: str = '"mdot@orifice" = {}'
) -> Record:
    text = ORIFICE.replace("P0", f'p_0 = "{p_0}"' if p_0 else "")
    text = text.replace("PB", f'p = "{p}"' if p else "").replace("LEG", leg)
    return calcsheets.calculate(parse_brief(text.replace("WANTED", wanted)))


def shuffled(value: Any, chance: random.Random) -> Any:
    """The same document with the keys of every table in another order."""
    if isinstance(value, dict):
        keys = list(value)
        chance.shuffle(keys)
        return {key: shuffled(value[key], chance) for key in keys}
    if isinstance(value, list):
        return [shuffled(item, chance) for item in value]
    return value


@pytest.mark.parametrize("path", EXAMPLES, ids=lambda path: path.stem)
def test_the_order_of_keys_changes_no_number_and_no_derivation(path: Any) -> None:
    document = tomllib.loads(path.read_text("utf-8"))
    record = calcsheets.calculate(calcsheets.read_brief(path))

    def essence(found: Record) -> dict[str, Any]:
        relations = {step.key: (step.relation, step.value, step.solved) for step in found.steps}
        results = {result.key: result.value for result in found.results}
        return {"steps": relations, "results": results}

    for seed in range(4):
        text = write_toml(shuffled(document, random.Random(seed)))
        assert essence(calcsheets.calculate(parse_brief(text))) == essence(record)


def test_the_order_of_keys_inside_tables_of_values_changes_no_byte() -> None:
    """Only the brief's own digest follows its text."""
    first = calcsheets.calculate(calcsheets.read_brief(LETDOWN))
    text = LETDOWN.read_text("utf-8").replace(
        '{ value = "8 mm", source = "Orifice data sheet FO-101 rev 0", tolerance = "0.05 mm",',
        '{ source = "Orifice data sheet FO-101 rev 0", tolerance = "0.05 mm", value = "8 mm",',
    )
    second = calcsheets.calculate(parse_brief(text))
    assert second.brief != first.brief
    assert record_bytes(replace(second, brief=first.brief)) == record_bytes(first)


@pytest.mark.parametrize("path", EXAMPLES, ids=lambda path: path.stem)
def test_only_needed_steps_are_taken_each_after_its_inputs(path: Any) -> None:
    record = calcsheets.calculate(calcsheets.read_brief(path))
    used = {operand.key for step in record.steps for operand in step.operands}
    used |= {use.key for step in record.steps for use in step.regimes} | {
        result.key for result in record.results
    }
    done: set[str] = {item.key for item in record.inputs}
    for step in record.steps:
        assert step.key in used, f"{step.key} is needed by nothing"
        assert {operand.key for operand in step.operands} <= done
        done.add(step.key)


def test_of_two_ways_the_one_with_fewer_steps_is_taken() -> None:
    """Given T and T_0, the Mach number needs one relation, not a chain through velocities."""
    text = """
[calculation]
number = "T-6"
revision = "0"
date = "2026-01-02"
title = "A stream"
purpose = "How fast?"
originator = "A"

[gas]
gamma = "1.4"
R = "287 J/(kg*K)"

[stations.a]
T = "280 K"
T_0 = "300 K"

[wanted]
"M@a" = {}
"""
    record = calcsheets.calculate(parse_brief(text))
    assert [step.relation for step in record.steps] == ["stagnation_temperature"]


@pytest.mark.parametrize(("back", "regime"), [("1 bar(a)", "choked"), ("2.5 bar(a)", "not choked")])
def test_a_regime_follows_from_its_test(back: str, regime: str) -> None:
    record = orifice("3 bar(a)", back, wanted='"mdot@orifice" = {}\n"regime@orifice" = {}')
    assert record.results[1].state == regime
    relation = {"choked": "choked_mass_flow", "not choked": "unchoked_mass_flow"}[regime]
    assert relation in [step.relation for step in record.steps]


@pytest.mark.parametrize("back", ["1 bar(a)", "2.5 bar(a)"])
def test_an_upstream_pressure_is_found_in_the_regime_that_agrees_with_itself(back: str) -> None:
    """The regime depends on the answer: each is tried, and kept if its own test agrees."""
    flow = orifice("3 bar(a)", back).results[0].value
    found = orifice(p=back, leg=f'mdot = "{flow!r} kg/s"', wanted='"p_0@a" = { unit = "bar(a)" }')
    assert found.results[0].value == pytest.approx(3, rel=1e-12)
    (test,) = [step.test for step in found.steps if step.test]
    assert test.assumed
    assert test.outcome == ("choked" if back == "1 bar(a)" else "not choked")


def test_a_back_pressure_is_found_above_the_critical_one_only() -> None:
    flow = orifice("3 bar(a)", "2.5 bar(a)").results[0].value
    found = orifice("3 bar(a)", leg=f'mdot = "{flow!r} kg/s"', wanted='"p@b" = { unit = "bar(a)" }')
    assert found.results[0].value == pytest.approx(2.5, rel=1e-9)


def test_a_stated_regime_that_its_test_refutes_is_refused() -> None:
    with pytest.raises((AmbiguousRegime, NoRoot)):
        orifice("3 bar(a)", "1 bar(a)", leg='regime = "not choked"')


def test_an_inlet_below_the_outlet_says_which_limit_is_missed() -> None:
    with pytest.raises(NoRoot) as caught:
        orifice("1 bar(a)", "3 bar(a)")
    assert "gas flows from the higher to the lower pressure" in str(caught.value)


def test_every_input_that_is_proposed_closes_the_problem() -> None:
    text = LETDOWN.read_text("utf-8")
    without = "\n".join(line for line in text.splitlines() if not line.startswith("T_0 = "))
    with pytest.raises(NotEnoughInputs) as caught:
        calcsheets.calculate(parse_brief(without))
    problem = state_problem(parse_brief(without), load_library())
    missing = Variable(*caught.value.wanted.split("@"))
    assert missing not in reach(problem, {}, open_regimes=True)
    assert caught.value.closing[0] == ("T_0@receiver",)
    for names in caught.value.closing:
        extra = [Variable(*name.split("@")) for name in names]
        assert missing in reach(problem, {}, extra=extra, open_regimes=True), names


def test_a_result_that_nothing_offers_is_said_to_be_offered_by_nothing() -> None:
    with pytest.raises(NotEnoughInputs) as caught:
        orifice("3 bar(a)", "1 bar(a)", wanted='"t@orifice" = {}')
    assert str(caught.value) == (
        "t@orifice (time, orifice) does not follow from the inputs: no relation offered by the "
        "path gives it. Add the process that determines it to [[path]], or correct the name."
    )


def test_a_regime_without_a_relation_is_named() -> None:
    """A library that gives the time only of a let-down that stays choked."""
    text = LETDOWN.read_text("utf-8").replace('"0.25 bar(g)"', '"1.5 bar(g)"')
    kept = tuple(
        replace(c, relations=tuple(r for r in c.relations if "unchoked" not in r.name))
        for c in load_library().chapters
    )
    with pytest.raises(NotEnoughInputs) as caught:
        solve_problem(state_problem(parse_brief(text), Library(kept)))
    assert str(caught.value) == (
        "t@let_down_isothermal (time, let-down at constant temperature) does not follow from the "
        "inputs. The regime of let_down_isothermal is unchoked at the end, and the library "
        "gives t there only where it is choked throughout. Change these inputs, or leave it out."
    )


def gas(properties: str) -> Record:
    text = ORIFICE.replace('gamma = "1.4"\nR = "287 J/(kg*K)"', properties)
    text = text.replace("P0", 'p_0 = "3 bar(a)"').replace("PB", 'p = "1 bar(a)"')
    return calcsheets.calculate(
        parse_brief(text.replace("LEG", "").replace("WANTED", '"mdot@orifice" = {}'))
    )


def test_gas_properties_that_contradict_each_other_are_refused() -> None:
    """c_p of air against γR/(γ − 1), 5 % apart."""
    with pytest.raises(ContradictoryInputs) as caught:
        gas('gamma = "1.4"\nR = "287 J/(kg*K)"\nc_p = "1055 J/(kg*K)"')
    assert str(caught.value) == (
        "c_p@gas is 1055 J/(kg*K), but gamma@gas, R@gas lead to 1004.5 J/(kg*K) (relation: "
        "Specific heat at constant pressure from γ); the two sides differ by 4.787%. Remove one "
        "of these inputs, or correct it."
    )


def test_redundant_properties_that_agree_are_shown_as_a_check() -> None:
    record = gas('gamma = "1.4"\nR = "287 J/(kg*K)"\nc_p = "1.005 kJ/(kg*K)"')
    found = {check.relation: check.difference for check in record.checks}
    difference = found["Specific heat at constant pressure from γ"]
    assert abs(difference) == pytest.approx(0.5 / 1005, rel=1e-3)
    assert record.unused == ("c_p@gas",)


def test_a_branch_is_asked_for_where_two_roots_remain() -> None:
    with pytest.raises(SeveralRoots) as caught:
        calcsheets.calculate(calcsheets.read_brief(ROOT / "tests" / "brief" / "nozzle.toml"))
    assert caught.value.branches == ("subsonic", "supersonic")
    assert "Which is meant?" in str(caught.value)


def test_a_shock_decides_the_branch_before_it_and_the_sheet_says_so() -> None:
    text = (ROOT / "examples" / "nozzle-and-shock.toml").read_text("utf-8")
    record = calcsheets.calculate(parse_brief(text.replace('branch = "supersonic"\n', "")))
    (step,) = [step for step in record.steps if step.other_roots]
    assert step.value is not None and step.value > 1
    assert [root.reason for root in step.other_roots] == [
        "outside a limit: a shock stands only in supersonic flow"
    ]


def test_fifty_stations_in_a_row_are_planned() -> None:
    stations = "".join(f"[stations.s{i}]\n\n" for i in range(1, 50))
    legs = "".join(
        f'[[path]]\nname = "l{i}"\nfrom = "s{i}"\nto = "s{i + 1}"\nprocess = "isentropic flow"\n\n'
        for i in range(49)
    )
    text = f"""
[calculation]
number = "T-7"
revision = "0"
date = "2026-01-02"
title = "A long duct"
purpose = "How far?"
originator = "A"

[gas]
gamma = "1.4"
R = "287 J/(kg*K)"

[stations.s0]
p_0 = "5 bar(a)"

{stations}{legs}
[wanted]
"p_0@s49" = {{ unit = "bar(a)" }}
"""
    record = calcsheets.calculate(parse_brief(text))
    assert len(record.steps) == 49
    assert record.results[0].value == 5.0


def test_every_quantity_of_the_vocabulary_occurs_in_a_relation() -> None:
    relations = load_library().relations
    used = {s.quantity for relation in relations for s in relation.symbols}
    sides = (side for r in relations for side in (r.published.left, r.published.right))
    used |= {integral.variable.quantity for side in sides for integral in integrals_in(side)}
    used |= {s.quantity for course in load_library().courses for statement in course.statements
             for s in statement.symbols}  # fmt: skip
    regimes_and_mixtures = {"regime", "x", "w"}
    assert set(catalogue()) - used - regimes_and_mixtures == {"dp", "T_ref", "p_ref"} - used
