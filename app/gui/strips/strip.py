"""One strip as scene items: its ground, the curves, the marks between them, and the texts above all.

From below: ground and allowable band, fills, marks, lines (`curves`), all painted into one picture that is
kept while the cursor moves over it; and above the joint lines of the sheet the `Labels`, which the sheet adds
beside the strip.
"""

from __future__ import annotations

from dataclasses import replace
from typing import TYPE_CHECKING

from PySide6.QtCore import QPointF, QRectF, Qt
from PySide6.QtGui import QBrush, QPainter, QPen
from PySide6.QtWidgets import QStyleOptionGraphicsItem, QWidget

from app.gui.sheet_items import Painted
from app.gui.sheet_layout import Place
from app.gui.strips.content import StripContent
from app.gui.strips.curves import Curves, shapes
from app.gui.strips.labels import DIAMOND, Label, strip_labels
from app.gui.strips.paths import Scale
from app.gui.theme import Theme, colour

if TYPE_CHECKING:
    from app.gui.strips.curve import Curve

LABELS_Z = 6.0  # above the joint lines


class Strip(Painted):
    """A strip; `show_content(None)` leaves its frame empty. What it is told is drawn by `refresh`."""

    def __init__(self, theme: Theme) -> None:
        super().__init__(theme, 0.0)
        self._content: StripContent | None = None
        self._place: Place | None = None
        self._spoilt = True
        self._has_legend = True
        self._scale: Scale | None = None
        self._curves = Curves()
        self.label_layer = Labels(theme)
        self.setCacheMode(self.CacheMode.DeviceCoordinateCache)  # the cursor moves over it

    @property
    def content(self) -> StripContent | None:
        """What the strip shows."""
        return self._content

    @property
    def labels(self) -> tuple[Label, ...]:
        """The placed texts."""
        return self.label_layer.labels

    @property
    def curves(self) -> list[Curve]:
        """The items of fills and lines that are drawn."""
        return self._curves.shown

    @property
    def place(self) -> Place | None:
        """Where the strip lies."""
        return self._place

    @property
    def scale(self) -> Scale | None:
        """How values lie on it; None where it shows nothing."""
        return self._scale

    def set_theme(self, theme: Theme) -> None:
        """Other colours."""
        if theme != self._theme:
            super().set_theme(theme)
            self.label_layer.set_theme(theme)
            self._spoilt = True

    def show_content(self, content: StripContent | None) -> None:
        """Other curves."""
        self._content = content
        self._spoilt = True

    def set_place(self, place: Place) -> None:
        """Another place or another window of the ruler."""
        if place != self._place:
            self._place = place
            self._spoilt = True
            self.set_rect(place.rect)

    def set_legend(self, *, shown: bool) -> None:
        """Whether this is the strip that says what the dashed lines are."""
        if shown != self._has_legend:
            self._has_legend = shown
            self._spoilt = True

    def refresh(self) -> None:
        """Draw what has changed since the last time."""
        if not self._spoilt or self._place is None:
            return
        self._spoilt = False
        content, place = self._content, self._place
        scale = None if content is None else Scale.of(content, place.rect, place.axes)
        drawn = () if content is None or scale is None else shapes(content, place, scale)
        self._curves.show_shapes(drawn, self._theme)
        self._scale = scale
        if content is not None and not self._has_legend:
            content = replace(content, legend="")
        self.label_layer.show_labels(content, place, scale)
        self.update()

    def boundingRect(self) -> QRectF:
        """The frame with its line."""
        return self._rect.adjusted(-1, -1, 1, 1)

    def paint(self, painter: QPainter, _option: QStyleOptionGraphicsItem, _widget: QWidget | None) -> None:
        """Ground, allowable band, fills, marks, lines, frame."""
        painter.fillRect(self._rect, colour(self._theme.card))
        if self._content is not None and self._place is not None and self._scale is not None:
            painter.save()
            painter.setClipRect(self._rect)
            if self._content.kind == "stress":
                self._paint_band(painter, self._content, self._place, self._scale)
            self._curves.paint(painter, lines=False)
            self._paint_marks(painter, self._content, self._place, self._scale)
            self._curves.paint(painter, lines=True)
            painter.restore()
        painter.setRenderHint(QPainter.RenderHint.Antialiasing)
        painter.setPen(QPen(colour(self._theme.edge), 1.0))
        painter.drawRect(self._rect)

    def _paint_band(self, painter: QPainter, content: StripContent, place: Place, scale: Scale) -> None:
        """The allowable band, between 0 and each allowable."""
        for limit in (*content.limits, *content.beyond):
            span = place.ruler.pixel(limit.first), place.ruler.pixel(limit.last)
            across = scale.pixel(0.0), scale.pixel(limit.value)
            painter.fillRect(place.axes.rect(span, across) & place.rect, colour(self._theme.band_fill))

    def _paint_marks(self, painter: QPainter, content: StripContent, place: Place, scale: Scale) -> None:
        """The hatch of what was not checked, the line of 0, the dashed limits."""
        brush = QBrush(colour(self._theme.joint), Qt.BrushStyle.FDiagPattern)
        for first, last in content.unchecked:
            span = place.ruler.pixel(first), place.ruler.pixel(last)
            painter.fillRect(place.axes.rect(span, place.axes.across_of(place.rect)) & place.rect, brush)
        painter.setRenderHint(QPainter.RenderHint.Antialiasing)
        painter.setPen(QPen(colour(self._theme.quiet), 1.0))
        _draw_line(painter, place, place.axes.along_of(place.rect), scale.pixel(0.0))
        painter.setPen(QPen(colour(self._theme.ink), 1.2, Qt.PenStyle.DashLine))
        for limit in content.limits:
            span = place.ruler.pixel(limit.first), place.ruler.pixel(limit.last)
            _draw_line(painter, place, span, scale.pixel(limit.value))


def _draw_line(painter: QPainter, place: Place, span: tuple[float, float], across: float) -> None:
    painter.drawLine(place.axes.point(span[0], across), place.axes.point(span[1], across))


class Labels(Painted):
    """The texts of a strip, and a dot at each extreme; they reach over its frame and lie on joint lines."""

    def __init__(self, theme: Theme) -> None:
        super().__init__(theme, LABELS_Z)
        self.labels: tuple[Label, ...] = ()
        self._content: StripContent | None = None
        self._place: Place | None = None
        self._scale: Scale | None = None
        self.setCacheMode(self.CacheMode.DeviceCoordinateCache)  # the cursor moves over it

    def show_labels(self, content: StripContent | None, place: Place, scale: Scale | None) -> None:
        """Write those of this content."""
        self._content, self._place, self._scale = content, place, scale
        self.labels = ()
        if content is not None:
            self.labels = strip_labels(content, place.rect, place.ruler, place.axes, place.fonts.measure)
        rect = place.rect.adjusted(-4, -4, 4, 4)
        for label in self.labels:
            rect |= label.rect
        self.set_rect(rect)

    def paint(self, painter: QPainter, _option: QStyleOptionGraphicsItem, _widget: QWidget | None) -> None:
        """Dots, then texts, those on a line on a ground of their own."""
        if self._content is None or self._place is None or self._scale is None:
            return
        painter.setRenderHint(QPainter.RenderHint.Antialiasing)
        self._paint_extremes(painter, self._content, self._place, self._scale)
        self._paint_marks(painter, self._content, self._place, self._scale)
        for label in self.labels:
            if label.ground:
                painter.fillRect(label.rect, colour(getattr(self._theme, label.ground)))
            painter.setFont(self._place.fonts.font(label.face))
            painter.setPen(colour(getattr(self._theme, label.ink)))
            self._place.fonts.write(painter, label.text, label.face, label.rect)

    def _paint_extremes(self, painter: QPainter, content: StripContent, place: Place, scale: Scale) -> None:
        """A dot where the extreme is, inside the window."""
        painter.setPen(QPen(colour(self._theme.card), 1.0))
        painter.setBrush(colour(self._theme.ink))
        for extreme in content.extremes:
            if place.ruler.holds(extreme.x):
                point = place.axes.point(place.ruler.pixel(extreme.x), scale.pixel(extreme.value))
                painter.drawEllipse(point, 3.0, 3.0)

    def _paint_marks(self, painter: QPainter, content: StripContent, place: Place, scale: Scale) -> None:
        """A diamond for what is at a single place, filled where it is beyond what is allowed."""
        for mark in content.marks:
            if place.ruler.holds(mark.x):
                at = place.axes.point(place.ruler.pixel(mark.x), scale.pixel(mark.value))
                corners = ((0.0, -DIAMOND), (DIAMOND, 0.0), (0.0, DIAMOND), (-DIAMOND, 0.0))
                painter.setPen(QPen(colour(self._theme.over if mark.over else self._theme.ink), 1.4))
                painter.setBrush(colour(self._theme.over if mark.over else self._theme.card))
                painter.drawPolygon([at + QPointF(*corner) for corner in corners])
