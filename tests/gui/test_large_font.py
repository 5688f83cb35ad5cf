"""At twice the font, and with another font or palette while the window is open, everything stays usable."""

from itertools import pairwise

import pytest
from PySide6.QtCore import QEvent, QSize, Qt
from PySide6.QtGui import QFont
from PySide6.QtTest import QTest
from PySide6.QtWidgets import QApplication, QLabel, QToolButton

from app.gui.theme import DARK, LIGHT
from tests.gui.windows import solved
from tests.screenshots import dark_palette


@pytest.fixture
def doubled(qtbot, qapp, window):
    """The window with the application's font doubled while it is open."""
    window.resize(1280, 800)
    before = QFont(qapp.font())
    font = QFont(before)
    font.setPointSizeF(2 * before.pointSizeF())
    try:
        qapp.setFont(font)
        qtbot.waitUntil(lambda: window.tables.fontMetrics().height() > 24)
        QApplication.sendPostedEvents(None, QEvent.Type.LayoutRequest)
        QApplication.processEvents()
        yield window
    finally:
        qapp.setFont(before)


@pytest.fixture
def dark(qtbot, qapp, window):
    """The window with the system turned dark while it is open."""
    before = qapp.palette()
    try:
        qapp.setPalette(dark_palette())
        qtbot.waitUntil(lambda: window._theme is DARK)
        yield window
    finally:
        qapp.setPalette(before)


def test_a_doubled_font_widens_no_window(doubled):
    assert doubled.size() == QSize(1280, 800)
    assert doubled.minimumSizeHint().width() <= 1280
    assert doubled.minimumSizeHint().height() <= 800


def test_a_kept_reference_in_the_bar_does_not_either(qtbot, doubled):
    doubled.actions_by_key["keep_reference"].trigger()
    QTest.keyClick(doubled.against.field, Qt.Key.Key_Return)
    QApplication.processEvents()
    assert doubled.against.picker.isVisible()
    assert doubled.minimumSizeHint().width() <= 1280


def test_titles_of_strips_side_by_side_stay_on_the_sheet(doubled):
    doubled.on_layout_picked("vertical")
    sheet = doubled.sheet
    titles = [strip.labels[0].rect for strip in sheet.strips]
    assert all(rect.right() <= sheet.viewport().width() for rect in titles)
    assert not any(one.intersects(other) for one, other in pairwise(titles))


def test_rows_of_every_room_grow_with_the_font(doubled):
    height = doubled.tables.fontMetrics().height()
    view = doubled.tables.views["segments"]
    assert view.rowHeight(1) > height
    assert view.viewport().height() >= 1.5 * height, "a row is in sight"
    for row in doubled.findings.rows:
        assert row.height() > height
    label = doubled.status.findChildren(QLabel)[0]
    assert label.height() >= height


def test_commands_without_room_are_in_a_menu_that_the_keyboard_opens(qtbot, doubled):
    bar = doubled.top_bar.commands
    shown = [b for b in bar.findChildren(QToolButton) if b.isVisible()]
    assert bar.more in shown
    for button in shown:
        assert button.geometry().right() <= bar.width()
        assert button.width() >= button.sizeHint().width()
    assert doubled.actions_by_key["keep_reference"] in bar.folded
    bar.more.setFocus()
    called = []
    doubled.actions_by_key["keep_reference"].triggered.connect(lambda: called.append(True))
    menu = bar.more.menu()
    menu.popup(bar.more.mapToGlobal(bar.more.rect().bottomLeft()))
    for _ in bar.folded:
        QTest.keyClick(menu, Qt.Key.Key_Down)
        if menu.activeAction() is doubled.actions_by_key["keep_reference"]:
            break
    QTest.keyClick(menu, Qt.Key.Key_Return)
    assert called == [True]


def test_with_room_nothing_is_folded(window):
    window.resize(1280, 800)
    bar = window.top_bar.commands
    assert bar.folded == ()
    assert not bar.more.isVisible()


def pixels(widget, every=7):
    image = widget.grab().toImage()
    return [
        image.pixelColor(x, y).lightness()
        for x in range(0, image.width(), every)
        for y in range(0, image.height(), every)
    ]


@pytest.mark.parametrize("room", ["sheet", "findings", "tables", "top_bar", "status"])
def test_every_room_turns_dark_while_open(dark, room):
    light = pixels(getattr(dark, room))
    assert sorted(light)[len(light) // 2] < 80


def test_and_light_again(qtbot, qapp, window):
    before = qapp.palette()
    qapp.setPalette(dark_palette())
    qtbot.waitUntil(lambda: window._theme is DARK)
    qapp.setPalette(before)
    qtbot.waitUntil(lambda: window._theme is LIGHT)
    solved(qtbot, window)
    for room in (window.sheet, window.findings, window.tables, window.top_bar, window.status):
        light = pixels(room)
        assert sorted(light)[len(light) // 2] > 180
