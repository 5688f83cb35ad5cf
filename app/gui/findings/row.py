"""One finding in the panel: mark, sentence, utilisation and the little scale of stress; a button."""

from __future__ import annotations

from PySide6.QtCore import QRectF, QSize, Qt, Signal
from PySide6.QtGui import QKeyEvent, QMouseEvent, QPainter, QPaintEvent, QPen, QResizeEvent
from PySide6.QtWidgets import QAbstractButton, QSizePolicy, QWidget

from app.gui.findings.content import Row
from app.gui.findings.scale import SCALE_HEIGHT, numbers_height, paint_scale
from app.gui.fonts import Face, Fonts
from app.gui.theme import Theme, colour

PAD = 7.0
MARK = 2.0  # the room of a mark, in heights of the text
LINES = Qt.TextFlag.TextDontClip | Qt.AlignmentFlag.AlignLeft | Qt.AlignmentFlag.AlignTop


class FindingRow(QAbstractButton):
    """A row; clicking it or Space chooses it, Enter or a double click goes on to what is to be changed."""

    entered = Signal()

    def __init__(self, theme: Theme, fonts: Fonts, parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self._theme = theme
        self._row: Row | None = None
        self._fonts = fonts
        self._lit = False
        self._twice = False
        self.setSizePolicy(QSizePolicy.Policy.Ignored, QSizePolicy.Policy.Fixed)

    @property
    def row(self) -> Row | None:
        """What the row says."""
        return self._row

    def show_row(self, row: Row) -> None:
        """Say something else; what leads nowhere cannot be chosen."""
        before, self._row = self._row, row
        if row == before:
            return
        self.setAccessibleName(row.spoken)
        leads = row.leads_somewhere
        if before is None or leads != before.leads_somewhere:
            self.setFocusPolicy(Qt.FocusPolicy.StrongFocus if leads else Qt.FocusPolicy.NoFocus)
            self.setCursor(Qt.CursorShape.PointingHandCursor if leads else Qt.CursorShape.ArrowCursor)
        self._fit_height()
        self.update()

    def set_theme(self, theme: Theme) -> None:
        """Other colours."""
        if theme != self._theme:
            self._theme = theme
            self.update()

    def set_fonts(self, fonts: Fonts) -> None:
        """Another font."""
        self._fonts = fonts
        self._fit_height()
        self.update()

    @property
    def is_lit(self) -> bool:
        """Whether what the row is about is selected."""
        return self._lit

    def set_lit(self, lit: bool) -> None:
        """Light the row of what is selected."""
        if lit != self._lit:
            self._lit = lit
            self.update()

    # Measures

    def _value_width(self) -> float:
        text = self._row.value if self._row else ""
        return self._fonts.measure(text, "strong").width() + 8.0 if text else 0.0

    def _text_rect(self, width: float) -> QRectF:
        indent = self._mark_width() if self._row and self._row.mark else 0.0
        return QRectF(PAD + indent, PAD, width - 2 * PAD - indent - self._value_width(), 1e4)

    def _mark_width(self) -> float:
        return MARK * self._fonts.text_height

    def _height_of(self, text: str, face: Face, width: float) -> float:
        if not text:
            return 0.0
        return self._fonts.measure(self._fonts.wrapped(text, face, width), face).height()

    def needed_height(self, width: int) -> int:
        """As high as sentence, remedy and scale need at this width."""
        if self._row is None:
            return 0
        room = self._text_rect(width).width()
        height = 2 * PAD + self._height_of(self._row.text, "plain", room)
        height += self._height_of(self._row.remedy, "small", room)
        if self._row.band is not None:
            height += SCALE_HEIGHT + (numbers_height(self._fonts) if self._row.band_named else 0.0)
        return max(round(height + 0.5), 24)

    def _fit_height(self) -> None:
        """Set the height itself: box layouts keep heights for width that they were told before a resize."""
        needed = self.needed_height(self.width())
        if needed != self.minimumHeight():
            self.setFixedHeight(needed)

    def sizeHint(self) -> QSize:
        """Any width, the height that was set."""
        return QSize(240, self.height())

    # Qt's own

    def resizeEvent(self, event: QResizeEvent) -> None:
        """Another width wraps differently."""
        super().resizeEvent(event)
        self._fit_height()

    def keyPressEvent(self, event: QKeyEvent) -> None:
        """Enter chooses, as Space does by itself, and goes on."""
        if event.key() in (Qt.Key.Key_Return, Qt.Key.Key_Enter):
            self.click()
            self.entered.emit()
        else:
            super().keyPressEvent(event)

    def mouseDoubleClickEvent(self, event: QMouseEvent) -> None:
        """The second press of a double click."""
        super().mouseDoubleClickEvent(event)
        self._twice = event.button() == Qt.MouseButton.LeftButton

    def mouseReleaseEvent(self, event: QMouseEvent) -> None:
        """After a double click, go on once the row is done with the mouse."""
        super().mouseReleaseEvent(event)
        twice, self._twice = self._twice, False
        if twice:
            self.entered.emit()

    def paintEvent(self, _event: QPaintEvent) -> None:
        """Card, mark, sentence, value, remedy, scale, focus."""
        if self._row is None:
            return
        painter = QPainter(self)
        painter.setRenderHint(QPainter.RenderHint.Antialiasing)
        self._paint_card(painter)
        self._paint_texts(painter, self._row)

    def _paint_card(self, painter: QPainter) -> None:
        rect = QRectF(self.rect()).adjusted(1, 1, -1, -1)
        hovered = self.underMouse() and self._row is not None and self._row.leads_somewhere
        if self._lit or hovered:
            painter.setPen(QPen(colour(self._theme.edge), 1.0))
            painter.setBrush(colour(self._theme.card))
            painter.drawRoundedRect(rect, 3, 3)
        if self.hasFocus():
            painter.setPen(QPen(colour(self._theme.select), 2.0))
            painter.setBrush(Qt.BrushStyle.NoBrush)
            painter.drawRoundedRect(rect, 3, 3)

    def _paint_texts(self, painter: QPainter, row: Row) -> None:
        theme, text = self._theme, self._text_rect(self.width())
        painter.setFont(self._fonts.font("strong"))
        painter.setPen(colour(theme.over if row.tone == "fail" else theme.ink))
        top = Qt.AlignmentFlag.AlignTop
        painter.drawText(
            QRectF(PAD, PAD, self.width() - 2 * PAD, 100.0), Qt.AlignmentFlag.AlignRight | top, row.value
        )
        painter.setPen(colour(theme.over if row.tone in ("not_made", "problem") else theme.ink))
        painter.drawText(QRectF(PAD, PAD, 200.0, 100.0), Qt.AlignmentFlag.AlignLeft | top, self._mark(row))
        painter.setFont(self._fonts.font("plain"))
        painter.setPen(colour(theme.ink))
        painter.drawText(text, LINES, self._fonts.wrapped(row.text, "plain", text.width()))
        foot = text.top() + self._height_of(row.text, "plain", text.width())
        if row.remedy:
            painter.setFont(self._fonts.font("small"))
            painter.setPen(colour(theme.quiet))
            remedy = self._fonts.wrapped(row.remedy, "small", text.width())
            painter.drawText(QRectF(text.left(), foot, text.width(), 1e4), LINES, remedy)
        if row.band is not None:
            room = QRectF(text.left() + 4, foot, self.width() - 2 * PAD - text.left(), SCALE_HEIGHT)
            paint_scale(painter, room, row, theme, self._fonts)

    def _mark(self, row: Row) -> str:
        """A long mark is cut to its room; the sentence for those who hear names it whole."""
        return self._fonts.elided(row.mark, "strong", self._mark_width() - 3.0)
