"""Outlines around parts: corners at the selected joints, dashes where a click would put a symbol.

A selected segment is seen by its own thick edge; a joint has none, so it wears corners around it.
"""

from __future__ import annotations

from PySide6.QtCore import QPointF, QRectF, Qt
from PySide6.QtGui import QPainter, QPen

from app.drawing.shapes import Part, Picture
from app.gui.theme import Theme, colour

CORNER = 6.0


def paint_selected_joints(painter: QPainter, picture: Picture, joints: frozenset[int], theme: Theme) -> None:
    """Four corners around each selected joint that is in the window."""
    painter.setPen(QPen(colour(theme.select), 2.0))
    for joint in sorted(joints):
        rect = _rect_of(picture, Part("joint", joint))
        if rect is not None:
            _paint_corners(painter, rect.adjusted(-2, -3, 2, 3))


def paint_lit(painter: QPainter, picture: Picture, part: Part, theme: Theme) -> None:
    """A dashed frame around the joint or segment."""
    rect = _rect_of(picture, part)
    if rect is not None:
        painter.setPen(QPen(colour(theme.select), 2.0, Qt.PenStyle.DashLine))
        painter.setBrush(Qt.BrushStyle.NoBrush)
        painter.drawRect(rect.adjusted(-3, -4, 3, 4))


def _rect_of(picture: Picture, part: Part) -> QRectF | None:
    """Where it is pointed at."""
    found = next((target.box for target in picture.targets if target.part == part), None)
    if found is None:
        return None
    return QRectF(found.left, found.top, found.right - found.left, found.bottom - found.top)


def _paint_corners(painter: QPainter, rect: QRectF) -> None:
    for corner, along, across in (
        (rect.topLeft(), 1, 1),
        (rect.topRight(), -1, 1),
        (rect.bottomLeft(), 1, -1),
        (rect.bottomRight(), -1, -1),
    ):
        reach = min(CORNER, 0.5 * rect.width()) * along, min(CORNER, 0.5 * rect.height()) * across
        painter.drawPolyline([corner + QPointF(reach[0], 0), corner, corner + QPointF(0, reach[1])])
