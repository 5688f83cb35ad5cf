"""What stands over the strips when they show nothing, or nothing current: never under what is typed in place.

A line that is typed into hides part of the sheet just when its wrong text makes the results out of date.
The word for that then stands in the next strip, or beside.
"""

from __future__ import annotations

from collections.abc import Iterator, Sequence

from PySide6.QtCore import QRectF, Signal

from app.gui.fonts import Fonts
from app.gui.sheet_items import Message
from app.gui.theme import Theme

SHARES = (0.5, 0.75, 0.25)  # of a strip each way, where the middle of the box may lie


class Notice(Message):
    """Stands in the middle of the first strip, unless something lies over that."""

    moved = Signal()

    def __init__(self, theme: Theme) -> None:
        super().__init__(theme, ground="paper", ink="quiet")
        self._strips: tuple[QRectF, ...] = ()
        self._box = QRectF()
        self._covered = QRectF()

    def say(self, text: str, fonts: Fonts, strips: Sequence[QRectF], widest: float) -> None:
        """Other words, or other strips to say them on; no wider than a width."""
        self.set_text(text, fonts)
        width = min(fonts.measure(text, "plain").width() + 20.0, widest)
        self._box, self._strips = QRectF(0.0, 0.0, width, 1.7 * fonts.text_height), tuple(strips)
        self._settle()

    def keep_clear_of(self, covered: QRectF) -> None:
        """What lies over the sheet now; an empty rectangle where nothing does."""
        if covered != self._covered:
            self._covered = QRectF(covered)
            self._settle()
            self.moved.emit()

    def _settle(self) -> None:
        free = (box for box in self._places() if not box.intersects(self._covered))
        first = next(self._places(), QRectF())
        self.set_rect(next(free, first))

    def _places(self) -> Iterator[QRectF]:
        """The middle of each strip, then the sides of each."""
        for share in SHARES:
            for strip in self._strips:
                box = QRectF(self._box)
                box.moveCenter(strip.topLeft() + (strip.bottomRight() - strip.topLeft()) * share)
                yield box
