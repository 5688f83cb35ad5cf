"""What holds for every test: no display, no trace in the user's settings, nothing left running, no noise.

Where Qt is absent or blocked (tests/without_qt) the tests that need it are not collected and the rest run.
"""

from __future__ import annotations

import importlib.util
import os
import threading
from collections.abc import Iterator
from pathlib import Path

import hypothesis
import pytest

os.environ.setdefault("QT_QPA_PLATFORM", "offscreen")
os.environ["LC_ALL"] = "C.UTF-8"  # the words and the decimal sign of the tests are those of the sources
os.environ.pop("LANGUAGE", None)

hypothesis.settings.register_profile(
    "quick",
    deadline=None,  # two shared cores: a slow example is no fault
    suppress_health_check=[hypothesis.HealthCheck.too_slow],  # nor is one that is slow to make
    max_examples=40,
    derandomize=True,  # the same examples everywhere; the thorough profile looks for new ones
    database=None,
)
hypothesis.settings.register_profile(
    "few", hypothesis.settings.get_profile("quick"), max_examples=5
)  # where a second run asks something else, such as whether it works without Qt
hypothesis.settings.register_profile("thorough", deadline=None, max_examples=1000)
hypothesis.settings.load_profile(os.environ.get("HYPOTHESIS_PROFILE", "quick"))


def has_qt() -> bool:
    """Whether Qt can be imported; the tests that need it are collected only then."""
    try:
        return importlib.util.find_spec("PySide6.QtCore") is not None
    except ImportError:
        return False


HAS_QT = has_qt()
collect_ignore_glob = [] if HAS_QT else ["gui/*"]


def pytest_addoption(parser: pytest.Parser, pluginmanager: pytest.PytestPluginManager) -> None:
    """Let the settings of pytest-qt stand in pyproject.toml where it is not loaded."""
    if not pluginmanager.has_plugin("pytest-qt"):
        for name in ("qt_api", "qt_log_level_fail", "qt_log_ignore"):
            parser.addini(name, "of pytest-qt, which is not loaded here")


@pytest.fixture(scope="session", autouse=True)
def isolated_settings(tmp_path_factory: pytest.TempPathFactory) -> None:
    """Keep settings, recovery copies and recent files of the tests out of the user's own folders."""
    if HAS_QT:
        from PySide6.QtCore import QSettings, QStandardPaths

        QStandardPaths.setTestModeEnabled(True)
        folder = str(tmp_path_factory.mktemp("settings"))
        QSettings.setDefaultFormat(QSettings.Format.IniFormat)
        for file_format in (QSettings.Format.IniFormat, QSettings.Format.NativeFormat):
            QSettings.setPath(file_format, QSettings.Scope.UserScope, folder)


@pytest.fixture(autouse=True)
def no_thread_left() -> Iterator[None]:
    """Fail the test that leaves a thread running."""
    before = set(threading.enumerate())
    yield
    left = [thread for thread in threading.enumerate() if thread not in before and thread.is_alive()]
    for thread in left:
        thread.join(timeout=2.0)  # a pool told to shut down may still be on its last step
    alive = [thread.name for thread in left if thread.is_alive() and thread.name != "MainThread"]
    assert not alive, f"threads left running: {', '.join(alive)}"


@pytest.fixture(scope="session")
def checkout() -> Path:
    """The top of the source tree."""
    return Path(__file__).resolve().parent.parent
