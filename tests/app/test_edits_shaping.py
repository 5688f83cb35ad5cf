"""Repeat, mirror, join equal neighbours: what they keep, what they copy, and the same physics."""

from __future__ import annotations

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st
from msgspec import UNSET
from msgspec.structs import replace

from app import edits
from app.edits import EditError
from app.edits.records import FreshMarks
from app.edits.repeating import MOST
from app.project_file import dump, parse
from solver.model import (
    DisplacementLimit,
    FixedSupport,
    Joint,
    JointLoad,
    Limits,
    LoadCase,
    Project,
    ReactionLimit,
    RelativeLimit,
    SpringSupport,
    StopSupport,
)
from solver.solve import solve
from tests.drawn_members import busy_member
from tests.strategies import projects

BUSY = busy_member(5)


def total(project: Project) -> float:
    return sum(segment.length for segment in project.segments)


@st.composite
def blocks(draw: st.DrawFn) -> tuple[Project, int, int]:
    project = draw(projects())
    first = draw(st.integers(0, len(project.segments) - 1))
    return project, first, draw(st.integers(first, len(project.segments) - 1))


# --- repeat ---


@given(blocks(), st.integers(1, 3))
def test_repeated_segments_stand_behind_themselves_with_their_loads(drawn, times):
    project, first, last = drawn
    count = last - first + 1
    repeated = edits.repeat_segments(project, first, last, times)
    assert parse(dump(repeated)) == repeated
    assert len(repeated.segments) == len(project.segments) + times * count
    for k in range(1, times + 1):
        for i in range(first, last + 1):
            copy, original = repeated.segments[i + k * count], project.segments[i]
            assert replace(copy, mark=original.mark) == original
            for case, before in zip(repeated.load_cases, project.load_cases, strict=True):
                own = [x for x in before.segment_loads if x.segment == original.mark]
                taken = [x for x in case.segment_loads if x.segment == copy.mark]
                assert [replace(x, segment=original.mark) for x in taken] == own


@given(blocks(), st.integers(1, 3))
def test_the_far_joint_stays_at_the_end_and_seams_are_free(drawn, times):
    project, first, last = drawn
    count = last - first + 1
    repeated = edits.repeat_segments(project, first, last, times)
    assert repeated.joints[: last + 1] == project.joints[: last + 1]
    assert repeated.joints[last + 1 + times * count :] == project.joints[last + 1 :]
    assert repeated.limits == project.limits
    for k in range(1, times + 1):
        assert repeated.joints[first + k * count].support is UNSET
        for i in range(first + 1, last + 1):
            assert repeated.joints[i + k * count].support == project.joints[i].support


@given(blocks())
def test_deleting_the_copies_gives_the_physics_back(drawn):
    project, first, last = drawn
    count = last - first + 1
    repeated = edits.repeat_segments(project, first, last, 1)
    less = edits.delete_segments(repeated, range(first, first + count))
    assert [replace(s, mark="") for s in less.segments] == [replace(s, mark="") for s in project.segments]
    assert [j.support for j in less.joints] == [j.support for j in project.joints]


@pytest.mark.parametrize("times", [0, -1, MOST + 1])
def test_a_number_of_repeats_out_of_reach_is_refused(times):
    with pytest.raises(EditError) as caught:
        edits.repeat_segments(BUSY, 0, 1, times)
    assert caught.value.faults[0].rule == "repeats"


# --- mirror ---


@given(projects())
def test_a_mirrored_member_is_its_own_mirror_image(project):
    whole = edits.mirror_member(project)
    assert parse(dump(whole)) == whole
    n = len(project.segments)
    assert len(whole.segments) == 2 * n
    assert whole.segments[:n] == project.segments
    back = edits.reverse_member(whole)
    assert [replace(s, mark="") for s in back.segments] == [replace(s, mark="") for s in whole.segments]
    assert [j.support for j in back.joints] == [j.support for j in whole.joints]


@settings(max_examples=15)
@given(projects(max_segments=3))
def test_under_mirrored_loads_the_halves_answer_alike(project):
    calm = replace(project, load_cases=tuple(replace(case, gravity=0.0) for case in project.load_cases))
    whole = edits.mirror_member(calm)
    results = solve(whole)
    for u, inside in zip(results.solution.joint_displacement, results.solution.displacement, strict=True):
        scale = float(np.max(np.abs(inside))) or 1.0  # also where joints move by rounding alone
        np.testing.assert_allclose(u, -u[::-1], rtol=0.0, atol=1e-6 * scale)


def test_mirrored_limits_and_stops_and_the_middle():
    half = replace(
        BUSY,
        joints=(
            Joint("0", StopSupport(side="plus", clearance=1e-3)),
            *BUSY.joints[1:-1],
            Joint("5", SpringSupport(stiffness=1e8)),
        ),
        load_cases=(LoadCase("Push", joint_loads=(JointLoad("5", 1000.0), JointLoad("1", 500.0))),),
        combinations=(),
    )
    from solver.model import DisplacementLimit, Limits, RelativeLimit

    half = replace(
        half,
        limits=Limits(
            (DisplacementLimit("0", 1e-3), DisplacementLimit("5", 1e-3)), (RelativeLimit("1", "5", 1e-3),)
        ),
    )
    whole = edits.mirror_member(half)
    assert whole.joints[-1].support == StopSupport(side="minus", clearance=1e-3)
    assert whole.joints[5] == half.joints[5]
    loads = whole.load_cases[0].joint_loads
    assert [(load.joint, load.force) for load in loads] == [("1", 500.0), (whole.joints[9].mark, -500.0)]
    assert [x.joint for x in whole.limits.displacement] == ["0", "5", whole.joints[10].mark]
    assert [(x.start, x.end) for x in whole.limits.relative] == [("1", "5"), (whole.joints[9].mark, "5")]


# --- join equal neighbours ---


@given(projects(), st.data())
def test_splitting_a_plain_segment_and_joining_equals_gives_it_back(project, data):
    index = data.draw(st.integers(0, len(project.segments) - 1))
    start = edits.join_equal_neighbours(project)
    index = min(index, len(start.segments) - 1)
    split = edits.split_segment(start, index, 0.5 * start.segments[index].length)
    joined = edits.join_equal_neighbours(split)
    assert len(joined.segments) in (len(start.segments), len(start.segments) + 1)
    assert total(joined) == pytest.approx(total(start), rel=1e-12)
    assert edits.join_equal_neighbours(joined) == joined
    if len(joined.segments) == len(start.segments):
        assert dump(joined) == dump(start)


def test_equal_neighbours_are_joined_over_bare_joints_only():
    plain = replace(
        BUSY,
        segments=tuple(
            replace(s, section=BUSY.segments[1].section, length=0.3, bedding=0.0) for s in BUSY.segments
        ),
        joints=tuple(Joint(str(i), FixedSupport() if i in (0, 3) else UNSET) for i in range(6)),
        load_cases=(),
        combinations=(),
    )
    joined = edits.join_equal_neighbours(plain)
    assert [s.length for s in joined.segments] == pytest.approx([0.9, 0.6])
    assert [j.mark for j in joined.joints] == ["0", "3", "5"]
    assert edits.join_equal_neighbours(joined) is joined


def test_a_taper_is_never_joined_as_equal():
    tapered = replace(
        BUSY, segments=(BUSY.segments[0], replace(BUSY.segments[0], mark="Z"), *BUSY.segments[2:])
    )
    joints = tuple(replace(j, support=UNSET) for j in tapered.joints)
    bare = replace(tapered, joints=joints, load_cases=(), combinations=())
    assert edits.join_equal_neighbours(bare) == bare


def test_marks_given_out_many_at_a_time_are_looked_for_once():
    taken = [f"S{number}" for number in range(5000)]
    looked_at = []

    class Counting(set):
        def __contains__(self, mark: object) -> bool:
            looked_at.append(mark)
            return super().__contains__(mark)

    marks = FreshMarks(taken)
    marks._taken = Counting(taken)
    assert marks.in_turn(3, "S4999") == ["S5000", "S5001", "S5002"]
    assert len(looked_at) < 5010


# --- number the joints ---


def with_joint_marks(project, *marks):
    for index, mark in enumerate(marks):  # by way of marks that nobody has
        project = edits.rename_joint(project, project.joints[index].mark, f"way {index} {mark}")
    for index, mark in enumerate(marks):
        project = edits.rename_joint(project, f"way {index} {mark}", mark)
    return project


@pytest.mark.parametrize(
    ("before", "after"),
    [
        (["0", "2", "1", "3", "4"], ["0", "1", "2", "3", "4"]),
        (["4", "3", "2", "1", "0"], ["0", "1", "2", "3", "4"]),
        (["toe", "7", "bed", "03", "top 2"], ["toe", "1", "bed", "3", "top 2"]),
    ],
)
def test_joints_that_are_numbers_are_numbered_in_order_with_all_that_names_them(before, after):
    member = busy_member(4)
    limits = Limits(
        displacement=(DisplacementLimit(joint="1", limit=1e-3),),
        relative=(RelativeLimit(start="0", end="3", limit=1e-3),),
        reaction=(ReactionLimit(joint="2", limit=1e5),),
    )
    member = replace(member, limits=limits)
    assert edits.number_joints(with_joint_marks(member, *before)) == with_joint_marks(member, *after)


def test_joints_in_order_give_the_very_same_project():
    member = busy_member(3)
    assert edits.number_joints(member) is member
