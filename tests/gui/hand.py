"""What a hand does at a table, as real key events."""

from PySide6.QtCore import Qt
from PySide6.QtTest import QTest
from PySide6.QtWidgets import QLineEdit

from app.gui.tables.view import TableView


def cell(view: TableView, row: int, key: str):
    """The index of a row's cell in the column called `key`."""
    column = next(i for i, c in enumerate(view.table_model.columns) if c.key == key)
    return view.table_model.index(row, column)


def go_to(view: TableView, row: int, key: str) -> None:
    """Make a cell the current one."""
    view.setCurrentIndex(cell(view, row, key))


def editor(view: TableView) -> QLineEdit:
    """The open editor."""
    (found,) = [line for line in view.findChildren(QLineEdit) if line.isVisible()]
    return found


def begin(view: TableView, text: str) -> QLineEdit:
    """Type into the current cell, leaving the editor open."""
    QTest.keyClicks(view, text[0])
    line = editor(view)
    QTest.keyClicks(line, text[1:])
    return line


def enter(view: TableView, row: int, key: str, text: str) -> None:
    """Type a text into a cell and press Enter."""
    go_to(view, row, key)
    QTest.keyClick(begin(view, text), Qt.Key.Key_Return)


def chord(widget, key, modifier=Qt.KeyboardModifier.ControlModifier) -> None:
    """A key with a modifier, which is let go afterwards (QTest leaves it down)."""
    QTest.keyClick(widget, key, modifier)
    QTest.keyClick(widget, Qt.Key.Key_Control)


def text_at(view: TableView, row: int, key: str) -> str:
    """What the cell shows."""
    return cell(view, row, key).data()
