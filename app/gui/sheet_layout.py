"""Where the parts of the sheet lie, across or upright: plain geometry, testable without a window.

Across, the drawing lies on top and the strips under it; upright, the drawing stands left and the strips
beside it. Both share the pixels `begin`…`end` along the member's axis.
"""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass
from typing import TypeAlias

from PySide6.QtCore import QPointF, QRectF

from app.drawing.frame import Frame
from app.drawing.ruler import Ruler
from app.drawing.shapes import Box
from app.gui.fonts import Fonts
from app.strip_choice import KINDS, USUAL, Kind

Shares: TypeAlias = Mapping[Kind, float]
# Stress carries the most; upright each has words above it.
SHARES_ACROSS: Shares = dict(zip(KINDS, (0.22, 0.26, 0.31, 0.21, 0.21), strict=True))
SHARES_UPRIGHT: Shares = dict(zip(KINDS, (0.23, 0.25, 0.29, 0.23, 0.23), strict=True))
GAP = 12.0
READOUT_LINES, LINE_EDGES = 2, 0.6  # lines kept free for the readout; above and below them, in text heights
LEAST_STRIP = 1.9  # across, the least depth of a strip in heights of the text: its title and one value
ABOVE, BELOW = 46.0, 52.0  # upright, beyond the member's ends: the arrow of a force, a spring on its ground


@dataclass(frozen=True, slots=True)
class Axes:
    """Turns (along, across) into points: across the sheet along is x; upright along is y and across x."""

    upright: bool

    def point(self, along: float, across: float) -> QPointF:
        """The point of the scene."""
        return QPointF(across, along) if self.upright else QPointF(along, across)

    def rect(self, along: tuple[float, float], across: tuple[float, float]) -> QRectF:
        """The rectangle between two corners, in any order."""
        return QRectF(self.point(along[0], across[0]), self.point(along[1], across[1])).normalized()

    def along(self, point: QPointF) -> float:
        """The pixel along the axis."""
        return point.y() if self.upright else point.x()

    def along_of(self, rect: QRectF) -> tuple[float, float]:
        """The rectangle's span along the axis, in growing pixels."""
        return (rect.top(), rect.bottom()) if self.upright else (rect.left(), rect.right())

    def across_of(self, rect: QRectF) -> tuple[float, float]:
        """The rectangle's span across the axis, in growing pixels."""
        return (rect.left(), rect.right()) if self.upright else (rect.top(), rect.bottom())


@dataclass(frozen=True, slots=True)
class Place:
    """Where an item lies, and how positions and texts are measured there."""

    rect: QRectF
    ruler: Ruler
    axes: Axes
    fonts: Fonts

    @property
    def frame(self) -> Frame:
        """The same for the drawing, which knows no Qt."""
        rect = self.rect
        box = Box(rect.left(), rect.top(), rect.right(), rect.bottom())
        return Frame(box, self.ruler, self.axes.upright, self.fonts.extent)


@dataclass(frozen=True, slots=True)
class SheetLayout:
    """The places on a sheet of some size; `begin`…`end` are the pixels of the ruler."""

    axes: Axes
    drawing: QRectF
    strips: tuple[QRectF, ...]
    readout: QRectF
    begin: float
    end: float

    @property
    def crossing(self) -> QRectF:
        """What joint lines and cursor cross: from the drawing's start to the last strip's end."""
        across = (self.axes.across_of(self.drawing)[0], self.axes.across_of(self.strips[-1])[1])
        return self.axes.rect((self.begin, self.end), across)


def least_height(text_height: float) -> float:
    """The height of a sheet on which drawing and strips can still be read, whichever way it lies."""
    return (9.0 + 4 * LEAST_STRIP + READOUT_LINES + LINE_EDGES) * text_height + 5 * GAP


def sheet_layout(
    width: float, height: float, upright: bool, text_height: float, kinds: tuple[Kind, ...] = USUAL
) -> SheetLayout:
    """The layout with some strips on a sheet of the given pixels; margins follow the height of the text.

    The room of a strip that is not shown goes to the others.
    """
    readout_height = round((READOUT_LINES + LINE_EDGES) * text_height)
    place = _upright if upright else _across
    return place(width, height - readout_height - 8.0, readout_height, text_height, kinds)


def _across(
    width: float, height: float, readout_height: float, text_height: float, kinds: tuple[Kind, ...]
) -> SheetLayout:
    left, right = 7.2 * text_height, 5.2 * text_height
    begin, end = left, max(width - right, left + 50.0)
    drawing_height = min(max(0.45 * height, 11.0 * text_height), 28.0 * text_height)
    strips_height = max(len(kinds), 4) * (LEAST_STRIP * text_height + GAP)
    drawing_height = min(drawing_height, height - strips_height)
    drawing = QRectF(0.0, 4.0, width, drawing_height)
    spans = _spans(drawing.bottom() + 6.0, height, SHARES_ACROSS, kinds)
    strips = tuple(QRectF(QPointF(begin, a), QPointF(end, b)) for a, b in spans)
    readout = QRectF(GAP, height + 4.0, width - 2 * GAP, readout_height)
    return SheetLayout(Axes(upright=False), drawing, strips, readout, begin, end)


def _upright(
    width: float, height: float, readout_height: float, text_height: float, kinds: tuple[Kind, ...]
) -> SheetLayout:
    top, bottom = max(3.4 * text_height, ABOVE), max(3.2 * text_height, BELOW)
    begin, end = max(height - bottom, top + 50.0), top
    drawing_width = min(max(0.45 * width, min(25.0 * text_height, 0.52 * width)), 40.0 * text_height)
    drawing = QRectF(0.0, 0.0, drawing_width, height)
    spans = _spans(drawing.right() + GAP, width - GAP, SHARES_UPRIGHT, kinds)
    strips = tuple(QRectF(QPointF(a, end), QPointF(b, begin)) for a, b in spans)
    readout = QRectF(GAP, height + 4.0, width - 2 * GAP, readout_height)
    return SheetLayout(Axes(upright=True), drawing, strips, readout, begin, end)


def _spans(first: float, last: float, shares: Shares, kinds: tuple[Kind, ...]) -> list[tuple[float, float]]:
    """The strips' spans across the axis, with gaps between them."""
    room = max(last - first - (len(kinds) - 1) * GAP, 4.0) / sum(shares[kind] for kind in kinds)
    spans, at = [], first
    for kind in kinds:
        spans.append((at, at + shares[kind] * room))
        at += shares[kind] * room + GAP
    return spans
