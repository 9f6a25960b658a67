"""Everything that can go wrong, as values with a sentence.

    CalcsheetsError
    ├── DefinitionError          a relation, quantity, gas or process of the library is wrong
    ├── UnitError                text with a unit that cannot be read as an engineer means it
    ├── UnknownGas               a gas name that is not in the data
    ├── BriefError               a brief that cannot be read, with file and line
    ├── PlanningError            the wanted results cannot be reached
    │   ├── NotEnoughInputs      says which inputs would close the problem
    │   ├── ContradictoryInputs  two inputs, or an input and a relation, disagree
    │   └── AmbiguousRegime      more than one regime agrees with its own test
    ├── SolvingError             one planned relation gives no value
    │   ├── NoRoot               with the range that the relation can reach
    │   ├── SeveralRoots         with every root, and the question to answer
    │   ├── OutsideLimit         a relation means nothing at the values reached
    │   ├── UndecidedRoots       the search did not come to an end
    │   └── UntabulatedIntegral  no sum over places comes near an integral
    ├── CheckError               an independent engine disagrees with the program
    └── OutputError              a file cannot be written

Each class keeps its facts in fields and builds its sentence in ``__str__``; a sentence
says where, what, which limit, and what to do.
"""

from __future__ import annotations

import math
from dataclasses import dataclass


class CalcsheetsError(Exception):
    """Base of every error that this program raises on purpose."""


@dataclass(eq=False)
class DefinitionError(CalcsheetsError):
    """A definition of the library contradicts itself.

    Attributes:
        subject: the relation, quantity, unit, gas or process.
        reason: what is wrong, as a clause.
    """

    subject: str
    reason: str

    def __str__(self) -> str:
        return f"definition of {self.subject}: {self.reason}"


@dataclass(eq=False)
class UnitError(CalcsheetsError):
    """A text with a unit that is not understood.

    Attributes:
        text: the text as typed.
        reason: what is wrong, as a clause.
        remedy: what to write instead, as a sentence without its full stop.
    """

    text: str
    reason: str
    remedy: str

    def __str__(self) -> str:
        return f'"{self.text}": {self.reason}. {self.remedy}.'


@dataclass(eq=False)
class UnknownGas(CalcsheetsError):
    """A gas name that the program does not know.

    Attributes:
        name: the name as typed.
        near: known names like it.
    """

    name: str
    near: tuple[str, ...]

    def __str__(self) -> str:
        ask = f" Did you mean {' or '.join(self.near)}?" if self.near else ""
        return (
            f'the gas "{self.name}" is not known.{ask} '
            "See calcsheets gases, or give gamma and M_w of your own."
        )


@dataclass(eq=False)
class BriefError(CalcsheetsError):
    """A brief that cannot be read.

    Attributes:
        file: name of the file as the caller gave it.
        line: line number counted from 1; 0 where the whole file is meant.
        where: the key in question, such as ``stations.receiver.p_0``.
        reason: what is wrong, as a clause.
        remedy: what to do, as a sentence without its full stop.
    """

    file: str
    line: int
    where: str
    reason: str
    remedy: str

    def __str__(self) -> str:
        place = f"{self.file}:{self.line}" if self.line else self.file
        where = f" {self.where}:" if self.where else ""
        return f"{place}:{where} {self.reason}. {self.remedy}."


class PlanningError(CalcsheetsError):
    """The wanted results cannot be reached from the inputs."""


@dataclass(eq=False)
class NotEnoughInputs(PlanningError):
    """A wanted quantity does not follow from the inputs.

    Attributes:
        wanted: the key that cannot be reached, such as ``mdot@orifice``.
        title: the quantity and its place in words.
        closing: sets of additional inputs, each of which would close the problem, best first.
        regimes: what stands against relations that would give it, as sentences.
    """

    wanted: str
    title: str
    closing: tuple[tuple[str, ...], ...]
    regimes: tuple[str, ...] = ()

    def __str__(self) -> str:
        head = f"{self.wanted} ({self.title}) does not follow from the inputs"
        if self.regimes:
            return f"{head}. {' '.join(self.regimes)} Change these inputs, or leave it out."
        if not self.closing:
            return (
                f"{head}: no relation offered by the path gives it. "
                "Add the process that determines it to [[path]], or correct the name."
            )
        sets = "; or ".join(" and ".join(names) for names in self.closing)
        return f"{head}. Give also: {sets}."


@dataclass(eq=False)
class ContradictoryInputs(PlanningError):
    """Two values for one quantity disagree.

    Attributes:
        quantity: key of the quantity, such as ``c_p@gas``.
        given: the value as given, with unit.
        derived: the value that the other inputs lead to, with unit.
        relation: title of the relation that leads to it.
        inputs: keys of the inputs that lead to it.
        difference: relative difference of the sides of the relation; infinite where one of
            them has no value.
    """

    quantity: str
    given: str
    derived: str
    relation: str
    inputs: tuple[str, ...]
    difference: float

    def __str__(self) -> str:
        lead = "lead" if len(self.inputs) > 1 else "leads"
        sides = (
            f"the two sides differ by {abs(self.difference):.3%}"
            if math.isfinite(self.difference)
            else "with these values one of its sides has none"
        )
        return (
            f"{self.quantity} is {self.given}, but {', '.join(self.inputs)} {lead} to "
            f"{self.derived} (relation: {self.relation}); {sides}. "
            "Remove one of these inputs, or correct it."
        )


@dataclass(eq=False)
class AmbiguousRegime(PlanningError):
    """The inputs agree with none or with several of the regimes of a process.

    Attributes:
        place: name of the process.
        agreeing: the regimes whose own test agrees.
        tried: all regimes that were tried.
        answers: what is wanted in each of the agreeing regimes, as text; may be left out.
    """

    place: str
    agreeing: tuple[str, ...]
    tried: tuple[str, ...]
    answers: tuple[str, ...] = ()

    def __str__(self) -> str:
        if self.agreeing:
            found = " and ".join(self.agreeing)
            if self.answers:
                each = zip(self.agreeing, self.answers, strict=True)
                found = "; ".join(f"{regime}: {answer}" for regime, answer in each)
            return (
                f"process {self.place}: the inputs agree with more than one regime ({found}). "
                f'Which is meant? State it as regime = "{self.agreeing[0]}" in its [[path]] entry.'
            )
        return (
            f"process {self.place}: each regime was tried ({', '.join(self.tried)}) and none "
            "agrees with its own test. Check the inputs of this process."
        )


class SolvingError(CalcsheetsError):
    """One planned relation does not give its unknown."""


@dataclass(eq=False)
class NoRoot(SolvingError):
    """No value of the unknown inside its bounds satisfies the relation.

    Attributes:
        relation: title of the relation.
        unknown: key of the unknown.
        bounds: the interval searched, as text.
        reached: the range that the relation reaches inside the bounds, as text.
        asked: what the other side asks for, as text.
        limits: limits of the relation that the inputs miss, as clauses.
    """

    relation: str
    unknown: str
    bounds: str
    reached: str
    asked: str
    limits: tuple[str, ...] = ()

    def __str__(self) -> str:
        missed = f" Limit not met: {'; '.join(self.limits)}." if self.limits else ""
        return (
            f"{self.relation}: no {self.unknown} within {self.bounds} satisfies it; "
            f"there the relation reaches {self.reached}, asked is {self.asked}. "
            f"Check the inputs of this step.{missed}"
        )


@dataclass(eq=False)
class SeveralRoots(SolvingError):
    """More than one value of the unknown satisfies the relation, and no branch is stated.

    Attributes:
        relation: title of the relation.
        unknown: key of the unknown.
        roots: each root as a number in coherent SI, in rising order.
        branches: the branch names that may be stated.
        place: where to state the branch.
        shown: the roots in a unit of the trade, where the coherent one is not read.
    """

    relation: str
    unknown: str
    roots: tuple[str, ...]
    branches: tuple[str, ...]
    place: str
    shown: tuple[str, ...] = ()

    def __str__(self) -> str:
        names = " or ".join(f'branch = "{name}"' for name in self.branches)
        remedy = (
            f"State {names} at {self.place}"
            if self.branches
            else f"Give {self.unknown}, or an input that decides it"
        )
        return (
            f"{self.relation}: {self.unknown} may be {' or '.join(self.shown or self.roots)}. "
            f"Which is meant? {remedy}."
        )


@dataclass(eq=False)
class UndecidedRoots(SolvingError):
    """The search for roots was given up; nothing is known about them.

    Attributes:
        relation: title of the relation.
        unknown: key of the unknown.
        bounds: the interval searched, as text.
    """

    relation: str
    unknown: str
    bounds: str

    def __str__(self) -> str:
        return (
            f"{self.relation}: the search for {self.unknown} within {self.bounds} did not come "
            f"to an end, so nothing is known about its roots. Give {self.unknown}, or other inputs."
        )


@dataclass(eq=False)
class OutsideLimit(SolvingError):
    """A relation means nothing at the values that the calculation came to.

    Attributes:
        relation: title of the relation.
        unknown: key of the quantity that it gave.
        limit: the limit that is not met, as a clause.
        found: the values of both sides of the limit, as a clause; empty where they say nothing.
    """

    relation: str
    unknown: str
    limit: str
    found: str = ""

    def __str__(self) -> str:
        found = f": {self.found}" if self.found else ""
        return (
            f"{self.relation}, for {self.unknown}: {self.limit}, and the inputs lead to values "
            f"outside that{found}. Check the inputs of this step."
        )


@dataclass(eq=False)
class UntabulatedIntegral(SolvingError):
    """An integral that no sum of the workbook comes near.

    Attributes:
        variable: what it runs over.
        places: how many places were tried at most.
    """

    variable: str
    places: int

    def __str__(self) -> str:
        return (
            f"the integral over {self.variable}: a sum over {self.places} places does not give it "
            "to the digits of a workbook. Check the inputs of this step: the integrand may be "
            "without bound at a limit, or change sharply between them."
        )


@dataclass(eq=False)
class CheckError(CalcsheetsError):
    """An independent engine finds another value than the program.

    Attributes:
        engine: the engine that recalculated.
        cell: sheet and cell.
        stored: the value that the program stored.
        found: the value that the engine found.
    """

    engine: str
    cell: str
    stored: str
    found: str

    def __str__(self) -> str:
        return (
            f"{self.cell}: the program computed {self.stored}, {self.engine} finds {self.found}. "
            "The workbook was not written; report this as a fault of the program."
        )


@dataclass(eq=False)
class OutputError(CalcsheetsError):
    """A file cannot be written or read.

    Attributes:
        path: the file.
        reason: what the system said, as a clause.
        remedy: what to do, as a sentence without its full stop.
    """

    path: str
    reason: str
    remedy: str

    def __str__(self) -> str:
        return f"{self.path}: {self.reason}. {self.remedy}."
