"""The member itself: each segment by its outline, its mark in a circle, the axis through all."""

from __future__ import annotations

from app.drawing.bonded import draw_layer, layers_around, layers_inside, outer_of
from app.drawing.placing import TIGHT, place
from app.drawing.shapes import Box, Circle, Fill, Part, Text
from app.drawing.sketch import Sketch
from solver.model import AreaSection, Segment, TubeSection
from solver.sections import outline

SAMPLES = 12  # of an outline that is not straight
LEAST_HALF = 2.0  # pixels: a segment is never a hair
JOINT_REACH = 8.0  # pixels to either side in which a joint is pointed at


def draw_body(sketch: Sketch) -> None:
    """All segments, their targets, their marks, the axis."""
    for index, segment in enumerate(sketch.member.project.segments):
        if sketch.shown_span(index) is not None:
            _draw_segment(sketch, index, segment)
    _draw_axis(sketch)
    _draw_marks(sketch)


def half_depth(sketch: Sketch, segment: Segment, s: float) -> float:
    """Half the drawn thickness at a fraction of the segment, px."""
    return max(outline(segment.section, s).outer * sketch.scale, LEAST_HALF)


def _whole_depth(sketch: Sketch, segment: Segment, s: float) -> float:
    """The same with the parts bonded around it."""
    return max(outer_of(segment, s) * sketch.scale, LEAST_HALF)


def edge_at(sketch: Sketch, joint: int) -> float:
    """The half thickness of the thicker side at a joint, px."""
    segments = sketch.member.project.segments
    left = _whole_depth(sketch, segments[joint - 1], 1.0) if joint > 0 else 0.0
    right = _whole_depth(sketch, segments[joint], 0.0) if joint < len(segments) else 0.0
    return max(left, right)


def _draw_segment(sketch: Sketch, index: int, segment: Segment) -> None:
    part = Part("segment", index)
    bare = isinstance(segment.section, AreaSection)
    fractions = [i / SAMPLES for i in range(SAMPLES + 1)] if bare else [0.0, 1.0]
    start, end = sketch.along(index), sketch.along(index + 1)
    axis = sketch.rows.axis
    depths = [half_depth(sketch, segment, s) for s in fractions]
    halves = [(start + s * (end - start), h) for s, h in zip(fractions, depths, strict=True)]
    upper = [(a, axis - h) for a, h in halves]
    lower = [(a, axis + h) for a, h in reversed(halves)]
    for section in layers_around(segment):
        draw_layer(sketch, section, (start, end), part)
    fill: Fill = "" if sketch.frame.detail.hollow else "band_fill" if bare else "body_fill"
    dash = (5.0, 3.0) if bare else ()
    sketch.line(*upper, *lower, width=1.4, fill=fill, closed=True, dash=dash, part=part, clip=True)
    if isinstance(segment.section, TubeSection):
        _draw_bore(sketch, segment, start, end)
    for section in layers_inside(segment):
        draw_layer(sketch, section, (start, end), part)
    whole = [_whole_depth(sketch, segment, s) for s in fractions] if segment.bonded else depths
    thick = max(*whole, 12.0)
    span = sketch.shown_span(index) or (start, end)
    sketch.target(span, (axis - thick, axis + thick), part)


def _draw_bore(sketch: Sketch, segment: Segment, start: float, end: float) -> None:
    """The inside of a tube, dashed as a hidden edge."""
    inner = [outline(segment.section, s).inner * sketch.scale for s in (0.0, 1.0)]
    for side in (-1.0, 1.0):
        ends = [(a, sketch.rows.axis + side * h) for a, h in zip((start, end), inner, strict=True)]
        sketch.line(*ends, ink="quiet", dash=(4.0, 3.0), clip=True)


def _draw_axis(sketch: Sketch) -> None:
    low, high = sketch.window
    ends = (low - 6.0, sketch.rows.axis), (high + 6.0, sketch.rows.axis)
    sketch.line(*ends, ink="quiet", width=0.8, dash=(12.0, 3.0, 2.0, 3.0))


def _draw_marks(sketch: Sketch) -> None:
    """A mark in a circle where it fits between its joints, else the mark alone where that fits."""
    wishes = []
    for index, segment in enumerate(sketch.member.project.segments):
        span = sketch.shown_span(index)
        if span is not None:
            along = 0.5 * (span[0] + span[1])
            wish = sketch.wish(segment.mark, along, Part("mark", index), face="strong")
            wishes.append(wish)
    placed = place(wishes, 1, sketch.room, TIGHT)
    sketch.picture.left_out += len(wishes) - len(placed)
    for label in placed:
        _draw_mark(sketch, label.wish.text, label.wish.along, label.wish.part)


def _draw_mark(sketch: Sketch, mark: str, along: float, part: Part) -> None:
    width, height = sketch.frame.measure(mark, "strong")
    radius = 0.5 * max(width, height) + 2.0
    centre = sketch.point(along, sketch.rows.axis)
    span = sketch.shown_span(part.index)
    if span is not None and 2.0 * radius + 2.0 <= span[1] - span[0]:
        sketch.picture.circles.append(Circle(centre, radius))
    sketch.picture.texts.append(Text(Box.around(centre, width, height), mark, "strong", "ink", part))


def aim_at_joints(sketch: Sketch) -> None:
    """Joints are pointed at near their line, but never so widely that a short segment is out of reach."""
    joints = sketch.member.project.joints
    for index in range(len(joints)):
        if not sketch.holds(index):
            continue
        reach = min(JOINT_REACH, sketch.shortest_beside(index) / 4.0)
        along, thick = sketch.along(index), max(edge_at(sketch, index), 12.0)
        span = along - reach, along + reach
        across = sketch.rows.axis - thick, sketch.rows.axis + thick
        sketch.target(span, across, Part("joint", index))
