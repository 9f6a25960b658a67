"""What double precision leaves of each value: a workbook computes the same steps in doubles.

The steps are evaluated again in balls of 53 bits, whose radii grow with every rounding and
with the condition of every step.
"""

from __future__ import annotations

from collections.abc import Mapping

from flint import arb, ctx

from ..expressions import derivative
from ..planning import Instance
from ..quantities import Variable
from .balls import Ball, OutsideDomainError, evaluate, exact_ball
from .run import Outcome, StepOutcome

_DOUBLE_BITS = 53
_NOTHING_LEFT = 1e280
_ROUNDINGS_OF_A_FUNCTION = 4  # engines round powers and logarithms less well than one operation


def double_errors(outcome: Outcome) -> Mapping[Variable, float]:
    """Return a bound on the absolute error of each step in double arithmetic.

    Args:
        outcome: a solved problem.

    Returns:
        The bound by variable, in coherent SI; 1e280 where double arithmetic leaves nothing.
    """
    balls: dict[Variable, Ball] = {}
    errors: dict[Variable, float] = {}
    with ctx.workprec(_DOUBLE_BITS):
        for given in outcome.problem.brief.given:
            unit = given.measured.unit
            balls[given.variable] = exact_ball(given.measured.rational, unit.pi_power)
        for step in outcome.steps:
            if step.solution is None or not isinstance(step.edge.source, Instance):
                continue
            ball = _in_doubles(step, step.edge.source, balls)
            balls[step.edge.target] = ball
            radius = float(ball.rad()) if ball.is_finite() else _NOTHING_LEFT
            errors[step.edge.target] = min(_ROUNDINGS_OF_A_FUNCTION * radius, _NOTHING_LEFT)
    return errors


def _in_doubles(step: StepOutcome, source: Instance, balls: Mapping[Variable, Ball]) -> Ball:
    solution, unknown = step.solution, step.edge.unknown
    if solution is None or unknown is None:
        raise ValueError(f"step {step.edge.target} was not solved")
    values = {symbol: balls[v] for symbol, v in source.binding.items() if v in balls}
    try:
        if solution.solved is not None:
            return evaluate(solution.solved, values)
        values[unknown] = arb(solution.value.mid())
        difference = source.relation.published.left - source.relation.published.right
        rate = derivative(difference, unknown)
        noise, slope = evaluate(difference, values), evaluate(rate, values)
        if slope.contains(0):
            return _near_touching(
                values[unknown], noise, slope, evaluate(derivative(rate, unknown), values)
            )
        return values[unknown] - noise / slope
    except OutsideDomainError:
        return arb("nan")


def _near_touching(root: Ball, noise: Ball, slope: Ball, curvature: Ball) -> Ball:
    """Where a parabola that only touches zero may still be as small as the noise."""
    rise, low, bend = abs(slope).upper(), abs(noise).upper(), abs(curvature).lower()
    if not bend > 0:
        return arb("nan")
    return root + arb(0, (rise + (rise * rise + 2 * bend * low).sqrt()) / bend)
