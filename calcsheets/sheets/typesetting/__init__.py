"""Shared helpers of the renderers: numbers, units, equations and moves as printed."""

from .drawing import Drawing, draw
from .latex import latex_text
from .move_text import move_words
from .numbers import NumberText, significant, superscript, typed, unit_text
from .plain import plain_text, symbol_text
from .presentation import (
    Operand,
    number_mathml,
    presentation_mathml,
    substituted_mathml,
    symbol_mathml,
)
from .regimes import regime_words, test_text

__all__ = [
    "Drawing",
    "NumberText",
    "Operand",
    "draw",
    "latex_text",
    "move_words",
    "number_mathml",
    "plain_text",
    "presentation_mathml",
    "regime_words",
    "significant",
    "substituted_mathml",
    "superscript",
    "symbol_mathml",
    "symbol_text",
    "test_text",
    "typed",
    "unit_text",
]
