"""Blocks of cells: copied, pasted, filled down. They go by the columns that are shown, each one undo step."""

from __future__ import annotations

from typing import TYPE_CHECKING

from PySide6.QtGui import QGuiApplication

from app.gui.tables.clipboard import block_of, block_text, tiled
from app.gui.tables.headings import HeadedBlock, headed_block
from app.gui.tables.reasons import NotTaken
from app.gui.tables.thousands import thousands_note
from app.words import tr, trn

if TYPE_CHECKING:
    from app.gui.tables.view import TableView

MOST_ROWS = 2000  # pasted at once; every cell is an edit that is checked, so more would take a minute


class Blocks:
    """What is done to the selected block of one table."""

    def __init__(self, view: TableView) -> None:
        self._view = view
        self._model = view.table_model

    def _selected(self) -> tuple[list[int], list[int]] | None:
        """The selection's rows and shown columns; None, and said, where it is empty or no block of cells.

        Rows may lie apart, as those of segments chosen on the drawing: what is between is left alone.
        """
        self._view.commit_open_editor()
        cells = {(index.row(), index.column()) for index in self._view.selectedIndexes()}
        if not cells:
            return None
        rows, columns = sorted({row for row, _ in cells}), {column for _, column in cells}
        shown = [place for place in self._view.shown_columns() if place in columns]
        records = [row for row in rows if not self._model.is_adding(row)]
        if any((row, column) not in cells for row in records for column in shown):
            self._model.noted.emit(tr("choose the same columns in every row"))
            return None
        return rows, shown

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

    def _texts(self, rows: list[int], columns: list[int]) -> list[list[str]]:
        records = [row for row in rows if not self._model.is_adding(row)]
        return [[self._model.text_to_copy(row, column) for column in columns] for row in records]

    def paste(self) -> None:
        """The clipboard's block from the selection's corner on; by its headings where it has some."""
        selected, block = self._selected(), block_of(QGuiApplication.clipboard().text())
        if not block or selected is None:
            return
        if len(block) > MOST_ROWS:
            said = tr("nothing was pasted: {count} rows are too many at once, paste up to {most}")
            self._model.noted.emit(said.format(count=len(block), most=MOST_ROWS))
            return
        try:
            headed = headed_block(block, self._model.columns, self._model.sight)
        except NotTaken as error:
            self._model.noted.emit(str(error))
            return
        grouped = thousands_note(block)
        if headed is not None:
            self._put_headed(selected[0][0], headed, grouped)
        else:
            self._put_plain(*selected, block, grouped)

    def _put_plain(self, rows: list[int], columns: list[int], block: list[list[str]], note: str) -> None:
        texts = tiled(block, len(rows), len(columns))
        if len(texts) != len(rows):
            if rows[-1] - rows[0] >= len(rows):
                self._model.noted.emit(tr("choose one cell to paste from: the chosen rows lie apart"))
                return
            rows = list(range(rows[0], rows[0] + len(texts)))
        places = [place for place in self._view.shown_columns() if place >= columns[0]]
        typed = [dict(zip(places, line, strict=False)) for line in texts]
        beyond = max(map(len, texts)) - len(places)
        self._model.put_block(rows, typed, tr("Paste"), _in_a_line(note, _left_out(beyond)))

    def _put_headed(self, top: int, headed: HeadedBlock, note: str) -> None:
        """Headings say the columns; a row before the first record takes only one copied from it."""
        lead = self._model.table.lead
        if top <= lead and headed.rows:
            its_own = lead and headed.rows[0].get(0) == self._model.text_to_copy(0, 0)
            top = 0 if its_own else lead
        names = ", ".join(f"“{heading}”" for heading in headed.unknown)
        unknown = tr("left out, as this table has no such column: {headings}").format(headings=names)
        rows = range(top, top + len(headed.rows))
        self._model.put_block(rows, headed.rows, tr("Paste"), _in_a_line(note, unknown if names else ""))

    def fill_down(self) -> None:
        """The selection's first row into the rows below it; no row is added."""
        selected = self._selected()
        if selected is None:
            return
        rows, columns = selected
        below = [row for row in rows[1:] if not self._model.is_adding(row)]
        if below:
            first = {column: self._model.text_to_fill(rows[0], column) for column in columns}
            self._model.put_block(below, [first] * len(below), tr("Fill down"))


def _in_a_line(*notes: str) -> str:
    return "; ".join(filter(None, notes))


def _left_out(columns: int) -> str:
    """A line on columns of a block that have no place in the table."""
    if columns <= 0:
        return ""
    return trn(
        "{count} column was left out: the table ends there",
        "{count} columns were left out: the table ends there",
        columns,
    )
