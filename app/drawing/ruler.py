"""The one ruler of a sheet: position along the member ↔ sheet coordinate ↔ pixel.

Drawing, strips, cursor and mouse all go through it and never scale a position by themselves; so when short
segments get a least width on the sheet, only `sheet` and `position` change. Today the sheet coordinate is the
position. A frozen value: zooming and panning make another ruler.
"""

from __future__ import annotations

from dataclasses import dataclass, replace
from typing import overload

import numpy as np

from solver.arrays import FloatArray

CLOSEST = 1e-4  # the closest zoom shows this part of the member


@dataclass(frozen=True, slots=True)
class Ruler:
    """The window `first`…`last` (sheet coordinates) of a member of `length` (m) on pixels `begin`…`end`.

    `end` may be below `begin`: upright, x grows upward while pixels grow downward.
    """

    length: float
    first: float
    last: float
    begin: float
    end: float

    @classmethod
    def whole(cls, length: float, begin: float = 0.0, end: float = 1.0) -> Ruler:
        """The ruler that shows the whole member."""
        return cls(length, 0.0, length, begin, end)

    @overload
    def sheet(self, x: float) -> float: ...
    @overload
    def sheet(self, x: FloatArray) -> FloatArray: ...
    def sheet(self, x: float | FloatArray) -> float | FloatArray:
        """Sheet coordinate of a position, monotone; any shape."""
        return x

    def position(self, sheet: float) -> float:
        """Position (m) of a sheet coordinate, kept within the member."""
        return min(max(sheet, 0.0), self.length)

    @overload
    def pixel(self, x: float) -> float: ...
    @overload
    def pixel(self, x: FloatArray) -> FloatArray: ...
    def pixel(self, x: float | FloatArray) -> float | FloatArray:
        """Pixel of a position (m); any shape; may lie outside `begin`…`end`."""
        return self.begin + (self.sheet(x) - self.first) * self.scale

    def position_at(self, pixel: float) -> float:
        """Position (m) at a pixel, kept within the member."""
        return self.position(self.first + (pixel - self.begin) / self.scale)

    @property
    def scale(self) -> float:
        """Pixels per sheet coordinate; negative upright."""
        return (self.end - self.begin) / (self.last - self.first)

    @property
    def pixels_per_metre(self) -> float:
        """Pixels per metre, for drawing across the axis in proportion."""
        return abs(self.scale)

    @property
    def whole_shown(self) -> bool:
        """Whether the window holds the whole member."""
        return self.first <= 0.0 and self.last >= self.sheet(self.length)

    def holds(self, x: float) -> bool:
        """Whether a position is inside the window, with half a pixel to spare."""
        low, high = sorted((self.begin, self.end))
        return low - 0.5 <= self.pixel(x) <= high + 0.5

    def on(self, begin: float, end: float) -> Ruler:
        """The same window on other pixels."""
        return replace(self, begin=begin, end=end)

    def of(self, length: float) -> Ruler:
        """The ruler for a member of another length: the same window where it still fits, else all of it."""
        if self.whole_shown or self.last > length:
            return Ruler.whole(length, self.begin, self.end)
        return replace(self, length=length)

    def fitted(self) -> Ruler:
        """The whole member."""
        return Ruler.whole(self.length, self.begin, self.end)

    def zoomed(self, factor: float, pixel: float) -> Ruler:
        """Closer by `factor`, with what is at `pixel` staying there."""
        whole = self.sheet(self.length)
        span = float(np.clip((self.last - self.first) / factor, CLOSEST * whole, whole))
        share = (pixel - self.begin) / (self.end - self.begin)
        return self._window(self.first + share * (self.last - self.first - span), span)

    def panned(self, pixels: float) -> Ruler:
        """The sheet dragged by `pixels`."""
        return self._window(self.first - pixels / self.scale, self.last - self.first)

    def _window(self, first: float, span: float) -> Ruler:
        first = float(np.clip(first, 0.0, max(self.sheet(self.length) - span, 0.0)))
        return replace(self, first=first, last=first + span)
