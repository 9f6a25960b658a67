"""Pressure on a surface in a supersonic free stream: its coefficient, and approximations to it.

Each approximation is a process of its own, so that a sheet never takes one for another or for
the exact pressure behind shocks and expansions.
"""

from __future__ import annotations

from ..expressions import Equation, Function, sqrt, symbols
from .relation import Chapter, Limit, Process, Relation
from .roles import INLET, OUTLET
from .sources import definition, derived, textbook
from .thermodynamics import CONSTANT_HEATS, PERFECT

SURFACE = "surface in a free stream"
LINEARISED = "surface, linearised"
SECOND_ORDER = "surface, second order"
NEWTONIAN = "surface, Newtonian"
MODIFIED = "surface, modified Newtonian"
HYPERSONIC_WEDGE = "surface, hypersonic compression"
HYPERSONIC_EXPANSION = "surface, hypersonic expansion"
APPROXIMATIONS = (
    LINEARISED,
    SECOND_ORDER,
    NEWTONIAN,
    MODIFIED,
    HYPERSONIC_WEDGE,
    HYPERSONIC_EXPANSION,
)

gamma, delta, C_pr, C_pr0 = symbols("gamma delta C_pr C_pr0")
M_1, p_1 = (s.of(INLET) for s in symbols("M p"))
p_2 = symbols("p")[0].of(OUTLET)

_GAS = (PERFECT, CONSTANT_HEATS)
_SUPERSONIC = Limit(M_1.above(1), "the free stream is supersonic", essential=True)
_THIN = "small disturbances: the inclination is far below 1 rad, the flow is nowhere transonic"
_SLENDER = "from about Mach 5 on, and slender: the inclination is far below 1 rad"
_FACING = Limit(
    delta.at_least(0), "the surface faces the stream; elsewhere C_pr is 0 here", essential=True
)
_ENTERS = Limit(delta.at_least(0), "a compression turns into the stream", essential=True)
_LEAVES = Limit(delta.at_most(0), "an expansion turns away from the stream", essential=True)
_SECOND = (gamma + 1) * M_1**4 - 4 * (M_1**2 - 1)
_SMALL = Limit(
    (delta**2 * _SECOND**2).at_most(4 * (M_1**2 - 1) ** 3),
    "the second-order term is at most half of the first",
    essential=True,
)


def _surface(
    name: str,
    title: str,
    equation: Equation,
    law: str,
    process: str,
    assumptions: tuple[str, ...],
    limits: tuple[Limit, ...],
    errs: str,
) -> Relation:
    return Relation(
        name,
        title,
        equation,
        textbook(law),
        (process,),
        limits=limits,
        assumptions=assumptions,
        errs=errs,
    )


CHAPTER = Chapter(
    "surfaces",
    "Pressure on surfaces in supersonic flow",
    (
        Relation(
            "pressure_coefficient",
            "Pressure coefficient",
            C_pr.equals(2 / (gamma * M_1**2) * (p_2 / p_1 - 1)),
            definition("Definition of the pressure coefficient, perfect gas"),
            (SURFACE, *APPROXIMATIONS),
            assumptions=(PERFECT,),
        ),
        _surface(
            "linearised_pressure",
            "Pressure coefficient of a surface, linearised",
            C_pr.equals(2 * delta / sqrt(M_1**2 - 1)),
            "Linearised supersonic flow (Ackeret)",
            LINEARISED,
            (_THIN, "plane flow"),
            (_SUPERSONIC,),
            "It understates a compression and overstates the suction of an expansion.",
        ),
        _surface(
            "second_order_pressure",
            "Pressure coefficient of a surface, second order",
            C_pr.equals(
                2 * delta / sqrt(M_1**2 - 1)
                + _SECOND / (2 * (M_1**2 - 1) ** 2) * delta**2
            ),
            "Second-order supersonic flow (Busemann)",
            SECOND_ORDER,
            (*_GAS, _THIN, "plane flow"),
            (_SUPERSONIC, _SMALL),
            "Terms of the third power of the inclination are left out, in either direction.",
        ),
        _surface(
            "newtonian_pressure",
            "Pressure coefficient of a surface, Newtonian",
            C_pr.equals(2 * Function("sin", delta) ** 2),
            "Newtonian theory of impact",
            NEWTONIAN,
            ("very high Mach number: the shock lies on the surface",),
            (_FACING,),
            "On a wedge or plate it understates the pressure at any finite Mach number.",
        ),
        _surface(
            "modified_newtonian_pressure",
            "Pressure coefficient of a surface, modified Newtonian",
            C_pr.equals(C_pr0 * Function("sin", delta) ** 2),
            "Newtonian theory of impact, scaled to the stagnation point (Lees)",
            MODIFIED,
            ("high Mach number and a blunt body, near its stagnation region",),
            (_FACING,),
            "It understates the pressure on surfaces of small inclination.",
        ),
        Relation(
            "stagnation_pressure_coefficient",
            "Pressure coefficient at the stagnation point of a blunt body",
            C_pr0.equals(
                2 / (gamma * M_1**2)
                * (((gamma + 1) * M_1**2 / 2) ** (gamma / (gamma - 1))
                   * ((gamma + 1) / (2 * gamma * M_1**2 - (gamma - 1))) ** (1 / (gamma - 1))
                   - 1)
            ),
            derived("Rayleigh's pitot formula with the definition of the pressure coefficient"),
            (MODIFIED,),
            limits=(_SUPERSONIC,),
            assumptions=_GAS,
        ),
        _surface(
            "hypersonic_compression",
            "Pressure coefficient of a slender wedge, hypersonic",
            C_pr.equals(
                delta**2
                * ((gamma + 1) / 2 + sqrt(((gamma + 1) / 2) ** 2 + 4 / (M_1**2 * delta**2)))
            ),
            "Hypersonic small-disturbance theory, oblique shock",
            HYPERSONIC_WEDGE,
            (*_GAS, _SLENDER, "plane flow"),
            (_SUPERSONIC, _ENTERS),
            "Too low a pressure where M₁ times the inclination is below 1, too high above.",
        ),
        _surface(
            "hypersonic_expansion",
            "Pressure coefficient of a slender expansion, hypersonic",
            C_pr.equals(
                2 / (gamma * M_1**2)
                * ((1 + (gamma - 1) / 2 * M_1 * delta) ** (2 * gamma / (gamma - 1)) - 1)
            ),
            "Hypersonic small-disturbance theory, Prandtl-Meyer expansion",
            HYPERSONIC_EXPANSION,
            (*_GAS, _SLENDER, "plane flow"),
            (_SUPERSONIC, _LEAVES),
            "The suction differs in either direction where M₁ is not far above 1.",
        ),
    ),
    processes=(
        Process(SURFACE, "a surface whose pressure is known, in a free stream"),
        Process(LINEARISED, "a slightly inclined surface by linearised theory"),
        Process(SECOND_ORDER, "a slightly inclined surface by second-order theory"),
        Process(NEWTONIAN, "a surface in hypersonic flow by Newtonian theory"),
        Process(MODIFIED, "a blunt body in hypersonic flow by modified Newtonian theory"),
        Process(HYPERSONIC_WEDGE, "a slender surface turned into a hypersonic stream"),
        Process(HYPERSONIC_EXPANSION, "a slender surface turned away from a hypersonic stream"),
    ),
)  # fmt: skip
