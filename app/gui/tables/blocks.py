"""Blocks of cells: copied, pasted, filled down. They go by the columns that are shown, each one undo step."""

from __future__ import annotations

from typing import TYPE_CHECKING

from PySide6.QtGui import QGuiApplication

from app.gui.tables.clipboard import block_of, block_text, tiled
from app.gui.tables.headings import HeadedBlock, headed_block
from app.gui.tables.reasons import NotTaken
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

    def copy_with_headings(self) -> None:
        """The same below a row of the columns' titles with their units."""
        selected = self._selected()
        if selected is not None:
            texts = [[self._model.titled(column) for column in selected[1]], *self._texts(*selected)]
            QGuiApplication.clipboard().setText(block_text(texts))

    def _texts(self, rows: range, columns: list[int]) -> list[list[str]]:
        records = range(rows.start, min(rows.stop, self._model.record_rows))
        return [[self._model.text_to_copy(row, column) for column in columns] for row in records]

    def paste(self) -> None:
        """The clipboard's block from the selection's corner on; by its headings where it has some."""
        selected, block = self._selected(), block_of(QGuiApplication.clipboard().text())
        if not block or selected is None:
            return
        try:
            headed = headed_block(block, self._model.columns, self._model.sight)
        except NotTaken as error:
            self._model.noted.emit(str(error))
            return
        if headed is not None:
            self._put_headed(selected[0].start, headed)
        else:
            self._put_plain(*selected, block)

    def _put_plain(self, rows: range, columns: list[int], block: list[list[str]]) -> None:
        texts = tiled(block, len(rows), len(columns))
        places = [place for place in self._view.shown_columns() if place >= columns[0]]
        typed = [dict(zip(places, line, strict=False)) for line in texts]
        self._model.put_block(rows.start, typed, tr("Paste"))

    def _put_headed(self, top: int, headed: HeadedBlock) -> None:
        """Headings say the columns; a row before the first record takes only one copied from it."""
        lead = self._model.table.lead
        if top <= lead and headed.rows:
            its_own = lead and headed.rows[0].get(0) == self._model.text_to_copy(0, 0)
            top = 0 if its_own else lead
        names = ", ".join(f"“{heading}”" for heading in headed.unknown)
        note = tr("left out, as this table has no such column: {headings}").format(headings=names)
        self._model.put_block(top, headed.rows, tr("Paste"), note if names else "")

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
