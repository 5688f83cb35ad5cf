"""The one table model: a snapshot's rows, told to Qt as what came, went or changed, never as a reset.

A reset would close the open editor and lose the current cell. Results arrive in their own columns only, so
that no cell being typed is ever announced as changed because the solver came back.
"""

from __future__ import annotations

from collections.abc import Sequence
from types import MappingProxyType
from typing import Any

from PySide6.QtCore import QAbstractTableModel, QModelIndex, QObject, QPersistentModelIndex, Qt, Signal

from app.gui.document import Document, Draft, Preview, Snapshot
from app.gui.places import Place
from app.gui.tables.column import Change, Column, Figures, Sight, Table
from app.gui.tables.reasons import NotTaken, TypingError, reason_of
from app.units import symbol
from app.words import tr
from solver.model import Project

ERROR_ROLE = int(Qt.ItemDataRole.UserRole) + 1  # the reason why the cell's text is not taken in, or ""
BAR_ROLE = ERROR_ROLE + 1  # (utilisation, sign of the stress) or None
HINT_ROLE = ERROR_ROLE + 2  # whether the text is a hint, not a value
LIT_ROLE = ERROR_ROLE + 3  # whether the row is selected elsewhere
STALE_ROLE = ERROR_ROLE + 4  # whether the figure is of an earlier edit

Index = QModelIndex | QPersistentModelIndex
NONE = QModelIndex()


def changed_span(old: Sequence[object], new: Sequence[object]) -> tuple[int, int]:
    """How many rows at the front, and then at the back, say the same in both."""
    shorter = min(len(old), len(new))
    front = back = 0
    while front < shorter and old[front] == new[front]:
        front += 1
    while back < shorter - front and old[-1 - back] == new[-1 - back]:
        back += 1
    return front, back


class TableModel(QAbstractTableModel):
    """Shows one `Table` of the document; typed texts go to the document as undo steps."""

    noted = Signal(str)  # a line about an edit that did more than it seems to

    def __init__(self, table: Table, document: Document, sight: Sight, parent: QObject | None = None) -> None:
        super().__init__(parent)
        self.table = table
        self._document = document
        self._sight = sight
        self._figures = Figures()
        self._lit: frozenset[int] = frozenset()
        self._rows = table.rows(document.project, sight)
        self._columns = table.columns(document.project, sight)
        document.changed.connect(self.on_document_changed)

    # What is shown

    def on_document_changed(self, snapshot: Snapshot) -> None:
        """Follow the document."""
        cases = len(snapshot.project.load_cases)
        case = self._sight.case
        if case is not None and case >= cases:
            self._sight = Sight(snapshot.project.display.unit_system, cases - 1 if cases else None)
        self._follow(snapshot.project)

    def set_sight(self, sight: Sight) -> None:
        """Read the table in other units or with the loads of another case."""
        if sight != self._sight:
            self._sight = sight
            self._follow(self._document.project)
            last = max(self.rowCount() - 1, 0)
            self.dataChanged.emit(self.index(0, 0), self.index(last, len(self._columns) - 1))

    def set_figures(self, figures: Figures) -> None:
        """Show these results; touches the columns of results only."""
        self._figures = figures
        last = self.rowCount() - 1
        for place, column in enumerate(self._columns):
            if column.figure is not None and last >= 0:
                self.dataChanged.emit(self.index(0, place), self.index(last, place))
        if self.table.adding is not None and last >= 0:
            self.dataChanged.emit(self.index(last, 0), self.index(last, len(self._columns) - 1))

    def set_lit(self, records: frozenset[int]) -> None:
        """Light the rows of these records."""
        if records != self._lit:
            touched = [self.row_of(record) for record in self._lit | records]
            self._lit = records
            rows = [row for row in touched if 0 <= row < self.rowCount()]
            if rows:
                last = len(self._columns) - 1
                self.dataChanged.emit(self.index(min(rows), 0), self.index(max(rows), last), [LIT_ROLE])

    def _follow(self, project: Project) -> None:
        self._sync_columns(self.table.columns(project, self._sight))
        self._sync_rows(self.table.rows(project, self._sight))

    def _sync_columns(self, new: tuple[Column, ...]) -> None:
        old = self._columns
        front, back = changed_span([c.key for c in old], [c.key for c in new])
        end = min(len(old), len(new)) - back
        grown = len(new) - len(old)
        if grown > 0:
            self.beginInsertColumns(NONE, end, end + grown - 1)
            self._columns = old[:end] + new[end : end + grown] + old[end:]
            self.endInsertColumns()
        elif grown < 0:
            self.beginRemoveColumns(NONE, end, end - grown - 1)
            self._columns = old[:end] + old[end - grown :]
            self.endRemoveColumns()
        self._columns = new
        self.headerDataChanged.emit(Qt.Orientation.Horizontal, 0, len(new) - 1)

    def _sync_rows(self, new: tuple[object, ...]) -> None:
        old = self._rows
        front, back = changed_span(old, new)
        end = min(len(old), len(new)) - back
        grown = len(new) - len(old)
        if grown > 0:
            self.beginInsertRows(NONE, end, end + grown - 1)
            self._rows = old[:end] + new[end : end + grown] + old[end:]
            self.endInsertRows()
        elif grown < 0:
            self.beginRemoveRows(NONE, end, end - grown - 1)
            self._rows = old[:end] + old[end - grown :]
            self.endRemoveRows()
        self._rows = new
        # Drafts can change anywhere, so all rows are announced; an open editor keeps its text by itself.
        last = len(self._columns) - 1
        if self.rowCount():
            self.dataChanged.emit(self.index(0, 0), self.index(self.rowCount() - 1, last))

    # What stands where

    @property
    def columns(self) -> tuple[Column, ...]:
        """The columns as they are now."""
        return self._columns

    @property
    def sight(self) -> Sight:
        """Units and case the table is read in."""
        return self._sight

    def record_of(self, row: int) -> int:
        """The index of the record a row stands for; −1 in a row before the first."""
        return row - self.table.lead

    def row_of(self, record: int) -> int:
        """The row that stands for a record."""
        return record + self.table.lead

    def is_record(self, row: int) -> bool:
        """Whether the row stands for a record (and not for the start or the adding of one)."""
        return self.table.lead <= row < len(self._rows)

    def is_adding(self, row: int) -> bool:
        """Whether typing into the row adds a record."""
        return self.table.adding is not None and row == len(self._rows)

    def place(self, row: int, column: int) -> Place:
        """The place of a cell in the project."""
        own = self._columns[column].place
        if own is not None and not self.is_adding(row):
            return own(self.record_of(row), self._sight)
        return (*self.table.records(self._sight), self.record_of(row), self._columns[column].key)

    def draft(self, index: Index) -> Draft | None:
        """What was typed into the cell and not taken in."""
        return self._document.snapshot.drafts.get(self.place(index.row(), index.column()))

    # Qt's side of it

    def rowCount(self, parent: Index = NONE) -> int:
        """Rows of records, the rows before them and the adding row."""
        return 0 if parent.isValid() else len(self._rows) + (self.table.adding is not None)

    def columnCount(self, parent: Index = NONE) -> int:
        """The columns of the table."""
        return 0 if parent.isValid() else len(self._columns)

    def flags(self, index: Index) -> Qt.ItemFlag:
        """Every cell can be chosen, those with an entry can be edited."""
        if not index.isValid():
            return Qt.ItemFlag.NoItemFlags
        chosen = Qt.ItemFlag.ItemIsEnabled | Qt.ItemFlag.ItemIsSelectable
        return chosen | Qt.ItemFlag.ItemIsEditable if self.entry(index) is not None else chosen

    def entry(self, index: Index) -> str | None:
        """What an editor starts from; None where the cell is not for typing."""
        row, column = index.row(), index.column()
        draft = self.draft(index)
        if draft is not None:
            return draft.text
        if self.is_adding(row):
            return "" if column == 0 else None
        return self._columns[column].entry(self._rows[row], self._sight)

    def data(self, index: Index, role: int = Qt.ItemDataRole.DisplayRole) -> Any:
        """One cell's answer for a role."""
        if not index.isValid():
            return None
        answer = _ANSWERS.get(role)
        return None if answer is None else answer(self, index)

    def _display(self, index: Index) -> str:
        draft = self.draft(index)
        if draft is not None:
            return draft.text
        row, column = index.row(), self._columns[index.column()]
        if self.is_adding(row):
            return self._adding_text(index.column())
        if column.figure is not None:
            return column.figure(self.record_of(row), self._figures, self._sight)
        return column.show(self._rows[row], self._sight)

    def _adding_text(self, column: int) -> str:
        if column == 0 and self.table.adding is not None:
            return "+ " + tr(self.table.adding.hint)
        if column == len(self._columns) - 1 and self.table.total is not None:
            return self.table.total(self._document.project, self._figures, self._sight)
        return ""

    def _error(self, index: Index) -> str:
        draft = self.draft(index)
        return draft.reason if draft is not None else ""

    def _spoken(self, index: Index) -> str:
        text, error = self._display(index), self._error(index)
        return tr("{text}, not taken in: {reason}").format(text=text, reason=error) if error else text

    def _tip(self, index: Index) -> str | None:
        return self._error(index) or None

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
        return self.is_record(index.row()) and self.record_of(index.row()) in self._lit

    def headerData(
        self, section: int, orientation: Qt.Orientation, role: int = Qt.ItemDataRole.DisplayRole
    ) -> Any:
        """The column's title over its unit; rows have no header."""
        if orientation != Qt.Orientation.Horizontal or not 0 <= section < len(self._columns):
            return None
        title, unit = self.heading(section)
        if role == Qt.ItemDataRole.DisplayRole:
            return f"{title}\n{unit}"
        if role in (Qt.ItemDataRole.AccessibleTextRole, Qt.ItemDataRole.ToolTipRole):
            return f"{title} ({unit})" if unit else title
        if role == Qt.ItemDataRole.TextAlignmentRole:
            return int(Qt.AlignmentFlag.AlignLeft | Qt.AlignmentFlag.AlignTop)
        return None

    def heading(self, column: int) -> tuple[str, str]:
        """A column's title and unit."""
        quantity = self._columns[column].quantity
        return tr(self._columns[column].title), symbol(quantity, self._sight.system) if quantity else ""

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

    def preview(self, index: Index, text: str) -> None:
        """Show what `text` in the cell would give, without committing it."""
        if text == self.entry(index) or (self.is_adding(index.row()) and not text.strip()):
            self._document.drop_preview()
            return
        try:
            change = self.put(index, text)
        except TypingError as error:
            self._document.set_preview(Preview(None, reason_of(error)))
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
            typed = self.entry(index) is not None and self.is_adding(index.row()) is False
            if not typed or not (column.optional or self.draft(index)):
                continue
            places.append(self.place(index.row(), index.column()))
            if column.optional and column.put is not None:
                project = column.put(project, self.record_of(index.row()), "", self._sight).project
        if places:
            self._document.commit(project, tr("Clear cells"), settled=tuple(places))

    def text_to_copy(self, row: int, column: int) -> str:
        """A cell for the clipboard: all digits of what is typed, what is read of the rest."""
        index = self.index(row, column)
        entry = None if self.is_adding(row) else self.entry(index)
        return self._display(index) if entry is None else entry

    def put_block(self, top: int, left: int, block: Sequence[Sequence[str]], name: str) -> None:
        """Type a block of texts into the cells from `top`, `left` on, rows past the end added: one undo step.

        What is no valid entry becomes a draft of its cell; cells that are not for typing are passed over.
        """
        snapshot = self._document.snapshot
        builder = _Block(self, snapshot.project, dict(snapshot.drafts))
        for down, texts in enumerate(block):
            for across, text in enumerate(texts):
                builder.type_in(top + down, left + across, text)
        self._document.commit_snapshot(builder.snapshot(), name)

    def setData(self, index: Index, value: Any, role: int = Qt.ItemDataRole.EditRole) -> bool:
        """Commit what was typed as one undo step, as a draft where it is no valid entry."""
        if role != Qt.ItemDataRole.EditRole or not index.isValid():
            return False
        text = str(value)
        if text == self.entry(index):
            self._document.drop_preview()
            return True
        place, name = self.place(index.row(), index.column()), self.step_name(index)
        if self.is_adding(index.row()) and not text.strip():
            self._forget_draft(place, name)
            return True
        try:
            change = self.put(index, text)
        except TypingError as error:
            self._document.commit_draft(place, Draft(text, reason_of(error), name), name)
        else:
            self._document.commit(change.project, name, settled=(place,))
            if change.note:
                self.noted.emit(change.note)
        return True

    def _forget_draft(self, place: Place, name: str) -> None:
        self._document.commit(self._document.project, name, settled=(place,))

    def step_name(self, index: Index) -> str:
        """The name of the undo step that an edit of the cell makes."""
        if self.is_adding(index.row()) and self.table.adding is not None:
            return tr(self.table.adding.name)
        row = self.table.row_name(self._document.project, self.record_of(index.row()), self._sight)
        title = tr(self._columns[index.column()].title)
        return tr("{column} of {row}").format(column=title, row=row)


class _Block:
    """Collects the cells of one paste on top of each other."""

    def __init__(self, model: TableModel, project: Project, drafts: dict[Place, Draft]) -> None:
        self._model = model
        self._project = project
        self._drafts = drafts

    def type_in(self, row: int, column: int, text: str) -> None:
        """One cell."""
        model, records = self._model, self._model.table.rows(self._project, self._model.sight)
        if not 0 <= column < len(model.columns):
            return
        if row >= len(records):
            self._add(column, text)
            return
        wanted = model.columns[column]
        entry = wanted.entry(records[row], model.sight)
        if wanted.put is None or entry is None or text == entry:
            return
        place = model.place(row, column)
        try:
            change = wanted.put(self._project, model.record_of(row), text, model.sight)
        except TypingError as error:
            self._drafts[place] = Draft(text, reason_of(error), tr(wanted.title))
        else:
            self._drafts.pop(place, None)
            self._project = change.project

    def _add(self, column: int, text: str) -> None:
        """Past the end: the first column that can add a record does, the others then find its row."""
        adding = self._model.table.adding
        if adding is None or self._model.columns[column].key != adding.column or not text.strip():
            return
        try:
            self._project = adding.put(self._project, text, self._model.sight).project
        except TypingError:
            return

    def snapshot(self) -> Snapshot:
        """What came of it."""
        return Snapshot(self._project, MappingProxyType(self._drafts))


_ANSWERS = {
    Qt.ItemDataRole.DisplayRole: TableModel._display,
    Qt.ItemDataRole.EditRole: TableModel.entry,
    Qt.ItemDataRole.ToolTipRole: TableModel._tip,
    Qt.ItemDataRole.AccessibleTextRole: TableModel._spoken,
    ERROR_ROLE: TableModel._error,
    BAR_ROLE: TableModel._bar,
    HINT_ROLE: TableModel._is_hint,
    LIT_ROLE: TableModel._is_lit,
    STALE_ROLE: TableModel._stale,
}
