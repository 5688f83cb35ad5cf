"""Selecting many on the sheet: a rubber band, all, and with the keys from the cursor on.

A click, with Ctrl or Shift or without, is the sheet's own; here is what takes more than one event.
"""

from __future__ import annotations

from PySide6.QtCore import QEvent, QObject, QPoint, QPointF, QRect, QRectF, QSize, Qt
from PySide6.QtGui import QKeyEvent, QMouseEvent
from PySide6.QtWidgets import QApplication, QRubberBand

from app.gui.sheet_view import SheetView
from app.gui.view import Selection, View

MOVES = (Qt.Key.Key_Left, Qt.Key.Key_Right, Qt.Key.Key_Up, Qt.Key.Key_Down, Qt.Key.Key_Home, Qt.Key.Key_End)
SHIFT = Qt.KeyboardModifier.ShiftModifier
CONTROL = Qt.KeyboardModifier.ControlModifier


class Selecting(QObject):
    """Hears the sheet's mouse and keys."""

    def __init__(self, view: View, sheet: SheetView, parent: QObject) -> None:
        super().__init__(parent)
        self._view = view
        self._sheet = sheet
        self._start: QPoint | None = None
        self._band = QRubberBand(QRubberBand.Shape.Rectangle, sheet.viewport())
        sheet.installEventFilter(self)
        sheet.viewport().installEventFilter(self)

    @property
    def band(self) -> QRect | None:
        """The rubber band, or None."""
        return self._band.geometry() if self._band.isVisible() else None

    def eventFilter(self, watched: QObject, event: QEvent) -> bool:
        """Shift and a drag over paper; keys with Shift; Ctrl+A; Escape."""
        if isinstance(event, QMouseEvent) and watched is self._sheet.viewport():
            return self._on_mouse(event)
        if isinstance(event, QKeyEvent) and watched is self._sheet:
            if event.type() == QEvent.Type.KeyPress:
                return self._on_key(event)
            if event.type() == QEvent.Type.ShortcutOverride and event.modifiers() & SHIFT:
                event.setAccepted(event.key() in MOVES)  # upright, they are commands of the tables else
                return event.isAccepted()
        return super().eventFilter(watched, event)

    # The rubber band

    def _on_mouse(self, event: QMouseEvent) -> bool:
        if event.type() == QEvent.Type.MouseButtonPress:
            return self._begins(event)
        if self._start is None:
            return False
        if event.type() == QEvent.Type.MouseMove:
            rect = QRect(self._start, event.position().toPoint()).normalized()
            self._band.setGeometry(QRect(rect.topLeft(), rect.size().expandedTo(QSize(1, 1))))
            self._band.setVisible(rect.width() + rect.height() >= QApplication.startDragDistance())
        elif event.type() == QEvent.Type.MouseButtonRelease:
            self._end()
        return True

    def _begins(self, event: QMouseEvent) -> bool:
        """Whether a press begins a band: with Shift, beside every part of the drawing."""
        on_paper = self._sheet.drawing.part_at(QPointF(event.position())) is None
        inside = self._sheet.places.drawing.contains(event.position())
        left = event.button() == Qt.MouseButton.LeftButton
        if not (left and on_paper and inside and event.modifiers() & SHIFT):
            return False
        self._start = event.position().toPoint()
        return True

    def _end(self) -> None:
        band, self._start = self.band, None
        self._band.hide()
        if band is not None:
            self._view.set_selection(self._view.selection.joined(self._inside(QRectF(band))))

    def _inside(self, band: QRectF) -> Selection:
        """Segments that the band holds from end to end, and joints between its ends, if it meets them."""
        places, ruler = self._sheet.places, self._sheet.ruler
        low, high = places.axes.along_of(band)
        found: dict[str, set[int]] = {"segment": set(), "joint": set(), "companion": set()}
        for target in self._sheet.drawing.picture.targets:
            box = target.box
            rect = QRectF(box.left, box.top, box.right - box.left, box.bottom - box.top)
            beside = target.part.kind == "companion"
            if target.part.kind in found and (band.contains(rect) if beside else band.intersects(rect)):
                found[target.part.kind].add(target.part.index)
        pixels = [ruler.pixel(x) for x in self._sheet.positions]
        held = {i for i in found["joint"] if low <= pixels[i] <= high}
        whole = {
            i for i in found["segment"] if low <= min(pixels[i : i + 2]) and max(pixels[i : i + 2]) <= high
        }
        return Selection(frozenset(whole), frozenset(held), frozenset(found["companion"]))

    def cancel(self) -> None:
        """Put the band away and leave the selection as it was."""
        self._start = None
        self._band.hide()

    # Keys

    def _on_key(self, event: QKeyEvent) -> bool:
        if event.key() == Qt.Key.Key_Escape and self._start is not None:
            self.cancel()
            return True
        if event.key() == Qt.Key.Key_A and event.modifiers() == CONTROL:
            self.select_all()
            return True
        if event.key() in MOVES and event.modifiers() & SHIFT:
            return self._extend(event)
        return False

    def select_all(self) -> None:
        """All segments and joints."""
        count = len(self._sheet.positions)
        self._view.set_selection(Selection(frozenset(range(count - 1)), frozenset(range(count))))

    def _extend(self, event: QKeyEvent) -> bool:
        """Move the cursor as without Shift, and select the segments that it goes over."""
        start = self._view.cursor.x if self._view.cursor else 0.0
        self._sheet.keyPressEvent(event)
        end = self._view.cursor.x if self._view.cursor else start
        low, high = min(start, end), max(start, end)
        positions = self._sheet.positions
        over = [i for i in range(len(positions) - 1) if positions[i] < high and low < positions[i + 1]]
        self._view.set_selection(self._view.selection.joined(Selection(segments=frozenset(over))))
        return True
