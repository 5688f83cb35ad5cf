"""The one ruler of a sheet: position along the member ↔ sheet coordinate ↔ pixel.

Drawing, strips, cursor and mouse all go through it and never scale a position by themselves, so all of them
agree where short segments have a least width (`widths`): between two joints the ruler is affine, and at the
joints it bends. Zooming and panning move a window over the sheet coordinate and never change its proportions.
A frozen value: zooming, panning, another member or other pixels make another ruler.
"""

from __future__ import annotations

import bisect
from collections.abc import Sequence
from dataclasses import dataclass, replace
from typing import overload

import numpy as np

from app.drawing.widths import sheet_of, widened
from solver.arrays import FloatArray

CLOSEST = 1e-4  # the closest zoom shows this part of the member


@dataclass(frozen=True, slots=True)
class Ruler:
    """The window `first`…`last` (sheet coordinates) of a member of `length` (m) on pixels `begin`…`end`.

    `end` may be below `begin`: upright, x grows upward while pixels grow downward. `joints` (m) lie at
    `sheet_joints`; beyond them the scale is that of the segments to scale. `true` keeps all to one scale.
    """

    length: float
    first: float
    last: float
    begin: float
    end: float
    joints: tuple[float, ...] = ()
    sheet_joints: tuple[float, ...] = ()
    true: bool = False

    @classmethod
    def whole(cls, length: float, begin: float = 0.0, end: float = 1.0) -> Ruler:
        """The ruler that shows a whole member to one scale, as if it were one segment."""
        return cls.fitting((0.0, length), begin, end)

    @classmethod
    def fitting(
        cls, joints: Sequence[float], begin: float = 0.0, end: float = 1.0, *, true: bool = False
    ) -> Ruler:
        """The ruler that shows a whole member, by the positions of its joints from 0 on."""
        joints = tuple(joints)
        sheet = joints if true else sheet_of(joints, abs(end - begin))
        return cls(joints[-1], 0.0, sheet[-1], begin, end, joints, sheet, true)

    @overload
    def sheet(self, x: float) -> float: ...
    @overload
    def sheet(self, x: FloatArray) -> FloatArray: ...
    def sheet(self, x: float | FloatArray) -> float | FloatArray:
        """Sheet coordinate of a position, strictly monotone; any shape."""
        if self.to_scale:
            return x
        if isinstance(x, np.ndarray):
            beyond = x - np.clip(x, self.joints[0], self.joints[-1])
            return np.interp(x, self.joints, self.sheet_joints) + beyond
        return _bent(x, self.joints, self.sheet_joints)

    def position(self, sheet: float) -> float:
        """Position (m) of a sheet coordinate, kept within the member."""
        x = sheet if self.to_scale else _bent(sheet, self.sheet_joints, self.joints)
        return min(max(x, 0.0), self.length)

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
        """Pixels per metre of the segments to scale, for drawing across the axis in proportion."""
        return abs(self.scale)

    @property
    def to_scale(self) -> bool:
        """Whether every segment is as wide as its length asks for."""
        return self.sheet_joints is self.joints or self.sheet_joints == self.joints

    @property
    def widened(self) -> tuple[int, ...]:
        """The segments that are not to scale, being wider than their length asks for."""
        return widened(self.joints, self.sheet_joints)

    @property
    def whole_shown(self) -> bool:
        """Whether the window holds the whole member that the ruler was made for."""
        return self.first <= 0.0 and self.last >= self.sheet_joints[-1]

    def holds(self, x: float) -> bool:
        """Whether a position is inside the window, with half a pixel to spare."""
        low, high = self.held_pixels
        return low <= self.pixel(x) <= high

    @property
    def held_pixels(self) -> tuple[float, float]:
        """The pixels of positions inside the window, with half a pixel to spare, growing."""
        low, high = sorted((self.begin, self.end))
        return low - 0.5, high + 0.5

    def on(self, begin: float, end: float) -> Ruler:
        """The same window on other pixels, where other segments may need a least width."""
        if (begin, end) == (self.begin, self.end):
            return self
        return self._anew(self.joints, begin, end, true=self.true)

    def of(self, joints: Sequence[float]) -> Ruler:
        """The ruler for a changed member: the same window where it still fits, else all of it."""
        if tuple(joints) == self.joints and self.length == self.joints[-1]:
            return self
        return self._anew(tuple(joints), self.begin, self.end, true=self.true)

    def held(self, length: float) -> Ruler:
        """This very ruler for a member that has another length for now: every position keeps its pixel."""
        return replace(self, length=length)

    def reaching(self, joints: Sequence[float]) -> Ruler:
        """From where this window begins to the end of a changed member, however long that has become."""
        fitting = Ruler.fitting(joints, self.begin, self.end, true=self.true)
        return replace(fitting, first=min(fitting.sheet(self.position(self.first)), 0.5 * fitting.last))

    def truly(self, *, true: bool) -> Ruler:
        """The same window with all segments to one scale, or with least widths."""
        return self if true == self.true else self._anew(self.joints, self.begin, self.end, true=true)

    def fitted(self) -> Ruler:
        """The whole member."""
        return Ruler.fitting(self.joints, self.begin, self.end, true=self.true)

    def zoomed(self, factor: float, pixel: float) -> Ruler:
        """Closer by `factor`, with what is at `pixel` staying there."""
        whole = self.sheet(self.length)
        span = float(np.clip((self.last - self.first) / factor, CLOSEST * whole, whole))
        share = (pixel - self.begin) / (self.end - self.begin)
        return self._window(self.first + share * (self.last - self.first - span), span)

    def panned(self, pixels: float) -> Ruler:
        """The sheet dragged by `pixels`."""
        return self._window(self.first - pixels / self.scale, self.last - self.first)

    def showing(self, low: float, high: float, *, air: float = 0.08) -> Ruler:
        """Closer or farther, so that `low` to `high` (m) is shown whole, with `air` of it on both sides."""
        first, last = self.sheet(low), self.sheet(high)
        whole = self.sheet(self.length)
        span = float(np.clip((last - first) * (1.0 + 2.0 * air), CLOSEST * whole, whole))
        return self._window(0.5 * (first + last - span), span)

    def _anew(self, joints: tuple[float, ...], begin: float, end: float, *, true: bool) -> Ruler:
        """Another ruler whose window shows the same positions, or all where they do not fit any more."""
        fitting = Ruler.fitting(joints, begin, end, true=true)
        last = self.position(self.last)
        if self.whole_shown or last > joints[-1]:
            return fitting
        return replace(fitting, first=fitting.sheet(self.position(self.first)), last=fitting.sheet(last))

    def _window(self, first: float, span: float) -> Ruler:
        first = float(np.clip(first, 0.0, max(self.sheet(self.length) - span, 0.0)))
        return replace(self, first=first, last=first + span)


def _bent(at: float, places: tuple[float, ...], values: tuple[float, ...]) -> float:
    """The value at a place between two of the growing `places`, straight; beyond them with slope 1."""
    if at <= places[0]:
        return values[0] + (at - places[0])
    if at >= places[-1]:
        return values[-1] + (at - places[-1])
    i = bisect.bisect_right(places, at) - 1
    share = (at - places[i]) / (places[i + 1] - places[i])
    return values[i] + share * (values[i + 1] - values[i])
