"""Values of a record as quantities with units, at the edge of the program."""

from __future__ import annotations

from functools import cache
from typing import Any

from ..errors import DefinitionError
from ..quantities import units_by_name
from .model import Record


def quantity_of(record: Record, key: str) -> Any:
    """Return the value of a key as a pint quantity, or a regime as its word.

    Raises:
        DefinitionError: if the record holds no such key.
    """
    for result in record.results:
        if result.key == key:
            return result.state or _quantity(result.value, result.unit)
    for given in record.inputs:
        if given.key == key:
            return _quantity(given.value, given.unit)
    for step in record.steps:
        if step.key == key:
            return step.test.outcome if step.test else _quantity(step.value, step.unit)
    keys = sorted({*(r.key for r in record.results), *(i.key for i in record.inputs),
                   *(s.key for s in record.steps)})  # fmt: skip
    raise DefinitionError(f"key {key}", f"the record holds only {', '.join(keys)}")


def _quantity(value: float | None, unit: str) -> Any:
    return _registry().Quantity(value, units_by_name()[unit].pint)


@cache
def _registry() -> Any:
    import pint

    return pint.UnitRegistry()
