"""A block of texts typed into a table at once: the cells on top of each other, for one undo step."""

from __future__ import annotations

from collections.abc import Sequence
from types import MappingProxyType

from app.gui.document import Draft, Snapshot
from app.gui.tables.column import Column
from app.gui.tables.reasons import TypingError, reason_of
from app.gui.tables.rows import RowsModel
from app.words import tr


class Block:
    """Collects what the cells of one paste make of the document."""

    def __init__(self, model: RowsModel, snapshot: Snapshot) -> None:
        self._model = model
        self._project = snapshot.project
        self._drafts = dict(snapshot.drafts)

    def typed(self, top: int, left: int, block: Sequence[Sequence[str]]) -> Snapshot:
        """The document with the texts typed from the cell `top`, `left` on."""
        for down, texts in enumerate(block):
            for column, text in enumerate(texts, left):
                if 0 <= column < len(self._model.columns):
                    self._type_in(top + down, column, text)
        return Snapshot(self._project, MappingProxyType(self._drafts))

    def _type_in(self, row: int, column: int, text: str) -> None:
        """One cell; past the end, a record is added by the column that can, and the others find its row."""
        records = self._model.table.rows(self._project, self._model.sight)
        wanted = self._model.columns[column]
        if row >= len(records):
            self._add(wanted, text)
        elif wanted.entry(records[row], self._model.sight) not in (None, text):
            self._put(row, column, text)

    def _put(self, row: int, column: int, text: str) -> None:
        wanted, place = self._model.columns[column], self._model.place(row, column)
        if wanted.put is None:
            return
        try:
            change = wanted.put(self._project, self._model.record_of(row), text, self._model.sight)
        except TypingError as error:
            self._drafts[place] = Draft(text, reason_of(error), self._cell_name(row, column))
        else:
            self._drafts.pop(place, None)
            self._project = change.project

    def _cell_name(self, row: int, column: int) -> str:
        model = self._model
        name = model.table.row_name(self._project, model.record_of(row), model.sight)
        return tr("{column} of {row}").format(column=model.columns[column].words, row=name)

    def _add(self, column: Column, text: str) -> None:
        adding = self._model.table.adding
        if adding is None or column.key != adding.column or not text.strip():
            return
        try:
            self._project = adding.put(self._project, text, self._model.sight).project
        except TypingError:
            return
