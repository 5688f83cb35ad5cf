"""The keyboard's place is seen on every control, in both themes: painted with and without it, it differs."""

from __future__ import annotations

import numpy as np
import pytest
from PySide6.QtCore import Qt
from PySide6.QtGui import QImage
from PySide6.QtTest import QTest
from PySide6.QtWidgets import QApplication, QWidget

from app.gui.help_window import HelpWindow
from app.gui.theme import DARK
from app.gui.title_block import TitleBlockDialog
from tests.gui.hand import chord
from tests.gui.windows import dialog_of, finish
from tests.screenshots import dark_palette


@pytest.fixture(params=["light", "dark"])
def themed(request, qtbot, qapp, window):
    """The window in each theme."""
    before = qapp.palette()
    try:
        if request.param == "dark":
            qapp.setPalette(dark_palette())
            qtbot.waitUntil(lambda: window._theme is DARK)
        yield window
    finally:
        qapp.setPalette(before)


def picture(widget: QWidget) -> np.ndarray:
    """What stands on the screen where the widget is, a little beyond its edges, without a blinking caret."""
    window = widget.window()
    place = widget.rect().translated(widget.mapTo(window, widget.rect().topLeft())).adjusted(-3, -3, 3, 3)
    image = window.grab(place).toImage().convertToFormat(QImage.Format.Format_RGB32)
    return np.array(image.constBits()).view(np.uint32)


def changes(widget: QWidget, elsewhere: QWidget) -> int:
    """How many pixels change when the widget gets the keyboard."""
    elsewhere.setFocus(Qt.FocusReason.TabFocusReason)
    without = picture(widget)
    widget.setFocus(Qt.FocusReason.TabFocusReason)
    assert widget.hasFocus() or widget.focusProxy()
    return int((without != picture(widget)).sum())


def test_every_control_of_the_window_shows_the_keyboard(themed):
    themed.view.set_selection(themed.view.selection)
    bar = themed.top_bar
    buttons = [part for part, action in bar.commands._parts if action is not None and part.isEnabled()]
    controls = [*buttons, bar.show_picker, bar.units_picker, bar.layout_picker, themed.tables.case_picker]
    controls += [themed.tables.tabs.tabBar(), themed.sheet]
    for control in controls:
        away = bar.units_picker if control is not bar.units_picker else bar.show_picker
        assert changes(control, away) > 8, control
    row = next(row for row in themed.findings.rows if row.row.leads_somewhere)
    themed.findings.ensureWidgetVisible(row)
    assert changes(row, bar.show_picker) > 8


def test_the_current_cell_of_a_table_shows_the_keyboard(themed):
    table = themed.tables.views["segments"]
    table.setCurrentIndex(table.model().index(1, 1))
    assert changes(table, themed.top_bar.show_picker) > 8


def test_controls_of_help_and_title_block_show_the_keyboard(qtbot, themed):
    chord(themed.tables.views["segments"], Qt.Key.Key_T)
    dialog = dialog_of(themed, TitleBlockDialog)
    qtbot.waitUntil(lambda: dialog.isAncestorOf(QApplication.focusWidget()))
    for field in dialog.fields.values():
        assert changes(field, dialog.title) > 8
    finish(qtbot, dialog, dialog.reject)
    themed.help.show_page("limits")
    shown = themed.findChild(HelpWindow)
    qtbot.waitUntil(shown.isActiveWindow)
    for control in (shown.list, shown.page):
        assert changes(control, shown.search) > 8, control
    assert changes(shown.search, shown.list) > 8
    QTest.keyClick(shown.search, Qt.Key.Key_Escape)
