"""How many digits of a value an enclosure certifies."""

from __future__ import annotations

from decimal import ROUND_HALF_EVEN, Context

_MOST_DIGITS = 15


def certified_digits(lower: str, upper: str) -> int:
    """Return to how many significant digits two bounds agree when rounded, at most 15."""
    for digits in range(_MOST_DIGITS, 0, -1):
        context = Context(prec=digits, rounding=ROUND_HALF_EVEN)
        if context.create_decimal(lower) == context.create_decimal(upper):
            return digits
    return 0
