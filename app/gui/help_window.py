"""Help beside the work: a list of pages, one page, a way back, and a search through all of them."""

from __future__ import annotations

from math import inf
from typing import NamedTuple

from PySide6.QtCore import QEvent, QSize, Qt
from PySide6.QtGui import QKeySequence, QPalette, QShortcut, QTextCursor, QTextDocument
from PySide6.QtWidgets import (
    QDialog,
    QHBoxLayout,
    QLabel,
    QLineEdit,
    QListWidget,
    QPushButton,
    QSplitter,
    QVBoxLayout,
    QWidget,
)

from app.gui.help_page import HelpPage, marked
from app.gui.help_search import Hit, hits
from app.gui.theme import colour, theme_for
from app.help.pages import PAGES
from app.words import tr

SIZE = (1020, 700)
LEAST_TYPED = 2  # letters that are looked for while more are typed


class _Began(NamedTuple):
    page: str
    begin: int  # position of the cursor or of what is selected
    scroll: int
    way: int  # how many pages Back led through


class HelpWindow(QDialog):
    """Not modal: the work goes on beside it. Escape closes it; it is kept for the next time."""

    def __init__(self, parent: QWidget | None = None) -> None:
        super().__init__(parent, Qt.WindowType.Window)
        self.setWindowTitle(tr("Help"))
        self._way: list[tuple[str, int]] = []  # pages gone through, with where they were scrolled to
        self._began: _Began | None = None  # where the reading was when what is being typed was begun
        self._others: dict[str, QTextDocument] = {}
        self.page = HelpPage()
        self.page.page_wanted.connect(self.show_page)
        self.list = self._make_list()
        self.back = QPushButton(tr("Back"))
        self.back.setAutoDefault(False)
        self.back.clicked.connect(self.on_back)
        self.search = QLineEdit()
        self.told = QLabel()
        self._set_up_search()
        self._lay_out()
        self.resize(*SIZE)
        self._dress()
        self._follow()

    def _make_list(self) -> QListWidget:
        made = QListWidget()
        made.setAccessibleName(tr("Pages"))
        made.setFrameShape(QListWidget.Shape.NoFrame)
        made.addItems([tr(title) for _page, title in PAGES])
        for row in range(made.count()):  # easy to hit
            made.item(row).setSizeHint(QSize(0, max(26, made.fontMetrics().height() + 12)))
        made.currentRowChanged.connect(self.on_row_changed)
        return made

    def _set_up_search(self) -> None:
        self.search.setPlaceholderText(tr("Find"))
        self.search.setAccessibleName(tr("Find in help"))
        self.search.setClearButtonEnabled(True)
        self.search.returnPressed.connect(self.on_find)
        self.search.textChanged.connect(self.on_typed)
        for keys, act in (
            (QKeySequence(QKeySequence.StandardKey.Find), self._go_to_search),
            (QKeySequence(Qt.KeyboardModifier.AltModifier | Qt.Key.Key_Left), self.on_back),
            (QKeySequence("F3"), self.on_find),
        ):
            QShortcut(keys, self).activated.connect(act)

    def _lay_out(self) -> None:
        top = QHBoxLayout()
        top.setContentsMargins(8, 8, 8, 0)
        for widget, share in ((self.back, 0), (self.search, 1), (self.told, 1)):
            top.addWidget(widget, share)
        parts = QSplitter()
        parts.setChildrenCollapsible(False)
        parts.addWidget(self.list)
        parts.addWidget(self.page)
        parts.setStretchFactor(1, 1)
        parts.setSizes([self._list_width(), SIZE[0]])
        rows = QVBoxLayout(self)
        rows.setContentsMargins(0, 0, 0, 0)
        rows.addLayout(top)
        rows.addWidget(parts, 1)
        self.setTabOrder(self.back, self.search)
        self.setTabOrder(self.search, self.list)
        self.setTabOrder(self.list, self.page)

    def _dress(self) -> None:
        theme, roles = theme_for(self.palette()), QPalette.ColorRole
        palette = QPalette(self.list.palette())
        for role, name in (
            (roles.Base, theme.panel),
            (roles.Text, theme.ink),
            (roles.Highlight, theme.select_fill),
            (roles.HighlightedText, theme.ink),
        ):
            palette.setColor(role, colour(name))
        self.list.setPalette(palette)

    def changeEvent(self, event: QEvent) -> None:
        """Follow the system between light and dark."""
        super().changeEvent(event)
        if event.type() == QEvent.Type.PaletteChange and hasattr(self, "told"):
            self._dress()

    def _list_width(self) -> int:
        """Room for the longest title."""
        return max(self.list.fontMetrics().horizontalAdvance(tr(title)) for _page, title in PAGES) + 28

    def done(self, result: int) -> None:
        """Closed: the keyboard goes back to where it was."""
        super().done(result)
        owner = self.parentWidget()
        if owner is not None:
            owner.window().activateWindow()

    # Going about

    def show_page(self, page: str, heading: str = "") -> None:
        """Go to a page, or to a heading of it; Back leads to what was read before."""
        if self.page.page and (page != self.page.page or heading):
            self._way.append((self.page.page, self.page.verticalScrollBar().value()))
        if page != self.page.page or not heading:
            self.page.show_page(page, heading)
        else:
            self.page.go_to(heading)
        self._follow()

    def on_back(self) -> None:
        """To the page before, where it was left."""
        if self._way:
            page, place = self._way.pop()
            self.page.show_page(page)
            self.page.verticalScrollBar().setValue(place)
            self._follow()

    def on_row_changed(self, row: int) -> None:
        """A page was chosen in the list."""
        if row >= 0 and PAGES[row][0] != self.page.page:
            self.show_page(PAGES[row][0])

    def _follow(self) -> None:
        self.back.setEnabled(bool(self._way))
        pages = [page for page, _title in PAGES]
        if self.page.page in pages:
            self.list.setCurrentRow(pages.index(self.page.page))

    # Search

    def _go_to_search(self) -> None:
        self.search.setFocus(Qt.FocusReason.ShortcutFocusReason)
        self.search.selectAll()

    def on_typed(self, text: str) -> None:
        """The first place from where the reading was when the search began; Back leads there at once."""
        self.told.clear()
        if self._began is None:
            self._began = self._here()
        del self._way[self._began.way :]
        began = self._began
        if len(text.strip()) < LEAST_TYPED or not self._find(began, began.begin):
            self._return_to(began)
        if not text:
            self._began = None
        self._follow()

    def _return_to(self, began: _Began) -> None:
        if self.page.page != began.page:
            self.page.show_page(began.page)
            self.page.verticalScrollBar().setValue(began.scroll)

    def on_find(self) -> None:
        """The next place on this page, then on the pages after it, then from the top of this one."""
        self._began = None
        if self.search.text().strip():
            here = self._here()
            self._find(here, here.begin + 1)

    def _here(self) -> _Began:
        begin = self.page.textCursor().selectionStart()
        return _Began(self.page.page, begin, self.page.verticalScrollBar().value(), len(self._way))

    def _find(self, here: _Began, begin: int) -> bool:
        words = self.search.text().split()
        for under_heading in (False, True):
            for page, first, end in self._round(here.page, begin):
                for hit in hits(self._document(page), words, under_heading=under_heading):
                    if first <= hit.begin < end:
                        self._show_hit(here, page, hit)
                        return True
        self.told.setText(tr("“{text}” is nowhere in the help").format(text=self.search.text().strip()))
        return False

    @staticmethod
    def _round(here: str, begin: int) -> list[tuple[str, int, float]]:
        """The pages in the order of the search, each with the positions between which to look."""
        pages = [page for page, _title in PAGES]
        at = pages.index(here)
        others = [(page, 0, inf) for page in (*pages[at + 1 :], *pages[:at])]
        return [(here, begin, inf), *others, (here, 0, begin)]

    def _document(self, page: str) -> QTextDocument:
        """The page that is shown, or another one's text, kept while the window is."""
        if page == self.page.page:
            return self.page.document()
        if page not in self._others:
            self._others[page] = QTextDocument(self)
            self._others[page].setMarkdown(marked(page).text)
        return self._others[page]

    def _show_hit(self, here: _Began, page: str, hit: Hit) -> None:
        self.told.clear()
        if page != here.page:
            self._way.append((here.page, here.scroll))
        if page != self.page.page:
            self.page.show_page(page)
        cursor = self.page.textCursor()
        cursor.setPosition(hit.begin)
        cursor.setPosition(hit.end, QTextCursor.MoveMode.KeepAnchor)
        self.page.setTextCursor(cursor)
        below = self.page.cursorRect().top() - self.page.viewport().height() // 2
        if below > 0:  # what follows is to be read as well
            bar = self.page.verticalScrollBar()
            bar.setValue(bar.value() + below)
        self._follow()
