"""A row of buttons that folds: what finds no room goes into a menu at its end, so that no window is widened.

At a large font, or in a narrow window, the pickers beside it keep their room.
"""

from __future__ import annotations

from collections.abc import Sequence

from PySide6.QtCore import QEvent, QSize, Qt
from PySide6.QtGui import QAction, QResizeEvent
from PySide6.QtWidgets import QMenu, QSizePolicy, QToolButton, QWidget

from app.words import tr

GAP = 4  # px between the parts


class FoldingRow(QWidget):
    """Buttons with their actions (rules between them have none), and one for those that are folded away."""

    def __init__(self, parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self._parts: list[tuple[QWidget, QAction | None]] = []
        self.more = QToolButton(self)
        self.more.setText(tr("More"))
        self.more.setAccessibleName(tr("More commands"))
        self.more.setAutoRaise(True)
        self.more.setFocusPolicy(Qt.FocusPolicy.NoFocus)  # what is folded is in the menus, too
        self.more.setPopupMode(QToolButton.ToolButtonPopupMode.InstantPopup)
        self.more.setMenu(QMenu(self.more))
        self.setSizePolicy(QSizePolicy.Policy.Preferred, QSizePolicy.Policy.Fixed)

    def add(self, part: QWidget, action: QAction | None = None) -> None:
        """One more at the end."""
        part.setParent(self)
        self._parts.append((part, action))
        self.updateGeometry()

    @property
    def is_empty(self) -> bool:
        """Whether there is nothing in it yet."""
        return not self._parts

    @property
    def folded(self) -> tuple[QAction, ...]:
        """The commands that are in the menu."""
        return tuple(self.more.menu().actions())

    # Measures

    def sizeHint(self) -> QSize:
        """Room for the menu's button; the row takes what others leave, and so folds before they are cut."""
        self.more.ensurePolished()
        return QSize(self.more.sizeHint().width(), self._height())

    def minimumSizeHint(self) -> QSize:
        """The same: the button is never cut."""
        return self.sizeHint()

    def _height(self) -> int:
        return max(part.sizeHint().height() for part in (self.more, *(p for p, _action in self._parts)))

    def _fitting(self) -> int:
        """How many parts have room; none stands at the end without a button behind it."""
        parts = [part for part, _action in self._parts]
        if _width(parts) <= self.width():
            return len(parts)
        room = self.width() - self.more.sizeHint().width() - GAP
        count = max(count for count in range(len(parts)) if _width(parts[:count]) <= room or not count)
        while count and self._parts[count - 1][1] is None:
            count -= 1
        return count

    def _arrange(self) -> None:
        count, left = self._fitting(), 0
        for place, (part, _action) in enumerate(self._parts):
            part.setVisible(place < count)
            if place < count:
                part.setGeometry(left, 0, part.sizeHint().width(), self.height())
                left += part.sizeHint().width() + GAP
        self.more.setVisible(count < len(self._parts))
        self.more.setGeometry(left, 0, self.more.sizeHint().width(), self.height())
        self._fill_menu([action for _part, action in self._parts[count:]])

    def _fill_menu(self, actions: Sequence[QAction | None]) -> None:
        wanted = [action for action in actions if action is not None]
        if wanted != self.more.menu().actions():
            self.more.menu().clear()
            self.more.menu().addActions(wanted)

    # Qt's own

    def resizeEvent(self, event: QResizeEvent) -> None:
        """Fold or unfold."""
        super().resizeEvent(event)
        self._arrange()

    def event(self, event: QEvent) -> bool:
        """A part has become wider or narrower, as with another font."""
        if event.type() in (QEvent.Type.LayoutRequest, QEvent.Type.FontChange, QEvent.Type.StyleChange):
            self.updateGeometry()
            self._arrange()
        return super().event(event)


def _width(parts: Sequence[QWidget]) -> int:
    return sum(part.sizeHint().width() for part in parts) + GAP * max(len(parts) - 1, 0)
