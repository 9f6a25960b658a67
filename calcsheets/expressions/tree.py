"""The tree of an equation, kept in the order in which the equation was published.

A computer-algebra system reorders what it is given, so algebra is done there and the printed
form is kept here. Trees are frozen; operators on symbols build them:

>>> from calcsheets.expressions import sqrt, symbols
>>> a, gamma, R, T = symbols("a gamma R T")
>>> equation = a.equals(sqrt(gamma * R * T))
"""

from __future__ import annotations

from collections.abc import Iterator, Mapping
from dataclasses import dataclass
from fractions import Fraction
from types import MappingProxyType

from ..errors import DefinitionError
from ..quantities import Quantity, catalogue

Plain = int | Fraction


class Expr:
    """A node of an expression tree. Operators keep the order of their operands."""

    def __add__(self, other: Expr | Plain) -> Expr:
        return Sum((*_terms(self), as_expr(other)))

    def __radd__(self, other: Plain) -> Expr:
        return as_expr(other) + self

    def __sub__(self, other: Expr | Plain) -> Expr:
        return Sum((*_terms(self), Negative(as_expr(other))))

    def __rsub__(self, other: Plain) -> Expr:
        return as_expr(other) - self

    def __mul__(self, other: Expr | Plain) -> Expr:
        return Product((*_factors(self), *_factors(as_expr(other))))

    def __rmul__(self, other: Plain) -> Expr:
        return as_expr(other) * self

    def __truediv__(self, other: Expr | Plain) -> Expr:
        return Quotient(self, as_expr(other))

    def __rtruediv__(self, other: Plain) -> Expr:
        return Quotient(as_expr(other), self)

    def __pow__(self, exponent: Expr | Plain) -> Expr:
        return Power(self, as_expr(exponent))

    def __neg__(self) -> Expr:
        return Negative(self)

    def equals(self, other: Expr | Plain) -> Equation:
        """Return the equation of this expression with another."""
        return Equation(self, as_expr(other))

    def at_most(self, other: Expr | Plain) -> Condition:
        """Return the condition that this is at most the other."""
        return Condition(self, "<=", as_expr(other))

    def at_least(self, other: Expr | Plain) -> Condition:
        """Return the condition that this is at least the other."""
        return Condition(self, ">=", as_expr(other))

    def below(self, other: Expr | Plain) -> Condition:
        """Return the condition that this is less than the other."""
        return Condition(self, "<", as_expr(other))

    def above(self, other: Expr | Plain) -> Condition:
        """Return the condition that this is greater than the other."""
        return Condition(self, ">", as_expr(other))


@dataclass(frozen=True)
class Symbol(Expr):
    """A quantity in a role.

    Attributes:
        quantity: symbol of the quantity in the vocabulary.
        role: whose quantity it is; empty for the station itself. See ``relations.roles``.
    """

    quantity: str
    role: str = ""

    def __post_init__(self) -> None:
        if self.quantity not in catalogue():
            raise DefinitionError(f"symbol {self.quantity}", "no such quantity in the vocabulary")

    @property
    def definition(self) -> Quantity:
        """The quantity that the symbol stands for."""
        return catalogue()[self.quantity]

    def of(self, role: str) -> Symbol:
        """Return the same quantity in another role."""
        return Symbol(self.quantity, role)

    def __str__(self) -> str:
        return f"{self.quantity}.{self.role}" if self.role else self.quantity


@dataclass(frozen=True)
class Number(Expr):
    """An exact number."""

    value: Fraction


@dataclass(frozen=True)
class Constant(Expr):
    """A constant of nature or of a definition; see ``CONSTANTS``."""

    name: str


@dataclass(frozen=True)
class Sum(Expr):
    """Terms added in order; a subtracted term is a ``Negative``."""

    terms: tuple[Expr, ...]


@dataclass(frozen=True)
class Negative(Expr):
    """The operand with the opposite sign."""

    operand: Expr


@dataclass(frozen=True)
class Product(Expr):
    """Factors multiplied in order."""

    factors: tuple[Expr, ...]


@dataclass(frozen=True)
class Quotient(Expr):
    """A fraction."""

    numerator: Expr
    denominator: Expr


@dataclass(frozen=True)
class Power(Expr):
    """A base raised to an exponent."""

    base: Expr
    exponent: Expr


@dataclass(frozen=True)
class Root(Expr):
    """The square root, never negative."""

    radicand: Expr


@dataclass(frozen=True)
class Function(Expr):
    """A function of one plain number: one of ``FUNCTIONS``."""

    name: str
    argument: Expr

    def __post_init__(self) -> None:
        if self.name not in FUNCTIONS:
            raise DefinitionError(f"function {self.name}", "it is not one of those known")


@dataclass(frozen=True)
class Integral(Expr):
    """A definite integral.

    Attributes:
        integrand: what is integrated.
        variable: the symbol that runs; outside the integrand it has no meaning.
        low: where it starts.
        high: where it ends.
    """

    integrand: Expr
    variable: Symbol
    low: Expr
    high: Expr

    def __post_init__(self) -> None:
        name = f"integral over {self.variable}"
        if any(isinstance(node, Integral) for node in _nodes(self.integrand)):
            raise DefinitionError(name, "its integrand holds another integral")
        if self.variable in {*symbols_in(self.low), *symbols_in(self.high)}:
            raise DefinitionError(name, "its limits hold its own variable")


FUNCTIONS = ("exp", "ln", "lg", "sin", "cos", "tan", "arcsin", "arccos", "arctan")


@dataclass(frozen=True)
class Equation:
    """Two sides that are equal."""

    left: Expr
    right: Expr

    @property
    def symbols(self) -> tuple[Symbol, ...]:
        """Every symbol once, in order of appearance."""
        return tuple(dict.fromkeys((*symbols_in(self.left), *symbols_in(self.right))))


@dataclass(frozen=True)
class Condition:
    """A comparison of two sides by ``<``, ``<=``, ``>`` or ``>=``."""

    left: Expr
    comparison: str
    right: Expr

    @property
    def symbols(self) -> tuple[Symbol, ...]:
        """Every symbol once, in order of appearance."""
        return tuple(dict.fromkeys((*symbols_in(self.left), *symbols_in(self.right))))

    @property
    def opposite(self) -> Condition:
        """The condition that holds exactly where this one does not."""
        return Condition(self.left, _OPPOSITE[self.comparison], self.right)


_OPPOSITE: Mapping[str, str] = MappingProxyType({"<=": ">", "<": ">=", ">=": "<", ">": "<="})


def as_expr(value: Expr | Plain) -> Expr:
    """Return an expression; whole numbers and fractions become exact numbers."""
    if isinstance(value, Expr):
        return value
    if isinstance(value, int | Fraction):
        return Number(Fraction(value))
    raise DefinitionError(f"expression {value!r}", "only exact numbers may stand in an equation")


def number(text: str) -> Number:
    """Return the exact number written as a decimal or a fraction: ``"0.62"``, ``"1/2"``."""
    return Number(Fraction(text))


def symbols(names: str) -> tuple[Symbol, ...]:
    """Return the symbols with these names, separated by spaces."""
    return tuple(Symbol(name) for name in names.split())


def sqrt(radicand: Expr) -> Expr:
    """Return the square root."""
    return Root(radicand)


def ln(argument: Expr) -> Expr:
    """Return the natural logarithm."""
    return Function("ln", argument)


def lg(argument: Expr) -> Expr:
    """Return the logarithm to base 10."""
    return Function("lg", argument)


def exp(argument: Expr) -> Expr:
    """Return the exponential."""
    return Function("exp", argument)


PI = Constant("pi")
MOLAR_GAS_CONSTANT = Constant("R_u")


def children(expr: Expr) -> tuple[Expr, ...]:
    """Return the operands of a node, in order."""
    match expr:
        case Sum(terms):
            return terms
        case Product(factors):
            return factors
        case Quotient(numerator, denominator):
            return (numerator, denominator)
        case Power(base, exponent):
            return (base, exponent)
        case Negative(operand) | Root(operand) | Function(_, operand):
            return (operand,)
        case Integral(integrand, _, low, high):
            return (low, high, integrand)
        case _:
            return ()


def symbols_in(expr: Expr) -> Iterator[Symbol]:
    """Yield every occurrence of a symbol, in order; the variable of an integral is none."""
    if isinstance(expr, Symbol):
        yield expr
    for child in children(expr):
        for symbol in symbols_in(child):
            if not (isinstance(expr, Integral) and symbol == expr.variable):
                yield symbol


def integrals_in(expr: Expr) -> Iterator[Integral]:
    """Yield every integral, in order."""
    return (node for node in _nodes(expr) if isinstance(node, Integral))


def constants_in(expr: Expr) -> Iterator[Constant]:
    """Yield every occurrence of a constant, in order."""
    return (node for node in _nodes(expr) if isinstance(node, Constant))


def substitute(expr: Expr, values: Mapping[Symbol, Expr]) -> Expr:
    """Return the expression with symbols replaced; the variable of an integral is not."""
    match expr:
        case Symbol():
            return values.get(expr, expr)
        case Integral(_, variable, _, _) if variable in values:
            free = {symbol: value for symbol, value in values.items() if symbol != variable}
            return substitute(expr, free)
        case _:
            return _rebuilt(expr, tuple(substitute(child, values) for child in children(expr)))


def replace_integrals(expr: Expr, values: Mapping[Integral, Expr]) -> Expr:
    """Return the expression with some of its integrals replaced."""
    if isinstance(expr, Integral) and expr in values:
        return values[expr]
    return _rebuilt(expr, tuple(replace_integrals(child, values) for child in children(expr)))


def _rebuilt(expr: Expr, parts: tuple[Expr, ...]) -> Expr:
    """Return the same node over other operands, in the order of ``children``."""
    match expr:
        case Sum():
            return Sum(parts)
        case Product():
            return Product(parts)
        case Quotient():
            return Quotient(*parts)
        case Power():
            return Power(*parts)
        case Negative():
            return Negative(*parts)
        case Root():
            return Root(*parts)
        case Function(name, _):
            return Function(name, *parts)
        case Integral(_, variable, _, _):
            low, high, integrand = parts
            return Integral(integrand, variable, low, high)
        case _:
            return expr


def _nodes(expr: Expr) -> Iterator[Expr]:
    yield expr
    for child in children(expr):
        yield from _nodes(child)


def _terms(expr: Expr) -> tuple[Expr, ...]:
    return expr.terms if isinstance(expr, Sum) else (expr,)


def _factors(expr: Expr) -> tuple[Expr, ...]:
    return expr.factors if isinstance(expr, Product) else (expr,)
