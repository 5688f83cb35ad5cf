"""The limits of a strip and their labels, each along its line where it hides no curve, in ever shorter words.

A limit too far to be drawn to scale is named at the edge of its strip, with an arrow that points to it.
"""

from __future__ import annotations

from collections.abc import Iterator, Sequence
from dataclasses import dataclass
from itertools import product
from typing import Final

import numpy as np

from app.sheet import colours
from app.sheet.ruler import Ruler
from app.sheet.svg import Canvas, text_width
from solver.arrays import FloatArray

SIZE: Final = 6.5
_DEPTH: Final = SIZE + 0.5  # of a line of text
_SHARES: Final = (1.0, 0.0, 0.5, 0.75, 0.25)  # of the way along a limit, where its label is tried
_NEAR: Final = 0.5  # of a limit: a curve nearer than this may be hidden by its label


@dataclass(frozen=True, slots=True)
class Limit:
    """A limit from `first` to `last` (m), SI; its texts, the longest first; `far` off the strip."""

    first: float
    last: float
    value: float
    texts: tuple[str, ...] = ("1",)
    far: bool = False


@dataclass(frozen=True, slots=True)
class Scale:
    """The strip's place: baseline of the value 0 and points per SI unit, both aside from the axis."""

    low: float  # aside, the edge of the box where the smallest value lies
    high: float
    zero: float
    factor: float

    def aside(self, value: float) -> float:
        """The distance from the axis, in points."""
        return self.zero + value * self.factor


@dataclass(frozen=True, slots=True)
class _Box:
    """A text and its room along and aside, in points."""

    text: str
    along: tuple[float, float]
    aside: tuple[float, float]

    def meets(self, other: _Box) -> bool:
        return all(
            a[0] < b[1] and b[0] < a[1] for a, b in ((self.along, other.along), (self.aside, other.aside))
        )


def draw_limit_labels(
    canvas: Canvas,
    ruler: Ruler,
    scale: Scale,
    limits: Sequence[Limit],
    curves: tuple[FloatArray, tuple[FloatArray, ...]],
) -> None:
    """Name every limit; not where that would hide a curve far from it: the tables hold every value."""
    taken: list[_Box] = []
    for limit in limits:
        boxes = [box for box in _boxes(ruler, scale, limit) if not any(box.meets(other) for other in taken)]
        box = next((box for box in boxes if not _hides(ruler, scale, box, curves)), None)
        if box is None and boxes and (limit.far or _is_near(limit, curves)):
            box = boxes[0 if limit.far else -1]
        if box is not None:
            taken.append(box)
            _draw(canvas, ruler, box)


def _boxes(ruler: Ruler, scale: Scale, limit: Limit) -> Iterator[_Box]:
    """Where the label could stand: at the ends or between, on either side of the line, long or short."""
    low, high = ruler.along(limit.first), ruler.along(limit.last)
    outward = 1.0 if limit.value > 0 else -1.0
    line = scale.aside(limit.value)
    if limit.far:
        line = scale.high if outward > 0 else scale.low
    arrows = "←→" if ruler.upright else "↓↑"
    for words in limit.texts:
        text = f"{arrows[int(outward > 0)]} {words}" if limit.far else words
        extent, depth = text_width(text, SIZE), _DEPTH
        if ruler.upright:
            extent, depth = depth, extent
        for side, share in product((-outward, outward), _SHARES):
            start = low + 2.0 + share * (high - low - extent - 4.0)
            near, away = sorted((line + side * 1.5, line + side * (1.5 + depth)))
            inside = scale.low - 2.0 <= near and away <= scale.high + 2.0
            if inside and low <= start and start + extent <= high:
                yield _Box(text, (start, start + extent), (near, away))


def _hides(ruler: Ruler, scale: Scale, box: _Box, curves: tuple[FloatArray, tuple[FloatArray, ...]]) -> bool:
    """Whether a box lies on a curve or on the fill between a curve and 0."""
    x, values = curves
    along = ruler.along(x)
    inside = (along >= box.along[0]) & (along <= box.along[1])
    for curve in values:
        ends = np.interp(box.along, along, curve)
        reached = scale.zero + scale.factor * np.concatenate([curve[inside], ends, [0.0]])
        if np.nanmin(reached) < box.aside[1] and np.nanmax(reached) > box.aside[0]:
            return True
    return False


def _is_near(limit: Limit, curves: tuple[FloatArray, tuple[FloatArray, ...]]) -> bool:
    """Whether a curve comes so near to a limit that its number matters more than what it hides."""
    x, values = curves
    inside = (x > limit.first) & (x < limit.last)
    shares = [np.nan_to_num(curve[inside]) / limit.value for curve in values]
    return any(bool((share >= _NEAR).any()) for share in shares)


def _draw(canvas: Canvas, ruler: Ruler, box: _Box) -> None:
    """The text in the middle of its box, on a ground of its own."""
    middle = ruler.point(sum(box.along) / 2, sum(box.aside) / 2)
    canvas.text(
        (middle[0], middle[1] + 0.3 * SIZE),
        box.text,
        size=SIZE,
        fill=colours.QUIET,
        anchor="middle",
        backed=True,
    )
