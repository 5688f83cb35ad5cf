"""What the cells of a table answer and what typing into them does: undo steps, drafts, previews.

Results arrive in their own columns only, so that no cell being typed is ever announced as changed because the
solver came back.
"""

from __future__ import annotations

from collections.abc import Callable, Sequence
from typing import Any, ClassVar

from msgspec import Struct
from PySide6.QtCore import QObject, Qt

from app.gui.document import Document, Draft, Preview
from app.gui.tables.column import Change, Column, Figures, Offer, Sight, Table
from app.gui.tables.headed import HeadedModel
from app.gui.tables.paste import Block, Texts
from app.gui.tables.reasons import NotTaken, TypingError, reason_of
from app.gui.tables.rows import Index
from app.gui.tables.thousands import typed_note
from app.support_entry import supports_entry
from app.words import tr

CHOSEN = Qt.ItemFlag.ItemIsEnabled | Qt.ItemFlag.ItemIsSelectable
TYPED = CHOSEN | Qt.ItemFlag.ItemIsEditable
ERROR_ROLE = int(Qt.ItemDataRole.UserRole) + 1  # the reason why the cell's text is not taken in, or ""


class Look(Struct, frozen=True, gc=False):
    """All that is painted of a cell."""

    text: str
    for_typing: bool
    error: str  # why its text is not taken in, or empty
    bar: tuple[float, float] | None  # utilisation, sign of the stress
    hint: bool  # the text is a hint, not a value
    sum: bool  # the text is a sum over the rows
    lit: bool  # the row is selected elsewhere
    stale: bool  # the figure is of an earlier edit


class TableModel(HeadedModel):
    """Shows one `Table` of the document; typed texts go to the document as undo steps."""

    def __init__(self, table: Table, document: Document, sight: Sight, parent: QObject | None = None) -> None:
        super().__init__(table, document, sight, parent)
        self._figures = Figures()
        self._lit: frozenset[int] = frozenset()
        self._swept: tuple[frozenset[int], int, str] | None = None  # rows, column, the text while it runs
        self.total_column = (
            len(self._columns) // 2
        )  # where the adding row's second half begins, with the totals

    def set_figures(self, figures: Figures) -> None:
        """Show these results; touches the columns of results only."""
        self._figures = figures
        last = self.rowCount() - 1
        if last >= 0:
            for first, after in self._figure_runs:
                self.dataChanged.emit(self.index(0, first), self.index(last, after))
        if self.table.total is not None and last >= 0:  # in the adding row
            self.dataChanged.emit(self.index(last, 0), self.index(last, len(self._columns) - 1))

    @property
    def _figure_runs(self) -> list[tuple[int, int]]:
        """First and last of the neighbouring columns of results: each run is one signal."""
        runs: list[tuple[int, int]] = []
        for place, column in enumerate(self._columns):
            if column.figure is not None:
                first = runs.pop()[0] if runs and runs[-1][1] == place - 1 else place
                runs.append((first, place))
        return runs

    def set_lit(self, records: frozenset[int]) -> None:
        """Light the rows of these records."""
        if records != self._lit:
            touched = [self.row_of(record) for record in self._lit | records]
            self._lit = records
            rows = [row for row in touched if 0 <= row < self.rowCount()]
            if rows:
                last = len(self._columns) - 1
                self.dataChanged.emit(self.index(min(rows), 0), self.index(max(rows), last))

    def show_swept(self, rows: frozenset[int], column: int, text: str | None) -> None:
        """Show a text in the cells of these rows while their number runs; None for their own again."""
        self._swept = None if text is None else (rows, column, text)
        last = self.rowCount() - 1
        for row in rows:
            self.dataChanged.emit(self.index(min(row, last), column), self.index(min(row, last), column))

    def _is_swept(self, index: Index) -> bool:
        swept = self._swept
        return swept is not None and index.row() in swept[0] and index.column() == swept[1]

    def flags(self, index: Index) -> Qt.ItemFlag:
        """Every cell can be chosen, those with an entry can be edited."""
        if not index.isValid():
            return Qt.ItemFlag.NoItemFlags
        return TYPED if self._is_for_typing(index) else CHOSEN

    def _is_for_typing(self, index: Index) -> bool:
        """Whether a cell has an entry; kept, as Qt asks for it several times while it paints a cell."""
        cells = self._for_typing.setdefault(index.row(), {})
        found = cells.get(index.column())
        if found is None:
            found = cells[index.column()] = self.entry(index) is not None
        return found

    def entry(self, index: Index) -> str | None:
        """What an editor starts from; None where the cell is not for typing."""
        row, column = index.row(), index.column()
        draft = self.draft(index)
        if draft is not None:
            return draft.text
        if self.is_adding(row):
            return "" if column == 0 else None
        return self._columns[column].entry(self._rows[row], self._sight)

    def is_entered(self, place: int) -> bool:
        """Whether any cell of a column holds something that could be left out."""
        nothing = ("", "0", supports_entry((), self._sight.system))
        rows = range(self.rowCount() - (self.table.adding is not None))
        return self._columns[place].optional and any(self._entered(row, place) not in nothing for row in rows)

    def _entered(self, row: int, place: int) -> str:
        """What a cell holds by itself; nothing where it follows from the column that says more."""
        column = self._columns[place]
        text = column.entry(self._rows[row], self._sight)
        if text is None and column.settled_by:
            return ""
        return text or self._settled_text(row, place)

    def data(self, index: Index, role: int = Qt.ItemDataRole.DisplayRole) -> Any:
        """One cell's answer for a role."""
        if not index.isValid():
            return None
        answer = self._ANSWERS.get(role)
        return None if answer is None else answer(self, index)

    def look(self, index: Index) -> Look:
        """What is painted of a cell."""
        hint = self._is_hint(index)
        return Look(
            text=self._display(index),
            for_typing=self._is_for_typing(index),
            error=self._error(index),
            bar=self._bar(index),
            hint=hint,
            sum=hint and index.column() > 0,
            lit=self._is_lit(index),
            stale=self._stale(index),
        )

    def _display(self, index: Index) -> str:
        if self._swept is not None and self._is_swept(index):
            return self._swept[2]
        draft = self.draft(index)
        if draft is not None:
            return draft.text
        if self.is_adding(index.row()):
            return self._adding_text(index.column())
        return self._settled_text(index.row(), index.column())

    def text_at(self, row: int, place: int) -> str:
        """What a record's cell shows."""
        if self._swept is None and not self._document.snapshot.drafts:  # most often, and faster
            return self._settled_text(row, place)
        return self._display(self.index(row, place))

    def _settled_text(self, row: int, place: int) -> str:
        """What a record's cell shows where nothing is being typed into it."""
        column = self._read_columns[place]
        if column.figure is not None:
            return column.figure(self.record_of(row), self._figures, self._sight)
        return column.show(self._read[row], self._sight)

    def _adding_text(self, column: int) -> str:
        if column == 0 and self.table.adding is not None:
            return "+ " + tr(self.table.adding.hint)
        if column == self.total_column and self.table.total is not None:
            return self.table.total(self._shown, self._figures, self._sight)
        return ""

    def _error(self, index: Index) -> str:
        draft = self.draft(index)
        return draft.reason if draft is not None else ""

    def _spoken(self, index: Index) -> str:
        text, error = self._display(index) or tr("empty"), self._error(index)
        return tr("{text}, not taken in: {reason}").format(text=text, reason=error) if error else text

    def _tip(self, index: Index) -> str | None:
        return self._error(index) or self._why_none(index) or self.why_not(index) or None

    def _why_none(self, index: Index) -> str:
        column = self._columns[index.column()]
        if column.why_none is None or not self.is_record(index.row()):
            return ""
        return column.why_none(self.record_of(index.row()), self._figures)

    def _bar(self, index: Index) -> tuple[float, float] | None:
        column = self._columns[index.column()]
        if column.bar is None or not self.is_record(index.row()):
            return None
        return column.bar(self.record_of(index.row()), self._figures)

    def _stale(self, index: Index) -> bool:
        return self._columns[index.column()].figure is not None and not self._figures.current

    def _is_hint(self, index: Index) -> bool:
        lead = index.row() < self.table.lead and index.column() == 0
        return self.draft(index) is None and (self.is_adding(index.row()) or lead)

    def _is_lit(self, index: Index) -> bool:
        if self._is_swept(index):
            return True
        return self.is_record(index.row()) and self.record_of(index.row()) in self._lit

    _ANSWERS: ClassVar[dict[int, Callable[[TableModel, Index], Any]]] = {
        Qt.ItemDataRole.DisplayRole: _display,
        Qt.ItemDataRole.EditRole: entry,
        Qt.ItemDataRole.ToolTipRole: _tip,
        Qt.ItemDataRole.AccessibleTextRole: _spoken,
        ERROR_ROLE: _error,
    }

    # Typing

    def put(self, index: Index, text: str) -> Change:
        """The project with `text` in the cell; EntryError or EditError where it is no valid entry."""
        project = self._document.project
        if self.is_adding(index.row()) and self.table.adding is not None:
            return self.table.adding.put(project, text, self._sight)
        column = self._columns[index.column()]
        if column.put is None:
            raise NotTaken(tr("this cell is not for typing"))
        return column.put(project, self.record_of(index.row()), text, self._sight)

    def _column_of(self, index: Index) -> Column:
        """The column that a text in the cell is for; in the row that adds, the one that adds a record."""
        adding = self.table.adding if self.is_adding(index.row()) else None
        return self._columns[index.column()] if adding is None else self.column_named(adding.column)

    def tell_notes(self, column: Column, text: str, *notes: str) -> None:
        """Say what an entry did more than it seems to, and how it was read where that may surprise."""
        read = typed_note(text, column.quantity, self._sight.system) if column.quantity else ""
        if said := "; ".join(filter(None, (read, *notes))):
            self.noted.emit(said)

    def offers(self, index: Index) -> tuple[Offer, ...]:
        """The names that a cell offers while it is typed into."""
        adding = self.is_adding(index.row())
        source = self.table.adding if adding else self._columns[index.column()]
        if source is None or source.offers is None:
            return ()
        return source.offers(self._document.project, self._sight)

    def separator(self, index: Index) -> str:
        """What stands between several names in a cell; empty where it holds one."""
        return "" if self.is_adding(index.row()) else self._columns[index.column()].separator

    def why_not(self, index: Index) -> str:
        """Why a cell is not for typing, in words; empty where it is, or where nothing could ever be typed."""
        if self.entry(index) is not None or not self.is_record(index.row()):
            return ""
        column = self._columns[index.column()]
        if column.of_case and self._sight.case is None:
            return tr("add a load case in the Loads table first")
        if column.of_case:
            return tr("several loads stand behind this cell: edit them one by one in the Loads table")
        return tr("a result is not for typing") if column.figure is not None else ""

    def tell_why_not(self, index: Index) -> None:
        """Say it in the status line."""
        if index.isValid() and (reason := self.why_not(index)):
            self.noted.emit(reason)

    def preview(self, index: Index, text: str) -> None:
        """Show what `text` in the cell would give, without committing it."""
        same = text == self.entry(index) and self.draft(index) is None
        if same or (self.is_adding(index.row()) and not text.strip()):
            self._document.drop_preview()
            return
        try:
            change = self.put(index, text)
        except TypingError as error:
            place = self.place(index.row(), index.column())
            self._document.set_preview(Preview(None, reason_of(error, self._sight.system, place)))
        else:
            self._document.set_preview(Preview(change.project))

    def drop_preview(self) -> None:
        """Back to what is committed: the editor was left without an entry."""
        self._document.drop_preview()

    def clear(self, indexes: Sequence[Index]) -> None:
        """Empty those cells that may be empty, and give up their drafts, as one undo step."""
        project, places = self._document.project, []
        for index in indexes:
            column = self._columns[index.column()]
            empties = column.optional and not self.is_adding(index.row())
            if self.entry(index) is None or not (empties or self.draft(index)):
                continue
            places.append(self.place(index.row(), index.column()))
            if empties and column.put is not None:
                project = column.put(project, self.record_of(index.row()), "", self._sight).project
        if places:
            self._document.commit(project, tr("Clear cells"), settled=tuple(places))

    def text_to_copy(self, row: int, column: int) -> str:
        """A cell for the clipboard: all digits of what is typed, what is read of the rest."""
        text = self.text_to_fill(row, column)
        return self._display(self.index(row, column)) if text is None else text

    def text_to_fill(self, row: int, column: int) -> str | None:
        """A cell's own text with all digits; None where it is not for typing."""
        return None if self.is_adding(row) else self.entry(self.index(row, column))

    def put_block(self, rows: Sequence[int], texts: Sequence[Texts], name: str, note: str = "") -> None:
        """Type a block of texts into these rows, those past the end added: one undo step.

        What is no valid entry becomes a draft of its cell; cells that are not for typing are passed over.
        """
        block = Block(self, self._document.snapshot)
        self._document.commit_snapshot(block.typed(rows, texts), name)
        if block.note or note:
            self.noted.emit("; ".join(filter(None, (block.note, note))))

    def setData(self, index: Index, value: Any, role: int = Qt.ItemDataRole.EditRole) -> bool:
        """Commit what was typed as one undo step, as a draft where it is no valid entry."""
        if role != Qt.ItemDataRole.EditRole or not index.isValid():
            return False
        text = str(value)
        if text == self.entry(index) and self.draft(index) is None:  # a draft may be valid by now
            self._document.drop_preview()
            return True
        place, name = self.place(index.row(), index.column()), self.step_name(index)
        column = self._column_of(index)  # before a row that it adds moves the row that adds
        if self.is_adding(index.row()) and not text.strip():
            self._document.commit(self._document.project, name, settled=(place,))
            return True
        try:
            change = self.put(index, text)
        except TypingError as error:
            reason = reason_of(error, self._sight.system, place)
            self._document.commit_draft(place, Draft(text, reason, name), name)
        else:
            new = self.record_of(index.row()) if self.is_adding(index.row()) else None
            self._document.commit(change.project, name, settled=(place,))
            if new is not None:
                self.added.emit(new)
            self.tell_notes(column, text, change.note)
        return True

    def step_name(self, index: Index) -> str:
        """The name of the undo step that an edit of the cell makes."""
        if self.is_adding(index.row()) and self.table.adding is not None:
            return tr(self.table.adding.name)
        return self.cell_name(self._document.project, self.record_of(index.row()), index.column())
