"""The findings beside the sheet: verdict, findings the worst first, what was not checked, the books.

The verdict is never filtered; which of the findings below it are listed is a person's choice, kept here
and in no file.
"""

from __future__ import annotations

from collections.abc import Callable, Mapping
from typing import TypeAlias

from PySide6.QtCore import QEvent, Qt, Signal
from PySide6.QtGui import QPalette
from PySide6.QtWidgets import QFrame, QLabel, QScrollArea, QVBoxLayout, QWidget

from app.cures import Cures
from app.findings import Comparison, Findings
from app.findings.subjects import Subject
from app.gui.findings.block import LinesBlock
from app.gui.findings.content import (
    Row,
    blocks,
    detail_blocks,
    overall_block,
    problem_rows,
    rows,
    with_named_scales,
)
from app.gui.findings.cure_line import CureLine
from app.gui.findings.filter_bar import FilterBar
from app.gui.findings.row import FindingRow
from app.gui.findings.row_list import RowList
from app.gui.findings.sift import count_line, sifted
from app.gui.fonts import Fonts
from app.gui.theme import colour, greyed, theme_for
from app.gui.view import Cursor, Selection, Shown, View
from app.words import tr

Narrow: TypeAlias = Callable[[str], Findings]  # of one combination, by its name


class FindingsPanel(QScrollArea):
    """Shows findings; choosing one sets the cursor and the selection of the `View`."""

    row_chosen = Signal(object)  # Row, before cursor and selection follow
    row_entered = Signal(object)  # Row whose cell is wanted
    cure_wanted = Signal(object)  # Cure

    def __init__(self, view: View, parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self._view = view
        self._theme = theme_for(self.palette())
        self._fonts = Fonts(self.font())  # of all rows, so that what is measured for one is kept for all
        self._findings: Findings | None = None
        self._compared: Comparison | None = None
        self._current = True
        self._has_problems = False
        self._narrow: Narrow | None = None
        self._problem_rows: tuple[Row, ...] = ()
        self._all_rows: tuple[Row, ...] = ()
        self._cures: Mapping[Subject, Cures] = {}
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
        self._uncured = QLabel()
        self._uncured.hide()
        self._labels = (self._headline, self._detail, self._stale, self._uncured, self._error)
        for label in self._labels:
            label.setWordWrap(True)
            label.setTextFormat(Qt.TextFormat.PlainText)
            label.setMargin(5)
            label.setTextInteractionFlags(Qt.TextInteractionFlag.TextSelectableByMouse)
        rows_box, self._blocks_box = QVBoxLayout(), QVBoxLayout()
        self._against = LinesBlock(self._theme, self._fonts)
        self._against.hide()
        self.filter = FilterBar()
        for part in (self._headline, self._detail, self._stale, self._against, self.filter, self._uncured):
            column.addWidget(part)
        for box in (rows_box, self._blocks_box):
            box.setSpacing(2)
            column.addLayout(box)
        column.addWidget(self._error)
        column.addStretch(1)
        self.setWidget(self._body)
        self._list = RowList(rows_box, self._theme, self._fonts, self.filter.last)
        self._list.chosen.connect(self._on_row_chosen)
        self._list.entered.connect(self.row_entered)
        self._list.cure_wanted.connect(self.cure_wanted)
        self.filter.changed.connect(self._on_filter_changed)

    def add_offer(self, offer: QWidget) -> None:
        """Something to press under the verdict."""
        column = self._body.layout()
        assert isinstance(column, QVBoxLayout)  # noqa: S101 - for the type checker
        column.insertWidget(column.indexOf(self._detail) + 1, offer)
        QWidget.setTabOrder(self, offer)

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
        return self._list.shown

    @property
    def cure_lines(self) -> tuple[CureLine, ...]:
        """The cures that are shown."""
        return self._list.cure_lines

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
        narrow: Narrow | None = None,
    ) -> None:
        """Show findings (`current`, or of an earlier edit), and the problems that keep from solving.

        `compared` is what has changed against a reference; `narrow` gives the findings of one combination.
        """
        if findings is not self._findings or not current:
            self._cures = {}
        self._findings = findings
        self._compared = compared if findings is not None else None
        self._current = current
        self._has_problems = bool(problems)
        self._narrow = narrow
        self._problem_rows = problem_rows(problems)
        self._all_rows = rows(findings) if findings is not None else ()
        self.filter.offer_states([book.name for book in findings.books] if findings is not None else ())
        self._show_rows()
        self._headline.setText(_headline(findings, problems))
        self._detail.setText(findings.detail if findings is not None and not problems else "")
        self._error.setText(findings.numerical_error if findings is not None else "")
        self._stale.setVisible(findings is not None and not current)
        for label in (self._detail, self._error):
            label.setVisible(bool(label.text()))
        self._show_blocks()
        self._list.light(self._view.selection)
        self._dress()

    def say_what_is_unsought(self, sentence: str) -> None:
        """Say why cures stand under none or not all of what fails; nothing where they are sought for all."""
        self._uncured.setText(sentence)
        self._uncured.setVisible(bool(sentence))

    def show_cures(self, cures: Mapping[Subject, Cures]) -> None:
        """Show what would cure the findings that are shown now."""
        shown, self._cures = self._cures, cures if self._current else {}
        if shown or self._cures:  # most often there were none and are none
            self._list.show_cures(self._cures)
            self._dress()

    def _show_rows(self) -> None:
        sift = self.filter.sift
        self.filter.setVisible(bool(self._all_rows))
        found = self._all_rows
        if sift.state is not None and self._narrow is not None:
            found = rows(self._narrow(sift.state))
        listed = sifted(found, sift)
        self.filter.say_count("" if sift.is_open else count_line(listed, self._all_rows, sift.state))
        self._list.show(self._problem_rows + with_named_scales(listed))
        self._list.show_cures(self._cures)

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

    # Colours

    def _dress(self) -> None:
        self._theme = theme_for(self.palette())
        stale = self._findings is not None and not self._current
        dressed = greyed(self._theme) if stale else self._theme
        self._list.dress(dressed, self._theme)
        for widget in (self._against, *self._blocks):
            widget.set_theme(dressed)
        ground = QPalette(self.palette())
        ground.setColor(QPalette.ColorRole.Window, colour(self._theme.panel))
        self._body.setPalette(ground)
        self._body.setAutoFillBackground(True)
        self.viewport().setPalette(ground)
        self.filter.set_theme(self._theme)
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

    def _on_row_chosen(self, row: Row) -> None:
        if not row.leads_somewhere:
            return
        self.row_chosen.emit(row)
        self._view.set_selection(Selection(row.segments, row.joints, row.companions))
        if row.position is not None:
            self._view.set_cursor(Cursor(row.position))

    def _on_filter_changed(self) -> None:
        self._show_rows()
        self._list.light(self._view.selection)
        self._dress()

    def _on_selection_changed(self, _selection: Selection) -> None:
        self._list.light(self._view.selection)

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
            self._list.set_fonts(self._fonts)
            for widget in (self._against, *self._blocks):
                widget.set_fonts(self._fonts)
            self._dress()


def _headline(findings: Findings | None, problems: tuple[str, ...]) -> str:
    """The verdict; never one of an earlier edit over problems of this one."""
    if problems:
        return tr("Cannot be solved yet")
    return findings.headline if findings is not None else ""
