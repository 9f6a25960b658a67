"""Surfaces and sections in supersonic flow: pressure, lift and wave drag."""

from __future__ import annotations

from collections.abc import Iterator

from .. import dimension as dim
from ..quantity import Kind, Notation, Quantity
from .entry import RIGHT_ANGLE, quantity


def quantities() -> Iterator[Quantity]:
    """Return the quantities."""
    n = Notation
    yield quantity(
        "delta",
        "inclination of a surface, positive against the free stream",
        n("δ"),
        dim.ONE,
        "rad",
        low=f"-{RIGHT_ANGLE}",
        high=RIGHT_ANGLE,
    )
    for symbol, title, notation in (
        ("alpha_i", "angle of attack", n("α")),
        ("epsilon", "half-angle of a wedge", n("ε")),
        ("theta_lf", "turn into the stream at the lower front panel", n("θ", "lf")),
        ("theta_uf", "turn into the stream at the upper front panel", n("θ", "uf")),
        ("theta_ue", "turn away from the stream at the upper front panel", n("θ", "ue")),
        ("theta_mid", "turn away from the stream at mid-chord", n("θ", "mid")),
    ):
        yield quantity(symbol, title, notation, dim.ONE, "rad", high=RIGHT_ANGLE, zero=True)
    for symbol, title, subscript in (
        ("p_u", "pressure on the upper side", "u"),
        ("p_l", "pressure on the lower side", "l"),
        ("p_uf", "pressure on the upper front panel", "uf"),
        ("p_ur", "pressure on the upper rear panel", "ur"),
        ("p_lf", "pressure on the lower front panel", "lf"),
        ("p_lr", "pressure on the lower rear panel", "lr"),
    ):
        yield quantity(
            symbol, title, n("p", subscript), dim.PRESSURE, "Pa", kind=Kind.ABSOLUTE, high="1e10"
        )
    for symbol, title, subscript in (
        ("C_pr", "pressure coefficient", "pr"),
        ("C_N", "normal-force coefficient", "N"),
        ("C_A", "axial-force coefficient", "A"),
        ("C_L", "lift coefficient", "L"),
    ):
        yield quantity(symbol, title, n("C", subscript), dim.ONE, "1", low="-10", high="10")
    for symbol, title, notation in (
        ("C_D", "wave-drag coefficient", n("C", "D")),
        ("C_pr0", "pressure coefficient at the stagnation point", n("C", "pr,0")),
        ("tau", "thickness over chord", n("τ")),
        ("k_s", "shape factor of the thickness drag", n("k", "s")),
    ):
        yield quantity(symbol, title, notation, dim.ONE, "1", high="10", zero=True)
    yield quantity("r_LD", "lift over wave drag", n("r", "LD"), dim.ONE, "1", high="1e6")
    yield quantity("A_pl", "plan area", n("A", "pl"), dim.AREA, "m2", high="1e6")
    yield quantity("F_L", "lift", n("F", "L"), dim.FORCE, "N", low="-1e12")
    yield quantity("F_D", "wave drag", n("F", "D"), dim.FORCE, "N", zero=True)
