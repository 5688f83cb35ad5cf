"""The program as it is started: opens, and ends without leaving anything behind."""

import gc
import sys

import pytest
from msgspec.structs import replace
from PySide6.QtCore import QTimer
from PySide6.QtWidgets import QApplication

from app.gui import main, settings
from app.gui.dialogs import TextDialog
from app.gui.window import Window
from app.samples import read_sample, sample_path


@pytest.fixture
def folder(tmp_path, monkeypatch):
    monkeypatch.setattr(settings, "folder", lambda: tmp_path)
    return tmp_path


def run_and_look(path, look, language=""):
    """Run the program, look at its window from inside its event loop, and close it."""
    seen = []

    def act():
        (window,) = [widget for widget in QApplication.topLevelWidgets() if isinstance(widget, Window)]
        seen.append(look(window))
        for dialog in window.findChildren(TextDialog):
            dialog.reject()
        window.close()

    QTimer.singleShot(0, act)
    code = main.run(path, language)
    return code, seen[0]


@pytest.mark.usefixtures("qapp")
def test_it_opens_a_sample_and_ends_cleanly(folder):
    hook = sys.excepthook
    code, project = run_and_look(str(sample_path("tie_rod")), lambda window: window.document.project)
    assert code == 0
    assert project == read_sample("tie_rod")
    assert sys.excepthook is hook
    assert list((folder / "recovery").iterdir()) == []


@pytest.mark.usefixtures("qapp", "folder")
def test_without_a_file_it_opens_a_new_project():
    code, title = run_and_look(None, lambda window: window.windowTitle())
    assert code == 0
    assert title.startswith("new project")


@pytest.mark.usefixtures("qapp", "folder")
def test_a_file_that_is_not_there_is_said_and_the_window_stays(tmp_path):
    def look(window):
        return [dialog.body.toPlainText() for dialog in window.findChildren(TextDialog)]

    code, texts = run_and_look(tmp_path / "gone.barwright.json", look)
    assert code == 0
    assert "no such file" in texts[0]


def test_what_the_first_results_brought_is_set_aside_once(window, qtbot):
    gc.unfreeze()
    try:
        main.set_aside(window)
        assert gc.get_freeze_count() == 0
        project = window.document.project
        window.document.commit(replace(project, title="another"), "Title")
        qtbot.waitUntil(lambda: window.showing.current)
        set_aside = gc.get_freeze_count()
        assert set_aside > 100_000  # the libraries
        gc.unfreeze()
        window.document.undo()
        qtbot.waitUntil(lambda: window.showing.current)
        assert gc.get_freeze_count() == 0
    finally:
        gc.unfreeze()
