"""Definite integrals in ball arithmetic, with a rigorous enclosure."""

from __future__ import annotations

from collections.abc import Callable
from typing import Any

from flint import acb, arb, ctx

from .complex_balls import ComplexFunction

Ball = Any  # flint.arb has no type information
_MOST_EVALUATIONS = 20_000
_LEAST_BITS = 8
_SHARE = arb(2) ** -10


def integral_ball(
    complex_function: ComplexFunction, function: Callable[[Ball], Ball], low: Ball, high: Ball
) -> Ball | None:
    """Return the ball of an integral between limits that are balls themselves.

    Between the middles of both limits the integrator bounds its own error on ellipses in the
    complex plane; what a limit may lie off its middle is bounded by the integrand there.

    Args:
        complex_function: the integrand as a function of a complex ball.
        function: the integrand as a function of a real ball.
        low: lower limit.
        high: upper limit.

    Returns:
        The ball, not finite where the integrator does not converge; ``None`` if the integrand
        has no real value on a part of the way.
    """
    start, end = arb(low.mid()), arb(high.mid())
    value = acb.integral(
        complex_function,
        acb(start),
        acb(end),
        rel_tol=_tolerance(abs(end - start), low.rad() + high.rad(), function((start + end) / 2)),
        eval_limit=_MOST_EVALUATIONS,
    )
    if not value.imag.contains(0):
        return None
    total = value.real
    if not high.is_exact():
        total = total + function(high) * (high - end)
    if not low.is_exact():
        total = total - function(low) * (low - start)
    return total


def _tolerance(way: Ball, uncertain: Ball, integrand: Ball) -> Ball:
    """What the integrator aims at: no finer than uncertain limits or a wide integrand leave."""
    bits = integrand.rel_accuracy_bits() if integrand.is_finite() else ctx.prec
    finest = arb(2) ** -max(min(bits, ctx.prec), _LEAST_BITS)
    coarse = arb(uncertain) * _SHARE
    return arb((coarse / way).mid()) if coarse > finest * way else finest
