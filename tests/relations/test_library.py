"""The library as a whole, and every relation solved for every one of its quantities."""

from __future__ import annotations

import random
from dataclasses import replace
from fractions import Fraction

import pytest
import sympy
from flint import arb

from calcsheets.errors import DefinitionError, SeveralRoots
from calcsheets.expressions import Condition, Number, Symbol, symbols
from calcsheets.relations import Chapter, Library, Limit, Relation, Source, load_library
from calcsheets.relations.relation import KNOWN
from calcsheets.sheets.typesetting import plain_text
from calcsheets.solving import (
    Ball,
    Question,
    compare,
    exact_ball,
    midpoint,
    solve,
    working_precision,
)
from tests.relations.states import random_states

LIBRARY = load_library()
PAIRS = [(relation, symbol) for relation in LIBRARY.relations for symbol in relation.symbols]
STATES = 5
SOURCE = Source("A test", "", "", "common practice")
p, T, rho, R, u = symbols("p T rho R u")


def test_the_library_holds_the_scope_of_the_first_chapters() -> None:
    assert len(LIBRARY.relations) >= 45
    assert [chapter.name for chapter in LIBRARY.chapters] == [
        "thermodynamics", "isentropic", "streams", "orifices", "vessels", "shocks",
        "oblique_shocks", "expansions", "surfaces", "sections", "moving_shocks", "shock_tubes",
        "ducts", "friction", "fanno", "isothermal_ducts", "rayleigh",
        "meters", "orifice_plates", "flow_nozzles", "critical_nozzles", "control_valves",
        "pneumatics",
    ]  # fmt: skip
    assert {relation.chapter for relation in LIBRARY.relations} == {
        chapter.name for chapter in LIBRARY.chapters
    }


@pytest.mark.parametrize("relation", LIBRARY.relations, ids=lambda relation: relation.name)
def test_a_relation_says_where_it_comes_from(relation: Relation) -> None:
    assert relation.source.document
    assert relation.source.known in KNOWN
    assert relation.title[0].isupper()
    assert isinstance(relation.equation, sympy.Equality)
    if relation.source.known == "from memory":
        assert str(relation.source).endswith("(from memory: confirm in the source)")


# Laws, definitions and geometry that hold for any gas; everything else is a model.
WITHOUT_MODEL = {
    "specific_gas_constant", "heat_ratio", "molar_heat", "specific_volume", "first_law_closed",
    "isothermal_temperature", "mach_number", "mach_angle", "dynamic_pressure_velocity",
    "volume_flow", "mass_flux", "molar_flow", "circular_area", "amount_held", "mass_discharged",
    "mass_filled",
    "meter_diameter_ratio", "velocity_of_approach", "meter_reynolds_number",
    "throat_reynolds_number", "relative_pressure_loss", "nozzle_throat_reynolds",
    "lift", "wave_drag", "driver_gas_constant", "driver_mach",
    "hydraulic_diameter", "duct_length", "duct_pressure_drop",
    "rectangle_area", "rectangle_perimeter", "relative_roughness", "fanning_factor",
    "stanton_pannell_factor", "wall_shear",
}  # fmt: skip
TWO_ROOTS = {
    ("area_mach", "M"), ("mass_flow_stagnation", "M"), ("unchoked_mass_flow", "p.2"),
    ("oblique_deflection", "beta"), ("oblique_largest_deflection", "beta_max"),
    ("fanno_stagnation_pressure", "M"), ("rayleigh_temperature", "M"),
}  # fmt: skip
SOMETIMES_TWO_ROOTS = {
    ("second_order_pressure", "M.1"), ("wedge_drag", "alpha_i"),
    ("oblique_detachment", "M.1"), ("oblique_sonic_angle", "M.1"), ("fanno_length", "M"),
    ("rayleigh_stagnation_temperature", "M"), ("rayleigh_stagnation_pressure", "M"),
}  # fmt: skip
# Correlations that rise and fall, so that several values may share one coefficient.
RISE_AND_FALL = {
    *((f"C_{tapping}_{size}", "beta_d") for tapping in ("corner", "D_half", "flange")
      for size in ("large", "small")),
    ("C_eccentric", "beta_d"), ("churchill", "Re"),
}  # fmt: skip


def test_a_model_states_its_assumptions() -> None:
    assert {r.name for r in LIBRARY.relations if not r.assumptions} == WITHOUT_MODEL


@pytest.mark.parametrize(
    "condition",
    [
        *(limit.condition for relation in LIBRARY.relations for limit in relation.limits),
        *(branch.condition for relation in LIBRARY.relations for branch in relation.branches),
        *(condition for regime in LIBRARY.regimes for condition in regime.conditions),
    ],
    ids=plain_text,
)
def test_a_limit_a_branch_and_a_regime_can_be_decided(condition: Condition) -> None:
    """At some states each holds and at others it does not: none is empty."""
    chance = random.Random(3)
    outcomes = set()
    with working_precision():
        for _ in range(200):
            lows = {s: -2 if s.definition.low < 0 else 0.1 for s in condition.symbols}
            values = {s: exact_ball(Fraction(chance.uniform(low, 2))) for s, low in lows.items()}
            outcomes.add(compare(condition, values))
            values = {s: exact_ball(_any_magnitude(s, chance)) for s in condition.symbols}
            outcomes.add(compare(condition, values))
    assert outcomes == {True, False}


def _any_magnitude(symbol: Symbol, chance: random.Random) -> Fraction:
    """A value between the bounds of a quantity, each decade alike."""
    low, high = float(symbol.definition.low), float(symbol.definition.high)
    low = low if low > 0 else min(high, 1e9) * 1e-12
    return Fraction(low * (min(high, 1e9) / low) ** chance.random())


@pytest.mark.parametrize(("relation", "unknown"), PAIRS, ids=[f"{r.name}-{s}" for r, s in PAIRS])
def test_a_relation_answers_for_each_of_its_quantities(relation: Relation, unknown: Symbol) -> None:
    """A quantity of a known state is hidden and found again.

    Where two states share everything else, both are named, and a branch decides between them.
    """
    states = random_states(relation, STATES, seed=1)
    assert len(states) == STATES
    for state in states:
        hidden = state[unknown]
        known = {symbol: ball for symbol, ball in state.items() if symbol != unknown}
        question = Question(relation, unknown, known, "", str(unknown), "a place")
        with working_precision():
            if (relation.name, str(unknown)) in TWO_ROOTS:
                question = _decided(question, hidden)
            elif (relation.name, str(unknown)) in SOMETIMES_TWO_ROOTS:
                question = _decided(question, hidden) if _is_open(question) else question
            elif (relation.name, str(unknown)) in RISE_AND_FALL and _is_among_several(
                question, hidden
            ):
                continue
            assert abs(solve(question).value / hidden - 1) < arb("1e-12")


def _is_among_several(question: Question, hidden: Ball) -> bool:
    """Whether several values were named, the hidden one among them."""
    try:
        solve(question)
    except SeveralRoots as several:
        roots = [float(root) for root in several.roots]
        assert any(abs(root / midpoint(hidden) - 1) < 1e-6 for root in roots)
        return True
    return False


def _is_open(question: Question) -> bool:
    try:
        solve(question)
    except SeveralRoots:
        return True
    return False


def _decided(question: Question, hidden: Ball) -> Question:
    """The question with what decides between its two roots, after both were named."""
    with pytest.raises(SeveralRoots) as caught:
        solve(question)
    roots = [float(root) for root in caught.value.roots]
    assert len(roots) == 2
    assert any(abs(root / midpoint(hidden) - 1) < 1e-6 for root in roots)
    for branch in question.relation.branches:
        if compare(branch.condition, {**question.values, question.unknown: hidden}):
            return replace(question, branch=branch.name)
    if question.relation.name != "unchoked_mass_flow":
        middle = Number(Fraction(sum(roots) / 2))
        upper = midpoint(hidden) > float(middle.value)
        test = Condition(question.unknown, ">=" if upper else "<=", middle)
        return replace(question, limits=(Limit(test, "another input", essential=True),))
    choked = next(regime.conditions[0] for regime in LIBRARY.regimes if regime.name == "choking")
    values = {**question.values, question.unknown: hidden}
    below = compare(choked, values) is True
    comparison = choked.comparison if below else ">"
    test = Condition(choked.left, comparison, choked.right)
    return replace(question, limits=(Limit(test, "the regime", essential=True),))


def test_a_wrong_dimension_is_refused_at_definition() -> None:
    with pytest.raises(DefinitionError) as caught:
        Relation("wrong", "Wrong", p.equals(rho * R), SOURCE, ("stream",))
    assert str(caught.value) == (
        "definition of relation wrong: its sides are in kg*m^-1*s^-2 and in kg*m^-1*s^-2*K^-1"
    )


def test_a_sum_of_unlike_terms_is_refused_at_definition() -> None:
    with pytest.raises(DefinitionError) as caught:
        Relation("wrong", "Wrong", p.equals(rho + u), SOURCE, ("stream",))
    assert "kg*m^-3 and m*s^-1 cannot be added" in str(caught.value)


def test_a_source_says_how_it_is_known() -> None:
    with pytest.raises(DefinitionError):
        Source("A book", "1953", "", "certainly")


def test_a_name_is_taken_once() -> None:
    relation = LIBRARY.relations[0]
    with pytest.raises(DefinitionError) as caught:
        Library((Chapter("a", "A", (relation, relation)),))
    assert str(caught.value) == (
        "definition of relation specific_gas_constant: the name is taken twice"
    )


def test_what_offers_a_relation_exists() -> None:
    relation = Relation("x", "X", p.equals(rho * R * T), SOURCE, ("pipe bend",))
    with pytest.raises(DefinitionError) as caught:
        Library((Chapter("a", "A", (relation,)),))
    assert str(caught.value) == "definition of relation x: nothing is called pipe bend"


def test_the_digest_changes_with_an_equation_and_with_a_source() -> None:
    chapter = LIBRARY.chapters[0]
    first, *rest = chapter.relations
    other = replace(first, source=replace(first.source, edition="another"))
    changed = Library((replace(chapter, relations=(other, *rest)), *LIBRARY.chapters[1:]))
    assert changed.digest != LIBRARY.digest
    assert Library(LIBRARY.chapters).digest == LIBRARY.digest
