"""A small chart of vector paths that stays legible in black and white."""

from __future__ import annotations

import math
import re
from collections.abc import Iterator, Sequence
from dataclasses import dataclass

from markupsafe import Markup, escape

from ...expressions import Symbol
from ..typesetting import draw, number_mathml, symbol_mathml, symbol_text, typed, unit_text
from .breaking import inside_of
from .breaking import math as math_of

WIDTH, HEIGHT = 156.0, 124.0
"""Size of a chart, in points."""

_LEFT, _RIGHT, _TOP, _BOTTOM = 34.0, 8.0, 16.0, 26.0
_SIZE = 7.0
_TICK = 2.5
_MOST_TICKS = 5
_STEPS = (1.0, 2.0, 2.5, 5.0, 10.0)
_POINT = 1.5
_SVG = re.compile(r'<svg [^>]*viewBox="([^"]*)"[^>]*>(.*)</svg>', re.DOTALL)


@dataclass(frozen=True)
class Axis:
    """One axis.

    Attributes:
        symbol: the quantity.
        unit: its unit.
        values: its value at each point.
    """

    symbol: Symbol
    unit: str
    values: tuple[float, ...]

    @property
    def exponent(self) -> int:
        """The power of ten in which its numbers are written, a multiple of three."""
        largest = max(abs(value) for value in self.values)
        if largest == 0 or 0.1 <= largest < 10_000:
            return 0
        return 3 * math.floor(math.log10(largest) / 3)

    @property
    def ticks(self) -> tuple[float, ...]:
        """Round numbers that enclose every value."""
        low, high = min(self.values), max(self.values)
        if low == high:
            low, high = low - abs(low) / 10 - 1e-300, high + abs(high) / 10 + 1e-300
        rough = (high - low) / _MOST_TICKS
        decade = 10.0 ** math.floor(math.log10(rough))
        step = next(s * decade for s in _STEPS if s * decade >= rough * (1 - 1e-9))
        first, last = math.floor(low / step + 1e-9), math.ceil(high / step - 1e-9)
        return tuple(number * step for number in range(first, last + 1))

    def label(self) -> str:
        """The quantity with its unit and power of ten, as MathML."""
        unit = unit_text(self.unit)
        power = f"<msup><mn>10</mn><mn>{self.exponent}</mn></msup>" if self.exponent else ""
        space = '<mspace width="0.2em"/>' if power and unit else ""
        text = f'<mtext mathvariant="normal">{escape(unit)}</mtext>' if unit else ""
        comma = '<mo rspace="0.3em">,</mo>' if power or unit else ""
        symbol = inside_of(symbol_mathml(self.symbol))
        return math_of(f"<mrow>{symbol}{comma}{power}{space}{text}</mrow>".replace("-", "−"))


def chart(across: Axis, up: Axis, filled: Sequence[bool]) -> Markup:
    """Return a chart of one quantity over another, a line through points.

    Args:
        across: the quantity across.
        up: the quantity upwards.
        filled: whether each point is drawn filled or open.
    """
    x = _Scale(across.ticks, _LEFT, WIDTH - _RIGHT)
    y = _Scale(up.ticks, HEIGHT - _BOTTOM, _TOP)
    points = [(x.at(a), y.at(b)) for a, b in zip(across.values, up.values, strict=True)]
    line = " ".join(f"{a:.2f},{b:.2f}" for a, b in points)
    parts = [
        *_frame(x, y),
        *_labels(across, up, x, y),
        f'<polyline points="{line}" fill="none" stroke="#000" stroke-width="0.9"/>',
        *(_point(a, b, full) for (a, b), full in zip(points, filled, strict=True)),
    ]
    alternative = f"{symbol_text(up.symbol)} over {symbol_text(across.symbol)}"
    return Markup(  # noqa: S704 - our own drawing, and an escaped text
        f'<svg xmlns="http://www.w3.org/2000/svg" width="{WIDTH}pt" height="{HEIGHT}pt" '
        f'viewBox="0 0 {WIDTH} {HEIGHT}"><title>{escape(alternative)}</title>{"".join(parts)}</svg>'
    )


@dataclass(frozen=True)
class _Scale:
    """Where a value of an axis stands on paper."""

    ticks: tuple[float, ...]
    start: float
    end: float

    def at(self, value: float) -> float:
        low, high = self.ticks[0], self.ticks[-1]
        return self.start + (value - low) / (high - low) * (self.end - self.start)


def _frame(x: _Scale, y: _Scale) -> Iterator[str]:
    for tick in x.ticks:
        yield _stroke(x.at(tick), y.start, x.at(tick), y.end, "#bbb", 0.3)
        yield _stroke(x.at(tick), y.start, x.at(tick), y.start + _TICK, "#000", 0.5)
    for tick in y.ticks:
        yield _stroke(x.start, y.at(tick), x.end, y.at(tick), "#bbb", 0.3)
        yield _stroke(x.start - _TICK, y.at(tick), x.start, y.at(tick), "#000", 0.5)
    yield _stroke(x.start, y.start, x.end, y.start, "#000", 0.6)
    yield _stroke(x.start, y.start, x.start, y.end, "#000", 0.6)


def _labels(across: Axis, up: Axis, x: _Scale, y: _Scale) -> Iterator[str]:
    for tick in x.ticks[:: 2 if len(x.ticks) > _MOST_TICKS else 1]:
        yield _text(_number(tick, across), x.at(tick), y.start + 10, 0.5)
    for tick in y.ticks:
        yield _text(_number(tick, up), x.start - 5, y.at(tick) + 2.5, 1.0)
    yield _text(across.label(), x.end, y.start + 22, 1.0)
    yield _text(up.label(), x.start - 20, y.end - 7, 0.0)


def _number(tick: float, axis: Axis) -> str:
    scaled = tick / 10.0**axis.exponent
    return number_mathml(typed(f"{scaled:.4g}" if abs(scaled) < 10_000 else f"{scaled:.0f}"))


def _stroke(x1: float, y1: float, x2: float, y2: float, colour: str, width: float) -> str:
    return (
        f'<path d="M{x1:.2f} {y1:.2f}L{x2:.2f} {y2:.2f}" stroke="{colour}" '
        f'stroke-width="{width}" fill="none"/>'
    )


def _point(x: float, y: float, full: bool) -> str:
    colour = "#000" if full else "#fff"
    return (
        f'<circle cx="{x:.2f}" cy="{y:.2f}" r="{_POINT}" fill="{colour}" stroke="#000" '
        'stroke-width="0.5"/>'
    )


def _text(mathml: str, x: float, baseline: float, anchor: float) -> str:
    """A text as paths; the anchor is the share of its width that lies left of the place."""
    drawing = draw(mathml, _SIZE)
    match = _SVG.fullmatch(drawing.svg)
    if match is None:
        raise ValueError("a drawing is one svg element with a view box")
    left, top, width, _ = (float(number) for number in re.split(r"[ ,]+", match[1].strip()))
    scale = drawing.width / width
    dx = x - anchor * drawing.width - scale * left
    dy = baseline - (drawing.height - drawing.depth) - scale * top
    return f'<g transform="matrix({scale:.5f} 0 0 {scale:.5f} {dx:.2f} {dy:.2f})">{match[2]}</g>'
