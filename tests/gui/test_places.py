"""Drafts find their cells again when rows come, go and change."""

import pytest

from app import edits
from app.gui.places import follow
from solver.model import FixedSupport
from tests.members import Part, case, member, round_bar

BAR = round_bar(0.04)


@pytest.fixture
def project():
    parts = [Part(1.0, BAR), Part(2.0, BAR), Part(3.0, BAR)]
    return member(parts, {0: FixedSupport()}, [case("Dead"), case("Live")])


def test_a_cell_behind_an_inserted_row_moves_down(project):
    grown = edits.insert_segment(project, 1)
    assert follow(("segments", 0, "length"), project, grown) == ("segments", 0, "length")
    assert follow(("segments", 2, "length"), project, grown) == ("segments", 3, "length")


def test_a_cell_of_a_deleted_row_is_gone(project):
    shrunk = edits.delete_segments(project, (1,))
    assert follow(("segments", 1, "length"), project, shrunk) is None
    assert follow(("segments", 2, "length"), project, shrunk) == ("segments", 1, "length")


def test_a_cell_of_a_changed_row_stays(project):
    changed = edits.set_value(project, ("segments", 1, "length"), 9.0)
    assert follow(("segments", 1, "section"), project, changed) == ("segments", 1, "section")


def test_the_case_at_the_end_of_a_place_is_followed_at_the_root(project):
    place = ("segments", 2, "heat", "load_cases", 1)
    fewer = edits.remove_case(project, "Dead")
    assert follow(place, project, fewer) == ("segments", 2, "heat", "load_cases", 0)
    assert follow(("segments", 2, "heat", "load_cases", 0), project, fewer) is None


def test_the_row_that_adds_another_stays_last(project):
    grown = edits.insert_segment(project, 0)
    assert follow(("segments", 3, "mark"), project, grown) == ("segments", 4, "mark")


def test_reversing_takes_the_cell_of_an_untouched_joint_along(project):
    turned = edits.reverse_member(project)
    assert follow(("joints", 0, "mark"), project, turned) == ("joints", 3, "mark")


def test_reversing_takes_the_cell_of_a_segment_along_that_has_changed_too(project):
    tapered = edits.set_value(project, ("segments", 2, "section"), round_bar(0.04, 0.03))
    turned = edits.reverse_member(tapered)
    assert turned.segments[0].mark == "C"
    assert follow(("segments", 2, "length"), tapered, turned) == ("segments", 0, "length")


def test_renaming_leaves_the_cell_where_it_is(project):
    renamed = edits.rename_segment(project, "B", "Q")
    assert follow(("segments", 1, "length"), project, renamed) == ("segments", 1, "length")


def test_a_load_typed_before_there_is_a_case_belongs_to_the_first_one(project):
    bare = edits.remove_case(edits.remove_case(project, "Dead"), "Live")
    place = ("load_cases", -1, "segment_loads", 0, "segment")
    assert follow(place, bare, edits.set_value(bare, ("title",), "Rod")) == place
    assert follow(place, bare, project) == ("load_cases", 0, "segment_loads", 0, "segment")
