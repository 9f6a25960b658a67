"""Numbers, symbols and equations as the templates print them."""

from __future__ import annotations

from decimal import ROUND_HALF_EVEN, Context, Decimal
from fractions import Fraction

from markupsafe import Markup, escape

from ...expressions import Condition, Constant, Equation, Expr, Symbol, decimal_text
from ...quantities import Dimension, catalogue
from ...record import InputRecord, ResultRecord
from ..typesetting import (
    NumberText,
    draw,
    plain_text,
    presentation_mathml,
    significant,
    symbol_mathml,
    symbol_text,
    typed,
    unit_text,
)
from .breaking import inside_of, joined
from .picture import SIZE, Picture, picture

WORKING_DIGITS = 8
"""Significant digits with which a person repeats a step."""

_LONGEST_FACTOR = 14  # characters
_LONG_FACTOR_DIGITS = 10

_LONGEST_PLAIN = 5


def working(value: float) -> NumberText:
    """Return a number with eight significant digits, or in full where it has fewer.

    Args:
        value: the double, in coherent SI.
    """
    for digits in range(1, WORKING_DIGITS):
        rounded = Context(prec=digits, rounding=ROUND_HALF_EVEN).create_decimal(Decimal(value))
        if float(rounded) == value:
            whole = rounded.adjusted() + 1
            return significant(value, max(digits, whole if whole <= _LONGEST_PLAIN + 1 else 0))
    return significant(value, WORKING_DIGITS)


def number_html(number: NumberText, unit: str = "1") -> Markup:
    """Return a number with its unit, on one line."""
    mantissa, exponent = number.parts
    text = escape(mantissa)
    if exponent:
        text += Markup("\u00a0×\u00a010<sup>{}</sup>").format(exponent)
    printed = unit_text(unit)
    if printed:
        text += Markup("\u00a0{}").format(printed)
    return Markup('<span class="number">{}</span>').format(text)


def value_html(value: float, unit: str = "1") -> Markup:
    """Return a value of the calculation with its unit."""
    return number_html(working(value), unit)


def result_html(result: ResultRecord) -> Markup:
    """Return a result in the unit and with the digits that were asked for."""
    if result.value is None:
        return Markup('<span class="number">{}</span>').format(result.state)
    return number_html(significant(result.value, result.digits), result.unit)


def symbol_html(symbol: Symbol | Constant) -> Markup:
    """Return a symbol as a drawing on the line."""
    mathml = presentation_mathml(symbol) if isinstance(symbol, Constant) else symbol_mathml(symbol)
    drawing = draw(mathml, SIZE)
    start, rest = drawing.svg.split(">", 1)
    return Markup(  # noqa: S704 - our own drawing, and an escaped text
        f'{start} style="vertical-align:-{drawing.depth}pt">'
        f"<title>{escape(symbol_text(symbol))}</title>{rest}"
    )


def equation_html(statement: Expr | Equation | Condition, width: float) -> Markup:
    """Return an equation or condition as a picture of at most this width in points."""
    return equation_picture(statement, width).svg(plain_text(statement))


def equation_picture(statement: Expr | Equation | Condition, width: float) -> Picture:
    """Return the picture of an equation or condition, with its measures."""
    return picture(inside_of(presentation_mathml(statement)), width)


def sides_html(left: str, right: str, alternative: str, width: float) -> Markup:
    """Return two pieces of MathML with an equals sign between them as a picture."""
    return picture(joined((inside_of(left), inside_of(right))), width).svg(alternative)


def coherent_unit(dimension: Dimension) -> str:
    """Return the coherent unit of a dimension by the name that the vocabulary gives it."""
    named = (q.unit for q in catalogue().values() if q.dimension == dimension)
    return "1" if dimension.is_one else next(named, str(dimension))


def conversion_html(item: InputRecord) -> Markup:
    """Return how the typed number becomes its value in coherent SI, for a person to repeat."""
    factor, offset = Fraction(item.factor), Fraction(item.offset)
    start: Markup = number_html(typed(item.number_typed))
    if offset and factor == 1:
        start += _plus(offset)
    elif offset:
        start = Markup("({}{}) × {}").format(start, _plus(offset / factor), _exact(factor))
    elif factor != 1:
        start += Markup(" × {}").format(_exact(factor))
    if item.pi_power:
        start += Markup(" × π") + (
            Markup("<sup>{}</sup>").format(item.pi_power) if item.pi_power != 1 else ""
        )
    if not offset and factor == 1 and not item.pi_power:
        return value_html(item.value, item.unit)
    # The line may be broken before the equals sign.
    shown = value_html(item.value, item.unit)
    return Markup('<span class="number">{}</span> <span class="number">= {}</span>').format(
        start, shown
    )


def _plus(value: Fraction) -> Markup:
    sign = "+" if value > 0 else "−"
    return Markup(" {} {}").format(sign, _exact(abs(value)))


def _exact(value: Fraction) -> Markup:
    """A factor in full where it is short, as a decimal or a fraction; else in ten digits.

    Ten digits are more than a pocket check needs, and all of them fit the column.
    """
    text = decimal_text(value)
    if len(text) > _LONGEST_FACTOR:
        return number_html(significant(float(value), _LONG_FACTOR_DIGITS))
    parts = [number_html(typed(part)) for part in text.split("/")]
    return Markup("/").join(parts) if len(parts) == 1 else Markup("({}/{})").format(*parts)
