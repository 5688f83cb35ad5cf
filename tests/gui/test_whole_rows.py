"""Whole rows of the tables are in sight, whatever the size of the window."""

from __future__ import annotations

import pytest
from PySide6.QtCore import QPoint, Qt
from PySide6.QtTest import QTest

from app.samples import sample_path


def cut_off(table) -> int:
    """Pixels of a row that are in sight where not all of it is."""
    whole = table.verticalScrollBar().maximum() == 0
    return 0 if whole else table.viewport().height() % table.verticalHeader().defaultSectionSize()


def test_the_row_for_adding_to_five_segments_is_seen_whole(qtbot, window, table):
    window.files.open_path(sample_path("quay_pile"))
    qtbot.waitUntil(lambda: table.table_model.record_rows == 5 + table.table_model.table.lead)
    window.resize(1279, 800)
    window.resize(1280, 800)
    last = table.table_model.index(table.table_model.rowCount() - 1, 0)
    qtbot.waitUntil(lambda: table.viewport().rect().contains(table.visualRect(last)))


@pytest.mark.parametrize("page", ["segments", "materials"])
def test_rows_are_whole_before_there_are_more_than_are_in_sight(qtbot, window, page):
    view = window.tables.views[page]
    window.files.new()
    window.tables.open_tab(0 if page == "segments" else 4)
    window.resize(1280, 837)
    row = view.verticalHeader().defaultSectionSize()
    qtbot.waitUntil(lambda: window.height() == 837 and view.viewport().height() % row == 0)
    assert view.verticalScrollBar().maximum() == 0


@pytest.mark.parametrize("height", [771, 800])
def test_rows_are_whole_in_any_window(qtbot, window, table, height):
    window.resize(1280, height)
    qtbot.waitUntil(lambda: window.height() == height and cut_off(table) == 0)


@pytest.mark.parametrize("by", [-33, 17])
def test_rows_are_whole_after_the_rule_was_dragged(qtbot, window, table, by):
    rule = window.panes.down.handle(1)
    before = window.panes.down.sizes()[1]
    at = rule.rect().center()
    QTest.mousePress(rule, Qt.MouseButton.LeftButton, pos=at)
    QTest.mouseMove(rule, at + QPoint(0, by))
    QTest.mouseRelease(rule, Qt.MouseButton.LeftButton, pos=at + QPoint(0, by))
    qtbot.waitUntil(lambda: cut_off(table) == 0)
    assert abs(window.panes.down.sizes()[1] - before + by) < 26
