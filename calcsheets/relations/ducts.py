"""Ducts of constant area: section, resistance, place along the duct, force on the wall."""

from __future__ import annotations

from ..expressions import symbols
from .duct_flows import DUCTS, ROUGH_DUCTS
from .relation import Chapter, Limit, Relation
from .roles import INLET, OUTLET
from .shocks import NORMAL_SHOCK
from .sources import definition, derived, textbook

A, d, D_h, P_w, L, f_D, K, K_d, L_eq, F_w, dp = symbols("A d D_h P_w L f_D K K_d L_eq F_w dp")
A_1, p_1, x_d1, F_i1 = (s.of(INLET) for s in symbols("A p x_d F_i"))
A_2, p_2, x_d2, F_i2 = (s.of(OUTLET) for s in symbols("A p x_d F_i"))

_ONE_AREA = "the section of the duct is the same all along"

_SECTION = (
    Relation(
        "duct_area_at_first",
        "Area of the first station: that of the duct",
        A_1.equals(A),
        definition("Duct of constant area"),
        DUCTS,
        assumptions=(_ONE_AREA,),
    ),
    Relation(
        "duct_area_at_second",
        "Area of the second station: that of the duct",
        A_2.equals(A),
        definition("Duct of constant area"),
        DUCTS,
        assumptions=(_ONE_AREA,),
    ),
    Relation(
        "hydraulic_diameter_circle",
        "Hydraulic diameter of a circular duct",
        D_h.equals(d),
        definition("Definition of the hydraulic diameter"),
        ROUGH_DUCTS,
        assumptions=("the duct is circular and d its internal diameter",),
    ),
    Relation(
        "hydraulic_diameter",
        "Hydraulic diameter from area and wetted perimeter",
        D_h.equals(4 * A / P_w),
        definition("Definition of the hydraulic diameter"),
        ROUGH_DUCTS,
        cautions=(
            "The hydraulic diameter serves turbulent flow; laminar flow in another section than "
            "a circle has a friction factor of its own.",
        ),
    ),
)

_RESISTANCE = (
    Relation(
        "duct_resistance",
        "Loss coefficient of the duct with its fittings",
        K_d.equals(f_D * L / D_h + K),
        textbook("Darcy-Weisbach equation with loss coefficients added"),
        ROUGH_DUCTS,
        assumptions=(
            "one friction factor along the duct",
            "the loss coefficients count on the velocity in the duct",
        ),
        cautions=(
            "The Darcy friction factor belongs here: four times the Fanning factor. The loss of "
            "the jet at an open end, K = 1, lies outside the duct and is not part of K.",
        ),
    ),
    Relation(
        "equivalent_length",
        "Loss coefficient and equivalent length of fittings",
        K.equals(f_D * L_eq / D_h),
        definition("Definition of the equivalent length"),
        ROUGH_DUCTS,
        assumptions=("the equivalent length counts with the friction factor of the duct",),
    ),
)

_ALONG = (
    Relation(
        "duct_length",
        "Length of the duct between two places along it",
        L.equals(x_d2 - x_d1),
        definition("Distances count along the duct from one place"),
        DUCTS,
    ),
    Relation(
        "shock_place",
        "A shock is thin: one place along the duct",
        x_d2.equals(x_d1),
        derived("Thickness of a shock is negligible"),
        (NORMAL_SHOCK,),
        assumptions=("the shock is normal to the duct and thin",),
    ),
    Relation(
        "duct_pressure_drop",
        "Pressure difference along the duct",
        dp.equals(p_1 - p_2),
        definition("Pressure difference from the first to the second station"),
        DUCTS,
    ),
    Relation(
        "wall_force",
        "Force of the stream on the wall along the duct",
        F_w.equals(F_i1 - F_i2),
        textbook("Momentum law for a steady stream in a duct of constant area"),
        ROUGH_DUCTS,
        assumptions=("steady uniform stream at both stations",),
        limits=(Limit((F_i2 / F_i1).at_most(1), "friction takes momentum from the stream", True),),
    ),
)

CHAPTER = Chapter("ducts", "Ducts: section, resistance and force", _SECTION + _RESISTANCE + _ALONG)
