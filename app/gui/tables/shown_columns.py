"""Which columns of a table are shown: those of the table's own choice until a person takes another.

Only what differs from the table's own choice is remembered, so that a column that comes later is seen. The
first column always stays, and so do columns named by the user: a combination's factors stand in them. What
few members need waits hidden, and is shown where the project has it.
"""

from __future__ import annotations

from collections.abc import Iterable
from typing import TYPE_CHECKING

from PySide6.QtCore import QPoint, Qt
from PySide6.QtGui import QAction, QKeyEvent, QMouseEvent
from PySide6.QtWidgets import QMenu, QWidget
from shiboken6 import isValid

from app.gui.tables.column import Column
from app.words import tr

if TYPE_CHECKING:
    from app.gui.tables.pane import TablesPane
    from app.gui.tables.view import TableView


class ShownColumns:
    """The choice for one table, offered in the menu of its headings and in View > Columns."""

    def __init__(self, view: TableView) -> None:
        self._view = view
        self._turned: frozenset[str] = frozenset()  # keys that are not as the table has them at first
        head = view.horizontalHeader()
        head.setContextMenuPolicy(Qt.ContextMenuPolicy.CustomContextMenu)
        head.customContextMenuRequested.connect(self.on_asked)

    @property
    def turned(self) -> tuple[str, ...]:
        """The columns that are shown or hidden other than at first, to be remembered."""
        return tuple(sorted(self._turned))

    def restore(self, turned: Iterable[str]) -> None:
        """Take up a choice that was remembered."""
        self._turned = frozenset(turned)
        self._view.on_shape_changed()

    def choices(self) -> tuple[Column, ...]:
        """The columns that can be shown and hidden."""
        columns = self._view.table_model.columns[1:]
        return tuple(c for c in columns if not c.named_by_user and not self._is_filled(c))

    def is_shown(self, column: Column) -> bool:
        """Whether a column is chosen to be shown."""
        if column not in self.choices():
            return True
        return column.at_first != (column.key in self._turned)

    def _is_filled(self, column: Column) -> bool:
        return column.filled is not None and column.filled(self._view.table_model.document.project)

    def turn(self, key: str) -> None:
        """Show a column that is hidden, hide one that is shown."""
        self._view.commit_open_editor()
        self._turned ^= {key}
        self._view.on_shape_changed()
        current = self._view.currentIndex()
        if current.isValid() and self._view.isColumnHidden(current.column()):
            self._view.setCurrentIndex(current.siblingAtColumn(0))

    def reveal(self, key: str) -> None:
        """Show a column that is to be worked in."""
        hidden = any(c.key == key and not self.is_shown(c) for c in self._view.table_model.columns)
        if hidden:
            self.turn(key)

    def hide_others(self) -> None:
        """Bring the table in line with the choice; an entry that is not taken in is never out of sight."""
        for place, hide in enumerate(self._hidden()):
            self._view.setColumnHidden(place, hide)
        self._view.columns_shown.emit()

    def follow_entries(self) -> None:
        """The same where an entry came or went that keeps a column in sight, taken in or not."""
        columns = range(self._view.table_model.columnCount())
        if [self._view.isColumnHidden(place) for place in columns] != self._hidden():
            self._view.on_shape_changed()

    def _hidden(self) -> list[bool]:
        columns = enumerate(self._view.table_model.columns)
        return [not (self.is_shown(column) or self._holds_draft(place)) for place, column in columns]

    def _holds_draft(self, place: int) -> bool:
        model = self._view.table_model
        rows = range(model.rowCount() if model.document.snapshot.drafts else 0)
        return any(model.draft(model.index(row, place)) is not None for row in rows)

    def not_seen(self) -> list[Column]:
        """The hidden columns in which something was entered that could be left out."""
        model = self._view.table_model
        hidden = [place for place in range(len(model.columns)) if self._view.isColumnHidden(place)]
        return [model.columns[place] for place in hidden if model.is_entered(place)]

    def fill(self, menu: QMenu) -> None:
        """An entry with a tick for each column, and one to go back to the table's own choice."""
        menu.clear()
        not_seen = self.not_seen()
        for column in self.choices():
            words = (
                tr("{column} (not empty)").format(column=column.words) if column in not_seen else column.words
            )
            action = menu.addAction(words.replace("&", "&&"))
            action.setCheckable(True)
            action.setChecked(self.is_shown(column))
            action.triggered.connect(lambda _checked, key=column.key: self.turn(key))
        if menu.isEmpty():
            menu.addAction(tr("all columns are shown")).setEnabled(False)
            return
        menu.addSeparator()
        back = menu.addAction(tr("As at first"), lambda: self.restore(()))
        back.setEnabled(bool(self._turned))
        menu.triggered.connect(lambda _action: back.setEnabled(bool(self._turned)) if isValid(back) else None)

    def on_asked(self, at: QPoint) -> None:
        """The menu of the headings."""
        menu = TickMenu(self._view)
        menu.aboutToHide.connect(menu.deleteLater)
        self.fill(menu)
        menu.popup(self._view.horizontalHeader().mapToGlobal(at))


class TickMenu(QMenu):
    """Stays open while entries are ticked, by the mouse or the space bar."""

    def mouseReleaseEvent(self, event: QMouseEvent) -> None:
        """A tick is no end of the choosing."""
        if not self._ticked(self.actionAt(event.position().toPoint())):
            super().mouseReleaseEvent(event)

    def keyPressEvent(self, event: QKeyEvent) -> None:
        """Space ticks, Enter ticks and closes."""
        if event.key() != Qt.Key.Key_Space or not self._ticked(self.activeAction()):
            super().keyPressEvent(event)

    @staticmethod
    def _ticked(action: QAction | None) -> bool:
        """Tick an entry that can be ticked; whether it was one."""
        if action is None or not action.isCheckable() or not action.isEnabled():
            return False
        action.trigger()
        return True


class ColumnsMenu(TickMenu):
    """View > Columns: those of the table in front, listed anew each time."""

    def __init__(self, tables: TablesPane, parent: QWidget) -> None:
        super().__init__(parent)
        self.aboutToShow.connect(lambda: tables.current_view().columns_choice.fill(self))
