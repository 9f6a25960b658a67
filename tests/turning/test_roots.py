"""The angles of shocks and fans against roots that scipy finds in formulas written anew."""

from __future__ import annotations

import math
from collections.abc import Callable
from fractions import Fraction

import pytest
from scipy.optimize import brentq, minimize_scalar

from calcsheets.errors import NoRoot, SeveralRoots
from calcsheets.expressions import Symbol, symbols
from calcsheets.relations import load_library
from calcsheets.solving import Ball, Question, exact_ball, midpoint, solve, working_precision

RELATIONS = {relation.name: relation for relation in load_library().relations}
gamma, theta, beta, M, nu = symbols("gamma theta beta M nu")
theta_max, beta_max, theta_cr, beta_cr = symbols("theta_max beta_max theta_cr beta_cr")
M_1 = M.of("1")
CASES = [
    (1.4, 1.2, 2.0), (1.4, 1.5, 5.0), (1.4, 2.0, 10.0), (1.4, 3.0, 30.0), (1.4, 8.0, 40.0),
    (1.4, 25.0, 1.0), (1.1, 2.5, 20.0), (1.3, 4.0, 35.0), (1.6667, 3.0, 15.0),
    (1.6667, 10.0, 33.0),
]  # fmt: skip


def solved(name: str, unknown: Symbol, values: dict[Symbol, float], branch: str = "") -> float:
    with working_precision():
        balls: dict[Symbol, Ball] = {s: exact_ball(Fraction(x)) for s, x in values.items()}
        question = Question(RELATIONS[name], unknown, balls, branch, "x", "a place")
        return midpoint(solve(question).value)


def deflection(heat_ratio: float, mach: float, angle: float) -> float:
    """From the ratio of the normal velocities, which is that of the densities."""
    normal = (mach * math.sin(angle)) ** 2
    density = (heat_ratio + 1) * normal / ((heat_ratio - 1) * normal + 2)
    return angle - math.atan(math.tan(angle) / density)


def steepest(heat_ratio: float, mach: float) -> float:
    low = math.asin(1 / mach)
    found = minimize_scalar(
        lambda angle: -deflection(heat_ratio, mach, angle),
        bounds=(low, math.pi / 2),
        method="bounded",
        options={"xatol": 1e-12},
    )
    return float(found.x)


def root(function: Callable[[float], float], low: float, high: float) -> float:
    return float(brentq(function, low, high, xtol=1e-15, rtol=1e-15))


@pytest.mark.parametrize(("heat_ratio", "mach", "degrees"), CASES)
def test_weak_and_strong_shock_angle(heat_ratio: float, mach: float, degrees: float) -> None:
    turn = math.radians(degrees)
    known = {gamma: heat_ratio, M_1: mach, theta: turn}
    top = steepest(heat_ratio, mach)
    for branch, low, high in (
        ("weak", math.asin(1 / mach), top),
        ("strong", top, math.pi / 2),
    ):
        expected = root(lambda x: deflection(heat_ratio, mach, x) - turn, low, high)
        assert solved("oblique_deflection", beta, known, branch) == pytest.approx(
            expected, rel=1e-9
        )
    with pytest.raises(SeveralRoots) as caught:
        solved("oblique_deflection", beta, known)
    assert caught.value.branches == ("weak", "strong")


@pytest.mark.parametrize(("heat_ratio", "mach", "degrees"), CASES)
def test_detachment_and_sonic_angle(heat_ratio: float, mach: float, degrees: float) -> None:
    known = {gamma: heat_ratio, M_1: mach}
    top = steepest(heat_ratio, mach)
    angle = solved("oblique_detachment", beta_max, known)
    assert angle == pytest.approx(top, abs=1e-6)  # a maximum is found to half the digits
    largest = solved("oblique_largest_deflection", theta_max, {**known, beta_max: angle})
    assert largest == pytest.approx(deflection(heat_ratio, mach, top), rel=1e-11)

    def mach_behind(x: float) -> float:
        normal = (mach * math.sin(x)) ** 2
        behind = ((heat_ratio - 1) * normal + 2) / (2 * heat_ratio * normal - (heat_ratio - 1))
        return math.sqrt(behind) / math.sin(x - deflection(heat_ratio, mach, x))

    sonic = root(lambda x: mach_behind(x) - 1, math.asin(1 / mach), math.pi / 2)
    found = solved("oblique_sonic_angle", beta_cr, known)
    assert found == pytest.approx(sonic, rel=1e-9)
    assert solved("oblique_sonic_deflection", theta_cr, {**known, beta_cr: found}) == pytest.approx(
        deflection(heat_ratio, mach, sonic), rel=1e-9
    )
    assert found < angle


def test_beyond_the_largest_deflection_there_is_no_attached_shock() -> None:
    for branch in ("", "weak", "strong"):
        with pytest.raises(NoRoot):
            solved("oblique_deflection", beta, {gamma: 1.4, M_1: 3.0, theta: 0.6}, branch)


def test_no_deflection_is_a_mach_wave_or_a_normal_shock() -> None:
    known = {gamma: 1.4, M_1: 3.0, theta: 0.0}
    assert solved("oblique_deflection", beta, known, "weak") == pytest.approx(math.asin(1 / 3))
    assert solved("oblique_deflection", beta, known, "strong") == pytest.approx(math.pi / 2)


@pytest.mark.parametrize("heat_ratio", [1.05, 1.2, 1.4, 1.6667])
@pytest.mark.parametrize("mach", [1.001, 1.01, 1.5, 2.0, 4.0, 12.0, 50.0])
def test_mach_number_from_the_prandtl_meyer_angle(heat_ratio: float, mach: float) -> None:
    """The angle is integrated from its differential equation, the Mach number found from it."""
    from scipy.integrate import quad

    def slope(x: float) -> float:
        return math.sqrt(x * x - 1) / (1 + (heat_ratio - 1) / 2 * x * x) / x

    angle = quad(slope, 1, mach, epsabs=1e-15, epsrel=1e-13, limit=500)[0]
    assert solved("prandtl_meyer", nu, {gamma: heat_ratio, M: mach}) == pytest.approx(
        angle, rel=1e-9
    )
    assert solved("prandtl_meyer", M, {gamma: heat_ratio, nu: angle}) == pytest.approx(
        mach, rel=1e-8
    )


def test_sonic_flow_has_no_prandtl_meyer_angle() -> None:
    assert solved("prandtl_meyer", nu, {gamma: 1.4, M: 1.0}) == 0
    assert solved("prandtl_meyer", M, {gamma: 1.4, nu: 0.0}) == pytest.approx(1, abs=1e-9)
