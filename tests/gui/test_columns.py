"""The column chooser: what is shown, hidden, remembered, and what goes by the columns that are shown."""

import pytest
from PySide6.QtCore import QEvent, QPoint, Qt
from PySide6.QtGui import QContextMenuEvent, QGuiApplication
from PySide6.QtTest import QTest
from PySide6.QtWidgets import QApplication
from shiboken6 import isValid

from app.gui.settings import Settings
from app.gui.tables.shown_columns import ColumnsMenu
from app.gui.view import Shown
from app.hand.cells import Cell
from tests.gui.hand import cell, enter, go_to, text_at

KEY = Qt.Key


def shown(view):
    return [view.table_model.columns[place].key for place in view.shown_columns()]


def hide(view, *keys):
    for key in keys:
        view.columns_choice.turn(key)


def test_new_columns_wait_until_they_are_chosen(table):
    assert not {"mass", "force", "stress"} & set(shown(table))
    hide(table, "mass", "force", "stress")
    assert shown(table)[-4:] == ["mass", "force", "stress", "utilisation"]


def test_the_headings_menu_hides_a_column_and_shows_it_again(table, qtbot):
    head = table.horizontalHeader().viewport()
    for wanted in (False, True):
        at = QPoint(40, 10)
        reason = QContextMenuEvent.Reason.Mouse
        QApplication.sendEvent(head, QContextMenuEvent(reason, at, head.mapToGlobal(at)))
        menu = QApplication.activePopupWidget()
        (entry,) = [action for action in menu.actions() if action.text() == "Bedding"]
        assert entry.isChecked() is not wanted
        menu.setActiveAction(entry)
        QTest.keyClick(menu, KEY.Key_Return)
        qtbot.waitUntil(lambda menu=menu: not isValid(menu))
        assert ("bedding" in shown(table)) is wanted


def test_the_first_column_is_not_for_hiding_nor_is_one_that_a_user_named(window):
    for view in window.tables.views.values():
        keys = {column.key for column in view.columns_choice.choices()}
        assert view.table_model.columns[0].key not in keys
        assert not any(key.startswith("factor of") for key in keys)


def test_view_columns_is_of_the_table_in_front(window):
    (menu,) = window.findChildren(ColumnsMenu)
    for tab, title in ((0, "Bedding"), (1, "Reaction"), (4, "Density")):
        window.tables.tabs.setCurrentIndex(tab)
        menu.aboutToShow.emit()
        assert title in [action.text() for action in menu.actions()]


def test_the_menu_goes_back_to_the_columns_of_the_beginning(window, table):
    before = shown(table)
    hide(table, "bedding", "mass")
    (menu,) = window.findChildren(ColumnsMenu)
    menu.aboutToShow.emit()
    menu.actions()[-1].trigger()
    assert shown(table) == before


def test_the_choice_is_remembered(window, table, store, tmp_path):
    hide(table, "bedding", "mass")
    chosen = shown(table)
    window._remember()
    hide(table, "bedding", "mass")
    window.tables.restore(Settings(tmp_path / "settings.ini"))
    assert shown(table) == chosen


def test_a_column_that_is_no_more_is_forgotten_without_a_word(window, table, store):
    before = shown(table)
    store.set_columns("segments", ("weight",))
    window.tables.restore(store)
    assert shown(table) == before


def test_the_keyboard_leaves_a_column_that_is_hidden(table):
    go_to(table, 2, "bedding")
    hide(table, "bedding")
    assert table.currentIndex() == cell(table, 2, "mark")


def test_tab_and_arrows_pass_over_hidden_columns(table):
    hide(table, "section", "area")
    go_to(table, 1, "length")
    for key, wanted in ((KEY.Key_Tab, "material"), (KEY.Key_Left, "length"), (KEY.Key_Right, "material")):
        QTest.keyClick(table, key)
        assert table.currentIndex() == cell(table, 1, wanted)


@pytest.mark.parametrize("hidden", [(), ("load_start", "load_end", "heat"), ("heat", "bedding", "support")])
def test_the_totals_stay_whichever_columns_are_hidden(table, hidden):
    hide(table, *hidden)
    model = table.table_model
    last = model.rowCount() - 1
    (place,) = [p for p in table.shown_columns() if model.index(last, p).data() not in ("", None)][1:]
    assert model.index(last, place).data().startswith("total 3560 mm, 35")
    assert table.columnSpan(last, place) > 1
    drawn = table.visualRect(model.index(last, place))
    wanted = sum(table.columnWidth(p) for p in table.shown_columns() if p >= place)
    assert abs(drawn.width() - wanted) <= 1


def test_copy_and_paste_go_by_the_columns_that_are_shown(window, table):
    hide(table, "section", "area")
    go_to(table, 1, "length")
    table.setCurrentIndex(cell(table, 1, "length"))
    QTest.keyClick(table, KEY.Key_Right, Qt.KeyboardModifier.ShiftModifier)
    table.blocks.copy()
    length, material = QGuiApplication.clipboard().text().split("\t")
    assert (length, material) == (text_at(table, 1, "length"), text_at(table, 1, "material"))
    QGuiApplication.clipboard().setText(f"123\t{material}")
    go_to(table, 1, "length")
    section = window.document.project.segments[0].section
    table.blocks.paste()
    assert window.document.project.segments[0].length == 0.123
    assert window.document.project.segments[0].section == section
    assert not window.document.snapshot.drafts


def test_the_new_columns_show_the_results_of_the_shown_state(window, table, qtbot):
    hide(table, "mass", "force", "stress")
    outcome = window.showing.outcome.results
    masses = [float(text_at(table, row, "mass")) for row in range(1, table.table_model.record_rows)]
    assert sum(masses) == pytest.approx(outcome.mass, rel=0.01)
    state = outcome.state_index("Storm surge")
    assert text_at(table, 1, "force").replace("\u202f", "") == f"{outcome.segments.force_max[state][0]:.0f}"
    assert text_at(table, 4, "stress") == f"{outcome.segments.stress_max[state][3] / 1e6:.0f}"
    window.view.set_shown(Shown("envelope"))
    checked = [i for i, one in enumerate(outcome.states) if one.checked]
    ends = outcome.segments.stress_min[checked, 3].min(), outcome.segments.stress_max[checked, 3].max()
    assert text_at(table, 4, "stress") == f"{ends[0] / 1e6:.1f}…{ends[1] / 1e6:.0f}"


def test_an_entry_that_is_not_taken_in_is_never_out_of_sight(window, table):
    hide(table, "length")
    QGuiApplication.clipboard().setText("Length\nlong")
    go_to(table, 2, "mark")
    table.blocks.paste()
    assert "length" in shown(table)
    window.document.undo()
    assert "length" not in shown(table)


def test_a_cell_that_is_gone_to_is_shown(window, table):
    hide(table, "section")
    window.tables.show_cell(Cell("segments", 2, "section"))
    assert table.currentIndex() == cell(table, 3, "section")
    assert "section" in shown(table)


class TestHiddenAndNotEmpty:
    """A hidden column that holds something is named under the table and in the menus."""

    @pytest.mark.parametrize(("text", "said"), [("20", True), ("0", False)])
    def test_is_named_under_the_table_in_front(self, window, table, qtbot, text, said):
        line = window.tables.hidden_line
        enter(table, 2, "bedding", text)
        hide(table, "bedding")
        line.look()
        assert line.isVisible() is said
        if said:
            assert line.text() == "Hidden and not empty: Bedding" == line.accessibleName()
            window.tables.tabs.setCurrentIndex(4)
            qtbot.waitUntil(lambda: not line.isVisible())
            window.tables.tabs.setCurrentIndex(0)
            qtbot.waitUntil(line.isVisible)
            window.document.undo()
            qtbot.waitUntil(lambda: not line.isVisible())

    def test_supports_are_something_and_free_joints_are_not(self, window, table, qtbot):
        hide(table, "support")
        qtbot.waitUntil(window.tables.hidden_line.isVisible)
        window.files.new()
        go_to(table, 1, "length")
        qtbot.waitUntil(lambda: window.tables.hidden_line.text().endswith("Support at far end"))
        hide(table, "support")
        enter(table, 0, "support", "free")
        hide(table, "support")
        qtbot.waitUntil(lambda: not window.tables.hidden_line.isVisible())

    def test_a_click_offers_the_columns_where_it_is_marked(self, window, table, qtbot):
        hide(table, "support", "bedding")
        line = window.tables.hidden_line
        qtbot.waitUntil(line.isVisible)
        QTest.mouseClick(line, Qt.MouseButton.LeftButton)
        menu = QApplication.activePopupWidget()
        texts = [action.text() for action in menu.actions()]
        assert "Support at far end (not empty)" in texts
        assert "Bedding" in texts
        menu.close()

    def test_rows_stay_whole_beside_it(self, window, table, qtbot):
        hide(table, "support")
        line, row = window.tables.hidden_line, table.verticalHeader().defaultSectionSize()
        qtbot.waitUntil(line.isVisible)
        QApplication.sendPostedEvents(None, QEvent.Type.LayoutRequest)
        qtbot.waitUntil(lambda: table.viewport().height() % row == 0)
        hide(table, "support")
        qtbot.waitUntil(lambda: not line.isVisible() and table.viewport().height() % row == 0)
