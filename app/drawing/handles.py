"""Where numbers of the drawing can be taken hold of: joints, edges, bores, forces, distributed loads.

A handle is a line with a reach around it. It lies over the parts but takes nothing away from them: a press
that does not move is a click on the part beneath, so that even the shortest segment stays within reach.
Only the screen asks for handles; paper has none.
"""

from __future__ import annotations

import math
from collections.abc import Callable, Sequence
from typing import Literal, TypeAlias

from msgspec import Struct
from msgspec.structs import replace

from app.drawing.body import half_depth
from app.drawing.loads import band_heights, force_line
from app.drawing.shapes import Point
from app.drawing.sketch import Sketch
from app.drawing.supports import faces_of
from solver.model import StopSupport, TubeSection
from solver.sections import outline

HandleKind: TypeAlias = Literal["joint", "edge", "bore", "stop", "force", "distributed"]
Where: TypeAlias = Literal["start", "end", "both"]
HandleKey: TypeAlias = tuple[HandleKind, int, Where, int, Point]
Direction: TypeAlias = Literal["along", "across"]
Half: TypeAlias = Callable[[float], float]  # half the thickness at a share of the segment, px

REACH = 5.0  # px to either side of an edge
JOINT_REACH = 7.0
LEAST_THIRD = 14.0  # px: below, the ends of a segment are too near to each other to be told apart
END_ZONE = 44.0  # px at most that belong to an end
ARROW_REACH = 9.0
STOP_REACH = 5.0


class Handle(Struct, frozen=True, gc=False):
    """A number's handle: the `line` to be near, the pull that makes it grow as a unit vector (x, y)."""

    kind: HandleKind
    index: int
    where: Where
    line: tuple[Point, Point]
    reach: float
    outward: Point
    direction: Direction
    number: int = 0  # of one of several supports at a joint

    @property
    def centre(self) -> Point:
        """Where its mark is painted."""
        (ax, ay), (bx, by) = self.line
        return 0.5 * (ax + bx), 0.5 * (ay + by)

    @property
    def key(self) -> HandleKey:
        """Which number it holds and on which side, wherever it lies."""
        return self.kind, self.index, self.where, self.number, self.outward

    def distance(self, point: Point) -> float:
        """How far a point is from the line, px."""
        (ax, ay), (bx, by) = self.line
        dx, dy = bx - ax, by - ay
        length = dx * dx + dy * dy
        share = 0.0 if length == 0.0 else ((point[0] - ax) * dx + (point[1] - ay) * dy) / length
        share = min(max(share, 0.0), 1.0)
        return math.hypot(point[0] - ax - share * dx, point[1] - ay - share * dy)

    def pull(self, start: Point, now: Point) -> float:
        """How far the pointer has gone outward, px."""
        return (now[0] - start[0]) * self.outward[0] + (now[1] - start[1]) * self.outward[1]


def handle_at(handles: list[Handle], point: Point) -> Handle | None:
    """The handle that a point is nearest to, measured by each one's reach; None where it is beyond all."""
    near = ((handle.distance(point) / handle.reach, handle) for handle in handles)
    best = min((found for found in near if found[0] <= 1.0), key=lambda found: found[0], default=None)
    return None if best is None else best[1]


def handles_of(sketch: Sketch, only: frozenset[int] | None = None) -> list[Handle]:
    """All handles inside the window; or only those whose segment or joint has one of these indices."""
    segments = sketch.member.project.segments
    chosen = range(len(segments) + 1) if only is None else sorted(only)
    handles = _joints(sketch, chosen)
    for index in chosen:
        if index < len(segments) and sketch.shown_span(index) is not None:
            handles += _edges(sketch, index)
            if isinstance(segments[index].section, TubeSection):
                handles += _bores(sketch, index)
    return handles + _stops(sketch, only) + _loads(sketch, chosen)


def _make(
    sketch: Sketch,
    kind: HandleKind,
    index: int,
    where: Where,
    line: tuple[Point, Point],
    reach: float,
    outward: Point,
) -> Handle:
    """A handle from (along, across) coordinates."""
    ends = sketch.point(*line[0]), sketch.point(*line[1])
    zero, away = sketch.point(0.0, 0.0), sketch.point(*outward)
    direction: Direction = "along" if outward[0] else "across"
    vector = away[0] - zero[0], away[1] - zero[1]
    return Handle(kind, index, where, ends, reach, vector, direction)


def _joints(sketch: Sketch, chosen: Sequence[int]) -> list[Handle]:
    """Every joint but the first, whose place is no number."""
    handles = []
    for joint in chosen:
        if joint > 0 and sketch.holds(joint):
            along, axis = sketch.along(joint), sketch.rows.axis
            half = max(_half_at(sketch, joint), 10.0)
            line = (along, axis - half), (along, axis + half)
            reach = min(JOINT_REACH, max(sketch.shortest_beside(joint) / 3.0, 3.0))
            handles.append(_make(sketch, "joint", joint, "end", line, reach, (sketch.forward, 0.0)))
    return handles


def _half_at(sketch: Sketch, joint: int) -> float:
    """The half thickness of the thinner side: beside it the thicker one has an edge of its own."""
    segments = sketch.member.project.segments
    halves = [half_depth(sketch, segments[joint - 1], 1.0)]
    if joint < len(segments):
        halves.append(half_depth(sketch, segments[joint], 0.0))
    return min(halves)


def _edges(sketch: Sketch, index: int) -> list[Handle]:
    segment = sketch.member.project.segments[index]
    return _pair(sketch, "edge", index, lambda s: half_depth(sketch, segment, s))


def _bores(sketch: Sketch, index: int) -> list[Handle]:
    section = sketch.member.project.segments[index].section
    return _pair(sketch, "bore", index, lambda s: outline(section, s).inner * sketch.scale)


def _pair(sketch: Sketch, kind: HandleKind, index: int, half: Half) -> list[Handle]:
    """The handles of an edge on both sides of the axis: its start, its end, and the middle for both."""
    axis, handles = sketch.rows.axis, []
    for where, first, last in _zones(sketch, index):
        for side in (-1.0, 1.0):
            line = (
                (_along(sketch, index, first), axis + side * half(first)),
                (_along(sketch, index, last), axis + side * half(last)),
            )
            handles.append(_make(sketch, kind, index, where, line, REACH, (0.0, side)))
    return handles


def _along(sketch: Sketch, index: int, share: float) -> float:
    start, end = sketch.along(index), sketch.along(index + 1)
    return start + share * (end - start)


def _zones(sketch: Sketch, index: int) -> list[tuple[Where, float, float]]:
    """The shares of a segment that stand for its start, for both ends and for its end, inside the window."""
    start, end = sketch.along(index), sketch.along(index + 1)
    length = abs(end - start)
    low, high = sketch.shown_span(index) or (start, end)
    first, last = sorted(((low - start) / (end - start), (high - start) / (end - start)))
    if length < 3.0 * LEAST_THIRD:
        return [("both", first, last)]
    share = min(1.0 / 3.0, END_ZONE / length)
    zones: list[tuple[Where, float, float]] = [
        ("start", 0.0, share),
        ("both", share, 1.0 - share),
        ("end", 1.0 - share, 1.0),
    ]
    return [(where, max(a, first), min(b, last)) for where, a, b in zones if max(a, first) < min(b, last)]


def _stops(sketch: Sketch, only: frozenset[int] | None) -> list[Handle]:
    """The wall of every stop, which is pulled away from what meets it."""
    handles = []
    for one in sketch.supports:
        wanted = only is None or one.joint in only
        if wanted and isinstance(one.support, StopSupport) and sketch.holds(one.joint):
            faces = faces_of(sketch, one)
            line = (faces.wall, faces.across - faces.half), (faces.wall, faces.across + faces.half)
            out = (1.0 if faces.wall > faces.nose else -1.0, 0.0)
            handle = _make(sketch, "stop", one.joint, "both", line, STOP_REACH, out)
            handles.append(replace(handle, number=one.number))
    return handles


def _loads(sketch: Sketch, chosen: Sequence[int]) -> list[Handle]:
    """The arrows and bands of the shown state."""
    loads = sketch.member.loads
    if loads is None:
        return []
    handles = []
    heights = band_heights(sketch, loads.distributed[0])
    for index in chosen:
        pair = heights[index] if index < len(heights) else None
        if pair is not None and sketch.shown_span(index) is not None:
            handles += _bands(sketch, index, pair)
    for joint in chosen:
        force = float(loads.joint_force[0, joint])
        if force and sketch.holds(joint):
            line = force_line(sketch, joint, force)
            handles.append(_make(sketch, "force", joint, "both", line, ARROW_REACH, (sketch.forward, 0.0)))
    return handles


def _bands(sketch: Sketch, index: int, heights: tuple[float, float]) -> list[Handle]:
    """The upper edge of a distributed load, which is pulled away from the member."""
    base, handles = sketch.rows.band[1], []
    for where, first, last in _zones(sketch, index):
        top = [base - (heights[0] + s * (heights[1] - heights[0])) for s in (first, last)]
        line = (_along(sketch, index, first), top[0]), (_along(sketch, index, last), top[1])
        handles.append(_make(sketch, "distributed", index, where, line, REACH, (0.0, -1.0)))
    return handles
