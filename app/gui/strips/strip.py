"""One strip as a scene item: paints prepared paths in pixels; the sheet places it and gives it its content."""

from __future__ import annotations

import pyqtgraph as pg
from PySide6.QtCore import QRectF, Qt
from PySide6.QtGui import QBrush, QPainter, QPainterPath, QPen
from PySide6.QtWidgets import QStyleOptionGraphicsItem, QWidget

from app.gui.fonts import Fonts
from app.gui.sheet_layout import Place
from app.gui.strips.content import COMPRESSION, OVER, PLAIN, TENSION, StripContent
from app.gui.strips.labels import Label, strip_labels
from app.gui.strips.paths import Scale, fill_paths, line_paths
from app.gui.theme import Theme, colour

LINES = {TENSION: "tension", COMPRESSION: "compression", OVER: "over"}
FILLS = {TENSION: "tension_fill", COMPRESSION: "compression_fill", OVER: "over_fill"}


class Strip(pg.GraphicsObject):
    """A strip; `show_content(None)` leaves its frame empty."""

    def __init__(self, theme: Theme) -> None:
        super().__init__()
        self._theme = theme
        self._content: StripContent | None = None
        self._place: Place | None = None
        self._lines: list[tuple[int, QPainterPath]] = []
        self._fills: list[tuple[int, QPainterPath]] = []
        self._labels: tuple[Label, ...] = ()

    @property
    def content(self) -> StripContent | None:
        """What the strip shows."""
        return self._content

    @property
    def labels(self) -> tuple[Label, ...]:
        """The placed texts."""
        return self._labels

    @property
    def place(self) -> Place | None:
        """Where the strip lies."""
        return self._place

    def set_theme(self, theme: Theme) -> None:
        """Other colours, nothing else."""
        self._theme = theme
        self.update()

    def show_content(self, content: StripContent | None) -> None:
        """Other curves."""
        self._content = content
        self._prepare()

    def set_place(self, place: Place) -> None:
        """Another place or another window of the ruler."""
        self.prepareGeometryChange()
        self._place = place
        self._prepare()

    def _prepare(self) -> None:
        self._lines, self._fills, self._labels = [], [], ()
        if self._content is not None and self._place is not None:
            place = self._place
            scale = Scale.of(self._content, place.rect, place.axes)
            for trace in self._content.traces:
                self._lines += line_paths(trace, place.ruler, scale, place.axes).items()
                if self._content.filled:
                    self._fills += fill_paths(trace, place.ruler, scale, place.axes).items()
            self._labels = strip_labels(
                self._content, place.rect, place.ruler, place.axes, place.fonts.measure
            )
        self.update()

    def boundingRect(self) -> QRectF:
        """Frame and labels."""
        if self._place is None:
            return QRectF()
        rect = QRectF(self._place.rect)
        for label in self._labels:
            rect |= label.rect
        return rect.adjusted(-110.0, -60.0, 4.0, 4.0)

    def paint(self, painter: QPainter, _option: QStyleOptionGraphicsItem, _widget: QWidget | None) -> None:
        """Frame, fills, lines, limits, texts, in this order."""
        if self._place is None:
            return
        painter.setRenderHint(QPainter.RenderHint.Antialiasing)
        painter.fillRect(self._place.rect, colour(self._theme.card))
        painter.save()
        painter.setClipRect(self._place.rect)
        if self._content is not None:
            self._paint_content(painter, self._content, self._place)
        painter.restore()
        painter.setPen(QPen(colour(self._theme.edge), 1.0))
        painter.setBrush(Qt.BrushStyle.NoBrush)
        painter.drawRect(self._place.rect)
        self._paint_labels(painter, self._place.fonts)

    def _paint_content(self, painter: QPainter, content: StripContent, place: Place) -> None:
        scale = Scale.of(content, place.rect, place.axes)
        self._paint_band(painter, content, place, scale)
        painter.setPen(Qt.PenStyle.NoPen)
        for drawn, path in self._fills:
            self._paint_fill(painter, drawn, path)
        self._paint_unchecked(painter, content, place)
        painter.setBrush(Qt.BrushStyle.NoBrush)
        self._paint_base(painter, content, place, scale)
        for drawn, path in self._lines:
            painter.setPen(QPen(colour(self._line_colour(content, drawn)), 1.8))
            painter.drawPath(path)
        self._paint_extremes(painter, content, place, scale)

    def _line_colour(self, content: StripContent, drawn: int) -> str:
        plain = self._theme.displacement if content.kind == "displacement" else self._theme.quiet
        return plain if drawn == PLAIN else getattr(self._theme, LINES[drawn])

    def _paint_fill(self, painter: QPainter, drawn: int, path: QPainterPath) -> None:
        fill = self._theme.load_fill if drawn == PLAIN else getattr(self._theme, FILLS[drawn])
        painter.fillPath(path, colour(fill))
        if drawn == OVER:
            painter.fillPath(path, QBrush(colour(self._theme.over), Qt.BrushStyle.BDiagPattern))

    def _paint_band(self, painter: QPainter, content: StripContent, place: Place, scale: Scale) -> None:
        """The allowable band, between 0 and each allowable."""
        if content.kind != "stress":
            return
        for limit in (*content.limits, *content.beyond):
            span = place.ruler.pixel(limit.first), place.ruler.pixel(limit.last)
            across = scale.pixel(0.0), scale.pixel(limit.value)
            painter.fillRect(place.axes.rect(span, across) & place.rect, colour(self._theme.band_fill))

    def _paint_unchecked(self, painter: QPainter, content: StripContent, place: Place) -> None:
        brush = QBrush(colour(self._theme.joint), Qt.BrushStyle.FDiagPattern)
        for first, last in content.unchecked:
            span = place.ruler.pixel(first), place.ruler.pixel(last)
            painter.fillRect(place.axes.rect(span, place.axes.across_of(place.rect)) & place.rect, brush)

    def _paint_base(self, painter: QPainter, content: StripContent, place: Place, scale: Scale) -> None:
        """The line of 0 and the dashed limits."""
        ends = place.axes.along_of(place.rect)
        painter.setPen(QPen(colour(self._theme.quiet), 1.0))
        self._line(painter, place, ends, scale.pixel(0.0))
        painter.setPen(QPen(colour(self._theme.ink), 1.2, Qt.PenStyle.DashLine))
        for limit in content.limits:
            span = place.ruler.pixel(limit.first), place.ruler.pixel(limit.last)
            self._line(painter, place, span, scale.pixel(limit.value))

    def _line(self, painter: QPainter, place: Place, span: tuple[float, float], across: float) -> None:
        painter.drawLine(place.axes.point(span[0], across), place.axes.point(span[1], across))

    def _paint_extremes(self, painter: QPainter, content: StripContent, place: Place, scale: Scale) -> None:
        """A dot where the extreme is."""
        painter.setPen(QPen(colour(self._theme.card), 1.0))
        painter.setBrush(colour(self._theme.ink))
        for extreme in content.extremes:
            point = place.axes.point(place.ruler.pixel(extreme.x), scale.pixel(extreme.value))
            painter.drawEllipse(point, 3.0, 3.0)

    def _paint_labels(self, painter: QPainter, fonts: Fonts) -> None:
        for label in self._labels:
            painter.setFont(fonts.font(label.face))
            painter.setPen(colour(getattr(self._theme, label.ink)))
            painter.drawText(label.rect, Qt.AlignmentFlag.AlignCenter | Qt.TextFlag.TextDontClip, label.text)
