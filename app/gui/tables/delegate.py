"""How a cell is painted and typed into.

A text that is not taken in wears a sign and a wavy underline beside its colour; a utilisation wears a bar,
hatched where it is over the limit. An editor sends each keystroke on as a preview and keeps its own text when
the table is told of changes.
"""

from __future__ import annotations

from PySide6.QtCore import QEvent, QModelIndex, QObject, QPersistentModelIndex, QRect, QRectF, Qt, Signal
from PySide6.QtGui import QBrush, QColor, QFontMetrics, QKeyEvent, QPainter, QPen
from PySide6.QtWidgets import (
    QAbstractItemDelegate,
    QLineEdit,
    QStyledItemDelegate,
    QStyleOptionViewItem,
    QWidget,
)

from app.gui.tables.cell_editor import CellEditor
from app.gui.tables.model import BAR_ROLE, ERROR_ROLE, HINT_ROLE, LIT_ROLE, STALE_ROLE, TableModel
from app.gui.theme import Theme
from app.words import tr

MARGIN = 6  # px left and right of a cell's text
BAR_WIDTH = 50
BAR_HEIGHT = 8
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

    # Painting

    def paint(self, painter: QPainter, option: QStyleOptionViewItem, index: Index) -> None:
        """Ground, bar, text, mark and the frame of the current cell."""
        painter.save()
        cell = QStyleOptionViewItem(option)
        self.initStyleOption(cell, index)
        self._paint_ground(painter, cell, index)
        area = QRect(cell.rect).adjusted(MARGIN, 0, -MARGIN, 0)
        bar = index.data(BAR_ROLE)
        if bar is not None:
            self._paint_bar(painter, area, bar, stale=bool(index.data(STALE_ROLE)))
            area.setLeft(area.left() + BAR_WIDTH + 10)
        self._paint_text(painter, cell, area, index)
        if index.data(ERROR_ROLE):
            self._paint_mark(painter, cell, area)
        if bool(cell.state & cell.state.State_HasFocus):
            painter.setPen(QPen(QColor(self.theme.select), 2))
            painter.drawRect(QRect(cell.rect).adjusted(1, 1, -1, -1))
        painter.restore()

    def _paint_ground(self, painter: QPainter, cell: QStyleOptionViewItem, index: Index) -> None:
        chosen = bool(cell.state & cell.state.State_Selected) or bool(index.data(LIT_ROLE))
        painter.fillRect(cell.rect, QColor(self.theme.select_fill if chosen else self.theme.card))
        painter.setPen(QColor(self.theme.edge))
        painter.drawLine(cell.rect.bottomLeft(), cell.rect.bottomRight())

    def _paint_text(self, painter: QPainter, cell: QStyleOptionViewItem, area: QRect, index: Index) -> None:
        quiet = (
            index.data(HINT_ROLE) or index.data(STALE_ROLE) or not index.flags() & Qt.ItemFlag.ItemIsEditable
        )
        wrong = bool(index.data(ERROR_ROLE))
        painter.setPen(QColor(self.theme.over if wrong else self.theme.quiet if quiet else self.theme.ink))
        painter.setFont(cell.font)
        if wrong:
            area = area.adjusted(0, 0, -14, 0)
        text = QFontMetrics(cell.font).elidedText(cell.text, Qt.TextElideMode.ElideRight, area.width())
        total = index.data(HINT_ROLE) and index.column() > 0
        side = Qt.AlignmentFlag.AlignRight if total else Qt.AlignmentFlag.AlignLeft
        painter.drawText(area, int(Qt.AlignmentFlag.AlignVCenter | side), text)

    def _paint_mark(self, painter: QPainter, cell: QStyleOptionViewItem, area: QRect) -> None:
        """A boxed "!" at the right and a dashed underline."""
        painter.setPen(QPen(QColor(self.theme.over), 2, Qt.PenStyle.DotLine))
        painter.drawLine(area.left(), area.bottom() - 3, area.right() - 14, area.bottom() - 3)
        box = QRect(area.right() - 11, area.center().y() - 7, 14, 14)
        painter.fillRect(box, QColor(self.theme.over))
        painter.setPen(QColor(self.theme.card))
        painter.setFont(cell.font)
        painter.drawText(box, int(Qt.AlignmentFlag.AlignCenter), "!")

    def _paint_bar(self, painter: QPainter, area: QRect, bar: tuple[float, float], *, stale: bool) -> None:
        utilisation, sign = bar
        top = area.center().y() - BAR_HEIGHT / 2
        painter.fillRect(QRectF(area.left(), top, BAR_WIDTH, BAR_HEIGHT), QColor(self.theme.body_fill))
        filled = QRectF(area.left(), top, BAR_WIDTH * min(max(utilisation, 0.0), 1.0), BAR_HEIGHT)
        over = utilisation > 1
        name = "quiet" if stale else "over" if over else "tension" if sign > 0 else "compression"
        shade = QColor(getattr(self.theme, name))
        painter.fillRect(filled, QBrush(shade, Qt.BrushStyle.BDiagPattern) if over else shade)
        if over:
            painter.setPen(QPen(shade, 1.5))
            painter.drawRect(filled)

    # Typing

    def createEditor(self, parent: QWidget, _option: QStyleOptionViewItem, index: Index) -> QWidget:
        """A line with the cell's full digits; each keystroke is previewed."""
        model = index.model()
        editor = CellEditor(parent, self.theme, model.offers(index) if isinstance(model, TableModel) else ())
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
