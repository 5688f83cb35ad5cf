"""Marks over the drawing: handles within reach, what a pull moves along, and the old outline meanwhile."""

from __future__ import annotations

from PySide6.QtCore import QPointF, QRectF, Qt
from PySide6.QtGui import QBrush, QPainter, QPen, QPolygonF
from PySide6.QtWidgets import QStyleOptionGraphicsItem, QWidget

from app.drawing.handles import Handle, HandleKey, handles_of
from app.drawing.shapes import Box, Point, Stroke
from app.drawing.sketch import Sketch
from app.gui.drawing.member_drawing import MemberDrawing
from app.gui.sheet_items import Painted
from app.gui.theme import Theme, colour
from app.gui.view import Selection

SQUARE = 3.0  # half of a quiet mark, px
ARROW = 9.0  # from a handle's middle to the tip of its arrows, px
GHOST_DASH = [4.0, 4.0]
TICK = 7.0
FAR = 1e5  # px, beyond any screen

Line = tuple[Point, Point]


class Ghost(Painted):
    """The outlines of before, dashed. They stand still while all else moves, so their picture is kept."""

    def __init__(self, theme: Theme) -> None:
        super().__init__(theme, 11.5)
        self.strokes: tuple[Stroke, ...] = ()
        self._window = Box(0.0, 0.0, 0.0, 0.0)
        self.setVisible(False)
        self.setCacheMode(self.CacheMode.DeviceCoordinateCache)

    def show_strokes(self, strokes: tuple[Stroke, ...], window: Box) -> None:
        """Paint these and nothing else, as far as they are in the window along the member."""
        self.strokes, self._window = strokes, window
        self.setVisible(bool(strokes))
        self.update()

    def set_rect(self, rect: QRectF) -> None:
        """Another place; the same one spoils nothing."""
        if rect != self._rect:
            super().set_rect(rect)

    def paint(self, painter: QPainter, _option: QStyleOptionGraphicsItem, _widget: QWidget | None) -> None:
        """Each outline by itself."""
        painter.setRenderHint(QPainter.RenderHint.Antialiasing)
        pen = QPen(colour(self._theme.quiet), 1.0)
        pen.setDashPattern(GHOST_DASH)
        painter.setPen(pen)
        painter.setBrush(Qt.BrushStyle.NoBrush)
        box = self._window
        corners = QPointF(box.left, box.top), QPointF(box.right, box.bottom)
        painter.setClipRect(QRectF(*corners).adjusted(-1.0, -1.0, 1.0, 1.0))
        for stroke in self.strokes:
            painter.drawPolygon([QPointF(*point) for point in stroke.points])


class HandMarks(Painted):
    """Paints the handles that it is told of where the drawing has them now; the mouse goes through."""

    def __init__(self, theme: Theme, drawing: MemberDrawing) -> None:
        super().__init__(theme, 12.0)
        self._drawing = drawing
        self._selection = Selection()
        self._key: HandleKey | None = None
        self._total_stays = False
        self.ghost_layer = Ghost(theme)

    @property
    def lit(self) -> Handle | None:
        """The handle in the hand or under the pointer."""
        if self._key is None:
            return None
        return next((h for h in self._of(frozenset((self._key[1],))) if h.key == self._key), None)

    @property
    def quiet(self) -> tuple[Handle, ...]:
        """The handles of what is selected."""
        chosen = self._selection
        if chosen == Selection():
            return ()
        indices = chosen.segments | chosen.joints | {index + 1 for index in chosen.segments}
        return tuple(handle for handle in self._of(indices) if belongs(handle, chosen))

    def _of(self, indices: frozenset[int]) -> list[Handle]:
        """Handles of these segments and joints alone: while one is pulled there are others every time."""
        sketch = self._drawing.sketch
        last = -1 if sketch is None else len(sketch.member.project.segments)
        return [] if sketch is None else handles_of(sketch, frozenset(i for i in indices if i <= last))

    @property
    def way(self) -> tuple[Line, ...]:
        """What shows which part of the member a pull of the lit joint moves."""
        return self._way_of(self.lit)

    def _way_of(self, lit: Handle | None) -> tuple[Line, ...]:
        sketch = self._drawing.sketch
        if sketch is None or lit is None:
            return ()
        return way_of(sketch, lit, total_stays=self._total_stays)

    @property
    def ghost(self) -> tuple[Stroke, ...]:
        """The outlines of before."""
        return self.ghost_layer.strokes

    def set_selection(self, selection: Selection) -> None:
        """Mark the handles of what is selected."""
        self._selection = selection
        self.update()

    def light(self, key: HandleKey | None, *, total_stays: bool = False) -> None:
        """Show one handle as ready, and the way it moves the member."""
        if (key, total_stays) != (self._key, self._total_stays):
            self._key, self._total_stays = key, total_stays
            self.update()

    def show_ghost(self, sketch: Sketch | None) -> None:
        """The outlines of a sketch, dashed, or none."""
        if sketch is None:
            self.ghost_layer.show_strokes((), Box(0.0, 0.0, 0.0, 0.0))
            return
        strokes = sketch.picture.strokes
        outlines = (s for s in strokes if s.closed and s.part is not None and s.part.kind == "segment")
        self.ghost_layer.show_strokes(tuple(outlines), sketch.box(sketch.window, (-FAR, FAR)))

    def set_theme(self, theme: Theme) -> None:
        """Other colours."""
        super().set_theme(theme)
        self.ghost_layer.set_theme(theme)

    def set_rect(self, rect: QRectF) -> None:
        """Another place."""
        super().set_rect(rect)
        self.ghost_layer.set_rect(rect)

    def paint(self, painter: QPainter, _option: QStyleOptionGraphicsItem, _widget: QWidget | None) -> None:
        """Quiet marks, the way, the lit handle."""
        painter.setRenderHint(QPainter.RenderHint.Antialiasing)
        painter.setPen(QPen(colour(self._theme.select), 1.2))
        painter.setBrush(QBrush(colour(self._theme.card)))
        lit = self.lit
        for handle in self.quiet:
            painter.drawRect(QRectF(*(c - SQUARE for c in handle.centre), 2.0 * SQUARE, 2.0 * SQUARE))
        painter.setPen(QPen(colour(self._theme.select), 2.0))
        for first, last in self._way_of(lit):
            painter.drawLine(QPointF(*first), QPointF(*last))
        if lit is not None:
            self._paint_lit(painter, lit)

    def _paint_lit(self, painter: QPainter, handle: Handle) -> None:
        """Its line, and an arrow both ways along the pull."""
        select = colour(self._theme.select)
        painter.setPen(QPen(select, 2.4))
        painter.drawLine(*(QPointF(*point) for point in handle.line))
        painter.setPen(QPen(colour(self._theme.paper), 1.0))
        painter.setBrush(QBrush(select))
        centre, out = QPointF(*handle.centre), QPointF(*handle.outward)
        aside = QPointF(-out.y(), out.x())
        for side in (1.0, -1.0):
            foot = centre + side * (ARROW - 6.0) * out
            tip = centre + side * (ARROW + 1.0) * out
            painter.drawPolygon(QPolygonF([tip, foot + 5.0 * aside, foot - 5.0 * aside]))


def belongs(handle: Handle, selection: Selection) -> bool:
    """Whether a handle is one of what is selected: a segment's own and the joint at its far end."""
    if handle.kind in ("force", "stop"):
        return handle.index in selection.joints
    if handle.kind == "joint":
        return handle.index in selection.joints or handle.index - 1 in selection.segments
    return handle.index in selection.segments


def way_of(sketch: Sketch, handle: Handle, *, total_stays: bool) -> tuple[Line, ...]:
    """Which part of the member a pull of a joint moves: all beyond it, with an arrow at the end, or the two
    segments beside it, between ticks that stay.
    """
    if handle.kind != "joint":
        return ()
    last = len(sketch.member.project.segments)
    at, here = sketch.rows.chain, sketch.along(handle.index)
    if handle.index == last:
        return ()
    if total_stays:
        ends = sketch.along(handle.index - 1), sketch.along(handle.index + 1)
        ticks = [((end, at - TICK), (end, at + TICK)) for end in ends]
        return _turned(sketch, [((ends[0], at), (ends[1], at)), *ticks])
    low, high = sketch.window
    end, back = min(max(sketch.along(last), low), high), -sketch.forward * TICK
    wings = [((end, at), (end + back, at - TICK)), ((end, at), (end + back, at + TICK))]
    return _turned(sketch, [((here, at), (end, at)), *wings])


def _turned(sketch: Sketch, lines: list[Line]) -> tuple[Line, ...]:
    return tuple((sketch.point(*first), sketch.point(*last)) for first, last in lines)
