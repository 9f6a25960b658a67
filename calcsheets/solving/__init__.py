"""Stage 6, solving: one planned relation and values become one value with its way and proof."""

from .attempts import solve_problem
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
from .bisection import HALVINGS, Bisection, Halving
from .consistency import LARGEST_DIFFERENCE, differences
from .courses import CourseRows, lay_out
from .doubles import CourseErrors, Doubles, TableErrors, in_doubles
from .moves import ACTIONS, Isolation, Move, isolate, occurrences
from .quadrature import Table, tables_of
from .question import Question, compare, residual_of, size_of
from .routes import RouteOutcome, other_routes
from .run import Outcome, RegimeOutcome, StepOutcome
from .solve import OtherRoot, Solution, solve

__all__ = [
    "ACTIONS",
    "HALVINGS",
    "LARGEST_DIFFERENCE",
    "PRECISION",
    "Ball",
    "Bisection",
    "CourseErrors",
    "CourseRows",
    "Doubles",
    "Halving",
    "Isolation",
    "Move",
    "OtherRoot",
    "Outcome",
    "OutsideDomainError",
    "Question",
    "RegimeOutcome",
    "RouteOutcome",
    "Solution",
    "StepOutcome",
    "Table",
    "TableErrors",
    "compare",
    "decimal_bounds",
    "differences",
    "evaluate",
    "exact_ball",
    "in_doubles",
    "isolate",
    "lay_out",
    "midpoint",
    "occurrences",
    "other_routes",
    "residual_of",
    "size_of",
    "solve",
    "solve_problem",
    "tables_of",
    "working_precision",
]
