"""Flow meters: throttling devices in a pipe and critical-flow nozzles.

``C`` is the discharge coefficient of ISO 5167, which counts the flow without the velocity of
approach; ``C_d`` is that of a nozzle or orifice whose upstream state is at rest.
"""

from __future__ import annotations

from collections.abc import Iterator

from .. import dimension as dim
from ..quantity import Kind, Notation, Quantity
from .entry import quantity


def quantities() -> Iterator[Quantity]:
    """Return the quantities."""
    yield from _of_the_gas()
    yield from _of_the_pipe()
    yield from _of_the_device()
    yield from _of_critical_nozzles()
    yield from _uncertainties()


def _of_the_gas() -> Iterator[Quantity]:
    n = Notation
    yield quantity("eta", "dynamic viscosity", n("η"), dim.VISCOSITY, "Pa*s", high="10")
    yield quantity(
        "eta_0",
        "dynamic viscosity at the stagnation state",
        n("η", "0"),
        dim.VISCOSITY,
        "Pa*s",
        high="10",
    )
    yield quantity("kappa", "isentropic exponent", n("κ"), dim.ONE, "1", low="1.001", high="5")
    yield quantity(
        "mu_JT",
        "Joule-Thomson coefficient",
        n("μ", "JT"),
        dim.COOLING,
        "K/Pa",
        low="-0.001",
        high="0.001",
    )


def _of_the_pipe() -> Iterator[Quantity]:
    n = Notation
    yield quantity("D", "internal diameter of the pipe", n("D"), dim.LENGTH, "m", high="100")
    yield quantity(
        "D_20", "internal diameter of the pipe at 20 °C", n("D", "20"), dim.LENGTH, "m", high="100"
    )
    yield quantity(
        "d_20", "diameter of the bore at 20 °C", n("d", "20"), dim.LENGTH, "m", high="100"
    )
    for letter, part in (("D", "pipe"), ("d", "device")):
        yield quantity(
            f"alpha_{letter}",
            f"coefficient of linear thermal expansion of the {part}",
            n("α", letter),
            dim.PER_TEMPERATURE,
            "/K",
            low="-0.001",
            high="0.001",
        )
    yield quantity("Re_D", "Reynolds number of the pipe", n("Re", "D"), dim.ONE, "1")
    yield quantity("Re_d", "Reynolds number of the throat", n("Re", "d"), dim.ONE, "1")
    yield quantity(
        "dp_m", "pressure difference between the tappings", n("Δp"), dim.PRESSURE, "Pa",
        high="1e8", kind=Kind.DIFFERENTIAL,
    )  # fmt: skip
    yield quantity(
        "dw", "pressure loss that remains", n("Δϖ"), dim.PRESSURE, "Pa",
        high="1e10", kind=Kind.DIFFERENTIAL,
    )  # fmt: skip
    yield quantity("xi_w", "relative pressure loss", n("ξ"), dim.ONE, "1", high="1")
    yield quantity("K_w", "pressure loss coefficient", n("K"), dim.ONE, "1", zero=True)


def _of_the_device() -> Iterator[Quantity]:
    n = Notation
    yield quantity("beta_d", "diameter ratio", n("β"), dim.ONE, "1", high="0.99999")
    yield quantity("E", "velocity of approach factor", n("E"), dim.ONE, "1", low="1", high="1000")
    yield quantity("C", "discharge coefficient (ISO 5167)", n("C"), dim.ONE, "1", high="1.5")
    yield quantity("eps", "expansibility factor", n("ε"), dim.ONE, "1", high="1")
    yield quantity("tau_p", "pressure ratio between the tappings", n("τ"), dim.ONE, "1", high="1")
    yield quantity("L_1", "spacing of the upstream tapping over D", n("L", "1"), dim.ONE, "1",
                   high="10")  # fmt: skip
    yield quantity(
        "Lp_2",
        "spacing of the downstream tapping from the downstream face over D",
        n("L", "2", superscript="′"),
        dim.ONE,
        "1",
        high="10",
    )
    yield quantity(
        "Mp_2", "dam height of the downstream tapping", n("M", "2", superscript="′"), dim.ONE, "1",
        high="4",
    )  # fmt: skip
    yield quantity(
        "A_RG", "Reynolds number term of the Reader-Harris/Gallagher equation", n("A", "RG"),
        dim.ONE, "1",
    )  # fmt: skip


def _of_critical_nozzles() -> Iterator[Quantity]:
    n = Notation
    yield quantity(
        "C_star", "critical flow function", n("C", superscript="*"), dim.ONE, "1", high="2"
    )
    yield quantity("Re_nt", "Reynolds number of the nozzle throat", n("Re", "nt"), dim.ONE, "1")
    yield quantity(
        "A_2t", "area at the exit of the diffuser over that of the throat", n("A", "2/t"),
        dim.ONE, "1", low="1", high="100",
    )  # fmt: skip
    yield quantity(
        "r_i", "ideal back-pressure ratio that still keeps the throat critical", n("r", "i"),
        dim.ONE, "1", high="1",
    )  # fmt: skip
    yield quantity(
        "r_max", "largest permissible back-pressure ratio", n("r", "max"), dim.ONE, "1", high="1"
    )


def _uncertainties() -> Iterator[Quantity]:
    for symbol, what in (
        ("q", "mass flow"),
        ("C", "discharge coefficient"),
        ("eps", "expansibility factor"),
        ("D", "pipe diameter"),
        ("d", "bore"),
        ("dp", "pressure difference"),
        ("rho", "density"),
        ("p", "pressure"),
        ("T", "temperature"),
        ("Cstar", "critical flow function"),
    ):
        letters = {"eps": "ε", "dp": "Δp", "rho": "ρ", "Cstar": "C*"}
        yield quantity(
            f"U_{symbol}", f"relative uncertainty of the {what}, at 95 %",
            Notation("U", letters.get(symbol, symbol)), dim.ONE, "1", high="10", zero=True,
        )  # fmt: skip
