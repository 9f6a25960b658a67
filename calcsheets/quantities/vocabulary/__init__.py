"""The entries of the vocabulary, by subject: one module for each, in the order of the list."""

from types import ModuleType

from . import changes, ducts, flow, gas, metering, states, turning, vessels

SUBJECTS: tuple[ModuleType, ...] = (
    states,
    gas,
    flow,
    changes,
    vessels,
    turning,
    ducts,
    metering,
)

__all__ = ["SUBJECTS"]
