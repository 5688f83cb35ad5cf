"""The curves of a strip as items of pyqtgraph, kept from one result to the next and fed with new points.

The points are in pixels already: the one ruler and the strip's scale place them, so no view box does, and
all strips stay on one axis to the pixel, whichever way the sheet is turned.
"""

from __future__ import annotations

from dataclasses import dataclass

import pyqtgraph as pg
from PySide6.QtCore import QRectF, Qt
from PySide6.QtGui import QBrush, QPen
from PySide6.QtWidgets import QGraphicsItem

from app.gui.sheet_layout import Place
from app.gui.strips.content import COMPRESSION, OVER, PLAIN, TENSION, StripContent
from app.gui.strips.paths import Polyline, Scale, fills, lines
from app.gui.theme import Theme, colour

LINES = {TENSION: "tension", COMPRESSION: "compression", OVER: "over"}
FILLS = {PLAIN: "load_fill", TENSION: "tension_fill", COMPRESSION: "compression_fill", OVER: "over_fill"}
FILL_Z, EARLIER_Z, LINE_Z = 1.0, 2.5, 3.0
WIDTH = 1.8
THIN = 1.1  # of a reference, with dashes of its own, not those of the limits
DASHES = (6.0, 4.0)  # in widths of the line


@dataclass(frozen=True, slots=True)
class Shape:
    """A curve or a fill and how it is drawn: `ink` and `fill` name colours of the theme."""

    points: Polyline
    ink: str = ""
    fill: str = ""
    hatched: bool = False
    dashed: bool = False

    @property
    def height(self) -> float:
        """Fills lie below, then the dashed lines of a reference, then the lines."""
        return FILL_Z if self.fill else EARLIER_Z if self.dashed else LINE_Z

    def pen(self, theme: Theme) -> QPen | None:
        """The pen of a line."""
        if self.fill:
            return None
        pen = QPen(colour(getattr(theme, self.ink)), THIN if self.dashed else WIDTH)
        if self.dashed:
            pen.setDashPattern(DASHES)
        return pen


def shapes(content: StripContent, place: Place, scale: Scale) -> tuple[Shape, ...]:
    """What is drawn of a content: the fills of all traces, a reference dashed, then the traces' lines."""
    where = place.ruler, scale, place.axes
    drawn: list[Shape] = []
    for trace in content.traces if content.filled else ():
        for way, outline in fills(trace, *where).items():
            drawn.append(Shape(outline, fill=FILLS[way]))
            if way == OVER:
                drawn.append(Shape(outline, fill="over", hatched=True))
    for trace in content.earlier:
        drawn += [Shape(line, ink="quiet", dashed=True) for line in lines(trace, *where).values()]
    plain = "displacement" if content.kind == "displacement" else "quiet"
    for trace in content.traces:
        drawn += [Shape(line, ink=LINES.get(way, plain)) for way, line in lines(trace, *where).items()]
    return tuple(drawn)


class Curve(pg.PlotCurveItem):
    """A curve in pixels of the sheet."""

    def __init__(self, strip: QGraphicsItem) -> None:
        super().__init__(antialias=True, parent=strip)
        self.setSegmentedLineMode("off")
        self.setAcceptedMouseButtons(Qt.MouseButton.NoButton)
        self.setCacheMode(self.CacheMode.DeviceCoordinateCache)  # the cursor moves over it

    def getViewBox(self) -> None:
        """None: it lies in no view box of the library."""

    def pixelVectors(self, _direction: object = None) -> tuple[None, None]:
        """None: the bounds are widened by `boundingRect`."""
        return None, None

    def boundingRect(self) -> QRectF:
        """Around all points, and half the line's width."""
        return super().boundingRect().adjusted(-WIDTH, -WIDTH, WIDTH, WIDTH)

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
        self.setVisible(True)


class Curves:
    """As many curve items as are needed, children of a strip."""

    def __init__(self, strip: QGraphicsItem) -> None:
        self._strip = strip
        self._items: list[Curve] = []

    @property
    def shown(self) -> list[Curve]:
        """The items that are drawn."""
        return [item for item in self._items if item.isVisible()]

    def show_shapes(self, shown: tuple[Shape, ...], theme: Theme) -> None:
        """Draw these and nothing else; among fills and among lines the later lie above."""
        while len(self._items) < len(shown):
            self._items.append(Curve(self._strip))
        for item, shape in zip(self._items, shown, strict=False):
            item.show_shape(shape, theme)
        for item in self._items[len(shown) :]:
            item.setVisible(False)
