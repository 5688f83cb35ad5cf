"""The text of one table cell, or of the same cell of several records, as the drawing types into it.

For one cell everything is the table model's own. For several, the text goes into all of them as one undo
step; where it is no valid entry, each of them keeps it as a draft.
"""

from __future__ import annotations

from types import MappingProxyType

from PySide6.QtCore import QPersistentModelIndex

from app.gui.document import Document, Draft, Preview, Snapshot
from app.gui.tables.column import Change
from app.gui.tables.model import TableModel
from app.gui.tables.reasons import TypingError, reason_of
from app.hand.many import put_in_all
from app.sweep import sweep_of
from app.words import tr, trn
from solver.model import Project

COUNTED = {
    "segments": lambda n: trn("for {count} segment", "for {count} segments", n),
    "companions": lambda n: trn("for {count} segment", "for {count} segments", n),
    "joints": lambda n: trn("for {count} joint", "for {count} joints", n),
}


class CellEntry:
    """Cells of one column; the first is the one whose text an editor starts from."""

    def __init__(self, document: Document, model: TableModel, column: int, records: tuple[int, ...]) -> None:
        self.model = model
        self._document = document
        self._column = column
        self._cells = [QPersistentModelIndex(model.index(model.row_of(r), column)) for r in records]

    @property
    def index(self) -> QPersistentModelIndex:
        """The first cell."""
        return self._cells[0]

    @property
    def valid(self) -> bool:
        """Whether the cells are still there."""
        return all(cell.isValid() for cell in self._cells)

    @property
    def is_single(self) -> bool:
        """Whether it is one cell only."""
        return len(self._cells) == 1

    @property
    def records(self) -> tuple[int, ...]:
        """The records of the cells."""
        return tuple(self.model.record_of(cell.row()) for cell in self._cells)

    @property
    def text(self) -> str | None:
        """What an editor starts from; None where the cell is not for typing."""
        return self.model.entry(self.index)

    @property
    def caption(self) -> str:
        """Which cell it is and in what unit, and for how many it is typed."""
        name = self.model.step_name(self.index)
        unit = self.model.unit_of(self._column)
        return self._for_many(f"{name} ({unit})" if unit else name)

    def _for_many(self, words: str) -> str:
        """Words on the first cell, with how many it is for."""
        return words if self.is_single else tr("{cell}, {many}").format(cell=words, many=self._counted())

    def _counted(self) -> str:
        count = len(self._cells)
        counted = COUNTED.get(self.model.table.key, lambda n: trn("for {count} load", "for {count} loads", n))
        return counted(count).format(count=count)

    @property
    def refusal(self) -> str:
        """Why one of the cells is not for typing; empty where all are."""
        return next((reason for cell in self._cells if (reason := self.model.why_not(cell))), "")

    @property
    def can_be_swept(self) -> bool:
        """Whether the text holds a number to run up and down; a mark or a name is none, even "2"."""
        text, named = self.text, self.model.columns[self._column].holds_a_name
        return not (named or self.refusal or text is None) and sweep_of(text) is not None

    def accepts(self, text: str) -> bool:
        """Whether the text is a valid entry of all of them."""
        try:
            self._put_in_all(text)
        except TypingError:
            return False
        return True

    def show_swept(self, text: str | None) -> None:
        """Show the text in the table's cells until it is taken in or given up (None)."""
        rows = frozenset(cell.row() for cell in self._cells if cell.isValid())
        self.model.show_swept(rows, self._column, text)

    def preview(self, text: str) -> None:
        """Show what the text would give."""
        if self.is_single:
            self.model.preview(self.index, text)
            return
        try:
            project, _notes = self._put_in_all(text)
        except TypingError as error:
            self._document.set_preview(Preview(None, self._reason(error)))
        else:
            self._document.set_preview(Preview(project))

    def commit(self, text: str) -> None:
        """Take the text in, as one undo step; as drafts where it is no valid entry."""
        if self.is_single:
            self.model.setData(self.index, text)
            return
        places = tuple(self.model.place(cell.row(), self._column) for cell in self._cells)
        name = self._for_many(self.model.step_name(self.index))
        try:
            project, notes = self._put_in_all(text)
        except TypingError as error:
            self._keep_drafts(text, self._reason(error), name)
        else:
            self._document.commit(project, name, settled=places)
            self.model.tell_notes(self.model.columns[self._column], text, *notes[:1])

    def _put_in_all(self, text: str) -> tuple[Project, tuple[str, ...]]:
        column, sight = self.model.columns[self._column], self.model.sight

        def put(project: Project, record: int) -> Change:
            return column.put(project, record, text, sight)

        return put_in_all(self._document.project, self.records, put)

    def _keep_drafts(self, text: str, reason: str, name: str) -> None:
        snapshot = self._document.snapshot
        drafts = dict(snapshot.drafts)
        for cell in self._cells:
            drafts[self.model.place(cell.row(), self._column)] = Draft(
                text, reason, self.model.step_name(cell)
            )
        self._document.commit_snapshot(Snapshot(snapshot.project, MappingProxyType(drafts)), name)

    def _reason(self, error: Exception) -> str:
        place = self.model.place(self.index.row(), self._column)
        return reason_of(error, self.model.sight.system, place)
