"""What the sheet prints for each step of the calculation."""

from __future__ import annotations

from collections.abc import Iterable, Iterator
from dataclasses import dataclass
from fractions import Fraction

from markupsafe import Markup

from ...expressions import (
    CONSTANTS,
    Condition,
    Constant,
    Equation,
    Expr,
    Symbol,
    constants_in,
    decimal_text,
    dimension_of,
)
from ...record import LimitRecord, Record, RelationRecord, StepRecord
from ..typesetting import (
    NumberText,
    move_words,
    plain_text,
    significant,
    substituted_mathml,
    symbol_mathml,
    symbol_text,
    typed,
)
from .breaking import inside_of
from .figures import (
    coherent_unit,
    equation_html,
    equation_picture,
    number_html,
    sides_html,
    symbol_html,
    value_html,
    working,
)
from .integrals import IntegralLine, integral_lines, running_variables
from .picture import picture
from .views import ResultLine, known_text, result_lines

_MOVE_SHARE = 0.62
_LIMIT_SHARE = 0.26
_TEXT_DEPTH = 3.4  # how far a line of text reaches below its baseline, in points


@dataclass(frozen=True)
class Line:
    """An equation with its number and the words that lead to it.

    Attributes:
        number: number of the equation.
        words: the move in words, empty for the published form.
        operand: operand of the move as a picture, or ``None``.
        equation: the equation as a picture.
        rise: how far above its bottom the number stands, in points.
    """

    number: str
    words: str
    operand: Markup | None
    equation: Markup
    rise: float


@dataclass(frozen=True)
class Where:
    """One line of the list of symbols; ``kind`` is ``input``, ``step``, ``integral`` or
    ``constant``."""

    symbol: Markup
    title: str
    place: str
    value: Markup
    kind: str
    number: int
    source: str


@dataclass(frozen=True)
class LimitLine:
    """One limit with the values of both sides; ``None`` where they are not known."""

    condition: Markup
    left: Markup | None
    right: Markup | None
    holds: bool | None
    reason: str


@dataclass(frozen=True)
class CaseLine:
    """One case of a regime test with the values of both sides.

    Attributes:
        line: the condition, and the regime that it means.
        substituted: the condition with numbers.
        left: value of the left side.
        right: value of the right side.
        holds: whether it holds; ``None`` behind the case that decides.
    """

    line: Line
    substituted: Markup
    left: Markup
    right: Markup
    holds: bool | None


@dataclass(frozen=True)
class Card:
    """One step as printed."""

    step: StepRecord
    relation: RelationRecord
    known: str
    symbol: Markup | None
    together: tuple[Line, ...]
    published: Line | None
    cases: tuple[CaseLine, ...]
    equal_within: Markup | None
    lines: tuple[Line, ...]
    substituted: Markup | None
    value: Markup | None
    residual: Markup | None
    bracket: tuple[Markup, ...]
    other_roots: tuple[tuple[Markup, str], ...]
    limits: tuple[LimitLine, ...]
    integrals: tuple[IntegralLine, ...]
    where: tuple[Where, ...]
    results: tuple[ResultLine, ...]


def cards(record: Record, width: float) -> tuple[Card, ...]:
    """Return every step of a record as printed.

    Args:
        record: the record.
        width: width for equations, in points.
    """
    return tuple(_card(record, step, width) for step in record.steps)


def _card(record: Record, step: StepRecord, width: float) -> Card:
    relation = record.relation(step.relation)
    published = relation.published
    lines = tuple(_lines(step, width))
    return Card(
        step=step,
        relation=relation,
        known=known_text(relation),
        symbol=None if step.test else symbol_html(step.symbol),
        together=tuple(_together(record, step, width)),
        published=None if step.test else _line(f"{step.number}.1", published, width),
        cases=tuple(_cases(step, width)),
        equal_within=number_html(significant(step.test.equal_within, 2)) if step.test else None,
        lines=lines,
        substituted=None if step.test else _substituted(step, published, width),
        value=None if step.value is None else value_html(step.value, step.unit),
        residual=number_html(significant(step.residual, 2)) if step.residual else None,
        bracket=tuple(value_html(end, step.unit) for end in step.bracket),
        other_roots=tuple((value_html(r.value, step.unit), r.reason) for r in step.other_roots),
        limits=tuple(_limit(limit, width) for limit in step.limits),
        integrals=integral_lines(step, width),
        where=(*_operands(step), *_running(step), *_constants(_stated(step, published))),
        results=tuple(line for line in result_lines(record) if line.result.step == step.number),
    )


def _stated(step: StepRecord, published: Equation | Condition) -> tuple[Equation | Condition, ...]:
    """What the step states: its equation, or every condition of its regime test."""
    return tuple(case.condition for case in step.test.cases) if step.test else (published,)


def _cases(step: StepRecord, width: float) -> Iterator[CaseLine]:
    """The cases of a regime test; the outcome says which of them decides."""
    if step.test is None:
        return
    decided = False
    for number, case in enumerate(step.test.cases, start=1):
        holds = None if decided else case.outcome == step.test.outcome
        decided = decided or bool(holds)
        left, right = _sides(case.condition, case.left, case.right)
        yield CaseLine(
            line=_line(f"{step.number}.{number}", case.condition, width, f"{case.outcome} if"),
            substituted=_substituted(step, case.condition, width),
            left=left,
            right=right,
            holds=holds,
        )


def _together(record: Record, step: StepRecord, width: float) -> Iterator[Line]:
    """The relations of a coupled set, and what each but the last is solved for."""
    letters = iter("abcdefghijklmnopqrstuvwxyz")
    for member in step.combination:
        words = f"{record.relation(member.relation).title}, {member.place}"
        yield _line(f"{step.number}.{next(letters)}", member.published, width, words)
        if member.symbol is not None and member.solved is not None:
            solved = Equation(member.symbol, member.solved)
            if solved != member.published:
                yield _line(f"{step.number}.{next(letters)}", solved, width, "solved")


def _lines(step: StepRecord, width: float) -> Iterator[Line]:
    for index, move in enumerate(step.moves, start=2):
        words, operand = move_words(move.action, move.operand)
        shown = None if operand is None else equation_html(operand, width * _MOVE_SHARE)
        yield _line(f"{step.number}.{index}", move.result, width, words, shown)
    if step.moves and step.solved is not None:
        solved = Equation(step.symbol, step.solved)
        if solved != step.moves[-1].result:
            number = f"{step.number}.{len(step.moves) + 2}"
            yield _line(number, solved, width, "solve for the wanted root")


def _line(
    number: str,
    statement: Equation | Condition,
    width: float,
    words: str = "",
    operand: Markup | None = None,
) -> Line:
    depth = equation_picture(statement, width).depth
    return Line(
        number, words, operand, equation_html(statement, width), max(0.0, depth - _TEXT_DEPTH)
    )


def _numbers(
    step: StepRecord, stated: Equation | Condition
) -> dict[Symbol | Constant, tuple[NumberText, str]]:
    """The number of every operand, and of every constant but π."""
    found: dict[Symbol | Constant, tuple[NumberText, str]] = {
        operand.symbol: (working(operand.value), operand.unit)
        for operand in step.operands
        if step.test is None or operand.symbol in stated.symbols
    }
    for constant in _constants_of((stated.left, stated.right)):
        definition = CONSTANTS[constant.name]
        if definition.value is not None:
            unit = coherent_unit(definition.dimension)
            found[constant] = (working(float(definition.value)), unit)
    return found


def _substituted(step: StepRecord, stated: Equation | Condition, width: float) -> Markup:
    """Numbers in the place of symbols: in the solved form, or in both sides of what is published.

    A root has no solved form, so the value found is put into the published one.
    """
    numbers = _numbers(step, stated)
    values = ", ".join(
        f"{symbol_text(symbol)} = {number.with_unit(unit)}"
        for symbol, (number, unit) in numbers.items()
    )
    if step.solved is not None:
        left, right = symbol_mathml(step.symbol), substituted_mathml(step.solved, numbers)
        words = f"{symbol_text(step.symbol)} = {plain_text(step.solved)} with {values}"
        return sides_html(left, right, words, width)
    if step.value is not None:
        found = (working(step.value), step.unit)
        numbers[step.symbol] = found
        values = f"{values}, {symbol_text(step.symbol)} = {found[0].with_unit(found[1])}"
    words = f"{plain_text(stated)} with {values}"
    return _picture_of(substituted_mathml(stated, numbers), words, width)


def _picture_of(mathml: str, words: str, width: float) -> Markup:
    return picture(inside_of(mathml), width).svg(words)


def _sides(condition: Condition, left: float | None, right: float | None) -> tuple[Markup, ...]:
    """Both sides of a condition with their unit; none where they are not known."""
    if left is None or right is None:
        return ()
    unit = coherent_unit(dimension_of(condition.left))
    return tuple(value_html(value, unit) for value in (left, right))


def _limit(limit: LimitRecord, width: float) -> LimitLine:
    sides = _sides(limit.condition, limit.left, limit.right) or (None, None)
    shown = equation_html(limit.condition, width * _LIMIT_SHARE)
    return LimitLine(shown, sides[0], sides[1], limit.holds, limit.reason)


def _operands(step: StepRecord) -> Iterator[Where]:
    for operand in (*step.operands, *step.limit_operands):
        kind = "input" if operand.input else "step"
        yield Where(
            symbol_html(operand.symbol),
            operand.title,
            operand.place,
            value_html(operand.value, operand.unit),
            kind,
            operand.input or operand.step,
            "",
        )


def _running(step: StepRecord) -> Iterator[Where]:
    """The variables of integrals, which have no value of their own."""
    for symbol in running_variables(step):
        yield Where(
            symbol_html(symbol), symbol.definition.title, "", Markup("runs"), "integral", 0, ""
        )


def _constants(stated: Iterable[Equation | Condition]) -> Iterator[Where]:
    for constant in _constants_of(side for item in stated for side in (item.left, item.right)):
        definition = CONSTANTS[constant.name]
        if definition.value is None:
            continue
        yield Where(
            symbol_html(constant),
            definition.title,
            "",
            number_html(_in_full(definition.value), coherent_unit(definition.dimension)),
            "constant",
            0,
            definition.source,
        )


def _in_full(value: Fraction) -> NumberText:
    """All digits of a decimal; a fraction without an end is rounded as values are."""
    text = decimal_text(value)
    return working(float(value)) if "/" in text else typed(text)


def _constants_of(expressions: Iterable[Expr]) -> tuple[Constant, ...]:
    return tuple(dict.fromkeys(found for e in expressions for found in constants_in(e)))
