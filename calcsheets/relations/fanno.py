"""Adiabatic flow with friction in a duct of constant area (Fanno flow)."""

from __future__ import annotations

from ..expressions import Condition, Equation, ln, sqrt, symbols
from .duct_flows import FANNO, FANNO_END, FANNO_STATION, NO_HEAT, ONE_DIMENSIONAL
from .isentropic import MACH_BRANCHES
from .orifices import CHOKED, NOT_CHOKED
from .relation import Branch, Chapter, Limit, Process, Regime, Relation, Source
from .roles import INLET, OUTLET
from .shocks import NORMAL_SHOCK
from .sources import derived, shapiro
from .thermodynamics import CONSTANT_HEATS, PERFECT

gamma, R = symbols("gamma R")
M, p, T, rho, p_0, T_0, mdot, A = symbols("M p T rho p_0 T_0 mdot A")
p_F, rho_F, p_0F, T_cr, K_F = symbols("p_F rho_F p_0F T_cr K_F")
K_d, K, f_D, D_h, L_F, ds = symbols("K_d K f_D D_h L_F ds")
M_1, p_1, T_1, p_01, K_F1, p_F1, rho_F1, p_0F1 = (
    s.of(INLET) for s in symbols("M p T p_0 K_F p_F rho_F p_0F")
)
M_2, p_2, T_2, p_02, K_F2, p_F2, rho_F2, p_0F2 = (
    s.of(OUTLET) for s in symbols("M p T p_0 K_F p_F rho_F p_0F")
)

_MODEL = (PERFECT, CONSTANT_HEATS, ONE_DIMENSIONAL, NO_HEAT)
ONE_SIDE = Limit(
    ((M_1 - 1) * (M_2 - 1)).at_least(0),
    "friction brings a stream to M = 1 and never past it",
    essential=True,
)
_LENGTH_MOVES = (
    "A shock inside the duct moves the sonic end: behind it this coefficient counts from the "
    "subsonic Mach number. The sonic pressure, density and stagnation pressure stay."
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
        source or shapiro("ch. 6"),
        (FANNO_STATION,),
        assumptions=_MODEL,
        branches=branches,
        cautions=cautions,
    )


_STATIONS = (
    _at(
        "fanno_pressure",
        "Adiabatic friction: static and sonic pressure",
        (p / p_F).equals(1 / M * sqrt((gamma + 1) / (2 + (gamma - 1) * M**2))),
    ),
    _at(
        "fanno_mach_from_pressure",
        "Adiabatic friction: Mach number from static and sonic pressure",
        (M**2).equals((sqrt(1 + (gamma**2 - 1) * (p_F / p) ** 2) - 1) / (gamma - 1)),
        derived("The pressure ratio of adiabatic flow with friction, solved for M²"),
    ),
    _at(
        "fanno_temperature",
        "Adiabatic friction: static and sonic temperature",
        (T / T_cr).equals((gamma + 1) / (2 + (gamma - 1) * M**2)),
    ),
    _at(
        "fanno_density",
        "Adiabatic friction: density and sonic density",
        (rho / rho_F).equals(1 / M * sqrt((2 + (gamma - 1) * M**2) / (gamma + 1))),
    ),
    _at(
        "fanno_stagnation_pressure",
        "Adiabatic friction: stagnation pressure and sonic stagnation pressure",
        (p_0 / p_0F).equals(
            1 / M
            * ((2 + (gamma - 1) * M**2) / (gamma + 1)) ** ((gamma + 1) / (2 * (gamma - 1)))
        ),
        branches=MACH_BRANCHES,
    ),
    _at(
        "fanno_length",
        "Adiabatic friction: loss coefficient f L/D up to the sonic end",
        K_F.equals(
            (1 - M**2) / (gamma * M**2)
            + (gamma + 1) / (2 * gamma)
            * ln((gamma + 1) * M**2 / (2 + (gamma - 1) * M**2))
        ),
        branches=MACH_BRANCHES,
        cautions=(_LENGTH_MOVES,),
    ),
    _at(
        "fanno_sonic_pressure",
        "Adiabatic friction: sonic pressure from the mass flow",
        p_F.equals(mdot / A * sqrt(2 * R * T_0 / (gamma * (gamma + 1)))),
        derived("Conservation of mass at M = 1 with the stagnation temperature of the stream"),
    ),
)  # fmt: skip


def _between(
    name: str,
    title: str,
    equation: Equation,
    source: Source | None = None,
    limits: tuple[Limit, ...] = (),
    offered_by: tuple[str, ...] = (FANNO,),
    assumptions: tuple[str, ...] = _MODEL,
) -> Relation:
    """A relation between two stations."""
    return Relation(
        name,
        title,
        equation,
        source or shapiro("ch. 6"),
        offered_by,
        limits=limits,
        assumptions=assumptions,
    )


_DUCT = (
    _between(
        "fanno_friction",
        "Adiabatic friction: loss coefficient of the duct between two Mach numbers",
        K_d.equals(K_F1 - K_F2),
        limits=(ONE_SIDE,),
        assumptions=(
            *_MODEL,
            "the losses of fittings act like friction spread along the duct",
        ),
    ),
    _between(
        "fanno_longest_duct",
        "Adiabatic friction: longest duct from the first station",
        K_F1.equals(f_D * L_F / D_h + K),
        assumptions=(*_MODEL, "one friction factor along the duct"),
    ),
    _between(
        "fanno_pressure_ratio",
        "Adiabatic friction: pressures between two stations",
        (p_2 / p_1).equals(
            M_1 / M_2 * sqrt((2 + (gamma - 1) * M_1**2) / (2 + (gamma - 1) * M_2**2))
        ),
    ),
    _between(
        "fanno_temperature_ratio",
        "Adiabatic friction: temperatures between two stations",
        (T_2 / T_1).equals((2 + (gamma - 1) * M_1**2) / (2 + (gamma - 1) * M_2**2)),
    ),
    _between(
        "fanno_entropy",
        "Adiabatic friction: rise of the specific entropy",
        ds.equals(R * ln(p_01 / p_02)),
        derived("Entropy of the calorically perfect gas at constant stagnation temperature"),
        limits=(
            Limit(
                (p_02 / p_01).at_most(1),
                "friction lowers the stagnation pressure",
                essential=True,
            ),
        ),
    ),
)  # fmt: skip


def _kept(name: str, what: str, equation: Equation) -> Relation:
    """What is one along the duct and across a shock in it: G and T_0 determine it."""
    return _between(
        name,
        f"Adiabatic friction: one {what} along the duct and across a shock",
        equation,
        derived("The sonic state follows from the mass flux and the stagnation temperature alone"),
        offered_by=(FANNO, NORMAL_SHOCK),
    )


_KEPT = (
    _kept("fanno_one_sonic_pressure", "sonic pressure", p_F2.equals(p_F1)),
    _kept("fanno_one_sonic_density", "sonic density", rho_F2.equals(rho_F1)),
    _kept("fanno_one_sonic_stagnation_pressure", "sonic stagnation pressure", p_0F2.equals(p_0F1)),
)

_SUBSONIC_END = Limit(
    M_1.at_most(1), "the surroundings act back only on a subsonic stream", essential=True
)
CHOKED_END_CAUTION = (
    "A choked end keeps a pressure above that of the surroundings: the stream expands outside, "
    "loud and with a larger force on the pipe."
)


def open_end(
    name: str, process: str, equation: Equation, regime: str, title: str, *limits: Limit
) -> Relation:
    """What holds at the open end of a duct, choked or not."""
    return Relation(
        name,
        title,
        equation,
        derived("A subsonic stream leaves at the pressure of the surroundings, a choked one not"),
        (process,),
        limits=limits,
        regime=regime,
        assumptions=("the stream leaves the duct freely, as a jet",),
        cautions=(CHOKED_END_CAUTION,) if regime == CHOKED else (),
    )


_CHOKES: Condition = (p_2 / p_F1).at_most(1)

CHAPTER = Chapter(
    "fanno",
    "Ducts with friction, adiabatic",
    (
        *_STATIONS,
        *_DUCT,
        *_KEPT,
        open_end(
            "fanno_choked_end",
            FANNO_END,
            M_1.equals(1),
            CHOKED,
            "Adiabatic friction: the stream chokes at the open end",
        ),
        open_end(
            "fanno_unchoked_end",
            FANNO_END,
            p_1.equals(p_2),
            NOT_CHOKED,
            "Adiabatic friction: the stream leaves at the pressure of the surroundings",
            _SUBSONIC_END,
        ),
    ),
    regimes=(
        Regime(
            "fanno_choking",
            "Choking at the open end of the duct: surroundings against the sonic pressure",
            ((_CHOKES, CHOKED),),
            NOT_CHOKED,
            (FANNO_END,),
            shapiro("ch. 6"),
        ),
    ),
    processes=(
        Process(
            FANNO,
            "a duct of constant area with friction and without heat exchange",
            one_stream=True,
        ),
        Process(
            FANNO_END,
            "the open end of an adiabatic duct with friction, into the surroundings",
            one_stream=True,
        ),
    ),
)
