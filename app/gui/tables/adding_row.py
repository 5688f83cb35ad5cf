"""Tab in the row that adds a record: on to the next cell of the row just made, not out of the table.

The row that adds moves down when it has added one, and Qt's Tab would go on from there, behind the last cell.
"""

from __future__ import annotations

from typing import TYPE_CHECKING

from PySide6.QtCore import Qt
from PySide6.QtWidgets import QAbstractItemView

if TYPE_CHECKING:
    from app.gui.tables.view import TableView


class AddingRow:
    """What an editor in the last row of one table has done."""

    def __init__(self, view: TableView) -> None:
        self._view = view
        self._rows = 0  # of records, before the text was taken in
        self._made = False

    def begin(self) -> None:
        """A text is about to be taken in."""
        self._rows, self._made = self._view.table_model.record_rows, False

    def end(self) -> None:
        """It has been: a row may have come."""
        self._made = self._is_current and self._view.table_model.record_rows == self._rows + 1

    @property
    def _is_current(self) -> bool:
        return self._view.table_model.is_adding(self._view.currentIndex().row())

    @property
    def keeps_the_keyboard(self) -> bool:
        """Whether a row was made, or a text was left that cannot make one."""
        current = self._view.currentIndex()
        return self._is_current and (self._made or self._view.table_model.draft(current) is not None)

    def go_on(self, *, forward: bool) -> None:
        """To the cell beside the one that the text went into; to stay where it went into none."""
        view, actions = self._view, QAbstractItemView.CursorAction
        view.setFocus()
        if not self._made:
            return
        self._made = False
        view.setCurrentIndex(view.table_model.index(self._rows, self._typed_column()))
        action = actions.MoveNext if forward else actions.MovePrevious
        beside = view.moveCursor(action, Qt.KeyboardModifier.NoModifier)
        view.setCurrentIndex(beside)
        if beside.flags() & Qt.ItemFlag.ItemIsEditable:
            view.edit(beside)

    def _typed_column(self) -> int:
        """The column that the text which adds a record is for."""
        model = self._view.table_model
        wanted = model.table.adding.column if model.table.adding is not None else ""
        return next((place for place, column in enumerate(model.columns) if column.key == wanted), 0)
