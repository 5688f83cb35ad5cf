"""Tables behind other tabs are made when they are needed, and then are as if they had always been there."""

import pytest
from PySide6.QtCore import Qt
from PySide6.QtTest import QTest
from PySide6.QtWidgets import QApplication

from app.gui.main import open_window
from app.gui.tables.pages import PLACES
from app.gui.view import Selection
from tests.gui.hand import text_at
from tests.gui.windows import end, solved


def test_only_the_table_in_front_is_made_at_first(window):
    assert list(window.tables.views.made) == ["segments"]
    assert list(window.tables.views) == list(PLACES)


def test_a_table_made_late_has_results_and_the_rows_selected_before(window):
    window.view.set_selection(Selection(joints=frozenset((2,))))
    window.tables.open_tab(PLACES["joints"])
    joints = window.tables.views["joints"]
    assert joints.chosen_records() == (2,)
    assert window.view.selection.joints == {2}
    assert text_at(joints, 0, "reaction")


@pytest.mark.parametrize("by", ["looking", "clicking"])
def test_the_choice_of_columns_outlives_windows_that_do_not_show_them(qtbot, store, rod, tmp_path, by):
    store.set_columns("joints", ("reaction",))
    for _ in range(2):
        window = open_window(rod, store, tmp_path / "recovery")
        solved(qtbot, window)
        if by == "clicking":
            window.tables.open_tab(PLACES["joints"])
            assert window.tables.views["joints"].columns_choice.turned == ("reaction",)
        end(qtbot, window)
    assert store.columns("joints") == ("reaction",)


@pytest.mark.parametrize("key", ["joints", "load_cases"])
def test_the_keyboard_goes_along_with_a_click_on_a_tab(window, table, key):
    table.setFocus()
    bar = window.tables.tabs.tabBar()
    QTest.mouseClick(bar, Qt.MouseButton.LeftButton, pos=bar.tabRect(PLACES[key]).center())
    assert window.tables.views[key].hasFocus()


@pytest.mark.parametrize("key", ["segments", "joints", "load_cases", "materials"])
def test_tab_goes_from_the_tabs_to_the_table_in_front(window, key):
    window.tables.tabs.setCurrentIndex(PLACES[key])
    bar = window.tables.tabs.tabBar()
    bar.setFocus(Qt.FocusReason.TabFocusReason)
    QTest.keyClick(bar, Qt.Key.Key_Tab)
    assert QApplication.focusWidget() is window.tables.views[key]


def test_tab_goes_through_the_tables_side_by_side(window):
    window.tables.tabs.setCurrentIndex(PLACES["load_cases"])
    one, two = (window.tables.views[key] for key in ("load_cases", "segment_loads"))
    one.setFocus()
    one.setCurrentIndex(one.model().index(one.model().rowCount() - 1, one.shown_columns()[-1]))
    for _ in range(2):
        if one.hasFocus():
            QTest.keyClick(one, Qt.Key.Key_Tab)
    assert two.hasFocus()
