"""The vocabulary: every quantity that relations and briefs may name.

Symbols follow NACA Report 1135 and ISO 80000 where those have one; ``u`` is the velocity and
``e`` the specific internal energy, so that ``V`` and ``v`` stay volume and specific volume.
"""

from __future__ import annotations

from collections.abc import Mapping
from functools import cache
from types import MappingProxyType

from ..errors import DefinitionError
from .quantity import Quantity
from .vocabulary import SUBJECTS


@cache
def catalogue() -> Mapping[str, Quantity]:
    """Return every quantity by its symbol.

    Raises:
        DefinitionError: if a symbol is defined twice.
    """
    found: dict[str, Quantity] = {}
    for subject in SUBJECTS:
        for quantity in subject.quantities():
            if found.setdefault(quantity.symbol, quantity) is not quantity:
                raise DefinitionError(f"quantity {quantity.symbol}", "it is defined twice")
    return MappingProxyType(found)


GAUGE_OF: Mapping[str, str] = MappingProxyType({"p": "p_g", "p_0": "p_0g"})
"""The gauge quantity that belongs to an absolute one."""

BAROMETRIC: frozenset[str] = frozenset({"p_atm", "p_ref"})
"""Absolute pressures for which nobody says so: a bare unit is understood as absolute."""
