"""Regimes as ordered chains of cases: the first that holds decides, the last one else."""

from __future__ import annotations

from fractions import Fraction

import pytest

from calcsheets.errors import DefinitionError
from calcsheets.expressions import Condition, number, symbols
from calcsheets.relations import Regime, Source, load_library
from calcsheets.solving import exact_ball, working_precision
from calcsheets.solving.question import decide

SOURCE = Source("A book", "1953", "", "from memory")
p, p_0, T, T_0 = symbols("p p_0 T T_0")
HIGH: Condition = (p / p_0).at_least(number("0.9"))
MIDDLE: Condition = (p / p_0).at_least(number("0.5"))
LOW: Condition = (p / p_0).at_least(number("0.1"))
FOUR = Regime(
    "four",
    "Four ways",
    ((HIGH, "high"), (MIDDLE, "middle"), (LOW, "low")),
    "very low",
    ("orifice",),
    SOURCE,
)


def test_the_outcomes_are_those_of_the_cases_and_the_last_one() -> None:
    assert FOUR.outcomes == ("high", "middle", "low", "very low")


@pytest.mark.parametrize(
    ("outcomes", "asked"),
    [
        (("high",), (HIGH,)),
        (("middle",), (HIGH.opposite, MIDDLE)),
        (("very low",), (HIGH.opposite, MIDDLE.opposite, LOW.opposite)),
        (("middle", "low"), (HIGH.opposite,)),
        (("very low", "low"), (HIGH.opposite, MIDDLE.opposite)),
        (("high", "very low"), ()),
    ],
)
def test_an_outcome_asks_that_no_case_before_it_holds(
    outcomes: tuple[str, ...], asked: tuple[Condition, ...]
) -> None:
    assert FOUR.asks(outcomes) == asked


@pytest.mark.parametrize("comparison", ["<", "<=", ">", ">="])
def test_the_opposite_of_the_opposite_is_the_condition(comparison: str) -> None:
    condition = Condition(p, comparison, p_0)
    assert condition.opposite != condition
    assert condition.opposite.opposite == condition


def test_each_symbol_is_named_once_in_order_of_appearance() -> None:
    chain = Regime("x", "X", ((T.at_most(T_0), "cold"), (HIGH, "high")), "low", ("o",), SOURCE)
    assert chain.symbols == (T, T_0, p, p_0)


def refused(*cases: tuple[Condition, str], otherwise: str = "low") -> str:
    with pytest.raises(DefinitionError) as caught:
        Regime("x", "X", cases, otherwise, ("orifice",), SOURCE)
    return str(caught.value)


def test_a_test_without_a_case_is_refused() -> None:
    assert refused() == "definition of regime test x: it has no case to test"


def test_two_cases_with_one_outcome_are_refused() -> None:
    assert refused((HIGH, "high"), (MIDDLE, "high")) == (
        'definition of regime test x: two cases come to "high"'
    )
    assert 'two cases come to "low"' in refused((HIGH, "low"))


def test_every_case_must_be_homogeneous() -> None:
    assert "its sides are in" in refused((HIGH, "high"), (Condition(p, "<", T), "middle"))


@pytest.mark.parametrize(
    ("ratio", "at_least", "at_most", "above", "below"),
    [
        ("0.5", True, True, False, False),
        ("0.5000000000004", True, True, False, False),
        ("0.4999999999996", True, True, False, False),
        ("0.500000000001", True, False, True, False),
        ("0.499999999999", False, True, False, True),
        ("0.6", True, False, True, False),
    ],
)
def test_sides_within_a_part_in_a_million_million_count_as_equal(
    ratio: str, at_least: bool, at_most: bool, above: bool, below: bool
) -> None:
    with working_precision():
        values = {p: exact_ball(Fraction(ratio)), p_0: exact_ball(Fraction(1))}
        half, found = number("0.5"), {}
        for comparison in (">=", "<=", ">", "<"):
            found[comparison] = decide(Condition(p / p_0, comparison, half), values)
    assert found == {">=": at_least, "<=": at_most, ">": above, "<": below}


def test_a_relation_names_only_regimes_that_its_process_can_have() -> None:
    library = load_library()
    for relation in library.relations:
        for role, outcomes in relation.uses:
            possible = {
                outcome
                for regime in library.regimes
                if role or set(regime.offered_by) & set(relation.offered_by)
                for outcome in regime.outcomes
            }
            assert set(outcomes) <= possible, relation.name
