"""The shock tube: a driver gas at rest bursts into a driven gas at rest.

The driver gas has properties of its own, at stations of the kind ``driver``; relations of the
gas of the brief are not offered there.
"""

from __future__ import annotations

from ..expressions import MOLAR_GAS_CONSTANT, sqrt, symbols
from .relation import Chapter, Limit, Process, Relation
from .roles import INLET, OUTLET
from .sources import definition, derived, textbook
from .thermodynamics import CONSTANT_HEATS, PERFECT, REVERSIBLE

SHOCK_TUBE = "shock tube"
DRIVER_EXPANSION = "unsteady expansion of the driver gas"
CONTACT = "contact surface"
DRIVER = "driver"

gamma, M_s, u_tail = symbols("gamma M_s u_tail")
p, T, rho, M, u, a_4, gamma_4, R_4, M_w4 = symbols("p T rho M u a_4 gamma_4 R_4 M_w4")
p_1, T_1, u_1, a_1, a_41, gamma_41, R_41 = (s.of(INLET) for s in symbols("p T u a a_4 gamma_4 R_4"))
p_2, T_2, u_2, a_42, gamma_42, R_42 = (s.of(OUTLET) for s in symbols("p T u a_4 gamma_4 R_4"))

_TUBE = (
    PERFECT,
    CONSTANT_HEATS,
    "both gases at rest before the diaphragm opens at once; one cross-section; no friction",
)
_EXPANDING = (PERFECT, CONSTANT_HEATS, REVERSIBLE, "plane wave in a straight duct")

_DRIVER_GAS = (
    Relation(
        "driver_gas_constant",
        "Specific gas constant of the driver gas",
        R_4.equals(MOLAR_GAS_CONSTANT / M_w4),
        definition("Definition of the specific gas constant"),
        (DRIVER,),
    ),
    Relation(
        "driver_speed_of_sound",
        "Speed of sound in the driver gas",
        a_4.equals(sqrt(gamma_4 * R_4 * T)),
        textbook("Speed of sound of a perfect gas"),
        (DRIVER,),
        assumptions=(PERFECT,),
    ),
    Relation(
        "driver_state",
        "Perfect-gas state of the driver gas",
        p.equals(rho * R_4 * T),
        textbook("Perfect-gas equation of state"),
        (DRIVER,),
        assumptions=(PERFECT,),
    ),
    Relation(
        "driver_mach",
        "Mach number of the driver gas",
        M.equals(u / a_4),
        definition("Definition of the Mach number"),
        (DRIVER,),
    ),
)

_BURST = (
    Relation(
        "shock_tube_pressures",
        "Pressure of driver and driven gas and shock Mach number",
        (p_2 / p_1).equals(
            (2 * gamma * M_s**2 - (gamma - 1)) / (gamma + 1)
            * (1 - (gamma_42 - 1) / (gamma + 1) * (a_1 / a_42) * (M_s - 1 / M_s))
            ** (-(2 * gamma_42) / (gamma_42 - 1))
        ),
        derived("Shock into the driven gas, expansion into the driver gas, contact surface"),
        (SHOCK_TUBE,),
        limits=(
            Limit(M_s.at_least(1), "a shock is faster than sound in the gas ahead", essential=True),
        ),
        assumptions=_TUBE,
        cautions=(
            "Friction at the wall and slow opening of the diaphragm weaken a real shock: the "
            "Mach number is an upper bound of what a given pressure yields.",
        ),
        errs="The shock is overstated for given pressures, the driver pressure understated.",
    ),
)  # fmt: skip

_BETWEEN = (
    Relation(
        "driver_expansion_velocity",
        "Velocity of the expanded driver gas",
        u_2.equals(u_1 + 2 / (gamma_41 - 1) * (a_41 - a_42)),
        textbook("Riemann invariant of a simple wave"),
        (DRIVER_EXPANSION,),
        assumptions=_EXPANDING,
    ),
    Relation(
        "driver_expansion_pressure",
        "Pressure and speed of sound of the expanded driver gas",
        (p_2 / p_1).equals((a_42 / a_41) ** (2 * gamma_41 / (gamma_41 - 1))),
        textbook("Isentropic change of the calorically perfect gas"),
        (DRIVER_EXPANSION,),
        assumptions=_EXPANDING,
    ),
    Relation(
        "driver_expansion_tail",
        "Velocity over ground of the tail of the expansion",
        u_tail.equals(u_2 - a_42),
        textbook("Characteristics of a simple wave"),
        (DRIVER_EXPANSION,),
        assumptions=_EXPANDING,
    ),
    Relation(
        "driver_heat_ratio_stays",
        "One driver gas: its ratio of specific heats",
        gamma_42.equals(gamma_41),
        textbook("Constant specific heats of one gas"),
        (DRIVER_EXPANSION,),
        assumptions=(CONSTANT_HEATS,),
    ),
    Relation(
        "driver_constant_stays",
        "One driver gas: its gas constant",
        R_42.equals(R_41),
        textbook("One composition of one gas"),
        (DRIVER_EXPANSION,),
        assumptions=("the driver gas does not mix or react",),
    ),
    Relation(
        "contact_pressure",
        "One pressure on both sides of a contact surface",
        p_2.equals(p_1),
        textbook("Balance of forces at a contact surface"),
        (CONTACT,),
        assumptions=("the contact surface is thin and plane, the gases do not mix",),
    ),
    Relation(
        "contact_velocity",
        "One velocity on both sides of a contact surface",
        u_2.equals(u_1),
        textbook("No flow through a contact surface"),
        (CONTACT,),
        assumptions=("the contact surface is thin and plane, the gases do not mix",),
    ),
)

CHAPTER = Chapter(
    "shock_tubes",
    "Shock tube",
    _DRIVER_GAS + _BURST + _BETWEEN,
    processes=(
        Process(SHOCK_TUBE, "from the driven gas to the driver gas of a shock tube, at rest"),
        Process(DRIVER_EXPANSION, "the expansion that runs into the driver gas"),
        Process(CONTACT, "from the driven to the driver gas at the surface where they touch"),
    ),
)
