"""Edges in the hand: the dimension that an edge of the drawing shows, at one end of a segment or at both.

Pulled at one end a plain segment becomes a taper; where both ends come to the same it is plain again. Of a
rectangle the drawing shows the depth, and a bare area is drawn as the round bar of that area.
"""

from __future__ import annotations

import math
from collections.abc import Callable
from dataclasses import dataclass
from typing import Final, Literal

from msgspec import UNSET, Struct
from msgspec.structs import replace

from app import edits
from app.edits.linear import exact, rounded
from app.hand.grip import Grip
from app.units import Quantity, input_text, symbol
from app.words import later, tr
from solver.model import (
    AnySection,
    AreaSection,
    Project,
    RectangleSection,
    RoundSection,
    TubeSection,
    end_of,
)

Where = Literal["start", "end", "both"]

# For the outer edge of each shape: the key it shows, and its word
OUTER: Final[dict[type[Struct], tuple[str, str]]] = {
    RoundSection: ("diameter", later("diameter")),
    TubeSection: ("outer", later("outside diameter")),
    RectangleSection: ("depth", later("depth")),
    AreaSection: ("area", later("area")),
}
INNER: Final = ("inner", later("inside diameter"))
TOLD: Final = {
    "start": later("{mark}, {size} at its start: {start} {unit}"),
    "end": later("{mark}, {size} at its end: {end} {unit}"),
    "both": later("{mark}, {size}: {start} at its start, {end} {unit} at its end"),
    "plain": later("{mark}, {size}: {start} {unit}"),
}


@dataclass(frozen=True, slots=True)
class Dimension:
    """A dimension of a segment's section by its key, and its word."""

    section: AnySection
    key: str
    word: str

    @property
    def ends(self) -> tuple[float, float]:
        """The dimension at the segment's start and end."""
        start: float = getattr(self.section, self.key)
        return start, end_of(start, getattr(self.section, f"{self.key}_end"))

    def having(self, start: float, end: float) -> AnySection:
        """The section with the dimension changed; plain where both ends are alike."""
        last = UNSET if start == end else end
        return replace(self.section, **{self.key: start, f"{self.key}_end": last})

    def moved(self, where: Where, value: float) -> tuple[float, float]:
        """Both ends with the value at one of them; at `both` the start takes it and the end goes along."""
        start, end = self.ends
        if where == "start":
            return value, end
        if where == "end":
            return start, value
        if start == end:
            return value, value
        return value, rounded(exact(end) + exact(value) - exact(start))


def dimension_of(section: AnySection, *, inner: bool = False) -> Dimension:
    """What the outer edge of a section shows, or the inner one of a tube."""
    key, word = INNER if inner else OUTER[type(section)]
    return Dimension(section, key, word)


def edge_grip(project: Project, index: int, where: Where, per_pixel: float, *, inner: bool = False) -> Grip:
    """The dimension of a segment at an end or at both; a pixel across the axis is `per_pixel` (m)."""
    dimension = dimension_of(project.segments[index].section, inner=inner)
    start, end = dimension.ends
    above, below = _bounds(dimension, where)
    mark = project.segments[index].mark

    def put(value: float) -> Project:
        section = dimension.having(*dimension.moved(where, value))
        return edits.set_value(project, ("segments", index, "section"), section)

    return Grip(
        name=tr("{size} of {mark}").format(size=tr(dimension.word).capitalize(), mark=mark),
        quantity=_quantity(dimension),
        system=project.display.unit_system,
        value=end if where == "end" else start,
        at=_size_at(dimension, end if where == "end" else start, per_pixel),
        put=put,
        tell=lambda value: _told(project, index, dimension, where, value),
        above=above,
        least=max(0.0, start - end) if inner and where == "both" else 0.0,
        below=below,
    )


def _quantity(dimension: Dimension) -> Quantity:
    return "area" if dimension.key == "area" else "size"


def _size_at(dimension: Dimension, value: float, per_pixel: float) -> Callable[[float], float]:
    """The dimension with which its edge is so many pixels further from the axis."""
    if dimension.key != "area":
        return lambda pixels: value + 2.0 * per_pixel * pixels
    radius = math.sqrt(value / math.pi)
    return lambda pixels: math.pi * max(radius + per_pixel * pixels, 0.0) ** 2


def _bounds(dimension: Dimension, where: Where) -> tuple[float, float]:
    """What the value stays over and under: 0, and a tube's other dimension at each end that is pulled."""
    start, end = dimension.ends
    along = exact(end) - exact(start) if where == "both" else exact(0.0)  # how the other end goes along
    others = [exact(other) for other in _others(dimension, where)]
    bounds = [rounded(other - by) for other, by in zip(others, (exact(0.0), along), strict=False)]
    return (-math.inf, min(bounds)) if dimension.key == "inner" else (max(bounds), math.inf)


def _others(dimension: Dimension, where: Where) -> tuple[float, ...]:
    """The other dimension of a tube at the ends that are pulled; 0 where there is none."""
    section = dimension.section
    ends = (0.0, 0.0)
    if isinstance(section, TubeSection):
        ends = dimension_of(section, inner=dimension.key != "inner").ends
    return {"start": ends[:1], "end": ends[1:], "both": ends}[where]


def _told(project: Project, index: int, dimension: Dimension, where: Where, value: float) -> str:
    system, quantity = project.display.unit_system, _quantity(dimension)
    start, end = dimension.moved(where, value)
    sentence = TOLD["plain" if where == "both" and start == end else where]
    return tr(sentence).format(
        mark=project.segments[index].mark,
        size=tr(dimension.word),
        start=input_text(start, quantity, system),
        end=input_text(end, quantity, system),
        unit=symbol(quantity, system),
    )
