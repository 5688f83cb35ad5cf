"""One curve of a strip, an item of pyqtgraph, kept from one result to the next and fed with new points.

A module of its own, since its library takes long to import: the first results bring it.
"""

from __future__ import annotations

import pyqtgraph as pg
from PySide6.QtCore import Qt
from PySide6.QtGui import QBrush, QPainter

from app.gui.strips.curves import THIN_Z, Shape
from app.gui.theme import Theme, colour

BESIDE = ((-0.4, -0.4), (0.4, 0.4), (-0.4, 0.4), (0.4, -0.4))  # hairlines that make one of 1.8 pixels


class Curve(pg.PlotCurveItem):
    """A curve in pixels of the sheet; its strip paints it, so that a strip is one picture that is kept."""

    def __init__(self) -> None:
        super().__init__(antialias=True)
        self.setSegmentedLineMode("off")

    def getViewBox(self) -> None:
        """None: it lies in no view box of the library."""

    def show_shape(self, shape: Shape, theme: Theme) -> None:
        """Draw this."""
        self.setZValue(shape.height)
        pattern = Qt.BrushStyle.BDiagPattern if shape.hatched else Qt.BrushStyle.SolidPattern
        filled = bool(shape.fill)
        self.setData(
            shape.points.x,
            shape.points.y,
            connect="all" if filled else shape.points.joined,  # which the library makes a path of much faster
            pen=shape.pen(theme),
            fillLevel="enclosed" if filled else None,
            brush=QBrush(colour(getattr(theme, shape.fill)), pattern) if filled else None,
        )

    def paint_on(self, painter: QPainter) -> None:
        """A fill with hard edges, which lie under its line; a line as hairlines beside each other.

        Qt draws a line of one pixel twenty times as fast as any wider one.
        """
        path, brush, pen = self.getPath(), self.opts["brush"], self.opts["pen"]
        painter.setRenderHint(QPainter.RenderHint.Antialiasing, brush is None)
        if brush is not None:
            painter.fillPath(path, brush)
            return
        painter.setPen(pen)
        for x, y in ((0.0, 0.0),) if self.zValue() == THIN_Z else BESIDE:
            painter.translate(x, y)
            painter.drawPath(path)
            painter.translate(-x, -y)
