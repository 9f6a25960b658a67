"""The entries of the vocabulary, by subject: one module for each, in the order of the list."""

from types import ModuleType

from . import (
    changes,
    ducts,
    flow,
    gas,
    metering,
    moving_waves,
    sections,
    states,
    turning,
    valves,
    vessels,
)

SUBJECTS: tuple[ModuleType, ...] = (
    states,
    gas,
    flow,
    changes,
    vessels,
    turning,
    ducts,
    metering,
    sections,
    moving_waves,
    valves,
)

__all__ = ["SUBJECTS"]
