"""What lies over drawing and strips: joint lines, the cursor, lines of text.

All of them are in pixels of the scene and know the member only through the ruler.
"""

from __future__ import annotations

from collections.abc import Sequence

from PySide6.QtCore import QLineF, QPointF, QRectF, Qt
from PySide6.QtGui import QPainter, QPainterPath, QPen
from PySide6.QtWidgets import QGraphicsObject, QStyleOptionGraphicsItem, QWidget

from app.drawing.ruler import Ruler
from app.gui.fonts import Fonts
from app.gui.sheet_layout import SheetLayout
from app.gui.sheet_texts import Stretch, rest_of
from app.gui.theme import Theme, colour


class Painted(QGraphicsObject):
    """Base of items that only paint: a rectangle, a theme, no mouse."""

    def __init__(self, theme: Theme, z: float) -> None:
        super().__init__()
        self._theme = theme
        self._rect = QRectF()
        self.setZValue(z)
        self.setAcceptedMouseButtons(Qt.MouseButton.NoButton)

    def set_theme(self, theme: Theme) -> None:
        """Other colours."""
        if theme != self._theme:
            self._theme = theme
            self.update()

    def set_rect(self, rect: QRectF) -> None:
        """Another place."""
        if rect != self._rect:
            self.prepareGeometryChange()
            self._rect = rect
        self.update()

    def boundingRect(self) -> QRectF:
        """The place."""
        return self._rect

    def shape(self) -> QPainterPath:
        """Empty, so that the mouse goes through."""
        return QPainterPath()


class JointLines(Painted):
    """The dotted line of every joint through drawing and strips."""

    def __init__(self, theme: Theme) -> None:
        super().__init__(theme, 5.0)
        self._lines: list[QLineF] = []
        self._of: tuple[object, ...] = ()  # what the lines follow from

    def set_joints(self, positions: Sequence[float], ruler: Ruler, layout: SheetLayout, first: float) -> None:
        """The joints of the member, on this ruler, from the pixel `first` across the sheet."""
        if (positions, ruler, layout, first) == self._of:
            return
        self._of = (positions, ruler, layout, first)
        axes, (low, high) = layout.axes, ruler.held_pixels
        last = axes.across_of(layout.strips[-1])[1]
        shown = [a for a in map(ruler.pixel, positions) if low <= a <= high]
        self._lines = [QLineF(axes.point(a, first), axes.point(a, last)) for a in shown]
        self.set_rect(layout.crossing.adjusted(-1, -1, 1, 1))

    @property
    def count(self) -> int:
        """How many lines are drawn."""
        return len(self._lines)

    def paint(self, painter: QPainter, _option: QStyleOptionGraphicsItem, _widget: QWidget | None) -> None:
        """Dotted lines, crisp."""
        painter.setRenderHint(QPainter.RenderHint.Antialiasing, False)
        painter.setPen(QPen(colour(self._theme.joint), 1.0, Qt.PenStyle.DotLine))
        painter.drawLines(self._lines)


class CursorLine(Painted):
    """The one cursor, across everything."""

    def __init__(self, theme: Theme) -> None:
        super().__init__(theme, 20.0)
        self._line: tuple[QPointF, QPointF] | None = None
        self._drawn: list[QLineF] = []

    def set_pixel(self, along: float | None, layout: SheetLayout, gaps: Sequence[Stretch] = ()) -> None:
        """The cursor's pixel along the axis, or None where it is not shown; texts stand in the gaps."""
        across, axes = layout.axes.across_of(layout.crossing), layout.axes
        self._line, self._drawn = None, []
        if along is not None:
            self._line = (axes.point(along, across[0]), axes.point(along, across[1]))
            shown = rest_of(across, gaps)
            self._drawn = [QLineF(axes.point(along, low), axes.point(along, high)) for low, high in shown]
        self.setVisible(along is not None)
        if self._line is not None:
            self.set_rect(QRectF(*self._line).normalized().adjusted(-2, -2, 2, 2))

    @property
    def line(self) -> tuple[QPointF, QPointF] | None:
        """The line's ends, or None."""
        return self._line

    @property
    def drawn(self) -> list[QLineF]:
        """What is drawn of it, between the texts."""
        return self._drawn

    def paint(self, painter: QPainter, _option: QStyleOptionGraphicsItem, _widget: QWidget | None) -> None:
        """One crisp line, with gaps; its caps would fill them."""
        pen = QPen(colour(self._theme.select), 1.4, Qt.PenStyle.SolidLine, Qt.PenCapStyle.FlatCap)
        painter.setPen(pen)
        painter.drawLines(self._drawn)


class Message(Painted):
    """Lines of text on a ground: the readout, "out of date", or why there is nothing to show."""

    def __init__(self, theme: Theme, ground: str = "panel", ink: str = "ink", z: float = 15.0) -> None:
        super().__init__(theme, z)
        self._ground, self._ink = ground, ink
        self._text = ""
        self._fonts: Fonts | None = None

    @property
    def text(self) -> str:
        """What it says."""
        return self._text

    @property
    def boxes(self) -> list[QRectF]:
        """Where it stands; empty while it says nothing."""
        return [self._rect] if self._text else []

    def set_text(self, text: str, fonts: Fonts) -> None:
        """Say something else; nothing where empty."""
        self._text, self._fonts = text, fonts
        self.setVisible(bool(text))
        self.update()

    def paint(self, painter: QPainter, _option: QStyleOptionGraphicsItem, _widget: QWidget | None) -> None:
        """Ground and text."""
        if self._fonts is None:
            return
        painter.fillRect(self._rect, colour(getattr(self._theme, self._ground)))
        painter.setFont(self._fonts.font("plain"))
        painter.setPen(colour(getattr(self._theme, self._ink)))
        flags = Qt.AlignmentFlag.AlignVCenter | Qt.TextFlag.TextDontClip
        painter.drawText(self._rect.adjusted(8, 0, -8, 0), flags, self._text)
