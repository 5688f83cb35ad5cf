"""Results on the drawing as items of the scene: colours under the member's lines, displaced shape over it.

They have a place of their own so that results that are out of date can be greyed while the member, which is
not, keeps its colours; and so that the drawing costs nothing more where none of them is asked for.
"""

from __future__ import annotations

from functools import lru_cache

from PySide6.QtCore import QPointF, QRectF, Qt
from PySide6.QtGui import QBrush, QPainter, QPen, QPolygonF
from PySide6.QtWidgets import QStyleOptionGraphicsItem, QWidget

from app.drawing.frame import Detail, StopMark
from app.drawing.member import Member
from app.drawing.overlay import STEPS, Graded, displaced_factor, displacements, graded
from app.drawing.shapes import Stroke
from app.drawing.signs import GROUND, Mark
from app.drawing.tinting import Tint, Tinting, displaced_outline, legend_size, tinted
from app.gui.drawing.contacts_layer import Contacts, stop_marks
from app.gui.drawing.member_drawing import MemberDrawing
from app.gui.sheet_items import Painted
from app.gui.sheet_layout import Place
from app.gui.theme import Theme, colour, mixed
from app.looks import Looks
from app.units import format_value
from app.words import tr
from solver.arrays import FloatArray
from solver.results import Results

UNDER_Z, OVER_Z = 9.0, 11.0  # of the drawing, which has 10
DISPLACED_Z = 12.5  # over the marks of what is selected, which would hide it
STRONGEST = 0.42  # share of the ink in the darkest shade, on which marks still stand out
BEYOND = 40.0  # px, as far as the displaced shape of an end may reach out of the window


class ResultsOnDrawing:
    """What of the results lies on the drawing: chosen by `Looks`, made once for each state."""

    def __init__(self, theme: Theme, drawing: MemberDrawing) -> None:
        self._drawing = drawing
        self._looks = Looks()
        self._graded: Graded | None = None
        self._moved: FloatArray | None = None
        self._known = False
        self._factor = 0.0
        self.colours = Colours(theme)
        self.displaced = Displaced(theme)
        self.contacts = Contacts(theme, OVER_Z)
        self._marks: tuple[StopMark, ...] = ()

    @property
    def factor(self) -> float:
        """How much the displaced shape is exaggerated; 0 where there is none."""
        return self._factor

    @property
    def items(self) -> tuple[Painted, ...]:
        """What lies on the sheet."""
        return self.colours, self.colours.signs, self.contacts, self.displaced

    def set_theme(self, theme: Theme) -> None:
        """Other colours, or those of what is out of date."""
        self.colours.set_theme(theme)
        self.displaced.set_theme(theme)
        self.contacts.set_theme(theme)

    def show(self, looks: Looks, results: Results | None, state: int | None) -> None:
        """Take what is chosen of these results in a state, or of the envelope (None)."""
        self._looks, self._known = looks, results is not None
        self._graded = None if results is None else graded(results, state, looks.colour)
        single = looks.displaced and results is not None and state is not None
        self._moved = displacements(results, state) if single else None
        self._marks = ()
        if results is not None and state is not None:
            self._marks = stop_marks(results, state, results.project.display.unit_system)

    def place(self, member: Member, place: Place) -> None:
        """Tell the drawing what room is needed and lie on what it lays out there."""
        moved = self._moved
        fits = moved is not None and len(moved) == len(member.position)
        self._factor = displaced_factor(member, place.ruler, moved) if fits else 0.0
        legend = (0.0, 0.0)
        if self._graded is not None:
            legend = legend_size(member, place.frame, self._graded)
        self._drawing.set_detail(
            Detail(
                hollow=self._graded is not None,
                words=self._words(member),
                legend=legend,
                contacts=self._marks,
            )
        )
        self._lie_on(member, place)

    def _lie_on(self, member: Member, place: Place) -> None:
        frame, picture = self._drawing.frame, self._drawing.picture
        found = Tinting() if self._graded is None else tinted(member, frame, picture, self._graded)
        self.colours.show_tinting(found, place)
        strokes: tuple[Stroke, ...] = ()
        if self._factor and self._moved is not None:
            strokes = displaced_outline(member, frame, picture, self._moved, self._factor)
        self.displaced.show_strokes(strokes, place)
        self.contacts.show_contacts(picture, place)

    def _words(self, member: Member) -> str:
        """How much the displaced shape is exaggerated, or why there is none."""
        if not (self._looks.displaced and self._known):
            return ""
        if self._moved is None:
            return tr("displaced shape: choose a single state at Show")
        if not self._factor:
            return tr("displaced shape: no joint moves")
        factor = format_value(self._factor, "factor", member.system, strip=True)
        return tr("displaced ×{factor}").format(factor=factor)


class Colours(Painted):
    """Tinted stretches, signs and the scale, under the lines of the drawing."""

    def __init__(self, theme: Theme) -> None:
        super().__init__(theme, UNDER_Z)
        self.tinting = Tinting()
        self._place: Place | None = None
        self.setCacheMode(self.CacheMode.DeviceCoordinateCache)  # the cursor moves over it
        self.signs = Signs(theme)

    def set_theme(self, theme: Theme) -> None:
        """Other colours."""
        super().set_theme(theme)
        self.signs.set_theme(theme)

    def show_tinting(self, tinting: Tinting, place: Place) -> None:
        """Paint these and nothing else."""
        self.setVisible(bool(tinting.tints))
        if tinting != self.tinting or place != self._place:
            self.tinting, self._place = tinting, place
            self.signs.show_marks(tinting.marks, place)
            self.set_rect(place.rect)

    def paint(self, painter: QPainter, _option: QStyleOptionGraphicsItem, _widget: QWidget | None) -> None:
        """Fills without edges, those over the limit hatched, then the numbers of the scale."""
        if self._place is None:
            return
        painter.setPen(Qt.PenStyle.NoPen)
        painter.setClipRect(_window(self._place))
        for tint in self.tinting.tints:
            self._paint_tint(painter, tint)
        painter.setClipping(False)
        for tint in self.tinting.scale:
            self._paint_tint(painter, tint)
        for text in self.tinting.texts:
            painter.setFont(self._place.fonts.font(text.face))
            painter.setPen(colour(getattr(self._theme, text.ink)))
            box = text.box
            rect = QRectF(box.left, box.top, box.right - box.left, box.bottom - box.top)
            painter.drawText(rect, Qt.AlignmentFlag.AlignCenter | Qt.TextFlag.TextDontClip, text.text)

    def _paint_tint(self, painter: QPainter, tint: Tint) -> None:
        shape = QPolygonF([QPointF(x, y) for x, y in tint.points])
        ink = self._theme.tension if tint.sign > 0 else self._theme.compression
        painter.setBrush(_shade(ink, self._theme.paper, tint.step))
        painter.drawPolygon(shape)
        if tint.over:
            painter.setBrush(QBrush(colour(self._theme.over), Qt.BrushStyle.BDiagPattern))
            painter.drawPolygon(shape)
        if tint.unchecked:
            painter.setBrush(QBrush(colour(self._theme.joint), Qt.BrushStyle.FDiagPattern))
            painter.drawPolygon(shape)


class Signs(Painted):
    """+ and − on grounds of their own, over the axis line of the drawing."""

    def __init__(self, theme: Theme) -> None:
        super().__init__(theme, OVER_Z)
        self._marks: tuple[Mark, ...] = ()
        self._place: Place | None = None

    def show_marks(self, marks: tuple[Mark, ...], place: Place) -> None:
        """Paint these and nothing else."""
        self._marks, self._place = marks, place
        self.setVisible(bool(marks))
        self.set_rect(place.rect)

    def paint(self, painter: QPainter, _option: QStyleOptionGraphicsItem, _widget: QWidget | None) -> None:
        """A round ground and the sign in it."""
        if self._place is None:
            return
        painter.setRenderHint(QPainter.RenderHint.Antialiasing)
        painter.setFont(self._place.fonts.font("mark"))
        for mark in self._marks:
            centre = QPointF(*mark.centre)
            painter.setPen(Qt.PenStyle.NoPen)
            painter.setBrush(colour(self._theme.card))
            painter.drawEllipse(centre, GROUND, GROUND)
            painter.setPen(colour(self._theme.tension if mark.sign > 0 else self._theme.compression))
            rect = QRectF(centre.x() - GROUND, centre.y() - GROUND, 2.0 * GROUND, 2.0 * GROUND)
            flags = Qt.AlignmentFlag.AlignCenter | Qt.TextFlag.TextDontClip
            painter.drawText(rect, flags, "+" if mark.sign > 0 else "−")


class Displaced(Painted):
    """The displaced outline, thin, over the drawing."""

    def __init__(self, theme: Theme) -> None:
        super().__init__(theme, DISPLACED_Z)
        self.strokes: tuple[Stroke, ...] = ()
        self._place: Place | None = None
        self.setCacheMode(self.CacheMode.DeviceCoordinateCache)  # the cursor moves over it

    def show_strokes(self, strokes: tuple[Stroke, ...], place: Place) -> None:
        """Paint these and nothing else."""
        self.setVisible(bool(strokes))
        self.strokes, self._place = strokes, place
        if strokes:
            self.set_rect(place.rect)

    def paint(self, painter: QPainter, _option: QStyleOptionGraphicsItem, _widget: QWidget | None) -> None:
        """In the colour of displacement."""
        if self._place is None:
            return
        painter.setRenderHint(QPainter.RenderHint.Antialiasing)
        painter.setClipRect(
            _window(self._place, BEYOND)
        )  # where the member goes on it is cut like the member
        for stroke in self.strokes:
            painter.setPen(QPen(colour(self._theme.displacement), stroke.width))
            painter.drawPolygon([QPointF(x, y) for x, y in stroke.points])


def _window(place: Place, beyond: float = 0.0) -> QRectF:
    """What the ruler shows, and some pixels on the sides where the member ends there."""
    ruler = place.ruler
    forward = 1.0 if ruler.end > ruler.begin else -1.0
    first = ruler.begin - forward * beyond * ruler.holds(0.0)
    last = ruler.end + forward * beyond * ruler.holds(ruler.length)
    low, high = sorted((first, last))
    return place.axes.rect((low, high), place.axes.across_of(place.rect))


@lru_cache(64)
def _shade(ink: str, paper: str, step: int) -> QBrush:
    return QBrush(colour(mixed(ink, paper, STRONGEST * step / STEPS)))
