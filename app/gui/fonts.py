"""The faces of the sheet's texts, all from the widget's own font, and their measure in pixels.

Most texts stay the same from one keystroke to the next, so what was measured is kept.
"""

from __future__ import annotations

import bisect
from functools import lru_cache

from PySide6.QtCore import QPointF, QRectF, QSizeF, Qt
from PySide6.QtGui import QFont, QFontMetricsF, QPainter, QStaticText, QTransform

from app.drawing.shapes import Face

_KEPT = 8192  # measures of texts
CENTRED = Qt.AlignmentFlag.AlignCenter | Qt.TextFlag.TextDontClip
_SIZES: dict[Face, float] = {"plain": 1.0, "strong": 1.06, "small": 0.9, "small_strong": 0.9, "mark": 1.25}


class Fonts:
    """The faces made from one font: plain, strong (bold), small and mark (for + and −)."""

    def __init__(self, base: QFont) -> None:
        self._fonts = {face: _sized(base, face) for face in _SIZES}
        self._metrics = {face: QFontMetricsF(font) for face, font in self._fonts.items()}
        self._width = lru_cache(_KEPT)(lambda text, face: self._metrics[face].horizontalAdvance(text))
        self._height = {face: metrics.height() for face, metrics in self._metrics.items()}
        self._laid_out = lru_cache(_KEPT)(self._lay_out)

    @property
    def text_height(self) -> float:
        """The height of a line of plain text."""
        return self._height["plain"]

    def font(self, face: Face) -> QFont:
        """The font of a face."""
        return self._fonts[face]

    def measure(self, text: str, face: Face) -> QSizeF:
        """Width and height of a text; line breaks in it count."""
        return QSizeF(*self.extent(text, face))

    def extent(self, text: str, face: Face) -> tuple[float, float]:
        """The same as plain numbers."""
        if "\n" not in text:
            return self._width(text, face), self._height[face]
        lines = text.split("\n")
        return max(self._width(line, face) for line in lines), len(lines) * self._height[face]

    def write(self, painter: QPainter, text: str, face: Face, box: QRectF) -> None:
        """Write a text in the middle of a box, whatever its size; the painter has the font of the face.

        A line is laid out once and kept, which is what takes time; several lines are left to Qt.
        """
        if "\n" in text:
            painter.drawText(box, CENTRED, text)
            return
        left = box.left() + 0.5 * (box.width() - self._width(text, face))
        top = box.top() + 0.5 * (box.height() - self._height[face])
        painter.drawStaticText(QPointF(left, top), self._laid_out(text, face))

    def _lay_out(self, text: str, face: Face) -> QStaticText:
        line = QStaticText(text)
        line.setTextFormat(Qt.TextFormat.PlainText)
        line.prepare(QTransform(), self._fonts[face])
        return line

    def wrapped(self, text: str, face: Face, width: float, between: str = " ") -> str:
        """The text with line breaks at spaces (or at what else stands `between` its parts), so that no line
        but a single long part is wider than `width`.

        So measured and painted lines are the same; Qt's own wrapping may paint more than it measures.
        """
        if self._width(text, face) <= width:
            return text
        lines, words = [], text.split(between)
        while words:
            line, words = self._first_line(words, face, width, between)
            lines.append(line)
        return "\n".join(lines)

    def _first_line(self, words: list[str], face: Face, width: float, between: str) -> tuple[str, list[str]]:
        """As many words as fit, at least one, and the rest; found by halving, as measuring is what costs."""

        def width_of(count: int) -> float:
            return self._width(between.join(words[:count]), face)

        count = max(bisect.bisect_right(range(len(words) + 1), width, lo=1, key=width_of) - 1, 1)
        return between.join(words[:count]), words[count:]

    def elided(self, text: str, face: Face, width: float) -> str:
        """The text, cut short with an ellipsis where it is wider than `width`."""
        return self._metrics[face].elidedText(text, Qt.TextElideMode.ElideRight, width)


def _sized(base: QFont, face: Face) -> QFont:
    font = QFont(base)
    font.setPointSizeF(max(base.pointSizeF(), 1.0) * _SIZES[face])
    font.setBold(face in ("strong", "small_strong", "mark"))
    return font
