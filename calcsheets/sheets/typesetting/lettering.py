"""How the symbol of a quantity in a role, or of a constant, is lettered."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass
from types import MappingProxyType

from ...expressions import CONSTANTS, Constant, Symbol
from ...gases import gases
from ...relations.roles import DISCHARGE, INLET, NOW, OUTLET, SUPPLY, THROUGH

ROLE_SUBSCRIPTS: Mapping[str, str] = MappingProxyType(
    {INLET: "1", OUTLET: "2", THROUGH: "", SUPPLY: "s", DISCHARGE: "b", NOW: ""}
)
"""The subscript that marks a role; a gas is marked by its formula, any other role by itself."""

_QUANTITY_SUBSCRIPTS = frozenset({"p", "v", "V"})


@dataclass(frozen=True)
class Letter:
    """A lettered symbol.

    Attributes:
        base: the letter; several letters only after ``Δ`` or for a word.
        subscripts: subscripts in order.
        accent: ``dot`` or empty.
        superscript: such as ``*``, or empty.
        upright: whether the base is set upright, as mathematical constants are.
    """

    base: str
    subscripts: tuple[str, ...] = ()
    accent: str = ""
    superscript: str = ""
    upright: bool = False


def letter_of(symbol: Symbol | Constant) -> Letter:
    """Return the lettering of a symbol or of a constant."""
    if isinstance(symbol, Constant):
        constant = CONSTANTS[symbol.name]
        return Letter(constant.base, _split(constant.subscript), upright=constant.value is None)
    notation = symbol.definition.notation
    role = ROLE_SUBSCRIPTS.get(symbol.role, _component(symbol.role))
    return Letter(
        notation.base,
        (*_split(notation.subscript), *((role,) if role else ())),
        notation.accent,
        notation.superscript,
    )


def _component(role: str) -> str:
    """The formula of a component of a mixture, where no other gas has the same."""
    gas = gases().get(role)
    if gas is None or not gas.formula:
        return role
    alike = [other for other in gases().values() if other.formula == gas.formula]
    return gas.formula if len(alike) == 1 else role


def base_runs(letter: Letter) -> tuple[tuple[str, bool], ...]:
    """Return the base as runs of text, each with whether it is italic.

    Single letters that stand for quantities are italic; ``Δ`` and words are upright.
    """
    base = letter.base
    if base.startswith("Δ") and len(base) == 2:
        return (("Δ", False), (base[1:], True))
    return ((base, len(base) == 1 and not letter.upright),)


def italic_subscript(text: str) -> bool:
    """Return whether a subscript stands for a quantity, as in specific heat at constant p."""
    return text in _QUANTITY_SUBSCRIPTS


def _split(subscript: str) -> tuple[str, ...]:
    return tuple(part for part in subscript.split(",") if part)
