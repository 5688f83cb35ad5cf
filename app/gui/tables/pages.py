"""The tabs of the tables; a tab's tables are made when they are first looked up or shown.

A dozen tables are most of what a window costs to make, and one of them is seen at first.
"""

from __future__ import annotations

from collections.abc import Callable, Iterator, Mapping

from PySide6.QtWidgets import QSplitter, QTabWidget, QVBoxLayout, QWidget

from app.gui.tables.column import Table
from app.gui.tables.combinations import COMBINATIONS
from app.gui.tables.companions import COMPANIONS
from app.gui.tables.fatigue import FATIGUE
from app.gui.tables.joints import JOINTS
from app.gui.tables.limits import DISPLACEMENT, REACTION, RELATIVE
from app.gui.tables.loads import CASES, JOINT_LOADS, SEGMENT_LOADS
from app.gui.tables.materials import MATERIALS
from app.gui.tables.segments import SEGMENTS
from app.gui.tables.stability_limits import STABILITY
from app.gui.tables.view import TableView
from app.words import later, tr

# Each tab with the tables that stand in it side by side, and their shares of its width
TABS: tuple[tuple[str, tuple[tuple[Table, int], ...]], ...] = (
    (later("Segments"), ((SEGMENTS, 1),)),
    (later("Joints"), ((JOINTS, 1),)),
    (later("Loads"), ((CASES, 30), (SEGMENT_LOADS, 66), (JOINT_LOADS, 34))),
    (later("Combinations"), ((COMBINATIONS, 70), (FATIGUE, 30))),
    (later("Materials"), ((MATERIALS, 1),)),
    (later("Limits"), ((DISPLACEMENT, 27), (RELATIVE, 36), (REACTION, 27), (STABILITY, 40))),
    (later("Companions"), ((COMPANIONS, 1),)),
)
PLACES = {table.key: place for place, (_title, tables) in enumerate(TABS) for table, _share in tables}
TABLES = tuple(table for _title, tables in TABS for table, _share in tables)


class Pages(Mapping[str, TableView]):
    """The tables on the screen by their keys, those not seen yet included."""

    def __init__(self, make: Callable[[Table], TableView]) -> None:
        self._make = make
        self.made: dict[str, TableView] = {}
        self.tabs = QTabWidget()
        self.tabs.setDocumentMode(True)
        self.tabs.tabBar().setDrawBase(False)
        self.tabs.setAccessibleName(tr("Tables"))
        for title, _tables in TABS:
            page = QWidget()
            QVBoxLayout(page).setContentsMargins(0, 0, 0, 0)
            self.tabs.addTab(page, tr(title))
        self.tabs.currentChanged.connect(self._fill)

    def __getitem__(self, key: str) -> TableView:
        self._fill(PLACES[key])
        return self.made[key]

    def __iter__(self) -> Iterator[str]:
        return iter(PLACES)

    def __len__(self) -> int:
        return len(PLACES)

    def in_front(self) -> list[TableView]:
        """The tables of the tab in front."""
        place = self.tabs.currentIndex()
        return [self[key] for key, where in PLACES.items() if where == place]

    def _fill(self, place: int) -> None:
        """Make a tab's tables, with their stop of the Tab key where those of the other tabs have it."""
        tables = TABS[place][1]
        if tables[0][0].key in self.made:
            return
        shown = [self._make(table) for table, _share in tables]
        self.made |= {view.table_model.table.key: view for view in shown}
        page = self.tabs.widget(place)
        content = _side_by_side(shown, [share for _table, share in tables])
        page.layout().addWidget(content)
        content.show()  # Qt would show it only in the next turn of its loop
        page.layout().activate()
        for before, view in zip((self.tabs.tabBar(), *shown), shown, strict=False):
            QWidget.setTabOrder(before, view)
        page.setFocusProxy(shown[0])  # moves on the keyboard if the empty page was given it


def _side_by_side(shown: list[TableView], shares: list[int]) -> QWidget:
    if len(shown) == 1:
        return shown[0]
    splitter = QSplitter()
    splitter.setChildrenCollapsible(False)
    for place, (view, share) in enumerate(zip(shown, shares, strict=True)):
        splitter.addWidget(view)
        splitter.setStretchFactor(place, share)
    splitter.setSizes([share * 12 for share in shares])
    return splitter
