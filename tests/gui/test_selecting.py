"""Selecting many on the sheet, shared with the tables; commands that shape what is selected."""

import pytest
from msgspec.structs import replace
from PySide6.QtCore import QPoint, Qt
from PySide6.QtTest import QTest

from app import edits
from app.gui.view import Cursor, Selection
from tests.gui.test_placing import click, joint_at, middle_of
from tests.gui.test_sheet_view import move_mouse
from tests.gui.windows import solved

SHIFT, CTRL = Qt.KeyboardModifier.ShiftModifier, Qt.KeyboardModifier.ControlModifier
LEFT = Qt.MouseButton.LeftButton


def segments(window) -> set[int]:
    return set(window.view.selection.segments)


def test_shift_extends_and_ctrl_toggles(window):
    click(window, middle_of(window, 2))
    click(window, middle_of(window, 6), SHIFT)
    assert segments(window) == {2, 3, 4, 5, 6}
    click(window, middle_of(window, 4), CTRL)
    assert segments(window) == {2, 3, 5, 6}
    click(window, joint_at(window, 1), CTRL)
    assert window.view.selection == Selection(frozenset((2, 3, 5, 6)), frozenset((1,)))
    assert window.tables.views["segments"].chosen_records() == (2, 3, 5, 6)
    assert window.tables.views["joints"].chosen_records() == (1,)


def test_rows_chosen_in_a_table_are_selected_on_the_sheet(window, table):
    table.choose_records(frozenset((1, 2)))
    assert segments(window) == {1, 2}


def test_a_rubber_band_takes_what_it_holds(window):
    viewport, drawing = window.sheet.viewport(), window.sheet.places.drawing
    positions = window.sheet.positions
    low, high = (round(window.sheet.ruler.pixel(positions[i])) for i in (2, 6))
    start = QPoint(low - 3, round(drawing.top()) + 3)
    end = QPoint(high + 3, round(drawing.bottom()) - 3)
    if window.sheet.drawing.part_at(start.toPointF()) is not None:
        start.setY(round(drawing.top()) + 1)
    QTest.mousePress(viewport, LEFT, SHIFT, start)
    move_mouse(window.sheet, QPoint(low + 40, start.y() + 40), LEFT)
    assert window.selecting.band is not None
    move_mouse(window.sheet, end, LEFT)
    QTest.mouseRelease(viewport, LEFT, SHIFT, end)
    assert window.selecting.band is None
    assert segments(window) == {2, 3, 4, 5}
    assert set(window.view.selection.joints) == {2, 3, 4, 5, 6}


@pytest.mark.parametrize(("layout", "key"), [("horizontal", Qt.Key.Key_Right), ("vertical", Qt.Key.Key_Up)])
def test_all_and_from_the_cursor_on_by_keys(window, layout, key):
    window.on_layout_picked(layout)
    before = window.document.project
    window.sheet.setFocus()
    QTest.keyClick(window.sheet, Qt.Key.Key_A, CTRL)
    QTest.keyClick(window.sheet, Qt.Key.Key_Control)
    assert len(segments(window)) == len(window.document.project.segments)
    window.view.set_selection(Selection())
    window.view.set_cursor(Cursor(0.0))
    for _ in range(3):
        QTest.keyClick(window.windowHandle(), key, CTRL | SHIFT)
        QTest.keyClick(window.sheet, Qt.Key.Key_Control)
        QTest.keyClick(window.sheet, Qt.Key.Key_Shift)
    assert segments(window) == {0, 1, 2}
    assert window.document.project is before


def test_repeat_asks_beside_the_sheet_and_shows_it_meanwhile(qtbot, window):
    before = window.document.project
    window.view.set_selection(Selection(segments=frozenset((2, 3))))
    window.sheet.setFocus()
    QTest.keyClick(window, Qt.Key.Key_R, CTRL)
    QTest.keyClick(window, Qt.Key.Key_Control)
    field = window.shaping.popup.field
    QTest.keyClicks(field, "3")
    assert len(window.document.shown_project.segments) == len(before.segments) + 6
    QTest.keyClick(field, Qt.Key.Key_Escape)
    assert window.document.shown_project is before
    window.actions_by_key["repeat"].trigger()
    QTest.keyClicks(window.shaping.popup.field, "2")
    QTest.keyClick(window.shaping.popup.field, Qt.Key.Key_Return)
    assert len(window.document.project.segments) == len(before.segments) + 4
    assert segments(window) == {4, 5, 6, 7}
    assert "4 segments" in window.status.news.text()
    window.document.undo()
    assert window.document.project is before


def test_repeat_needs_segments_side_by_side(window):
    window.view.set_selection(Selection(segments=frozenset((1, 3))))
    window.actions_by_key["repeat"].trigger()
    assert window.shaping.popup is None
    assert "side by side" in window.status.news.text()


def test_mirror_says_what_it_did(window):
    count = len(window.document.project.segments)
    window.actions_by_key["mirror"].trigger()
    assert len(window.document.project.segments) == 2 * count
    assert "middle" in window.status.news.text()
    assert "limit" in window.status.news.text()


def test_joints_are_numbered_in_order_in_one_step(window):
    before = window.document.project
    window.actions_by_key["number_joints"].trigger()
    assert "in order" in window.status.news.text()
    window.document.commit(edits.rename_joint(before, before.joints[2].mark, "99"), "another mark")
    window.actions_by_key["number_joints"].trigger()
    assert window.document.project.joints[2].mark == "2"
    assert "1 joint" in window.status.news.text()
    window.document.undo()
    assert window.document.project.joints[2].mark == "99"


def test_a_joint_is_inserted_at_the_cursor_and_equal_neighbours_joined_again(qtbot, window):
    before = window.document.project
    plain = replace(before, load_cases=(), combinations=())
    window.document.commit(plain, "no loads")
    neck = sum(segment.length for segment in before.segments[:2]) + 0.4 * before.segments[2].length
    window.view.set_cursor(Cursor(neck))
    window.sheet.setFocus()
    QTest.keyClick(window, Qt.Key.Key_I, CTRL)
    QTest.keyClick(window, Qt.Key.Key_Control)
    assert len(window.document.project.segments) == len(before.segments) + 1
    assert window.view.selection == Selection(joints=frozenset((3,)))
    window.actions_by_key["join_equal"].trigger()
    assert window.document.project.segments == before.segments
    window.view.set_cursor(Cursor(before.segments[0].length))
    solved(qtbot, window)
    window.actions_by_key["split_at_cursor"].trigger()
    assert "already" in window.status.news.text()


@pytest.mark.parametrize("sign", [1, -1])
def test_a_selection_extends_from_the_nearest(sign):
    chosen = Selection(segments=frozenset((10,)))
    wanted = Selection(segments=frozenset((10 + 3 * sign,)))
    assert chosen.extended(wanted).segments == frozenset(
        range(min(10, 10 + 3 * sign), max(10, 10 + 3 * sign) + 1)
    )


def test_a_joint_that_is_selected_leaves_no_segment_chosen_in_the_tables(window):
    click(window, middle_of(window, 2) + QPoint(14, 0))
    segments, joints = window.tables.views["segments"], window.tables.views["joints"]
    assert segments.chosen_records() == (2,)
    click(window, joint_at(window, 4))
    assert segments.chosen_records() == ()
    assert joints.chosen_records() == (4,)
    assert window.view.selection == Selection(joints=frozenset((4,)))
