"""The symbols of the table of kinds as icons, in the theme's ink."""

from __future__ import annotations

from PySide6.QtCore import QPointF, QSize, Qt
from PySide6.QtGui import QIcon, QPainter, QPen, QPixmap, QPolygonF

from app.gui.theme import Theme, colour
from app.hand.symbols import GRID, Line, Symbol

SHARPNESS = 3  # pixels of the pixmap for one of the widget, enough for any screen


def symbol_icon(symbol: Symbol, theme: Theme, size: int) -> QIcon:
    """The symbol on a square of `size` pixels."""
    pixmap = QPixmap(QSize(size, size) * SHARPNESS)
    pixmap.setDevicePixelRatio(SHARPNESS)
    pixmap.fill(Qt.GlobalColor.transparent)
    painter = QPainter(pixmap)
    painter.setRenderHint(QPainter.RenderHint.Antialiasing)
    painter.scale(size / GRID, size / GRID)
    for line in symbol:
        _paint(painter, line, theme)
    painter.end()
    return QIcon(pixmap)


def _paint(painter: QPainter, line: Line, theme: Theme) -> None:
    pen = QPen(colour(theme.ink), line.width)
    if line.dashed:
        pen.setDashPattern([2.0, 1.4])
    painter.setPen(pen)
    painter.setBrush(colour(theme.ink) if line.filled else Qt.BrushStyle.NoBrush)
    points = QPolygonF([QPointF(x, y) for x, y in line.points])
    if line.closed:
        painter.drawPolygon(points)
    else:
        painter.drawPolyline(points)
