"""One relation solved for one unknown: moves, polynomial forms, roots, and what is no number."""

from __future__ import annotations

import itertools
import random
from dataclasses import replace
from fractions import Fraction
from typing import Any

import mpmath
import pytest
from scipy.optimize import brentq

import calcsheets
from calcsheets.checking.decimals import evaluate_decimal
from calcsheets.errors import NoRoot, OutsideLimit, SeveralRoots
from calcsheets.expressions import Equation, Symbol, lg, number, symbols
from calcsheets.record import Record, StepRecord
from calcsheets.relations import Limit, load_library
from calcsheets.sheets.typesetting import plain_text
from calcsheets.solving import Question, Solution, exact_ball, isolate, midpoint, solve
from calcsheets.solving.balls import working_precision
from calcsheets.solving.polynomials import polynomial_form
from calcsheets.solving.roots import isolate_roots
from tests.conftest import EXAMPLES

RELATIONS = {relation.name: relation for relation in load_library().relations}


def answer(name: str, unknown: str, branch: str = "", **values: str) -> Solution:
    relation = RELATIONS[name]
    named = {str(symbol).replace(".", "__"): symbol for symbol in relation.symbols}
    with working_precision():
        known = {named[key]: exact_ball(Fraction(text)) for key, text in values.items()}
        return solve(Question(relation, named[unknown], known, branch, unknown, "stations.x"))


def moves(name: str, unknown: str) -> list[str]:
    """The moves in words, each with the equation that it leads to."""
    relation = RELATIONS[name]
    symbol = next(s for s in relation.symbols if str(s) == unknown)
    isolation = isolate(relation.published, symbol)
    assert isolation is not None
    return [
        f"{move.action} {plain_text(move.operand) if move.operand else ''}".strip()
        + f": {plain_text(move.result)}"
        for move in isolation.moves
    ]


def test_an_unknown_is_isolated_move_by_move() -> None:
    assert moves("stagnation_temperature", "M") == [
        "exchange sides: 1 + ((γ − 1)/2)·M² = T₀/T",
        "subtract 1: ((γ − 1)/2)·M² = T₀/T − 1",
        "divide by (γ − 1)/2: M² = (T₀/T − 1)·2/(γ − 1)",
        "take the positive square root: M = √((T₀/T − 1)·2/(γ − 1))",
    ]


def test_the_published_order_is_kept_in_a_solved_form() -> None:
    assert moves("choked_mass_flow", "A") == [
        "exchange sides: C_d·A·p_0,1·√(γ/(R·T_0,1))·(2/(γ + 1))^((γ + 1)/(2·(γ − 1))) = ṁ",
        "divide by C_d·p_0,1·√(γ/(R·T_0,1))·(2/(γ + 1))^((γ + 1)/(2·(γ − 1))): "
        "A = ṁ/(C_d·p_0,1·√(γ/(R·T_0,1))·(2/(γ + 1))^((γ + 1)/(2·(γ − 1))))",
    ]


def test_an_unknown_below_a_fraction_and_inside_a_power() -> None:
    assert moves("stagnation_pressure", "p") == [
        "take reciprocals and multiply by p₀: p = p₀/(1 + ((γ − 1)/2)·M²)^(γ/(γ − 1))"
    ]
    assert moves("isentropic_T_p", "T.2")[1:] == [
        "raise to the power (γ − 1)/γ: T₂/T₁ = (p₂/p₁)^((γ − 1)/γ)",
        "multiply by T₁: T₂ = T₁·(p₂/p₁)^((γ − 1)/γ)",
    ]


def test_a_logarithm_is_undone() -> None:
    last = moves("let_down_time_isothermal", "p_0.2")[-1]
    assert last.startswith("take reciprocals and multiply by p_0,1: p_0,2 = p_0,1/exp(")


def of_equation(equation: Equation, unknown: Symbol) -> list[str]:
    isolation = isolate(equation, unknown)
    assert isolation is not None
    return [f"{move.action}: {plain_text(move.result)}" for move in isolation.moves]


def test_a_logarithm_to_base_ten_is_undone_by_powers_of_ten_and_the_other_way_round() -> None:
    a, b = symbols("M M_cr")
    assert of_equation(Equation(lg(2 * a), b), a) == [
        "raise 10 to both sides: 2·M = 10^M*",
        "divide by: M = 10^M*/2",
    ]
    assert of_equation(Equation(number("10") ** a, b), a) == ["apply: M = lg(M*)"]


def collected(name: str, unknown: str) -> list[str]:
    """The moves to a polynomial in words, each with the equation that it leads to."""
    relation = RELATIONS[name]
    symbol = next(s for s in relation.symbols if str(s) == unknown)
    form = polynomial_form(relation.published, symbol)
    assert form is not None
    return [f"{move.action}: {plain_text(move.result)}" for move in form.moves]


def test_an_unknown_that_occurs_twice_is_collected() -> None:
    assert collected("c_p_from_gamma", "gamma") == ["collect powers of: (R − c_p)·γ + c_p = 0"]
    assert collected("shock_mach", "M.1") == [
        "collect powers of: (2·γ·M₂² + 1 − γ)·M₁² + M₂² − γ·M₂² − 2 = 0"
    ]


def test_powers_around_a_polynomial_are_undone_first() -> None:
    assert collected("polytropic_T_p", "n") == [
        "exchange sides: (p₂/p₁)^((n − 1)/n) = T₂/T₁",
        "take logarithms and divide by: (n − 1)/n = ln(T₂/T₁)/ln(p₂/p₁)",
        "collect powers of: (ln(T₂/T₁)/ln(p₂/p₁) − 1)·n + 1 = 0",
    ]


def test_a_root_over_the_unknown_is_squared_away_and_the_false_root_is_dropped() -> None:
    assert collected("mass_flow_static", "M")[0] == (
        "square: ṁ² = A²·p²·M²·(γ/(R·T₀))·(1 + ((γ − 1)/2)·M²)"
    )
    known = {"mdot": "1", "A": "0.01", "p": "100000", "gamma": "1.4", "R": "287", "T_0": "300"}
    found = answer("mass_flow_static", "M", **known)
    assert found.method == "polynomial"
    assert found.other_roots == ()
    assert midpoint(found.value) == pytest.approx(0.246498692614, rel=1e-11)


def test_an_area_ratio_without_a_branch_is_a_question_with_both_roots() -> None:
    """0.3059 and 2.1972 at A/A* = 2 (NACA Report 1135, table I and II, from memory)."""
    with pytest.raises(SeveralRoots) as caught:
        answer("area_mach", "M", A="2", A_cr="1", gamma="1.4")
    assert str(caught.value) == (
        "Area and Mach number: M may be 0.3059038 or 2.197198. Which is meant? "
        'State branch = "subsonic" or branch = "supersonic" at stations.x.'
    )


@pytest.mark.parametrize(
    ("branch", "mach", "other"),
    [("subsonic", 0.305903834189, 2.19719812165), ("supersonic", 2.19719812165, 0.305903834189)],
)
def test_the_stated_branch_is_taken_and_the_other_root_is_kept(
    branch: str, mach: float, other: float
) -> None:
    found = answer("area_mach", "M", branch, A="2", A_cr="1", gamma="1.4")
    assert midpoint(found.value) == pytest.approx(mach, rel=1e-11)
    assert [midpoint(root.value) for root in found.other_roots] == [pytest.approx(other)]
    assert found.other_roots[0].reason == f"not on the stated branch, {branch}"
    assert found.branch == branch


@pytest.mark.parametrize(("branch", "ratio"), [("subsonic", 0.9372), ("supersonic", 0.0939)])
def test_the_branch_decides_a_pressure_ten_times_over(branch: str, ratio: float) -> None:
    """p/p_0 at A/A* = 2 (NACA Report 1135, tables I and II, from memory)."""
    mach = midpoint(answer("area_mach", "M", branch, A="2", A_cr="1", gamma="1.4").value)
    found = answer("stagnation_pressure", "p", p_0="1", M=f"{mach:.15f}", gamma="1.4")
    assert midpoint(found.value) == pytest.approx(ratio, abs=0.00005)


def test_a_mass_flow_below_the_critical_one_has_two_mach_numbers() -> None:
    known = {"mdot": "2", "A": "0.01", "p_0": "100000", "gamma": "1.4", "R": "287", "T_0": "300"}
    with pytest.raises(SeveralRoots) as caught:
        answer("mass_flow_stagnation", "M", **known)
    low, high = (float(root) for root in caught.value.roots)
    assert low < 1 < high
    assert midpoint(answer("mass_flow_stagnation", "M", "subsonic", **known).value) < 1
    assert midpoint(answer("mass_flow_stagnation", "M", "supersonic", **known).value) > 1


def test_more_than_the_critical_mass_flow_has_no_mach_number() -> None:
    """Choked flux at γ = 1.4: 0.6847 p_0/√(R T_0) (from memory), here 2.333 kg/s."""
    known = {"mdot": "2.34", "A": "0.01", "p_0": "100000", "gamma": "1.4", "R": "287",
             "T_0": "300"}  # fmt: skip
    with pytest.raises(NoRoot) as caught:
        answer("mass_flow_stagnation", "M", **known)
    reached = float(caught.value.reached.split()[-1])
    assert reached == pytest.approx(0.6847 * 0.01 * 100000 / (287 * 300) ** 0.5, rel=1e-4)


def test_a_pitot_reading_below_that_of_sonic_flow_has_no_shock() -> None:
    """At M = 1 the ratio is 1/0.5283 = 1.893 (NACA Report 1135, table I, from memory)."""
    with pytest.raises(NoRoot) as caught:
        answer("rayleigh_pitot", "M__1", p_0__2="1.64", p__1="1", gamma="1.4")
    assert "there the relation reaches 1.892929 to" in str(caught.value)


def test_a_shock_without_strength_stands_at_the_speed_of_sound() -> None:
    """M = 1 is a threefold root: the definition of the weakest shock."""
    found = answer("shock_stagnation_pressure", "M__1", p_0__1="1", p_0__2="1", gamma="1.4")
    assert midpoint(found.value) == pytest.approx(1, abs=1e-9)


def test_an_area_below_the_critical_one_has_no_root() -> None:
    with pytest.raises(NoRoot) as caught:
        answer("area_mach", "M", A="0.9", A_cr="1", gamma="1.4")
    assert "there the relation reaches 1 to" in str(caught.value)
    assert "asked is 0.9" in str(caught.value)


def test_the_critical_area_has_its_one_touching_root() -> None:
    found = answer("area_mach", "M", A="1", A_cr="1", gamma="1.4")
    assert midpoint(found.value) == pytest.approx(1, abs=1e-9)


def test_a_subsonic_stream_has_no_shock_behind_which_a_wanted_state_lies() -> None:
    with pytest.raises(NoRoot):
        answer("shock_mach", "M__1", M__2="0.3", gamma="1.4")


def test_a_shock_in_a_subsonic_stream_is_no_number() -> None:
    with pytest.raises(OutsideLimit) as caught:
        answer("shock_mach", "M__2", M__1="0.9", gamma="1.4")
    assert caught.value.limit == "a shock stands only in supersonic flow"


def test_equal_pressures_drive_no_flow() -> None:
    known = {"C_d": "0.8", "A": "0.0001", "p_0__1": "800000", "gamma": "1.4", "R": "287",
             "T_0__1": "300", "p__2": "800000"}  # fmt: skip
    assert midpoint(answer("unchoked_mass_flow", "mdot", **known).value) == 0.0


def test_outside_a_limit_that_is_not_essential_a_value_is_given() -> None:
    """The root within the limits goes first; without one, the record marks the step."""
    gamma, mach, area, critical = symbols("gamma M A A_cr")
    published = RELATIONS["area_mach"].published
    limit = Limit(mach.at_least(1), "measured in supersonic flow only")
    relation = replace(RELATIONS["area_mach"], limits=(limit,), branches=())
    assert published.symbols == (area, critical, mach, gamma)
    known = {gamma: "1.4", area: "2", critical: "1"}
    with working_precision():
        values = {symbol: exact_ball(Fraction(text)) for symbol, text in known.items()}
        found = solve(Question(relation, mach, values, "", "M", "a place"))
        assert midpoint(found.value) == pytest.approx(2.19719812165)
        thin = replace(relation, limits=(Limit(mach.at_least(10), "far beyond"),))
        with pytest.raises(SeveralRoots):
            solve(Question(thin, mach, values, "", "M", "a place"))


def test_a_flow_below_choking_has_two_back_pressures_and_no_guess_is_made() -> None:
    known = {"C_d": "0.8", "A": "0.0001", "p_0__1": "800000", "gamma": "1.4", "R": "287",
             "T_0__1": "300", "mdot": "0.1"}  # fmt: skip
    with pytest.raises(SeveralRoots) as caught:
        answer("unchoked_mass_flow", "p__2", **known)
    assert len(caught.value.roots) == 2


def test_a_static_temperature_above_the_stagnation_one_has_no_mach_number() -> None:
    with pytest.raises(NoRoot) as caught:
        answer("stagnation_temperature", "M", T_0="300", T="310", gamma="1.4")
    assert "asked is 0.9677419" in str(caught.value)


def test_no_root_is_missed() -> None:
    """Roots of random polynomials times an exponential, against a scan by scipy (library)."""
    chance = random.Random(11)
    for _ in range(100):
        roots = sorted(chance.uniform(0.02, 9.5) for _ in range(chance.randint(1, 5)))
        if any(b - a < 1e-3 for a, b in itertools.pairwise(roots)):
            continue
        exact = [Fraction(root) for root in roots]

        def value(x, exact=exact):  # type: ignore[no-untyped-def]
            product = x * 0 + 1
            for root in exact:
                product = product * (x - exact_ball(root))
            return product * (-x).exp()

        def slope(x, exact=exact):  # type: ignore[no-untyped-def]
            total = x * 0
            for skipped in range(len(exact)):
                product = x * 0 + 1
                for index, root in enumerate(exact):
                    if index != skipped:
                        product = product * (x - exact_ball(root))
                total = total + product
            return total * (-x).exp() - value(x)

        with working_precision():
            found = isolate_roots(value, slope, Fraction(1, 100), Fraction(10))
        scanned = _scan(roots)
        assert [midpoint(root.value) for root in found] == pytest.approx(scanned, rel=1e-9)


def _scan(roots: list[float]) -> list[float]:
    def value(x: float) -> float:
        product = 1.0
        for root in roots:
            product *= x - root
        return product

    grid = [0.01 + i * (10 - 0.01) / 40_000 for i in range(40_001)]
    signs = [value(x) for x in grid]
    return [
        brentq(value, grid[i], grid[i + 1], xtol=1e-14)
        for i in range(40_000)
        if signs[i] * signs[i + 1] < 0
    ]


@pytest.fixture(scope="module", params=EXAMPLES, ids=lambda path: path.stem)
def record(request: pytest.FixtureRequest) -> Record:
    return calcsheets.calculate(calcsheets.read_brief(request.param))


def test_each_enclosure_holds_the_value_in_50_digits(record: Record) -> None:
    """The chain is evaluated again by mpmath (library) from the exact inputs."""
    with mpmath.workdps(50):
        values = {
            item.key: mpmath.mpf(Fraction(item.number_typed).numerator)
            / Fraction(item.number_typed).denominator
            * _mpf(item.factor)
            + _mpf(item.offset)
            for item in record.inputs
        }
        for step in record.steps:
            if step.value is None:
                continue
            known = {o.symbol: values[o.key] for o in step.operands}
            value = _root(record, step, known) if step.solved is None else None
            values[step.key] = value or evaluate_decimal(step.solved, known)
            margin = abs(values[step.key]) * mpmath.mpf("1e-24")  # bounds are kept in 25 digits
            assert mpmath.mpf(step.lower) - margin <= values[step.key], step.key
            assert values[step.key] <= mpmath.mpf(step.upper) + margin, step.key


def _root(record: Record, step: StepRecord, known: dict[Symbol, Any]) -> Any:
    published = record.relation(step.relation).published

    def difference(at: Any) -> Any:
        values = {**known, step.symbol: at}
        return evaluate_decimal(published.left, values) - evaluate_decimal(published.right, values)

    near = mpmath.mpf(step.value)
    return mpmath.findroot(difference, (near * 0.999, near * 1.001), solver="anderson", tol=1e-45)


def _mpf(text: str) -> object:
    fraction = Fraction(text)
    return mpmath.mpf(fraction.numerator) / fraction.denominator


def test_each_value_put_back_leaves_no_residual(record: Record) -> None:
    assert max(step.residual for step in record.steps) < 1e-30
    assert min(step.certified_digits for step in record.steps if not step.test) == 15
