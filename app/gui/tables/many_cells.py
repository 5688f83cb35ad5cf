"""One text for all chosen cells of a column: Ctrl+Enter in an editor."""

from __future__ import annotations

from typing import TYPE_CHECKING

from PySide6.QtCore import QModelIndex

from app.gui.hand.cell_entry import CellEntry
from app.words import tr

if TYPE_CHECKING:
    from app.gui.tables.view import TableView

ONE_BY_ONE = ("mark", "name")  # columns of what no two records can share


class ManyCells:
    """The chosen cells of one table that take what is typed into the current one."""

    def __init__(self, view: TableView) -> None:
        self._view = view

    def _chosen_for(self, current: QModelIndex) -> tuple[int, ...]:
        """The records of the chosen cells in the current cell's column that are for typing, its own first."""
        view, model, column = self._view, self._view.table_model, current.column()
        if not 0 <= current.row() < model.record_rows or model.columns[column].key in ONE_BY_ONE:
            return ()
        chosen = sorted(index.row() for index in view.selectedIndexes() if index.column() == column)
        rows = dict.fromkeys((current.row(), *chosen))
        typed = (row for row in rows if model.text_to_fill(row, column) is not None)
        return tuple(model.record_of(row) for row in typed if view.selectionModel().isSelected(current))

    def on_editor_begun(self) -> None:
        """Say what Ctrl+Enter does where it does more than Enter."""
        count = len(self._chosen_for(self._view.currentIndex()))
        if count > 1:
            self._view.table_model.noted.emit(
                tr("Ctrl+Enter puts it into all {count} chosen cells").format(count=count)
            )

    def put_in_chosen(self, text: str) -> None:
        """What was typed into the current cell, into all chosen cells of its column: one undo step."""
        current, model = self._view.currentIndex(), self._view.table_model
        records = self._chosen_for(current)
        if len(records) > 1:
            CellEntry(model.document, model, current.column(), records).commit(text)
        else:
            model.setData(current, text)
