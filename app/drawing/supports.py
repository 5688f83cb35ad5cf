"""What holds the member: a hatched wall, a zigzag spring with its stiffness, a stop with its gap.

At the ends of the member, walls, springs and stops lie on the axis outside it; at inner joints they hang from
the joint in rows of their own on the far side of the loads, one below the other where there are several.
"""

from __future__ import annotations

from itertools import zip_longest

from msgspec import Struct, UnsetType
from msgspec.structs import replace

from app.drawing.body import edge_at
from app.drawing.hanging import Drawn, side_of
from app.drawing.placing import Wish
from app.drawing.shapes import Part
from app.drawing.sketch import Sketch
from app.drawing.words import value_text
from app.support_entry import are_opposite
from app.words import tr
from solver.model import FixedSupport, SpringSupport, StopSupport, supports_of

SPRING = 38.0  # length of a zigzag, px
WALL = 7.0  # how far hatching reaches, px
TEETH = 5
NOSE = 8.0  # from the joint to the plate of a hanging stop, px
GAP = 8.0  # from a plate, or the member's end, to the wall it can meet, px
LEVEL = 20.0  # from one hanging support to the next below it, px
SLIDE = 60.0  # how far a label may go aside, px; beside others of its joint further
FAR = 3.0  # times as far


class Faces(Struct, frozen=True, gc=False):
    """What of a stop can meet: the pixels along the axis of plate and wall, and their place across."""

    nose: float
    wall: float
    across: float
    half: float


def draw_supports(sketch: Sketch) -> None:
    """All supports inside the window."""
    for one in sketch.supports:
        if not sketch.holds(one.joint):
            continue
        if one.hangs:
            _draw_hanging(sketch, one)
        else:
            _draw_at_end(sketch, one)


def part_of(one: Drawn) -> Part:
    """What the support is as a part of the drawing."""
    return Part("support", one.joint, one.number)


def across_of(sketch: Sketch, one: Drawn) -> float:
    """The line that a support hangs on."""
    return sketch.rows.under + LEVEL * one.level


def faces_of(sketch: Sketch, one: Drawn) -> Faces:
    """Where plate and wall of a stop are."""
    along = sketch.along(one.joint)
    out = sketch.forward * (side_of(one.support) if isinstance(one.support, StopSupport) else 1.0)
    if one.hangs:
        return Faces(along + out * NOSE, along + out * (NOSE + GAP), across_of(sketch, one), 8.0)
    return Faces(along, along + out * GAP, sketch.rows.axis, edge_at(sketch, one.joint) + 6.0)


# Labels


def support_wishes(sketch: Sketch) -> list[Wish]:
    """The labels of hanging springs and of stops."""
    if not sketch.frame.detail.dimensions:
        return []
    wishes, said = [], False
    for one, after in zip_longest(sketch.supports, sketch.supports[1:]):
        both = not said and _speaks_for(one, after)
        text = "" if said else _label(sketch, one, both=both)
        said = both
        if text and sketch.holds(one.joint):
            low, high = span_of(sketch, one)
            wishes.append(sketch.wish(text, 0.5 * (low + high), part_of(one), slide=slide_of(sketch, one)))
    return wishes + _wide_wishes(sketch)


def slide_of(sketch: Sketch, one: Drawn) -> float:
    """How far a label may go aside."""
    return SLIDE if _is_alone(sketch, one) else SLIDE * FAR


def _is_alone(sketch: Sketch, one: Drawn) -> bool:
    """Whether its joint has no other support."""
    return len(supports_of(sketch.member.project.joints[one.joint])) == 1


def _speaks_for(one: Drawn, after: Drawn | None) -> bool:
    """Whether the next support is a stop like this one but for its side, so that one label says both."""
    return after is not None and after.joint == one.joint and are_opposite(one.support, after.support)


def _wide_wishes(sketch: Sketch) -> list[Wish]:
    """The stiffnesses of end springs that have no room outside the member, where they get some under it."""
    if not sketch.frame.detail.explained:
        return []
    wishes = []
    for one in sketch.supports:
        if not one.hangs and isinstance(one.support, SpringSupport) and _is_alone(sketch, one):
            wish = _stiffness_wish(sketch, one, one.support, sketch.along(one.joint))
            if _is_wide(sketch, one.joint, wish):
                wishes.append(replace(wish, slide=wish.extent))
    return wishes


def _stiffness_wish(sketch: Sketch, one: Drawn, support: SpringSupport, along: float) -> Wish:
    return sketch.wish(_stiffness(sketch, support.stiffness), along, part_of(one))


def _is_wide(sketch: Sketch, joint: int, wish: Wish) -> bool:
    """Whether the margin beyond an end joint is too narrow for a label."""
    low, high = sketch.margin_beyond(joint)
    return wish.extent > high - low


def _label(sketch: Sketch, one: Drawn, *, both: bool) -> str:
    """What stands in the row under the supports; the side of a stop where there is more at its joint."""
    support = one.support
    if isinstance(support, SpringSupport) and (one.hangs or not _is_alone(sketch, one)):
        return _stiffness(sketch, support.stiffness)
    if not isinstance(support, StopSupport):
        return ""
    gap = value_text(support.clearance, "displacement", sketch.member.system)
    how = tr("rigid") if isinstance(support.stiffness, UnsetType) else _stiffness(sketch, support.stiffness)
    words = tr("gap {value}, {how}").format(value=gap, how=how)
    return (
        words
        if _is_alone(sketch, one)
        else f"{'±' if both else '+' if side_of(support) > 0 else '−'} {words}"
    )


def _stiffness(sketch: Sketch, stiffness: float) -> str:
    return value_text(stiffness, "spring", sketch.member.system)


def span_of(sketch: Sketch, one: Drawn) -> tuple[float, float]:
    """The pixels along the axis that a support takes, growing."""
    along = sketch.along(one.joint)
    if isinstance(one.support, FixedSupport):
        return along - 12.0, along + 12.0
    end = along - sketch.forward * SPRING
    if isinstance(one.support, StopSupport):
        end = faces_of(sketch, one).wall
    return min(along, end), max(along, end)


# At an end


def _draw_at_end(sketch: Sketch, one: Drawn) -> None:
    """On the axis, outward."""
    out = one.end * sketch.forward
    along, axis, half = sketch.along(one.joint), sketch.rows.axis, edge_at(sketch, one.joint)
    part = part_of(one)
    reach = WALL + 3.0
    if isinstance(one.support, FixedSupport):
        _wall(sketch, along, half + 8.0, out)
    elif isinstance(one.support, StopSupport):
        faces = faces_of(sketch, one)
        _wall(sketch, faces.wall, faces.half, out)
        reach = GAP + WALL
    else:
        ground = along + out * SPRING
        _zigzag(sketch, along, ground, axis, part)
        _wall(sketch, ground, 12.0, out)
        reach, half = SPRING + WALL, max(half, 12.0)
        if sketch.frame.detail.dimensions and _is_alone(sketch, one):
            _label_end_spring(sketch, one, one.support, 0.5 * (along + ground))
    span = (along, along + out * max(reach, 24.0))
    sketch.target(span, (axis - half - 8.0, axis + half + 8.0), part)


def _label_end_spring(sketch: Sketch, one: Drawn, support: SpringSupport, along: float) -> None:
    """Beside the spring, outside the member; under its edge where the margin is too narrow for that."""
    wish = _stiffness_wish(sketch, one, support, along)
    low, high = sketch.margin_beyond(one.joint)
    top, foot = sketch.rows.axis + 15.0, sketch.rows.sections[-1][1]
    if _is_wide(sketch, one.joint, wish):
        if sketch.frame.detail.explained:
            return  # it stands in the row of hanging labels
        low, high = sketch.room
        top = max(top, sketch.rows.axis + edge_at(sketch, one.joint) + 3.0)
        foot = sketch.rows.under_label[0][0]
    along = min(max(along, low + 0.5 * wish.extent), high - 0.5 * wish.extent)
    span, across = (along - 0.5 * wish.extent, along + 0.5 * wish.extent), (top, top + wish.depth)
    if across[1] <= foot and sketch.is_free(wish, span, across, "middle"):
        sketch.text(wish, span, across)
    else:
        sketch.picture.left_out += 1


def _wall(sketch: Sketch, along: float, half: float, out: float) -> None:
    """A wall across the axis, hatched on its outer side."""
    axis = sketch.rows.axis
    sketch.line((along, axis - half), (along, axis + half), width=2.0)
    sketch.hatch((along, along), (axis - half, axis + half - 4.0), (out * WALL, 5.0))


def _zigzag(sketch: Sketch, start: float, end: float, across: float, part: Part) -> None:
    """A spring along the axis."""
    straight, step = 0.15 * (end - start), 0.7 * (end - start) / TEETH
    first = start + straight
    teeth = [(first + (i + 0.5) * step, across + (5.0 if i % 2 else -5.0)) for i in range(TEETH)]
    ends = (end - straight, across), (end, across)
    sketch.line((start, across), (first, across), *teeth, *ends, width=1.3, part=part)


# Under a joint


def _draw_hanging(sketch: Sketch, one: Drawn) -> None:
    """Under the joint, on a stem."""
    part = part_of(one)
    along, under = sketch.along(one.joint), across_of(sketch, one)
    top = sketch.rows.axis + edge_at(sketch, one.joint) if one.level == 0 else under - LEVEL
    sketch.line((along, top), (along, under), width=1.6, part=part)
    if isinstance(one.support, FixedSupport):
        sketch.line((along - 12.0, under), (along + 12.0, under), width=2.0, part=part)
        sketch.hatch((along - 12.0, along + 8.0), (under, under), (5.0, WALL))
    elif isinstance(one.support, SpringSupport):
        _hang_spring(sketch, along, under, part)
    else:
        _hang_stop(sketch, along, faces_of(sketch, one), part)
    low = sketch.rows.under_label[-1][1] if sketch.is_lowest(one) else under + 0.5 * LEVEL
    sketch.target(span_of(sketch, one), (under - 9.0, low), part)


def _hang_spring(sketch: Sketch, along: float, under: float, part: Part) -> None:
    ground = along - sketch.forward * SPRING
    _zigzag(sketch, along, ground, under, part)
    sketch.line((ground, under - 7.0), (ground, under + 7.0), width=1.6, part=part)
    sketch.hatch((ground, ground), (under - 7.0, under + 4.0), (-sketch.forward * 5.0, 4.0))


def _hang_stop(sketch: Sketch, along: float, faces: Faces, part: Part) -> None:
    """A plate on the joint, a gap, and the wall it can meet on its side."""
    nose, wall, under = faces.nose, faces.wall, faces.across
    out = 1.0 if wall > nose else -1.0
    sketch.line((along, under), (nose, under), width=1.6, part=part)
    sketch.line((nose, under - 5.0), (nose, under + 5.0), width=2.4, part=part)
    sketch.line((wall, under - faces.half), (wall, under + faces.half), width=1.6, part=part)
    sketch.hatch((wall, wall), (under - faces.half, under + 4.0), (out * 5.0, 4.0))
