"""Unknowns that occur several times but form a polynomial of degree one or two.

Square roots over the unknown are squared away, fractions cleared, and x or x = unknown² taken
as the variable. Where powers or logarithms stand around the unknown, they are undone first.
Computer algebra collects; the result becomes a tree again.
"""

from __future__ import annotations

from dataclasses import dataclass
from fractions import Fraction
from functools import lru_cache
from typing import Any

from ..expressions import (
    CONSTANTS,
    PI,
    Constant,
    Equation,
    Expr,
    Negative,
    Number,
    Power,
    Product,
    Quotient,
    Root,
    Sum,
    Symbol,
    integrals_in,
    symbols_in,
    to_sympy,
)
from .moves import Move, divide, gather

_HIGHEST = 2
_MOST_TERMS = 40


@dataclass(frozen=True)
class PolynomialForm:
    """An equation as a polynomial in the unknown or its square.

    Attributes:
        moves: how the equation became the polynomial.
        candidates: the solved forms, one for each root of the polynomial.
    """

    moves: tuple[Move, ...]
    candidates: tuple[Expr, ...]


@lru_cache(maxsize=512)
def polynomial_form(equation: Equation, unknown: Symbol) -> PolynomialForm | None:
    """Return the solved forms of an equation that is a polynomial in disguise.

    Args:
        equation: the published equation.
        unknown: a symbol that occurs in it more than once.

    Returns:
        The form, or ``None`` if the unknown stands in an exponent, in a power that does not
        close, in an integral, or in a polynomial of a degree above two.
    """
    import sympy

    if any(integrals_in(equation.left)) or any(integrals_in(equation.right)):
        return None
    squared, moves = _without_root(equation, unknown)
    difference = to_sympy(squared.left) - to_sympy(squared.right)
    form = _form(difference, unknown, _symbol_table(squared), moves)
    gathered = gather(equation, unknown)
    if form is not None or gathered is None:
        return form
    # The other side may hold logarithms; it is one known number to the polynomial.
    other_side = sympy.Symbol("other side", real=True)
    names = {**_symbol_table(equation), other_side.name: gathered.solved}
    difference = to_sympy(gathered.moves[-1].result.left) - other_side
    return _form(difference, unknown, names, gathered.moves)


def _form(
    difference: Any, unknown: Symbol, names: dict[str, Expr], moves: tuple[Move, ...]
) -> PolynomialForm | None:
    """The solved forms of ``difference = 0``, or ``None`` if it is no such polynomial."""
    import sympy

    variable = to_sympy(unknown)
    numerator = sympy.numer(sympy.together(difference))
    if not numerator.is_polynomial(variable):
        return None
    polynomial = sympy.Poly(sympy.expand(numerator), variable)
    exponents = [monomial[0] for monomial in polynomial.monoms()]
    shift = min(exponents)
    step = 2 if all((exponent - shift) % 2 == 0 for exponent in exponents) else 1
    degree = (max(exponents) - shift) // step
    if not 1 <= degree <= _HIGHEST:
        return None
    powers = [variable ** (shift + step * power) for power in range(degree + 1)]
    factored = [sympy.factor(sympy.factor_terms(polynomial.coeff_monomial(x))) for x in powers]
    if factored[-1].could_extract_minus_sign():
        factored = [-coefficient for coefficient in factored]
    trees = [_from_sympy(coefficient, names) for coefficient in factored]
    coefficients = [tree for tree in trees if tree is not None]
    if len(coefficients) < len(trees):
        return None
    collected = unknown**2 if step == 2 else unknown
    candidates = _linear(coefficients) if degree == 1 else _quadratic(coefficients)
    shown = _collected(coefficients, collected)
    move = Move("collect powers of", collected, Equation(shown, Number(Fraction(0))))
    if step == 2:
        candidates = tuple(Root(candidate) for candidate in candidates)
    return PolynomialForm((*moves, move), candidates)


def _without_root(equation: Equation, unknown: Symbol) -> tuple[Equation, tuple[Move, ...]]:
    """Square an equation whose one side is a product with a root over the unknown."""
    for side in (equation.left, equation.right):
        factors = side.factors if isinstance(side, Product) else (side,)
        if any(isinstance(f, Root) and unknown in set(symbols_in(f)) for f in factors):
            two = Number(Fraction(2))
            squared = Equation(_square(equation.left, two), _square(equation.right, two))
            return squared, (Move("square", None, squared),)
    return equation, ()


def _square(side: Expr, two: Number) -> Expr:
    factors = side.factors if isinstance(side, Product) else (side,)
    squares = tuple(f.radicand if isinstance(f, Root) else Power(f, two) for f in factors)
    return squares[0] if len(squares) == 1 else Product(squares)


def _linear(coefficients: list[Expr]) -> tuple[Expr, ...]:
    constant, slope = coefficients
    return (divide(_negated(constant), slope),)


def _quadratic(coefficients: list[Expr]) -> tuple[Expr, ...]:
    c, b, a = coefficients
    product = 4 * a * (c.operand if isinstance(c, Negative) else c)
    discriminant = b**2 + product if isinstance(c, Negative) else b**2 - product
    root = Root(discriminant)
    return (Quotient(_negated(b) + root, 2 * a), Quotient(_negated(b) - root, 2 * a))


def _negated(expr: Expr) -> Expr:
    return expr.operand if isinstance(expr, Negative) else Negative(expr)


def _collected(coefficients: list[Expr], variable: Expr) -> Expr:
    terms: list[Expr] = []
    for power in range(len(coefficients) - 1, 0, -1):
        factor = variable if power == 1 else Power(variable, Number(Fraction(power)))
        terms.append(_term(coefficients[power], factor))
    terms.append(coefficients[0])
    return Sum(tuple(terms))


def _term(coefficient: Expr, factor: Expr) -> Expr:
    if coefficient == Number(Fraction(1)):
        return factor
    if isinstance(coefficient, Negative):
        return Negative(coefficient.operand * factor)
    return coefficient * factor


def _symbol_table(equation: Equation) -> dict[str, Expr]:
    names: dict[str, Expr] = {str(symbol): symbol for symbol in equation.symbols}
    names.update({name: Constant(name) for name in CONSTANTS if name != "pi"})
    return names


def _from_sympy(expr: Any, names: dict[str, Expr]) -> Expr | None:
    """Return the tree of a rational expression: signs in front, numbers last in a sum."""
    import sympy

    if expr.is_Symbol:
        return names[expr.name]
    if expr == sympy.pi:
        return PI
    if expr.is_Number and expr.is_Rational and expr >= 0:
        return Number(Fraction(int(expr.p), int(expr.q)))
    if (expr.is_Mul or expr.is_Number) and expr.could_extract_minus_sign():
        opposite = _from_sympy(-expr, names)
        return None if opposite is None else Negative(opposite)
    arguments = sorted(expr.args, key=_reading_order) if expr.is_Add else expr.args
    parts = [_from_sympy(argument, names) for argument in arguments]
    if len(parts) > _MOST_TERMS or any(part is None for part in parts):
        return None
    known = tuple(part for part in parts if part is not None)
    if expr.is_Add:
        return Sum(known)
    if expr.is_Mul:
        return _fraction(known)
    if expr.is_Pow and isinstance(known[1], Number | Negative):
        return Power(known[0], _plain(known[1]))
    return None


def _reading_order(term: Any) -> tuple[bool, bool, str]:
    """Positive terms before negative ones, numbers last; a total order."""
    return (bool(term.could_extract_minus_sign()), bool(term.is_Number), str(term))


def _plain(exponent: Expr) -> Expr:
    """A negative number as one number, so that a power of it is seen as a reciprocal."""
    match exponent:
        case Negative(Number(value)):
            return Number(-value)
        case _:
            return exponent


def _fraction(factors: tuple[Expr, ...]) -> Expr:
    above: list[Expr] = []
    below: list[Expr] = []
    for factor in factors:
        match factor:
            case Power(base, Number(value)) if value < 0:
                below.append(base if value == -1 else Power(base, Number(-value)))
            case Number(value) if value.denominator != 1:
                above += [Number(Fraction(value.numerator))] if value.numerator != 1 else []
                below.append(Number(Fraction(value.denominator)))
            case _:
                above.append(factor)
    top = _product(above)
    return Quotient(top, _product(below)) if below else top


def _product(factors: list[Expr]) -> Expr:
    if not factors:
        return Number(Fraction(1))
    return factors[0] if len(factors) == 1 else Product(tuple(factors))
