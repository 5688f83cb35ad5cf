"""Help on the real window: the page of the pane with the keyboard, links, search, pictures, both themes."""

from __future__ import annotations

import pytest
from PySide6.QtCore import QPoint, Qt, QUrl
from PySide6.QtGui import QTextDocument
from PySide6.QtTest import QTest
from PySide6.QtWidgets import QApplication

from app.gui.actions import COMMANDS, shortcuts_of
from app.gui.help_page import HelpPage, marked
from app.gui.help_pictures import Pictures
from app.gui.help_window import HelpWindow
from app.gui.theme import DARK, LIGHT
from app.help.markup import PICTURE, marks
from app.help.pages import KEYS, PAGES, languages, page_path, read_page
from app.words import use_language
from tests.gui.hand import begin, chord, go_to
from tests.screenshots import dark_palette

WRITTEN = [page for page, _title in PAGES if page != KEYS]


@pytest.fixture
def help_window(qtbot):
    made = HelpWindow()
    qtbot.addWidget(made)
    made.show()
    return made


@pytest.fixture
def german():
    use_language("de")
    yield
    use_language("en")


def opened(window) -> HelpWindow:
    (found,) = [dialog for dialog in window.findChildren(HelpWindow) if dialog.isVisible()]
    return found


@pytest.mark.parametrize("page", [page for page, _title in PAGES])
@pytest.mark.parametrize("language", languages())
def test_every_mark_is_filled_in(qapp, language, page):
    use_language(language)
    try:
        assert "{" not in marked(page).text
    finally:
        use_language("en")


def test_keys_named_in_the_text_are_those_of_the_commands(help_window):
    help_window.show_page("entering")
    undo = next(command for command in COMMANDS if command.key == "undo")
    assert shortcuts_of(undo)[0].toString() in help_window.page.toPlainText()
    assert ("key", "undo") in marks(read_page("entering"))


def test_the_page_of_keys_has_every_key_of_the_commands_and_panes(help_window):
    help_window.show_page(KEYS)
    text = help_window.page.toPlainText()
    for command in COMMANDS:
        for key in shortcuts_of(command)[:1]:
            assert key.toString() in text
    for words in ("Cursor to the first or last joint", "Edit the cell", "In the findings"):
        assert words in text
    assert not any(odd in text for odd in ("F14", "F16", "F18", ", New", ", Exit", "Shift+Save"))


@pytest.mark.parametrize(
    ("tab", "key", "page", "heading"),
    [
        (0, "segments", "entering", ""),
        (1, "joints", "loads", "Supports"),
        (2, "load_cases", "loads", "Load cases"),
        (3, "combinations", "loads", "Combinations"),
        (4, "materials", "entering", "Materials"),
        (5, "limits displacement", "loads", "Limits"),
    ],
)
def test_f1_in_a_table_opens_its_page(window, tab, key, page, heading):
    window.tables.tabs.setCurrentIndex(tab)
    window.tables.views[key].setFocus()
    QTest.keyClick(window.tables.views[key], Qt.Key.Key_F1)
    shown = opened(window).page
    assert shown.page == page
    if heading:
        assert shown.textCursor().block().text() == heading


def test_f1_in_sheet_and_findings_opens_what_is_told_of_them(window):
    window.sheet.setFocus()
    QTest.keyClick(window.sheet, Qt.Key.Key_F1)
    assert opened(window).page.textCursor().block().text() == "The strips"
    row = next(row for row in window.findings.rows if row.row.leads_somewhere)
    row.setFocus()
    window.activateWindow()
    QTest.keyClick(row, Qt.Key.Key_F1)
    assert opened(window).page.textCursor().block().text() == "Findings"


def test_f1_while_a_cell_is_typed_into_leaves_the_cell_open(window, table):
    go_to(table, 1, "length")
    table.setFocus()
    line = begin(table, "77")
    QTest.keyClick(line, Qt.Key.Key_F1)
    assert opened(window).page.page == "entering"
    assert line.isVisible()
    assert line.text() == "77"
    QTest.keyClick(line, Qt.Key.Key_Escape)


def test_help_closes_with_escape_and_gives_the_keyboard_back(qtbot, window, table):
    table.setFocus()
    QTest.keyClick(table, Qt.Key.Key_F1)
    shown = opened(window)
    qtbot.waitUntil(shown.isActiveWindow)
    QTest.keyClick(shown.page, Qt.Key.Key_Escape)
    assert not shown.isVisible()
    qtbot.waitUntil(lambda: QApplication.focusWidget() is table)


def place_of(page: HelpPage, words: str) -> QPoint:
    """The middle of some words on the page, in the viewport."""
    page.moveCursor(page.textCursor().MoveOperation.Start)
    assert page.find(words)
    cursor = page.textCursor()
    page.ensureCursorVisible()
    end = page.cursorRect(cursor).center()
    cursor.setPosition(cursor.selectionStart())
    return (page.cursorRect(cursor).center() + end) / 2


def test_a_link_leads_on_and_back_returns_to_where_one_was(qtbot, help_window):
    help_window.show_page("limits")
    page = help_window.page
    QTest.mouseClick(
        page.viewport(), Qt.MouseButton.LeftButton, pos=place_of(page, "what the solver guarantees")
    )
    assert page.page == "guarantee"
    assert help_window.list.currentItem().text() == "What the solver guarantees"
    chord(help_window, Qt.Key.Key_Left, Qt.KeyboardModifier.AltModifier)
    assert page.page == "limits"
    assert not help_window.back.isEnabled()


def test_back_returns_to_the_line(help_window):
    help_window.show_page("reading")
    bar = help_window.page.verticalScrollBar()
    bar.setValue(300)
    help_window.page.on_link(QUrl("guarantee.md"))
    QTest.mouseClick(help_window.back, Qt.MouseButton.LeftButton)
    assert (help_window.page.page, bar.value()) == ("reading", 300)


def test_the_list_goes_by_keys(help_window):
    help_window.show_page("entering")
    help_window.list.setFocus()
    QTest.keyClick(help_window.list, Qt.Key.Key_Down)
    assert help_window.page.page == "shaping"


def test_search_goes_through_all_pages_and_says_where_nothing_is(help_window):
    help_window.show_page("entering")
    chord(help_window.page, Qt.Key.Key_F)
    QTest.keyClicks(help_window.search, "creep")
    QTest.keyClick(help_window.search, Qt.Key.Key_Return)
    assert help_window.page.page == "limits"
    assert help_window.page.textCursor().selectedText() == "creep"
    assert help_window.told.text() == ""
    help_window.search.clear()
    QTest.keyClicks(help_window.search, "zeppelin")
    QTest.keyClick(help_window.search, Qt.Key.Key_Return)
    assert "zeppelin" in help_window.told.text()
    assert help_window.page.page == "limits"


@pytest.mark.parametrize("page", WRITTEN)
def test_every_picture_can_be_made(qapp, page):
    look = HelpPage()
    pictures = Pictures(look)
    named = {target for _alt, target in PICTURE.findall(page_path(page, "en").read_text("utf-8"))}
    for target in named:
        image = pictures.image(target.removeprefix("picture:"), 600)
        assert image.width() <= 600
        assert (
            len({image.pixel(x, y) for x in range(0, image.width(), 3) for y in range(0, image.height(), 3)})
            > 8
        )
    look.deleteLater()


def test_no_picture_is_made_for_nothing(qapp):
    look = HelpPage()
    named = {t for page in WRITTEN for _alt, t in PICTURE.findall(page_path(page, "en").read_text("utf-8"))}
    assert {target.removeprefix("picture:") for target in named} == Pictures(look).names()
    look.deleteLater()


def picture(page: HelpPage, name: str):
    return page.loadResource(QTextDocument.ResourceType.ImageResource.value, QUrl(f"picture:{name}"))


def test_pictures_and_page_follow_light_and_dark_while_open(qtbot, qapp, help_window):
    help_window.show_page("entering")
    page, before = help_window.page, qapp.palette()
    assert picture(page, "drawing").pixelColor(4, 4).name().upper() == LIGHT.paper
    try:
        qapp.setPalette(dark_palette())
        qtbot.waitUntil(lambda: page.palette().base().color().name().upper() == DARK.card)
        assert picture(page, "drawing").pixelColor(4, 4).name().upper() == DARK.paper
    finally:
        qapp.setPalette(before)
    qtbot.waitUntil(lambda: page.palette().base().color().name().upper() == LIGHT.card)


def test_the_page_follows_the_font_while_open(qtbot, qapp, help_window):
    help_window.show_page("limits")
    before, height = qapp.font(), help_window.page.document().size().height()
    larger = qapp.font()
    larger.setPointSizeF(2 * larger.pointSizeF())
    try:
        qapp.setFont(larger)
        qtbot.waitUntil(lambda: help_window.page.document().size().height() > 1.5 * height)
    finally:
        qapp.setFont(before)
    qtbot.waitUntil(lambda: help_window.page.document().size().height() == pytest.approx(height, rel=0.02))


def test_the_words_of_pictures_follow_the_language(qtbot, german):
    made = HelpWindow()
    qtbot.addWidget(made)
    made.show_page("reading")
    assert made.page.toPlainText().startswith("Die Ergebnisse lesen")
    assert not picture(made.page, "findings").isNull()


@pytest.mark.parametrize("typed", ["delete load", "loads delete", "LOAD  Delete"])
def test_search_finds_all_words_in_any_order_as_they_are_typed(help_window, typed):
    help_window.show_page("limits")
    QTest.keyClicks(help_window.search, typed)
    assert help_window.page.page == "shaping"
    assert help_window.page.textCursor().block().text().startswith("To delete loads")
    assert help_window.page.cursorRect().top() < 0.6 * help_window.page.viewport().height()
    QTest.mouseClick(help_window.back, Qt.MouseButton.LeftButton)
    assert help_window.page.page == "limits"
    assert not help_window.back.isEnabled()


def test_search_says_while_typing_that_nothing_is_found_and_takes_it_back(help_window):
    help_window.show_page("entering")
    QTest.keyClicks(help_window.search, "zeppelin")
    assert "zeppelin" in help_window.told.text()
    help_window.search.clear()
    assert help_window.told.text() == ""


def test_enter_goes_on_to_every_place_and_round(help_window):
    help_window.show_page("entering")
    QTest.keyClicks(help_window.search, "support")
    seen = set()
    for _time in range(200):
        place = help_window.page.page, help_window.page.textCursor().selectionStart()
        if place in seen:
            break
        seen.add(place)
        assert help_window.page.textCursor().selectedText().lower() == "support"
        QTest.keyClick(help_window.search, Qt.Key.Key_Return)
    assert len({page for page, _at in seen}) > 3


def test_words_of_one_heading_are_found_where_no_paragraph_has_them_all(help_window):
    help_window.show_page("entering")
    QTest.keyClicks(help_window.search, "lighter taper nudges")
    assert help_window.told.text() != ""
    help_window.search.clear()
    QTest.keyClicks(help_window.search, "taper nudges")
    assert help_window.page.page == "shaping"
