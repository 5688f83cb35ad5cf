"""Typing in place: a small editor over the drawing, bound to the very table cell that holds what is shown.

Each keystroke is previewed as in the table; Enter takes it in, Tab as well and goes on to the next cell of
the same segment or joint, Escape restores, and leaving it takes it in. A text that is no valid entry stays a
draft of its cell, with the reason beside it.
"""

from __future__ import annotations

from collections.abc import Callable

from PySide6.QtCore import QEvent, QObject, QRectF, QSize, Qt, QTimer, Signal
from PySide6.QtGui import QKeyEvent
from PySide6.QtWidgets import QFrame, QLabel, QVBoxLayout, QWidget

from app.drawing.shapes import LOADS, OF_COMPANION, OF_JOINT, OF_SEGMENT, Box, Part
from app.gui.document import Document, Snapshot
from app.gui.hand.cell_entry import CellEntry
from app.gui.hand.drafts import drafts_on_drawing
from app.gui.hand.leaving import keyboard_is_gone
from app.gui.sheet_view import SheetView
from app.gui.tables.cell_editor import CellEditor
from app.gui.tables.pane import TablesPane
from app.gui.theme import Theme, theme_for
from app.gui.view import View
from app.hand.cells import ORDER, Cell, case_share, cells_of, loads_behind, part_of
from app.hand.owners import why_not_here
from app.units import input_text
from app.words import tr

ENTER = (Qt.Key.Key_Return, Qt.Key.Key_Enter)
TAB = (Qt.Key.Key_Tab, Qt.Key.Key_Backtab)
ASIDE = 4.0  # px, between the box that is typed about and the editor
LEAST_WIDTH = 110  # px, of the line that is typed into
ONE_BY_ONE = ("mark", "companion")  # what cannot be the same for several


class EditorFrame(QFrame):
    """The caption, the line and the reason, in the colours of now."""

    placed = Signal(QRectF)

    def __init__(self, parent: QWidget, theme: Theme, entry: CellEntry) -> None:
        super().__init__(parent)
        self.setObjectName("in_place")
        self.caption = QLabel(entry.caption)
        self.reason = QLabel()
        self.line = CellEditor(
            self, theme, entry.model.offers(entry.index), entry.model.separator(entry.index)
        )
        self.line.setAccessibleName(entry.caption)
        self.reason.hide()
        for label in (self.caption, self.reason):
            label.setTextFormat(Qt.TextFormat.PlainText)
        self.reason.setWordWrap(True)
        rows = QVBoxLayout(self)
        rows.setContentsMargins(6, 3, 6, 5)
        rows.setSpacing(2)
        for widget in (self.caption, self.line, self.reason):
            rows.addWidget(widget)
        self.setStyleSheet(
            f"QFrame#in_place {{ background: {theme.card}; border: 1px solid {theme.joint}; }}"
            f"QLabel {{ color: {theme.quiet}; border: none; }}"
            f"QLineEdit#cell {{ background: {theme.card}; color: {theme.ink};"
            f" border: 2px solid {theme.select}; padding: 1px 2px; }}"
        )
        self.reason.setStyleSheet(f"color: {theme.over};")
        self._anchor = Box(0.0, 0.0, 0.0, 0.0)

    def say(self, reason: str) -> None:
        """Why the text is not taken in; nothing where it is."""
        self.reason.setText(f"! {reason}" if reason else "")
        self.reason.setVisible(bool(reason))
        self.line.setAccessibleDescription(reason)
        self.place(self._anchor)

    def place(self, box: Box) -> None:
        """Under the box, or over it where there is no room under it, and all of it inside the sheet."""
        self._anchor = box
        room = self.parentWidget().size()
        self.reason.setMaximumWidth(max(room.width() - 24, 80))
        size = self.sizeHint().boundedTo(QSize(room.width() - 4, room.height()))
        if self.reason.isVisibleTo(self):
            size.setHeight(max(size.height(), self.heightForWidth(size.width())))
        left = box.centre[0] - 0.5 * size.width()
        under, over = box.bottom + ASIDE, box.top - ASIDE - size.height()
        top = under if under + size.height() <= room.height() or over < 0.0 else over
        left = min(max(left, 2.0), max(room.width() - size.width() - 2.0, 0.0))
        top = min(max(top, 2.0), max(room.height() - size.height() - 2.0, 0.0))
        self.setGeometry(round(left), round(top), size.width(), size.height())
        self.placed.emit(QRectF(self.geometry()))


class InPlace(QObject):
    """Opens, takes in and closes the editor over the sheet; there is at most one."""

    told = Signal(str)

    def __init__(
        self, document: Document, view: View, sheet: SheetView, tables: TablesPane, parent: QObject
    ) -> None:
        super().__init__(parent)
        self._document = document
        self._view = view
        self._sheet = sheet
        self._tables = tables
        self._entry: CellEntry | None = None
        self._frame: EditorFrame | None = None
        self._part: Part | None = None
        sheet.viewport().installEventFilter(self)
        sheet.opened.connect(self.open_part)
        tables.committing.connect(self.commit)
        document.opened.connect(self.cancel)
        document.changed.connect(self._mark_drafts)
        document.preview_changed.connect(lambda _preview: self._say_reason())

        self._mark_drafts(document.snapshot)

    def _mark_drafts(self, snapshot: Snapshot) -> None:
        self._sheet.drawing.set_drafts(drafts_on_drawing(snapshot))

    @property
    def editor(self) -> CellEditor | None:
        """The open line, or None."""
        return None if self._frame is None else self._frame.line

    @property
    def caption(self) -> str:
        """What is said above the open line; empty where there is none."""
        return "" if self._frame is None else self._frame.caption.text()

    @property
    def reason(self) -> str:
        """Why the text that stands there is not taken in; empty where it is."""
        return "" if self._frame is None else self._frame.reason.text()

    # Opening

    def open_part(self, part: Part, box: Box, text: str | None = None) -> None:
        """Type what a part of the drawing shows; for all that is selected where it is one of several."""
        self.commit()
        project, case = self._document.project, self._tables.sight.case
        if refused := self.why_not(part):
            self.told.emit(refused)
            return
        cells = cells_of(part, project, case)
        if not cells:
            self._lead_to_loads(part)
            return
        self._part = part
        records = dict.fromkeys(cell.record for cell in cells)
        self.open(cells[0], box, text, (*records, *self._also_selected(part, cells[0])))

    def open(self, cell: Cell, box: Box, text: str | None = None, records: tuple[int, ...] = ()) -> None:
        """Type into a table's cell over a box of the sheet, beginning with `text` where one is given.

        `records` are all those that the text is for, the cell's own among them; only that one if empty.
        """
        self.commit()
        model = self._tables.models[cell.table]
        columns = [column.key for column in model.columns]
        if cell.column not in columns:
            return
        several = cell.column not in ONE_BY_ONE
        whole = tuple(dict.fromkeys((cell.record, *records))) if several else (cell.record,)
        entry = CellEntry(self._document, model, columns.index(cell.column), whole)
        if not entry.valid:
            return
        if entry.text is None or entry.refusal:
            self._refuse(entry, cell)
            return
        self._show(entry, box, text)

    def open_cell(self, cell: Cell, records: tuple[int, ...] = ()) -> None:
        """Type into a cell where the drawing shows it, for these records together."""
        self.open(cell, self._box_of(cell), None, records)

    def open_inserted(self, segment: int) -> None:
        """Type the length of a segment that was inserted on the sheet."""
        if self._sheet.hasFocus():
            self.open_cell(Cell("segments", segment, "length"))

    def _show(self, entry: CellEntry, box: Box, text: str | None) -> None:
        self._entry = entry
        self._frame = frame = EditorFrame(self._sheet.viewport(), theme_for(self._sheet.palette()), entry)
        if note := self._share_note(entry):
            frame.caption.setText(f"{entry.caption}\n{note}")
            frame.line.setAccessibleName(f"{entry.caption}, {note}")
        line = frame.line
        line.setText(entry.text)
        room = line.fontMetrics().horizontalAdvance(entry.text or "") + 28
        line.setMinimumWidth(min(max(LEAST_WIDTH, room), self._sheet.viewport().width() // 2))
        line.installEventFilter(self)
        for typed in (line.textEdited, line.offered):
            typed.connect(self._on_typed)
        line.picked.connect(self._take_in)
        frame.placed.connect(self._sheet.paper.notice_box.keep_clear_of)
        frame.place(box)
        frame.show()
        line.setFocus(Qt.FocusReason.OtherFocusReason)
        line.selectAll()
        if text is not None:
            line.clear()
            line.insert(text)
            line.setModified(True)
            self._on_typed(text)
        elif draft := entry.model.draft(entry.index):
            frame.say(draft.reason)

    def _share_note(self, entry: CellEntry) -> str:
        """How a load's own number counts in what is shown, where the drawing shows another one."""
        part, shown = self._part_in(entry), self._view.shown
        case = self._tables.sight.case
        if part is None or part.kind not in LOADS or case is None:
            return ""
        share = case_share(self._document.project, shown, case)
        if share == 0.0:
            return tr("takes no part in what is shown")
        if shown.kind == "case":
            return ""
        factor = input_text(share, "factor", self._document.project.display.unit_system)
        return tr("the number of the case itself; it counts ×{factor} in {shown}").format(
            factor=factor, shown=shown.name
        )

    def _part_in(self, entry: CellEntry) -> Part | None:
        """The part of the drawing that shows what is typed."""
        column = entry.model.columns[entry.index.column()].key
        cell = Cell(entry.model.table.key, entry.records[0], column)
        return part_of(cell, self._document.project, self._tables.sight.case)

    def _also_selected(self, part: Part, cell: Cell) -> tuple[int, ...]:
        """The other selected segments or joints where the part is one of them."""
        chosen = self._view.selection
        if part.kind in OF_COMPANION:
            return tuple(sorted(chosen.companions)) if part.index in chosen.companions else ()
        among = chosen.segments if part.kind in OF_SEGMENT else chosen.joints
        of_table = cell.table == ("segments" if part.kind in OF_SEGMENT else "joints")
        if part.kind not in OF_SEGMENT | OF_JOINT or not of_table or part.index not in among:
            return ()
        return tuple(sorted(among))

    # What cannot be typed

    def why_not(self, part: Part) -> str:
        """Why a load on the drawing cannot be edited in the edited case; empty where it can."""
        project, shown, case = self._document.project, self._view.shown, self._tables.sight.case
        if part.kind not in LOADS:
            return ""
        if case is None:
            return tr("add a load case in the Loads table first")
        if case_share(project, shown, case):
            return why_not_here(part, project, shown, case)
        name = project.load_cases[case].name
        words = tr("{case} takes no part in what is shown: choose at “Edit loads of” or “Show” one that does")
        return words.format(case=name)

    def _refuse(self, entry: CellEntry, cell: Cell) -> None:
        """Say why the cell is not for typing; where several loads stand behind it, lead to them."""
        case = self._tables.sight.case
        part = part_of(cell, self._document.project, case)
        self.told.emit(entry.refusal or tr("this cell is not for typing"))
        if part is not None and part.kind in LOADS:
            self._show_loads(part)

    def _lead_to_loads(self, part: Part) -> None:
        """Several records say together what the part shows."""
        self.told.emit(tr("several loads stand behind this label: edit them one by one in the Loads table"))
        self._show_loads(part)

    def _show_loads(self, part: Part) -> None:
        records = loads_behind(part, self._document.project, self._tables.sight.case)
        if records:
            table = "joint_loads" if part.kind in OF_JOINT else "segment_loads"
            self._tables.show_record(table, records[0])
            self._tables.views[table].choose_records(frozenset(records))

    # Typing

    def _on_typed(self, text: str) -> None:
        if self._entry is not None and self._entry.valid:
            self._entry.preview(text)
            self._say_reason()

    def _say_reason(self) -> None:
        preview = self._document.preview
        if self._frame is not None:
            self._frame.say(preview.reason if preview is not None and preview.project is None else "")

    def commit(self) -> None:
        """Take in what stands in the open line, and close it."""
        entry, frame = self._close()
        if entry is not None and frame is not None and entry.valid:
            entry.commit(frame.line.text())

    def cancel(self) -> None:
        """Close the line and leave the cell as it was."""
        if self._close()[0] is not None:
            self._document.drop_preview()

    def _close(self) -> tuple[CellEntry | None, EditorFrame | None]:
        """Take the editor off the sheet; the keyboard goes back to the sheet where the editor had it."""
        entry, frame = self._entry, self._frame
        self._entry = self._frame = None
        if frame is not None:
            had_focus = frame.line.hasFocus()
            frame.line.removeEventFilter(self)
            frame.hide()
            self._sheet.paper.notice_box.keep_clear_of(QRectF())
            frame.deleteLater()
            if had_focus:
                self._sheet.setFocus(Qt.FocusReason.OtherFocusReason)
        return entry, frame

    def _take_in(self) -> None:
        self.commit()

    def _go_on(self, by: int) -> None:
        """Take in, and on to the record's next cell that is for typing; to the sheet after the last."""
        entry = self._entry
        if entry is None:
            return
        table, records = entry.model.table.key, entry.records
        keys = [column.key for column in entry.model.columns]
        order = ORDER.get(table, ())
        here = keys[entry.index.column()]
        self.commit()
        rest = order[order.index(here) + 1 :] if by > 0 else order[: order.index(here)][::-1]
        for key in rest if here in order else ():
            cell = Cell(table, records[0], key)
            column = keys.index(key) if key in keys else -1
            row = entry.model.row_of(records[0])
            if column >= 0 and entry.model.entry(entry.model.index(row, column)) is not None:
                self.open_cell(cell, records)
                return

    def _box_of(self, cell: Cell) -> Box:
        """Where the drawing shows a cell."""
        part = part_of(cell, self._document.project, self._tables.sight.case)
        return self._sheet.box_of(part or Part("note", 0))

    def _follow(self) -> None:
        """Stand over the part again, wherever zooming or another size of the sheet has put it."""
        if self._entry is not None and self._frame is not None and self._entry.valid:
            self._frame.place(self._sheet.box_of(self._part_in(self._entry) or Part("note", 0)))

    def eventFilter(self, line: QObject, event: QEvent) -> bool:
        """Enter, Tab and Escape end the editor; so does the loss of the keyboard."""
        if event.type() == QEvent.Type.KeyPress and isinstance(event, QKeyEvent):
            action = self._key_action(event.key())
            if action is not None:
                action()
                return True
        if line is self._sheet.viewport():
            if event.type() in (QEvent.Type.Wheel, QEvent.Type.Resize) and self._frame is not None:
                QTimer.singleShot(0, self, self._follow)
            return False
        mine = self._frame is not None and line is self._frame.line
        if event.type() == QEvent.Type.FocusOut and mine and keyboard_is_gone(event):
            self.commit()
        return super().eventFilter(line, event)

    def _key_action(self, key: int) -> Callable[[], None] | None:
        if key in ENTER:
            return self._take_in
        if key == Qt.Key.Key_Escape:
            return self.cancel
        if key in TAB:
            return lambda: self._go_on(1 if key == Qt.Key.Key_Tab else -1)
        return None
