"""What holds joints sideways: wedges on both edges where one cannot go, bars along them where it cannot turn.

Springs and dashes stand for those that give, with their stiffness under the member. At the ends the signs lie
a little inward, beside the wall that holds the member along its axis.
"""

from __future__ import annotations

from app.drawing.body import edge_at
from app.drawing.placing import Wish
from app.drawing.shapes import Part, PartKind
from app.drawing.sketch import Sketch
from app.lateral_entry import LateralKey, hold_of, hold_text
from app.words import tr
from solver.model import Joint, UnitSystemName, parts_of
from solver.sections import outline

HEIGHT = 9.0  # of a wedge or a spring across, px
HALF = 5.0  # of a wedge along
BAR = 9.0  # half of a bar along
GAP = 3.0  # from the member's edge to a bar
INWARD = 12.0  # of the signs at the ends of the member
ROOM = 8.0  # across on either side, beside what lies there anyway
KEYS: tuple[tuple[PartKind, LateralKey], ...] = (("lateral", "translation"), ("turning", "rotation"))


def is_held(joint: Joint) -> bool:
    """Whether anything holds the joint sideways."""
    return any(hold_of(joint.lateral, key) != "free" for _part, key in KEYS)


def room_beside(sketch: Sketch) -> float:
    """What the signs need on either side beyond the thickest section; none where all stand at thin ones."""
    joints = sketch.member.project.joints
    held = [_thickness(sketch, index) for index, joint in enumerate(joints) if is_held(joint)]
    if not held:
        return 0.0
    most = max(_thickness(sketch, index) for index in range(len(joints)))
    return ROOM * max(0.0, 2.0 * max(held) / most - 1.0)


def _thickness(sketch: Sketch, joint: int) -> float:
    """Of the thicker side at a joint, m."""
    segments = sketch.member.project.segments
    sides = [(segments[joint - 1], 1.0)] if joint else []
    sides += [(segments[joint], 0.0)] if joint < len(segments) else []
    return max(outline(part.section, s).outer for segment, s in sides for part in parts_of(segment))


def draw_laterals(sketch: Sketch) -> None:
    """The signs of all joints inside the window, and where they are pointed at."""
    for index, joint in enumerate(sketch.member.project.joints):
        if is_held(joint) and sketch.holds(index):
            for side in (-1.0, 1.0):
                _draw(sketch, index, joint, side)


def _along(sketch: Sketch, index: int) -> float:
    last = len(sketch.member.project.joints) - 1
    inward = 1.0 if index == 0 else -1.0 if index == last else 0.0
    room = min(INWARD, sketch.shortest_beside(index) / 2.0)
    return sketch.along(index) + inward * room * sketch.forward


def _draw(sketch: Sketch, index: int, joint: Joint, side: float) -> None:
    """Across from the member's edge outward, `side` −1 above and +1 below the axis."""
    along = _along(sketch, index)
    edge = sketch.rows.axis + side * (edge_at(sketch, index) + 1.0)
    turning = hold_of(joint.lateral, "rotation")
    if turning != "free":
        part = Part("turning", index)
        _bar(sketch, along, edge + side * GAP, side, part, springs=turning != "fixed")
        edge += side * (GAP + 1.0)
        sketch.target((along - BAR, along + BAR), (edge - 4.0, edge + 4.0), part)
    moving = hold_of(joint.lateral, "translation")
    if moving != "free":
        part, foot = Part("lateral", index), edge + side * HEIGHT
        if moving == "fixed":
            corners = (along, edge), (along - HALF, foot), (along + HALF, foot)
            sketch.line(*corners, width=1.4, fill="paper", closed=True, part=part)
        else:
            _spring(sketch, along, edge, foot, part)
        ground = (along - HALF - 2.0, foot), (along + HALF + 2.0, foot)
        sketch.line(*ground, width=1.8, part=part)
        sketch.target((along - HALF - 3.0, along + HALF + 3.0), (edge, foot + side * 3.0), part)


def _bar(sketch: Sketch, along: float, across: float, side: float, part: Part, *, springs: bool) -> None:
    """A bar beside the edge: what lies along it cannot turn; dashed where it gives."""
    dash = (3.0, 2.0) if springs else ()
    sketch.line((along - BAR, across), (along + BAR, across), width=2.2, dash=dash, part=part)
    if not springs:
        for at in (-BAR, 0.0, BAR):
            end = along + at + 3.0, across + side * 4.0
            sketch.line((along + at, across), end, width=1.0, part=part)


def _spring(sketch: Sketch, along: float, start: float, end: float, part: Part) -> None:
    """A zigzag across."""
    step = (end - start) / 6.0
    teeth = [(along + (HALF - 1.0 if i % 2 else 1.0 - HALF), start + step * (i + 1)) for i in range(5)]
    sketch.line((along, start), *teeth, (along, end), width=1.2, part=part)


def lateral_wishes(sketch: Sketch) -> list[Wish]:
    """The stiffnesses of those that give."""
    if not sketch.frame.detail.dimensions:
        return []
    return [
        sketch.wish(text, _along(sketch, index), Part(kind, index), slide=60.0)
        for index, joint in enumerate(sketch.member.project.joints)
        if sketch.holds(index)
        for kind, key in KEYS
        if (text := _label(sketch, joint, key))
    ]


def _label(sketch: Sketch, joint: Joint, key: LateralKey) -> str:
    if isinstance(hold_of(joint.lateral, key), str):
        return ""
    words = tr("sideways {value}") if key == "translation" else tr("turning {value}")
    return words.format(value=hold_text(joint.lateral, key, sketch.member.system))


def lateral_lines(joint: Joint, system: UnitSystemName) -> tuple[str, ...]:
    """The same in words, for what is pointed at."""
    said = {"lateral": tr("sideways: {hold}"), "turning": tr("against turning: {hold}")}
    return tuple(
        said[part].format(hold=hold_text(joint.lateral, key, system))
        for part, key in KEYS
        if hold_of(joint.lateral, key) != "free"
    )
