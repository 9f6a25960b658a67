"""One relation solved for one unknown: moves, polynomial form, or a root on a branch."""

from __future__ import annotations

from collections.abc import Callable, Mapping
from dataclasses import dataclass, replace
from fractions import Fraction

from flint import arb

from ..expressions import Expr, Function, Symbol, derivative, symbols_in
from .balls import Ball, OutsideDomainError, evaluate, exact_ball, midpoint
from .bisection import Bisection, Search
from .bound import BALLS, bind
from .logarithms import is_positive, logarithm_of
from .moves import Move, isolate
from .polynomials import polynomial_form
from .quadrature import Table, tables_of
from .question import Question, bounds_of, may_hold, residual_of, size_of
from .refusals import no_root, outside_limit, several_roots, undecided
from .roots import TooManyCellsError, isolate_roots
from .taylor import taylor_form

_TINY = Fraction(1, 10**15)
_APPROACHES = 200
_INCONSISTENT = "nothing consistent follows from it in this calculation"
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


def solve(question: Question) -> Solution:
    """Solve one relation for one unknown.

    A root within the limits of the relation goes before one outside them. Where only a root
    outside limits that are not essential exists it is returned: the record marks the step.

    Raises:
        NoRoot: if no value inside the physical bounds satisfies the published form.
        UndecidedRoots: if the search for roots did not come to an end.
        SeveralRoots: if more than one does and no branch is stated.
    """
    published, unknown = question.relation.published, question.unknown
    isolation = isolate(published, unknown)
    if isolation is not None:
        value = _candidate(question, isolation.solved)
        taken, others = _choose(question, () if value is None else (value,))
        return _solution(question, "moves", isolation.moves, isolation.solved, taken, others)
    form = polynomial_form(published, unknown)
    if form is not None:
        values = {solved: _candidate(question, solved) for solved in form.candidates}
        genuine = {solved: value for solved, value in values.items() if value is not None}
        taken, others = _choose(question, tuple(genuine.values()))
        solved = next(solved for solved, value in genuine.items() if value is taken)
        return _solution(question, "polynomial", form.moves, solved, taken, others)
    taken, others = _choose(question, _roots(question))
    return _solution(question, "root", (), None, taken, others)


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
    bisection = bracket = None
    if method == "root":
        bracket = _alone(replace(question, branch=branch), value, others)
        search = Search(published, question.unknown, question.values, tables)
        bisection = search.bisection(_bracket(question, value, bracket))
    return Solution(
        value=value,
        method=method,
        moves=moves,
        solved=solved,
        residual=residual_of(question.relation, values),
        branch=branch,
        bracket=bracket,
        other_roots=others,
        bisection=bisection,
        tables=tables,
    )


def _bracket(
    question: Question, value: Ball, alone: tuple[Fraction, Fraction]
) -> tuple[Fraction, Fraction]:
    """An interval around one root in which the relation is defined and no other root lies.

    It is kept as wide as the branch allows, so that a workbook can bisect in it after its
    inputs have changed.
    """
    centre = Fraction(midpoint(value))
    difference = question.relation.published.left - question.relation.published.right
    ends = []
    for end in (alone[0] if alone[0] != 0 else alone[1] * _TINY, alone[1]):
        ends.append(_towards(centre, end, lambda x: _defined(question, difference, x)))
    return ends[0], ends[1]


def _towards(centre: Fraction, end: Fraction, defined: Callable[[Fraction], bool]) -> Fraction:
    """An end from which on a relation is defined, with room for changed inputs."""
    if defined(end):
        return end
    for _ in range(_APPROACHES):
        end = Fraction(float(end + (centre - end) / 8))
        if defined(end):
            return (end + centre) / 2
    return centre


def _alone(
    question: Question, value: Ball, others: tuple[OtherRoot, ...]
) -> tuple[Fraction, Fraction]:
    """The interval of its branch and limits in which a root is the only one."""
    low, high = bounds_of(question)
    centre = Fraction(midpoint(value))
    for other in others:
        there = Fraction(midpoint(other.value))
        if low <= there < centre:
            low = (there + centre) / 2
        elif centre < there <= high:
            high = (there + centre) / 2
    return low, high


def _defined(question: Question, expr: Expr, at: Fraction) -> bool:
    try:
        value = evaluate(expr, {**question.values, question.unknown: exact_ball(at)})
    except OutsideDomainError:
        return False
    return bool(value.is_finite())


def _roots(question: Question) -> tuple[Ball, ...]:
    """All roots in the physical bounds; where that search has no end, all within the limits."""
    definition = question.unknown.definition
    bounds = definition.low, definition.high
    narrower = bounds_of(question)
    try:
        return _roots_between(question, *bounds)
    except TooManyCellsError as problem:
        if narrower == bounds:
            raise undecided(question) from problem
    try:
        return _roots_between(question, *narrower)
    except TooManyCellsError as problem:
        raise undecided(question) from problem


def _roots_between(question: Question, low: Fraction, high: Fraction) -> tuple[Ball, ...]:
    difference, values = _search_form(question), question.values
    slope = derivative(difference, question.unknown)
    found = isolate_roots(
        bind(difference, values, question.unknown, BALLS),
        bind(slope, values, question.unknown, BALLS),
        low,
        high,
        taylor_form(difference, values, question.unknown),
    )
    return tuple(root.value for root in found)


def _search_form(question: Question) -> Expr:
    """What is zero at a root: the difference of the sides, or of their logarithms.

    Logarithms are taken where both sides must be positive, because they are of a form that
    cannot be negative or because the other side is known and positive: the roots are the same,
    and products of large and small factors keep their meaning.
    """
    left, right = question.relation.published.left, question.relation.published.right
    for inner, known in ((left, right), (right, left)):
        if question.unknown in set(symbols_in(known)):
            continue
        logarithm = logarithm_of(inner)
        if logarithm is not None and evaluate(known, question.values) > 0:
            return logarithm - Function("ln", known)
    if all(
        question.unknown in set(symbols_in(side)) and is_positive(side) for side in (left, right)
    ):
        logarithms = [logarithm_of(side) or Function("ln", side) for side in (left, right)]
        return logarithms[0] - logarithms[1]
    return left - right


def _choose(question: Question, roots: tuple[Ball, ...]) -> tuple[Ball, tuple[OtherRoot, ...]]:
    """The root that is meant, and the others with the reason why each is not.

    A root outside limits that are not essential is taken only where none lies within them.
    """
    against = {index: _against(question, root) for index, root in enumerate(roots)}
    for essential_only in (False, True):
        taken = [
            index
            for index, objections in against.items()
            if not any(essential or not essential_only for essential, _ in objections)
        ]
        if len(taken) > 1 and (question.choice is None or question.choice >= len(taken)):
            raise several_roots(question, tuple(roots[index] for index in taken))
        if taken:
            chosen = taken[question.choice or 0] if len(taken) > 1 else taken[0]
            others = (
                OtherRoot(roots[index], objections[0][1] if objections else _INCONSISTENT)
                for index, objections in against.items()
                if index != chosen
            )
            return roots[chosen], tuple(others)
    raise (outside_limit(question) if roots else None) or no_root(question)


def _against(question: Question, value: Ball) -> tuple[tuple[bool, str], ...]:
    """Why a value is not the one that is meant: whether that decides, and the reason."""
    found = [
        (True, f"not on the stated branch, {branch.name}")
        for branch in question.relation.branches
        if branch.name == question.branch and not may_hold(branch.condition, question, value)
    ]
    found += [
        (limit.essential, f"outside a limit: {limit.reason}")
        for limit in (*question.limits, *question.relation.limits)
        if not may_hold(limit.condition, question, value)
    ]
    return tuple(sorted(found, key=lambda objection: not objection[0]))


def _branch_at(question: Question, value: Ball) -> str:
    for branch in question.relation.branches:
        mine = question.unknown in branch.condition.symbols
        if mine and may_hold(branch.condition, question, value):
            return branch.name
    return ""


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
    return value if proved else None


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
