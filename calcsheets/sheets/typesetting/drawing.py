"""Equations as vector paths, because the page composer does not set MathML."""

from __future__ import annotations

from collections.abc import Iterator
from contextlib import contextmanager
from dataclasses import dataclass
from functools import lru_cache
from threading import Lock
from xml.etree import ElementTree as ET

import ziamath
from ziamath.config import config

from ...errors import DefinitionError

# The library never draws smaller than a fixed share of its own base size, so everything is
# drawn at that size and scaled: superscripts of superscripts stay in proportion.
_DRAWN_AT = 24.0
_MARGIN = 0.6
_SMALLEST = 0.55  # of the base size: fractions in fractions must stay readable on paper
_DRAWING = Lock()


@dataclass(frozen=True)
class Drawing:
    """An equation as a self-contained picture.

    Attributes:
        svg: an ``svg`` element that holds nothing but paths, in the current text colour.
        width: width in points.
        height: height in points.
        depth: how far the picture reaches below the baseline, in points.
    """

    svg: str
    width: float
    height: float
    depth: float


@lru_cache(maxsize=4096)
def draw(mathml: str, size: float = 10.0) -> Drawing:
    """Draw presentation MathML.

    Args:
        mathml: one ``math`` element.
        size: size of the letters in points.

    Returns:
        The drawing; the same MathML gives the same bytes.

    Raises:
        DefinitionError: if the text is not well-formed MathML.
    """
    try:
        with _settings():
            picture = ziamath.Math(mathml, size=_DRAWN_AT, margin=_MARGIN)
            element, below = picture.svgxml(), -picture.getyofst() + _MARGIN
    except ET.ParseError as problem:
        raise DefinitionError("MathML", f"it is not well formed ({problem})") from problem
    scale = size / _DRAWN_AT
    width, height = float(element.attrib["width"]), float(element.attrib["height"])
    paths = "".join(f'<path d="{d}"/>' for d in _paths(element) if d)
    shown = [round(length * scale, 3) for length in (width, height, below)]
    svg = (
        f'<svg xmlns="http://www.w3.org/2000/svg" width="{shown[0]}pt" height="{shown[1]}pt" '
        f'viewBox="{element.attrib["viewBox"]}" fill="currentColor">{paths}</svg>'
    )
    return Drawing(svg, *shown)


@contextmanager
def _settings() -> Iterator[None]:
    """Hold the library's settings, which are one for the whole process, while we draw."""
    wanted = {"svg2": False, "precision": 2, "minsizefraction": _SMALLEST}
    with _DRAWING:
        found = {name: getattr(config, name) for name in wanted}
        try:
            for name, value in wanted.items():
                setattr(config, name, value)
            yield
        finally:
            for name, value in found.items():
                setattr(config, name, value)


def _paths(element: ET.Element) -> tuple[str, str]:
    """Return all outlines as one path, and all rules as another.

    They stay apart because a rule may overlap a letter that is drawn the other way round.
    """
    outlines, rules = [], []
    for part in element.iter():
        match part.tag:
            case "svg" | "g":
                continue
            case "path":
                outlines.append(part.attrib["d"].strip())
            case "rect":
                x, y, width, height = (part.attrib[k] for k in ("x", "y", "width", "height"))
                rules.append(f"M {x} {y} h {width} v {height} h -{width} Z")
            case other:
                raise DefinitionError("MathML", f"it cannot be drawn with paths alone ({other})")
    return " ".join(outlines), " ".join(rules)
