"""Expressions as cell formulas.

Only ``+ - * /``, ``PI``, ``POWER``, ``SQRT``, ``EXP``, ``LN``, ``LOG10`` and the circular
functions of the first edition of ISO/IEC 29500 are written, with every operation in brackets,
so that no engine has to agree with another on precedence. Engines and people differ on a sign
before a power (``-2^2``), so powers are ``POWER`` and a negative is ``0-(x)``.
"""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from fractions import Fraction
from types import MappingProxyType

from ...errors import DefinitionError
from ...expressions import (
    CONSTANTS,
    Condition,
    Constant,
    Expr,
    Function,
    Integral,
    Negative,
    Number,
    Power,
    Product,
    Quotient,
    Root,
    Sum,
    Symbol,
)

_FUNCTIONS: Mapping[str, str] = MappingProxyType(
    {
        "exp": "EXP",
        "ln": "LN",
        "lg": "LOG10",
        "sin": "SIN",
        "cos": "COS",
        "tan": "TAN",
        "arcsin": "ASIN",
        "arccos": "ACOS",
        "arctan": "ATAN",
    }
)
_EXACT_BELOW = 10**15  # whole numbers up to here are kept by every engine
_NO_CELLS: Mapping[str, str] = MappingProxyType({})
_NO_INTEGRALS: Mapping[Integral, str] = MappingProxyType({})


def formula(
    expr: Expr,
    cells: Mapping[Symbol, str],
    constants: Mapping[str, str] = _NO_CELLS,
    integrals: Mapping[Integral, str] = _NO_INTEGRALS,
) -> str:
    """Return an expression as formula text, without the leading equals sign.

    Args:
        expr: the expression.
        cells: cell reference or defined name of each of its symbols, in coherent SI.
        constants: cell or name of constants by name; the others are written as numbers.
        integrals: cell of each of its integrals, which a formula cannot hold.

    Raises:
        DefinitionError: if a symbol or an integral has no cell.
    """

    def text(node: Expr) -> str:
        match node:
            case Symbol():
                return _cell(node, cells)
            case Constant(name):
                return constants[name] if name in constants else _constant(name)
            case Number(value):
                return _number(value)
            case Negative(operand):
                return f"(0-{text(operand)})"
            case Sum(terms):
                return f"({text(terms[0])}{''.join(added(term) for term in terms[1:])})"
            case Product(factors):
                return f"({'*'.join(text(factor) for factor in factors)})"
            case Quotient(numerator, denominator):
                return f"({text(numerator)}/{text(denominator)})"
            case Power(base, exponent):
                return f"POWER({text(base)},{text(exponent)})"
            case Root(radicand):
                return f"SQRT({text(radicand)})"
            case Function(name, argument):
                return f"{_FUNCTIONS[name]}({text(argument)})"
            case Integral(_, variable, _, _):
                if node not in integrals:
                    raise DefinitionError(f"integral over {variable}", "no cell holds its value")
                return integrals[node]
        raise DefinitionError(f"expression {node!r}", "it is no node of an expression tree")

    def added(term: Expr) -> str:
        return f"-{text(term.operand)}" if isinstance(term, Negative) else f"+{text(term)}"

    return text(expr)


def comparison(
    condition: Condition, cells: Mapping[Symbol, str], constants: Mapping[str, str] = _NO_CELLS
) -> str:
    """Return a condition as formula text that is TRUE where it holds.

    Args:
        condition: the condition.
        cells: cell reference or defined name of each of its symbols, in coherent SI.
        constants: cell or name of constants by name.

    Raises:
        DefinitionError: if a symbol has no cell.
    """
    left = formula(condition.left, cells, constants)
    right = formula(condition.right, cells, constants)
    return f"{left}{condition.comparison}{right}"


def decision(condition: Condition, cells: Mapping[Symbol, str], equal_within: float) -> str:
    """Return the condition of a regime test as formula text that is TRUE where it holds.

    Sides that differ by no more than a part ``equal_within`` of the right one count as equal,
    so that every engine decides alike.

    Args:
        condition: the condition.
        cells: cell reference or defined name of each of its symbols, in coherent SI.
        equal_within: that part.

    Raises:
        DefinitionError: if a symbol has no cell.
    """
    left, right = formula(condition.left, cells), formula(condition.right, cells)
    within = f"{equal_within:G}*ABS({right})"
    slack = within if condition.comparison in ("<=", ">") else f"0-{within}"
    return f"{left}-{right}{condition.comparison}{slack}"


def is_one_of(cell: str, texts: Sequence[str]) -> str:
    """Return formula text that is TRUE where a cell holds one of some texts."""
    return joined("OR", [f'{cell}="{text}"' for text in texts])


def joined(function: str, tests: Sequence[str]) -> str:
    """Return conditions joined by ``AND`` or ``OR``; one stands alone, none is empty."""
    return f"{function}({','.join(tests)})" if len(tests) > 1 else "".join(tests)


def exact_number(value: Fraction) -> str:
    """Return an exact number as formula text: digits, or a quotient of whole numbers."""
    return _number(value)


def _cell(symbol: Symbol, cells: Mapping[Symbol, str]) -> str:
    if symbol not in cells:
        raise DefinitionError(f"symbol {symbol}", "no cell holds its value")
    return cells[symbol]


def _constant(name: str) -> str:
    value = CONSTANTS[name].value
    return "PI()" if value is None else _double(value)


def _number(value: Fraction) -> str:
    if value < 0:
        return f"(0-{_number(-value)})"
    if Fraction(_double(value)) == value:
        return _double(value)
    if value.numerator < _EXACT_BELOW and value.denominator < _EXACT_BELOW:
        return f"({value.numerator}/{value.denominator})"
    return _double(value)


def _double(value: Fraction) -> str:
    """The shortest text of the nearest double, without a needless point."""
    if value.denominator == 1 and abs(value.numerator) < _EXACT_BELOW:
        return str(value.numerator)
    return repr(float(value)).replace("e", "E")
