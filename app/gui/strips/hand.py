"""Strips under the hand: a drag by the title puts a strip elsewhere, a menu does the same by clicks.

It watches the sheet's events and takes only those that are its own.
"""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass

from PySide6.QtCore import QEvent, QObject, QPoint, QPointF, QRectF, Qt
from PySide6.QtGui import QContextMenuEvent, QHelpEvent, QKeyEvent, QMouseEvent, QPainter
from PySide6.QtWidgets import QApplication, QStyleOptionGraphicsItem, QToolTip, QWidget

from app.gui.sheet_items import Painted
from app.gui.sheet_layout import GAP, SheetLayout
from app.gui.sheet_view import SheetView
from app.gui.strips.menu import StripMenu
from app.gui.theme import Theme, colour, theme_for
from app.gui.view import View
from app.strip_choice import Kind
from app.words import tr

MARK = 3.0  # pixels of the line that shows where a dragged strip would go
ESCAPE = Qt.Key.Key_Escape
NO_BUTTON = Qt.MouseButton.NoButton


@dataclass(frozen=True, slots=True)
class Grips:
    """Where strips are taken hold of, and the gaps between them, on some layout."""

    places: SheetLayout

    def grip(self, index: int) -> QRectF:
        """Beside the strip, where its title and values stand; upright above it."""
        rect = self.places.strips[index]
        if self.places.axes.upright:
            return QRectF(rect.left(), 0.0, rect.width(), rect.top())
        return QRectF(0.0, rect.top(), rect.left(), rect.height())

    def held(self, point: QPointF) -> int | None:
        """The strip whose grip is under the point."""
        return next((i for i in range(len(self.places.strips)) if self.grip(i).contains(point)), None)

    def strip(self, point: QPointF) -> int | None:
        """The strip under the point, its grip included."""
        inside = (i for i, rect in enumerate(self.places.strips) if (rect | self.grip(i)).contains(point))
        return next(inside, None)

    def gap(self, point: QPointF) -> int:
        """The gap that is nearest: 0 before the first strip, as many as there are strips after the last."""
        across = self.places.axes.across_of(QRectF(point, point))[0]
        return sum(across > sum(self.places.axes.across_of(rect)) / 2 for rect in self.places.strips)

    def mark(self, gap: int) -> QRectF:
        """The line in a gap, as long as the strips."""
        axes, strips = self.places.axes, self.places.strips
        first = axes.across_of(strips[0])[0]
        middle = first - GAP / 2 if gap == 0 else axes.across_of(strips[gap - 1])[1] + GAP / 2
        return axes.rect(axes.along_of(strips[0]), (middle - MARK / 2, middle + MARK / 2))


class Mark(Painted):
    """The line in the gap a dragged strip would go to."""

    def __init__(self, theme: Theme) -> None:
        super().__init__(theme, 30.0)
        self.setVisible(False)

    def paint(self, painter: QPainter, _option: QStyleOptionGraphicsItem, _widget: QWidget | None) -> None:
        """A bar."""
        painter.fillRect(self._rect, colour(self._theme.select))


@dataclass(slots=True)
class _Drag:
    kind: Kind
    start: QPointF
    began: bool = False


class StripHand(QObject):
    """Watches the sheet for the mouse on strips and their titles."""

    def __init__(self, sheet: SheetView, view: View, menu: StripMenu) -> None:
        super().__init__(sheet)
        self._sheet, self._view, self._menu = sheet, view, menu
        self._drag: _Drag | None = None
        self._pointing = False
        self.mark = Mark(theme_for(sheet.palette()))
        sheet.scene().addItem(self.mark)
        sheet.viewport().installEventFilter(self)
        sheet.installEventFilter(self)

    @property
    def _grips(self) -> Grips:
        return Grips(self._sheet.places)

    def eventFilter(self, _watched: QObject, event: QEvent) -> bool:
        """Whether an event was one for a strip."""
        takers: dict[type, Callable[..., bool]] = {
            QMouseEvent: self._on_mouse,
            QContextMenuEvent: self._on_menu,
            QHelpEvent: self._on_help,
            QKeyEvent: self._on_key,
        }
        taker = takers.get(type(event))
        return taker is not None and taker(event)

    def _on_mouse(self, event: QMouseEvent) -> bool:
        takers = {
            QEvent.Type.MouseButtonPress: self._on_press,
            QEvent.Type.MouseMove: self._on_move,
            QEvent.Type.MouseButtonRelease: self._on_release,
        }
        taker = takers.get(event.type())
        return taker is not None and taker(event)

    def _on_press(self, event: QMouseEvent) -> bool:
        held = self._grips.held(event.position())
        if held is None or event.button() != Qt.MouseButton.LeftButton:
            return False
        self._drag = _Drag(self._view.strips.shown[held], event.position())
        return True

    def _on_move(self, event: QMouseEvent) -> bool:
        if self._drag is None:
            self._point_out(event)
            return False
        moved = (event.position() - self._drag.start).manhattanLength()
        self._drag.began = self._drag.began or moved >= QApplication.startDragDistance()
        if self._drag.began:
            self.mark.set_theme(theme_for(self._sheet.palette()))
            self.mark.set_rect(self._grips.mark(self._grips.gap(event.position())))
            self.mark.setVisible(True)
        return True

    def _point_out(self, event: QMouseEvent) -> None:
        """A hand over what can be taken hold of."""
        pointing = event.buttons() == NO_BUTTON and self._grips.held(event.position()) is not None
        if pointing != self._pointing:
            self._pointing = pointing
            if pointing:
                self._sheet.viewport().setCursor(Qt.CursorShape.OpenHandCursor)
            else:
                self._sheet.viewport().unsetCursor()

    def _on_release(self, event: QMouseEvent) -> bool:
        drag = self._drag
        if drag is None:
            return False
        self._end()
        if drag.began:
            self._view.set_strips(self._view.strips.put(drag.kind, self._grips.gap(event.position())))
        return True

    def _on_key(self, event: QKeyEvent) -> bool:
        """Escape leaves a dragged strip where it was."""
        if self._drag is None or event.type() != QEvent.Type.KeyPress or event.key() != ESCAPE:
            return False
        self._end()
        return True

    def _end(self) -> None:
        self._drag = None
        self.mark.setVisible(False)

    def _on_menu(self, event: QContextMenuEvent) -> bool:
        index = self._grips.strip(QPointF(event.pos()))
        if index is None or event.reason() == QContextMenuEvent.Reason.Keyboard:
            return False
        self._menu.open_for(self._view.strips.shown[index], event.globalPos())
        return True

    def _on_help(self, event: QHelpEvent) -> bool:
        """What is to know of a strip, and what its title can do."""
        index = self._grips.held(QPointF(event.pos()))
        if index is None:
            return False
        words = tr("Drag to put this strip elsewhere; the right mouse button hides it, copies it, and more")
        content = self._sheet.strips[index].content
        if content is not None and content.notes:
            words = f"{content.title}: {content.notes[0]}\n{words}"
        QToolTip.showText(event.globalPos() + QPoint(0, 8), words, self._sheet)
        return True
