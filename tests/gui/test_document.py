"""The document: snapshots, drafts, undo, modified state and previews."""

from pathlib import Path

import pytest
from msgspec import UNSET

from app import edits
from app.gui.document import UNDO_LIMIT, Document, Draft, Preview
from solver.model import FixedSupport
from tests.members import Part, member, round_bar

PLACE = ("segments", 0, "length")


@pytest.fixture
def project():
    return member([Part(1.0, round_bar(0.04)), Part(2.0, round_bar(0.04))], {0: FixedSupport()})


@pytest.fixture
def document(qapp, project):
    return Document(project, Path("rod.barwright.json"))


def with_length(project, length):
    return edits.set_value(project, PLACE, length)


def test_undo_and_redo_give_the_very_same_snapshots_back(document, project):
    changed = with_length(project, 5.0)
    document.commit(changed, "Length of A")
    assert document.project is changed
    assert document.undo_name == "Length of A"
    document.undo()
    assert document.project is project
    assert (document.undo_name, document.redo_name) == (None, "Length of A")
    document.redo()
    assert document.project is changed


def test_an_edit_after_undo_drops_what_could_be_redone(document, project):
    document.commit(with_length(project, 5.0), "one")
    document.undo()
    document.commit(with_length(project, 6.0), "two")
    assert document.redo_name is None
    assert document.project.segments[0].length == 6.0


def test_an_entry_that_says_the_same_is_no_step(document, project):
    document.commit(with_length(project, 1.0), "Length of A")
    assert document.undo_name is None
    assert document.project is project


def test_typing_what_was_saved_is_unmodified_again(document, project):
    document.commit(with_length(project, 5.0), "Length of A")
    document.commit(with_length(document.project, 1.0), "Length of A")
    assert document.undo_name == "Length of A"
    assert not document.modified


def test_a_change_that_only_the_file_shows_is_a_change(document, project):
    unwritten = edits.set_value(project, ("segments", 0, "bedding"), UNSET)  # where a 0 was written
    assert unwritten == project
    document.commit(unwritten, "Bedding of A")
    assert document.project is unwritten
    assert document.modified


def test_undo_back_to_what_was_saved_is_unmodified_again(document, project, qtbot):
    with qtbot.waitSignal(document.modified_changed, check_params_cb=bool):
        document.commit(with_length(project, 5.0), "Length of A")
    with qtbot.waitSignal(document.modified_changed, check_params_cb=lambda modified: not modified):
        document.undo()


def test_saving_moves_the_clean_state(document, project):
    document.commit(with_length(project, 5.0), "Length of A")
    document.mark_saved(document.project, Path("rod.barwright.json"))
    assert not document.modified
    document.undo()
    assert document.modified


def test_a_draft_is_a_step_keeps_the_project_and_counts_as_changed(document, project):
    document.commit_draft(PLACE, Draft("abc", "not a number"), "Length of A")
    assert document.project is project
    assert document.has_drafts
    document.mark_saved(document.project, Path("rod.barwright.json"))
    assert document.modified, "saving leaves out what was not taken in, so it stays changed"
    document.undo()
    assert not document.has_drafts


def test_a_draft_follows_its_row_and_goes_when_it_is_settled(document, project):
    document.commit_draft(("segments", 1, "length"), Draft("abc", "not a number"), "Length of B")
    document.commit(edits.insert_segment(project, 0), "Insert segment")
    assert list(document.snapshot.drafts) == [("segments", 2, "length")]
    document.commit(document.project, "Length of C", settled=(("segments", 2, "length"),))
    assert not document.snapshot.drafts


def test_a_draft_of_a_deleted_row_comes_back_by_undo(document, project):
    document.commit_draft(("segments", 1, "length"), Draft("abc", "not a number"), "Length of B")
    document.commit(edits.delete_segments(project, (1,)), "Delete segments")
    assert not document.snapshot.drafts
    document.undo()
    assert list(document.snapshot.drafts) == [("segments", 1, "length")]


def test_a_preview_is_shown_but_not_part_of_the_document(document, project, qtbot):
    previewed = with_length(project, 7.0)
    with qtbot.waitSignal(document.preview_changed):
        document.set_preview(Preview(previewed))
    assert document.shown_project is previewed
    assert document.project is project
    assert not document.modified
    document.set_preview(Preview(None, "not a number"))
    assert document.has_drafts
    assert document.shown_project is project
    document.drop_preview()
    assert not document.has_drafts


def test_a_commit_ends_the_preview(document, project):
    document.set_preview(Preview(with_length(project, 7.0)))
    document.commit(with_length(project, 7.0), "Length of A")
    assert document.preview is None


def test_loading_starts_a_fresh_history(document, project):
    document.commit(with_length(project, 5.0), "Length of A")
    document.load(project, None)
    assert document.undo_name is None
    assert not document.modified
    assert document.path is None


def test_the_history_is_bounded_and_its_oldest_steps_go(document, project):
    for count in range(UNDO_LIMIT + 20):
        document.commit(with_length(project, 2.0 + count), str(count))
    steps = 0
    while document.undo_name is not None:
        document.undo()
        steps += 1
    assert steps == UNDO_LIMIT - 1
