"""Pneumatic components by ISO 6358: sonic conductance and critical back-pressure ratio.

Effective area, Kv and sonic conductance all say how much a component passes. They are different
quantities; relations lead from one to another.
"""

from __future__ import annotations

from collections.abc import Iterator

from .. import dimension as dim
from ..quantity import Kind, Notation, Quantity
from .entry import quantity


def quantities() -> Iterator[Quantity]:
    """Return the quantities."""
    n = Notation
    one, conductance = dim.ONE, dim.CONDUCTANCE
    for symbol, title, subscript in (
        ("C_son", "sonic conductance", ""),
        ("C_I", "sonic conductance of the first component", "I"),
        ("C_II", "sonic conductance of the second component", "II"),
    ):
        yield quantity(symbol, title, n("C", subscript), conductance, "m3/(s*Pa)", high="1")
    for symbol, title, subscript in (
        ("b_cr", "critical back-pressure ratio", ""),
        ("b_I", "critical back-pressure ratio of the first component", "I"),
        ("b_II", "critical back-pressure ratio of the second component", "II"),
    ):
        yield quantity(symbol, title, n("b", subscript), one, "1", high="0.999999", zero=True)
    yield quantity("m_sub", "subsonic index", n("m"), one, "1", high="2")
    yield quantity(
        "dp_c", "cracking pressure", n("Δp", "c"), dim.PRESSURE, "Pa", high="1e8",
        kind=Kind.DIFFERENTIAL, zero=True,
    )  # fmt: skip
    yield quantity("alpha_12", "conductance ratio of a series", n("α"), one, "1", high="1e6")
    yield quantity("A_eff", "effective area", n("A", "eff"), dim.AREA, "m2", high="1e3")
    yield quantity("L_tube", "length of the tube", n("L"), dim.LENGTH, "m", high="1e5")
    yield quantity("d_tube", "inner diameter of the tube", n("d"), dim.LENGTH, "m", high="10")
