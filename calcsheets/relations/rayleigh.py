"""Flow with heat addition in a duct of constant area (Rayleigh flow)."""

from __future__ import annotations

from ..expressions import Equation, symbols
from .duct_flows import NO_FRICTION, ONE_DIMENSIONAL, RAYLEIGH, RAYLEIGH_END, RAYLEIGH_STATION
from .fanno import open_end
from .isentropic import MACH_BRANCHES
from .orifices import CHOKED, NOT_CHOKED
from .relation import Branch, Chapter, Limit, Process, Regime, Relation, Source
from .roles import INLET, OUTLET
from .shocks import NORMAL_SHOCK
from .sources import derived, shapiro, textbook
from .thermodynamics import CONSTANT_HEATS, PERFECT

gamma, c_p, q, Qdot = symbols("gamma c_p q Qdot")
M, p, T, rho, p_0, T_0 = symbols("M p T rho p_0 T_0")
p_R, T_R, rho_R, p_0R, T_0R, T_mx, q_R = symbols("p_R T_R rho_R p_0R T_0R T_mx q_R")
M_1, p_1, T_01, p_R1, p_0R1, T_0R1, mdot_1 = (
    s.of(INLET) for s in symbols("M p T_0 p_R p_0R T_0R mdot")
)
M_2, p_2, T_02, p_R2, p_0R2, T_0R2 = (s.of(OUTLET) for s in symbols("M p T_0 p_R p_0R T_0R"))

_MODEL = (PERFECT, CONSTANT_HEATS, ONE_DIMENSIONAL, NO_FRICTION)
_ONE_SIDE = Limit(
    ((M_1 - 1) * (M_2 - 1)).at_least(0),
    "heating brings a stream to M = 1 and never past it",
    essential=True,
)
_COOLS = (
    "Between M = 1/√γ and M = 1 heating lowers the static temperature: the hottest place is not "
    "the end of the duct.",
)


def _at(
    name: str,
    title: str,
    equation: Equation,
    source: Source | None = None,
    branches: tuple[Branch, ...] = (),
    cautions: tuple[str, ...] = (),
) -> Relation:
    """A relation of a station of such a duct."""
    return Relation(
        name,
        title,
        equation,
        source or shapiro("ch. 7"),
        (RAYLEIGH_STATION,),
        assumptions=_MODEL,
        branches=branches,
        cautions=cautions,
    )


_STATIONS = (
    _at(
        "rayleigh_stagnation_temperature",
        "Heat addition: stagnation temperature and sonic stagnation temperature",
        (T_0 / T_0R).equals(
            (gamma + 1) * M**2 * (2 + (gamma - 1) * M**2) / (1 + gamma * M**2) ** 2
        ),
        branches=MACH_BRANCHES,
    ),
    _at(
        "rayleigh_temperature",
        "Heat addition: static and sonic temperature",
        (T / T_R).equals(((1 + gamma) * M / (1 + gamma * M**2)) ** 2),
        cautions=_COOLS,
    ),
    _at(
        "rayleigh_pressure",
        "Heat addition: static and sonic pressure",
        (p / p_R).equals((1 + gamma) / (1 + gamma * M**2)),
    ),
    _at(
        "rayleigh_density",
        "Heat addition: density and sonic density",
        (rho / rho_R).equals((1 + gamma * M**2) / ((1 + gamma) * M**2)),
    ),
    _at(
        "rayleigh_stagnation_pressure",
        "Heat addition: stagnation pressure and sonic stagnation pressure",
        (p_0 / p_0R).equals(
            (1 + gamma) / (1 + gamma * M**2)
            * ((2 + (gamma - 1) * M**2) / (gamma + 1)) ** (gamma / (gamma - 1))
        ),
        branches=MACH_BRANCHES,
    ),
    _at(
        "rayleigh_sonic_temperature",
        "Heat addition: static and stagnation temperature at the sonic end",
        (T_R / T_0R).equals(2 / (gamma + 1)),
    ),
    _at(
        "rayleigh_highest_temperature",
        "Heat addition: highest static temperature, at M = 1/√γ",
        (T_mx / T_R).equals((gamma + 1) ** 2 / (4 * gamma)),
        derived("The temperature ratio of flow with heat at M² = 1/γ"),
        cautions=_COOLS,
    ),
    _at(
        "rayleigh_heat_to_choking",
        "Heat addition: heat up to thermal choking",
        q_R.equals(c_p * (T_0R - T_0)),
        derived("First law for a steady stream up to the sonic stagnation temperature"),
        cautions=(
            "More heat than this does not pass the duct: a subsonic stream is throttled back, a "
            "supersonic one is disturbed by shocks. A shock inside the duct does not change it.",
        ),
    ),
)  # fmt: skip


def _between(
    name: str,
    title: str,
    equation: Equation,
    source: Source,
    limits: tuple[Limit, ...] = (),
    assumptions: tuple[str, ...] = _MODEL,
    offered_by: tuple[str, ...] = (RAYLEIGH,),
) -> Relation:
    """A relation between two stations."""
    return Relation(
        name,
        title,
        equation,
        source,
        offered_by,
        limits=limits,
        assumptions=assumptions,
    )


_DUCT = (
    _between(
        "rayleigh_heat",
        "Heat addition: heat and stagnation temperatures",
        q.equals(c_p * (T_02 - T_01)),
        textbook("First law of thermodynamics, steady flow without shaft work"),
        limits=(_ONE_SIDE,),
        assumptions=(PERFECT, CONSTANT_HEATS, "no shaft work between the stations"),
    ),
    _between(
        "rayleigh_heat_flow",
        "Heat addition: heat flow and heat per mass",
        Qdot.equals(mdot_1 * q),
        textbook("Conservation of energy, steady flow"),
        assumptions=("the heat does not add mass to the stream, as fuel would",),
    ),
    _between(
        "rayleigh_momentum",
        "Heat addition: pressures between two stations",
        (p_1 * (1 + gamma * M_1**2)).equals(p_2 * (1 + gamma * M_2**2)),
        textbook("Momentum law for a steady stream without wall friction at constant area"),
    ),
)


def _kept(name: str, what: str, equation: Equation) -> Relation:
    """What is one along the duct and across a shock in it: G and the impulse determine it."""
    return _between(
        name,
        f"Heat addition: one {what} along the duct and across a shock",
        equation,
        derived("The sonic state follows from the mass flux and the impulse function alone"),
        offered_by=(RAYLEIGH, NORMAL_SHOCK),
    )


_KEPT = (
    _kept(
        "rayleigh_one_sonic_stagnation_temperature",
        "sonic stagnation temperature",
        T_0R2.equals(T_0R1),
    ),
    _kept("rayleigh_one_sonic_pressure", "sonic pressure", p_R2.equals(p_R1)),
    _kept(
        "rayleigh_one_sonic_stagnation_pressure", "sonic stagnation pressure", p_0R2.equals(p_0R1)
    ),
)

CHAPTER = Chapter(
    "rayleigh",
    "Ducts with heat addition",
    (
        *_STATIONS,
        *_DUCT,
        *_KEPT,
        open_end(
            "rayleigh_choked_end",
            RAYLEIGH_END,
            M_1.equals(1),
            CHOKED,
            "Heat addition: the stream chokes at the open end",
        ),
        open_end(
            "rayleigh_unchoked_end",
            RAYLEIGH_END,
            p_1.equals(p_2),
            NOT_CHOKED,
            "Heat addition: the stream leaves at the pressure of the surroundings",
            Limit(
                M_1.at_most(1),
                "the surroundings act back only on a subsonic stream",
                essential=True,
            ),
        ),
    ),
    regimes=(
        Regime(
            "rayleigh_choking",
            "Thermal choking at the open end: surroundings against the sonic pressure",
            (((p_2 / p_R1).at_most(1), CHOKED),),
            NOT_CHOKED,
            (RAYLEIGH_END,),
            shapiro("ch. 7"),
        ),
    ),
    processes=(
        Process(
            RAYLEIGH,
            "heat added to or taken from a stream in a duct of constant area without friction",
            one_stream=True,
        ),
        Process(
            RAYLEIGH_END,
            "the open end of a heated duct, into the surroundings",
            one_stream=True,
        ),
    ),
)
