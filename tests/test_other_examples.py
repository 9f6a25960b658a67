"""The second and third example against independent calculations from the laws, in mpmath.

Provenance: conservation laws, perfect gas, isentropic change, Rankine-Hugoniot jump conditions
(common practice); gas data as the sheet states them; unit definitions of 1959 (see
tests/published/constants.toml).
"""

from __future__ import annotations

import mpmath
import pytest
from mpmath import mpf

import calcsheets
from calcsheets.record import Record
from tests.conftest import ROOT

INCH, POUND = mpf("0.0254"), mpf("0.45359237")
FOOT = 12 * INCH
PSI = POUND * mpf("9.80665") / INCH**2
R_U = mpf("8.31446261815324")


def results(name: str) -> tuple[Record, dict[str, float | str]]:
    record = calcsheets.calculate(calcsheets.read_brief(ROOT / "examples" / f"{name}.toml"))
    return record, {r.key: r.state if r.value is None else r.value for r in record.results}


def kelvin(fahrenheit: str) -> mpf:
    return (mpf(fahrenheit) + mpf("459.67")) * 5 / 9


def given(record: Record, key: str) -> mpf:
    return mpf(next(item.value for item in record.inputs if item.key == key))


@pytest.fixture(scope="module")
def filling() -> dict[str, mpf | str]:
    """The receiver filled, by integrating its mass and energy balance."""
    record, _ = results("air-receiver-filling")
    M_w, C_p = given(record, "M_w@gas"), given(record, "C_p@gas")
    gamma, R = C_p / (C_p - R_U), R_U / M_w
    atm = mpf("14.2") * PSI
    p_s, T_s = 250 * PSI + atm, kelvin("75")
    p_1, p_2, V = atm, 100 * PSI + atm, 120 * FOOT**3
    area = mpf("0.85") * mpmath.pi / 4 * (mpf("0.375") * INCH) ** 2
    throat = T_s * 2 / (gamma + 1)
    density = p_s / (R * T_s) * (throat / T_s) ** (1 / (gamma - 1))
    mdot = area * density * mpmath.sqrt(gamma * R * throat)
    # Isothermal: the pressure rises with the mass. Adiabatic: V dp = γ R T_s dm.
    mass_1 = p_1 * V / (R * T_s)
    supplied = (p_2 - p_1) * V / (R * T_s)
    supplied_hot = V * (p_2 - p_1) / (gamma * R * T_s)
    return {
        "regime@orifice": "choked" if p_1 / p_s < mpf("0.528") else "not choked",
        "mdot@orifice": mdot * 60 / POUND,
        "q_SCF@orifice": mdot * R * kelvin("60") / (mpf("14.696") * PSI) / FOOT**3 * 60,
        "t@filling_isothermal": supplied / mdot,
        "t@filling_adiabatic": supplied_hot / mdot,
        "dm@filling_isothermal": supplied / POUND,
        "T_0@full_adiabatic": p_2 * V / (R * (mass_1 + supplied_hot)) * 9 / 5 - mpf("459.67"),
    }


def test_the_filling_agrees_with_the_independent_calculation(
    filling: dict[str, mpf | str],
) -> None:
    _, found = results("air-receiver-filling")
    assert set(found) == set(filling)
    for key, value in filling.items():
        if isinstance(value, str):
            assert found[key] == value
        else:
            assert abs(mpf(found[key]) / value - 1) < 1e-9, key


@pytest.fixture(scope="module")
def nozzle() -> dict[str, mpf]:
    """The nozzle by mass and energy, the shock by its three jump conditions."""
    record, _ = results("nozzle-and-shock")
    x = {"oxygen": mpf("0.205"), "nitrogen": mpf("0.795")}
    M_w = sum(x[gas] * given(record, f"M_w@{gas}") for gas in x)
    C_p = sum(x[gas] * given(record, f"C_p@{gas}") for gas in x)
    R, gamma = R_U / M_w, C_p / (C_p - R_U)
    c_p = C_p / M_w
    p_0, T_0 = mpf("620000") + mpf("100600"), mpf("313.15")
    areas = {d: mpmath.pi / 4 * mpf(d) ** 2 for d in ("0.018", "0.024")}

    def flux(T: mpf) -> mpf:
        density = p_0 / (R * T_0) * (T / T_0) ** (1 / (gamma - 1))
        return density * mpmath.sqrt(2 * c_p * (T_0 - T))

    mdot = areas["0.018"] * flux(2 * T_0 / (gamma + 1))
    T = mpmath.findroot(
        lambda T: areas["0.024"] * flux(T) - mdot, (mpf(60), mpf(250)), solver="anderson"
    )
    u = mpmath.sqrt(2 * c_p * (T_0 - T))
    p = p_0 * (T / T_0) ** (gamma / (gamma - 1))
    rho = p / (R * T)

    def jump(u_2: mpf) -> mpf:
        """Energy left over behind the shock, by continuity and momentum."""
        p_2 = p + rho * u * (u - u_2)
        T_2 = p_2 * u_2 / (rho * u * R)
        return c_p * T_2 + u_2**2 / 2 - c_p * T_0

    u_2 = mpmath.findroot(jump, (u / 10, u * mpf("0.8")), solver="anderson")
    p_2 = p + rho * u * (u - u_2)
    T_2 = p_2 * u_2 / (rho * u * R)
    p_02 = p_2 * (T_0 / T_2) ** (gamma / (gamma - 1))
    return {
        "M@exit": u / mpmath.sqrt(gamma * R * T),
        "p@exit": p / 1000,
        "T@exit": T,
        "mdot@exit": mdot,
        "p_0@tube": (p_02 - mpf(100600)) / 100000,
        "M@tube": u_2 / mpmath.sqrt(gamma * R * T_2),
    }


def test_the_nozzle_agrees_with_the_independent_calculation(nozzle: dict[str, mpf]) -> None:
    _, found = results("nozzle-and-shock")
    kelvin_of = {"T@exit": mpf("273.15")}
    assert {key.replace("p_0g", "p_0") for key in found} == set(nozzle)
    for key, value in found.items():
        key = key.replace("p_0g", "p_0")
        shown = mpf(value) + kelvin_of.get(key, 0)
        assert abs(shown / nozzle[key] - 1) < 1e-9, key


def test_the_root_that_was_not_taken_is_the_subsonic_one() -> None:
    record, _ = results("nozzle-and-shock")
    step = next(step for step in record.steps if step.key == "M@exit")
    assert step.branch == "supersonic"
    (other,) = step.other_roots
    assert 0.35 < other.value < 0.351
    assert other.reason == "not on the stated branch, supersonic"
    assert step.bracket == (1.0, 1000.0)


@pytest.mark.parametrize("name", ["air-receiver-filling", "nozzle-and-shock"])
def test_the_examples_leave_nothing_unused_and_exceed_no_limit(name: str) -> None:
    record, _ = results(name)
    assert record.unused == ()
    assert all(step.within_limits for step in record.steps)
    assert all(item.source for item in record.inputs)
