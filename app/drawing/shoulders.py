"""Shoulders on the drawing: the fillet in both corners of the step, under it the radius and its factor.

The fillet is drawn as large as it is across, but never too small to be seen nor larger than its step.
"""

from __future__ import annotations

import math

from msgspec.structs import replace

from app.drawing.body import half_depth
from app.drawing.placing import Wish
from app.drawing.shapes import Part
from app.drawing.sketch import Sketch
from app.numerals import reading
from app.shoulder_entry import shoulder_text
from app.words import tr
from solver.model import Project
from solver.shoulders import Notch

LEAST = 4.0  # of a fillet, px
MOST = 14.0
BESIDE = 5.0  # from the line of the joint to the label, px
STEPS = 4  # of a fillet's quarter of a circle


def draw_shoulders(sketch: Sketch) -> None:
    """The fillets of all shoulders inside the window, and where they are pointed at."""
    for notch in sketch.member.shoulders:
        if sketch.holds(notch.joint):
            _draw(sketch, notch)


def shoulder_wishes(sketch: Sketch) -> list[Wish]:
    """The labels of the shoulders, one for each joint."""
    if not sketch.frame.detail.dimensions:
        return []
    by_joint = {notch.joint: notch for notch in sketch.member.shoulders}
    return [_wish(sketch, notch) for joint, notch in by_joint.items() if sketch.holds(joint)]


def _wish(sketch: Sketch, notch: Notch) -> Wish:
    """Beside the line of the joint, under the thinner side."""
    text = shoulder_label(notch, sketch.member.project)
    wish = sketch.wish(text, sketch.along(notch.joint), Part("shoulder", notch.joint), slide=60.0)
    return replace(wish, along=wish.along + _outward(sketch, notch) * (0.5 * wish.extent + BESIDE))


def _halves(sketch: Sketch, notch: Notch) -> tuple[float, float]:
    """Half the drawn thickness before and behind the joint; at an end of the member twice the same."""
    segments, joint = sketch.member.project.segments, notch.joint
    before = None if joint == 0 else half_depth(sketch, segments[joint - 1], 1.0)
    behind = None if joint == len(segments) else half_depth(sketch, segments[joint], 0.0)
    return before or behind or 0.0, behind or before or 0.0


def _outward(sketch: Sketch, notch: Notch) -> float:
    """The sense along the pixels from the joint to where the corner of the step is, the thinner side.

    It need not be the side of smaller area, as where a tube meets a round bar.
    """
    before, behind = _halves(sketch, notch)
    forward = notch.at_start if before == behind else behind < before
    return sketch.forward * (1.0 if forward else -1.0)


def shoulder_label(notch: Notch, project: Project) -> str:
    """What was entered, and the factor that follows from it: "r 2 mm, Kt 1.62"."""
    entered = shoulder_text(project.joints[notch.joint].shoulder, project.display.unit_system)
    if notch.factor is None:
        shoulder = project.joints[notch.joint].shoulder
        unused = tr("{shoulder}, not used") if shoulder and shoulder.factor else tr("{shoulder}, no Kt")
        return unused.format(shoulder=entered)
    if notch.step is None:
        return entered
    return tr("{shoulder}, Kt {factor}").format(shoulder=entered, factor=reading(notch.factor, 3))


def _draw(sketch: Sketch, notch: Notch) -> None:
    """Dark corners between the thinner side and the face of the step, above and below the axis."""
    part, axis, along = Part("shoulder", notch.joint), sketch.rows.axis, sketch.along(notch.joint)
    edge = min(_halves(sketch, notch))
    size = _size(sketch, notch)
    out = _outward(sketch, notch)
    for side in (-1.0, 1.0):
        corner = along, axis + side * edge
        arc = [
            (
                along + out * size * (1.0 - math.sin(angle)),
                axis + side * (edge + size * (1.0 - math.cos(angle))),
            )
            for angle in (0.5 * math.pi * i / STEPS for i in range(STEPS + 1))
        ]
        sketch.line(corner, *arc, ink="ink", width=1.2, fill="ink", closed=True, part=part, clip=True)
        span = along - 2.0 * out, along + out * (size + 3.0)
        sketch.target(span, (corner[1] - 3.0, corner[1] + side * (size + 3.0)), part)


def _size(sketch: Sketch, notch: Notch) -> float:
    radius = 0.0 if notch.step is None else notch.step.radius * sketch.scale
    return min(max(radius, LEAST), MOST, max(LEAST, sketch.shortest_beside(notch.joint) / 3.0))
