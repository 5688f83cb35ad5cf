"""Edits of companions, and what edits of the chain beside them do to them."""

from __future__ import annotations

import pytest
from hypothesis import given
from hypothesis import strategies as st
from msgspec.structs import replace

from app import edits
from app.edits import EditError
from app.project_file import dump, parse
from solver import validation
from solver.model import Project, TubeSection
from tests.sleeves import draw_bolt
from tests.strategies import full_projects

BOLT = draw_bolt()


def ends(project: Project) -> list[tuple[str, str, str]]:
    return [(c.mark, c.start, c.end) for c in project.companions]


def marks(project: Project, companion: int = 0) -> list[str]:
    return [segment.mark for segment in project.companions[companion].segments]


def unfit(project: Project) -> list[str]:
    found = validation.unsolvable(project)
    return [str(fault.facts["companion"]) for fault in found if fault.rule == "companion_length"]


# --- putting on, growing, taking off ---


def test_a_companion_is_made_to_fit_of_what_it_lies_beside():
    grown = edits.add_companion(BOLT, "0", "2")
    made = grown.companions[-1]
    assert (made.mark, made.start, made.end, made.action) == ("C1", "0", "2", "both")
    (piece,) = made.segments
    assert (piece.mark, piece.length, piece.material) == ("C1a", 0.29, "Steel")
    assert piece.section == BOLT.segments[0].section
    assert unfit(grown) == []


def test_the_joints_of_a_new_companion_may_be_named_in_either_order():
    assert ends(edits.add_companion(BOLT, "3", "1", "T"))[-1] == ("T", "1", "3")


@pytest.mark.parametrize("wrong", [("1", "9"), ("1", "1"), ("1", "2", "S")])
def test_a_companion_that_cannot_be_is_refused(wrong):
    with pytest.raises(EditError):
        edits.add_companion(BOLT, *wrong)


def test_a_companion_that_is_too_short_grows_by_what_is_missing():
    short = edits.set_value(BOLT, ("companions", 0, "segments", 1, "length"), 0.06)
    assert edits.missing_length(short, short.companions[0]) == 0.04
    grown = edits.extend_companion(short, 0)
    assert [(s.mark, s.length) for s in grown.companions[0].segments] == [
        ("Sa", 0.14),
        ("Sb", 0.06),
        ("Sc", 0.04),
    ]
    assert grown.companions[0].segments[2].section == TubeSection(outer=0.040, inner=0.022)


def test_a_companion_that_fits_gives_half_of_its_last_segment():
    lengths = [segment.length for segment in edits.extend_companion(BOLT, 0).companions[0].segments]
    assert lengths == [0.14, 0.05, 0.05]


def test_segments_go_with_their_loads_and_a_companion_with_its_last():
    one = edits.remove_companion_segments(BOLT, [(0, 1)])
    assert marks(one) == ["Sa"]
    assert one.load_cases[0].segment_loads == ()
    none = edits.remove_companion_segments(one, [(0, 0)])
    assert none.companions == ()
    assert validation.faults(none) == ()
    assert dump(none) == dump(edits.remove_companions(BOLT, [0]))


def test_the_last_segment_is_made_to_fit():
    longer = edits.set_value(BOLT, ("segments", 1, "length"), 0.25)
    assert unfit(longer) == ["S"]
    fitted = edits.fit_companion(longer, 0)
    assert [s.length for s in fitted.companions[0].segments] == [0.14, 0.11]
    assert unfit(fitted) == []


def test_what_cannot_fit_is_refused():
    shorter = edits.set_value(BOLT, ("segments", 1, "length"), 0.14)
    with pytest.raises(EditError, match="companion_full"):
        edits.fit_companion(shorter, 0)


# --- names ---


def test_renaming_takes_companions_along():
    renamed = edits.rename_joint(BOLT, "1", "collar")
    assert ends(renamed) == [("S", "collar", "2")]
    renamed = edits.rename_material(renamed, "Brass", "Bronze")
    assert [s.material for s in renamed.companions[0].segments] == ["Steel", "Bronze"]
    renamed = edits.set_value(renamed, ("companions", 0, "segments", 1, "mark"), "upper")
    assert renamed.load_cases[0].segment_loads[0].segment == "upper"
    assert validation.faults(renamed) == ()


def test_a_mark_of_the_member_is_taken_for_its_companions_too():
    with pytest.raises(EditError):
        edits.set_value(BOLT, ("companions", 0, "segments", 0, "mark"), "A")
    assert edits.insert_segment(replace(BOLT), 3).segments[3].mark not in ("Sa", "Sb")


def test_joints_numbered_in_order_keep_their_companions():
    named = edits.rename_joint(edits.rename_joint(BOLT, "1", "8"), "2", "9")
    assert ends(edits.number_joints(named)) == [("S", "1", "2")]


# --- edits of the chain ---


@given(full_projects())
def test_reversing_twice_gives_the_companions_back(project):
    once = edits.reverse_member(project)
    assert validation.faults(once) == ()
    assert dump(edits.reverse_member(once)) == dump(project)


def test_reversing_swaps_ends_and_order():
    turned = edits.reverse_member(BOLT).companions[0]
    assert (turned.start, turned.end) == ("2", "1")
    assert [s.mark for s in turned.segments] == ["Sb", "Sa"]
    assert turned.segments[0].section == TubeSection(outer=0.040, outer_end=0.044, inner=0.022)


def test_a_joint_that_a_companion_ends_at_takes_it_along_with_its_loads():
    gone = edits.delete_segments(BOLT, [1])
    assert gone.companions == ()
    assert gone.load_cases[0].segment_loads == ()
    assert edits.companions_at(BOLT, ("2",)) == ("S",)


def test_joining_over_the_end_of_a_companion_is_refused():
    with pytest.raises(EditError) as caught:
        edits.join_segments(BOLT, 1, 2)
    assert [(f.rule, f.facts["kind"]) for f in caught.value.faults] == [("joint_carries", "companion")]
    assert edits.join_equal_neighbours(BOLT) == BOLT


def test_a_split_leaves_them_as_they_are():
    assert edits.split_segment(BOLT, 1, 0.1).companions == BOLT.companions


def test_a_changed_span_is_not_mended_unasked():
    longer = edits.insert_segment(BOLT, 1)
    assert longer.companions == BOLT.companions
    assert unfit(longer) == ["S"]


def test_the_mirror_image_has_companions_with_loads_of_their_own():
    whole = edits.mirror_member(BOLT)
    assert len(ends(whole)) == 2
    image = whole.companions[1]
    assert [s.length for s in image.segments] == [0.10, 0.14]
    assert [s.material for s in image.segments] == ["Brass", "Steel"]
    assert unfit(whole) == []
    loaded = [load.segment for load in whole.load_cases[0].segment_loads]
    assert loaded == ["Sb", image.segments[0].mark]


def test_a_companion_up_to_the_middle_has_its_image_from_there():
    whole = edits.mirror_member(edits.add_companion(BOLT, "1", "3", "T"))
    assert ends(whole)[-1][1] == "3"
    assert unfit(whole) == []


def test_a_repeated_part_repeats_its_companions():
    pitch = edits.repeat_segments(BOLT, 1, 1, 2)
    assert len(pitch.companions) == 3
    assert unfit(pitch) == []
    joints = [joint.mark for joint in pitch.joints]
    spans = [(joints.index(c.start), joints.index(c.end)) for c in pitch.companions]
    assert spans == [(1, 2), (2, 3), (3, 4)]
    assert len(pitch.load_cases[0].segment_loads) == 3


@st.composite
def parts(draw: st.DrawFn) -> tuple[Project, int, int]:
    project = draw(full_projects())
    first = draw(st.integers(0, len(project.segments) - 1))
    return project, first, draw(st.integers(first, len(project.segments) - 1))


@given(parts(), st.integers(1, 3))
def test_companions_of_a_repeated_part_fit_and_the_others_wait(drawn, times):
    project, first, last = drawn
    places = {joint.mark: i for i, joint in enumerate(project.joints)}
    inner = [c for c in project.companions if first <= places[c.start] and places[c.end] <= last + 1]
    through = [c for c in project.companions if places[c.start] <= last < places[c.end]]
    repeated = edits.repeat_segments(project, first, last, times)
    assert parse(dump(repeated)) == repeated
    assert len(repeated.companions) == len(project.companions) + times * len(inner)
    assert unfit(repeated) == [c.mark for c in through if c not in inner]


@given(full_projects(), st.data())
def test_whatever_is_done_to_the_chain_the_project_stays_well_formed(project, data):
    index = data.draw(st.integers(0, len(project.segments) - 1))
    done = [edits.mirror_member(project), edits.move_segments(project, [index], 0)]
    done += [
        edits.insert_segment(project, index),
        edits.split_segment(project, index, project.segments[index].length / 2),
    ]
    if len(project.segments) > 1:
        done.append(edits.delete_segments(project, [index]))
    for edited in done:
        assert validation.faults(edited) == ()
        assert parse(dump(edited)) == edited
