"""Strips chosen and ordered on the real window: by dragging titles, by menus, remembered."""

import pytest
from PySide6.QtCore import QPoint, QPointF, Qt
from PySide6.QtGui import QContextMenuEvent
from PySide6.QtTest import QTest
from PySide6.QtWidgets import QApplication

from app.gui.main import open_window
from app.gui.settings import Settings
from app.strip_choice import KINDS, USUAL, StripChoice
from tests.gui.windows import end, solved

U, N, SIGMA, UTILISATION, MODE = KINDS
LEFT = Qt.MouseButton.LeftButton
BOTH_WAYS = pytest.mark.parametrize("layout", ["horizontal", "vertical"])


def shown(window):
    return tuple(strip.content.kind for strip in window.sheet.strips)


def grip(window, index):
    return window.strip_hand._grips.grip(index).center().toPoint()


def turn(window, layout):
    window.on_layout_picked(layout)
    assert window.sheet.places.axes.upright is (layout == "vertical")


def ask_for_menu(window, point):
    """The right mouse button on the sheet."""
    viewport = window.sheet.viewport()
    reason = QContextMenuEvent.Reason.Mouse
    QApplication.sendEvent(viewport, QContextMenuEvent(reason, point, viewport.mapToGlobal(point)))


def pick(menu, text):
    """Choose an entry by the keyboard."""
    action = next(a for a in menu.actions() if a.text().replace("&", "") == text)
    menu.setActiveAction(action)
    QTest.keyClick(menu, Qt.Key.Key_Return)


def drag(window, first, last, *, release=True):
    """Press, move in steps, let go."""
    viewport = window.sheet.viewport()
    QTest.mousePress(viewport, LEFT, pos=first)
    for share in (0.3, 0.6, 1.0):
        QTest.mouseMove(viewport, QPoint(*(first + (last - first) * share).toTuple()))
    if release:
        QTest.mouseRelease(viewport, LEFT, pos=last)


@BOTH_WAYS
def test_a_strip_is_dragged_by_its_title_to_another_place(window, layout):
    turn(window, layout)
    first, last = grip(window, 2), grip(window, 0) - QPoint(10, 10)
    drag(window, first, last, release=False)
    assert window.strip_hand.mark.isVisible()
    QTest.mouseRelease(window.sheet.viewport(), LEFT, pos=last)
    assert shown(window) == (SIGMA, U, N, UTILISATION)
    assert not window.strip_hand.mark.isVisible()
    across = [window.sheet.places.axes.across_of(strip.place.rect)[0] for strip in window.sheet.strips]
    assert across == sorted(across)


def test_escape_leaves_a_dragged_strip_where_it_was(window):
    window.sheet.setFocus()
    drag(window, grip(window, 2), grip(window, 0), release=False)
    QTest.keyClick(window.sheet, Qt.Key.Key_Escape)
    QTest.mouseRelease(window.sheet.viewport(), LEFT, pos=grip(window, 0))
    assert shown(window) == USUAL


def test_a_click_on_a_title_moves_nothing(window):
    QTest.mouseClick(window.sheet.viewport(), LEFT, pos=grip(window, 2))
    assert shown(window) == USUAL


@BOTH_WAYS
def test_the_context_menu_moves_and_hides(window, layout):
    turn(window, layout)
    back, on = ("Move left", "Move right") if layout == "vertical" else ("Move up", "Move down")
    ask_for_menu(window, grip(window, 1))
    pick(window.strip_menu, on)
    assert shown(window) == (U, SIGMA, N, UTILISATION)
    ask_for_menu(window, window.sheet.strips[3].place.rect.center().toPoint())
    pick(window.strip_menu, back)
    assert shown(window) == (U, SIGMA, UTILISATION, N)
    ask_for_menu(window, grip(window, 0))
    pick(window.strip_menu, "Hide u, displacement")
    assert shown(window) == (SIGMA, UTILISATION, N)
    ask_for_menu(window, grip(window, 0))
    pick(window.strip_menu, "Show u, displacement")
    assert shown(window) == (U, SIGMA, UTILISATION, N)


@BOTH_WAYS
def test_the_room_of_hidden_strips_goes_to_the_others(window, layout):
    turn(window, layout)
    axes = window.sheet.places.axes
    whole = [axes.across_of(rect) for rect in window.sheet.places.strips]
    window.view.set_strips(StripChoice((SIGMA, N)))
    two = [axes.across_of(rect) for rect in window.sheet.places.strips]
    assert (two[0][0], two[-1][1]) == pytest.approx((whole[0][0], whole[-1][1]))
    assert all(high - low > 1.5 * (whole[2][1] - whole[2][0]) for low, high in two)
    assert [s.isVisible() for s in window.sheet.scene()._strips.values()] == [False, True, True, False, False]


def test_the_menu_of_the_window_does_the_same_from_the_keyboard(window):
    menu = window.strips_menu
    menu.popup(QPoint(0, 0))
    QTest.keyClick(menu, Qt.Key.Key_2)
    assert shown(window) == (U, SIGMA, UTILISATION)
    menu.popup(QPoint(0, 0))
    assert [a.isChecked() for a in menu.actions()[:4]] == [True, True, True, False]
    pick(menu, "The usual strips in their usual order")
    assert shown(window) == USUAL


def test_the_last_strip_cannot_be_hidden(window):
    window.view.set_strips(StripChoice((SIGMA,)))
    ask_for_menu(window, grip(window, 0))
    hide = next(a for a in window.strip_menu.actions() if "Hide" in a.text())
    assert not hide.isEnabled()
    window.strip_menu.close()


def test_the_choice_is_remembered(qtbot, window, rod, store, tmp_path):
    window.view.set_strips(StripChoice((SIGMA, U)))
    window.view.set_together(True)
    end(qtbot, window)
    again = open_window(rod, Settings(tmp_path / "settings.ini"), tmp_path / "recovery")
    solved(qtbot, again)
    assert shown(again) == (SIGMA, U)
    assert again.view.together
    end(qtbot, again)


def test_a_hand_shows_over_a_title_and_goes_again(window):
    viewport = window.sheet.viewport()
    QTest.mouseMove(viewport, grip(window, 1))
    assert viewport.cursor().shape() == Qt.CursorShape.OpenHandCursor
    QTest.mouseMove(viewport, window.sheet.strips[1].place.rect.center().toPoint())
    assert viewport.cursor().shape() == Qt.CursorShape.ArrowCursor


def test_gaps_are_counted_between_the_strips(window):
    grips = window.strip_hand._grips
    middles = [rect.center() for rect in window.sheet.places.strips]
    assert [grips.gap(middle - QPointF(0, 2)) for middle in middles] == [0, 1, 2, 3]
    assert grips.gap(middles[3] + QPointF(0, 2)) == 4
