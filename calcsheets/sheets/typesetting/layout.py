"""Where an expression needs brackets, signs and multiplication signs.

The layout is decided once, here; MathML, LaTeX and plain text only print it. Operands keep
their published order. A fraction is stacked, or linear inside exponents and in plain text.
"""

from __future__ import annotations

from collections.abc import Callable, Iterator
from dataclasses import dataclass, replace
from enum import IntEnum
from fractions import Fraction

from ...errors import DefinitionError
from ...expressions import (
    Condition,
    Constant,
    Equation,
    Expr,
    Function,
    Integral,
    Negative,
    Number,
    Power,
    Product,
    Quotient,
    Root,
    Sum,
    Symbol,
    decimal_text,
)
from .lettering import Letter, letter_of
from .numbers import MINUS, NumberText, typed


@dataclass(frozen=True)
class Digits:
    """A number, with a printed unit or an empty text."""

    number: NumberText
    unit: str = ""


@dataclass(frozen=True)
class Sign:
    """An operator between or before operands: ``+ − / · × = ≤ ≥ < >`` or a thin space."""

    text: str
    prefix: bool = False


@dataclass(frozen=True)
class Row:
    """Parts side by side."""

    parts: tuple[Box, ...]


@dataclass(frozen=True)
class Stacked:
    """A fraction with a bar."""

    above: Box
    below: Box


@dataclass(frozen=True)
class Raised:
    """A base with an exponent."""

    base: Box
    exponent: Box


@dataclass(frozen=True)
class RootOf:
    """A square root."""

    radicand: Box


@dataclass(frozen=True)
class Called:
    """A named function of a bracketed argument."""

    name: str
    argument: Box


@dataclass(frozen=True)
class Bracketed:
    """A box in round brackets."""

    inside: Box


@dataclass(frozen=True)
class Integrated:
    """An integral sign with its limits, the integrand and its variable behind a ``d``."""

    low: Box
    high: Box
    integrand: Box
    variable: Box


Box = Letter | Digits | Sign | Row | Stacked | Raised | RootOf | Called | Bracketed | Integrated


class Strength(IntEnum):
    """How firmly the parts of a box hold together, from loose to firm."""

    SUM = 0
    QUOTIENT = 1  # linear, or a product that holds one
    PRODUCT = 2
    POWER = 3
    ATOM = 4


@dataclass(frozen=True)
class Piece:
    """A box with its strength."""

    box: Box
    strength: Strength

    def at_least(self, strength: Strength) -> Box:
        """Return the box, in brackets if its parts hold together less firmly than asked."""
        return self.box if self.strength >= strength else Bracketed(self.box)


THIN = "\u2009"


def symbol_piece(symbol: Symbol | Constant) -> Piece:
    """Return the letter of a symbol or constant as a piece."""
    return Piece(letter_of(symbol), Strength.ATOM)


@dataclass(frozen=True)
class Manner:
    """How an expression is laid out.

    Attributes:
        linear: whether fractions stand in the line.
        times: the sign between factors: a thin space, ``·`` or ``×``.
        leaf: what a symbol or constant becomes.
    """

    linear: bool
    times: str
    leaf: Callable[[Symbol | Constant], Piece] = symbol_piece


_COMPARISONS = {"<=": "≤", ">=": "≥", "<": "<", ">": ">"}


def lay_out(statement: Expr | Equation | Condition, manner: Manner) -> Box:
    """Return an expression, an equation or a condition as boxes.

    Raises:
        DefinitionError: if the statement holds something that is no node of a tree.
    """
    match statement:
        case Equation(left, right):
            sign = "="
        case Condition(left, comparison, right):
            sign = _COMPARISONS[comparison]
        case _:
            return piece(statement, manner).box
    return Row((piece(left, manner).box, Sign(sign), piece(right, manner).box))


def piece(expr: Expr, manner: Manner) -> Piece:
    """Return one expression as a piece."""
    terms = tuple(_terms(expr, manner))
    if len(terms) > 1 or terms[0][0]:
        return _sum(terms, manner)
    return _unsigned(terms[0][1], manner)


def _unsigned(expr: Expr, manner: Manner) -> Piece:
    match expr:
        case Symbol() | Constant():
            return manner.leaf(expr)
        case Number(value):
            return _number(value)
        case Product(factors):
            return _product(factors, manner)
        case Quotient(numerator, denominator):
            return _quotient(numerator, denominator, manner)
        case Power(base, exponent):
            return _power(base, exponent, manner)
        case Root(radicand):
            return Piece(RootOf(piece(radicand, manner).box), Strength.POWER)
        case Function(name, argument):
            return Piece(Called(name, piece(argument, manner).box), Strength.POWER)
        case Integral():
            return _integral(expr, manner)
    raise DefinitionError(f"expression {expr!r}", "it is no node of an expression tree")


def _integral(integral: Integral, manner: Manner) -> Piece:
    """The variable stays a letter where every other symbol becomes its number."""

    def leaf(symbol: Symbol | Constant) -> Piece:
        return symbol_piece(symbol) if symbol == integral.variable else manner.leaf(symbol)

    inside = piece(integral.integrand, replace(manner, leaf=leaf)).at_least(Strength.PRODUCT)
    in_line = replace(manner, linear=True)
    low, high = (piece(limit, in_line).box for limit in (integral.low, integral.high))
    box = Integrated(low, high, inside, symbol_piece(integral.variable).box)
    return Piece(box, Strength.QUOTIENT)  # what follows must not be read into it


def _terms(expr: Expr, manner: Manner) -> Iterator[tuple[bool, Expr]]:
    """Yield the terms of a sum, each with whether a minus sign stands before it."""
    if isinstance(expr, Sum):
        for term in expr.terms:
            yield from _terms(term, manner)
    else:
        yield _signed(expr, manner)


def _signed(expr: Expr, manner: Manner) -> tuple[bool, Expr]:
    """Take a minus sign out to the left, where the value allows it."""
    match expr:
        case Negative(operand):
            return True, operand
        case Number(value) if value < 0:
            return True, Number(-value)
        case Product((first, *rest)):
            negative, size = _signed(first, manner)
            if not negative:
                return False, expr
            kept = tuple(rest) if rest and size == Number(Fraction(1)) else (size, *rest)
            return True, kept[0] if len(kept) == 1 else Product(kept)
        case Quotient(numerator, denominator) if _in_line(numerator, denominator, manner):
            negative, size = _signed(numerator, manner)
            return negative, Quotient(size, denominator)
    return False, expr


def _sum(terms: tuple[tuple[bool, Expr], ...], manner: Manner) -> Piece:
    parts: list[Box] = []
    for index, (negative, expr) in enumerate(terms):
        if negative or index:
            parts.append(Sign(MINUS if negative else "+", prefix=not index))
        term = piece(expr, manner)
        parts.append(term.at_least(Strength.QUOTIENT) if negative or index else term.box)
    return Piece(Row(tuple(parts)), Strength.SUM)


def _number(value: Fraction) -> Piece:
    text = decimal_text(value)
    if "/" not in text:
        return Piece(Digits(typed(text)), Strength.ATOM)
    above, below = (Digits(typed(part)) for part in text.split("/"))
    return Piece(Row((above, Sign("/"), below)), Strength.QUOTIENT)


def _product(factors: tuple[Expr, ...], manner: Manner) -> Piece:
    pieces = tuple(piece(factor, manner) for factor in _flat(factors))
    # In a line a solidus is not followed by a product without brackets (ISO 80000-1, from
    # memory): a/b·c would be read in two ways.
    inner = Strength.PRODUCT if manner.linear else Strength.QUOTIENT
    boxes = [p.at_least(inner) for p in pieces[:-1]] + [pieces[-1].at_least(Strength.QUOTIENT)]
    parts: list[Box] = [boxes[0]]
    for left, box in zip(pieces, boxes[1:], strict=False):
        parts += [Sign(_times(left, box, manner)), box]
    open_pieces = pieces[-1:] if manner.linear else pieces
    holds_quotient = any(p.strength == Strength.QUOTIENT for p in open_pieces)
    strength = Strength.QUOTIENT if holds_quotient else Strength.PRODUCT
    return Piece(Row(tuple(parts)), strength)


def _flat(factors: tuple[Expr, ...]) -> Iterator[Expr]:
    for factor in factors:
        if isinstance(factor, Product):
            yield from _flat(factor.factors)
        else:
            yield factor


def _times(left: Piece, right: Box, manner: Manner) -> str:
    """A visible sign where a number follows, or where a linear fraction would run on."""
    unclear = left.strength == Strength.QUOTIENT or _starts_with_digit(right)
    return "·" if manner.times == THIN and unclear else manner.times


def _starts_with_digit(box: Box) -> bool:
    match box:
        case Digits():
            return True
        case Row(parts):
            return _starts_with_digit(parts[0])
        case Raised(base, _):
            return _starts_with_digit(base)
    return False


def _quotient(numerator: Expr, denominator: Expr, manner: Manner) -> Piece:
    above, below = piece(numerator, manner), piece(denominator, manner)
    if not _in_line(numerator, denominator, manner):
        return Piece(Stacked(above.box, below.box), Strength.POWER)
    row = Row((above.at_least(Strength.PRODUCT), Sign("/"), below.at_least(Strength.POWER)))
    return Piece(row, Strength.QUOTIENT)


def _in_line(numerator: Expr, denominator: Expr, manner: Manner) -> bool:
    """A fraction of two plain numbers never needs a bar."""
    plain = isinstance(numerator, Number) and isinstance(denominator, Number)
    return manner.linear or plain


def _power(base: Expr, exponent: Expr, manner: Manner) -> Piece:
    raised = piece(exponent, replace(manner, linear=True))
    return Piece(Raised(piece(base, manner).at_least(Strength.ATOM), raised.box), Strength.POWER)
