"""Rows under the hand: moved by their grips and keys, and many at once changed by one text."""

import pytest
from PySide6.QtCore import QPoint, Qt
from PySide6.QtTest import QTest
from PySide6.QtWidgets import QFrame

from tests.gui.hand import begin, cell, chord, editor, go_to, text_at

KEY = Qt.Key
CTRL, SHIFT = Qt.KeyboardModifier.ControlModifier, Qt.KeyboardModifier.ShiftModifier


def marks(window):
    return "".join(segment.mark for segment in window.document.project.segments)


def grip(table, row):
    return QPoint(8, table.rowViewportPosition(row) + table.rowHeight(row) // 2)


def drag(table, row, to, modifier=Qt.KeyboardModifier.NoModifier, *, release=True):
    """Press on the grip of a row and pull it to the upper edge of another."""
    head, left = table.grips.viewport(), Qt.MouseButton.LeftButton
    QTest.mousePress(head, left, modifier, grip(table, row))
    start, goal = grip(table, row), grip(table, to) - QPoint(0, 8)  # the press may have scrolled
    for share in (0.2, 0.6, 1.0):
        QTest.mouseMove(head, start * (1 - share) + goal * share)
    if release:
        QTest.mouseRelease(head, left, modifier, goal)


@pytest.mark.parametrize(
    ("row", "to", "order"),
    [(1, 4, "BCADEFGH"), (6, 2, "AFBCDEGH"), (3, 3, "ABCDEFGH"), (2, 0, "BACDEFGH"), (1, 9, "BCDEFGHA")],
)
def test_a_row_is_dragged_by_its_grip(window, table, row, to, order):
    drag(table, row, to)
    assert marks(window) == order
    moved = order.index("ABCDEFGH"[row - 1])
    assert table.chosen_records() == (moved,)
    window.actions_by_key["undo"].trigger()
    assert marks(window) == "ABCDEFGH"


def test_a_line_shows_where_rows_fall_and_escape_leaves_them(window, table):
    drag(table, 1, 4, release=False)
    (line,) = table.viewport().findChildren(QFrame, "drop_line")
    assert line.isVisible()
    assert abs(line.geometry().center().y() - table.rowViewportPosition(4)) <= 2
    QTest.keyClick(table, KEY.Key_Escape)
    assert not line.isVisible()
    QTest.mouseRelease(table.grips.viewport(), Qt.MouseButton.LeftButton, pos=grip(table, 4))
    assert marks(window) == "ABCDEFGH"


def test_several_chosen_rows_go_together(window, table):
    QTest.mouseClick(table.grips.viewport(), Qt.MouseButton.LeftButton, pos=grip(table, 2))
    QTest.mouseClick(table.grips.viewport(), Qt.MouseButton.LeftButton, SHIFT, grip(table, 3))
    assert table.chosen_records() == (1, 2)
    drag(table, 3, 6)
    assert marks(window) == "ADEBCFGH"
    assert table.chosen_records() == (3, 4)


def test_the_keys_move_rows_and_say_where_the_chain_ends(window, table):
    go_to(table, 2, "length")
    for key, order in ((KEY.Key_Down, "ACBDEFGH"), (KEY.Key_Up, "ABCDEFGH"), (KEY.Key_Up, "BACDEFGH")):
        chord(table, key, CTRL | SHIFT)
        assert marks(window) == order
    chord(table, KEY.Key_Up, CTRL | SHIFT)
    assert window.status.news.text() == "nothing lies before it"
    assert table.currentIndex() == cell(table, 1, "length")


def test_only_segments_have_grips(window):
    assert [key for key, view in window.tables.views.items() if view.grips is not None] == ["segments"]


# Many rows, one text


def choose_down(table, row, key, count):
    go_to(table, row, key)
    for _ in range(count - 1):
        QTest.keyClick(table, KEY.Key_Down, SHIFT)


def test_ctrl_enter_puts_a_text_into_all_chosen_cells_as_one_step(window, table):
    choose_down(table, 1, "length", 3)
    before = window.document.project
    line = begin(table, "444")
    assert "all 3 chosen cells" in window.status.news.text()
    chord(line, KEY.Key_Return)
    assert [segment.length for segment in window.document.project.segments[:4]][:3] == [0.444] * 3
    assert window.document.project.segments[3] == before.segments[3]
    assert window.document.undo_name == "Length of C, for 3 segments"
    window.document.undo()
    assert window.document.project == before


def test_a_wrong_text_for_many_stays_in_each_with_its_reason(window, table):
    choose_down(table, 1, "section", 2)
    chord(begin(table, "beam"), KEY.Key_Return)
    assert [text_at(table, row, "section") for row in (1, 2)] == ["beam", "beam"]
    assert len(window.document.snapshot.drafts) == 2
    choose_down(table, 1, "section", 2)
    chord(begin(table, "d44"), KEY.Key_Return)
    assert not window.document.snapshot.drafts


def test_supports_of_the_start_and_of_far_ends_are_chosen_alike(window, table):
    choose_down(table, 0, "support", 3)
    chord(begin(table, "fixed"), KEY.Key_Return)
    assert [text_at(table, row, "support") for row in range(3)] == ["0: fixed", "1: fixed", "2: fixed"]


def test_ctrl_enter_leaves_rows_alone_that_are_chosen_in_another_column(window, table):
    before = window.document.project.segments
    go_to(table, 1, "section")
    spot = table.visualRect(cell(table, 3, "length")).center()
    QTest.mouseClick(table.viewport(), Qt.MouseButton.LeftButton, CTRL, spot)
    assert len(table.selectedIndexes()) == 2
    chord(begin(table, "444"), KEY.Key_Return)
    after = window.document.project.segments
    assert after[2].length == 0.444
    assert after[0] == before[0]


def test_ctrl_enter_with_one_cell_or_a_mark_takes_in_that_one(window, table):
    go_to(table, 1, "length")
    chord(begin(table, "444"), KEY.Key_Return)
    assert window.document.project.segments[0].length == 0.444
    choose_down(table, 1, "mark", 2)
    QTest.keyClick(table, KEY.Key_F2)
    line = editor(table)
    line.selectAll()
    QTest.keyClicks(line, "Q")
    chord(line, KEY.Key_Return)
    assert marks(window)[:3] == "AQC"
    assert not window.document.snapshot.drafts


# The keys of a spreadsheet

FIRST, LAST = "mark", "utilisation"


@pytest.mark.parametrize(
    ("keys", "modifier", "row", "key"),
    [
        ([KEY.Key_Right], 0, 3, "area"),
        ([KEY.Key_Left], 0, 3, "length"),
        ([KEY.Key_Up], 0, 2, "section"),
        ([KEY.Key_Down, KEY.Key_Down], 0, 5, "section"),
        ([KEY.Key_Home], 0, 3, FIRST),
        ([KEY.Key_End], 0, 3, LAST),
        ([KEY.Key_Right], CTRL, 3, LAST),
        ([KEY.Key_Left], CTRL, 3, FIRST),
        ([KEY.Key_Up], CTRL, 0, "section"),
        ([KEY.Key_Down], CTRL, 8, "section"),
        ([KEY.Key_Home], CTRL, 0, FIRST),
        ([KEY.Key_End], CTRL, 8, LAST),
    ],
)
def test_arrows_home_and_end_go_as_in_a_spreadsheet(table, keys, modifier, row, key):
    go_to(table, 3, "section")
    for pressed in keys:
        chord(table, pressed, modifier or Qt.KeyboardModifier.NoModifier)
    assert table.currentIndex() == cell(table, row, key)
    assert table.selectedIndexes() == [table.currentIndex()]


def test_shift_with_arrows_chooses_a_block(table):
    go_to(table, 2, "length")
    for key in (KEY.Key_Down, KEY.Key_Right, KEY.Key_Down):
        QTest.keyClick(table, key, SHIFT)
    places = {(index.row(), index.column()) for index in table.selectedIndexes()}
    assert places == {(row, column) for row in (2, 3, 4) for column in (1, 2)}


def test_ctrl_d_fills_down_and_delete_empties(window, table):
    go_to(table, 1, "load_start")
    QTest.keyClick(begin(table, "7"), KEY.Key_Return)
    choose_down(table, 1, "load_start", 3)
    chord(table, KEY.Key_D)
    assert [text_at(table, row, "load_start") for row in (1, 2, 3)] == ["7", "7", "7"]
    choose_down(table, 2, "load_start", 2)
    QTest.keyClick(table, KEY.Key_Delete)
    assert [text_at(table, row, "load_start") for row in (1, 2, 3)] == ["7", "0", "0"]


def test_tab_and_shift_tab_go_on_and_back_within_the_row(table):
    go_to(table, 2, "length")
    QTest.keyClick(begin(table, "321"), KEY.Key_Tab)
    assert text_at(table, 2, "length") == "321"
    line = editor(table)
    QTest.keyClick(line, KEY.Key_Backtab, SHIFT)
    assert table.currentIndex() == cell(table, 2, "length")
