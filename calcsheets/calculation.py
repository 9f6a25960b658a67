"""The whole way from a brief to its record."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import replace

from .brief import Brief, Given
from .errors import BriefError, UnitError
from .planning import state_problem
from .quantities import (
    GAUGE_OF,
    REFERENCE_STATES,
    Variable,
    catalogue,
    quantity_given,
    read_measured,
)
from .record import Record
from .record.build import build_record
from .relations import load_library
from .solving import solve_problem


def calculate(brief: Brief, inputs: Mapping[str, str] | None = None) -> Record:
    """Plan and solve a brief.

    Args:
        brief: the brief.
        inputs: other values for inputs of the brief, such as
            ``{"p_0@receiver": "12.4 bar(g)"}``.

    Returns:
        The record.

    Raises:
        BriefError: if a changed input is not one of the brief, or is not understood.
        PlanningError: if the wanted results cannot be reached, or inputs contradict.
        SolvingError: if a step has no root, or several and no stated branch.
    """
    library = load_library()
    changed = with_inputs(brief, inputs or {})
    outcome = solve_problem(state_problem(changed, library))
    before = {given.variable: given.measured for given in brief.given}
    keys = tuple(
        str(given.variable)
        for given in changed.given
        if before.get(given.variable) != given.measured
    )
    return build_record(outcome, library.digest, keys)


def with_inputs(brief: Brief, inputs: Mapping[str, str]) -> Brief:
    """Return a brief with other values for some of its inputs.

    Args:
        brief: the brief.
        inputs: new texts by key; a key names the quantity, whatever its datum or volume state.

    Raises:
        BriefError: if the brief gives no such input, or the text does not fit it.
    """
    for key, text in inputs.items():
        brief = _with_input(brief, key, text)
    return brief


def _with_input(brief: Brief, key: str, text: str) -> Brief:
    symbol, _, place = key.partition("@")
    quantity = catalogue().get(symbol)
    if quantity is None:
        raise BriefError(brief.file, 0, key, "there is no such quantity", "Check the key")
    try:
        measured = read_measured(text)
        stated = Variable(quantity_given(quantity, measured).symbol, place)
    except UnitError as problem:
        raise BriefError(
            brief.file, 0, key, f'"{text}": {problem.reason}', problem.remedy
        ) from problem
    old = _given(brief, Variable(symbol, place)) or _given(brief, stated)
    if old is None:
        names = ", ".join(str(given.variable) for given in brief.given)
        raise BriefError(brief.file, 0, key, "the brief gives no such input", f"Inputs are {names}")
    new = replace(old, variable=stated, measured=measured)
    given = tuple(new if item is old else item for item in brief.given)
    return replace(brief, given=given)


def _given(brief: Brief, variable: Variable) -> Given | None:
    """The input of a variable, or of the quantity in another datum at the same place."""
    related = {variable, *(Variable(s, variable.place) for s in _related(variable.symbol))}
    return next((given for given in brief.given if given.variable in related), None)


def _related(symbol: str) -> tuple[str, ...]:
    """Other quantities under which the same input may have been stated."""
    gauges = {**GAUGE_OF, **{gauge: absolute for absolute, gauge in GAUGE_OF.items()}}
    flows = ("mdot", *(f"q_{state.name}" for state in REFERENCE_STATES))
    masses = ("m", *(f"V_{state.name}" for state in REFERENCE_STATES))
    for family in (flows, masses):
        if symbol in family:
            return family
    return (gauges[symbol],) if symbol in gauges else ()
