"""What the record says of another route to a result."""

from __future__ import annotations

from dataclasses import dataclass

from ..expressions import Expr, Symbol
from .step_model import Operand, RegimeUse


@dataclass(frozen=True)
class RouteStep:
    """One step of another route, which the calculation itself does not have.

    Attributes:
        number: number within the route, from 1.
        key: variable that the step gives.
        symbol: its symbol in the published form.
        title: quantity in words.
        place: place in words.
        relation: name of the relation.
        operands: known quantities; those that an earlier step of the route gives have neither
            input nor step.
        solved: the solved form.
        value: value in coherent SI.
        unit: coherent SI unit.
        double_error: bound on the absolute error when the steps are computed in doubles.
        regimes: the regimes in which the relation holds, empty for all.
    """

    number: int
    key: str
    symbol: Symbol
    title: str
    place: str
    relation: str
    operands: tuple[Operand, ...]
    solved: Expr
    value: float
    unit: str
    double_error: float
    regimes: tuple[RegimeUse, ...]


@dataclass(frozen=True)
class RouteRecord:
    """Another route to a result, or why there is none.

    Attributes:
        result: number of the result.
        key: variable of the result.
        steps: its own steps, each after those that it needs; empty where there is no other
            route.
        value: what it leads to, in coherent SI; ``None`` likewise.
        difference: relative difference from the value of the calculation; ``None`` likewise.
        shared: titles of the relations that both use.
        reason: why there is no other route, as a clause; empty where there is one.
    """

    result: int
    key: str
    steps: tuple[RouteStep, ...]
    value: float | None
    difference: float | None
    shared: tuple[str, ...]
    reason: str

    @property
    def agrees(self) -> bool | None:
        """Whether both values are the same; ``None`` where there is nothing to compare."""
        return None if self.difference is None else abs(self.difference) <= LARGEST_DIFFERENCE


LARGEST_DIFFERENCE = 1e-9
"""Above this relative difference two routes disagree: rounding alone leaves far less."""
