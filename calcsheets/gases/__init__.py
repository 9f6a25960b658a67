"""Stage 2, data: gases by name, with molar mass, heat capacity, range and sources."""

from .data import Gas, GasValue, find_gas, gases

__all__ = ["Gas", "GasValue", "find_gas", "gases"]
