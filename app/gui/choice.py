"""A choice from a list that the mouse wheel does not change in passing.

Scrolling over the window must never edit: not the units, and not the load case that the tables write to.
"""

from __future__ import annotations

from PySide6.QtCore import Qt, Signal
from PySide6.QtGui import QKeyEvent, QPainter, QPaintEvent, QPen, QWheelEvent
from PySide6.QtWidgets import QComboBox, QWidget

from app.gui.theme import colour, theme_for


class Choice(QComboBox):
    """Takes the wheel only while it has the keyboard; Enter and Escape say that the choosing is over."""

    left = Signal()

    def __init__(self, parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self.setFocusPolicy(Qt.FocusPolicy.StrongFocus)

    def wheelEvent(self, event: QWheelEvent) -> None:
        """Leave it to what lies below."""
        if self.hasFocus():
            super().wheelEvent(event)
        else:
            event.ignore()

    def keyPressEvent(self, event: QKeyEvent) -> None:
        """Enter and Escape on the closed list mean nothing to Qt."""
        if event.key() in (Qt.Key.Key_Return, Qt.Key.Key_Enter, Qt.Key.Key_Escape):
            self.left.emit()
        else:
            super().keyPressEvent(event)

    def paintEvent(self, event: QPaintEvent) -> None:
        """A frame where the keyboard is: under a style sheet the system's own is not drawn."""
        super().paintEvent(event)
        if self.hasFocus():
            painter = QPainter(self)
            painter.setPen(QPen(colour(theme_for(self.palette()).select), 2))
            painter.drawRect(self.rect().adjusted(1, 1, -1, -1))
