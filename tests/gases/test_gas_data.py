"""The gas table states facts with sources, and agrees with independent libraries."""

import importlib
import re
import tomllib
from pathlib import Path
from typing import Any

import pytest

ROOT = Path(__file__).resolve().parents[2]
GASES: dict[str, dict[str, Any]] = tomllib.loads(
    (ROOT / "calcsheets" / "gases" / "gases.toml").read_text(encoding="utf-8")
)
WITNESS: dict[str, Any] = tomllib.loads(
    (ROOT / "tests" / "published" / "gas_properties.toml").read_text(encoding="utf-8")
)
ROWS: list[dict[str, str]] = WITNESS["row"]
LIVE_ROWS = [row for row in ROWS if row["library"] == "CoolProp"]

MOLAR_GAS_CONSTANT = 8.314462618  # J/(mol K), exact in the SI since 2019 to the digits given
REFERENCE_TEMPERATURE = 298.15  # K
KNOWN_WORDS = {"read in the source", "library", "common practice", "from memory"}
SOURCE_FIELDS = {"document", "edition", "where", "known"}
GAS_FIELDS = {
    "title",
    "formula",
    "aliases",
    "molar_mass",
    "molar_mass_source",
    "cp_molar",
    "cp_range",
    "cp_source",
    "cautions",
}


def number(text: str, unit: str) -> float:
    """Return the decimal in front of the unit, and fail where the text is not exactly that."""
    found = re.fullmatch(r"(\d+(?:\.\d+)?) " + re.escape(unit), text)
    assert found, f"{text!r} is not a decimal followed by {unit!r}"
    return float(found.group(1))


def molar_mass(gas: str) -> float:
    return number(GASES[gas]["molar_mass"], "g/mol")


def heat_capacity(gas: str) -> float:
    return number(GASES[gas]["cp_molar"], "J/(mol*K)")


def row_name(row: dict[str, str]) -> str:
    return f"{row['gas']}-{row['library']}"


def test_at_least_eighteen_gases_are_known() -> None:
    assert len(GASES) >= 18


@pytest.mark.parametrize("gas", GASES)
def test_every_gas_states_exactly_the_expected_facts(gas: str) -> None:
    assert set(GASES[gas]) == GAS_FIELDS
    assert re.fullmatch(r"[a-z][a-z0-9_]*", gas)
    assert molar_mass(gas) > 0.0
    assert heat_capacity(gas) > 0.0
    assert GASES[gas]["title"]
    assert GASES[gas]["cautions"], "each of these gases can hurt someone"
    assert all(text.strip() for text in GASES[gas]["cautions"])


@pytest.mark.parametrize("gas", GASES)
@pytest.mark.parametrize("field", ["molar_mass_source", "cp_source"])
def test_every_source_is_complete_and_says_how_the_value_is_known(gas: str, field: str) -> None:
    source = GASES[gas][field]
    assert set(source) == SOURCE_FIELDS
    assert all(source.values())
    assert source["known"] in KNOWN_WORDS


@pytest.mark.parametrize("gas", GASES)
def test_the_range_of_constant_heat_capacity_holds_the_reference_temperature(gas: str) -> None:
    low, high = (number(text, "K") for text in GASES[gas]["cp_range"])
    assert low < REFERENCE_TEMPERATURE < high


def test_no_two_gases_answer_to_the_same_name() -> None:
    owners: dict[str, str] = {}
    for gas, facts in GASES.items():
        own = {gas.lower(), gas.replace("_", " "), facts["title"].lower()}
        aliases = [alias.lower() for alias in facts["aliases"]]
        assert len(aliases) == len(set(aliases)), f"{gas} repeats an alias"
        assert not own & set(aliases), f"{gas} lists its own name as an alias"
        for name in own | set(aliases):
            assert owners.setdefault(name, gas) == gas, f"{name!r} means {owners[name]} and {gas}"


def test_every_gas_has_a_witness_and_every_witness_a_gas() -> None:
    assert {row["gas"] for row in ROWS} == set(GASES)
    assert {row["gas"] for row in LIVE_ROWS} == set(GASES)
    names = [(row["gas"], row["library"]) for row in ROWS]
    assert len(names) == len(set(names))
    assert WITNESS["source"]["provenance"] == "library"
    assert all(row["library"] in WITNESS["source"]["version"] for row in ROWS)


@pytest.mark.parametrize("row", ROWS, ids=row_name)
def test_molar_mass_agrees_with_the_library(row: dict[str, str]) -> None:
    assert molar_mass(row["gas"]) == pytest.approx(float(row["M_w"]), rel=1e-3)


@pytest.mark.parametrize("row", ROWS, ids=row_name)
def test_heat_capacity_agrees_with_the_library_or_the_difference_is_explained(
    row: dict[str, str],
) -> None:
    difference = abs(heat_capacity(row["gas"]) / float(row["cp_molar"]) - 1.0)
    if difference > 3e-3:
        assert row.get("difference_explained"), f"{difference:.2%} and no explanation"
    else:
        assert "difference_explained" not in row, "an explanation without a difference"
    assert difference <= 5e-3, "no difference this large has been explained so far"


@pytest.mark.parametrize("gas", GASES)
def test_the_ratio_of_specific_heats_is_physical(gas: str) -> None:
    cp = heat_capacity(gas)
    gamma = cp / (cp - MOLAR_GAS_CONSTANT)
    assert 1.0 < gamma <= 5.0 / 3.0 + 0.001


@pytest.mark.parametrize("row", LIVE_ROWS, ids=row_name)
def test_stored_witness_is_what_the_library_says_today(row: dict[str, str]) -> None:
    pytest.importorskip("CoolProp")
    props = importlib.import_module("CoolProp.CoolProp").PropsSI
    fluid = row["library_fluid"]
    live_cp = props("CP0MOLAR", "T", REFERENCE_TEMPERATURE, "P", 101325.0, fluid)
    assert float(row["M_w"]) == pytest.approx(1e3 * props("M", fluid), rel=1e-3)
    assert float(row["cp_molar"]) == pytest.approx(live_cp, rel=1e-3)


@pytest.mark.parametrize("row", LIVE_ROWS, ids=row_name)
def test_heat_capacity_stays_within_two_percent_over_the_stated_range(row: dict[str, str]) -> None:
    pytest.importorskip("CoolProp")
    props = importlib.import_module("CoolProp.CoolProp").PropsSI
    low, high = (number(text, "K") for text in GASES[row["gas"]]["cp_range"])
    for step in range(21):
        temperature = low + (high - low) * step / 20
        cp = props("CP0MOLAR", "T", temperature, "P", 1.0, row["library_fluid"])
        assert cp == pytest.approx(float(row["cp_molar"]), rel=0.02), f"at {temperature:.1f} K"
