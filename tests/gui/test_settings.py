"""What is remembered between starts, and the log."""

import logging
import os
import sys

import pytest
from PySide6.QtCore import QByteArray

from app.gui import log
from app.gui.settings import MOST_RECENT, Settings


@pytest.fixture
def store(tmp_path):
    return Settings(tmp_path / "settings.ini")


def test_recent_files_are_newest_first_without_repeats_and_exist(store, tmp_path):
    files = [tmp_path / f"{number}.json" for number in range(MOST_RECENT + 3)]
    for path in files:
        path.write_text("{}", "utf-8")
        store.add_recent(path)
    store.add_recent(files[5])
    assert store.recent[0] == files[5]
    assert len(store.recent) == len(set(store.recent)) == MOST_RECENT
    files[5].unlink()
    assert files[5] not in store.recent
    store.clear_recent()
    assert store.recent == ()


def test_a_recent_file_that_may_not_be_looked_at_any_more_is_passed_over(store, tmp_path, monkeypatch):
    path = tmp_path / "private.json"
    path.write_text("{}", "utf-8")
    store.add_recent(path)
    store.set_last_folder(path.parent)
    real = os.stat

    def refused(what, *args, **keys):
        if str(what).startswith(str(tmp_path)):
            raise PermissionError(13, "Permission denied")
        return real(what, *args, **keys)

    monkeypatch.setattr(os, "stat", refused)
    assert store.recent == ()
    assert store.last_folder != path.parent


def test_where_no_log_can_be_written_the_work_goes_on(tmp_path):
    blocked = tmp_path / "a file"
    blocked.write_text("in the way")
    log.start(blocked / "folder")
    log.stop()


def test_all_is_read_back_from_the_file(store, tmp_path):
    path = tmp_path / "a.json"
    path.write_text("{}", "utf-8")
    store.add_recent(path)
    store.set_last_folder(tmp_path)
    store.set_units("in-kip-ksi")
    store.set_bytes("geometry", QByteArray(b"\x00\x01"))
    store.sync()
    again = Settings(tmp_path / "settings.ini")
    assert again.recent == (path,)
    assert again.last_folder == tmp_path
    assert again.units == "in-kip-ksi"
    assert again.bytes_of("geometry") == QByteArray(b"\x00\x01")


def test_nonsense_in_the_file_is_the_default(store, tmp_path):
    store._store.setValue("units", "furlongs")
    store._store.setValue("last_folder", str(tmp_path / "gone"))
    assert store.units == "mm-N-MPa"
    assert store.last_folder != tmp_path / "gone"
    assert store.bytes_of("geometry").isEmpty()


@pytest.fixture
def log_file(tmp_path):
    path = log.start(tmp_path / "log")
    yield path
    log.stop()
    log.LOGGER.setLevel(logging.NOTSET)


def test_an_error_is_logged_with_its_traceback(log_file):
    try:
        raise ZeroDivisionError("planted")
    except ZeroDivisionError as error:
        report = log.log_error("solver", error)
    assert "planted" in report
    assert "test_settings.py" in log_file.read_text("utf-8")


def test_what_nobody_caught_is_logged_and_told_and_the_hook_goes_again(log_file):
    before, told = sys.excepthook, []
    hook = log.UncaughtErrors(told.append)
    hook.install()
    try:
        sys.excepthook(ValueError, ValueError("planted"), None)
    finally:
        hook.remove()
    assert sys.excepthook is before
    assert "planted" in told[0]
    assert "planted" in log_file.read_text("utf-8")
