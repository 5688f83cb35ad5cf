"""A quiet line under the tables while a hidden column of the table in front holds something.

What is not seen is easily taken for not there; a click on the line, or Enter, offers the columns.
"""

from __future__ import annotations

from collections.abc import Callable

from PySide6.QtCore import QPoint, Qt, QTimer, Signal
from PySide6.QtGui import QResizeEvent
from PySide6.QtWidgets import QPushButton, QSizePolicy, QWidget

from app.gui.tables.view import TableView
from app.words import tr

BETWEEN = ", "


class HiddenLine(QPushButton):
    """Names the columns; not there while there is nothing to say."""

    came_or_went = Signal()

    def __init__(self, in_front: Callable[[], list[TableView]], parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self._in_front = in_front
        self._view: TableView | None = None
        self.setObjectName("hidden_line")
        self.setSizePolicy(QSizePolicy.Policy.Ignored, QSizePolicy.Policy.Fixed)
        self.setFocusPolicy(Qt.FocusPolicy.TabFocus)
        self.setVisible(False)
        self._soon = QTimer(self)  # once for all that changes together
        self._soon.setSingleShot(True)
        self._soon.setInterval(0)
        self._soon.timeout.connect(self.look)
        self.clicked.connect(self._offer)

    def look_soon(self) -> None:
        """Something may have changed."""
        self._soon.start()

    def look(self) -> None:
        """Say what is hidden and not empty now."""
        found = [(view, column) for view in self._in_front() for column in view.columns_choice.not_seen()]
        self._view = found[0][0] if found else None
        words = BETWEEN.join(column.words for _view, column in found)
        text = tr("Hidden and not empty: {columns}").format(columns=words)
        self.setText(text)
        self.setToolTip(text)
        self.setAccessibleName(text)
        if self.isHidden() is bool(found):
            self.setVisible(bool(found))
            self.came_or_went.emit()

    def resizeEvent(self, event: QResizeEvent) -> None:
        """It has been given its place: now the rows above have theirs."""
        super().resizeEvent(event)
        self.came_or_went.emit()

    def _offer(self) -> None:
        if self._view is not None:
            head = self._view.horizontalHeader()
            self._view.columns_choice.on_asked(QPoint(0, head.height()))
