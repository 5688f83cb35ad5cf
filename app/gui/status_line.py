"""The status line: what the solver does, the numerical error, a command's news, file, whether changed."""

from __future__ import annotations

from PySide6.QtCore import Qt
from PySide6.QtGui import QAccessible, QAccessibleEvent, QPainter, QPaintEvent
from PySide6.QtWidgets import QHBoxLayout, QLabel, QSizePolicy, QWidget

from app.words import tr


class StatusLine(QWidget):
    """Three texts: the solver's, the news, the file's."""

    def __init__(self, parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self.setObjectName("status_line")
        self.setAttribute(Qt.WidgetAttribute.WA_StyledBackground)
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
        """News of a command, until the next."""
        self.news.setText(text)
        QAccessible.updateAccessibility(QAccessibleEvent(self.news, QAccessible.Event.NameChanged))


class ElidedLabel(QLabel):
    """A label that shortens its text rather than widening the window; the whole text is its tip."""

    def __init__(self, parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self._whole = ""
        self.setTextFormat(Qt.TextFormat.PlainText)
        self.setSizePolicy(QSizePolicy.Policy.Preferred, QSizePolicy.Policy.Fixed)
        self.setMinimumWidth(40)

    def setText(self, text: str) -> None:
        """Show a text."""
        self._whole = text
        self.setToolTip(text)
        self.setAccessibleName(text)
        super().setText(text)

    def paintEvent(self, _event: QPaintEvent) -> None:
        """The text, with an ellipsis where it does not fit."""
        painter = QPainter(self)
        painter.setPen(self.palette().color(self.foregroundRole()))
        shown = self.fontMetrics().elidedText(self._whole, Qt.TextElideMode.ElideRight, self.width())
        painter.drawText(self.rect(), int(Qt.AlignmentFlag.AlignVCenter) | int(self.alignment()), shown)
