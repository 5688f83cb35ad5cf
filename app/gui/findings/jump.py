"""From a finding to its place on the sheet, on to the table cell that is to be changed, and back."""

from __future__ import annotations

from PySide6.QtCore import QObject, Qt, Signal
from PySide6.QtWidgets import QApplication

from app.beside import beside
from app.findings.cells import cell_of_finding
from app.gui.document import Document
from app.gui.findings.content import Row
from app.gui.findings.panel import FindingsPanel
from app.gui.findings.row import FindingRow
from app.gui.sheet_view import SheetView
from app.gui.tables.pane import TablesPane
from app.gui.view import View
from app.words import tr


class Jump(QObject):
    """Wires the panel's rows to sheet and tables."""

    told = Signal(str)

    def __init__(
        self,
        document: Document,
        view: View,
        sheet: SheetView,
        panel: FindingsPanel,
        tables: TablesPane,
        parent: QObject | None = None,
    ) -> None:
        super().__init__(parent)
        self._document = document
        self._view = view
        self._sheet = sheet
        self._panel = panel
        self._tables = tables
        self._last: Row | None = None  # the finding one came from
        panel.row_chosen.connect(self.on_chosen)
        panel.row_entered.connect(self.to_cell)

    def on_chosen(self, row: Row) -> None:
        """Zoom or pan so far that all of what the finding is about is seen."""
        between = frozenset(self._sheet.drawing.joints_beside(row.companions))
        self._sheet.bring_into_view(row.segments, row.joints | between)

    def to_cell(self, row: Row) -> None:
        """The cell that would be changed, with the keyboard in it."""
        cell = cell_of_finding(row.about, self._document.project) if row.about is not None else None
        if cell is None:
            self.told.emit(tr("there is no cell to change for this"))
            return
        self._last = row
        self._tables.show_cell(cell)

    def there_and_back(self) -> None:
        """From a finding to its cell; from anywhere else to the finding one came from, or to the first."""
        focus = QApplication.focusWidget()
        if isinstance(focus, FindingRow) and focus.row is not None:
            self.to_cell(focus.row)
            return
        rows = [
            widget for widget in self._panel.rows if widget.row is not None and widget.row.leads_somewhere
        ]
        about = self._last.about if self._last is not None else None
        came_from = next((w for w in rows if w.row is not None and w.row.about == about), None)
        target = came_from or next(iter(rows), None)
        if target is not None:
            self._tables.commit_open_editor()
            target.setFocus(Qt.FocusReason.ShortcutFocusReason)
            self._panel.ensureWidgetVisible(target)

    def only_selected(self) -> None:
        """List only the findings of what is selected."""
        project, selection = self._document.project, self._view.selection
        marks = [segment.mark for i, segment in enumerate(project.segments) if i in selection.segments]
        marks += [joint.mark for i, joint in enumerate(project.joints) if i in selection.joints]
        marks += [of.segment.mark for i, of in enumerate(beside(project)) if i in selection.companions]
        if marks:
            self._panel.filter.ask_for_marks(marks)
        else:
            self.told.emit(tr("select segments or joints first, to see their findings"))
