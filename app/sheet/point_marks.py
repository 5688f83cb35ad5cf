"""Peak stresses and fatigue in the strips on paper: diamonds with their words, the worst first."""

from __future__ import annotations

from collections.abc import Sequence
from typing import Final

from app.point_marks import PointMark
from app.sheet import colours
from app.sheet.limit_labels import Scale
from app.sheet.ruler import Ruler
from app.sheet.svg import Canvas, Ink, Point, text_width

SIZE: Final = 6.5
HALF: Final = 2.6  # of a diamond, points
_Box = tuple[float, float, float, float]  # left, top, right, bottom


def draw_point_marks(canvas: Canvas, ruler: Ruler, scale: Scale, marks: Sequence[PointMark]) -> None:
    """All diamonds, and as many words as have room beside each other."""
    taken: list[_Box] = []
    for mark in marks:
        at = ruler.point(ruler.along(mark.x), scale.aside(mark.value))
        taken.append((at[0] - HALF, at[1] - HALF, at[0] + HALF, at[1] + HALF))
    room = ruler.points([(0.0, scale.low), (ruler.extent, scale.high)])
    for mark in marks:
        at = ruler.point(ruler.along(mark.x), scale.aside(mark.value))
        colour = colours.OVER if mark.over else colours.INK
        ink = Ink(colour, 1.0, fill=colour if mark.over else "#FFFFFF")
        x, y = at
        canvas.path([(x, y - HALF), (x + HALF, y), (x, y + HALF), (x - HALF, y)], ink, closed=True)
        box = next((b for b in _boxes(at, mark.text) if _inside(b, room) and not _meets(b, taken)), None)
        if box is not None:
            taken.append(box)
            canvas.text((box[0], box[3] - 1.5), mark.text, size=SIZE, fill=colour, backed=True)


def _boxes(at: Point, text: str) -> tuple[_Box, ...]:
    """Where the words could stand: right, left, under, over."""
    (x, y), width, half = at, text_width(text, SIZE), 0.5 * SIZE
    gap = HALF + 2.0
    return (
        (x + gap, y - half, x + gap + width, y + half),
        (x - gap - width, y - half, x - gap, y + half),
        (x - 0.5 * width, y + gap, x + 0.5 * width, y + gap + SIZE),
        (x - 0.5 * width, y - gap - SIZE, x + 0.5 * width, y - gap),
    )


def _inside(box: _Box, room: Sequence[Point]) -> bool:
    (left, right), (top, bottom) = (sorted(point[i] for point in room) for i in (0, 1))
    return left <= box[0] and box[2] <= right and top <= box[1] and box[3] <= bottom


def _meets(box: _Box, others: Sequence[_Box]) -> bool:
    return any(
        box[0] < other[2] and other[0] < box[2] and box[1] < other[3] and other[1] < box[3]
        for other in others
    )
