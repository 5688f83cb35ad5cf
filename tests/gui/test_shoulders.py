"""Shoulders and fatigue typed in the tables of the real window, put on and typed on the drawing, and seen."""

from __future__ import annotations

import pytest
from msgspec import UNSET
from PySide6.QtCore import QPoint, Qt
from PySide6.QtTest import QTest

from app.drawing.shapes import Part
from app.gui.tables.pages import PLACES
from app.gui.view import Selection, Shown
from solver.model import Endurance, FatigueRange, Shoulder
from tests.gui.hand import cell, enter, go_to, text_at
from tests.gui.test_in_place import double_click, replace_text
from tests.gui.test_placing import click, joint_at, press
from tests.gui.windows import solved
from tests.shouldered import FACTOR, FILLET, spindle, with_shoulders, without_strength

ENTER, DELETE = Qt.Key.Key_Return, Qt.Key.Key_Delete
BOTH_WAYS = pytest.mark.parametrize("layout", ["horizontal", "vertical"])


def load(qtbot, window, project):
    window.document.load(project, None)
    solved(qtbot, window)


@pytest.fixture
def bare(qtbot, window):
    """The window on the spindle without shoulders and strength, with what a table holds at hand."""
    load(qtbot, window, without_strength(with_shoulders(spindle(), {})))
    return window


@pytest.fixture
def spindled(qtbot, window):
    load(qtbot, window, spindle())
    return window


def in_front(window, key):
    window.tables.tabs.setCurrentIndex(PLACES[key])
    return window.tables.views[key]


def hidden(view, key):
    return view.isColumnHidden(cell(view, 0, key).column())


def project_of(window):
    return window.document.project


# --- tables ---


def test_a_shoulder_is_typed_at_a_joint(bare):
    joints = in_front(bare, "joints")
    enter(joints, 1, "shoulder", "r 2")
    enter(joints, 2, "shoulder", "kt 1,8")
    assert [joint.shoulder for joint in project_of(bare).joints] == [UNSET, FILLET, FACTOR, UNSET]
    assert (text_at(joints, 1, "shoulder"), text_at(joints, 2, "shoulder")) == ("r 2 mm", "Kt 1.8")
    enter(joints, 1, "shoulder", "3")
    assert project_of(bare).joints[1].shoulder == Shoulder(fillet_radius=0.003)
    go_to(joints, 1, "shoulder")
    QTest.keyClick(joints, DELETE)
    assert project_of(bare).joints[1].shoulder is UNSET


def test_a_shoulder_that_cannot_be_read_stays_with_the_reason(bare):
    joints = in_front(bare, "joints")
    enter(joints, 1, "shoulder", "sharp")
    (draft,) = bare.document.snapshot.drafts.values()
    assert (draft.text, project_of(bare).joints[1].shoulder) == ("sharp", UNSET)
    assert "r 2 mm" in draft.reason
    assert "Kt 1.8" in draft.reason


@pytest.mark.parametrize("key", ["allowable_peak", "endured_amplitude", "endured_ultimate"])
def test_columns_that_few_need_wait_hidden_and_are_there_where_they_hold_something(qtbot, bare, key):
    materials = in_front(bare, "materials")
    assert hidden(materials, key)
    load(qtbot, bare, spindle())
    assert not hidden(materials, key)
    assert key not in {column.key for column in bare.tables.views["segments"].table_model.columns}


def test_peak_stress_and_endurance_are_typed_and_the_other_number_never_flatters(bare):
    materials = in_front(bare, "materials")
    for key in ("allowable_peak", "endured_amplitude", "endured_ultimate"):
        materials.columns_choice.reveal(key)
    enter(materials, 0, "allowable_peak", "300")
    enter(materials, 0, "endured_amplitude", "140")
    first = project_of(bare).materials[0]
    assert (first.allowable_peak, first.endurance) == (300e6, Endurance(amplitude=140e6, ultimate=140e6))
    enter(materials, 0, "endured_ultimate", "600")
    assert project_of(bare).materials[0].endurance == Endurance(amplitude=140e6, ultimate=600e6)
    enter(materials, 1, "endured_ultimate", "500")
    made = project_of(bare).materials[1].endurance
    assert made.ultimate == 500e6
    assert made.amplitude < 1e-3 * made.ultimate
    go_to(materials, 1, "endured_amplitude")
    QTest.keyClick(materials, DELETE)
    assert project_of(bare).materials[1].endurance is UNSET


def test_a_range_of_fatigue_is_added_changed_and_deleted(bare):
    fatigue = in_front(bare, "fatigue")
    go_to(fatigue, 0, "start")
    QTest.keyClick(fatigue, DELETE)
    assert project_of(bare).fatigue in ((), spindle().fatigue)
    bare.document.undo()
    enter(fatigue, 1, "start", "Pushing -> Pulling")
    assert project_of(bare).fatigue[-1] == FatigueRange("Pushing", "Pulling")
    enter(fatigue, 1, "start", "Idle")
    (draft,) = bare.document.snapshot.drafts.values()
    assert "Idle" in draft.reason


@pytest.mark.parametrize(("text", "reason"), [("Pulling", "Full -> Empty"), ("A -> Pulling", "A")])
def test_a_range_that_names_no_two_combinations_is_refused(bare, text, reason):
    fatigue = in_front(bare, "fatigue")
    enter(fatigue, 1, "start", text)
    (draft,) = bare.document.snapshot.drafts.values()
    assert reason in draft.reason
    assert len(project_of(bare).fatigue) == 1


# --- drawing ---


@BOTH_WAYS
def test_a_shoulder_is_put_on_and_typed_at_once(qtbot, bare, layout):
    bare.on_layout_picked(layout)
    solved(qtbot, bare)
    press(bare, "shoulder")
    click(bare, joint_at(bare, 1))
    line = bare.in_place.editor
    assert line.text() == "r 1 mm"
    replace_text(line, "r 2")
    QTest.keyClick(line, ENTER)
    assert project_of(bare).joints[1].shoulder == FILLET
    solved(qtbot, bare)
    texts = [text.text.replace("\n", " ") for text in bare.sheet.drawing.picture.texts]
    assert "r 2 mm, Kt 2.08" in texts


def test_its_letter_puts_it_on_what_is_selected_and_an_end_is_refused(qtbot, bare):
    bare.view.set_selection(Selection(joints=frozenset({2})))
    bare.sheet.setFocus()
    QTest.keyClick(bare.sheet, Qt.Key.Key_A)
    assert project_of(bare).joints[2].shoulder == Shoulder(factor=3.0)  # a tube beside it: no fit
    if bare.in_place.editor is not None:
        QTest.keyClick(bare.in_place.editor, Qt.Key.Key_Escape)
    bare.view.set_selection(Selection(joints=frozenset({3})))
    bare.sheet.setFocus()
    QTest.keyClick(bare.sheet, Qt.Key.Key_A)
    assert project_of(bare).joints[3].shoulder is UNSET
    assert "end of the member" in bare.status.news.text()


@BOTH_WAYS
def test_its_label_is_typed_over_in_place(qtbot, spindled, layout):
    spindled.on_layout_picked(layout)
    solved(qtbot, spindled)
    line = double_click(spindled, Part("shoulder", 1))
    assert line.text() == "r 2 mm"
    replace_text(line, "Kt 1.5")
    QTest.keyClick(line, ENTER)
    assert project_of(spindled).joints[1].shoulder == Shoulder(factor=1.5)


def test_delete_takes_off_the_shoulder_that_was_clicked(qtbot, spindled):
    box = spindled.sheet.drawing.picture.box_of(Part("shoulder", 1))
    at = QPoint(round(box.centre[0]), round(box.centre[1]))
    click(spindled, at)
    QTest.keyClick(spindled.sheet, DELETE)
    assert project_of(spindled).joints[1].shoulder is UNSET
    assert len(project_of(spindled).segments) == 3


# --- strips and findings ---


def test_the_strips_mark_peaks_and_fatigue_with_their_words(qtbot, spindled):
    spindled.view.set_shown(Shown("combination", "Pulling"))
    solved(qtbot, spindled)
    strips = {strip.content.kind: strip for strip in spindled.sheet.strips if strip.content is not None}
    assert [mark.text for mark in strips["stress"].content.marks] == ["peak 182", "peak 180"]
    written = {label.text: label for label in strips["utilisation"].labels}
    assert written["fatigue 1.07"].ink == "over"
    assert written["peak 0.61"].ink == "ink"
    assert strips["stress"].content.high > 182e6


def test_a_finding_of_a_shoulder_leads_to_its_cell(qtbot, spindled):
    row = next(row for row in spindled.findings.rows if "fatigue" in row.row.text and row.row.joints)
    row.click()
    assert spindled.view.selection.joints == frozenset({1})
    QTest.keyClick(row, ENTER)
    joints = spindled.tables.views["joints"]
    assert joints.currentIndex() == cell(joints, 1, "shoulder")
