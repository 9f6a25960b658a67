"""Equations as pictures that fit a column: broken at operators, or a little smaller."""

from __future__ import annotations

import re
from collections.abc import Iterator
from dataclasses import dataclass, replace
from functools import lru_cache

from markupsafe import Markup, escape

from ..typesetting import Drawing, draw
from .breaking import Run, least_width, math, opened, runs

SIZE = 9.5
"""Size of the letters of an equation, in points."""

SMALLEST = 0.7
"""Below this share of its size an equation is hard to read."""

_SHRUNK_BEFORE_BROKEN = 0.88
_RELATION_SPACE = 0.28
_BINARY_SPACE = 0.22
_THIN_SPACE = 0.17
_INDENT = 2.0
_DEEPEST_INDENT = 0.3
_LEADING = 0.35
_MOST_OPENINGS = 12


@dataclass(frozen=True)
class Picture:
    """An equation that fits its column.

    Attributes:
        markup: drawing instructions, to be put into an ``svg`` element.
        width: width in points, as printed.
        height: height in points, as printed.
        depth: how far it reaches below the baseline of its last line, in points.
        scale: size as a share of the normal size.
        lines: number of lines.
    """

    markup: str
    width: float
    height: float
    depth: float
    scale: float
    lines: int

    def svg(self, alternative: str) -> Markup:
        """Return the picture with a text alternative."""
        width, height = self.width / self.scale, self.height / self.scale
        return Markup(  # noqa: S704 - our own drawing, and an escaped text
            f'<svg xmlns="http://www.w3.org/2000/svg" width="{self.width:.2f}pt" '
            f'height="{self.height:.2f}pt" viewBox="0 0 {width:.2f} {height:.2f}" '
            f'style="vertical-align:-{self.depth:.2f}pt">'
            f"<title>{escape(alternative)}</title>{self.markup}</svg>"
        )


@dataclass(frozen=True)
class _Part:
    """A drawn run with the operator before it."""

    drawing: Drawing
    sign: str
    relation: bool
    run: Run

    @property
    def gap(self) -> float:
        """Width of the operator with its spaces, in points."""
        if not self.sign:
            return 0.0
        if self.sign == " ":
            return _THIN_SPACE * SIZE
        space = _RELATION_SPACE if self.relation else _BINARY_SPACE
        return _operator(self.sign).width + 2 * space * SIZE

    @property
    def width(self) -> float:
        """Width with the operator, in points."""
        return self.gap + self.drawing.width


@dataclass(frozen=True)
class _Placed:
    drawing: Drawing
    left: float
    line: int


@lru_cache(maxsize=4096)
def picture(markup: str, width: float) -> Picture:
    """Set an equation in a column.

    Args:
        markup: inside of a ``math`` element, see :func:`.breaking.inside_of`.
        width: width of the column in points.

    Returns:
        The picture, no wider than the column. Lines are broken before operators; fractions,
        roots and brackets are opened only where they are wider than the column.
    """
    parts = tuple(_drawn(run) for run in _openings(runs(markup), width))
    total = sum(part.width for part in parts)
    if total * _SHRUNK_BEFORE_BROKEN <= width:
        return _composed((parts,), 0.0, width)
    indent = _indent(parts, width)
    for _ in range(_MOST_OPENINGS):
        if all(part.width + indent <= width for part in parts):
            break
        wide = tuple(_narrowed(part, width - indent) for part in parts)
        parts = tuple(part for group in wide for part in group)
    return _composed(_filled(parts, indent, width), indent, width)


def _drawn(run: Run) -> _Part:
    return _Part(draw(math(run.markup), SIZE), run.sign, run.relation, run)


def _openings(found: tuple[Run, ...], width: float) -> Iterator[Run]:
    """Open what is certainly wider than the column before it is drawn, which takes long."""
    for run in found:
        inside = opened(run) if least_width(run.markup) * SIZE > width else (run,)
        if len(inside) > 1:
            yield from _openings(inside, width)
        else:
            yield run


def _operator(sign: str) -> Drawing:
    return draw(math(f"<mo>{escape(sign)}</mo>"), SIZE)


def _narrowed(part: _Part, room: float) -> tuple[_Part, ...]:
    return (part,) if part.width <= room else tuple(_drawn(run) for run in opened(part.run))


def _indent(parts: tuple[_Part, ...], width: float) -> float:
    """Continuation lines start behind the first relation sign, unless it stands far right."""
    left = 0.0
    for part in parts:
        if part.relation:
            return left if left <= width * _DEEPEST_INDENT else _INDENT * SIZE
        left += part.width
    return _INDENT * SIZE


def _filled(parts: tuple[_Part, ...], indent: float, width: float) -> tuple[tuple[_Part, ...], ...]:
    lines: list[list[_Part]] = [[]]
    left = 0.0
    for part in parts:
        if lines[-1] and left + part.width > width:
            # Where a line starts, a product that was only a space needs its sign.
            part = replace(part, sign="·") if part.sign == " " else part
            lines.append([])
            left = indent
        lines[-1].append(part)
        left += part.width
    return tuple(tuple(line) for line in lines)


def _composed(lines: tuple[tuple[_Part, ...], ...], indent: float, width: float) -> Picture:
    placed: list[_Placed] = []
    widest = 0.0
    for number, line in enumerate(lines):
        left = indent if number else 0.0
        for part in line:
            if part.sign.strip():
                sign = _operator(part.sign)
                placed.append(_Placed(sign, left + (part.gap - sign.width) / 2, number))
            left += part.gap
            placed.append(_Placed(part.drawing, left, number))
            left += part.drawing.width
        widest = max(widest, left)
    baselines, height = _baselines(placed, len(lines))
    scale = min(1.0, width / widest)
    markup = "".join(_group(item, baselines[item.line]) for item in placed)
    depth = height - baselines[-1]
    return Picture(markup, widest * scale, height * scale, depth * scale, scale, len(lines))


def _baselines(placed: list[_Placed], lines: int) -> tuple[list[float], float]:
    """Return where the baseline of each line is, from the top, and the height of all."""
    baselines: list[float] = []
    top = 0.0
    for number in range(lines):
        drawings = [item.drawing for item in placed if item.line == number]
        baselines.append(top + max(d.height - d.depth for d in drawings))
        top = baselines[-1] + max(d.depth for d in drawings) + _LEADING * SIZE
    return baselines, top - _LEADING * SIZE


_SVG = re.compile(r'<svg [^>]*viewBox="([^"]*)"[^>]*>(.*)</svg>', re.DOTALL)


def _group(item: _Placed, baseline: float) -> str:
    drawing = item.drawing
    match = _SVG.fullmatch(drawing.svg)
    if match is None:
        raise ValueError("a drawing is one svg element with a view box")
    x, y, width, _ = (float(number) for number in re.split(r"[ ,]+", match[1].strip()))
    scale = drawing.width / width
    left = item.left - scale * x
    top = baseline - (drawing.height - drawing.depth) - scale * y
    return f'<g transform="matrix({scale:.5f} 0 0 {scale:.5f} {left:.2f} {top:.2f})">{match[2]}</g>'
