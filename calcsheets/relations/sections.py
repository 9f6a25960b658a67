"""Lift and wave drag of plane sections in supersonic flow.

The pressures on the panels come from shocks and expansions, each a process of its own; a
section takes them by ``same_as``. It runs from the free stream to the wake.
"""

from __future__ import annotations

from ..expressions import Expr, Function, sqrt, symbols
from .relation import Chapter, Limit, Process, Relation
from .roles import INLET
from .sources import definition, derived, textbook

FLAT_PLATE = "flat plate in supersonic flow"
DOUBLE_WEDGE = "double wedge in supersonic flow"
LINEARISED_SECTION = "section in supersonic flow, linearised"
_FORCES = (FLAT_PLATE, DOUBLE_WEDGE, LINEARISED_SECTION)

gamma, alpha, epsilon, tau, k_s = symbols("gamma alpha_i epsilon tau k_s")
theta_lf, theta_uf, theta_ue, theta_mid = symbols("theta_lf theta_uf theta_ue theta_mid")
p_u, p_l, p_uf, p_ur, p_lf, p_lr = symbols("p_u p_l p_uf p_ur p_lf p_lr")
C_N, C_A, C_L, C_D, r_LD, A_pl, F_L, F_D = symbols("C_N C_A C_L C_D r_LD A_pl F_L F_D")
M_1, p_1, q_1 = (s.of(INLET) for s in symbols("M p q_dyn"))

_PLANE = ("plane flow without friction: skin friction comes on top",)
_LINEAR = (
    "small disturbances: angles are far below 1 rad, the flow is nowhere transonic",
    *_PLANE,
)
_SUPERSONIC = Limit(M_1.above(1), "the free stream is supersonic", essential=True)
_UNDERSTATED = "The drag is understated: friction and base drag come on top."


def _sin(angle: Expr) -> Expr:
    return Function("sin", angle)


def _cos(angle: Expr) -> Expr:
    return Function("cos", angle)


_FLAT = (
    Relation(
        "plate_normal_force",
        "Normal-force coefficient of a flat plate",
        C_N.equals(2 / (gamma * M_1**2) * ((p_l - p_u) / p_1)),
        derived("Balance of pressures on both sides of the plate"),
        (FLAT_PLATE,),
        limits=(_SUPERSONIC,),
        assumptions=_PLANE,
    ),
    Relation(
        "plate_lift",
        "Lift coefficient of a flat plate",
        C_L.equals(C_N * _cos(alpha)),
        textbook("Components of the force on a plate"),
        (FLAT_PLATE,),
        assumptions=_PLANE,
    ),
    Relation(
        "plate_drag",
        "Wave-drag coefficient of a flat plate",
        C_D.equals(C_N * _sin(alpha)),
        textbook("Components of the force on a plate"),
        (FLAT_PLATE,),
        assumptions=_PLANE,
        errs=_UNDERSTATED,
    ),
)

_WEDGE = (
    Relation(
        "wedge_lower_front_turn",
        "Turn of the stream at the lower front panel",
        theta_lf.equals(epsilon + alpha),
        textbook("Geometry of the double wedge"),
        (DOUBLE_WEDGE,),
        assumptions=("the angle of attack lifts the leading edge",),
    ),
    Relation(
        "wedge_upper_front_compression",
        "Turn into the stream at the upper front panel",
        theta_uf.equals(epsilon - alpha),
        textbook("Geometry of the double wedge"),
        (DOUBLE_WEDGE,),
        limits=(
            Limit(
                alpha.at_most(epsilon),
                "beyond the half-angle the panel is in the lee",
                essential=True,
            ),
        ),
        assumptions=("the angle of attack lifts the leading edge",),
    ),
    Relation(
        "wedge_upper_front_expansion",
        "Turn away from the stream at the upper front panel",
        theta_ue.equals(alpha - epsilon),
        textbook("Geometry of the double wedge"),
        (DOUBLE_WEDGE,),
        limits=(
            Limit(
                alpha.at_least(epsilon),
                "below the half-angle the panel faces the stream",
                essential=True,
            ),
        ),
        assumptions=("the angle of attack lifts the leading edge",),
    ),
    Relation(
        "wedge_mid_chord_turn",
        "Turn of the stream at mid-chord",
        theta_mid.equals(2 * epsilon),
        textbook("Geometry of the double wedge"),
        (DOUBLE_WEDGE,),
        assumptions=("the greatest thickness lies at mid-chord",),
    ),
    Relation(
        "wedge_thickness",
        "Thickness of a double wedge",
        tau.equals(Function("tan", epsilon)),
        textbook("Geometry of the double wedge"),
        (DOUBLE_WEDGE,),
        assumptions=("the greatest thickness lies at mid-chord",),
    ),
    Relation(
        "wedge_normal_force",
        "Normal-force coefficient of a double wedge",
        C_N.equals(1 / (gamma * M_1**2) * ((p_lf + p_lr - p_uf - p_ur) / p_1)),
        derived("Balance of pressures on the four panels, normal to the chord"),
        (DOUBLE_WEDGE,),
        limits=(_SUPERSONIC,),
        assumptions=(*_PLANE, "the greatest thickness lies at mid-chord"),
    ),
    Relation(
        "wedge_axial_force",
        "Axial-force coefficient of a double wedge",
        C_A.equals(tau / (gamma * M_1**2) * ((p_uf + p_lf - p_ur - p_lr) / p_1)),
        derived("Balance of pressures on the four panels, along the chord"),
        (DOUBLE_WEDGE,),
        limits=(_SUPERSONIC,),
        assumptions=(*_PLANE, "the greatest thickness lies at mid-chord"),
    ),
    Relation(
        "wedge_lift",
        "Lift coefficient of a double wedge",
        C_L.equals(C_N * _cos(alpha) - C_A * _sin(alpha)),
        textbook("Components of the force on a section"),
        (DOUBLE_WEDGE,),
        assumptions=_PLANE,
    ),
    Relation(
        "wedge_drag",
        "Wave-drag coefficient of a double wedge",
        C_D.equals(C_N * _sin(alpha) + C_A * _cos(alpha)),
        textbook("Components of the force on a section"),
        (DOUBLE_WEDGE,),
        assumptions=_PLANE,
        errs=_UNDERSTATED,
    ),
)

_LINEARISED = (
    Relation(
        "linearised_lift",
        "Lift coefficient of a thin section, linearised",
        C_L.equals(4 * alpha / sqrt(M_1**2 - 1)),
        textbook("Linearised supersonic flow (Ackeret)"),
        (LINEARISED_SECTION,),
        limits=(_SUPERSONIC,),
        assumptions=_LINEAR,
        errs="The lift is understated at moderate angles of attack.",
    ),
    Relation(
        "linearised_drag",
        "Wave-drag coefficient of a thin symmetric section, linearised",
        C_D.equals(4 / sqrt(M_1**2 - 1) * (alpha**2 + k_s * tau**2)),
        textbook("Linearised supersonic flow (Ackeret)"),
        (LINEARISED_SECTION,),
        limits=(_SUPERSONIC,),
        assumptions=(
            *_LINEAR,
            "the shape factor is 0 for a plate, 1 for a double wedge, 4/3 for parabolic arcs",
        ),
        errs=_UNDERSTATED,
    ),
)

_RESULTS = (
    Relation(
        "lift_over_drag",
        "Lift over wave drag",
        r_LD.equals(C_L / C_D),
        definition("Definition of the ratio of lift and drag"),
        _FORCES,
        assumptions=_PLANE,
        errs="The ratio is overstated: friction and base drag lower it.",
    ),
    Relation(
        "lift",
        "Lift from its coefficient",
        F_L.equals(C_L * q_1 * A_pl),
        definition("Definition of the lift coefficient"),
        _FORCES,
    ),
    Relation(
        "wave_drag",
        "Wave drag from its coefficient",
        F_D.equals(C_D * q_1 * A_pl),
        definition("Definition of the drag coefficient"),
        _FORCES,
    ),
)

CHAPTER = Chapter(
    "sections",
    "Sections in supersonic flow",
    _FLAT + _WEDGE + _LINEARISED + _RESULTS,
    processes=(
        Process(FLAT_PLATE, "a flat plate at an angle of attack, from the pressures on its sides"),
        Process(DOUBLE_WEDGE, "a symmetric double wedge, from the pressures on its panels"),
        Process(LINEARISED_SECTION, "a thin symmetric section by linearised theory"),
    ),
)
