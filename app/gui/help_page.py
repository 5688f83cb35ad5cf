"""One page of help on the screen: Markdown with the program's own keys, words and pictures filled in."""

from __future__ import annotations

from dataclasses import replace
from typing import Any, Final

from PySide6.QtCore import QEvent, QTimer, QUrl, Signal
from PySide6.QtGui import (
    QFocusEvent,
    QFont,
    QPalette,
    QResizeEvent,
    QTextBlock,
    QTextBlockFormat,
    QTextCharFormat,
    QTextCursor,
    QTextDocument,
    QTextFrameFormat,
)
from PySide6.QtWidgets import QApplication, QFrame, QTextBrowser, QTextEdit, QWidget

from app.gui.help_pictures import Pictures
from app.gui.help_words import fillers, keys_page
from app.gui.theme import colour, theme_for
from app.help.markup import PICTURE, Marked, filled
from app.help.pages import KEYS, PAGES, read_page
from app.words import tr

WIDEST: Final = 52  # of a line, in heights of the text
SIZES: Final = {1: 1.7, 2: 1.25, 3: 1.08}  # of headings
ABOVE: Final = {2: 1.1, 3: 0.7}  # free above them, in heights of the text
SETTLE: Final = 80  # ms after the last change of size until pictures are made anew


def marked(page: str) -> Marked:
    """A page with its marks filled in, in the language of now."""
    found = filled(keys_page() if page == KEYS else read_page(page), fillers())
    return replace(found, text=PICTURE.sub(r"\g<0>\n\n\1", found.text))  # said in words below, for everyone


class HelpPage(QTextBrowser):
    """Shows a page; links between pages are for whoever listens."""

    page_wanted = Signal(str, str)  # page, heading

    def __init__(self, parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self._page = ""
        self._marked = Marked("", {})
        self._pictures = Pictures(self)
        self._pictured = 0  # the width that the pictures were made for
        self._late = QTimer(self)
        self._late.setSingleShot(True)
        self._late.setInterval(SETTLE)
        self._late.timeout.connect(self.renew)
        self.setOpenLinks(False)
        self.setFrameStyle(QFrame.Shape.Box.value | QFrame.Shadow.Plain.value)
        self.setLineWidth(2)  # seen where the keyboard is here
        self.setLineWrapMode(QTextEdit.LineWrapMode.FixedPixelWidth)
        self.document().setDocumentMargin(16)
        self.anchorClicked.connect(self.on_link)
        self._dress()

    @property
    def page(self) -> str:
        """The page that is shown."""
        return self._page

    def show_page(self, page: str, heading: str = "") -> None:
        """Show a page from its top, or from a heading."""
        self._page = page
        self._marked = marked(page)
        self.setAccessibleName(tr(dict(PAGES)[page]))
        self._fill()
        self.go_to(heading)

    def renew(self) -> None:
        """The same page in the look and the width of now."""
        if self._page and (self._pictured != self._room() or not self._late.isActive()):
            place = self.verticalScrollBar().value()
            self._fill()
            self.verticalScrollBar().setValue(place)

    def _room(self) -> int:
        """The width of the text in pixels."""
        width = self.viewport().width() - 8
        return max(min(width, WIDEST * self.fontMetrics().height()), 200)

    def _fill(self) -> None:
        self._pictured = self._room()
        self.setLineWrapColumnOrWidth(self._pictured)
        self.document().setDefaultFont(self.font())
        self.document().clear()
        self.setMarkdown(self._marked.text)
        self._space_out()

    # How it looks

    def _dress(self) -> None:
        """The colours of a page; its frame shows where the keyboard is."""
        self._theme = theme_for(QApplication.palette())  # its own has the colours of its frame
        palette = QPalette(self.palette())
        for role, name in (
            (QPalette.ColorRole.Base, self._theme.card),
            (QPalette.ColorRole.Text, self._theme.ink),
            (QPalette.ColorRole.Link, self._theme.select),
            (QPalette.ColorRole.LinkVisited, self._theme.select),
            (QPalette.ColorRole.WindowText, self._theme.select if self.hasFocus() else self._theme.card),
        ):
            palette.setColor(role, colour(name))
        if palette != self.palette():
            self.setPalette(palette)

    def _space_out(self) -> None:
        """Air between paragraphs, sizes of headings: Markdown says neither."""
        cursor = QTextCursor(self.document())
        block = self.document().begin()
        while block.isValid():
            self._space(cursor, block)
            block = block.next()
        self._colour_links()
        self._draw_tables()

    def _space(self, cursor: QTextCursor, block: QTextBlock) -> None:
        cursor.setPosition(block.position())
        level, line = block.blockFormat().headingLevel(), self.fontMetrics().height()
        shape = QTextBlockFormat()
        shape.setTopMargin(ABOVE.get(level, 0.0) * line)
        goes_on = block.textList() is not None and block.next().textList() is not None
        shape.setBottomMargin((0.25 if goes_on else 0.6) * line)
        percent = 100.0 if _is_picture(block) else 118.0
        shape.setLineHeight(percent, QTextBlockFormat.LineHeightTypes.ProportionalHeight.value)
        cursor.mergeBlockFormat(shape)
        if level:
            _merge(cursor, _heading_text(SIZES.get(level, 1.0) * max(self.font().pointSizeF(), 1.0)))
        elif _is_picture(block.previous()):
            _merge(cursor, self._caption_text())

    def _caption_text(self) -> QTextCharFormat:
        made = QTextCharFormat()
        made.setFontPointSize(0.9 * max(self.font().pointSizeF(), 1.0))
        made.setForeground(colour(self._theme.quiet))
        return made

    def _draw_tables(self) -> None:
        for frame in self.document().rootFrame().childFrames():
            shape = frame.frameFormat()
            shape.setBorderStyle(QTextFrameFormat.BorderStyle.BorderStyle_Solid)
            shape.setBorderBrush(colour(self._theme.edge))
            shape.setTopMargin(0.3 * self.fontMetrics().height())
            shape.setBottomMargin(0.6 * self.fontMetrics().height())
            frame.setFrameFormat(shape)

    def _colour_links(self) -> None:
        """Markdown took the colour of links from the application, not from the page."""
        made = QTextCharFormat()
        made.setForeground(colour(self._theme.select))
        cursor, block = QTextCursor(self.document()), self.document().begin()
        while block.isValid():
            for place, length in _links(block):
                cursor.setPosition(place)
                cursor.setPosition(place + length, QTextCursor.MoveMode.KeepAnchor)
                cursor.mergeCharFormat(made)
            block = block.next()

    # Links

    def on_link(self, url: QUrl) -> None:
        """A link to a page, a heading, or both."""
        page = url.path().removesuffix(".md") or self._page
        self.page_wanted.emit(page, url.fragment())

    def go_to(self, heading: str) -> None:
        """To a heading of the page, to its top where there is none of that name."""
        place = self._marked.anchors.get(heading)
        self.moveCursor(QTextCursor.MoveOperation.Start)
        self.verticalScrollBar().setValue(0)
        if place is not None:
            block = self._headings()[place]
            top = self.document().documentLayout().blockBoundingRect(block).top()
            self.setTextCursor(QTextCursor(block))
            self.verticalScrollBar().setValue(round(top) - 4)

    def _headings(self) -> list[QTextBlock]:
        found, block = [], self.document().begin()
        while block.isValid():
            if block.blockFormat().headingLevel():
                found.append(block)
            block = block.next()
        return found

    # Qt's own

    def loadResource(self, kind: int, url: QUrl) -> Any:
        """A picture is made; nothing is read from anywhere."""
        if kind == QTextDocument.ResourceType.ImageResource.value and url.scheme() == "picture":
            return self._pictures.image(url.path(), self._pictured - 40)
        return None

    def resizeEvent(self, event: QResizeEvent) -> None:
        """The text follows at once, its pictures when the size has settled."""
        super().resizeEvent(event)
        if self._page and self._room() != self._pictured:
            self.setLineWrapColumnOrWidth(self._room())
            self._late.start()

    def focusInEvent(self, event: QFocusEvent) -> None:
        """The frame is seen."""
        super().focusInEvent(event)
        self._dress()

    def focusOutEvent(self, event: QFocusEvent) -> None:
        """It is not any more."""
        super().focusOutEvent(event)
        self._dress()

    def changeEvent(self, event: QEvent) -> None:
        """Follow the palette and the font."""
        super().changeEvent(event)
        if not hasattr(self, "_theme"):
            return
        before = self._theme
        self._dress()
        if event.type() == QEvent.Type.FontChange or self._theme != before:
            self._late.start(0)


def _links(block: QTextBlock) -> list[tuple[int, int]]:
    """Place and length of each link in a block."""
    fragments = [part.fragment() for part in block]
    return [(f.position(), f.length()) for f in fragments if f.charFormat().isAnchor()]


def _heading_text(size: float) -> QTextCharFormat:
    made = QTextCharFormat()
    made.setFontPointSize(size)
    made.setFontWeight(QFont.Weight.Bold)
    return made


def _merge(cursor: QTextCursor, text: QTextCharFormat) -> None:
    """Give the cursor's block the format of a text."""
    cursor.movePosition(QTextCursor.MoveOperation.StartOfBlock)
    cursor.movePosition(QTextCursor.MoveOperation.EndOfBlock, QTextCursor.MoveMode.KeepAnchor)
    cursor.mergeCharFormat(text)


def _is_picture(block: QTextBlock) -> bool:
    return "\N{OBJECT REPLACEMENT CHARACTER}" in block.text()
