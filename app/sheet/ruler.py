"""The position axis of a figure, across or upright, so that every drawing is written once.

`along` is the distance in points from the first joint in the direction of +x; `aside` is the distance in
points from the axis: up in a figure that runs across, to the right in one that stands upright, where x runs
upward.
"""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass
from typing import overload

from app.drawing.ruler import Ruler as Positions
from app.sheet.svg import Point
from solver.arrays import FloatArray


@dataclass(frozen=True, slots=True)
class Ruler:
    """Maps positions x in m to points on paper; `extent` is the drawn length of the member in points.

    Short segments are as wide as `positions` makes them, which is the ruler of drawing and window.
    """

    upright: bool
    positions: Positions

    @property
    def extent(self) -> float:
        """The drawn length of the member in points."""
        return self.positions.end

    @overload
    def along(self, x: float) -> float: ...
    @overload
    def along(self, x: FloatArray) -> FloatArray: ...

    def along(self, x: float | FloatArray) -> float | FloatArray:
        """Points along the axis at positions x (m), any shape."""
        return self.positions.pixel(x)

    def point(self, along: float, aside: float) -> Point:
        """The place on paper."""
        return (aside, -along) if self.upright else (along, -aside)

    def points(self, places: Sequence[tuple[float, float]]) -> list[Point]:
        """The places on paper of (along, aside) pairs."""
        return [self.point(along, aside) for along, aside in places]
