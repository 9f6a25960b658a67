"""Temperatures that leave the range in which the gas data hold."""

from __future__ import annotations

from collections.abc import Iterator

from ..brief import GasStatement
from ..quantities import Kind, catalogue
from ..solving import Outcome, midpoint


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


def _range(gas: GasStatement) -> tuple[float, float]:
    """The range of the gas, or the part that all components share; empty if no data are used."""
    known = [gas.library] if gas.library else [component for component, _ in gas.components]
    if not known:
        return 0.0, 0.0
    return (
        max(float(item.low.rational) for item in known),
        min(float(item.high.rational) for item in known),
    )
