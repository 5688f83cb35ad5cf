"""One curve of a strip as a path of pyqtgraph's, kept while the same is drawn.

A module of its own, since its library takes long to import: the first results bring it. Only how it makes a
path of arrays is used of it; its items ask and keep far more than a curve under a hand has time for.
"""

from __future__ import annotations

from functools import cached_property

from pyqtgraph.functions import arrayToQPath
from PySide6.QtCore import Qt
from PySide6.QtGui import QBrush, QPainter, QPainterPath, QPen

from app.gui.strips.curves import Shape
from app.gui.theme import Theme, colour

BESIDE = ((-0.4, -0.4), (0.4, 0.4), (-0.4, 0.4), (0.4, -0.4))  # hairlines that make one of 1.8 pixels


class Curve:
    """A shape in the colours of a theme; its strip paints it, so that a strip is one picture that is kept."""

    def __init__(self, shape: Shape, theme: Theme) -> None:
        self.shape = shape
        self.pen: QPen | None = shape.pen(theme)
        self.brush: QBrush | None = None
        if shape.fill:
            pattern = Qt.BrushStyle.BDiagPattern if shape.hatched else Qt.BrushStyle.SolidPattern
            self.brush = QBrush(colour(getattr(theme, shape.fill)), pattern)

    @cached_property
    def path(self) -> QPainterPath:
        """Its points as Qt draws them."""
        points = self.shape.points
        return arrayToQPath(points.x, points.y, connect="all" if self.shape.fill else points.joined)

    def paint_on(self, painter: QPainter) -> None:
        """A fill with hard edges, which lie under its line; a line as hairlines beside each other.

        Qt draws a line of one pixel twenty times as fast as any wider one.
        """
        painter.setRenderHint(QPainter.RenderHint.Antialiasing, self.brush is None)
        if self.brush is not None:
            painter.fillPath(self.path, self.brush)
            return
        painter.setPen(self.pen)
        for x, y in ((0.0, 0.0),) if self.shape.thin else BESIDE:
            painter.translate(x, y)
            painter.drawPath(self.path)
            painter.translate(-x, -y)
