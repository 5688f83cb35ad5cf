"""A picker of the top bar: values under words, of which a person picks one."""

from __future__ import annotations

from collections.abc import Sequence

from PySide6.QtCore import QSignalBlocker, QSize, Signal
from PySide6.QtWidgets import QComboBox, QWidget

from app.gui.choice import Choice


class Picker(Choice):
    """A choice among values; tells only what a person picks."""

    picked = Signal(object)

    def __init__(self, name: str, digits: int, parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self.setAccessibleName(name)
        self.setSizeAdjustPolicy(QComboBox.SizeAdjustPolicy.AdjustToMinimumContentsLengthWithIcon)
        self.setMinimumContentsLength(digits)
        self._values: list[object] = []
        self.activated.connect(lambda index: self.picked.emit(self._values[index]))

    def minimumSizeHint(self) -> QSize:
        """Where room is short the words are cut, and stand whole in the list and in the tip."""
        digits = 7 * self.fontMetrics().horizontalAdvance("0")
        return QSize(
            min(digits + self.sizeHint().height(), self.sizeHint().width()), self.sizeHint().height()
        )

    def offer(self, choices: Sequence[tuple[object, str]], chosen: object) -> None:
        """List the choices, as (value, words), with one of them chosen."""
        values = [value for value, _words in choices]
        with QSignalBlocker(self):
            if [self.itemText(i) for i in range(self.count())] != [words for _value, words in choices]:
                self.clear()
                self.addItems([words for _value, words in choices])
            self._values = values
            self.setCurrentIndex(values.index(chosen))
        self.setToolTip(self.currentText())
