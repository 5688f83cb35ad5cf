"""Strips taken elsewhere from the real window: numbers and pictures, to the clipboard and to files."""

import csv
import io
import re

import pytest
from PySide6.QtCore import Qt
from PySide6.QtGui import QGuiApplication, QImage
from PySide6.QtTest import QTest
from PySide6.QtWidgets import QFileDialog

from app.gui.view import Shown
from app.strip_choice import StripChoice
from app.strip_numbers import csv_text, number_rows
from tests.gui.hand import begin, go_to
from tests.gui.test_strip_choice import ask_for_menu, grip, pick
from tests.gui.windows import dialog_of, finish

CTRL_ALT = Qt.KeyboardModifier.ControlModifier | Qt.KeyboardModifier.AltModifier


def clipboard():
    return QGuiApplication.clipboard()


def press(window, key):
    """Ctrl, Alt and a key, let go again."""
    QTest.keyClick(window, key, CTRL_ALT)
    QTest.keyClick(window, Qt.Key.Key_Control)


def expected(window, kinds):
    return number_rows(window.showing.outcome.results, window.sheet.shown_state, kinds)


def test_the_numbers_of_the_shown_strips_are_copied_by_key(window):
    window.view.set_strips(StripChoice(("stress", "force")))
    press(window, Qt.Key.Key_C)
    rows = list(csv.reader(io.StringIO(clipboard().text()), "excel-tab"))
    assert rows == expected(window, ("stress", "force"))
    assert "copied" in window.status.news.text()


def test_the_numbers_of_one_strip_are_copied_from_its_menu(window):
    window.view.set_shown(Shown("envelope"))
    ask_for_menu(window, grip(window, 1))
    pick(window.strip_menu, "Copy numbers")
    heads = clipboard().text().split("\n")[0].split("\t")
    assert [head.split(" (")[0].split(", ")[0] for head in heads] == ["x", "Segment", "N max", "N min"]


def test_the_sheet_is_copied_as_a_picture_twice_as_fine(window):
    press(window, Qt.Key.Key_P)
    image = clipboard().image()
    assert image.size() == window.sheet.viewport().size() * 2


def test_one_strip_is_copied_as_a_picture_of_its_own_part(window):
    ask_for_menu(window, grip(window, 2))
    pick(window.strip_menu, "Copy picture")
    image, rect = clipboard().image(), window.sheet.places.strips[2]
    assert 2 * rect.height() < image.height() < 2.5 * rect.height()
    assert image.width() > 2 * rect.right()
    inside = {image.pixelColor(x, image.height() // 2).name() for x in range(image.width())}
    assert len(inside) > 3  # it is drawn on


def save(qtbot, window, entry, target):
    """Choose an entry of the menu on the strip of stress, and a file."""
    ask_for_menu(window, grip(window, 2))
    pick(window.strip_menu, entry)
    dialog = dialog_of(window, QFileDialog)
    dialog.selectFile(str(target))
    finish(qtbot, dialog, dialog.accept)


def test_numbers_are_saved(qtbot, window, tmp_path):
    save(qtbot, window, "Save numbers…", tmp_path / "stress.csv")
    text = (tmp_path / "stress.csv").read_bytes().decode("utf-8-sig")
    assert text == csv_text(expected(window, ("stress",)))


def test_a_picture_is_saved(qtbot, window, tmp_path):
    save(qtbot, window, "Save picture…", tmp_path / "stress.png")
    assert QImage(str(tmp_path / "stress.png")).width() > 500


def texts_of(path):
    return set(re.findall(r">([^<]+)</text>", path.read_text("utf-8")))


def test_strips_are_saved_as_lines(window, tmp_path):
    window.taking.write_picture(tmp_path / "strips.svg")
    marks = {segment.mark for segment in window.document.project.segments}
    assert {"u", "N", "σ"} | marks <= texts_of(tmp_path / "strips.svg")
    window.taking.write_picture(tmp_path / "one.svg", ("force",))
    assert {"u", "N", "σ"} & texts_of(tmp_path / "one.svg") == {"N"}


def test_what_is_out_of_date_is_not_taken(window, table):
    clipboard().setText("before")
    go_to(table, 1, "length")
    begin(table, "12 x")
    assert not window.showing.current
    window.taking.copy_numbers(("force",))
    assert clipboard().text() == "before"
    assert "out of date" in window.status.news.text()


def test_a_state_that_is_not_checked_has_no_picture_of_utilisation(window, tmp_path):
    window.view.set_shown(Shown("case", window.document.project.load_cases[0].name))
    window.taking.write_picture(tmp_path / "none.svg", ("utilisation",))
    assert not (tmp_path / "none.svg").exists()
    assert "not checked" in window.status.news.text()


@pytest.mark.parametrize("name", ["numbers.csv", "picture.png"])
def test_a_file_that_cannot_be_written_is_said(window, tmp_path, name):
    target = tmp_path / "missing" / name
    if name.endswith("csv"):
        window.taking.write_numbers(target, ("force",))
    else:
        window.taking.write_picture(target)
    assert f"{name} not written: " in window.status.news.text()
