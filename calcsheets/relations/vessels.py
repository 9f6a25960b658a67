"""Vessels: the gas held, let-down and filling through an orifice that stays choked."""

from __future__ import annotations

from ..expressions import ln, sqrt, symbols
from .orifices import CRITICAL_RATIO
from .relation import Chapter, Process, Regime, Relation
from .roles import DISCHARGE, INLET, OUTLET, SUPPLY, THROUGH
from .sources import definition, derived, naca_1135, textbook
from .thermodynamics import CONSTANT_HEATS, PERFECT

gamma, R, M_w, t, dm = symbols("gamma R M_w t dm")
p, T, p_0, T_0, V, m, N = symbols("p T p_0 T_0 V m N")
p_1, T_1, V_1, m_1 = (s.of(INLET) for s in symbols("p_0 T_0 V m"))
p_2, T_2, V_2, m_2 = (s.of(OUTLET) for s in symbols("p_0 T_0 V m"))
A, C_d, mdot = (s.of(THROUGH) for s in symbols("A C_d mdot"))
p_back = symbols("p")[0].of(DISCHARGE)
p_s, T_s = (s.of(SUPPLY) for s in symbols("p_0 T_0"))

LET_DOWN_ISOTHERMAL = "let-down, isothermal"
LET_DOWN_ADIABATIC = "let-down, adiabatic"
FILLING_ISOTHERMAL = "filling, isothermal"
FILLING_ADIABATIC = "filling, adiabatic"
_LET_DOWNS = (LET_DOWN_ISOTHERMAL, LET_DOWN_ADIABATIC)
_FILLINGS = (FILLING_ISOTHERMAL, FILLING_ADIABATIC)
CHOKED_THROUGHOUT = "choked throughout"
UNCHOKED_AT_THE_END = "unchoked before the end"
UNCHOKED_AT_THE_START = "unchoked from the start or before the end"

_UNIFORM = "the gas in the vessel is uniform and at rest"
_LET_DOWN_ASSUMPTIONS = (PERFECT, CONSTANT_HEATS, _UNIFORM, "constant discharge coefficient")
_COLD = (
    "A let-down cools the gas and the wall: check the vessel and pipe metal against its "
    "minimum design temperature, and the gas for condensation and hydrates.",
)
_HOT = (
    "Filling heats the gas; in oxygen service fast filling can ignite materials by compression.",
)

CHAPTER = Chapter(
    "vessels",
    "Let-down and filling of vessels",
    (
        Relation(
            "gas_held",
            "Gas held in a vessel",
            (p_0 * V).equals(m * R * T_0),
            textbook("Perfect-gas equation of state"),
            ("vessel",),
            assumptions=(PERFECT, _UNIFORM),
        ),
        Relation(
            "pressure_at_rest",
            "Gas at rest: static and stagnation pressure are one",
            p.equals(p_0),
            definition("Definition of the stagnation state"),
            ("vessel",),
            assumptions=(_UNIFORM,),
        ),
        Relation(
            "temperature_at_rest",
            "Gas at rest: static and stagnation temperature are one",
            T.equals(T_0),
            definition("Definition of the stagnation state"),
            ("vessel",),
            assumptions=(_UNIFORM,),
        ),
        Relation(
            "amount_held",
            "Amount of substance held in a vessel",
            m.equals(N * M_w),
            definition("Definition of molar mass"),
            ("vessel",),
        ),
        Relation(
            "rigid_vessel",
            "Rigid vessel: one volume",
            V_2.equals(V_1),
            textbook("Rigid walls"),
            (*_LET_DOWNS, *_FILLINGS),
            assumptions=("the vessel keeps its volume",),
        ),
        Relation(
            "mass_discharged",
            "Mass discharged",
            dm.equals(m_1 - m_2),
            textbook("Conservation of mass"),
            _LET_DOWNS,
        ),
        Relation(
            "isothermal_vessel",
            "Isothermal vessel: one temperature",
            T_2.equals(T_1),
            definition("Definition of the isothermal change"),
            (LET_DOWN_ISOTHERMAL, FILLING_ISOTHERMAL),
            assumptions=("the walls hold the gas at constant temperature",),
            errs="A fast let-down is colder and a fast filling hotter than this.",
        ),
        Relation(
            "adiabatic_let_down_temperature",
            "Temperature after a let-down without heat exchange",
            (T_2 / T_1).equals((p_2 / p_1) ** ((gamma - 1) / gamma)),
            textbook("Isentropic change of the gas that remains"),
            (LET_DOWN_ADIABATIC,),
            assumptions=(
                PERFECT,
                CONSTANT_HEATS,
                "no heat from the walls, so that the remaining gas expands isentropically",
            ),
            cautions=_COLD,
            errs="Heat from the walls is left out: the real gas stays warmer than this.",
        ),
        Relation(
            "let_down_time_isothermal",
            "Time of a choked let-down at constant temperature",
            t.equals(
                V_1 / (C_d * A * sqrt(gamma * R * T_1))
                * ((gamma + 1) / 2) ** ((gamma + 1) / (2 * (gamma - 1)))
                * ln(p_1 / p_2)
            ),
            derived("Mass balance of the vessel with choked mass flow at constant temperature"),
            (LET_DOWN_ISOTHERMAL,),
            regime=CHOKED_THROUGHOUT,
            assumptions=_LET_DOWN_ASSUMPTIONS,
        ),
        Relation(
            "let_down_time_adiabatic",
            "Time of a choked let-down without heat exchange",
            t.equals(
                2 * V_1 / ((gamma - 1) * C_d * A * sqrt(gamma * R * T_1))
                * ((gamma + 1) / 2) ** ((gamma + 1) / (2 * (gamma - 1)))
                * ((p_1 / p_2) ** ((gamma - 1) / (2 * gamma)) - 1)
            ),
            derived("Mass balance of the vessel with choked mass flow and isentropic expansion"),
            (LET_DOWN_ADIABATIC,),
            regime=CHOKED_THROUGHOUT,
            assumptions=_LET_DOWN_ASSUMPTIONS,
            cautions=_COLD,
        ),
        Relation(
            "mass_filled",
            "Mass filled",
            dm.equals(m_2 - m_1),
            textbook("Conservation of mass"),
            _FILLINGS,
        ),
        Relation(
            "filling_steady_mass",
            "Mass filled at constant mass flow",
            dm.equals(mdot * t),
            textbook("Conservation of mass with constant choked mass flow"),
            _FILLINGS,
            regime=CHOKED_THROUGHOUT,
            assumptions=("constant supply state",),
        ),
        Relation(
            "filling_energy",
            "Energy balance of a filling without heat exchange",
            (V_1 * (p_2 - p_1)).equals(gamma * R * T_s * dm),
            derived("First law for the vessel: internal energy gained is enthalpy supplied"),
            (FILLING_ADIABATIC,),
            assumptions=(PERFECT, CONSTANT_HEATS, _UNIFORM, "no heat to the walls"),
            cautions=_HOT,
        ),
    ),
    regimes=(
        Regime(
            "let_down_choking",
            "Choking until the end of the let-down",
            (p_back / p_2).at_most(CRITICAL_RATIO),
            CHOKED_THROUGHOUT,
            UNCHOKED_AT_THE_END,
            _LET_DOWNS,
            naca_1135(),
        ),
        Regime(
            "filling_choking",
            "Choking until the end of the filling",
            (p_2 / p_s).at_most(CRITICAL_RATIO),
            CHOKED_THROUGHOUT,
            UNCHOKED_AT_THE_START,
            _FILLINGS,
            naca_1135(),
        ),
    ),
    processes=(
        Process(LET_DOWN_ISOTHERMAL, "a vessel let down at constant temperature", True),
        Process(LET_DOWN_ADIABATIC, "a vessel let down without heat exchange", True),
        Process(FILLING_ISOTHERMAL, "a vessel filled at constant temperature", True),
        Process(FILLING_ADIABATIC, "a vessel filled without heat exchange", True),
    ),
)  # fmt: skip
