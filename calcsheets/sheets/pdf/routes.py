"""Other routes as printed."""

from __future__ import annotations

from dataclasses import dataclass

from markupsafe import Markup

from ...expressions import Equation
from ...record import Record, ResultRecord, RouteRecord, RouteStep
from ..typesetting import significant
from .figures import equation_html, number_html, value_html

_FORM_SHARE = 0.5


@dataclass(frozen=True)
class RouteStepLine:
    """One step of another route."""

    relation: str
    place: str
    solved: Markup
    value: Markup


@dataclass(frozen=True)
class RouteLine:
    """Another route to a result, or why there is none."""

    result: ResultRecord
    steps: tuple[RouteStepLine, ...]
    difference: Markup
    agrees: bool
    shared: str
    reason: str


def route_lines(record: Record, width: float) -> tuple[RouteLine, ...]:
    """Return the other routes of a record.

    Args:
        record: the record.
        width: width for equations, in points.
    """
    return tuple(_line(record, route, width * _FORM_SHARE) for route in record.routes)


def _line(record: Record, route: RouteRecord, width: float) -> RouteLine:
    return RouteLine(
        result=record.results[route.result - 1],
        steps=tuple(_step(record, step, width) for step in route.steps),
        difference=number_html(significant(route.difference or 0.0, 2)),
        agrees=route.agrees is not False,
        shared="; ".join(route.shared) or "nothing",
        reason=route.reason,
    )


def _step(record: Record, step: RouteStep, width: float) -> RouteStepLine:
    return RouteStepLine(
        relation=record.relation(step.relation).title,
        place=step.place,
        solved=equation_html(Equation(step.symbol, step.solved), width),
        value=value_html(step.value, step.unit),
    )
