"""Stops by hand on the real window: put on, typed, pulled, taken off; what they do is said and seen."""

from __future__ import annotations

import pytest
from PySide6.QtCore import QPoint, Qt
from PySide6.QtTest import QTest
from PySide6.QtWidgets import QApplication

from app import edits
from app.drawing.shapes import Part
from app.gui.hand.grasp import Phase
from app.gui.view import Selection, Shown
from solver.model import (
    Combination,
    FixedSupport,
    JointLoad,
    RoundSection,
    SegmentLoad,
    SpringSupport,
    StopSupport,
    supports_of,
)
from tests.gui.hand import cell, enter, text_at
from tests.gui.pointer import Pointer
from tests.gui.windows import solved
from tests.members import Part as Segment
from tests.members import case, member

LEFT = Qt.MouseButton.LeftButton
PLUS = StopSupport(side="plus", clearance=2e-4)
MINUS = StopSupport(side="minus", clearance=1e-4)


def shaft(supports):
    """A shaft of 1 m that grows by 0.48 mm in Hot, held at its start."""
    bar = Segment(0.5, RoundSection(diameter=0.05), expansion=1.2e-5, allowable_compression=2e8)
    warm = case("Warm", on_segments=[SegmentLoad(m, temperature_start=40.0) for m in "AB"])
    both = Combination("Hot", {"Warm": 1.0}), Combination("Cold", {"Warm": 0.2})
    made = member([bar, bar], {0: FixedSupport()}, [warm], both)
    for joint, held in supports.items():
        made = edits.hold_joint(made, joint, held)
    return made


@pytest.fixture
def ready(qtbot, window):
    """Opens a member on the window, Hot shown, and gives a pointer over its sheet."""

    def begin(supports):
        window.document.load(shaft(supports), None)
        solved(qtbot, window)
        window.view.set_shown(Shown("combination", "Hot"))
        window.sheet.setFocus()
        QApplication.processEvents()
        return Pointer(window)

    return begin


def supports(window, joint):
    return supports_of(window.document.project.joints[joint])


def joints_table(window):
    return window.tables.views["joints"]


def click_on(window, part):
    x, y = window.sheet.drawing.picture.box_of(part).centre
    QTest.mouseClick(window.sheet.viewport(), LEFT, pos=QPoint(round(x), round(y)))


class TestPuttingOn:
    def test_a_letter_puts_one_on_and_its_clearance_is_typed_at_once(self, qtbot, window, ready):
        ready({})
        window.view.set_selection(Selection(joints=frozenset((2,))))
        QTest.keyClick(window.sheet, Qt.Key.Key_P)
        line = window.in_place.editor
        assert line is not None
        assert line.text() == "stop + 0.2 mm"
        QTest.keyClicks(line, "0.3")
        QTest.keyClick(line, Qt.Key.Key_Return)
        assert supports(window, 2) == (StopSupport(side="plus", clearance=3e-4),)
        solved(qtbot, window)

    def test_before_the_first_joint_it_stands_on_the_other_side(self, window, ready):
        ready({0: (SpringSupport(stiffness=1e9),)})
        window.view.set_selection(Selection(joints=frozenset((0,))))
        QTest.keyClick(window.sheet, Qt.Key.Key_P)
        QTest.keyClick(window.in_place.editor, Qt.Key.Key_Escape)
        assert supports(window, 0) == (
            SpringSupport(stiffness=1e9),
            StopSupport(side="minus", clearance=2e-4),
        )

    def test_a_spring_goes_beside_a_stop_and_a_wall_instead_of_all(self, window, ready):
        ready({2: (PLUS, MINUS)})
        window.view.set_selection(Selection(joints=frozenset((2,))))
        QTest.keyClick(window.sheet, Qt.Key.Key_S)
        QTest.keyClick(window.in_place.editor, Qt.Key.Key_Escape)
        assert [type(s) for s in supports(window, 2)] == [SpringSupport, StopSupport, StopSupport]
        QTest.keyClick(window.sheet, Qt.Key.Key_F)
        assert supports(window, 2) == (FixedSupport(),)

    def test_the_strip_of_symbols_has_it_with_a_name(self, window, ready):
        ready({})
        button = window.symbols.buttons["stop"]
        assert "Stop" in button.accessibleName()


class TestTyping:
    @pytest.mark.parametrize("table", ["joints", "segments"])
    def test_several_are_typed_into_one_cell_and_shown_again(self, window, ready, table):
        ready({})
        view = window.tables.views[table]
        window.tables.show_record(table, 1)
        enter(view, 2, "support", "spring 20 kN/mm; stop +- 0,2")
        assert supports(window, 2) == (
            SpringSupport(stiffness=2e7),
            PLUS,
            StopSupport(side="minus", clearance=2e-4),
        )
        assert text_at(view, 2, "support").endswith("spring 20\u202f000 N/mm and stop ± 0.2 mm")

    def test_what_is_no_support_stays_marked_with_its_reason(self, window, ready):
        ready({})
        window.tables.show_record("joints", 2)
        enter(joints_table(window), 2, "support", "stop 0.2")
        draft = joints_table(window).table_model.draft(cell(joints_table(window), 2, "support"))
        assert "side and clearance" in draft.reason
        assert supports(window, 2) == ()

    def test_a_click_twice_on_the_gap_types_it_in_place(self, window, ready):
        ready({2: (PLUS,)})
        x, y = next(t for t in window.sheet.drawing.picture.texts if t.text.startswith("gap")).box.centre
        QTest.mouseDClick(window.sheet.viewport(), LEFT, pos=QPoint(round(x), round(y)))
        QTest.keyClicks(window.in_place.editor, "0.15")
        QTest.keyClick(window.in_place.editor, Qt.Key.Key_Return)
        assert supports(window, 2) == (StopSupport(side="plus", clearance=1.5e-4),)


class TestPulling:
    @pytest.mark.parametrize(("number", "pixels", "clearance"), [(0, 40, 3e-4), (1, -20, 7.5e-5)])
    def test_the_wall_is_pulled_in_round_steps_and_only_its_own_stop_changes(
        self, window, ready, number, pixels, clearance
    ):
        pointer = ready({2: (PLUS, MINUS)})
        pointer.grab("stop", 2, "both", number=number)
        pointer.pull(pixels)
        assert window.sheet.paper.bubble.text.startswith(f"Stop {'+−'[number]} at joint 2: gap ")
        pointer.let_go()
        found = supports(window, 2)
        assert found[number].clearance == pytest.approx(clearance, abs=6e-6)
        assert found[1 - number] == (PLUS, MINUS)[1 - number]
        assert window.document.undo_name == "Gap of the stop at joint 2"
        window.document.undo()
        assert supports(window, 2) == (PLUS, MINUS)

    def test_escape_leaves_it_as_it_was(self, window, ready):
        pointer = ready({2: (PLUS,)})
        pointer.grab("stop", 2, "both")
        pointer.pull(60)
        QTest.keyClick(window.sheet, Qt.Key.Key_Escape)
        pointer.let_go()
        assert supports(window, 2) == (PLUS,)
        assert window.hand.phase is Phase.IDLE

    def test_a_clearance_is_never_less_than_nothing(self, window, ready):
        pointer = ready({2: (PLUS,)})
        pointer.drag("stop", 2, "both", -300)
        assert supports(window, 2) == (StopSupport(side="plus", clearance=0.0),)
        pointer.drag("stop", 2, "both", 40)
        assert supports(window, 2)[0].clearance > 0.0

    def test_by_keys_it_is_taken_and_nudged(self, window, ready):
        ready({2: (PLUS,)})
        window.view.set_selection(Selection(joints=frozenset((2,))))
        for _ in range(2):  # the joint's place, then the stop
            QTest.keyClick(window.sheet, Qt.Key.Key_H)
        assert window.sheet.paper.bubble.text.startswith("Stop + at joint 2: gap 0.2 mm")
        QTest.keyClick(window.sheet, Qt.Key.Key_Right, Qt.KeyboardModifier.AltModifier)
        assert supports(window, 2)[0].clearance > 2e-4


class TestTakingOff:
    def test_delete_takes_the_clicked_one_of_several(self, window, ready):
        ready({2: (PLUS, MINUS)})
        click_on(window, Part("support", 2, 1))
        assert window.view.thing == Part("support", 2, 1)
        assert "stop − 0.1 mm of joint 2" in window.status.news.text()
        QTest.keyClick(window.sheet, Qt.Key.Key_Delete)
        assert supports(window, 2) == (PLUS,)
        assert window.view.thing is None
        window.document.undo()
        assert supports(window, 2) == (PLUS, MINUS)

    def test_free_takes_all(self, window, ready):
        ready({2: (PLUS, MINUS)})
        window.view.set_selection(Selection(joints=frozenset((2,))))
        QTest.keyClick(window.sheet, Qt.Key.Key_R)
        assert supports(window, 2) == ()


class TestResults:
    def test_the_drawing_says_what_the_stop_does_in_the_shown_state(self, qtbot, window, ready):
        ready({2: (PLUS,)})
        contacts = window.sheet.paper.on_drawing.contacts
        assert [text.text.partition(",")[0] for text in contacts.texts] == ["closed"]
        assert len(contacts.strokes) == 1
        hot = window.sheet.viewport().grab().toImage()
        window.view.set_shown(Shown("combination", "Cold"))
        QApplication.processEvents()
        assert [text.text for text in contacts.texts] == ["open, 0.1040 mm left"]
        assert contacts.strokes == ()
        assert window.sheet.viewport().grab().toImage() != hot

    def test_an_envelope_says_nothing_of_one_state(self, window, ready):
        ready({2: (PLUS,)})
        window.view.set_shown(Shown("envelope"))
        QApplication.processEvents()
        assert window.sheet.paper.on_drawing.contacts.texts == ()

    def test_the_table_of_joints_says_it_too(self, window, ready):
        ready({2: (PLUS, MINUS)})
        found = text_at(joints_table(window), 2, "contact")
        assert found.startswith("+ closed, ")
        assert "; − open, " in found
        assert text_at(joints_table(window), 1, "contact") == ""

    def test_a_finding_says_it_over_all_combinations_and_leads_to_the_cell(self, window, ready):
        ready({2: (PLUS,)})
        row = next(r for r in window.findings.rows if r.row.kind == "contact")
        assert row.row.spoken.startswith("Joint 2, stop + 0.2 mm: closed in Hot (")
        assert row.row.spoken.endswith("open in Cold (0.1040 mm left)")
        row.setFocus()
        QTest.keyClick(row, Qt.Key.Key_Return)
        view = joints_table(window)
        assert view.currentIndex() == cell(view, 2, "support")

    def test_what_holds_by_stops_alone_and_is_not_pressed_is_said(self, qtbot, window, ready):
        ready({0: (SpringSupport(stiffness=1e8),), 2: (PLUS,)})
        window.document.commit(edits.hold_joint(window.document.project, 0, ()), "Free")
        qtbot.waitUntil(lambda: window.findings.headline == "Cannot be solved yet", timeout=5000)
        assert any("stop" in row.row.spoken for row in window.findings.rows if row.row.tone == "problem")


class TestACaseThatIsNotPressed:
    @pytest.fixture
    def pulled(self, qtbot, window, ready):
        """A stop alone holds the shaft: in Push it is pressed, in Pull it is not."""
        forces = {"Push": -2e4, "Pull": 1e4}
        cases = [case(name, on_joints=[JointLoad("2", force)]) for name, force in forces.items()]
        bar = Segment(1.0, RoundSection(diameter=0.05), allowable_compression=2e8)
        stop = StopSupport(side="minus", clearance=0.0)
        both = (Combination("Both", {"Push": 1.0, "Pull": 1.0}),)
        window.document.load(member([bar, bar], {0: stop}, cases, both), None)
        solved(qtbot, window)
        window.view.set_shown(Shown("case", "Pull"))
        QApplication.processEvents()
        return window

    def test_nothing_is_shown_of_another_state_and_it_is_said_why(self, pulled):
        assert pulled.sheet.notice.startswith("No results of Pull alone")
        assert all(strip.content is None for strip in pulled.sheet.paper.strips)
        assert text_at(pulled.tables.views["segments"], 1, "utilisation") == ""
        assert pulled.sheet.paper.on_drawing.contacts.texts == ()

    def test_nothing_can_be_copied_as_if_it_were_its_own(self, pulled):
        QApplication.clipboard().setText("before")
        pulled.taking.copy_numbers(("force",))
        assert QApplication.clipboard().text() == "before"

    def test_another_state_is_shown_again(self, pulled):
        pulled.view.set_shown(Shown("combination", "Both"))
        QApplication.processEvents()
        assert pulled.sheet.notice == ""
        assert all(strip.content is not None for strip in pulled.sheet.paper.strips)
