"""Delete takes off the thing that was clicked; a load of another case is refused; on the real window."""

from __future__ import annotations

import pytest
from msgspec import UNSET
from PySide6.QtCore import QPoint, Qt
from PySide6.QtTest import QTest
from PySide6.QtWidgets import QApplication

from app import edits
from app.drawing.shapes import Part
from app.edits.supports import moving_joints
from app.gui.hand.grasp import Phase
from app.gui.view import Selection, Shown
from app.hand.kinds import KINDS
from tests.gui.pointer import Pointer
from tests.gui.test_hand import shaft
from tests.gui.windows import solved

BY_KEY = {kind.key: kind for kind in KINDS}
LEFT = Qt.MouseButton.LeftButton


@pytest.fixture
def pointer(qtbot, window):
    """Over the shaft, both cases shown together, Dead edited."""
    window.document.load(shaft(), None)
    solved(qtbot, window)
    window.view.set_shown(Shown("combination", "Both"))
    edit_case(window, 0)
    window.sheet.setFocus()
    QApplication.processEvents()
    return Pointer(window)


def edit_case(window, index):
    window.tables.case_picker.setCurrentIndex(index)
    window.tables.on_case_picked(index)


def click_on(window, kind, index):
    """A click on a part's label, where it has one, else on the part."""
    x, y = window.sheet.drawing.picture.box_of(Part(kind, index)).centre
    QTest.mouseClick(window.sheet.viewport(), LEFT, pos=QPoint(round(x), round(y)))


def loads(window, case):
    found = window.document.project.load_cases[case]
    return len(found.segment_loads), len(found.joint_loads)


@pytest.mark.parametrize(
    ("kind", "index", "left"),
    [("distributed", 1, (0, 1)), ("force", 2, (1, 0))],
)
def test_delete_takes_off_the_load_that_was_clicked_and_nothing_beneath(window, pointer, kind, index, left):
    before = window.document.project
    click_on(window, kind, index)
    assert window.view.thing == Part(kind, index)
    assert "Delete takes it off" in window.status.news.text()
    QTest.keyClick(window.sheet, Qt.Key.Key_Delete)
    assert window.document.project.segments == before.segments
    assert loads(window, 0) == left
    assert loads(window, 1) == (0, 1)
    assert window.document.undo_name.startswith("Take off: ")
    assert window.view.thing is None
    window.document.undo()
    assert window.document.project == before


def test_delete_takes_off_the_support_that_was_clicked(window, pointer):
    click_on(window, "support", 0)
    QTest.keyClick(window.sheet, Qt.Key.Key_Delete)
    assert window.document.project.joints[0].support is UNSET
    assert len(window.document.project.segments) == 4
    assert window.document.undo_name == "Take the support off"


@pytest.mark.parametrize("way", ["delete", "letter", "menu", "table"])
def test_a_movement_goes_with_the_support_that_moved_and_is_said_to(window, pointer, way):
    moved = edits.set_joint_load(
        window.document.project, "Live", window.document.project.joints[0].mark, "movement", 0.001
    )
    window.document.load(moved, None)
    window.view.set_selection(Selection(joints=frozenset({0})))
    if way in ("delete", "letter"):
        QTest.keyClick(window.sheet, Qt.Key.Key_Delete if way == "delete" else Qt.Key.Key_R)
    elif way == "menu":
        window.taking_off.take_off(BY_KEY["fixed"], (0,))
    else:
        view = window.tables.views["segments"]
        keys = [column.key for column in view.table_model.columns]
        view.table_model.setData(view.table_model.index(0, keys.index("support")), "")
    assert window.document.project.joints[0].support is UNSET
    assert moving_joints(window.document.project, (0,)) == ()
    assert "went with its support" in window.status.news.text()
    window.document.undo()
    assert window.document.project == moved


def test_a_click_on_the_segment_puts_the_thing_down(window, pointer):
    click_on(window, "distributed", 1)
    assert window.view.selection == Selection(segments=frozenset((1,)))
    click_on(window, "mark", 1)
    assert window.view.thing is None
    assert "Delete" not in window.status.news.text()
    QTest.keyClick(window.sheet, Qt.Key.Key_Delete)
    assert len(window.document.project.segments) == 3


def test_the_thing_in_hand_is_seen(window, pointer):
    window.view.set_selection(Selection(segments=frozenset((1,))))
    selected = window.sheet.viewport().grab().toImage()
    click_on(window, "distributed", 1)
    assert window.sheet.viewport().grab().toImage() != selected


def test_a_load_of_another_case_is_named_and_nothing_is_taken_off(window, pointer):
    before = window.document.project
    click_on(window, "force", 4)
    QTest.keyClick(window.sheet, Qt.Key.Key_Delete)
    assert window.document.project is before
    assert "Live" in window.status.news.text()


def test_joints_without_support_say_how_a_load_is_taken_off(window, pointer):
    before = window.document.project
    window.view.set_selection(Selection(joints=frozenset((2,))))
    QTest.keyClick(window.sheet, Qt.Key.Key_Delete)
    assert window.document.project is before
    assert "Take off" in window.status.news.text()


def test_after_a_pull_delete_takes_off_what_was_pulled(window, pointer):
    window.view.set_selection(Selection(segments=frozenset((2,))))
    pointer.drag("force", 2, "both", 40)
    QTest.keyClick(window.sheet, Qt.Key.Key_Delete)
    assert len(window.document.project.segments) == 4
    assert loads(window, 0) == (1, 0)


# A load of another case


def test_pulling_a_load_that_the_edited_case_has_not_makes_no_load(window, pointer):
    before = window.document.project
    pointer.drag("force", 4, "both", 40)
    assert window.document.project is before
    assert window.hand.phase is Phase.IDLE
    assert "Live" in window.status.news.text()
    assert "Ctrl+L" in window.status.news.text()
    edit_case(window, 1)
    pointer.drag("force", 4, "both", 40)
    assert loads(window, 1) == (0, 1)
    assert window.document.project != before


def test_neither_does_a_distributed_load(window, pointer):
    edit_case(window, 1)
    before = window.document.project
    pointer.drag("distributed", 1, "start", 20)
    assert window.document.project is before
    assert "Dead" in window.status.news.text()


@pytest.mark.parametrize(
    ("kind", "index", "case", "owner"), [("force", 4, 0, "Live"), ("distributed", 1, 1, "Dead")]
)
def test_nor_does_typing(window, pointer, kind, index, case, owner):
    edit_case(window, case)
    x, y = window.sheet.drawing.picture.box_of(Part(kind, index)).centre
    QTest.mouseDClick(window.sheet.viewport(), LEFT, pos=QPoint(round(x), round(y)))
    assert window.in_place.editor is None
    assert owner in window.status.news.text()
