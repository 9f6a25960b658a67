"""Isothermal flow with friction in a duct of constant area."""

from __future__ import annotations

from ..expressions import Equation, ln, sqrt, symbols
from .duct_flows import ISOTHERMAL_DUCT, ISOTHERMAL_END, ISOTHERMAL_STATION, ONE_DIMENSIONAL
from .fanno import open_end
from .orifices import CHOKED, NOT_CHOKED
from .relation import Chapter, Limit, Process, Regime, Relation, Source
from .roles import INLET, OUTLET
from .sources import definition, derived, shapiro, textbook
from .thermodynamics import CONSTANT_HEATS, PERFECT

gamma, R, q, A = symbols("gamma R q A")
M, p, T, p_0, T_0, mdot = symbols("M p T p_0 T_0 mdot")
p_T, p_0T, T_0T, K_T, K_d, K, f_D, D_h, L_T = symbols("p_T p_0T T_0T K_T K_d K f_D D_h L_T")
M_1, p_1, T_1, u_1, K_T1, p_T1, mdot_1 = (s.of(INLET) for s in symbols("M p T u K_T p_T mdot"))
M_2, p_2, T_2, u_2, K_T2, p_T2 = (s.of(OUTLET) for s in symbols("M p T u K_T p_T"))

_MODEL = (PERFECT, ONE_DIMENSIONAL, "the wall keeps the gas at one temperature")
_STATION_LIMIT = Limit(
    (gamma * M**2).at_most(1),
    "isothermal flow with friction ends at M = 1/√γ",
    essential=True,
)
_HEAT = (
    "Near M = 1/√γ the wall would have to supply heat without bound: a real duct is then closer "
    "to adiabatic flow.",
)


def _relation(
    name: str,
    title: str,
    equation: Equation,
    source: Source,
    offered_by: tuple[str, ...],
    limits: tuple[Limit, ...] = (),
    assumptions: tuple[str, ...] = _MODEL,
    cautions: tuple[str, ...] = (),
) -> Relation:
    return Relation(
        name,
        title,
        equation,
        source,
        offered_by,
        limits=limits,
        assumptions=assumptions,
        cautions=cautions,
    )


_AT = (ISOTHERMAL_STATION,)
_DUCT = (ISOTHERMAL_DUCT,)
_BOOK = shapiro("ch. 6")

_STATIONS = (
    _relation(
        "isothermal_pressure",
        "Isothermal friction: pressure and limiting pressure",
        (p / p_T).equals(1 / (sqrt(gamma) * M)),
        _BOOK,
        _AT,
    ),
    _relation(
        "isothermal_length",
        "Isothermal friction: loss coefficient f L/D up to the limit",
        K_T.equals((1 - gamma * M**2) / (gamma * M**2) + ln(gamma * M**2)),
        _BOOK,
        _AT,
        (_STATION_LIMIT,),
        cautions=_HEAT,
    ),
    _relation(
        "isothermal_stagnation_temperature",
        "Isothermal friction: stagnation temperature and its limit",
        (T_0 / T_0T).equals(2 * gamma / (3 * gamma - 1) * (1 + (gamma - 1) / 2 * M**2)),
        _BOOK,
        _AT,
        assumptions=(*_MODEL, CONSTANT_HEATS),
    ),
    _relation(
        "isothermal_stagnation_pressure",
        "Isothermal friction: stagnation pressure and its limit",
        (p_0 / p_0T).equals(
            1 / (sqrt(gamma) * M)
            * (2 * gamma / (3 * gamma - 1) * (1 + (gamma - 1) / 2 * M**2))
            ** (gamma / (gamma - 1))
        ),
        _BOOK,
        _AT,
        (_STATION_LIMIT,),
        assumptions=(*_MODEL, CONSTANT_HEATS),
    ),
    _relation(
        "isothermal_limiting_pressure",
        "Isothermal friction: limiting pressure from the mass flow",
        p_T.equals(mdot / A * sqrt(R * T)),
        derived("Conservation of mass at M = 1/√γ with the temperature of the stream"),
        _AT,
    ),
)  # fmt: skip

_BETWEEN = (
    _relation(
        "isothermal_duct_temperature",
        "Isothermal friction: one temperature",
        T_2.equals(T_1),
        definition("Definition of the isothermal change"),
        _DUCT,
        cautions=_HEAT,
    ),
    _relation(
        "isothermal_one_limiting_pressure",
        "Isothermal friction: one limiting pressure along the duct",
        p_T2.equals(p_T1),
        derived("The limit follows from the mass flux and the temperature alone"),
        _DUCT,
    ),
    _relation(
        "isothermal_friction",
        "Isothermal friction: loss coefficient of the duct between two Mach numbers",
        K_d.equals(K_T1 - K_T2),
        _BOOK,
        _DUCT,
    ),
    _relation(
        "isothermal_pressures",
        "Isothermal friction: pressures, mass flow and loss coefficient",
        (p_1**2 - p_2**2).equals(
            (mdot_1 / A) ** 2 * R * T_1 * (K_d + 2 * ln(p_1 / p_2))
        ),
        textbook("Momentum law with friction for a perfect gas at one temperature, integrated"),
        _DUCT,
        tuple(
            Limit(
                (mdot_1 / A * sqrt(R * T_1) / pressure).at_most(1),
                "isothermal flow with friction ends at M = 1/√γ",
                essential=True,
            )
            for pressure in (p_1, p_2)
        ),
        cautions=_HEAT,
    ),
    _relation(
        "isothermal_longest_duct",
        "Isothermal friction: longest duct from the first station",
        K_T1.equals(f_D * L_T / D_h + K),
        _BOOK,
        _DUCT,
        assumptions=(*_MODEL, "one friction factor along the duct"),
    ),
    _relation(
        "isothermal_heat",
        "Isothermal friction: heat that keeps the temperature",
        q.equals((u_2**2 - u_1**2) / 2),
        textbook("First law of thermodynamics, steady flow of a perfect gas at one temperature"),
        _DUCT,
        cautions=_HEAT,
    ),
)  # fmt: skip

CHAPTER = Chapter(
    "isothermal_ducts",
    "Ducts with friction, isothermal",
    (
        *_STATIONS,
        *_BETWEEN,
        open_end(
            "isothermal_choked_end",
            ISOTHERMAL_END,
            (gamma * M_1**2).equals(1),
            CHOKED,
            "Isothermal friction: the stream is at its limit at the open end",
        ),
        open_end(
            "isothermal_unchoked_end",
            ISOTHERMAL_END,
            p_1.equals(p_2),
            NOT_CHOKED,
            "Isothermal friction: the stream leaves at the pressure of the surroundings",
            Limit(
                (gamma * M_1**2).at_most(1),
                "isothermal flow with friction ends at M = 1/√γ",
                essential=True,
            ),
        ),
    ),
    regimes=(
        Regime(
            "isothermal_choking",
            "Limit at the open end of the duct: surroundings against the limiting pressure",
            (((p_2 / p_T1).at_most(1), CHOKED),),
            NOT_CHOKED,
            (ISOTHERMAL_END,),
            _BOOK,
        ),
    ),
    processes=(
        Process(
            ISOTHERMAL_DUCT,
            "a duct of constant area with friction whose wall keeps the gas at one temperature",
            one_stream=True,
        ),
        Process(
            ISOTHERMAL_END,
            "the open end of an isothermal duct with friction, into the surroundings",
            one_stream=True,
        ),
    ),
)
