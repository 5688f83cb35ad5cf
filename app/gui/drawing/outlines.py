"""Outlines around parts: corners at the selected joints, dashes where a click would put a symbol, a frame
around the label of a load or a support that is in hand by itself.

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


def paint_thing(painter: QPainter, picture: Picture, thing: Part, theme: Theme) -> None:
    """A frame around the labels of a load or a support; around where it is pointed at if it has none."""
    boxes = [text.box for text in picture.texts if text.part == thing]
    around = [QRectF(b.left, b.top, b.right - b.left, b.bottom - b.top) for b in boxes]
    target = _rect_of(picture, thing)
    painter.setPen(QPen(colour(theme.select), 1.8))
    painter.setBrush(Qt.BrushStyle.NoBrush)
    for rect in around or ([] if target is None else [target]):
        painter.drawRoundedRect(rect.adjusted(-3, -1, 3, 1), 3.0, 3.0)


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
