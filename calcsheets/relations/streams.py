"""Mass, volume and momentum of a stream, and pressures by their datum."""

from __future__ import annotations

from ..expressions import PI, Constant, sqrt, symbols
from ..quantities import REFERENCE_STATES
from .duct_flows import DUCTS
from .isentropic import MACH_BRANCHES
from .relation import Chapter, Relation
from .sources import definition, derived, naca_1135, textbook
from .thermodynamics import CONSTANT_HEATS, PERFECT, REVERSIBLE
from .throttles import THROTTLES

R, M_w, gamma = symbols("R M_w gamma")
p, p_g, p_0, p_0g, T, T_0, rho, M, u, p_atm = symbols("p p_g p_0 p_0g T T_0 rho M u p_atm")
mdot, ndot, G, q_V, A, d, F, F_i, m = symbols("mdot ndot G q_V A d F F_i m")
p_ref, T_ref, T_atm = symbols("p_ref T_ref T_atm")

_STREAM = ("stream",)
_FLOWS = ("stream", "orifice", *THROTTLES)

_DATUM = (
    Relation(
        "absolute_pressure",
        "Absolute pressure from gauge pressure",
        p.equals(p_g + p_atm),
        definition("Definition of gauge pressure"),
        ("stream", "driver"),
        assumptions=("the gauge reads against the local atmosphere",),
    ),
    Relation(
        "absolute_stagnation_pressure",
        "Absolute stagnation pressure from gauge pressure",
        p_0.equals(p_0g + p_atm),
        definition("Definition of gauge pressure"),
        ("stream", "vessel"),
        assumptions=("the gauge reads against the local atmosphere",),
    ),
)

_MASS = (
    Relation(
        "mass_flow",
        "Mass flow of a uniform stream",
        mdot.equals(rho * u * A),
        textbook("Conservation of mass, uniform stream"),
        _STREAM,
        assumptions=("uniform velocity and density over the section",),
    ),
    Relation(
        "volume_flow",
        "Volume flow at flowing conditions",
        mdot.equals(rho * q_V),
        definition("Definition of volume flow"),
        _STREAM,
    ),
    Relation(
        "mass_flux",
        "Mass flux",
        mdot.equals(G * A),
        definition("Definition of mass flux"),
        _FLOWS,
    ),
    Relation(
        "molar_flow",
        "Mass flow and flow of amount of substance",
        mdot.equals(ndot * M_w),
        definition("Definition of molar mass"),
        _FLOWS,
    ),
    Relation(
        "circular_area",
        "Area of a circle",
        A.equals(PI / 4 * d**2),
        definition("Geometry of the circle"),
        (*_FLOWS, *DUCTS),
    ),
    Relation(
        "mass_flow_static",
        "Mass flow from static pressure and stagnation temperature",
        mdot.equals(A * p * M * sqrt(gamma / (R * T_0) * (1 + (gamma - 1) / 2 * M**2))),
        derived(
            "Conservation of mass with the perfect-gas state, the speed of sound "
            "and the stagnation temperature"
        ),
        _STREAM,
        assumptions=(PERFECT, CONSTANT_HEATS, "uniform stream"),
        cautions=(
            "A Mach number above 1 from the pressure behind a duct means that the duct chokes at "
            "its end: the pressure there is then higher than was put in.",
        ),
    ),
    Relation(
        "mass_flow_stagnation",
        "Mass flow from the stagnation state and the Mach number",
        mdot.equals(
            A * p_0 * M * sqrt(gamma / (R * T_0))
            * (1 + (gamma - 1) / 2 * M**2) ** (-(gamma + 1) / (2 * (gamma - 1)))
        ),
        naca_1135(),
        _STREAM,
        assumptions=(PERFECT, CONSTANT_HEATS, REVERSIBLE, "uniform stream"),
        branches=MACH_BRANCHES,
    ),
)  # fmt: skip

_FORCE = (
    Relation(
        "open_end_force",
        "Force of a stream leaving an open end",
        F.equals(mdot * u + (p - p_atm) * A),
        textbook("Momentum law for a steady stream into the atmosphere"),
        _STREAM,
        assumptions=(
            "steady uniform stream along the axis of the opening",
            "the force acts on the pipe against the direction of the stream",
        ),
        cautions=(
            "The force at opening may exceed the steady force; supports need a dynamic factor.",
        ),
        errs="Transients are left out: a support designed for it as a maximum needs a load factor.",
    ),
    Relation(
        "impulse_function",
        "Impulse function",
        F_i.equals(p * A * (1 + gamma * M**2)),
        textbook("Momentum law for a steady stream"),
        _STREAM,
        assumptions=(PERFECT, "uniform stream"),
    ),
)


def _reference_volumes() -> tuple[Relation, ...]:
    """One relation for the flow and one for the volume at each reference state."""
    site_states = {"ref": (p_ref, T_ref), "FA": (p_atm, T_atm)}
    found = []
    for state in REFERENCE_STATES:
        pressure, temperature = site_states.get(
            state.name, (Constant(f"p_{state.name}"), Constant(f"T_{state.name}"))
        )
        flow, volume = symbols(f"q_{state.name} V_{state.name}")
        for name, title, equation, offered_by in (
            (
                f"flow_at_{state.name}",
                f"Mass flow and volume flow at {state.title}",
                mdot.equals(pressure * flow / (R * temperature)),
                _FLOWS,
            ),
            (
                f"volume_at_{state.name}",
                f"Mass and volume at {state.title}",
                m.equals(pressure * volume / (R * temperature)),
                ("vessel",),
            ),
        ):
            found.append(
                Relation(
                    name,
                    title,
                    equation,
                    definition(f"Perfect-gas volume at the reference state ({state.source})"),
                    offered_by,
                    assumptions=("perfect gas at the reference state, counted dry",),
                )
            )
    return tuple(found)


CHAPTER = Chapter(
    "streams",
    "Mass, volume and momentum of a stream",
    _DATUM + _MASS + _FORCE + _reference_volumes(),
)
