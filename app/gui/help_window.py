"""Help beside the work: a list of pages, one page, a way back, and a search through all of them."""

from __future__ import annotations

from PySide6.QtCore import QEvent, QSize, Qt
from PySide6.QtGui import QKeySequence, QPalette, QShortcut, QTextDocument
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
from app.gui.theme import colour, theme_for
from app.help.pages import PAGES
from app.words import tr

SIZE = (1020, 700)


class HelpWindow(QDialog):
    """Not modal: the work goes on beside it. Escape closes it; it is kept for the next time."""

    def __init__(self, parent: QWidget | None = None) -> None:
        super().__init__(parent, Qt.WindowType.Window)
        self.setWindowTitle(tr("Help"))
        self._way: list[tuple[str, int]] = []  # pages gone through, with where they were scrolled to
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
        self.search.textEdited.connect(lambda _text: self.told.clear())
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

    def on_find(self) -> None:
        """The next place on this page, then on the pages after it, then from the top of this one."""
        text = self.search.text().strip()
        if not text or self.page.find(text):
            self.told.clear()
            return
        pages = [page for page, _title in PAGES]
        here = pages.index(self.page.page)
        for page in (*pages[here + 1 :], *pages[: here + 1]):
            if self._find_on(page, text):
                self.told.clear()
                return
        self.told.setText(tr("“{text}” is nowhere in the help").format(text=text))

    def _find_on(self, page: str, text: str) -> bool:
        """Go to a page if it holds the text."""
        if page != self.page.page:
            other = QTextDocument()
            other.setMarkdown(marked(page).text)
            if other.find(text).isNull():
                return False
            self.show_page(page)
        cursor = self.page.textCursor()
        cursor.setPosition(0)
        self.page.setTextCursor(cursor)
        return self.page.find(text)
