"""What a relation is, and the checks that it passes when it is defined."""

from __future__ import annotations

from dataclasses import dataclass
from fractions import Fraction
from typing import TYPE_CHECKING, Any

from ..errors import DefinitionError
from ..expressions import Condition, Equation, Expr, Symbol, dimension_of, equation_to_sympy

if TYPE_CHECKING:
    from .course import Course

KNOWN = ("read in the source", "library", "common practice", "from memory", "brief")

EQUAL_WITHIN = Fraction(1, 10**12)
"""Sides of a regime test that differ by no more of the right one count as equal.

At a border both regimes give one value, and a workbook, whose cells keep 15 to 17 digits, must
come to the same outcome as arithmetic in many more.
"""


@dataclass(frozen=True)
class Source:
    """Where a relation is published, and how we know.

    Attributes:
        document: the publication.
        edition: year or edition.
        clause: clause, equation or table; empty where none is claimed.
        known: one of ``KNOWN``.
    """

    document: str
    edition: str
    clause: str
    known: str

    def __post_init__(self) -> None:
        if self.known not in KNOWN:
            raise DefinitionError(
                f"source {self.document}", f'"{self.known}" is not one of {KNOWN}'
            )

    def __str__(self) -> str:
        text = ", ".join(part for part in (self.document, self.edition, self.clause) if part)
        return (
            f"{text} (from memory: confirm in the source)" if self.known == "from memory" else text
        )


@dataclass(frozen=True)
class Limit:
    """A condition outside which a relation must not be used.

    Attributes:
        condition: the condition that must hold.
        reason: why, as a clause.
        essential: whether the relation means nothing outside it, so that no value is given
            there; outside other limits a value is given and marked.
    """

    condition: Condition
    reason: str
    essential: bool = False


@dataclass(frozen=True)
class Branch:
    """One of several ranges in each of which a relation has one root.

    Attributes:
        name: trade name, such as ``subsonic``.
        condition: comparison of the symbol with a number.
    """

    name: str
    condition: Condition


@dataclass(frozen=True)
class Relation:
    """One published equation.

    Attributes:
        name: identifier, unique in the library.
        title: the relation in words.
        published: the equation as published.
        source: where it is published.
        offered_by: station kinds, process names, ``gas`` or ``site`` that offer it.
        limits: conditions of its use.
        assumptions: what must be true for it to hold.
        cautions: where someone can get hurt.
        regime: outcome of the regime test in which it holds, or several; empty for all.
        regime_role: role of the process whose regime it is; empty for its own.
        also: other regimes that must be as well: role of the process, and outcome or outcomes.
        branches: ranges that part its roots.
        errs: in which direction it errs outside its assumptions, as a sentence.
        empirical: whether it rests on measurement and not on the model alone.
        chapter: set by the chapter that holds it.
    """

    name: str
    title: str
    published: Equation
    source: Source
    offered_by: tuple[str, ...]
    limits: tuple[Limit, ...] = ()
    assumptions: tuple[str, ...] = ()
    cautions: tuple[str, ...] = ()
    regime: str | tuple[str, ...] = ""
    regime_role: str = ""
    also: tuple[tuple[str, str | tuple[str, ...]], ...] = ()
    branches: tuple[Branch, ...] = ()
    errs: str = ""
    empirical: bool = False
    chapter: str = ""

    def __post_init__(self) -> None:
        _require_homogeneous(self.name, self.published.left, self.published.right)
        for limit in self.limits:
            _require_homogeneous(self.name, limit.condition.left, limit.condition.right)
        if not self.offered_by:
            raise DefinitionError(f"relation {self.name}", "nothing offers it")
        if not self.published.symbols:
            raise DefinitionError(f"relation {self.name}", "it relates nothing")

    @property
    def equation(self) -> Any:
        """The relation as ``sympy.Eq``, for algebra."""
        return equation_to_sympy(self.published)

    @property
    def symbols(self) -> tuple[Symbol, ...]:
        """Every symbol of the equation once, in order of appearance."""
        return self.published.symbols

    @property
    def uses(self) -> tuple[tuple[str, tuple[str, ...]], ...]:
        """The regimes on which it depends: role of the process, and the outcomes that do."""
        own = ((self.regime_role, self.regime),) if self.regime else ()
        return tuple((role, _several(outcomes)) for role, outcomes in (*own, *self.also))


@dataclass(frozen=True)
class Regime:
    """Tests that decide, in their order, between mutually exclusive states of a process.

    The regime is that of the first case whose condition holds, and the last one if none does.
    Sides that differ by no more than ``EQUAL_WITHIN`` of the right one count as equal.

    Attributes:
        name: identifier, unique in the library.
        title: what is decided, in words.
        cases: each condition with the regime that it means.
        otherwise: the regime if no condition holds.
        offered_by: processes that it decides.
        source: where the test is published.
        chapter: set by the chapter that holds it.
    """

    name: str
    title: str
    cases: tuple[tuple[Condition, str], ...]
    otherwise: str
    offered_by: tuple[str, ...]
    source: Source
    cautions: tuple[str, ...] = ()
    chapter: str = ""

    def __post_init__(self) -> None:
        if not self.cases:
            raise DefinitionError(f"regime test {self.name}", "it has no case to test")
        for condition, _ in self.cases:
            _require_homogeneous(self.name, condition.left, condition.right)
        for outcome in self.outcomes:
            if self.outcomes.count(outcome) > 1:
                raise DefinitionError(f"regime test {self.name}", f'two cases come to "{outcome}"')

    @property
    def conditions(self) -> tuple[Condition, ...]:
        """The condition of each case, in order."""
        return tuple(condition for condition, _ in self.cases)

    @property
    def outcomes(self) -> tuple[str, ...]:
        """Every regime, in the order of the cases."""
        return (*(outcome for _, outcome in self.cases), self.otherwise)

    @property
    def symbols(self) -> tuple[Symbol, ...]:
        """Every symbol of the tests once, in order of appearance."""
        return tuple(dict.fromkeys(s for condition in self.conditions for s in condition.symbols))

    def asks(self, outcomes: tuple[str, ...]) -> tuple[Condition, ...]:
        """Return conditions that hold in each of some outcomes.

        The cases before the first of them do not hold. If it is the only one, its own does.
        """
        first = min(self.outcomes.index(outcome) for outcome in outcomes)
        before = tuple(condition.opposite for condition in self.conditions[:first])
        return (*before, *self.conditions[first : first + 1]) if len(outcomes) == 1 else before


@dataclass(frozen=True)
class Process:
    """What can happen between two stations of a path.

    Attributes:
        name: name in a brief.
        title: the process in words.
        needs_through: whether it names the orifice that the gas passes.
        one_stream: whether one steady stream passes it, so that the mass flow of a station of
            the stream can be that of one such process before and one behind it only.
    """

    name: str
    title: str
    needs_through: bool = False
    one_stream: bool = False


def starting_from(process: str, station_kind: str) -> str:
    """Return what offers a relation only where a process starts from one kind of station."""
    return f"{process} from a {station_kind}"


def ending_in(process: str, kind: str) -> str:
    """Return the name under which a process that ends in a kind of station offers relations."""
    return f"{process} into a {kind}"


def station_of(process: str) -> str:
    """Return the name under which the stations at either end of a process offer relations."""
    return f"station of a {process}"


@dataclass(frozen=True)
class Chapter:
    """The relations of one subject.

    Attributes:
        name: identifier, the name of its file.
        title: the subject in words.
        relations: in the order in which they are read.
        regimes: the regime tests.
        processes: the processes that the chapter introduces.
        courses: how processes run, row by row.
    """

    name: str
    title: str
    relations: tuple[Relation, ...]
    regimes: tuple[Regime, ...] = ()
    processes: tuple[Process, ...] = ()
    courses: tuple[Course, ...] = ()


def _several(outcomes: str | tuple[str, ...]) -> tuple[str, ...]:
    return (outcomes,) if isinstance(outcomes, str) else outcomes


def _require_homogeneous(name: str, left: Expr, right: Expr) -> None:
    try:
        dimensions = dimension_of(left), dimension_of(right)
    except DefinitionError as problem:
        raise DefinitionError(f"relation {name}", str(problem)) from problem
    if dimensions[0] != dimensions[1]:
        raise DefinitionError(
            f"relation {name}", f"its sides are in {dimensions[0]} and in {dimensions[1]}"
        )
