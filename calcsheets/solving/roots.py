"""All roots inside the bounds of a quantity, isolated so that none can be missed.

The bounds are cut into cells. Ball arithmetic either proves that a cell holds no root, or
that the function is monotone in it, or the cell is halved. What stays undecided down to the
smallest width is kept as a touching root, never dropped.
"""

from __future__ import annotations

from collections.abc import Callable, Iterator
from dataclasses import dataclass
from fractions import Fraction

from flint import arb, ctx

from .balls import Ball, OutsideDomainError, exact_ball
from .taylor import TaylorForm

_SMALLEST = Fraction(1, 10**12)
_MOST_CELLS = 20_000
_SEARCH_BITS = 128  # enough to tell a root from none; its value is narrowed with all bits
_TINY = Fraction(1, 10**15)
_NARROW = Fraction(1, 24)
_BISECTIONS = 12
_NEWTON_STEPS = 24

BallFunction = Callable[[Ball], Ball]


@dataclass(frozen=True)
class RootFound:
    """One root.

    Attributes:
        value: its ball.
        touching: whether the function only touches zero there, as far as could be decided.
    """

    value: Ball
    touching: bool


class TooManyCellsError(ArithmeticError):
    """The search was given up; nothing is known about the roots."""


def isolate_roots(
    function: BallFunction,
    slope: BallFunction,
    low: Fraction,
    high: Fraction,
    form: Callable[[Ball], TaylorForm | None] = lambda cell: None,
) -> tuple[RootFound, ...]:
    """Return every root between two bounds, in rising order.

    Args:
        function: continuous function of a ball.
        slope: its derivative.
        low: lower bound; zero itself is left out.
        high: upper bound.
        form: its Taylor form over a cell; ``None`` where it has none.

    Raises:
        TooManyCellsError: if the search does not end within its limit.
    """

    with ctx.workprec(min(_SEARCH_BITS, ctx.prec)):
        search = _search(function, slope, low, high, form)

    def slope_over(cell: Ball) -> Ball:
        taylor = form(cell)
        return slope(cell) if taylor is None else taylor.slope

    found = [RootFound(_refine(function, slope_over, a, b), False) for a, b in search.crossings]
    touching = [RootFound(_interval(a, b), True) for a, b in _merged(search.undecided)]
    return tuple(sorted(_distinct(found, touching), key=lambda root: float(root.value.mid())))


@dataclass(frozen=True)
class _Search:
    """Cells with one root each, and cells about which nothing could be decided."""

    crossings: list[tuple[Fraction, Fraction]]
    undecided: list[tuple[Fraction, Fraction]]


def _search(
    function: BallFunction,
    slope: BallFunction,
    low: Fraction,
    high: Fraction,
    form: Callable[[Ball], TaylorForm | None],
) -> _Search:
    """Halve cells until each is excluded, holds one root, or is too small to tell."""
    search = _Search([], [])
    cells = list(reversed(list(_first_cells(low, high))))
    visited = 0
    while cells:
        visited += 1
        if visited > _MOST_CELLS:
            raise TooManyCellsError
        a, b = cells.pop()
        ball = _interval(a, b)
        value = _defined(function, ball)
        if value is None or (value.is_finite() and not value.contains(0)):
            continue
        taylor = form(ball)
        if taylor is not None and not taylor.value.contains(0):
            continue
        if taylor is None and b - a > _NARROW * max(abs(a), abs(b)):
            middle = (a + b) / 2  # a slope over a wide cell costs much and says nothing
            cells += [(middle, b), (a, middle)]
            continue
        rate = _rate(slope, ball) if taylor is None else taylor.slope
        if taylor is None and rate.is_finite() and _excluded(function, rate, ball):
            continue
        if rate.is_finite() and not rate.contains(0):
            crossing = _crossing(function, a, b)
            if crossing is not None:
                if crossing:
                    search.crossings.append((a, b))
                continue
        if b - a <= _SMALLEST * max(abs(a), abs(b), _TINY):
            # Not finite down to the smallest width is a pole or the edge of the domain.
            search.undecided.extend([(a, b)] if value.is_finite() else [])
            continue
        middle = (a + b) / 2
        cells += [(middle, b), (a, middle)]
    return search


def _first_cells(low: Fraction, high: Fraction) -> Iterator[tuple[Fraction, Fraction]]:
    """Cells that double in width away from zero, so that every decade is searched alike."""
    if high <= 0:
        yield from ((-b, -a) for a, b in reversed(list(_first_cells(-high, -low))))
        return
    if low < 0:
        near = min(-low, high) * _TINY
        yield from ((-b, -a) for a, b in reversed(list(_first_cells(near, -low))))
        yield -near, near
        low = near
    edge = low if low > 0 else high * _TINY
    while edge * 2 < high:
        yield edge, edge * 2
        edge *= 2
    yield edge, high


def _defined(function: BallFunction, ball: Ball) -> Ball | None:
    """The function's ball, or ``None`` where the function is defined nowhere in the cell."""
    try:
        return function(ball)
    except OutsideDomainError:
        return None


def _rate(slope: BallFunction, ball: Ball) -> Ball:
    """The slope's ball; no number where its own form is defined nowhere in the cell."""
    value = _defined(slope, ball)
    return arb("nan") if value is None else value


def _excluded(function: BallFunction, rate: Ball, ball: Ball) -> bool:
    """Whether the mean-value form, which narrows faster than its cell, proves no root there."""
    centre = arb(ball.mid())
    at_centre = _defined(function, centre)
    if at_centre is None:
        return False
    value = at_centre + rate * (ball - centre)
    return bool(value.is_finite() and not value.contains(0))


def _interval(a: Fraction, b: Fraction) -> Ball:
    return exact_ball(a).union(exact_ball(b))


def _crossing(function: BallFunction, a: Fraction, b: Fraction) -> bool | None:
    """Whether a monotone function changes sign in a cell; ``None`` if an end is undecided."""
    at_a, at_b = _defined(function, exact_ball(a)), _defined(function, exact_ball(b))
    if at_a is None or at_b is None:
        return None
    if at_a.contains(0) or at_b.contains(0):
        return True if _end_is_root(at_a, at_b) else None
    return bool((at_a > 0) != (at_b > 0))


def _end_is_root(at_a: Ball, at_b: Ball) -> bool:
    """A monotone function whose value at one end is zero has its only root there."""
    return bool(at_a.contains(0) != at_b.contains(0))


def _refine(function: BallFunction, slope: BallFunction, a: Fraction, b: Fraction) -> Ball:
    """Narrow the only root of a monotone cell by bisection, then by interval Newton steps."""
    rising = function(exact_ball(b)) > function(exact_ball(a))
    for _ in range(_BISECTIONS):
        middle = (a + b) / 2
        value = function(exact_ball(middle))
        if value.contains(0):
            break
        if (value > 0) == rising:
            b = middle
        else:
            a = middle
    ball = _interval(a, b)
    for _ in range(_NEWTON_STEPS):
        centre = arb(ball.mid())
        step = centre - function(centre) / slope(ball)
        if not step.is_finite() or not step.overlaps(ball):
            break
        narrowed = step.intersection(ball)
        if narrowed.rad() >= ball.rad() * arb(0.75):
            ball = narrowed
            break
        ball = narrowed
    return ball


def _merged(cells: list[tuple[Fraction, Fraction]]) -> Iterator[tuple[Fraction, Fraction]]:
    """Undecided cells that touch are one root."""
    start: Fraction | None = None
    end = Fraction(0)
    for a, b in sorted(cells):
        if start is not None and a > end + (end - start) + _SMALLEST * abs(end):
            yield start, end
            start = None
        start = a if start is None else start
        end = b
    if start is not None:
        yield start, end


def _distinct(found: list[RootFound], touching: list[RootFound]) -> list[RootFound]:
    """Drop a root that was found from both sides of a cell boundary."""
    kept: list[RootFound] = list(touching)
    for root in found:
        if not any(root.value.overlaps(other.value) for other in kept):
            kept.append(root)
    return kept
