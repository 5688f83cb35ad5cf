"""What a first-time user stumbled over: cases and combinations just added, keys, columns, news that stay."""

import pytest
from PySide6.QtCore import Qt
from PySide6.QtGui import QKeySequence
from PySide6.QtTest import QTest
from PySide6.QtWidgets import QMenu

from tests.gui.hand import begin, cell, chord, enter, text_at
from tests.gui.test_adding_rows import adding_row

KEY = Qt.Key


def heading(view, key):
    place = cell(view, 0, key).column()
    head = view.table_model.headerData
    across = Qt.Orientation.Horizontal
    return head(place, across).split("\n")[1], head(place, across, Qt.ItemDataRole.ToolTipRole)


def test_a_case_just_added_is_the_one_that_is_edited(window, table):
    view = adding_row(window, "load_cases")
    before = window.document.project.load_cases
    QTest.keyClick(begin(view, "Storm"), KEY.Key_Return)
    assert window.tables.case_picker.currentText() == "Storm"
    assert "edit the loads of Storm" in window.status.news.text()
    window.tables.open_tab(0)
    enter(table, 1, "load_start", "7")
    assert window.document.project.load_cases[:-1] == before
    assert len(window.document.project.load_cases[-1].segment_loads) == 1


@pytest.mark.parametrize(("table_key", "key"), [("segments", "load_start"), ("joints", "force")])
def test_the_columns_of_loads_name_the_case_that_they_edit(window, table_key, key):
    view, names = window.tables.views[table_key], [c.name for c in window.document.project.load_cases]
    for place, name in enumerate(names):
        window.tables.case_picker.setCurrentIndex(place)
        window.tables.on_case_picked(place)
        line, tip = heading(view, key)
        assert name[:13] in line
        assert tip.endswith(f"load case {name}")


def test_a_new_combination_says_that_it_takes_every_case(window):
    view = adding_row(window, "combinations")
    QTest.keyClick(begin(view, "Both"), KEY.Key_Return)
    assert window.status.news.text() == "“Both” takes every load case with factor 1"


def test_ctrl_y_redoes_beside_the_standard_key(window, table):
    assert QKeySequence("Ctrl+Y") in window.actions_by_key["redo"].shortcuts()
    enter(table, 1, "length", "321")
    window.actions_by_key["undo"].trigger()
    assert text_at(table, 1, "length") != "321"
    chord(table, KEY.Key_Y)
    assert text_at(table, 1, "length") == "321"


def test_the_menu_of_columns_stays_open_while_entries_are_ticked(window, table):
    table.columns_choice.on_asked(table.horizontalHeader().rect().center())
    (menu,) = [menu for menu in table.findChildren(QMenu) if menu.isVisible()]
    entries = {action.text(): action for action in menu.actions()}
    for name in ("Area", "Bedding"):
        QTest.mouseClick(menu, Qt.MouseButton.LeftButton, pos=menu.actionGeometry(entries[name]).center())
        assert menu.isVisible()
        assert not entries[name].isChecked()
    menu.setActiveAction(entries["Area"])
    QTest.keyClick(menu, KEY.Key_Space)
    assert menu.isVisible()
    assert not table.isColumnHidden(cell(table, 0, "area").column())
    assert entries["As at first"].isEnabled()
    QTest.keyClick(menu, KEY.Key_Escape)
    assert not menu.isVisible()


def test_news_go_with_the_next_command_and_the_file_keeps_its_room(window):
    window.status.tell("something long " * 30)
    window.resize(1280, 800)
    name = window.status.file
    assert name.width() >= name.fontMetrics().horizontalAdvance(name.text())
    window.actions_by_key["fit"].trigger()
    assert window.status.news.text() == ""
