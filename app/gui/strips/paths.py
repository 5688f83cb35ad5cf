"""From a strip's traces to points in pixels: one line and one outline of a fill for each way of drawing."""

from __future__ import annotations

from dataclasses import dataclass
from itertools import pairwise

import numpy as np
from PySide6.QtCore import QRectF

from app.drawing.ruler import Ruler
from app.gui.sheet_layout import Axes
from app.gui.strips.content import NONE, StripContent, Trace
from solver.arrays import BoolArray, FloatArray, IntArray


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
    return [Run(first, stop, int(drawn[first])) for first, stop in pairwise(starts) if drawn[first] != NONE]


@dataclass(frozen=True, slots=True)
class Polyline:
    """Points (k,) in pixels of the sheet; `joined` says of each whether a line leads to the next."""

    x: FloatArray
    y: FloatArray
    joined: IntArray


def lines(trace: Trace, ruler: Ruler, scale: Scale, axes: Axes) -> dict[int, Polyline]:
    """The curve, by way of drawing; it breaks at jumps. One each, however many segments there are."""
    along, across = ruler.pixel(trace.x), scale.pixels(trace.value)
    return {
        int(way): _polyline(along, across, axes, np.append(trace.drawn == way, False))
        for way in np.unique(trace.drawn)
        if way != NONE
    }


def fills(trace: Trace, ruler: Ruler, scale: Scale, axes: Axes) -> dict[int, Polyline]:
    """The area between the curve and 0, by way of drawing, as one outline that goes along 0 between runs."""
    along, across, zero = ruler.pixel(trace.x), scale.pixels(trace.value), scale.pixel(0.0)
    return {
        int(way): _outline(along, across, zero, trace.drawn == way, axes)
        for way in np.unique(trace.drawn)
        if way != NONE
    }


def _outline(along: FloatArray, across: FloatArray, zero: float, chosen: BoolArray, axes: Axes) -> Polyline:
    """Each chosen interval from start to end, from 0 or to 0 where its neighbour is not chosen."""
    at = np.flatnonzero(chosen)
    opens = np.append(True, np.diff(at) > 1)
    closes = np.append(np.diff(at) > 1, True)
    first, last = across[at], across[at + 1]
    corners = np.column_stack([np.where(opens, zero, first), first, last, np.where(closes, zero, last)])
    places = np.column_stack([along[at], along[at], along[at + 1], along[at + 1]])
    return _polyline(places.ravel(), corners.ravel(), axes, np.ones(corners.size, dtype=np.bool_))


def _polyline(along: FloatArray, across: FloatArray, axes: Axes, joined: BoolArray) -> Polyline:
    x, y = (across, along) if axes.upright else (along, across)
    return Polyline(np.ascontiguousarray(x), np.ascontiguousarray(y), joined.astype(np.int32))
