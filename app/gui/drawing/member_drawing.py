"""The drawing as an interactive item of the scene: paints a picture, says what is under the mouse.

Knows parts by kind and index only; what a click does is up to whoever listens.
"""

from __future__ import annotations

from collections.abc import Iterable, Mapping
from dataclasses import replace
from functools import lru_cache

from PySide6.QtCore import QPointF, QRectF, Qt, Signal
from PySide6.QtGui import QBrush, QPainter, QPen
from PySide6.QtWidgets import (
    QApplication,
    QGraphicsObject,
    QGraphicsSceneHoverEvent,
    QGraphicsSceneMouseEvent,
    QStyleOptionGraphicsItem,
    QWidget,
)

from app.beside import beside
from app.drawing.companions import joints_of, pieces_of
from app.drawing.frame import Detail, Frame
from app.drawing.handles import Handle, handles_of
from app.drawing.layout import sketched
from app.drawing.member import Member
from app.drawing.shapes import Box, Circle, Part, Picture, Stroke, Target, body_of
from app.drawing.sketch import Sketch
from app.drawing.tips import tip
from app.gui.drawing.draft_marks import paint_marks
from app.gui.drawing.outlines import paint_lit, paint_selected_joints, paint_thing
from app.gui.fonts import Fonts
from app.gui.sheet_layout import Place
from app.gui.theme import Theme, colour
from app.gui.view import Selection


class MemberDrawing(QGraphicsObject):
    """The member with supports, loads and dimension chain."""

    clicked = Signal(object, object)  # Part, the keyboard's modifiers
    hovered = Signal(object)  # Part, or None

    def __init__(self, theme: Theme) -> None:
        super().__init__()
        self._theme = theme
        self._member: Member | None = None
        self._place: Place | None = None
        self._detail = Detail()
        self._sketch: Sketch | None = None  # None: to be made when next asked for
        self._handles: list[Handle] | None = None  # likewise
        self._held: Sketch | None = None  # whose rows and proportions are kept while something is pulled
        self._selection = Selection()
        self._under_mouse: Part | None = None
        self._drafts: Mapping[Part, str] = {}
        self._lit: Part | None = None
        self._thing: Part | None = None
        self.setZValue(10.0)
        self.setAcceptHoverEvents(True)
        self.setAcceptedMouseButtons(Qt.MouseButton.LeftButton)
        self.setCacheMode(self.CacheMode.DeviceCoordinateCache)  # the cursor moves over it

    @property
    def picture(self) -> Picture:
        """What is drawn."""
        sketch = self.sketch
        return Picture() if sketch is None else sketch.picture

    @property
    def sketch(self) -> Sketch | None:
        """The member as it is laid out; None while there is nothing to draw."""
        if self._sketch is None and self._member is not None and self._place is not None:
            self._sketch = sketched(self._member, self.frame, self._held)
        return self._sketch

    @property
    def handles(self) -> list[Handle]:
        """Where numbers can be taken hold of."""
        if self._handles is None:
            self._handles = [] if self.sketch is None else handles_of(self.sketch)
        return self._handles

    @property
    def member(self) -> Member | None:
        """What is drawn, as it was given."""
        return self._member

    def companions_at(self, x: float) -> tuple[int, ...]:
        """The segments of companions that lie beside a position, by their index among all."""
        sketch = self.sketch
        if sketch is None:
            return ()
        pixel = sketch.frame.ruler.pixel(x)
        found = (piece for piece in pieces_of(sketch) if min(piece.ends) <= pixel <= max(piece.ends))
        return tuple(piece.index for piece in found)

    def joints_beside(self, companions: Iterable[int]) -> list[int]:
        """The joints that the companions of these segments lie between."""
        if self._member is None:
            return []
        found = beside(self._member.project)
        whole = [found[index].companion for index in companions if index < len(found)]
        return [joint for companion in whole for joint in joints_of(self._member, companion)]

    def hold(self) -> None:
        """Keep rows and proportions from now on."""
        self._held = self.sketch

    def let_go(self) -> None:
        """Share the room anew."""
        self._held = None
        self._forget()

    def _forget(self) -> None:
        self._sketch = self._handles = None
        self.update()

    @property
    def frame(self) -> Frame:
        """Where it is drawn, and with what detail."""
        return replace(self._place.frame, detail=self._detail)

    @property
    def chain_edge(self) -> float:
        """The pixel across the axis where joint lines begin."""
        return self.picture.chain_edge

    def show_member(self, member: Member) -> None:
        """Draw another member, or other loads on it."""
        self._member = member
        self._forget()

    def set_place(self, place: Place) -> None:
        """Another place or another window of the ruler."""
        if place != self._place:
            self.prepareGeometryChange()
            self._place = place
            self._forget()

    def set_detail(self, detail: Detail) -> None:
        """Other things drawn beside the member."""
        if detail != self._detail:
            self._detail = detail
            self._forget()

    def set_theme(self, theme: Theme) -> None:
        """Other colours."""
        if theme != self._theme:
            self._theme = theme
            self.update()

    def set_selection(self, selection: Selection) -> None:
        """Light what is selected."""
        self._selection = selection
        self.update()

    def set_drafts(self, drafts: Mapping[Part, str]) -> None:
        """Mark the parts whose cells hold a text that was not taken in, and say why in their tooltips."""
        if drafts != self._drafts:
            self._drafts = drafts
            self.update()

    def set_lit(self, part: Part | None) -> None:
        """Light the joint or segment that a symbol would be put on, or none."""
        if part != self._lit:
            self._lit = part
            self.update()

    def set_thing(self, thing: Part | None) -> None:
        """Light a load or a support by itself instead of what it is on, or none."""
        if thing != self._thing:
            self._thing = thing
            self.update()

    def part_at(self, point: QPointF) -> Part | None:
        """The part under a point, or None."""
        target = self.picture.target_at((point.x(), point.y()))
        return None if target is None else target.part

    def label_at(self, point: QPointF) -> Target | None:
        """What is typed in place at a point, or None."""
        return self.picture.label_at((point.x(), point.y()))

    # Qt's own

    def boundingRect(self) -> QRectF:
        """The drawing's rectangle."""
        return QRectF() if self._place is None else self._place.rect

    def hoverMoveEvent(self, event: QGraphicsSceneHoverEvent) -> None:
        """Announce the part under the mouse and say it in the tooltip."""
        self._set_under_mouse(self.part_at(event.pos()))

    def hoverLeaveEvent(self, _event: QGraphicsSceneHoverEvent) -> None:
        """Announce that no part is under the mouse any more."""
        self._set_under_mouse(None)

    def _set_under_mouse(self, part: Part | None) -> None:
        if part != self._under_mouse:
            self._under_mouse = part
            self.setToolTip(self._tip(part))
            self.hovered.emit(part)

    def _tip(self, part: Part | None) -> str:
        if part is None or self._member is None:
            return ""
        drafts = [words for marked, words in self._drafts.items() if body_of(marked) == body_of(part)]
        return "\n".join([tip(self._member, part), *drafts])

    def mousePressEvent(self, event: QGraphicsSceneMouseEvent) -> None:
        """Take the mouse on a part only; elsewhere the sheet pans."""
        if self.part_at(event.pos()) is None:
            event.ignore()

    def mouseReleaseEvent(self, event: QGraphicsSceneMouseEvent) -> None:
        """A press and release in one place is a click."""
        moved = event.screenPos() - event.buttonDownScreenPos(Qt.MouseButton.LeftButton)
        part = self.part_at(event.pos())
        if part is not None and moved.manhattanLength() < QApplication.startDragDistance():
            self.clicked.emit(part, event.modifiers())

    def paint(self, painter: QPainter, _option: QStyleOptionGraphicsItem, _widget: QWidget | None) -> None:
        """Strokes, circles, texts."""
        if self._place is None:
            return
        painter.setRenderHint(QPainter.RenderHint.Antialiasing)
        self._clip(painter, self._place)
        for stroke in self.picture.strokes:
            self._paint_stroke(painter, stroke)
        painter.setClipping(False)
        for circle in self.picture.circles:
            self._paint_circle(painter, circle)
        self._paint_texts(painter, self._place.fonts)
        if self._thing is None:
            paint_selected_joints(painter, self.picture, self._selection.joints, self._theme)
        else:
            paint_thing(painter, self.picture, self._thing, self._theme)
        if self._lit is not None:
            paint_lit(painter, self.picture, self._lit, self._theme)
        paint_marks(painter, self.picture, self._drafts, self._theme, self._place.fonts.font("small"))

    def _is_selected(self, part: Part | None) -> bool:
        if part is None or self._thing is not None:
            return part is not None and part == self._thing
        if part.kind == "segment":
            return part.index in self._selection.segments
        if part.kind == "companion":
            return part.index in self._selection.companions
        return part.kind in ("support", "force") and part.index in self._selection.joints

    def _clip(self, painter: QPainter, place: Place) -> None:
        """To the window of the ruler, for the strokes that ask for it."""
        window = (place.ruler.begin, place.ruler.end)
        clip = place.axes.rect(window, place.axes.across_of(place.rect))
        painter.setClipRect(clip.adjusted(-1, -1, 1, 1))

    def _paint_stroke(self, painter: QPainter, stroke: Stroke) -> None:
        selected = self._is_selected(stroke.part)
        ink, extra = ("select", 0.8) if selected else (stroke.ink, 0.0)
        painter.setPen(_pen(getattr(self._theme, ink), stroke.width + extra, stroke.dash))
        fill = "select_fill" if selected and stroke.fill else stroke.fill
        painter.setBrush(_brush(getattr(self._theme, fill)) if fill else Qt.BrushStyle.NoBrush)
        if stroke.clip != painter.hasClipping():
            painter.setClipping(stroke.clip)
        points = [QPointF(x, y) for x, y in stroke.points]
        if stroke.pairs:
            painter.drawLines(points)
        elif stroke.closed:
            painter.drawPolygon(points)
        else:
            painter.drawPolyline(points)

    def _paint_circle(self, painter: QPainter, circle: Circle) -> None:
        painter.setPen(QPen(colour(self._theme.ink), 1.0))
        painter.setBrush(QBrush(colour(self._theme.card)))
        painter.drawEllipse(QPointF(*circle.centre), circle.radius, circle.radius)

    def _paint_texts(self, painter: QPainter, fonts: Fonts) -> None:
        worn: tuple[str, str] | None = None
        for text in self.picture.texts:
            if worn != (text.face, text.ink):
                worn = (text.face, text.ink)
                painter.setFont(fonts.font(text.face))
                painter.setPen(colour(getattr(self._theme, text.ink)))
            fonts.write(painter, text.text, text.face, _rect(text.box))


def _rect(box: Box) -> QRectF:
    return QRectF(box.left, box.top, box.right - box.left, box.bottom - box.top)


@lru_cache(256)  # a drawing has hundreds of strokes and a few pens
def _pen(ink: str, width: float, dash: tuple[float, ...]) -> QPen:
    pen = QPen(colour(ink))
    pen.setWidthF(width)
    if dash:
        pen.setDashPattern([d / pen.widthF() for d in dash])
    return pen


@lru_cache(64)
def _brush(fill: str) -> QBrush:
    return QBrush(colour(fill))
