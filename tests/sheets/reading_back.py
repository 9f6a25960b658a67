"""A reader of printed equations that knows only the rules of arithmetic, for comparison.

Products and fractions bind alike and are read from the left; a minus sign may stand only at
the start of a sum; an exponent belongs to the one letter, number or bracket before it.
"""

from __future__ import annotations

import math
import re
from collections.abc import Mapping
from xml.etree import ElementTree as ET

TOKEN = re.compile(
    r"\s*(\d[\d\u202f\u2006]*(?:\.[\d\u202f\u2006]+)?|[A-Za-zγρμπ]+|[⁻⁰¹²³⁴-⁹]+|[+−·×/^√()])"
)
SUPERSCRIPTS = str.maketrans("⁰¹²³⁴⁵⁶⁷⁸⁹⁻", "0123456789-")
FUNCTIONS = {
    "exp": math.exp, "ln": math.log, "lg": math.log10,
    "sin": math.sin, "cos": math.cos, "tan": math.tan,
}  # fmt: skip


class Reader:
    def __init__(self, text: str, values: Mapping[str, float]) -> None:
        self.tokens = TOKEN.findall(text)
        assert "".join(self.tokens) == re.sub(r"\s", "", text), f"not understood: {text}"
        self.values = values

    def read(self) -> float:
        value = self.sum()
        assert not self.tokens, f"left over: {self.tokens}"
        return value

    def next(self) -> str:
        return self.tokens[0] if self.tokens else ""

    def sum(self) -> float:
        negative = self.next() == "−"
        if negative:
            self.tokens.pop(0)
        value = -self.term() if negative else self.term()
        while self.next() in ("+", "−"):
            sign = self.tokens.pop(0)
            value = value + self.term() if sign == "+" else value - self.term()
        return value

    def term(self) -> float:
        value = self.power()
        while self.next() in ("·", "×", "/"):
            sign = self.tokens.pop(0)
            value = value / self.power() if sign == "/" else value * self.power()
        return value

    def power(self) -> float:
        value = self.atom()
        if self.next() == "^":
            self.tokens.pop(0)
            return math.pow(value, self.atom())
        if self.next() and self.next()[0] in "⁻⁰¹²³⁴⁵⁶⁷⁸⁹":
            return math.pow(value, int(self.tokens.pop(0).translate(SUPERSCRIPTS)))
        return value

    def atom(self) -> float:
        token = self.tokens.pop(0)
        if token == "(":
            value = self.sum()
            assert self.tokens.pop(0) == ")"
            return value
        if token == "√":
            return math.sqrt(self.atom())
        if token in FUNCTIONS:
            assert self.next() == "("
            return FUNCTIONS[token](self.atom())
        if token[0].isdigit():
            return float(re.sub(r"[\u202f\u2006]", "", token))
        return self.values[token]


def value_of_text(text: str, values: Mapping[str, float]) -> float:
    """The value of one line of plain text."""
    return Reader(text, values).read()


def value_of_mathml(mathml: str, values: Mapping[str, float]) -> float:
    """The value of presentation MathML; a thin space between factors is a product."""
    return Reader(line_of(ET.fromstring(mathml)), values).read()


def line_of(element: ET.Element) -> str:
    tag = element.tag.split("}")[-1]
    parts = [line_of(child) for child in element]
    match tag:
        case "mfrac":
            return f"({parts[0]})/({parts[1]})"
        case "msup":
            return f"{parts[0]}^({parts[1]})"
        case "msub":
            return f"{parts[0]}_{parts[1]}"
        case "msubsup":
            return f"{parts[0]}_{parts[1]}^({parts[2]})"
        case "msqrt":
            return f"(√({''.join(parts)}))"
        case "mspace":
            return "·"
        case "math" | "mrow":
            return "".join(parts)
        case _:
            return element.text or ""
