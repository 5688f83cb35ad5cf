"""Marks on the drawing where a cell holds a text that was not taken in: a boxed "!" and a dotted line.

They look as in the tables, so that what is out of date can be found from either side.
"""

from __future__ import annotations

from collections.abc import Iterable

from PySide6.QtCore import QPointF, QRectF, Qt
from PySide6.QtGui import QFont, QPainter, QPen

from app.drawing.shapes import Box, Part, Picture, body_of
from app.gui.theme import Theme, colour

SIZE = 14.0


def paint_marks(
    painter: QPainter, picture: Picture, parts: Iterable[Part], theme: Theme, font: QFont
) -> None:
    """A mark for each part that is drawn, or for the segment or joint it belongs to."""
    for part in parts:
        box = box_to_mark(picture, part)
        if box is not None:
            _paint_mark(painter, box, theme, font)


def box_to_mark(picture: Picture, part: Part) -> Box | None:
    """Where a part's mark goes; None where neither it nor its segment or joint is in the window."""
    return picture.box_of(part) or picture.box_of(body_of(part))


def _paint_mark(painter: QPainter, box: Box, theme: Theme, font: QFont) -> None:
    painter.setPen(QPen(colour(theme.over), 2.0, Qt.PenStyle.DotLine))
    painter.drawLine(QPointF(box.left, box.bottom), QPointF(box.right, box.bottom))
    square = QRectF(box.right + 2.0, box.centre[1] - 0.5 * SIZE, SIZE, SIZE)
    painter.fillRect(square, colour(theme.over))
    painter.setPen(colour(theme.card))
    painter.setFont(font)
    painter.drawText(square, int(Qt.AlignmentFlag.AlignCenter), "!")
