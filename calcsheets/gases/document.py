"""The page of gases, made from the data: ``python -m calcsheets.gases.document``."""

from __future__ import annotations

import sys
from collections.abc import Iterator

from ..errors import DefinitionError
from ..expressions import CONSTANTS
from .data import Gas, GasValue, gases

_INTRODUCTION = """\
# Gases

Each gas is an ideal gas of constant specific heats: molar mass M, molar heat capacity C_p at
constant pressure at 25 °C. The ratio of specific heats is not stored; it follows as
γ = C_p / (C_p − R_u), and is printed here for information. Within the range of temperature, the
heat capacity of the ideal gas stays within 2 % of its value at 25 °C. At high pressure and near
saturation the real gas differs. How we know a value stands in brackets behind its source.

In a brief: `[gas]` with `name = "nitrogen"`. Mixtures: `composition` and `by`. A gas of your own:
`gamma` and `M_w`, or `gamma` and `R`.
"""


def gases_page() -> str:
    """Return the page as Markdown."""
    lines = [_INTRODUCTION, *_overview()]
    for gas in gases().values():
        lines += _section(gas)
    return "\n".join(lines)


def _overview() -> Iterator[str]:
    yield "| gas | formula | also written | M | C_p at 25 °C | γ at 25 °C | range |"
    yield "|---|---|---|---|---|---|---|"
    for gas in gases().values():
        also = ", ".join(f"`{alias}`" for alias in gas.aliases)
        span = f"{gas.low.text} to {gas.high.text}"
        yield (
            f"| `{gas.key}` | {gas.formula or '–'} | {also} | {gas.molar_mass.value.text} "
            f"| {gas.molar_heat.value.text} | {_gamma(gas):.4f} | {span} |"
        )
    yield ""


def _gamma(gas: Gas) -> float:
    heat, constant = gas.molar_heat.value.rational, CONSTANTS["R_u"].value
    if constant is None:
        raise DefinitionError("constant R_u", "it has no exact value")
    return float(heat / (heat - constant))


def _section(gas: Gas) -> Iterator[str]:
    yield f"## {gas.title[0].upper()}{gas.title[1:]}\n"
    yield _line("M", gas.molar_mass)
    yield _line("C_p", gas.molar_heat)
    for caution in gas.cautions:
        yield f"- caution: {caution}"
    yield ""


def _line(name: str, value: GasValue) -> str:
    return f"- {name} = {value.value.text}: {value.source}"


if __name__ == "__main__":
    sys.stdout.write(gases_page())
