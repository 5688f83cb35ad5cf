"""How supports and bedding are drawn: walls with hatching, springs as zigzags, a gap at a stop."""

from __future__ import annotations

from collections.abc import Callable

from msgspec import UnsetType

from app.sheet.colours import INK, QUIET
from app.sheet.lanes import Edge
from app.sheet.ruler import Ruler
from app.sheet.svg import Canvas, Ink
from solver.model import FixedSupport, Joint, Segment, SpringSupport, StopSupport

_LINE = Ink(INK, 1.0)
_THIN = Ink(INK, 0.7)
_BODY = Ink(INK, 1.4)
_SPRING = 24.0
_TEETH = 5


def draw_wall(canvas: Canvas, ruler: Ruler, along: float, aside: tuple[float, float], facing: int) -> None:
    """A wall across the axis, hatched on its far side; the member lies on the side `facing` points to."""
    low, high = aside
    canvas.path(ruler.points([(along, low), (along, high)]), _BODY)
    count = max(2, round((high - low) / 5))
    step = (high - low) / count
    canvas.lines(
        (
            (
                ruler.point(along, low + (index + 1) * step),
                ruler.point(along - facing * 5, low + index * step),
            )
            for index in range(count)
        ),
        _THIN,
    )


def draw_spring(canvas: Canvas, ruler: Ruler, start: float, end: float, aside: float) -> None:
    """A zigzag along the axis from start to end, in points."""
    lead = (end - start) * 0.15
    pitch = (end - start - 2 * lead) / (2 * _TEETH)
    teeth = [
        (start + lead + (index + 0.5) * pitch, aside + (3.5 if index % 2 else -3.5))
        for index in range(2 * _TEETH)
    ]
    places = [(start, aside), (start + lead, aside), *teeth, (end - lead, aside), (end, aside)]
    canvas.path(ruler.points(places), _LINE)


def draw_end_support(canvas: Canvas, ruler: Ruler, joint: Joint, along: float, half: float, out: int) -> None:
    """The support of an end joint, beyond the member; `out` is −1 at the first joint, +1 at the last."""
    support = joint.support
    if isinstance(support, UnsetType):
        return
    away = 0.0 if isinstance(support, FixedSupport) else _SPRING
    if isinstance(support, SpringSupport) or (
        isinstance(support, StopSupport) and not isinstance(support.stiffness, UnsetType)
    ):
        draw_spring(canvas, ruler, along, along + out * away, 0.0)
    draw_wall(canvas, ruler, along + out * away, (-half - 4, half + 4), -out)


def draw_side_support(
    canvas: Canvas, ruler: Ruler, joint: Joint, along: float, edge: Edge, half: float
) -> None:
    """The support of a joint inside the member, drawn beside it beyond the edge."""
    support = joint.support
    aside = edge.at(9.0)
    canvas.path(ruler.points([(along, edge.side * half), (along, aside)]), _LINE)
    back = along if isinstance(support, FixedSupport) else along - _SPRING
    if isinstance(support, SpringSupport):
        draw_spring(canvas, ruler, back, along, aside)
    draw_wall(canvas, ruler, back, (aside - 6, aside + 6), 1)


def draw_bedding(
    canvas: Canvas, ruler: Ruler, segment: Segment, span: tuple[float, float], half: Callable[[float], float]
) -> bool:
    """Short slanted marks along both edges of a bedded segment; whether it is bedded."""
    ends = (segment.bedding, 0.0 if isinstance(segment.bedding_end, UnsetType) else segment.bedding_end)
    if not any(ends):
        return False
    start, end = span
    count = max(1, int((end - start) / 6))
    marks = []
    for index in range(count):
        s = (index + 0.5) / count
        along, edge = start + s * (end - start), half(s)
        marks += [
            (ruler.point(along - 1.5, side * edge), ruler.point(along + 1.5, side * (edge + 4)))
            for side in (-1, 1)
        ]
    canvas.lines(marks, Ink(QUIET, 0.7))
    return True
