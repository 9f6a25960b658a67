"""Moves in words, to be followed by their operand."""

from __future__ import annotations

from collections.abc import Mapping
from types import MappingProxyType

from ...errors import DefinitionError
from ...expressions import Expr, Function

_WORDS: Mapping[str, str] = MappingProxyType(
    {
        "exchange sides": "exchange the sides",
        "add": "add to both sides",
        "subtract": "subtract from both sides",
        "multiply by": "multiply both sides by",
        "divide by": "divide both sides by",
        "take reciprocals and multiply by": "take the reciprocals of both sides and multiply by",
        "change signs": "change the sign of both sides",
        "square": "square both sides",
        "take the positive square root": "take the positive square root of both sides",
        "raise to the power": "raise both sides to the power",
        "take logarithms and divide by": "take the natural logarithm of both sides and divide by",
        "raise 10 to both sides": "raise 10 to the power of both sides",
        "collect powers of": "clear fractions and collect powers of",
    }
)
_FUNCTIONS: Mapping[str, str] = MappingProxyType(
    {
        "exp": "exponential",
        "ln": "natural logarithm",
        "lg": "logarithm to base 10",
        "sin": "sine",
        "cos": "cosine",
        "tan": "tangent",
        "arcsin": "arcsine",
        "arccos": "arccosine",
        "arctan": "arctangent",
    }
)


def move_words(action: str, operand: Expr | None) -> tuple[str, Expr | None]:
    """Return a move as words, and the expression to set behind them.

    Args:
        action: one of the actions of a move.
        operand: its operand; for ``apply`` the function applied to the other side.

    Returns:
        The words, and the operand or ``None`` where the words say it all.

    Raises:
        DefinitionError: if the action is not known.
    """
    if action == "apply" and isinstance(operand, Function):
        return f"take the {_FUNCTIONS[operand.name]} of both sides", None
    if action not in _WORDS:
        raise DefinitionError(f"move {action}", "there are no words for it")
    return _WORDS[action], operand
