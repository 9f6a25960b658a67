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
    {
        "α": r"\alpha", "β": r"\beta", "γ": r"\gamma", "δ": r"\delta", "ε": r"\varepsilon",
        "ζ": r"\zeta", "η": r"\eta", "θ": r"\theta", "κ": r"\kappa", "λ": r"\lambda",
        "μ": r"\mu", "ν": r"\nu", "ξ": r"\xi", "π": r"\pi", "ϖ": r"\varpi", "ρ": r"\rho",
        "σ": r"\sigma", "τ": r"\tau", "φ": r"\varphi", "χ": r"\chi", "ψ": r"\psi",
        "ω": r"\omega", "Δ": r"\Delta", "Ω": r"\Omega", "Φ": r"\Phi", "Γ": r"\Gamma",
        "Σ": r"\Sigma",
    }
)  # fmt: skip
_SUPERSCRIPTS: Mapping[str, str] = MappingProxyType({"′": r"\prime"})


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
            mark = _SUPERSCRIPTS.get(star, star)
            return f"{_base(base)}^{{{mark}\\,{_text(exponent)}}}"
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
    above = _SUPERSCRIPTS.get(letter.superscript, letter.superscript)
    star = f"^{{{above}}}" if above else ""
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
        text if text.isdigit() or italic_subscript(text) else rf"\mathrm{{{_upright(text)}}}"
        for text in letter.subscripts
    )
    return f"{base}_{{{subscript}}}" if subscript else base


def _upright(text: str) -> str:
    """A subscript with its Greek letters as commands."""
    return "".join(f"{_GREEK[c]} " if c in _GREEK else c for c in text)
