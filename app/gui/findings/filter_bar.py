"""The pickers over the findings: kind, combination, marks; and how many are shown, with a way back to all.

One line where there is room, up to three where the font is large. The last line is there only while something
is hidden.
"""

from __future__ import annotations

from collections.abc import Sequence
from itertools import pairwise

from PySide6.QtCore import QEvent, QSignalBlocker, Signal
from PySide6.QtGui import QPalette, QResizeEvent
from PySide6.QtWidgets import (
    QComboBox,
    QHBoxLayout,
    QLabel,
    QLineEdit,
    QSizePolicy,
    QToolButton,
    QVBoxLayout,
    QWidget,
)

from app.gui.findings.sift import KINDS, Sift
from app.gui.picker import Picker
from app.gui.theme import Theme, colour
from app.words import tr

NARROW = 38  # digits; below it the marks go to a line of their own
TIGHT = 30  # digits; below it the combinations do as well, else their names would be cut
LONGEST = 200  # characters of marks


class FilterBar(QWidget):
    """Holds what is asked for; `changed` when a person asks for something else."""

    changed = Signal()

    def __init__(self, parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self.kind = Picker(tr("Show findings of this kind"), 6)
        self.kind.offer([(kind, tr(words)) for kind, words in KINDS], None)
        self.state = Picker(tr("Show findings of this combination"), 6)
        self.marks = QLineEdit()
        self.marks.setMaxLength(LONGEST)
        self.marks.setPlaceholderText(tr("Marks"))
        self.marks.setAccessibleName(tr("Show findings of segments and joints with these marks"))
        self.marks.setToolTip(tr("Marks of segments and joints, such as B, D"))
        self.marks.setClearButtonEnabled(True)
        self.count = QLabel()
        self.count.setWordWrap(True)
        self.clear_button = QToolButton()
        self.clear_button.setText(tr("Show all"))
        self.clear_button.setToolTip(tr("Show all findings"))
        self._sift = Sift()
        self._lay_out()
        self.offer_states(())
        self.say_count("")
        self.kind.picked.connect(self._on_changed)
        self.state.picked.connect(self._on_changed)
        self.marks.textChanged.connect(self._on_changed)
        self.clear_button.clicked.connect(self.clear)

    def _lay_out(self) -> None:
        for picker in (self.kind, self.state):
            picker.setSizePolicy(QSizePolicy.Policy.Ignored, QSizePolicy.Policy.Fixed)
            picker.setSizeAdjustPolicy(QComboBox.SizeAdjustPolicy.AdjustToMinimumContentsLengthWithIcon)
        self.marks.setSizePolicy(QSizePolicy.Policy.Ignored, QSizePolicy.Policy.Fixed)
        self.count.setSizePolicy(QSizePolicy.Policy.Ignored, QSizePolicy.Policy.Preferred)
        whole = QVBoxLayout(self)
        whole.setContentsMargins(5, 4, 5, 4)
        self._first, self._middle, self._second, third = (QHBoxLayout() for _ in range(4))
        for line in (self._first, self._middle, self._second, third):
            whole.addLayout(line)
        for layout in (whole, self._first, self._middle, self._second, third):
            layout.setSpacing(4)
        self._first.addWidget(self.kind, 1)
        third.addWidget(self.count, 1)
        third.addWidget(self.clear_button)
        self._arrange()
        for one, next_one in pairwise((self.kind, self.state, self.marks, self.clear_button)):
            self.setTabOrder(one, next_one)

    def set_theme(self, theme: Theme) -> None:
        """Colours that can be read; Qt's own of a placeholder is too faint."""
        palette = QPalette(self.palette())
        palette.setColor(QPalette.ColorRole.WindowText, colour(theme.ink))
        palette.setColor(QPalette.ColorRole.PlaceholderText, colour(theme.quiet))
        for part in (self.count, self.marks):
            part.setPalette(palette)

    def _arrange(self) -> None:
        """All stand side by side where there is room, else below each other."""
        digits = self.width() / self.fontMetrics().horizontalAdvance("0")
        marks_line = self._second if digits < NARROW else self._first
        for part, wanted in (
            (self.state, self._middle if digits < TIGHT else self._first),
            (self.marks, marks_line),
        ):
            if wanted.indexOf(part) < 0:
                wanted.insertWidget(min(1, wanted.count()), part, 1)  # and no longer in the other

    @property
    def sift(self) -> Sift:
        """What is asked for."""
        return self._sift

    @property
    def last(self) -> QWidget:
        """What the keyboard reaches last."""
        return self.clear_button

    def offer_states(self, names: Sequence[str]) -> None:
        """The combinations there are; one that is gone is asked for no more."""
        kept = self._sift.state if self._sift.state in names else None
        self.state.offer([(None, tr("Worst of all")), *((name, name) for name in names)], kept)
        self.state.setVisible(len(names) > 1)
        self._sift = Sift(self._sift.kind, kept if len(names) > 1 else None, self._sift.marks)
        self._arrange()

    def say_count(self, line: str) -> None:
        """How many are shown; nothing where all are."""
        self.count.setText(line)
        for part in (self.count, self.clear_button):
            part.setVisible(bool(line))

    def ask_for_marks(self, marks: Sequence[str]) -> None:
        """Only what is about these."""
        self.marks.setText(", ".join(marks))

    def clear(self) -> None:
        """Ask for all again; the keyboard does not stay on what goes."""
        if self.clear_button.hasFocus():
            self.kind.setFocus()
        self.kind.setCurrentIndex(0)
        self.state.setCurrentIndex(0)
        with QSignalBlocker(self):  # and not the field's, whose own button for clearing would stay
            self.marks.clear()
        self._on_changed()

    def _on_changed(self, *_what: object) -> None:
        kinds = [kind for kind, _words in KINDS]
        state = self.state.currentText() if self.state.currentIndex() > 0 else None
        self._sift = Sift(kinds[self.kind.currentIndex()], state, self.marks.text())
        self.changed.emit()

    def resizeEvent(self, event: QResizeEvent) -> None:
        """One line, or more."""
        super().resizeEvent(event)
        self._arrange()

    def changeEvent(self, event: QEvent) -> None:
        """The same with a larger font."""
        super().changeEvent(event)
        if event.type() == QEvent.Type.FontChange and hasattr(self, "_first"):
            self._arrange()
