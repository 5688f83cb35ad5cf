"""Keeps the height of the tables at whole rows, so that the row for adding is never half out of sight."""

from __future__ import annotations

from PySide6.QtCore import QEvent, QObject, QTimer
from PySide6.QtWidgets import QSplitter

from app.gui.tables.pane import TablesPane

ROUNDED_UP = 0.4  # of a row: where more of it is in sight, all of it is shown


class WholeRows(QObject):
    """Moves the rule above the tables by less than a row after it, or the window, was moved."""

    def __init__(self, splitter: QSplitter, tables: TablesPane) -> None:
        super().__init__(splitter)
        self._splitter, self._tables = splitter, tables
        self._soon = QTimer(self)  # once the layout inside the tables is done
        self._soon.setSingleShot(True)
        self._soon.setInterval(0)
        self._soon.timeout.connect(self.fit)
        splitter.splitterMoved.connect(lambda _place, _index: self._soon.start())
        tables.hidden_line.came_or_went.connect(self._soon.start)
        splitter.installEventFilter(self)

    def eventFilter(self, _watched: QObject, event: QEvent) -> bool:
        """The window has another size."""
        if event.type() in (QEvent.Type.Resize, QEvent.Type.Show):
            self._soon.start()
        return False

    def fit(self) -> None:
        """Give the tables a little more or less, before rows are more than are in sight."""
        view = self._tables.current_view()
        if not view.isVisible():
            return
        self._tables.layout().activate()
        row = view.verticalHeader().defaultSectionSize()
        over = view.viewport().height() % row
        if over:
            above, below = self._splitter.sizes()
            more = row - over if over > ROUNDED_UP * row else -over
            self._splitter.setSizes([above - more, below + more])
