"""The list of names below (or above) a cell that is being typed into.

It only shows and takes clicks: the keyboard stays in the cell, so Enter, Escape and Tab do there what they
always do. It is a part of the window rather than a window of its own, which would have to fight for focus.
"""

from __future__ import annotations

from typing import Any

from PySide6.QtCore import (
    QAbstractListModel,
    QModelIndex,
    QObject,
    QPersistentModelIndex,
    QPoint,
    QRect,
    QSize,
    Qt,
)
from PySide6.QtGui import QColor, QPainter
from PySide6.QtWidgets import QListView, QStyle, QStyledItemDelegate, QStyleOptionViewItem, QWidget

from app.gui.tables.column import Offer
from app.gui.theme import Theme
from app.words import tr

MOST_ROWS = 8  # seen at once; the rest is scrolled to
LEAST_WIDTH = 120  # px, where its cell is as wide
ROW_HEIGHT = 24  # px at least, the smallest that WCAG 2.5.8 calls easy to hit
MARGIN = 6  # px left and right, as in a cell
GAP = 18  # px between a name and its remark
REMARK_ROLE = int(Qt.ItemDataRole.UserRole) + 1

Index = QModelIndex | QPersistentModelIndex
NONE = QModelIndex()


class OfferModel(QAbstractListModel):
    """The names with their remarks, which are read aloud with them."""

    def __init__(self, parent: QObject) -> None:
        super().__init__(parent)
        self.offers: tuple[Offer, ...] = ()

    def show(self, offers: tuple[Offer, ...]) -> None:
        """Other names."""
        self.beginResetModel()
        self.offers = offers
        self.endResetModel()

    def rowCount(self, parent: Index = NONE) -> int:
        """One row a name."""
        return 0 if parent.isValid() else len(self.offers)

    def data(self, index: Index, role: int = Qt.ItemDataRole.DisplayRole) -> Any:
        """The name, its remark, or both for a screen reader."""
        if not index.isValid():
            return None
        offer = self.offers[index.row()]
        if role == Qt.ItemDataRole.DisplayRole:
            return offer.name
        if role == REMARK_ROLE:
            return offer.remark
        return offer.spoken if role == Qt.ItemDataRole.AccessibleTextRole else None


class OfferDelegate(QStyledItemDelegate):
    """Paints the name at the left and its remark quietly at the right."""

    def __init__(self, theme: Theme, parent: QObject) -> None:
        super().__init__(parent)
        self._theme = theme

    def sizeHint(self, option: QStyleOptionViewItem, _index: Index) -> QSize:
        """High enough to be clicked; the list is as wide as it is."""
        return QSize(0, max(ROW_HEIGHT, option.fontMetrics.height() + 6))

    def paint(self, painter: QPainter, option: QStyleOptionViewItem, index: Index) -> None:
        """One row; the current one wears a bar at its left beside its colour."""
        painter.save()
        current = bool(option.state & QStyle.StateFlag.State_Selected)
        painter.fillRect(option.rect, QColor(self._theme.select_fill if current else self._theme.card))
        if current:
            edge = QRect(option.rect)
            edge.setWidth(3)
            painter.fillRect(edge, QColor(self._theme.select))
        area = QRect(option.rect).adjusted(MARGIN, 0, -MARGIN, 0)
        middle = Qt.AlignmentFlag.AlignVCenter
        painter.setFont(option.font)
        painter.setPen(QColor(self._theme.ink))
        painter.drawText(area, int(middle | Qt.AlignmentFlag.AlignLeft), index.data())
        painter.setPen(QColor(self._theme.quiet))
        painter.drawText(area, int(middle | Qt.AlignmentFlag.AlignRight), index.data(REMARK_ROLE))
        painter.restore()


class OfferList(QListView):
    """The names that match what stands in the cell."""

    def __init__(self, theme: Theme, cell: QWidget) -> None:
        super().__init__(cell.window())
        self.setObjectName("offers")
        self.setAccessibleName(tr("Names to choose from"))
        self._cell = cell
        self._offers = OfferModel(self)
        self.setModel(self._offers)
        self.setItemDelegate(OfferDelegate(theme, self))
        self.setFocusPolicy(Qt.FocusPolicy.NoFocus)
        self.setEditTriggers(QListView.EditTrigger.NoEditTriggers)
        self.setUniformItemSizes(True)
        self.setHorizontalScrollBarPolicy(Qt.ScrollBarPolicy.ScrollBarAlwaysOff)
        self.setFont(cell.font())
        self.setStyleSheet(
            f"QListView#offers {{ background: {theme.card}; color: {theme.ink};"
            f" border: 1px solid {theme.joint}; }}"
        )

    @property
    def offers(self) -> tuple[Offer, ...]:
        """What is offered now."""
        return self._offers.offers

    def show_offers(self, offers: tuple[Offer, ...]) -> None:
        """Show these with none chosen; hide where there are none."""
        self._offers.show(offers)
        self.setVisible(bool(offers))
        if offers:
            self.place()
            self.raise_()

    def choose(self, row: int) -> None:
        """Make a row the chosen one; −1 for none."""
        self.setCurrentIndex(self._offers.index(row) if row >= 0 else QModelIndex())

    def place(self) -> None:
        """Below the cell, or above it where there is more room; never beyond the window."""
        window, cell = self.parentWidget(), self._cell
        corner = cell.mapTo(window, QPoint(0, 0))
        above, below = corner.y(), window.height() - corner.y() - cell.height()
        wanted = min(len(self.offers), MOST_ROWS) * self.sizeHintForRow(0) + 2 * self.frameWidth()
        upwards = below < wanted and above > below
        height = min(wanted, above if upwards else below)
        width = min(max(self._width_of_texts(), min(cell.width(), LEAST_WIDTH)), window.width())
        left = max(min(corner.x(), window.width() - width), 0)
        top = corner.y() - height if upwards else corner.y() + cell.height()
        self.setGeometry(left, top, width, height)

    def _width_of_texts(self) -> int:
        text = self.fontMetrics().horizontalAdvance
        widest = max(text(offer.name) + GAP + text(offer.remark) for offer in self.offers)
        scrolling = self.verticalScrollBar().sizeHint().width() if len(self.offers) > MOST_ROWS else 0
        return widest + 2 * MARGIN + 2 * self.frameWidth() + scrolling
