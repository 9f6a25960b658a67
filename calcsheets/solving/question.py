"""What one step asks, and how a value of its unknown is held against that."""

from __future__ import annotations

import math
from collections.abc import Mapping
from dataclasses import dataclass
from fractions import Fraction

from flint import arb

from ..expressions import (
    Condition,
    Expr,
    Function,
    Negative,
    Number,
    Product,
    Quotient,
    Sum,
    Symbol,
)
from ..relations import EQUAL_WITHIN, Limit, Relation
from .balls import Ball, evaluate


@dataclass(frozen=True)
class Question:
    """What one step asks of the solver.

    Attributes:
        relation: the relation.
        unknown: the symbol to solve for.
        values: a ball for every other symbol.
        branch: stated branch, empty for none.
        key: key of the unknown in the brief, for messages.
        place: where a branch would be stated, for messages.
        limits: what a value must meet besides the limits of the relation: its regime test, and
            what the process asks of the place.
        choice: which of several roots that nothing tells apart is taken; ``None`` to ask.
        explain: whether somebody will read why there is no value; that takes a search of its own.
    """

    relation: Relation
    unknown: Symbol
    values: Mapping[Symbol, Ball]
    branch: str
    key: str
    place: str
    limits: tuple[Limit, ...] = ()
    choice: int | None = None
    explain: bool = True


def bounds_of(question: Question) -> tuple[Fraction, Fraction]:
    """Return the interval in which a value is accepted: physical bounds, limits, branch."""
    low, high = question.unknown.definition.low, question.unknown.definition.high
    branches = [b.condition for b in question.relation.branches if b.name == question.branch]
    limits = (limit.condition for limit in (*question.limits, *question.relation.limits))
    for condition in (*limits, *branches):
        narrowed = _narrowed(condition, question.unknown, low, high)
        low, high = narrowed if narrowed[0] < narrowed[1] else (low, high)
    return low, high


def residual_of(relation: Relation, values: Mapping[Symbol, Ball]) -> Ball:
    """Return left minus right side of the published form."""
    return evaluate(relation.published.left, values) - evaluate(relation.published.right, values)


def size_of(relation: Relation, values: Mapping[Symbol, Ball]) -> Ball:
    """Return the size of what is compared.

    Terms that are added count each, wherever they stand, and a logarithm counts as one at
    least: sides that cancel to zero still have a size.
    """
    sides = (relation.published.left, relation.published.right)
    return sum((_size(side, values) for side in sides), arb(0))


def _size(expr: Expr, values: Mapping[Symbol, Ball]) -> Ball:
    match expr:
        case Sum(terms):
            return sum((_size(term, values) for term in terms), arb(0))
        case Negative(operand):
            return _size(operand, values)
        case Product(factors):
            return math.prod((_size(factor, values) for factor in factors), start=arb(1))
        case Quotient(numerator, denominator):
            return _size(numerator, values) / abs(evaluate(denominator, values))
        case Function("ln" | "lg", _):
            return 1 + abs(evaluate(expr, values))
        case _:
            return abs(evaluate(expr, values))


def may_hold(condition: Condition, question: Question, value: Ball) -> bool:
    """Whether a condition is not proved wrong at a value of the unknown."""
    values = {**question.values, question.unknown: value}
    if not set(condition.symbols) <= set(values):
        return True
    return compare(condition, values) is not False


def compare(condition: Condition, values: Mapping[Symbol, Ball]) -> bool | None:
    """Return whether a condition holds; ``None`` where the enclosures do not decide it."""
    left, right = evaluate(condition.left, values), evaluate(condition.right, values)
    if condition.comparison in (">", ">="):
        left, right = right, left
    strict = condition.comparison in ("<", ">")
    if (left < right) if strict else (left <= right):
        return True
    if (left >= right) if strict else (left > right):
        return False
    return None


def decide(condition: Condition, values: Mapping[Symbol, Ball]) -> bool:
    """Return whether the condition of a regime test holds, by the rule of equal sides.

    Sides count as equal where the enclosures do not part them, and within ``EQUAL_WITHIN``.
    """
    left, right = evaluate(condition.left, values), evaluate(condition.right, values)
    within = abs(right) * EQUAL_WITHIN.numerator / EQUAL_WITHIN.denominator
    if compare(condition, values) is None or abs(left - right) <= within:
        return condition.comparison in ("<=", ">=")
    return compare(condition, values) is True


def _narrowed(
    condition: Condition, unknown: Symbol, low: Fraction, high: Fraction
) -> tuple[Fraction, Fraction]:
    """Narrow bounds by a condition that compares the unknown itself with a number."""
    if condition.left != unknown or not isinstance(condition.right, Number):
        return low, high
    limit = condition.right.value
    if condition.comparison in (">", ">="):
        return max(low, limit), high
    return low, min(high, limit)
