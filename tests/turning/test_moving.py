"""Moving shocks and shock tubes against the conservation laws, written anew for the test."""

from __future__ import annotations

import math

import pytest
from scipy.optimize import brentq

from calcsheets.errors import CalcsheetsError, NoRoot
from calcsheets.record import Record
from tests.turning.briefs import calculated, turning

R = 287.05
AHEAD = 'p = "40 kPa(a)"\nT = "290 K"\n'
GASES = [(1.4, 1.2), (1.4, 3.0), (1.667, 2.0), (1.15, 6.0)]


def si(record: Record, key: str) -> float:
    return float(record.value(key).to_base_units().magnitude)


@pytest.mark.parametrize(("gamma", "mach"), GASES)
@pytest.mark.parametrize("stream", [0.0, 120.0])
def test_mass_momentum_and_energy_are_conserved_seen_from_the_shock(
    gamma: float, mach: float, stream: float
) -> None:
    given = f'{AHEAD}u = "{stream} m/s"'
    keys = "u_s@wave u@b p@b T@b rho@a rho@b T_0s@wave p_01s@wave p_02s@wave M_2s@wave ds@wave"
    body = turning("moving normal shock", given, f'M_s = "{mach}"')
    record = calculated(body, keys, str(gamma))
    shock = si(record, "u_s@wave")
    ahead, behind = shock - stream, shock - si(record, "u@b")
    rho_1, rho_2 = si(record, "rho@a"), si(record, "rho@b")
    assert rho_1 * ahead == pytest.approx(rho_2 * behind, rel=1e-12)
    assert 4e4 + rho_1 * ahead**2 == pytest.approx(si(record, "p@b") + rho_2 * behind**2, rel=1e-12)
    c_p = gamma * R / (gamma - 1)
    total = 290 + ahead**2 / (2 * c_p)
    assert total == pytest.approx(si(record, "T@b") + behind**2 / (2 * c_p), rel=1e-12)
    assert si(record, "T_0s@wave") == pytest.approx(total, rel=1e-12)
    sound = math.sqrt(gamma * R * si(record, "T@b"))
    assert si(record, "M_2s@wave") == pytest.approx(behind / sound, rel=1e-12)
    loss = si(record, "p_02s@wave") / si(record, "p_01s@wave")
    assert loss < 1
    rise = c_p * math.log(si(record, "T@b") / 290) - R * math.log(si(record, "p@b") / 4e4)
    assert si(record, "ds@wave") == pytest.approx(rise, rel=1e-9)
    assert -R * math.log(loss) == pytest.approx(rise, rel=1e-9)


def test_stagnation_values_over_ground_are_not_those_seen_from_the_shock() -> None:
    """A moving shock raises the stagnation temperature over ground; seen from it none is lost."""
    body = turning("moving normal shock", f'{AHEAD}u = "0 m/s"', 'M_s = "2"')
    record = calculated(body, "T_0@a T_0@b T_0s@wave p_0@b p_02s@wave")
    assert si(record, "T_0@a") == 290
    assert si(record, "T_0@b") > si(record, "T_0@a") * 1.5
    assert si(record, "T_0s@wave") == pytest.approx(290 * 1.8, rel=1e-12)
    assert si(record, "p_0@b") != pytest.approx(si(record, "p_02s@wave"), rel=0.1)


def test_a_shock_against_its_stream_slows_it_down() -> None:
    given = f'{AHEAD}u = "300 m/s"'
    body = turning("moving normal shock against the stream", given, 'M_s = "1.3"')
    record = calculated(body, "u_s@wave u@b u_p@wave")
    sound = math.sqrt(1.4 * R * 290)
    assert si(record, "u_s@wave") == pytest.approx(1.3 * sound - 300, rel=1e-12)
    assert si(record, "u@b") == pytest.approx(300 - si(record, "u_p@wave"), rel=1e-12)
    assert 0 < si(record, "u@b") < 300


def test_gas_that_would_run_back_is_refused() -> None:
    given = f'{AHEAD}u = "100 m/s"'
    body = turning("moving normal shock against the stream", given, 'M_s = "3"')
    with pytest.raises(NoRoot):
        calculated(body, "u@b")


def test_a_wave_slower_than_sound_is_no_shock() -> None:
    body = turning("moving normal shock", f'{AHEAD}u = "0 m/s"', 'M_s = "0.9"')
    with pytest.raises(CalcsheetsError) as caught:
        calculated(body, "p@b")
    assert "a shock is faster than sound in the gas ahead" in str(caught.value)


@pytest.mark.parametrize(("gamma", "mach"), GASES)
def test_a_reflection_in_one_step_and_in_two(gamma: float, mach: float) -> None:
    body = (
        f'[stations.a]\n{AHEAD}u = "0 m/s"\n[stations.b]\n[stations.c]\n[stations.wall]\n'
        '[[path]]\nname = "incident"\nfrom = "a"\nto = "b"\nprocess = "moving normal shock"\n'
        f'M_s = "{mach}"\n'
        '[[path]]\nname = "back"\nfrom = "b"\nto = "c"\nprocess = "reflected normal shock"\n'
        '[[path]]\nname = "whole"\nfrom = "a"\nto = "wall"\n'
        'process = "shock reflection at a closed end"\n'
        'M_s = { same_as = "M_s@incident" }\n'
    )
    keys = "p@c p@wall T@c T@wall M_s@back M_r@whole u@c u_s@back"
    record = calculated(body, keys, str(gamma))
    assert si(record, "p@c") == pytest.approx(si(record, "p@wall"), rel=1e-10)
    assert si(record, "T@c") == pytest.approx(si(record, "T@wall"), rel=1e-10)
    assert si(record, "M_s@back") == pytest.approx(si(record, "M_r@whole"), rel=1e-10)
    assert abs(si(record, "u@c")) < 1e-9
    assert si(record, "u_s@back") > 0


TUBE = """
[stations.driven]
p = "5 kPa(a)"
T = "295 K"
u = "0 m/s"
[stations.behind]
[stations.driver]
kind = "driver"
p = "{pressure} kPa(a)"
T = "320 K"
u = "0 m/s"
gamma_4 = "1.667"
M_w4 = "4.0026 g/mol"
[stations.expanded]
kind = "driver"
[[path]]
name = "tube"
from = "driven"
to = "driver"
process = "shock tube"
[[path]]
name = "wave"
from = "driven"
to = "behind"
process = "moving normal shock"
M_s = {{ same_as = "M_s@tube" }}
[[path]]
name = "contact"
from = "behind"
to = "expanded"
process = "contact surface"
[[path]]
name = "expansion"
from = "driver"
to = "expanded"
process = "unsteady expansion of the driver gas"
"""


@pytest.mark.parametrize("pressure", [6.0, 50.0, 1000.0, 20000.0])
def test_helium_drives_a_shock_into_air(pressure: float) -> None:
    """Pressure and velocity meet where scipy finds them, with the properties of each gas."""
    g_1, g_4, r_4 = 1.4, 1.667, 8.31446261815324 / 4.0026e-3
    a_1, a_4 = math.sqrt(g_1 * R * 295), math.sqrt(g_4 * r_4 * 320)

    def gap(ratio: float) -> float:
        rise = ratio - 1
        shock = a_1 / g_1 * rise * math.sqrt(2 * g_1 / (g_1 + 1) / (ratio + (g_1 - 1) / (g_1 + 1)))
        left = (ratio * 5 / pressure) ** ((g_4 - 1) / (2 * g_4))
        return shock - 2 * a_4 / (g_4 - 1) * (1 - left)

    ratio = brentq(gap, 1, pressure / 5, xtol=1e-14, rtol=1e-14)
    mach = math.sqrt(1 + (g_1 + 1) / (2 * g_1) * (ratio - 1))
    keys = "M_s@tube p@behind u@behind p@expanded T@expanded u_tail@expansion M@expanded"
    record = calculated(TUBE.format(pressure=pressure), keys)
    assert si(record, "M_s@tube") == pytest.approx(mach, rel=1e-10)
    assert si(record, "p@behind") == pytest.approx(5000 * ratio, rel=1e-9)
    cooled = 320 * (ratio * 5 / pressure) ** ((g_4 - 1) / g_4)
    assert si(record, "T@expanded") == pytest.approx(cooled, rel=1e-9)
    velocity, sound = si(record, "u@behind"), math.sqrt(g_4 * r_4 * cooled)
    assert si(record, "M@expanded") == pytest.approx(velocity / sound, rel=1e-9)
    assert si(record, "u_tail@expansion") == pytest.approx(velocity - sound, rel=1e-8)


def test_the_driver_pressure_for_a_wanted_shock() -> None:
    body = (
        TUBE.format(pressure=1)
        .replace('p = "1 kPa(a)"\n', "")
        .replace('process = "shock tube"', 'process = "shock tube"\nM_s = "3"')
    )
    record = calculated(body, "p@driver")
    pressure = si(record, "p@driver")
    again = calculated(TUBE.format(pressure=pressure / 1000), "M_s@tube")
    assert si(again, "M_s@tube") == pytest.approx(3, rel=1e-9)


def test_relations_of_the_gas_of_the_brief_are_not_offered_to_the_driver_gas() -> None:
    """Its speed of sound must come from its own properties: none is known without them."""
    body = TUBE.format(pressure=100).replace('gamma_4 = "1.667"\n', "")
    with pytest.raises(CalcsheetsError) as caught:
        calculated(body, "M_s@tube")
    assert str(caught.value).endswith("or a_4@driver.")


def test_an_unsteady_expansion_is_isentropic_and_keeps_its_invariant() -> None:
    body = turning("unsteady expansion", f'{AHEAD}u = "0 m/s"', "").replace(
        "[stations.b]", '[stations.b]\np = "15 kPa(a)"'
    )
    record = calculated(body, "u@b T@b u_esc@wave u_tail@wave a@a a@b")
    a_1, a_2 = si(record, "a@a"), si(record, "a@b")
    assert si(record, "T@b") == pytest.approx(290 * (15 / 40) ** (0.4 / 1.4), rel=1e-12)
    assert si(record, "u@b") == pytest.approx(5 * (a_1 - a_2), rel=1e-12)
    assert si(record, "u_esc@wave") == pytest.approx(5 * a_1, rel=1e-12)
    assert si(record, "u_tail@wave") == pytest.approx(si(record, "u@b") - a_2, rel=1e-12)
