"""One strip as a scene item: paints prepared paths in pixels; the sheet places and fills it."""

from __future__ import annotations

from dataclasses import dataclass

from PySide6.QtCore import QRectF, Qt
from PySide6.QtGui import QBrush, QPainter, QPainterPath, QPen
from PySide6.QtWidgets import QGraphicsObject, QStyleOptionGraphicsItem, QWidget

from app.gui.fonts import Fonts
from app.gui.sheet_layout import Place
from app.gui.strips.content import COMPRESSION, OVER, PLAIN, TENSION, StripContent
from app.gui.strips.labels import Label, strip_labels
from app.gui.strips.paths import Scale, fill_paths, line_paths
from app.gui.theme import Theme, colour

LINES = {TENSION: "tension", COMPRESSION: "compression", OVER: "over"}
FILLS = {TENSION: "tension_fill", COMPRESSION: "compression_fill", OVER: "over_fill"}


@dataclass(frozen=True, slots=True)
class Prepared:
    """What is painted of a content in a place, ready in pixels."""

    scale: Scale
    lines: tuple[tuple[int, QPainterPath], ...]
    fills: tuple[tuple[int, QPainterPath], ...]
    labels: tuple[Label, ...]

    @classmethod
    def of(cls, content: StripContent, place: Place) -> Prepared:
        """Make the paths and place the labels."""
        scale = Scale.of(content, place.rect, place.axes)
        where = place.ruler, scale, place.axes
        traces = content.traces
        return cls(
            scale=scale,
            lines=tuple(item for trace in traces for item in line_paths(trace, *where).items()),
            fills=tuple(
                item for trace in traces if content.filled for item in fill_paths(trace, *where).items()
            ),
            labels=strip_labels(content, place.rect, place.ruler, place.axes, place.fonts.measure),
        )


class Strip(QGraphicsObject):
    """A strip; `show_content(None)` leaves its frame empty."""

    def __init__(self, theme: Theme) -> None:
        super().__init__()
        self._theme = theme
        self._content: StripContent | None = None
        self._place: Place | None = None
        self._prepared: Prepared | None = None  # None: to be made when next asked for
        self.setAcceptedMouseButtons(Qt.MouseButton.NoButton)
        self.setCacheMode(self.CacheMode.DeviceCoordinateCache)  # the cursor moves over it

    @property
    def content(self) -> StripContent | None:
        """What the strip shows."""
        return self._content

    @property
    def labels(self) -> tuple[Label, ...]:
        """The placed texts."""
        prepared = self._ready()
        return () if prepared is None else prepared.labels

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
        self._spoil()

    def set_place(self, place: Place) -> None:
        """Another place or another window of the ruler."""
        self.prepareGeometryChange()
        self._place = place
        self._spoil()

    def _spoil(self) -> None:
        self._prepared = None
        self.update()

    def _ready(self) -> Prepared | None:
        if self._prepared is None and self._content is not None and self._place is not None:
            self._prepared = Prepared.of(self._content, self._place)
        return self._prepared

    def boundingRect(self) -> QRectF:
        """The frame, and room for the labels left of it or above it."""
        if self._place is None:
            return QRectF()
        height = self._place.fonts.text_height
        left, top = (4.0, 4.0 * height) if self._place.axes.upright else (self._place.rect.left(), 4.0)
        return self._place.rect.adjusted(-left, -top, 4.0, 4.0)

    def paint(self, painter: QPainter, _option: QStyleOptionGraphicsItem, _widget: QWidget | None) -> None:
        """Frame, fills, lines, limits, texts, in this order."""
        if self._place is None:
            return
        painter.setRenderHint(QPainter.RenderHint.Antialiasing)
        painter.fillRect(self._place.rect, colour(self._theme.card))
        painter.save()
        painter.setClipRect(self._place.rect)
        prepared = self._ready()
        if self._content is not None and prepared is not None:
            self._paint_content(painter, self._content, self._place, prepared)
        painter.restore()
        painter.setPen(QPen(colour(self._theme.edge), 1.0))
        painter.setBrush(Qt.BrushStyle.NoBrush)
        painter.drawRect(self._place.rect)
        self._paint_labels(painter, self._place.fonts)

    def _paint_content(
        self, painter: QPainter, content: StripContent, place: Place, prepared: Prepared
    ) -> None:
        scale = prepared.scale
        self._paint_band(painter, content, place, scale)
        painter.setPen(Qt.PenStyle.NoPen)
        for drawn, path in prepared.fills:
            self._paint_fill(painter, drawn, path)
        self._paint_unchecked(painter, content, place)
        painter.setBrush(Qt.BrushStyle.NoBrush)
        self._paint_base(painter, content, place, scale)
        for drawn, path in prepared.lines:
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
        for label in self.labels:
            painter.setFont(fonts.font(label.face))
            painter.setPen(colour(getattr(self._theme, label.ink)))
            painter.drawText(label.rect, Qt.AlignmentFlag.AlignCenter | Qt.TextFlag.TextDontClip, label.text)
