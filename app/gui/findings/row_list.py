"""The rows of the panel, each with the cures of its finding below it.

Widgets are kept and given new contents, so that a result after every keystroke costs no new widgets and a row
keeps the keyboard's focus.
"""

from __future__ import annotations

from collections.abc import Iterator, Mapping

from PySide6.QtCore import QObject, Qt, Signal
from PySide6.QtWidgets import QVBoxLayout, QWidget

from app.cures import Cure, Cures
from app.findings.subjects import Subject
from app.gui.findings.content import Row
from app.gui.findings.cure_line import CureLine
from app.gui.findings.row import FindingRow
from app.gui.fonts import Fonts
from app.gui.theme import Theme
from app.gui.view import Selection
from app.phrases.cures import cures_sentences


class _Entry:
    """A row with its cures."""

    def __init__(self, row: FindingRow) -> None:
        self.row = row
        self.lines: list[CureLine] = []
        self.column = QVBoxLayout()
        self.column.setSpacing(0)
        self.column.addWidget(row)

    @property
    def last(self) -> QWidget:
        """What the keyboard reaches last in it."""
        return self.lines[-1] if self.lines else self.row


class RowList(QObject):
    """Makes and fills the rows in a layout."""

    chosen = Signal(object)  # Row
    entered = Signal(object)  # Row
    cure_wanted = Signal(object)  # Cure

    def __init__(self, box: QVBoxLayout, theme: Theme, fonts: Fonts, before: QWidget) -> None:
        """`before` is what the keyboard reaches just before the first row."""
        super().__init__(before)
        self._box = box
        self._theme = theme
        self._fonts = fonts
        self._before = before
        self._entries: list[_Entry] = []

    @property
    def shown(self) -> tuple[FindingRow, ...]:
        """The rows that are shown."""
        return tuple(entry.row for entry in self._entries if not entry.row.isHidden())

    @property
    def cure_lines(self) -> tuple[CureLine, ...]:
        """The cures that are shown."""
        return tuple(line for entry in self._entries for line in entry.lines if not line.isHidden())

    def show(self, rows: tuple[Row, ...]) -> None:
        """List these rows, without cures."""
        while len(self._entries) < len(rows):
            self._add()
        for index, entry in enumerate(self._entries):
            if index < len(rows):
                entry.row.show_row(rows[index])
            entry.row.setVisible(index < len(rows))

    def _add(self) -> None:
        entry = _Entry(FindingRow(self._theme, self._fonts))
        entry.row.clicked.connect(self._on_clicked)
        entry.row.entered.connect(self._on_entered)
        self._box.addLayout(entry.column)
        before = self._entries[-1].last if self._entries else self._before
        QWidget.setTabOrder(before, entry.row)  # else after the whole window
        self._entries.append(entry)

    def show_cures(self, cures: Mapping[Subject, Cures]) -> None:
        """Put the cures under their findings."""
        for entry in self._entries:
            row = None if entry.row.isHidden() else entry.row.row
            found = cures.get(row.about) if row is not None and isinstance(row.about, Subject) else None
            self._fill(entry, found if row is not None and row.tone == "fail" else None)

    def _fill(self, entry: _Entry, cures: Cures | None) -> None:
        sentences = cures_sentences(cures) if cures is not None else ()
        makes: tuple[Cure | None, ...] = cures.found if cures is not None and cures.found else (None,)
        while len(entry.lines) < len(sentences):
            line = CureLine(self._theme, self._fonts)
            line.clicked.connect(self._on_cure_clicked)
            entry.column.addWidget(line)
            QWidget.setTabOrder(entry.last, line)
            entry.lines.append(line)
        for index, line in enumerate(entry.lines):
            if index < len(sentences):
                row = entry.row.row
                line.show_cure(sentences[index], makes[index], indented=bool(row and row.mark))
            line.setVisible(index < len(sentences))

    def light(self, selection: Selection) -> None:
        """Light the rows of what is selected."""
        for entry in self._entries:
            row = entry.row.row
            lit = row is not None and bool(
                row.segments & selection.segments
                or row.joints & selection.joints
                or row.companions & selection.companions
            )
            entry.row.set_lit(lit)

    def dress(self, theme: Theme, of_problems: Theme) -> None:
        """Other colours; problems may have their own."""
        self._theme = theme
        for entry in self._entries:
            row = entry.row.row
            entry.row.set_theme(of_problems if row is not None and row.tone == "problem" else theme)
            for line in entry.lines:
                line.set_theme(theme)

    def set_fonts(self, fonts: Fonts) -> None:
        """Another font."""
        self._fonts = fonts
        for widget in self._widgets():
            widget.set_fonts(fonts)

    def _widgets(self) -> Iterator[FindingRow | CureLine]:
        for entry in self._entries:
            yield entry.row
            yield from entry.lines

    # What happened

    def _on_clicked(self) -> None:
        widget = self.sender()
        if isinstance(widget, FindingRow) and widget.row is not None:
            self.chosen.emit(widget.row)

    def _on_entered(self) -> None:
        widget = self.sender()
        if isinstance(widget, FindingRow) and widget.row is not None:
            self.entered.emit(widget.row)

    def _on_cure_clicked(self) -> None:
        """The line goes with the finding; the keyboard stays at the finding's row."""
        line = self.sender()
        if not isinstance(line, CureLine) or line.cure is None:
            return
        if line.hasFocus():
            row = next(entry.row for entry in self._entries if line in entry.lines)
            row.setFocus(Qt.FocusReason.OtherFocusReason)
        self.cure_wanted.emit(line.cure)
