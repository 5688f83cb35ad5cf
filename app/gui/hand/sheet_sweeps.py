"""Sweeping the numbers on the drawing: Ctrl with the wheel over a label, or a press and a pull with Ctrl.

The label's own table cell is swept, that of all neighbours that the label stands for. A label moves while its
number runs, so a wheel that goes on turning in one place goes on with the same number. A click with Ctrl goes
through to the drawing as it came.
"""

from __future__ import annotations

from collections.abc import Callable
from typing import Any

from PySide6.QtCore import QEvent, QObject, QPointF, Qt
from PySide6.QtGui import QMouseEvent, QWheelEvent
from PySide6.QtWidgets import QApplication

from app.drawing.shapes import Text
from app.gui.hand.cell_entry import CellEntry
from app.gui.hand.in_place import InPlace
from app.gui.hand.sweeper import CONTROL, PULL, Wheel
from app.gui.sheet_view import SheetView
from app.gui.tables.pane import TablesPane
from app.hand.cells import cells_of
from app.sweep import place_in_entry

WORDS = ("note", "mark")  # labels that hold no value


class SheetSweeps(QObject):
    """Turns what the hand does over the labels of the sheet into steps of the sweeper."""

    def __init__(self, sheet: SheetView, tables: TablesPane, in_place: InPlace) -> None:
        super().__init__(sheet)
        self._sheet = sheet
        self._tables = tables
        self._in_place = in_place
        self._sweeper = tables.sweeper
        self._wheel = Wheel()
        self._turned_at: QPointF | None = None  # where the wheel took hold of the number that runs
        self._press: QMouseEvent | None = None  # with Ctrl on a number
        self._pulled: int | None = None  # steps of the pull so far; None before it began
        self._passing = False  # a click on its way to the drawing
        sheet.viewport().installEventFilter(self)
        self._handlers: dict[QEvent.Type, Callable[[Any], bool]] = {
            QEvent.Type.Wheel: self._on_wheel,
            QEvent.Type.MouseButtonPress: self._on_press,
            QEvent.Type.MouseMove: self._on_move,
            QEvent.Type.MouseButtonRelease: self._on_release,
            QEvent.Type.Leave: self._on_leave,
        }

    def eventFilter(self, watched: QObject, event: QEvent) -> bool:
        """What concerns a number; the rest is the sheet's."""
        handle = self._handlers.get(event.type())
        if handle is None or self._passing:
            return super().eventFilter(watched, event)
        return handle(event)

    def _label_at(self, point: QPointF) -> Text | None:
        """The label with a value at a point."""
        at = (point.x(), point.y())
        found = (
            text
            for text in self._sheet.drawing.picture.texts
            if text.part is not None and text.part.kind not in WORDS and text.box.contains(at)
        )
        return next(found, None)

    def _begin(self, point: QPointF) -> bool | None:
        """Whether the number at a point can be swept, with why not in the status line; None for no label."""
        label = self._label_at(point)
        if label is None or label.part is None:
            return None
        self._tables.commit_open_editor()
        project, case = self._tables.document.project, self._tables.sight.case
        if refused := self._in_place.why_not(label.part):
            self._sweeper.told.emit(refused)
            return False
        cells = cells_of(label.part, project, case)
        if not cells:
            return None
        model = self._tables.models[cells[0].table]
        keys = [column.key for column in model.columns]
        records = tuple(dict.fromkeys(cell.record for cell in cells))
        entry = CellEntry(self._tables.document, model, keys.index(cells[0].column), records)
        share = (point.x() - label.box.left) / max(label.box.right - label.box.left, 1.0)
        at = place_in_entry(label.text, int(share * len(label.text)), entry.text or "")
        self._sheet.setFocus(Qt.FocusReason.MouseFocusReason)  # an undo that follows is of the member
        return self._sweeper.begin(entry, at)

    # The hand

    def _on_wheel(self, event: QWheelEvent) -> bool:
        if not event.modifiers() & CONTROL:
            return False
        stays = self._turned_at is not None and self._near(event.position(), self._turned_at)
        if not (self._sweeper.is_running and stays):
            self._turned_at = event.position()
            begun = self._begin(event.position())
            if not begun:
                return begun is not None
        self._sweeper.by(self._wheel.notches(event), event.modifiers())
        return True

    @staticmethod
    def _near(one: QPointF, other: QPointF) -> bool:
        return (one - other).manhattanLength() < QApplication.startDragDistance()

    def _on_press(self, event: QMouseEvent) -> bool:
        held = event.modifiers() & CONTROL and event.button() == Qt.MouseButton.LeftButton
        if not held or self._label_at(event.position()) is None:
            return False
        self._press, self._pulled = event.clone(), None
        return True

    def _on_move(self, event: QMouseEvent) -> bool:
        if self._press is None:
            return False
        start = self._press.position()
        if self._pulled is None:
            if self._near(event.position(), start):
                return True
            if not self._begin(start):
                self._press = None
                return True
            self._pulled = 0
        steps = int((start.y() - event.position().y()) / PULL)
        self._sweeper.by(steps - self._pulled, event.modifiers())
        self._pulled = steps
        return True

    def _on_release(self, _event: QMouseEvent) -> bool:
        press, pulled = self._press, self._pulled
        self._press = self._pulled = None
        if press is None:
            return False
        if pulled is not None:
            self._sweeper.commit()
            return True
        self._passing = True
        QApplication.sendEvent(self._sheet.viewport(), press)
        self._passing = False
        return False

    def _on_leave(self, _event: QEvent) -> bool:
        if self._press is None:
            self._sweeper.commit()
        return False
