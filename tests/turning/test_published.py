"""Published tables and worked examples of supersonic turning and moving shocks."""

from __future__ import annotations

import tomllib
from fractions import Fraction
from pathlib import Path
from typing import Any

import pytest

from calcsheets.quantities import find_unit
from calcsheets.record import Record
from tests.turning.briefs import calculated, turning

FOLDER = Path(__file__).parent.parent / "published"
PROVENANCES = {"read in the source", "library", "common practice", "from memory"}


def table(name: str) -> dict[str, Any]:
    return tomllib.loads((FOLDER / name).read_text(encoding="utf-8"))


OBLIQUE = table("course_notes_oblique_shock.toml")
DETACHMENT = table("textbook_detachment.toml")
FANS = table("naca_1135_prandtl_meyer.toml")
EXAMPLES = table("turning_examples.toml")["case"]


def half_unit(text: str) -> Fraction:
    """Half a unit of the last printed digit."""
    return Fraction(1, 2) / 10 ** len(text.partition(".")[2])


def assert_printed(
    record: Record, key: str, text: str, unit: str = "1", tolerance: str = ""
) -> None:
    """A value of a record agrees with a printed one."""
    scale = find_unit(unit)
    found = (float(record.value(key).to_base_units().magnitude)) / _factor(scale)
    allowed = float(Fraction(tolerance) if tolerance else half_unit(text))
    assert abs(found - float(text)) <= allowed * (1 + 1e-9), f"{key}: {found}, printed {text}"


def _factor(unit: Any) -> float:
    return float(unit.factor) * 3.141592653589793**unit.pi_power


def test_every_source_says_how_it_is_known() -> None:
    sources = [OBLIQUE["source"], DETACHMENT["source"], FANS["source"], *EXAMPLES]
    assert {source["provenance"] for source in sources} <= PROVENANCES
    assert all(source["found"] for source in sources)


def test_at_least_sixty_values_were_read_in_their_sources() -> None:
    tables = sum(len(row) - 2 for row in OBLIQUE["row"])
    tables += sum(len(row) - 1 for row in DETACHMENT["row"])
    read = [case for case in EXAMPLES if case["provenance"] == "read in the source"]
    assert tables + sum(len(case["expected"]) for case in read) >= 200


@pytest.mark.parametrize("row", OBLIQUE["row"], ids=lambda row: f"{row['M1']}-{row['theta']}")
def test_table_of_weak_shocks(row: dict[str, str]) -> None:
    own = f'theta = "{row["theta"]} deg"\nbranch = "weak"'
    given = f'M = "{row["M1"]}"\np = "1 kPa(a)"'
    record = calculated(turning("oblique shock", given, own), "beta@wave M@b p@b")
    if "beta" in row:
        assert_printed(record, "beta@wave", row["beta"], "deg", "0.01")
    assert_printed(record, "M@b", row["M2"])
    assert_printed(record, "p@b", row["p_ratio"], "kPa(a)")


@pytest.mark.parametrize("row", DETACHMENT["row"], ids=lambda row: row["M1"])
def test_table_of_largest_deflections(row: dict[str, str]) -> None:
    given = f'M = "{row["M1"]}"'
    record = calculated(turning("oblique shock", given, ""), "theta_max@wave beta_max@wave")
    assert_printed(record, "theta_max@wave", row["theta_max"], "deg")
    assert_printed(record, "beta_max@wave", row["beta_max"], "deg", "0.035")
    at_angle = f'beta = "{row["beta_max"]} deg"'
    behind = calculated(turning("oblique shock", given, at_angle), "M@b")
    assert_printed(behind, "M@b", row["M2"], tolerance="0.0011")


@pytest.mark.parametrize("row", FANS["row"], ids=lambda row: row["M"])
def test_table_of_prandtl_meyer_angles(row: dict[str, str]) -> None:
    body = f'[stations.a]\nM = "{row["M"]}"\n'
    record = calculated(body, "nu@a mu@a")
    assert_printed(record, "nu@a", row["nu"], "deg")
    assert_printed(record, "mu@a", row["mu"], "deg")


@pytest.mark.parametrize("row", FANS["row"], ids=lambda row: row["M"])
def test_mach_number_from_a_printed_angle(row: dict[str, str]) -> None:
    body = f'[stations.a]\nnu = "{row["nu"]} deg"\n'
    record = calculated(body, "M@a")
    steepness = {True: "0.002", False: "0.02"}[float(row["M"]) < 5]
    assert_printed(record, "M@a", row["M"], tolerance=steepness)


@pytest.mark.parametrize("case", EXAMPLES, ids=lambda case: case["id"])
def test_worked_example(case: dict[str, Any]) -> None:
    wanted = " ".join(item["key"] for item in case["expected"])
    record = calculated(case["brief"], wanted, case.get("gamma", "1.4"))
    for item in case["expected"]:
        assert_printed(
            record, item["key"], item["value"], item.get("unit", "1"), item.get("tolerance", "")
        )
