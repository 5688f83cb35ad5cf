"""From a strip's traces to paths in pixels: one line path and one fill path for each way of drawing.

The paths are made when the content or the ruler changes, and painted as they are.
"""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np
from PySide6.QtCore import QRectF
from PySide6.QtGui import QPainterPath
from pyqtgraph.functions import arrayToQPath

from app.gui.ruler import Ruler
from app.gui.sheet_layout import Axes
from app.gui.strips.content import NONE, StripContent, Trace
from solver.arrays import FloatArray, IntArray


@dataclass(frozen=True, slots=True)
class Scale:
    """Value ↔ pixel across the axis; across the sheet values grow upward, upright to the right."""

    low: float
    high: float
    begin: float  # pixel of `low`
    end: float

    @classmethod
    def of(cls, content: StripContent, rect: QRectF, axes: Axes) -> Scale:
        """The scale of a content in its rectangle."""
        first, last = axes.across_of(rect)
        begin, end = (first, last) if axes.upright else (last, first)
        return cls(content.low, content.high, begin, end)

    def pixel(self, value: float) -> float:
        """The pixel of a value."""
        return self.begin + (value - self.low) / (self.high - self.low) * (self.end - self.begin)

    def pixels(self, value: FloatArray) -> FloatArray:
        """The pixels of values, any shape."""
        return self.begin + (value - self.low) / (self.high - self.low) * (self.end - self.begin)


@dataclass(frozen=True, slots=True)
class Run:
    """Consecutive intervals of a trace drawn alike: points `first`…`last`, both included."""

    first: int
    last: int
    drawn: int


def runs(drawn: IntArray) -> list[Run]:
    """The runs of a trace's intervals, without those that are not drawn."""
    if len(drawn) == 0:
        return []
    starts = [0, *(np.flatnonzero(np.diff(drawn)) + 1).tolist(), len(drawn)]
    spans = zip(starts, starts[1:], strict=False)
    return [Run(first, stop, int(drawn[first])) for first, stop in spans if drawn[first] != NONE]


def line_paths(trace: Trace, ruler: Ruler, scale: Scale, axes: Axes) -> dict[int, QPainterPath]:
    """The curve, by way of drawing; it breaks at jumps."""
    along, across = ruler.pixel(trace.x), scale.pixels(trace.value)
    x, y = (across, along) if axes.upright else (along, across)
    paths: dict[int, QPainterPath] = {}
    for run in runs(trace.drawn):
        part = slice(run.first, run.last + 1)
        path = arrayToQPath(np.ascontiguousarray(x[part]), np.ascontiguousarray(y[part]))
        paths.setdefault(run.drawn, QPainterPath()).addPath(path)
    return paths


def fill_paths(trace: Trace, ruler: Ruler, scale: Scale, axes: Axes) -> dict[int, QPainterPath]:
    """The area between the curve and 0, by way of drawing."""
    along, across, zero = ruler.pixel(trace.x), scale.pixels(trace.value), scale.pixel(0.0)
    paths: dict[int, QPainterPath] = {}
    for run in runs(trace.drawn):
        part = slice(run.first, run.last + 1)
        closed_along = np.r_[along[run.first], along[part], along[run.last]]
        closed_across = np.r_[zero, across[part], zero]
        x, y = (closed_across, closed_along) if axes.upright else (closed_along, closed_across)
        path = arrayToQPath(x, y)
        path.closeSubpath()
        paths.setdefault(run.drawn, QPainterPath()).addPath(path)
    return paths
