"""One relation solved for one unknown: moves, polynomial form, or a root on a branch."""

from __future__ import annotations

import math
from collections.abc import Callable, Iterator, Mapping
from dataclasses import dataclass, replace
from fractions import Fraction

from flint import arb

from ..errors import NoRoot, SeveralRoots, UndecidedRoots
from ..expressions import Condition, Expr, Function, Number, Sum, Symbol, derivative, symbols_in
from ..relations import Relation
from .balls import Ball, OutsideDomainError, evaluate, exact_ball, midpoint
from .bisection import Bisection, Search
from .bound import BALLS, bind
from .logarithms import logarithm_of
from .moves import Move, isolate
from .polynomials import polynomial_form
from .quadrature import Table, tables_of
from .roots import TooManyCellsError, isolate_roots
from .taylor import taylor_form

_SAMPLES = 64
_NARROWINGS = 80
_TINY = Fraction(1, 10**15)
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
        bisection: the course of a bisection in the bracket; ``None`` for closed forms.
        tables: the integrals of the solved form, or of the published one, as sums.
    """

    value: Ball
    method: str
    moves: tuple[Move, ...]
    solved: Expr | None
    residual: Ball
    branch: str
    bracket: tuple[Fraction, Fraction] | None
    other_roots: tuple[OtherRoot, ...]
    bisection: Bisection | None
    tables: tuple[Table, ...]


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
        conditions: what a root must meet besides the limits of the relation: its regime test.
    """

    relation: Relation
    unknown: Symbol
    values: Mapping[Symbol, Ball]
    branch: str
    key: str
    place: str
    conditions: tuple[Condition, ...] = ()


def solve(question: Question) -> Solution:
    """Solve one relation for one unknown.

    A root within the limits of the relation goes before one outside them. Where only a root
    outside limits that are not essential exists it is returned: the record marks the step.

    Raises:
        NoRoot: if no value inside the physical bounds satisfies the published form.
        UndecidedRoots: if the search for roots did not come to an end.
        SeveralRoots: if more than one does and no branch is stated.
    """
    limits = question.relation.limits
    essential = tuple(limit.condition for limit in limits if limit.essential)
    others = tuple(limit.condition for limit in limits if not limit.essential)
    question = replace(question, conditions=(*question.conditions, *essential))
    try:
        return _solve(replace(question, conditions=(*question.conditions, *others)))
    except NoRoot as within_limits:
        if not others:
            raise
        try:
            return _solve(question)
        except NoRoot:
            raise within_limits from None


def _solve(question: Question) -> Solution:
    published, unknown = question.relation.published, question.unknown
    isolation = isolate(published, unknown)
    if isolation is not None:
        value = _candidate(question, isolation.solved)
        if value is None:
            raise _no_root(question)
        return _solution(question, "moves", isolation.moves, isolation.solved, value)
    form = polynomial_form(published, unknown)
    if form is not None:
        values = {solved: _candidate(question, solved) for solved in form.candidates}
        genuine = {solved: value for solved, value in values.items() if value is not None}
        taken, others = _choose(question, tuple(genuine.values()))
        solved = next(solved for solved, value in genuine.items() if value is taken)
        return _solution(question, "polynomial", form.moves, solved, taken, others)
    taken, others = _choose(question, _roots(question))
    return _solution(question, "root", (), None, taken, others)


def bounds_of(question: Question) -> tuple[Fraction, Fraction]:
    """Return the interval in which the unknown is searched: physical bounds, limits, branch."""
    low, high = question.unknown.definition.low, question.unknown.definition.high
    branches = [b.condition for b in question.relation.branches if b.name == question.branch]
    for condition in (*question.conditions, *branches):
        low, high = _narrowed(condition, question.unknown, low, high)
    return low, high


def residual_of(relation: Relation, values: Mapping[Symbol, Ball]) -> Ball:
    """Return left minus right side of the published form."""
    return evaluate(relation.published.left, values) - evaluate(relation.published.right, values)


def size_of(relation: Relation, values: Mapping[Symbol, Ball]) -> Ball:
    """Return the size of what is compared: terms that are added count each, so that sides
    that cancel to zero still have one."""
    sides = (relation.published.left, relation.published.right)
    terms = [term for side in sides for term in (side.terms if isinstance(side, Sum) else (side,))]
    return sum((abs(evaluate(term, values)) for term in terms), arb(0))


def _solution(
    question: Question,
    method: str,
    moves: tuple[Move, ...],
    solved: Expr | None,
    value: Ball,
    others: tuple[OtherRoot, ...] = (),
) -> Solution:
    published, values = question.relation.published, {**question.values, question.unknown: value}
    tables = tables_of(solved or published.left - published.right, values)
    branch = _branch_at(question, value)
    bisection = None
    if method == "root":
        search = Search(published, question.unknown, question.values, tables)
        bisection = search.bisection(_bracket(question, value, others))
    return Solution(
        value=value,
        method=method,
        moves=moves,
        solved=solved,
        residual=residual_of(question.relation, values),
        branch=branch,
        bracket=bounds_of(replace(question, branch=branch)) if method == "root" else None,
        other_roots=others,
        bisection=bisection,
        tables=tables,
    )


def _bracket(
    question: Question, value: Ball, others: tuple[OtherRoot, ...]
) -> tuple[Fraction, Fraction]:
    """An interval around one root in which the relation is defined and no other root lies.

    It is kept as wide as the branch allows, so that a workbook can bisect in it after its
    inputs have changed.
    """
    low, high = bounds_of(replace(question, branch=_branch_at(question, value)))
    low = low if low != 0 else high * _TINY
    centre = Fraction(midpoint(value))
    for other in others:
        there = Fraction(midpoint(other.value))
        if low <= there < centre:
            low = (there + centre) / 2
        elif centre < there <= high:
            high = (there + centre) / 2
    difference = question.relation.published.left - question.relation.published.right
    ends = []
    for end in (low, high):
        if not _defined(question, difference, end):
            while not _defined(question, difference, end):
                end += (centre - end) / 8
            end = (end + centre) / 2  # room for changed inputs
        ends.append(end)
    return ends[0], ends[1]


def _defined(question: Question, expr: Expr, at: Fraction) -> bool:
    try:
        value = evaluate(expr, {**question.values, question.unknown: exact_ball(at)})
    except OutsideDomainError:
        return False
    return bool(value.is_finite())


def _roots(question: Question) -> tuple[Ball, ...]:
    difference = _search_form(question)
    slope = derivative(difference, question.unknown)
    values = question.values
    low, high = bounds_of(replace(question, branch=""))
    try:
        found = isolate_roots(
            bind(difference, values, question.unknown, BALLS),
            bind(slope, values, question.unknown, BALLS),
            low,
            high,
            taylor_form(difference, values, question.unknown),
        )
    except TooManyCellsError as problem:
        raise UndecidedRoots(
            question.relation.title, question.key, _interval_text(low, high)
        ) from problem
    return tuple(root.value for root in found if _meets_conditions(question, root.value))


def _search_form(question: Question) -> Expr:
    """What is zero at a root: the difference of the sides, or of their logarithms.

    Logarithms are taken where the unknown stands in a product form that must be positive,
    because the other side is known and positive: the roots are the same.
    """
    left, right = question.relation.published.left, question.relation.published.right
    for inner, known in ((left, right), (right, left)):
        if question.unknown in set(symbols_in(known)):
            continue
        logarithm = logarithm_of(inner)
        if logarithm is not None and evaluate(known, question.values) > 0:
            return logarithm - Function("ln", known)
    return left - right


def _choose(question: Question, roots: tuple[Ball, ...]) -> tuple[Ball, tuple[OtherRoot, ...]]:
    stated = [b for b in question.relation.branches if b.name == question.branch]
    stated = [b for b in stated if question.unknown in b.condition.symbols]
    taken = tuple(r for r in roots if all(_may_hold(b.condition, question, r) for b in stated))
    if not taken:
        raise _no_root(question)
    if len(taken) > 1:
        raise SeveralRoots(
            relation=question.relation.title,
            unknown=question.key,
            roots=tuple(_text(root) for root in taken),
            branches=tuple(branch.name for branch in question.relation.branches),
            place=question.place,
        )
    reason = f"not on the stated branch, {question.branch}"
    return taken[0], tuple(OtherRoot(r, reason) for r in roots if r is not taken[0])


def _branch_at(question: Question, value: Ball) -> str:
    for branch in question.relation.branches:
        mine = question.unknown in branch.condition.symbols
        if mine and _may_hold(branch.condition, question, value):
            return branch.name
    return ""


def _meets_conditions(question: Question, value: Ball) -> bool:
    return all(_may_hold(condition, question, value) for condition in question.conditions)


def _may_hold(condition: Condition, question: Question, value: Ball) -> bool:
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


def _candidate(question: Question, solved: Expr) -> Ball | None:
    """The value of a solved form, if it is a root of the published form within all bounds."""
    definition = question.unknown.definition
    try:
        value = evaluate(solved, question.values)
    except OutsideDomainError:
        return None
    if not value.is_finite():
        return None
    if value < exact_ball(definition.low) or value > exact_ball(definition.high):
        return None
    if definition.low == 0 and not definition.zero and value <= 0:
        return None
    proved = _satisfies(question, question.values, value) or _satisfies_midway(question, solved)
    return value if proved and _meets_conditions(question, value) else None


def _satisfies(question: Question, known: Mapping[Symbol, Ball], value: Ball) -> bool:
    values = {**known, question.unknown: value}
    difference = residual_of(question.relation, values)
    allowed = size_of(question.relation, values) * _RESIDUAL_SCALE
    return bool(difference.is_finite() and abs(difference) <= allowed)


def _satisfies_midway(question: Question, solved: Expr) -> bool:
    """Whether a solved form is a root at the middle of wide inputs, as a touching root is one."""
    middles = {symbol: arb(ball.mid()) for symbol, ball in question.values.items()}
    try:
        return _satisfies(question, middles, evaluate(solved, middles))
    except OutsideDomainError:
        return False


def _no_root(question: Question) -> NoRoot:
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
        bounds=_interval_text(low, high),
        reached=_reached(question, reached, low, high),
        asked="0" if on_both else _asked(question, asked),
        limits=tuple(_limits_missed(question)),
    )


def _limits_missed(question: Question) -> Iterator[str]:
    """Reasons of the limits that the known values alone already miss."""
    for limit in question.relation.limits:
        known = set(limit.condition.symbols) <= set(question.values)
        if known and compare(limit.condition, question.values) is False:
            yield limit.reason


def _asked(question: Question, expr: Expr) -> str:
    """The value of the known side; other inputs may leave it without one."""
    try:
        return _text(evaluate(expr, question.values))
    except OutsideDomainError:
        return "no value at all"


def _interval_text(low: Fraction, high: Fraction) -> str:
    return f"{_text(exact_ball(low))} to {_text(exact_ball(high))}"


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
