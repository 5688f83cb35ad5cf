"""No word reaches the user past the catalogues: the window in a language of brackets, read as a whole."""

from __future__ import annotations

from collections.abc import Iterator

import pytest
from msgspec import UNSET
from msgspec.structs import replace
from PySide6.QtCore import QAbstractItemModel, Qt
from PySide6.QtGui import QAction, QPainter
from PySide6.QtTest import QTest
from PySide6.QtWidgets import (
    QAbstractButton,
    QAbstractItemView,
    QComboBox,
    QDialog,
    QLabel,
    QLineEdit,
    QMenu,
    QTabWidget,
    QWidget,
)

from app import samples
from app.gui.dialogs import ask_unsaved
from app.gui.help import key_groups
from app.gui.tables.pages import TABLES
from app.gui.view import Selection, Shown
from app.hand.kinds import KINDS
from app.looks import Looks
from tests.gui.hand import enter
from tests.gui.windows import finish, solved
from tests.pseudo import bare, brackets, words_of

ROLE = Qt.ItemDataRole
ROLES = (
    ROLE.DisplayRole,
    ROLE.ToolTipRole,
    ROLE.StatusTipRole,
    ROLE.AccessibleTextRole,
    ROLE.AccessibleDescriptionRole,
)
# Names and signs that no language changes, units, and Qt's own words, which Qt translates.
FIXED = frozenset(
    (
        "barwright",
        "deutsch",
        "english",
        "json",
        "mpa",
        "ksi",
        "kip",
        "lbf",
        "psi",
        "rad",
        "alt",
        "esc",
        "enter",
        "tab",
    )
)
OF_QT = frozenset(
    ("scroll", "left", "right", "cancel", "save", "ctrl", "shift", "home", "end", "del", "ins", "backspace")
)
OF_USERS = frozenset[str]().union(*(words_of(samples.read_sample(name)) for name in samples.names()))
OF_SAMPLES = frozenset(word for name in samples.names() for word in name.split("_"))
KNOWN = FIXED | OF_QT | OF_USERS | OF_SAMPLES


@pytest.fixture
def rod(rod):
    with brackets():
        yield rod


def texts_of(widget: QWidget) -> Iterator[str]:
    """What a control says, in whatever way."""
    yield from (widget.toolTip(), widget.statusTip(), widget.accessibleName(), widget.accessibleDescription())
    yield widget.windowTitle()
    match widget:
        case QLabel() | QAbstractButton():
            yield widget.text()
        case QLineEdit():
            yield from (widget.text(), widget.placeholderText())
        case QComboBox():
            yield from (widget.itemText(row) for row in range(widget.count()))
        case QTabWidget():
            yield from (widget.tabText(tab) + widget.tabToolTip(tab) for tab in range(widget.count()))
        case QMenu():
            yield widget.title()
        case QAbstractItemView() if widget.model() is not None:
            yield from texts_of_model(widget.model())


def texts_of_model(model: QAbstractItemModel) -> Iterator[str]:
    for role in ROLES:
        for column in range(model.columnCount()):
            yield str(model.headerData(column, Qt.Orientation.Horizontal, role) or "")
            for row in range(model.rowCount()):
                yield str(model.index(row, column).data(role) or "")


def texts_below(widget: QWidget) -> Iterator[str]:
    for child in (widget, *widget.findChildren(QWidget)):
        yield from texts_of(child)
    for action in widget.findChildren(QAction):
        yield from (action.text(), action.toolTip(), action.statusTip())


@pytest.fixture
def painted(monkeypatch):
    """The texts that our own code paints."""
    found: list[str] = []
    drawn = QPainter.drawText

    def draw(self, *arguments):
        found.extend(argument for argument in arguments if isinstance(argument, str))
        return drawn(self, *arguments)

    monkeypatch.setattr(QPainter, "drawText", draw)
    return found


def untranslated(window, texts) -> set[str]:
    path = str(window.document.path)
    return {f"{text!r}: {found}" for text in texts if (found := bare(text.replace(path, ""), KNOWN))}


def as_it_opens(qtbot, window):
    """The drawing with a state, strips, findings and the first table."""


def upright(qtbot, window):
    window.on_layout_picked("vertical")


def with_the_envelope(qtbot, window):
    window.view.set_shown(Shown("envelope"))
    window.view.set_together(True)


def with_looks(qtbot, window):
    window.view.set_looks(Looks("stress", displaced=True))


def with_the_cursor_at_a_joint(qtbot, window):
    window.view.set_selection(Selection(segments=frozenset((1,)), joints=frozenset((2,))))
    window.sheet.setFocus()
    QTest.keyClick(window.sheet, Qt.Key.Key_Right, Qt.KeyboardModifier.ControlModifier)


def against_a_reference(qtbot, window):
    window.comparing.keep()
    window.comparing.on_named("A")
    enter(window.tables.views["segments"], 1, "length", "200")
    solved(qtbot, window)


def with_an_entry_not_taken_in(qtbot, window):
    enter(window.tables.views["segments"], 1, "length", "7?")


def held_nowhere(qtbot, window):
    project = window.document.project
    free = tuple(replace(joint, support=UNSET) for joint in project.joints)
    window.document.commit(replace(project, joints=free), "")


def without_allowables(qtbot, window):
    project = window.document.project
    without = [replace(m, allowable_tension=UNSET, allowable_compression=UNSET) for m in project.materials]
    window.document.commit(replace(project, materials=tuple(without)), "")
    solved(qtbot, window)


def with_a_handle_in_hand(qtbot, window):
    window.view.set_selection(Selection(segments=frozenset((1,))))
    window.sheet.setFocus()
    QTest.keyClick(window.sheet, Qt.Key.Key_H)
    QTest.keyClick(window.sheet, Qt.Key.Key_Right, Qt.KeyboardModifier.AltModifier)


SITUATIONS = (
    as_it_opens,
    upright,
    with_the_envelope,
    with_looks,
    with_the_cursor_at_a_joint,
    against_a_reference,
    with_an_entry_not_taken_in,
    held_nowhere,
    without_allowables,
    with_a_handle_in_hand,
)


@pytest.mark.parametrize("situation", SITUATIONS, ids=lambda act: act.__name__)
def test_the_window(qtbot, window, painted, situation):
    situation(qtbot, window)
    assert len(window.tables.views.values()) == len(TABLES)  # of the tabs not seen yet as well
    for menu in window.findChildren(QMenu):
        menu.aboutToShow.emit()
    texts = list(texts_below(window))
    window.grab()
    assert len(texts) > 500
    assert len(painted) > 20
    assert untranslated(window, texts + painted) == set()


@pytest.mark.parametrize("name", samples.names())
def test_each_sample(qtbot, window, painted, name):
    window.document.commit(samples.read_sample(name), "")
    solved(qtbot, window)
    window.grab()
    assert untranslated(window, [*texts_below(window), *painted]) == set()


def test_what_a_symbol_says(window):
    for kind in KINDS:
        if kind.on == "member":
            continue  # put on at once
        window.placing.take(kind)
        assert untranslated(window, [window.status.news.text()]) == set()


def test_the_menu_of_a_place(window):
    window.view.set_selection(Selection(segments=frozenset((1,)), joints=frozenset((2,))))
    window.sheet.setFocus()
    QTest.keyClick(window.sheet, Qt.Key.Key_F10, Qt.KeyboardModifier.ShiftModifier)
    menu = window.sheet_menu.menu
    assert untranslated(window, texts_below(menu)) == set()
    menu.close()


@pytest.mark.parametrize("key", ["title_block", "about", "log"])
def test_a_dialog(qtbot, window, key):
    window.actions_by_key[key].trigger()
    (dialog,) = [dialog for dialog in window.findChildren(QDialog) if dialog.isVisible()]
    assert untranslated(window, texts_below(dialog)) == set()
    finish(qtbot, dialog, dialog.reject)


def test_a_question(qtbot, window):
    box = ask_unsaved(window, "A", lambda _answer: None)
    assert untranslated(window, texts_below(box)) == set()
    finish(qtbot, box, box.reject)


def test_the_keys(window):
    """Qt names those of the commands, we name those of the panes."""
    commands, *panes = key_groups()
    texts = [commands[0], *(words for _keys, words in commands[1])]
    for title, keys in panes:
        texts += [title, *(text for pair in keys for text in pair)]
    assert {text for text in texts if bare(text, FIXED)} == set()
