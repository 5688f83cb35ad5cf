"""Where the parts of the window lie: bars, sheet beside findings over tables; sizes kept, F6 goes round."""

from __future__ import annotations

from PySide6.QtCore import Qt
from PySide6.QtWidgets import QApplication, QHBoxLayout, QSplitter, QVBoxLayout, QWidget

from app.gui.findings.panel import FindingsPanel
from app.gui.hand.symbol_strip import SymbolStrip
from app.gui.settings import Settings
from app.gui.sheet_view import SheetView
from app.gui.status_line import StatusLine
from app.gui.tables.pane import TablesPane
from app.gui.top_bar import TopBar
from app.gui.whole_rows import WholeRows

_TABLES = ("entering", "")
_TABLE_TOPICS = {
    "joints": ("loads", "supports"),
    "load_cases": ("loads", "cases"),
    "segment_loads": ("loads", "cases"),
    "joint_loads": ("loads", "cases"),
    "combinations": ("loads", "combinations"),
    "companions": ("loads", "companions"),
    "materials": ("entering", "materials"),
    **dict.fromkeys(
        ("limits displacement", "limits relative", "limits reaction", "limits stability"), ("loads", "limits")
    ),
}


class Panes(QWidget):
    """The middle of the window."""

    def __init__(
        self,
        top_bar: TopBar,
        symbols: SymbolStrip,
        sheet: SheetView,
        findings: FindingsPanel,
        tables: TablesPane,
        status: StatusLine,
        parent: QWidget | None = None,
    ) -> None:
        super().__init__(parent)
        self._top_bar = top_bar
        self._symbols = symbols
        self._sheet = sheet
        self._findings = findings
        self._tables = tables
        self._status = status
        self.across = QSplitter(Qt.Orientation.Horizontal)
        self.down = QSplitter(Qt.Orientation.Vertical)
        self._lay_out()
        self.whole_rows = WholeRows(self.down, tables)

    def _lay_out(self) -> None:
        self.across.addWidget(self._beside(self._symbols, self._sheet))
        self.across.addWidget(self._findings)
        self.across.setStretchFactor(0, 1)
        self.down.addWidget(self.across)
        self.down.addWidget(self._tables)
        self.down.setStretchFactor(0, 3)
        self.down.setStretchFactor(1, 2)
        for splitter in (self.across, self.down):
            splitter.setChildrenCollapsible(False)
            splitter.setHandleWidth(3)
        rows = QVBoxLayout(self)
        rows.setContentsMargins(0, 0, 0, 0)
        rows.setSpacing(0)
        for widget in (self._top_bar, self.down, self._status):
            rows.addWidget(widget)
        rows.setStretch(1, 1)

    @staticmethod
    def _beside(symbols: SymbolStrip, sheet: SheetView) -> QWidget:
        """The strip of symbols at the edge of the sheet."""
        both = QWidget()
        row = QHBoxLayout(both)
        row.setContentsMargins(0, 0, 0, 0)
        row.setSpacing(0)
        row.addWidget(symbols)
        row.addWidget(sheet, 1)
        return both

    def dress(self, style: str) -> None:
        """Colours for the window's own panels; sheet and findings follow the palette by themselves."""
        handles = (self.across.handle(1), self.down.handle(1))
        for panel in (self._top_bar, self._tables, self._status, *handles):
            panel.setStyleSheet(style)

    def restore(self, store: Settings) -> None:
        """The sizes of the last time, else the usual ones."""
        self.across.setSizes([930, 350])
        self.down.setSizes([480, 230])
        for key, splitter in (("across", self.across), ("down", self.down)):
            splitter.restoreState(store.bytes_of(key))
        self._tables.restore(store)

    def remember(self, store: Settings) -> None:
        """Keep the sizes for the next time."""
        for key, splitter in (("across", self.across), ("down", self.down)):
            store.set_bytes(key, splitter.saveState())
        self._tables.remember(store)

    def go_to(self, by: int) -> None:
        """Give the keyboard to the next pane, or to the one before."""
        panes: tuple[QWidget, ...] = (
            self._sheet,
            self._findings,
            self._tables.current_view(),
            self._top_bar.show_picker,
            self._symbols,
        )
        panes[(self._here() + by) % len(panes)].setFocus(Qt.FocusReason.ShortcutFocusReason)

    def _here(self) -> int:
        """Which pane has the keyboard, in the order of F6; −1 for none."""
        around = (self._sheet, self._findings, self._tables, self._top_bar, self._symbols)
        focus = QApplication.focusWidget()
        return next(
            (i for i, pane in enumerate(around) if focus and (pane is focus or pane.isAncestorOf(focus))), -1
        )

    def topic(self) -> tuple[str, str]:
        """The page and heading of help on the pane that has the keyboard."""
        tables = _TABLE_TOPICS.get(self._tables.current_view().table_model.table.key, _TABLES)
        return {0: ("reading", "strips"), 1: ("reading", "findings"), 2: tables}.get(self._here(), _TABLES)
