"""Symbols put on by strip, click and key; the menu on the drawing; on the real window."""

import pytest
from msgspec import UNSET
from msgspec.structs import replace
from PySide6.QtCore import QEvent, QPoint, Qt
from PySide6.QtGui import QContextMenuEvent, QHelpEvent
from PySide6.QtTest import QTest
from PySide6.QtWidgets import QApplication, QToolTip

from app.gui.view import Selection, Shown
from app.hand.kinds import KINDS
from solver.model import FixedSupport, SpringSupport
from tests.gui.test_sheet_view import move_mouse
from tests.gui.windows import solved

LEFT = Qt.MouseButton.LeftButton
BOTH_WAYS = pytest.mark.parametrize("layout", ["horizontal", "vertical"])


def press(window, key: str) -> None:
    """Click a symbol of the strip."""
    QTest.mouseClick(window.symbols.buttons[key], LEFT)


def on_axis(window, x: float) -> QPoint:
    """The point of the drawing at a position, beside the member's axis."""
    sheet = window.sheet
    middle = sheet.places.drawing.center()
    across = middle.x() if sheet.places.axes.upright else middle.y()
    return sheet.places.axes.point(sheet.ruler.pixel(x), across).toPoint()


def middle_of(window, segment: int) -> QPoint:
    positions = window.sheet.positions
    return on_axis(window, 0.5 * (positions[segment] + positions[segment + 1]))


def joint_at(window, joint: int) -> QPoint:
    return on_axis(window, window.sheet.positions[joint])


def click(window, at: QPoint, modifiers=Qt.KeyboardModifier.NoModifier) -> None:
    QTest.mouseClick(window.sheet.viewport(), LEFT, modifiers, at)


def edit_case(window, index: int) -> str:
    """Edit the loads of a case; its name."""
    window.tables.case_picker.setCurrentIndex(index)
    window.tables.on_case_picked(index)
    return window.document.project.load_cases[index].name


@BOTH_WAYS
def test_a_spring_is_put_on_the_joint_that_is_clicked_and_typed_at_once(qtbot, window, layout):
    window.on_layout_picked(layout)
    solved(qtbot, window)
    press(window, "spring")
    assert window.symbols.buttons["spring"].isChecked()
    QTest.mouseMove(window.sheet.viewport(), joint_at(window, 3))
    assert window.sheet.paper.hand_marks.lit is None  # a click puts the spring on and takes no handle
    assert window.sheet.viewport().cursor().shape() == Qt.CursorShape.CrossCursor
    assert window.sheet.drawing._lit.index == 3
    click(window, joint_at(window, 3))
    assert window.document.project.joints[3].support == SpringSupport(stiffness=1e8)
    assert window.in_place.editor.selectedText() == "spring 100000 N/mm"
    QTest.keyClicks(window.in_place.editor, "500000")
    QTest.keyClick(window.in_place.editor, Qt.Key.Key_Return)
    assert window.document.project.joints[3].support == SpringSupport(stiffness=5e8)
    assert not window.symbols.buttons["spring"].isChecked()
    assert window.placing.kind is None


def test_escape_puts_the_symbol_down_and_nothing_is_put_on(window):
    before = window.document.project
    press(window, "fixed")
    QTest.keyClick(window.sheet, Qt.Key.Key_Escape)
    assert window.placing.kind is None
    click(window, joint_at(window, 4))
    assert window.document.project is before
    assert window.view.selection == Selection(joints=frozenset((4,)))


@pytest.mark.parametrize(
    "kind", [k for k in KINDS if k.on == "segment" and k.keys], ids=lambda kind: kind.key
)
def test_each_load_goes_on_the_segment_that_is_clicked(qtbot, window, kind):
    name = edit_case(window, 0)
    window.view.set_shown(Shown("envelope"))
    segments = window.document.project.segments
    case = window.document.project.load_cases[0]
    bare = next(i for i, s in enumerate(segments) if s.mark not in {x.segment for x in case.segment_loads})
    press(window, kind.key)
    click(window, middle_of(window, bare))
    assert window.in_place.editor is not None
    assert segments[bare].mark in window.in_place.caption
    if kind.of_case:
        assert window.view.shown == Shown("case", name)
        assert name in window.status.news.text()
        loads = window.document.project.load_cases[0].segment_loads
        assert segments[bare].mark in {load.segment for load in loads}
    else:
        assert getattr(window.document.project.segments[bare], kind.keys[0])
    window.on_undo()
    assert window.document.project.segments == segments


def test_a_symbol_that_is_clicked_waits_for_its_target_whatever_is_selected(window):
    edit_case(window, 0)
    window.view.set_selection(Selection(segments=frozenset((0,))))
    before = window.document.project
    press(window, "warmth")
    assert window.document.project is before
    assert window.symbols.buttons["warmth"].isChecked()
    assert "click a segment" in window.status.news.text()
    click(window, middle_of(window, 3))
    assert before.segments[3].mark in window.in_place.caption
    had = before.load_cases[0].segment_loads
    mark = before.segments[3].mark
    fresh = [load for load in window.document.project.load_cases[0].segment_loads if load not in had]
    assert {load.segment for load in fresh} == {mark}


def test_the_letter_of_a_symbol_puts_it_on_all_that_is_selected(window):
    window.sheet.setFocus()
    window.view.set_selection(Selection(joints=frozenset((1, 3, 5))))
    QTest.keyClick(window.sheet, Qt.Key.Key_F)
    supports = [joint.support for joint in window.document.project.joints]
    assert [supports[i] for i in (1, 3, 5)] == [FixedSupport()] * 3
    assert window.document.undo_name == "Put on: Fixed support"
    window.document.undo()
    assert window.document.undo_name is None


def test_one_typed_value_goes_to_all_that_it_was_put_on(window):
    edit_case(window, 0)
    window.sheet.setFocus()
    window.view.set_selection(Selection(joints=frozenset((3, 5))))
    QTest.keyClick(window.sheet, Qt.Key.Key_L)
    assert "for 2 joints" in window.in_place.caption
    QTest.keyClicks(window.in_place.editor, "7 kN")
    QTest.keyClick(window.in_place.editor, Qt.Key.Key_Return)
    marks = [window.document.project.joints[i].mark for i in (3, 5)]
    forces = {x.joint: x.force for x in window.document.project.load_cases[0].joint_loads}
    assert [forces[mark] for mark in marks] == [7000.0, 7000.0]


def test_a_key_takes_a_symbol_and_without_a_case_one_is_made(qtbot, window):
    project = window.document.project
    window.document.commit(replace(project, load_cases=(), combinations=()), "no cases")
    solved(qtbot, window)
    window.sheet.setFocus()
    window.view.set_selection(Selection())
    QTest.keyClick(window.sheet, Qt.Key.Key_L)
    assert window.placing.kind.key == "force"
    click(window, joint_at(window, 4))
    (case,) = window.document.project.load_cases
    assert [load.force for load in case.joint_loads] == [1000.0]
    assert "was made" in window.status.news.text()


def test_by_keys_alone(window):
    window.sheet.setFocus()
    QTest.keyClick(window.sheet, Qt.Key.Key_Home)
    for _ in range(3):
        QTest.keyClick(window.sheet, Qt.Key.Key_Right, Qt.KeyboardModifier.ControlModifier)
        QTest.keyClick(window.sheet, Qt.Key.Key_Control)
    QTest.keyClick(window.sheet, Qt.Key.Key_Space)
    assert window.view.selection == Selection(joints=frozenset((3,)))
    QTest.keyClick(window.sheet, Qt.Key.Key_F)
    assert window.document.project.joints[3].support == FixedSupport()
    QTest.keyClick(window.sheet, Qt.Key.Key_R)
    assert window.document.project.joints[3].support is UNSET


def test_the_strip_is_reached_and_walked_by_keys(qtbot, window):
    window.sheet.setFocus()
    QTest.keyClick(window, Qt.Key.Key_F6, Qt.KeyboardModifier.ShiftModifier)
    QTest.keyClick(window, Qt.Key.Key_Shift)
    assert window.symbols.isAncestorOf(QApplication.focusWidget())
    QTest.keyClick(QApplication.focusWidget(), Qt.Key.Key_Down)
    assert QApplication.focusWidget() is window.symbols.buttons["spring"]
    window.view.set_selection(Selection())
    QTest.keyClick(QApplication.focusWidget(), Qt.Key.Key_Return)
    assert window.placing.kind.key == "spring"
    for button in window.symbols.buttons.values():
        assert button.accessibleName()
        assert button.width() >= 24
        assert button.height() >= 24


# The menu


def menu_at(window, at: QPoint):
    """Open the menu as the right button does."""
    viewport = window.sheet.viewport()
    event = QContextMenuEvent(QContextMenuEvent.Reason.Mouse, at, viewport.mapToGlobal(at))
    QApplication.sendEvent(viewport, event)
    return window.sheet_menu.menu


def entry(menu, *words):
    """An entry by its words, through submenus."""
    action = next(a for a in menu.actions() if a.text().replace("&", "") == words[0])
    return entry(action.menu(), *words[1:]) if words[1:] else action


def test_the_menu_of_a_segment_types_puts_on_and_takes_off(window):
    edit_case(window, 0)
    menu = menu_at(window, middle_of(window, 4) + QPoint(14, 0))
    assert window.view.selection == Selection(segments=frozenset((4,)))
    entry(menu, "Put on", "Bedding").trigger()
    assert window.document.project.segments[4].bedding == 1e6
    window.in_place.cancel()
    menu.close()
    menu = menu_at(window, middle_of(window, 4) + QPoint(14, 0))
    entry(menu, "Take off", "Bedding").trigger()
    assert window.document.project.segments[4].bedding == 0
    menu.close()
    menu = menu_at(window, middle_of(window, 4) + QPoint(14, 0))
    entry(menu, "Type in place", "Length").trigger()
    assert window.in_place.caption.startswith("Length of")
    menu.close()


def test_the_menu_inserts_a_joint_where_it_was_opened(window):
    at = middle_of(window, 4) + QPoint(14, 0)
    x = window.sheet.ruler.position_at(at.x())
    count = len(window.document.project.segments)
    menu = menu_at(window, at)
    entry(menu, "Insert joint here").trigger()
    menu.close()
    assert len(window.document.project.segments) == count + 1
    first = window.document.project.segments[4].length
    start = sum(s.length for s in window.document.project.segments[:4])
    assert start + first == pytest.approx(x, abs=2.0 / window.sheet.ruler.pixels_per_metre)
    assert (1000 * first) == pytest.approx(round(1000 * first), abs=1e-9)
    assert window.view.selection == Selection(joints=frozenset((5,)))


def test_the_menu_opens_by_key_on_the_selection_and_on_paper(window):
    window.sheet.setFocus()
    window.view.set_selection(Selection(joints=frozenset((2,))))
    QTest.keyClick(window.sheet, Qt.Key.Key_F10, Qt.KeyboardModifier.ShiftModifier)
    QTest.keyClick(window.sheet, Qt.Key.Key_Shift)
    menu = window.sheet_menu.menu
    assert entry(menu, "Put on", "Fixed support")
    menu.close()
    window.view.set_selection(Selection())
    QTest.keyClick(window.sheet, Qt.Key.Key_Menu)
    menu = window.sheet_menu.menu
    entry(menu, "Select all").trigger()
    menu.close()
    assert len(window.view.selection.segments) == len(window.document.project.segments)


def test_delete_takes_segments_out_and_supports_off(window):
    window.sheet.setFocus()
    held = next(i for i, j in enumerate(window.document.project.joints) if j.support is not UNSET)
    window.view.set_selection(Selection(joints=frozenset((held,))))
    QTest.keyClick(window.sheet, Qt.Key.Key_Delete)
    assert window.document.project.joints[held].support is UNSET
    count = len(window.document.project.segments)
    window.view.set_selection(Selection(segments=frozenset((2, 3))))
    QTest.keyClick(window.sheet, Qt.Key.Key_Delete)
    assert len(window.document.project.segments) == count - 2


def test_a_symbol_in_the_hand_comes_before_what_could_be_pulled(window):
    """A joint is also a handle: a click with the symbol, and a small slip of the hand, only puts it on."""
    lengths = [segment.length for segment in window.document.project.segments]
    press(window, "fixed")
    viewport, at = window.sheet.viewport(), joint_at(window, 4)
    QTest.mousePress(viewport, LEFT, pos=at)
    move_mouse(window.sheet, at + QPoint(14, 0), LEFT)
    QTest.mouseRelease(viewport, LEFT, pos=at + QPoint(4, 0))
    assert window.document.project.joints[4].support == FixedSupport()
    assert [segment.length for segment in window.document.project.segments] == lengths


def test_the_strip_is_one_stop_of_the_tab_key(window):
    strip = window.symbols
    strip.setFocus(Qt.FocusReason.TabFocusReason)
    first, second, *_rest = strip.buttons.values()
    assert first.hasFocus()
    QTest.keyClick(first, Qt.Key.Key_Down)
    assert second.hasFocus()
    QTest.keyClick(second, Qt.Key.Key_Tab)
    assert not any(button.hasFocus() for button in strip.buttons.values())
    strip.setFocus(Qt.FocusReason.TabFocusReason)
    assert second.hasFocus()


def test_the_tip_of_a_symbol_stands_beside_the_strip(qtbot, window):
    button = window.symbols.buttons["fixed"]
    middle = button.rect().center()
    QApplication.sendEvent(button, QHelpEvent(QEvent.Type.ToolTip, middle, button.mapToGlobal(middle)))
    qtbot.waitUntil(QToolTip.isVisible)
    (tip,) = [w for w in QApplication.topLevelWidgets() if w.inherits("QTipLabel") and w.isVisible()]
    right = window.symbols.mapToGlobal(window.symbols.rect().topRight()).x()
    assert tip.geometry().left() >= right - 8
    QToolTip.hideText()


def test_the_symbols_take_two_columns_in_a_low_window_and_none_is_cut_off(qtbot, window):
    window.resize(1000, 580)
    qtbot.waitUntil(lambda: len({b.x() for b in window.symbols.buttons.values()}) == 2)
    room = window.symbols.rect()
    assert all(room.contains(button.geometry()) for button in window.symbols.buttons.values())
    window.resize(1400, 1000)
    qtbot.waitUntil(lambda: len({b.x() for b in window.symbols.buttons.values()}) == 1)
