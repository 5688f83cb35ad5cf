"""Typing in place on the drawing: by mouse and keys on the real window, bound to the tables' cells."""

import pytest
from msgspec.structs import replace
from PySide6.QtCore import QPoint, Qt
from PySide6.QtTest import QTest

from app.drawing.shapes import Part
from app.gui.places import Place
from app.gui.view import Selection, Shown
from app.hand.cells import Cell
from solver.model import FixedSupport, JointLoad, SpringSupport
from tests.gui.windows import solved

LEFT = Qt.MouseButton.LeftButton


def centre_of(window, part: Part) -> QPoint:
    """The middle of a part's label on the sheet."""
    box = window.sheet.drawing.picture.box_of(part)
    assert box is not None, part
    return QPoint(round(box.centre[0]), round(box.centre[1]))


def double_click(window, part: Part):
    """Open a part's editor as the mouse does."""
    at = centre_of(window, part)
    QTest.mouseClick(window.sheet.viewport(), LEFT, pos=at)
    QTest.mouseDClick(window.sheet.viewport(), LEFT, pos=at)
    return window.in_place.editor


def replace_text(line, text: str) -> None:
    """Type over what stands there."""
    line.selectAll()
    QTest.keyClicks(line, text)


def show_case(window, name: str) -> None:
    """Look at one case, and edit its loads."""
    picker = window.tables.case_picker
    picker.setCurrentIndex(picker.findText(name))
    picker.activated.emit(picker.currentIndex())
    window.view.set_shown(Shown("case", name))


def test_a_length_is_typed_over_its_label(window):
    line = double_click(window, Part("length", 2))
    assert line.text() == window.tables.views["segments"].table_model.entry(
        window.tables.views["segments"].table_model.index(3, 1)
    )
    assert "Length" in window.in_place.caption
    replace_text(line, "300+12")
    assert window.document.shown_project.segments[2].length == pytest.approx(0.312)
    steps = window.document.undo_name
    assert steps is None
    QTest.keyClick(line, Qt.Key.Key_Return)
    assert window.document.project.segments[2].length == 0.312
    assert window.in_place.editor is None
    assert window.sheet.hasFocus()
    window.document.undo()
    assert window.document.undo_name is None


def test_escape_restores(window):
    before = window.document.project
    line = double_click(window, Part("length", 2))
    replace_text(line, "77")
    QTest.keyClick(line, Qt.Key.Key_Escape)
    assert window.document.project is before
    assert window.document.preview is None
    assert window.in_place.editor is None


def test_a_wrong_text_says_why_and_stays_a_draft_of_the_cell(window):
    place: Place = ("segments", 2, "length")
    line = double_click(window, Part("length", 2))
    replace_text(line, "abc")
    assert "abc" in window.in_place.reason
    QTest.keyClick(line, Qt.Key.Key_Return)
    assert window.document.snapshot.drafts[place].text == "abc"
    marked = window.sheet.grab().toImage()
    window.sheet.drawing.set_drafts({})
    assert window.sheet.grab().toImage() != marked
    window.document.undo()
    window.document.redo()
    assert window.sheet.grab().toImage() == marked
    line = double_click(window, Part("length", 2))
    assert line.text() == "abc"
    assert window.in_place.reason


def test_leaving_it_takes_it_in_and_so_does_a_command(window):
    line = double_click(window, Part("length", 1))
    replace_text(line, "123")
    window.tables.views["segments"].setFocus()
    assert window.document.project.segments[1].length == 0.123
    line = double_click(window, Part("length", 1))
    replace_text(line, "124")
    window.actions_by_key["split"].trigger()
    assert window.document.project.segments[1].length in (0.124, 0.062)


@pytest.mark.parametrize("layout", ["horizontal", "vertical"])
def test_every_label_that_shows_a_cell_opens_it(window, layout):
    window.on_layout_picked(layout)
    opened = set()
    for text in window.sheet.drawing.picture.texts:
        if text.part is None or text.part.kind in ("note", "joint"):
            continue
        line = double_click(window, text.part)
        if line is None:
            assert window.status.news.text()
            continue
        opened.add(text.part.kind)
        QTest.keyClick(line, Qt.Key.Key_Escape)
    assert {"length", "section", "mark"} <= opened


def test_a_section_label_is_typed_for_all_that_it_stands_for(qtbot, window):
    project = window.document.project
    alike = tuple(replace(s, section=project.segments[0].section) for s in project.segments[:3])
    window.document.commit(replace(project, segments=(*alike, *project.segments[3:])), "same sections")
    solved(qtbot, window)
    line = double_click(window, Part("section", 0))
    assert "for 3 segments" in window.in_place.caption
    replace_text(line, "d44")
    QTest.keyClick(line, Qt.Key.Key_Return)
    assert [s.section.diameter for s in window.document.project.segments[:3]] == [0.044] * 3
    window.document.undo()
    assert window.document.project.segments[1].section == project.segments[0].section


def test_typing_on_one_of_several_selected_sets_them_all(window):
    window.view.set_selection(Selection(segments=frozenset((1, 4, 5))))
    box = window.sheet.drawing.picture.box_of(Part("length", 4))
    window.in_place.open_part(Part("length", 4), box)
    line = window.in_place.editor
    assert "for 3 segments" in window.in_place.caption
    replace_text(line, "1e3x")
    assert window.in_place.reason
    QTest.keyClick(line, Qt.Key.Key_Return)
    assert len(window.document.snapshot.drafts) == 3
    window.in_place.open_part(Part("length", 4), box)
    replace_text(window.in_place.editor, "250")
    QTest.keyClick(window.in_place.editor, Qt.Key.Key_Return)
    assert [window.document.project.segments[i].length for i in (1, 4, 5)] == [0.25] * 3
    assert not window.document.snapshot.drafts


def test_a_force_is_typed_in_the_case_that_is_edited(window):
    project = window.document.project
    case = next(c for c in project.load_cases if any(load.force for load in c.joint_loads))
    mark = next(load.joint for load in case.joint_loads if load.force)
    joint = next(i for i, j in enumerate(project.joints) if j.mark == mark)
    show_case(window, case.name)
    line = double_click(window, Part("force", joint))
    assert window.in_place.caption.count(case.name) == 1  # the heading of its column has it too
    replace_text(line, "-12.5 kN")
    QTest.keyClick(line, Qt.Key.Key_Return)
    loads = next(c for c in window.document.project.load_cases if c.name == case.name).joint_loads
    assert [load.force for load in loads if load.joint == mark] == [-12500.0]


def test_a_load_of_another_case_is_not_typed_by_mistake(window):
    project = window.document.project
    case = next(c for c in project.load_cases if any(load.force for load in c.joint_loads))
    mark = next(load.joint for load in case.joint_loads if load.force)
    joint = next(i for i, j in enumerate(project.joints) if j.mark == mark)
    other = next(c.name for c in project.load_cases if c.name != case.name)
    show_case(window, other)
    window.view.set_shown(Shown("case", case.name))
    assert double_click(window, Part("force", joint)) is None
    assert other in window.status.news.text()


def test_f2_opens_the_selected_part_and_tab_goes_through_its_cells(window):
    window.sheet.setFocus()
    window.view.set_selection(Selection(segments=frozenset((3,))))
    QTest.keyClick(window.sheet, Qt.Key.Key_F2)
    seen = []
    while window.in_place.editor is not None:
        seen.append(window.in_place.caption.split(" of ")[0])
        QTest.keyClick(window.in_place.editor, Qt.Key.Key_Tab)
    assert seen[:3] == ["Length", "Section", "Material"]
    assert seen[-1] == "Mark"
    assert window.sheet.hasFocus()
    assert window.document.undo_name is None


def test_enter_opens_a_joints_support(window):
    window.sheet.setFocus()
    window.view.set_selection(Selection(joints=frozenset((2,))))
    QTest.keyClick(window.sheet, Qt.Key.Key_Return)
    replace_text(window.in_place.editor, "fixed")
    QTest.keyClick(window.in_place.editor, Qt.Key.Key_Return)
    assert window.document.project.joints[2].support == FixedSupport()


def test_offers_serve_on_the_drawing_as_in_the_table(window):
    window.view.set_selection(Selection(segments=frozenset((3,))))
    window.sheet.setFocus()
    QTest.keyClick(window.sheet, Qt.Key.Key_F2)
    QTest.keyClick(window.in_place.editor, Qt.Key.Key_Tab)
    QTest.keyClick(window.in_place.editor, Qt.Key.Key_Tab)
    line = window.in_place.editor
    replace_text(line, "Bra")
    assert line.offer_list is not None
    QTest.keyClick(line, Qt.Key.Key_Down)
    QTest.keyClick(line, Qt.Key.Key_Return)
    assert window.document.project.segments[3].material == line.text() or "Brass" in {
        m.name for m in window.document.project.materials
    }


def test_several_loads_lead_to_the_loads_table(qtbot, window):
    project = window.document.project
    case = project.load_cases[0]
    twice = replace(case, joint_loads=(JointLoad("3", 1000.0), JointLoad("3", 500.0)))
    window.document.commit(replace(project, load_cases=(twice, *project.load_cases[1:])), "two loads")
    show_case(window, case.name)
    solved(qtbot, window)
    assert double_click(window, Part("force", 3)) is None
    assert "several loads" in window.status.news.text()
    assert window.tables.current_view() is window.tables.views["joint_loads"]
    assert window.tables.views["joint_loads"].chosen_records() == (0, 1)


def test_both_ends_of_a_load_are_typed_at_once(window):
    show_case(window, window.document.project.load_cases[0].name)
    box = window.sheet.box_of(Part("segment", 3))
    window.in_place.open(Cell("segments", 3, "load_start"), box)
    replace_text(window.in_place.editor, "3 -> 5")
    QTest.keyClick(window.in_place.editor, Qt.Key.Key_Return)
    mark = window.document.project.segments[3].mark
    (load,) = [x for x in window.document.project.load_cases[0].segment_loads if x.segment == mark]
    assert load.load_end == pytest.approx(load.load_start * 5 / 3)


def test_it_opens_with_a_text_given_and_previews_it(window):
    window.in_place.open(Cell("segments", 0, "length"), window.sheet.box_of(Part("length", 0)), "4")
    assert window.in_place.editor.text() == "4"
    assert window.document.shown_project.segments[0].length == 0.004
    QTest.keyClicks(window.in_place.editor, "50")
    assert window.document.shown_project.segments[0].length == 0.45


def test_a_stiffness_is_typed_on_its_label(qtbot, window):
    project = window.document.project
    joints = list(project.joints)
    joints[3] = replace(joints[3], support=SpringSupport(stiffness=6e8))
    window.document.commit(replace(project, joints=tuple(joints)), "a spring")
    solved(qtbot, window)
    line = double_click(window, Part("support", 3))
    assert line.text().startswith("spring 600")
    replace_text(line, "spring 500 kN/mm")
    QTest.keyClick(line, Qt.Key.Key_Return)
    assert window.document.project.joints[3].support.stiffness == 5e8


def test_a_double_click_on_one_of_several_selected_types_for_all(window):
    window.view.set_selection(Selection(segments=frozenset((1, 4, 5))))
    line = double_click(window, Part("length", 4))
    assert "for 3 segments" in window.in_place.caption
    replace_text(line, "250")
    QTest.keyClick(line, Qt.Key.Key_Return)
    assert [window.document.project.segments[i].length for i in (1, 4, 5)] == [0.25] * 3
    assert window.view.selection == Selection(segments=frozenset((1, 4, 5)))
    QTest.mouseClick(window.sheet.viewport(), LEFT, pos=centre_of(window, Part("length", 4)))
    assert window.view.selection == Selection(segments=frozenset((4,)))


def test_the_length_of_a_segment_inserted_on_the_drawing_is_typed_at_once(window):
    window.sheet.setFocus()
    window.view.set_selection(Selection(segments=frozenset((2,))))
    window.actions_by_key["insert_after"].trigger()
    assert window.in_place.editor is not None
    assert window.in_place.caption.startswith("Length of")
    QTest.keyClicks(window.in_place.editor, "123")
    QTest.keyClick(window.in_place.editor, Qt.Key.Key_Return)
    assert window.document.project.segments[3].length == 0.123


def test_one_inserted_in_the_table_is_typed_there(window):
    window.tables.views["segments"].setFocus()
    window.actions_by_key["insert_after"].trigger()
    assert window.in_place.editor is None


def test_the_editor_leaves_what_is_typed_about_to_be_seen(window):
    window.sheet.setFocus()
    for part in (Part("length", 2), Part("section", 2), Part("support", 0)):
        box = window.sheet.box_of(part)
        window.in_place.open_part(part, box)
        frame = window.in_place.editor.parentWidget().geometry()
        assert frame.top() >= box.bottom or frame.bottom() <= box.top
        assert window.sheet.viewport().rect().contains(frame)
        window.in_place.cancel()


@pytest.mark.parametrize("size", [(1280, 800), (2560, 1440)], ids=["small", "large"])
@pytest.mark.parametrize("orientation", ["horizontal", "vertical"])
@pytest.mark.parametrize("kind", ["length", "section", "support"])
def test_out_of_date_is_not_hidden_by_the_line_whose_text_makes_it_so(window, qtbot, size, orientation, kind):
    window.resize(*size)
    window.sheet.set_orientation(orientation)
    indices = range(len(window.document.project.joints))
    parts = [Part(kind, i) for i in indices if window.sheet.drawing.picture.box_of(Part(kind, i)) is not None]
    for part in parts:
        line = double_click(window, part)
        replace_text(line, "5x")
        assert window.in_place.reason
        qtbot.waitUntil(lambda: window.sheet.notice == "out of date")
        (notice,) = window.sheet.paper.notice_box.boxes
        assert not notice.intersects(window.in_place._frame.geometry().toRectF()), part
        QTest.keyClick(line, Qt.Key.Key_Escape)
    (strip, *_) = window.sheet.places.strips
    assert window.sheet.paper.notice_box.boundingRect().center() == strip.center()
