"""Thermodynamics of the calorically perfect gas: state, specific heats, changes of state."""

from __future__ import annotations

from ..expressions import MOLAR_GAS_CONSTANT, ln, symbols
from .duct_flows import DUCTS
from .relation import Chapter, Process, Relation
from .roles import INLET, OUTLET
from .sources import definition, derived, textbook

R, M_w, gamma, c_p, c_v, C_p, n = symbols("R M_w gamma c_p c_v C_p n")
p, T, rho, v, p_0, T_0, rho_0 = symbols("p T rho v p_0 T_0 rho_0")
dh, de, ds, q, w_s, w_b = symbols("dh de ds q w_s w_b")
p_1, T_1, rho_1, v_1, u_1 = (s.of(INLET) for s in symbols("p T rho v u"))
p_2, T_2, rho_2, v_2, u_2 = (s.of(OUTLET) for s in symbols("p T rho v u"))

PERFECT = "perfect gas: the compressibility factor is 1"
CONSTANT_HEATS = "constant specific heats between the temperatures of the calculation"
REVERSIBLE = "no friction and no heat exchange"

ISENTROPIC = "isentropic change"
POLYTROPIC = "polytropic change"
ISOTHERMAL = "isothermal change"
ANY_CHANGE = "change of state"
_CHANGES = (ANY_CHANGE, ISENTROPIC, POLYTROPIC, ISOTHERMAL)

_GAS = (
    Relation(
        "specific_gas_constant",
        "Specific gas constant from the molar mass",
        R.equals(MOLAR_GAS_CONSTANT / M_w),
        definition("Definition of the specific gas constant"),
        ("gas",),
    ),
    Relation(
        "mayer",
        "Mayer's relation",
        (c_p - c_v).equals(R),
        textbook("Mayer's relation"),
        ("gas",),
        assumptions=(PERFECT,),
    ),
    Relation(
        "heat_ratio",
        "Ratio of specific heats",
        gamma.equals(c_p / c_v),
        definition("Definition of the ratio of specific heats"),
        ("gas",),
    ),
    Relation(
        "c_p_from_gamma",
        "Specific heat at constant pressure from γ",
        c_p.equals(gamma * R / (gamma - 1)),
        derived("Mayer's relation with the definition of γ"),
        ("gas",),
        assumptions=(PERFECT,),
    ),
    Relation(
        "c_v_from_gamma",
        "Specific heat at constant volume from γ",
        c_v.equals(R / (gamma - 1)),
        derived("Mayer's relation with the definition of γ"),
        ("gas",),
        assumptions=(PERFECT,),
    ),
    Relation(
        "gamma_from_c_p",
        "Ratio of specific heats from the specific heat at constant pressure",
        gamma.equals(c_p / (c_p - R)),
        derived("Mayer's relation with the definition of γ"),
        ("gas",),
        assumptions=(PERFECT,),
    ),
    Relation(
        "molar_heat",
        "Molar heat capacity and specific heat",
        C_p.equals(c_p * M_w),
        definition("Definition of molar quantities"),
        ("gas",),
    ),
)

_STATE = (
    Relation(
        "perfect_gas",
        "Perfect-gas state",
        p.equals(rho * R * T),
        textbook("Perfect-gas equation of state"),
        ("stream",),
        assumptions=(PERFECT,),
    ),
    Relation(
        "perfect_gas_stagnation",
        "Perfect-gas state at stagnation",
        p_0.equals(rho_0 * R * T_0),
        textbook("Perfect-gas equation of state"),
        ("stream", "vessel"),
        assumptions=(PERFECT,),
    ),
    Relation(
        "specific_volume",
        "Specific volume and density",
        v.equals(1 / rho),
        definition("Definition of specific volume"),
        ("stream",),
    ),
)

_CHANGE = (
    Relation(
        "enthalpy_change",
        "Change of specific enthalpy",
        dh.equals(c_p * (T_2 - T_1)),
        textbook("Enthalpy of the calorically perfect gas"),
        _CHANGES,
        assumptions=(PERFECT, CONSTANT_HEATS),
    ),
    Relation(
        "internal_energy_change",
        "Change of specific internal energy",
        de.equals(c_v * (T_2 - T_1)),
        textbook("Internal energy of the calorically perfect gas"),
        _CHANGES,
        assumptions=(PERFECT, CONSTANT_HEATS),
    ),
    Relation(
        "entropy_change_T_p",
        "Change of specific entropy from temperatures and pressures",
        ds.equals(c_p * ln(T_2 / T_1) - R * ln(p_2 / p_1)),
        textbook("Entropy of the calorically perfect gas"),
        (*_CHANGES, *DUCTS),
        assumptions=(PERFECT, CONSTANT_HEATS),
    ),
    Relation(
        "entropy_change_T_v",
        "Change of specific entropy from temperatures and specific volumes",
        ds.equals(c_v * ln(T_2 / T_1) + R * ln(v_2 / v_1)),
        textbook("Entropy of the calorically perfect gas"),
        _CHANGES,
        assumptions=(PERFECT, CONSTANT_HEATS),
    ),
    Relation(
        "first_law_closed",
        "First law for a fixed mass of gas",
        q.equals(de + w_b),
        textbook("First law of thermodynamics, closed system"),
        _CHANGES,
    ),
    Relation(
        "first_law_steady",
        "First law for a steady stream",
        (q - w_s).equals(dh + (u_2**2 - u_1**2) / 2),
        textbook("First law of thermodynamics, steady flow, equal heights"),
        _CHANGES,
        assumptions=("steady flow with one inlet and one outlet at equal height",),
    ),
    Relation(
        "isentropic_T_p",
        "Isentropic change: pressure and temperature",
        (p_2 / p_1).equals((T_2 / T_1) ** (gamma / (gamma - 1))),
        textbook("Isentropic change of the calorically perfect gas"),
        (ISENTROPIC,),
        assumptions=(PERFECT, CONSTANT_HEATS, REVERSIBLE),
    ),
    Relation(
        "isentropic_p_rho",
        "Isentropic change: pressure and density",
        (p_2 / p_1).equals((rho_2 / rho_1) ** gamma),
        textbook("Isentropic change of the calorically perfect gas"),
        (ISENTROPIC,),
        assumptions=(PERFECT, CONSTANT_HEATS, REVERSIBLE),
    ),
    Relation(
        "isentropic_T_rho",
        "Isentropic change: temperature and density",
        (T_2 / T_1).equals((rho_2 / rho_1) ** (gamma - 1)),
        textbook("Isentropic change of the calorically perfect gas"),
        (ISENTROPIC,),
        assumptions=(PERFECT, CONSTANT_HEATS, REVERSIBLE),
    ),
    Relation(
        "isentropic_boundary_work",
        "Isentropic change: boundary work of a fixed mass",
        w_b.equals(c_v * (T_1 - T_2)),
        derived("First law for a fixed mass without heat exchange"),
        (ISENTROPIC,),
        assumptions=(PERFECT, CONSTANT_HEATS, REVERSIBLE),
    ),
    Relation(
        "isentropic_shaft_work",
        "Isentropic change: shaft work of a steady stream at equal velocities",
        w_s.equals(c_p * (T_1 - T_2)),
        derived("First law for a steady stream without heat exchange"),
        (ISENTROPIC,),
        assumptions=(PERFECT, CONSTANT_HEATS, REVERSIBLE, "equal velocities and heights"),
    ),
    Relation(
        "polytropic_p_rho",
        "Polytropic change: pressure and density",
        (p_2 / p_1).equals((rho_2 / rho_1) ** n),
        textbook("Polytropic change"),
        (POLYTROPIC,),
        assumptions=("one exponent holds along the whole change",),
    ),
    Relation(
        "polytropic_T_p",
        "Polytropic change: temperature and pressure",
        (T_2 / T_1).equals((p_2 / p_1) ** ((n - 1) / n)),
        textbook("Polytropic change"),
        (POLYTROPIC,),
        assumptions=(PERFECT, "one exponent holds along the whole change"),
    ),
    Relation(
        "polytropic_boundary_work",
        "Polytropic change: boundary work of a fixed mass",
        w_b.equals(R * (T_1 - T_2) / (n - 1)),
        textbook("Polytropic change"),
        (POLYTROPIC,),
        assumptions=(PERFECT, "one exponent, other than 1, holds along the whole change"),
    ),
    Relation(
        "isothermal_temperature",
        "Isothermal change: one temperature",
        T_2.equals(T_1),
        definition("Definition of the isothermal change"),
        (ISOTHERMAL,),
    ),
    Relation(
        "isothermal_boundary_work",
        "Isothermal change: boundary work of a fixed mass",
        w_b.equals(R * T_1 * ln(p_1 / p_2)),
        textbook("Isothermal change of a perfect gas"),
        (ISOTHERMAL,),
        assumptions=(PERFECT, "reversible"),
    ),
)

CHAPTER = Chapter(
    "thermodynamics",
    "Thermodynamics of gases",
    _GAS + _STATE + _CHANGE,
    processes=(
        Process(ANY_CHANGE, "any change of state between two stations"),
        Process(ISENTROPIC, "a change without friction and heat exchange"),
        Process(POLYTROPIC, "a change along one polytropic exponent"),
        Process(ISOTHERMAL, "a change at constant temperature"),
    ),
)
