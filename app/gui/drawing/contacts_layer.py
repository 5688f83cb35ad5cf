"""What stops do in the shown state, over the drawing that keeps room for it."""

from __future__ import annotations

from PySide6.QtCore import QPointF, QRectF
from PySide6.QtGui import QBrush, QPainter, QPen
from PySide6.QtWidgets import QStyleOptionGraphicsItem, QWidget

from app.contacts import stop_states
from app.drawing.frame import StopMark
from app.drawing.shapes import Picture, Stroke, Text
from app.gui.sheet_items import Painted
from app.gui.sheet_layout import Place
from app.gui.theme import Theme, colour
from app.phrases.contacts import signed_contact_text
from solver.model import UnitSystemName
from solver.results import Results


def stop_marks(results: Results, state: int, system: UnitSystemName) -> tuple[StopMark, ...]:
    """What the drawing is to say of every stop in a state."""
    return tuple(
        StopMark(stop.mark, stop.number, stop.closed, signed_contact_text(stop, system))
        for stop in stop_states(results, state)
    )


class Contacts(Painted):
    """Bars across the gaps of closed stops, and the words beside all of them."""

    def __init__(self, theme: Theme, z: float) -> None:
        super().__init__(theme, z)
        self.strokes: tuple[Stroke, ...] = ()
        self.texts: tuple[Text, ...] = ()
        self._place: Place | None = None

    def show_contacts(self, picture: Picture, place: Place) -> None:
        """Paint those of a picture and nothing else."""
        self.strokes, self.texts = tuple(picture.contact_strokes), tuple(picture.contact_texts)
        self._place = place
        self.setVisible(bool(self.strokes or self.texts))
        if self.isVisible():
            self.set_rect(place.rect)

    def paint(self, painter: QPainter, _option: QStyleOptionGraphicsItem, _widget: QWidget | None) -> None:
        """The words of closed ones are bold, so that nothing hangs on a colour."""
        if self._place is None:
            return
        painter.setRenderHint(QPainter.RenderHint.Antialiasing)
        ink = colour(self._theme.ink)
        painter.setPen(QPen(ink, 1.0))
        painter.setBrush(QBrush(ink))
        for stroke in self.strokes:
            painter.drawPolygon([QPointF(x, y) for x, y in stroke.points])
        for text in self.texts:
            painter.setFont(self._place.fonts.font(text.face))
            box = text.box
            rect = QRectF(box.left, box.top, box.right - box.left, box.bottom - box.top)
            self._place.fonts.write(painter, text.text, text.face, rect)
