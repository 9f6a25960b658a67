"""The library: all chapters as one value."""

from __future__ import annotations

import hashlib
from collections.abc import Mapping
from dataclasses import dataclass, replace
from functools import cache, cached_property
from types import MappingProxyType

from ..errors import DefinitionError
from ..expressions import expression_to_mathml
from . import (
    control_valves,
    critical_nozzles,
    ducts,
    expansions,
    fanno,
    flow_nozzles,
    friction,
    isentropic,
    isothermal_ducts,
    meters,
    moving_shocks,
    oblique_shocks,
    orifice_plates,
    orifices,
    pneumatics,
    rayleigh,
    sections,
    shock_tubes,
    shocks,
    streams,
    surfaces,
    thermodynamics,
    vessels,
)
from .course import Course
from .relation import Chapter, Process, Regime, Relation, ending_in, starting_from, station_of

STATION_KINDS = ("stream", "vessel", "driver")


@dataclass(frozen=True)
class Library:
    """Chapters, in order.

    Attributes:
        chapters: every chapter, its relations marked with its name.
    """

    chapters: tuple[Chapter, ...]

    def __post_init__(self) -> None:
        items: tuple[Relation | Regime, ...] = (*self.relations, *self.regimes)
        names = [item.name for item in (*items, *self.courses)]
        for name in sorted(set(names)):
            if names.count(name) > 1:
                raise DefinitionError(f"relation {name}", "the name is taken twice")
        offers = {*STATION_KINDS, "gas", "site", *self.processes}
        offers |= {station_of(process) for process in self.processes}
        for kind in STATION_KINDS:
            offers |= {starting_from(process, kind) for process in self.processes}
            offers |= {ending_in(process, kind) for process in self.processes}
        for item in (*items, *self.courses):
            unknown = sorted(set(item.offered_by) - offers)
            if unknown:
                raise DefinitionError(f"relation {item.name}", f"nothing is called {unknown[0]}")

    @cached_property
    def relations(self) -> tuple[Relation, ...]:
        """Every relation, chapter by chapter."""
        return tuple(
            replace(relation, chapter=chapter.name)
            for chapter in self.chapters
            for relation in chapter.relations
        )

    @cached_property
    def regimes(self) -> tuple[Regime, ...]:
        """Every regime test, chapter by chapter."""
        return tuple(
            replace(regime, chapter=chapter.name)
            for chapter in self.chapters
            for regime in chapter.regimes
        )

    @cached_property
    def courses(self) -> tuple[Course, ...]:
        """How processes run, row by row, chapter by chapter."""
        return tuple(course for chapter in self.chapters for course in chapter.courses)

    @cached_property
    def processes(self) -> Mapping[str, Process]:
        """Every process by its name."""
        return MappingProxyType(
            {process.name: process for chapter in self.chapters for process in chapter.processes}
        )

    def outcomes(self, process: str) -> tuple[str, ...]:
        """Return every regime that a process may be in, none where nothing tests one."""
        return tuple(
            outcome
            for regime in self.regimes
            if process in regime.offered_by
            for outcome in regime.outcomes
        )

    @cached_property
    def digest(self) -> str:
        """SHA-256 over the names, equations and sources of relations, regime tests and courses."""
        lines = [
            f"{relation.name} {expression_to_mathml(relation.published)} {relation.source}"
            for relation in self.relations
        ]
        lines += [
            f"{regime.name} {expression_to_mathml(condition)} {outcome} {regime.source}"
            for regime in self.regimes
            for condition, outcome in regime.cases
        ]
        lines += [
            f"{course.name} {expression_to_mathml(statement)} {course.source}"
            for course in self.courses
            for statement in course.statements
        ]
        return hashlib.sha256("\n".join(lines).encode()).hexdigest()


@cache
def load_library() -> Library:
    """Return the library that the program ships.

    Raises:
        DefinitionError: if a relation contradicts itself or another.
    """
    return Library(
        tuple(
            module.CHAPTER
            for module in (
                thermodynamics,
                isentropic,
                streams,
                orifices,
                vessels,
                shocks,
                oblique_shocks,
                expansions,
                surfaces,
                sections,
                moving_shocks,
                shock_tubes,
                ducts,
                friction,
                fanno,
                isothermal_ducts,
                rayleigh,
                meters,
                orifice_plates,
                flow_nozzles,
                critical_nozzles,
                control_valves,
                pneumatics,
            )
        )
    )
