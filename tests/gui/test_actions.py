"""The table of commands: whole, without clashes, and walked by menus and help alike."""

from collections import Counter

import pytest
from PySide6.QtGui import QKeySequence
from PySide6.QtWidgets import QMenu, QMenuBar

from app.gui.actions import (
    COMMANDS,
    MENUS,
    RECENT,
    SAMPLES,
    SEPARATOR,
    fill_menus,
    keys_text,
    make_actions,
    shortcuts_of,
)

REAL = [command for command in COMMANDS if command is not SEPARATOR]


def test_no_two_commands_share_a_key(qapp):
    keys = [key.toString() for c in REAL for key in shortcuts_of(c)]
    assert [key for key, count in Counter(keys).items() if count > 1] == []


def test_no_two_entries_of_a_menu_share_a_mnemonic(qapp):
    for menu in MENUS:
        letters = [c.text[c.text.index("&") + 1].lower() for c in REAL if c.menu == menu]
        assert sorted(letters) == sorted(set(letters)), menu


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
    fill_menus(bar, actions, {RECENT: QMenu(bar), SAMPLES: QMenu(bar)})
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


def test_the_help_page_lists_every_key(qapp):
    text = keys_text()
    for command in REAL:
        for key in shortcuts_of(command):
            assert key.toString(QKeySequence.SequenceFormat.NativeText) in text
