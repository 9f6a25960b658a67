"""The first example against an independent calculation, written from the laws in plain mpmath.

Provenance of what is compared with: laws of conservation, the perfect-gas state and the
isentropic change (common practice); the exact molar gas constant (library, see
tests/published/constants.toml). Nothing of the program's formulas is used: the let-down times
come from the differential equation of the vessel, the vent from the root of its mass balance.
"""

from __future__ import annotations

from decimal import Decimal
from pathlib import Path

import mpmath
import pytest
from mpmath import mpf

import calcsheets
from calcsheets.record import Record
from tests.conftest import ROOT

EXAMPLE = ROOT / "examples" / "receiver-letdown.toml"
TEXT = EXAMPLE.read_text("utf-8")

# Key of the input: its text in the brief, and its value in coherent SI.
INPUTS = {
    "p_atm@site": ("98.2 kPa", "98200"),
    "gamma@gas": ("1.40", "1.40"),
    "M_w@gas": ("28.0134 g/mol", "0.0280134"),
    "V@receiver": ("3.2 m3", "3.2"),
    "p_0@receiver": ("12.0 bar(g)", "1200000"),
    "T_0@receiver": ("25 °C", "298.15"),
    "p@header": ("0.25 bar(g)", "25000"),
    "d@vent": ("52.5 mm", "0.0525"),
    "d@orifice": ("8 mm", "0.008"),
    "C_d@orifice": ("0.82", "0.82"),
    "p_0@emptied_isothermal": ("2.0 bar(g)", "200000"),
    "p_0@emptied_adiabatic": ("2.0 bar(g)", "200000"),
    "t@limit_isothermal": ("600 s", "600"),
    "t@limit_adiabatic": ("600 s", "600"),
}


def si(text: str) -> mpf:
    return mpf(text)


def throat_flux(p: mpf, T: mpf, gamma: mpf, R: mpf) -> mpf:
    """Mass flux of the choked throat: density times speed of sound at M = 1."""
    T_throat = T * 2 / (gamma + 1)
    p_throat = p * (T_throat / T) ** (gamma / (gamma - 1))
    return p_throat / (R * T_throat) * mpmath.sqrt(gamma * R * T_throat)


def let_down_time(area: mpf, state: dict[str, mpf], end: mpf, adiabatic: bool) -> mpf:
    """Integral of dm/mdot over the pressure of the vessel, from the mass balance."""
    gamma, R, V = state["gamma"], state["R"], state["V"]

    def temperature(p: mpf) -> mpf:
        if not adiabatic:
            return state["T"]
        return state["T"] * (p / state["p"]) ** ((gamma - 1) / gamma)

    def mass(p: mpf) -> mpf:
        return p * V / (R * temperature(p))

    def integrand(p: mpf) -> mpf:
        flow = area * throat_flux(p, temperature(p), gamma, R)
        return mpmath.diff(mass, p) / flow

    return mpmath.quad(integrand, mpmath.linspace(end, state["p"], 9))


def independent(values: dict[str, mpf]) -> dict[str, mpf]:
    """Every result of the example in coherent SI, from its inputs in coherent SI."""
    gamma, M_w, atm = values["gamma@gas"], values["M_w@gas"], values["p_atm@site"]
    R = mpf("8.31446261815324") / M_w
    p_0, T_0, V = values["p_0@receiver"] + atm, values["T_0@receiver"], values["V@receiver"]
    p_back = values["p@header"] + atm
    state = {"gamma": gamma, "R": R, "V": V, "T": T_0, "p": p_0}
    area = values["C_d@orifice"] * mpmath.pi * values["d@orifice"] ** 2 / 4
    mdot = area * throat_flux(p_0, T_0, gamma, R)
    ends = {kind: values[f"p_0@emptied_{kind}"] + atm for kind in ("isothermal", "adiabatic")}
    times = {kind: let_down_time(area, state, ends[kind], kind == "adiabatic") for kind in ends}
    smallest = {
        # The time goes with one over the area.
        kind: values["d@orifice"] * mpmath.sqrt(times[kind] / values[f"t@limit_{kind}"])
        for kind in ends
    }
    A_vent = mpmath.pi * values["d@vent"] ** 2 / 4

    def imbalance(u: mpf) -> mpf:
        T = T_0 - u**2 * (gamma - 1) / (2 * gamma * R)
        return p_back / (R * T) * u * A_vent - mdot

    u = mpmath.findroot(imbalance, (mpf(1), mpf(200)), solver="anderson")
    T_vent = T_0 - u**2 * (gamma - 1) / (2 * gamma * R)
    return {
        "mdot@orifice": mdot,
        "q_N@orifice": mdot * R * mpf("273.15") / mpf(101325),
        "m@receiver": p_0 * V / (R * T_0),
        "t@let_down_isothermal": times["isothermal"],
        "t@let_down_adiabatic": times["adiabatic"],
        "T_0@emptied_adiabatic": T_0 * (ends["adiabatic"] / p_0) ** ((gamma - 1) / gamma),
        "d@smallest_isothermal": smallest["isothermal"],
        "d@smallest_adiabatic": smallest["adiabatic"],
        "M@vent": u / mpmath.sqrt(gamma * R * T_vent),
        "u@vent": u,
        "F@vent": mdot * u + (p_back - atm) * A_vent,
    }


UNIT = {  # printed unit of each result: factor and zero in coherent SI
    "mdot@orifice": (mpf(1) / 3600, 0),
    "q_N@orifice": (mpf(1) / 3600, 0),
    "T_0@emptied_adiabatic": (mpf(1), mpf("273.15")),
    "d@smallest_isothermal": (mpf("0.001"), 0),
    "d@smallest_adiabatic": (mpf("0.001"), 0),
}


def agree(record: Record, values: dict[str, mpf]) -> None:
    found = {r.key: r.value for r in record.results if r.value is not None}
    expected = independent(values)
    assert set(found) == set(expected)
    for key, value in expected.items():
        factor, zero = UNIT.get(key, (mpf(1), 0))
        # Relative to the value in coherent SI: a temperature in °C may be near zero.
        difference = abs(mpf(found[key]) * factor + zero - value) / abs(value)
        assert difference < 1e-9, key


@pytest.fixture(scope="module")
def si_values() -> dict[str, mpf]:
    return {key: si(value) for key, (_, value) in INPUTS.items()}


def test_the_record_agrees_with_the_independent_calculation(si_values: dict[str, mpf]) -> None:
    agree(calcsheets.calculate(calcsheets.read_brief(EXAMPLE)), si_values)


def test_the_orifice_is_choked_throughout() -> None:
    """Critical pressure ratio of γ = 1.4: 0.5283 (NACA Report 1135, table I, from memory)."""
    record = calcsheets.calculate(calcsheets.read_brief(EXAMPLE))
    outcomes = {step.test.outcome for step in record.steps if step.test}
    assert outcomes == {"choked", "choked throughout"}
    assert (25 + 98.2) / (200 + 98.2) < 0.5283


def test_the_criteria_are_those_of_the_brief() -> None:
    record = calcsheets.calculate(calcsheets.read_brief(EXAMPLE))
    assert {r.key: r.verdict for r in record.results if r.criteria} == {
        "t@let_down_isothermal": "met",
        "t@let_down_adiabatic": "met",
        "T_0@emptied_adiabatic": "caution",
        "d@smallest_isothermal": "met",
        "d@smallest_adiabatic": "met",
        "M@vent": "met",
    }
    assert record.all_met


@pytest.mark.parametrize("key", INPUTS)
def test_an_input_3_percent_larger_agrees_too(key: str, si_values: dict[str, mpf]) -> None:
    """Changed in the text of the brief and by the Python face: both are the same calculation."""
    old, _ = INPUTS[key]
    number, _, unit = old.partition(" ")
    new = f"{Decimal(number) * Decimal('1.03')} {unit}".strip()
    by_face = calcsheets.calculate(calcsheets.read_brief(EXAMPLE), inputs={key: new})
    by_text = calcsheets.calculate(calcsheets.parse_brief(_with(key, old, new)))
    assert [r.value for r in by_text.results] == [r.value for r in by_face.results]
    factor = {"°C": mpf(1), "bar(g)": mpf(100000), "g/mol": mpf("0.001"), "kPa": mpf(1000)}
    scale = factor.get(unit, mpf("0.001") if unit == "mm" else mpf(1))
    zero = mpf("273.15") if unit == "°C" else mpf(0)
    changed = {**si_values, key: mpf(new.partition(" ")[0]) * scale + zero}
    agree(by_face, changed)


def _with(key: str, old: str, new: str) -> str:
    """The brief with one input's text replaced, found by its table and key."""
    symbol, place = key.split("@")
    lines, inside, done = [], False, False
    for line in TEXT.splitlines():
        if line.startswith("["):
            inside = line in (f"[stations.{place}]", f"[{place}]")
        if line == f'name = "{place}"':
            inside = True
        if inside and line.startswith(f"{symbol} = ") and f'"{old}"' in line:
            line, done = line.replace(f'"{old}"', f'"{new}"'), True
        lines.append(line)
    assert done, key
    return "\n".join(lines)


def test_the_printed_sheet_shows_the_numbers_of_the_independent_calculation(
    si_values: dict[str, mpf], tmp_path: Path
) -> None:
    import subprocess

    from tests.conftest import require_program

    package = calcsheets.write_sheets(
        calcsheets.calculate(calcsheets.read_brief(EXAMPLE)), tmp_path
    )
    done = subprocess.run(
        [require_program("pdftotext"), "-layout", str(package.pdf), "-"],
        capture_output=True,
        check=True,
    )
    text = done.stdout.decode().replace("\u202f", "").replace("\u2212", "-")
    for key, value in independent(si_values).items():
        factor, zero = UNIT.get(key, (mpf(1), 0))
        printed = mpmath.nstr((value - zero) / factor, 4, strip_zeros=False)
        assert printed in text, (key, printed)
