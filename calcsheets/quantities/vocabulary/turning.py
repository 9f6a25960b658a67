"""Turning of supersonic streams: oblique shocks and expansions."""

from __future__ import annotations

from collections.abc import Iterator

from .. import dimension as dim
from ..quantity import Notation, Quantity
from .entry import RIGHT_ANGLE, quantity


def quantities() -> Iterator[Quantity]:
    """Return the quantities."""
    n = Notation
    for symbol, title, notation in (
        ("theta", "deflection of the stream", n("θ")),
        ("beta", "shock angle to the stream ahead", n("β")),
        ("theta_max", "largest deflection by an attached shock", n("θ", "max")),
        ("beta_max", "shock angle at the largest deflection", n("β", "max")),
        ("theta_cr", "deflection with M = 1 behind the shock", n("θ", superscript="*")),
        ("beta_cr", "shock angle with M = 1 behind the shock", n("β", superscript="*")),
    ):
        yield quantity(symbol, title, notation, dim.ONE, "rad", high=RIGHT_ANGLE, zero=True)
    for symbol, title, subscript in (
        ("M_n1", "Mach number normal to the shock, ahead of it", "n1"),
        ("M_n2", "Mach number normal to the shock, behind it", "n2"),
    ):
        yield quantity(symbol, title, n("M", subscript), dim.ONE, "1", high="1000")
    for symbol, title, subscript in (
        ("nu", "Prandtl-Meyer angle", ""),
        ("nu_max", "Prandtl-Meyer angle of expansion into vacuum", "max"),
    ):
        yield quantity(symbol, title, n("ν", subscript), dim.ONE, "rad", high="20", zero=True)
    for symbol, title, notation in (
        ("theta_vac", "deflection that expands the stream into vacuum", n("θ", "vac")),
        ("phi_fan", "angle between first and last wave of a fan", n("φ")),
    ):
        yield quantity(symbol, title, notation, dim.ONE, "rad", high="20", zero=True)
