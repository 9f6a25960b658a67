"""A calculation takes other values for inputs of its brief, and for those alone."""

from __future__ import annotations

from pathlib import Path

import pytest

from calcsheets import calculate
from calcsheets.brief import parse_brief, read_brief
from calcsheets.errors import BriefError
from tests.conftest import ROOT

HERE = Path(__file__).parent
TEXT = (HERE / "orifice.toml").read_text("utf-8")
BRIEF = parse_brief(TEXT, "orifice.toml")


def flow(inputs: dict[str, str] | None = None, text: str = TEXT) -> float:
    """Mass flow of the orifice in kg/h."""
    found = calculate(parse_brief(text, "orifice.toml"), inputs)
    return float(found.value("mdot@orifice").to("kg/h").magnitude)


@pytest.mark.parametrize(
    ("key", "old", "new"),
    [
        ("p_0@receiver", 'p_0 = "7.0 bar(g)"', "7.4 bar(g)"),
        ("T_0@receiver", 'T_0 = "25 °C"', "45 °C"),
        ("d@orifice", 'd = "8 mm"', "0.25 in"),
        ("C_d@orifice", 'C_d = "0.82"', "0.80"),
        ("p_atm@site", 'p_atm = "98.2 kPa"', "84 kPa"),
    ],
)
def test_another_value_gives_what_the_changed_brief_gives(key: str, old: str, new: str) -> None:
    name = old.partition(" ")[0]
    assert old in TEXT
    changed = TEXT.replace(old, f'{name} = "{new}"')
    assert flow({key: new}) == flow(text=changed) != flow()


def test_a_gauge_pressure_may_be_replaced_by_an_absolute_one() -> None:
    assert flow({"p_0@receiver": "7.982 bar(a)"}) == pytest.approx(flow(), rel=1e-12)


def test_the_key_may_name_the_gauge_quantity_that_the_brief_states() -> None:
    assert flow({"p_0g@receiver": "7.4 bar(g)"}) == flow({"p_0@receiver": "7.4 bar(g)"})


def test_a_mass_flow_may_be_replaced_by_a_volume_flow_at_a_reference_state() -> None:
    text = TEXT.replace('d = "8 mm"', 'mdot = "280 kg/h"').replace(
        '"mdot@orifice" = { unit = "kg/h" }', '"d@orifice" = { unit = "mm" }'
    )
    brief = parse_brief(text)
    by_mass = calculate(brief).value("d@orifice").magnitude
    by_volume = calculate(brief, {"mdot@orifice": "216.55 Nm3/h"}).value("d@orifice").magnitude
    assert by_volume == pytest.approx(by_mass, rel=1e-3)  # 280 kg/h of air at 1.293 kg/m3


def test_several_inputs_change_together_and_the_order_does_not_matter() -> None:
    inputs = {"T_0@receiver": "45 °C", "d@orifice": "9 mm"}
    assert flow(inputs) == flow(dict(reversed(inputs.items())))


def test_no_change_gives_the_record_of_the_brief() -> None:
    assert calculate(BRIEF, {}).digest == calculate(BRIEF).digest
    assert calculate(BRIEF, {"T_0@receiver": "25 °C"}).digest == calculate(BRIEF).digest


def test_a_changed_input_changes_the_digest_and_leaves_the_brief_alone() -> None:
    before = BRIEF.given
    assert calculate(BRIEF, {"T_0@receiver": "26 °C"}).digest != calculate(BRIEF).digest
    assert BRIEF.given is before


def test_the_first_example_takes_another_receiver_pressure() -> None:
    brief = read_brief(ROOT / "examples" / "receiver-letdown.toml")
    low, high = (
        calculate(brief, {"p_0@receiver": p}).value("m@receiver").magnitude
        for p in ("12.0 bar(g)", "12.4 bar(g)")
    )
    assert high / low == pytest.approx((12.4 + 0.982) / (12.0 + 0.982), rel=1e-12)


@pytest.mark.parametrize(
    ("key", "text", "message"),
    [
        (
            "T_0@header",
            "25 °C",
            "orifice.toml: T_0@header: the brief gives no such input. Inputs are p_atm@site, "
            "M_w@gas, C_p@gas, p_0g@receiver, T_0@receiver, p_g@header, d@orifice, C_d@orifice.",
        ),
        (
            "temp@receiver",
            "25 °C",
            "orifice.toml: temp@receiver: there is no such quantity. Check the key.",
        ),
        (
            "p_0@receiver",
            "7.4 bar",
            'orifice.toml: p_0@receiver: "7.4 bar": stagnation pressure (p_0) may be gauge or '
            "absolute. Which is meant? Write bar(g) or bar(a).",
        ),
        (
            "d@orifice",
            "8 mil",
            'orifice.toml: d@orifice: "8 mil": mil is said for a thousandth of an inch and for a '
            "millimetre. Write thou (0.001 in) or mm.",
        ),
        (
            "d@orifice",
            "-8 mm",
            'orifice.toml: d@orifice: "-8 mm": diameter (d) must be above 0 m. Check the number '
            "and its unit.",
        ),
        (
            "d@orifice",
            "8 mm2",
            'orifice.toml: d@orifice: "8 mm2": diameter (d) is measured in m, and mm2 is a unit '
            "of another dimension. Give it in m or another unit of that dimension.",
        ),
    ],
)
def test_a_change_that_does_not_fit_is_refused(key: str, text: str, message: str) -> None:
    with pytest.raises(BriefError) as refused:
        calculate(BRIEF, {key: text})
    assert str(refused.value) == message
