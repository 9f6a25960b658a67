"""Numbers and units as a printed sheet shows them."""

from __future__ import annotations

import re
from dataclasses import dataclass
from decimal import ROUND_HALF_EVEN, Context, Decimal, InvalidOperation

from ...errors import DefinitionError

MINUS = "\u2212"
GROUP_SPACE = "\u202f"  # narrow no-break space
UNIT_SPACE = "\u00a0"  # no-break space

_PLAIN_FROM = -3  # decimal exponents of the leading digit that are written without a power of ten
_PLAIN_TO = 5
_UNGROUPED = 4
_SUPERSCRIPTS = str.maketrans("0123456789-" + MINUS, "⁰¹²³⁴⁵⁶⁷⁸⁹⁻⁻")
_TYPED = re.compile(r"([+-]?)(\d+)(?:\.(\d*))?(?:[eE]([+-]?\d+))?")


@dataclass(frozen=True)
class NumberText:
    """A number ready for print.

    Attributes:
        mantissa: sign and digits, grouped in threes.
        exponent: power of ten that it is multiplied by; ``None`` for plain notation.
    """

    mantissa: str
    exponent: int | None = None

    @property
    def negative(self) -> bool:
        """Whether the number carries a minus sign."""
        return self.mantissa.startswith(MINUS)

    @property
    def parts(self) -> tuple[str, str]:
        """Mantissa, and the exponent as text; empty where there is none."""
        return self.mantissa, "" if self.exponent is None else signed_integer(self.exponent)

    @property
    def text(self) -> str:
        """One line, such as ``1.298 2 × 10⁶``."""
        mantissa, exponent = self.parts
        return f"{mantissa} × 10{superscript(exponent)}" if exponent else mantissa

    def with_unit(self, unit: str) -> str:
        """Return the number and the printed form of a unit of the closed list."""
        printed = unit_text(unit)
        space = UNIT_SPACE if printed and printed != "°" else ""
        return f"{self.text}{space}{printed}"


def significant(value: float | str, digits: int) -> NumberText:
    """Round half-even to significant digits, from the exact decimal of the double.

    Args:
        value: a finite double, or a decimal as text.
        digits: how many significant digits are kept, at least one; trailing zeros stand.

    Returns:
        Plain notation from 0.001 up to below 1 000 000 where every digit of the whole part is
        significant, else a mantissa and a power of ten. Zero is ``0``.

    Raises:
        DefinitionError: if the value is not a finite number, or if no digit is asked for.
    """
    exact = _finite(value)
    if digits < 1:
        raise DefinitionError(f"number {value}", f"{digits} significant digits were asked for")
    if not exact:
        return NumberText("0")
    rounded = Context(prec=digits, rounding=ROUND_HALF_EVEN).plus(exact)
    leading = rounded.adjusted()
    shown = str(int(abs(rounded).scaleb(digits - 1 - leading)))
    sign = MINUS if rounded < 0 else ""
    if _PLAIN_FROM <= leading <= _PLAIN_TO and leading < digits:
        return NumberText(sign + _plain(shown, leading))
    return NumberText(sign + _plain(shown, 0), leading)


def typed(text: str) -> NumberText:
    """Return a decimal with exactly the digits that somebody typed: ``12.0``, ``1.5e-3``.

    Raises:
        DefinitionError: if the text is not a decimal number.
    """
    match = _TYPED.fullmatch(text.strip().replace(MINUS, "-"))
    if match is None:
        raise DefinitionError(f'number "{text}"', "it is not a decimal number")
    sign, whole, decimals, exponent = match.groups()
    mantissa = (MINUS if sign == "-" else "") + _grouped(whole, decimals or "")
    return NumberText(mantissa, int(exponent) if exponent else None)


def unit_text(name: str) -> str:
    """Return the printed form of a unit of the closed list: ``kg/(m2*s)`` → ``kg/(m²·s)``.

    The unit of a plain number, ``1``, is printed as nothing.
    """
    if name == "1":
        return ""
    water = name.replace("H2O", "H₂O")
    return re.sub(r"(?<=[A-Za-z])[23]", lambda found: superscript(found[0]), water).replace(
        "*", "·"
    )


def superscript(digits: str) -> str:
    """Return an integer as Unicode superscripts."""
    return digits.translate(_SUPERSCRIPTS)


def signed_integer(value: int) -> str:
    """Return an integer with a true minus sign."""
    return str(value).replace("-", MINUS)


def _finite(value: float | str) -> Decimal:
    try:
        exact = Decimal(value)
    except InvalidOperation as problem:
        raise DefinitionError(f'number "{value}"', "it is not a decimal number") from problem
    if not exact.is_finite():
        raise DefinitionError(f"number {value}", "only finite numbers are printed")
    return exact


def _plain(digits: str, leading: int) -> str:
    """Set the decimal point behind the digit of the exponent zero."""
    if leading < 0:
        return _grouped("0", "0" * (-leading - 1) + digits)
    return _grouped(digits[: leading + 1], digits[leading + 1 :])


def _grouped(whole: str, decimals: str) -> str:
    """Group in threes on each side of the point where more than four digits stand."""
    if len(whole) > _UNGROUPED:
        first = len(whole) % 3
        heads = [whole[:first]] if first else []
        whole = GROUP_SPACE.join(heads + [whole[i : i + 3] for i in range(first, len(whole), 3)])
    if len(decimals) > _UNGROUPED:
        decimals = GROUP_SPACE.join(decimals[i : i + 3] for i in range(0, len(decimals), 3))
    return f"{whole}.{decimals}" if decimals else whole
