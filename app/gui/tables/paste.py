"""A block of texts typed into a table at once: the cells on top of each other, for one undo step.

Nothing that was pasted is lost unsaid: a cell that is no valid entry becomes a draft, also the one by which
its row is added where the row can be made without it, so that those behind keep their places. The first row
that cannot be added becomes a draft of the adding one; the note counts such rows, and passes on what single
cells have to say.
"""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from types import MappingProxyType

from app.gui.document import Draft, Snapshot, moved
from app.gui.places import Place
from app.gui.tables.column import Adding, Change
from app.gui.tables.reasons import NotTaken, TypingError, reason_of
from app.gui.tables.rows import RowsModel
from app.words import tr, trn

Texts = Mapping[int, str | None]  # by column; None: nothing for that cell


class Block:
    """Collects what the cells of one paste make of the document."""

    def __init__(self, model: RowsModel, snapshot: Snapshot) -> None:
        self._model = model
        self._project = snapshot.project
        self._drafts = dict(snapshot.drafts)
        self._refused: list[Draft] = []  # rows that could not be added
        self._notes: dict[str, None] = {}  # of the cells and rows, each once, in order

    def typed(self, rows: Sequence[int], block: Sequence[Texts]) -> Snapshot:
        """The document with the texts typed into these rows, from top to bottom."""
        for row, texts in zip(rows, block, strict=True):
            self._type_row(row, texts)
        if self._refused:
            self._drafts[self._adding_place()] = self._refused[0]
        return Snapshot(self._project, MappingProxyType(self._drafts))

    @property
    def note(self) -> str:
        """A line about rows that were not taken in, else about edits that did more than they seem to."""
        if not self._refused:
            return self._notes_in_a_line()
        rows = trn("{count} row was not added", "{count} rows were not added", len(self._refused))
        return f"{rows}: {self._refused[0].reason}"

    def _notes_in_a_line(self) -> str:
        first, more = next(iter(self._notes), ""), len(self._notes) - 1
        if more < 1:
            return first
        return first + trn(" (and {count} thing more)", " (and {count} things more)", more)

    def _type_row(self, row: int, texts: Texts) -> None:
        """One row; past the end, a record is added by the column that can, and the others find its row.

        A blank row empties what may be empty and leaves the rest as it is.
        """
        count = self._model.table.count(self._project, self._model.sight)
        row = min(row, count)  # rows that were refused leave no gap
        if row == count and not self._add(texts):
            return
        blank = not any(text and text.strip() for text in texts.values())
        said = {c.key for i, c in enumerate(self._model.columns) if (texts.get(i) or "").strip()}
        for place, text in texts.items():
            column = self._model.columns[place]
            if text is not None and column.settled_by not in said and not (blank and not column.optional):
                self._type_in(row, place, text)

    def _type_in(self, row: int, column: int, text: str) -> None:
        """One cell; those that are not for typing are passed over."""
        wanted = self._model.columns[column]
        now = self._model.table.row(self._project, row, self._model.sight)
        if wanted.put is None or wanted.entry(now, self._model.sight) in (None, text):
            return
        try:
            change = wanted.put(self._project, self._model.record_of(row), text, self._model.sight)
        except TypingError as error:
            name = self._model.cell_name(self._project, self._model.record_of(row), column)
            place = self._place(row, column)
            reason = reason_of(error, self._model.sight.system, place)
            self._drafts[place] = Draft(text, reason, name)
        else:
            self._follow(change)
            self._drafts.pop(self._place(row, column), None)

    def _follow(self, change: Change) -> None:
        self._drafts = moved(self._drafts, self._project, change.project)
        self._project = change.project
        if change.note:
            self._notes[change.note] = None

    def _place(self, row: int, column: int) -> Place:
        return self._model.cell_place(self._model.record_of(row), column, self._project)

    def _adding_place(self) -> Place:
        """Where the row that adds a record stands now."""
        model = self._model
        count = model.table.count(self._project, model.sight)
        if model.table.place is not None:
            return model.cell_place(model.record_of(count), 0, self._project)
        return (*model.table.records(model.sight), model.record_of(count), model.columns[0].key)

    def _add(self, texts: Texts) -> bool:
        """Add a record by the text in the column that can; whether there is one now."""
        adding = self._model.table.adding
        if adding is None or not any(text and text.strip() for text in texts.values()):
            return False
        keys = [column.key for column in self._model.columns]
        text = texts.get(keys.index(adding.column)) or ""
        try:
            self._follow(self._grown(adding, text, whole=sum(map(bool, texts.values())) > 1))
        except TypingError as error:
            if adding.unread is not None and texts.get(keys.index(adding.column)) is not None:
                self._follow(Change(adding.unread(self._project, self._model.sight)))
                return True  # its own cell then keeps the text, as a draft
            reason = reason_of(error, self._model.sight.system, self._adding_place())
            self._refused.append(Draft(text, reason, tr(adding.name)))
            return False
        return True

    def _grown(self, adding: Adding, text: str, *, whole: bool) -> Change:
        """The record added; of a whole row, what is said of its other cells may be wrong at once."""
        if not text.strip():
            column = next(c for c in self._model.columns if c.key == adding.column)
            raise NotTaken(tr("a row is added by its “{column}”").format(column=column.words))
        change = adding.put(self._project, text, self._model.sight)
        return Change(change.project) if whole and not change.stands else change
