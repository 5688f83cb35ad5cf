"""The window in German: words, decimal comma in and out, Qt's own buttons; the choice of a language."""

import pytest
from PySide6.QtCore import QCoreApplication, Qt, QTranslator
from PySide6.QtGui import QGuiApplication
from PySide6.QtTest import QTest
from PySide6.QtWidgets import QAbstractButton, QLabel

from app.gui import main, settings
from app.gui.actions import command_keys
from app.gui.settings import Settings
from app.gui.title_block import TitleBlockDialog
from app.words import LANGUAGES, language, use_language
from tests.gui.hand import chord, editor, enter, go_to, text_at
from tests.gui.test_main import run_and_look
from tests.gui.windows import dialog_of, end


@pytest.fixture
def german(qapp):
    """German for this test, with Qt's own words taken away again afterwards."""
    use_language("de")
    before = set(qapp.findChildren(QTranslator))
    yield
    use_language("en")
    for translator in set(qapp.findChildren(QTranslator)) - before:
        qapp.removeTranslator(translator)
        translator.deleteLater()
    main.speak(qapp)
    QCoreApplication.sendPostedEvents()


@pytest.fixture
def folder(tmp_path, monkeypatch):
    monkeypatch.setattr(settings, "folder", lambda: tmp_path)
    return tmp_path


@pytest.mark.usefixtures("german")
class TestGerman:
    @pytest.fixture
    def rod(self, german, rod):
        return rod

    def test_a_comma_is_shown_and_typed(self, window, table):
        enter(table, 1, "length", "12,5")
        assert text_at(table, 1, "length") == "12,5"
        assert window.document.project.segments[0].length == 0.0125
        enter(table, 1, "length", "13.25")
        assert text_at(table, 1, "length") == "13,25"

    def test_an_editor_starts_with_the_comma(self, window, table):
        enter(table, 1, "length", "12,5")
        go_to(table, 1, "length")
        QTest.keyClick(table, Qt.Key.Key_F2)
        assert editor(table).text() == "12,5"
        QTest.keyClick(editor(table), Qt.Key.Key_Escape)

    def test_the_clipboard_has_the_comma_and_takes_both(self, window, table):
        enter(table, 1, "length", "12,5")
        go_to(table, 1, "length")
        chord(table, Qt.Key.Key_C)
        assert QGuiApplication.clipboard().text() == "12,5"
        for text in ("40.5", "41,5"):
            QGuiApplication.clipboard().setText(text)
            go_to(table, 2, "length")
            chord(table, Qt.Key.Key_V)
            assert text_at(table, 2, "length") == text.replace(".", ",")

    def test_a_support_is_shown_and_typed_in_the_words_of_the_trade(self, window, table):
        enter(table, 2, "support", "Feder 12,25 N/mm")
        assert text_at(table, 2, "support").endswith("Feder 12,25 N/mm")
        assert window.document.project.joints[2].support.stiffness == 12250.0

    def test_what_cannot_be_read_is_said_in_german(self, window, table):
        enter(table, 1, "length", "lang")
        assert "ist keine Zahl" in " ".join(label.text() for label in window.findChildren(QLabel))

    def test_the_findings_have_it(self, window):
        assert "Nicht erfüllt" in " ".join(label.text() for label in window.findings.findChildren(QLabel))

    def test_the_project_file_has_the_point(self, window, table, rod):
        enter(table, 1, "length", "12,5")
        chord(window, Qt.Key.Key_S)
        assert '"length": 0.0125' in rod.read_text("utf-8")

    def test_qt_s_own_buttons_speak_it(self, window, qapp):
        main.speak(qapp)
        window.actions_by_key["title_block"].trigger()
        dialog = dialog_of(window, TitleBlockDialog)
        assert "Abbrechen" in [b.text().replace("&", "") for b in dialog.findChildren(QAbstractButton)]
        dialog.reject()


def chosen(window):
    return [action.text() for action in window.language_menu.actions() if action.isChecked()]


def test_the_language_is_chosen_for_the_next_start(window, store):
    assert chosen(window) == ["As the system"]
    (action,) = [action for action in window.language_menu.actions() if action.text() == "Deutsch"]
    action.trigger()
    assert chosen(window) == ["Deutsch"]
    assert "started again" in window.status.news.text()
    assert (store.language, language()) == ("de", "en")


def test_a_language_that_is_none_of_ours_is_not_remembered(store):
    store.set_language("tlh")
    assert store.language == ""


@pytest.mark.usefixtures("german")
@pytest.mark.parametrize(
    ("chosen", "asked", "of_system", "title"),
    [
        ("", "", "C", "new project"),
        ("", "", "de_DE.UTF-8", "Neues Projekt"),
        ("de", "", "C", "Neues Projekt"),
        ("en", "", "de_DE.UTF-8", "new project"),
        ("de", "en", "de_DE.UTF-8", "new project"),
    ],
)
def test_the_program_starts_in_the_language_asked_for_else_chosen_else_the_system_s(
    folder, monkeypatch, chosen, asked, of_system, title
):
    monkeypatch.setenv("LC_ALL", of_system)
    store = Settings()
    store.set_language(chosen)
    store.sync()
    code, seen = run_and_look(None, lambda window: window.windowTitle(), asked)
    assert code == 0
    assert seen.startswith(title)
    store.set_language("")
    store.sync()


@pytest.mark.parametrize("code", LANGUAGES)
def test_the_top_bar_fits_the_smallest_window(qtbot, store, rod, tmp_path, code):
    """Also with a reference, and while a name is asked for one: longer words must not widen the window."""
    use_language(code)
    try:
        made = main.open_window(rod, store, tmp_path / "recovery")
    finally:
        use_language("en")
    made.against.show_references(("Before 1",), "Before 1")
    widths = [made.top_bar.minimumSizeHint().width()]
    made.against.ask("Before 2")
    widths.append(made.top_bar.minimumSizeHint().width())
    end(qtbot, made)
    assert max(widths) <= 1280


def test_keys_are_called_as_on_the_keyboard(german, qapp):
    """With Qt's words for them, and none is lost that English has."""
    english = [keys.split(", ") for keys, _words in command_keys()]
    main.speak(qapp)
    keys = [keys.split(", ") for keys, _words in command_keys()]
    assert list(map(len, keys)) == list(map(len, english))
    assert ["Strg+Entf"] in keys
