"""The table of commands: whole, without clashes, and walked by menus and help alike."""

from collections import Counter

import pytest
from PySide6.QtGui import QKeySequence, QTextCursor
from PySide6.QtWidgets import QMenu, QMenuBar

from app.gui.actions import (
    COMMANDS,
    MENUS,
    SEPARATOR,
    SUBMENUS,
    fill_menus,
    make_actions,
    shortcuts_of,
)
from app.gui.dialogs import TextDialog
from app.gui.status_line import StatusLine
from app.words import LANGUAGES, tr, use_language

REAL = [command for command in COMMANDS if command is not SEPARATOR]


def test_no_two_commands_share_a_key(qapp):
    keys = [key.toString() for c in REAL for key in shortcuts_of(c)]
    assert [key for key, count in Counter(keys).items() if count > 1] == []


@pytest.mark.parametrize("language", LANGUAGES)
def test_no_two_entries_of_a_menu_share_a_mnemonic(qapp, language):
    use_language(language)
    try:
        menus = [[tr(c.text) for c in REAL if c.menu == menu] for menu in MENUS] + [[tr(m) for m in MENUS]]
    finally:
        use_language("en")
    for texts in menus:
        letters = [text[text.index("&") + 1].lower() for text in texts]
        assert [letter for letter, count in Counter(letters).items() if count > 1] == [], texts


def test_every_standard_key_has_a_fallback_or_a_binding(qapp):
    for command in REAL:
        if isinstance(command.shortcut, QKeySequence.StandardKey):
            assert all(not key.isEmpty() for key in shortcuts_of(command)), command.key
            assert shortcuts_of(command), command.key


@pytest.fixture
def menu_bar(qtbot):
    bar = QMenuBar()
    qtbot.addWidget(bar)
    called = []
    handlers = {c.key: (lambda key=c.key: called.append(key)) for c in REAL}
    actions = make_actions(bar, handlers)
    fill_menus(bar, actions, {key: QMenu(bar) for key in SUBMENUS})
    return bar, actions, called


def test_menus_hold_every_command_in_order(menu_bar):
    bar, _actions, _called = menu_bar
    for action, title in zip(bar.actions(), MENUS, strict=True):
        own = [entry for entry in action.menu().actions() if not entry.isSeparator()]
        assert action.text() == title
        assert [entry.text() for entry in own] == [c.text for c in REAL if c.menu == title]


def test_each_command_calls_its_own_handler(menu_bar):
    _bar, actions, called = menu_bar
    for key, action in actions.items():
        action.trigger()
        assert called[-1] == key


def test_the_columns_of_a_shown_text_stand_under_each_other(qtbot):
    dialog = TextDialog(None, "Keys", "Keys", "Ctrl+Shift+Backspace, Ctrl+Ins\tlong\nF6\tshort")
    qtbot.addWidget(dialog)
    dialog.show()
    starts = []
    for line, word in ((0, "long"), (1, "short")):
        cursor = QTextCursor(dialog.body.document().findBlockByNumber(line))
        cursor.setPosition(cursor.position() + cursor.block().text().index(word))
        starts.append(dialog.body.cursorRect(cursor).left())
    assert starts[0] == starts[1]


def test_the_solver_s_text_gives_way_to_news(qtbot):
    line = StatusLine()
    qtbot.addWidget(line)
    line.solver.setText("Solved in 2.1 ms. " + 12 * "a long account ")
    line.file.setText("rod.barwright.json, changed")
    line.resize(1000, 24)
    line.show()
    line.tell(12 * "news ")
    qtbot.waitUntil(lambda: line.news.width() >= line.news.fontMetrics().horizontalAdvance(12 * "news "))
    line.tell(60 * "news ")
    qtbot.waitUntil(lambda: line.news.width() >= 690)
    line.resize(400, 24)
    assert line.width() == 400
    line.tell("")
    qtbot.waitUntil(lambda: line.news.minimumWidth() == 40)
