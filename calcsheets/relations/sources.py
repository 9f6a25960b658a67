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
