"""The exact value: a small field at the readout, opened by the first digit typed while or after a pull.

It takes the very number that is in the hand, not a cell of a table: with the total kept, one end of a taper,
or a load under a factor there is no cell that means the same. What cannot be read stays, with its reason.
"""

from __future__ import annotations

from PySide6.QtCore import QPointF, QSize, Qt, Signal
from PySide6.QtGui import QFocusEvent, QKeyEvent
from PySide6.QtWidgets import QLineEdit, QWidget

from app.gui.hand.leaving import keyboard_is_gone
from app.words import tr

DIGITS = "0123456789.,+-−(⌀"


def begins_entry(text: str) -> bool:
    """Whether a typed text begins a number."""
    return len(text) == 1 and text in DIGITS


class ExactEntry(QLineEdit):
    """Hidden until opened. Enter takes the text in, Escape gives it up, leaving the field does the former."""

    typed = Signal(str)
    taken = Signal()
    given_up = Signal()
    left = Signal()

    def __init__(self, parent: QWidget) -> None:
        super().__init__(parent)
        self.setObjectName("exact_entry")
        self.setAccessibleName(tr("Exact value"))
        self.textEdited.connect(self.typed)
        self.hide()

    def open_at(self, near: QPointF, text: str) -> None:
        """Show the field beside a point, with the text typed so far."""
        self.setText(text)
        size = QSize(12 * self.fontMetrics().averageCharWidth() + 16, self.sizeHint().height())
        self.resize(size)
        room = self.parentWidget().rect()
        left = min(max(near.x() + 18.0, 0.0), room.width() - size.width())
        top = min(max(near.y() - size.height(), 0.0), room.height() - size.height())
        self.move(round(left), round(top))
        self.show()
        self.setFocus(Qt.FocusReason.OtherFocusReason)
        self.end(False)
        self.typed.emit(text)

    def keyPressEvent(self, event: QKeyEvent) -> None:
        """Enter and Escape end the entry; all else is typing."""
        if event.key() in (Qt.Key.Key_Return, Qt.Key.Key_Enter):
            self.taken.emit()
        elif event.key() == Qt.Key.Key_Escape:
            self.given_up.emit()
        else:
            super().keyPressEvent(event)

    def focusOutEvent(self, event: QFocusEvent) -> None:
        """Leaving the field takes its text in, but a menu or another window does not."""
        super().focusOutEvent(event)
        if keyboard_is_gone(event):
            self.left.emit()
