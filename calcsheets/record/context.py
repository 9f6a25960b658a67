"""What a record keeps of the brief beside its numbers."""

from __future__ import annotations

from dataclasses import dataclass


@dataclass(frozen=True)
class AssumptionRecord:
    """One assumption; a hold if it is to be confirmed."""

    text: str
    status: str
    basis: str
    owner: str
    due: str


@dataclass(frozen=True)
class ReferenceRecord:
    """One document that the calculation rests on."""

    id: str
    title: str
    edition: str


@dataclass(frozen=True)
class StationRecord:
    """A station of the path, for the picture of it."""

    name: str
    kind: str
    title: str


@dataclass(frozen=True)
class LegRecord:
    """A process of the path."""

    name: str
    start: str
    end: str
    process: str
    through: str
    title: str


@dataclass(frozen=True)
class FieldRecord:
    """One field of the cover block."""

    name: str
    text: str
