"""The record of integrals: what is proved of each, and the sum that a workbook makes of it."""

from __future__ import annotations

from collections.abc import Mapping
from fractions import Fraction

from ..expressions import Symbol
from ..solving import Ball, Table, TableErrors, decimal_bounds, evaluate, exact_ball
from .digits import certified_digits
from .step_model import IntegralRecord, NodeRecord, SumRecord


def integral_record(
    table: Table, values: Mapping[Symbol, Ball], errors: TableErrors
) -> IntegralRecord:
    """Return the record of an integral.

    Args:
        table: the integral as a sum.
        values: a ball in coherent SI for each of its symbols.
        errors: what double arithmetic makes of the sum.
    """
    exact = evaluate(table.integral, values)
    lower, upper = decimal_bounds(exact)
    nodes = zip(table.places, table.weights, table.at, table.heights, strict=True)
    return IntegralRecord(
        integral=table.integral,
        low=table.low,
        high=table.high,
        nodes=tuple(NodeRecord(*node) for node in nodes),
        total=table.total,
        lower=lower,
        upper=upper,
        certified_digits=certified_digits(lower, upper),
        difference=float(abs(exact - exact_ball(Fraction(table.total))).upper()),
        limit_error=errors.limits,
        height_error=errors.heights,
        total_error=errors.total,
    )


def sum_record(table: Table) -> SumRecord:
    """Return the record of a sum at another value of the unknown."""
    return SumRecord(table.low, table.high, table.heights, table.total)
