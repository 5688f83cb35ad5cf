"""Which reference is looked at, in the top bar; while one is named, the field for its name stands there."""

from __future__ import annotations

from collections.abc import Sequence

from PySide6.QtCore import Qt, Signal
from PySide6.QtGui import QKeyEvent
from PySide6.QtWidgets import QHBoxLayout, QLabel, QLineEdit, QWidget
from shiboken6 import isValid

from app.gui.picker import Picker
from app.words import tr

LONGEST = 40  # characters of a name
WIDTH = 6  # digits that picker and field have room for; the picker's tip has a longer name whole


class NameField(QLineEdit):
    """Takes a name: Enter or leaving takes it, Escape does not."""

    dropped = Signal()

    def keyPressEvent(self, event: QKeyEvent) -> None:
        """Escape leaves without a name."""
        if event.key() == Qt.Key.Key_Escape:
            self.dropped.emit()
        else:
            super().keyPressEvent(event)


class AgainstBar(QWidget):
    """Nothing until there is a reference; then a picker, and a field for as long as a name is asked."""

    picked = Signal(object)  # str or None
    named = Signal(str)
    dropped = Signal()

    def __init__(self, parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self._label = QLabel()
        self._label.setObjectName("quiet")
        self.picker = Picker(tr("Against"), WIDTH)
        self.field = NameField()
        self.field.setMaxLength(LONGEST)
        self.field.setAccessibleName(tr("Name of the reference"))
        self.field.setToolTip(tr("Enter keeps the reference under this name, Escape keeps none"))
        self.field.setFixedWidth(self.picker.sizeHint().width())
        row = QHBoxLayout(self)
        row.setContentsMargins(10, 0, 0, 0)
        row.setSpacing(4)
        for part in (self._label, self.picker, self.field):
            row.addWidget(part)
        self.picker.picked.connect(self.picked)
        self.field.editingFinished.connect(self._on_named)
        self.field.dropped.connect(self._on_dropped)
        self._asking = False
        self._came_from: QWidget | None = None
        self.show_references((), None)

    @property
    def is_asking(self) -> bool:
        """Whether a name is asked for."""
        return self._asking

    def show_references(self, names: Sequence[str], chosen: str | None) -> None:
        """Offer these, and none of them."""
        self.picker.offer([(None, tr("none")), *((name, name) for name in names)], chosen)
        self.picker.setToolTip(chosen or "")
        self._arrange()

    def ask(self, proposed: str) -> None:
        """Ask for a name, beginning with a proposed one that typing replaces."""
        if not self._asking:
            self._came_from = self.window().focusWidget()
        self._asking = True
        self.field.setText(proposed)
        self._arrange()
        self.field.setFocus(Qt.FocusReason.OtherFocusReason)
        self.field.selectAll()

    def end(self) -> None:
        """Ask no more; the keyboard goes back to where it was, unless it has gone elsewhere."""
        if not self._asking:
            return
        had_focus = self.field.hasFocus()
        self._asking = False
        if had_focus and self._came_from is not None and isValid(self._came_from):
            self._came_from.setFocus(Qt.FocusReason.OtherFocusReason)
        self._came_from = None
        self._arrange()

    def _arrange(self) -> None:
        """Only what is of use is there."""
        some = self.picker.count() > 1
        self._label.setText(tr("Keep as") if self._asking else tr("Against"))
        self._label.setBuddy(self.field if self._asking else self.picker)
        parts = {self.field: self._asking, self.picker: some and not self._asking}
        for part in sorted(parts, key=parts.__getitem__):  # hide first: room for both would widen the window
            part.setVisible(parts[part])
        self.setVisible(some or self._asking)

    def _on_named(self) -> None:
        if self._asking:  # also comes when the field is hidden
            self.end()
            self.named.emit(self.field.text())

    def _on_dropped(self) -> None:
        self.end()
        self.dropped.emit()
