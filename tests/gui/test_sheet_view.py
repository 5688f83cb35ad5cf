"""The sheet with real events: one ruler, one cursor, selection, both layouts, stale, empty, light, dark."""

from __future__ import annotations

import pytest
from msgspec.structs import replace
from PySide6.QtCore import QEvent, QPoint, QPointF, QRectF, QSize, Qt
from PySide6.QtGui import QColor, QMouseEvent, QPalette, QWheelEvent
from PySide6.QtWidgets import QApplication
from pytestqt.qtbot import QtBot

from app.drawing.shapes import Part
from app.gui.fonts import Fonts
from app.gui.sheet_view import SheetView
from app.gui.theme import DARK, LIGHT
from app.gui.view import Cursor, Selection, Shown, View
from app.samples import read_sample
from app.units import SYSTEM_NAMES
from solver.results import Results
from solver.solve import solve
from tests.drawn_members import busy_member

PILE = read_sample("quay_pile")
PILE_RESULTS = solve(PILE)
BOTH_WAYS = pytest.mark.parametrize("orientation", ["horizontal", "vertical"])


@pytest.fixture
def view() -> View:
    made = View()
    state = PILE_RESULTS.states[0]
    made.set_shown(Shown(state.kind, state.name))
    return made


@pytest.fixture
def sheet(qtbot: QtBot, view: View) -> SheetView:
    made = SheetView(view)
    qtbot.addWidget(made)
    made.resize(900, 500)
    made.show_results(PILE, PILE_RESULTS, True)
    with qtbot.waitExposed(made):
        made.show()
    return made


def point_of(sheet: SheetView, x: float) -> QPoint:
    """A point of the second strip at a position along the member."""
    middle = sheet.strips[1].place.rect.center()
    along = sheet.ruler.pixel(x)
    axes = sheet.places.axes
    across = middle.x() if axes.upright else middle.y()
    return axes.point(along, across).toPoint()


def move_mouse(sheet: SheetView, point: QPoint, buttons=Qt.MouseButton.NoButton) -> None:
    at = QPointF(point)
    glob = QPointF(sheet.viewport().mapToGlobal(point))
    event = QMouseEvent(
        QEvent.Type.MouseMove, at, glob, Qt.MouseButton.NoButton, buttons, Qt.KeyboardModifier.NoModifier
    )
    QApplication.sendEvent(sheet.viewport(), event)


class TestCursor:
    @BOTH_WAYS
    def test_follows_the_mouse_on_drawing_and_strips_alike(self, sheet, view, orientation):
        sheet.set_orientation(orientation)
        move_mouse(sheet, point_of(sheet, 8.0))
        pixel = 1.0 / sheet.ruler.pixels_per_metre
        assert view.cursor.x == pytest.approx(8.0, abs=pixel)
        drawing = sheet.places.drawing.center()
        axes = sheet.places.axes
        across = drawing.x() if axes.upright else drawing.y()
        move_mouse(sheet, axes.point(sheet.ruler.pixel(12.0), across).toPoint())
        assert view.cursor.x == pytest.approx(12.0, abs=pixel)

    def test_the_mouse_takes_a_joint_that_is_near(self, sheet, view):
        move_mouse(sheet, point_of(sheet, 10.5) + QPoint(3, 0))
        assert view.cursor.x == 10.5
        assert "(joint bed)" in sheet.readout

    def test_crosses_drawing_and_strips_at_the_rulers_pixel(self, sheet, view):
        view.set_cursor(Cursor(5.0))
        first, last = sheet.scene().cursor_line.line
        assert first.x() == last.x() == pytest.approx(sheet.ruler.pixel(5.0))
        assert first.y() <= sheet.places.drawing.top() + 1
        assert last.y() >= sheet.strips[3].place.rect.bottom() - 1

    @pytest.mark.parametrize(
        ("orientation", "forward", "back"),
        [("horizontal", Qt.Key.Key_Right, Qt.Key.Key_Left), ("vertical", Qt.Key.Key_Up, Qt.Key.Key_Down)],
    )
    def test_moves_by_keys(self, qtbot, sheet, view, orientation, forward, back):
        sheet.set_orientation(orientation)
        view.set_cursor(Cursor(4.4))
        qtbot.keyClick(sheet, forward)
        assert 4.4 < view.cursor.x <= 4.5
        qtbot.keyClick(sheet, forward, Qt.KeyboardModifier.ControlModifier)
        qtbot.keyClick(sheet, Qt.Key.Key_Control)
        assert view.cursor.x in (4.5, 10.5)
        qtbot.keyClick(sheet, Qt.Key.Key_Home)
        assert view.cursor.x == 0.0
        qtbot.keyClick(sheet, back)
        assert view.cursor.x == 0.0
        qtbot.keyClick(sheet, Qt.Key.Key_End)
        assert view.cursor.x == pytest.approx(20.2)

    def test_arrow_keys_halt_at_a_joint_on_the_way(self, qtbot, sheet, view):
        view.set_cursor(Cursor(4.49))
        qtbot.keyClick(sheet, Qt.Key.Key_Right)
        assert view.cursor.x == 4.5

    def test_space_selects_the_segment_it_is_in(self, qtbot, sheet, view):
        view.set_cursor(Cursor(12.0))
        qtbot.keyClick(sheet, Qt.Key.Key_Space)
        assert view.selection == Selection(segments=frozenset({2}))

    def test_set_from_elsewhere_outside_the_window_brings_it_in(self, sheet, view):
        sheet.zoom(6.0, sheet.ruler.begin)
        view.set_cursor(Cursor(19.0))
        assert sheet.ruler.holds(19.0)


class TestZoom:
    def test_by_wheel_is_about_the_pointer_and_shared(self, sheet):
        place = point_of(sheet, 8.0)
        at = QPointF(place)
        event = QWheelEvent(
            at,
            QPointF(sheet.viewport().mapToGlobal(place)),
            QPoint(),
            QPoint(0, 240),
            Qt.MouseButton.NoButton,
            Qt.KeyboardModifier.NoModifier,
            Qt.ScrollPhase.NoScrollPhase,
            False,
        )
        QApplication.sendEvent(sheet.viewport(), event)
        assert not sheet.ruler.whole_shown
        assert sheet.ruler.pixel(8.0) == pytest.approx(place.x(), abs=1.0)
        assert {strip.place.ruler for strip in sheet.strips} == {sheet.ruler}

    def test_drag_pans_and_double_click_fits(self, qtbot, sheet):
        sheet.zoom(4.0, 0.5 * (sheet.ruler.begin + sheet.ruler.end))
        before = sheet.ruler
        start = point_of(sheet, before.position_at(0.5 * (before.begin + before.end)))
        qtbot.mousePress(sheet.viewport(), Qt.MouseButton.LeftButton, pos=start)
        for step in (10, 30, 60):
            move_mouse(sheet, start + QPoint(step, 0), Qt.MouseButton.LeftButton)
        qtbot.mouseRelease(sheet.viewport(), Qt.MouseButton.LeftButton, pos=start + QPoint(60, 0))
        assert sheet.ruler.first < before.first
        qtbot.mouseDClick(sheet.viewport(), Qt.MouseButton.LeftButton, pos=start)
        assert sheet.ruler.whole_shown

    def test_by_keys(self, qtbot, sheet):
        qtbot.keyClick(sheet, Qt.Key.Key_Plus)
        assert not sheet.ruler.whole_shown
        qtbot.keyClick(sheet, Qt.Key.Key_0)
        assert sheet.ruler.whole_shown

    def test_survives_an_edit_that_keeps_the_place(self, sheet):
        sheet.zoom(4.0, sheet.ruler.begin)
        before = sheet.ruler
        sheet.show_results(PILE, PILE_RESULTS, True)
        assert sheet.ruler == before


class TestSelection:
    @BOTH_WAYS
    def test_a_click_on_a_segment_selects_it(self, qtbot, sheet, view, orientation):
        sheet.set_orientation(orientation)
        target = next(t for t in sheet.drawing.picture.targets if t.part == Part("segment", 2))
        with qtbot.waitSignal(
            sheet.drawing.clicked, check_params_cb=lambda part, _mods: part == Part("segment", 2)
        ):
            place = _beside_mark(QPointF(*target.box.centre), sheet)
            qtbot.mouseClick(sheet.viewport(), Qt.MouseButton.LeftButton, pos=place)
        assert view.selection == Selection(segments=frozenset({2}))

    def test_of_a_segment_is_lit_in_the_drawing(self, sheet, view):
        before = sheet.grab().toImage()
        view.set_selection(Selection(segments=frozenset({1})))
        assert sheet.grab().toImage() != before

    def test_hovering_tells_the_part(self, qtbot, sheet):
        target = next(t for t in sheet.drawing.picture.targets if t.part == Part("segment", 0))
        with qtbot.waitSignal(sheet.drawing.hovered, check_params_cb=lambda p: p == Part("segment", 0)):
            move_mouse(sheet, QPointF(*target.box.centre).toPoint() + QPoint(20, 0))
        assert "P1" in sheet.drawing.toolTip()


def _beside_mark(point: QPointF, sheet: SheetView) -> QPoint:
    return sheet.places.axes.point(*_along_across(point, sheet)).toPoint()


def _along_across(point: QPointF, sheet: SheetView) -> tuple[float, float]:
    axes = sheet.places.axes
    across = point.x() if axes.upright else point.y()
    return axes.along(point) + 5.0, across


class TestWhatIsShown:
    def test_changes_with_the_shown_state(self, sheet, view):
        first = sheet.strips[1].content
        view.set_shown(Shown("envelope"))
        assert sheet.strips[1].content is not first
        assert len(sheet.strips[1].content.traces) == 2

    def test_joint_lines_run_through_all(self, sheet):
        assert sheet.scene().joint_lines.count == len(PILE.joints)

    def test_without_results_the_drawing_stays_and_the_strips_say_why(self, sheet):
        sheet.show_results(PILE, None, False)
        assert [strip.content for strip in sheet.strips] == [None] * 4
        assert "findings" in sheet.notice
        sheet.show_results(PILE, None, False, waiting=True)
        assert "findings" not in sheet.notice
        assert sheet.drawing.picture.targets

    def test_out_of_date_results_are_greyed_and_say_so(self, sheet, view):
        view.set_cursor(Cursor(3.0))
        assert sheet.notice == ""
        current = _colours(sheet)
        sheet.show_results(PILE, PILE_RESULTS, False)
        assert sheet.notice == "out of date"
        assert "out of date" in sheet.readout
        assert LIGHT.compression in current
        assert LIGHT.compression not in _colours(sheet)
        sheet.show_results(PILE, PILE_RESULTS, True)
        assert LIGHT.compression in _colours(sheet)

    def test_an_edit_that_changes_the_number_of_segments(self, sheet, view):
        view.set_cursor(Cursor(20.0))
        project = busy_member(3)
        sheet.show_results(project, solve(project), True)
        assert sheet.ruler.length == pytest.approx(1.05)
        assert sheet.scene().joint_lines.count == 4
        sheet.show_results(project, PILE_RESULTS, False)  # an earlier edit's results over a newer drawing

    def test_a_project_not_solved_yet_can_be_zoomed_and_turned(self, qtbot):
        made = SheetView(View())
        qtbot.addWidget(made)
        made.show_results(busy_member(2), None, False)
        made.set_orientation("vertical")
        made.zoom(2.0)
        qtbot.keyClick(made, Qt.Key.Key_End)
        assert made.readout == ""


def _colours(sheet: SheetView) -> set[str]:
    image = sheet.grab().toImage()
    return {
        QColor(image.pixel(x, y)).name().upper()
        for x in range(0, image.width(), 3)
        for y in range(image.height() // 3, image.height())
    }


class TestTheme:
    def test_follows_the_palette(self, sheet):
        palette = QPalette()
        palette.setColor(QPalette.ColorRole.Window, QColor("#111111"))
        palette.setColor(QPalette.ColorRole.WindowText, QColor("#EEEEEE"))
        sheet.setPalette(palette)
        corner = QColor(sheet.grab().toImage().pixel(2, 2)).name().upper()
        assert corner == DARK.paper

    def test_has_a_name_for_those_who_hear_it(self, sheet):
        assert sheet.accessibleName()
        assert sheet.focusPolicy() == Qt.FocusPolicy.StrongFocus


def test_results_of_the_sample_are_what_the_tests_think(qapp):
    assert isinstance(PILE_RESULTS, Results)
    assert [joint.mark for joint in PILE.joints][2] == "bed" or PILE_RESULTS.position[3] == 10.5


class TestReadout:
    @pytest.mark.parametrize("units", SYSTEM_NAMES)
    @BOTH_WAYS
    def test_is_never_cut_off_and_names_both_sides_of_a_joint(self, qtbot, units, orientation):
        view = View()
        sheet = SheetView(view)
        qtbot.addWidget(sheet)
        sheet.resize(920, 480)  # as in a window of 1280×800
        sheet.set_orientation(orientation)
        project = replace(PILE, display=replace(PILE.display, units=units))
        results = solve(project)
        sheet.show_results(project, results, True)
        states = [Shown(state.kind, state.name) for state in results.states]
        for shown in (Shown("envelope"), *states):
            view.set_shown(shown)
            for x in results.position[1:-1]:
                move_mouse(sheet, point_of(sheet, float(x)))
                assert view.cursor.x == x
                assert "joint" in sheet.readout
                # Force or section step at each joint above; further down both sides are equal.
                if shown.kind != "case":
                    assert ("|" in sheet.readout) == (x > 11.0)
                box, text = sheet.readout_box, Fonts(sheet.font()).measure(sheet.readout, "plain")
                assert text.width() <= box.width()
                assert text.height() <= box.height()
                assert sheet.scene().sceneRect().contains(box)
                assert not box.intersects(sheet.places.strips[-1])


class TestLargeFonts:
    @pytest.mark.parametrize("size", [1.0, 1.5, 2.0])
    @BOTH_WAYS
    def test_strips_keep_room_for_their_words(self, qtbot, size, orientation):
        sheet = SheetView(View())
        qtbot.addWidget(sheet)
        font = sheet.font()
        font.setPointSizeF(size * font.pointSizeF())
        sheet.setFont(font)
        sheet.set_orientation(orientation)
        sheet.resize(sheet.minimumSize().expandedTo(QSize(980, 480)))
        sheet.show_results(PILE, PILE_RESULTS, True)
        whole = sheet.scene().sceneRect()
        for strip in sheet.strips:
            assert whole.contains(strip.place.rect)
            assert len(strip.labels) >= 2
            assert [label.text for label in strip.labels if not whole.contains(label.rect)] == []


def test_without_a_cursor_the_foot_says_how_to_read_values(window):
    window.view.set_cursor(None)
    assert "Point at the sheet" in window.sheet.readout
    window.view.set_cursor(Cursor(0.5))
    assert "Point at the sheet" not in window.sheet.readout


@BOTH_WAYS
def test_the_cursor_leaves_room_for_what_says_that_results_are_out_of_date(sheet, view, orientation):
    sheet.set_orientation(orientation)
    sheet.show_results(PILE, PILE_RESULTS, current=False, waiting=False)
    (box,) = sheet.paper.notice_box.boxes
    axes = sheet.places.axes
    view.set_cursor(Cursor(sheet.ruler.position_at(axes.along(box.center()))))
    low, high = axes.across_of(box)
    drawn = [sorted(axes.across_of(QRectF(s.p1(), s.p2()))) for s in sheet.scene().cursor_line.drawn]
    assert drawn
    assert all(last <= low or first >= high for first, last in drawn)


@BOTH_WAYS
def test_the_cursor_leaves_room_for_the_texts_that_it_meets(sheet, view, orientation):
    sheet.set_orientation(orientation)
    line, axes = sheet.scene().cursor_line, sheet.places.axes
    met = 0
    for part in range(1, 40):
        x = PILE_RESULTS.position[-1] * part / 40
        view.set_cursor(Cursor(float(x)))
        along = sheet.ruler.pixel(x)
        drawn = [sorted(axes.across_of(QRectF(s.p1(), s.p2()))) for s in line.drawn]
        boxes = [t.box for t in sheet.drawing.picture.texts]
        rects = [QRectF(b.left, b.top, b.right - b.left, b.bottom - b.top) for b in boxes]
        for rect in (*rects, *(label.rect for strip in sheet.strips for label in strip.labels)):
            first, last = axes.along_of(rect)
            if first < along < last:
                low, high = axes.across_of(rect)
                met += 1
                assert all(end <= low or begin >= high for begin, end in drawn)
    assert met > 10
