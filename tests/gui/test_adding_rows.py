"""The row that adds a record: Tab goes on in the row just made, and no key typed next is a command."""

import pytest
from PySide6.QtCore import Qt
from PySide6.QtGui import QGuiApplication
from PySide6.QtTest import QTest
from PySide6.QtWidgets import QToolButton

from app.gui.tables.pages import TABS
from solver.model import RoundSection
from tests.gui.hand import begin, chord, editor

KEY, SHIFT = Qt.Key, Qt.KeyboardModifier.ShiftModifier
TEXTS = {
    "segments": "300",
    "load_cases": "Storm",
    "segment_loads": "A",
    "joint_loads": "1",
    "combinations": "Stormy",
    "materials": "Brass",
}


def adding_row(window, key):
    """The table, with its adding row the current one."""
    view = window.tables.views[key]
    place = next(i for i, (_title, tables) in enumerate(TABS) if key in [t.key for t, _share in tables])
    window.tables.tabs.setCurrentIndex(place)
    view.setFocus()
    view.setCurrentIndex(view.table_model.index(view.table_model.record_rows, 0))
    return view


def adding_column(view):
    return [c.key for c in view.table_model.columns].index(view.table_model.table.adding.column)


@pytest.mark.parametrize("key", TEXTS)
def test_tab_in_an_adding_row_goes_on_in_the_row_just_made(window, key):
    view = adding_row(window, key)
    row = view.table_model.record_rows
    QTest.keyClick(begin(view, TEXTS[key]), KEY.Key_Tab)
    assert view.table_model.record_rows == row + 1
    assert (view.currentIndex().row(), view.currentIndex().column()) == (row, adding_column(view) + 1)
    assert editor(view).hasFocus()


def test_shift_tab_in_an_adding_row_goes_back_from_the_cell_just_typed(window):
    view = adding_row(window, "segments")
    row = view.table_model.record_rows
    QTest.keyClick(begin(view, "300"), KEY.Key_Backtab, SHIFT)
    assert (view.currentIndex().row(), view.currentIndex().column()) == (row, adding_column(view) - 1)
    assert len(window.document.project.segments) == row


def test_a_text_that_adds_nothing_keeps_the_keyboard_and_a_second_tab_leaves(window):
    view = adding_row(window, "segments")
    row = view.table_model.record_rows
    QTest.keyClick(begin(view, "beam"), KEY.Key_Tab)
    assert view.table_model.record_rows == row
    assert view.hasFocus()
    assert view.table_model.is_adding(view.currentIndex().row())
    QTest.keyClick(view, KEY.Key_Tab)
    assert not view.hasFocus()


def test_rows_are_typed_one_after_another_with_tab_and_no_key_is_a_command(window):
    asked: list[str] = []
    for key in ("new", "open", "save"):
        window.actions_by_key[key].triggered.connect(lambda *_a, key=key: asked.append(key))
    view = adding_row(window, "segments")
    QTest.keyClick(begin(view, "300"), KEY.Key_Tab)
    QTest.keyClicks(window.focusWidget(), "d40")
    QTest.keyClick(window.focusWidget(), KEY.Key_Tab)
    assert window.document.project.segments[-1].section == RoundSection(diameter=0.04)
    QTest.keyClick(window.focusWidget(), KEY.Key_Space)
    assert asked == []


def test_tab_out_of_the_tables_never_stands_on_a_command(window):
    buttons = window.top_bar.commands.findChildren(QToolButton)
    assert buttons
    adding_row(window, "segments")
    for _ in range(60):
        chord(window.focusWidget(), KEY.Key_Tab, Qt.KeyboardModifier.NoModifier)
        assert window.focusWidget() not in buttons


@pytest.mark.parametrize("wrong", ["abc", "", "-5", "1.234.567"])
def test_a_pasted_row_whose_length_cannot_be_read_keeps_its_place_in_the_chain(window, table, wrong):
    first = adding_row(window, "segments").table_model.record_rows
    lines = [f"Length (mm)\tSection (mm)\n100\td41\n{wrong}\td42\n300\td43"]
    QGuiApplication.clipboard().setText("\n".join(lines))
    table.blocks.paste()
    added = window.document.project.segments[first - 1 :]
    assert [segment.section.diameter for segment in added] == [0.041, 0.042, 0.043]
    assert [added[0].length, added[2].length] == [0.1, 0.3]
    ((place, draft),) = window.document.snapshot.drafts.items()
    assert place == ("segments", first, "length")
    assert draft.text == wrong
    assert not window.showing.current
