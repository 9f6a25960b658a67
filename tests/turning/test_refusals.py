"""What the program says where no attached wave exists, and where two do."""

from __future__ import annotations

import pytest

from calcsheets.errors import CalcsheetsError, NoRoot, OutsideLimit, SeveralRoots
from tests.turning.briefs import calculated, turning

OUTSIDE = "and the inputs lead to values outside that"


def refusal(process: str, given: str, own: str, wanted: str) -> CalcsheetsError:
    with pytest.raises(CalcsheetsError) as caught:
        calculated(turning(process, given, own), wanted)
    return caught.value


def test_a_deflection_beyond_detachment_is_refused_with_the_angle_of_detachment() -> None:
    refused = refusal("oblique shock", 'M = "3"', 'theta = "40 deg"\nbranch = "weak"', "M@b")
    assert isinstance(refused, OutsideLimit)
    assert str(refused) == (
        "Deflection, shock angle and Mach number, for beta@wave: at a larger deflection the shock "
        f"detaches, {OUTSIDE}: deflection of the stream is 40°, allowed is at most 34.07344°. "
        "Check the inputs of this step."
    )


def test_the_branch_of_a_shock_must_be_stated() -> None:
    refused = refusal("oblique shock", 'M = "2"', 'theta = "10 deg"', "beta@wave")
    assert isinstance(refused, SeveralRoots)
    assert str(refused) == (
        "Deflection, shock angle and Mach number: beta@wave may be 39.31393° or 83.70008°. Which "
        'is meant? State branch = "weak" or branch = "strong" at the place wave.'
    )


def test_a_shock_angle_below_the_mach_angle_is_refused() -> None:
    refused = refusal("oblique shock", 'M = "2"', 'beta = "25 deg"', "theta@wave")
    assert isinstance(refused, NoRoot)


def test_a_shock_angle_of_the_other_branch_is_refused() -> None:
    own = 'beta = "80 deg"\nbranch = "weak"'
    refused = refusal("oblique shock", 'M = "2"', own, "theta@wave")
    assert isinstance(refused, NoRoot | OutsideLimit)


def test_an_expansion_beyond_vacuum_is_refused_with_the_largest_deflection() -> None:
    refused = refusal("expansion fan", 'M = "3"', 'theta = "85 deg"', "nu@b")
    assert isinstance(refused, OutsideLimit)
    assert str(refused) == (
        "Turning by an expansion fan, for nu@b: a larger deflection leaves a vacuum at the wall, "
        f"{OUTSIDE}: deflection of the stream is 85°, allowed is at most 80.69673°. "
        "Check the inputs of this step."
    )


def test_a_compression_below_sonic_flow_is_refused() -> None:
    refused = refusal("isentropic compression fan", 'M = "1.5"', 'theta = "13 deg"', "M@b")
    assert isinstance(refused, NoRoot)
    assert str(refused).endswith(
        "Limit not met: a larger deflection ends in a shock "
        "(deflection of the stream is 13°, allowed is at most 11.90521°)."
    )


def test_a_subsonic_stream_has_no_fan() -> None:
    refused = refusal("expansion fan", 'M = "0.8"', 'theta = "5 deg"', "M@b")
    assert isinstance(refused, NoRoot)
    assert "(Mach number is 0.8, allowed is at least 1)" in str(refused)
