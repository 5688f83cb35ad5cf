"""A heading with names and values under it, such as the reactions of one state; read aloud as one."""

from __future__ import annotations

from PySide6.QtCore import QRectF, QSize, Qt
from PySide6.QtGui import QPainter, QPaintEvent, QPen
from PySide6.QtWidgets import QSizePolicy, QWidget

from app.gui.findings.content import Block
from app.gui.fonts import Fonts
from app.gui.theme import Theme, colour

PAD = 7.0
ABOVE = 10.0
LINE = 1.35  # of the text's height
MOST = 0.75  # of a line that its value takes where it has a name


class LinesBlock(QWidget):
    """Shows a block."""

    def __init__(self, theme: Theme, fonts: Fonts, parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self._theme = theme
        self._fonts = fonts
        self._block = Block("", ())
        self.setSizePolicy(QSizePolicy.Policy.Ignored, QSizePolicy.Policy.Fixed)

    @property
    def block(self) -> Block:
        """What it shows."""
        return self._block

    def show_block(self, block: Block) -> None:
        """Show something else."""
        self._block = block
        lines = [": ".join(filter(None, (line.name, line.value))) for line in block.lines]
        self.setAccessibleName("; ".join([block.title, *lines]))
        self.setToolTip("\n".join([block.title, *lines]))  # whole, where the panel is narrow
        self.updateGeometry()
        self.update()

    def set_theme(self, theme: Theme) -> None:
        """Other colours."""
        if theme != self._theme:
            self._theme = theme
            self.update()

    def set_fonts(self, fonts: Fonts) -> None:
        """Another font."""
        self._fonts = fonts
        self.updateGeometry()
        self.update()

    def _line_height(self) -> float:
        return LINE * self._fonts.text_height

    def sizeHint(self) -> QSize:
        """Heading and lines."""
        return QSize(240, round((1 + len(self._block.lines)) * self._line_height() + 2 * ABOVE))

    def minimumSizeHint(self) -> QSize:
        """Never lower than its lines."""
        return QSize(120, self.sizeHint().height())

    def paintEvent(self, _event: QPaintEvent) -> None:
        """A rule, the heading, the lines."""
        painter = QPainter(self)
        painter.setPen(QPen(colour(self._theme.edge), 1.0))
        painter.drawLine(round(PAD), 0, round(self.width() - PAD), 0)
        height = self._line_height()
        row = QRectF(PAD, ABOVE, self.width() - 2 * PAD, height)
        painter.setFont(self._fonts.font("strong"))
        painter.setPen(colour(self._theme.ink))
        painter.drawText(
            row, Qt.AlignmentFlag.AlignVCenter, self._fonts.elided(self._block.title, "strong", row.width())
        )
        painter.setFont(self._fonts.font("plain"))
        for line in self._block.lines:
            row.translate(0.0, height)
            painter.setPen(colour(self._theme.quiet if line.quiet else self._theme.ink))
            value = self._fonts.elided(line.value, "plain", (MOST if line.name else 1.0) * row.width())
            painter.drawText(row, Qt.AlignmentFlag.AlignVCenter | Qt.AlignmentFlag.AlignRight, value)
            room = row.width() - self._fonts.measure(value, "plain").width() - 8.0
            name = self._fonts.elided(line.name, "plain", room)
            painter.drawText(row, Qt.AlignmentFlag.AlignVCenter | Qt.AlignmentFlag.AlignLeft, name)
