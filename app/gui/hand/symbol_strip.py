"""The narrow strip of trade symbols beside the sheet: a button for each line of the table of kinds.

A chosen symbol is in the hand until it is put down; the strip only shows which one that is.
"""

from __future__ import annotations

from PySide6.QtCore import QEvent, QPoint, QSize, Qt, Signal
from PySide6.QtGui import QKeyEvent, QResizeEvent
from PySide6.QtWidgets import QGridLayout, QToolButton, QToolTip, QWidget

from app.gui.hand.symbol_icon import symbol_icon
from app.gui.theme import Theme, theme_for
from app.hand.kinds import KINDS, Kind
from app.words import later, tr

LEAST_BUTTON = 26  # px, above the 24 that WCAG 2.5.8 calls easy to hit
TOP = 6  # px, above and below the buttons
TIP_ASIDE = QPoint(4, -18)  # px; a tip stands below the point it is given, and would hide the next symbol
GOES_ON = {
    "joint": later("{name}: choose it, then click a joint; the key {letter} puts it on the selected joints"),
    "segment": later(
        "{name}: choose it, then click a segment; the key {letter} puts it on the selected segments"
    ),
    "member": later("{name}, key {letter}: for the whole member"),
}


def words_of(kind: Kind) -> str:
    """What a symbol is and where it goes."""
    return tr(GOES_ON[kind.on]).format(name=tr(kind.name), letter=kind.letter)


class SymbolStrip(QWidget):
    """A column of buttons, two where it is low: Tab goes to the last one used, Up and Down through them."""

    chosen = Signal(object)  # Kind

    def __init__(self, parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self.setObjectName("symbols")
        self.setAttribute(Qt.WidgetAttribute.WA_StyledBackground)
        self.setAccessibleName(tr("Symbols to put on the drawing"))
        self._dressed: tuple[Theme, int] | None = None
        self.buttons = {kind.key: self._button(kind) for kind in KINDS}
        self._grid = QGridLayout(self)
        self._grid.setContentsMargins(3, TOP, 3, TOP)
        self._grid.setSpacing(1)
        self._arrange(1)
        self._make_stop(next(iter(self.buttons.values())))
        self._dress()

    def _button(self, kind: Kind) -> QToolButton:
        button = QToolButton(self)
        button.setCheckable(True)
        button.setToolTip(words_of(kind))
        button.setAccessibleName(tr(kind.name))
        button.setAccessibleDescription(words_of(kind))
        button.setFocusPolicy(Qt.FocusPolicy.NoFocus)  # until it is the one stop of Tab
        button.clicked.connect(lambda _on=False: self.chosen.emit(kind))
        button.installEventFilter(self)
        return button

    def _arrange(self, columns: int) -> None:
        """All buttons in so many columns, from the top down."""
        self._columns, rows = columns, -(-len(self.buttons) // columns)
        for place, button in enumerate(self.buttons.values()):
            self._grid.addWidget(button, place % rows, place // rows)
        for row in range(len(self.buttons) + 1):
            self._grid.setRowStretch(row, 1 if row == rows else 0)

    def _height_in(self, columns: int) -> int:
        rows = -(-len(self.buttons) // columns)
        return rows * (next(iter(self.buttons.values())).height() + 1) + 2 * TOP

    def minimumSizeHint(self) -> QSize:
        """As low as two columns allow."""
        return QSize(self._grid.minimumSize().width(), self._height_in(2))

    def resizeEvent(self, event: QResizeEvent) -> None:
        """A second column where the window is too low for one."""
        super().resizeEvent(event)
        columns = 1 if self._height_in(1) <= self.height() else 2
        if columns != self._columns:
            self._arrange(columns)

    def _make_stop(self, button: QToolButton) -> None:
        """Make a button the only one that Tab stops at."""
        button.setFocusPolicy(Qt.FocusPolicy.TabFocus)
        self.setFocusProxy(button)
        for other in self.buttons.values():
            if other is not button:
                other.setFocusPolicy(Qt.FocusPolicy.NoFocus)

    def show_chosen(self, kind: Kind | None) -> None:
        """Show which symbol is in the hand."""
        for key, button in self.buttons.items():
            button.setChecked(kind is not None and kind.key == key)

    def _dress(self) -> None:
        theme = theme_for(self.palette())
        size = max(LEAST_BUTTON, round(1.45 * self.fontMetrics().height()))
        if (theme, size) == self._dressed:  # a style sheet changes the palette, which asks for it again
            return
        self._dressed = theme, size
        for kind in KINDS:
            button = self.buttons[kind.key]
            button.setIcon(symbol_icon(kind.symbol, theme, size - 6))
            button.setIconSize(QSize(size - 6, size - 6))
            button.setFixedSize(size, size)
        self.setStyleSheet(
            f"QWidget#symbols {{ background: {theme.panel}; border-right: 1px solid {theme.edge}; }}"
            "QToolButton { border: 1px solid transparent; padding: 0px; }"
            f"QToolButton:hover {{ background: {theme.select_fill}; }}"
            f"QToolButton:checked {{ background: {theme.select_fill}; border: 2px solid {theme.select}; }}"
            f"QToolButton:focus {{ border: 2px solid {theme.ink}; }}"
        )

    def changeEvent(self, event: QEvent) -> None:
        """Follow the palette and the font."""
        super().changeEvent(event)
        if event.type() in (QEvent.Type.PaletteChange, QEvent.Type.FontChange):
            self._dress()

    def eventFilter(self, button: QWidget, event: QEvent) -> bool:
        """Up and Down go to the next button; Enter presses it like Space does; tips stand beside."""
        if event.type() == QEvent.Type.ToolTip:
            beside = button.mapToGlobal(QPoint(button.width() + TIP_ASIDE.x(), TIP_ASIDE.y()))
            QToolTip.showText(beside, button.toolTip(), button)
            return True
        if event.type() == QEvent.Type.KeyPress and isinstance(event, QKeyEvent):
            steps = {Qt.Key.Key_Up: -1, Qt.Key.Key_Down: 1}.get(Qt.Key(event.key()), 0)
            if steps:
                all_of_them = list(self.buttons.values())
                here = all_of_them.index(button)
                self._make_stop(all_of_them[(here + steps) % len(all_of_them)])
                self.setFocus(Qt.FocusReason.TabFocusReason)
                return True
            if event.key() in (Qt.Key.Key_Return, Qt.Key.Key_Enter):
                button.click()
                return True
        return super().eventFilter(button, event)
