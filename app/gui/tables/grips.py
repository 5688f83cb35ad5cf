"""Grips left of the rows: the chosen rows are dragged by them, and a line shows between which they fall.

A press on a grip chooses its row, with Shift all rows to it, so that several can be taken along. The menu's
commands are the twin by keys.
"""

from __future__ import annotations

from typing import TYPE_CHECKING

from PySide6.QtCore import QEvent, QObject, QPoint, QRect, QSize, Qt, Signal
from PySide6.QtGui import QColor, QKeyEvent, QMouseEvent, QPainter
from PySide6.QtWidgets import QApplication, QFrame, QHeaderView

from app.gui.theme import Theme
from app.words import tr

if TYPE_CHECKING:
    from app.gui.tables.view import TableView

WIDTH = 12  # px: narrow, so that all columns still fit a small screen
LINE = 3  # px, of the drop line
DOT = 2  # px


class RowGrips(QHeaderView):
    """The vertical header of a table whose rows can be moved."""

    moved = Signal(int)  # the chosen records go before the record that is at this place

    def __init__(self, view: TableView, theme: Theme) -> None:
        super().__init__(Qt.Orientation.Vertical, view)
        self._view = view
        self.theme = theme
        self._from: QPoint | None = None  # where the button went down
        self._before: int | None = None  # the record to put the rows before, while they are dragged
        self._line = QFrame(view.viewport())
        self._line.setObjectName("drop_line")
        self._line.hide()
        self.setAccessibleName(tr("Grips to move segments"))
        self.setToolTip(tr("Drag to move the chosen segments (Ctrl+Shift+Up, Ctrl+Shift+Down)"))

    def dress(self, theme: Theme) -> None:
        """Take over the colours."""
        self.theme = theme
        self.setStyleSheet(f"QHeaderView {{ background: {theme.card}; border: none; }}")

    def sizeHint(self) -> QSize:
        """Just wide enough for the dots."""
        return QSize(WIDTH, super().sizeHint().height())

    def paintSection(self, painter: QPainter, rect: QRect, row: int) -> None:
        """Six dots before a row that can be moved."""
        painter.fillRect(rect, QColor(self.theme.card))
        painter.setPen(QColor(self.theme.edge))
        painter.drawLine(rect.bottomLeft(), rect.bottomRight())
        if self._view.table_model.is_record(row):
            for i in range(6):
                at = rect.center() + QPoint(5 * (i % 2) - 3, 5 * (i // 2) - 6)
                painter.fillRect(QRect(at, QSize(DOT, DOT)), QColor(self.theme.quiet))

    @property
    def is_dragging(self) -> bool:
        """Whether rows are on their way."""
        return self._before is not None

    # The hand

    def mousePressEvent(self, event: QMouseEvent) -> None:
        """Choose the row, unless it is among the chosen ones, which then come along."""
        row = self.logicalIndexAt(event.position().toPoint())
        if event.button() != Qt.MouseButton.LeftButton or not self._view.table_model.is_record(row):
            return
        self._view.commit_open_editor()
        self._view.setFocus(Qt.FocusReason.MouseFocusReason)
        self._choose(self._view.table_model.record_of(row), event.modifiers())
        self._from = event.position().toPoint()

    def _choose(self, record: int, modifiers: Qt.KeyboardModifier) -> None:
        chosen = self._view.chosen_records()
        if modifiers & Qt.KeyboardModifier.ShiftModifier and chosen:
            first, last = min(*chosen, record), max(*chosen, record)
            self._view.choose_records(frozenset(range(first, last + 1)))
        elif record not in chosen:
            self._view.choose_record(record)

    def mouseMoveEvent(self, event: QMouseEvent) -> None:
        """Show where the rows would fall."""
        at = event.position().toPoint()
        if self._from is None:
            over = self._view.table_model.is_record(self.logicalIndexAt(at))
            self.setCursor(Qt.CursorShape.OpenHandCursor if over else Qt.CursorShape.ArrowCursor)
        elif self.is_dragging or abs(at.y() - self._from.y()) >= QApplication.startDragDistance():
            if not self.is_dragging:
                self.setCursor(Qt.CursorShape.ClosedHandCursor)
                self._view.installEventFilter(self)
            self._drag_to(at.y())

    def _drag_to(self, y: int) -> None:
        """Between the two rows next to the height; past an edge the table scrolls."""
        view, model = self._view, self._view.table_model
        if not 0 <= y < view.viewport().height():
            bar = view.verticalScrollBar()
            bar.setValue(bar.value() + (1 if y > 0 else -1))
        row = view.rowAt(y)
        row = (0 if y < 0 else model.rowCount() - 1) if row < 0 else row
        below = y > view.rowViewportPosition(row) + view.rowHeight(row) // 2
        row = min(max(row + below, model.row_of(0)), model.record_rows)
        self._before = model.record_of(row)
        edge = view.rowViewportPosition(row - 1) + view.rowHeight(row - 1)
        self._line.setStyleSheet(f"background: {self.theme.select};")
        self._line.setGeometry(0, edge - LINE // 2 - 1, view.viewport().width(), LINE)
        self._line.show()
        self._line.raise_()

    def mouseReleaseEvent(self, _event: QMouseEvent) -> None:
        """Put the rows down."""
        before = self._before
        self.cancel()
        if before is not None:
            self.moved.emit(before)

    def cancel(self) -> None:
        """Leave the rows where they are."""
        self._from = self._before = None
        self._line.hide()
        self._view.removeEventFilter(self)
        self.setCursor(Qt.CursorShape.OpenHandCursor)

    def eventFilter(self, watched: QObject, event: QEvent) -> bool:
        """Escape while rows are dragged."""
        if isinstance(event, QKeyEvent) and event.key() == Qt.Key.Key_Escape and self.is_dragging:
            self.cancel()
            return True
        return super().eventFilter(watched, event)
