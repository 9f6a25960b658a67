"""Vessels: the gas held, and its change by let-down and filling through an orifice."""

from __future__ import annotations

from ..expressions import symbols
from .orifices import CRITICAL_RATIO
from .relation import Chapter, Process, Regime, Relation
from .roles import DISCHARGE, INLET, OUTLET, SUPPLY, THROUGH
from .sources import definition, derived, naca_1135, textbook
from .thermodynamics import CONSTANT_HEATS, PERFECT
from .vessel_changes import (
    CHOKED_THROUGHOUT,
    COLD,
    FILLING_ADIABATIC,
    FILLING_ISOTHERMAL,
    FILLINGS,
    HOT,
    LET_DOWN_ADIABATIC,
    LET_DOWN_ISOTHERMAL,
    LET_DOWNS,
    UNCHOKED_AT_THE_END,
    UNIFORM,
)
from .vessel_courses import COURSES
from .vessel_times import FILLING_TIMES, LET_DOWN_TIMES

gamma, R, M_w, t, dm = symbols("gamma R M_w t dm")
p, T, p_0, T_0, V, m, N = symbols("p T p_0 T_0 V m N")
p_1, T_1, V_1, m_1 = (s.of(INLET) for s in symbols("p_0 T_0 V m"))
p_2, T_2, V_2, m_2 = (s.of(OUTLET) for s in symbols("p_0 T_0 V m"))
A, C_d, mdot = (s.of(THROUGH) for s in symbols("A C_d mdot"))
p_back = symbols("p")[0].of(DISCHARGE)
p_s, T_s = (s.of(SUPPLY) for s in symbols("p_0 T_0"))

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
            assumptions=(PERFECT, UNIFORM),
        ),
        Relation(
            "pressure_at_rest",
            "Gas at rest: static and stagnation pressure are one",
            p.equals(p_0),
            definition("Definition of the stagnation state"),
            ("vessel",),
            assumptions=(UNIFORM,),
        ),
        Relation(
            "temperature_at_rest",
            "Gas at rest: static and stagnation temperature are one",
            T.equals(T_0),
            definition("Definition of the stagnation state"),
            ("vessel",),
            assumptions=(UNIFORM,),
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
            (*LET_DOWNS, *FILLINGS),
            assumptions=("the vessel keeps its volume",),
        ),
        Relation(
            "mass_discharged",
            "Mass discharged",
            dm.equals(m_1 - m_2),
            textbook("Conservation of mass"),
            LET_DOWNS,
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
            cautions=COLD,
            errs="Heat from the walls is left out: the real gas stays warmer than this.",
        ),
        Relation(
            "mass_filled",
            "Mass filled",
            dm.equals(m_2 - m_1),
            textbook("Conservation of mass"),
            FILLINGS,
        ),
        Relation(
            "filling_energy",
            "Energy balance of a filling without heat exchange",
            (V_1 * (p_2 - p_1)).equals(gamma * R * T_s * dm),
            derived("First law for the vessel: internal energy gained is enthalpy supplied"),
            (FILLING_ADIABATIC,),
            assumptions=(PERFECT, CONSTANT_HEATS, UNIFORM, "no heat to the walls"),
            cautions=HOT,
        ),
        *LET_DOWN_TIMES,
        *FILLING_TIMES,
    ),
    regimes=(
        Regime(
            "let_down_choking",
            "Choking until the end of the let-down",
            (((p_back / p_2).at_most(CRITICAL_RATIO), CHOKED_THROUGHOUT),),
            UNCHOKED_AT_THE_END,
            LET_DOWNS,
            naca_1135(),
        ),
        Regime(
            "filling_choking",
            "Choking until the end of the filling",
            (((p_2 / p_s).at_most(CRITICAL_RATIO), CHOKED_THROUGHOUT),),
            UNCHOKED_AT_THE_END,
            FILLINGS,
            naca_1135(),
        ),
    ),
    processes=(
        Process(LET_DOWN_ISOTHERMAL, "a vessel let down at constant temperature", True),
        Process(LET_DOWN_ADIABATIC, "a vessel let down without heat exchange", True),
        Process(FILLING_ISOTHERMAL, "a vessel filled at constant temperature", True),
        Process(FILLING_ADIABATIC, "a vessel filled without heat exchange", True),
    ),
    courses=COURSES,
)  # fmt: skip
