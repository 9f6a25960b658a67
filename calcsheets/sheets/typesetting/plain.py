"""Expressions as one line of Unicode text, for cells and text alternatives."""

from __future__ import annotations

import re
import unicodedata

from ...expressions import Condition, Constant, Equation, Expr, Symbol
from .layout import (
    Box,
    Bracketed,
    Called,
    Digits,
    Integrated,
    Manner,
    Raised,
    RootOf,
    Row,
    Sign,
    Stacked,
    lay_out,
)
from .lettering import Letter, letter_of
from .numbers import UNIT_SPACE, superscript

_LINE = Manner(linear=True, times="·")
_SUBSCRIPTS = str.maketrans("0123456789", "₀₁₂₃₄₅₆₇₈₉")
_DOT_ABOVE = "\u0307"
_TIGHT = ("·", "/")
_INTEGER = re.compile(r"−?\d+")


def plain_text(statement: Expr | Equation | Condition) -> str:
    """Return an expression, equation or condition as one line: ``p₀/p = (1 + …)^(…)``."""
    return _text(lay_out(statement, _LINE))


def symbol_text(symbol: Symbol | Constant) -> str:
    """Return a symbol as text: ``p₀``, ``ṁ``, ``C_d``, ``p_0,1``."""
    return _letter(letter_of(symbol))


def _text(box: Box) -> str:
    match box:
        case Letter():
            return _letter(box)
        case Digits(number, unit):
            return f"{number.text}{UNIT_SPACE}{unit}" if unit else number.text
        case Sign(text, prefix):
            return text if prefix or text in _TIGHT else f" {text} "
        case Row(parts):
            return "".join(_text(part) for part in parts)
        case Raised(base, exponent):
            return _text(base) + _exponent(exponent)
        case RootOf(radicand):
            return f"√{_text(radicand)}" if _atomic(radicand) else f"√({_text(radicand)})"
        case Called(name, argument):
            return f"{name}({_text(argument)})"
        case Bracketed(inside):
            return f"({_text(inside)})"
        case Stacked(above, below):
            return f"({_text(above)})/({_text(below)})"
        case Integrated(low, high, integrand, variable):
            limits = f"{_text(low)} to {_text(high)}"
            return f"∫[{limits}] {_text(integrand)} d{_text(variable)}"


def _exponent(box: Box) -> str:
    text = _text(box)
    if _INTEGER.fullmatch(text):
        return superscript(text)
    return f"^{text}" if _atomic(box) else f"^({text})"


def _atomic(box: Box) -> bool:
    return isinstance(box, Letter) or (
        isinstance(box, Digits) and not box.unit and box.number.exponent is None
    )


def _letter(letter: Letter) -> str:
    base = letter.base + _DOT_ABOVE if letter.accent == "dot" else letter.base
    subscript = ",".join(letter.subscripts)
    if subscript.isdigit():
        subscript = subscript.translate(_SUBSCRIPTS)
    elif subscript:
        subscript = f"_{subscript}"
    return unicodedata.normalize("NFC", base) + subscript + letter.superscript
