"""Text with only those characters that the fonts of the sheet hold."""

from __future__ import annotations

import unicodedata

_SPACES = "\n\t\r "


def printable(text: str, covered: frozenset[str]) -> str:
    """Return the text, with each character that cannot be printed as its code, ``[U+4E2D]``.

    Args:
        text: any text.
        covered: the characters that can be printed.

    Returns:
        The text; a letter with an accent is taken apart where only its parts can be printed.
        A missing character would be printed by whatever font a machine happens to have.
    """
    if covered.issuperset(text):
        return text
    return "".join(_shown(character, covered) for character in text)


def _shown(character: str, covered: frozenset[str]) -> str:
    if character in covered or character in _SPACES:
        return character
    parts = unicodedata.normalize("NFD", character)
    return parts if covered.issuperset(parts) else f"[U+{ord(character):04X}]"
