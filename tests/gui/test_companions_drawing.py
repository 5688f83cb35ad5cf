"""Companions on the real drawing: put on, selected, typed in place, taken off, made to fit."""

import pytest
from PySide6.QtCore import Qt
from PySide6.QtTest import QTest

from app import edits
from app.drawing.shapes import Part
from app.gui.view import Cursor, Selection
from app.project_file import dump
from tests.gui.hand import chord
from tests.gui.test_in_place import centre_of, double_click, replace_text
from tests.gui.test_placing import click, middle_of, press
from tests.gui.windows import solved
from tests.sleeves import draw_bolt

KEY = Qt.Key
LEFT = Qt.MouseButton.LeftButton
CTRL = Qt.KeyboardModifier.ControlModifier
BOTH_WAYS = pytest.mark.parametrize("layout", ["horizontal", "vertical"])


@pytest.fixture
def rod(tmp_path):
    path = tmp_path / "bolt.barwright.json"
    path.write_bytes(dump(draw_bolt()))
    return path


def companions(window):
    return window.document.project.companions


def spans(window):
    return [(c.mark, c.start, c.end, c.action) for c in companions(window)]


@BOTH_WAYS
def test_a_companion_is_put_beside_the_segment_that_is_clicked_and_its_way_typed_at_once(
    qtbot, window, layout
):
    window.on_layout_picked(layout)
    solved(qtbot, window)
    press(window, "companion")
    click(window, middle_of(window, 2))
    assert spans(window)[1:] == [("C1", "2", "3", "both")]
    line = window.in_place.editor
    assert line is not None
    assert "Acts" in window.in_place.caption
    replace_text(line, "compression")
    QTest.keyClick(line, KEY.Key_Return)
    assert spans(window)[1:] == [("C1", "2", "3", "compression")]
    window.document.undo()
    window.document.undo()
    assert spans(window) == [("S", "1", "2", "compression")]


def test_the_letter_puts_one_beside_each_run_of_selected_segments(window):
    window.view.set_selection(Selection(segments=frozenset((0, 1))))
    window.sheet.setFocus()
    QTest.keyClick(window.sheet, KEY.Key_C)
    QTest.keyClick(window.in_place.editor, KEY.Key_Escape)
    assert spans(window)[1:] == [("C1", "0", "2", "both")]
    assert "C1: one segment like the first beside it" in window.status.news.text()


@BOTH_WAYS
@pytest.mark.parametrize(
    ("kind", "index", "text", "check"),
    [
        ("companion_length", 1, "110", lambda c: c.segments[1].length == 0.11),
        ("companion_section", 0, "d40x5", lambda c: c.segments[0].section.outer == 0.04),
        ("companion_mark", 0, "foot", lambda c: c.segments[0].mark == "foot"),
        ("companion_name", 0, "both ways", lambda c: c.action == "both"),
    ],
)
def test_what_is_shown_is_typed_in_place(qtbot, window, layout, kind, index, text, check):
    window.resize(1900, 1100)
    window.on_layout_picked(layout)
    solved(qtbot, window)
    line = double_click(window, Part(kind, index))
    replace_text(line, text)
    QTest.keyClick(line, KEY.Key_Return)
    assert check(companions(window)[0])


def test_what_acts_is_typed_in_place_in_the_edited_case(window):
    line = double_click(window, Part("companion_load", 1))
    assert line.text() == "0.3"
    replace_text(line, "0.2")
    QTest.keyClick(line, KEY.Key_Return)
    assert window.document.project.load_cases[0].segment_loads[0].lack_of_fit == 0.0002


def test_a_click_selects_and_the_table_follows_and_leads(window):
    at = centre_of(window, Part("companion", 1))
    QTest.mouseClick(window.sheet.viewport(), LEFT, pos=at)
    assert window.view.selection == Selection(companions=frozenset((1,)))
    chord(window.sheet, KEY.Key_7)
    table = window.tables.views["companions"]
    assert table.chosen_records() == (1,)
    QTest.mouseClick(window.sheet.viewport(), LEFT, CTRL, centre_of(window, Part("companion", 0)))
    assert window.view.selection.companions == {0, 1}
    table.choose_record(0)
    assert window.view.selection == Selection(companions=frozenset((0,)))


def test_the_space_bar_goes_from_the_segment_at_the_cursor_to_what_lies_beside_it(window):
    window.sheet.setFocus()
    window.view.set_cursor(Cursor(0.1))
    chosen = []
    for _ in range(3):
        QTest.keyClick(window.sheet, KEY.Key_Space)
        chosen.append(window.view.selection)
    segment, beside = Selection(segments=frozenset((1,))), Selection(companions=frozenset((0,)))
    assert chosen == [segment, beside, segment]


def test_delete_takes_the_selected_segments_off_and_the_companion_with_the_last(window):
    window.sheet.setFocus()
    for index, left in ((1, 1), (0, 0)):
        window.view.set_selection(Selection(companions=frozenset((index,))))
        QTest.keyClick(window.sheet, KEY.Key_Delete)
        assert sum(len(c.segments) for c in companions(window)) == left
    assert companions(window) == ()


def test_a_span_that_changes_is_said_and_one_key_makes_the_companion_fit(qtbot, window):
    line = double_click(window, Part("length", 1))
    replace_text(line, "250")
    QTest.keyClick(line, KEY.Key_Return)
    solved(qtbot, window)
    (problem, *_) = window.showing.outcome.problems
    assert window.fit_offer.text() == "Make Sb 110 mm long: S fits"
    assert window.fit_offer.isVisible()
    assert 'companion "S" is 240 mm long and spans 250 mm; it is 10 mm too short' in problem
    chord(window.sheet, KEY.Key_E)
    assert [s.length for s in companions(window)[0].segments] == [0.14, 0.11]
    assert window.document.undo_name == "Make companions fit"
    chord(window.sheet, KEY.Key_E)
    assert window.status.news.text() == "every companion fits its span"


def test_a_click_in_the_findings_makes_them_fit(qtbot, window):
    window.document.commit(edits.set_value(window.document.project, ("segments", 1, "length"), 0.3), "Length")
    solved(qtbot, window)
    QTest.mouseClick(window.fit_offer, LEFT)
    assert [s.length for s in companions(window)[0].segments] == [0.14, 0.16]
    assert not window.fit_offer.isVisible()


def test_one_whose_last_segment_cannot_mend_it_is_said_and_not_offered(qtbot, window):
    window.document.commit(edits.set_value(window.document.project, ("segments", 1, "length"), 0.1), "Length")
    solved(qtbot, window)
    assert not window.fit_offer.isVisible()
    chord(window.sheet, KEY.Key_E)
    assert 'the other segments of companion "S" alone' in window.status.news.text()


def test_what_goes_with_a_segment_is_said(window):
    window.view.set_selection(Selection(segments=frozenset((1,))))
    window.sheet.setFocus()
    QTest.keyClick(window.sheet, KEY.Key_Delete)
    assert companions(window) == ()
    assert window.status.news.text() == "also gone: companion S, 2 loads"


def test_the_menu_on_a_companion_has_what_can_be_done_with_it(window):
    window.view.set_selection(Selection(companions=frozenset((0,))))
    window.sheet.setFocus()
    QTest.keyClick(window.sheet, KEY.Key_Menu)
    menu = window.sheet_menu.menu
    words = {action.text().replace("&", ""): action for action in menu.actions()}
    assert {"Type in place", "Add companion segment", "Make companions fit", "Take the companion off"} <= set(
        words
    )
    words["Take the companion off"].trigger()
    menu.close()
    assert companions(window) == ()


def test_a_draft_is_marked_where_the_companion_shows_it(window):
    line = double_click(window, Part("companion_length", 0))
    replace_text(line, "long")
    QTest.keyClick(line, KEY.Key_Return)
    assert list(window.sheet.drawing._drafts) == [Part("companion_length", 0)]
