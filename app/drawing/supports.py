"""What holds the member: a hatched wall, a zigzag spring with its stiffness, a stop with its gap.

At the ends of the member, walls and springs lie on the axis outside it; at inner joints they hang from the
joint in a row of their own on the far side of the loads.
"""

from __future__ import annotations

from msgspec import UnsetType
from msgspec.structs import replace

from app.drawing.body import edge_at
from app.drawing.placing import Wish
from app.drawing.shapes import Part
from app.drawing.sketch import Sketch
from app.drawing.words import value_text
from app.words import tr
from solver.model import AnySupport, FixedSupport, SpringSupport, StopSupport

SPRING = 38.0  # length of a zigzag, px
WALL = 7.0  # how far hatching reaches, px
TEETH = 5


def support_of(sketch: Sketch, joint: int) -> AnySupport | None:
    """The support at a joint, or None."""
    support = sketch.member.project.joints[joint].support
    return None if isinstance(support, UnsetType) else support


def hangs(support: AnySupport | None, *, inner: bool) -> bool:
    """Whether a support takes room in the row under the member."""
    return support is not None and (inner or isinstance(support, StopSupport))


def draw_supports(sketch: Sketch, wishes: list[Wish]) -> None:
    """All supports inside the window, with the labels of those that hang."""
    last = len(sketch.member.project.joints) - 1
    for joint in range(last + 1):
        support = support_of(sketch, joint)
        if support is None or not sketch.holds(joint):
            continue
        if hangs(support, inner=0 < joint < last):
            _draw_hanging(sketch, joint, support)
        else:
            _draw_at_end(sketch, joint, support, -1.0 if joint == 0 else 1.0)
    sketch.put(wishes, (sketch.rows.under_label,), "low")


def hanging_wishes(sketch: Sketch) -> list[Wish]:
    """The labels of hanging springs and stops."""
    if not sketch.frame.detail.dimensions:
        return []
    last = len(sketch.member.project.joints) - 1
    wishes = []
    for joint in range(last + 1):
        support = support_of(sketch, joint)
        if support is not None and hangs(support, inner=0 < joint < last) and sketch.holds(joint):
            low, high = _hanging_span(sketch, joint, support)
            text = _hanging_text(sketch, support)
            if text:
                wishes.append(sketch.wish(text, 0.5 * (low + high), Part("support", joint), slide=30.0))
    return wishes + _wide_wishes(sketch)


def _wide_wishes(sketch: Sketch) -> list[Wish]:
    """The stiffnesses of end springs that have no room outside the member, where they get some under it."""
    if not sketch.frame.detail.explained:
        return []
    wishes = []
    for joint in (0, len(sketch.member.project.joints) - 1):
        support = support_of(sketch, joint)
        if isinstance(support, SpringSupport):
            wish = _stiffness_wish(sketch, joint, support, sketch.along(joint))
            if _is_wide(sketch, joint, wish):
                wishes.append(replace(wish, slide=wish.extent))
    return wishes


def _stiffness_wish(sketch: Sketch, joint: int, support: SpringSupport, along: float) -> Wish:
    return sketch.wish(_stiffness(sketch, support.stiffness), along, Part("support", joint))


def _is_wide(sketch: Sketch, joint: int, wish: Wish) -> bool:
    """Whether the margin beyond an end joint is too narrow for a label."""
    low, high = sketch.margin_beyond(joint)
    return wish.extent > high - low


def _hanging_text(sketch: Sketch, support: AnySupport) -> str:
    if isinstance(support, SpringSupport):
        return _stiffness(sketch, support.stiffness)
    if isinstance(support, StopSupport):
        gap = value_text(support.clearance, "displacement", sketch.member.system)
        return tr("gap {value}").format(value=gap)
    return ""


def _hanging_span(sketch: Sketch, joint: int, support: AnySupport) -> tuple[float, float]:
    """The pixels along the axis that a hanging support takes, growing."""
    along = sketch.along(joint)
    if isinstance(support, FixedSupport):
        return along - 12.0, along + 12.0
    reach = -SPRING if isinstance(support, SpringSupport) else 16.0 * _side(support)
    low, high = sorted((along, along + sketch.forward * reach))
    return low, high


def _side(support: AnySupport) -> float:
    """+1 for a stop on the plus side, −1 on the other."""
    return -1.0 if isinstance(support, StopSupport) and support.side == "minus" else 1.0


def _draw_at_end(sketch: Sketch, joint: int, support: AnySupport, side: float) -> None:
    """On the axis, outward: `side` −1 at the first joint, +1 at the last."""
    out = side * sketch.forward
    along, axis, half = sketch.along(joint), sketch.rows.axis, edge_at(sketch, joint)
    part = Part("support", joint)
    reach = WALL + 3.0
    if isinstance(support, FixedSupport):
        _wall(sketch, along, half + 8.0, out)
    elif isinstance(support, SpringSupport):
        ground = along + out * SPRING
        _zigzag(sketch, along, ground, axis, part)
        _wall(sketch, ground, 12.0, out)
        reach, half = SPRING + WALL, max(half, 12.0)
        if sketch.frame.detail.dimensions:
            _label_end_spring(sketch, joint, support, 0.5 * (along + ground))
    span = (along, along + out * max(reach, 24.0))
    sketch.target(span, (axis - half - 8.0, axis + half + 8.0), part)


def _label_end_spring(sketch: Sketch, joint: int, support: SpringSupport, along: float) -> None:
    """Beside the spring, outside the member; under its edge where the margin is too narrow for that."""
    wish = _stiffness_wish(sketch, joint, support, along)
    low, high = sketch.margin_beyond(joint)
    top, foot = sketch.rows.axis + 15.0, sketch.rows.sections[-1][1]
    if _is_wide(sketch, joint, wish):
        if sketch.frame.detail.explained:
            return  # it stands in the row of hanging labels
        low, high = sketch.room
        top = max(top, sketch.rows.axis + edge_at(sketch, joint) + 3.0)
        foot = sketch.rows.under_label[0]
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


def _stiffness(sketch: Sketch, stiffness: float) -> str:
    return value_text(stiffness, "spring", sketch.member.system)


def _draw_hanging(sketch: Sketch, joint: int, support: AnySupport) -> None:
    """Under the joint, on a stem."""
    part = Part("support", joint)
    along, under = sketch.along(joint), sketch.rows.under
    sketch.line((along, sketch.rows.axis + edge_at(sketch, joint)), (along, under), width=1.6, part=part)
    if isinstance(support, FixedSupport):
        sketch.line((along - 12.0, under), (along + 12.0, under), width=2.0, part=part)
        sketch.hatch((along - 12.0, along + 8.0), (under, under), (5.0, WALL))
    elif isinstance(support, SpringSupport):
        _hang_spring(sketch, along, part)
    else:
        _hang_stop(sketch, along, sketch.forward * _side(support), part)
    span = _hanging_span(sketch, joint, support)
    sketch.target(span, (under - 9.0, sketch.rows.under_label[1]), part)


def _hang_spring(sketch: Sketch, along: float, part: Part) -> None:
    under, ground = sketch.rows.under, along - sketch.forward * SPRING
    _zigzag(sketch, along, ground, under, part)
    sketch.line((ground, under - 7.0), (ground, under + 7.0), width=1.6, part=part)
    sketch.hatch((ground, ground), (under - 7.0, under + 4.0), (-sketch.forward * 5.0, 4.0))


def _hang_stop(sketch: Sketch, along: float, out: float, part: Part) -> None:
    """A plate on the joint, a gap, and the wall it can meet on its side."""
    under = sketch.rows.under
    nose, wall = along + out * 8.0, along + out * 16.0
    sketch.line((along, under), (nose, under), width=1.6, part=part)
    sketch.line((nose, under - 5.0), (nose, under + 5.0), width=2.4, part=part)
    sketch.line((wall, under - 8.0), (wall, under + 8.0), width=1.6, part=part)
    sketch.hatch((wall, wall), (under - 8.0, under + 4.0), (out * 5.0, 4.0))
