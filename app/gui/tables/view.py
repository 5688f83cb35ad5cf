"""The table on the screen: keys of the hand, no trap for them, and rows that add a record.

Enter moves down, Tab to the next cell and out of the table after the last one, F2 edits, Delete clears what
can be empty, Escape restores.
"""

from __future__ import annotations

from collections.abc import Iterable

from PySide6.QtCore import QItemSelection, QItemSelectionModel, Qt, Signal
from PySide6.QtGui import QGuiApplication, QKeyEvent, QResizeEvent, QShowEvent
from PySide6.QtWidgets import (
    QAbstractItemDelegate,
    QAbstractItemView,
    QHeaderView,
    QTableView,
    QWidget,
)

from app.gui.tables.cell_editor import CellEditor
from app.gui.tables.clipboard import block_of, block_text, tiled
from app.gui.tables.delegate import BAR_WIDTH, ENTER, MARGIN, CellDelegate
from app.gui.tables.model import TableModel
from app.gui.theme import Theme
from app.words import tr

ROW_HEIGHT = 26
MEASURED = 60  # rows whose texts are measured for the widths
TAB = (Qt.Key.Key_Tab, Qt.Key.Key_Backtab)


class TableView(QTableView):
    """One table of the document."""

    record_chosen = Signal(object)  # frozenset of the records that hold a selected cell

    def __init__(self, model: TableModel, theme: Theme, parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self.table_model = model
        self._cells = CellDelegate(theme, self)
        self._cells.stepped.connect(self.step)
        self._cells.closeEditor.connect(self.on_editor_closed)
        self.setItemDelegate(self._cells)
        self.setModel(model)
        self.setAccessibleName(tr(model.table.title))
        self.horizontalHeader().setAccessibleName(
            tr("Columns of {table}").format(table=tr(model.table.title))
        )
        self._dress()
        self.set_theme(theme)
        for came in (model.rowsInserted, model.rowsRemoved, model.columnsInserted, model.columnsRemoved):
            came.connect(self.on_shape_changed)
        model.modelReset.connect(self.on_shape_changed)
        self.doubleClicked.connect(model.tell_why_not)
        self.on_shape_changed()

    def _dress(self) -> None:
        self.setShowGrid(False)
        self.setFrameShape(QTableView.Shape.NoFrame)
        self.setCornerButtonEnabled(False)
        self.setTabKeyNavigation(True)
        self.setSelectionMode(QAbstractItemView.SelectionMode.ExtendedSelection)
        triggers = QAbstractItemView.EditTrigger
        self.setEditTriggers(triggers.DoubleClicked | triggers.EditKeyPressed | triggers.AnyKeyPressed)
        self.setHorizontalScrollMode(QAbstractItemView.ScrollMode.ScrollPerPixel)
        self.verticalHeader().hide()
        rows = self.verticalHeader()
        rows.setMinimumSectionSize(24)
        rows.setDefaultSectionSize(max(ROW_HEIGHT, self.fontMetrics().height() + 10))
        head = self.horizontalHeader()
        head.setHighlightSections(False)
        head.setSectionsClickable(False)
        head.setSectionResizeMode(QHeaderView.ResizeMode.Fixed)
        head.setMinimumSectionSize(40)
        head.setDefaultAlignment(Qt.AlignmentFlag.AlignLeft | Qt.AlignmentFlag.AlignTop)

    def set_theme(self, theme: Theme) -> None:
        """Take over the colours."""
        self._cells.theme = theme
        self.horizontalHeader().setStyleSheet(
            f"QHeaderView {{ background: {theme.card}; border: none;"
            f" border-bottom: 1px solid {theme.edge}; }}"
            f"QHeaderView::section {{ background: {theme.card}; color: {theme.quiet}; border: none;"
            f" border-bottom: 1px solid {theme.edge}; padding: 2px {MARGIN}px; }}"
        )
        self.viewport().update()

    # The shape of the table

    def on_shape_changed(self) -> None:
        """Span the adding row's hint and totals, and share the width out."""
        self.share_width()
        model = self.table_model
        self.clearSpans()
        last, columns = model.rowCount() - 1, model.columnCount()
        half = model.total_column
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

    def share_width(self) -> None:
        """Give each column what its texts need, towards its usual width, and then more in proportion."""
        needed = self._needed_widths()
        usual = [max(width, self._usual_width(place)) for place, width in enumerate(needed)]
        room, least, most = self.viewport().width(), sum(needed), sum(usual)
        grown = min(max((room - least) / max(1, most - least), 0.0), 1.0)
        share = min(max(room / max(1, most), 1.0), 3.0)
        for place, (need, wish) in enumerate(zip(needed, usual, strict=True)):
            self.setColumnWidth(place, int((need + grown * (wish - need)) * share))

    def widen_if_needed(self) -> None:
        """After a change: share the width out anew only where a text would be cut off."""
        self._widen(range(self.table_model.columnCount()))

    def widen_for_figures(self) -> None:
        """The same after new results, which change their own columns only."""
        self._widen(p for p, column in enumerate(self.table_model.columns) if column.figure is not None)

    def _widen(self, places: Iterable[int]) -> None:
        if self.isVisible() and any(self.columnWidth(place) < self._needed_width(place) for place in places):
            self.share_width()

    def _usual_width(self, place: int) -> int:
        return self.table_model.columns[place].width * self.fontMetrics().horizontalAdvance("0") + 2 * MARGIN

    def _needed_widths(self) -> list[int]:
        return [self._needed_width(place) for place in range(self.table_model.columnCount())]

    def _needed_width(self, place: int) -> int:
        """Wide enough for the heading and the texts, but no text takes more than three usual widths."""
        model, metrics = self.table_model, self.fontMetrics()
        texts = [str(model.index(row, place).data()) for row in range(min(model.record_rows, MEASURED))]
        widest = max((metrics.horizontalAdvance(text) for text in texts), default=0)
        column = model.columns[place]
        if column.figure is not None:  # room for results before they are there, so that nothing jumps
            widest = max(widest, column.width * metrics.horizontalAdvance("0"))
        bar = BAR_WIDTH + 10 if column.bar is not None else 0
        heading = max(metrics.horizontalAdvance(text) for text in model.heading(place))
        return max(min(widest, 3 * self._usual_width(place)) + bar, heading) + 2 * MARGIN + 2

    def showEvent(self, event: QShowEvent) -> None:
        """Texts may have changed while the table was hidden."""
        super().showEvent(event)
        self.widen_if_needed()

    def resizeEvent(self, event: QResizeEvent) -> None:
        """The width is shared out anew."""
        super().resizeEvent(event)
        self.share_width()

    # Keys

    def keyPressEvent(self, event: QKeyEvent) -> None:
        """The keys that Qt's table lacks or traps."""
        if event.key() in ENTER and not self._is_editing():
            self.step(-1 if event.modifiers() & Qt.KeyboardModifier.ShiftModifier else 1)
        elif event.key() == Qt.Key.Key_Delete or event.key() == Qt.Key.Key_Backspace:
            self.clear_selected()
        elif event.key() in TAB and self._leaves(forward=event.key() == Qt.Key.Key_Tab):
            self._leave(forward=event.key() == Qt.Key.Key_Tab)
        else:
            if event.text().isprintable() and event.text() and not self._is_editing():
                self.table_model.tell_why_not(self.currentIndex())
            super().keyPressEvent(event)

    def _is_editing(self) -> bool:
        return self.state() == QAbstractItemView.State.EditingState

    def _leaves(self, *, forward: bool) -> bool:
        current, model = self.currentIndex(), self.table_model
        if not current.isValid():
            return True
        if not forward:
            return current.row() == 0 and current.column() == 0
        reach = current.column() + self.columnSpan(current.row(), current.column())
        return current.row() == model.rowCount() - 1 and reach >= model.columnCount() - 1

    def _leave(self, *, forward: bool) -> None:
        self.setTabKeyNavigation(False)  # with navigation on, focusNextPrevChild comes back here
        self.focusNextPrevChild(forward)
        self.setTabKeyNavigation(True)

    def step(self, rows: int) -> None:
        """Move the current cell down (or up)."""
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

    # Blocks

    def _selected_block(self) -> tuple[int, int, int, int] | None:
        """Top, left, rows and columns of the selection's bounding block."""
        chosen = self.selectedIndexes()
        if not chosen:
            return None
        rows, columns = [i.row() for i in chosen], [i.column() for i in chosen]
        return min(rows), min(columns), max(rows) - min(rows) + 1, max(columns) - min(columns) + 1

    def copy(self) -> None:
        """The selected block to the clipboard, with all digits; the row that adds another stays behind."""
        self.commit_open_editor()
        block = self._selected_block()
        if block is None:
            return
        top, left, rows, columns = block
        texts = [
            [self.table_model.text_to_copy(row, column) for column in range(left, left + columns)]
            for row in range(top, min(top + rows, self.table_model.record_rows))
        ]
        QGuiApplication.clipboard().setText(block_text(texts))

    def paste(self) -> None:
        """The clipboard's block from the selection's corner on, one undo step."""
        self.commit_open_editor()
        block, selected = block_of(QGuiApplication.clipboard().text()), self._selected_block()
        if block and selected is not None:
            top, left, rows, columns = selected
            self.table_model.put_block(top, left, tiled(block, rows, columns), tr("Paste"))

    def fill_down(self) -> None:
        """The selection's first row into the rows below it, one undo step; no row is added."""
        self.commit_open_editor()
        selected = self._selected_block()
        if selected is None:
            return
        top, left, rows, columns = selected
        below = min(top + rows, self.table_model.record_rows) - top - 1
        if below > 0:
            first = [self.table_model.text_to_fill(top, column) for column in range(left, left + columns)]
            self.table_model.put_block(top + 1, left, [first] * below, tr("Fill down"))

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
        """Choose these records' rows in the column that is current, unless they are chosen already."""
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
