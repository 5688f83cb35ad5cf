"""The tables below the sheet, behind tabs, with the picker of the load case whose loads they edit."""

from __future__ import annotations

from PySide6.QtCore import QSignalBlocker, Qt, Signal
from PySide6.QtWidgets import QHBoxLayout, QLabel, QVBoxLayout, QWidget

from app.gui.choice import Choice
from app.gui.document import Document, Snapshot
from app.gui.hand.sweeper import Sweeper
from app.gui.settings import Settings
from app.gui.tables.blocks import Blocks
from app.gui.tables.cell_sweeps import CellSweeps
from app.gui.tables.column import Figures, Sight, Table
from app.gui.tables.hidden_line import HiddenLine
from app.gui.tables.model import TableModel
from app.gui.tables.pages import PLACES, TABLES, Pages
from app.gui.tables.view import TableView
from app.gui.theme import Theme
from app.gui.view import Selection, View
from app.hand.cells import Cell
from app.words import tr

SELECTED = ("segments", "joints", "companions")  # tables whose rows are what the view has selected


class TablesPane(QWidget):
    """All tables of one document; their selection is the view's."""

    noted = Signal(str)
    rows_moved = Signal(int)  # the chosen segments were dragged before the one at this place
    committing = Signal()  # whoever types into a cell elsewhere takes in what it holds
    current_table_changed = Signal()

    def __init__(self, document: Document, view: View, theme: Theme, parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self.setObjectName("tables")
        self.setAttribute(Qt.WidgetAttribute.WA_StyledBackground)
        self._document = document
        self._view = view
        self._theme = theme
        self._store: Settings | None = None
        self.sweeper = Sweeper(document, self)
        self.sweeper.told.connect(self.noted)
        self._sight = Sight(document.project.display.unit_system, 0 if document.project.load_cases else None)
        self._following = False
        self.case_picker = Choice()
        self.models = {table.key: self._make_model(table) for table in TABLES}
        self.views = Pages(self._make_view)
        self.tabs = self.views.tabs
        self.hidden_line = HiddenLine(self.views.in_front)
        self._lay_out()
        self.on_document_changed(document.snapshot)
        document.changed.connect(self.on_document_changed)
        self.models["load_cases"].added.connect(self.on_case_added)
        self.case_picker.activated.connect(self.on_case_picked)
        self.case_picker.left.connect(lambda: self.current_view().setFocus())
        view.selection_changed.connect(self.on_selection_changed)
        self.views.in_front()
        self.tabs.currentChanged.connect(lambda _index: self.current_table_changed.emit())
        self.current_table_changed.connect(self.hidden_line.look_soon)

    def _make_model(self, table: Table) -> TableModel:
        model = TableModel(table, self._document, self._sight, self)
        model.noted.connect(self.noted)
        return model

    def _make_view(self, table: Table) -> TableView:
        view = TableView(self.models[table.key], self._theme)
        view.columns_shown.connect(self.hidden_line.look_soon)
        CellSweeps(view, self.sweeper)
        if view.grips is not None:
            view.grips.moved.connect(self.rows_moved)
        if self._store is not None:
            view.columns_choice.restore(self._store.columns(table.key))
        if table.key in SELECTED:
            view.choose_records(getattr(self._view.selection, table.key))
            view.record_chosen.connect(self.on_record_chosen)
        return view

    def _lay_out(self) -> None:
        label = QLabel(tr("Edit loads of"))
        label.setBuddy(self.case_picker)
        self.case_picker.setAccessibleName(tr("Edit loads of"))
        self.case_picker.setMinimumContentsLength(14)
        corner = QWidget()
        corner.setObjectName("corner")
        row = QHBoxLayout(corner)
        row.setContentsMargins(0, 2, 12, 2)
        row.addWidget(label)
        row.addWidget(self.case_picker)
        self.tabs.setCornerWidget(corner)
        whole = QVBoxLayout(self)
        whole.setContentsMargins(0, 0, 0, 0)
        whole.setSpacing(0)
        whole.addWidget(self.tabs)
        whole.addWidget(self.hidden_line)

    def restore(self, store: Settings) -> None:
        """The columns chosen last time, for the tables that are not made yet as well."""
        self._store = store
        for key, view in self.views.made.items():
            view.columns_choice.restore(store.columns(key))

    def remember(self, store: Settings) -> None:
        """Keep the choice of columns for the next time."""
        for key, view in self.views.made.items():
            store.set_columns(key, view.columns_choice.turned)

    # What is shown

    @property
    def document(self) -> Document:
        """What the tables show."""
        return self._document

    @property
    def sight(self) -> Sight:
        """Units and edited case."""
        return self._sight

    def current_view(self) -> TableView:
        """The table of the tab in front that has or last had the keyboard, else its first."""
        shown, last = self.views.in_front(), self.tabs.currentWidget().focusWidget()
        return next((view for view in shown if view is last or view.isAncestorOf(last)), shown[0])

    def blocks(self) -> Blocks:
        """The commands on the chosen block of that table."""
        return self.current_view().blocks

    def open_tab(self, place: int) -> None:
        """Bring a tab to the front and give its table the keyboard, its next one if a table there has it."""
        self.commit_open_editor()
        had_it = self.tabs.currentIndex() == place and self.current_view().hasFocus()
        self.tabs.setCurrentIndex(place)
        shown, last = self.views.in_front(), self.current_view()
        chosen = shown[(shown.index(last) + 1) % len(shown)] if had_it else last
        chosen.setFocus(Qt.FocusReason.ShortcutFocusReason)

    def choose_case(self) -> None:
        """Give the keyboard to the picker of the edited case; Enter gives it back."""
        self.commit_open_editor()
        self.case_picker.setFocus(Qt.FocusReason.ShortcutFocusReason)

    def show_record(self, key: str, record: int) -> None:
        """Bring a record's row to the front, with the keyboard in it."""
        self.tabs.setCurrentIndex(PLACES[key])
        view = self.views[key]
        view.choose_record(record)
        view.setFocus()

    def show_cell(self, cell: Cell) -> None:
        """Bring one cell to the front, with the keyboard in it; a hidden column is shown for it."""
        self.show_record(cell.table, cell.record)
        view = self.views[cell.table]
        view.columns_choice.reveal(cell.column)
        model = view.table_model
        place = next((i for i, column in enumerate(model.columns) if column.key == cell.column), None)
        if place is not None:
            view.setCurrentIndex(model.index(model.row_of(cell.record), place))

    def on_document_changed(self, snapshot: Snapshot) -> None:
        """The picker lists the cases of now; the edited case is kept by its name."""
        names = [case.name for case in snapshot.project.load_cases]
        kept = self.case_picker.currentText()
        place = (
            names.index(kept)
            if kept in names
            else min(max(self.case_picker.currentIndex(), 0), len(names) - 1)
        )
        with QSignalBlocker(self.case_picker):
            self.case_picker.clear()
            self.case_picker.addItems(names or [tr("no load case yet")])
            self.case_picker.setCurrentIndex(max(place, 0))
        self.case_picker.setEnabled(bool(names))
        self._set_sight(Sight(snapshot.project.display.unit_system, place if names else None))

    def on_case_picked(self, index: int) -> None:
        """Edit the loads of another case; what is being typed belongs to the one before."""
        self.commit_open_editor()
        self._set_sight(Sight(self._sight.system, index))

    def on_case_added(self, case: int) -> None:
        """The loads typed next are those of the case just made."""
        with QSignalBlocker(self.case_picker):
            self.case_picker.setCurrentIndex(case)
        self._set_sight(Sight(self._sight.system, case))
        self.noted.emit(
            tr("The tables now edit the loads of {case}").format(case=self.case_picker.currentText())
        )

    def _set_sight(self, sight: Sight) -> None:
        self._sight = sight
        for model in self.models.values():
            model.set_sight(sight)
        for view in self.views.made.values():
            view.columns_choice.follow_entries()
            view.widths.widen_if_needed()
        self.hidden_line.look_soon()

    def set_figures(self, figures: Figures) -> None:
        """Show results in the columns that have them."""
        for model in self.models.values():
            model.set_figures(figures)
        for view in self.views.made.values():
            view.widths.widen_for_figures()

    def set_theme(self, theme: Theme) -> None:
        """Take over the colours."""
        self._theme = theme
        for view in self.views.made.values():
            view.set_theme(theme)

    def commit_open_editor(self) -> None:
        """Take in what an open editor holds, and a number that is run up and down."""
        self.sweeper.commit()
        for view in self.views.made.values():
            view.commit_open_editor()
        self.committing.emit()

    # Selection

    def on_record_chosen(self, records: frozenset[int]) -> None:
        """The rows chosen in the tables are what the view has selected."""
        if self._following:
            return
        key = next(key for key in SELECTED if self.views.made.get(key) is self.sender())
        self._view.set_selection(Selection(**{key: records}))

    def on_selection_changed(self, selection: Selection) -> None:
        """Light what is selected elsewhere, and choose its rows, as commands work on the rows chosen."""
        self._following = True  # the rows chosen here are no choice of a person's
        for key in SELECTED:
            records = getattr(selection, key)
            self.models[key].set_lit(records)
            if key in self.views.made and selection != Selection():  # a click on paper chooses nothing
                self.views[key].choose_records(records)
        self._following = False
