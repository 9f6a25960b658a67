"""Strict Content MathML (ISO/IEC 40314): the form in which a record keeps its expressions.

Operators are ``csymbol`` of the standard content dictionaries, so that a reader who knows
nothing of this program can evaluate them.
"""

from __future__ import annotations

from fractions import Fraction
from xml.etree import ElementTree as ET

from ..errors import DefinitionError
from .constants import CONSTANTS, decimal_text
from .tree import (
    FUNCTIONS,
    Condition,
    Constant,
    Equation,
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

_LONGEST = 100_000
_DEEPEST = 60
_COMPARISONS = {"=": "eq", "<": "lt", "<=": "leq", ">": "gt", ">=": "geq"}
_COMPARISON_OF = {name: sign for sign, name in _COMPARISONS.items()}
_TEN = Number(Fraction(10))

Statement = Expr | Equation | Condition


def expression_to_mathml(statement: Statement) -> str:
    """Return an expression, equation or condition as one strict Content MathML element."""
    match statement:
        case Equation(left, right):
            element = _apply("relation1", "eq", left, right)
        case Condition(left, comparison, right):
            element = _apply("relation1", _COMPARISONS[comparison], left, right)
        case _:
            element = _element(statement)
    return ET.tostring(element, encoding="unicode")


def expression_from_mathml(text: str) -> Statement:
    """Return the expression, equation or condition that :func:`expression_to_mathml` wrote.

    Raises:
        DefinitionError: if the text is not such an element; nothing in it is ever evaluated.
    """
    if len(text) > _LONGEST or "<!" in text or "<?" in text:
        raise DefinitionError("MathML", "too long, or with a declaration, which is never read")
    try:
        element = ET.fromstring(text)  # noqa: S314 - declarations and entities refused above
    except ET.ParseError as problem:
        raise DefinitionError("MathML", f"not well formed ({problem})") from problem
    head = element[0] if element.tag == "apply" and len(element) else None
    if head is not None and head.get("cd") == "relation1":
        return _statement(element, head.text or "")
    return _expr(element, 0)


def _statement(element: ET.Element, name: str) -> Statement:
    if name not in _COMPARISON_OF or len(element) != 3:
        raise DefinitionError("MathML", f'no comparison "{name}" of two sides')
    left, right = _expr(element[1], 1), _expr(element[2], 1)
    sign = _COMPARISON_OF[name]
    return Equation(left, right) if sign == "=" else Condition(left, sign, right)


def _element(expr: Expr) -> ET.Element:
    match expr:
        case Symbol():
            return _leaf("ci", str(expr))
        case Constant("pi"):
            return _leaf("csymbol", "pi", cd="nums1")
        case Constant(name):
            return _leaf("ci", name)
        case Number(value):
            return _number(value)
        case Sum(terms):
            return _apply("arith1", "plus", *terms)
        case Negative(operand):
            return _apply("arith1", "unary_minus", operand)
        case Product(factors):
            return _apply("arith1", "times", *factors)
        case Quotient(numerator, denominator):
            return _apply("arith1", "divide", numerator, denominator)
        case Power(base, exponent):
            return _apply("arith1", "power", base, exponent)
        case Root(radicand):
            return _apply("arith1", "root", radicand, Number(Fraction(2)))
        case Function("lg", argument):
            return _apply("transc1", "log", _TEN, argument)
        case Function(name, argument):
            return _apply("transc1", name, argument)
        case Integral():
            return _integral(expr)
    raise DefinitionError(f"expression {expr!r}", "it is no node of an expression tree")


def _apply(dictionary: str, name: str, *operands: Expr) -> ET.Element:
    element = ET.Element("apply")
    element.append(_leaf("csymbol", name, cd=dictionary))
    element.extend(_element(operand) for operand in operands)
    return element


def _integral(integral: Integral) -> ET.Element:
    """Strict form of ``int`` with ``bvar``, ``lowlimit`` and ``uplimit``."""
    function = ET.Element("bind")
    function.append(_leaf("csymbol", "lambda", cd="fns1"))
    ET.SubElement(function, "bvar").append(_element(integral.variable))
    function.append(_element(integral.integrand))
    element = ET.Element("apply")
    element.append(_leaf("csymbol", "defint", cd="calculus1"))
    element.append(_apply("interval1", "oriented_interval", integral.low, integral.high))
    element.append(function)
    return element


def _number(value: Fraction) -> ET.Element:
    text = decimal_text(value)
    if "/" not in text:
        return _leaf("cn", text, type="real" if "." in text else "integer")
    element = ET.Element("apply")
    element.append(_leaf("csymbol", "rational", cd="nums1"))
    element.append(_leaf("cn", str(value.numerator), type="integer"))
    element.append(_leaf("cn", str(value.denominator), type="integer"))
    return element


def _leaf(tag: str, text: str, **attributes: str) -> ET.Element:
    element = ET.Element(tag, attributes)
    element.text = text
    return element


def _expr(element: ET.Element, depth: int) -> Expr:
    if depth > _DEEPEST:
        raise DefinitionError("MathML", f"nested deeper than {_DEEPEST} levels")
    text = element.text or ""
    match element.tag, element.get("cd"):
        case "ci", None:
            if text in CONSTANTS:
                return Constant(text)
            quantity, _, role = text.partition(".")
            return Symbol(quantity, role)
        case "csymbol", "nums1" if text == "pi":
            return Constant("pi")
        case "cn", None:
            return Number(_fraction(text))
        case "apply", None if len(element):
            return _applied(element, depth)
    raise DefinitionError("MathML", f"element {element.tag} is not expected")


def _applied(element: ET.Element, depth: int) -> Expr:
    head, *rest = element
    name = head.text or ""
    if (head.get("cd"), name) == ("calculus1", "defint"):
        return _read_integral(rest, depth)
    operands = tuple(_expr(child, depth + 1) for child in rest)
    match head.get("cd"), name, operands:
        case "arith1", "plus", (_, _, *_):
            return Sum(operands)
        case "arith1", "times", (_, _, *_):
            return Product(operands)
        case "arith1", "unary_minus", (operand,):
            return Negative(operand)
        case "arith1", "divide", (numerator, denominator):
            return Quotient(numerator, denominator)
        case "arith1", "power", (base, exponent):
            return Power(base, exponent)
        case "arith1", "root", (radicand, Number(degree)) if degree == 2:
            return Root(radicand)
        case "nums1", "rational", (Number(above), Number(below)) if below:
            return Number(above / below)
        case "transc1", "log", (base, argument) if base == _TEN:
            return Function("lg", argument)
        case "transc1", _, (argument,) if name in FUNCTIONS and name != "lg":
            return Function(name, argument)
    raise DefinitionError("MathML", f'operator "{name}" with {len(operands)} operands')


def _read_integral(parts: list[ET.Element], depth: int) -> Expr:
    match [_shape(part) for part in parts]:
        case [
            ("apply", "interval1", "oriented_interval", 3),
            ("bind", "fns1", "lambda", 3),
        ] if parts[1][1].tag == "bvar" and len(parts[1][1]) == 1:
            (_, low, high), (_, bound, body) = parts
            variable = _expr(bound[0], depth + 1)
            if isinstance(variable, Symbol):
                limits = (_expr(low, depth + 1), _expr(high, depth + 1))
                return Integral(_expr(body, depth + 1), variable, *limits)
    raise DefinitionError("MathML", "an integral needs two limits and a function of one variable")


def _shape(element: ET.Element) -> tuple[str, str, str, int]:
    """Tag, dictionary and name of the head, and number of parts."""
    head = element[0] if len(element) else element
    return element.tag, head.get("cd", ""), head.text or "", len(element)


def _fraction(text: str) -> Fraction:
    if not text.isascii() or len(text) > 60 or not text.lstrip("-").replace(".", "", 1).isdigit():
        raise DefinitionError("MathML", f'"{text[:20]}" is not a decimal number')
    return Fraction(text)
