"""The normal shock."""

from __future__ import annotations

from ..expressions import Equation, ln, symbols
from .relation import Chapter, Limit, Process, Relation, Source
from .roles import INLET, OUTLET
from .sources import derived, naca_1135
from .thermodynamics import CONSTANT_HEATS, PERFECT

NORMAL_SHOCK = "normal shock"

gamma, R, ds = symbols("gamma R ds")
A_1, A_2 = (symbols("A")[0].of(role) for role in (INLET, OUTLET))
M_1, p_1, T_1, rho_1, p_01, A_cr1, u_1, a_cr = (
    s.of(INLET) for s in symbols("M p T rho p_0 A_cr u a_cr")
)
M_2, p_2, T_2, rho_2, p_02, A_cr2, u_2 = (s.of(OUTLET) for s in symbols("M p T rho p_0 A_cr u"))

_MODEL = (PERFECT, CONSTANT_HEATS, "thin shock normal to the stream, no heat exchange")
_SUPERSONIC = (Limit(M_1.at_least(1), "a shock stands only in supersonic flow", essential=True),)


_SUBSONIC = Limit(M_2.at_most(1), "behind a normal shock the flow is subsonic", essential=True)


def _shock(name: str, title: str, equation: Equation, source: Source, *limits: Limit) -> Relation:
    return Relation(
        name,
        title,
        equation,
        source,
        (NORMAL_SHOCK,),
        limits=(*_SUPERSONIC, *limits),
        assumptions=_MODEL,
    )


CHAPTER = Chapter(
    "shocks",
    "Normal shock",
    (
        _shock(
            "shock_pressure",
            "Pressure ratio of a normal shock",
            (p_2 / p_1).equals((2 * gamma * M_1**2 - (gamma - 1)) / (gamma + 1)),
            naca_1135("eq. 93"),
        ),
        _shock(
            "shock_density",
            "Density ratio of a normal shock",
            (rho_2 / rho_1).equals((gamma + 1) * M_1**2 / ((gamma - 1) * M_1**2 + 2)),
            naca_1135("eq. 94"),
        ),
        _shock(
            "shock_temperature",
            "Temperature ratio of a normal shock",
            (T_2 / T_1).equals(
                (2 * gamma * M_1**2 - (gamma - 1)) * ((gamma - 1) * M_1**2 + 2)
                / ((gamma + 1) ** 2 * M_1**2)
            ),
            naca_1135("eq. 95"),
        ),
        _shock(
            "shock_mach",
            "Mach number behind a normal shock",
            (M_2**2).equals(((gamma - 1) * M_1**2 + 2) / (2 * gamma * M_1**2 - (gamma - 1))),
            naca_1135("eq. 96"),
            _SUBSONIC,
        ),
        _shock(
            "shock_stagnation_pressure",
            "Stagnation pressure ratio of a normal shock",
            (p_02 / p_01).equals(
                ((gamma + 1) * M_1**2 / ((gamma - 1) * M_1**2 + 2)) ** (gamma / (gamma - 1))
                * ((gamma + 1) / (2 * gamma * M_1**2 - (gamma - 1))) ** (1 / (gamma - 1))
            ),
            naca_1135("eq. 99"),
        ),
        _shock(
            "rayleigh_pitot",
            "Stagnation pressure behind a normal shock and static pressure ahead (Rayleigh)",
            (p_02 / p_1).equals(
                ((gamma + 1) * M_1**2 / 2) ** (gamma / (gamma - 1))
                * ((gamma + 1) / (2 * gamma * M_1**2 - (gamma - 1))) ** (1 / (gamma - 1))
            ),
            naca_1135("eq. 100"),
        ),
        _shock(
            "prandtl_shock",
            "Prandtl's relation for a normal shock",
            (u_1 * u_2).equals(a_cr**2),
            naca_1135(),
        ),
        _shock(
            "shock_area",
            "A shock is thin: one area",
            A_2.equals(A_1),
            derived("Thickness of a shock is negligible"),
        ),
        _shock(
            "shock_entropy",
            "Entropy rise of a normal shock",
            ds.equals(-R * ln(p_02 / p_01)),
            derived("Entropy of the calorically perfect gas at constant stagnation temperature"),
        ),
        _shock(
            "shock_critical_area",
            "Critical areas across a normal shock",
            (p_01 * A_cr1).equals(p_02 * A_cr2),
            derived("Conservation of mass at constant stagnation temperature"),
        ),
    ),
    processes=(
        Process(
            NORMAL_SHOCK,
            "a normal shock between two stations next to each other",
            one_stream=True,
        ),
    ),
)  # fmt: skip
