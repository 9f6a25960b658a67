"""Where a calculation leaves the gas data: by its properties, or by its temperatures."""

from __future__ import annotations

from collections.abc import Iterator

from ..brief import GasStatement
from ..expressions import CONSTANTS
from ..quantities import Kind, Variable, catalogue
from ..solving import Outcome, midpoint

_LARGEST_DIFFERENCE = 0.02


def range_cautions(outcome: Outcome) -> Iterator[str]:
    """Say for each temperature of the calculation outside the range of the gas data that it is.

    Properties that the brief gives have no range here: whoever gives them answers for it.
    """
    gas = outcome.problem.brief.gas
    low, high = _range(gas)
    if low >= high:
        return
    for variable in sorted(outcome.values):
        quantity = catalogue()[variable.symbol]
        if quantity.kind is not Kind.LEVEL or quantity.home != "station":
            continue
        value = midpoint(outcome.values[variable])
        if not low <= value <= high:
            yield (
                f"{quantity.title.capitalize()}, {outcome.problem.title(variable)}: {value:.1f} K "
                f"lies outside {low:g} K to {high:g} K, where a constant heat capacity of "
                f"{gas.title} holds within 2 %."
            )


def property_cautions(outcome: Outcome) -> Iterator[str]:
    """Say where properties that the brief gives are not those of the gas that it names."""
    gas = outcome.problem.brief.gas
    if gas.named is None or gas.library is not None:
        return
    molar_mass = float(gas.named.molar_mass.value.rational)
    heat = float(gas.named.molar_heat.value.rational)
    gamma = heat / (heat - float(CONSTANTS["R_u"].value or 0))
    for symbol, data in (("gamma", gamma), ("M_w", molar_mass)):
        variable = Variable(symbol, "gas")
        if variable not in outcome.values:
            continue
        value = midpoint(outcome.values[variable])
        if abs(value / data - 1) > _LARGEST_DIFFERENCE:
            quantity = catalogue()[symbol]
            yield (
                f"{quantity.title.capitalize()} of {gas.title}: {value:.5g} is used, the gas data "
                f"give {data:.5g}{_unit(quantity.unit)} at 25 °C. "
                "Check that the value is that of this gas."
            )


def _unit(unit: str) -> str:
    return "" if unit == "1" else f" {unit}"


def _range(gas: GasStatement) -> tuple[float, float]:
    """The range of the gas, or the part that all components share; empty if no data are used."""
    known = [gas.library] if gas.library else [component for component, _ in gas.components]
    if not known:
        return 0.0, 0.0
    return (
        max(float(item.low.rational) for item in known),
        min(float(item.high.rational) for item in known),
    )
