"""Isentropic flow: sound, stagnation state, critical state, area and Mach number."""

from __future__ import annotations

from ..expressions import Function, sqrt, symbols
from .duct_flows import DUCTS, FANNO
from .relation import Branch, Chapter, Limit, Process, Relation, ending_in
from .roles import INLET, OUTLET
from .sources import definition, derived, naca_1135, textbook
from .thermodynamics import CONSTANT_HEATS, PERFECT, REVERSIBLE
from .throttles import THROTTLES

R, gamma, c_p = symbols("R gamma c_p")
p, T, rho, p_0, T_0, rho_0 = symbols("p T rho p_0 T_0 rho_0")
M, u, a, a_0, u_max, q_dyn, mu, A = symbols("M u a a_0 u_max q_dyn mu A")
p_cr, T_cr, rho_cr, a_cr, A_cr, M_cr = symbols("p_cr T_cr rho_cr a_cr A_cr M_cr")
p_01, T_01, mdot_1, A_cr1 = (s.of(INLET) for s in symbols("p_0 T_0 mdot A_cr"))
p_02, T_02, mdot_2, A_cr2 = (s.of(OUTLET) for s in symbols("p_0 T_0 mdot A_cr"))

ISENTROPIC_FLOW = "isentropic flow"
PASSAGE = "adiabatic passage"
_FANS = ("expansion fan", "isentropic compression fan")
_SHOCKS = ("normal shock", "oblique shock")

_MODEL = (PERFECT, CONSTANT_HEATS)
_ISENTROPIC = (PERFECT, CONSTANT_HEATS, REVERSIBLE)
_STREAM = ("stream",)

MACH_BRANCHES = (Branch("subsonic", M.at_most(1)), Branch("supersonic", M.at_least(1)))

_SOUND = (
    Relation(
        "speed_of_sound",
        "Speed of sound",
        a.equals(sqrt(gamma * R * T)),
        naca_1135(),
        _STREAM,
        assumptions=(PERFECT,),
    ),
    Relation(
        "stagnation_speed_of_sound",
        "Speed of sound at stagnation",
        a_0.equals(sqrt(gamma * R * T_0)),
        naca_1135(),
        ("stream", "vessel"),
        assumptions=(PERFECT,),
    ),
    Relation(
        "mach_number",
        "Mach number",
        M.equals(u / a),
        definition("Definition of the Mach number"),
        _STREAM,
    ),
    Relation(
        "mach_angle",
        "Mach angle",
        Function("sin", mu).equals(1 / M),
        naca_1135(),
        _STREAM,
        limits=(
            Limit(M.at_least(1), "a Mach wave exists only in supersonic flow", essential=True),
        ),
    ),
)

_STAGNATION = (
    Relation(
        "stagnation_temperature",
        "Stagnation and static temperature",
        (T_0 / T).equals(1 + (gamma - 1) / 2 * M**2),
        naca_1135("eq. 43"),
        _STREAM,
        assumptions=_MODEL,
    ),
    Relation(
        "stagnation_pressure",
        "Stagnation and static pressure",
        (p_0 / p).equals((1 + (gamma - 1) / 2 * M**2) ** (gamma / (gamma - 1))),
        naca_1135("eq. 44"),
        _STREAM,
        assumptions=_ISENTROPIC,
    ),
    Relation(
        "stagnation_density",
        "Stagnation and static density",
        (rho_0 / rho).equals((1 + (gamma - 1) / 2 * M**2) ** (1 / (gamma - 1))),
        naca_1135("eq. 45"),
        _STREAM,
        assumptions=_ISENTROPIC,
    ),
    Relation(
        "stagnation_temperature_velocity",
        "Stagnation temperature and velocity",
        T_0.equals(T + u**2 / (2 * c_p)),
        textbook("First law of thermodynamics, steady adiabatic flow"),
        _STREAM,
        assumptions=_MODEL,
    ),
    Relation(
        "maximum_velocity",
        "Velocity of expansion into vacuum",
        u_max.equals(sqrt(2 * c_p * T_0)),
        naca_1135(),
        ("stream", "vessel"),
        assumptions=_MODEL,
    ),
    Relation(
        "dynamic_pressure",
        "Dynamic pressure",
        q_dyn.equals(gamma / 2 * p * M**2),
        naca_1135(),
        _STREAM,
        assumptions=(PERFECT,),
    ),
    Relation(
        "dynamic_pressure_velocity",
        "Dynamic pressure from density and velocity",
        q_dyn.equals(rho * u**2 / 2),
        definition("Definition of the dynamic pressure"),
        _STREAM,
    ),
)

_CRITICAL = (
    Relation(
        "critical_temperature",
        "Critical temperature ratio",
        (T_cr / T_0).equals(2 / (gamma + 1)),
        naca_1135(),
        ("stream", "vessel"),
        assumptions=_MODEL,
    ),
    Relation(
        "critical_pressure",
        "Critical pressure ratio",
        (p_cr / p_0).equals((2 / (gamma + 1)) ** (gamma / (gamma - 1))),
        naca_1135(),
        ("stream", "vessel"),
        assumptions=_ISENTROPIC,
    ),
    Relation(
        "critical_density",
        "Critical density ratio",
        (rho_cr / rho_0).equals((2 / (gamma + 1)) ** (1 / (gamma - 1))),
        naca_1135(),
        ("stream", "vessel"),
        assumptions=_ISENTROPIC,
    ),
    Relation(
        "critical_speed_of_sound",
        "Critical speed of sound",
        a_cr.equals(sqrt(gamma * R * T_cr)),
        naca_1135(),
        ("stream", "vessel"),
        assumptions=(PERFECT,),
    ),
    Relation(
        "velocity_ratio",
        "Velocity over the critical speed of sound",
        (M_cr**2).equals((gamma + 1) * M**2 / (2 + (gamma - 1) * M**2)),
        naca_1135(),
        _STREAM,
        assumptions=_MODEL,
    ),
    Relation(
        "area_mach",
        "Area and Mach number",
        (A / A_cr).equals(
            1 / M
            * (2 / (gamma + 1) * (1 + (gamma - 1) / 2 * M**2))
            ** ((gamma + 1) / (2 * (gamma - 1)))
        ),
        naca_1135("eq. 80"),
        _STREAM,
        limits=(
            Limit(
                (A / A_cr).at_least(1), "no area is smaller than the critical one", essential=True
            ),
        ),
        assumptions=_ISENTROPIC,
        branches=MACH_BRANCHES,
    ),
)  # fmt: skip

_PASSAGES = (
    Relation(
        "adiabatic_stagnation_temperature",
        "Adiabatic flow: one stagnation temperature",
        T_02.equals(T_01),
        textbook("First law of thermodynamics, steady adiabatic flow"),
        (
            ISENTROPIC_FLOW,
            PASSAGE,
            *(ending_in(name, "stream") for name in ("orifice", *THROTTLES)),
            *_SHOCKS,
            *_FANS,
            FANNO,
        ),
        assumptions=("no heat exchange and no shaft work between the stations",),
    ),
    Relation(
        "isentropic_stagnation_pressure",
        "Isentropic flow: one stagnation pressure",
        p_02.equals(p_01),
        textbook("Second law of thermodynamics, reversible adiabatic flow"),
        (ISENTROPIC_FLOW, *_FANS),
        assumptions=(REVERSIBLE,),
    ),
    Relation(
        "continuity",
        "Steady flow: one mass flow",
        mdot_2.equals(mdot_1),
        textbook("Conservation of mass, steady flow"),
        (ISENTROPIC_FLOW, PASSAGE, *_SHOCKS, *_FANS, *DUCTS),
        assumptions=("steady flow without branches between the stations",),
    ),
    Relation(
        "isentropic_critical_area",
        "Isentropic flow: one critical area",
        A_cr2.equals(A_cr1),
        derived("Conservation of mass with constant stagnation state"),
        (ISENTROPIC_FLOW, *_FANS),
        assumptions=_ISENTROPIC,
    ),
)

CHAPTER = Chapter(
    "isentropic",
    "Isentropic flow",
    _SOUND + _STAGNATION + _CRITICAL + _PASSAGES,
    processes=(
        Process(
            ISENTROPIC_FLOW,
            "flow between two stations without friction, heat or shock",
            one_stream=True,
        ),
        Process(
            PASSAGE,
            "steady flow between two stations without heat exchange, losses open",
            one_stream=True,
        ),
    ),
)
