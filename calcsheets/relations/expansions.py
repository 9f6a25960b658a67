"""Isentropic turning of a supersonic stream: the Prandtl-Meyer function and its fans."""

from __future__ import annotations

from ..expressions import PI, Expr, Function, sqrt, symbols
from .relation import Chapter, Limit, Process, Relation
from .roles import INLET, OUTLET
from .sources import naca_1135, textbook
from .thermodynamics import CONSTANT_HEATS, PERFECT, REVERSIBLE

EXPANSION_FAN = "expansion fan"
COMPRESSION_FAN = "isentropic compression fan"

gamma, M, nu, nu_max = symbols("gamma M nu nu_max")
theta, theta_vac, phi_fan = symbols("theta theta_vac phi_fan")
M_1, nu_1, nu_max_1, mu_1 = (s.of(INLET) for s in symbols("M nu nu_max mu"))
M_2, nu_2, mu_2 = (s.of(OUTLET) for s in symbols("M nu mu"))

_MODEL = (PERFECT, CONSTANT_HEATS, REVERSIBLE, "plane flow")
_SUPERSONIC = Limit(M.at_least(1), "the function is defined for supersonic flow", essential=True)


def _arctan(ratio: Expr) -> Expr:
    return Function("arctan", ratio)


CHAPTER = Chapter(
    "expansions",
    "Prandtl-Meyer turning",
    (
        Relation(
            "prandtl_meyer",
            "Prandtl-Meyer function",
            nu.equals(
                sqrt((gamma + 1) / (gamma - 1))
                * _arctan(sqrt((gamma - 1) / (gamma + 1) * (M**2 - 1)))
                - _arctan(sqrt(M**2 - 1))
            ),
            naca_1135("eq. 171c"),
            ("stream",),
            limits=(_SUPERSONIC,),
            assumptions=_MODEL,
        ),
        Relation(
            "prandtl_meyer_limit",
            "Prandtl-Meyer angle of expansion into vacuum",
            nu_max.equals(PI / 2 * (sqrt((gamma + 1) / (gamma - 1)) - 1)),
            naca_1135(),
            ("stream",),
            assumptions=_MODEL,
        ),
        Relation(
            "expansion_turning",
            "Turning by an expansion fan",
            theta.equals(nu_2 - nu_1),
            naca_1135(),
            (EXPANSION_FAN,),
            limits=(
                Limit(
                    theta.at_most(theta_vac),
                    "a larger deflection leaves a vacuum at the wall",
                    essential=True,
                ),
            ),
            assumptions=(*_MODEL, "the wall turns away from the stream"),
        ),
        Relation(
            "expansion_largest_turning",
            "Deflection that expands the stream into vacuum",
            theta_vac.equals(nu_max_1 - nu_1),
            naca_1135(),
            (EXPANSION_FAN,),
            assumptions=_MODEL,
            cautions=(
                "A real gas condenses before it reaches the vacuum; the angle is an upper bound.",
            ),
            errs="The angle is larger than any that a real gas reaches.",
        ),
        Relation(
            "expansion_fan_angle",
            "Angle between the first and the last wave of an expansion fan",
            phi_fan.equals(mu_1 + theta - mu_2),
            textbook("Geometry of the centred expansion fan"),
            (EXPANSION_FAN,),
            assumptions=("centred fan at a sharp corner",),
        ),
        Relation(
            "compression_turning",
            "Turning by an isentropic compression",
            theta.equals(nu_1 - nu_2),
            naca_1135(),
            (COMPRESSION_FAN,),
            limits=(
                Limit(theta.at_most(nu_1), "a larger deflection ends in a shock", essential=True),
            ),
            assumptions=(*_MODEL, "the wall turns into the stream along a smooth curve"),
            cautions=(
                "Waves of a compression run together: away from the wall they form a shock, for "
                "which this relation does not hold.",
            ),
            errs="Stagnation pressure is overstated wherever the waves have formed a shock.",
        ),
    ),
    processes=(
        Process(
            EXPANSION_FAN,
            "an expansion fan by which a supersonic stream turns away from itself",
        ),
        Process(
            COMPRESSION_FAN,
            "a smooth isentropic compression by which a supersonic stream turns into itself",
        ),
    ),
)
