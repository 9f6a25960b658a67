"""What the sheet prints of the integrals of a step."""

from __future__ import annotations

from dataclasses import dataclass

from markupsafe import Markup

from ...expressions import Symbol, dimension_of
from ...record import IntegralRecord, StepRecord
from ..typesetting import significant
from .figures import coherent_unit, equation_html, number_html, value_html

_SHARE = 0.5


@dataclass(frozen=True)
class IntegralLine:
    """One integral with its value and how its sum stands to it."""

    item: IntegralRecord
    integral: Markup
    low: Markup
    high: Markup
    value: Markup
    difference: Markup


def integral_lines(step: StepRecord, width: float) -> tuple[IntegralLine, ...]:
    """Return the integrals of a step as printed.

    Args:
        step: the step.
        width: width for equations, in points.
    """
    return tuple(_line(item, width) for item in step.integrals)


def running_variables(step: StepRecord) -> tuple[Symbol, ...]:
    """Return the variable of each integral once."""
    return tuple(dict.fromkeys(item.integral.variable for item in step.integrals))


def _line(item: IntegralRecord, width: float) -> IntegralLine:
    integral = item.integral
    unit = integral.variable.definition.unit
    return IntegralLine(
        item=item,
        integral=equation_html(integral, width * _SHARE),
        low=value_html(item.low, unit),
        high=value_html(item.high, unit),
        value=value_html(item.total, coherent_unit(dimension_of(integral))),
        difference=number_html(significant(item.difference, 2)),
    )
