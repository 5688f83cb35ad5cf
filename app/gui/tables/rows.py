"""The rows and columns of a table as Qt is told of them: what came, went or changed, never a reset.

A reset would close the open editor and lose the current cell and the selection.
"""

from __future__ import annotations

from collections.abc import Sequence

from PySide6.QtCore import QAbstractTableModel, QModelIndex, QObject, QPersistentModelIndex, Qt, Signal

from app.gui.document import Document, Draft, Preview, Snapshot
from app.gui.places import Place
from app.gui.tables.column import Column, Sight, Table
from app.words import tr
from solver.model import Project

Index = QModelIndex | QPersistentModelIndex
NONE = QModelIndex()


def changed_span(old: Sequence[object], new: Sequence[object]) -> tuple[int, int]:
    """Where rows came or went, and how many came (negative: went).

    Rows alike at both ends are taken to be the same; the difference in number is before those at the back.
    """
    shorter = min(len(old), len(new))
    front = back = 0
    while front < shorter and old[front] == new[front]:
        front += 1
    while back < shorter - front and old[-1 - back] == new[-1 - back]:
        back += 1
    return shorter - back, len(new) - len(old)


class RowsModel(QAbstractTableModel):
    """Rows and columns of one `Table` of the document, in the sight of now."""

    noted = Signal(str)  # a line about an edit that did more than it seems to
    added = Signal(int)  # a record was typed into the row that adds, by its index

    def __init__(self, table: Table, document: Document, sight: Sight, parent: QObject | None = None) -> None:
        super().__init__(parent)
        self.table = table
        self._document = document
        self._sight = sight
        self._shown = document.project
        self._rows = table.rows(document.project, sight)
        self._typed: tuple[tuple[object, ...], tuple[Column, ...]] | None = None  # of what is typed or swept
        self._columns = table.columns(document.project, sight)
        self._for_typing: dict[int, dict[int, bool]] = {}  # by row and column, of the cells asked for so far
        document.changed.connect(self.on_document_changed)
        document.preview_changed.connect(self.on_preview_changed)

    def on_document_changed(self, snapshot: Snapshot) -> None:
        """Follow the document; the case that was edited may be gone."""
        cases = len(snapshot.project.load_cases)
        case = self._sight.case
        if case is not None and case >= cases:
            self._sight = Sight(self._sight.system, cases - 1 if cases else None)
        self._follow(snapshot.project)

    def on_preview_changed(self, preview: Preview | None) -> None:
        """Follow a hand on the drawing in all rows, and what is being typed or swept in how they read.

        What an editor starts from, and what a typed text is held against, is of the document meanwhile.
        """
        wanted = None if preview is None else preview.project
        shown = wanted or self._document.project
        if shown is self._shown:
            return
        before, self._shown = self._read, shown
        rows = self.table.rows(shown, self._sight)
        if wanted is None or (preview is not None and preview.by_hand):
            self._sync_rows(rows)
        else:  # an editor stands in its row, so none comes or goes
            columns = self.table.columns(shown, self._sight)
            alike = len(rows) == len(self._rows) and len(columns) == len(self._columns)
            self._typed = (rows, columns) if alike else None
        self._announce(before)

    @property
    def _read(self) -> tuple[object, ...]:
        """The rows as they are read: with what is being typed, and what follows from it."""
        return self._rows if self._typed is None else self._typed[0]

    @property
    def _read_columns(self) -> tuple[Column, ...]:
        """The columns that they are read by: a case that is being renamed has its new name there."""
        return self._columns if self._typed is None else self._typed[1]

    def _announce(self, before: tuple[object, ...]) -> None:
        """Tell Qt of the rows that read otherwise than before, and of the totals."""
        now, last, columns = self._read, self.rowCount() - 1, len(self._columns) - 1
        differing = [row for row, (a, b) in enumerate(zip(before, now, strict=False)) if a != b]
        for row in differing:
            self._for_typing.pop(row, None)
        if len(before) != len(now):
            self.dataChanged.emit(self.index(0, 0), self.index(last, columns))
        elif differing:
            self.dataChanged.emit(self.index(differing[0], 0), self.index(differing[-1], columns))
        if self.table.total is not None:
            self.dataChanged.emit(self.index(last, 0), self.index(last, columns))

    def set_sight(self, sight: Sight) -> None:
        """Read the table in other units or with the loads of another case."""
        if sight != self._sight:
            self._sight = sight
            self._follow(self._document.project)

    def _follow(self, project: Project) -> None:
        self._shown = project
        self._sync_columns(self.table.columns(project, self._sight))
        self._sync_rows(self.table.rows(project, self._sight))
        self._for_typing.clear()
        # Drafts and units can change any cell, so all are announced; an open editor keeps its text by itself.
        if self.rowCount():
            self.dataChanged.emit(self.index(0, 0), self.index(self.rowCount() - 1, len(self._columns) - 1))

    def _sync_columns(self, new: tuple[Column, ...]) -> None:
        old = self._columns
        at, grown = changed_span([c.key for c in old], [c.key for c in new])
        if grown > 0:
            self.beginInsertColumns(NONE, at, at + grown - 1)
            self._columns = old[:at] + new[at : at + grown] + old[at:]
            self.endInsertColumns()
        elif grown < 0:
            self.beginRemoveColumns(NONE, at, at - grown - 1)
            self._columns = old[:at] + old[at - grown :]
            self.endRemoveColumns()
        self._columns = new
        self.headerDataChanged.emit(Qt.Orientation.Horizontal, 0, len(new) - 1)

    def _sync_rows(self, new: tuple[object, ...]) -> None:
        old, self._typed = self._rows, None
        at, grown = changed_span(old, new)
        if grown > 0:
            self.beginInsertRows(NONE, at, at + grown - 1)
            self._rows = old[:at] + new[at : at + grown] + old[at:]
            self.endInsertRows()
        elif grown < 0:
            self.beginRemoveRows(NONE, at, at - grown - 1)
            self._rows = old[:at] + old[at - grown :]
            self.endRemoveRows()
        self._rows = new
        if grown:
            self._for_typing.clear()

    # What stands where

    @property
    def document(self) -> Document:
        """What the table shows a part of."""
        return self._document

    @property
    def columns(self) -> tuple[Column, ...]:
        """The columns as they are now."""
        return self._columns

    def column_named(self, key: str) -> Column:
        """One of them."""
        return next(column for column in self._columns if column.key == key)

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
        if self.is_adding(row) and self.table.place is None:
            return (*self.table.records(self._sight), self.record_of(row), self._columns[column].key)
        return self.cell_place(self.record_of(row), column)

    def cell_place(self, record: int, column: int, project: Project | None = None) -> Place:
        """The place of a record's cell, also of a record of `project` that is not shown yet."""
        wanted = self._columns[column]
        if wanted.place is not None:
            return wanted.place(record, self._sight)
        case = self._sight.case_place if wanted.of_case else ()
        if self.table.place is not None:
            return (*self.table.place(project or self._document.project, record, wanted.key), *case)
        return (*self.table.records(self._sight), record, wanted.key, *case)

    def cell_name(self, project: Project, record: int, column: int) -> str:
        """A record's cell in words, with the load case it belongs to."""
        words = self._columns[column].words
        row = self.table.row_name(project, record, self._sight)
        case = self._sight.load_case(project) if self._columns[column].of_case else None
        if case is None:
            return tr("{column} of {row}").format(column=words, row=row)
        return tr("{column} of {row}, {case}").format(column=words, row=row, case=case.name)

    def draft(self, index: Index) -> Draft | None:
        """What was typed into the cell and not taken in."""
        drafts = self._document.snapshot.drafts
        return drafts.get(self.place(index.row(), index.column())) if drafts else None

    def rowCount(self, parent: Index = NONE) -> int:
        """Rows of records, the rows before them and the adding row."""
        return 0 if parent.isValid() else len(self._rows) + (self.table.adding is not None)

    @property
    def record_rows(self) -> int:
        """The rows before the adding one."""
        return len(self._rows)

    def columnCount(self, parent: Index = NONE) -> int:
        """The columns of the table."""
        return 0 if parent.isValid() else len(self._columns)
