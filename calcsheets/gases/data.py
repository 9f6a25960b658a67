"""The gases that the program knows, read once from the data file beside this module."""

from __future__ import annotations

import difflib
import tomllib
from collections.abc import Mapping
from dataclasses import dataclass
from functools import cache
from importlib.resources import files
from types import MappingProxyType
from typing import Any

from ..errors import UnknownGas
from ..quantities import Measured, read_measured


@dataclass(frozen=True)
class GasValue:
    """One property with its source.

    Attributes:
        value: number and unit.
        document: the publication.
        edition: year or edition.
        where: place in it, as far as known.
        known: how we know it.
    """

    value: Measured
    document: str
    edition: str
    where: str
    known: str

    @property
    def source(self) -> str:
        """The source in one line."""
        parts = ", ".join(part for part in (self.document, self.edition, self.where) if part)
        return f"{parts} ({self.known})"


@dataclass(frozen=True)
class Gas:
    """One gas as an ideal gas of constant specific heats.

    Attributes:
        key: name in briefs.
        title: name in words.
        formula: chemical formula, empty for air.
        aliases: other names.
        molar_mass: molar mass.
        molar_heat: ideal-gas molar heat capacity at constant pressure at 25 °C.
        low: temperature above which the heat capacity is within 2 % of that value.
        high: temperature below which it is.
        cautions: what can hurt someone.
    """

    key: str
    title: str
    formula: str
    aliases: tuple[str, ...]
    molar_mass: GasValue
    molar_heat: GasValue
    low: Measured
    high: Measured
    cautions: tuple[str, ...]


@cache
def gases() -> Mapping[str, Gas]:
    """Return every gas by its key, in alphabetical order."""
    table = tomllib.loads(files(__package__).joinpath("gases.toml").read_text("utf-8"))
    return MappingProxyType({key: _gas(key, table[key]) for key in sorted(table)})


def find_gas(name: str) -> Gas:
    """Return the gas with this key, title or alias.

    Raises:
        UnknownGas: if there is none; it carries names like it.
    """
    names = _names()
    wanted = name.strip().casefold()
    if wanted in names:
        return names[wanted]
    near = difflib.get_close_matches(wanted, sorted(names), n=3, cutoff=0.6)
    raise UnknownGas(name, tuple(dict.fromkeys(names[match].key for match in near)))


@cache
def _names() -> Mapping[str, Gas]:
    return {
        name.casefold(): gas
        for gas in gases().values()
        for name in (gas.key, gas.title, *gas.aliases)
    }


def _gas(key: str, entry: Mapping[str, Any]) -> Gas:
    low, high = entry["cp_range"]
    return Gas(
        key=key,
        title=entry["title"],
        formula=entry["formula"],
        aliases=tuple(entry["aliases"]),
        molar_mass=_value(entry["molar_mass"], entry["molar_mass_source"]),
        molar_heat=_value(entry["cp_molar"], entry["cp_source"]),
        low=read_measured(low),
        high=read_measured(high),
        cautions=tuple(entry["cautions"]),
    )


def _value(text: str, source: Mapping[str, str]) -> GasValue:
    return GasValue(read_measured(text), **source)
