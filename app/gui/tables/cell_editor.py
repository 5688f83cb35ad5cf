"""The line that a cell is typed into, with the names that its cell offers.

Down and Up go through the names, each put into the line as if it had been typed, so that it is previewed
like any text; Up from the first brings back what was typed. Enter, Tab and Escape find only a text.
"""

from __future__ import annotations

from PySide6.QtCore import QEvent, QModelIndex, Qt, Signal
from PySide6.QtGui import (
    QAccessible,
    QAccessibleAnnouncementEvent,
    QHideEvent,
    QKeyEvent,
    QKeySequence,
    QMoveEvent,
)
from PySide6.QtWidgets import QLineEdit, QWidget

from app.gui.tables.column import Offer
from app.gui.tables.offer_list import OfferList
from app.gui.tables.offers import matching
from app.gui.theme import Theme
from app.words import tr


class CellEditor(QLineEdit):
    """A cell's editor. Deleting a word in it is not the command that deletes segments."""

    offered = Signal(str)  # a name that the keys went to, not taken in yet
    picked = Signal()  # a name was clicked: it is the cell's text

    def __init__(
        self, parent: QWidget, theme: Theme, offers: tuple[Offer, ...] = (), separator: str = ""
    ) -> None:
        super().__init__(parent)
        self.setObjectName("cell")
        self._theme = theme
        self._offers = offers
        self._separator = separator  # names are offered for what stands behind the last of these
        self._typed = ""  # what the names in the list were matched with
        self._list: OfferList | None = None
        if offers:
            self.setAccessibleDescription(tr("Down goes through names to choose from"))
            self.textEdited.connect(self.on_typed)

    @property
    def offer_list(self) -> OfferList | None:
        """The list of names where it is open."""
        return self._list if self._list is not None and self._list.isVisible() else None

    def event(self, event: QEvent) -> bool:
        """Keep the keys that delete words for the text."""
        if event.type() == QEvent.Type.ShortcutOverride and isinstance(event, QKeyEvent):
            keys = QKeySequence.StandardKey
            if event.matches(keys.DeleteStartOfWord) or event.matches(keys.DeleteEndOfWord):
                event.accept()
                return True
        return super().event(event)

    def keyPressEvent(self, event: QKeyEvent) -> None:
        """Down opens the list and goes through it, Up goes back; the rest is for the text."""
        steps = {Qt.Key.Key_Down: 1, Qt.Key.Key_Up: -1}.get(Qt.Key(event.key()), 0)
        if self._offers and steps:
            self._go(steps)
        else:
            super().keyPressEvent(event)

    def on_typed(self, text: str) -> None:
        """Offer what goes with the text; nothing where it is empty."""
        self._typed = text
        self._opened().show_offers(matching(self._offers, self._last(text)) if text.strip() else ())

    def _last(self, text: str) -> str:
        """What is being named: the text, or the last of several parts of it."""
        return text.rpartition(self._separator)[2].strip() if self._separator else text

    def _with_name(self, name: str) -> str:
        """The typed text with the offered name for what is being named."""
        if not self._separator:
            return name
        before, cut, _ = self._typed.rpartition(self._separator)
        return f"{before}{cut} {name} " if cut else f"{name} "

    def _opened(self) -> OfferList:
        if self._list is None:
            self._list = OfferList(self._theme, self)
            self._list.clicked.connect(self.on_clicked)
        return self._list

    def _go(self, steps: int) -> None:
        """To the next name; a closed list opens with all of them, at the one that stands in the cell."""
        shown = self.offer_list
        if shown is None:
            if steps < 0:
                return
            self._typed = self.text()
            shown = self._opened()
            shown.show_offers(self._offers)
            shown.choose(next((i for i, o in enumerate(self._offers) if o.name == self._typed), -1))
        row = min(max(shown.currentIndex().row() + steps, -1), len(shown.offers) - 1)
        shown.choose(row)
        self._put(self._with_name(shown.offers[row].name) if row >= 0 else self._typed)
        spoken = shown.offers[row].spoken if row >= 0 else self._typed
        QAccessible.updateAccessibility(QAccessibleAnnouncementEvent(self, spoken))

    def _put(self, text: str) -> None:
        self.setText(text)
        self.setModified(True)  # else the table would fill it anew when it is told of changes
        self.offered.emit(text)

    def on_clicked(self, index: QModelIndex) -> None:
        """A clicked name is chosen for good."""
        self._put(self._with_name(index.data()))
        if self._separator:  # its section follows
            self._opened().show_offers(())
        else:
            self.picked.emit()

    def moveEvent(self, event: QMoveEvent) -> None:
        """The list stays with its cell."""
        super().moveEvent(event)
        if self.offer_list is not None:
            self.offer_list.place()

    def hideEvent(self, event: QHideEvent) -> None:
        """The list goes with its cell."""
        super().hideEvent(event)
        if self._list is not None:
            self._list.hide()
            self._list.deleteLater()
            self._list = None
