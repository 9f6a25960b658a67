"""The oblique shock: angles, detachment, and the changes across it.

The component of the stream normal to the shock passes a normal shock; the component along it
is unchanged.
"""

from __future__ import annotations

from ..expressions import Equation, Expr, Function, ln, sqrt, symbols
from .relation import Branch, Chapter, Limit, Process, Relation, Source
from .roles import INLET, OUTLET
from .sources import derived, naca_1135, textbook
from .thermodynamics import CONSTANT_HEATS, PERFECT

OBLIQUE_SHOCK = "oblique shock"

gamma, R, ds = symbols("gamma R ds")
theta, beta, theta_max, beta_max, theta_cr, beta_cr = symbols(
    "theta beta theta_max beta_max theta_cr beta_cr"
)
M_n1, M_n2 = symbols("M_n1 M_n2")
M_1, p_1, T_1, rho_1, p_01, A_1, A_cr1, u_1 = (
    s.of(INLET) for s in symbols("M p T rho p_0 A A_cr u")
)
M_2, p_2, T_2, rho_2, p_02, A_2, A_cr2, u_2 = (
    s.of(OUTLET) for s in symbols("M p T rho p_0 A A_cr u")
)

MODEL = (PERFECT, CONSTANT_HEATS, "thin plane shock, uniform streams, no heat exchange")
_SUPERSONIC = Limit(M_1.at_least(1), "a shock stands only in supersonic flow", essential=True)
_COMPRESSION = Limit(
    M_n1.at_least(1), "a shock needs a supersonic component normal to it", essential=True
)
_ACUTE = Limit(theta.below(beta), "the shock stands ahead of the deflected stream", essential=True)
_ATTACHED = Limit(
    theta.at_most(theta_max), "at a larger deflection the shock detaches", essential=True
)


def _sin(angle: Expr) -> Expr:
    return Function("sin", angle)


def _cos(angle: Expr) -> Expr:
    return Function("cos", angle)


def _tan(angle: Expr) -> Expr:
    return Function("tan", angle)


def _deflection(at: Expr) -> Expr:
    """Tangent of the deflection at a shock angle."""
    return (
        2 * _cos(at) * (M_1**2 * _sin(at) ** 2 - 1)
        / (_sin(at) * (M_1**2 * (gamma + _cos(2 * at)) + 2))
    )  # fmt: skip


_SIN2_AT_LARGEST = (
    1 / (4 * gamma * M_1**2)
    * ((gamma + 1) * M_1**2 - 4
       + sqrt((gamma + 1) * ((gamma + 1) * M_1**4 + 8 * (gamma - 1) * M_1**2 + 16)))
)  # fmt: skip
_SIN2_AT_SONIC = (
    1 / (4 * gamma * M_1**2)
    * ((gamma + 1) * M_1**2 - (3 - gamma)
       + sqrt((gamma + 1)
              * ((gamma + 1) * M_1**4 - 2 * (3 - gamma) * M_1**2 + gamma + 9)))
)  # fmt: skip

_WEAK_SONIC = Limit(
    (_sin(beta_cr) ** 2).at_most(_SIN2_AT_LARGEST),
    "sonic flow behind a shock lies on the weak branch",
    essential=True,
)

SHOCK_BRANCHES = (
    Branch("weak", (_sin(beta) ** 2).at_most(_SIN2_AT_LARGEST)),
    Branch("strong", (_sin(beta) ** 2).at_least(_SIN2_AT_LARGEST)),
)


def _angle(
    name: str,
    title: str,
    equation: Equation,
    source: Source,
    limits: tuple[Limit, ...] = (_SUPERSONIC,),
    branches: tuple[Branch, ...] = (),
    cautions: tuple[str, ...] = (),
) -> Relation:
    return Relation(
        name,
        title,
        equation,
        source,
        (OBLIQUE_SHOCK,),
        limits=limits,
        assumptions=MODEL,
        branches=branches,
        cautions=cautions,
    )


def _across(name: str, title: str, equation: Equation, source: Source) -> Relation:
    limits = tuple(
        limit for limit in (_COMPRESSION, _ACUTE) if limit.condition.left in equation.symbols
    )
    return Relation(
        name, title, equation, source, (OBLIQUE_SHOCK,), limits=limits, assumptions=MODEL
    )


_ANGLES = (
    _angle(
        "oblique_deflection",
        "Deflection, shock angle and Mach number",
        _tan(theta).equals(_deflection(beta)),
        naca_1135(),
        limits=(_SUPERSONIC, _ATTACHED),
        branches=SHOCK_BRANCHES,
        cautions=(
            "In a free stream an attached shock takes the weak branch; the strong one needs a "
            "back pressure that holds it.",
        ),
    ),
    _angle(
        "oblique_detachment",
        "Shock angle at the largest deflection",
        (_sin(beta_max) ** 2).equals(_SIN2_AT_LARGEST),
        naca_1135("eq. 168"),
    ),
    _angle(
        "oblique_largest_deflection",
        "Largest deflection by an attached shock",
        _tan(theta_max).equals(_deflection(beta_max)),
        naca_1135(),
        cautions=(
            "A wedge or ramp that asks for more has a detached, curved shock before it, for which "
            "no relation of this chapter holds.",
        ),
    ),
    _angle(
        "oblique_sonic_angle",
        "Shock angle with Mach number 1 behind the shock",
        (_sin(beta_cr) ** 2).equals(_SIN2_AT_SONIC),
        naca_1135("eq. 167"),
    ),
    _angle(
        "oblique_sonic_deflection",
        "Deflection with Mach number 1 behind the shock",
        _tan(theta_cr).equals(_deflection(beta_cr)),
        naca_1135(),
        limits=(_SUPERSONIC, _WEAK_SONIC),
    ),
)

_COMPONENTS = (
    _across(
        "oblique_normal_ahead",
        "Mach number normal to the shock, ahead of it",
        M_n1.equals(M_1 * _sin(beta)),
        textbook("Geometry of the oblique shock"),
    ),
    _across(
        "oblique_normal_behind",
        "Mach number normal to the shock, behind it",
        M_n2.equals(M_2 * _sin(beta - theta)),
        textbook("Geometry of the oblique shock"),
    ),
    _across(
        "oblique_normal_mach",
        "Normal Mach number behind an oblique shock",
        (M_n2**2).equals(((gamma - 1) * M_n1**2 + 2) / (2 * gamma * M_n1**2 - (gamma - 1))),
        naca_1135("eq. 96 with the normal components"),
    ),
    _across(
        "oblique_mach",
        "Mach number behind an oblique shock",
        (M_2**2).equals(
            ((gamma + 1) ** 2 * M_1**2 * M_n1**2 - 4 * (M_n1**2 - 1) * (gamma * M_n1**2 + 1))
            / ((2 * gamma * M_n1**2 - (gamma - 1)) * ((gamma - 1) * M_n1**2 + 2))
        ),
        naca_1135("with the normal component"),
    ),
    _across(
        "oblique_tangential_velocity",
        "An oblique shock leaves the velocity along it unchanged",
        (u_1 * _cos(beta)).equals(u_2 * _cos(beta - theta)),
        textbook("Momentum law along the shock"),
    ),
    _across(
        "oblique_normal_velocity",
        "Conservation of mass across an oblique shock",
        (rho_1 * u_1 * _sin(beta)).equals(rho_2 * u_2 * _sin(beta - theta)),
        textbook("Conservation of mass across the shock"),
    ),
)  # fmt: skip

_RATIOS = (
    _across(
        "oblique_pressure",
        "Pressure ratio of an oblique shock",
        (p_2 / p_1).equals((2 * gamma * M_n1**2 - (gamma - 1)) / (gamma + 1)),
        naca_1135("eq. 128 with the normal component"),
    ),
    _across(
        "oblique_density",
        "Density ratio of an oblique shock",
        (rho_2 / rho_1).equals((gamma + 1) * M_n1**2 / ((gamma - 1) * M_n1**2 + 2)),
        naca_1135("eq. 129 with the normal component"),
    ),
    _across(
        "oblique_temperature",
        "Temperature ratio of an oblique shock",
        (T_2 / T_1).equals(
            (2 * gamma * M_n1**2 - (gamma - 1)) * ((gamma - 1) * M_n1**2 + 2)
            / ((gamma + 1) ** 2 * M_n1**2)
        ),
        naca_1135("eq. 130 with the normal component"),
    ),
    _across(
        "oblique_stagnation_pressure",
        "Stagnation pressure ratio of an oblique shock",
        (p_02 / p_01).equals(
            ((gamma + 1) * M_n1**2 / ((gamma - 1) * M_n1**2 + 2)) ** (gamma / (gamma - 1))
            * ((gamma + 1) / (2 * gamma * M_n1**2 - (gamma - 1))) ** (1 / (gamma - 1))
        ),
        naca_1135("with the normal component"),
    ),
    _across(
        "oblique_stagnation_over_static",
        "Stagnation pressure behind an oblique shock and static pressure ahead",
        (p_02 / p_1).equals(
            ((gamma + 1) * M_n1**2 * ((gamma - 1) * M_1**2 + 2)
             / (2 * ((gamma - 1) * M_n1**2 + 2))) ** (gamma / (gamma - 1))
            * ((gamma + 1) / (2 * gamma * M_n1**2 - (gamma - 1))) ** (1 / (gamma - 1))
        ),
        naca_1135("with the normal component"),
    ),
    _across(
        "oblique_entropy",
        "Entropy rise of an oblique shock",
        ds.equals(-R * ln(p_02 / p_01)),
        derived("Entropy of the calorically perfect gas at constant stagnation temperature"),
    ),
    _across(
        "oblique_stream_tube",
        "Areas of a stream tube across an oblique shock",
        (A_2 / A_1).equals(_sin(beta - theta) / _sin(beta)),
        textbook("Geometry of the oblique shock"),
    ),
    _across(
        "oblique_critical_area",
        "Critical areas across an oblique shock",
        (p_01 * A_cr1).equals(p_02 * A_cr2),
        derived("Conservation of mass at constant stagnation temperature"),
    ),
)  # fmt: skip

CHAPTER = Chapter(
    "oblique_shocks",
    "Oblique shock",
    _ANGLES + _COMPONENTS + _RATIOS,
    processes=(
        Process(
            OBLIQUE_SHOCK,
            "an attached plane oblique shock that turns the stream",
        ),
    ),
)
