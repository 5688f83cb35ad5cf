"""The readout at the pointer: what is being changed, to what, what moves along, what else a hand can do."""

from __future__ import annotations

from collections.abc import Sequence

from PySide6.QtCore import QPointF, QRectF, Qt
from PySide6.QtGui import QPainter, QPen
from PySide6.QtWidgets import QStyleOptionGraphicsItem, QWidget

from app.drawing.shapes import Point
from app.gui.fonts import Fonts
from app.gui.sheet_items import Painted
from app.gui.theme import Theme, colour

ASIDE = QPointF(18.0, 20.0)  # from the pointer, px
EDGE = 7.0
APART = 2.0  # between lines


class Bubble(Painted):
    """Lines on a card beside a point; the first is the news, the others are quiet."""

    def __init__(self, theme: Theme) -> None:
        super().__init__(theme, 40.0)
        self._lines: tuple[str, ...] = ()
        self._fonts: Fonts | None = None
        self.setVisible(False)

    @property
    def text(self) -> str:
        """What it says; empty while it is hidden."""
        return "\n".join(self._lines)

    def say(
        self,
        lines: tuple[str, ...],
        near: QPointF,
        room: QRectF,
        fonts: Fonts,
        clear: Sequence[Point] = (),
    ) -> None:
        """Say lines beside a point, inside the room, with what is `clear` not covered where that can be."""
        self._lines, self._fonts = lines, fonts
        sizes = [fonts.measure(line, self._face(place)) for place, line in enumerate(lines)]
        width = max(size.width() for size in sizes) + 2.0 * EDGE
        height = sum(size.height() + APART for size in sizes) + 2.0 * EDGE - APART
        box = QRectF(near + ASIDE, near + ASIDE + QPointF(width, height))
        self.set_rect(_beside(box, near, room, clear))
        self.setVisible(True)

    def hush(self) -> None:
        """Say nothing."""
        self._lines = ()
        self.setVisible(False)

    @staticmethod
    def _face(place: int) -> str:
        return "plain" if place == 0 else "small"

    def paint(self, painter: QPainter, _option: QStyleOptionGraphicsItem, _widget: QWidget | None) -> None:
        """A card with a quiet edge, then the lines."""
        if self._fonts is None:
            return
        painter.setRenderHint(QPainter.RenderHint.Antialiasing)
        painter.setPen(QPen(colour(self._theme.joint), 1.0))
        painter.setBrush(colour(self._theme.card))
        painter.drawRoundedRect(self._rect.adjusted(0.5, 0.5, -0.5, -0.5), 3.0, 3.0)
        top = self._rect.top() + EDGE
        for place, line in enumerate(self._lines):
            face = self._face(place)
            size = self._fonts.measure(line, face)
            painter.setFont(self._fonts.font(face))
            painter.setPen(colour(self._theme.ink if place == 0 else self._theme.quiet))
            box = QRectF(self._rect.left() + EDGE, top, size.width(), size.height())
            painter.drawText(box, int(Qt.TextFlag.TextDontClip), line)
            top += size.height() + APART


def _beside(box: QRectF, near: QPointF, room: QRectF, clear: Sequence[Point]) -> QRectF:
    """The first of some places that covers none of the points; else the one that covers the fewest."""
    places = [_inside(QRectF(box), near, room)]
    if clear:
        across, along = [y for _, y in clear], [x for x, _ in clear]
        size = box.size()
        for left, top in (
            (near.x() + ASIDE.x(), near.y() - ASIDE.y() - size.height()),
            (near.x() - 0.5 * size.width(), max(across) + ASIDE.y()),
            (near.x() - 0.5 * size.width(), min(across) - ASIDE.y() - size.height()),
            (max(along) + ASIDE.x(), near.y() - 0.5 * size.height()),
            (min(along) - ASIDE.x() - size.width(), near.y() - 0.5 * size.height()),
        ):
            places.append(_held(QRectF(QPointF(left, top), size), room))
    return min(places, key=lambda place: sum(place.contains(QPointF(*point)) for point in clear))


def _inside(box: QRectF, near: QPointF, room: QRectF) -> QRectF:
    """The box moved into the room, to the other side of the point where it would cover it.

    A pull may go on beyond the window; what it says stays inside.
    """
    if box.right() > room.right():
        box.moveRight(near.x() - ASIDE.x())
    if box.bottom() > room.bottom():
        box.moveBottom(near.y() - ASIDE.y())
    return _held(box, room)


def _held(box: QRectF, room: QRectF) -> QRectF:
    """The box moved so far that it lies in the room."""
    box.moveLeft(max(min(box.left(), room.right() - box.width()), room.left()))
    box.moveTop(max(min(box.top(), room.bottom() - box.height()), room.top()))
    return box
