"""The status line: what the solver does, the numerical error, a command's news, file, whether changed."""

from __future__ import annotations

from PySide6.QtCore import QEvent, QSize, Qt
from PySide6.QtGui import QAccessible, QAccessibleEvent, QPainter, QPaintEvent, QResizeEvent
from PySide6.QtWidgets import QHBoxLayout, QLabel, QSizePolicy, QStyle, QStyleOption, QWidget

from app.words import tr

LEAST_WIDTH = 40
ROOM_STEP = 32  # px
FILE_SHARE = 0.25  # of the line, at most, is kept for the file's name
NEWS_SHARE = 0.7  # of the line, at most


class StatusLine(QWidget):
    """Three texts: the solver's, the news, the file's."""

    def __init__(self, parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self.setObjectName("status_line")
        self.setAttribute(Qt.WidgetAttribute.WA_OpaquePaintEvent)  # what lies under it is not painted with it
        self.setMinimumWidth(1)  # however long the news, the window can be made smaller
        self.solver = self._label(tr("Solver"))
        self.news = self._label(tr("News"))
        self.file = self._label(tr("File"))
        self.file.setObjectName("quiet")
        row = QHBoxLayout(self)
        row.setContentsMargins(14, 3, 14, 3)
        row.setSpacing(24)
        row.addWidget(self.solver)
        row.addWidget(self.news, 1)
        row.addWidget(self.file)

    def _label(self, name: str) -> QLabel:
        label = ElidedLabel()
        label.setAccessibleDescription(name)
        return label

    def tell(self, text: str) -> None:
        """News of a command, until the next; where the line is short, the solver's text gives way to them."""
        self.news.setText(text)
        self._give_room()
        QAccessible.updateAccessibility(QAccessibleEvent(self.news, QAccessible.Event.NameChanged))

    def name_file(self, text: str) -> None:
        """The file's name and whether it has changed; it keeps its room beside any news."""
        self.file.setText(text)
        self._give_room()

    def _give_room(self) -> None:
        kept = self._keep(self.file, int(FILE_SHARE * self.width()))
        around = self.layout().contentsMargins()
        used = around.left() + around.right() + 2 * self.layout().spacing() + LEAST_WIDTH + kept
        self._keep(self.news, min(int(NEWS_SHARE * self.width()), self.width() - used))

    @staticmethod
    def _keep(label: QLabel, most: int) -> int:
        """Give a label the room that it needs, up to so much; returns it."""
        needed = label.fontMetrics().horizontalAdvance(label.text()) + 2
        label.setMinimumWidth(max(LEAST_WIDTH, min(needed, most)))
        return label.minimumWidth()

    def paintEvent(self, _event: QPaintEvent) -> None:
        """The ground, as the style sheet has it."""
        option = QStyleOption()
        option.initFrom(self)
        self.style().drawPrimitive(QStyle.PrimitiveElement.PE_Widget, option, QPainter(self), self)

    def resizeEvent(self, event: QResizeEvent) -> None:
        """The news' room follows the width."""
        super().resizeEvent(event)
        self._give_room()


class ElidedLabel(QLabel):
    """A label that shortens its text rather than widening the window; the whole text is its tip."""

    def __init__(self, parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self._whole = ""
        self._room = 0
        self.setTextFormat(Qt.TextFormat.PlainText)
        self.setSizePolicy(QSizePolicy.Policy.Preferred, QSizePolicy.Policy.Fixed)
        self.setMinimumWidth(LEAST_WIDTH)

    def setText(self, text: str) -> None:
        """Show a text."""
        if text != self._whole:
            self._whole = text
            self.setToolTip(text)
            self.setAccessibleName(text)
            self._ask_for_room()
            self.update()

    def text(self) -> str:
        """The whole text."""
        return self._whole

    def _ask_for_room(self) -> None:
        """What the text needs, in steps, so that a figure that changes does not lay the window out anew."""
        needed = self.fontMetrics().horizontalAdvance(self._whole) + 2
        room = ROOM_STEP * -(-needed // ROOM_STEP)
        if room != self._room:
            self._room = room
            self.updateGeometry()

    def sizeHint(self) -> QSize:
        """Room for the text in a line."""
        return QSize(self._room, self.fontMetrics().height())

    def minimumSizeHint(self) -> QSize:
        """Any width, since the text can be shortened."""
        return QSize(0, self.fontMetrics().height())

    def changeEvent(self, event: QEvent) -> None:
        """Follow the font."""
        super().changeEvent(event)
        if event.type() == QEvent.Type.FontChange:
            self._ask_for_room()

    def paintEvent(self, _event: QPaintEvent) -> None:
        """The text, with an ellipsis where it does not fit."""
        painter = QPainter(self)
        painter.setPen(self.palette().color(self.foregroundRole()))
        shown = self.fontMetrics().elidedText(self._whole, Qt.TextElideMode.ElideRight, self.width())
        painter.drawText(self.rect(), int(Qt.AlignmentFlag.AlignVCenter) | int(self.alignment()), shown)
