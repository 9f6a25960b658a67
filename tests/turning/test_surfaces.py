"""Approximations of the pressure on surfaces against exact waves, and forces on sections."""

from __future__ import annotations

import math

import pytest

from calcsheets.record import Record
from tests.turning.briefs import calculated, turning


def si(record: Record, key: str) -> float:
    return float(record.value(key).to_base_units().magnitude)


def coefficient(process: str, mach: float, degrees: float, gamma: float = 1.4) -> float:
    given = f'M = "{mach}"\np = "1 Pa(a)"'
    body = turning(process, given, f'delta = "{degrees} deg"')
    return si(calculated(body, "C_pr@wave", str(gamma)), "C_pr@wave")


def exact(mach: float, degrees: float, gamma: float = 1.4) -> float:
    """From the oblique shock or the expansion fan."""
    process = "oblique shock" if degrees > 0 else "expansion fan"
    own = f'theta = "{abs(degrees)} deg"' + ('\nbranch = "weak"' if degrees > 0 else "")
    body = turning(process, f'M = "{mach}"\np = "1 Pa(a)"', own)
    body += '[[path]]\nname = "panel"\nfrom = "a"\nto = "b"\nprocess = "surface in a free stream"\n'
    return si(calculated(body, "C_pr@panel", str(gamma)), "C_pr@panel")


@pytest.mark.parametrize("mach", [1.5, 2.0, 3.0])
@pytest.mark.parametrize("degrees", [1.0, -1.0])
def test_errors_fall_with_the_power_of_the_inclination_that_is_left_out(
    mach: float, degrees: float
) -> None:
    """Halving the inclination divides the error by about four, and by about eight."""
    for process, factor in (("surface, linearised", 4), ("surface, second order", 8)):
        errors = [
            coefficient(process, mach, angle) - exact(mach, angle)
            for angle in (degrees, degrees / 2)
        ]
        assert errors[0] / errors[1] == pytest.approx(factor, rel=0.15)


def test_the_linearised_pressure_errs_to_the_low_side() -> None:
    for degrees in (5.0, -5.0):
        assert coefficient("surface, linearised", 2.0, degrees) < exact(2.0, degrees)


@pytest.mark.parametrize("gamma", [1.2, 1.4])
def test_hypersonic_forms_come_near_the_exact_waves(gamma: float) -> None:
    for mach, degrees, low in ((20, 8, False), (6, 3, True)):
        near = coefficient("surface, hypersonic compression", mach, degrees, gamma)
        assert near == pytest.approx(exact(mach, degrees, gamma), rel=0.02)
        assert (near < exact(mach, degrees, gamma)) is low
    fan = coefficient("surface, hypersonic expansion", 20, -4, gamma)
    assert fan == pytest.approx(exact(20, -4, gamma), rel=0.02)


def test_newtonian_pressure_is_the_limit_of_a_thin_shock_layer() -> None:
    """At a high Mach number and γ near 1 the shock lies on the surface."""
    newton = coefficient("surface, Newtonian", 500, 20, 1.02)
    assert newton == pytest.approx(2 * math.sin(math.radians(20)) ** 2, rel=1e-12)
    assert newton == pytest.approx(exact(500, 20, 1.02), rel=0.03)
    assert newton < exact(500, 20, 1.02)


def test_modified_newtonian_pressure_is_that_of_a_pitot_tube_at_the_stagnation_point() -> None:
    body = turning("normal shock", 'M = "6"\np = "10 kPa(a)"', "")
    pitot = si(calculated(body, "p_0@b"), "p_0@b")
    at_point = coefficient("surface, modified Newtonian", 6, 90)
    assert at_point == pytest.approx((pitot / 1e4 - 1) * 2 / (1.4 * 36), rel=1e-12)
    assert at_point == pytest.approx(1.818, abs=0.001)  # NACA Report 1135, p1/p02 = .02115 or so


PLATE = """
[stations.free]
M = "{mach}"
p = "30 kPa(a)"
[stations.upper]
[stations.lower]
[stations.wake]
[stations.far]
[[path]]
name = "fan"
from = "free"
to = "upper"
process = "expansion fan"
theta = "{angle} deg"
[[path]]
name = "shock"
from = "free"
to = "lower"
process = "oblique shock"
theta = "{angle} deg"
branch = "weak"
[[path]]
name = "plate"
from = "free"
to = "wake"
process = "flat plate in supersonic flow"
alpha_i = "{angle} deg"
A_pl = "2 m2"
p_u = {{ same_as = "p@upper" }}
p_l = {{ same_as = "p@lower" }}
[[path]]
name = "linear"
from = "free"
to = "far"
process = "section in supersonic flow, linearised"
alpha_i = "{angle} deg"
tau = "0"
k_s = "0"
"""


@pytest.mark.parametrize(("mach", "angle"), [(1.6, 1.0), (2.0, 3.0), (4.0, 6.0)])
def test_a_plate_has_the_forces_of_its_pressures(mach: float, angle: float) -> None:
    keys = "C_L@plate C_D@plate F_L@plate F_D@plate r_LD@plate C_L@linear p@upper p@lower"
    record = calculated(PLATE.format(mach=mach, angle=angle), keys)
    alpha = math.radians(angle)
    normal = 2 * (si(record, "p@lower") - si(record, "p@upper"))
    assert si(record, "F_L@plate") == pytest.approx(normal * math.cos(alpha), rel=1e-10)
    assert si(record, "F_D@plate") == pytest.approx(normal * math.sin(alpha), rel=1e-10)
    assert si(record, "r_LD@plate") == pytest.approx(1 / math.tan(alpha), rel=1e-10)
    linear = si(record, "C_L@linear")
    assert linear == pytest.approx(4 * alpha / math.sqrt(mach**2 - 1), rel=1e-12)
    assert linear == pytest.approx(si(record, "C_L@plate"), rel=0.2)


def test_a_double_wedge_without_angle_of_attack_has_wave_drag_alone() -> None:
    body = """
[stations.free]
M = "2"
p = "30 kPa(a)"
[stations.front]
[stations.rear]
[stations.wake]
[stations.far]
[[path]]
name = "nose"
from = "free"
to = "front"
process = "oblique shock"
theta = { same_as = "theta_uf@section" }
branch = "weak"
[[path]]
name = "middle"
from = "front"
to = "rear"
process = "expansion fan"
theta = { same_as = "theta_mid@section" }
[[path]]
name = "section"
from = "free"
to = "wake"
process = "double wedge in supersonic flow"
alpha_i = "0 deg"
epsilon = "3 deg"
p_uf = { same_as = "p@front" }
p_lf = { same_as = "p@front" }
p_ur = { same_as = "p@rear" }
p_lr = { same_as = "p@rear" }
[[path]]
name = "linear"
from = "free"
to = "far"
process = "section in supersonic flow, linearised"
alpha_i = "0 deg"
tau = { same_as = "tau@section" }
k_s = "1"
"""
    record = calculated(body, "C_L@section C_D@section C_D@linear tau@section p@front p@rear")
    tau = math.tan(math.radians(3))
    assert si(record, "tau@section") == pytest.approx(tau, rel=1e-12)
    assert abs(si(record, "C_L@section")) < 1e-12
    drag = tau * (si(record, "p@front") - si(record, "p@rear")) / (2.8 * 30e3)
    assert si(record, "C_D@section") == pytest.approx(drag, rel=1e-9)
    assert si(record, "C_D@linear") == pytest.approx(4 * tau**2 / math.sqrt(3), rel=1e-12)
    assert si(record, "C_D@linear") == pytest.approx(drag, rel=0.02)


def test_the_turns_of_a_wedge_change_from_compression_to_expansion() -> None:
    def section(alpha: float, wanted: str) -> Record:
        given = 'M = "2"'
        own = f'alpha_i = "{alpha} deg"\nepsilon = "5 deg"'
        return calculated(turning("double wedge in supersonic flow", given, own), wanted)

    assert si(section(2, "theta_uf@wave"), "theta_uf@wave") == pytest.approx(math.radians(3))
    assert si(section(8, "theta_ue@wave"), "theta_ue@wave") == pytest.approx(math.radians(3))
    assert si(section(8, "theta_lf@wave"), "theta_lf@wave") == pytest.approx(math.radians(13))
