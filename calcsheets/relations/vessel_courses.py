"""The course of a let-down and of a filling: time, temperature, mass flow and mass by pressure."""

from __future__ import annotations

from collections.abc import Mapping
from types import MappingProxyType

from ..expressions import Condition, Expr, Symbol, substitute, symbols
from . import orifices
from .course import INTERVALS, Case, Course, CourseColumn, Words
from .orifices import CHOKED, CRITICAL_RATIO, NOT_CHOKED
from .relation import Relation
from .roles import DISCHARGE, INLET, NOW, OUTLET, SUPPLY, THROUGH
from .sources import derived
from .vessel_changes import (
    FILLING_ADIABATIC,
    FILLING_ISOTHERMAL,
    LET_DOWN_ADIABATIC,
    LET_DOWN_ISOTHERMAL,
)
from .vessel_times import FILLING_TIMES, LET_DOWN_TIMES

gamma, R, row = symbols("gamma R row")
_WAY = row / INTERVALS
p_1, T_1, V_1 = (q.of(INLET) for q in symbols("p_0 T_0 V"))
p_2 = symbols("p_0")[0].of(OUTLET)
A, C_d = (q.of(THROUGH) for q in symbols("A C_d"))
p_back = symbols("p")[0].of(DISCHARGE)
p_s, T_s = (q.of(SUPPLY) for q in symbols("p_0 T_0"))
t, p, T, m, mdot = (q.of(NOW) for q in symbols("t p_0 T_0 m mdot"))

_RELATIONS: Mapping[str, Relation] = MappingProxyType(
    {r.name: r for r in (*LET_DOWN_TIMES, *FILLING_TIMES, *orifices.CHAPTER.relations)}
)
_SOURCE = derived("The relations of let-down and filling, with the state of each row as their end")


def _form(name: str, values: Mapping[Symbol, Expr]) -> Expr:
    return substitute(_RELATIONS[name].published.right, values)


def _times(name: str, choked: Condition, starts_choked: Condition) -> CourseColumn:
    """The time to each row by the relation that holds there: the row is the end of a change."""
    here: dict[Symbol, Expr] = {p_2: p}
    return CourseColumn(
        t,
        (
            Case(_form(name, here), choked),
            Case(_form(f"{name}_to_unchoked", here), starts_choked),
            Case(_form(f"{name}_unchoked", here)),
        ),
    )


def _flow(before: Expr, temperature: Expr, behind: Expr, choked: Condition) -> CourseColumn:
    """The mass flow of the orifice at each row."""
    place: dict[Symbol, Expr] = {
        orifices.p_0: before,
        orifices.T_0: temperature,
        orifices.p: behind,
        orifices.A: A,
        orifices.C_d: C_d,
    }
    return CourseColumn(
        mdot,
        (
            Case(_form("choked_mass_flow", place), choked),
            Case(_form("unchoked_mass_flow", place)),
        ),
    )


_MASS = CourseColumn(m, (Case(p * V_1 / (R * T)),))


def _let_down(name: str, title: str, process: str, temperature: Expr) -> Course:
    choked = (p_back / p).at_most(CRITICAL_RATIO)
    return Course(
        f"course_of_{name}",
        title,
        (process,),
        row,
        p,
        p_1,
        p_2,
        p_1 * (p_2 / p_1) ** _WAY,
        (
            _times(f"let_down_time_{name}", choked, (p_back / p_1).at_most(CRITICAL_RATIO)),
            CourseColumn(T, (Case(temperature),)),
            _flow(p, T, p_back, choked),
            _MASS,
        ),
        Words(choked, CHOKED, NOT_CHOKED),
        _SOURCE,
    )


def _filling(name: str, title: str, process: str, state: tuple[CourseColumn, ...]) -> Course:
    choked = (p / p_s).at_most(CRITICAL_RATIO)
    return Course(
        f"course_of_filling_{name}",
        title,
        (process,),
        row,
        p,
        p_1,
        p_2,
        p_1 + (p_2 - p_1) * _WAY,
        (
            _times(f"filling_time_{name}", choked, (p_1 / p_s).at_most(CRITICAL_RATIO)),
            *state,
            _flow(p_s, T_s, p, choked),
        ),
        Words(choked, CHOKED, NOT_CHOKED),
        _SOURCE,
    )


COURSES = (
    _let_down(
        "isothermal", "Course of the let-down at constant temperature", LET_DOWN_ISOTHERMAL, T_1
    ),
    _let_down(
        "adiabatic",
        "Course of the let-down without heat exchange",
        LET_DOWN_ADIABATIC,
        T_1 * (p / p_1) ** ((gamma - 1) / gamma),
    ),
    _filling(
        "isothermal",
        "Course of the filling at constant temperature",
        FILLING_ISOTHERMAL,
        (CourseColumn(T, (Case(T_1),)), _MASS),
    ),
    _filling(
        "adiabatic",
        "Course of the filling without heat exchange",
        FILLING_ADIABATIC,
        (
            CourseColumn(m, (Case(V_1 * p_1 / (R * T_1) + V_1 * (p - p_1) / (gamma * R * T_s)),)),
            CourseColumn(T, (Case(p * V_1 / (m * R)),)),
        ),
    ),
)
