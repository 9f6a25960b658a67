"""The entries of the vocabulary, by subject: one module for each, in the order of the list."""

from types import ModuleType

from . import (
    changes,
    ducts,
    flow,
    gas,
    metering,
    moving_waves,
    pneumatics,
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
    pneumatics,
)

__all__ = ["SUBJECTS"]
