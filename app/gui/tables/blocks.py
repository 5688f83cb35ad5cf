"""Blocks of cells: copied, pasted, filled down. They go by the columns that are shown, each one undo step."""

from __future__ import annotations

from typing import TYPE_CHECKING

from PySide6.QtGui import QGuiApplication

from app.gui.tables.clipboard import block_of, block_text, tiled
from app.words import tr

if TYPE_CHECKING:
    from app.gui.tables.view import TableView


class Blocks:
    """What is done to the selected block of one table."""

    def __init__(self, view: TableView) -> None:
        self._view = view
        self._model = view.table_model

    def _selected(self) -> tuple[range, list[int]] | None:
        """Rows and shown columns of the selection's bounding block; None where nothing is selected."""
        self._view.commit_open_editor()
        chosen = self._view.selectedIndexes()
        if not chosen:
            return None
        rows, columns = [index.row() for index in chosen], [index.column() for index in chosen]
        shown = [place for place in self._view.shown_columns() if min(columns) <= place <= max(columns)]
        return range(min(rows), max(rows) + 1), shown

    def copy(self) -> None:
        """The selected block to the clipboard, with all digits; the row that adds another stays behind."""
        selected = self._selected()
        if selected is not None:
            QGuiApplication.clipboard().setText(block_text(self._texts(*selected)))

    def _texts(self, rows: range, columns: list[int]) -> list[list[str]]:
        records = range(rows.start, min(rows.stop, self._model.record_rows))
        return [[self._model.text_to_copy(row, column) for column in columns] for row in records]

    def paste(self) -> None:
        """The clipboard's block from the selection's corner on."""
        selected, block = self._selected(), block_of(QGuiApplication.clipboard().text())
        if block and selected is not None:
            rows, columns = selected
            texts = tiled(block, len(rows), len(columns))
            places = [place for place in self._view.shown_columns() if place >= columns[0]]
            typed = [dict(zip(places, line, strict=False)) for line in texts]
            self._model.put_block(rows.start, typed, tr("Paste"))

    def fill_down(self) -> None:
        """The selection's first row into the rows below it; no row is added."""
        selected = self._selected()
        if selected is None:
            return
        rows, columns = selected
        below = min(rows.stop, self._model.record_rows) - rows.start - 1
        if below > 0:
            first = {column: self._model.text_to_fill(rows.start, column) for column in columns}
            self._model.put_block(rows.start + 1, [first] * below, tr("Fill down"))
