"""Flow, geometry and forces."""

from __future__ import annotations

from collections.abc import Iterator

from .. import dimension as dim
from ..quantity import Kind, Notation, Quantity
from ..reference_states import REFERENCE_STATES
from .entry import quantity


def quantities() -> Iterator[Quantity]:
    """Return the quantities."""
    n = Notation
    yield quantity("mdot", "mass flow", n("m", accent="dot"), dim.MASS_FLOW, "kg/s", zero=True)
    yield quantity(
        "ndot",
        "amount of substance flow",
        n("n", accent="dot"),
        dim.AMOUNT_FLOW,
        "mol/s",
        zero=True,
    )
    yield quantity("G", "mass flux", n("G"), dim.MASS_FLUX, "kg/(m2*s)", zero=True)
    yield quantity(
        "q_V", "volume flow at flowing conditions", n("q", "V"), dim.VOLUME_FLOW, "m3/s", zero=True
    )
    yield quantity("A", "cross-sectional area", n("A"), dim.AREA, "m2", high="1e6")
    yield quantity("d", "diameter", n("d"), dim.LENGTH, "m", high="1e4")
    yield quantity("C_d", "discharge coefficient", n("C", "d"), dim.ONE, "1", high="1.2")
    yield quantity("y", "velocity over maximum velocity", n("y"), dim.ONE, "1", high="1", zero=True)
    yield quantity("F", "force", n("F"), dim.FORCE, "N", low="-1e12")
    yield quantity("F_i", "impulse function", n("I"), dim.FORCE, "N")
    for state in REFERENCE_STATES:
        at = f"at {state.title}"
        yield quantity(
            f"q_{state.name}", f"volume flow {at}", n("q", state.name), dim.VOLUME_FLOW, "m3/s",
            kind=Kind.REFERENCE_VOLUME, reference=state.name, zero=True,
        )  # fmt: skip
        yield quantity(
            f"V_{state.name}", f"volume {at}", n("V", state.name), dim.VOLUME, "m3",
            kind=Kind.REFERENCE_VOLUME, reference=state.name,
        )  # fmt: skip
