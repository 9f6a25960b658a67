"""Where a line of presentation MathML may be broken, and how a long part is opened up."""

from __future__ import annotations

from collections.abc import Iterable, Iterator
from copy import deepcopy
from dataclasses import dataclass
from xml.etree import ElementTree as ET

NAMESPACE = "http://www.w3.org/1998/Math/MathML"
_NARROW = 0.25  # width in ems of a narrow character
_FRACTION = 0.7  # size of the terms of a fraction within a fraction, at least
_RELATIONS = ("=", "≤", "≥", "<", ">", "≈")


@dataclass(frozen=True)
class Run:
    """What stays together on a line.

    Attributes:
        markup: presentation MathML of the run, without the ``math`` element.
        sign: the operator that stands before it; empty for the first one.
    """

    markup: str
    sign: str

    @property
    def relation(self) -> bool:
        """Whether a relation sign stands before it."""
        return self.sign in _RELATIONS


def runs(markup: str) -> tuple[Run, ...]:
    """Part a row of presentation MathML at its own operators, not at those inside its parts.

    Args:
        markup: the inside of a ``math`` element, without namespaces.

    Returns:
        The runs, in order.
    """
    found: list[Run] = []
    sign, current = "", list[str]()
    for element in _elements(markup):
        before = _sign_of(element)
        if before is None:
            current.append(_text_of(element))
            continue
        if current:
            found.append(Run("".join(current), sign))
        sign, current = before, []
    found.append(Run("".join(current), sign))
    return tuple(found)


def least_width(markup: str) -> float:
    """Return a width in ems that a row is not narrower than, without drawing it."""
    return sum(_least_width(element) for element in _elements(markup))


def opened(run: Run) -> tuple[Run, ...]:
    """Return the runs of a run whose outermost brackets, fractions and roots are in the line.

    A fraction becomes ``( ) / ( )``, a root ``( )`` to the power 1/2, and brackets lose their
    hold on what they enclose. A run that cannot be opened is returned alone.
    """
    inside: list[ET.Element] = []
    for element in _elements(run.markup):
        inside += _opened(element)
    first, *rest = runs("".join(_text_of(element) for element in inside))
    return (Run(first.markup, run.sign), *rest)


def inside_of(mathml: str) -> str:
    """Return what a ``math`` element holds, without namespaces."""
    root = ET.fromstring(mathml)  # noqa: S314 - our own markup
    for element in root.iter():
        element.tag = element.tag.removeprefix(f"{{{NAMESPACE}}}")
    return "".join(_text_of(child) for child in root)


def math(markup: str) -> str:
    """Return a ``math`` element that holds the markup."""
    return f'<math xmlns="{NAMESPACE}" display="block">{markup}</math>'


def _elements(markup: str) -> Iterator[ET.Element]:
    yield from ET.fromstring(f"<mrow>{markup}</mrow>")  # noqa: S314 - our own markup


def _least_width(element: ET.Element) -> float:
    if not len(element):
        return len(element.text or "") * _NARROW
    widths = [_least_width(child) for child in element]
    match element.tag:
        case "mfrac":
            return max(widths) * _FRACTION
        case "msup" | "msub" | "msubsup" | "mover":
            return widths[0]
        case "munderover":
            return max(widths)
    return sum(widths)


def _text_of(element: ET.Element) -> str:
    return ET.tostring(element, encoding="unicode")


def _sign_of(element: ET.Element) -> str | None:
    """The operator at which a line may be broken, or ``None``; a thin space multiplies."""
    if element.tag == "mspace":
        return " "
    if element.tag == "mo" and element.get("form") == "infix":
        return element.text or ""
    return None


def _opened(element: ET.Element) -> list[ET.Element]:
    match element.tag:
        case "mrow":
            return list(element)
        case "mfrac":
            above, below = element
            return [*_bracketed(above), _operator("/", "infix"), *_bracketed(below)]
        case "msqrt":
            half = ET.fromstring("<mrow><mn>1</mn><mo>/</mo><mn>2</mn></mrow>")  # noqa: S314
            return [_operator("(", "prefix"), *element, _raised(_operator(")", "postfix"), half)]
        case "msup" if element[0].tag == "mrow":
            base, exponent = element
            *before, closing = list(base)
            return [*before, _raised(closing, exponent)]
    return [element]


def _bracketed(element: ET.Element) -> list[ET.Element]:
    children = list(element) if element.tag == "mrow" else [element]
    if not any(_sign_of(child) for child in children):
        return [element]
    return [_operator("(", "prefix"), *children, _operator(")", "postfix")]


def _raised(base: ET.Element, exponent: ET.Element) -> ET.Element:
    raised = ET.Element("msup")
    raised.extend((deepcopy(base), deepcopy(exponent)))
    return raised


def _operator(text: str, form: str) -> ET.Element:
    element = ET.Element("mo", {"form": form})
    element.text = text
    return element


def joined(parts: Iterable[str]) -> str:
    """Return rows of markup with an equals sign between them."""
    return '<mo form="infix">=</mo>'.join(parts)
