"""A brief as a frozen value: what is known, where it came from, what is wanted."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass, field
from decimal import Decimal

from ..gases import Gas
from ..quantities import Measured, Unit, Variable

STATUSES = ("verified", "to be confirmed", "preliminary")
USES = ("minimum", "maximum", "best estimate")
CONSEQUENCES = ("fail", "caution")
ASSUMPTION_STATUSES = ("justified", "to be confirmed")
BASES = ("mole", "mass")


@dataclass(frozen=True)
class Given:
    """One input.

    Attributes:
        variable: the quantity that the text states; gauge for a gauge pressure.
        measured: number and unit as typed.
        source: document, revision and page.
        tolerance: tolerance as typed, empty for none.
        status: one of ``STATUSES``.
        line: line in the brief; 0 for a value of the gas data.
    """

    variable: Variable
    measured: Measured
    source: str
    tolerance: str
    status: str
    line: int


@dataclass(frozen=True)
class SameAs:
    """A quantity that the brief states to be equal to another.

    Attributes:
        variable: the quantity.
        other: the quantity that it equals.
        source: why.
        line: line in the brief.
    """

    variable: Variable
    other: Variable
    source: str
    line: int


@dataclass(frozen=True)
class Station:
    """A named place in the flow path.

    Attributes:
        name: its name.
        kind: ``stream`` or ``vessel``.
        title: the place in words.
        branch: stated branch, empty for none.
        line: line in the brief.
    """

    name: str
    kind: str
    title: str
    branch: str
    line: int


@dataclass(frozen=True)
class Leg:
    """One process of the path.

    Attributes:
        name: its name, at which its own quantities stand.
        start: name of the first station.
        end: name of the second station.
        process: name of the process.
        through: name of the orifice leg that the gas passes, empty for none.
        title: the process in words.
        regime: stated regime, empty for none.
        branch: stated branch, empty for none.
        line: line in the brief.
    """

    name: str
    start: str
    end: str
    process: str
    through: str
    title: str
    regime: str
    branch: str
    line: int


@dataclass(frozen=True)
class Limit:
    """One side of a criterion.

    Attributes:
        comparison: ``<=`` or ``>=``.
        measured: the limit as typed.
        variable: the quantity that the limit states; the gauge quantity for a gauge limit.
    """

    comparison: str
    measured: Measured
    variable: Variable


@dataclass(frozen=True)
class Wanted:
    """One result that is asked for.

    Attributes:
        variable: the quantity in the form in which it is wanted.
        unit: unit in which it is wanted; ``None`` for a state in words.
        digits: significant digits to print.
        limits: the criterion, empty for none.
        used_as: one of ``USES``, empty where not stated.
        otherwise: what a missed criterion means, one of ``CONSEQUENCES``.
        title: the result in words, empty for the name of the quantity.
        line: line in the brief.
    """

    variable: Variable
    unit: Unit | None
    digits: int
    limits: tuple[Limit, ...]
    used_as: str
    otherwise: str
    title: str
    line: int


@dataclass(frozen=True)
class GasStatement:
    """The gas of the calculation.

    Attributes:
        title: the gas in words.
        components: gas and fraction, by name of the gas; empty for a single gas.
        basis: ``mole`` or ``mass``.
        library: the gas whose data are used, ``None`` for a mixture or own properties.
        named: the gas that the name means, also where the brief gives its own properties.
        cautions: what can hurt someone.
    """

    title: str
    components: tuple[tuple[Gas, Decimal], ...]
    basis: str
    library: Gas | None
    named: Gas | None
    cautions: tuple[str, ...]


@dataclass(frozen=True)
class Assumption:
    """One assumption.

    Attributes:
        text: the assumption.
        status: one of ``ASSUMPTION_STATUSES``.
        basis: justification or reference.
        owner: who confirms it.
        due: by when.
    """

    text: str
    status: str
    basis: str
    owner: str
    due: str


@dataclass(frozen=True)
class Reference:
    """One document that the calculation rests on."""

    id: str
    title: str
    edition: str


@dataclass(frozen=True)
class Brief:
    """Everything that the originator states.

    Attributes:
        file: name of the file.
        text: its whole text, kept for the package.
        identity: fields of ``[calculation]``, in the order of the form.
        gas: the gas.
        stations: by order of the file.
        legs: the path, by order of the file.
        given: every input, gas data included.
        same_as: stated equalities.
        wanted: every wanted result.
        assumptions: in order.
        references: in order.
        cautions: in order.
    """

    file: str
    text: str = field(repr=False)
    identity: Mapping[str, str]
    gas: GasStatement
    stations: tuple[Station, ...]
    legs: tuple[Leg, ...]
    given: tuple[Given, ...]
    same_as: tuple[SameAs, ...]
    wanted: tuple[Wanted, ...]
    assumptions: tuple[Assumption, ...]
    references: tuple[Reference, ...]
    cautions: tuple[str, ...]
