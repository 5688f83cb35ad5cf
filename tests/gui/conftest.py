"""The whole window as a fixture, on a file of the user's own.

Qt is imported inside the fixtures, since this file is read also where there is no Qt.
"""

import pytest

from app import samples


@pytest.fixture
def store(tmp_path):
    from app.gui.settings import Settings

    made = Settings(tmp_path / "settings.ini")
    made.set_last_folder(tmp_path)
    return made


@pytest.fixture
def rod(tmp_path):
    """A file of the user's own."""
    path = tmp_path / "rod.barwright.json"
    path.write_bytes(samples.sample_path("tie_rod").read_bytes())
    return path


@pytest.fixture
def window(qtbot, store, rod, tmp_path):
    from app.gui.main import open_window
    from tests.gui.windows import end, solved

    made = open_window(rod, store, tmp_path / "recovery")
    with qtbot.waitActive(made):
        made.activateWindow()
    solved(qtbot, made)
    yield made
    end(qtbot, made)


@pytest.fixture
def table(window):
    return window.tables.views["segments"]
