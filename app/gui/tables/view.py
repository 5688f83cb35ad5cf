"""The table on the screen: keys of the hand, no trap for them, and rows that add a record.

Enter moves down, Tab to the next cell and out of the table after the last one, F2 edits, Delete clears what
can be empty, Escape restores.
"""

from __future__ import annotations

from PySide6.QtCore import QEvent, QItemSelection, QItemSelectionModel, QModelIndex, QSize, Qt, Signal
from PySide6.QtGui import QKeyEvent, QPainter, QPaintEvent, QResizeEvent, QShowEvent
from PySide6.QtWidgets import (
    QAbstractButton,
    QAbstractItemDelegate,
    QAbstractItemView,
    QHeaderView,
    QTableView,
    QWidget,
)

from app.gui.tables.adding_row import AddingRow
from app.gui.tables.blocks import Blocks
from app.gui.tables.cell_editor import CellEditor
from app.gui.tables.delegate import ENTER, MARGIN, CellDelegate
from app.gui.tables.grips import RowGrips
from app.gui.tables.many_cells import ManyCells
from app.gui.tables.model import TableModel
from app.gui.tables.shown_columns import ShownColumns
from app.gui.tables.widths import Widths
from app.gui.theme import Theme, colour
from app.words import tr

ROW_HEIGHT = 26
LEAST_ROWS = 2  # in sight, however small the window
TAB = (Qt.Key.Key_Tab, Qt.Key.Key_Backtab)


class TableView(QTableView):
    """One table of the document."""

    record_chosen = Signal(object)  # frozenset of the records that hold a selected cell
    columns_shown = Signal()  # or hidden

    def __init__(self, model: TableModel, theme: Theme, parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self.table_model = model
        self._cells = CellDelegate(theme, self)
        self._cells.stepped.connect(self.step)
        self._cells.closeEditor.connect(self.on_editor_closed)
        self._many = ManyCells(self)
        self._cells.began.connect(self._many.on_editor_begun)
        self._cells.meant_for_all.connect(self._many.put_in_chosen)
        self.setItemDelegate(self._cells)
        self.setModel(model)
        self.widths, self.blocks, self._adding = Widths(self), Blocks(self), AddingRow(self)
        self.setAccessibleName(tr(model.table.title))
        self.horizontalHeader().setAccessibleName(
            tr("Columns of {table}").format(table=tr(model.table.title))
        )
        self.grips = RowGrips(self, theme) if model.table.movable else None
        if self.grips is not None:
            self.setVerticalHeader(self.grips)
            self.findChild(QAbstractButton).setAccessibleName(self.grips.accessibleName())  # above them
        self._dress()
        self.set_theme(theme)
        self.columns_choice = ShownColumns(self)
        for came in (model.rowsInserted, model.rowsRemoved, model.columnsInserted, model.columnsRemoved):
            came.connect(self.on_shape_changed)
        model.modelReset.connect(self.on_shape_changed)
        self.doubleClicked.connect(model.tell_why_not)
        self.on_shape_changed()

    def _dress(self) -> None:
        self.viewport().setAttribute(Qt.WidgetAttribute.WA_OpaquePaintEvent)
        self.setShowGrid(False)
        self.setFrameShape(QTableView.Shape.NoFrame)
        self.setCornerButtonEnabled(False)
        self.setTabKeyNavigation(True)
        self.setSelectionMode(QAbstractItemView.SelectionMode.ExtendedSelection)
        triggers = QAbstractItemView.EditTrigger
        self.setEditTriggers(triggers.DoubleClicked | triggers.EditKeyPressed | triggers.AnyKeyPressed)
        self.setHorizontalScrollMode(QAbstractItemView.ScrollMode.ScrollPerPixel)
        rows = self.verticalHeader()
        rows.setVisible(self.grips is not None)
        rows.setMinimumSectionSize(24)
        self._fit_rows()
        head = self.horizontalHeader()
        head.setHighlightSections(False)
        head.setSectionsClickable(False)
        head.setSectionResizeMode(QHeaderView.ResizeMode.Fixed)
        head.setMinimumSectionSize(40)
        head.setDefaultAlignment(Qt.AlignmentFlag.AlignLeft | Qt.AlignmentFlag.AlignTop)

    def _fit_rows(self) -> None:
        """Rows as high as the font needs."""
        self.verticalHeader().setDefaultSectionSize(max(ROW_HEIGHT, self.fontMetrics().height() + 10))

    def minimumSizeHint(self) -> QSize:
        """The headings and a few rows, in any font."""
        rows = LEAST_ROWS * self.verticalHeader().defaultSectionSize()
        height = self.horizontalHeader().sizeHint().height() + rows
        return QSize(super().minimumSizeHint().width(), height)

    def changeEvent(self, event: QEvent) -> None:
        """Follow the font."""
        super().changeEvent(event)
        if event.type() == QEvent.Type.FontChange and hasattr(self, "widths"):
            self._fit_rows()
            self.widths.share()

    def paintEvent(self, event: QPaintEvent) -> None:
        """The cells on their ground, so that nothing that lies under the table is painted with them."""
        painter = QPainter(self.viewport())
        painter.fillRect(event.rect(), colour(self._cells.theme.card))
        painter.end()
        super().paintEvent(event)

    def set_theme(self, theme: Theme) -> None:
        """Take over the colours."""
        self._cells.theme = theme
        if self.grips is not None:
            self.grips.dress(theme)
        self.horizontalHeader().setStyleSheet(
            f"QHeaderView {{ background: {theme.card}; border: none;"
            f" border-bottom: 1px solid {theme.edge}; }}"
            f"QHeaderView::section {{ background: {theme.card}; color: {theme.quiet}; border: none;"
            f" border-bottom: 1px solid {theme.edge}; padding: 2px {MARGIN}px; }}"
        )
        self.setStyleSheet(
            f"QTableCornerButton::section {{ background: {theme.card}; border: none;"
            f" border-bottom: 1px solid {theme.edge}; }}"
        )
        self.viewport().update()

    # The shape of the table

    def shown_columns(self) -> list[int]:
        """The columns that are not hidden, in order; the first one always is among them."""
        return [place for place in range(self.table_model.columnCount()) if not self.isColumnHidden(place)]

    def on_shape_changed(self) -> None:
        """Span the adding row's hint and totals over the columns that are shown, and share the width out."""
        self.columns_choice.hide_others()
        self.widths.share()
        model, shown = self.table_model, self.shown_columns()
        self.clearSpans()
        last, columns = model.rowCount() - 1, model.columnCount()
        half = model.total_column = shown[len(shown) // 2] if len(shown) > 1 else columns
        if model.table.adding is None:
            return
        if model.table.total is None:
            self._span(last, 0, columns)
        else:
            self._span(last, 0, half)
            self._span(last, half, columns - half)

    def _span(self, row: int, column: int, count: int) -> None:
        if count > 1:  # Qt complains about a span of one cell
            self.setSpan(row, column, 1, count)

    def showEvent(self, event: QShowEvent) -> None:
        """Texts may have changed while the table was hidden."""
        super().showEvent(event)
        self.widths.widen_if_needed()

    def resizeEvent(self, event: QResizeEvent) -> None:
        """The width is shared out anew."""
        super().resizeEvent(event)
        self.widths.share()

    # Keys

    def keyPressEvent(self, event: QKeyEvent) -> None:
        """The keys that Qt's table lacks or traps."""
        edge = self._edge(event)
        if edge is not None and not self._is_editing():
            flags = QItemSelectionModel.SelectionFlag
            self.selectionModel().setCurrentIndex(edge, flags.ClearAndSelect)
        elif event.key() in ENTER and not self._is_editing():
            self.step(-1 if event.modifiers() & Qt.KeyboardModifier.ShiftModifier else 1)
        elif event.key() == Qt.Key.Key_Delete or event.key() == Qt.Key.Key_Backspace:
            self.clear_selected()
        elif event.key() in TAB and self._leaves(forward=event.key() == Qt.Key.Key_Tab):
            self._leave(forward=event.key() == Qt.Key.Key_Tab)
        else:
            if event.text().isprintable() and event.text() and not self._is_editing():
                self.table_model.tell_why_not(self.currentIndex())
            super().keyPressEvent(event)

    def _edge(self, event: QKeyEvent) -> QModelIndex | None:
        """Where Ctrl with an arrow, Home or End leads: to the edge of the records; None for other keys."""
        current, shown = self.currentIndex(), self.shown_columns()
        if event.modifiers() & ~Qt.KeyboardModifier.KeypadModifier != Qt.KeyboardModifier.ControlModifier:
            return None
        row, column, last = max(current.row(), 0), max(current.column(), 0), self.table_model.record_rows - 1
        edges = {
            Qt.Key.Key_Left: (row, shown[0]),
            Qt.Key.Key_Right: (row, shown[-1]),
            Qt.Key.Key_Up: (0, column),
            Qt.Key.Key_Down: (max(last, 0), column),
            Qt.Key.Key_Home: (0, shown[0]),
            Qt.Key.Key_End: (max(last, 0), shown[-1]),
        }
        edge = edges.get(Qt.Key(event.key()))
        return None if edge is None else self.table_model.index(*edge)

    def _is_editing(self) -> bool:
        return self.state() == QAbstractItemView.State.EditingState

    def _leaves(self, *, forward: bool) -> bool:
        current, model = self.currentIndex(), self.table_model
        if not current.isValid():
            return True
        if not forward:
            return current.row() == 0 and current.column() == 0
        last = current.row() == model.rowCount() - 1
        return model.is_adding(current.row()) or (last and current.column() >= self.shown_columns()[-1])

    def _leave(self, *, forward: bool) -> None:
        self.setTabKeyNavigation(False)  # with navigation on, focusNextPrevChild comes back here
        self.focusNextPrevChild(forward)
        self.setTabKeyNavigation(True)

    def commitData(self, editor: QWidget) -> None:
        """Take in the editor's text, and note whether that has added a row."""
        self._adding.begin()
        super().commitData(editor)
        self._adding.end()

    def closeEditor(self, editor: QWidget, hint: QAbstractItemDelegate.EndEditHint) -> None:
        """Tab in an editor goes on to the next cell, and out of the table after the last one as well."""
        forward = hint == QAbstractItemDelegate.EndEditHint.EditNextItem
        back = hint == QAbstractItemDelegate.EndEditHint.EditPreviousItem
        if (forward or back) and self._adding.keeps_the_keyboard:
            super().closeEditor(editor, QAbstractItemDelegate.EndEditHint.NoHint)
            self._adding.go_on(forward=forward)
        elif (forward or back) and self._leaves(forward=forward):
            super().closeEditor(editor, QAbstractItemDelegate.EndEditHint.NoHint)
            self.setFocus()
            self._leave(forward=forward)
        else:
            super().closeEditor(editor, hint)

    def step(self, rows: int) -> None:
        """Move the current cell down (or up).

        An editor that a new row has pushed out of sight was hidden by Qt, and gave the keyboard to anyone.
        """
        self.setFocus()
        current = self.currentIndex()
        row = min(max(current.row() + rows, 0), self.table_model.rowCount() - 1)
        column = 0 if self.table_model.is_adding(row) else max(current.column(), 0)
        self.setCurrentIndex(self.table_model.index(row, column))

    def on_editor_closed(self, _editor: QWidget, hint: QAbstractItemDelegate.EndEditHint) -> None:
        """Escape takes the preview back."""
        if hint == QAbstractItemDelegate.EndEditHint.RevertModelCache:
            self.table_model.drop_preview()

    def commit_open_editor(self) -> None:
        """Take in what an open editor holds, before saving or closing."""
        if not self._is_editing():
            return
        for editor in self.findChildren(CellEditor):
            if editor.isVisible():  # one that was closed waits hidden for its deletion
                self.commitData(editor)
                self.closeEditor(editor, QAbstractItemDelegate.EndEditHint.NoHint)

    def clear_selected(self) -> None:
        """Empty the selected cells that may be empty, as one undo step."""
        self.commit_open_editor()
        self.table_model.clear(self.selectedIndexes())

    # Selection

    def chosen_records(self) -> tuple[int, ...]:
        """The records that hold a selected cell, in order."""
        rows = {index.row() for index in self.selectedIndexes()}
        return tuple(
            self.table_model.record_of(row) for row in sorted(rows) if self.table_model.is_record(row)
        )

    @property
    def lead_is_chosen(self) -> bool:
        """Whether a row before the first record holds a selected cell."""
        return any(index.row() < self.table_model.table.lead for index in self.selectedIndexes())

    def choose_record(self, record: int) -> None:
        """Make a record's row the current one, in the column that is current."""
        self.choose_records(frozenset((record,)))

    def choose_records(self, records: frozenset[int]) -> None:
        """Choose these records' rows in the column that is current, unless they are already; or none."""
        if not records and self.chosen_records():
            self.clearSelection()
        column, model = max(self.currentIndex().column(), 0), self.table_model
        cells = [model.index(model.row_of(record), column) for record in sorted(records)]
        cells = [index for index in cells if index.isValid()]
        if not cells or records == frozenset(self.chosen_records()):
            return
        chosen = QItemSelection()
        for index in cells:
            chosen.select(index, index)
        flags = QItemSelectionModel.SelectionFlag
        self.selectionModel().setCurrentIndex(cells[0], flags.NoUpdate)
        self.selectionModel().select(chosen, flags.ClearAndSelect)
        self.scrollTo(cells[0])

    def selectionChanged(self, selected: QItemSelection, deselected: QItemSelection) -> None:
        """Say which records are chosen."""
        super().selectionChanged(selected, deselected)
        self.record_chosen.emit(frozenset(self.chosen_records()))
