"""What the record says of one step.

Numbers are doubles in coherent SI unless a field says otherwise.
"""

from __future__ import annotations

from dataclasses import dataclass

from ..expressions import Condition, Equation, Expr, Integral, Symbol


@dataclass(frozen=True)
class Operand:
    """One known quantity of a step.

    Attributes:
        symbol: the symbol in the published form.
        key: the variable that it means here.
        title: quantity in words.
        place: place in words.
        value: value in coherent SI.
        unit: coherent SI unit.
        input: number of the input that it is, 0 if it is none.
        step: number of the step that gave it, 0 if none did.
    """

    symbol: Symbol
    key: str
    title: str
    place: str
    value: float
    unit: str
    input: int
    step: int


@dataclass(frozen=True)
class MoveRecord:
    """One algebraic action on both sides."""

    action: str
    operand: Expr | None
    result: Equation


@dataclass(frozen=True)
class LimitRecord:
    """One limit of a relation at this step.

    Attributes:
        condition: what must hold.
        reason: why.
        left: value of the left side; ``None`` where it could not be evaluated.
        right: value of the right side; likewise.
        holds: whether it holds; ``None`` where it could not be evaluated.
    """

    condition: Condition
    reason: str
    left: float | None
    right: float | None
    holds: bool | None


@dataclass(frozen=True)
class RootRecord:
    """A root that was not taken, and why."""

    value: float
    reason: str


@dataclass(frozen=True)
class NodeRecord:
    """One place at which an integrand is taken.

    Attributes:
        place: share of the way from the lower to the upper limit.
        weight: its weight; all weights together are one.
        at: the variable there.
        height: the integrand there.
    """

    place: float
    weight: float
    at: float
    height: float


@dataclass(frozen=True)
class IntegralRecord:
    """An integral of a step, with the sum that a workbook makes of it.

    Attributes:
        integral: the integral.
        low: value of its lower limit.
        high: value of its upper limit.
        nodes: the places of the sum, in order.
        total: the sum: width times the weighted heights.
        lower: decimal below which the exact integral cannot lie.
        upper: decimal above which it cannot lie.
        certified_digits: significant digits that these certify, at most 15.
        difference: bound on the difference of the sum from the exact integral.
        limit_error: bound on the error of a limit, or of the variable at a place, in doubles.
        height_error: bound on the error of the integrand at a place in doubles.
        total_error: bound on the error of the sum in doubles.
    """

    integral: Integral
    low: float
    high: float
    nodes: tuple[NodeRecord, ...]
    total: float
    lower: str
    upper: str
    certified_digits: int
    difference: float
    limit_error: float
    height_error: float
    total_error: float


@dataclass(frozen=True)
class SumRecord:
    """The same sum at another value of the unknown.

    Attributes:
        low: value of the lower limit.
        high: value of the upper limit.
        heights: the integrand at each place.
        total: the sum.
    """

    low: float
    high: float
    heights: tuple[float, ...]
    total: float


@dataclass(frozen=True)
class HalvingRecord:
    """One row of the bisection that leads to a root.

    Attributes:
        low: lower end of the interval.
        high: upper end.
        residual: difference of both sides at the middle, over the sum of their magnitudes.
        integrals: each integral of the step at the middle.
    """

    low: float
    high: float
    residual: float
    integrals: tuple[SumRecord, ...]


@dataclass(frozen=True)
class RegimeUse:
    """A regime on which a step depends: its key, and the outcomes in which the step holds."""

    key: str
    outcomes: tuple[str, ...]


@dataclass(frozen=True)
class AlternativeRecord:
    """What gives the same quantity in the other regime, for a workbook that stays alive.

    Attributes:
        regimes: the regimes in which it holds.
        relation: name of the relation.
        solved: its solved form.
        operands: its known quantities.
        integrals: the integrals of the solved form.
    """

    regimes: tuple[RegimeUse, ...]
    relation: str
    solved: Expr
    operands: tuple[Operand, ...]
    integrals: tuple[IntegralRecord, ...]


@dataclass(frozen=True)
class RegimeCase:
    """One case of a regime test.

    Attributes:
        condition: the test.
        left: value of the left side.
        right: value of the right side.
        outcome: regime if it holds and none before it does.
    """

    condition: Condition
    left: float
    right: float
    outcome: str


@dataclass(frozen=True)
class RegimeTest:
    """A regime test with its outcome.

    Attributes:
        cases: the cases, in the order in which they are tested.
        otherwise: regime if none of them holds.
        equal_within: sides that differ by no more of the right one count as equal.
        outcome: the regime.
        assumed: whether the regime was tried first and confirmed by the test afterwards.
    """

    cases: tuple[RegimeCase, ...]
    otherwise: str
    equal_within: float
    outcome: str
    assumed: bool


@dataclass(frozen=True)
class MemberRecord:
    """One relation of a coupled set.

    Attributes:
        relation: name of the relation.
        place: place in words.
        key: the variable that it gives once the torn one is known; empty for the relation that
            closes the loop.
        symbol: that variable in the symbols of the step; ``None`` likewise.
        published: the relation in the symbols of the step.
        solved: its solved form in these symbols; ``None`` likewise.
    """

    relation: str
    place: str
    key: str
    symbol: Symbol | None
    published: Equation
    solved: Expr | None


@dataclass(frozen=True)
class StepRecord:
    """One line of the calculation.

    Attributes:
        number: number on the sheet, from 1.
        key: variable that the step gives.
        symbol: its symbol in the published form.
        title: quantity in words.
        place: place in words.
        relation: name of the relation or regime test, see ``Record.relations``.
        operands: known quantities, in order of appearance.
        method: ``moves``, ``polynomial``, ``root`` or ``regime``.
        moves: algebraic moves from the published to the solved form.
        solved: the solved form; ``None`` for a root or a regime.
        value: value in coherent SI; ``None`` for a regime.
        unit: coherent SI unit.
        lower: decimal below which the exact value cannot lie.
        upper: decimal above which it cannot lie.
        certified_digits: significant digits that the enclosure certifies, at most 15.
        double_error: bound on the absolute error when the steps are computed in doubles, as
            a workbook does.
        residual: bound on the relative difference of both sides of the published form.
        limits: limits of the relation.
        limit_operands: known quantities that only the limits name.
        branch: branch on which the value lies, empty for none.
        bracket: interval in which the root is the only one, empty for closed forms.
        other_roots: roots not taken.
        halvings: the course of a bisection in the bracket, empty for closed forms.
        integrals: the integrals of the solved form, or of the published one for a root.
        start_integrals: for a root the same at the lower end of the first interval.
        regimes: the regimes in which the relation holds, empty for all.
        alternatives: the same quantity in other regimes.
        test: the regime test; ``None`` for a relation.
        combination: the relations that are solved together, where the step is a coupled set.
        dropped: quantities that stand in these relations and drop out of what is inserted.
    """

    number: int
    key: str
    symbol: Symbol
    title: str
    place: str
    relation: str
    operands: tuple[Operand, ...]
    method: str
    moves: tuple[MoveRecord, ...]
    solved: Expr | None
    value: float | None
    unit: str
    lower: str
    upper: str
    certified_digits: int
    double_error: float
    residual: float
    limits: tuple[LimitRecord, ...]
    limit_operands: tuple[Operand, ...]
    branch: str
    bracket: tuple[float, ...]
    other_roots: tuple[RootRecord, ...]
    halvings: tuple[HalvingRecord, ...]
    integrals: tuple[IntegralRecord, ...]
    start_integrals: tuple[SumRecord, ...]
    regimes: tuple[RegimeUse, ...]
    alternatives: tuple[AlternativeRecord, ...]
    test: RegimeTest | None
    combination: tuple[MemberRecord, ...]
    dropped: tuple[Operand, ...]

    @property
    def within_limits(self) -> bool:
        """Whether no limit is known to be exceeded."""
        return all(limit.holds is not False for limit in self.limits)
