"""A cure under its finding: a quiet sentence, and at its end the control that makes the change."""

from __future__ import annotations

from PySide6.QtCore import QPoint, QRectF, QSize, Qt
from PySide6.QtGui import QKeyEvent, QPainter, QPaintEvent, QPen, QResizeEvent
from PySide6.QtWidgets import QAbstractButton, QSizePolicy, QWidget

from app.cures import Cure
from app.gui.findings.row import LINES, MARK, PAD
from app.gui.fonts import Fonts
from app.gui.theme import Theme, colour
from app.units import unbroken
from app.words import tr

ROOM = 5.0  # within the frame of the control, left and right
ABOVE = 2.0


class CureLine(QAbstractButton):
    """Says a cure; a click on "Apply", Space or Enter make it. Without a cure it only says its sentence."""

    def __init__(self, theme: Theme, fonts: Fonts, parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self._theme = theme
        self._fonts = fonts
        self._sentence = ""
        self._indented = False
        self._cure: Cure | None = None
        self.setSizePolicy(QSizePolicy.Policy.Ignored, QSizePolicy.Policy.Fixed)

    @property
    def cure(self) -> Cure | None:
        """The cure that it makes."""
        return self._cure

    @property
    def sentence(self) -> str:
        """What it says."""
        return self._sentence

    def show_cure(self, sentence: str, cure: Cure | None, *, indented: bool) -> None:
        """Say something else; `indented` under a row with a mark."""
        self._sentence, self._cure, self._indented = unbroken(sentence), cure, indented
        self.setAccessibleName(tr("Apply: {cure}").format(cure=sentence) if cure else sentence)
        self.setToolTip(tr("Make this change; Undo takes it back") if cure else "")
        self.setFocusPolicy(Qt.FocusPolicy.StrongFocus if cure else Qt.FocusPolicy.NoFocus)
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

    # Measures

    def _control(self) -> QRectF:
        """Where "Apply" stands; empty without a cure."""
        if self._cure is None:
            return QRectF()
        size = self._fonts.measure(tr("Apply"), "small")
        width = size.width() + 2 * ROOM
        return QRectF(self.width() - PAD - width, ABOVE, width, size.height() + 2.0)

    def _text_rect(self) -> QRectF:
        left = PAD + (MARK * self._fonts.text_height if self._indented else 0.0)
        right = self._control().left() - ROOM if self._cure is not None else self.width() - PAD
        return QRectF(left, ABOVE + 1.0, max(right - left, 1.0), 1e4)

    def _wrapped(self) -> str:
        return self._fonts.wrapped(self._sentence, "small", self._text_rect().width())

    def _fit_height(self) -> None:
        text = self._fonts.measure(self._wrapped(), "small").height() + ABOVE + 1.0
        self.setFixedHeight(round(max(text, self._control().bottom()) + 4.5))

    def sizeHint(self) -> QSize:
        """Any width, the height that was set."""
        return QSize(240, self.height())

    # Qt's own

    def hitButton(self, point: QPoint) -> bool:
        """Only the control takes the mouse: a sentence is no button."""
        return self._control().adjusted(-3, -3, 3, 3).contains(point)

    def resizeEvent(self, event: QResizeEvent) -> None:
        """Another width wraps differently."""
        super().resizeEvent(event)
        self._fit_height()

    def keyPressEvent(self, event: QKeyEvent) -> None:
        """Enter makes the change, as Space does by itself."""
        if event.key() in (Qt.Key.Key_Return, Qt.Key.Key_Enter):
            self.click()
        else:
            super().keyPressEvent(event)

    def paintEvent(self, _event: QPaintEvent) -> None:
        """The sentence, and the control in its frame."""
        painter = QPainter(self)
        painter.setRenderHint(QPainter.RenderHint.Antialiasing)
        painter.setFont(self._fonts.font("small"))
        painter.setPen(colour(self._theme.quiet))
        painter.drawText(self._text_rect(), LINES, self._wrapped())
        if self._cure is None:
            return
        focus = self.hasFocus()
        painter.setPen(
            QPen(colour(self._theme.select if focus else self._theme.joint), 2.0 if focus else 1.0)
        )
        painter.setBrush(colour(self._theme.select_fill if self.isDown() else self._theme.card))
        painter.drawRoundedRect(self._control(), 3, 3)
        painter.setPen(colour(self._theme.ink))
        painter.drawText(self._control(), Qt.AlignmentFlag.AlignCenter, tr("Apply"))
