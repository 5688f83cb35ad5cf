"""From a strip's traces to points in pixels: one line and one outline of a fill for each way of drawing.

No more points than the pixels can show are painted, and no extreme is left out (`app.thinning`)."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np
from PySide6.QtCore import QRectF

from app.drawing.ruler import Ruler
from app.gui.sheet_layout import Axes
from app.gui.strips.company import NONE, Trace
from app.gui.strips.content import StripContent
from app.thinning import Chain, chain_of, thinned
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

    def value(self, pixel: float) -> float:
        """The value at a pixel."""
        return self.low + (pixel - self.begin) / (self.end - self.begin) * (self.high - self.low)

    def pixels(self, value: FloatArray) -> FloatArray:
        """The pixels of values, any shape."""
        return self.begin + (value - self.low) / (self.high - self.low) * (self.end - self.begin)


def stretches(chosen: BoolArray) -> tuple[IntArray, IntArray]:
    """First and last points of the runs of chosen intervals (k − 1,)."""
    edges = np.flatnonzero(np.diff(np.concatenate([[False], chosen, [False]])))
    return edges[::2], edges[1::2]


@dataclass(frozen=True, slots=True)
class Polyline:
    """Points (k,) in pixels of the sheet; `joined` says of each whether a line leads to the next."""

    x: FloatArray
    y: FloatArray
    joined: IntArray


@dataclass(frozen=True, slots=True)
class Pixels:
    """A trace in pixels, thinned to what they can show: a chain of points for each way of drawing."""

    along: FloatArray
    across: FloatArray
    zero: float
    chains: dict[int, Chain]
    axes: Axes

    @classmethod
    def of(cls, trace: Trace, ruler: Ruler, scale: Scale, axes: Axes) -> Pixels:
        """Those of a trace that lie in the ruler's window."""
        trace = bent(trace, ruler)
        along, across = ruler.pixel(trace.x), scale.pixels(trace.value)
        drawn = np.where(_in_window(along, ruler), trace.drawn, NONE)
        chains = {
            int(way): thinned(chain_of(drawn == way), along, across)
            for way in np.unique(drawn)
            if way != NONE
        }
        return cls(along, across, scale.pixel(0.0), chains, axes)

    def lines(self) -> dict[int, Polyline]:
        """The curve, by way of drawing; it breaks at jumps. One each, however many segments there are."""
        return {way: self._line(chain) for way, chain in self.chains.items()}

    def fills(self) -> dict[int, Polyline]:
        """The area between the curve and 0, by way of drawing, as one outline along 0 between runs."""
        return {way: self._outline(chain) for way, chain in self.chains.items()}

    def _line(self, chain: Chain) -> Polyline:
        return polyline(self.along[chain.index], self.across[chain.index], self.axes, chain.joined)

    def _outline(self, chain: Chain) -> Polyline:
        """The points of the chain, from 0 and to 0 where there is a gap; at a jump straight on."""
        along = self.along[chain.index]
        closes = np.append(~chain.joined[:-1] & (np.diff(along) != 0.0), True)
        opens = np.append(True, closes[:-1])
        times = 1 + opens + closes
        at = np.repeat(chain.index, times)
        first = np.cumsum(times) - times
        across = self.across[at]
        across[first[opens]] = self.zero
        across[(first + times - 1)[closes]] = self.zero
        return polyline(self.along[at], across, self.axes, np.ones(len(at), dtype=np.bool_))


def band(upper: Trace, lower: Trace, ruler: Ruler, scale: Scale, axes: Axes) -> Polyline:
    """The outline between two traces over the same places: there along one of them, back along the other."""
    along, turned = [], []
    for trace, step in ((upper, 1), (lower, -1)):
        pixels, across = ruler.pixel(trace.x), scale.pixels(trace.value)
        whole = Chain(np.arange(len(pixels)), np.ones(len(pixels), dtype=np.bool_))
        kept = thinned(whole, pixels, across).index[::step]
        along.append(pixels[kept])
        turned.append(across[kept])
    corners = np.concatenate(along)
    return polyline(corners, np.concatenate(turned), axes, np.ones(len(corners), dtype=np.bool_))


def _in_window(along: FloatArray, ruler: Ruler) -> BoolArray:
    """Whether an interval (k − 1,) reaches into the pixels that are shown."""
    first, last = sorted((ruler.begin, ruler.end))
    low, high = np.minimum(along[:-1], along[1:]), np.maximum(along[:-1], along[1:])
    inside: BoolArray = (high >= first) & (low <= last)
    return inside


def bent(trace: Trace, ruler: Ruler) -> Trace:
    """The trace with a point at every joint where the ruler bends.

    Curves of the member shown have them already; those of an earlier edit or of a reference may not.
    """
    if ruler.to_scale or not len(trace.x):
        return trace
    joints = np.asarray(ruler.joints)
    after = np.searchsorted(trace.x, joints)
    inside = (after > 0) & (after < len(trace.x)) & (trace.x[np.minimum(after, len(trace.x) - 1)] != joints)
    if not inside.any():
        return trace
    joints, after = joints[inside], after[inside]
    share = (joints - trace.x[after - 1]) / (trace.x[after] - trace.x[after - 1])
    value = trace.value[after - 1] + share * (trace.value[after] - trace.value[after - 1])
    return Trace(
        np.insert(trace.x, after, joints),
        np.insert(trace.value, after, value),
        np.insert(trace.drawn, after, trace.drawn[after - 1]),
    )


def polyline(along: FloatArray, across: FloatArray, axes: Axes, joined: BoolArray) -> Polyline:
    """Points along and across the axis as those of the sheet."""
    x, y = (across, along) if axes.upright else (along, across)
    return Polyline(np.ascontiguousarray(x), np.ascontiguousarray(y), joined.astype(np.int32))
