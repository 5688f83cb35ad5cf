"""How a cell is painted and typed into.

A text that is not taken in wears a sign and a wavy underline beside its colour; a utilisation wears a bar,
hatched where it is over the limit. An editor sends each keystroke on as a preview and keeps its own text when
the table is told of changes.
"""

from __future__ import annotations

from PySide6.QtCore import (
    QEvent,
    QModelIndex,
    QObject,
    QPersistentModelIndex,
    QPointF,
    QRect,
    QRectF,
    Qt,
    Signal,
)
from PySide6.QtGui import QBrush, QFont, QKeyEvent, QPainter, QPen, QStaticText, QTransform
from PySide6.QtWidgets import (
    QAbstractItemDelegate,
    QLineEdit,
    QStyle,
    QStyledItemDelegate,
    QStyleOptionViewItem,
    QWidget,
)

from app.gui.tables.cell_editor import CellEditor
from app.gui.tables.model import Look, TableModel
from app.gui.theme import Theme, colour
from app.words import tr

MARGIN = 6  # px left and right of a cell's text
BAR_WIDTH = 50
BAR_HEIGHT = 8
SELECTED = QStyle.StateFlag.State_Selected.value  # as numbers: flags of enums are slow to combine
FOCUSED = QStyle.StateFlag.State_HasFocus.value
MOST_LINES = 8192  # texts that are kept laid out
ENTER = (Qt.Key.Key_Return, Qt.Key.Key_Enter)

Index = QModelIndex | QPersistentModelIndex


class CellDelegate(QStyledItemDelegate):
    """Paints cells by the model's roles, in the theme's colours."""

    stepped = Signal(int)  # Enter in an editor: rows to move by
    began = Signal()  # a cell is being typed into
    meant_for_all = Signal(str)  # Ctrl+Enter: the text, for all chosen cells of the column

    def __init__(self, theme: Theme, parent: QObject | None = None) -> None:
        super().__init__(parent)
        self.theme = theme
        self._font: QFont | None = None  # of the lines that are kept
        self._lines: dict[tuple[str, int], QStaticText] = {}

    # Painting

    def paint(self, painter: QPainter, option: QStyleOptionViewItem, index: Index) -> None:
        """Ground, bar, text, mark and the frame of the current cell.

        The model is asked once for all of it: some dozens of cells are painted at every step of a pull.
        """
        model = index.model()
        if not isinstance(model, TableModel):
            super().paint(painter, option, index)
            return
        look, state = model.look(index), option.state.value
        painter.save()
        chosen = look.lit or bool(state & SELECTED)
        self._paint_ground(painter, option.rect, chosen=chosen)
        area = option.rect.adjusted(MARGIN, 0, -MARGIN, 0)
        if look.bar is not None:
            self._paint_bar(painter, area, look.bar, stale=look.stale)
            area.setLeft(area.left() + BAR_WIDTH + 10)
        self._paint_text(painter, option, area, look)
        if look.error:
            self._paint_mark(painter, option, area)
        if state & FOCUSED:
            painter.setPen(QPen(colour(self.theme.select), 2))
            painter.drawRect(option.rect.adjusted(1, 1, -1, -1))
        painter.restore()

    def _paint_ground(self, painter: QPainter, rect: QRect, *, chosen: bool) -> None:
        painter.fillRect(rect, colour(self.theme.select_fill if chosen else self.theme.card))
        painter.setPen(colour(self.theme.edge))
        painter.drawLine(rect.bottomLeft(), rect.bottomRight())

    def _paint_text(self, painter: QPainter, cell: QStyleOptionViewItem, area: QRect, look: Look) -> None:
        wrong, quiet = bool(look.error), look.hint or look.stale or not look.for_typing
        painter.setPen(colour(self.theme.over if wrong else self.theme.quiet if quiet else self.theme.ink))
        painter.setFont(cell.font)
        if wrong:
            area = area.adjusted(0, 0, -14, 0)
        line = self._laid_out(look.text, area.width(), cell)
        left = area.right() - line.size().width() if look.sum else area.left()
        painter.drawStaticText(QPointF(left, area.center().y() + 1 - 0.5 * line.size().height()), line)

    def _laid_out(self, text: str, width: int, cell: QStyleOptionViewItem) -> QStaticText:
        """A text cut to a width, kept: laying it out is what takes time, and most stay as they are."""
        if cell.font != self._font or len(self._lines) > MOST_LINES:
            self._font = QFont(cell.font)
            self._lines.clear()
        line = self._lines.get((text, width))
        if line is None:
            line = QStaticText(cell.fontMetrics.elidedText(text, Qt.TextElideMode.ElideRight, width))
            line.setTextFormat(Qt.TextFormat.PlainText)
            line.prepare(QTransform(), cell.font)
            self._lines[text, width] = line
        return line

    def _paint_mark(self, painter: QPainter, cell: QStyleOptionViewItem, area: QRect) -> None:
        """A boxed "!" at the right and a dashed underline."""
        painter.setPen(QPen(colour(self.theme.over), 2, Qt.PenStyle.DotLine))
        painter.drawLine(area.left(), area.bottom() - 3, area.right() - 14, area.bottom() - 3)
        box = QRect(area.right() - 11, area.center().y() - 7, 14, 14)
        painter.fillRect(box, colour(self.theme.over))
        painter.setPen(colour(self.theme.card))
        painter.setFont(cell.font)
        painter.drawText(box, int(Qt.AlignmentFlag.AlignCenter), "!")

    def _paint_bar(self, painter: QPainter, area: QRect, bar: tuple[float, float], *, stale: bool) -> None:
        utilisation, sign = bar
        top = area.center().y() - BAR_HEIGHT / 2
        painter.fillRect(QRectF(area.left(), top, BAR_WIDTH, BAR_HEIGHT), colour(self.theme.body_fill))
        filled = QRectF(area.left(), top, BAR_WIDTH * min(max(utilisation, 0.0), 1.0), BAR_HEIGHT)
        over = utilisation > 1
        name = "quiet" if stale else "over" if over else "tension" if sign > 0 else "compression"
        shade = colour(getattr(self.theme, name))
        painter.fillRect(filled, QBrush(shade, Qt.BrushStyle.BDiagPattern) if over else shade)
        if over:
            painter.setPen(QPen(shade, 1.5))
            painter.drawRect(filled)

    # Typing

    def createEditor(self, parent: QWidget, _option: QStyleOptionViewItem, index: Index) -> QWidget:
        """A line with the cell's full digits; each keystroke is previewed."""
        model = index.model()
        offered = (model.offers(index), model.separator(index)) if isinstance(model, TableModel) else ()
        editor = CellEditor(parent, self.theme, *offered)
        editor.setTextMargins(MARGIN - 5, 0, 0, 0)
        editor.picked.connect(lambda: self._take_in(editor))
        if isinstance(model, TableModel):
            name = tr("{column}, row {row}")
            editor.setAccessibleName(name.format(column=model.titled(index.column()), row=index.row() + 1))
            kept = QPersistentModelIndex(index)
            for typed in (editor.textEdited, editor.offered):
                typed.connect(lambda text: model.preview(kept, text) if kept.isValid() else None)
            self.began.emit()
        return editor

    def setEditorData(self, editor: QWidget, index: Index) -> None:
        """Fill a fresh editor; one that is being typed into keeps its text."""
        if isinstance(editor, QLineEdit) and not editor.isModified():
            editor.setText(index.data(Qt.ItemDataRole.EditRole) or "")

    def setModelData(self, editor: QWidget, model: TableModel, index: Index) -> None:
        """Commit the text."""
        if isinstance(editor, QLineEdit):
            model.setData(index, editor.text())

    def eventFilter(self, editor: QObject, event: QEvent) -> bool:
        """Enter commits and moves down (up with Shift), with Ctrl into all chosen cells; the rest is Qt's."""
        pressed = isinstance(event, QKeyEvent) and event.type() == QEvent.Type.KeyPress
        if pressed and event.key() in ENTER and isinstance(editor, QWidget):
            self._on_enter(editor, event.modifiers())
            return True
        return super().eventFilter(editor, event)

    def _on_enter(self, editor: QWidget, modifiers: Qt.KeyboardModifier) -> None:
        if modifiers & Qt.KeyboardModifier.ControlModifier and isinstance(editor, QLineEdit):
            text = editor.text()
            self.closeEditor.emit(editor, QAbstractItemDelegate.EndEditHint.RevertModelCache)
            self.meant_for_all.emit(text)
            return
        self._take_in(editor)
        self.stepped.emit(-1 if modifiers & Qt.KeyboardModifier.ShiftModifier else 1)

    def _take_in(self, editor: QWidget) -> None:
        self.commitData.emit(editor)
        self.closeEditor.emit(editor, QAbstractItemDelegate.EndEditHint.NoHint)
