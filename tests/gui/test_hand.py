"""The hand on the drawing, with real events on the real window: pulls, results that follow, undo, mishaps."""

from __future__ import annotations

import pytest
from msgspec.structs import replace
from PySide6.QtCore import QEvent, QPoint, QPointF, Qt
from PySide6.QtGui import QFocusEvent, QMouseEvent, QWheelEvent
from PySide6.QtTest import QTest
from PySide6.QtWidgets import QApplication

from app import samples
from app.gui.document import Draft
from app.gui.hand.grasp import Phase
from app.gui.view import Selection, Shown
from app.hand.sections import dimension_of
from solver.model import (
    AreaSection,
    Combination,
    FixedSupport,
    JointLoad,
    RectangleSection,
    RoundSection,
    SegmentLoad,
    TubeSection,
)
from tests.gui.hand import text_at
from tests.gui.pointer import CTRL, SHIFT, Pointer, handle_of
from tests.gui.windows import beyond_window, solved
from tests.members import Part, case, member

SECTIONS = (
    RoundSection(diameter=0.05),
    TubeSection(outer=0.08, inner=0.05),
    RectangleSection(width=0.04, depth=0.06),
    AreaSection(area=2e-3),
)


def shaft(orientation="horizontal"):
    """One segment of each shape, held at the start, two cases in a combination."""
    cases = [
        case("Dead", on_segments=[SegmentLoad("B", 1e4, 2e4)], on_joints=[JointLoad("2", 8000.0)]),
        case("Live", on_joints=[JointLoad("4", 5000.0)]),
    ]
    parts = [Part(0.3, section, allowable_tension=1.6e8, allowable_compression=1.4e8) for section in SECTIONS]
    both = Combination("Both", {"Dead": 2.0, "Live": 1.5})
    made = member(parts, {0: FixedSupport()}, cases, [both])
    return replace(made, display=replace(made.display, orientation=orientation))


@pytest.fixture(params=["horizontal", "vertical"])
def orientation(request):
    return request.param


@pytest.fixture
def pointer(qtbot, window):
    """Over the shaft, lying across, case Dead shown and edited."""
    return opened(qtbot, window, "horizontal")


@pytest.fixture
def either(qtbot, window, orientation):
    """The same, in both orientations."""
    return opened(qtbot, window, orientation)


def opened(qtbot, window, orientation):
    window.document.load(shaft(orientation), None)
    solved(qtbot, window)
    window.view.set_shown(Shown("case", "Dead"))
    window.sheet.setFocus()
    QApplication.processEvents()
    return Pointer(window)


def lengths(window, *, preview=False):
    project = window.document.shown_project if preview else window.document.project
    return [segment.length for segment in project.segments]


def sizes(window, index, *, inner=False):
    return dimension_of(window.document.project.segments[index].section, inner=inner).ends


class TestJoint:
    def test_what_lies_beyond_moves_along(self, qtbot, window, either):
        either.drag("joint", 2, "end", 60)
        a, b, c, d = lengths(window)
        assert (a, c, d) == (0.3, 0.3, 0.3)
        assert b > 0.3
        assert window.document.undo_name == "Length of B"

    def test_with_shift_the_total_stays(self, qtbot, window, either):
        either.drag("joint", 2, "end", 30, SHIFT)
        a, b, c, d = lengths(window)
        assert (a, d) == (0.3, 0.3)
        assert b > 0.3
        assert b + c == pytest.approx(0.6, rel=1e-15)

    def test_results_follow_while_it_is_pulled(self, qtbot, window, pointer):
        before = window.showing.outcome.results
        pointer.grab("joint", 4, "end")
        pointer.pull(60)
        solved(qtbot, window)
        results = window.showing.outcome.results
        assert results is not before
        assert results.project is window.document.shown_project
        assert window.document.project.segments[3].length == 0.3
        assert results.project.segments[3].length > 0.3

    def test_the_table_follows_too_and_goes_back(self, window, pointer):
        table = window.tables.views["segments"]
        total = table.table_model.index(table.table_model.rowCount() - 1, table.table_model.total_column)
        before = text_at(table, 2, "length"), total.data()
        pointer.grab("joint", 2, "end")
        pointer.pull(40)
        pulled = lengths(window, preview=True)
        assert (text_at(table, 2, "length"), total.data()) != before
        assert text_at(table, 2, "length") == f"{1000 * pulled[1]:g}"
        assert f"{1000 * sum(pulled):g}" in total.data().replace("\u2009", "")
        QTest.keyClick(window.sheet, Qt.Key.Key_Escape)
        assert text_at(table, 2, "length") == before[0]
        assert total.data().split(",")[0] == before[1].split(",")[0]

    def test_the_joint_stays_under_the_pointer_and_the_sheet_fits_afterwards(self, window, either):
        either.grab("joint", 2, "end")
        ruler = window.sheet.ruler
        either.pull(40, CTRL)
        joint = handle_of(window, "joint", 2, "end")
        along = window.sheet.places.axes.along
        assert along(QPointF(*joint.centre)) == pytest.approx(along(either.at), abs=2.0)
        for x in (0.0, 0.3, 0.9):
            assert window.sheet.ruler.pixel(x) == ruler.pixel(x)
        either.let_go(CTRL)
        assert window.sheet.ruler.whole_shown
        assert window.sheet.ruler.last == pytest.approx(sum(lengths(window)))

    def test_the_end_stays_on_the_sheet_however_far_it_is_pulled(self, window, either):
        last = len(lengths(window))
        before = lengths(window)[-1]
        either.grab("joint", last, "end")
        grown = before
        for _ in range(12):
            either.move(40, CTRL)
            assert window.sheet.ruler.holds(sum(lengths(window, preview=True)))
            assert lengths(window, preview=True)[-1] > grown
            grown = lengths(window, preview=True)[-1]
        assert handle_of(window, "joint", last, "end")
        either.move(-40, CTRL)
        assert before < lengths(window, preview=True)[-1] < grown
        QTest.keyClick(window.sheet, Qt.Key.Key_Escape)
        assert lengths(window)[-1] == before
        assert window.sheet.ruler.whole_shown
        assert window.sheet.ruler.last == pytest.approx(sum(lengths(window)))

    def test_shift_in_mid_pull_changes_the_way_and_both_look_different(self, window, pointer):
        pointer.grab("joint", 2, "end")
        pointer.pull(30)
        marks, bubble = window.sheet.paper.hand_marks, window.sheet.paper.bubble
        first, words, shape = marks.way, bubble.text, pointer.viewport.cursor().shape()
        QTest.keyPress(window.sheet, Qt.Key.Key_Shift)
        assert "the total stays" in bubble.text.split("\n")[0]
        assert "moves along" in words.split("\n")[0]
        assert marks.way != first
        assert pointer.viewport.cursor().shape() != shape
        assert sum(lengths(window, preview=True)) == pytest.approx(1.2)
        QTest.keyRelease(window.sheet, Qt.Key.Key_Shift)
        assert bubble.text == words
        pointer.let_go()

    def test_ctrl_is_free_of_round_steps(self, window, pointer):
        pointer.drag("joint", 1, "end", 33)
        snapped = lengths(window)[0]
        window.on_undo()
        pointer.drag("joint", 1, "end", 33, CTRL)
        assert round(1000 * snapped) % 5 == 0
        assert 0 < abs(lengths(window)[0] - snapped) < 0.01

    def test_a_joint_cannot_be_pulled_over_its_neighbour(self, window, pointer):
        pointer.drag("joint", 2, "end", -900)
        assert 0 < lengths(window)[1] < 0.02


class TestEdges:
    @pytest.mark.parametrize("index", range(4), ids=["round", "tube", "rectangle", "area"])
    def test_the_middle_changes_both_ends(self, window, either, index):
        before = sizes(window, index)
        either.drag("edge", index, "both", 12)
        start, end = sizes(window, index)
        assert start == end > before[0]

    @pytest.mark.parametrize("where", ["start", "end"])
    def test_an_end_makes_a_taper(self, window, either, where):
        either.drag("edge", 0, where, 12)
        start, end = sizes(window, 0)
        assert (start > end == 0.05) if where == "start" else (end > start == 0.05)
        assert window.document.undo_name == "Diameter of A"

    def test_a_bore_stops_below_the_outside(self, window, either):
        either.drag("bore", 1, "both", 200)
        assert 0.05 < sizes(window, 1, inner=True)[0] < 0.08

    def test_the_old_outline_stays_as_a_ghost_and_rows_keep_still(self, window, pointer):
        edge = handle_of(window, "edge", 1, "both")
        pointer.grab("edge", 1, "both")
        pointer.pull(30)
        ghost = window.sheet.paper.hand_marks.ghost
        assert len(ghost) == 4
        moved = next(h for h in window.sheet.drawing.handles if h.key == edge.key)
        assert abs(moved.centre[1] - pointer.at.y()) < 3.0
        pointer.let_go()
        assert window.sheet.paper.hand_marks.ghost == ()

    @pytest.mark.parametrize("end", [-1, 1])
    def test_zoomed_in_the_ghost_is_cut_where_the_member_goes_on(self, window, either, end):
        window.view.set_selection(Selection(segments=frozenset((1,))))
        window.sheet.zoom_to_selection()
        either.grab("edge", 1, "both")
        either.pull(-30)
        assert window.sheet.paper.hand_marks.ghost
        assert not beyond_window(window, window.sheet.paper.hand_marks.ghost_layer, end)
        either.let_go()


class TestLoads:
    def force(self, window, number=0):
        return window.document.project.load_cases[number].joint_loads[0].force

    def test_a_force_is_pulled_along(self, window, either):
        either.drag("force", 2, "both", 40)
        assert self.force(window) == 12000.0

    def test_through_zero_the_arrow_turns(self, window, pointer):
        pointer.drag("force", 2, "both", -160)
        assert self.force(window) == -8000.0

    def test_under_a_factor_the_case_changes_so_that_the_sum_follows(self, window, pointer):
        window.view.set_shown(Shown("combination", "Both"))
        pointer.grab("force", 2, "both")
        pointer.pull(40)
        text = window.sheet.paper.bubble.text
        pointer.let_go()
        assert self.force(window) == 12000.0
        assert "×2: 24 kN" in text or "×2: 24\u202f000 N" in text

    def test_a_case_that_takes_no_part_moves_nothing_and_the_status_says_why(self, window, pointer):
        window.tables.case_picker.setCurrentIndex(1)
        window.tables.on_case_picked(1)
        before = window.document.project
        pointer.drag("force", 2, "both", 40)
        assert window.document.project is before
        assert "Live, whose loads are edited, takes no part in Dead" in window.status.news.text()

    @pytest.mark.parametrize(
        ("where", "expected"), [("start", (2e4, 2e4)), ("end", (1e4, 3e4)), ("both", (2e4, 3e4))]
    )
    def test_a_distributed_load_by_its_ends(self, window, either, where, expected):
        either.drag("distributed", 1, where, 40)
        load = window.document.project.load_cases[0].segment_loads[0]
        end = (
            load.load_start
            if load.load_end is not None and not isinstance(load.load_end, float)
            else load.load_end
        )
        assert (load.load_start, end) == expected

    def test_several_records_are_refused_with_the_reason_at_the_pointer(self, qtbot, window, pointer):
        project = window.document.project
        dead = replace(project.load_cases[0], joint_loads=(JointLoad("2", 1000.0), JointLoad("2", 2000.0)))
        window.document.commit(replace(project, load_cases=(dead, project.load_cases[1])), "Test")
        solved(qtbot, window)
        pointer.grab("force", 2, "both")
        pointer.pull(40)
        assert "2 load records" in window.sheet.paper.bubble.text
        pointer.let_go()
        assert window.document.undo_name == "Test"
        assert "2 load records" in window.status.news.text()


class TestUndoAndEscape:
    def test_a_gesture_is_one_step(self, window, pointer):
        before = window.document.project
        pointer.drag("joint", 1, "end", 60)
        pointer.drag("joint", 1, "end", 60)
        window.on_undo()
        window.on_undo()
        assert window.document.project is before
        assert window.document.undo_name is None

    def test_escape_restores_exactly(self, qtbot, window, pointer):
        before = window.document.snapshot
        drawn = window.sheet.drawing.picture.strokes
        pointer.grab("joint", 1, "end")
        pointer.pull(60)
        QTest.keyClick(window.sheet, Qt.Key.Key_Escape)
        assert window.document.snapshot is before
        assert window.document.preview is None
        assert window.sheet.drawing.picture.strokes == drawn
        pointer.pull(20)
        pointer.let_go()
        assert window.document.snapshot is before
        solved(qtbot, window)
        assert window.showing.outcome.results.project == before.project

    def test_a_pull_back_to_where_it_began_is_no_step(self, window, pointer):
        pointer.grab("joint", 1, "end")
        pointer.pull(60)
        pointer.pull(-60)
        pointer.let_go()
        assert window.document.undo_name is None

    def test_a_press_without_a_pull_selects_the_part(self, window, pointer):
        pointer.grab("joint", 1, "end")
        pointer.let_go()
        assert window.view.selection == Selection(joints=frozenset((1,)))
        assert window.document.undo_name is None


class TestExactValue:
    def type(self, window, text):
        QTest.keyClicks(window.sheet, text[0])
        QTest.keyClicks(window.hand.entry, text[1:])

    def test_typed_during_a_pull(self, qtbot, window, pointer):
        pointer.grab("joint", 1, "end")
        pointer.pull(60)
        self.type(window, "423.5")
        solved(qtbot, window)
        assert window.showing.outcome.results.project.segments[0].length == 0.4235
        QTest.keyClick(window.hand.entry, Qt.Key.Key_Return)
        pointer.let_go()
        assert lengths(window)[0] == 0.4235
        assert window.document.undo_name == "Length of A"
        window.on_undo()
        assert window.document.undo_name is None

    def test_typed_after_a_pull_amends_its_step(self, window, pointer):
        pointer.drag("joint", 1, "end", 60)
        self.type(window, "17 in")
        QTest.keyClick(window.hand.entry, Qt.Key.Key_Return)
        assert lengths(window)[0] == 0.4318
        window.on_undo()
        assert lengths(window)[0] == 0.3
        assert window.document.undo_name is None

    def test_the_total_stays_also_when_typed(self, window, pointer):
        pointer.drag("joint", 1, "end", 60, SHIFT)
        self.type(window, "350")
        QTest.keyClick(window.hand.entry, Qt.Key.Key_Return)
        assert lengths(window)[:2] == [0.35, 0.25]

    def test_one_end_of_a_taper_is_typed(self, window, pointer):
        pointer.drag("edge", 0, "end", 15)
        self.type(window, "66")
        QTest.keyClick(window.hand.entry, Qt.Key.Key_Return)
        assert sizes(window, 0) == (0.05, 0.066)

    def test_escape_leaves_the_pull_as_it_was(self, window, pointer):
        pointer.drag("joint", 1, "end", 60)
        pulled = window.document.project
        self.type(window, "42")
        QTest.keyClick(window.hand.entry, Qt.Key.Key_Escape)
        assert window.document.project is pulled
        assert window.document.preview is None
        assert window.sheet.hasFocus()

    def test_what_cannot_be_read_stays_with_its_reason(self, window, pointer):
        pointer.drag("joint", 1, "end", 60)
        pulled = window.document.project
        self.type(window, "4x")
        QTest.keyClick(window.hand.entry, Qt.Key.Key_Return)
        assert window.hand.entry.isVisible()
        assert window.hand.entry.text() == "4x"
        assert not window.showing.current
        assert window.document.project is pulled
        assert "x" in window.sheet.paper.bubble.text

    def test_what_is_not_possible_is_refused(self, window, pointer):
        pointer.drag("joint", 1, "end", 60)
        self.type(window, "-3")
        assert "greater than 0" in window.sheet.paper.bubble.text
        QTest.keyClick(window.hand.entry, Qt.Key.Key_Escape)

    def test_once_something_else_is_done_digits_are_not_the_hands(self, window, pointer):
        pointer.drag("joint", 1, "end", 60)
        window.view.set_selection(Selection(segments=frozenset((2,))))
        pointer.at = QPointF(5.0, 5.0)
        pointer.send(QEvent.Type.MouseMove)
        QTest.keyClick(window.sheet, Qt.Key.Key_0)
        assert not window.hand.entry.isVisible()


class TestMishaps:
    @pytest.fixture
    def pulling(self, window, pointer):
        pointer.drag("edge", 0, "both", 12)
        pointer.grab("joint", 1, "end")
        pointer.pull(60)
        assert window.hand.phase is Phase.PULLING
        return pointer

    def clean(self, window):
        assert window.hand.phase is Phase.IDLE
        assert window.document.preview is None
        assert lengths(window)[0] == 0.3 or len(lengths(window)) != 4
        assert window.sheet.paper.bubble.text == ""
        assert window.sheet.paper.hand_marks.ghost == ()

    def test_undo_takes_back_the_pull_and_no_more(self, window, pulling):
        window.actions_by_key["undo"].trigger()
        self.clean(window)
        assert window.document.undo_name == "Diameter of A"
        pulling.let_go()
        assert window.document.undo_name == "Diameter of A"

    def test_another_document(self, qtbot, window, pulling):
        window.document.load(samples.read_sample("quay_pile"), None)
        self.clean(window)
        pulling.pull(20)
        pulling.let_go()
        assert window.document.undo_name is None
        solved(qtbot, window)

    def test_another_window_takes_the_keyboard(self, window, pulling):
        event = QFocusEvent(QEvent.Type.FocusOut, Qt.FocusReason.ActiveWindowFocusReason)
        QApplication.sendEvent(window.sheet, event)
        self.clean(window)

    def test_the_wheel_leaves_the_sheet_still(self, window, pulling):
        ruler = window.sheet.ruler
        at = pulling.at
        glob = QPointF(pulling.viewport.mapToGlobal(at.toPoint()))
        event = QWheelEvent(
            at,
            glob,
            QPoint(),
            QPoint(0, 120),
            Qt.MouseButton.LeftButton,
            Qt.KeyboardModifier.NoModifier,
            Qt.ScrollPhase.NoScrollPhase,
            False,
        )
        QApplication.sendEvent(pulling.viewport, event)
        assert window.sheet.ruler == ruler
        assert window.hand.phase is Phase.PULLING
        pulling.let_go()

    def test_a_state_is_picked(self, window, pulling):
        window.view.set_shown(Shown("case", "Live"))
        self.clean(window)

    def test_the_window_closes(self, window, pulling):
        window._closing = True
        window.close()
        assert window.hand.phase is Phase.IDLE

    def test_with_drafts_a_pull_still_works_and_nothing_looks_current(self, qtbot, window, pointer):
        place = ("segments", 2, "length")
        window.document.commit_draft(place, Draft("3x", "why", "length of C"), "Test")
        pointer.drag("joint", 1, "end", 60)
        assert lengths(window)[0] > 0.3
        assert place in window.document.snapshot.drafts
        assert not window.showing.current

    def test_what_cannot_be_solved_can_be_pulled(self, qtbot, window, pointer):
        project = window.document.project
        free = tuple(replace(joint, support=project.joints[1].support) for joint in project.joints)
        window.document.commit(replace(project, joints=free), "Test")
        solved(qtbot, window)
        assert window.showing.outcome.results is None
        pointer.drag("joint", 1, "end", 60)
        assert lengths(window)[0] > 0.3


def test_a_pull_beside_the_member_still_pans_and_a_click_deselects(window, pointer):
    window.view.set_selection(Selection(segments=frozenset((1,))))
    rect = window.sheet.places.drawing
    pointer.at = QPointF(rect.left() + 6.0, rect.bottom() - 4.0)
    pointer.press()
    pointer.let_go()
    assert window.view.selection == Selection()
    assert window.hand.phase is Phase.IDLE


def test_handles_say_by_the_cursor_which_way_they_go(window, either):
    upright = window.sheet.places.axes.upright
    either.over("edge", 0, "both")
    across = either.viewport.cursor().shape()
    either.over("joint", 2, "end")
    along = either.viewport.cursor().shape()
    either.over("joint", 2, "end", SHIFT)
    shapes = Qt.CursorShape.SizeVerCursor, Qt.CursorShape.SizeHorCursor
    assert (across, along) == (shapes if not upright else shapes[::-1])
    assert either.viewport.cursor().shape() not in (across, along)


class TestKeys:
    """The keyboard's twin of every drag."""

    def select(self, window, **chosen):
        window.view.set_selection(Selection(**{kind: frozenset(found) for kind, found in chosen.items()}))

    def nudge(self, window, key, modifier=Qt.KeyboardModifier.AltModifier, times=1):
        for _ in range(times):
            QTest.keyClick(window.sheet, key, modifier)

    def arrow(self, window, along):
        upright = window.sheet.places.axes.upright
        if along:
            return Qt.Key.Key_Up if upright else Qt.Key.Key_Right
        return (
            Qt.Key.Key_Left if upright else Qt.Key.Key_Down
        )  # away from the loads' side, on the axis' other

    def test_a_burst_of_nudges_is_one_step(self, window, either):
        self.select(window, segments=[1])
        self.nudge(window, self.arrow(window, along=True), times=3)
        assert lengths(window)[1] > 0.3
        assert round(1e6 * lengths(window)[1]) % 1000 == 0
        window.on_undo()
        assert lengths(window)[1] == 0.3
        assert window.document.undo_name is None

    def test_a_coarse_nudge_is_ten_steps(self, window, pointer):
        self.select(window, joints=[2])
        self.nudge(window, Qt.Key.Key_Right)
        fine = lengths(window)[1] - 0.3
        window.on_undo()
        modifiers = Qt.KeyboardModifier.AltModifier | Qt.KeyboardModifier.ShiftModifier
        self.nudge(window, Qt.Key.Key_Right, modifiers)
        assert lengths(window)[1] - 0.3 == pytest.approx(10 * fine)

    def test_across_the_axis_the_size_goes(self, window, either):
        self.select(window, segments=[0])
        upright = window.sheet.places.axes.upright
        self.nudge(window, Qt.Key.Key_Right if upright else Qt.Key.Key_Up)
        start, end = sizes(window, 0)
        assert start == end > 0.05

    def test_h_goes_through_every_handle_and_digits_type_the_one_in_hand(self, window, pointer):
        self.select(window, segments=[1])
        told = []
        for _ in range(12):
            QTest.keyClick(window.sheet, Qt.Key.Key_H)
            told.append(window.sheet.paper.bubble.text.split("\n")[0])
        assert len(set(told)) == 11  # joint twice; edge, bore and load at start, end and both
        assert told[0] == told[11]
        QTest.keyClick(window.sheet, Qt.Key.Key_H)
        assert "the total stays" in window.sheet.paper.bubble.text
        QTest.keyClicks(window.sheet, "2")
        QTest.keyClicks(window.hand.entry, "50")
        QTest.keyClick(window.hand.entry, Qt.Key.Key_Return)
        assert lengths(window)[1:3] == [0.25, 0.35]

    def test_a_burst_after_something_else_is_a_step_of_its_own(self, window, pointer):
        self.select(window, segments=[1])
        self.nudge(window, Qt.Key.Key_Right)
        once = lengths(window)[1]
        pointer.drag("edge", 0, "both", 12)
        self.nudge(window, Qt.Key.Key_Right)
        window.on_undo()
        assert lengths(window)[1] == once
        window.on_undo()
        window.on_undo()
        assert window.document.undo_name is None

    def test_without_a_selection_the_status_says_what_to_do(self, window, pointer):
        self.nudge(window, Qt.Key.Key_Right)
        assert "Select a segment or a joint first" in window.status.news.text()

    def test_escape_lets_go(self, window, pointer):
        self.select(window, segments=[1])
        QTest.keyClick(window.sheet, Qt.Key.Key_H)
        assert window.hand.phase is Phase.AFTER
        QTest.keyClick(window.sheet, Qt.Key.Key_Escape)
        assert window.hand.phase is Phase.IDLE
        assert window.sheet.paper.bubble.text == ""


class TestSlowFindings:
    """Findings that take long to word wait until the hand rests, and do not look current meanwhile."""

    def test_they_wait_marked_and_are_settled_at_rest(self, qtbot, window, pointer, monkeypatch):
        monkeypatch.setattr("app.gui.show.HURRY", -1.0)
        pointer.grab("joint", 1, "end")
        pointer.pull(60)
        solved(qtbot, window)
        assert not window.showing.complete
        assert window.findings.is_marked_out_of_date
        qtbot.waitUntil(lambda: window.showing.complete)
        assert not window.findings.is_marked_out_of_date
        pointer.let_go()

    def test_a_program_that_is_behind_is_no_rest(self, qtbot, window, pointer, monkeypatch):
        monkeypatch.setattr("app.gui.show.HURRY", -1.0)
        pointer.grab("joint", 1, "end")
        pointer.pull(60)
        window.showing.on_rest()  # its time is over before the results are there
        solved(qtbot, window)
        assert not window.showing.complete
        qtbot.waitUntil(lambda: window.showing.complete)
        pointer.let_go()

    def test_nor_does_a_screen_reader_hear_them_as_current(self, qtbot, window, pointer, monkeypatch):
        monkeypatch.setattr("app.gui.show.HURRY", -1.0)
        pointer.grab("joint", 1, "end")
        pointer.pull(60)
        solved(qtbot, window)
        assert "out of date" in window.sheet.accessibleDescription()
        qtbot.waitUntil(lambda: window.showing.complete)
        assert "out of date" not in window.sheet.accessibleDescription()
        pointer.let_go()

    def test_the_release_words_them_at_once(self, qtbot, window, pointer, monkeypatch):
        monkeypatch.setattr("app.gui.show.HURRY", -1.0)
        monkeypatch.setattr("app.gui.show.REST", 10_000)
        pointer.drag("joint", 1, "end", 60)
        qtbot.waitUntil(lambda: window.showing.complete)
        assert window.showing.outcome.project is window.document.project


class TestBeyondTheWindow:
    """What is pulled may leave the window; what is said of it does not, and the selection stays."""

    @pytest.mark.parametrize("pixels", [-2000, 400])
    def test_the_readout_stays_inside(self, window, either, pixels):
        either.grab("joint", 4, "end")
        either.pull(pixels)
        room = window.sheet.viewport().rect()
        assert room.contains(window.sheet.paper.bubble.boundingRect().toAlignedRect().adjusted(2, 2, -2, -2))
        window.hand.cancel()
        either.let_go()

    def test_a_pull_that_began_on_paper_leaves_the_selection(self, window, pointer):
        window.view.set_selection(Selection(segments=frozenset((0, 2))))
        pointer.over("edge", 1, "both")
        down = pointer.at + 4.0 * pointer.outward
        window.sheet.mousePressEvent(press_at(window, down))  # as where both pixels and halves of them meet
        window.sheet.mouseReleaseEvent(press_at(window, down + 30.0 * pointer.outward, released=True))
        assert window.view.selection == Selection(segments=frozenset((0, 2)))


def press_at(window, at, *, released=False):
    """A press or release of the left button as the sheet itself gets it."""
    kind = QEvent.Type.MouseButtonRelease if released else QEvent.Type.MouseButtonPress
    glob = QPointF(window.sheet.viewport().mapToGlobal(at.toPoint()))
    held = Qt.MouseButton.NoButton if released else Qt.MouseButton.LeftButton
    return QMouseEvent(kind, at, glob, Qt.MouseButton.LeftButton, held, Qt.KeyboardModifier.NoModifier)


class TestReadoutAfterwards:
    def test_it_goes_at_the_next_key(self, qtbot, window, pointer):
        pointer.drag("joint", 2, "end", 60)
        assert window.sheet.paper.bubble.text
        QTest.keyClick(window.sheet, Qt.Key.Key_Right)
        assert not window.sheet.paper.bubble.text

    def test_it_goes_when_the_exact_value_is_taken(self, qtbot, window, pointer):
        pointer.drag("joint", 2, "end", 60)
        QTest.keyClick(window.sheet, Qt.Key.Key_4)
        QTest.keyClicks(window.hand.entry, "20")
        QTest.keyClick(window.hand.entry, Qt.Key.Key_Return)
        assert lengths(window)[1] == 0.42
        assert not window.sheet.paper.bubble.text

    @pytest.mark.parametrize(
        ("kind", "index", "where"), [("edge", 1, "start"), ("edge", 1, "end"), ("joint", 1, "end")]
    )
    def test_it_covers_no_handle_of_what_is_selected(self, qtbot, window, either, kind, index, where):
        window.view.set_selection(Selection(segments=frozenset((0, 1, 2))))
        either.drag(kind, index, where, 20)
        bubble = window.sheet.paper.bubble
        assert bubble.text
        covered = [
            h
            for h in window.sheet.paper.hand_marks.quiet
            if bubble.boundingRect().contains(QPointF(*h.centre))
        ]
        assert not covered
