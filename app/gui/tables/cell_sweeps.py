"""Sweeping numbers in a table's cells: Ctrl with the wheel, Ctrl with a press and a pull, Alt with arrows."""

from __future__ import annotations

from collections.abc import Callable
from typing import TYPE_CHECKING, Any

from PySide6.QtCore import QEvent, QItemSelectionModel, QModelIndex, QObject, QPoint, Qt
from PySide6.QtGui import QKeyEvent, QMouseEvent, QWheelEvent
from PySide6.QtWidgets import QApplication

from app.gui.hand.cell_entry import CellEntry
from app.gui.hand.sweeper import CONTROL, PULL, Sweeper, Wheel, is_step
from app.gui.tables.delegate import BAR_WIDTH, MARGIN
from app.sweep import place_in_entry

if TYPE_CHECKING:
    from app.gui.tables.view import TableView


class CellSweeps(QObject):
    """Turns what the hand does at one table into steps of the sweeper."""

    def __init__(self, view: TableView, sweeper: Sweeper) -> None:
        super().__init__(view)
        self._view = view
        self._sweeper = sweeper
        self._wheel = Wheel()
        self._pressed: tuple[QModelIndex, QPoint] | None = None  # with Ctrl, on a cell with a number
        self._pulled: int | None = None  # steps of the pull so far; None before it began
        view.installEventFilter(self)
        view.viewport().installEventFilter(self)
        self._handlers: dict[QEvent.Type, Callable[[Any], bool]] = {
            QEvent.Type.Wheel: self._on_wheel,
            QEvent.Type.MouseButtonPress: self._on_press,
            QEvent.Type.MouseMove: self._on_move,
            QEvent.Type.MouseButtonRelease: self._on_release,
            QEvent.Type.KeyPress: self._on_key,
            QEvent.Type.Leave: self._on_leave,
        }

    def eventFilter(self, watched: QObject, event: QEvent) -> bool:
        """Keys come to the table, the mouse to what it shows."""
        handle = self._handlers.get(event.type())
        of_keys = event.type() == QEvent.Type.KeyPress
        if handle is None or (watched is self._view) is not of_keys:
            return super().eventFilter(watched, event)
        return handle(event)

    def _entry(self, index: QModelIndex) -> CellEntry:
        model = self._view.table_model
        return CellEntry(model.document, model, index.column(), (model.record_of(index.row()),))

    def _begin(self, index: QModelIndex, at: int | None) -> bool:
        """Sweep a cell's number, or go on with it."""
        entry = self._entry(index)
        if self._sweeper.is_of(entry, at):
            return True
        self._view.commit_open_editor()
        return self._sweeper.begin(self._entry(index), at)

    def _place_at(self, index: QModelIndex, point: QPoint) -> int | None:
        """The place in the cell's own text of the number under the pointer."""
        shown, own = str(index.data()), self._view.table_model.entry(index)
        bar = BAR_WIDTH + 10 if self._view.table_model.columns[index.column()].bar is not None else 0
        reach = point.x() - self._view.visualRect(index).left() - MARGIN - bar
        advance = self._view.fontMetrics().horizontalAdvance
        at = next((i for i in range(len(shown)) if advance(shown[: i + 1]) > reach), len(shown))
        return place_in_entry(shown, at, own or "")

    # The hand

    def _on_wheel(self, event: QWheelEvent) -> bool:
        index = self._view.indexAt(event.position().toPoint())
        if not event.modifiers() & CONTROL or not index.isValid():
            return False
        if self._view.table_model.is_adding(index.row()):
            return True
        if self._begin(index, self._place_at(index, event.position().toPoint())):
            self._sweeper.by(self._wheel.notches(event), event.modifiers())
        return True

    def _on_press(self, event: QMouseEvent) -> bool:
        """A number waits for a pull; without one, the release does what a click with Ctrl does."""
        point = event.position().toPoint()
        index, model = self._view.indexAt(point), self._view.table_model
        held = event.modifiers() & CONTROL and event.button() == Qt.MouseButton.LeftButton
        if not held or not index.isValid() or model.is_adding(index.row()):
            return False
        if not self._entry(index).can_be_swept:
            return False
        self._pressed, self._pulled = (index, point), None
        return True

    def _on_move(self, event: QMouseEvent) -> bool:
        if self._pressed is None:
            return False
        index, start = self._pressed
        up = start.y() - event.position().toPoint().y()
        if self._pulled is None:
            if abs(up) < QApplication.startDragDistance():
                return True
            if not self._begin(index, self._place_at(index, start)):
                self._pressed = None
                return True
            self._pulled = 0
        steps = int(up / PULL)
        self._sweeper.by(steps - self._pulled, event.modifiers())
        self._pulled = steps
        return True

    def _on_release(self, _event: QMouseEvent) -> bool:
        if self._pressed is None:
            return False
        (index, _start), pulled = self._pressed, self._pulled
        self._pressed = self._pulled = None
        if pulled is not None:
            self._sweeper.commit()
        else:
            self._view.commit_open_editor()
            toggle = QItemSelectionModel.SelectionFlag.Toggle
            self._view.selectionModel().setCurrentIndex(index, toggle)
        return True

    def _on_key(self, event: QKeyEvent) -> bool:
        index = self._view.currentIndex()
        if not is_step(event) or not index.isValid() or self._view.table_model.is_adding(index.row()):
            return False
        if self._begin(index, None):
            self._sweeper.by(1 if event.key() == Qt.Key.Key_Up else -1, event.modifiers())
        return True

    def _on_leave(self, _event: QEvent) -> bool:
        if self._pressed is None:
            self._sweeper.commit()
        return False
