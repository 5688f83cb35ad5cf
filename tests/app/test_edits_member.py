"""Edits of the chain: split, join, reverse, insert, delete; identities to the byte, and the same physics."""

from __future__ import annotations

import json
import math
from typing import Any

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from app import edits
from app.edits import EditError
from app.edits.linear import parted, sum_of
from app.edits.records import fresh_mark
from app.project_file import dump, parse
from solver.model import Joint, Project, Segment
from solver.solve import solve
from tests.documents import changed, documents, encoded, example
from tests.strategies import numbers, projects


def project(document: Any = None) -> Project:
    return parse(encoded(example() if document is None else document))


def document_of(edited: Project) -> Any:
    return json.loads(dump(edited))


def refusal(edit: Any, *arguments: Any) -> list[tuple[str, str]]:
    with pytest.raises(EditError) as caught:
        edit(*arguments)
    return [(fault.place, fault.rule) for fault in caught.value.faults]


def tube(outer: float, outer_end: float, inner: float, inner_end: float) -> Any:
    return {"shape": "tube", "outer": outer, "outer_end": outer_end, "inner": inner, "inner_end": inner_end}


def split_at(drawn: st.DataObject, member: Project) -> tuple[Project, int]:
    """The member split somewhere, and the index of the segment that was split."""
    index = drawn.draw(st.integers(0, len(member.segments) - 1))
    length = member.segments[index].length
    at = drawn.draw(numbers(0.01, 0.99)) * length
    return edits.split_segment(member, index, at), index


# --- split and join ---


@given(documents(), st.data())
def test_split_then_join_gives_the_same_bytes(document: Any, data: st.DataObject) -> None:
    whole = project(document)
    halves, index = split_at(data, whole)
    assert len(halves.segments) == len(whole.segments) + 1
    assert parse(dump(halves)) == halves
    assert dump(edits.join_segments(halves, index, index + 1)) == dump(whole)


@given(documents(), st.data())
def test_a_segment_split_twice_is_joined_in_one_step(document: Any, data: st.DataObject) -> None:
    """The inner joint of a taper is rounded once more, so the two outer ends are what must come back."""
    whole = project(document)
    length = whole.segments[0].length
    first = data.draw(numbers(0.3, 0.7)) * length
    parts = edits.split_segment(edits.split_segment(whole, 0, first), 0, first * 0.5)
    joined = edits.join_segments(parts, 0, 2)
    assert joined.segments[0].section == whole.segments[0].section
    assert joined.segments[0].length == pytest.approx(length, rel=4e-16)  # one rounding each way
    assert joined.joints == whole.joints


def test_a_split_interpolates_and_shares_by_length() -> None:
    halves = document_of(edits.split_segment(project(), 0, 0.14))
    a, c = halves["segments"][:2]
    assert (a["mark"], c["mark"]) == ("A", "C")
    assert (a["length"], c["length"]) == (0.14, 0.21)
    assert a["section"] == {
        "shape": "tube",
        "outer": 0.04,
        "outer_end": 0.036,
        "inner": 0.02,
        "inner_end": 0.016,
    }
    assert c["section"] == {
        "shape": "tube",
        "outer": 0.036,
        "outer_end": 0.03,
        "inner": 0.016,
        "inner_end": 0.01,
    }
    assert halves["load_cases"][1]["segment_loads"] == [
        {
            "segment": "A",
            "load_start": 1000.0,
            "load_end": 1200.0,
            "temperature_start": 30.0,
            "temperature_end": 36.0,
            "lack_of_fit": 0.00004,
        },
        {
            "segment": "C",
            "load_start": 1200.0,
            "load_end": 1500.0,
            "temperature_start": 36.0,
            "temperature_end": 45.0,
            "lack_of_fit": 0.00006,
        },
    ]
    assert [joint["mark"] for joint in halves["joints"]] == ["0", "3", "1", "2"]
    assert "support" not in halves["joints"][1]


def test_a_split_of_bedding_interpolates_it() -> None:
    halves = document_of(edits.split_segment(project(), 1, 0.1))
    _, b, c = halves["segments"]
    assert (b["bedding"], b["bedding_end"], c["bedding"], c["bedding_end"]) == (2.0e6, 2.2e6, 2.2e6, 3.0e6)
    assert b["section"] == c["section"] == {"shape": "area", "area": 7.0e-4}


@pytest.mark.parametrize("at", [0.0, -0.1, 0.35, 1.0, float("nan"), float("inf")])
def test_a_split_lies_inside(at: float) -> None:
    assert refusal(edits.split_segment, project(), 0, at) == [("segments[0].length", "not_inside")]


@given(numbers(1e-3, 1e3), numbers(0.0, 1.0))
def test_a_part_and_the_rest_make_the_whole(whole: float, fraction: float) -> None:
    part, rest = parted(whole, whole * fraction)
    assert sum_of(part, rest) == whole
    assert part == pytest.approx(whole * fraction, abs=2 * math.ulp(whole))


@pytest.mark.parametrize(
    ("whole", "part"),
    [
        (2.209931226666153, 2.209931226666153 * 0.0625),
        (1600.0404250492138, 3.2392872470685505),
        (7.872790830228232e-06, 1.0871019647919018e-07),
        (9.563494836271111, 0.24023114448785027),
        (-1e-4, -4e-5),
        (0.0, 0.0),
    ],
)
def test_also_where_the_digits_are_too_many_for_decimals(whole: float, part: float) -> None:
    assert sum_of(*parted(whole, part)) == whole


def test_what_a_person_would_write_comes_out() -> None:
    assert parted(0.35, 0.1) == (0.1, 0.25)
    assert 0.35 - 0.1 != 0.25  # what the bare subtraction gives
    assert sum_of(0.1, 0.2) == 0.3


SQUARE = {"shape": "area", "area": 1e-3}


def joinable() -> Any:
    """Two unlike tapers with a bare joint between them."""
    document = example()
    document["joints"][1] = {"mark": "1"}
    document["load_cases"][1]["joint_loads"] = []
    document["segments"][0]["section"] = {"shape": "round", "diameter": 0.04, "diameter_end": 0.03}
    document["segments"][1]["section"] = {"shape": "round", "diameter": 0.05, "diameter_end": 0.02}
    return document


def test_joining_runs_from_the_first_start_to_the_last_end() -> None:
    joined = document_of(edits.join_segments(project(joinable()), 0, 1))
    (segment,) = joined["segments"]
    assert segment == {
        "mark": "A",
        "length": 0.85,
        "material": "Steel",
        "section": {"shape": "round", "diameter": 0.04, "diameter_end": 0.02},
        "bedding_end": 3.0e6,
    }
    assert [joint["mark"] for joint in joined["joints"]] == ["0", "2"]
    (load,) = joined["load_cases"][1]["segment_loads"]
    assert load == {
        "segment": "A",
        "load_start": 1000.0,
        "load_end": 0.0,
        "temperature_start": 30.0,
        "temperature_end": 0.0,
        "lack_of_fit": 0.0001,
    }


def test_loads_of_either_part_alone_are_joined_with_nothing() -> None:
    document = joinable()
    document["load_cases"][1]["segment_loads"] = [
        {"segment": "B", "lack_of_fit": 0.001},
        {"segment": "B", "load_start": 5.0},
        {"segment": "A", "lack_of_fit": 0.002},
    ]
    joined = document_of(edits.join_segments(project(document), 0, 1))
    assert joined["load_cases"][1]["segment_loads"] == [
        {"segment": "A", "lack_of_fit": 0.003},
        {"segment": "A", "load_end": 5.0},
    ]


@pytest.mark.parametrize(
    ("steps", "value", "fault"),
    [
        (("segments", 1, "material"), "Oak", ("segments[1].material", "parts_differ")),
        (
            ("segments", 1, "section"),
            {"shape": "area", "area": 1e-3},
            ("segments[1].section", "parts_differ"),
        ),
        (("joints", 1, "support"), {"kind": "fixed"}, ("joints[1]", "joint_carries")),
        (("load_cases", 0, "joint_loads"), [{"joint": "1", "force": 1.0}], ("joints[1]", "joint_carries")),
        (("limits", "displacement"), [{"joint": "1", "limit": 1.0}], ("joints[1]", "joint_carries")),
        (("limits", "relative", 0, "to"), "1", ("joints[1]", "joint_carries")),
    ],
)
def test_joining_loses_nothing_that_was_put_in(steps: Any, value: Any, fault: tuple[str, str]) -> None:
    document = joinable()
    document["materials"].append({"name": "Oak", "modulus": 1e10})
    holder = document
    for step in steps[:-1]:
        holder = holder[step]
    holder[steps[-1]] = value
    assert refusal(edits.join_segments, project(document), 0, 1) == [fault]


def test_every_hindrance_of_a_joining_is_told() -> None:
    rules = refusal(edits.join_segments, project(), 0, 1)
    assert rules == [
        ("segments[1].section", "parts_differ"),
        ("joints[1]", "joint_carries"),
        ("joints[1]", "joint_carries"),
    ]


# --- reverse ---


@given(projects())
def test_reversed_twice_is_the_same_bytes(member: Project) -> None:
    assert dump(edits.reverse_member(edits.reverse_member(member))) == dump(member)


@given(documents())
def test_reversed_twice_is_the_same_also_where_keys_are_left_out(document: Any) -> None:
    """An end that was written over a start that was not makes the start a written 0: the same value."""
    member = project(document)
    turned = edits.reverse_member(member)
    assert parse(dump(turned)) == turned
    assert edits.reverse_member(turned) == member


def test_the_example_reversed() -> None:
    turned = document_of(edits.reverse_member(project()))
    assert [joint["mark"] for joint in turned["joints"]] == ["2", "1", "0"]
    assert turned["joints"][1]["support"]["side"] == "minus"
    assert turned["joints"][1]["support"]["clearance"] == 0.002
    b, a = turned["segments"]
    assert (a["mark"], b["mark"]) == ("A", "B")
    assert a["section"] == {
        "shape": "tube",
        "outer": 0.03,
        "outer_end": 0.04,
        "inner": 0.01,
        "inner_end": 0.02,
    }
    assert (b["bedding"], b["bedding_end"]) == (3.0e6, 2.0e6)
    assert b["section"] == {"shape": "area", "area": 7.0e-4}
    dead, service = turned["load_cases"]
    assert dead["gravity"] == 9.80665
    assert "gravity" not in service
    assert service["segment_loads"] == [
        {
            "segment": "A",
            "load_start": -1500.0,
            "load_end": -1000.0,
            "temperature_start": 45.0,
            "temperature_end": 30.0,
            "lack_of_fit": 0.0001,
        }
    ]
    assert service["joint_loads"] == [{"joint": "1", "force": -25000.0}, {"joint": "0", "movement": 0.0005}]
    assert turned["limits"] == example()["limits"]
    assert dump(edits.reverse_member(edits.reverse_member(project()))) == encoded(example())


def test_an_end_that_was_left_out_follows_the_same_value_reversed() -> None:
    document = changed("load_cases", 1, "segment_loads", [{"segment": "A", "load_end": 8.0}])
    turned = document_of(edits.reverse_member(project(document)))
    assert turned["load_cases"][1]["segment_loads"] == [{"segment": "A", "load_start": -8.0, "load_end": 0.0}]


# --- the same part, the same answer ---

# Joints move by up to their displacements' scale times the solver's bound (1e-9) and rounding; stiffness
# ratios of random members add the rest.
CLOSE = 1e-7


def displacements(member: Project) -> np.ndarray:
    return solve(member).solution.joint_displacement


@settings(max_examples=15)
@given(projects(max_segments=3))
def test_the_reversed_member_moves_as_its_mirror_image(member: Project) -> None:
    there, back = displacements(member), displacements(edits.reverse_member(member))
    scale = max(np.abs(there).max(), 1e-12)
    np.testing.assert_allclose(back[:, ::-1], -there, rtol=0, atol=CLOSE * scale)


@settings(max_examples=15)
@given(projects(max_segments=3), st.data())
def test_a_split_member_moves_as_before(member: Project, data: st.DataObject) -> None:
    halves, index = split_at(data, member)
    there = displacements(member)
    split = np.delete(displacements(halves), index + 1, axis=1)
    scale = max(np.abs(there).max(), 1e-12)
    np.testing.assert_allclose(split, there, rtol=0, atol=CLOSE * scale)


# --- insert and delete ---


@given(documents(), st.data())
def test_what_was_inserted_is_deleted_again(document: Any, data: st.DataObject) -> None:
    before = project(document)
    index = data.draw(st.integers(0, len(before.segments)))
    longer = edits.insert_segment(before, index)
    assert parse(dump(longer)) == longer
    assert dump(edits.delete_segments(longer, [index])) == dump(before)


def test_a_new_segment_continues_its_neighbour() -> None:
    member = project(joinable())
    last = edits.insert_segment(member, 2)
    assert last.segments[2].section == type(last.segments[2].section)(diameter=0.02)
    assert (last.segments[2].mark, last.joints[3]) == ("C", Joint("3"))
    first = edits.insert_segment(member, 0)
    assert first.segments[0].section == type(first.segments[0].section)(diameter=0.04)
    assert [joint.mark for joint in first.joints] == ["0", "3", "1", "2"]
    assert first.joints[0] == member.joints[0]


def test_a_segment_is_inserted_as_given() -> None:
    member = project()
    segment = Segment("new", 1.0, "Steel", member.segments[1].section)
    longer = edits.insert_segment(member, 1, segment, Joint("x"))
    assert [s.mark for s in longer.segments] == ["A", "new", "B"]
    assert [j.mark for j in longer.joints] == ["0", "1", "x", "2"]
    assert refusal(edits.insert_segment, member, 1, Segment("A", 1.0, "Steel", segment.section)) == [
        ("segments[1].mark", "duplicate_mark")
    ]


def test_a_segment_goes_with_its_loads_and_its_far_joint_with_loads_and_limits() -> None:
    left = document_of(edits.delete_segments(project(), [1]))
    assert [segment["mark"] for segment in left["segments"]] == ["A"]
    assert [joint["mark"] for joint in left["joints"]] == ["0", "1"]
    assert left["limits"] == {
        "displacement": [],
        "relative": [],
        "reaction": [{"joint": "0", "limit": 40000.0}],
    }
    left = document_of(edits.delete_segments(project(), [0]))
    assert left["load_cases"][1]["segment_loads"] == []
    assert left["load_cases"][1]["joint_loads"] == [{"joint": "0", "movement": -0.0005}]
    assert [joint["mark"] for joint in left["joints"]] == ["0", "2"]
    assert left["limits"] == example()["limits"]


def test_the_last_segment_stays() -> None:
    assert refusal(edits.delete_segments, project(), [0, 1]) == [("segments", "too_few_segments")]


@pytest.mark.parametrize(
    ("taken", "like", "fresh"),
    [
        ("AB", "A", "C"),
        ("ABC", "A", "D"),
        ("az", "a", "b"),
        ("Z", "Z", "Z2"),
        (["0", "1", "2"], "1", "3"),
        (["Steel", "Steel2"], "Steel", "Steel3"),
        (["K7"], "K7", "K2"),
    ],
)
def test_a_fresh_mark_goes_on_in_the_manner_of_its_neighbour(taken: Any, like: str, fresh: str) -> None:
    assert fresh_mark(taken, like) == fresh


# --- anything in any order ---


@settings(max_examples=30)
@given(documents(), st.data())
def test_any_edits_in_any_order_leave_a_well_formed_project(document: Any, data: st.DataObject) -> None:
    edited = project(document)
    for _ in range(data.draw(st.integers(1, 5))):
        index = data.draw(st.integers(0, len(edited.segments) - 1))
        edit = data.draw(st.sampled_from(EDITS))
        try:
            edited = edit(edited, index)
        except EditError as error:
            faults = error.faults
            assert faults
    assert parse(dump(edited)) == edited


EDITS: list[Any] = [
    lambda member, index: edits.split_segment(member, index, member.segments[index].length / 3),
    lambda member, index: edits.join_segments(member, index, min(index + 1, len(member.segments) - 1)),
    lambda member, index: edits.delete_segments(member, [index]),
    edits.insert_segment,
    lambda member, _: edits.reverse_member(member),
    lambda member, index: edits.rename_joint(member, member.joints[index].mark, "renamed"),
    lambda member, index: edits.rename_segment(member, member.segments[index].mark, "renamed"),
    lambda member, index: edits.rename_material(member, member.segments[index].material, "renamed"),
    lambda member, _: edits.remove_case(member, "name 0"),
]


# --- move ---


@given(projects(max_segments=6), st.data())
def test_moving_segments_keeps_them_and_leaves_the_joints(member: Project, data: st.DataObject) -> None:
    count = len(member.segments)
    taken = sorted(data.draw(st.sets(st.integers(0, count - 1))))
    before = data.draw(st.integers(0, count))
    moved = edits.move_segments(member, taken, before)
    others = [segment for index, segment in enumerate(member.segments) if index not in taken]
    first = sum(index not in taken for index in range(before))
    assert [member.segments[index] for index in taken] == list(moved.segments[first : first + len(taken)])
    assert [*moved.segments[:first], *moved.segments[first + len(taken) :]] == others
    assert (moved.joints, moved.load_cases, moved.limits) == (member.joints, member.load_cases, member.limits)


@given(projects(max_segments=6), st.data())
def test_a_segment_moved_back_gives_the_same_bytes(member: Project, data: st.DataObject) -> None:
    index = data.draw(st.integers(0, len(member.segments) - 1))
    to = data.draw(st.integers(0, len(member.segments) - 1))
    there = edits.move_segments(member, (index,), to + (to > index))
    assert there.segments[to] is member.segments[index]
    assert dump(edits.move_segments(there, (to,), index + (index > to))) == dump(member)
