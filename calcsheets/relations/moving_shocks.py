"""Normal shocks that move over ground, and unsteady expansions.

Static values are the same over ground and seen from the shock; velocities and stagnation
values are not. Quantities of a station are those over ground.
"""

from __future__ import annotations

from ..expressions import Equation, ln, symbols
from .relation import Chapter, Limit, Process, Relation, Source
from .roles import INLET, OUTLET
from .sources import derived, naca_1135, textbook
from .thermodynamics import CONSTANT_HEATS, PERFECT, REVERSIBLE

WITH_STREAM = "moving normal shock"
AGAINST_STREAM = "moving normal shock against the stream"
REFLECTED = "reflected normal shock"
REFLECTION = "shock reflection at a closed end"
EXPANSION = "unsteady expansion"
_SHOCKS = (WITH_STREAM, AGAINST_STREAM, REFLECTED)

gamma, R, ds = symbols("gamma R ds")
M_s, M_r, M_2s, u_s, u_p, u_esc, u_tail = symbols("M_s M_r M_2s u_s u_p u_esc u_tail")
T_0s, p_01s, p_02s = symbols("T_0s p_01s p_02s")
p_1, T_1, rho_1, u_1, a_1 = (s.of(INLET) for s in symbols("p T rho u a"))
p_2, T_2, rho_2, u_2, a_2 = (s.of(OUTLET) for s in symbols("p T rho u a"))

_MODEL = (PERFECT, CONSTANT_HEATS, "plane shock of constant speed, no friction")
_EXPANDING = (PERFECT, CONSTANT_HEATS, REVERSIBLE, "plane wave in a straight duct")
_SHOCK = Limit(M_s.at_least(1), "a shock is faster than sound in the gas ahead", essential=True)


def _across(
    name: str,
    title: str,
    equation: Equation,
    source: Source,
    offered_by: tuple[str, ...] = _SHOCKS,
    cautions: tuple[str, ...] = (),
) -> Relation:
    return Relation(
        name,
        title,
        equation,
        source,
        offered_by,
        limits=(_SHOCK,) if M_s in equation.symbols else (),
        assumptions=_MODEL,
        cautions=cautions,
    )


_STATIC = (
    _across(
        "moving_shock_pressure",
        "Pressure ratio of a moving shock",
        (p_2 / p_1).equals((2 * gamma * M_s**2 - (gamma - 1)) / (gamma + 1)),
        naca_1135("eq. 93 with the shock Mach number"),
    ),
    _across(
        "moving_shock_density",
        "Density ratio of a moving shock",
        (rho_2 / rho_1).equals((gamma + 1) * M_s**2 / ((gamma - 1) * M_s**2 + 2)),
        naca_1135("eq. 94 with the shock Mach number"),
    ),
    _across(
        "moving_shock_temperature",
        "Temperature ratio of a moving shock",
        (T_2 / T_1).equals(
            (2 * gamma * M_s**2 - (gamma - 1)) * ((gamma - 1) * M_s**2 + 2)
            / ((gamma + 1) ** 2 * M_s**2)
        ),
        naca_1135("eq. 95 with the shock Mach number"),
    ),
)  # fmt: skip

_VELOCITIES = (
    _across(
        "moving_shock_induced_velocity",
        "Change of velocity by a moving shock",
        u_p.equals(2 * a_1 / (gamma + 1) * (M_s - 1 / M_s)),
        derived("Conservation of mass seen from the shock, with its density ratio"),
    ),
    _across(
        "moving_shock_speed",
        "Velocity of a shock that runs with the stream",
        u_s.equals(u_1 + M_s * a_1),
        textbook("Change of the frame of reference"),
        (WITH_STREAM,),
    ),
    _across(
        "moving_shock_velocity_behind",
        "Velocity behind a shock that runs with the stream",
        u_2.equals(u_1 + u_p),
        textbook("Change of the frame of reference"),
        (WITH_STREAM,),
        cautions=(
            "Stagnation values at the stations are those over ground; they are not conserved "
            "across a moving shock.",
        ),
    ),
    _across(
        "opposing_shock_speed",
        "Velocity over ground of a shock that runs against the stream",
        u_s.equals(M_s * a_1 - u_1),
        textbook("Change of the frame of reference"),
        (AGAINST_STREAM, REFLECTED),
    ),
    _across(
        "opposing_shock_velocity_behind",
        "Velocity behind a shock that runs against the stream",
        u_2.equals(u_1 - u_p),
        textbook("Change of the frame of reference"),
        (AGAINST_STREAM, REFLECTED),
        cautions=(
            "Stagnation values at the stations are those over ground; they are not conserved "
            "across a moving shock.",
        ),
    ),
    _across(
        "reflected_shock_stops",
        "A shock reflected at a closed end stops the gas",
        u_p.equals(u_1),
        textbook("No flow through a closed end"),
        (REFLECTED,),
    ),
)

_FROM_THE_SHOCK = (
    _across(
        "moving_shock_mach_behind",
        "Mach number behind, relative to the shock",
        (M_2s**2).equals(((gamma - 1) * M_s**2 + 2) / (2 * gamma * M_s**2 - (gamma - 1))),
        naca_1135("eq. 96 with the shock Mach number"),
    ),
    _across(
        "moving_shock_stagnation_temperature",
        "Stagnation temperature relative to the shock",
        (T_0s / T_1).equals(1 + (gamma - 1) / 2 * M_s**2),
        naca_1135("eq. 43 with the shock Mach number"),
    ),
    _across(
        "moving_shock_stagnation_ahead",
        "Stagnation pressure ahead, relative to the shock",
        (p_01s / p_1).equals((1 + (gamma - 1) / 2 * M_s**2) ** (gamma / (gamma - 1))),
        naca_1135("eq. 44 with the shock Mach number"),
    ),
    _across(
        "moving_shock_stagnation_behind",
        "Stagnation pressure behind, relative to the shock",
        (p_02s / p_2).equals((1 + (gamma - 1) / 2 * M_2s**2) ** (gamma / (gamma - 1))),
        naca_1135("eq. 44 with the Mach number behind"),
    ),
    _across(
        "moving_shock_entropy",
        "Entropy rise of a moving shock",
        ds.equals(-R * ln(p_02s / p_01s)),
        derived("Entropy at constant stagnation temperature relative to the shock"),
    ),
)

_REFLECTION = (
    _across(
        "reflection_mach",
        "Mach number of the shock reflected at a closed end",
        (M_r**2).equals((2 * gamma * M_s**2 - (gamma - 1)) / ((gamma - 1) * M_s**2 + 2)),
        derived("Two shocks, the second of which stops the gas"),
        (REFLECTION,),
    ),
    _across(
        "reflection_pressure",
        "Pressure at a closed end over that ahead of the incident shock",
        (p_2 / p_1).equals(
            (2 * gamma * M_s**2 - (gamma - 1)) / (gamma + 1)
            * (((3 * gamma - 1) * M_s**2 - 2 * (gamma - 1)) / ((gamma - 1) * M_s**2 + 2))
        ),
        derived("Two shocks, the second of which stops the gas"),
        (REFLECTION,),
        cautions=(
            "The wall bears this pressure, not that of the incident shock; a structure that "
            "yields or rings may see more.",
        ),
    ),
    _across(
        "reflection_temperature",
        "Temperature at a closed end over that ahead of the incident shock",
        (T_2 / T_1).equals(
            (2 * (gamma - 1) * M_s**2 + (3 - gamma)) * ((3 * gamma - 1) * M_s**2 - 2 * (gamma - 1))
            / ((gamma + 1) ** 2 * M_s**2)
        ),
        derived("Two shocks, the second of which stops the gas"),
        (REFLECTION,),
    ),
)  # fmt: skip

_EXPANSION = (
    Relation(
        "unsteady_expansion_velocity",
        "Velocity behind an unsteady expansion",
        u_2.equals(u_1 + 2 / (gamma - 1) * (a_1 - a_2)),
        textbook("Riemann invariant of a simple wave"),
        (EXPANSION,),
        assumptions=_EXPANDING,
        limits=(
            Limit(u_2.at_least(u_1), "an expansion speeds the gas up", essential=True),
        ),
    ),
    Relation(
        "unsteady_expansion_pressure",
        "Pressure and speed of sound in an unsteady expansion",
        (p_2 / p_1).equals((a_2 / a_1) ** (2 * gamma / (gamma - 1))),
        textbook("Isentropic change of the calorically perfect gas"),
        (EXPANSION,),
        assumptions=_EXPANDING,
    ),
    Relation(
        "unsteady_expansion_vacuum",
        "Velocity of unsteady expansion into vacuum",
        u_esc.equals(u_1 + 2 * a_1 / (gamma - 1)),
        textbook("Riemann invariant of a simple wave"),
        (EXPANSION,),
        assumptions=_EXPANDING,
        errs="The velocity is larger than any that a real gas reaches.",
    ),
    Relation(
        "unsteady_expansion_tail",
        "Velocity over ground of the tail of an unsteady expansion",
        u_tail.equals(u_2 - a_2),
        textbook("Characteristics of a simple wave"),
        (EXPANSION,),
        assumptions=_EXPANDING,
    ),
)  # fmt: skip

CHAPTER = Chapter(
    "moving_shocks",
    "Moving shocks and unsteady expansions",
    _STATIC + _VELOCITIES + _FROM_THE_SHOCK + _REFLECTION + _EXPANSION,
    processes=(
        Process(WITH_STREAM, "a normal shock that runs into gas at rest, or with its stream"),
        Process(AGAINST_STREAM, "a normal shock that runs against the stream ahead of it"),
        Process(REFLECTED, "a normal shock that comes back from a closed end and stops the gas"),
        Process(REFLECTION, "from the gas ahead of a shock to that at the closed end, in one"),
        Process(EXPANSION, "an expansion that runs against the gas and speeds it up"),
    ),
)
