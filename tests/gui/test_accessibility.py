"""Qt's accessibility tree of the real window and its dialogs, walked as a screen reader walks it."""

from __future__ import annotations

from dataclasses import dataclass
from types import SimpleNamespace

import pytest
from PySide6.QtCore import Qt
from PySide6.QtGui import QAccessible, QAccessibleInterface
from PySide6.QtTest import QTest
from PySide6.QtWidgets import QDialog, QWidget

from app.gui.dialogs import ask_unsaved
from app.gui.view import Selection
from tests.gui.hand import begin, go_to
from tests.gui.windows import finish, solved

ROLE, TEXT = QAccessible.Role, QAccessible.Text
# Roles that say nothing of what a control does; nothing that can take the keyboard may have one of them.
VAGUE = {ROLE.NoRole, ROLE.Client, ROLE.Pane, ROLE.Grouping, ROLE.Whitespace, ROLE.LayeredPane, ROLE.Border}
# Qt knows no role for these; the tab bar, the findings' buttons and the sheet's description speak for them.
WITHOUT_ROLE = {"QTabWidget", "FindingsPanel", "SheetView", "qt_scrollarea_viewport"}
# Parts of Qt's own controls that a screen reader meets under the name of the control itself.
SILENT = {ROLE.ScrollBar, ROLE.Splitter, ROLE.Grip, ROLE.Separator, ROLE.Border, ROLE.Indicator}


@dataclass(frozen=True)
class Node:
    """What a screen reader is told; plain, as an interface kept longer than its object is a trap."""

    thing: str
    role: QAccessible.Role
    name: str
    focusable: bool


def walk(interface: QAccessibleInterface):
    """An interface and all below it that can be seen."""
    widget = interface.object()
    parent = widget.parent() if widget is not None else None
    thing = f"{type(widget).__name__} {widget.objectName() if widget else ''} in {type(parent).__name__}"
    yield Node(thing, interface.role(), interface.text(TEXT.Name).strip(), bool(interface.state().focusable))
    for place in range(interface.childCount()):
        child = interface.child(place)
        if child is not None and child.isValid() and not child.state().invisible:
            yield from walk(child)


def tree(widget: QWidget) -> list[Node]:
    found = QAccessible.queryAccessibleInterface(widget)
    assert found is not None
    return list(walk(found))


def nameless(nodes: list[Node]) -> list[str]:
    return [node.thing for node in nodes if node.focusable and node.role not in SILENT and not node.name]


def vague(nodes: list[Node]) -> list[str]:
    return [
        node.thing
        for node in nodes
        if node.focusable and node.role in VAGUE and not set(node.thing.split()) & WITHOUT_ROLE
    ]


@pytest.mark.parametrize("tab", range(6))
def test_every_control_of_the_window_has_a_name_and_a_role(window, tab):
    window.tables.tabs.setCurrentIndex(tab)
    found = tree(window)
    assert len(found) > 60
    assert nameless(found) == []
    assert vague(found) == []


def test_an_open_editor_says_which_cell_it_is(window, table):
    go_to(table, 1, "length")
    line = begin(table, "7")
    assert nameless(tree(window)) == []
    assert tree(line)[0].name.startswith("Length (mm)")
    QTest.keyClick(line, Qt.Key.Key_Escape)


@pytest.mark.parametrize("key", ["title_block", "help", "about", "log"])
def test_every_control_of_a_dialog_has_a_name_and_a_role(qtbot, window, key):
    window.actions_by_key[key].trigger()
    (dialog,) = [dialog for dialog in window.findChildren(QDialog) if dialog.isVisible()]
    found = tree(dialog)
    assert len(found) > 3
    assert nameless(found) == []
    assert vague(found) == []
    finish(qtbot, dialog, dialog.reject)


def test_a_question_has_names(qtbot, window):
    box = ask_unsaved(window, "rod", lambda _answer: None)
    assert nameless(tree(box)) == []
    finish(qtbot, box, box.reject)


@pytest.mark.parametrize("tab", range(6))
def test_cells_and_headings_of_every_table_are_read(window, tab):
    window.tables.tabs.setCurrentIndex(tab)
    nodes = tree(window.tables.current_view())
    assert nodes[0].role == ROLE.Table
    assert ROLE.Cell in {node.role for node in nodes}
    headings = [node.name for node in nodes if node.role == ROLE.ColumnHeader]
    assert headings
    assert all(headings)


def test_every_finding_is_a_button_that_says_its_whole_sentence(window):
    for row in window.findings.rows:
        (node,) = tree(row)
        assert node.role == ROLE.Button
        assert len(node.name) > 10


# The sheet


def described(window) -> str:
    return QAccessible.queryAccessibleInterface(window.sheet).text(TEXT.Description)


def test_the_sheet_says_the_member_the_verdict_and_the_state(window):
    text = described(window)
    project = window.document.project
    assert f"{len(project.segments)} segments" in text
    assert window.findings.headline in text
    assert window.view.shown.name in text


def test_the_sheet_says_what_is_selected_and_the_readout(window):
    window.view.set_selection(Selection(segments=frozenset((1,))))
    assert f"segment {window.document.project.segments[1].mark}" in described(window)
    window.sheet.setFocus()
    QTest.keyClick(window.sheet, Qt.Key.Key_Right, Qt.KeyboardModifier.ControlModifier)
    QTest.keyClick(window.sheet, Qt.Key.Key_Control)
    assert window.sheet.readout
    assert window.sheet.readout.split()[1] in described(window)


def test_results_that_are_out_of_date_are_said_to_be_so(qtbot, window, table):
    go_to(table, 1, "length")
    table.setFocus()
    line = begin(table, "x")
    QTest.keyClick(line, Qt.Key.Key_Return)
    qtbot.waitUntil(lambda: not window.showing.current)
    assert "out of date" in described(window)
    window.actions_by_key["undo"].trigger()
    solved(qtbot, window)
    assert "out of date" not in described(window)


def test_a_screen_reader_is_told_of_the_cursor_only_while_the_sheet_has_the_keyboard(window, monkeypatch):
    told = []
    tell = SimpleNamespace(Event=QAccessible.Event, updateAccessibility=told.append)
    monkeypatch.setattr("app.gui.sheet_voice.QAccessible", tell)
    window.tables.views["segments"].setFocus()
    window.sheet._move_cursor(0.3)
    assert told == []
    window.sheet.setFocus()
    told.clear()
    QTest.keyClick(window.sheet, Qt.Key.Key_End)
    assert len(told) == 1
