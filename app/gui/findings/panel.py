"""The findings beside the sheet: verdict, findings the worst first, what was not checked, the books.

Widgets are kept and given new contents, so that a result after every keystroke costs no new widgets and a row
keeps the keyboard's focus.
"""

from __future__ import annotations

from PySide6.QtCore import QEvent, Qt
from PySide6.QtGui import QPalette
from PySide6.QtWidgets import QFrame, QLabel, QScrollArea, QVBoxLayout, QWidget

from app.findings import Comparison, Findings
from app.gui.findings.block import LinesBlock
from app.gui.findings.content import Row, blocks, detail_blocks, overall_block, problem_rows, rows
from app.gui.findings.row import FindingRow
from app.gui.fonts import Fonts
from app.gui.theme import colour, greyed, theme_for
from app.gui.view import Cursor, Selection, Shown, View
from app.words import tr


class FindingsPanel(QScrollArea):
    """Shows findings; choosing one sets the cursor and the selection of the `View`."""

    def __init__(self, view: View, parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self._view = view
        self._theme = theme_for(self.palette())
        self._fonts = Fonts(self.font())  # of all rows, so that what is measured for one is kept for all
        self._findings: Findings | None = None
        self._compared: Comparison | None = None
        self._current = True
        self._has_problems = False
        self._rows: list[FindingRow] = []
        self._blocks: list[LinesBlock] = []
        self._make_widgets()
        self.setFrameShape(QFrame.Shape.NoFrame)
        self.setWidgetResizable(True)
        self.setHorizontalScrollBarPolicy(Qt.ScrollBarPolicy.ScrollBarAlwaysOff)
        self.setMinimumWidth(260)
        self.setAccessibleName(tr("Findings"))
        view.selection_changed.connect(self._on_selection_changed)
        view.shown_changed.connect(self._on_shown_changed)
        self._dress()

    def _make_widgets(self) -> None:
        self._body = QWidget()
        column = QVBoxLayout(self._body)
        column.setContentsMargins(10, 12, 10, 12)
        column.setSpacing(2)
        self._headline, self._detail = QLabel(), QLabel()
        self._stale, self._error = QLabel(tr("out of date")), QLabel()
        self._labels = (self._headline, self._detail, self._stale, self._error)
        for label in self._labels:
            label.setWordWrap(True)
            label.setTextFormat(Qt.TextFormat.PlainText)
            label.setMargin(5)
            label.setTextInteractionFlags(Qt.TextInteractionFlag.TextSelectableByMouse)
        self._problems_box, self._rows_box, self._blocks_box = QVBoxLayout(), QVBoxLayout(), QVBoxLayout()
        self._against = LinesBlock(self._theme, self._fonts)
        self._against.hide()
        for part in (self._headline, self._detail, self._stale, self._against):
            column.addWidget(part)
        for box in (self._problems_box, self._rows_box, self._blocks_box):
            box.setSpacing(2)
            column.addLayout(box)
        column.addWidget(self._error)
        column.addStretch(1)
        self.setWidget(self._body)

    # What is shown

    @property
    def headline(self) -> str:
        """The verdict in one line."""
        return self._headline.text()

    @property
    def is_marked_out_of_date(self) -> bool:
        """Whether the panel says that the findings are of an earlier edit."""
        return not self._stale.isHidden()

    @property
    def rows(self) -> tuple[FindingRow, ...]:
        """The rows that are shown, problems first."""
        return tuple(row for row in self._rows if not row.isHidden())

    @property
    def blocks(self) -> tuple[LinesBlock, ...]:
        """The blocks that are shown: what has changed against a reference, then the books."""
        return tuple(block for block in (self._against, *self._blocks) if not block.isHidden())

    def show_findings(
        self,
        findings: Findings | None,
        problems: tuple[str, ...],
        current: bool,
        compared: Comparison | None = None,
    ) -> None:
        """Show findings (`current`, or of an earlier edit), and the problems that keep from solving.

        `compared` is what has changed against a reference.
        """
        self._findings = findings
        self._compared = compared if findings is not None else None
        self._current = current
        self._has_problems = bool(problems)
        shown = problem_rows(problems) + (rows(findings) if findings is not None else ())
        self._show_rows(shown)
        self._headline.setText(_headline(findings, problems))
        self._detail.setText(findings.detail if findings is not None and not problems else "")
        self._error.setText(findings.numerical_error if findings is not None else "")
        self._stale.setVisible(findings is not None and not current)
        for label in (self._detail, self._error):
            label.setVisible(bool(label.text()))
        self._show_blocks()
        self._light()
        self._dress()

    def _show_rows(self, shown: tuple[Row, ...]) -> None:
        while len(self._rows) < len(shown):
            row = FindingRow(self._theme, self._fonts)
            row.clicked.connect(self._on_row_clicked)
            self._rows_box.addWidget(row)
            self.setTabOrder(self._rows[-1] if self._rows else self, row)  # else after the whole window
            self._rows.append(row)
        for index, widget in enumerate(self._rows):
            if index < len(shown):
                widget.show_row(shown[index])
            widget.setVisible(index < len(shown))

    def _show_blocks(self) -> None:
        shown = blocks(self._findings, self._view.shown) if self._findings is not None else ()
        if self._compared is not None:
            self._against.show_block(overall_block(self._compared))
            shown = (*detail_blocks(self._compared), *shown)
        self._against.setVisible(self._compared is not None)
        while len(self._blocks) < len(shown):
            block = LinesBlock(self._theme, self._fonts)
            self._blocks.append(block)
            self._blocks_box.addWidget(block)
        for index, widget in enumerate(self._blocks):
            if index < len(shown):
                widget.show_block(shown[index])
            widget.setVisible(index < len(shown))

    def _light(self) -> None:
        """Light the rows of what is selected."""
        selection = self._view.selection
        for widget in self._rows:
            row = widget.row
            lit = row is not None and bool(row.segments & selection.segments or row.joints & selection.joints)
            widget.set_lit(lit)

    # Colours

    def _dress(self) -> None:
        self._theme = theme_for(self.palette())
        stale = self._findings is not None and not self._current
        dressed = greyed(self._theme) if stale else self._theme
        for widget in (*self._rows, self._against, *self._blocks):
            widget.set_theme(dressed)
        for widget in self._rows:
            if widget.row is not None and widget.row.tone == "problem":
                widget.set_theme(self._theme)
        ground = QPalette(self.palette())
        ground.setColor(QPalette.ColorRole.Window, colour(self._theme.panel))
        self._body.setPalette(ground)
        self._body.setAutoFillBackground(True)
        self.viewport().setPalette(ground)
        self._dress_labels(dressed.ink)

    def _dress_labels(self, ink: str) -> None:
        big = self.font()
        big.setPointSizeF(1.45 * max(big.pointSizeF(), 1.0))
        big.setBold(True)
        self._headline.setFont(big)
        for label in self._labels:
            palette = QPalette(self._body.palette())
            inks = {
                self._headline: self._theme.ink if self._has_problems else ink,
                self._stale: self._theme.ink,
            }
            palette.setColor(QPalette.ColorRole.WindowText, colour(inks.get(label, self._theme.quiet)))
            label.setPalette(palette)

    # What happened

    def _on_row_clicked(self) -> None:
        widget = self.sender()
        row = widget.row if isinstance(widget, FindingRow) else None
        if row is None or not row.leads_somewhere:
            return
        self._view.set_selection(Selection(row.segments, row.joints))
        if row.position is not None:
            self._view.set_cursor(Cursor(row.position))

    def _on_selection_changed(self, _selection: Selection) -> None:
        self._light()

    def _on_shown_changed(self, _shown: Shown) -> None:
        self._show_blocks()
        self._dress()

    def changeEvent(self, event: QEvent) -> None:
        """Follow the palette and the font."""
        super().changeEvent(event)
        if not hasattr(self, "_headline"):
            return
        if event.type() == QEvent.Type.PaletteChange:
            self._dress()
        elif event.type() == QEvent.Type.FontChange:
            self._fonts = Fonts(self.font())
            for widget in (*self._rows, self._against, *self._blocks):
                widget.set_fonts(self._fonts)
            self._dress()


def _headline(findings: Findings | None, problems: tuple[str, ...]) -> str:
    """The verdict; never one of an earlier edit over problems of this one."""
    if problems:
        return tr("Cannot be solved yet")
    return findings.headline if findings is not None else ""
