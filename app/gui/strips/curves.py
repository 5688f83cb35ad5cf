"""What the curves of a strip are and in which order they lie; `curve` paints each.

The points are in pixels already: the one ruler and the strip's scale place them, so no view box does, and
all strips stay on one axis to the pixel, whichever way the sheet is turned.
"""

from __future__ import annotations

from dataclasses import dataclass
from typing import TYPE_CHECKING

from PySide6.QtCore import Qt
from PySide6.QtGui import QPainter, QPen

from app.gui.sheet_layout import Place
from app.gui.strips.company import COMPRESSION, OVER, PLAIN, TENSION
from app.gui.strips.content import StripContent
from app.gui.strips.paths import Pixels, Polyline, Scale, band
from app.gui.theme import Theme, colour

if TYPE_CHECKING:
    from app.gui.strips.curve import Curve

LINES = {TENSION: "tension", COMPRESSION: "compression", OVER: "over"}
FILLS = {PLAIN: "load_fill", TENSION: "tension_fill", COMPRESSION: "compression_fill", OVER: "over_fill"}
FILL_Z, THIN_Z, LINE_Z = 1.0, 2.5, 3.0
HAIRLINE = 1.0
DASHES = (6.0, 4.0)  # of a reference, unlike those of the limits
DOTS = (1.5, 2.5)  # of the envelope around a state


@dataclass(frozen=True, slots=True)
class Shape:
    """A curve or a fill and how it is drawn: `ink` and `fill` name colours of the theme."""

    points: Polyline
    ink: str = ""
    fill: str = ""
    hatched: bool = False
    thin: bool = False
    dashes: tuple[float, float] | None = None

    @property
    def height(self) -> float:
        """Fills lie below, then the thin lines, then the lines."""
        return FILL_Z if self.fill else THIN_Z if self.thin else LINE_Z

    def pen(self, theme: Theme) -> QPen | None:
        """The pen of a line."""
        if self.fill:
            return None
        pen = QPen(colour(getattr(theme, self.ink)), HAIRLINE)
        if self.dashes is not None:
            pen.setDashPattern(self.dashes)
        return pen


def shapes(content: StripContent, place: Place, scale: Scale) -> tuple[Shape, ...]:
    """What is drawn of a content: the envelope around it, the fills of all traces, thin lines, the lines."""
    where = place.ruler, scale, place.axes
    traces = [Pixels.of(trace, *where) for trace in content.traces]
    drawn = [Shape(outline, fill="load_fill") for outline in _bands(content, place, scale)]
    for trace in traces if content.filled else ():
        for way, outline in trace.fills().items():
            drawn.append(Shape(outline, fill=FILLS[way]))
            if way == OVER:
                drawn.append(Shape(outline, fill="over", hatched=True))
    manners = (
        (content.singles, "joint", None),
        (content.around, "quiet", DOTS),
        (content.earlier, "quiet", DASHES),
    )
    for others, ink, dashes in manners:
        lines = [line for other in others for line in Pixels.of(other, *where).lines().values()]
        drawn += [Shape(line, ink=ink, thin=True, dashes=dashes) for line in lines]
    plain = "displacement" if content.kind in ("displacement", "mode") else "quiet"
    for trace in traces:
        drawn += [Shape(line, ink=LINES.get(way, plain)) for way, line in trace.lines().items()]
    return tuple(drawn)


def _bands(content: StripContent, place: Place, scale: Scale) -> list[Polyline]:
    """The area between the largest and the smallest values of the envelope around a state."""
    if len(content.around) < 2:
        return []
    return [band(*content.around, place.ruler, scale, place.axes)]


class Curves:
    """The curves of a strip, the lower ones first."""

    def __init__(self) -> None:
        self.shown: list[Curve] = []

    def show_shapes(self, shown: tuple[Shape, ...], theme: Theme) -> None:
        """Draw these and nothing else; among fills and among lines the later lie above."""
        self.shown = []
        if shown:
            from app.gui.strips.curve import (
                Curve,  # with a library that a window which opens need not wait for
            )

            self.shown = [Curve(shape, theme) for shape in sorted(shown, key=lambda shape: shape.height)]

    def paint(self, painter: QPainter, *, lines: bool) -> None:
        """The fills, or the lines."""
        painter.setBrush(Qt.BrushStyle.NoBrush)
        for curve in self.shown:
            if (curve.brush is None) is lines:
                curve.paint_on(painter)
