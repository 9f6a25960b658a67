"""What a course is: a process as a table, row by row from its start to its end."""

from __future__ import annotations

from dataclasses import dataclass

from ..errors import DefinitionError
from ..expressions import Condition, Equation, Expr, Symbol, dimension_of
from .relation import Source

INTERVALS = 20
"""A course has one row more: its start, its end, and nineteen between."""


@dataclass(frozen=True)
class Case:
    """One form of a column.

    Attributes:
        value: the form.
        condition: where it holds, if no case before it does; ``None`` everywhere.
    """

    value: Expr
    condition: Condition | None = None


@dataclass(frozen=True)
class CourseColumn:
    """One quantity of a course: the first of its cases that holds gives it."""

    symbol: Symbol
    cases: tuple[Case, ...]


@dataclass(frozen=True)
class Words:
    """What is said of each row in words: a condition, and the word for each outcome."""

    condition: Condition
    if_so: str
    if_not: str


@dataclass(frozen=True)
class Course:
    """A process as a table.

    Attributes:
        name: identifier, unique in the library.
        title: the course in words.
        offered_by: processes that have it.
        row: the number of the row, from 0 at the start to ``INTERVALS`` at the end.
        running: the quantity that is laid out in rows.
        start: its value at the start.
        end: its value at the end.
        between: its value in between, by the number of the row.
        columns: the other quantities, each after those that it needs.
        words: what is said of each row.
        source: where the forms come from.
    """

    name: str
    title: str
    offered_by: tuple[str, ...]
    row: Symbol
    running: Symbol
    start: Symbol
    end: Symbol
    between: Expr
    columns: tuple[CourseColumn, ...]
    words: Words
    source: Source

    def __post_init__(self) -> None:
        for equation in self.statements:
            if isinstance(equation, Equation):
                left, right = dimension_of(equation.left), dimension_of(equation.right)
                if left != right:
                    raise DefinitionError(
                        f"course {self.name}", f"{equation.left} is in {left}, its form in {right}"
                    )

    @property
    def statements(self) -> tuple[Equation | Condition, ...]:
        """Every form as an equation, and every condition, in order."""
        found: list[Equation | Condition] = [Equation(self.running, self.between)]
        for column in self.columns:
            for case in column.cases:
                found.append(Equation(column.symbol, case.value))
                found += [case.condition] if case.condition is not None else []
        return (*found, self.words.condition)

    @property
    def symbols(self) -> tuple[Symbol, ...]:
        """Every symbol that must be known, once, in order of appearance."""
        rows = {self.row, self.running, *(column.symbol for column in self.columns)}
        named = (symbol for statement in self.statements for symbol in statement.symbols)
        return tuple(
            symbol for symbol in dict.fromkeys((self.start, self.end, *named)) if symbol not in rows
        )
