"""Cells read with what is being typed into another; nothing is taken in, and no editor starts from it."""

from __future__ import annotations

import pytest
from PySide6.QtCore import Qt
from PySide6.QtTest import QTest

from app.gui.tables.model import ERROR_ROLE
from app.gui.tables.pages import PLACES
from tests.gui.hand import begin, cell, enter, go_to, text_at

KEY = Qt.Key


@pytest.fixture
def table(window):
    return window.tables.views["segments"]


def test_the_area_follows_the_section_letter_by_letter(window, table):
    before, starts = text_at(table, 1, "area"), table.table_model.entry(cell(table, 1, "area"))
    go_to(table, 1, "section")
    editor = begin(table, "8")
    assert text_at(table, 1, "area") not in ("", before)
    assert table.table_model.entry(cell(table, 1, "area")) == starts
    assert editor.text() == "8"
    QTest.keyClick(editor, KEY.Key_X)  # no section any more
    assert text_at(table, 1, "area") == before
    QTest.keyClick(editor, KEY.Key_Escape)
    assert text_at(table, 1, "area") == before
    assert window.document.undo_name is None


def test_drafts_beside_it_stay_as_they_were_typed(window, table):
    enter(table, 1, "area", "about 20")
    go_to(table, 1, "section")
    editor = begin(table, "8")
    assert text_at(table, 1, "area") == "about 20"
    assert cell(table, 1, "area").data(ERROR_ROLE)
    QTest.keyClick(editor, KEY.Key_Escape)


def test_a_length_typed_to_add_a_segment_moves_no_row_yet(window, table):
    rows, totals = table.table_model.rowCount(), table.table_model.total_column
    before = table.table_model.index(rows - 1, totals).data()
    go_to(table, rows - 1, "mark")
    editor = begin(table, "150")
    assert table.table_model.rowCount() == rows
    assert table.table_model.index(rows - 1, totals).data() != before
    assert editor.text() == "150"
    QTest.keyClick(editor, KEY.Key_Escape)
    assert table.table_model.index(rows - 1, totals).data() == before


def test_factors_stay_readable_while_their_case_is_renamed(window):
    model = window.tables.models["combinations"]
    case = window.document.project.load_cases[0].name
    place = next(i for i, column in enumerate(model.columns) if column.title == case)
    before = [model.text_at(row, place) for row in range(model.record_rows)]
    window.tables.open_tab(PLACES["load_cases"])
    view = window.tables.views["load_cases"]
    go_to(view, 0, "name")
    editor = begin(view, "Z")
    assert window.document.shown_project.load_cases[0].name == "Z"
    assert any(before)
    assert [model.text_at(row, place) for row in range(model.record_rows)] == before
    QTest.keyClick(editor, KEY.Key_Escape)
