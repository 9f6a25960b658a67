"""Stage 3, library: published equations with source, limits, assumptions and cautions."""

from .course import INTERVALS, Case, Course, CourseColumn, Words
from .library import STATION_KINDS, Library, load_library
from .mixtures import mixture_relations
from .relation import (
    EQUAL_WITHIN,
    Branch,
    Chapter,
    Limit,
    Process,
    Regime,
    Relation,
    Source,
    ending_in,
    starting_from,
    station_of,
)

__all__ = [
    "EQUAL_WITHIN",
    "INTERVALS",
    "STATION_KINDS",
    "Branch",
    "Case",
    "Chapter",
    "Course",
    "CourseColumn",
    "Library",
    "Limit",
    "Process",
    "Regime",
    "Relation",
    "Source",
    "Words",
    "ending_in",
    "load_library",
    "mixture_relations",
    "starting_from",
    "station_of",
]
