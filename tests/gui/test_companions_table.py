"""The companions' table with real keys: a sleeve entered without the file, cells, blocks, drafts, notes."""

import pytest
from PySide6.QtCore import Qt
from PySide6.QtGui import QGuiApplication
from PySide6.QtTest import QTest

from app import edits
from app.project_file import dump
from tests.gui.hand import begin, chord, enter, go_to, text_at
from tests.sleeves import draw_bolt

KEY = Qt.Key
CTRL = Qt.KeyboardModifier.ControlModifier


@pytest.fixture
def rod(tmp_path):
    path = tmp_path / "bolt.barwright.json"
    path.write_bytes(dump(draw_bolt()))
    return path


@pytest.fixture
def beside(window):
    chord(window.tables.current_view(), KEY.Key_7)
    view = window.tables.current_view()
    assert view.table_model.table.key == "companions"
    return view


def companion(window, at=0):
    return window.document.project.companions[at]


def lengths(window, at=0):
    return [segment.length for segment in companion(window, at).segments]


def news(window):
    return window.status.news.text()


def type_here(view, text):
    QTest.keyClick(begin(view, text), KEY.Key_Return)


def add(view, text):
    enter(view, view.table_model.record_rows, "companion", text)


def test_a_companion_and_its_segments_are_typed(window, beside):
    add(beside, "T 0 -> 1")
    made = companion(window, 1)
    assert (made.mark, made.start, made.end) == ("T", "0", "1")
    assert "T lies beside joints 0 to 1" in news(window)
    add(beside, "T")
    assert lengths(window, 1) == [0.025, 0.025]
    assert "Ta gave half of its length" in news(window)
    assert [text_at(beside, row, "mark") for row in range(4)] == ["Sa", "Sb", "Ta", "Tb"]
    assert window.document.undo_name == "Add companion segment"
    window.document.undo()
    window.document.undo()
    assert len(window.document.project.companions) == 1


@pytest.mark.parametrize(
    ("key", "text", "shown"),
    [
        ("companion", "sleeves", "sleeves"),
        ("start", "0", "0"),
        ("end", "3", "3"),
        ("acts", "ten", "tension only"),
        ("mark", "lower", "lower"),
        ("length", "150", "150"),
        ("section", "d40x5", "⌀40×5"),
        ("material", "Brass", "Brass"),
        ("load_start", "2", "2"),
        ("heat", "10 -> 30", "10→30"),
        ("lack_of_fit", "0.1", "0.1"),
    ],
)
def test_every_cell_is_typed_and_undone(window, beside, key, text, shown):
    before = window.document.project
    enter(beside, 0, key, text)
    assert text_at(beside, 0, key) == shown
    assert not window.document.snapshot.drafts
    window.document.undo()
    assert window.document.project == before


def test_what_is_the_companions_is_typed_in_any_of_its_rows(window, beside):
    enter(beside, 1, "acts", "both")
    assert companion(window).action == "both"
    assert text_at(beside, 0, "acts") == "both ways"
    go_to(beside, 0, "acts")
    QTest.keyClick(beside, KEY.Key_Delete)
    assert not companion(window).acts


def test_both_joints_are_typed_at_once(window, beside):
    enter(beside, 0, "start", "0 -> 3")
    assert (companion(window).start, companion(window).end) == ("0", "3")
    assert news(window) == "S is 110 mm too short"


@pytest.mark.parametrize(
    ("key", "text", "reason"),
    [
        ("acts", "sideways", "acts in one of these ways"),
        ("end", "9", "there is no joint"),
        ("end", "0", "a companion runs along the axis"),
        ("mark", "A", "is taken already"),
        ("length", "-3", "must be greater than 0"),
    ],
)
def test_what_cannot_be_stays_with_its_reason_and_is_mended(window, beside, key, text, reason):
    before = window.document.project
    enter(beside, 1, key, text)
    (draft,) = window.document.snapshot.drafts.values()
    assert reason in draft.reason
    assert text_at(beside, 1, key) == text
    assert window.document.project == before
    chord(window.tables.current_view(), KEY.Key_1)  # a row before it comes and goes: the draft keeps its cell
    table = window.tables.views["segments"]
    enter(table, table.table_model.record_rows, "mark", "50")
    assert text_at(beside, 1, key) == text


def test_a_draft_stays_at_its_segment_whatever_comes_and_goes_in_the_member(window, beside):
    enter(beside, 1, "length", "long")
    window.document.commit(edits.insert_segment(window.document.project, 0), "Insert segment")
    assert text_at(beside, 1, "length") == "long"
    window.document.commit(edits.remove_companion_segments(window.document.project, [(0, 0)]), "Delete")
    assert text_at(beside, 0, "length") == "long"


def test_a_length_that_does_not_fit_is_said_in_the_table(window, beside):
    enter(beside, 1, "length", "90")
    assert news(window) == "S is 10 mm too short"
    model = beside.table_model
    total = model.index(model.record_rows, model.total_column).data()
    assert total == "S is 10 mm too short"


def test_rows_are_deleted_with_their_companion(window, beside):
    go_to(beside, 0, "length")
    window.actions_by_key["delete_rows"].trigger()
    assert [s.mark for s in companion(window).segments] == ["Sb"]
    go_to(beside, 0, "length")
    window.actions_by_key["delete_rows"].trigger()
    assert window.document.project.companions == ()


def test_a_block_goes_out_and_comes_back(window, beside):
    model = beside.table_model
    beside.selectAll()
    window.actions_by_key["copy_with_headings"].trigger()
    block = QGuiApplication.clipboard().text()
    go_to(beside, 0, "length")
    window.actions_by_key["delete_rows"].trigger()
    window.actions_by_key["delete_rows"].trigger()
    assert model.record_rows == 0
    go_to(beside, 0, "companion")
    QGuiApplication.clipboard().setText(block)
    window.actions_by_key["paste"].trigger()
    assert not window.document.snapshot.drafts
    again, before = companion(window), draw_bolt().companions[0]
    assert (again.mark, again.start, again.end, again.acts) == ("S", "1", "2", "compression")
    assert [(s.mark, s.length, s.material) for s in again.segments] == [
        (s.mark, s.length, s.material) for s in before.segments
    ]
    assert again.segments[0].section == before.segments[0].section


def test_a_text_is_filled_down(window, beside):
    go_to(beside, 0, "section")
    QTest.keyClick(beside, KEY.Key_Down, Qt.KeyboardModifier.ShiftModifier)
    chord(beside, KEY.Key_D)
    sections = [segment.section for segment in companion(window).segments]
    assert sections[0] == sections[1]


def test_loads_on_them_are_typed_in_the_loads_table_too(window):
    chord(window.tables.current_view(), KEY.Key_3)
    loads = window.tables.views["segment_loads"]
    add_row = loads.table_model.record_rows
    enter(loads, add_row, "segment", "Sa")
    assert window.document.project.load_cases[0].segment_loads[-1].segment == "Sa"
    assert {offer.name for offer in loads.table_model.offers(loads.table_model.index(0, 0))} >= {
        "A",
        "Sa",
        "Sb",
    }


def test_a_material_that_a_companion_is_made_of_stays(window):
    chord(window.tables.current_view(), KEY.Key_5)
    materials = window.tables.current_view()
    go_to(materials, 1, "name")
    window.actions_by_key["delete_rows"].trigger()
    assert "Sb is made of Brass" in news(window)
    assert len(window.document.project.materials) == 2
