"""Stage 4, reading: a file becomes a validated, frozen brief."""

from .form import brief_form
from .model import (
    Assumption,
    Brief,
    GasStatement,
    Given,
    Leg,
    Limit,
    Reference,
    SameAs,
    Station,
    Wanted,
)
from .reader import parse_brief, read_brief

__all__ = [
    "Assumption",
    "Brief",
    "GasStatement",
    "Given",
    "Leg",
    "Limit",
    "Reference",
    "SameAs",
    "Station",
    "Wanted",
    "brief_form",
    "parse_brief",
    "read_brief",
]
