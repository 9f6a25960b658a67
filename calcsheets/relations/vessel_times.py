"""How long a let-down or a filling takes, choked throughout, unchoked at the end, or never choked.

The integrals run over the velocity at the orifice over the maximum velocity of the gas, which
is the square root of one less the pressure ratio raised to (gamma - 1)/gamma. Over this
variable the integrand is smooth up to the end, where the pressures are equal and nothing flows.
"""

from __future__ import annotations

from ..expressions import Expr, Integral, ln, sqrt, symbols
from .orifices import CHOKED, CRITICAL_RATIO, NOT_CHOKED
from .relation import Limit, Relation
from .roles import DISCHARGE, INLET, OUTLET, SUPPLY, THROUGH
from .sources import derived, textbook
from .thermodynamics import CONSTANT_HEATS, PERFECT
from .vessel_changes import (
    CHOKED_THROUGHOUT,
    COLD,
    FILLING_ADIABATIC,
    FILLING_ISOTHERMAL,
    FILLINGS,
    HOT,
    LET_DOWN_ADIABATIC,
    LET_DOWN_ISOTHERMAL,
    UNCHOKED_AT_THE_END,
    UNIFORM,
)

gamma, R, t, dm, y = symbols("gamma R t dm y")
p_1, T_1, V_1 = (s.of(INLET) for s in symbols("p_0 T_0 V"))
p_2 = symbols("p_0")[0].of(OUTLET)
A, C_d, mdot = (s.of(THROUGH) for s in symbols("A C_d mdot"))
p_back = symbols("p")[0].of(DISCHARGE)
p_s, T_s = (s.of(SUPPLY) for s in symbols("p_0 T_0"))

_STARTS_CHOKED = ((THROUGH, CHOKED),)
_NEVER_CHOKED = ((THROUGH, NOT_CHOKED),)
_ASSUMPTIONS = (PERFECT, CONSTANT_HEATS, UNIFORM, "constant discharge coefficient")
_LET_DOWN = (*_ASSUMPTIONS, "constant pressure downstream of the orifice")
_FILLING = (*_ASSUMPTIONS, "constant supply state")

_CHOKED_FACTOR = ((gamma + 1) / 2) ** ((gamma + 1) / (2 * (gamma - 1)))
_CRITICAL = sqrt((gamma - 1) / (gamma + 1))
_EXPANSION = (gamma - 1) / gamma
_HALF = (gamma - 1) / (2 * gamma)
_ISOTHERMAL = (1 - y**2) ** (-gamma / (gamma - 1))
_ADIABATIC = (1 - y**2) ** (-(gamma + 1) / (2 * (gamma - 1)))


def _velocity(low: Expr, high: Expr) -> Expr:
    """The velocity over the maximum velocity of gas that expands between two pressures."""
    return sqrt(1 - (low / high) ** _EXPANSION)


_Y_1, _Y_2 = _velocity(p_back, p_1), _velocity(p_back, p_2)
_X_1, _X_2 = _velocity(p_1, p_s), _velocity(p_2, p_s)

_FALLS = Limit((p_2 / p_1).at_most(1), "a let-down ends at a lower pressure", essential=True)
_LEAVES = Limit(
    (p_back / p_2).at_most(1), "gas flows from the higher to the lower pressure", essential=True
)
_CHOKED_FIRST = Limit(
    (p_back / p_1).at_most(CRITICAL_RATIO), "the orifice is choked at the start", essential=True
)
_UNCHOKED_FIRST = Limit(
    (p_back / p_1).at_least(CRITICAL_RATIO),
    "the orifice is not choked at the start",
    essential=True,
)
_UNCHOKED_LAST = Limit(
    (p_back / p_2).at_least(CRITICAL_RATIO), "the orifice is not choked at the end", essential=True
)
_RISES = Limit((p_1 / p_2).at_most(1), "a filling ends at a higher pressure", essential=True)
_ENTERS = Limit(
    (p_2 / p_s).at_most(1), "gas flows from the higher to the lower pressure", essential=True
)
_FILLS_CHOKED_FIRST = Limit(
    (p_1 / p_s).at_most(CRITICAL_RATIO), "the orifice is choked at the start", essential=True
)
_FILLS_UNCHOKED_FIRST = Limit(
    (p_1 / p_s).at_least(CRITICAL_RATIO),
    "the orifice is not choked at the start",
    essential=True,
)
_FILLS_UNCHOKED_LAST = Limit(
    (p_2 / p_s).at_least(CRITICAL_RATIO), "the orifice is not choked at the end", essential=True
)

LET_DOWN_TIMES = (
    Relation(
        "let_down_time_isothermal",
        "Time of a choked let-down at constant temperature",
        t.equals(
            V_1 / (C_d * A * sqrt(gamma * R * T_1))
            * _CHOKED_FACTOR
            * ln(p_1 / p_2)
        ),
        derived("Mass balance of the vessel with choked mass flow at constant temperature"),
        (LET_DOWN_ISOTHERMAL,),
        regime=CHOKED_THROUGHOUT,
        also=_STARTS_CHOKED,
        assumptions=_ASSUMPTIONS,
    ),
    Relation(
        "let_down_time_isothermal_to_unchoked",
        "Time of a let-down at constant temperature, choked and then unchoked",
        t.equals(
            V_1 / (C_d * A * sqrt(R * T_1))
            * (
                _CHOKED_FACTOR / sqrt(gamma) * ln(CRITICAL_RATIO * p_1 / p_back)
                + sqrt(2 * gamma / (gamma - 1)) * Integral(_ISOTHERMAL, y, _Y_2, _CRITICAL)
            )
        ),
        derived(
            "Mass balance of the vessel at constant temperature, with choked mass flow down to "
            "the pressure at which choking ends and isentropic flow to the back pressure below it"
        ),
        (LET_DOWN_ISOTHERMAL,),
        limits=(_CHOKED_FIRST, _UNCHOKED_LAST, _LEAVES),
        regime=UNCHOKED_AT_THE_END,
        also=_STARTS_CHOKED,
        assumptions=_LET_DOWN,
    ),
    Relation(
        "let_down_time_isothermal_unchoked",
        "Time of an unchoked let-down at constant temperature",
        t.equals(
            V_1 / (C_d * A)
            * sqrt(2 * gamma / ((gamma - 1) * R * T_1))
            * Integral(_ISOTHERMAL, y, _Y_2, _Y_1)
        ),
        derived(
            "Mass balance of the vessel at constant temperature with isentropic flow to the back "
            "pressure"
        ),
        (LET_DOWN_ISOTHERMAL,),
        limits=(_UNCHOKED_FIRST, _FALLS, _LEAVES),
        regime=UNCHOKED_AT_THE_END,
        also=_NEVER_CHOKED,
        assumptions=_LET_DOWN,
    ),
    Relation(
        "let_down_time_adiabatic",
        "Time of a choked let-down without heat exchange",
        t.equals(
            2 * V_1 / ((gamma - 1) * C_d * A * sqrt(gamma * R * T_1))
            * _CHOKED_FACTOR
            * ((p_1 / p_2) ** _HALF - 1)
        ),
        derived("Mass balance of the vessel with choked mass flow and isentropic expansion"),
        (LET_DOWN_ADIABATIC,),
        regime=CHOKED_THROUGHOUT,
        also=_STARTS_CHOKED,
        assumptions=_ASSUMPTIONS,
        cautions=COLD,
    ),
    Relation(
        "let_down_time_adiabatic_to_unchoked",
        "Time of a let-down without heat exchange, choked and then unchoked",
        t.equals(
            V_1 / (C_d * A * sqrt(gamma * R * T_1))
            * (
                2 / (gamma - 1) * _CHOKED_FACTOR
                * ((CRITICAL_RATIO * p_1 / p_back) ** _HALF - 1)
                + sqrt(2 / (gamma - 1)) * (p_1 / p_back) ** _HALF
                * Integral(_ADIABATIC, y, _Y_2, _CRITICAL)
            )
        ),
        derived(
            "Mass balance of the vessel with isentropic expansion of what remains, with choked "
            "mass flow down to the pressure at which choking ends and isentropic flow to the back "
            "pressure below it"
        ),
        (LET_DOWN_ADIABATIC,),
        limits=(_CHOKED_FIRST, _UNCHOKED_LAST, _LEAVES),
        regime=UNCHOKED_AT_THE_END,
        also=_STARTS_CHOKED,
        assumptions=_LET_DOWN,
        cautions=COLD,
    ),
    Relation(
        "let_down_time_adiabatic_unchoked",
        "Time of an unchoked let-down without heat exchange",
        t.equals(
            V_1 / (C_d * A)
            * sqrt(2 / (gamma * (gamma - 1) * R * T_1))
            * (p_1 / p_back) ** _HALF
            * Integral(_ADIABATIC, y, _Y_2, _Y_1)
        ),
        derived(
            "Mass balance of the vessel with isentropic expansion of what remains and isentropic "
            "flow to the back pressure"
        ),
        (LET_DOWN_ADIABATIC,),
        limits=(_UNCHOKED_FIRST, _FALLS, _LEAVES),
        regime=UNCHOKED_AT_THE_END,
        also=_NEVER_CHOKED,
        assumptions=_LET_DOWN,
        cautions=COLD,
    ),
)  # fmt: skip


def _choked_filling_time(name: str, title: str, process: str, heating: Expr, heat: str) -> Relation:
    """The filling that stays choked; ``heating`` is what R T is to the pressure."""
    adiabatic = process == FILLING_ADIABATIC
    return Relation(
        name,
        title,
        t.equals(
            V_1 * sqrt(R * T_s) / (C_d * A * heating)
            * _CHOKED_FACTOR / sqrt(gamma) * ((p_2 - p_1) / p_s)
        ),
        derived(f"Mass balance of the vessel {heat} with constant choked mass flow"),
        (process,),
        regime=CHOKED_THROUGHOUT,
        also=_STARTS_CHOKED,
        assumptions=(*_FILLING, *(("no heat to the walls",) if adiabatic else ())),
        cautions=HOT if adiabatic else (),
    )  # fmt: skip


def _filling_time(name: str, title: str, process: str, heating: Expr, heat: str) -> Relation:
    """The choked filling that turns unchoked; ``heating`` as above."""
    adiabatic = process == FILLING_ADIABATIC
    return Relation(
        name,
        title,
        t.equals(
            V_1 * sqrt(R * T_s) / (C_d * A * heating)
            * (
                _CHOKED_FACTOR / sqrt(gamma) * (CRITICAL_RATIO - p_1 / p_s)
                + sqrt(2 * gamma / (gamma - 1)) * (_CRITICAL - _X_2)
            )
        ),
        derived(
            f"Mass balance of the vessel {heat}, with choked mass flow up to the pressure at "
            "which choking ends and isentropic flow to the vessel's pressure above it"
        ),
        (process,),
        limits=(_FILLS_CHOKED_FIRST, _FILLS_UNCHOKED_LAST, _ENTERS),
        regime=UNCHOKED_AT_THE_END,
        also=_STARTS_CHOKED,
        assumptions=(*_FILLING, *(("no heat to the walls",) if adiabatic else ())),
        cautions=HOT if adiabatic else (),
    )  # fmt: skip


def _unchoked_filling_time(
    name: str, title: str, process: str, heating: Expr, heat: str
) -> Relation:
    adiabatic = process == FILLING_ADIABATIC
    return Relation(
        name,
        title,
        t.equals(
            V_1 / (C_d * A * heating)
            * sqrt(2 * gamma * R * T_s / (gamma - 1))
            * (_X_1 - _X_2)
        ),
        derived(f"Mass balance of the vessel {heat} with isentropic flow to its pressure"),
        (process,),
        limits=(_FILLS_UNCHOKED_FIRST, _RISES, _ENTERS),
        regime=UNCHOKED_AT_THE_END,
        also=_NEVER_CHOKED,
        assumptions=(*_FILLING, *(("no heat to the walls",) if adiabatic else ())),
        cautions=HOT if adiabatic else (),
    )  # fmt: skip


_AT_CONSTANT_TEMPERATURE = "at constant temperature"
_WITHOUT_HEAT = "and its energy balance without heat exchange"

FILLING_TIMES = (
    Relation(
        "filling_steady_mass",
        "Mass filled at constant mass flow",
        dm.equals(mdot * t),
        textbook("Conservation of mass with constant choked mass flow"),
        FILLINGS,
        regime=CHOKED_THROUGHOUT,
        also=_STARTS_CHOKED,
        assumptions=("constant supply state",),
    ),
    _choked_filling_time(
        "filling_time_isothermal",
        "Time of a choked filling at constant temperature",
        FILLING_ISOTHERMAL,
        R * T_1,
        _AT_CONSTANT_TEMPERATURE,
    ),
    _filling_time(
        "filling_time_isothermal_to_unchoked",
        "Time of a filling at constant temperature, choked and then unchoked",
        FILLING_ISOTHERMAL,
        R * T_1,
        _AT_CONSTANT_TEMPERATURE,
    ),
    _unchoked_filling_time(
        "filling_time_isothermal_unchoked",
        "Time of an unchoked filling at constant temperature",
        FILLING_ISOTHERMAL,
        R * T_1,
        _AT_CONSTANT_TEMPERATURE,
    ),
    _choked_filling_time(
        "filling_time_adiabatic",
        "Time of a choked filling without heat exchange",
        FILLING_ADIABATIC,
        gamma * R * T_s,
        _WITHOUT_HEAT,
    ),
    _filling_time(
        "filling_time_adiabatic_to_unchoked",
        "Time of a filling without heat exchange, choked and then unchoked",
        FILLING_ADIABATIC,
        gamma * R * T_s,
        _WITHOUT_HEAT,
    ),
    _unchoked_filling_time(
        "filling_time_adiabatic_unchoked",
        "Time of an unchoked filling without heat exchange",
        FILLING_ADIABATIC,
        gamma * R * T_s,
        _WITHOUT_HEAT,
    ),
)
