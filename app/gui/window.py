"""The window: makes the rooms, puts them in their places and wires them; they do not know each other."""

from __future__ import annotations

from collections.abc import Callable
from pathlib import Path

from msgspec.structs import replace
from PySide6.QtCore import QEvent, Qt
from PySide6.QtGui import QCloseEvent, QDragEnterEvent, QDropEvent
from PySide6.QtWidgets import QMainWindow

from app.gui.actions import (
    COLUMNS,
    DRAWING,
    LANGUAGE,
    RECENT,
    SAMPLES,
    STRIPS,
    TYPICAL,
    fill_menus,
    make_actions,
)
from app.gui.against import AgainstBar
from app.gui.comparing import Comparing
from app.gui.document import Document
from app.gui.drawing_menu import DrawingMenu
from app.gui.file_menus import RecentMenu, SamplesMenu
from app.gui.files import Files
from app.gui.findings.curing import Curing
from app.gui.findings.fit_offer import FitOffer
from app.gui.findings.jump import Jump
from app.gui.findings.panel import FindingsPanel
from app.gui.hand.grasp import Grasp
from app.gui.hand.hand import Hand
from app.gui.hand.in_place import InPlace
from app.gui.hand.placing import Placing
from app.gui.hand.selecting import Selecting
from app.gui.hand.shaping import Shaping
from app.gui.hand.sheet_menu import SheetMenu
from app.gui.hand.sheet_sweeps import SheetSweeps
from app.gui.hand.symbol_strip import SymbolStrip
from app.gui.hand.taking_off import TakingOff
from app.gui.help import Help
from app.gui.language_menu import LanguageMenu
from app.gui.member_edits import MemberEdits
from app.gui.outcome import shown_states
from app.gui.panes import Panes
from app.gui.printing import Printing
from app.gui.recovery import Recovery
from app.gui.settings import Settings
from app.gui.sheet_view import SheetView
from app.gui.sheet_voice import SheetVoice
from app.gui.show import Showing
from app.gui.status_line import StatusLine
from app.gui.strips.hand import StripHand
from app.gui.strips.menu import StripMenu, StripsMenu
from app.gui.strips.taking import StripTaking
from app.gui.style import style_sheet
from app.gui.tables.pane import TablesPane
from app.gui.tables.shown_columns import ColumnsMenu
from app.gui.theme import theme_for
from app.gui.title_block import TitleBlockDialog
from app.gui.top_bar import TopBar
from app.gui.typical_menu import TypicalMenu
from app.gui.view import View
from app.words import tr
from solver.model import Orientation, Project, UnitSystemName


class Window(QMainWindow):
    """One project in one window."""

    def __init__(
        self, project: Project, store: Settings, recovery_folder: Path, path: Path | None = None
    ) -> None:
        super().__init__()
        self.setAttribute(Qt.WidgetAttribute.WA_DeleteOnClose)
        self.setAcceptDrops(True)
        self.store = store
        self.document = Document(project, path, parent=self)
        self.view = View(self)
        self._theme = theme_for(self.palette())
        self._make_rooms(recovery_folder)
        self._make_commands()
        self._wire()
        self._restore()
        self._dress()
        self.on_document_changed()
        self.showing.begin()
        self.tables.views["segments"].setFocus()

    def _make_rooms(self, recovery_folder: Path) -> None:
        self.sheet = SheetView(self.view)
        self.findings = FindingsPanel(self.view)
        self.tables = TablesPane(self.document, self.view, self._theme)
        self.status = StatusLine()
        self.showing = Showing(self.document, self.view, self.sheet, self.findings, self.tables, self.status)
        self.voice = SheetVoice(self.sheet, self.findings, self.showing, self.document, self.view)
        commit = self.tables.commit_open_editor
        self.files = Files(self, self.document, self.store, commit)
        self.printing = Printing(self, self.document, self.store, commit)
        self.against = AgainstBar()
        self.comparing = Comparing(self.document, self.showing, self.against, commit, self)
        self.in_place = InPlace(self.document, self.view, self.sheet, self.tables, self)
        self.taking = StripTaking(self, self.sheet, self.view, self.showing, self.store)
        self.jump = Jump(self.document, self.view, self.sheet, self.findings, self.tables, self)
        self.curing = Curing(self.document, self.showing, self.findings, commit, self)
        self.sweeps = SheetSweeps(self.sheet, self.tables, self.in_place)
        self.symbols = SymbolStrip()
        self.taking_off = TakingOff(self.document, self.view, self.sheet, self.tables, self)
        self.placing = Placing(
            self.document, self.view, self.sheet, self.tables, self.in_place, self.taking_off, self
        )
        self.shaping = Shaping(self.document, self.view, self.sheet, self.tables, self)
        self.selecting = Selecting(self.view, self.sheet, self)
        self.edits = MemberEdits(self.document, self.tables, self)
        self.fit_offer = FitOffer(self.document)
        self.fit_offer.clicked.connect(lambda _on=False: self.edits.fit_companions())
        self.findings.add_offer(self.fit_offer)
        grasp = Grasp(self.document, self.view, self.sheet, self._edited_case, commit, self)
        self.hand = Hand(grasp, self.view, self)
        self.recovery = Recovery(self.document, recovery_folder, self)
        self.help = Help(self)

    def _make_commands(self) -> None:
        self.actions_by_key = make_actions(
            self, {key: self._begun(act) for key, act in self._handlers().items()}
        )
        self.recent_menu = RecentMenu(self.store, self.files.open_path, self)
        self.samples_menu = SamplesMenu(self.files.open_sample, self)
        self.typical_menu = TypicalMenu(self.document, self.edits.add_typical, self)
        self.language_menu = LanguageMenu(self.store, self.status.tell, self)
        self.strip_menu = StripMenu(self.view, lambda: self.sheet.places.axes.upright, self.taking, self)
        self.strip_hand = StripHand(self.sheet, self.view, self.strip_menu)
        self.strips_menu = StripsMenu(self.view, self.strip_menu, self)
        menus = {
            RECENT: self.recent_menu,
            SAMPLES: self.samples_menu,
            TYPICAL: self.typical_menu,
            COLUMNS: ColumnsMenu(self.tables, self),
            LANGUAGE: self.language_menu,
            STRIPS: self.strips_menu,
            DRAWING: DrawingMenu(self.view, self),
        }
        fill_menus(self.menuBar(), self.actions_by_key, menus)
        self.top_bar = TopBar(self.actions_by_key, self.against)
        self.panes = Panes(self.top_bar, self.symbols, self.sheet, self.findings, self.tables, self.status)
        self.setCentralWidget(self.panes)
        self.sheet_menu = SheetMenu(
            self.document,
            self.view,
            self.sheet,
            self.tables,
            self.in_place,
            self.placing,
            self.taking_off,
            self.shaping,
            self.selecting,
            self.actions_by_key,
            self,
        )
        self.symbols.chosen.connect(self.placing.choose)
        self.taking_off.segments_asked.connect(self.edits.delete_segments)
        self.placing.kind_changed.connect(self.symbols.show_chosen)

    def _begun(self, act: Callable[[], None]) -> Callable[[], None]:
        """A command before which the news of the one before it go."""

        def command() -> None:
            self.status.tell("")
            act()

        return command

    def _handlers(self) -> dict[str, Callable[[], None]]:
        return {
            "new": self.files.new,
            "open": self.files.open,
            "save": self.files.save,
            "save_as": self.files.save_as,
            "title_block": lambda: TitleBlockDialog(self, self.document).open(),
            "sheet": self.printing.ask,
            "quit": lambda: self.close() and None,
            "undo": self.on_undo,
            "redo": self.on_redo,
            "copy": lambda: self.tables.blocks().copy(),
            "copy_with_headings": lambda: self.tables.blocks().copy_with_headings(),
            "paste": lambda: self.tables.blocks().paste(),
            "fill_down": lambda: self.tables.blocks().fill_down(),
            "clear": lambda: self.tables.current_view().clear_selected(),
            "copy_numbers": lambda: self.taking.copy_numbers(self.view.strips.shown),
            "save_numbers": lambda: self.taking.save_numbers(self.view.strips.shown),
            "copy_picture": self.taking.copy_picture,
            "save_picture": self.taking.save_picture,
            "delete_rows": self.edits.delete_rows,
            "insert_before": self.edits.insert_before,
            "insert_after": self.edits.insert_after,
            "move_up": self.edits.move_up,
            "move_down": self.edits.move_down,
            "delete_segments": self.edits.delete_segments,
            "fit_companions": self.edits.fit_companions,
            "split": self.edits.split,
            "join": self.edits.join,
            "split_at_cursor": self.shaping.split_at_cursor,
            "join_equal": self.shaping.join_equal,
            "repeat": self.shaping.repeat,
            "mirror": self.shaping.mirror,
            "reverse": self.edits.reverse,
            "number_joints": self.edits.number_joints,
            "choose_case": self.tables.choose_case,
            **{
                f"table_{place + 1}": lambda place=place: self.tables.open_tab(place)
                for place in range(self.tables.tabs.count())
            },
            "fit": self.sheet.fit,
            "zoom_to_selection": self.sheet.zoom_to_selection,
            "next_pane": lambda: self.panes.go_to(1),
            "previous_pane": lambda: self.panes.go_to(-1),
            "there_and_back": self.jump.there_and_back,
            "findings_of_selected": self.jump.only_selected,
            "all_findings": self.findings.filter.clear,
            "keep_reference": self.comparing.keep,
            "forget_reference": self.comparing.forget,
            "help": lambda: self.help.show_page(*self.panes.topic()),
            "keys": lambda: self.help.show_page("keys"),
            "log": self.help.show_log,
            "about": self.help.show_about,
        }

    def _wire(self) -> None:
        self.document.changed.connect(lambda _snapshot: self.on_document_changed())
        self.document.history_changed.connect(self.on_history_changed)
        self.document.modified_changed.connect(lambda _modified: self.on_file_changed())
        self.document.opened.connect(self.findings.filter.clear)
        self.document.changed.connect(lambda _snapshot: self.selecting.cancel())
        self.document.opened.connect(self.placing.put_down)
        self.document.path_changed.connect(lambda _path: self.on_file_changed())
        self.view.shown_changed.connect(lambda _shown: self._show_pickers())
        view = self.view
        picked = self.top_bar.show_picked, view.strips_changed, view.looks_changed, view.together_changed
        for signal in picked:  # what was done before is no news any more
            signal.connect(lambda _how: self.status.tell(""))
        self.view.strips_changed.connect(self.store.set_strips)
        self.view.looks_changed.connect(self.store.set_looks)
        self.view.together_changed.connect(self.store.set_together)
        self.top_bar.show_picked.connect(self.view.set_shown)
        self.top_bar.units_picked.connect(self.on_units_picked)
        self.top_bar.layout_picked.connect(self.on_layout_picked)
        rooms = self.files, self.printing, self.edits, self.recovery, self.comparing, self.taking
        at_hand = self.in_place, self.jump, self.curing, self.placing, self.taking_off, self.shaping
        for room in (*rooms, *at_hand, self.hand):
            room.told.connect(self.status.tell)
        self.tables.noted.connect(self.status.tell)
        self.edits.inserted.connect(self.in_place.open_inserted)
        self.tables.rows_moved.connect(self.edits.move_before)

    def _edited_case(self) -> str | None:
        """The load case whose loads are edited, by name."""
        case = self.tables.sight.load_case(self.document.project)
        return None if case is None else case.name

    # The document

    def on_document_changed(self) -> None:
        """Pickers, sheet and title follow."""
        self._show_pickers()
        self.sheet.set_orientation(self.document.project.display.layout)
        self.status.tell("")
        self.on_history_changed()
        self.on_file_changed()

    def _show_pickers(self) -> None:
        project = self.document.shown_project
        states = shown_states(project)
        if self.view.shown in states:  # else it is about to follow
            self.top_bar.show_project(project, states, self.view.shown)

    def on_history_changed(self) -> None:
        """Undo and redo say what they would do."""
        for key, plain, named, name in (
            ("undo", tr("&Undo"), tr("&Undo {name}"), self.document.undo_name),
            ("redo", tr("&Redo"), tr("&Redo {name}"), self.document.redo_name),
        ):
            action = self.actions_by_key[key]
            action.setEnabled(name is not None)
            action.setText(plain if name is None else named.format(name=name.replace("&", "&&")))

    def on_file_changed(self) -> None:
        """Title and status say which file, and whether it has changed."""
        path, modified = self.document.path, self.document.modified
        name = self.files.name
        self.setWindowTitle(f"{name}[*] – Barwright")
        self.setWindowModified(modified)
        self.setWindowFilePath(str(path) if path else "")
        self.status.name_file(tr("{name}, changed").format(name=name) if modified else name)

    def on_undo(self) -> None:
        """Back one step; what is in the hand or in an open editor is the step taken back first."""
        if self.hand.cancel() or self.shaping.cancel():
            return
        self.tables.commit_open_editor()
        self.document.undo()

    def on_redo(self) -> None:
        """Forward one step."""
        self.tables.commit_open_editor()
        self.document.redo()

    def on_units_picked(self, system: UnitSystemName) -> None:
        """Another unit system, as an undo step of the project."""
        self.tables.commit_open_editor()
        project = self.document.project
        self.store.set_units(system)
        if system != project.display.unit_system:
            display = replace(project.display, units=system)
            self.document.commit(replace(project, display=display), tr("Units"))

    def on_layout_picked(self, layout: Orientation) -> None:
        """Across or upright, as an undo step of the project."""
        self.tables.commit_open_editor()
        project = self.document.project
        if layout != project.display.layout:
            display = replace(project.display, orientation=layout)
            self.document.commit(replace(project, display=display), tr("Lay"))

    # Window

    def _restore(self) -> None:
        self.resize(1280, 800)
        if not self.restoreGeometry(self.store.bytes_of("geometry")):
            self.resize(1280, 800)
        self.panes.restore(self.store)
        self.view.set_strips(self.store.strips)
        self.view.set_looks(self.store.looks)
        self.view.set_together(self.store.together)

    def _remember(self) -> None:
        self.store.set_bytes("geometry", self.saveGeometry())
        self.panes.remember(self.store)
        self.store.sync()

    def closeEvent(self, event: QCloseEvent) -> None:
        """Ask about unsaved changes, then end cleanly, also while the solver runs."""
        if self._may_close():
            self._remember()
            self.hand.close()
            self.showing.close()
            self.curing.close()
            self.printing.close()
            self.recovery.close()
            event.accept()
        else:
            event.ignore()
            self.files.when_safe(self._close_now)

    _closing = False

    def _may_close(self) -> bool:
        self.hand.cancel()
        self.tables.commit_open_editor()
        return self._closing or not self.document.modified

    def _close_now(self) -> None:
        self._closing = True
        self.close()

    def dragEnterEvent(self, event: QDragEnterEvent) -> None:
        """A file may be dropped."""
        if any(url.isLocalFile() for url in event.mimeData().urls()):
            event.acceptProposedAction()

    def dropEvent(self, event: QDropEvent) -> None:
        """Open the first file dropped."""
        local = [url.toLocalFile() for url in event.mimeData().urls() if url.isLocalFile()]
        if local:
            event.acceptProposedAction()
            self.files.open_path(Path(local[0]))

    def _dress(self) -> None:
        """Colours from the theme."""
        style = style_sheet(self._theme)
        self.menuBar().setStyleSheet(style)
        self.panes.dress(style)

    def changeEvent(self, event: QEvent) -> None:
        """Follow the system between light and dark, and its font, which style sheets hold fast."""
        super().changeEvent(event)
        if event.type() == QEvent.Type.FontChange and hasattr(self, "panes"):
            self._dress()
        if event.type() == QEvent.Type.PaletteChange and hasattr(self, "status"):
            theme = theme_for(self.palette())
            if theme != self._theme:
                self._theme = theme
                self.tables.set_theme(theme)
                self._dress()
