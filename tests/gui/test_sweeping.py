"""Numbers run up and down under the hand: wheel, pull and keys, one undo step, and Escape restores."""

import pytest
from PySide6.QtCore import QEvent, QPoint, QPointF, Qt
from PySide6.QtGui import QWheelEvent
from PySide6.QtTest import QTest
from PySide6.QtWidgets import QApplication

from app.drawing.shapes import LOADS, Part
from app.gui.view import Shown
from tests.gui.hand import begin, cell, chord, enter, go_to, text_at

KEY = Qt.Key
ALT, CTRL, SHIFT = (getattr(Qt.KeyboardModifier, f"{name}Modifier") for name in ("Alt", "Control", "Shift"))
LEFT, NONE = Qt.MouseButton.LeftButton, Qt.KeyboardModifier.NoModifier


def turn(widget, at, notches, modifiers=CTRL, eighths=120):
    """Turn the wheel over a point of a widget."""
    phase, here = Qt.ScrollPhase.NoScrollPhase, QPointF(at)
    angle = QPoint(0, notches * eighths)
    buttons = Qt.MouseButton.NoButton
    event = QWheelEvent(
        here, QPointF(widget.mapToGlobal(at)), QPoint(), angle, buttons, modifiers, phase, False
    )
    QApplication.sendEvent(widget, event)


def over(table, row, key, share=0.1):
    """A point in a cell."""
    box = table.visualRect(cell(table, row, key))
    return QPoint(round(box.left() + share * box.width()), box.center().y())


def wheel(table, row, key, notches, modifiers=CTRL, share=0.1):
    turn(table.viewport(), over(table, row, key, share), notches, modifiers)


def let_go(table, key=KEY.Key_Control):
    QTest.keyRelease(table, key)


def length(window, segment=0):
    return window.document.project.segments[segment].length


def test_the_wheel_with_ctrl_runs_a_number_and_everything_follows(window, table, qtbot):
    before = length(window)
    wheel(table, 1, "length", 2)
    assert text_at(table, 1, "length") == "182"
    assert window.document.shown_project.segments[0].length == 0.182
    assert length(window) == before, "nothing is committed yet"
    assert window.status.news.text() == "Length of A (mm): 182 (was 180)"
    qtbot.waitUntil(lambda: window.showing.current)
    let_go(table)
    assert length(window) == 0.182
    assert window.status.news.text() == "Length of A (mm): 182 (was 180)"
    window.document.undo()
    assert length(window) == before
    assert window.document.undo_name is None


def total_of(table):
    model = table.table_model
    return model.index(model.rowCount() - 1, model.total_column).data().split(",")[0]


def test_cells_that_follow_from_a_swept_one_go_with_it_and_back(window, table):
    before = text_at(table, 1, "area"), total_of(table)
    wheel(table, 1, "section", 3)
    area = text_at(table, 1, "area")
    assert area not in ("", before[0])
    wheel(table, 1, "length", 3)  # takes the section in
    assert text_at(table, 1, "area") == area
    assert total_of(table) != before[1]
    QTest.keyClick(table, KEY.Key_Escape)
    assert total_of(table) == before[1]
    window.document.undo()
    assert text_at(table, 1, "area") == before[0]


def test_shift_takes_larger_steps_and_a_smooth_wheel_whole_ones(window, table):
    wheel(table, 1, "length", 1, CTRL | SHIFT)
    assert text_at(table, 1, "length") == "190"
    for _ in range(7):
        turn(table.viewport(), over(table, 1, "length"), -1, CTRL, 60)
    assert text_at(table, 1, "length") == "187"


def test_escape_restores(window, table):
    wheel(table, 1, "length", 3)
    QTest.keyClick(table, KEY.Key_Escape)
    assert text_at(table, 1, "length") == "180"
    assert window.document.preview is None
    let_go(table)
    assert window.document.undo_name is None


def test_it_stops_before_what_is_not_valid_and_says_so(window, table):
    wheel(table, 1, "length", -400)
    assert text_at(table, 1, "length") == "1"
    assert window.status.news.text() == "Length of A (mm): 1 (was 180); the next value is not valid"
    assert window.document.preview.project is not None


def test_back_at_the_start_there_is_nothing_to_undo(window, table):
    wheel(table, 1, "length", 3)
    wheel(table, 1, "length", -3)
    assert window.document.preview is None
    let_go(table)
    assert window.document.undo_name is None


def test_another_cell_begins_a_step_of_its_own(window, table):
    wheel(table, 1, "length", 1)
    wheel(table, 2, "length", 1)
    assert window.document.undo_name == "Length of A"
    let_go(table)
    assert window.document.undo_name == "Length of B"


@pytest.mark.parametrize(
    "leave",
    [
        lambda table: QTest.mouseClick(table.viewport(), LEFT, NONE, over(table, 3, "mark")),
        lambda table: QTest.keyClick(table, KEY.Key_Down),
        lambda table: table.window().actions_by_key["save"].trigger(),
        lambda table: QApplication.sendEvent(table.viewport(), QEvent(QEvent.Type.Leave)),
    ],
    ids=["click", "key", "save", "leave"],
)
def test_leaving_takes_the_number_in(window, table, leave):
    wheel(table, 1, "length", 1)
    leave(table)
    assert length(window) == 0.181
    assert not window.tables.sweeper.is_running


def test_the_number_under_the_pointer_is_the_one_that_runs(window, table):
    enter(table, 1, "section", "d60x5")
    text = QPoint(table.visualRect(cell(table, 1, "section")).left() + 6, over(table, 1, "section").y())
    reach = table.fontMetrics().horizontalAdvance("⌀60×5")
    turn(table.viewport(), text + QPoint(reach - 3, 0), 1)
    assert text_at(table, 1, "section") == "⌀60×6"
    turn(table.viewport(), text + QPoint(12, 0), 1)
    let_go(table)
    assert text_at(table, 1, "section") == "⌀61×6"


def test_a_plain_wheel_scrolls_and_a_name_is_no_number(window, table):
    turn(table.viewport(), over(table, 1, "length"), -1, NONE)
    assert not window.tables.sweeper.is_running
    table.scrollToTop()
    go_to(table, 1, "mark")
    enter(table, 1, "mark", "7")
    wheel(table, 1, "mark", 1)
    assert text_at(table, 1, "mark") == "7"
    assert window.status.news.text() == "there is no number here to run up and down"


def test_what_is_being_typed_is_taken_in_first(window, table):
    go_to(table, 1, "length")
    begin(table, "500")
    wheel(table, 1, "length", 1)
    let_go(table)
    assert length(window) == 0.51
    window.document.undo()
    assert length(window) == 0.5


def test_the_modulus_of_one_row_says_that_it_has_a_material_of_its_own(window, table):
    go_to(table, 1, "modulus")
    wheel(table, 1, "modulus", 1)
    let_go(table)
    assert "A now has a material of its own" in window.status.news.text()


# Ctrl, press and pull


def pull(table, row, key, up, modifiers=CTRL, *, release=True):
    start, view = over(table, row, key), table.viewport()
    QTest.mousePress(view, LEFT, modifiers, start)
    for share in (0.5, 1.0):
        QTest.mouseMove(view, start - QPoint(0, round(share * up)))
    if release:
        QTest.mouseRelease(view, LEFT, modifiers, start - QPoint(0, up))


@pytest.mark.parametrize(("up", "swept"), [(31, 0.185), (-31, 0.175)])
def test_a_pull_with_ctrl_runs_a_number_as_one_step(window, table, up, swept):
    pull(table, 1, "length", up)
    assert length(window) == swept
    assert table.chosen_records() == (), "nothing was chosen by it"
    window.document.undo()
    assert window.document.undo_name is None


def test_escape_ends_a_pull_for_good(window, table):
    pull(table, 1, "length", 31, release=False)
    QTest.keyClick(table, KEY.Key_Escape)
    QTest.mouseMove(table.viewport(), over(table, 1, "length") - QPoint(0, 60))
    QTest.mouseRelease(table.viewport(), LEFT, CTRL, over(table, 1, "length"))
    assert length(window) == 0.18
    assert window.document.undo_name is None


def test_a_plain_click_with_ctrl_still_chooses_and_lets_go(window, table):
    QTest.mouseClick(table.viewport(), LEFT, NONE, over(table, 1, "length"))
    for wanted in ((0, 2), (0,)):
        QTest.mouseClick(table.viewport(), LEFT, CTRL, over(table, 3, "length"))
        assert table.chosen_records() == wanted
    assert table.currentIndex() == cell(table, 3, "length")


# On the drawing


def label(window, kind, index=0):
    """The middle of a label of the drawing."""
    (box,) = [t.box for t in window.sheet.drawing.picture.texts if t.part == Part(kind, index)]
    return QPoint(*map(round, box.centre))


@pytest.fixture
def painted(window, qtbot):
    qtbot.waitUntil(lambda: bool(window.sheet.drawing.picture.texts))
    return window


def test_the_wheel_with_ctrl_over_a_dimension_runs_the_length(painted):
    window, at = painted, label(painted, "length", 3)
    before = length(window, 3)
    for _ in range(3):  # the dimension moves away from under the pointer meanwhile
        turn(window.sheet.viewport(), at, 1)
    assert window.document.shown_project.segments[3].length > before
    assert window.tables.views["segments"].table_model.index(4, 1).data() != str(round(before * 1000))
    QTest.keyRelease(window.sheet, KEY.Key_Control)
    assert window.document.undo_name == "Length of D"
    window.document.undo()
    assert length(window, 3) == before


def test_a_pull_over_a_section_runs_it_and_escape_restores(painted):
    window, at = painted, label(painted, "section", 1)
    sheet = window.sheet.viewport()
    before = window.document.project
    QTest.mousePress(sheet, LEFT, CTRL, at)
    QTest.mouseMove(sheet, at - QPoint(0, 10))
    QTest.mouseMove(sheet, at - QPoint(0, 25))
    assert window.document.preview is not None
    assert window.document.preview.project.segments[1].section != before.segments[1].section
    QTest.keyClick(window.sheet, KEY.Key_Escape)
    QTest.mouseRelease(sheet, LEFT, CTRL, at)
    assert window.document.project == before
    assert window.document.undo_name is None


def test_the_wheel_beside_the_labels_zooms_with_or_without_ctrl(painted):
    window = painted
    body = window.sheet.drawing.picture.box_of(Part("segment", 2))
    at = QPoint(round(body.left + 3), round(body.top + 2))
    for modifiers in (CTRL, NONE):
        before = window.sheet.ruler.scale
        turn(window.sheet.viewport(), at, 1, modifiers)
        assert window.sheet.ruler.scale > before
        assert not window.tables.sweeper.is_running


def test_a_click_with_ctrl_on_a_label_goes_through_to_the_drawing(painted):
    window = painted
    QTest.mouseClick(window.sheet.viewport(), LEFT, CTRL, label(window, "length", 2))
    assert window.view.selection.segments == {2}


def test_a_load_whose_case_is_not_shown_does_not_run(painted, qtbot):
    window = painted
    window.on_layout_picked("horizontal")
    window.view.set_shown(Shown("case", window.document.project.load_cases[1].name))
    at = next(t for t in window.sheet.drawing.picture.texts if t.part is not None and t.part.kind in LOADS)
    turn(window.sheet.viewport(), QPoint(*map(round, at.box.centre)), 1)
    assert "takes no part in what is shown" in window.status.news.text()
    assert window.document.preview is None


# Keys


def test_alt_with_arrows_is_the_twin_and_a_burst_is_one_step(window, table):
    go_to(table, 1, "length")
    for key, modifiers in ((KEY.Key_Up, ALT), (KEY.Key_Up, ALT | SHIFT), (KEY.Key_Down, ALT)):
        QTest.keyPress(table, key, modifiers)
    assert text_at(table, 1, "length") == "190"
    assert length(window) == 0.18
    QTest.keyRelease(table, KEY.Key_Alt)
    assert length(window) == 0.19
    window.document.undo()
    assert length(window) == 0.18


def test_a_result_says_that_it_is_not_for_typing(window, table):
    go_to(table, 1, "utilisation")
    QTest.keyClick(table, KEY.Key_Up, ALT)
    assert window.status.news.text() == "a result is not for typing"


def test_undo_takes_the_running_number_back(window, table):
    go_to(table, 1, "length")
    QTest.keyClick(table, KEY.Key_Up, ALT)
    chord(table, KEY.Key_Z)
    assert length(window) == 0.18
    assert text_at(table, 1, "length") == "180"
