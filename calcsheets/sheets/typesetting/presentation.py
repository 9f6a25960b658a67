"""Presentation MathML (ISO/IEC 40314) of expressions, as published and with numbers put in."""

from __future__ import annotations

from collections.abc import Mapping
from xml.sax.saxutils import escape

from ...errors import DefinitionError
from ...expressions import Condition, Constant, Equation, Expr, Symbol
from .layout import (
    THIN,
    Box,
    Bracketed,
    Called,
    Digits,
    Integrated,
    Manner,
    Piece,
    Raised,
    RootOf,
    Row,
    Sign,
    Stacked,
    Strength,
    lay_out,
    symbol_piece,
)
from .lettering import Letter, base_runs, italic_subscript
from .numbers import GROUP_SPACE, NumberText, signed_integer, typed, unit_text

Operand = tuple[NumberText | str, str]
"""A number, ready for print or as typed, and a unit of the closed list."""

_NAMESPACE = "http://www.w3.org/1998/Math/MathML"
_STACKED = Manner(linear=False, times=THIN)
_TIMES = "×"
_TIGHT_SIGNS = ("/",)
_GROUP_SPACE = "\u2006"  # a little wider than in text, which the drawn letters need


def presentation_mathml(statement: Expr | Equation | Condition) -> str:
    """Return an expression, equation or condition as one ``math`` element."""
    return _math(lay_out(statement, _STACKED))


def substituted_mathml(
    statement: Expr | Equation | Condition, operands: Mapping[Symbol | Constant, Operand]
) -> str:
    """Return the same statement with a number and its unit in the place of every symbol.

    Args:
        statement: what is set.
        operands: for each of its symbols, and for constants that shall not stay letters, the
            number and the name of its unit.

    Raises:
        DefinitionError: if a symbol has no operand.
    """

    def leaf(symbol: Symbol | Constant) -> Piece:
        if symbol not in operands:
            if isinstance(symbol, Constant):
                return symbol_piece(symbol)
            raise DefinitionError(f"symbol {symbol}", "no number is given to put in its place")
        number, unit = operands[symbol]
        return _number_piece(number if isinstance(number, NumberText) else typed(number), unit)

    return _math(lay_out(statement, Manner(linear=False, times=_TIMES, leaf=leaf)))


def number_mathml(number: NumberText, unit: str = "1") -> str:
    """Return a number with its unit as one ``math`` element."""
    return _math(_number_piece(number, unit).box)


def symbol_mathml(symbol: Symbol) -> str:
    """Return a symbol as one ``math`` element."""
    return presentation_mathml(symbol)


def _number_piece(number: NumberText, unit: str) -> Piece:
    printed = unit_text(unit)
    if number.negative:
        strength = Strength.SUM
    elif "/" in printed:
        strength = Strength.QUOTIENT
    elif printed or number.exponent is not None:
        strength = Strength.PRODUCT
    else:
        strength = Strength.ATOM
    return Piece(Digits(number, printed), strength)


def _math(box: Box) -> str:
    return f'<math xmlns="{_NAMESPACE}" display="block">{_inside(box)}</math>'


def _markup(box: Box) -> str:
    match box:
        case Letter():
            return _letter(box, "")
        case Digits(number, unit):
            return _digits(number, unit)
        case Sign(text, prefix):
            return _sign(text, prefix)
        case Row():
            return _row(_inside(box))
        case Stacked(above, below):
            return f"<mfrac>{_markup(above)}{_markup(below)}</mfrac>"
        case Raised(Letter() as base, exponent):
            return _letter(base, _markup(exponent))
        case Raised(base, exponent):
            return f"<msup>{_markup(base)}{_markup(exponent)}</msup>"
        case RootOf(radicand):
            return f"<msqrt>{_inside(radicand)}</msqrt>"
        case Called(name, argument):
            return _row(_inside(Called(name, argument)))
        case Bracketed(inside):
            return _brackets(inside)
        case Integrated():
            return _row(_integral(box))


def _inside(box: Box) -> str:
    """Return the markup without its own row, for an element that is a row already.

    Rows in rows double the time of drawing with every level.
    """
    match box:
        case Row(parts):
            return "".join(_inside(part) for part in parts)
        case Called(name, argument):
            return f'<mi mathvariant="normal">{name}</mi>{_brackets(argument)}'
        case _:
            return _markup(box)


def _integral(box: Integrated) -> str:
    sign = '<mo largeop="true" lspace="0" rspace="0.1em">∫</mo>'
    limits = f"{_row(_inside(box.low))}{_row(_inside(box.high))}"
    running = f'<mi mathvariant="normal">d</mi>{_markup(box.variable)}'
    space = '<mspace width="0.167em"/>'
    return f"<munderover>{sign}{limits}</munderover>{_inside(box.integrand)}{space}{running}"


def _row(inside: str) -> str:
    return f"<mrow>{inside}</mrow>"


def _brackets(inside: Box) -> str:
    opening = '<mo fence="true" form="prefix">(</mo>'
    closing = '<mo fence="true" form="postfix">)</mo>'
    return _row(f"{opening}{_inside(inside)}{closing}")


def _sign(text: str, prefix: bool) -> str:
    if text == THIN:
        return '<mspace width="0.167em"/>'
    if text in _TIGHT_SIGNS:
        return f'<mo lspace="0" rspace="0">{text}</mo>'
    form = "prefix" if prefix else "infix"
    return f'<mo form="{form}">{escape(text)}</mo>'


def _digits(number: NumberText, unit: str) -> str:
    parts = [f"<mn>{number.mantissa.replace(GROUP_SPACE, _GROUP_SPACE)}</mn>"]
    if number.exponent is not None:
        power = f"<msup><mn>10</mn><mn>{signed_integer(number.exponent)}</mn></msup>"
        parts += [f"<mo>{_TIMES}</mo>", power]
    if unit:
        parts += [
            '<mspace width="0.167em"/>',
            f'<mtext mathvariant="normal">{escape(unit)}</mtext>',
        ]
    return parts[0] if len(parts) == 1 else _row("".join(parts))


def _letter(letter: Letter, exponent: str) -> str:
    """An exponent stands above the subscript, and beside the star of a critical quantity."""
    base = _row_of([_run(text, italic) for text, italic in base_runs(letter)])
    if letter.accent == "dot":
        base = f'<mover accent="true">{base}<mo>˙</mo></mover>'
    below = _row_of(_subscripts(letter.subscripts))
    stars = [f"<mo>{letter.superscript}</mo>"] if letter.superscript else []
    above = _row_of([*stars, *([exponent] if exponent else [])])
    if below and above:
        return f"<msubsup>{base}{below}{above}</msubsup>"
    if below:
        return f"<msub>{base}{below}</msub>"
    return f"<msup>{base}{above}</msup>" if above else base


def _row_of(parts: list[str]) -> str:
    return _row("".join(parts)) if len(parts) > 1 else "".join(parts)


def _run(text: str, italic: bool) -> str:
    if italic:
        return f"<mi>{text}</mi>"
    tag = "mi" if len(text) == 1 else "mtext"
    return f'<{tag} mathvariant="normal">{escape(text)}</{tag}>'


def _subscripts(texts: tuple[str, ...]) -> list[str]:
    parts: list[str] = []
    for index, text in enumerate(texts):
        parts += ['<mtext mathvariant="normal">,</mtext>'] if index else []
        parts.append(f"<mn>{text}</mn>" if text.isdigit() else _run(text, italic_subscript(text)))
    return parts
