"""What goes wrong under a hand on the sheet: menus, other files, the wheel and a second button meanwhile."""

from __future__ import annotations

import pytest
from PySide6.QtCore import QEvent, QPoint, QPointF, Qt
from PySide6.QtGui import QContextMenuEvent, QFocusEvent, QWheelEvent
from PySide6.QtTest import QTest
from PySide6.QtWidgets import QApplication

from app.drawing.shapes import Part as DrawnPart
from app.gui.hand.count_popup import CountPopup
from app.gui.hand.grasp import Phase
from app.gui.view import Selection, Shown
from solver.model import AreaSection, FixedSupport
from tests.gui.pointer import LEFT, NONE, PLAIN, SHIFT, Pointer
from tests.gui.test_hand import opened
from tests.members import Part, member

POPUP = Qt.FocusReason.PopupFocusReason


@pytest.fixture
def pointer(qtbot, window) -> Pointer:
    return opened(qtbot, window, "horizontal")


@pytest.fixture
def upright(qtbot, window) -> Pointer:
    return opened(qtbot, window, "vertical")


def type_in_place(window, kind, index):
    part = DrawnPart(kind, index)
    window.in_place.open_part(part, window.sheet.box_of(part))
    return window.in_place.editor


def ask_for_repeats(window) -> CountPopup:
    window.view.set_selection(Selection(segments=frozenset((2, 3))))
    window.shaping.repeat()
    return window.shaping.popup


def turn_wheel(pointer, notches):
    at = QPointF(400.0, 60.0)
    where = QPointF(pointer.viewport.mapToGlobal(at.toPoint()))
    angle, phase = QPoint(0, 120 * notches), Qt.ScrollPhase.NoScrollPhase
    event = QWheelEvent(at, where, QPoint(), angle, NONE, PLAIN, phase, False)
    QApplication.sendEvent(pointer.viewport, event)


@pytest.mark.usefixtures("pointer")
def test_a_menu_of_the_field_does_not_close_it(window):
    line = type_in_place(window, "length", 1)
    QApplication.sendEvent(line, QFocusEvent(QEvent.Type.FocusOut, POPUP))
    assert window.in_place.editor is line
    window.in_place.cancel()
    popup = ask_for_repeats(window)
    QApplication.sendEvent(popup.field, QFocusEvent(QEvent.Type.FocusOut, POPUP))
    assert window.shaping.popup is popup


@pytest.mark.usefixtures("pointer")
def test_another_project_ends_the_question_how_often(window):
    ask_for_repeats(window)
    other = member([Part(0.3, AreaSection(area=1e-3))], {0: FixedSupport()})
    window.document.load(other, None)
    assert window.shaping.popup is None
    assert window.document.project is other


def test_undo_takes_back_the_question_how_often_first(window, pointer):
    pointer.drag("joint", 2, "end", 30.0)
    pulled = window.document.project
    ask_for_repeats(window)
    window.actions_by_key["undo"].trigger()
    assert window.shaping.popup is None
    assert window.document.preview is None
    assert window.document.project is pulled


def test_the_editor_on_the_drawing_goes_along_with_a_zoom(qtbot, window, pointer):
    line = type_in_place(window, "length", 1)
    before = line.parentWidget().geometry()
    turn_wheel(pointer, 4)
    qtbot.waitUntil(lambda: line.parentWidget().geometry() != before)
    assert window.in_place.editor is line


def test_the_sheet_keeps_still_while_an_exact_value_is_typed(window, pointer):
    window.sheet.setFocus()
    pointer.drag("joint", 2, "end", 30.0)
    QTest.keyClicks(window.sheet, "5")
    ruler = window.sheet.ruler
    turn_wheel(pointer, 4)
    assert window.hand.phase is Phase.TYPING
    assert window.sheet.ruler == ruler


def test_no_menu_opens_while_something_is_pulled(window, pointer):
    pointer.grab("joint", 2, "end")
    pointer.pull(30.0)
    right = Qt.MouseButton.RightButton
    pointer.send(QEvent.Type.MouseButtonPress, right, LEFT | right)
    at = pointer.at.toPoint()
    asked = QContextMenuEvent(QContextMenuEvent.Reason.Mouse, at, pointer.viewport.mapToGlobal(at))
    QApplication.sendEvent(pointer.viewport, asked)
    assert window.sheet_menu.menu is None
    assert window.hand.phase is Phase.PULLING


@pytest.mark.parametrize("lay", ["pointer", "upright"])
def test_the_first_joint_says_why_it_stays(request, window, lay):
    pointer = request.getfixturevalue(lay)
    told = []
    window.hand.told.connect(told.append)
    axes, ruler = window.sheet.places.axes, window.sheet.ruler
    across = window.sheet.drawing.picture.axis - 3.0
    first = ruler.pixel(0.0)
    pointer.at = QPointF(across, first) if axes.upright else QPointF(first, across)
    pointer.outward = QPointF(1.0, 1.0)
    pointer.press()
    assert not told
    pointer.pull(40.0)
    pointer.let_go()
    assert [line.startswith("The first joint stays") for line in told] == [True]


@pytest.mark.usefixtures("pointer")
def test_a_load_typed_in_a_combination_says_how_it_counts_there(window):
    type_in_place(window, "force", 2)
    assert "\n" not in window.in_place.caption
    window.in_place.cancel()
    window.view.set_shown(Shown("combination", "Both"))
    line = type_in_place(window, "force", 2)
    note = "the number of the case itself; it counts ×2 in Both"
    assert window.in_place.caption.split("\n")[1] == note
    assert note in line.accessibleName()


def test_another_project_puts_band_and_symbol_away(window, pointer):
    drawing = window.sheet.places.drawing
    pointer.at, pointer.outward = drawing.topLeft() + QPointF(4.0, 4.0), QPointF(1.0, 0.3)
    pointer.press(SHIFT)
    pointer.pull(800.0, SHIFT)
    window.document.load(member([Part(0.3, AreaSection(area=1e-3))], {0: FixedSupport()}), None)
    pointer.let_go(SHIFT)
    assert window.view.selection == Selection()
    QTest.keyClicks(window.sheet, "D")
    assert window.placing.kind is not None
    window.document.load(member([Part(0.4, AreaSection(area=1e-3))], {0: FixedSupport()}), None)
    assert window.placing.kind is None
