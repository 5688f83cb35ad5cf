"""What a change leaves well formed, judged by the records it changed: never more lenient than the rules."""

from typing import Any

import pytest
from hypothesis import given
from hypothesis import strategies as st
from msgspec import structs

from app import edits
from app.edits import EditError
from app.edits.soundness import is_surely_sound
from app.hand.kinds import KINDS
from app.hand.putting import put_on, take_off
from solver import validation
from solver.model import JointLoad, LoadCase, Project, SegmentLoad, TubeSection
from tests.drawn_members import busy_member
from tests.strategies import projects

NAMES = {"materials": "name", "joints": "mark", "segments": "mark", "load_cases": "name"}
REFERENCES = {"segments": "material", "segment_loads": "segment", "joint_loads": "joint"}
NO_WALL = TubeSection(outer=0.05, inner=0.06)
MEMBER = busy_member(4)


def draw_list(draw: Any, key: str, records: tuple[Any, ...], words: tuple[str, ...]) -> tuple[Any, ...]:
    """The list with one thing done to it that may or may not be sound."""
    if not records:
        return records
    at = draw(st.integers(0, len(records) - 1))
    record, fields = records[at], [NAMES.get(key), REFERENCES.get(key)]
    changed = {name: draw(st.sampled_from(words)) for name in fields if name and draw(st.booleans())}
    if key == "segments" and draw(st.booleans()):
        changed["section"] = NO_WALL
    fresh = structs.replace(record, **changed)
    return draw(
        st.sampled_from(
            [
                (*records[:at], fresh, *records[at + 1 :]),
                (*records[:at], fresh, *records[at:]),
                (*records[:at], *records[at + 1 :]),
                records[::-1],
            ]
        )
    )


@st.composite
def changed_projects(draw: Any) -> tuple[Project, Project]:
    """A well-formed project, and the same with a few things done to its lists."""
    old = new = draw(projects())
    words = ("name 0", "?", *(s.mark for s in old.segments), *(j.mark for j in old.joints))
    for key in draw(st.lists(st.sampled_from((*NAMES, "segment_loads", "joint_loads")), max_size=3)):
        if key in NAMES:
            new = structs.replace(new, **{key: draw_list(draw, key, getattr(new, key), words)})
        elif new.load_cases:
            case = new.load_cases[0]
            case = structs.replace(case, **{key: draw_list(draw, key, getattr(case, key), words)})
            new = structs.replace(new, load_cases=(case, *new.load_cases[1:]))
    return old, new


@given(changed_projects())
def test_what_is_surely_sound_has_no_fault_by_the_rules_of_the_whole(pair):
    old, new = pair
    if is_surely_sound(new, old):
        assert validation.faults(new) == ()


def with_case(**lists: tuple[Any, ...]) -> Project:
    """The member with other loads in its first case."""
    return structs.replace(
        MEMBER, load_cases=(structs.replace(MEMBER.load_cases[0], **lists), *MEMBER.load_cases[1:])
    )


@pytest.mark.parametrize(
    "faulty",
    [
        *(structs.replace(MEMBER, **{key: getattr(MEMBER, key)[1:]}) for key in NAMES),
        *(
            structs.replace(MEMBER, **{key: getattr(MEMBER, key)[:1] * 2})
            for key in ("materials", "load_cases")
        ),
        structs.replace(MEMBER, segments=MEMBER.segments[:1] * len(MEMBER.segments)),
        structs.replace(
            MEMBER, segments=(structs.replace(MEMBER.segments[0], material="?"), *MEMBER.segments[1:])
        ),
        structs.replace(
            MEMBER, segments=(structs.replace(MEMBER.segments[0], section=NO_WALL), *MEMBER.segments[1:])
        ),
        structs.replace(MEMBER, segments=(*MEMBER.segments, structs.replace(MEMBER.segments[0], mark="new"))),
        with_case(segment_loads=(SegmentLoad("?"),)),
        with_case(joint_loads=(JointLoad("?"),)),
    ],
)
def test_what_is_faulty_is_never_surely_sound(faulty):
    assert validation.faults(faulty)
    assert not is_surely_sound(faulty, MEMBER)


@given(projects(), st.data())
def test_a_value_changed_within_a_segment_or_a_load_needs_no_look_at_the_whole(old, data):
    at = data.draw(st.integers(0, len(old.segments) - 1))
    assert is_surely_sound(edits.set_value(old, ("segments", at, "length"), 1.5), old)
    case = structs.replace(old, load_cases=(*old.load_cases, LoadCase("another case")))
    assert is_surely_sound(
        edits.set_segment_load(case, "another case", old.segments[at].mark, "load_start", 1.0), case
    )


@pytest.fixture
def whole_looks(monkeypatch):
    """How often all of a large project was looked at."""
    looks, ask = [], validation.faults

    def counted(project):
        looks.extend([1] * (len(project.segments) > 10))
        return ask(project)

    monkeypatch.setattr(validation, "faults", counted)
    return looks


# one companion stands beside all that is selected: there is only one look to take
EACH_ALONE = [kind for kind in KINDS if kind.key != "companion"]


@pytest.mark.parametrize("kind", EACH_ALONE, ids=lambda kind: kind.key)
def test_putting_on_many_and_taking_off_looks_at_each_alone(kind, whole_looks):
    member = busy_member(30)
    member = structs.replace(member, load_cases=(LoadCase("L"),), combinations=())
    inner = range(1, len(member.segments))  # a shoulder needs a step between two segments
    index = [i for i in inner if kind.on != "joint" or member.joints[i].support or kind.key == "shoulder"]
    on = put_on(kind, member, index[:20], 0)
    take_off(kind, on.project, index[:20], 0)
    assert whole_looks == []


def test_repeating_thousands_looks_at_what_is_new_only(whole_looks):
    member = busy_member(30)
    grown = edits.repeat_segments(structs.replace(member, limits=type(member.limits)()), 0, 3, 100)
    assert len(grown.segments) == 430


def test_a_record_that_cannot_be_is_refused_with_its_place_in_the_list():
    member = busy_member(4)
    place = ("load_cases", 0, "segment_loads")
    count = len(member.load_cases[0].segment_loads)
    with pytest.raises(EditError) as error:
        edits.add_record(member, place, {"segment": "nowhere", "load_start": 1.0})
    assert error.value.faults[0].place == f"load_cases[0].segment_loads[{count}].segment"
    with pytest.raises(EditError) as error:
        edits.add_record(member, place, {"segment": member.segments[0].mark, "load_start": "x"}, 0)
    assert error.value.faults[0].place == "load_cases[0].segment_loads[0].load_start"
