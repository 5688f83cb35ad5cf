"""The pictures of help, made by the window's own rooms when a page is shown, so never out of date.

They show `app.help.example` in the colours, the font and the language of the moment.
"""

from __future__ import annotations

from collections.abc import Callable
from typing import Final

from PySide6.QtCore import QRect, QSize, Qt
from PySide6.QtGui import QImage, QPalette
from PySide6.QtWidgets import QApplication, QSplitter, QWidget

from app.gui.document import Document
from app.gui.findings.panel import FindingsPanel
from app.gui.outcome import Outcome, compute, figures_of, governing
from app.gui.sheet_view import SheetView
from app.gui.style import style_sheet
from app.gui.tables.pages import PLACES
from app.gui.tables.pane import TablesPane
from app.gui.tables.view import TableView
from app.gui.theme import theme_for
from app.gui.view import Cursor, Shown, View
from app.help.example import example
from app.words import tr

NARROWEST: Final = 460  # px, below which sheet and tables cannot be read
SMALLEST: Final = 0.62  # of the size in the window, what is wider than the page
LINES: Final = 29  # height of a sheet, in lines of text
MOST: Final = 30  # pictures kept; a page has three at most


class Pictures:
    """Makes pictures by name, in the look of a widget."""

    def __init__(self, look: QWidget) -> None:
        self._look = look
        self._outcome: Outcome | None = None
        self._kept: dict[tuple[str, int, tuple[int, str, str]], QImage] = {}

    def names(self) -> frozenset[str]:
        """The pictures that there are."""
        return frozenset(self._makers())

    def image(self, name: str, width: int) -> QImage:
        """A picture at a width in pixels; KeyError where there is none of that name."""
        look = (self._palette().cacheKey(), self._look.font().toString(), tr("Help"))
        if len(self._kept) >= MOST:
            self._kept.clear()
        if (name, width, look) not in self._kept:
            self._kept[name, width, look] = self._makers()[name](max(width, NARROWEST))
        return self._kept[name, width, look]

    @staticmethod
    def _palette() -> QPalette:
        """That of the window; the page's own has the colours of a page."""
        return QApplication.palette()

    def _makers(self) -> dict[str, Callable[[int], QImage]]:
        return {
            "drawing": self._drawing,
            "sheet": self._sheet,
            "envelope": self._envelope,
            "findings": self._findings,
            "segments": lambda width: self._table("segments", width),
            "loads": self._loads,
            "combinations": lambda width: self._table("combinations", width),
        }

    def _solved(self) -> Outcome:
        """The example in the language of now, solved."""
        project = example()
        if self._outcome is None or self._outcome.project != project:
            self._outcome = compute(project, lambda: False)
        return self._outcome

    def _dressed(self, room: QWidget, size: QSize) -> None:
        """In the look of the page, laid out as if it were on the screen."""
        room.setAttribute(Qt.WidgetAttribute.WA_DontShowOnScreen)
        room.setPalette(self._palette())
        room.setFont(self._look.font())
        room.resize(size)
        room.show()

    def _line(self) -> int:
        return self._look.fontMetrics().height()

    def _view(self, outcome: Outcome) -> View:
        view = View()
        view.set_shown(governing_of(outcome))
        return view

    def _sheet_room(self, width: int, shown: Shown | None = None) -> SheetView:
        outcome = self._solved()
        view = self._view(outcome)
        if shown is not None:
            view.set_shown(shown)
        room = SheetView(view)
        self._dressed(room, QSize(width, LINES * self._line()))
        room.show_results(outcome.project, outcome.results, current=True)
        view.setParent(room)
        return room

    def _drawing(self, width: int) -> QImage:
        room = self._sheet_room(width)
        place = room.places.drawing.toAlignedRect()
        return _grabbed(room, None, QRect(0, 0, room.width(), place.bottom() + 4))

    def _sheet(self, width: int) -> QImage:
        room = self._sheet_room(width)
        view = room.findChild(View)
        if view is not None:
            view.set_cursor(Cursor(0.5))
        return _grabbed(room)

    def _envelope(self, width: int) -> QImage:
        return _grabbed(self._sheet_room(width, Shown("envelope")))

    def _findings(self, width: int) -> QImage:
        outcome = self._solved()
        room = FindingsPanel(self._view(outcome))
        room.show_findings(outcome.findings, (), current=True)
        self._dressed(room, QSize(min(width, 30 * self._line()), LINES * self._line()))
        room.grab()  # its rows find their heights
        return _grabbed(room)

    def _tables(self, width: int) -> TablesPane:
        outcome = self._solved()
        room = TablesPane(Document(outcome.project, None), self._view(outcome), theme_for(self._palette()))
        room.set_figures(figures_of(outcome.results, governing_of(outcome), current=True))
        room.setStyleSheet(style_sheet(theme_for(self._palette())))
        self._dressed(room, QSize(width, LINES * self._line()))
        for table in room.views.values():
            table.setHorizontalScrollBarPolicy(Qt.ScrollBarPolicy.ScrollBarAlwaysOff)
        return room

    def _table(self, key: str, width: int) -> QImage:
        """One table with all its rows, as wide as its columns."""
        room = self._tables(width)
        view = room.views[key]
        room.tabs.setCurrentIndex(PLACES[key])
        room.resize(max(width, view.widths.needed), room.height())
        return _narrowed(_grabbed(room, view, _used(view)), width)

    def _loads(self, width: int) -> QImage:
        """The three tables of the tab, as wide as their columns."""
        room = self._tables(width)
        views = [room.views[key] for key in ("load_cases", "segment_loads", "joint_loads")]
        room.tabs.setCurrentIndex(PLACES["load_cases"])
        page = views[0].parentWidget()
        room.resize(max(width, sum(view.widths.needed for view in views) + 12), room.height())
        if isinstance(page, QSplitter):
            page.setSizes([view.widths.needed for view in views])
        height = max(_used(view).height() for view in views)
        return _narrowed(_grabbed(room, page, QRect(0, 0, page.width(), height)), width)


def governing_of(outcome: Outcome) -> Shown:
    """The state that governs, of an outcome that has results."""
    assert outcome.results is not None  # noqa: S101 - the example can be solved
    return governing(outcome.results)


def _used(view: TableView) -> QRect:
    """The part of a table that has rows."""
    height = view.horizontalHeader().height() + sum(map(view.rowHeight, range(view.model().rowCount())))
    return QRect(0, 0, view.width(), height + 2)


def _grabbed(room: QWidget, part: QWidget | None = None, place: QRect | None = None) -> QImage:
    """What a room, or a part of it, looks like, without showing it."""
    part = part or room
    image = part.grab(place or part.rect()).toImage()
    room.hide()
    room.deleteLater()
    return image


def _narrowed(image: QImage, width: int) -> QImage:
    """No wider than `width`: made smaller as far as it can still be read, then cut."""
    ratio = image.devicePixelRatio()
    natural = image.width() / ratio
    if natural <= width:
        return image
    factor = max(width / natural, SMALLEST)
    smaller = image.scaledToWidth(round(factor * image.width()), Qt.TransformationMode.SmoothTransformation)
    smaller.setDevicePixelRatio(ratio)
    return smaller.copy(0, 0, min(smaller.width(), round(width * ratio)), smaller.height())
