"""One relation solved for one unknown: moves, polynomial form, or a root on a branch."""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from dataclasses import dataclass
from fractions import Fraction

from flint import arb

from ..errors import NoRoot, SeveralRoots
from ..expressions import Condition, Expr, Number, Symbol, derivative, symbols_in
from ..relations import Branch, Relation
from .balls import Ball, evaluate, exact_ball
from .moves import Move, isolate
from .polynomials import polynomial_form
from .roots import RootFound, TooManyCellsError, isolate_roots

_SAMPLES = 64
_RESIDUAL_SCALE = arb(2) ** -60


@dataclass(frozen=True)
class OtherRoot:
    """A root that was not taken.

    Attributes:
        value: its ball.
        reason: why it was not taken, as a clause.
    """

    value: Ball
    reason: str


@dataclass(frozen=True)
class Solution:
    """The value of one unknown, with the way to it.

    Attributes:
        value: ball of the unknown in coherent SI.
        method: ``moves``, ``polynomial`` or ``root``.
        moves: algebraic moves from the published form.
        solved: the solved form; ``None`` for a root.
        residual: ball of left minus right side of the published form at the value.
        branch: name of the branch on which the value lies, empty where there is one root.
        bracket: interval in which the root is the only one; ``None`` for closed forms.
        other_roots: roots that were not taken.
    """

    value: Ball
    method: str
    moves: tuple[Move, ...]
    solved: Expr | None
    residual: Ball
    branch: str
    bracket: tuple[Fraction, Fraction] | None
    other_roots: tuple[OtherRoot, ...]


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
    """

    relation: Relation
    unknown: Symbol
    values: Mapping[Symbol, Ball]
    branch: str
    key: str
    place: str


def solve(question: Question) -> Solution:
    """Solve one relation for one unknown.

    Raises:
        NoRoot: if no value inside the physical bounds satisfies the published form.
        SeveralRoots: if more than one does and no branch is stated.
    """
    isolation = isolate(question.relation.published, question.unknown)
    if isolation is not None:
        value = evaluate(isolation.solved, question.values)
        _require_root(question, value)
        return _solution(question, "moves", isolation.moves, isolation.solved, value)
    form = polynomial_form(question.relation.published, question.unknown)
    if form is not None:
        roots = [(c, evaluate(c, question.values)) for c in form.candidates]
        genuine = [(c, v) for c, v in roots if _is_root(question, v)]
        taken, others = _choose(question, [RootFound(v, False) for _, v in genuine])
        solved = next(c for c, v in genuine if v is taken.value)
        solution = _solution(question, "polynomial", form.moves, solved, taken.value, others)
        return solution
    taken, others = _choose(question, _roots(question))
    return _solution(question, "root", (), None, taken.value, others)


def bounds_of(question: Question) -> tuple[Fraction, Fraction]:
    """Return the interval in which the unknown is searched: physical bounds, limits, branch."""
    low, high = question.unknown.definition.low, question.unknown.definition.high
    conditions = [limit.condition for limit in question.relation.limits]
    conditions += [b.condition for b in question.relation.branches if b.name == question.branch]
    for condition in conditions:
        low, high = _narrowed(condition, question.unknown, low, high)
    return low, high


def residual_of(relation: Relation, values: Mapping[Symbol, Ball]) -> Ball:
    """Return left minus right side of the published form."""
    return evaluate(relation.published.left, values) - evaluate(relation.published.right, values)


def _solution(
    question: Question,
    method: str,
    moves: tuple[Move, ...],
    solved: Expr | None,
    value: Ball,
    others: tuple[OtherRoot, ...] = (),
) -> Solution:
    return Solution(
        value=value,
        method=method,
        moves=moves,
        solved=solved,
        residual=residual_of(question.relation, {**question.values, question.unknown: value}),
        branch=_branch_at(question, value),
        bracket=bounds_of(_on_branch(question, value)) if method == "root" else None,
        other_roots=others,
    )


def _roots(question: Question) -> Sequence[RootFound]:
    difference = question.relation.published.left - question.relation.published.right
    slope = derivative(difference, question.unknown)
    values = question.values
    physical = Question(
        question.relation, question.unknown, values, "", question.key, question.place
    )
    low, high = bounds_of(physical)
    try:
        return isolate_roots(
            lambda x: evaluate(difference, {**values, question.unknown: x}),
            lambda x: evaluate(slope, {**values, question.unknown: x}),
            low,
            high,
        )
    except TooManyCellsError as problem:
        raise _no_root(question) from problem


def _choose(
    question: Question, roots: Sequence[RootFound]
) -> tuple[RootFound, tuple[OtherRoot, ...]]:
    if not roots:
        raise _no_root(question)
    branches = {branch.name: branch for branch in question.relation.branches}
    if question.branch in branches and question.unknown in branches[question.branch].condition.symbols:
        inside = [r for r in roots if _meets(branches[question.branch], question.unknown, r.value)]
        if len(inside) == 1:
            reason = f"not on the stated branch, {question.branch}"
            others = tuple(OtherRoot(r.value, reason) for r in roots if r is not inside[0])
            return inside[0], others
        if not inside:
            raise _no_root(question)
        roots = inside
    if len(roots) == 1:
        return roots[0], ()
    raise SeveralRoots(
        relation=question.relation.title,
        unknown=question.key,
        roots=tuple(_text(root.value) for root in roots),
        branches=tuple(branches),
        place=question.place,
    )


def _branch_at(question: Question, value: Ball) -> str:
    for branch in question.relation.branches:
        if question.unknown in branch.condition.symbols and _meets(branch, question.unknown, value):
            return branch.name
    return ""


def _on_branch(question: Question, value: Ball) -> Question:
    branch = _branch_at(question, value)
    return Question(
        question.relation, question.unknown, question.values, branch, question.key, question.place
    )


def _meets(branch: Branch, unknown: Symbol, value: Ball) -> bool:
    low, high = _narrowed(branch.condition, unknown, Fraction(-(10**30)), Fraction(10**30))
    middle = exact_ball(low).union(exact_ball(high))
    return bool(middle.overlaps(value))


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


def _is_root(question: Question, value: Ball) -> bool:
    definition = question.unknown.definition
    if not value.is_finite():
        return False
    if value < exact_ball(definition.low) or value > exact_ball(definition.high):
        return False
    if definition.low == 0 and value <= 0:
        return False
    low, high = bounds_of(question)
    if value < exact_ball(low) or value > exact_ball(high):
        return question.branch != "" and question.relation.branches != ()
    values = {**question.values, question.unknown: value}
    left = evaluate(question.relation.published.left, values)
    right = evaluate(question.relation.published.right, values)
    difference = left - right
    scale = abs(left) + abs(right)
    return bool(difference.is_finite() and abs(difference) <= scale * _RESIDUAL_SCALE)


def _require_root(question: Question, value: Ball) -> None:
    if not _is_root(question, value):
        raise _no_root(question)


def _no_root(question: Question) -> NoRoot:
    low, high = bounds_of(question)
    published = question.relation.published
    inner, asked = published.left, published.right
    if question.unknown in set(symbols_in(asked)) and question.unknown not in set(symbols_in(inner)):
        inner, asked = asked, inner
    on_both = question.unknown in set(symbols_in(asked))
    reached = inner - asked if on_both else inner
    return NoRoot(
        relation=question.relation.title,
        unknown=question.key,
        bounds=f"{_text(exact_ball(low))} to {_text(exact_ball(high))}",
        reached=_reached(question, reached, low, high),
        asked="0" if on_both else _text(evaluate(asked, question.values)),
    )


def _reached(question: Question, expr: Expr, low: Fraction, high: Fraction) -> str:
    """The range of one side over the bounds, by samples in every decade."""
    found = []
    for sample in _samples(low, high):
        value = evaluate(expr, {**question.values, question.unknown: exact_ball(sample)})
        if value.is_finite():
            found.append(value)
    if not found:
        return "no value at all"
    ordered = sorted(found, key=lambda ball: float(ball.mid()))
    return f"{_text(ordered[0])} to {_text(ordered[-1])}"


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
