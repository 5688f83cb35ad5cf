"""The recovery copy: written after a change, with drafts, offered only when nobody holds it any more."""

import json
from pathlib import Path

import pytest

from app import edits, samples
from app.gui import log
from app.gui.document import Document, Draft
from app.gui.recovery import Recovery, decode, encode, left_behind

PLACE = ("segments", 0, "length")


@pytest.fixture
def document(qapp):
    return Document(samples.read_sample(), Path("somewhere/rod.barwright.json"))


@pytest.fixture
def recovery(document, tmp_path):
    made = Recovery(document, tmp_path)
    yield made
    made.close()


def change(document, length=0.5):
    document.commit(edits.set_value(document.project, PLACE, length), "Length of A")


def test_a_copy_holds_project_drafts_and_file(document):
    change(document)
    place = ("segments", 1, "load_start", "load_cases", 0)
    document.commit_draft(place, Draft("ab\tc", "not a number", "Load of B"), "Load of B")
    found = decode(encode(document.snapshot, document.path), Path("copy"))
    assert found.snapshot.project == document.project
    assert dict(found.snapshot.drafts) == dict(document.snapshot.drafts)
    assert found.path == document.path


def test_it_is_due_half_a_minute_after_the_first_change(document, recovery):
    assert not recovery._timer.isActive()
    change(document)
    assert recovery._timer.isActive()
    assert recovery._timer.interval() == 30_000
    running = recovery._timer.timerId()
    change(document, 0.6)
    assert recovery._timer.timerId() == running, "a later change does not put the copy off"
    recovery._timer.timeout.emit()
    assert json.loads(recovery.copy.read_bytes())["format"] == "barwright-recovery"


def test_saving_and_undoing_to_the_saved_state_remove_it(document, recovery):
    change(document)
    recovery.write()
    document.mark_saved(document.project, document.path)
    assert not recovery.copy.exists()
    assert not recovery._timer.isActive()
    document.undo()
    recovery.write()
    document.redo()
    assert not recovery.copy.exists()


def test_a_living_programs_copy_is_not_offered_and_a_dead_ones_is(document, recovery, tmp_path):
    change(document)
    recovery.write()
    assert left_behind(tmp_path) == ()
    recovery._lock.unlock()  # as when the program is gone
    (found,) = left_behind(tmp_path)
    assert found.snapshot.project == document.project
    found.discard()
    assert left_behind(tmp_path) == ()


def test_a_clean_end_leaves_nothing(document, tmp_path):
    recovery = Recovery(document, tmp_path)
    change(document)
    recovery.write()
    recovery.close()
    assert list(tmp_path.iterdir()) == []


@pytest.mark.parametrize(
    "damaged",
    [
        b"{",
        b"\xff",
        b"[" * 100_000,
        b'{"format": "barwright-recovery", "project": 5, "drafts": [], "path": null}',
        b'{"format": "barwright-recovery", "project": "{}", "drafts": [], "path": null}',
        b'{"format": "barwright-recovery", "project": "{}", "drafts": [{"place": 1}], "path": null}',
    ],
)
def test_an_unreadable_copy_is_logged_and_left_alone(tmp_path, qapp, caplog, damaged):
    broken = tmp_path / "x.recovery.json"
    broken.write_bytes(damaged)
    with caplog.at_level("ERROR", logger=log.LOGGER.name):
        assert left_behind(tmp_path) == ()
    assert "unreadable recovery copy" in caplog.text
    assert broken.exists()


def test_a_full_disk_is_logged_and_disturbs_nothing(document, recovery, monkeypatch, caplog):
    def full(*_args):
        raise OSError(28, "No space left on device")

    monkeypatch.setattr("app.gui.recovery.write_bytes", full)
    change(document)
    with caplog.at_level("ERROR", logger=log.LOGGER.name):
        recovery.write()
    assert "recovery copy not written" in caplog.text
