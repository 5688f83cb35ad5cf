"""The little scale of stress: from the allowable in compression through 0 to that in tension, range as bar.

Where an allowable is missing the scale has no end there and is dotted; where the range leaves the scale, the
scale gives way and the end mark stands inside, so that what is over the limit is seen to be over it.
"""

from __future__ import annotations

from dataclasses import dataclass

from PySide6.QtCore import QPointF, QRectF, Qt
from PySide6.QtGui import QBrush, QPainter, QPen

from app.findings import Band
from app.gui.findings.content import Row
from app.gui.fonts import Fonts
from app.gui.theme import Theme, colour

SCALE_HEIGHT = 17.0
BAR = 7.0
LEAST_BAR = 4.0
ROOM = 1.06  # how far the scale reaches beyond what it holds


@dataclass(frozen=True, slots=True)
class StressScale:
    """Stress ↔ pixel of one scale."""

    low: float
    high: float
    left: float
    right: float

    @classmethod
    def of(cls, band: Band, left: float, right: float) -> StressScale:
        """The scale that holds the allowables there are and the whole range."""
        ends = [0.0, band.low, band.high]
        ends += [end for end in (band.compression, band.tension) if end is not None]
        low, high = min(ends), max(ends)
        if low == high:
            low, high = -1.0, 1.0
        over = [band.low < (band.compression or band.low), band.high > (band.tension or band.high)]
        low = low * ROOM if over[0] or band.compression is None else low
        high = high * ROOM if over[1] or band.tension is None else high
        return cls(low, high, left, right)

    def pixel(self, stress: float) -> float:
        """The pixel of a stress."""
        return self.left + (stress - self.low) / (self.high - self.low) * (self.right - self.left)


def numbers_height(fonts: Fonts) -> float:
    """How much more a scale with numbers takes."""
    return fonts.measure("0", "small").height()


def paint_scale(painter: QPainter, room: QRectF, row: Row, theme: Theme, fonts: Fonts) -> None:
    """The scale of a row in its room; the numbers of the ends below it where the row asks for them."""
    band = row.band
    if band is None:
        return
    scale = StressScale.of(band, room.left(), room.right())
    middle = room.center().y()
    _paint_line(painter, scale, band, middle, theme)
    _paint_bar(painter, scale, row, middle, theme)
    if row.band_named:
        _paint_numbers(
            painter,
            scale,
            band,
            QRectF(room.left(), room.bottom() - 3.0, room.width(), numbers_height(fonts)),
            theme,
            fonts,
        )


def _paint_line(painter: QPainter, scale: StressScale, band: Band, middle: float, theme: Theme) -> None:
    for end, allowable in ((scale.low, band.compression), (scale.high, band.tension)):
        dotted = allowable is None and end != 0.0
        style = Qt.PenStyle.DotLine if dotted else Qt.PenStyle.SolidLine
        painter.setPen(QPen(colour(theme.quiet), 1.0, style))
        painter.drawLine(QPointF(scale.pixel(0.0), middle), QPointF(scale.pixel(end), middle))
    painter.setPen(QPen(colour(theme.quiet), 1.0))
    _tick(painter, scale.pixel(0.0), middle, 4.0)
    painter.setPen(QPen(colour(theme.ink), 1.6))
    for allowable in (band.compression, band.tension):
        if allowable is not None:
            _tick(painter, scale.pixel(allowable), middle, 5.0)


def _tick(painter: QPainter, x: float, middle: float, half: float) -> None:
    painter.drawLine(QPointF(x, middle - half), QPointF(x, middle + half))


def _paint_bar(painter: QPainter, scale: StressScale, row: Row, middle: float, theme: Theme) -> None:
    """Compression left of 0, tension right of it; hatched in one colour where the check fails."""
    band = row.band
    if band is None:
        return
    painter.setPen(Qt.PenStyle.NoPen)
    if row.tone == "fail":
        bar = _bar(scale, band.low, band.high, middle)
        painter.fillRect(bar, colour(theme.over_fill))
        painter.fillRect(bar, QBrush(colour(theme.over), Qt.BrushStyle.Dense4Pattern))
        painter.setPen(QPen(colour(theme.over), 1.0))
        painter.drawRect(bar)
        return
    if band.low < 0.0:
        painter.fillRect(_bar(scale, band.low, min(band.high, 0.0), middle), colour(theme.compression))
    if band.high > 0.0:
        painter.fillRect(_bar(scale, max(band.low, 0.0), band.high, middle), colour(theme.tension))


def _bar(scale: StressScale, low: float, high: float, middle: float) -> QRectF:
    left, right = scale.pixel(low), scale.pixel(high)
    wider = max(LEAST_BAR - (right - left), 0.0)
    return QRectF(left - 0.5 * wider, middle - 0.5 * BAR, right - left + wider, BAR)


def _paint_numbers(
    painter: QPainter, scale: StressScale, band: Band, room: QRectF, theme: Theme, fonts: Fonts
) -> None:
    painter.setFont(fonts.font("small"))
    painter.setPen(colour(theme.quiet))
    ends = ((band.compression, band.compression_text), (band.tension, band.tension_text), (0.0, "0"))
    taken: list[QRectF] = []
    for stress, text in ends:
        if stress is None:
            continue
        size = fonts.measure(text, "small")
        left = min(max(scale.pixel(stress) - 0.5 * size.width(), room.left()), room.right() - size.width())
        box = QRectF(left, room.top(), size.width(), size.height())
        if not any(box.adjusted(-4, 0, 4, 0).intersects(other) for other in taken):
            taken.append(box)
            painter.drawText(box, Qt.AlignmentFlag.AlignCenter | Qt.TextFlag.TextDontClip, text)
