"""Expressions as LaTeX, the text alternative that other typesetters can set again."""

from __future__ import annotations

from collections.abc import Mapping
from types import MappingProxyType

from ...expressions import Condition, Equation, Expr
from .layout import (
    THIN,
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
from .lettering import Letter, base_runs, italic_subscript
from .numbers import GROUP_SPACE, MINUS

_STACKED = Manner(linear=False, times=THIN)
_SIGNS: Mapping[str, str] = MappingProxyType(
    {MINUS: "-", THIN: r" \, ", "·": r" \cdot ", "×": r" \times ", "≤": r" \le ", "≥": r" \ge "}
)
_GREEK: Mapping[str, str] = MappingProxyType(
    {"γ": r"\gamma", "ρ": r"\rho", "μ": r"\mu", "π": r"\pi", "Δ": r"\Delta"}
)


def latex_text(statement: Expr | Equation | Condition) -> str:
    """Return an expression, equation or condition as LaTeX for math mode."""
    return _text(lay_out(statement, _STACKED))


def _text(box: Box) -> str:
    match box:
        case Letter():
            return _letter(box)
        case Digits(number, _):
            return number.mantissa.replace(GROUP_SPACE, r"\,").replace(MINUS, "-")
        case Sign(text, prefix):
            return _sign(text, prefix)
        case Row(parts):
            return "".join(_text(part) for part in parts)
        case Stacked(above, below):
            return rf"\frac{{{_text(above)}}}{{{_text(below)}}}"
        case Raised(Letter(superscript=star) as base, exponent) if star:
            return f"{_base(base)}^{{{star}\\,{_text(exponent)}}}"
        case Raised(base, exponent):
            return f"{_text(base)}^{{{_text(exponent)}}}"
        case RootOf(radicand):
            return rf"\sqrt{{{_text(radicand)}}}"
        case Called(name, argument):
            return rf"\{name}\left({_text(argument)}\right)"
        case Bracketed(inside):
            return rf"\left({_text(inside)}\right)"
        case Integrated(low, high, integrand, variable):
            limits = rf"\int_{{{_text(low)}}}^{{{_text(high)}}}"
            return rf"{limits} {_text(integrand)} \, \mathrm{{d}} {_text(variable)}"


def _sign(text: str, prefix: bool) -> str:
    if text == "/":
        return text
    shown = _SIGNS.get(text, text)
    return shown if prefix or shown.startswith(" ") else f" {shown} "


def _letter(letter: Letter) -> str:
    star = f"^{{{letter.superscript}}}" if letter.superscript else ""
    return _base(letter) + star


def _base(letter: Letter) -> str:
    runs = "".join(
        _GREEK.get(text, text if italic else rf"\mathrm{{{text}}}")
        for text, italic in base_runs(letter)
    )
    # A command must not run into the letter that follows it.
    runs = runs.replace(r"\Delta", r"\Delta ")
    base = rf"\dot{{{runs}}}" if letter.accent == "dot" else runs
    subscript = ",".join(
        text if text.isdigit() or italic_subscript(text) else rf"\mathrm{{{text}}}"
        for text in letter.subscripts
    )
    return f"{base}_{{{subscript}}}" if subscript else base
