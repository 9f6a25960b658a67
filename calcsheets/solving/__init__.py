"""Stage 6, solving: one planned relation and values become one value with its way and proof."""

from .balls import (
    PRECISION,
    Ball,
    OutsideDomainError,
    decimal_bounds,
    evaluate,
    exact_ball,
    midpoint,
    working_precision,
)
from .bisection import HALVINGS, Halving
from .doubles import double_errors
from .moves import ACTIONS, Isolation, Move, isolate, occurrences
from .run import Outcome, RegimeOutcome, StepOutcome, solve_problem
from .solve import (
    OtherRoot,
    Question,
    Solution,
    compare,
    residual_of,
    size_of,
    solve,
)

__all__ = [
    "ACTIONS",
    "HALVINGS",
    "PRECISION",
    "Ball",
    "Halving",
    "Isolation",
    "Move",
    "OtherRoot",
    "Outcome",
    "OutsideDomainError",
    "Question",
    "RegimeOutcome",
    "Solution",
    "StepOutcome",
    "compare",
    "decimal_bounds",
    "double_errors",
    "evaluate",
    "exact_ball",
    "isolate",
    "midpoint",
    "occurrences",
    "residual_of",
    "size_of",
    "solve",
    "solve_problem",
    "working_precision",
]
