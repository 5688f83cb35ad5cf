"""A number that may have been meant as thousands is taken as it is read, and that is said at once."""

import pytest
from PySide6.QtCore import Qt
from PySide6.QtTest import QTest

from app.drawing.shapes import Part
from tests.gui.hand import begin, chord, enter, go_to
from tests.gui.test_in_place import double_click, replace_text


@pytest.mark.parametrize("text", ["1.500", "1,500", "1.500 mm", "2*1,500"])
def test_three_digits_behind_a_sign_are_said_to_be_decimals(window, table, text):
    enter(table, 1, "length", text)
    told = window.status.news.text()
    assert told.endswith("read as 1.5 mm; if thousands are meant, type 1500")


@pytest.mark.parametrize("text", ["1.5", "1.500 m", "0.500", "1500", "12.3456", "1.500e3", "1.500 cm"])
def test_nothing_is_said_where_nothing_can_be_mistaken(window, table, text):
    enter(table, 1, "length", text)
    assert "thousands" not in window.status.news.text()


def test_it_is_said_of_new_rows_of_both_ends_and_of_many_cells(window, table):
    go_to(table, table.table_model.record_rows, "mark")
    QTest.keyClick(begin(table, "1,500"), Qt.Key.Key_Return)
    assert "“1,500” is read as 1.5 mm" in window.status.news.text()
    enter(table, 1, "bedding", "1.500 -> 20")
    assert "“1.500” is read as 1.5" in window.status.news.text()
    go_to(table, 1, "length")
    QTest.keyClick(table, Qt.Key.Key_Down, Qt.KeyboardModifier.ShiftModifier)
    chord(begin(table, "2.500"), Qt.Key.Key_Return)
    assert "“2.500” is read as 2.5 mm" in window.status.news.text()


def test_a_name_is_no_number(window, table):
    enter(table, 1, "mark", "1.500")
    assert window.status.news.text() == ""


def test_it_is_said_in_place_on_the_drawing(window):
    line = double_click(window, Part("length", 1))
    replace_text(line, "1.500")
    QTest.keyClick(line, Qt.Key.Key_Return)
    assert "is read as 1.5 mm" in window.status.news.text()
