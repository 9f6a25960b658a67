"""The publications that relations cite, written once."""

from __future__ import annotations

from .relation import Source


def naca_1135(clause: str = "") -> Source:
    """NACA Report 1135, the collection of equations for compressible flow."""
    return Source(
        "NACA Report 1135, Equations, Tables and Charts for Compressible Flow",
        "1953",
        clause,
        "from memory",
    )


def textbook(law: str) -> Source:
    """A law of thermodynamics or mechanics that every textbook states alike."""
    return Source(law, "", "", "common practice")


def derived(what: str) -> Source:
    """A closed result that follows from relations of this library; the derivation is named."""
    return Source(what, "", "", "common practice")


def definition(what: str) -> Source:
    """A definition."""
    return Source(what, "", "", "common practice")


def shapiro(clause: str) -> Source:
    """The textbook from which the relations of ducts are usually cited."""
    return Source(
        "A. H. Shapiro, The Dynamics and Thermodynamics of Compressible Fluid Flow, vol. 1",
        "1953",
        clause,
        "from memory",
    )


def iso_5167(part: int, clause: str = "", known: str = "library") -> Source:
    """ISO 5167, flow measurement by pressure difference; the equations by the library fluids.

    Where a clause is named, its text was read; the others were compared with the library
    fluids 1.3.1, which codes the edition of 2003.
    """
    return Source(f"ISO 5167-{part}", "2003", clause, known)


def iso_9300(clause: str = "") -> Source:
    """ISO 9300, flow measurement by critical flow nozzles; its text was not open."""
    return Source("ISO 9300, Critical flow nozzles", "2005", clause, "from memory")


def library(document: str, edition: str) -> Source:
    """A formula that general-purpose libraries implement alike; see ``tests/published``."""
    return Source(document, edition, "", "library")


def iec_60534(section: str = "1", what: str = "gas and vapour") -> Source:
    """IEC 60534-2, flow capacity of control valves; its equations by the library fluids."""
    edition = {"1": "2011", "4": ""}[section]
    known = {"1": "library", "4": "from memory"}[section]
    return Source(f"IEC 60534-2-{section}, Control valves, {what}", edition, "", known)


def iso_6358(part: int) -> Source:
    """ISO 6358, flow-rate characteristics of pneumatic components; its text was not open."""
    edition = {1: "2013", 3: "2014"}[part]
    return Source(f"ISO 6358-{part}, Pneumatic fluid power", edition, "", "from memory")
