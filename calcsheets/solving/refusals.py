"""Answers that are no number, with what the reader needs to change the question."""

from __future__ import annotations

import math
from collections.abc import Callable, Iterator, Mapping
from fractions import Fraction

from flint import arb

from ..errors import NoRoot, OutsideLimit, SeveralRoots, UndecidedRoots
from ..expressions import Condition, Expr, Symbol, symbols_in
from ..quantities import Quantity
from ..relations import Limit, Relation
from .balls import Ball, OutsideDomainError, evaluate, exact_ball
from .question import Question, bounds_of, compare

_SAMPLES = 64
_NARROWINGS = 80


def no_root(question: Question) -> NoRoot:
    """Return that nothing in the bounds satisfies a relation, and what it reaches there."""
    low, high = bounds_of(question)
    published = question.relation.published
    inner, asked = published.left, published.right
    if question.unknown in set(symbols_in(asked)) and question.unknown not in set(
        symbols_in(inner)
    ):
        inner, asked = asked, inner
    on_both = question.unknown in set(symbols_in(asked))
    reached = inner - asked if on_both else inner
    return NoRoot(
        relation=question.relation.title,
        unknown=question.key,
        bounds=_bounds_text(question, low, high),
        reached=_reached(question, reached, low, high) if question.explain else "",
        asked="0" if on_both else _asked(question, asked),
        limits=tuple(_limits_missed(question)),
    )


def outside_limit(question: Question) -> OutsideLimit | None:
    """Return the limit that the known values alone miss, if one that means something is."""
    for limit in question.relation.limits:
        known = set(limit.condition.symbols) <= set(question.values)
        if limit.essential and known and compare(limit.condition, question.values) is False:
            return limit_missed(question.relation, question.key, limit, question.values)
    return None


def several_roots(question: Question, roots: tuple[Ball, ...]) -> SeveralRoots:
    """Return the question which of several roots is meant."""
    unknown = question.unknown.definition
    return SeveralRoots(
        relation=question.relation.title,
        unknown=question.key,
        roots=tuple(_text(root) for root in roots),
        branches=tuple(branch.name for branch in question.relation.branches),
        place=question.place,
        shown=tuple(quantity_text(unknown, root) for root in roots)
        if unknown.unit == "rad"
        else (),
    )


def undecided(question: Question) -> UndecidedRoots:
    """Return that the search did not come to an end."""
    low, high = bounds_of(question)
    bounds = _bounds_text(question, low, high)
    return UndecidedRoots(question.relation.title, question.key, bounds)


def limit_missed(
    relation: Relation, key: str, limit: Limit, values: Mapping[Symbol, Ball]
) -> OutsideLimit:
    """Return that an essential limit is not met, with the values of its sides."""
    return OutsideLimit(relation.title, key, limit.reason, _sides(limit.condition, values))


_ALLOWED = {"<=": "at most", "<": "less than", ">=": "at least", ">": "more than"}


def _sides(condition: Condition, values: Mapping[Symbol, Ball]) -> str:
    """What a quantity is and what it may be; nothing where no quantity alone is compared."""
    if not isinstance(condition.left, Symbol):
        return ""
    compared = condition.left.definition
    is_now = quantity_text(compared, evaluate(condition.left, values))
    may_be = quantity_text(compared, evaluate(condition.right, values))
    return f"{compared.title} is {is_now}, allowed is {_ALLOWED[condition.comparison]} {may_be}"


def _limits_missed(question: Question) -> Iterator[str]:
    """Reasons of the limits that the known values alone already miss."""
    for limit in question.relation.limits:
        known = set(limit.condition.symbols) <= set(question.values)
        if known and compare(limit.condition, question.values) is False:
            sides = _sides(limit.condition, question.values)
            yield f"{limit.reason} ({sides})" if sides else limit.reason


def _asked(question: Question, expr: Expr) -> str:
    """The value of the known side; other inputs may leave it without one."""
    try:
        return _text(evaluate(expr, question.values))
    except OutsideDomainError:
        return "no value at all"


def _bounds_text(question: Question, low: Fraction, high: Fraction) -> str:
    of = question.unknown.definition
    if of.unit == "rad":
        return f"{quantity_text(of, exact_ball(low))} to {quantity_text(of, exact_ball(high))}"
    return f"{_text(exact_ball(low))} to {_text(exact_ball(high))}"


def quantity_text(quantity: Quantity, value: Ball) -> str:
    """Return a value with its coherent unit, angles in degrees."""
    if quantity.unit == "rad":
        return f"{_text(value * 180 / arb.pi())}°"
    return _text(value) if quantity.unit == "1" else f"{_text(value)} {quantity.unit}"


def _reached(question: Question, expr: Expr, low: Fraction, high: Fraction) -> str:
    """The range of one side over the bounds: samples in every decade, their extremes narrowed."""

    def at(x: Fraction) -> Ball | None:
        try:
            value = evaluate(expr, {**question.values, question.unknown: exact_ball(x)})
        except OutsideDomainError:
            return None
        return value if value.is_finite() else None

    samples = _samples(low, high)
    found = {x: value for x in samples if (value := at(x)) is not None}
    if not found:
        return "no value at all"
    lowest = min(found, key=lambda x: float(found[x].mid()))
    highest = max(found, key=lambda x: float(found[x].mid()))
    ends = (_extreme(at, samples, lowest, -1), _extreme(at, samples, highest, 1))
    return " to ".join(_text(end) for end in ends)


def _extreme(
    at: Callable[[Fraction], Ball | None], samples: list[Fraction], best: Fraction, sign: int
) -> Ball:
    """The largest (smallest for sign -1) value between the neighbours of the best sample."""
    index = samples.index(best)
    a, b = samples[max(index - 1, 0)], samples[min(index + 1, len(samples) - 1)]

    def height(x: Fraction) -> float:
        value = at(x)
        return -math.inf if value is None else sign * float(value.mid())

    for _ in range(_NARROWINGS):
        third = (b - a) / 3
        left, right = Fraction(float(a + third)), Fraction(float(b - third))
        a, b = (left, b) if height(left) < height(right) else (a, right)
    return at(max((a, best, b), key=height))


def _samples(low: Fraction, high: Fraction) -> list[Fraction]:
    if low < 0:
        return [low + (high - low) * i / _SAMPLES for i in range(_SAMPLES + 1)]
    start = low if low > 0 else high / 10**12
    ratio = (float(high) / float(start)) ** (1 / _SAMPLES)
    inner = [start * Fraction(ratio**i) for i in range(1, _SAMPLES)]
    return [start, *inner, high]


def _text(ball: Ball) -> str:
    text: str = arb(ball.mid()).str(7, radius=False)
    return text.rstrip("0").rstrip(".") if "." in text and "e" not in text else text
