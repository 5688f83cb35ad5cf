"""A small field over the sheet for the one number that a command needs; what it gives is previewed.

Enter takes it, Escape or leaving it does not: unlike a cell it holds nothing that was there before.
"""

from __future__ import annotations

from collections.abc import Callable

from PySide6.QtCore import QEvent, QObject, Qt
from PySide6.QtGui import QKeyEvent
from PySide6.QtWidgets import QFrame, QHBoxLayout, QLabel, QSpinBox, QWidget

from app.drawing.shapes import Box
from app.gui.hand.leaving import keyboard_is_gone
from app.gui.theme import theme_for


class CountPopup(QFrame):
    """Asks for a whole number; `changed` hears each one, `done` the one taken (None where none is)."""

    def __init__(
        self,
        sheet: QWidget,
        words: str,
        most: int,
        changed: Callable[[int], None],
        done: Callable[[int | None], None],
    ) -> None:
        super().__init__(sheet)
        self.setObjectName("count")
        self._done = done
        theme = theme_for(sheet.palette())
        label = QLabel(words)
        self.field = QSpinBox()
        self.field.setRange(1, most)
        self.field.setAccessibleName(words)
        label.setBuddy(self.field)
        row = QHBoxLayout(self)
        row.setContentsMargins(8, 5, 8, 5)
        row.addWidget(label)
        row.addWidget(self.field)
        self.setStyleSheet(
            f"QFrame#count {{ background: {theme.card}; border: 1px solid {theme.joint}; }}"
            f"QLabel {{ color: {theme.ink}; border: none; }}"
        )
        self.field.valueChanged.connect(changed)
        self.field.installEventFilter(self)

    def open_at(self, box: Box) -> None:
        """Above the box, inside the sheet, with the number selected."""
        size, room = self.sizeHint(), self.parentWidget().size()
        left = min(max(box.centre[0] - 0.5 * size.width(), 2.0), max(room.width() - size.width() - 2.0, 0.0))
        top = min(max(box.top - size.height() - 6.0, 2.0), max(room.height() - size.height() - 2.0, 0.0))
        self.setGeometry(round(left), round(top), size.width(), size.height())
        self.show()
        self.field.setFocus(Qt.FocusReason.OtherFocusReason)
        self.field.selectAll()

    def give_up(self) -> None:
        """Close it without a number, as what it was for is not there any more."""
        self._end(None)

    def _end(self, count: int | None) -> None:
        self.field.removeEventFilter(self)
        self.hide()
        self.deleteLater()
        self._done(count)

    def eventFilter(self, field: QObject, event: QEvent) -> bool:
        """Enter takes the number, Escape and the loss of the keyboard do not."""
        if event.type() == QEvent.Type.KeyPress and isinstance(event, QKeyEvent):
            if event.key() in (Qt.Key.Key_Return, Qt.Key.Key_Enter):
                self._end(self.field.value())
                return True
            if event.key() == Qt.Key.Key_Escape:
                self._end(None)
                return True
        if event.type() == QEvent.Type.FocusOut and keyboard_is_gone(event):
            self._end(None)
            return True
        return super().eventFilter(field, event)
