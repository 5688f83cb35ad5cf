"""The tables under the hand: keys, drafts, previews, blocks of cells, and the signals they send to Qt."""

from itertools import pairwise

import pytest
from hypothesis import HealthCheck, given, settings
from hypothesis import strategies as st
from PySide6.QtCore import QItemSelectionModel, Qt
from PySide6.QtGui import QAccessible, QGuiApplication
from PySide6.QtTest import QAbstractItemModelTester, QTest
from PySide6.QtWidgets import QLineEdit, QVBoxLayout, QWidget

from app import edits
from app.gui.document import Document
from app.gui.member_edits import MemberEdits, also_gone
from app.gui.show import drafts_line
from app.gui.tables.column import Figures, Sight
from app.gui.tables.model import ERROR_ROLE, TableModel
from app.gui.tables.pages import TABS
from app.gui.tables.pane import TablesPane
from app.gui.tables.reasons import NotTaken
from app.gui.tables.segments import SEGMENTS
from app.gui.theme import LIGHT
from app.gui.view import Selection, View
from solver.model import (
    AreaSection,
    Combination,
    DisplacementLimit,
    FixedSupport,
    Limits,
    LoadCase,
    RectangleSection,
    RelativeLimit,
    RoundSection,
    SegmentLoad,
    SpringSupport,
    TubeSection,
)
from tests.gui.hand import begin, cell, editor, enter, go_to, text_at
from tests.members import Part, case, member, round_bar

KEY = Qt.Key


def shaft():
    bar = round_bar(0.04)
    loads = [SegmentLoad("B", 1000.0), SegmentLoad("C", 1.0), SegmentLoad("C", 2.0)]
    project = member(
        [Part(0.5, bar), Part(1.0, bar), Part(0.25, round_bar(0.04, 0.03))],
        {0: FixedSupport()},
        [case("Dead", on_segments=loads), case("Hot")],
        [Combination("Working", {"Dead": 1.0})],
    )
    return edits.set_value(project, ("display", "units"), "mm-kN-MPa")


@pytest.fixture
def document(qapp):
    return Document(shaft())


@pytest.fixture
def view(qapp):
    return View()


@pytest.fixture
def pane(qtbot, document, view):
    made = TablesPane(document, view, LIGHT)
    qtbot.addWidget(made)
    made.resize(1200, 260)
    made.show()
    with qtbot.waitActive(made):
        made.activateWindow()
    made.views["segments"].setFocus()
    return made


@pytest.fixture
def table(pane):
    return pane.views["segments"]


def lengths(document):
    return [segment.length for segment in document.project.segments]


# Keys


def test_typing_replaces_enter_commits_and_moves_down(table, document):
    enter(table, 1, "length", "600")
    assert lengths(document) == [0.6, 1.0, 0.25]
    assert table.currentIndex() == cell(table, 2, "length")
    assert document.undo_name == "Length of A"


def test_shift_enter_moves_up_and_enter_on_a_closed_cell_moves_down(table):
    go_to(table, 2, "length")
    QTest.keyClick(begin(table, "700"), KEY.Key_Return, Qt.KeyboardModifier.ShiftModifier)
    assert table.currentIndex() == cell(table, 1, "length")
    QTest.keyClick(table, KEY.Key_Return)
    assert table.currentIndex() == cell(table, 2, "length")


def test_tab_commits_and_opens_the_next_cell(table, document):
    go_to(table, 1, "length")
    QTest.keyClick(begin(table, "600"), KEY.Key_Tab)
    assert lengths(document)[0] == 0.6
    assert table.currentIndex() == cell(table, 1, "section")


def test_f2_edits_with_all_digits_and_escape_restores(table, document):
    go_to(table, 1, "length")
    QTest.keyClick(table, KEY.Key_F2)
    line = editor(table)
    assert line.text() == "500"
    QTest.keyClicks(line, "9")
    assert document.preview is not None
    QTest.keyClick(line, KEY.Key_Escape)
    assert document.preview is None
    assert document.undo_name is None
    assert lengths(document) == [0.5, 1.0, 0.25]


@pytest.mark.parametrize(("key", "row", "column"), [(KEY.Key_Tab, 5, 5), (KEY.Key_Backtab, 0, 0)])
def test_tab_leaves_the_table_at_its_ends(qtbot, document, view, key, row, column):
    window = QWidget()
    before, pane, behind = QLineEdit(), TablesPane(document, view, LIGHT), QLineEdit()
    rows = QVBoxLayout(window)
    for widget in (before, pane, behind):
        rows.addWidget(widget)
    qtbot.addWidget(window)
    window.show()
    with qtbot.waitActive(window):
        window.activateWindow()
    table = pane.views["segments"]
    table.setFocus()
    model = table.table_model
    table.setCurrentIndex(model.index(min(row, model.rowCount() - 1), column))
    for _ in range(8):  # a few keys lead out, whatever controls stand between
        if not table.hasFocus():
            break
        QTest.keyClick(table, key)
    assert not table.hasFocus()


def test_delete_clears_what_may_be_empty_as_one_step(table, document):
    for key in ("load_start", "length"):
        table.selectionModel().select(cell(table, 2, key), QItemSelectionModel.SelectionFlag.Select)
    QTest.keyClick(table, KEY.Key_Delete)
    assert not [load for load in document.project.load_cases[0].segment_loads if load.segment == "B"]
    assert lengths(document) == [0.5, 1.0, 0.25]
    document.undo()
    assert document.project.load_cases[0].segment_loads[0].load_start == 1000.0


# What cells take in


def test_units_in_an_entry_and_two_ends_in_a_cell(table, document):
    enter(table, 1, "length", "1/2 m")
    enter(table, 1, "heat", "10 -> 20")
    enter(table, 2, "bedding", "2->3")
    load = document.project.load_cases[0].segment_loads[-1]
    assert (load.segment, load.temperature_start, load.temperature_end) == ("A", 10.0, 20.0)
    assert text_at(table, 1, "heat") == "10→20"
    bedded = document.project.segments[1]
    assert (bedded.bedding, bedded.bedding_end) == (2e6, 3e6)


def test_supports_are_typed_as_text_and_the_start_row_holds_the_first_joints(table, document):
    enter(table, 3, "support", "spring 600 kN/mm")
    enter(table, 0, "support", "free")
    assert document.project.joints[3].support == SpringSupport(stiffness=6e8)
    assert not document.project.joints[0].support
    assert text_at(table, 3, "support") == "3: spring 600 kN/mm"
    assert text_at(table, 0, "support") == "0: free"


def test_a_typed_area_makes_the_section_known_by_its_area_alone_and_says_so(table, document, qtbot):
    with qtbot.waitSignal(table.table_model.noted, check_params_cb=lambda note: "A" in note):
        enter(table, 1, "area", "1200")
    assert document.project.segments[0].section == AreaSection(area=0.0012)


@pytest.mark.parametrize(
    ("before", "section", "told"),
    [
        ("d40", TubeSection(outer=0.06, inner=0.05), "“60x5” is taken as a tube, outside × wall"),
        ("r20x30", RectangleSection(width=0.06, depth=0.005), "“60x5” is taken as a rectangle"),
    ],
)
def test_two_bare_dimensions_say_what_they_were_taken_as(pane, table, document, before, section, told):
    enter(table, 1, "section", before)
    lines = []
    pane.noted.connect(lines.append)
    enter(table, 1, "section", "60x5")
    assert document.project.segments[0].section == section
    assert lines[-1].startswith(told)


def test_looking_at_the_area_changes_nothing(table, document):
    go_to(table, 1, "area")
    QTest.keyClick(table, KEY.Key_F2)
    QTest.keyClick(editor(table), KEY.Key_Return)
    assert document.undo_name is None
    assert isinstance(document.project.segments[0].section, RoundSection)


def test_a_shared_materials_modulus_becomes_the_rows_own(qtbot, qapp, view):
    project = edits.set_value(shaft(), ("segments", 1, "material"), "of A")
    project = edits.set_value(project, ("materials", 0, "allowable_tension"), 160e6)
    document = Document(project)
    pane = TablesPane(document, view, LIGHT)
    qtbot.addWidget(pane)
    table = pane.views["segments"]
    model = table.table_model
    told = "B now has a material of its own, of A B; its allowable stresses are those of of A: verify"
    with qtbot.waitSignal(model.noted, check_params_cb=lambda note: note == told):
        model.setData(cell(table, 2, "modulus"), "70000")
    assert document.project.materials[-1].allowable_tension == 160e6
    moduli = {material.name: material.modulus for material in document.project.materials}
    assert document.project.segments[1].material == "of A B"
    assert (moduli["of A B"], moduli["of A"]) == (7e10, 2.1e11)


def test_a_shared_materials_own_modulus_typed_in_other_words_makes_no_new_material(qapp):
    document = Document(edits.set_value(shaft(), ("segments", 1, "material"), "of A"))
    model = TableModel(SEGMENTS, document, Sight("mm-kN-MPa", 0))
    modulus = next(i for i, column in enumerate(model.columns) if column.key == "modulus")
    model.setData(model.index(2, modulus), "210 GPa")
    assert document.undo_name is None
    assert len(document.project.materials) == 3


def test_a_cell_of_several_records_shows_their_sum_and_is_not_for_typing(table):
    index = cell(table, 3, "load_start")
    assert index.data() == "0.003"
    assert not index.flags() & Qt.ItemFlag.ItemIsEditable


def test_typing_into_a_sum_says_where_its_loads_are_edited(table, pane, qtbot):
    go_to(table, 3, "load_start")
    with qtbot.waitSignal(pane.noted, check_params_cb=lambda line: "Loads table" in line):
        QTest.keyClicks(table, "5")
    go_to(table, 2, "load_start")
    with qtbot.assertNotEmitted(pane.noted):
        QTest.keyClicks(table, "5")


def test_typing_a_load_without_a_case_says_what_to_do(qtbot, qapp, view):
    pane = TablesPane(Document(member([Part(1.0, round_bar(0.04))], {0: FixedSupport()})), view, LIGHT)
    qtbot.addWidget(pane)
    for key, row in (("segments", 1), ("joints", 0)):
        table = pane.views[key]
        go_to(table, row, "load_start" if key == "segments" else "force")
        with qtbot.waitSignal(pane.noted, check_params_cb=lambda line: "add a load case" in line):
            QTest.keyClicks(table, "5")


def test_renaming_a_mark_takes_its_loads_along(table, document):
    enter(table, 2, "mark", "Neck")
    assert document.project.load_cases[0].segment_loads[0].segment == "Neck"


def test_typing_a_length_into_the_last_row_adds_a_segment(table, document):
    go_to(table, 4, "mark")
    assert "type a length" in table.currentIndex().data()
    QTest.keyClick(begin(table, "800"), KEY.Key_Return)
    assert lengths(document) == [0.5, 1.0, 0.25, 0.8]
    assert document.project.segments[3].section == RoundSection(diameter=0.03)
    assert table.table_model.is_adding(table.currentIndex().row()), "the next length can be typed at once"
    document.undo()
    assert len(lengths(document)) == 3


def test_the_last_row_keeps_what_it_cannot_take_in(table, document):
    go_to(table, 4, "mark")
    QTest.keyClick(begin(table, "-5"), KEY.Key_Return)
    assert text_at(table, 4, "mark") == "-5"
    assert len(document.project.segments) == 3
    QTest.keyClick(table, KEY.Key_Up)
    go_to(table, 4, "mark")
    QTest.keyClick(table, KEY.Key_F2)
    QTest.keyClick(editor(table), KEY.Key_A, Qt.KeyboardModifier.ControlModifier)
    QTest.keyClick(editor(table), KEY.Key_Backspace)
    QTest.keyClick(editor(table), KEY.Key_Return)
    assert not document.snapshot.drafts


# Drafts and previews


def test_an_invalid_cell_stays_as_typed_with_its_reason(table, document):
    enter(table, 1, "length", "abc")
    index = cell(table, 1, "length")
    assert index.data() == "abc"
    assert index.data(ERROR_ROLE)
    assert index.data(Qt.ItemDataRole.ToolTipRole) == index.data(ERROR_ROLE)
    assert index.data(ERROR_ROLE) in index.data(Qt.ItemDataRole.AccessibleTextRole)
    assert lengths(document) == [0.5, 1.0, 0.25]
    enter(table, 1, "length", "600")
    assert not document.snapshot.drafts
    assert lengths(document)[0] == 0.6
    document.undo()
    assert cell(table, 1, "length").data() == "abc"


def test_a_negative_length_and_an_unknown_material_are_refused_in_words(table, document):
    enter(table, 1, "length", "-3")
    enter(table, 1, "material", "of Q")
    reasons = [draft.reason for draft in document.snapshot.drafts.values()]
    assert "greater than 0" in reasons[0]
    assert "of Q" in reasons[1]


def test_each_keystroke_previews_the_model_it_makes(table, document):
    go_to(table, 1, "length")
    line = begin(table, "7")
    assert document.shown_project.segments[0].length == 0.007
    QTest.keyClicks(line, "0")
    assert document.shown_project.segments[0].length == 0.07
    QTest.keyClicks(line, "x")
    assert document.preview.project is None
    assert document.preview.reason
    assert lengths(document)[0] == 0.5, "nothing is committed yet"
    QTest.keyClick(line, KEY.Key_Backspace)
    QTest.keyClick(line, KEY.Key_Return)
    assert lengths(document)[0] == 0.07
    document.undo()
    assert lengths(document)[0] == 0.5, "all keystrokes are one step"


def test_an_open_editor_keeps_its_text_when_results_or_units_arrive(table, document):
    go_to(table, 1, "length")
    line = begin(table, "77")
    table.table_model.set_figures(Figures())
    table.table_model.set_sight(Sight("in-lbf-psi", 0))
    assert line.text() == "77"
    assert line.isVisible()


def test_results_touch_only_their_own_columns(table, qtbot):
    model, touched = table.table_model, []
    model.dataChanged.connect(
        lambda first, last: touched.append((first.column(), last.column(), first.row()))
    )
    model.set_figures(Figures())
    results = {i for i, c in enumerate(model.columns) if c.figure is not None}
    last = model.rowCount() - 1
    runs = [(first, after) for first, after, row in touched if row != last]
    assert {place for first, after in runs for place in range(first, after + 1)} == results
    assert all(after < first for (_, after), (first, _) in pairwise(runs)), "each of them once"


def test_save_takes_in_an_open_editor(table, pane, document):
    go_to(table, 1, "length")
    begin(table, "600")
    pane.commit_open_editor()
    assert lengths(document)[0] == 0.6
    assert not [line for line in table.findChildren(QLineEdit) if line.isVisible()]


# Blocks


def test_a_block_is_pasted_as_one_step_and_rows_past_the_end_are_added(table, document):
    QGuiApplication.clipboard().setText("A\t100\t⌀20\nB\t200\t⌀30\nC\t300\t⌀40\nD\t400\t⌀50\n")
    go_to(table, 1, "mark")
    table.blocks.paste()
    assert lengths(document) == [0.1, 0.2, 0.3, 0.4]
    document.undo()
    assert lengths(document) == [0.5, 1.0, 0.25]


def test_what_is_copied_can_be_pasted_back(table, document):
    before = document.project
    table.selectAll()
    table.blocks.copy()
    table.blocks.paste()
    assert document.project == before


def test_a_bad_cell_in_a_paste_becomes_a_draft_and_the_rest_is_taken_in(table, document):
    QGuiApplication.clipboard().setText("100\nlong\n300")
    go_to(table, 1, "length")
    table.blocks.paste()
    assert lengths(document) == [0.1, 1.0, 0.3]
    assert [draft.text for draft in document.snapshot.drafts.values()] == ["long"]


def test_fill_down_copies_the_first_selected_row(table, document):
    for row in (1, 2, 3):
        table.selectionModel().select(cell(table, row, "length"), QItemSelectionModel.SelectionFlag.Select)
    table.blocks.fill_down()
    assert lengths(document) == [0.5, 0.5, 0.5]
    assert document.undo_name == "Fill down"


def test_rows_past_the_end_take_their_marks_along(table, document):
    QGuiApplication.clipboard().setText("Q\t700")
    table.setCurrentIndex(table.table_model.index(4, 0))
    table.blocks.paste()
    assert (document.project.segments[-1].mark, lengths(document)[-1]) == ("Q", 0.7)


def test_a_row_that_cannot_be_added_leaves_the_others_their_numbers_and_is_told(pane, document, qtbot):
    loads = pane.views["segment_loads"]
    QGuiApplication.clipboard().setText("A\t5\nNowhere\t6\nB\t7")
    loads.setCurrentIndex(loads.table_model.index(3, 0))
    with qtbot.waitSignal(pane.noted, check_params_cb=lambda line: "1 row was not added" in line):
        loads.blocks.paste()
    added = document.project.load_cases[0].segment_loads[3:]
    assert [(load.segment, load.load_start) for load in added] == [("A", 5e3), ("B", 7e3)]
    assert [draft.text for draft in document.snapshot.drafts.values()] == ["Nowhere"]
    assert loads.table_model.index(5, 0).data() == "Nowhere"


def test_what_waits_in_the_last_row_stays_there_when_rows_are_pasted(table, document):
    enter(table, 4, "mark", "abc")
    QGuiApplication.clipboard().setText("Q\t700")
    table.setCurrentIndex(table.table_model.index(4, 0))
    table.blocks.paste()
    assert table.table_model.index(5, 0).data() == "abc"
    assert text_at(table, 4, "mark") == "Q"
    table.setCurrentIndex(table.table_model.index(5, 0))
    QTest.keyClick(table, KEY.Key_Delete)
    assert not document.snapshot.drafts


def test_a_copy_holds_no_hint_for_adding_rows(table):
    table.selectAll()
    table.blocks.copy()
    assert len(QGuiApplication.clipboard().text().splitlines()) == table.table_model.record_rows


def choose(table, rows, key):
    """Choose the cells of a column."""
    table.clearSelection()
    for row in rows:
        table.selectionModel().select(cell(table, row, key), QItemSelectionModel.SelectionFlag.Select)


def test_filling_down_adds_no_row_and_spreads_no_cell_that_is_not_for_typing(table, document):
    choose(table, (1, 2, 3, 4), "length")
    table.blocks.fill_down()
    assert lengths(document) == [0.5, 0.5, 0.5]
    document.undo()
    choose(table, (0, 1, 2, 3), "length")
    table.blocks.fill_down()
    assert lengths(document) == [0.5, 1.0, 0.25]
    assert not document.snapshot.drafts


def test_filling_down_and_pasting_take_in_the_open_editor_first(table, document):
    go_to(table, 1, "length")
    begin(table, "900")
    choose(table, (1, 2, 3), "length")
    table.blocks.fill_down()
    assert lengths(document) == [0.9, 0.9, 0.9]


# Drafts and what becomes of them


def test_a_draft_that_has_become_valid_is_taken_in_by_enter(table, pane, document):
    enter(table, 1, "material", "Bronze")
    pane.tabs.setCurrentIndex(4)
    enter(pane.views["materials"], 3, "name", "Bronze")
    pane.tabs.setCurrentIndex(0)
    go_to(table, 1, "material")
    QTest.keyClick(table, KEY.Key_F2)
    QTest.keyClick(editor(table), KEY.Key_Return)
    assert document.project.segments[0].material == "Bronze"
    assert not document.snapshot.drafts


def test_a_draft_of_a_load_says_of_which_case(table, pane, document):
    enter(table, 1, "load_start", "abc")
    pane.tabs.setCurrentIndex(1)
    enter(pane.views["joints"], 1, "force", "abc")
    names = [draft.name for draft in document.snapshot.drafts.values()]
    assert names == ["Load at start of A, Dead", "Force along +x of 1, Dead"]
    pane.on_case_picked(1)
    pane.tabs.setCurrentIndex(0)
    assert text_at(table, 1, "load_start") == "0"


def test_a_load_typed_before_there_is_a_case_waits_for_the_first_one(qtbot, qapp, view):
    document = Document(member([Part(1.0, round_bar(0.04))], {0: FixedSupport()}))
    pane = TablesPane(document, view, LIGHT)
    qtbot.addWidget(pane)
    loads, cases = pane.views["segment_loads"].table_model, pane.views["load_cases"].table_model
    loads.setData(loads.index(0, 0), "A")
    assert "load case" in loads.index(0, 0).data(ERROR_ROLE)
    cases.setData(cases.index(0, 0), "Dead")
    assert loads.index(0, 0).data() == "A"
    loads.setData(loads.index(0, 0), "A")
    assert [load.segment for load in document.project.load_cases[0].segment_loads] == ["A"]


# The other tables and the pickers


def test_the_edited_case_is_picked_by_name_and_shared_by_all_tables(pane, document, qtbot):
    pane.case_picker.setFocus()
    QTest.keyClick(pane.case_picker, KEY.Key_Down)
    assert pane.sight.case == 1
    table = pane.views["segments"]
    assert text_at(table, 2, "load_start") == "0"
    enter(table, 2, "load_start", "5")
    assert document.project.load_cases[1].segment_loads == (SegmentLoad("B", 5000.0),)
    project = edits.add_record(document.project, ("load_cases",), LoadCase("Cold"), 0)
    document.commit(edits.add_record(project, ("load_cases",), LoadCase("Wet"), 0), "Add load cases")
    assert pane.case_picker.currentText() == "Hot"
    assert pane.sight.case == 3
    document.commit(edits.remove_case(document.project, "Cold"), "Delete load cases")
    assert pane.case_picker.currentText() == "Hot"
    assert pane.sight.case == 2
    document.commit(edits.remove_case(document.project, "Hot"), "Delete load cases")
    assert pane.sight.case == 1


@pytest.mark.parametrize(
    ("key", "column", "text", "place", "value"),
    [
        ("joints", "force", "25", ("load_cases", 0, "joint_loads", 0, "force"), 25e3),
        ("joints", "movement", "0.5", ("load_cases", 0, "joint_loads", 0, "movement"), 0.5e-3),
        ("load_cases", "gravity", "-9.8", ("load_cases", 0, "gravity"), -9.8),
        ("segment_loads", "lack_of_fit", "0.1", ("load_cases", 0, "segment_loads", 0, "lack_of_fit"), 1e-4),
        ("combinations", "factor of Hot", "1.5", ("combinations", 0, "factors", "Hot"), 1.5),
        ("combinations", "allowable_factor", "1.2", ("combinations", 0, "allowable_factor"), 1.2),
        ("materials", "allowable_tension", "160", ("materials", 0, "allowable_tension"), 160e6),
    ],
)
def test_each_table_edits_its_records(pane, document, key, column, text, place, value):
    view = pane.views[key]
    view.table_model.setData(cell(view, 0, column), text)
    assert edits.value_at(document.project, place) == pytest.approx(value, rel=1e-15)


@pytest.mark.parametrize(
    ("key", "text"),
    [
        ("load_cases", "Cold"),
        ("segment_loads", "A"),
        ("joint_loads", "1"),
        ("combinations", "Rare"),
        ("materials", "Bronze"),
        ("limits displacement", "3"),
        ("limits relative", "0 -> 3"),
        ("limits reaction", "0"),
    ],
)
def test_each_tables_last_row_adds_and_its_records_can_be_deleted(pane, document, key, text):
    view = pane.views[key]
    before = view.table_model.rowCount()
    view.table_model.setData(view.table_model.index(before - 1, 0), text)
    assert view.table_model.rowCount() == before + 1
    assert not document.snapshot.drafts
    table = view.table_model.table
    document.commit(table.delete(document.project, (before - 1,), view.table_model.sight), "Delete")
    assert view.table_model.rowCount() == before


def test_a_new_case_gets_a_column_in_the_combinations(pane, document):
    combinations = pane.views["combinations"].table_model
    before = combinations.columnCount()
    document.commit(edits.add_record(document.project, ("load_cases",), LoadCase("Cold")), "Add load case")
    assert combinations.columnCount() == before + 1
    assert combinations.heading(before - 1)[0] == "Cold"


def test_choosing_a_row_selects_the_segment_and_the_other_way_round(pane, table, view):
    go_to(table, 2, "length")
    assert view.selection == Selection(segments=frozenset({1}))
    view.set_selection(Selection(segments=frozenset({2})))
    assert table.table_model._lit == frozenset({2})


def test_commands_find_the_segment_that_was_chosen_elsewhere_last(pane, table, view):
    go_to(table, 1, "length")
    view.set_selection(Selection(segments=frozenset({1, 2})))
    assert table.chosen_records() == (1, 2)
    assert table.currentIndex() == cell(table, 2, "length")
    view.set_selection(Selection())
    assert table.chosen_records() == (1, 2), "a click beside the member leaves the table's choice alone"
    view.set_selection(Selection(segments=frozenset({99})))
    assert table.chosen_records() == (1, 2)


def test_picking_another_case_takes_in_what_is_being_typed_for_the_old_one(pane, table, document):
    go_to(table, 1, "load_start")
    begin(table, "7")
    pane.case_picker.activated.emit(1)
    dead, hot = document.project.load_cases
    assert "A" in {load.segment for load in dead.segment_loads}
    assert not hot.segment_loads


def test_tables_headers_and_editors_have_names(pane, table):
    go_to(table, 1, "length")
    line = begin(table, "7")
    assert line.accessibleName() == "Length (mm), row 2"
    assert QAccessible.queryAccessibleInterface(table).text(QAccessible.Text.Name) == "Segments"
    header = table.table_model.headerData(1, Qt.Orientation.Horizontal, Qt.ItemDataRole.AccessibleTextRole)
    assert header == "Length (mm)"
    QTest.keyClick(line, KEY.Key_Escape)


# What Qt is told

ALL_TABLES = [table for _title, tables in TABS for table, _share in tables]
STEPS = st.lists(
    st.tuples(
        st.sampled_from(["insert", "delete", "length", "reverse", "undo", "redo", "case", "uncase"]),
        st.integers(0, 7),
    ),
    max_size=12,
)


def take_step(document, step, at):
    project = document.project
    index = at % len(project.segments)
    edit = {
        "insert": lambda: edits.insert_segment(project, index),
        "delete": lambda: edits.delete_segments(project, (index,)) if len(project.segments) > 1 else project,
        "length": lambda: edits.set_value(project, ("segments", index, "length"), 1.0 + at),
        "reverse": lambda: edits.reverse_member(project),
        "case": lambda: edits.add_record(
            project, ("load_cases",), LoadCase(f"Case {len(project.load_cases)}-{at}")
        ),
        "uncase": lambda: (
            edits.remove_case(project, project.load_cases[-1].name) if project.load_cases else project
        ),
    }
    if step in edit:
        try:
            document.commit(edit[step](), step)
        except edits.EditError:  # a name that is taken already
            return
    else:
        getattr(document, step)()


@settings(suppress_health_check=[HealthCheck.function_scoped_fixture])
@given(steps=STEPS)
def test_qt_is_told_the_truth_about_rows_and_columns(qapp, steps):
    document = Document(shaft())
    sight = Sight("mm-kN-MPa", 0)
    models = [TableModel(table, document, sight) for table in ALL_TABLES]
    mode = QAbstractItemModelTester.FailureReportingMode.Warning  # a warning of Qt fails the test
    testers = [QAbstractItemModelTester(model, mode) for model in models]
    for step, at in steps:
        take_step(document, step, at)
        for model in models:
            records = model.table.rows(document.project, model.sight)
            assert model.rowCount() == len(records) + (model.table.adding is not None)
    del testers


def test_reasons_speak_the_words_and_units_of_the_tables(table, pane, document):
    enter(table, 1, "length", "-5")
    enter(table, 2, "mark", "A")
    pane.tabs.setCurrentIndex(2)
    loads = pane.views["joint_loads"]
    enter(loads, 0, "joint", "nine")
    reasons = [draft.reason for draft in document.snapshot.drafts.values()]
    assert reasons == [
        "must be greater than 0, is −5 mm",
        '"A" is taken already, at segment 1, mark; choose another',
        'there is no joint "nine"; add it or choose one that exists',
    ]


def test_a_limit_that_nobody_typed_does_not_pass_for_one(pane, document):
    pane.tabs.setCurrentIndex(5)
    told = []
    pane.noted.connect(told.append)
    enter(pane.views["limits displacement"], 0, "joint", "1")
    enter(pane.views["limits reaction"], 0, "joint", "0")
    assert document.project.limits.displacement[0].limit <= 1e-6
    assert document.project.limits.reaction[0].limit <= 1.0
    assert len(told) == 2
    assert "until you type yours" in told[0]


def test_a_new_material_says_what_it_starts_with(pane):
    pane.tabs.setCurrentIndex(4)
    told = []
    pane.noted.connect(told.append)
    materials = pane.views["materials"]
    enter(materials, materials.table_model.rowCount() - 1, "name", "Bronze")
    assert told == [
        "Bronze starts with the modulus of the material above it and expansion and density 0: type its own"
    ]


def test_a_cell_that_is_not_for_typing_says_why(table, pane, document):
    told = []
    pane.noted.connect(told.append)
    go_to(table, 3, "load_start")  # two loads on C
    QTest.keyClick(table, "5")
    go_to(table, 1, "utilisation")
    QTest.keyClick(table, "5")
    document.commit(edits.remove_case(edits.remove_case(document.project, "Hot"), "Dead"), "Delete")
    go_to(table, 1, "heat")
    QTest.keyClick(table, "5")
    assert told == [
        "several loads stand behind this cell: edit them one by one in the Loads table",
        "a result is not for typing",
        "add a load case in the Loads table first",
    ]
    assert cell(table, 1, "heat").data(Qt.ItemDataRole.ToolTipRole) == told[-1]


def test_the_status_tells_the_entry_refused_last(table, document):
    for row, key, text in ((1, "length", "x"), (2, "section", "M36"), (1, "length", "y")):
        enter(table, row, key, text)
    assert drafts_line(tuple(document.snapshot.drafts.values())) == (
        "Results are out of date: Length of A: “y” is not a number; type one such as 350 mm (and 1 cell more)"
    )
    enter(table, 1, "length", "5")
    assert "d40, d60x5 (a tube), r20x30" in drafts_line(tuple(document.snapshot.drafts.values()))


def test_a_material_in_use_is_kept_and_names_who_uses_it(pane, document):
    delete = pane.views["materials"].table_model.table.delete
    with pytest.raises(NotTaken, match=r"^A is made of of A: give it another material first$"):
        delete(document.project, (0,), Sight("mm-N-MPa", None))


def test_every_cell_has_a_name_that_can_be_read(pane):
    """Names read "Length of A": a heading is a noun, not the start of a sentence."""
    headings = [column.title for view in pane.views.values() for column in view.table_model.columns]
    assert not [words for words in headings if words.endswith(" by") or words == "At most"]


def test_what_goes_with_a_deleted_segment_is_told():
    project = edits.set_value(shaft(), ("joints", 2, "support"), SpringSupport(stiffness=1e8))
    limits = Limits(displacement=(DisplacementLimit("2", 1e-3),), relative=(RelativeLimit("1", "3", 1e-3),))
    project = edits.set_value(project, ("limits",), limits)
    assert also_gone(project, edits.delete_segments(project, (1,))) == (
        "also gone: the support of joint 2, 1 load, 1 limit"
    )
    assert also_gone(shaft(), edits.delete_segments(shaft(), (0,))) == ""


def test_the_status_tells_what_went_with_a_segment(pane, table, document):
    told = []
    commands = MemberEdits(document, pane)
    commands.told.connect(told.append)
    go_to(table, 3, "mark")
    commands.delete_segments()
    assert told == ["also gone: 2 loads"]
